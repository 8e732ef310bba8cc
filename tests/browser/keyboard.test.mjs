// Everything by keyboard: order, focus, undo, lists, dialogs, messages.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, focused, give, insight, launch, open, openWith, picture, smallPlan, unfold } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

test("23: a route is added, filled in and compared without a pointer", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  const tabTo = async (label) => {
    for (let i = 0; i < 400; i += 1) {
      await page.keyboard.press("Tab");
      const name = await page.evaluate(() => {
        const it = document.activeElement;
        return it.getAttribute("aria-label") ?? it.labels?.[0]?.innerText ?? it.innerText ?? "";
      });
      if (name.startsWith(label)) return;
    }
    assert.fail(`Tab never reaches ${label}`);
  };
  await page.evaluate(() => document.activeElement.blur());
  await tabTo("Duplicate: Large flask");
  await page.keyboard.press("Enter");
  await page.getByRole("article", { name: "Large flask 2" }).waitFor();
  assert.equal(await focused(page), "workloads[0].routes[1].name");
  await tabTo("Solvent in the flask");
  await page.keyboard.press("Control+a");
  await page.keyboard.type("100 mL");
  await page.keyboard.press("Tab");
  assert.match(await insight(page), /Large flask 2 brings/);
  await tabTo("Copy as columns");
  await page.keyboard.press("Shift+Tab");
  assert.equal(await page.evaluate(() => document.activeElement.className), "figure");
  await page.keyboard.press("Enter");
  await page.getByRole("dialog").waitFor();
  await page.keyboard.press("Escape");
  assert.equal(await page.getByRole("dialog").count(), 0);
  assert.equal(await page.evaluate(() => document.activeElement.className), "figure", "the focus comes back");
  assertQuiet(seen);
  await close();
});

test("23: Tab goes through the whole page in the order of reading, and out again", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const order = await page.evaluate(() =>
    [...document.querySelectorAll("a[href], button, input, select, textarea, summary, [tabindex='0']")].filter(
      (e) => e.offsetParent !== null && !(e.tagName === "BUTTON" && e.closest("details:not([open]) > :not(summary)")) && !e.closest("dialog"),
    ).length,
  );
  await page.evaluate(() => document.activeElement.blur());
  const positive = await page.locator("[tabindex]:not([tabindex='0']):not([tabindex='-1'])").count();
  assert.equal(positive, 0, "no order but that of the document");
  let stops = 0;
  let left = false;
  for (; stops < order + 20; stops += 1) {
    await page.keyboard.press("Tab");
    if (await page.evaluate(() => document.activeElement === document.body)) {
      left = true;
      break;
    }
  }
  assert.ok(left && stops > 60, `${stops} stops of ${order}`);
  await close();
});

test("24: the focus is to be seen, and nothing that sticks to the top hides it", async () => {
  for (const viewport of [{ width: 1280, height: 720 }, { width: 320, height: 640 }]) {
    const { page, close } = await openWith(browser, smallPlan(), { viewport });
    await page.evaluate(() => {
      document.documentElement.style.scrollBehavior = "auto";
      window.scrollTo({ top: 1500, behavior: "instant" });
      document.getElementById("site.name").focus();
    });
    for (let i = 0; i < 60; i += 1) {
      await page.keyboard.press(i < 30 ? "Tab" : "Shift+Tab");
      const it = await page.evaluate(() => {
        const e = document.activeElement;
        const box = e.getBoundingClientRect();
        const style = getComputedStyle(e);
        const x = Math.min(Math.max(box.left + Math.min(box.width / 2, 12), 1), innerWidth - 2);
        const on = document.elementFromPoint(x, Math.min(Math.max(box.top + Math.min(box.height / 2, 12), 1), innerHeight - 2));
        return { name: e.id || e.innerText, width: style.outlineWidth, style: style.outlineStyle, seen: e === on || e.contains(on) || on?.contains(e) };
      });
      assert.ok(Number.parseFloat(it.width) >= 2 && it.style === "solid", JSON.stringify(it));
      assert.ok(it.seen, JSON.stringify(it));
    }
    await close();
  }
});

test("26: undo goes back through twenty edits by name, and redo forward again", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  const values = [];
  const charge = page.getByLabel(/^Solvent in the flask/);
  const time = page.getByLabel(/^Extraction time/);
  for (let n = 0; n < 20; n += 1) {
    const [box, text] = n % 2 ? [time, `${10 + n} h`] : [charge, `${200 + n} mL`];
    await box.fill(text);
    values.push([await charge.inputValue(), await time.inputValue()]);
  }
  await page.locator("h1").click();
  const undo = page.getByRole("button", { name: /^Undo/ });
  for (let n = 19; n > 0; n -= 1) {
    assert.equal(await undo.innerText(), n % 2 ? "Undo: change extraction time" : "Undo: change solvent in the flask");
    await page.keyboard.press(n % 3 ? "Control+z" : "Meta+z");
    assert.deepEqual([await charge.inputValue(), await time.inputValue()], values[n - 1]);
  }
  await page.keyboard.press("Control+z");
  assert.equal(await undo.innerText(), "Undo: open plan.json");
  assert.equal(await charge.inputValue(), "300 mL");
  await page.getByText("No unsaved changes").waitFor();
  for (let n = 0; n < 20; n += 1) {
    await page.keyboard.press(n % 2 ? "Control+y" : "Control+Shift+z");
    assert.deepEqual([await charge.inputValue(), await time.inputValue()], values[n]);
  }
  assertQuiet(seen);
  await close();
});

test("26: inside a text that is being edited the browser's own undo wins, and keys are listed", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const title = page.getByLabel("Title");
  await title.focus();
  await title.press("End");
  await page.keyboard.type("abc");
  await page.keyboard.press("Control+z");
  assert.match(await page.getByRole("button", { name: /^Undo/ }).innerText(), /Undo: (change title|open)/);
  assert.ok(!(await title.inputValue()).endsWith("abc"));
  assert.equal(await page.getByRole("button", { name: "Save", exact: true }).getAttribute("aria-keyshortcuts"), "Control+S Meta+S");
  await page.getByText("Keys", { exact: true }).click();
  await page.getByText("Ctrl Y").waitFor();
  await close();
});

test("27: what is added takes the focus, what goes hands it on, and undo is offered", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await page.getByRole("button", { name: "Add a stream" }).click();
  assert.equal(await focused(page), "site.streams[2].name");
  await unfold(page, "flammable");
  await page.getByRole("button", { name: "Remove: flammable" }).click();
  assert.match(await page.evaluate(() => document.activeElement.closest("[id]").id || ""), /site\.streams\[0\]/);
  await page.getByText("Done: remove stream. Undo takes it back.").waitFor();
  await page.getByRole("button", { name: "Undo: remove stream" }).click();
  assert.equal(await page.getByLabel("Name of the stream").first().inputValue(), "flammable");
  await page.getByRole("button", { name: "Add a material to Solvent", exact: true }).click();
  assert.match(await focused(page), /solvent-row-2/);
  await page.getByRole("button", { name: "Remove the row from Solvent" }).click();
  assert.match(await focused(page), /solvent\.acetone/);
  await close();
});

test("28: routes and steps change places by button, and the open form stays with its route", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const names = () => page.locator(".route h4").allInnerTexts();
  await page.getByRole("button", { name: "Move down: Large flask" }).click();
  assert.deepEqual((await names()).map((n) => n.replace(/\s+present/, "")), ["Small flask", "Large flask"]);
  assert.equal(await page.getByLabel(/^Solvent in the flask/).inputValue(), "300 mL");
  assert.equal(await page.getByRole("button", { name: "Move down: Large flask" }).getAttribute("aria-disabled"), "true");
  assert.equal(await focused(page), "workloads[0].routes[1]-move-down");
  await close();
});

test("references follow a stream that is renamed, and a name that is taken is refused at the field", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await unfold(page, "flammable");
  const name = page.getByLabel("Name of the stream").first();
  await name.fill("solids");
  await name.blur();
  await page.getByText("Another stream is called “solids”. Enter a name of its own.").waitFor();
  assert.equal(await name.inputValue(), "solids");
  await name.fill("drum");
  await name.blur();
  assert.equal(await page.getByLabel("From the liquor").inputValue(), "drum");
  assert.match(await insight(page), /In place of/);
  await close();
});

test("20: errors are listed with links in the words of the fields, and a link leads to its field in a closed form", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await page.getByRole("button", { name: "Open the form of Small flask" }).click();
  await page.getByLabel(/^Solvent in the flask/).fill("150 m");
  await page.getByLabel(/^Extraction time/).fill("");
  await page.getByRole("button", { name: "Open the form of Large flask" }).click();
  await page.getByRole("button", { name: "Print the report" }).click();
  assert.equal(await focused(page), "mend");
  assert.match(await page.locator("#mend h2").innerText(), /There are 2 things to mend/);
  assert.match(await page.title(), /^Error: /);
  const links = page.locator("#mend li a");
  const words = await links.first().innerText();
  await picture(page, "mend", false);
  await links.first().click();
  assert.match(await focused(page), /^workloads\[0\]\.routes\[1\]\.steps\[0\]\.(charge|time)$/);
  const said = page.locator(".field.wrong .said").first();
  assert.ok((await page.locator(".field.wrong .said").allInnerTexts()).some((text) => text.includes(words)), `${words} / ${await said.innerText()}`);
  await close();
});

test("a step is folded into its line, says there what has to be mended, and opens when a link leads into it", async () => {
  const broken = smallPlan((plan) => {
    plan.workloads[0].routes[0].steps[0].charge = "300 m";
  });
  const { page, close } = await openWith(browser, broken, { folded: true });
  const step = page.locator("details.step").first();
  assert.equal(await step.evaluate((card) => card.open), false);
  assert.match(await step.locator("summary").innerText(), /Solvent in the flask 300 m[^]*1 thing to mend/);
  await page.getByRole("button", { name: "Print the report" }).click();
  await page.locator("#mend li a").first().click();
  assert.equal(await focused(page), "workloads[0].routes[0].steps[0].charge");
  assert.equal(await step.evaluate((card) => card.open), true);
  await close();
});

test("29: the working is a dialog that takes the focus, closes with Escape and gives the focus back", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const figure = page.locator("table[id^=goes-to] button.figure").first();
  await figure.focus();
  await page.keyboard.press("Enter");
  const dialog = page.getByRole("dialog");
  await dialog.waitFor();
  assert.ok(await page.evaluate(() => document.activeElement.closest("dialog") !== null));
  const text = await dialog.innerText();
  for (const wanted of ["Formula", "Source", "Behind it, largest first", "Rules and the numbers put in", "computed", "a reported result"]) {
    assert.ok(text.includes(wanted), wanted);
  }
  await page.keyboard.press("Escape");
  assert.equal(await figure.evaluate((e) => document.activeElement === e), true);
  await figure.click();
  await dialog.getByRole("button", { name: "Close" }).click();
  assert.equal(await figure.evaluate((e) => document.activeElement === e), true);
  await close();
});

test("30: the finding is read out once after a burst of typing, without moving the focus", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await page.evaluate(() => {
    globalThis.readOut = [];
    new MutationObserver(() => globalThis.readOut.push(document.getElementById("read-out").textContent)).observe(
      document.getElementById("read-out"), { childList: true, characterData: true, subtree: true },
    );
  });
  await page.waitForTimeout(1100);
  await page.evaluate(() => {
    globalThis.readOut.length = 0;
  });
  const charge = page.getByLabel(/^Solvent in the flask/);
  await charge.focus();
  await charge.evaluate(async (input) => {
    for (const text of ["4", "45", "450", "450 ", "450 m", "450 mL"]) {
      Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value").set.call(input, text);
      input.dispatchEvent(new InputEvent("input", { bubbles: true }));
      await new Promise((done) => setTimeout(done, 20));
    }
  });
  await page.waitForTimeout(1300);
  const heard = await page.evaluate(() => globalThis.readOut);
  assert.equal(heard.length, 1, heard.join("\n"));
  assert.match(heard[0], /In place of Large flask, Small flask brings/);
  assert.equal(await charge.evaluate((e) => document.activeElement === e), true);
  await close();
});
