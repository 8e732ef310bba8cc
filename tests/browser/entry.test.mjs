// What can be typed, what is understood, and what is said when it cannot be. Numbers are those of the list of points.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, insight, launch, open, openWith, settled, smallPlan, unfold } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

const charge = (page) => page.getByLabel(/^Solvent in the flask/);
const beside = (page) => page.locator(".field", { has: charge(page) }).locator(".beside");

test("7, 8, 9, 13: fields are plain text with a label above, the unit in the name, and no limit on what is pasted", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const found = await page.evaluate(() =>
    [...document.querySelectorAll("input:not([type=file])")].map((input) => ({
      id: input.id,
      type: input.type,
      mode: input.inputMode,
      off: input.autocomplete,
      spell: input.spellcheck,
      limit: input.maxLength,
      hint: input.placeholder,
      label: input.labels[0] ? input.labels[0].textContent : input.getAttribute("aria-label"),
      above: input.labels[0] ? input.labels[0].getBoundingClientRect().bottom <= input.getBoundingClientRect().top + 1 : true,
      described: (input.getAttribute("aria-describedby") ?? "").split(" ").filter(Boolean).every((id) => document.getElementById(id)),
    })),
  );
  assert.ok(found.length > 20);
  for (const input of found) {
    assert.equal(input.type, "text", input.id);
    assert.equal(input.off, "off", input.id);
    assert.equal(input.limit, -1, input.id);
    assert.equal(input.hint, "", input.id);
    assert.equal(input.spell, false, input.id);
    assert.ok(input.label && input.above && input.described, JSON.stringify(input));
  }
  // A keypad of digits is asked for only where no unit has to be typed.
  const decimal = found.filter((input) => input.mode === "decimal").map((input) => input.label);
  assert.ok(decimal.length >= 3 && decimal.every((label) => !label.replace(" (optional)", "").includes("(")), decimal.join("; "));
  assert.match(await charge(page).evaluate((input) => input.labels[0].innerText), /^Solvent in the flask \(mL, L/);
  const width = await charge(page).boundingBox();
  await charge(page).focus();
  await page.mouse.move(width.x + 5, width.y + 5);
  await page.mouse.wheel(0, 40);
  await page.keyboard.press("ArrowUp");
  assert.equal(await charge(page).inputValue(), "300 mL");
  await close();
});

test("12: another unit writes the amount again and says so; undo gives back what was typed", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  const unit = page.getByLabel("Unit of solvent in the flask");
  await charge(page).fill("250 ± 5 mL");
  assert.equal(await unit.inputValue(), "mL");
  await unit.selectOption("L");
  assert.equal(await charge(page).inputValue(), "0.25 ± 0.005 L");
  assert.equal(await page.locator(".field", { has: charge(page) }).locator("[aria-live]").innerText(), "250 ± 5 mL is 0.25 ± 0.005 L.");
  assert.match(await beside(page).innerText(), /^Read as 250 mL, between 245 and 255 mL \(limits\)\./);
  await page.getByRole("button", { name: "Undo: change unit of solvent in the flask" }).click();
  assert.equal(await charge(page).inputValue(), "250 ± 5 mL");
  // What is no amount has no unit to change.
  await charge(page).fill("a flask");
  assert.equal(await unit.count(), 0);
  assertQuiet(seen);
  await close();
});

test("10, 11: amounts are read as people write them, and the reading is given back", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  for (const [text, echo] of [
    ["250 mL", "Read as 250 mL."],
    ["250mL", "Read as 250 mL."],
    ["0.25 l", "Read as 250 mL."],
    ["  250   ml ", "Read as 250 mL."],
    ["250\u00a0mL", "Read as 250 mL."],
    ["250 cm3", "Read as 250 mL."],
    ["250000 µL", "Read as 250 mL."],
    ["250000 \u03bcL", "Read as 250 mL."],
    ["250000 uL", "Read as 250 mL."],
    ["0,25 L", "Read as 250 mL."],
    ["2.5e-1 L", "Read as 250 mL."],
    ["2.5×10^2 mL", "Read as 250 mL."],
    ["250 ± 5 mL", "Read as 250 mL, between 245 and 255 mL (limits)."],
  ]) {
    await charge(page).fill(text);
    assert.equal(await beside(page).locator(".echo").innerText(), echo, text);
    assert.equal(await charge(page).inputValue(), text);
  }
  await charge(page).fill("1,234 mL");
  await charge(page).blur();
  assert.match(await beside(page).locator(".said").innerText(), /1,234/);
  assertQuiet(seen);
  await close();
});

test("14: not known is an answer of its own, and says what stands in for it", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const loss = page.getByLabel(/^Share lost past the condenser/);
  const echo = page.locator(".field", { has: loss }).locator(".echo");
  assert.equal(await echo.innerText(), "5\u202f% is assumed: from memory.");
  await loss.fill("not known");
  assert.equal(await echo.innerText(), "Not known: 5\u202f% stands in for it, from memory.");
  await loss.fill("0 %");
  assert.equal(await echo.innerText(), "Read as 0\u202f%.");
  await close();
});

test("15: a route, a step and a stream are copied rather than typed again", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await page.getByRole("button", { name: "Duplicate: step 1, Soxhlet extraction" }).click();
  assert.equal(await page.locator(".step").count(), 2);
  assert.equal(await charge(page).nth(1).inputValue(), "300 mL");
  await page.getByRole("button", { name: "Duplicate: Large flask" }).click();
  assert.equal(await page.locator(".route").count(), 3);
  await unfold(page, "solids");
  await page.getByRole("button", { name: "Duplicate: solids" }).click();
  assert.equal(await page.getByLabel("Name of the stream").nth(2).inputValue(), "solids 2");
  await close();
});

test("16: what is unusual is doubted and still counted; what is impossible is not", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  await charge(page).fill("5 L");
  await charge(page).blur();
  assert.match(await beside(page).locator(".said").innerText(), /unusual.*is usual/s);
  assert.match(await insight(page), /In place of Large flask, Small flask brings/);
  assert.equal(await charge(page).getAttribute("aria-invalid"), null);
  await charge(page).fill("50 m3");
  assert.match(await beside(page).locator(".said").innerText(), /outside what is possible\. Between/);
  assert.equal(await charge(page).getAttribute("aria-invalid"), "true");
  await close();
});

test("17, 18, 19, 21: a wrong entry is told after it was left, names what would do, is never cleared, and goes at once when mended", async () => {
  const { page, seen, close } = await open(browser);
  await page.getByText("Begin anew", { exact: true }).click();
  await page.getByRole("button", { name: "Blank plan" }).click();
  await page.getByRole("button", { name: "Add the step" }).click();
  const message = beside(page).locator(".said");
  await charge(page).pressSequentially("250 m");
  assert.equal(await message.innerText(), "", "nothing is said while someone types");
  await charge(page).blur();
  assert.match(await message.innerText(), /^✕\s*Error:\s/);
  assert.match(await message.innerText(), /"250 m".*mL/s);
  assert.equal(await charge(page).inputValue(), "250 m");
  assert.equal(await charge(page).getAttribute("aria-invalid"), "true");
  const described = await charge(page).getAttribute("aria-describedby");
  assert.ok(described.split(" ").includes(await message.getAttribute("id")));
  assert.equal(await charge(page).evaluate((input) => getComputedStyle(input).borderTopWidth), "2px");
  await charge(page).press("End");
  await charge(page).pressSequentially("L");
  assert.equal(await message.innerText(), "");
  assertQuiet(seen);
  await close();
});

test("17: no message blames, pleads or hides behind a code", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  for (const text of ["", "abc", "-5 mL", "1e99 mL", "5 kg", "250", "99 L"]) {
    await charge(page).fill(text);
    await charge(page).blur();
    const said = await beside(page).innerText();
    assert.doesNotMatch(said, /invalid|please|oops|required field|illegal|undefined|NaN|null/i, `${text}: ${said}`);
    assert.ok(said.length > 10, text);
  }
  await close();
});

test("nothing moves while someone types, right or wrong", async () => {
  for (const viewport of [{ width: 1280, height: 900 }, { width: 320, height: 640 }]) {
    const { page, close } = await openWith(browser, smallPlan(), { viewport });
    await charge(page).scrollIntoViewIfNeeded();
    await charge(page).focus();
    const where = () => page.evaluate(() => {
      const label = document.activeElement.closest(".field");
      const next = label.nextElementSibling.getBoundingClientRect();
      return [document.activeElement.getBoundingClientRect().top, next.top];
    });
    await charge(page).press("End");
    const start = await where();
    for (const key of ["Backspace", "Backspace", "Backspace", "Backspace", "Backspace", "Backspace", "2", "5", "0", " ", "m", "L", " ", "±", " ", "5", " ", "m", "L"]) {
      await (key.length === 1 ? page.keyboard.insertText(key) : page.keyboard.press(key));
      const now = await where();
      // Less than a pixel is the rounding of a line's height.
      assert.ok(now.every((y, i) => Math.abs(y - start[i]) <= 1), `after ${key} at ${viewport.width}: ${start} became ${now}`);
    }
    await close();
  }
});

test("a measured figure stands beside the computed one", async () => {
  const { page, close } = await openWith(browser, smallPlan());
  const measured = page.getByLabel(/^Measured: condenser loss/);
  const echo = page.locator(".field", { has: measured }).locator(".echo");
  const computed = /^Computed: ([\d.]+ g) a run/.exec(await echo.innerText())[1];
  await measured.fill("6 ± 2 g");
  assert.match(await echo.innerText(), new RegExp(`^Computed in its place: ${computed} a run`));
  await settled(page);
  await page.locator("table[id^=goes-to] tr", { hasText: "To hood" }).locator("button.figure").first().click();
  assert.match(await page.getByRole("dialog").innerText(), /measured/);
  await close();
});
