// Draws client/media/icon.png from icon.svg beside it, in Chromium. The picture is checked in, since a
// package may hold no SVG as its icon:  node test/packaging/drawIcon.mjs
import { readFileSync } from "node:fs";
import { chromium } from "playwright-core";

const svg = readFileSync("client/media/icon.svg", "utf8");
const browser = await chromium.launch({
  executablePath: process.env.CHROMIUM ?? "/usr/bin/chromium",
  args: ["--no-sandbox", "--disable-gpu"],
});
const page = await browser.newPage({ viewport: { width: 128, height: 128 } });
await page.setContent(`<style>body{margin:0;background:transparent}svg{display:block}</style>${svg}`);
await page.screenshot({ path: "client/media/icon.png", omitBackground: true });
await browser.close();
