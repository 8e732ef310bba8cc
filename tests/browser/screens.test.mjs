// The pictures in the README are taken here. A picture is written anew only where it shows something else than before, so that
// the smoothing of a letter changes no file.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { existsSync, mkdirSync, readFileSync, writeFileSync } from "node:fs";
import { join } from "node:path";
import { launch, open, packed, root } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

const folder = join(root, "tests/browser/screens");
/** The share of pixels that may differ before a picture is taken for another one. */
const ALIKE = 0.005;

/** The share of pixels of two PNG files that differ by more than smoothing does; 1 where their sizes differ. */
async function difference(a, b) {
  const page = await browser.newPage();
  const share = await page.evaluate(async (files) => {
    const [a, b] = await Promise.all(files.map(async (file) => {
      const image = new Image();
      image.src = `data:image/png;base64,${file}`;
      await image.decode();
      const canvas = new OffscreenCanvas(image.width, image.height).getContext("2d");
      canvas.drawImage(image, 0, 0);
      return canvas.getImageData(0, 0, image.width, image.height);
    }));
    if (a.width !== b.width || a.height !== b.height) return 1;
    let other = 0;
    for (let i = 0; i < a.data.length; i += 4) {
      if ([0, 1, 2].some((c) => Math.abs(a.data[i + c] - b.data[i + c]) > 48)) other += 1;
    }
    return (other * 4) / a.data.length;
  }, [a, b].map((file) => file.toString("base64")));
  await page.close();
  return share;
}

for (const [name, section, options] of [
  ["question", "question", { viewport: { width: 1280, height: 800 } }],
  ["places", "places", { viewport: { width: 1280, height: 800 } }],
  ["narrow", "finding", { viewport: { width: 390, height: 700 }, colorScheme: "dark" }],
]) {
  test(`the picture "${name}" of the README shows the page as it is`, async () => {
    const { page, close } = await open(browser, packed, { ...options, folded: true, reducedMotion: "reduce" });
    if (section !== "question") await page.evaluate((id) => document.getElementById(id).scrollIntoView({ behavior: "instant" }), section);
    const now = await page.screenshot();
    const file = join(folder, `${name}.png`);
    mkdirSync(folder, { recursive: true });
    if (!existsSync(file) || (await difference(readFileSync(file), now)) > ALIKE) writeFileSync(file, now);
    assert.ok((await difference(readFileSync(file), now)) <= ALIKE);
    assert.ok((await difference(now, await (await browser.newPage()).screenshot())) > ALIKE, "control: an empty page is another picture");
    await close();
  });
}
