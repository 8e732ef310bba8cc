// Money, time and terms typed on the page, and what follows: lines of cost, the case over the years, intervals of a chosen figure.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, axeFindings, launch, open, openWith, settled, smallPlan } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

/** Waits until the draws have caught up with the plan. */
const caughtUp = (page) => page.waitForFunction(() => !document.querySelector(".works[aria-busy]") && !document.body.textContent.includes("Being drawn"), null, { timeout: 20_000 });
const fold = (page, title) => page.locator("details.more > summary", { hasText: title }).click();

test("prices, hours, climate, seed, time and permission are typed on the page; the case follows, and undo names what it takes back", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  assert.match(await page.locator("#cost").innerText(), /The plan names no prices/);
  const undo = page.getByRole("button", { name: /^Undo/ });
  const row = async (of, number, what, name, amount) => {
    await page.getByRole("button", { name: `Add a ${what} to ${of}`, exact: true }).click();
    await page.getByLabel(`${of}, row ${number}, ${what}`, { exact: true }).fill(name);
    await page.getByLabel(new RegExp(`^${of}, row ${number}, (price|share|amount)`)).fill(amount);
  };
  await page.getByLabel("Seed of the draws").fill("7");
  assert.equal(await undo.innerText(), "Undo: change seed of the draws");
  await fold(page, "Electricity");
  await page.getByLabel(/^Price of electricity/).fill("0.2 EUR/kWh");
  await fold(page, "Prices and money");
  await page.getByLabel("Currency").fill("EUR");
  assert.equal(await undo.innerText(), "Undo: change currency");
  await row("Prices of materials", 1, "material", "n-hexane", "23 ± 3 EUR/L");
  await row("Prices of materials", 2, "material", "acetone", "46 EUR for 4 L");
  await row("Removal of waste", 1, "stream", "flammable", "72 EUR/container");
  await row("Removal of waste", 2, "stream", "solids", "1.7 EUR/kg");
  await page.getByLabel(/^An hour of labour/).fill("46 ± 5 EUR");
  assert.match(await page.getByLabel(/^An hour of labour/).evaluate((input) => input.closest(".field").textContent), /EUR.*Read as/s);
  await page.getByLabel(/^Yearly rate at which/).fill("6 %");
  await page.getByLabel("Years of a case").fill("5");
  await fold(page, "Hours of instruments");
  await page.getByLabel(/^Hours of a year with someone there/).fill("1750 h");
  await page.getByLabel(/^Further hours in which instruments/).fill("4200 h");
  await fold(page, "Climate");
  await row("Share that is burnt", 1, "stream", "flammable", "100 %");
  await page.getByLabel("Warming potentials of").selectOption("AR5");
  const time = async (minutes) => {
    await page.getByLabel(/^One run takes/).fill("20 h");
    await page.getByLabel("Extractions in one run").fill("6");
    await page.getByLabel(/^People's time for each extraction/).fill(`${minutes} min`);
    await page.getByLabel("Instruments that are there").fill("2");
    await page.getByLabel("May run with nobody there").selectOption("true");
  };
  await time(14);
  await page.getByRole("button", { name: "Open the form of Small flask" }).click();
  await time(12);
  await page.getByLabel(/^By which method, permit or agreement/).fill("the monitoring programme");
  await page.getByLabel(/^Once, to show that the route works/).fill("4000 ± 1000 EUR");
  assert.match(await undo.innerText(), /^Undo: change once, to show/);
  await settled(page);
  await caughtUp(page);
  const cost = await page.locator("#cost").innerText();
  assert.match(cost, /Running cost/);
  assert.match(cost, /Small flask in place of Large flask: half of the draws/);
  assert.match(cost, /It holds only with: instruments of Small flask/);
  assert.match(cost, /what is lost costs/);
  assert.match(await page.locator("#climate").innerText(), /Waste burnt/);
  assert.match(await page.locator("#sure").innerText(), /Small flask costs/);
  assert.deepEqual(await axeFindings(page), []);
  // One step back: the case is another one.
  await undo.click();
  await settled(page);
  await caughtUp(page);
  assert.match(await page.locator("#cost").innerText(), /Small flask in place of Large flask: nothing has to be paid back/);
  assertQuiet(seen);
  await close();
});

test("37: an uncertain result is drawn as an interval with its point, of the figure that is chosen", async () => {
  const { page, seen, close } = await open(browser);
  await caughtUp(page);
  const shown = () => page.locator("#sure figure.picture").first().evaluate((figure) => ({
    title: figure.querySelector("strong").textContent,
    description: figure.querySelector("figcaption p").textContent,
    marks: figure.querySelectorAll("svg.drawing-wide path.mark").length,
  }));
  const first = await shown();
  assert.match(first.description, /median and 95\s% coverage interval, 10\s000 draws: /);
  assert.equal(first.marks, 4, "a point for each route");
  await page.getByLabel("Figure of PAH in sediment").selectOption({ label: "Running cost" });
  const second = await shown();
  assert.match(second.title, /^Running cost: .* has less in /);
  assert.equal(second.marks, 4);
  const years = await page.locator("#cost figure.picture", { hasText: "money in hand" }).count();
  assert.equal(years, 3, "a case over the years for each route beside the present one");
  assertQuiet(seen);
  await close();
});
