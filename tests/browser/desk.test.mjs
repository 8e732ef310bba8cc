// The waste desk and the year of the site, as an environmental officer meets them.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { mkdtempSync, readFileSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { assertQuiet, axeFindings, launch, open, printed, settled } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

const glance = (page) => page.locator("#desk-glance").innerText();

test("codes follow the rules of the site, and say what only a test can clear", async () => {
  const { page, seen, close } = await open(browser);
  // The neat rinse brings F003 on the drum; the wet solids are not cleared without a test.
  assert.match(await glance(page), /flammable\s+hazardous\s+D001, F003/);
  assert.match(await glance(page), /solids\s+hazardous until tested\s+D001/);
  await page.getByLabel("Waste rules read").selectOption("EU");
  await settled(page);
  assert.match(await glance(page), /14 06 03\*/);
  assert.doesNotMatch(await glance(page), /F003/);
  assertQuiet(seen);
  await close();
});

test("a pour is stopped, or brings codes", async () => {
  const { page, seen, close } = await open(browser);
  const desk = page.locator("#waste-desk");
  const poured = desk.getByLabel("Poured, as one mixture");
  await poured.fill("nitric acid = 10 mL");
  await poured.press("Tab");
  await desk.getByText("Pour into flammable: do not pour").waitFor();
  await poured.fill("dichloromethane = 40 mL");
  await poured.press("Tab");
  await desk.getByText("The container gains: F002.").waitFor();
  await desk.getByLabel("Container", { exact: true }).selectOption("drain");
  await desk.getByText("Pour into the drain: do not pour").waitFor();
  await poured.fill("acetine = 1 mL");
  await poured.press("Tab");
  await desk.getByText("did you mean acetone").waitFor();
  assert.deepEqual(await axeFindings(page), []);
  assertQuiet(seen);
  await close();
});

test("the year of the site has its pictures, each with its table, and unfolds into papers", async () => {
  const { page, seen, close } = await open(browser);
  const site = page.locator("#site-year");
  for (const title of [/^At most .* lie on site/, /^The largest load of a year is flammable/]) {
    const figure = site.locator("figure", { has: page.getByText(title) });
    await figure.locator("summary").click();
    assert.ok((await figure.locator("tbody tr").count()) > 1);
  }
  await site.getByText("Waste month by month", { exact: true }).click();
  assert.match(await site.locator("#site-months-0").innerText(), /category\s+VSQG/);
  await site.getByText("Pick-up calendar", { exact: true }).click();
  assert.ok((await site.locator("#site-pick-ups-1 tbody tr").count()) > 10);
  // Other waste of the site raises the category.
  await page.getByText("Waste of the whole site").click();
  await page.getByLabel(/^Other hazardous waste of the site, row 1, each month/).fill("90 kg");
  await settled(page);
  assert.match(await site.locator("#site-months-0").innerText(), /category\s+SQG/);
  assertQuiet(seen);
  await close();
});

test("the mix of routes keeps within what it may cost", async () => {
  const { page, seen, close } = await open(browser);
  const site = page.locator("#site-year");
  await site.getByText("The mix of routes that lowers a figure most").click();
  await site.getByText("Nothing holds the cost.").waitFor();
  assert.match(await site.locator("#mix-0").innerText(), /Supercritical CO2/);
  const budget = site.getByLabel("At most so much more a year");
  await budget.fill("0");
  await budget.press("Tab");
  await site.getByText("At most 0 USD a year more than the present routes.").waitFor();
  assert.match(await site.locator("#mix-0").innerText(), /Pressurised liquid/);
  await site.getByLabel("Figure to lower").selectOption("air.solvents");
  await site.getByText(/^Every mix that no other beats in both: .*air/).waitFor();
  assertQuiet(seen);
  await close();
});

test("labels print at the size of the label, one a page, and nothing else with them", async () => {
  const { page, seen, close } = await open(browser);
  const desk = page.locator("#waste-desk");
  await desk.getByText("Labels to print").click();
  await page.evaluate(() => (globalThis.print = () => {}));
  for (const [size, width, height] of [["4 × 6 in", 288, 432], ["A6", 298, 420]]) {
    await desk.getByLabel("Size of the labels").selectOption(size);
    const labels = await desk.locator(".labels .label").count();
    assert.ok(labels >= 2);
    await desk.getByRole("button", { name: "Print the labels" }).click();
    const { text, pages } = await sheets(page);
    // PostScript points, 72 to the inch.
    assert.equal(pages.length, labels, `${pages}`);
    for (const [w, h] of pages) assert.ok(Math.abs(w - width) < 1 && Math.abs(h - height) < 1, `${w} × ${h}`);
    assert.match(text, /HAZARDOUS WASTE/);
    assert.doesNotMatch(text, /Thimbleworth|Waste desk|may this go/i);
    await page.evaluate(() => dispatchEvent(new Event("afterprint")));
  }
  // Four places on a sheet.
  await desk.getByLabel("Size of the labels").selectOption("A4, four of 105 × 148 mm");
  await desk.getByRole("button", { name: "Print the labels" }).click();
  const sheet = await sheets(page);
  assert.equal(sheet.pages.length, 1);
  assert.ok(Math.abs(sheet.pages[0][0] - 595) < 1, `${sheet.pages[0]}`);
  await page.evaluate(() => dispatchEvent(new Event("afterprint")));
  assert.match(await printed(page, "desk-after-labels"), /Waste desk/);
  assertQuiet(seen);
  await close();
});

/** What the page would print on the sheets that it asks for: its text, and the size of each sheet. */
async function sheets(page) {
  const folder = mkdtempSync(join(tmpdir(), "thimbleworth-"));
  try {
    const file = join(folder, "labels.pdf");
    await page.pdf({ path: file, preferCSSPageSize: true });
    execFileSync("pdftotext", ["-layout", file, join(folder, "text.txt")]);
    const told = execFileSync("pdfinfo", ["-l", "99", file], { encoding: "utf8" });
    const pages = [...told.matchAll(/^Page +\d+ size: +([\d.]+) x ([\d.]+)/gm)].map((m) => [Number(m[1]), Number(m[2])]);
    return { text: readFileSync(join(folder, "text.txt"), "utf8"), pages };
  } finally {
    rmSync(folder, { recursive: true });
  }
}
