// How fast the page is; no test, because a number depends on the machine and on what else it does.
//   cargo page && cargo page --empty && node tests/browser/measure.mjs [an earlier page to open beside it]
// Times are told twice: by the clock, which other work on the machine lengthens, and as processor time of the page's main
// thread, which it hardly does.
import { give, launch, open, openRaw, packed, root, settled, smallPlan } from "./vocabulary.mjs";
import { existsSync } from "node:fs";
import { cpus, loadavg } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";

const RUNS = 10;
const empty = join(root, "web/dist/empty.html");
const median = (list) => [...list].sort((a, b) => a - b)[Math.floor(list.length / 2)];
const browser = await launch();
const load = () => `load ${loadavg().map((l) => l.toFixed(1)).join(" ")}`;
console.log(`${cpus().length} processors, ${cpus()[0].model.trim()}, Chromium ${browser.version()}, ${load()}`);

/** Marks when the first section (of an empty page: anything) is drawn, when the finding stands, and when all is there. */
const watch = () => {
  performance.mark("begins");
  for (const [name, wanted] of [["drawn", "#question, #drawn"], ["finding", ".insight p:nth-child(2), #drawn"], ["whole", "#assumptions, #drawn"]]) {
    new MutationObserver((_, observer) => {
      if (document.querySelector(wanted)) {
        performance.mark(name);
        observer.disconnect();
      }
    }).observe(document, { childList: true, subtree: true });
  }
};

/** Opens `file` once: milliseconds since the navigation began, and processor time since the document was there. */
async function opened(file) {
  const { page, close } = await openRaw(browser, null, { prepare: watch, folded: true });
  await browser.startTracing(page, { categories: ["blink.user_timing"] });
  await page.goto(pathToFileURL(file).href);
  await page.waitForFunction(() => performance.getEntriesByName("whole").length);
  const clock = await page.evaluate(() => Object.fromEntries(performance.getEntriesByType("mark").map((m) => [m.name, m.startTime])));
  const events = JSON.parse((await browser.stopTracing()).toString()).traceEvents;
  await close();
  const begins = events.findLast((e) => e.name === "begins" && e.tts);
  const processor = Object.fromEntries(
    events.filter((e) => e.pid === begins.pid && e.tts && e.ts >= begins.ts).map((e) => [e.name, (e.tts - begins.tts) / 1000]),
  );
  return { clock, processor };
}

const files = { page: packed, ...(existsSync(empty) && { empty }), ...(process.argv[2] && { earlier: process.argv[2] }) };
const found = Object.fromEntries(Object.keys(files).map((name) => [name, []]));
for (let i = 0; i < RUNS; i += 1) {
  for (const [name, file] of Object.entries(files)) found[name].push(await opened(file));
}
const of = (name, kind, mark) => median(found[name].map((run) => run[kind][mark]));
for (const [mark, words] of [["drawn", "first section drawn"], ["finding", "finding drawn"], ["whole", "all sections drawn"]]) {
  console.log(`${words}: median of ${RUNS} ${of("page", "clock", mark).toFixed(0)} ms by the clock, ${of("page", "processor", mark).toFixed(0)} ms of the main thread`);
}
if (found.earlier) {
  console.log(`${process.argv[2]}, beside it in turn: first section drawn ${of("earlier", "clock", "drawn").toFixed(0)} ms, ${of("earlier", "processor", "drawn").toFixed(0)} ms`);
}
if (found.empty) {
  const ratio = (kind) => (of("page", kind, "drawn") / of("empty", kind, "drawn")).toFixed(1);
  console.log(
    `an empty page packed in the same way, beside it in turn: ${of("empty", "clock", "drawn").toFixed(0)} ms, ${of("empty", "processor", "drawn").toFixed(0)} ms; ratio ${ratio("clock")} by the clock, ${ratio("processor")} of the main thread`,
  );
} else {
  console.log("no web/dist/empty.html: run `cargo page --empty` for the ratio");
}

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
  await settled(page);
  const times = await page.evaluate(async () => {
    const input = [...document.querySelectorAll("label")].find((l) => l.innerText.startsWith("Solvent in the flask")).control;
    const set = Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value").set;
    // Resolves as soon as the figures beside the account are others; not by turning round in one turn, which nothing else could use.
    const changed = () => new Promise((done) => {
      const observer = new MutationObserver(() => {
        observer.disconnect();
        done();
      });
      observer.observe(document.querySelector(".insight"), { subtree: true, childList: true, characterData: true });
    });
    const out = { script: [], layout: [] };
    for (let i = 0; i < 60; i += 1) {
      await new Promise((done) => setTimeout(done, 20));
      const drawn = changed();
      const start = performance.now();
      set.call(input, `${200 + (i % 7) * 13} mL`);
      input.dispatchEvent(new InputEvent("input", { bubbles: true }));
      await drawn;
      out.script.push(performance.now() - start);
      document.body.getBoundingClientRect();
      out.layout.push(performance.now() - start);
    }
    return out;
  });
  // The sections with figures follow once nobody types: the longest task among them is what a stroke may have to wait for.
  const follow = { clock: [], processor: [] };
  for (let i = 0; i < 5; i += 1) {
    await browser.startTracing(page, { categories: ["toplevel", "blink.user_timing"] });
    await page.evaluate(async (i) => {
      const input = [...document.querySelectorAll("label")].find((l) => l.innerText.startsWith("Solvent in the flask")).control;
      Object.getOwnPropertyDescriptor(HTMLInputElement.prototype, "value").set.call(input, `${300 + i} mL`);
      input.dispatchEvent(new InputEvent("input", { bubbles: true }));
      performance.mark("typed");
      await new Promise((done) => setTimeout(done, 1500));
    }, i);
    const events = JSON.parse((await browser.stopTracing()).toString()).traceEvents;
    const typed = events.findLast((e) => e.name === "typed" && e.tts);
    const tasks = events.filter((e) => /RunTask$/.test(e.name) && e.tdur && e.pid === typed.pid && e.tid === typed.tid && e.ts > typed.ts);
    if (tasks.length === 0) throw new Error("no task is traced");
    follow.clock.push(Math.max(...tasks.map((e) => e.dur)) / 1000);
    follow.processor.push(Math.max(...tasks.map((e) => e.tdur)) / 1000);
  }
  console.log(`${routes} routes of 8 steps: key stroke to figures, median ${median(times.script).toFixed(1)} ms, with layout ${median(times.layout).toFixed(1)} ms, worst ${Math.max(...times.layout).toFixed(1)} ms; longest task of the sections that follow ${median(follow.clock).toFixed(0)} ms, ${median(follow.processor).toFixed(0)} ms of the main thread`);
  await close();
}
console.log(load());
await browser.close();
