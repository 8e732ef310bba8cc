// Pictures: what they say without being seen, bars from zero, marks that stand out. Numbers are those of the list of points.
import { after, before, test } from "node:test";
import assert from "node:assert/strict";
import { assertQuiet, launch, open, packed } from "./vocabulary.mjs";

let browser;
before(async () => {
  browser = await launch();
});
after(() => browser?.close());

test("34, 35: every picture has a title, a sentence, its figures as a table, and upright text of its own", async () => {
  const { page, seen, close } = await open(browser);
  const found = await page.evaluate(() =>
    [...document.querySelectorAll("main svg[role=img]")].map((svg) => {
      const [title, description] = svg.getAttribute("aria-labelledby").split(" ").map((id) => document.getElementById(id)?.textContent ?? "");
      const figure = svg.closest("figure, .picture");
      return {
        title,
        description,
        cells: figure?.querySelectorAll("table td").length ?? 0,
        caption: [...(figure?.querySelectorAll("table") ?? [])].every((table) => table.caption?.textContent),
        texts: svg.querySelectorAll("text").length,
        turned: [...svg.querySelectorAll("text")].filter((text) => /rotate/.test(text.getAttribute("transform") ?? "")).length,
        images: svg.querySelectorAll("image, foreignObject").length,
        ids: [...svg.querySelectorAll("[id]")].every((e) => document.querySelectorAll(`[id="${CSS.escape(e.id)}"]`).length === 1),
      };
    }),
  );
  assert.ok(found.length >= 8, `${found.length} drawings`);
  for (const picture of found) {
    assert.ok(picture.title.length > 20, `a title that says what is to be seen: ${picture.title}`);
    assert.match(picture.description, /\.$/, "a sentence");
    assert.ok(picture.cells > 3 && picture.caption, `${picture.title}: the same figures as a table`);
    assert.ok(picture.texts > 2 && picture.turned === 0 && picture.images === 0, `${picture.title}: labels as real, upright text`);
    assert.ok(picture.ids, `${picture.title}: ids of its own`);
  }
  assertQuiet(seen);
  await close();
});

test("36: bars of mass start at one zero line, stand in order of size, and are as long as their figures say", async () => {
  const { page, close } = await open(browser);
  const routes = await page.evaluate(() => {
    const out = [];
    let bar = null;
    let label = "";
    for (const e of document.querySelector("#places svg.drawing-wide").children) {
      if (e.matches("text.name")) out.push({ name: e.textContent, bars: [] });
      if (e.matches("text:not([class^=name], .amount)")) label = e.textContent;
      if (e.matches("text.amount")) bar = { label, amount: Number(e.textContent.replaceAll("\u202f", "")) };
      if (e.matches("rect[class^=fill]") && bar && out.length) {
        out.at(-1).bars.push({ ...bar, from: Number(e.getAttribute("x")), width: Number(e.getAttribute("width")) });
        bar = null;
      }
    }
    return out;
  });
  const bars = routes.flatMap((route) => route.bars);
  assert.ok(routes.length >= 4 && bars.length >= 8, JSON.stringify(routes));
  assert.equal(new Set(bars.map((b) => b.from)).size, 1, "one zero line");
  // By the most that a place gets on any route, and so in the same order on every route.
  const most = new Map();
  for (const { label, width } of bars) most.set(label, Math.max(width, most.get(label) ?? 0));
  const order = [...most].sort((a, b) => b[1] - a[1]).map(([label]) => label);
  for (const { name, bars } of routes) {
    const labels = bars.map((b) => b.label);
    assert.deepEqual(labels, order.filter((label) => labels.includes(label)), `${name}: what gets most first`);
  }
  const long = bars.filter((b) => b.width > 20 && Number.isFinite(b.amount));
  assert.ok(long.length >= 3);
  const [first] = long;
  for (const b of long) {
    // Figures are written with three digits.
    assert.ok(Math.abs(b.width / b.amount / (first.width / first.amount) - 1) < 0.02, JSON.stringify([first, b]));
  }
  await close();
});

/** Contrast of two colours by WCAG 2.2, "relative luminance". */
function contrast(a, b) {
  const luminance = (colour) => {
    const [r, g, b] = /(\d+), (\d+), (\d+)/.exec(colour).slice(1).map((v) => Number(v) / 255).map((v) => (v <= 0.04045 ? v / 12.92 : ((v + 0.055) / 1.055) ** 2.4));
    return 0.2126 * r + 0.7152 * g + 0.0722 * b;
  };
  const [low, high] = [luminance(a), luminance(b)].sort((x, y) => x - y);
  return (high + 0.05) / (low + 0.05);
}

for (const [name, options] of Object.entries({ light: {}, dark: { colorScheme: "dark" }, "forced colours": { forced: true } })) {
  test(`38: marks stand out from their ground by three to one: ${name}`, async () => {
    const { page, close } = await open(browser, packed, options);
    const found = await page.evaluate(() =>
      [...document.querySelectorAll("svg.drawing-wide rect[class^=fill]:not(.fill-back), svg.drawing-wide path.mark, svg.drawing-wide .stop")].map((mark) => {
        let ground = mark.closest("svg").parentElement;
        while (getComputedStyle(ground).backgroundColor === "rgba(0, 0, 0, 0)" && ground.parentElement) ground = ground.parentElement;
        return [mark.getAttribute("class"), getComputedStyle(mark).fill, getComputedStyle(ground).backgroundColor];
      }),
    );
    assert.ok(found.length > 8, `${found.length} marks`);
    for (const [kind, mark, ground] of found) assert.ok(contrast(mark, ground) >= 3, `${kind}: ${mark} on ${ground}`);
    await close();
  });
}

test("38: what kind of place a bar stands for is told by lines and dots as well as by colour", async () => {
  const { page, close } = await open(browser);
  const air = await page.evaluate(() => {
    const svg = document.querySelector("#places svg.drawing-wide");
    return { air: svg.querySelectorAll(".fill-air").length, hatched: svg.querySelectorAll("[fill^='url(#places']").length, said: document.querySelector("#places .picture").textContent };
  });
  assert.ok(air.air > 0 && air.hatched >= air.air, JSON.stringify(air));
  assert.match(air.said, /lines is air|lines are air/i);
  await close();
});
