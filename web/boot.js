// What the program asks of the browser, packed with it and unpacked by start.js; before it stands `wasm_bindgen`.
// With a document it starts the page; without one (a test that computes) it only makes `account` ready.
// The functions below are called by the program, through src/browser.rs.

const LARGEST_FILE = 8 * 1024 * 1024;
const LARGEST_LOG = 64e6;
let kept = null;
let hear = null;

function keepPlan(name, text) {
  kept = { name, text };
}

// The program has stopped, so nothing of it may be called here.
function showStopped() {
  const notice = document.getElementById("stopped");
  if (!notice || !notice.hidden) return;
  if (kept) {
    const button = document.createElement("button");
    button.type = "button";
    button.textContent = "Save the plan as it was last seen";
    button.addEventListener("click", () => download(kept.name, kept.text, "application/json"));
    notice.append(" ", button);
  }
  notice.hidden = false;
  notice.scrollIntoView();
}

async function read(file) {
  const fits = file.size <= LARGEST_FILE;
  hear(file.name, file.size, fits ? new Uint8Array(await file.arrayBuffer()) : new Uint8Array());
}

// Every file of a field: its name and its bytes, none of a file that is too large or cannot be read.
async function readFiles(input, callback) {
  const files = [...input.files];
  input.value = "";
  for (const file of files) {
    const bytes = file.size <= LARGEST_LOG ? await file.arrayBuffer().catch(() => null) : null;
    callback(file.name, bytes ? new Uint8Array(bytes) : undefined);
  }
}

function watchFiles(callback) {
  hear = callback;
  const carries = (event) => event.dataTransfer && [...event.dataTransfer.types].includes("Files");
  document.addEventListener("dragover", (event) => {
    if (!carries(event)) return;
    event.preventDefault();
    document.body.classList.add("dropping");
  });
  document.addEventListener("dragleave", (event) => {
    if (!event.relatedTarget) document.body.classList.remove("dropping");
  });
  document.addEventListener("drop", (event) => {
    if (!carries(event)) return;
    event.preventDefault();
    document.body.classList.remove("dropping");
    if (event.dataTransfer.files[0]) read(event.dataTransfer.files[0]);
  });
}

function chooseFile() {
  const input = document.createElement("input");
  input.type = "file";
  input.accept = ".json,application/json";
  input.hidden = true;
  input.addEventListener("change", () => {
    if (input.files[0]) read(input.files[0]);
    input.remove();
  });
  document.body.append(input);
  input.click();
}

function download(name, text, type) {
  const url = URL.createObjectURL(new Blob([text], { type }));
  const link = document.createElement("a");
  link.href = url;
  link.download = name;
  link.hidden = true;
  document.body.append(link);
  link.click();
  link.remove();
  setTimeout(() => URL.revokeObjectURL(url), 60000);
}

async function saveFile(name, text, type, callback) {
  if (typeof showSaveFilePicker === "function") {
    try {
      const handle = await showSaveFilePicker({ suggestedName: name });
      const stream = await handle.createWritable();
      await stream.write(text);
      await stream.close();
      callback(handle.name);
      return;
    } catch (error) {
      if (error && error.name === "AbortError") {
        callback(undefined);
        return;
      }
    }
  }
  download(name, text, type);
  callback(name);
}

// A cell that a spreadsheet would take for a formula is marked as text.
function cellText(cell) {
  if (cell.dataset.value !== undefined) return cell.dataset.value;
  const text = cell.innerText.replace(/\s+/g, " ").trim();
  return /^[=+\-@\t\r]/.test(text) ? `'${text}` : text;
}

async function copyTable(id, callback) {
  try {
    const rows = [...document.getElementById(id).rows];
    const text = rows.map((row) => [...row.cells].map(cellText).join("\t")).join("\n");
    await navigator.clipboard.writeText(text);
    callback("");
  } catch (error) {
    callback(String((error && error.message) || error));
  }
}

// Prints the labels and nothing else.
function printLabels() {
  const { classList } = document.documentElement;
  addEventListener("afterprint", () => classList.remove("labels-only"), { once: true });
  classList.add("labels-only");
  print();
}

function askBeforeLeaving(event) {
  event.preventDefault();
  event.returnValue = "";
}

function guardLeaving(unsaved) {
  const change = unsaved ? "addEventListener" : "removeEventListener";
  window[change]("beforeunload", askBeforeLeaving);
}

function storeGet(key) {
  try {
    return localStorage.getItem(key) ?? undefined;
  } catch {
    return undefined;
  }
}

function storePut(key, text) {
  try {
    if (text === undefined) localStorage.removeItem(key);
    else localStorage.setItem(key, text);
    return "";
  } catch (error) {
    return String((error && error.message) || error || "no storage");
  }
}

function focusOn(id) {
  let path = id;
  let place = document.getElementById(path);
  while (!place && path) {
    path = path.slice(0, Math.max(path.lastIndexOf("."), path.lastIndexOf("["), 0));
    place = document.getElementById(path);
  }
  if (!place) return;
  const field = place.matches("input, select, textarea") ? place : place.querySelector("input, select, textarea");
  const target = field || (place.hasAttribute("tabindex") ? place : place.querySelector("button") || place);
  for (let fold = target.closest("details:not([open])"); fold; fold = fold.parentElement.closest("details:not([open])")) {
    fold.open = true;
  }
  target.focus();
}

async function load() {
  wasm_bindgen.initSync({ module: await WebAssembly.compileStreaming(globalThis.thimbleworth.program()) });
  return { account: wasm_bindgen.account };
}

const ready = load();
const { showFailure } = globalThis.thimbleworth;
globalThis.thimbleworth = { ready };
if (typeof document !== "undefined") {
  ready.then(() => wasm_bindgen.start_page()).catch(showFailure);
}
