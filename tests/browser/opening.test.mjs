// The page opens from a file, and says what is missing where it cannot.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { copyFileSync, mkdirSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { assertQuiet, launch, open, openRaw, packed, picture, root, shell } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

for (const [name, file] of [["the file to mail", packed], ["the root index.html after a build", shell]]) {
  test(`${name} opens from the disk and shows every section, numbered`, async () => {
    const { page, seen, close } = await open(browser, file);
    assert.equal(await page.title(), "Untitled plan – Thimbleworth");
    assert.equal(await page.locator("h1").count(), 1);
    assert.equal(await page.locator("html").getAttribute("lang"), "en");
    const headings = await page.locator("main section h2").allInnerTexts();
    const contents = await page.locator("nav a").allInnerTexts();
    assert.equal(headings.length, 9);
    headings.forEach((text, i) => assert.match(text, new RegExp(`^${i + 1}\\s`)));
    const plain = (texts) => texts.map((text) => text.replace(/\s+/g, " "));
    assert.deepEqual(plain(contents), plain(headings));
    assert.ok(await page.locator("#not-built, #boot, #stopped").locator("visible=true").count() === 0);
    assertQuiet(seen);
    await close();
  });
}

test("every entry of the contents list leads to its section", async () => {
  const { page, close } = await open(browser);
  for (const link of await page.locator("nav a").all()) {
    const target = await link.getAttribute("href");
    await link.click();
    assert.equal(await page.evaluate(() => location.hash), target);
    assert.equal(await page.locator(`section${target}`).count(), 1);
  }
  await close();
});

test("a title that is typed names the window, and undo takes it back by name", async () => {
  const { page, seen, close } = await open(browser);
  await page.getByLabel("Title").pressSequentially("Hop oil");
  assert.equal(await page.title(), "• Hop oil – Thimbleworth");
  await page.getByRole("button", { name: "Undo: change title" }).click();
  assert.equal(await page.getByLabel("Title").inputValue(), "");
  assert.equal(await page.title(), "Untitled plan – Thimbleworth");
  await page.keyboard.press("Control+y");
  assert.equal(await page.getByLabel("Title").inputValue(), "Hop oil");
  await page.keyboard.press("Control+z");
  assert.equal(await page.getByLabel("Title").inputValue(), "");
  assertQuiet(seen);
  await close();
});

test("the first Tab stop skips to the account", async () => {
  const { page, close } = await open(browser);
  await page.keyboard.press("Tab");
  assert.equal(await page.evaluate(() => document.activeElement.textContent), "Skip to the account");
  await page.keyboard.press("Enter");
  assert.equal(await page.evaluate(() => document.activeElement.id), "main");
  await close();
});

test("before a build, the root index.html says how to build", async () => {
  const folder = mkdtempSync(join(tmpdir(), "thimbleworth-"));
  mkdirSync(join(folder, "web"));
  copyFileSync(shell, join(folder, "index.html"));
  copyFileSync(join(root, "web/page.css"), join(folder, "web/page.css"));
  const { page, close } = await openRaw(browser, join(folder, "index.html"));
  await page.locator("#not-built").waitFor({ timeout: 5_000 });
  assert.match(await page.locator("#not-built").innerText(), /not been built yet.*cargo page/s);
  await picture(page, "not-built");
  await close();
  rmSync(folder, { recursive: true });
});

test("without JavaScript the page says that it needs it", async () => {
  const { page, close } = await openRaw(browser, packed, { javaScriptEnabled: false });
  assert.match(await page.locator("noscript").innerText(), /needs JavaScript/);
  await close();
});

test("a browser that cannot unpack the program is told so", async () => {
  const { page, close } = await openRaw(browser, packed, {
    prepare: () => {
      delete globalThis.DecompressionStream;
    },
  });
  await page.locator("#boot").waitFor({ timeout: 5_000 });
  assert.match(await page.locator("#boot").innerText(), /could not start.*DecompressionStream/);
  await close();
});

test("a fault of the program itself shows the banner", async () => {
  const { page, seen, close } = await open(browser);
  await page.getByLabel("Title").fill("Hop oil");
  // Drawing the idle Undo button sets an attribute; the program does not expect that to fail.
  await page.evaluate(() => {
    Element.prototype.setAttribute = () => {
      throw new Error("broken on purpose");
    };
  });
  await page.getByRole("button", { name: /^Undo/ }).click();
  await page.locator("#stopped").waitFor({ timeout: 5_000 });
  assert.match(await page.locator("#stopped").innerText(), /has stopped/);
  assert.ok(seen.errors.some((text) => text.includes("panicked")), seen.errors.join("\n"));
  await close();
});
