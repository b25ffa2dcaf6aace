// What the suite, which runs in the extension host, asks of the page: a small server on this machine only.
import { createServer } from "node:http";
import { join } from "node:path";
import axe from "axe-core";

/** Matches this text and no longer one. */
function whole(text) {
  return new RegExp(`^\\s*${text.replace(/[.*+?^${}()|[\]\\]/g, "\\$&")}\\s*$`);
}

/** The frame in which a selector finds something, and what it finds first. */
async function inFrame(page, selector) {
  for (const frame of page.frames()) {
    // A frame may go away while it is asked.
    const found = await frame.$(selector).catch(() => null);
    if (found) return { frame, found };
  }
  throw new Error(`No frame holds ${selector}.`);
}

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
      await page
        .locator(selector, { hasText: whole(text) })
        .first()
        .hover({ timeout: 15_000 });
    },
    async click({ selector, text }) {
      await page
        .locator(selector, { hasText: whole(text) })
        .first()
        .click({ timeout: 15_000 });
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
    /** The markup of what a selector finds in a frame of the page, as the Markdown preview is one. */
    async framed({ selector }) {
      return (await inFrame(page, selector)).frame.$$eval(selector, (found) =>
        found.map((one) => one.outerHTML),
      );
    },
    /** Brings something in a frame into view. */
    async reveal({ selector }) {
      const { found } = await inFrame(page, selector);
      await found.scrollIntoViewIfNeeded();
    },
    /** What axe-core says is wrong with all that a selector finds, in the page or in a frame of it. */
    async faults({ selector }) {
      const { frame } = await inFrame(page, selector);
      await frame.evaluate(axe.source);
      return frame.evaluate(async (checked) => {
        const { violations } = await globalThis.axe.run({ include: [checked] });
        return violations.map(({ id, impact, nodes }) => ({
          id,
          impact,
          where: nodes.map(({ html, failureSummary }) => `${html.slice(0, 200)}: ${failureSummary}`),
        }));
      }, selector);
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
