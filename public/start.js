// Loads the program and reports how that went to boot.js.
import init from "./{{app.js}}";

init({ module_or_path: new URL("./{{app.wasm}}", import.meta.url) }).then(
  window.slackwaterStarted,
  window.slackwaterNotStarted,
);
