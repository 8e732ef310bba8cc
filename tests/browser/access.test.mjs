// The page can be read and used by everyone: axe finds nothing in any look, and nothing is cut off.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, axeFindings, launch, open, packed, picture } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

const narrow = { width: 320, height: 640 };
const looks = {
  wide: {},
  dark: { colorScheme: "dark" },
  narrow: { viewport: narrow },
  "narrow-dark": { viewport: narrow, colorScheme: "dark" },
  print: { print: true },
  "forced-colours": { forced: true },
};

for (const [name, options] of Object.entries(looks)) {
  test(`6: axe finds nothing: ${name}`, async () => {
    const { page, seen, close } = await open(browser, packed, options);
    await picture(page, name);
    // Nothing on paper is pressed with a finger.
    const rules = name === "print" ? { "target-size": { enabled: false } } : {};
    assert.deepEqual(await axeFindings(page, rules), []);
    if (name !== "print") {
      await page.getByLabel("Title").fill("Which route for hop oil?");
      await page.getByLabel(/^Solvent in the flask/).fill("300 m");
      await page.getByLabel(/^Solvent in the flask/).blur();
      assert.deepEqual(await axeFindings(page), [], "filled, with an error");
    }
    assertQuiet(seen);
    await close();
  });
}

test("control: axe catches a field without a label and pale text", async () => {
  const { page, close } = await open(browser);
  await page.evaluate(() => {
    document.querySelector("label[for=title]").remove();
    const lead = document.querySelector(".lead");
    lead.style.color = "#bbbbbb";
  });
  const found = (await axeFindings(page)).join("\n");
  assert.match(found, /^label: #title$/m);
  assert.match(found, /^color-contrast: /m);
  await close();
});

test("4: at 320 px nothing scrolls sideways but the contents strip, which stays in sight", async () => {
  const { page, close } = await open(browser, packed, { viewport: narrow });
  assert.equal(await page.evaluate(() => document.documentElement.scrollWidth), narrow.width);
  await page.evaluate(() => document.getElementById("assumptions").scrollIntoView({ behavior: "instant" }));
  const top = await page.evaluate(() => document.querySelector("nav").getBoundingClientRect().top);
  assert.equal(top, 0);
  for (const box of await page.locator(".scroll").all()) {
    assert.equal(await box.getAttribute("tabindex"), "0", "what scrolls by itself can be reached by key");
  }
  await picture(page, "narrow-end", false);
  await close();
});

test("5: with the text spacing of WCAG 1.4.12 nothing is cut off", async () => {
  const { page, close } = await open(browser, packed, { viewport: narrow, bypassCSP: true });
  await page.addStyleTag({
    content: "* { line-height: 1.5 !important; letter-spacing: 0.12em !important; word-spacing: 0.16em !important; }",
  });
  assert.equal(await page.evaluate(() => document.documentElement.scrollWidth), narrow.width);
  const cut = () => page.evaluate(() =>
    [...document.querySelectorAll("main *, .toolbar *")]
      // What scrolls by itself, is meant for listeners alone or holds typed text is not cut off by the spacing.
      .filter((element) => !element.closest(".scroll, .picture-scroll, svg, .unseen, input, textarea, select, dialog, datalist"))
      .filter((element) => element.scrollWidth > element.clientWidth + 1 && element.clientWidth > 0)
      .filter((element) => getComputedStyle(element).display !== "inline")
      .map((element) => element.outerHTML.slice(0, 80)),
  );
  assert.deepEqual(await cut(), []);
  await page.evaluate(() => {
    document.querySelector(".lead").style.cssText = "width: 4rem; overflow: hidden; white-space: nowrap";
  });
  assert.equal((await cut()).length, 1, "control: a line that is cut off is found");
  await close();
});

test("5: text twice as large loses nothing", async () => {
  const { page, close } = await open(browser, packed, { bypassCSP: true });
  await page.addStyleTag({ content: "html { font-size: 200% !important; }" });
  assert.equal(await page.evaluate(() => document.documentElement.scrollWidth), 1280);
  await picture(page, "twice", false);
  await close();
});

test("25: targets are at least 24 px, and 44 px under a finger", async () => {
  for (const [options, least] of [[{}, 24], [{ hasTouch: true, isMobile: true, viewport: { width: 390, height: 800 } }, 44]]) {
    const { page, close } = await open(browser, packed, options);
    const small = await page.evaluate((least) =>
      [...document.querySelectorAll("button, input, select, textarea, summary, nav a")]
        .filter((e) => e.offsetParent !== null && !e.closest("dialog"))
        .map((e) => [e.innerText || e.id, e.getBoundingClientRect()])
        .filter(([, box]) => box.height > 0 && (box.height < least - 0.5 || box.width < Math.min(least, 24) - 0.5))
        .map(([name, box]) => `${name}: ${box.width} × ${box.height}`), least);
    assert.deepEqual(small, [], `${least} px`);
    await close();
  }
});

test("reduced motion is respected", async () => {
  const { page, close } = await open(browser, packed, { reducedMotion: "reduce" });
  assert.equal(await page.evaluate(() => getComputedStyle(document.documentElement).scrollBehavior), "auto");
  await close();
});
