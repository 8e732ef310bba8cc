// Files, storage and faults: no work is lost, and nothing that is opened can harm it.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, downloaded, give, insight, launch, open, openWith, packed, smallPlan, withoutPicker } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

const KEY = "thimbleworth/recovery/1";

test("22, 42: a broken, a newer, a huge and a foreign file leave the work as it is, and say what was found where", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan());
  await page.getByLabel(/^Solvent in the flask/).fill("275 mL");
  const before = await insight(page);
  for (const [name, content, wanted] of [
    ["cut.json", '{ "thimbleworth": 1, "title": "x"', /cut\.json could not be opened/],
    ["newer.json", '{ "thimbleworth": 99, "title": "x" }', /newer.*99|99.*newer/s],
    ["other.json", "[1, 2, 3]", /other\.json could not be opened/],
    ["wrong.json", JSON.stringify(smallPlan((p) => { p.workloads[0].batch = 12; })), /workloads\[0\]\.batch/],
    ["picture.json", Buffer.from([0x89, 0x50, 0xff, 0xfe]), /UTF-8/],
    ["huge.json", Buffer.alloc(9 * 1024 * 1024, 0x20), /too large/],
    ["deep.json", "[".repeat(100_000), /deep\.json could not be opened/],
  ]) {
    await give(page, name, content);
    await page.locator(".said-line.wrong", { hasText: name }).waitFor();
    assert.match(await page.locator(".said-line").innerText(), wanted, name);
    assert.equal(await page.getByLabel(/^Solvent in the flask/).inputValue(), "275 mL");
    assert.equal(await insight(page), before);
  }
  assertQuiet(seen);
  await close();
});

test("42: a file is opened by dropping it on the page", async () => {
  const { page, close } = await open(browser);
  const data = await page.evaluateHandle((text) => {
    const transfer = new DataTransfer();
    transfer.items.add(new File([text], "dropped.json", { type: "application/json" }));
    return transfer;
  }, JSON.stringify(smallPlan()));
  await page.dispatchEvent("main", "dragover", { dataTransfer: data });
  await page.dispatchEvent("main", "drop", { dataTransfer: data });
  await page.getByText("dropped.json is open.").waitFor();
  assert.match(await page.title(), /Meal of Aldmoor.*\(dropped\.json\)/);
  await close();
});

test("43: leaving asks only while there are unsaved changes", async () => {
  const { page, close } = await openWith(browser, smallPlan(), { prepare: withoutPicker });
  const asks = async () => {
    let asked = false;
    const listener = async (dialog) => {
      asked = dialog.type() === "beforeunload";
      await dialog.dismiss();
    };
    page.once("dialog", listener);
    const prevented = await page.evaluate(() => {
      const event = new Event("beforeunload", { cancelable: true });
      window.dispatchEvent(event);
      return event.defaultPrevented;
    });
    page.off("dialog", listener);
    return asked || prevented;
  };
  assert.equal(await asks(), false);
  await page.getByLabel("Title").fill("changed");
  assert.equal(await asks(), true);
  await page.getByText("Unsaved changes", { exact: true }).waitFor();
  await downloaded(page, () => page.getByRole("button", { name: "Save", exact: true }).click());
  await page.getByText("plan.json is saved.").waitFor();
  assert.equal(await asks(), false);
  await close();
});

test("43: unsaved work is offered on the next visit, not imposed, and a saved file ends that", async () => {
  const { page, close } = await openWith(browser, smallPlan(), { prepare: withoutPicker });
  await page.getByLabel("Title").fill("kept against a crash");
  await page.waitForFunction((key) => localStorage.getItem(key), KEY);
  page.on("dialog", (dialog) => dialog.accept());
  await page.reload();
  await page.locator("#assumptions").waitFor();
  assert.notEqual(await page.getByLabel("Title").inputValue(), "kept against a crash");
  await page.getByText("kept from an earlier visit: “kept against a crash”").waitFor();
  await page.getByRole("button", { name: "Open the kept copy" }).click();
  assert.equal(await page.getByLabel("Title").inputValue(), "kept against a crash");
  assert.match(await page.title(), /^• kept against a crash \(plan\.json\)/);
  await downloaded(page, () => page.getByRole("button", { name: "Save", exact: true }).click());
  await page.getByText("is saved.").waitFor();
  assert.equal(await page.evaluate((key) => localStorage.getItem(key), KEY), null);
  await close();
});

test("43: storage that is damaged, full or absent is told and harms nothing", async () => {
  for (const [name, prepare, wanted] of [
    ["damaged", () => localStorage.setItem("thimbleworth/recovery/1", '{"file":null,"plan":"{<script>"}'), /could not be read and is removed/],
    ["full", () => {
      Storage.prototype.setItem = () => {
        throw new DOMException("The quota has been exceeded.", "QuotaExceededError");
      };
    }, /No copy can be kept against a crash \(.*quota.*\)/],
    ["absent", () => {
      Object.defineProperty(globalThis, "localStorage", { get() {
        throw new DOMException("The operation is insecure.", "SecurityError");
      } });
    }, /No copy can be kept against a crash/],
  ]) {
    const { page, seen, close } = await open(browser, packed, { prepare });
    await page.getByLabel(/^Solvent in the flask/).fill("123 mL");
    await page.locator(".said-line", { hasText: wanted }).waitFor({ timeout: 3_000 });
    assert.equal(await page.getByLabel(/^Solvent in the flask/).inputValue(), "123 mL", name);
    assertQuiet(seen);
    await close();
  }
});

test("a fault of the program shows the notice, and the plan can still be saved as it was typed", async () => {
  const { page, seen, close } = await openWith(browser, smallPlan(), { prepare: withoutPicker });
  await page.getByLabel("Title").fill("before the fault");
  await page.evaluate(() => {
    Element.prototype.setAttribute = () => {
      throw new Error("broken on purpose");
    };
    Node.prototype.insertBefore = Element.prototype.setAttribute;
  });
  await page.getByRole("button", { name: "Duplicate: Large flask" }).click().catch(() => {});
  await page.locator("#stopped").waitFor({ timeout: 5_000 });
  assert.match(await page.locator("#stopped").innerText(), /has stopped/);
  assert.ok(seen.errors.some((text) => text.includes("panicked")), seen.errors.join("\n"));
  const saved = await downloaded(page, () => page.getByRole("button", { name: "Save the plan as it was last seen" }).click());
  const plan = JSON.parse(saved.text);
  assert.equal(saved.name, "plan.json");
  assert.equal(plan.title, "before the fault");
  assert.equal(plan.workloads[0].routes.length, 3, "the last action is in it");
  await close();
});

const MARKUP = '<img src=x onerror="globalThis.hacked=1"><script>globalThis.hacked=1</script>';

test("a plan with markup and script in every text is shown as text, in the page, its tables and its report", async () => {
  const hostile = smallPlan((plan) => {
    plan.title = MARKUP;
    plan.notes = MARKUP;
    plan.site.name = MARKUP;
    plan.site.streams[0].name = `${MARKUP}a`;
    plan.materials = { [`${MARKUP}m`]: { class: "solvent", density: "0.7 g/mL", hazards: "H225", source: MARKUP } };
    const work = plan.workloads[0];
    work.name = MARKUP;
    for (const route of work.routes) {
      route.equivalence = MARKUP;
      route.steps[0].solvent = { [`${MARKUP}m`]: "100 %" };
      route.steps[0].note = MARKUP;
      route.ends.liquor = `${MARKUP}a`;
    }
    work.routes[0].name = `${MARKUP}1`;
    work.routes[1].name = `=cmd|' /C calc'!A1`;
    work.present = `${MARKUP}1`;
  });
  const { page, seen, close } = await openWith(browser, hostile, { prepare: withoutPicker });
  assert.equal(await page.getByLabel("Title").inputValue(), MARKUP);
  assert.match(await insight(page), /<img src=x/);
  await page.locator("button.figure").first().click();
  await page.getByRole("dialog").waitFor();
  await page.keyboard.press("Escape");
  await page.getByRole("button", { name: /^Open the form of =cmd/ }).click();
  await page.waitForTimeout(100);
  assert.equal(await page.evaluate(() => globalThis.hacked), undefined);
  assert.equal(await page.locator("img, main script").count(), 0);
  assertQuiet(seen);
  await page.context().grantPermissions(["clipboard-read", "clipboard-write"]);
  await page.locator("[data-copy^=goes-to]").click();
  await page.getByText("The table is copied.").waitFor();
  const copied = await page.evaluate(() => navigator.clipboard.readText());
  assert.ok(copied.split("\n")[0].split("\t").some((cell) => cell.startsWith("'=cmd")), copied.split("\n")[0]);
  await page.getByText("Hand on", { exact: true }).click();
  const csv = await downloaded(page, () => page.getByRole("button", { name: /^Figures as CSV/ }).click());
  assert.doesNotMatch(csv.text, /(^|[,;\n])"?[=+@-](?![\d.])/m, "no cell begins like a formula");
  await close();
});
