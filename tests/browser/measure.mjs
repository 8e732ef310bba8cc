// How fast the page is; no test, because a number depends on the machine. `node tests/browser/measure.mjs`
import { give, launch, open, openRaw, packed, smallPlan } from "./vocabulary.mjs";
import { pathToFileURL } from "node:url";

const median = (list) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)];
const browser = await launch();

const renders = [];
const beside = process.argv[2];
const empty = [];
for (let i = 0; i < 10; i += 1) {
  for (const [file, list] of [[packed, renders], ...(beside ? [[beside, empty]] : [])]) {
    const { page, close } = await openRaw(browser, null, {
      prepare: () => {
        new MutationObserver((_, observer) => {
          if (document.querySelector("#question, #drawn")) {
            globalThis.drawn = performance.now();
            observer.disconnect();
          }
        }).observe(document, { childList: true, subtree: true });
      },
    });
    await page.goto(pathToFileURL(file).href);
    await page.waitForFunction(() => globalThis.drawn);
    list.push(await page.evaluate(() => globalThis.drawn));
    await close();
  }
}
console.log(`first render: median of ten ${median(renders).toFixed(0)} ms`);
if (beside) console.log(`beside an empty page: ${median(empty).toFixed(0)} ms, ratio ${(median(renders) / median(empty)).toFixed(1)}`);

for (const routes of [4, 50]) {
  const { page, close } = await open(browser);
  const plan = smallPlan((plan) => {
    const [first] = plan.workloads[0].routes;
    const step = first.steps[0];
    const rinse = { step: "rinse", solvent: "acetone", charge: "40 mL", to: "flammable" };
    plan.workloads[0].routes = Array.from({ length: routes }, (_, i) => ({
      ...first,
      name: i ? `Route ${i}` : "Large flask",
      steps: [step, ...Array.from({ length: 7 }, () => rinse)],
    }));
  });
  await give(page, "plan.json", plan);
  await page.getByText("plan.json is open.").waitFor();
  const times = await page.evaluate(async () => {
    const input = [...document.querySelectorAll("label")].find((l) => l.innerText.startsWith("Solvent in the flask")).control;
    const set = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value").set;
    const figure = () => document.querySelector(".insight").textContent;
    const out = { script: [], layout: [] };
    for (let i = 0; i < 60; i += 1) {
      await new Promise((done) => setTimeout(done, 20));
      const before = figure();
      const start = performance.now();
      set.call(input, `${200 + (i % 7) * 13} mL`);
      input.dispatchEvent(new InputEvent("input", { bubbles: true }));
      while (figure() === before && performance.now() - start < 500) await Promise.resolve();
      out.script.push(performance.now() - start);
      document.body.getBoundingClientRect();
      out.layout.push(performance.now() - start);
    }
    return out;
  });
  console.log(`${routes} routes of 8 steps: keystroke to figures, median ${median(times.script).toFixed(1)} ms, with layout ${median(times.layout).toFixed(1)} ms, worst ${Math.max(...times.layout).toFixed(1)} ms`);
  await close();
}
await browser.close();
