// The words in which the scenarios are written: open a page, watch it, ask what axe finds, take a picture.
import { chromium } from "playwright-core";
import axe from "axe-core";
import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
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
  const { forced, print, prepare, folded, ...context } = options;
  const profile = await browser.newContext({ viewport: { width: 1280, height: 900 }, ...context });
  const seen = watch(profile);
  const page = await profile.newPage();
  if (forced || print) {
    await page.emulateMedia({ forcedColors: forced ? "active" : null, media: print ? "print" : null });
  }
  if (prepare) await page.addInitScript(prepare);
  if (!folded) await page.addInitScript(stepsOpen);
  if (file) await page.goto(pathToFileURL(file).href);
  return { page, seen, close: () => profile.close() };
}

/** Opens every step's card as soon as it is drawn, so that a scenario need not unfold it before it types. */
const stepsOpen = () => {
  const open = () => document.querySelectorAll("details.step:not([open])").forEach((card) => (card.open = true));
  document.addEventListener("DOMContentLoaded", () => new MutationObserver(open).observe(document.body, { childList: true, subtree: true }));
};

/** Opens `file` and waits until the account is drawn. */
export async function open(browser, file = packed, options = {}) {
  const opened = await openRaw(browser, file, options);
  await settled(opened.page);
  return opened;
}

/** Waits until every section stands and has followed the last change. */
export async function settled(page) {
  await page.waitForFunction(() => document.querySelector(".leaves") && !document.querySelector(".leaves[aria-busy], .leaf[aria-busy]"), null, { timeout: 10_000 });
}

export function assertQuiet(seen) {
  assert.deepEqual(seen, { requests: [], errors: [] });
}

/** The rules that the page breaks, of those that stand for WCAG 2.2, levels A and AA. */
export async function axeFindings(page, rules = {}) {
  await page.evaluate(axe.source);
  const found = await page.evaluate((rules) =>
    globalThis.axe.run(document, {
      rules,
      runOnly: ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa"],
      resultTypes: ["violations"],
    }), rules,
  );
  assert.ok(found.passes.length > 0, "axe examined nothing");
  return found.violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.target.join(" ")).join(", ")}`);
}

/** A picture for a person to look at, in a folder that is not checked in. */
export async function picture(page, name, fullPage = true) {
  mkdirSync(shots, { recursive: true });
  await page.screenshot({ path: join(shots, `${name}.png`), fullPage });
}

/** A small plan of one workload and two routes, in a place that does not exist; `change` may alter it. */
export function smallPlan(change = () => {}) {
  const soxhlet = (name, charge) => ({
    name,
    recovery: "94 %",
    equivalence: "paired samples",
    steps: [{ step: "soxhlet", solvent: { "n-hexane": "50 %", acetone: "50 %" }, charge, time: "18 h", heater: "250 W" }],
    ends: { liquor: "flammable", marc: "solids" },
  });
  const plan = {
    thimbleworth: 1,
    title: "Meal of Aldmoor: less solvent?",
    site: {
      name: "Aldmoor mill",
      rules: "US",
      as_of: "2026-12-01",
      streams: [
        { name: "flammable", container: "20 L", fill: "90 %" },
        { name: "solids", holds: "solid", container: "60 L", bulk_density: "0.5 kg/L" },
      ],
    },
    workloads: [
      {
        name: "oil in meal",
        results_per_year: 1000,
        batch: { samples: 10, controls: 2 },
        feed: { sediment: "10 g" },
        present: "Large flask",
        routes: [soxhlet("Large flask", "300 mL"), soxhlet("Small flask", "150 mL")],
      },
    ],
  };
  change(plan);
  return plan;
}

/** Gives the page a file, as the browser's own dialog would. */
export async function give(page, name, content) {
  const text = typeof content === "string" || Buffer.isBuffer(content) ? content : JSON.stringify(content, null, 2);
  const chooser = page.waitForEvent("filechooser");
  await page.getByRole("button", { name: "Open a file" }).click();
  await (await chooser).setFiles({ name, mimeType: "application/json", buffer: Buffer.from(text) });
}

/** Opens the page with a plan in it. */
export async function openWith(browser, plan, options = {}) {
  const opened = await open(browser, packed, options);
  await give(opened.page, "plan.json", plan);
  await opened.page.getByText("plan.json is open.").waitFor();
  await settled(opened.page);
  return opened;
}

/** Where the browser has no dialog of its own for saving, a file is downloaded: its text. */
export const withoutPicker = () => {
  delete globalThis.showSaveFilePicker;
};

/** What a click downloads: `{ name, text }`. */
export async function downloaded(page, click) {
  const waiting = page.waitForEvent("download");
  await click();
  const download = await waiting;
  return { name: download.suggestedFilename(), text: readFileSync(await download.path(), "utf8") };
}

/** The text of the page as it prints, and the PDF beside the pictures. */
export async function printed(page, name, format = "A4") {
  mkdirSync(shots, { recursive: true });
  const file = join(shots, `${name}.pdf`);
  await page.pdf({ path: file, format, preferCSSPageSize: false, printBackground: false });
  const folder = mkdtempSync(join(tmpdir(), "thimbleworth-"));
  try {
    execFileSync("pdftotext", ["-layout", file, join(folder, "text.txt")]);
    return readFileSync(join(folder, "text.txt"), "utf8");
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** The field with this label in a step. */
export const field = (page, label) => page.getByLabel(label, { exact: false });

/** The finding that stays in sight beside the account. */
export const insight = async (page) => (await page.locator(".insight p:not(.head)").allInnerTexts()).join(" ");

/** The id of the element that has the focus. */
export const focused = (page) => page.evaluate(() => document.activeElement.id || document.activeElement.textContent);

/** Opens the fold of a waste stream. */
export const unfold = (page, stream) => page.locator("details.card > summary", { hasText: new RegExp(`^\\s*${stream}`) }).click();
