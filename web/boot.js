// The page's one script that is not packed; before it stand UNPACKER, SIZES and PAYLOAD (see web/pack/src/packing.rs).
// With a document it starts the page; without one (a test that computes) it only makes `account` ready.

// How many bytes of the program are unpacked at a time.
const PIECE = 262144;

// Seven bits a character, lowest first; one of two bytes has fourteen. See web/pack/src/packing.rs.
const APART = [0, 10, 13, 34, 60, 92];

function bytesOf([size, signs]) {
  const bytes = new Uint8Array(size);
  let held = 0;
  let bits = 0;
  let at = 0;
  for (let i = 0; i < signs.length; i += 1) {
    const sign = signs.charCodeAt(i);
    if (sign < 128) {
      held |= sign << bits;
      bits += 7;
    } else {
      held |= (APART[(sign - 160) >> 7] | (((sign - 160) & 127) << 7)) << bits;
      bits += 14;
    }
    while (bits >= 8) {
      bytes[at] = held;
      at += 1;
      held >>>= 8;
      bits -= 8;
    }
  }
  return bytes;
}

// The program and the script that goes with it. Unpacked a piece a turn, so that the browser compiles what is there while the
// next is unpacked.
async function unpacked() {
  const packed = bytesOf(PAYLOAD);
  const from = 65536;
  const to = from + packed.length;
  const [programSize, scriptSize] = SIZES;
  const programEnd = to + programSize;
  const memory = new WebAssembly.Memory({ initial: Math.ceil((programEnd + scriptSize) / 65536) });
  new Uint16Array(memory.buffer, 0, 7164).fill(1024);
  new Uint8Array(memory.buffer, from).set(packed);
  const { instance } = await WebAssembly.instantiate(bytesOf(UNPACKER), { "": { memory } });
  const { begin, unpack } = instance.exports;
  begin(from, to);
  let at = to;
  const pull = (pieces) => {
    const end = Math.min(unpack(Math.min(at + PIECE, programEnd)), programEnd);
    pieces.enqueue(new Uint8Array(memory.buffer, at, end - at));
    at = end;
    if (at === programEnd) pieces.close();
  };
  const headers = { "content-type": "application/wasm" };
  const module = await WebAssembly.compileStreaming(new Response(new ReadableStream({ pull }), { headers }));
  unpack(programEnd + scriptSize);
  return { module, script: new TextDecoder().decode(new Uint8Array(memory.buffer, programEnd, scriptSize)) };
}

// The policy of the page knows the hash of this script. Where there is no document, a test lends what runs it.
function run(text) {
  if (typeof document === "undefined") {
    globalThis.runScript(text);
    return;
  }
  const script = document.createElement("script");
  script.textContent = text;
  document.head.append(script);
}

async function load() {
  if (typeof WebAssembly !== "object") {
    throw new Error("this browser lacks WebAssembly. A current browser has it");
  }
  const { module, script } = await unpacked();
  run(script);
  const { program } = globalThis.thimbleworth;
  program.initSync({ module });
  return { account: program.account, start: program.start_page };
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
  ready.then(({ start }) => start()).catch(showFailure);
}
