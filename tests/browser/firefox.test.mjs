// The same file in a stock Firefox: open, type, see the finding change, look behind a figure.
import { test } from "node:test";
import assert from "node:assert/strict";
import { openInFirefox } from "./firefox.mjs";
import { packed } from "./vocabulary.mjs";

const CONTROL = "\uE009";
const ESCAPE = "\uE00C";
const finding = () => [...document.querySelectorAll(".insight p:not(.head)")].map((p) => p.textContent).join(" ");
const whole = () => document.querySelector(".leaves:not([aria-busy])") !== null && document.querySelector(".leaf[aria-busy]") === null;

test("Firefox opens the file from the disk, follows a volume that is typed, opens a working, and asks for nothing", async () => {
  const { run, until, type, press, seen, close } = await openInFirefox(packed);
  try {
    await until(whole);
    assert.match(await run(() => document.title), /^Harbour sediment.* – Thimbleworth$/);
    assert.ok((await run(() => document.querySelectorAll("section.leaf").length)) >= 9);
    const before = await run(finding);
    assert.match(before, /In place of /);
    const bought = () => document.querySelector("[data-figure='0.0.mass.bought']").textContent;
    const figure = await run(bought);

    const held = await run(() => {
      const input = [...document.querySelectorAll("label")].find((label) => label.textContent.startsWith("Solvent in the flask")).control;
      input.closest("details").open = true;
      input.focus();
      return input.value;
    });
    assert.match(held, /mL/);
    await press(CONTROL, "a");
    await type("150 mL");
    assert.equal(await run(() => document.activeElement.value), "150 mL");
    const after = await until((before) => {
      const now = [...document.querySelectorAll(".insight p:not(.head)")].map((p) => p.textContent).join(" ");
      return now !== before && now;
    }, before);
    assert.match(after, /In place of /);
    await until(whole);
    assert.notEqual(await run(bought), figure);
    assert.match(await run(() => document.title), /^• /);

    await run(() => document.querySelector("[data-figure='0.0.mass.bought']").click());
    const working = await until(() => document.querySelector("dialog[open]")?.innerText);
    for (const wanted of ["Formula", "Source", "Behind it, largest first"]) assert.ok(working.includes(wanted), wanted);
    await type(ESCAPE);
    await until(() => document.querySelector("dialog[open]") === null);
    assert.ok(await run(() => document.querySelector("svg[role=img]") !== null || document.querySelector("svg") !== null));
    assert.deepEqual(seen, { requests: [], errors: [] });

    // Control: what goes wrong in the page or is asked for elsewhere is heard of.
    await run(() => fetch("http://127.0.0.1:9/").catch(() => {}).then(() => null));
    await until(() => new Promise((done) => setTimeout(() => done(true), 200)));
    assert.ok(seen.errors.length + seen.requests.length > 0, "a request that the policy stops is reported");
  } finally {
    await close();
  }
});
