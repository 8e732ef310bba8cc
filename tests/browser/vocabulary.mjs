// The words in which the scenarios are written: open a page, watch it, ask what axe finds, take a picture.
import { chromium } from "playwright-core";
import axe from "axe-core";
import assert from "node:assert/strict";
import { existsSync, mkdirSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath, pathToFileURL } from "node:url";

export const root = join(dirname(fileURLToPath(import.meta.url)), "../..");
/** The file to mail, and the shell at the root, which becomes the program once the page is built. */
export const packed = join(root, "web/dist/thimbleworth.html");
export const shell = join(root, "index.html");
const shots = join(root, "tests/browser/shots");

const executable = process.env.CHROMIUM ?? "/usr/bin/chromium";
assert.ok(existsSync(executable), `no Chromium at ${executable}: run \`apt-get install chromium\`, or set CHROMIUM`);
assert.ok(existsSync(packed), "the page is not built: run `cargo page`");

export function launch() {
  return chromium.launch({
    executablePath: executable,
    args: [
      "--headless=new",
      "--no-sandbox",
      "--disable-gpu",
      "--disable-quic",
      "--no-first-run",
      "--disable-background-networking",
      "--disable-component-update",
      "--disable-sync",
    ],
  });
}

/**
 * What goes wrong or goes out while a page is open: requests whose scheme leaves the machine's own files, and errors
 * in the console (a request that the page's policy stops never reaches the network, but is reported there).
 */
function watch(context) {
  const seen = { requests: [], errors: [] };
  const own = /^(file|data|blob|about|chrome):/;
  context.on("request", (request) => {
    if (!own.test(request.url())) seen.requests.push(request.url());
  });
  context.on("console", (message) => {
    if (message.type() === "error") seen.errors.push(message.text());
  });
  context.on("weberror", (error) => seen.errors.push(String(error.error())));
  return seen;
}

/** Opens `file` in a fresh profile without waiting for the program. */
export async function openRaw(browser, file, options = {}) {
  const { forced, print, prepare, ...context } = options;
  const profile = await browser.newContext({ viewport: { width: 1280, height: 900 }, ...context });
  const seen = watch(profile);
  const page = await profile.newPage();
  if (forced || print) {
    await page.emulateMedia({ forcedColors: forced ? "active" : null, media: print ? "print" : null });
  }
  if (prepare) await page.addInitScript(prepare);
  if (file) await page.goto(pathToFileURL(file).href);
  return { page, seen, close: () => profile.close() };
}

/** Opens `file` and waits until the account is drawn. */
export async function open(browser, file = packed, options = {}) {
  const opened = await openRaw(browser, file, options);
  await opened.page.locator("#question").waitFor({ timeout: 10_000 });
  return opened;
}

export function assertQuiet(seen) {
  assert.deepEqual(seen, { requests: [], errors: [] });
}

/** The rules that the page breaks, of those that stand for WCAG 2.2, levels A and AA. */
export async function axeFindings(page) {
  await page.evaluate(axe.source);
  const found = await page.evaluate(() =>
    globalThis.axe.run(document, {
      runOnly: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"],
      resultTypes: ["violations"],
    }),
  );
  assert.ok(found.passes.length > 0, "axe examined nothing");
  return found.violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
}

/** A picture for a person to look at, in a folder that is not checked in. */
export async function picture(page, name, fullPage = true) {
  mkdirSync(shots, { recursive: true });
  await page.screenshot({ path: join(shots, `${name}.png`), fullPage });
}
