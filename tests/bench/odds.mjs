// How long the shipped page's own program draws: cargo page && node tests/bench/odds.mjs
// In Node, without a document, so that nothing but the draws is measured; beside the native program in the same run, where it is
// built (cargo build --release -p thimbleworth-command). It judges nothing.
import { execFileSync } from "node:child_process";
import { existsSync, readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { load } from "../parity/shipped.mjs";

const root = join(dirname(fileURLToPath(import.meta.url)), "../..");
const { account } = await load(join(root, "web/dist/page.js"));
const plan = readFileSync(join(root, "core/plans/harbour-sediment.json"), "utf8");
const DRAWS = 100_000;

/** Least processor time of several runs, s. */
function least(runs, call) {
  let best = Infinity;
  for (let i = 0; i < runs; i += 1) {
    const before = process.cpuUsage();
    call();
    const { user, system } = process.cpuUsage(before);
    best = Math.min(best, (user + system) / 1e6);
  }
  return best;
}

// Reading what is drawn takes its time too: what two numbers of draws differ by is the time of the draws and their reading.
const few = least(3, () => account(plan, "odds 1000"));
const all = least(3, () => account(plan, `odds ${DRAWS}`));
console.log(`the page's program: ${DRAWS} draws of 4 routes, drawn and read as a document, ${all.toFixed(2)} s (1000: ${few.toFixed(2)} s)`);
const target = process.env.CARGO_TARGET_DIR ?? join(root, "target");
const native = join(target, "release/thimbleworth");
if (existsSync(native)) {
  const start = performance.now();
  execFileSync(native, ["odds", "-", "--draws", String(DRAWS), "--format", "json"], { input: plan, stdio: ["pipe", "pipe", "ignore"], maxBuffer: 1 << 28 });
  const seconds = (performance.now() - start) / 1000;
  console.log(`the native program, the same by the clock: ${seconds.toFixed(2)} s; the page takes ${(all / seconds).toFixed(1)} times as long`);
}
