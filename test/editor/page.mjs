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
    /** The text of every frame within the page: what a webview shows. */
    async frames() {
      const inner = page.frames().filter((frame) => frame !== page.mainFrame());
      return Promise.all(inner.map((frame) => frame.evaluate(() => document.body?.textContent ?? "")));
    },
    /** Waits until a selector finds something visible. */
    async appears({ selector }) {
      await page.waitForSelector(selector, { state: "visible", timeout: 15_000 });
    },
    /** Rests the pointer on the first thing a selector finds whose whole text this is. */
    async hover({ selector, text }) {
      const whole = new RegExp(`^\\s*${text.replace(/[.*+?^${}()|[\]\\]/g, "\\$&")}\\s*$`);
      await page.locator(selector, { hasText: whole }).first().hover({ timeout: 15_000 });
    },
    /** Pulls something that can be dragged, as the edge of a box, upwards. */
    async pullUp({ selector, pixels }) {
      const { x, y, width, height } = await page.locator(selector).first().boundingBox({ timeout: 15_000 });
      await page.mouse.move(x + width / 2, y + height / 2);
      await page.mouse.down();
      await page.mouse.move(x + width / 2, y + height / 2 - pixels, { steps: 10 });
      await page.mouse.up();
    },
    /** Turns the wheel over something. */
    async scroll({ selector, notches }) {
      await page.locator(selector).first().hover({ timeout: 15_000 });
      for (let i = 0; i < notches; i++) await page.mouse.wheel(0, 120);
    },
    /** Waits for the page that the workbench opened beside this one, closes it and gives its address. */
    async opened() {
      const context = page.context();
      const beside = context.pages().find((one) => one !== page);
      const other = beside ?? (await context.waitForEvent("page", { timeout: 15_000 }));
      await other.waitForURL(/^http/, { waitUntil: "commit" });
      const address = other.url();
      await other.close();
      await page.bringToFront();
      return address;
    },
    async away() {
      await page.mouse.move(5, 5);
    },
  };
  const server = createServer(async (request, response) => {
    // A host in the browser asks from a page of another origin.
    response.setHeader("Access-Control-Allow-Origin", "*");
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
