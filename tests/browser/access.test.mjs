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
  test(`axe finds nothing: ${name}`, async () => {
    const { page, seen, close } = await open(browser, packed, options);
    await picture(page, name);
    assert.deepEqual(await axeFindings(page), []);
    await page.getByLabel("Title").fill("Which route for hop oil?");
    assert.deepEqual(await axeFindings(page), [], "filled");
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

test("at 320 px nothing scrolls sideways but the contents strip, which stays in sight", async () => {
  const { page, close } = await open(browser, packed, { viewport: narrow });
  assert.equal(await page.evaluate(() => document.documentElement.scrollWidth), narrow.width);
  await page.evaluate(() => document.getElementById("assumptions").scrollIntoView({ behavior: "instant" }));
  const top = await page.evaluate(() => document.querySelector("nav").getBoundingClientRect().top);
  assert.equal(top, 0);
  await picture(page, "narrow-end", false);
  await close();
});

test("with the text spacing of WCAG 1.4.12 nothing is cut off", async () => {
  const { page, close } = await open(browser, packed, { viewport: narrow, bypassCSP: true });
  await page.addStyleTag({
    content: "* { line-height: 1.5 !important; letter-spacing: 0.12em !important; word-spacing: 0.16em !important; }",
  });
  assert.equal(await page.evaluate(() => document.documentElement.scrollWidth), narrow.width);
  const cut = () => page.evaluate(() =>
    [...document.querySelectorAll("main *, .toolbar *")]
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
