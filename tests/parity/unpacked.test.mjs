// The page unpacks its program byte for byte as it was packed.
import { test } from "node:test";
import assert from "node:assert/strict";
import { readFileSync } from "node:fs";
import { dirname, join } from "node:path";
import { fileURLToPath } from "node:url";
import { unpacked } from "./shipped.mjs";

const dist = join(dirname(fileURLToPath(import.meta.url)), "../../web/dist");

test("what the page unpacks is the program that was packed", async () => {
  const expected = readFileSync(join(dist, "program.wasm"));
  const program = await unpacked(join(dist, "page.js"));
  assert.equal(program.length, expected.length);
  assert.equal(Buffer.compare(program, expected), 0);
});
