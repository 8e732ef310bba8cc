// A stock Firefox, driven over WebDriver BiDi: JSON messages on a web socket, which is read and written here, because Node 20
// has none of its own.
import assert from "node:assert/strict";
import { spawn } from "node:child_process";
import { randomBytes } from "node:crypto";
import { existsSync, mkdtempSync, rmSync, writeFileSync } from "node:fs";
import { connect } from "node:net";
import { tmpdir } from "node:os";
import { join } from "node:path";
import { pathToFileURL } from "node:url";

const executable = process.env.FIREFOX ?? "/usr/bin/firefox-esr";
assert.ok(existsSync(executable), `no Firefox at ${executable}: run \`apt-get install firefox-esr\`, or set FIREFOX`);

/** Nothing but the page may be asked for while a scenario runs. */
const SETTINGS = {
  "app.normandy.enabled": false,
  "app.update.auto": false,
  "browser.aboutwelcome.enabled": false,
  "browser.shell.checkDefaultBrowser": false,
  "datareporting.policy.dataSubmissionEnabled": false,
  "network.captive-portal-service.enabled": false,
  "network.connectivity-service.enabled": false,
  "toolkit.telemetry.enabled": false,
};

/** A text message as a client sends it (RFC 6455, section 5.2): final, masked. */
function framed(text) {
  const body = Buffer.from(text);
  const mask = randomBytes(4);
  const size = body.length < 126 ? [128 | body.length] : body.length < 65536 ? [254, body.length >> 8, body.length & 255]
    : [255, 0, 0, 0, 0, body.length >>> 24, (body.length >> 16) & 255, (body.length >> 8) & 255, body.length & 255];
  return Buffer.concat([Buffer.from([129, ...size]), mask, body.map((byte, i) => byte ^ mask[i % 4])]);
}

/** The whole messages at the start of `held`, and what is left. A message may come in several frames. */
function messages(held, begun) {
  const whole = [];
  for (;;) {
    if (held.length < 2) break;
    let size = held[1] & 127;
    let from = 2;
    if (size === 126) [size, from] = held.length < 4 ? [Infinity, 4] : [held.readUInt16BE(2), 4];
    else if (size === 127) [size, from] = held.length < 10 ? [Infinity, 10] : [Number(held.readBigUInt64BE(2)), 10];
    if (held.length < from + size) break;
    const [last, kind] = [held[0] & 128, held[0] & 15];
    if (kind < 8) begun.push(held.subarray(from, from + size));
    if (kind < 8 && last) whole.push(Buffer.concat(begun.splice(0)).toString());
    held = held.subarray(from + size);
  }
  return [whole, held];
}

/** Opens the socket: `ask(method, params)` answers with the result, `hear(event => ...)` hears every event. */
function socket(port, path) {
  return new Promise((opened, failed) => {
    const stream = connect(port, "127.0.0.1");
    const waiting = new Map();
    const hearers = [];
    const begun = [];
    let held = Buffer.alloc(0);
    let open = false;
    let count = 0;
    const ask = (method, params = {}) => new Promise((done, fail) => {
      count += 1;
      waiting.set(count, { done, fail, method });
      stream.write(framed(JSON.stringify({ id: count, method, params })));
    });
    stream.on("error", failed);
    stream.on("data", (data) => {
      held = Buffer.concat([held, data]);
      if (!open) {
        const end = held.indexOf("\r\n\r\n");
        if (end < 0) return;
        if (!held.toString("latin1", 0, end).startsWith("HTTP/1.1 101")) return failed(new Error(held.toString("latin1", 0, end)));
        held = held.subarray(end + 4);
        open = true;
        opened({ ask, hear: (hearer) => hearers.push(hearer), end: () => stream.destroy() });
      }
      let whole;
      [whole, held] = messages(held, begun);
      for (const message of whole.map((text) => JSON.parse(text))) {
        const asked = waiting.get(message.id);
        if (!asked) for (const hearer of hearers) hearer(message);
        else if (message.type === "error") asked.fail(new Error(`${asked.method}: ${message.error}: ${message.message}`));
        else asked.done(message.result);
      }
    });
    stream.write([
      `GET ${path} HTTP/1.1`, `Host: 127.0.0.1:${port}`, "Upgrade: websocket", "Connection: Upgrade",
      `Sec-WebSocket-Key: ${randomBytes(16).toString("base64")}`, "Sec-WebSocket-Version: 13", "", "",
    ].join("\r\n"));
  });
}

/** Starts Firefox with a profile of its own and opens `file`. */
export async function openInFirefox(file) {
  const profile = mkdtempSync(join(tmpdir(), "thimbleworth-firefox-"));
  writeFileSync(join(profile, "user.js"), Object.entries(SETTINGS).map(([key, value]) => `user_pref("${key}", ${value});\n`).join(""));
  const firefox = spawn(executable, ["--headless", "--no-remote", "--profile", profile, "--remote-debugging-port=0"], {
    stdio: ["ignore", "ignore", "pipe"],
    env: { ...process.env, HOME: profile },
  });
  const stopped = new Promise((done) => firefox.on("exit", done));
  let bidi;
  const close = async () => {
    bidi?.end();
    firefox.kill();
    await stopped;
    rmSync(profile, { recursive: true, force: true, maxRetries: 5, retryDelay: 200 });
  };
  try {
    const port = await new Promise((done, fail) => {
      let said = "";
      firefox.stderr.on("data", (data) => {
        said += data;
        const found = /WebDriver BiDi listening on ws:\/\/[^:]+:(\d+)/.exec(said);
        if (found) done(Number(found[1]));
      });
      stopped.then(() => fail(new Error(`Firefox ended: ${said.slice(-2000)}`)));
      setTimeout(() => fail(new Error(`Firefox offers no BiDi after a minute: ${said.slice(-2000)}`)), 60_000).unref();
    });
    bidi = await socket(port, "/session");
    const { capabilities } = await bidi.ask("session.new", { capabilities: {} });
    const seen = { requests: [], errors: [] };
    bidi.hear(({ method, params }) => {
      if (method === "network.beforeRequestSent" && !/^(file|data|blob|about):/.test(params.request.url)) seen.requests.push(params.request.url);
      if (method === "log.entryAdded" && params.level === "error") seen.errors.push(params.text);
    });
    const context = (await bidi.ask("browsingContext.getTree")).contexts[0].context;
    await bidi.ask("session.subscribe", { events: ["network.beforeRequestSent", "log.entryAdded"], contexts: [context] });
    await bidi.ask("browsingContext.setViewport", { context, viewport: { width: 1280, height: 900 } });
    await bidi.ask("browsingContext.navigate", { context, url: pathToFileURL(file).href, wait: "interactive" });

    /** What a function of the page answers; what it needs is given as plain values. */
    const run = async (what, ...given) => {
      const answer = await bidi.ask("script.evaluate", {
        expression: `(async () => JSON.stringify(await (${what})(...${JSON.stringify(given)})) ?? "null")()`,
        target: { context },
        awaitPromise: true,
        userActivation: true,
      });
      if (answer.type === "exception") throw new Error(answer.exceptionDetails.text);
      return JSON.parse(answer.result.value);
    };
    const until = async (what, ...given) => {
      const end = Date.now() + 20_000;
      for (;;) {
        const answer = await run(what, ...given);
        if (answer) return answer;
        assert.ok(Date.now() < end, `not within 20 s: ${what}`);
        await new Promise((done) => setTimeout(done, 50));
      }
    };
    /** Real keys, one after the other. */
    const type = (text) => bidi.ask("input.performActions", {
      context,
      actions: [{ type: "key", id: "keys", actions: [...text].flatMap((value) => [{ type: "keyDown", value }, { type: "keyUp", value }]) }],
    });
    const press = (down, value) => bidi.ask("input.performActions", {
      context,
      actions: [{ type: "key", id: "keys", actions: [
        { type: "keyDown", value: down }, { type: "keyDown", value }, { type: "keyUp", value }, { type: "keyUp", value: down },
      ] }],
    });
    return { run, until, type, press, seen, version: capabilities.browserVersion, close };
  } catch (error) {
    await close();
    throw error;
  }
}
