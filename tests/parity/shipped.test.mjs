// The program in the page is the program that the evidence runs.
import { test } from "node:test";
import assert from "node:assert/strict";
import { readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { load } from "./shipped.mjs";

const root = join(dirname(fileURLToPath(import.meta.url)), "../..");
const script = join(root, "web/dist/page.js");

test("the file to mail holds exactly the script that the evidence loads", () => {
  const mailed = readFileSync(join(root, "web/dist/thimbleworth.html"), "utf8");
  assert.ok(mailed.includes(`<script>${readFileSync(script, "utf8")}</script>`));
});

test("the shipped program answers in Node, under the version of the workspace", async () => {
  const version = /^\[workspace\.package\]\nversion = "(.+)"$/m.exec(readFileSync(join(root, "Cargo.toml"), "utf8"))[1];
  const { account } = await load(script);
  const answer = JSON.parse(account("{}", "json"));
  assert.equal(answer.program, `Thimbleworth ${version}`);
  assert.equal(answer.plan, "JSON");
  assert.match(JSON.parse(account("{", "json")).plan, /^not JSON: .*line 1 column 1/);
});
