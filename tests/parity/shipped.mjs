// The shipped page's own script, run in Node without a document: what a test computes with is what people open.
import { readFileSync } from "node:fs";
import { createContext, runInContext } from "node:vm";

/** Runs the script `file`, `web/dist/page.js`, with what `more` lends beside the usual; gives its global object. */
function run(file, more) {
  const context = createContext({ console, ReadableStream, Response, TextDecoder, TextEncoder, WebAssembly, ...more });
  runInContext(readFileSync(file, "utf8"), context, { filename: file });
  return context;
}

/** The script's exports, `{ account }`, once it is unpacked. */
export function load(file) {
  return run(file, {}).thimbleworth.ready;
}

/** The program that the script unpacks, which it hands to the browser's compiler. */
export function unpacked(file) {
  return new Promise((resolve, reject) => {
    const compileStreaming = (response) => {
      response.arrayBuffer().then((bytes) => resolve(Buffer.from(bytes)), reject);
      return new Promise(() => {});
    };
    const names = ["Instance", "Memory", "Module"].map((name) => [name, WebAssembly[name]]);
    run(file, { WebAssembly: { ...Object.fromEntries(names), compileStreaming } });
  });
}
