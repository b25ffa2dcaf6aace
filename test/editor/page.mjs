// What the suite, which runs in the extension host, asks of the page: a small server on this machine only.
import { createServer } from "node:http";
import { join } from "node:path";

/** Answers the suite's requests with the page's own doing. Gives the port. */
export function servePage(page, pictures) {
  const actions = {
    async screenshot({ name }) {
      await page.screenshot({ path: join(pictures, `${name}.png`) });
    },
    async press({ keys }) {
      await page.keyboard.press(keys);
    },
    async type({ text }) {
      await page.keyboard.type(text, { delay: 40 });
    },
    /** The visible text of everything a selector finds. */
    async texts({ selector }) {
      return page.$$eval(selector, (found) => found.map((one) => one.textContent ?? ""));
    },
    /** Waits until a selector finds something visible. */
    async appears({ selector }) {
      await page.waitForSelector(selector, { state: "visible", timeout: 15_000 });
    },
    async hover({ selector, text }) {
      await page.locator(selector, { hasText: text }).first().hover({ timeout: 15_000 });
    },
    async away() {
      await page.mouse.move(5, 5);
    },
  };
  const server = createServer(async (request, response) => {
    let body = "";
    for await (const chunk of request) body += chunk;
    const { action, ...args } = JSON.parse(body);
    try {
      const answer = (await actions[action](args)) ?? null;
      response.end(JSON.stringify({ answer }));
    } catch (error) {
      response.end(JSON.stringify({ error: String(error) }));
    }
  });
  return new Promise((resolve) => {
    server.listen(0, "127.0.0.1", () =>
      resolve({ port: server.address().port, close: () => server.close() }),
    );
  });
}
