// The shipped page's own script, run in Node without a document: what a test computes with is what people open.
import { readFileSync } from "node:fs";
import { createContext, runInContext } from "node:vm";

/** The script's exports, `{ account }`, once it is unpacked. `file` is `web/dist/page.js`. */
export function load(file) {
  const lent = { console, ReadableStream, Response, TextDecoder, TextEncoder, WebAssembly };
  const context = createContext(lent);
  runInContext(readFileSync(file, "utf8"), context, { filename: file });
  return context.thimbleworth.ready;
}
