// A first visit, from opening the file to a printed comparison.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import {
  assertQuiet, axeFindings, give, insight, launch, open, openWith, packed, picture, printed, settled, smallPlan,
  withoutPicker,
} from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

test("a first visit: look at the example, type a volume, see the finding change, print the comparison", async () => {
  const { page, seen, close } = await open(browser);
  await page.getByText("This is an example: the laboratory").waitFor();
  const before = await insight(page);
  assert.match(before, /In place of /);
  const charge = page.getByLabel(/^Solvent in the flask/);
  await charge.fill("150 mL");
  const after = await insight(page);
  assert.notEqual(after, before);
  await picture(page, "wide", false);
  await picture(page, "wide-whole");
  const text = await printed(page, "report");
  for (const sentence of after.split(/(?<=\.) /).slice(0, 1)) {
    assert.ok(text.replace(/\s+/g, " ").includes(sentence.slice(0, 60)), sentence);
  }
  assertQuiet(seen);
  await close();
});

test("from a blank plan: every entry typed, a second route added, the two compared", async () => {
  const { page, seen, close } = await open(browser);
  await page.getByText("Begin anew", { exact: true }).click();
  await page.getByRole("button", { name: "Blank plan" }).click();
  await page.getByText("A blank plan is open.").waitFor();
  assert.match(await insight(page), /Nothing can be accounted yet/);
  await page.getByLabel("Title").fill("Less solvent for the meal?");
  await page.getByLabel("Site", { exact: true }).fill("Aldmoor mill");
  await page.getByLabel("Results reported in a year").fill("1000");
  await page.getByRole("button", { name: "Add a material to What one sample brings", exact: true }).click();
  await page.getByLabel("What one sample brings, row 1, material").fill("sediment");
  await page.getByLabel(/^What one sample brings, row 1, mass/).fill("10 g");
  await page.getByRole("button", { name: "Add the step" }).click();
  await page.getByRole("button", { name: "Add a material to Solvent", exact: true }).click();
  await page.getByLabel("Solvent, row 1, material").fill("acetone");
  await page.getByLabel(/^Solvent, row 1, share/).fill("100 %");
  await page.getByLabel(/^Solvent in the flask/).fill("300 mL");
  await page.getByLabel(/^Extraction time/).fill("18 h");
  await page.getByLabel("From the liquor").selectOption("solvents");
  await page.getByLabel("From the marc").selectOption("solids");
  assert.match(await insight(page), /stands alone/);
  await page.getByRole("button", { name: "Duplicate: Present route" }).click();
  await page.getByLabel("Name of the route").fill("Small flask");
  await page.getByLabel("Name of the route").press("Enter");
  await page.getByLabel(/^Solvent in the flask/).fill("150 mL");
  assert.match(await insight(page), /In place of Present route, Small flask brings .* less/);
  await settled(page);
  const rows = page.locator("table[id^=comparison] tbody tr");
  assert.ok((await rows.count()) > 5);
  assertQuiet(seen);
  await close();
});

test("44: one action prints a report that stands by itself, on A4 and on Letter", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan((plan) => {
    plan.notes = "Agreed on the ninth.";
  }));
  await page.evaluate(() => {
    globalThis.printedTimes = 0;
    globalThis.print = () => {
      globalThis.printedTimes += 1;
    };
  });
  await page.getByRole("button", { name: "Print the report" }).click();
  await page.waitForFunction(() => globalThis.printedTimes > 0);
  assert.equal(await page.evaluate(() => globalThis.printedTimes), 1);
  for (const [format, sheet] of [["A4", "report-a4"], ["Letter", "report-letter"]]) {
    const text = (await printed(page, sheet, format)).replace(/[ \t]+/g, " ");
    const flat = text.replace(/\s+/g, " ");
    for (const wanted of [
      "Meal of Aldmoor: less solvent?", "Aldmoor mill", "date of the plan: 2026-12-01", "file: plan.json", "Thimbleworth 0.",
      "Agreed on the ninth.", "In place of Large flask, Small flask brings", "Solvent in the flask 300 mL",
      "Soxhlet extraction", "Where it ends", "n-hexane to hood", "Waste streams", "Analytical Eco-Scale", "NEMI", "CHEM21",
      "The routes on the same work", "is assumed", "Caution", "SW-846 Method 3540C", "stricter",
    ].map((w) => (w === "is assumed" ? "Assumed, because the plan does not say" : w))) {
      assert.ok(flat.includes(wanted), `${format}: ${wanted}`);
    }
    const pages = [...text.matchAll(/(\d+) ?\/ ?(\d+)\s*$/gm)].map((m) => [Number(m[1]), Number(m[2])]);
    const last = pages.at(-1);
    assert.ok(last && last[0] === last[1] && last[0] > 1, `${format}: page numbers ${JSON.stringify(pages)}`);
    for (const hidden of ["Open the form", "Copy as columns", "Undo", "Add a route", "Skip to"]) {
      assert.ok(!flat.includes(hidden), `${format}: ${hidden} should not print`);
    }
  }
  assertQuiet(seen);
  await close();
});

test("44: what is printed right after a key stroke has the figures of that stroke", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  const bought = () => page.evaluate(() => document.querySelector("[data-figure='0.0.mass.bought']").innerText);
  const before = await bought();
  const [typed, drawn] = await page.evaluate(async () => {
    const input = [...document.querySelectorAll("label")].find((l) => l.innerText.startsWith("Solvent in the flask")).control;
    const figure = () => document.querySelector("[data-figure='0.0.mass.bought']").innerText;
    const drawn = new Promise((done) => {
      globalThis.print = () => done(figure());
    });
    Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value").set.call(input, "600 mL");
    input.dispatchEvent(new InputEvent("input", { bubbles: true }));
    await Promise.resolve();
    const typed = figure();
    [...document.querySelectorAll("button")].find((button) => button.innerText === "Print the report").click();
    return [typed, await drawn];
  });
  assert.equal(typed, before, "the tables have not followed yet");
  assert.notEqual(drawn, before);
  await page.getByLabel(/^Solvent in the flask/).fill("900 mL");
  const text = await printed(page, "report-at-once");
  await settled(page);
  assert.ok(text.includes(await bought()), "the browser's own printing too");
  assertQuiet(seen);
  await close();
});

test("42: a plan is saved to a file, and saving what was opened gives the same bytes", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan(), { prepare: withoutPicker });
  const save = () => page.getByRole("button", { name: "Save", exact: true }).click();
  const take = async () => {
    const waiting = page.waitForEvent("download");
    await save();
    const download = await waiting;
    return [download.suggestedFilename(), await (await import("node:fs/promises")).readFile(await download.path(), "utf8")];
  };
  const [name, first] = await take();
  assert.equal(name, "plan.json");
  assert.match(first, /^\{\n {2}"thimbleworth": 1,/);
  await page.getByText("plan.json is saved.").waitFor();
  await give(page, "plan.json", first);
  await page.getByText("plan.json is open.").waitFor();
  const [, second] = await take();
  assert.equal(second, first);
  await page.getByLabel("Title").fill("changed");
  await page.getByText("Unsaved changes", { exact: true }).waitFor();
  assert.match(await page.title(), /^• changed \(plan\.json\)/);
  assertQuiet(seen);
  await close();
});

test("42: where the browser has a dialog for saving, it is used, and thinking better of it changes nothing", async () => {
  const { page, close } = await openWith(browser, smallPlan(), {
    prepare: () => {
      globalThis.written = [];
      globalThis.showSaveFilePicker = async ({ suggestedName }) => {
        if (globalThis.refuse) throw new DOMException("no", "AbortError");
        return {
          name: suggestedName,
          createWritable: async () => ({ write: async (text) => globalThis.written.push(text), close: async () => {} }),
        };
      };
    },
  });
  await page.getByLabel("Title").fill("changed");
  await page.evaluate(() => {
    globalThis.refuse = true;
  });
  await page.keyboard.press("Control+s");
  await page.getByText("Unsaved changes", { exact: true }).waitFor();
  await page.evaluate(() => {
    globalThis.refuse = false;
  });
  await page.keyboard.press("Control+s");
  await page.getByText("plan.json is saved.").waitFor();
  const written = await page.evaluate(() => globalThis.written);
  assert.equal(written.length, 1);
  assert.equal(JSON.parse(written[0]).title, "changed");
  await close();
});

test("every state of the page is clean by axe: blank, filled, error, dialog, results", async () => {
  const { page, close } = await open(browser);
  assert.deepEqual(await axeFindings(page), [], "example");
  await page.getByText("Begin anew", { exact: true }).click();
  assert.deepEqual(await axeFindings(page), [], "menu");
  await page.getByRole("button", { name: "Blank plan" }).click();
  await page.getByText("A blank plan is open.").waitFor();
  assert.deepEqual(await axeFindings(page), [], "blank");
  await page.getByRole("button", { name: "Print the report" }).click();
  await page.locator("#mend").getByRole("heading", { name: "To mend", exact: true }).waitFor();
  assert.deepEqual(await axeFindings(page), [], "errors");
  await picture(page, "errors", false);
  await give(page, "plan.json", smallPlan());
  await page.getByText("plan.json is open.").waitFor();
  assert.deepEqual(await axeFindings(page), [], "results");
  await page.locator("button.figure").first().click();
  await page.getByRole("dialog").waitFor();
  assert.deepEqual(await axeFindings(page), [], "dialog");
  await picture(page, "working", false);
  await close();
});
