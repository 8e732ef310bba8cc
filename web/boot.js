// The last part of the page's one script; before it stand PAYLOAD (the program, gzip in base64) and `wasm_bindgen`.
// With a document it starts the page; without one (a test that computes) it only makes `account` ready.

function decode(base64) {
  const text = atob(base64);
  const bytes = new Uint8Array(text.length);
  for (let i = 0; i < text.length; i += 1) bytes[i] = text.charCodeAt(i);
  return bytes;
}

async function load() {
  if (typeof WebAssembly !== "object" || typeof DecompressionStream !== "function") {
    throw new Error("this browser lacks WebAssembly or DecompressionStream. A current browser has both");
  }
  const packed = new Blob([decode(PAYLOAD)]).stream();
  const program = new Response(packed.pipeThrough(new DecompressionStream("gzip")));
  wasm_bindgen.initSync({ module: await WebAssembly.compile(await program.arrayBuffer()) });
  return { account: wasm_bindgen.account };
}

function showFailure(error) {
  const place = document.getElementById("boot");
  place.textContent = `The page could not start: ${error && error.message ? error.message : error}.`;
  place.hidden = false;
  console.error(error);
}

const ready = load();
globalThis.thimbleworth = { ready };
if (typeof document !== "undefined") {
  ready.then(() => wasm_bindgen.start_page()).catch(showFailure);
}
