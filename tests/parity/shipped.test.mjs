// The program in the page is the program that the evidence runs, and answers with the same bytes as the command.
import { test } from "node:test";
import assert from "node:assert/strict";
import { execFileSync } from "node:child_process";
import { readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { load } from "./shipped.mjs";

const root = join(dirname(fileURLToPath(import.meta.url)), "../..");
const script = join(root, "web/dist/page.js");

/** What the command, built without or with optimisation, writes to the standard output. */
function command(profile, args, input = "") {
  const cargo = ["run", "-q", "--locked", ...profile, "-p", "thimbleworth-command", "--", ...args];
  const stdio = ["pipe", "pipe", "ignore"];
  return execFileSync("cargo", cargo, { cwd: root, input, stdio, encoding: "utf8", maxBuffer: 1 << 28 });
}

/** Every example plan by its key, as the command knows them. */
function examples() {
  const keys = command([], ["example"]).split("\n").filter((line) => /^\S+: /.test(line)).map((line) => line.split(":")[0]);
  assert.ok(keys.length > 0);
  return keys.map((key) => [key, command([], ["example", key])]);
}

test("the file to mail holds exactly the script that the evidence loads", () => {
  const mailed = readFileSync(join(root, "web/dist/thimbleworth.html"), "utf16le");
  const [load] = /(?<=<script type="text\/plain" id="load">)[^<]*/.exec(mailed);
  const whole = readFileSync(script, "utf8");
  assert.ok(load.length > 100_000 && whole.includes(`"${load}"`));
  const beside = whole.replace(`"${load}"`, 'document.getElementById("load").textContent');
  assert.ok(mailed.includes(`<script>${beside}</script>`));
});

test("the shipped program answers in Node, under the version of the workspace", async () => {
  const version = /^\[workspace\.package\]\nversion = "(.+)"$/m.exec(readFileSync(join(root, "Cargo.toml"), "utf8"))[1];
  const { account } = await load(script);
  const answer = JSON.parse(account("{}", "json"));
  assert.equal(answer.program, `Thimbleworth ${version}`);
  assert.equal(answer.problems[0].severity, "error");
  assert.match(account("{}", "pdf"), /^no format "pdf"; there are: json, compare, csv, odds, markdown$/);
});

for (const [name, profile] of [["debug", []], ["release", ["--release"]]]) {
  test(`every example plan gives the same bytes from the command (${name}) and from the page`, async () => {
    const { account } = await load(script);
    for (const [key, plan] of examples()) {
      for (const [format, args] of [
        ["json", ["account", "-", "--format", "json"]],
        ["csv", ["account", "-", "--format", "csv"]],
        ["markdown", ["account", "-", "--format", "markdown"]],
        ["compare", ["compare", "-", "--format", "json"]],
        ["odds", ["odds", "-", "--draws", "2000", "--format", "json"]],
      ]) {
        const written = command(profile, args, plan);
        assert.ok(written.length > 1000, `${key} ${format}: ${written.length} characters`);
        // Compared first as one text: a difference in megabytes would be printed whole.
        const shown = account(plan, format);
        if (shown !== written) {
          const at = [...written].findIndex((c, i) => c !== shown[i]);
          assert.fail(`${key} ${format} differs at ${at}: ${written.slice(at, at + 80)} / ${shown.slice(at, at + 80)}`);
        }
      }
    }
  });
}
