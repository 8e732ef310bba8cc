// Nothing leaves the page.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, launch, open, openRaw, packed, shell } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

// A port of the machine itself that nothing listens on.
const elsewhere = "http://127.0.0.1:9/";
const call = (page) => page.evaluate((url) => fetch(url).catch(() => {}), elsewhere);

test("3: opening, typing and undoing sends no request, with the network off", async () => {
  for (const file of [packed, shell]) {
    const { page, seen, close } = await open(browser, file, { offline: true });
    await page.getByLabel("Title").fill("Hop oil");
    await page.getByRole("button", { name: /^Undo/ }).click();
    await page.waitForTimeout(200);
    assertQuiet(seen);
    await close();
  }
});

test("control: a request from a page without a policy is seen on the network", async () => {
  const { page, seen, close } = await openRaw(browser);
  await call(page);
  assert.deepEqual(seen.requests, [elsewhere]);
  assert.throws(() => assertQuiet(seen));
  await close();
});

test("control: a request from the packed page is stopped by its policy, and seen in the console", async () => {
  const { page, seen, close } = await open(browser);
  await call(page);
  assert.deepEqual(seen.requests, []);
  assert.ok(seen.errors.some((text) => text.includes("Content Security Policy")), seen.errors.join("\n"));
  assert.throws(() => assertQuiet(seen));
  await close();
});

test("the policy of the packed page stops a script and a style that it does not know", async () => {
  const { page, seen, close } = await open(browser);
  const ran = await page.evaluate(() => {
    const script = document.createElement("script");
    script.textContent = "globalThis.strange = true;";
    document.body.append(script);
    document.body.insertAdjacentHTML("beforeend", '<p id="strange" style="position: fixed">strange</p>');
    return { script: globalThis.strange === true, style: getComputedStyle(document.getElementById("strange")).position };
  });
  assert.deepEqual(ran, { script: false, style: "static" });
  assert.equal(seen.errors.length, 2, seen.errors.join("\n"));
  await close();
});
