// The page's first script; before it stand UNPACKER, SIZES and LOAD (see web/pack/src/shell.rs). It unpacks the styles
// and the script that goes on from here (boot.js) at once, and the program a piece at a time.

// How many bytes of the program are unpacked at a time.
const PIECE = 262144;
// The first sign and how many there are.
const FIRST = 0x2100;
const SIGNS = 46341;

// 31 bits in two signs, lowest bits first; written by halves of a word, in a loop without calls: it runs before the browser
// has translated it.
function bytesOf([size, signs]) {
  const halves = new Uint16Array(signs.length);
  let held = 0;
  let bits = 0;
  let at = 0;
  for (let i = 0; i < signs.length; i += 2) {
    const value = (signs.charCodeAt(i) - FIRST) * SIGNS + signs.charCodeAt(i + 1) - FIRST;
    held |= (value & 0xffff) << bits;
    halves[at++] = held;
    held = (held >>> 16) | ((value >>> 16) << bits);
    bits += 15;
    if (bits > 15) {
      halves[at++] = held;
      held >>>= 16;
      bits -= 16;
    }
  }
  halves[at] = held;
  return new Uint8Array(halves.buffer, 0, size);
}

function unpack() {
  const [STYLES, SCRIPT, PROGRAM] = SIZES;
  const packed = bytesOf(LOAD);
  const from = 65536;
  const to = from + packed.length;
  const script = to + STYLES;
  const program = script + SCRIPT;
  const end = program + PROGRAM;
  const memory = new WebAssembly.Memory({ initial: Math.ceil(end / 65536) });
  new Uint8Array(memory.buffer, from).set(packed);
  const { exports } = new WebAssembly.Instance(new WebAssembly.Module(bytesOf(UNPACKER)), { "": { memory } });
  exports.begin(from, to);
  exports.unpack(program);
  const text = (at, size) => new TextDecoder().decode(new Uint8Array(memory.buffer, at, size));
  // A piece a turn, so that the browser compiles what is there while the next is unpacked.
  let at = program;
  const pull = (pieces) => {
    const next = Math.min(exports.unpack(Math.min(at + PIECE, end)), end);
    pieces.enqueue(new Uint8Array(memory.buffer, at, next - at));
    at = next;
    if (at === end) pieces.close();
  };
  const headers = { "content-type": "application/wasm" };
  return {
    styles: text(to, STYLES),
    script: text(script, SCRIPT),
    program: () => new Response(new ReadableStream({ pull }), { headers }),
  };
}

function showFailure(error) {
  const place = document.getElementById("boot");
  place.textContent = `The page could not start: ${error && error.message ? error.message : error}.`;
  place.hidden = false;
  console.error(error);
}

function add(name, text) {
  const element = document.createElement(name);
  element.textContent = text;
  document.head.append(element);
}

// With a document it starts the page; without one (a test that computes) it only makes the program ready.
function start() {
  if (typeof WebAssembly !== "object") {
    throw new Error("this browser lacks WebAssembly. A current browser has it");
  }
  const { styles, script, program } = unpack();
  globalThis.thimbleworth = { program, showFailure };
  if (typeof document === "undefined") {
    (0, eval)(script);
  } else {
    add("style", styles);
    add("script", script);
  }
}

try {
  start();
} catch (error) {
  if (typeof document === "undefined") throw error;
  showFailure(error);
}
