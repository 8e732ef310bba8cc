// Tables, numbers and signs.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, downloaded, launch, open, openWith, settled, smallPlan, withoutPicker } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

test("31, 32: tables have captions, scoped headers with units, and columns of figures that line up", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const tables = await page.evaluate(() =>
    [...document.querySelectorAll("main table.figures")].map((table) => ({
      caption: table.caption?.textContent ?? "",
      scoped: [...table.querySelectorAll("th")].every((th) => ["row", "col"].includes(th.scope)),
      head: table.rows[0].cells[0].textContent,
      align: [...table.querySelectorAll("td.num")].every((td) => getComputedStyle(td).textAlign === "right"),
      tabular: getComputedStyle(table).fontVariantNumeric,
      decimals: [...table.querySelectorAll("td.num button")].map((b) => (b.innerText.split(".")[1] ?? "").length),
      box: table.closest("[role=region]")?.tabIndex,
    })),
  );
  assert.ok(tables.length >= 4);
  for (const table of tables) {
    assert.ok(table.caption && table.scoped && table.align, JSON.stringify(table));
    assert.match(table.tabular, /tabular-nums/);
    assert.equal(table.box, 0);
  }
  const places = tables.find((t) => t.caption === "Where it ends");
  assert.match(places.head, /^Place and material \/ kg a year$/);
  assert.equal(new Set(places.decimals).size, 1, "equal decimals in a column");
  const rows = await page.locator("table.inputs input").evaluateAll((inputs) => inputs.map((i) => i.getAttribute("aria-label")));
  assert.ok(rows.length >= 4 && rows.every((name) => /row \d+, /.test(name)), rows.join("; "));
  await close();
});

test("33: a table is copied as columns with every digit", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
  await page.locator("[data-copy^=goes-to]").click();
  await page.getByText("The table is copied.").waitFor();
  const lines = (await page.evaluate(() => navigator.clipboard.readText())).split("\n").map((line) => line.split("\t"));
  assert.ok(lines.length > 5 && lines.every((line) => line.length === 3));
  assert.equal(lines[0][0], "Place and material / kg a year");
  const shown = await page.locator("table[id^=goes-to] td.num button").first().innerText();
  assert.ok(Math.abs(Number(lines[1][1]) - Number(shown.replaceAll("\u202f", ""))) <= 0.5);
  assert.ok(lines[1][1].length > shown.length);
  await close();
});

test("40: the full value is behind every figure, and the basis can be changed", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const figure = page.locator("table[id^=goes-to] td.num button").first();
  const [year, full] = [await figure.innerText(), await figure.getAttribute("title")];
  assert.match(full, /^\d+(\.\d+)? kg$/);
  await page.getByLabel("Show the figures below for").selectOption("a reported result");
  await settled(page);
  assert.match(await page.locator("table[id^=goes-to] thead th").first().innerText(), /g a reported result/);
  assert.notEqual(await figure.innerText(), year);
  const [value, unit] = (await figure.getAttribute("title")).split(" ");
  const kg = Number(value) / (unit === "g" ? 1000 : 1);
  assert.ok(Math.abs(kg * 1000 - Number.parseFloat(full)) < 1e-6 * Number.parseFloat(full), "1000 results a year");
  await close();
});

test("40, 41: no minus zero, no hyphen for a minus, a space before every unit, one sign for micro", async () => {
  const { page, seen, close } = await open(browser);
  for (const name of ["Harbour", "Pesticides", "Hop extract"]) {
    await page.getByText("Begin anew", { exact: true }).click();
    await page.getByRole("button", { name: new RegExp(`^Example: ${name}`) }).click();
    await page.locator(".said-line", { hasText: "is open." }).waitFor();
    await settled(page);
    const text = await page.locator("main").innerText();
    const figures = await page.locator("button.figure").allInnerTexts();
    assert.ok(figures.length > 40, name);
    for (const figure of figures) assert.match(figure, /^(< )?\u2212?\d{1,3}(\d|(\u202f\d{3})+)?(\.\d+)?$/, figure);
    assert.doesNotMatch(text, /(^|\s)[-\u2212]0(\.0+)?\s/m, name);
    assert.doesNotMatch(text, /\d(mL|kg|°C|%|bar|kWh)\b/, name);
    assert.match(text, /\d\u202f%/, name);
    assert.doesNotMatch(text, /.*\d[ \u00a0]%.*/, `${name}: a per cent sign that can stand on a line of its own`);
    assert.doesNotMatch(text, /\u03bc|NaN|undefined|\[object/, name);
    assert.doesNotMatch(text, /\binf\b/, name);
  }
  assertQuiet(seen);
  await close();
});

test("33: figures go out as CSV and JSON, the report as Markdown", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan(), { prepare: withoutPicker });
  const take = async (name) => {
    if (!(await page.getByRole("button", { name }).isVisible())) await page.getByText("Hand on", { exact: true }).click();
    return downloaded(page, () => page.getByRole("button", { name }).click());
  };
  const csv = await take(/^Figures as CSV/);
  assert.equal(csv.name, "plan.csv");
  assert.ok(csv.text.split("\n").length > 50);
  const json = await take(/^Results as JSON/);
  assert.equal(typeof JSON.parse(json.text), "object");
  const markdown = await take(/^Report as Markdown/);
  assert.match(markdown.text, /Meal of Aldmoor/);
  assertQuiet(seen);
  await close();
});
