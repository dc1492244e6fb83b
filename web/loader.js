"use strict";
// Starts the program that stands, packed, in this same file: once for the
// page and once more in each worker for the computing. Nothing is fetched.

// The page keeps nothing. Whatever asks for the browser's storage, the
// framework included, gets a drawer without a bottom.
for (const name of ["localStorage", "sessionStorage"]) {
  const drawer = { length: 0, key: () => null, getItem: () => null, setItem() {}, removeItem() {}, clear() {} };
  Object.defineProperty(globalThis, name, { value: drawer });
}

// What the framework expects its own loader to have left here.
globalThis.goappNav = globalThis.goappOnUpdate = globalThis.goappOnAppInstallChange = () => {};
globalThis.goappGetenv = () => "";
globalThis.goappIsAppInstallable = globalThis.goappIsAppInstalled = () => false;
globalThis.goappKeepBodyClean = () => () => {};

// The policy lets no style attribute in. Where a place has to be computed, the
// program says it in data-at, and it becomes the custom property --at here.
const place = element => element.style?.setProperty("--at", element.dataset.at);
new MutationObserver(changes => {
  for (const { type, target, addedNodes } of changes) {
    if (type === "attributes") place(target);
    for (const node of addedNodes) {
      if (node.nodeType !== Node.ELEMENT_NODE) continue;
      if (node.dataset.at) place(node);
      node.querySelectorAll("[data-at]").forEach(place);
    }
  }
}).observe(document.body, { subtree: true, childList: true, attributeFilter: ["data-at"] });

// The slots of the sentence are no button elements, so what a browser does for
// those is done here: Enter and the space bar click. It has to be done before
// the key's own effect, which is sooner than the program hears of it.
document.addEventListener("keydown", event => {
  if (event.target.getAttribute?.("role") !== "button" || (event.key !== "Enter" && event.key !== " ")) return;
  event.preventDefault();
  if (!event.repeat) event.target.click();
});

const textOf = id => document.getElementById(id).textContent;

// The worker keeps what it is told until the program in it listens.
const inWorker = `
  const early = [];
  onmessage = async first => {
    onmessage = later => early.push(later);
    globalThis.tailgapEarly = early;
    let reason = "its program came to an end";
    try {
      const go = new Go();
      await go.run(await WebAssembly.instantiate(first.data, go.importObject));
    } catch (error) {
      reason = String(error);
    }
    postMessage({ text: JSON.stringify({ kind: "broken", error: reason }), parcels: [] });
  };`;

function unpack(text) {
  if (Uint8Array.fromBase64) return Uint8Array.fromBase64(text);
  const binary = atob(text), bytes = new Uint8Array(binary.length);
  for (let i = 0; i < bytes.length; i++) bytes[i] = binary.charCodeAt(i);
  return bytes;
}

async function compile() {
  const packed = new Blob([unpack(textOf("wasm"))]);
  document.getElementById("wasm").remove();
  const stream = packed.stream().pipeThrough(new DecompressionStream("gzip"));
  return WebAssembly.compileStreaming(new Response(stream, { headers: { "Content-Type": "application/wasm" } }));
}

async function start() {
  if (!globalThis.WebAssembly?.compileStreaming || !globalThis.DecompressionStream || !globalThis.Worker) {
    throw new Error("this browser is too old for this page, which needs WebAssembly and DecompressionStream; any current browser has both");
  }
  const program = await compile();
  const workerSource = URL.createObjectURL(new Blob([textOf("runtime"), inWorker], { type: "text/javascript" }));
  const spawn = () => {
    const worker = new Worker(workerSource);
    worker.postMessage(program);
    return worker;
  };
  // The first worker starts beside the page instead of after it.
  let ready = spawn();
  globalThis.tailgapWorker = () => {
    const worker = ready ?? spawn();
    ready = null;
    return worker;
  };
  const go = new Go();
  await go.run(await WebAssembly.instantiate(program, go.importObject));
}

function stop(sentence) {
  document.getElementById("start")?.remove();
  const says = document.createElement("p");
  says.className = "trouble";
  says.setAttribute("role", "alert");
  says.textContent = sentence;
  document.body.prepend(says);
}

start().then(
  () => stop("The page has stopped working, which is a fault of its own. Nothing was sent or stored. Reload it to start again."),
  error => stop("The page could not start: " + (error.message ?? error) + "."),
);
