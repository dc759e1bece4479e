// Keeps one version of the program whole on the device. The build fills in the version and the list: every file with the
// digest of its bytes, the page itself last, so that a cache which holds "./" was once complete.

const VERSION = "{{version}}";
const LIST = {{list}};

// Caches belong to the origin, not to the path: other copies of this program, and other programs, may live beside it.
const SCOPE = new URL(self.registration.scope);
const PREFIX = `slackwater:${SCOPE.pathname}:`;
const NAME = PREFIX + VERSION;
const WAIT_BEFORE_MS = [0, 1000, 4000];

// A digest that doesn't fit and a redirect are both refused: a captive portal answers every request, with its own page.
async function fetchWhole(path, integrity, cache) {
  const response = await fetch(new Request(path, { integrity, cache, redirect: "error", credentials: "same-origin" }));
  if (!response.ok) throw new Error(`${path}: ${response.status}`);
  return response;
}

async function missing(cache) {
  const found = await Promise.all(LIST.map(([path]) => cache.match(path, { ignoreVary: true })));
  return LIST.filter((_, at) => !found[at]);
}

// Fetches what isn't kept yet. What one try got, the next needn't fetch again: it was checked against its digest.
async function fill() {
  const cache = await caches.open(NAME);
  for (const wait of WAIT_BEFORE_MS) {
    await new Promise((resolve) => setTimeout(resolve, wait));
    // The browser's own cache may serve the first try (the page just fetched the same files), never the later ones.
    const mode = wait === 0 ? "default" : "reload";
    const entries = await missing(cache);
    const page = entries.filter(([path]) => path === "./");
    const files = entries.filter(([path]) => path !== "./");
    const keep = async ([path, integrity]) =>
      cache.put(path, await fetchWhole(path, integrity, path === "./" ? "reload" : mode));
    const results = await Promise.allSettled(files.map(keep));
    if (results.every((result) => result.status === "fulfilled")) {
      const last = await Promise.allSettled(page.map(keep));
      if (last.every((result) => result.status === "fulfilled")) return [];
    }
  }
  return (await missing(cache)).map(([path]) => path);
}

async function install() {
  const lost = await fill();
  if (lost.length > 0) throw new Error(`could not be kept: ${lost.join(", ")}`);
}

// This version and the one before it stay: a page still open on that one may yet ask for one of its files.
async function tidy() {
  const others = (await caches.keys()).filter((name) => name.startsWith(PREFIX) && name !== NAME);
  const whole = [];
  for (const name of others) {
    if (await (await caches.open(name)).match("./", { ignoreVary: true })) whole.push(name);
  }
  const before = whole.at(-1);
  await Promise.all(others.filter((name) => name !== before).map((name) => caches.delete(name)));
}

// One page, whatever the query says; the rooms are behind the hash, which a worker never sees.
function isThePage(url) {
  return url.pathname === SCOPE.pathname || url.pathname === `${SCOPE.pathname}index.html`;
}

async function page(request) {
  const kept = await (await caches.open(NAME)).match("./", { ignoreVary: true });
  return kept ?? fetch(request);
}

// Addresses that are no page of ours: the network has the word, and without one the way leads to the page.
async function elsewhere(request) {
  try {
    return await fetch(request);
  } catch {
    return Response.redirect(SCOPE.href);
  }
}

// Page, glue and wasm come from one cache. The version before is only asked for names that carry their content's digest.
async function file(request) {
  const how = { ignoreVary: true, ignoreSearch: true };
  const kept = await (await caches.open(NAME)).match(request, how);
  if (kept) return kept;
  if (new URL(request.url).pathname.startsWith(`${SCOPE.pathname}assets/`)) {
    for (const name of await caches.keys()) {
      const older = name.startsWith(PREFIX) && (await (await caches.open(name)).match(request, how));
      if (older) return older;
    }
  }
  return fetch(request);
}

self.addEventListener("install", (event) => event.waitUntil(install()));

// Claiming is safe because the page doesn't reload when its worker changes, unless somebody asked for the new version.
self.addEventListener("activate", (event) => event.waitUntil(tidy().then(() => self.clients.claim())));

self.addEventListener("message", (event) => {
  if (event.data === "take over") self.skipWaiting();
  if (event.data === "what is missing?") {
    const [port] = event.ports;
    event.waitUntil(fill().then((lost) => port.postMessage(lost)));
  }
});

self.addEventListener("fetch", (event) => {
  const url = new URL(event.request.url);
  const ours = event.request.method === "GET" && url.origin === SCOPE.origin && url.pathname.startsWith(SCOPE.pathname);
  if (!ours) return;
  if (event.request.mode !== "navigate") event.respondWith(file(event.request));
  else event.respondWith(isThePage(url) ? page(event.request) : elsewhere(event.request));
});
