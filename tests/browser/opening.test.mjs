// The page opens from a file, and says what is missing where it cannot.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { createServer } from "node:http";
import { copyFileSync, cpSync, createReadStream, mkdirSync, mkdtempSync, rmSync } from "node:fs";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { assertQuiet, launch, open, openRaw, packed, picture, root, settled, shell } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

for (const [name, file] of [["the file to mail", packed], ["the root index.html after a build", shell]]) {
  test(`${name} opens from the disk and shows every section, numbered`, async () => {
    const { page, seen, close } = await open(browser, file);
    assert.match(await page.title(), /^Harbour sediment.* – Thimbleworth$/);
    assert.equal(await page.locator("h1").count(), 1);
    assert.equal(await page.locator("html").getAttribute("lang"), "en");
    const headings = await page.locator("main section.leaf h2").allInnerTexts();
    const contents = await page.locator("nav.contents a").allInnerTexts();
    assert.ok(headings.length >= 9);
    headings.forEach((text, i) => assert.match(text, new RegExp(`^${i + 1}\\s`)));
    const plain = (texts) => texts.map((text) => text.replace(/\s+/g, " "));
    assert.deepEqual(plain(contents), plain(headings));
    assert.ok(await page.locator("#not-built, #boot, #stopped").locator("visible=true").count() === 0);
    assertQuiet(seen);
    await close();
  });
}

test("the file opens from a server that says UTF-8, as one reads it from a web page", async () => {
  const server = createServer((_, answer) => {
    answer.setHeader("content-type", "text/html; charset=utf-8");
    createReadStream(packed).pipe(answer);
  });
  await new Promise((done) => server.listen(0, "127.0.0.1", done));
  const { page, seen, close } = await openRaw(browser);
  await page.goto(`http://127.0.0.1:${server.address().port}/`);
  await settled(page);
  assert.equal(seen.requests.length, 1, "the page itself");
  assert.deepEqual(seen.errors, []);
  await close();
  server.close();
});

test("every entry of the contents list leads to its section", async () => {
  const { page, close } = await open(browser);
  for (const link of await page.locator("nav.contents a").all()) {
    const target = await link.getAttribute("href");
    await link.click();
    assert.equal(await page.evaluate(() => location.hash), target);
    assert.equal(await page.locator(`section${target}`).count(), 1);
  }
  await close();
});

test("1, 43: a title that is typed names the window and marks it, and undo takes it back by name", async () => {
  const { page, seen, close } = await open(browser);
  const title = page.getByLabel("Title");
  const before = await title.inputValue();
  await title.fill("Hop oil");
  await page.waitForFunction(() => document.title === "• Hop oil – Thimbleworth");
  await page.getByRole("button", { name: "Undo: change title" }).click();
  assert.equal(await title.inputValue(), before);
  await page.waitForFunction(() => document.title.startsWith("Harbour"));
  const holds = (value) => page.waitForFunction((value) => document.getElementById("title").value === value, value);
  await page.keyboard.press("Control+y");
  await holds("Hop oil");
  await page.keyboard.press("Control+z");
  await holds(before);
  assertQuiet(seen);
  await close();
});

test("what is typed in the very turn in which the first section is drawn is kept, and nothing there moves", async () => {
  const { page, seen, close } = await openRaw(browser, packed, {
    prepare: () => {
      const places = () => [...document.querySelectorAll("#question .form input, #question .form select")]
        .filter((field) => field.checkVisibility({ contentVisibilityAuto: true }))
        .map((field) => [field.id, field.getBoundingClientRect().x, Math.round(field.getBoundingClientRect().y + scrollY)].join(" "));
      new MutationObserver((_, observer) => {
        if (!document.querySelector("#question")) return;
        observer.disconnect();
        globalThis.late = document.querySelector("#routes") !== null;
        const type = (id, value) => {
          const field = document.getElementById(id);
          field.value = value;
          field.dispatchEvent(new InputEvent("input", { bubbles: true }));
        };
        type("title", "Typed at once");
        type("workloads[0].results_per_year", "4321");
        globalThis.places = { before: places(), now: places };
      }).observe(document, { childList: true, subtree: true });
    },
  });
  await settled(page);
  assert.equal(await page.evaluate(() => globalThis.late), false, "typed before anything else stood");
  assert.equal(await page.locator("#title").inputValue(), "Typed at once");
  assert.equal(await page.getByLabel("Results reported in a year").first().inputValue(), "4321");
  assert.equal(await page.title(), "• Typed at once – Thimbleworth");
  const [before, now] = await page.evaluate(() => [globalThis.places.before, globalThis.places.now()]);
  assert.ok(before.length > 10, `${before.length} fields in sight`);
  assert.deepEqual(now, before);
  await page.getByRole("button", { name: "Undo: change results reported in a year" }).click();
  await page.getByRole("button", { name: "Undo: change title" }).click();
  assert.match(await page.locator("#title").inputValue(), /^Harbour sediment/);
  assertQuiet(seen);
  await close();
});

test("2: the page has its landmarks, and the contents stay in sight", async () => {
  const { page, close } = await open(browser);
  for (const role of ["banner", "navigation", "main", "contentinfo"]) {
    assert.equal(await page.getByRole(role).count(), 1, role);
  }
  await page.evaluate(() => document.getElementById("assumptions").scrollIntoView({ behavior: "instant" }));
  const box = await page.locator("nav.contents").boundingBox();
  assert.ok(box.y >= 0 && box.y < 100, JSON.stringify(box));
  assert.ok(await page.locator(".insight").isVisible());
  await close();
});

test("2: the first Tab stop skips to the account", async () => {
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
  cpSync(join(root, "web/style"), join(folder, "web/style"), { recursive: true });
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
      delete globalThis.WebAssembly;
    },
  });
  await page.locator("#boot").waitFor({ timeout: 5_000 });
  assert.match(await page.locator("#boot").innerText(), /could not start.*lacks WebAssembly/);
  await close();
});
