// Starts the program, and speaks when it can't start or has stopped. It is plain old script on purpose: it must run in
// browsers that lack what the program itself needs, and it must work when the wasm doesn't.
(function () {
  "use strict";

  // Every key the program stores under begins so.
  var STORED = "slackwater";
  var stopped = false;
  var here = document.currentScript.src;

  function say(sentence) {
    document.getElementById("first-state").textContent = sentence;
  }

  function element(name, text) {
    var made = document.createElement(name);
    if (text) made.textContent = text;
    return made;
  }

  // Why the program can't run here, as a sentence with what to do; nothing when it can.
  function obstacle() {
    if (!("noModule" in document.createElement("script"))) {
      return "This browser is too old for Slackwater: it can't load script modules. Use one of the last five years.";
    }
    if (typeof WebAssembly !== "object") {
      return (
        "WebAssembly is missing or switched off in this browser, and Slackwater computes with it. " +
        "Allow it for this page (a lockdown mode switches it off), or use another browser."
      );
    }
    if (!storageWorks()) {
      return (
        "This browser lets the page store nothing, so what you type would be lost. " +
        "Allow cookies and site data for this page, or leave the private window, and load it again."
      );
    }
    return "";
  }

  // Full storage still counts as working: what is kept there can be read, and the program says what it could not add.
  function storageWorks() {
    try {
      var shelf = window.localStorage;
      if (shelf.length > 0) return shelf.getItem(shelf.key(0)) !== null;
      shelf.setItem(STORED + "-probe", "1");
      shelf.removeItem(STORED + "-probe");
      return true;
    } catch (refused) {
      return false;
    }
  }

  // What is stored on this device and what stands in the page's fields, as text to copy.
  function everythingTyped() {
    var kept = { stored: {}, on_screen: [] };
    try {
      for (var i = 0; i < window.localStorage.length; i++) {
        var key = window.localStorage.key(i);
        if (key.indexOf(STORED) === 0) kept.stored[key] = window.localStorage.getItem(key);
      }
    } catch (refused) {
      kept.stored = "The browser refused to hand over what is stored: " + refused;
    }
    var fields = document.querySelectorAll("input, textarea, select, output, [role=spinbutton], [role=textbox]");
    for (var j = 0; j < fields.length; j++) {
      var field = fields[j];
      var value = field.value || field.getAttribute("aria-valuetext") || field.textContent;
      if (value) kept.on_screen.push({ field: nameOf(field), value: value });
    }
    return JSON.stringify(kept, null, 1);
  }

  function nameOf(field) {
    if (field.labels && field.labels[0]) return field.labels[0].textContent;
    return field.getAttribute("aria-label") || field.getAttribute("name") || field.id || "unnamed";
  }

  // Takes the program's view away, because figures that nothing works out any more still look alive, and puts in its
  // place why, and everything typed.
  function rescue(why, detail) {
    if (stopped) return;
    stopped = true;
    var text = everythingTyped();
    for (var i = 0; i < document.body.children.length; i++) {
      document.body.children[i].hidden = true;
      document.body.children[i].setAttribute("inert", "");
    }

    var panel = element("main");
    panel.id = "rescue";
    var heading = element("h1", "Slackwater has stopped");
    heading.tabIndex = -1;
    panel.appendChild(heading);
    var reason = element("p", why);
    reason.setAttribute("role", "alert");
    panel.appendChild(reason);
    panel.appendChild(element("p", "Look after the patient by what you can see and measure. Nothing here is being worked out."));

    var again = element("button", "Start again");
    again.type = "button";
    again.onclick = function () {
      location.reload();
    };
    panel.appendChild(again);

    var label = element("label", "What is stored, and what was on the screen. Nothing of it was removed. Copy it to keep it elsewhere.");
    var area = element("textarea");
    area.id = "rescue-text";
    area.readOnly = true;
    area.rows = 12;
    area.value = text;
    label.htmlFor = area.id;
    panel.appendChild(label);
    panel.appendChild(area);
    panel.appendChild(copyButton(area));
    if (detail) panel.appendChild(element("p", "For whoever mends it: " + detail));

    document.body.appendChild(panel);
    heading.focus();
  }

  function copyButton(area) {
    var copy = element("button", "Copy the text");
    copy.type = "button";
    copy.onclick = function () {
      area.focus();
      area.select();
      // The old command works without a permission and on pages without encryption, where the newer one is missing.
      var done = false;
      try {
        done = document.execCommand("copy");
      } catch (refused) {
        done = false;
      }
      copy.textContent = done ? "Copied" : "Selected: copy it with the browser's menu";
    };
    return copy;
  }

  function isPanic(error) {
    return typeof WebAssembly === "object" && error instanceof WebAssembly.RuntimeError;
  }

  function stoppedByError(error) {
    rescue("An error in the program stopped it.", String((error && error.message) || error));
  }

  // The program may call this from its panic hook, which knows the place; the traps below would only say "unreachable".
  window.slackwaterRescue = stoppedByError;

  window.slackwaterStarted = function () {
    var first = document.getElementById("first-paint");
    if (first && !stopped) first.parentNode.removeChild(first);
    if (window.performance && performance.mark) performance.mark("app-started");
  };

  window.slackwaterNotStarted = function (error) {
    if (isPanic(error)) stoppedByError(error);
    else {
      rescue(
        "The program did not arrive whole, or this browser refuses to run it. Check the signal and start again.",
        String((error && error.message) || error)
      );
    }
  };

  window.addEventListener("error", function (event) {
    if (isPanic(event.error)) stoppedByError(event.error);
  });
  window.addEventListener("unhandledrejection", function (event) {
    if (isPanic(event.reason)) stoppedByError(event.reason);
  });

  var sentence = obstacle();
  if (sentence) {
    say(sentence);
    return;
  }
  say("Starting.");
  setTimeout(function () {
    if (document.getElementById("first-state")) {
      say("Still loading. The line is slow or gone: once it is loaded whole, it starts without a signal.");
    }
  }, 10000);
  var start = element("script");
  start.type = "module";
  start.src = new URL("./{{start.js}}", here).href;
  start.onerror = function () {
    window.slackwaterNotStarted("the start script could not be fetched");
  };
  document.head.appendChild(start);
})();
