// Looks after the service worker and tells the page how it stands:
//   <html data-offline>  "working" | "ready" | "no" | "unsupported"   event "slackwater:offline" on document
//   <html data-update>   "ready" when a newer version waits            event "slackwater:update" on document
//   window.slackwaterUpdate()  changes to that version: only ever called because somebody pressed a button.
// "ready" is said only after the active worker found every entry of its list in its cache.

const RETRY_AFTER_S = [3, 10, 30, 60, 120];
const ANSWER_WITHIN_MS = 15_000;

let failures = 0;
let timer;
let busy = false;
let watched;

function tell(name, value) {
  const data = document.documentElement.dataset;
  if (data[name] === value) return;
  data[name] = value;
  document.dispatchEvent(new Event(`slackwater:${name}`));
}

async function attempt() {
  clearTimeout(timer);
  if (busy || document.documentElement.dataset.offline === "ready") return;
  busy = true;
  tell("offline", "working");
  try {
    const registration = await navigator.serviceWorker.register("./sw.js", { updateViaCache: "none" });
    watch(registration);
    const missing = await ask(await activeWorker(registration));
    if (missing.length > 0) throw new Error(`not kept yet: ${missing.join(", ")}`);
    failures = 0;
    tell("offline", "ready");
  } catch (error) {
    console.warn("Not ready for no signal:", error);
    if (error.name === "SecurityError" || error.name === "NotSupportedError") {
      tell("offline", "unsupported");
    } else {
      const wait = RETRY_AFTER_S[Math.min(failures, RETRY_AFTER_S.length - 1)];
      failures += 1;
      tell("offline", "no");
      timer = setTimeout(attempt, wait * 1000);
    }
  } finally {
    busy = false;
  }
}

// The first install can fail (one lost request is enough): then there is no active worker and never will be one of this try.
function activeWorker(registration) {
  if (registration.active) return registration.active;
  const worker = registration.installing ?? registration.waiting;
  return new Promise((resolve, reject) => {
    const look = () => {
      if (worker.state === "activating" || worker.state === "activated") resolve(worker);
      if (worker.state === "redundant") reject(new Error("the files could not all be fetched"));
    };
    worker.addEventListener("statechange", look);
    look();
  });
}

// Which entries of its list the worker could not find, nor fetch again.
function ask(worker) {
  return new Promise((resolve, reject) => {
    const channel = new MessageChannel();
    channel.port1.onmessage = (event) => resolve(event.data);
    setTimeout(() => reject(new Error("the worker did not answer")), ANSWER_WITHIN_MS);
    worker.postMessage("what is missing?", [channel.port2]);
  });
}

function watch(registration) {
  if (watched === registration) return;
  watched = registration;
  const look = () => {
    if (registration.waiting && registration.active) tell("update", "ready");
  };
  registration.addEventListener("updatefound", () => {
    registration.installing?.addEventListener("statechange", look);
  });
  look();
}

window.slackwaterUpdate = () => {
  if (!watched?.waiting) return;
  navigator.serviceWorker.addEventListener("controllerchange", () => location.reload(), { once: true });
  watched.waiting.postMessage("take over");
};

if ("serviceWorker" in navigator && "caches" in window) {
  // After the page's own files, so that the first answer doesn't share the line with the copy for later.
  if (document.readyState === "complete") attempt();
  else window.addEventListener("load", attempt, { once: true });
  window.addEventListener("online", attempt);
} else {
  tell("offline", "unsupported");
}
