// Helpers that run inside the page. `what` names one, the rest are its arguments.
const [what, ...rest] = arguments;

const shown = (element) => {
  const box = element.getBoundingClientRect();
  const style = getComputedStyle(element);
  return box.width > 0 && box.height > 0 && style.visibility === "visible" && !element.closest("[inert]");
};

const tidy = (text) => text.replace(/\s+/g, " ").trim();

// Of the ways a control gets its name, those this project uses; text counts as it is rendered.
const nameOf = (element) => {
  const by = element.getAttribute("aria-labelledby");
  if (by) return tidy(by.split(" ").map((id) => document.getElementById(id)?.textContent ?? "").join(" "));
  return tidy(element.getAttribute("aria-label") ?? element.innerText);
};

const firstLine = (element) => tidy(element.innerText.split("\n")[0] ?? "");

const controls = () =>
  [...document.querySelectorAll("button, a[href], summary, label, input, select, [role=button], [role=tab], [role=link]")]
    .filter(shown);

const helpers = {
  // The control with exactly this name, or whose first line of text is this.
  control: (label) => {
    const all = controls().filter((control) => !control.disabled);
    return all.find((control) => nameOf(control) === label) ?? all.find((control) => firstLine(control) === label) ?? null;
  },
  // The first control whose name begins so.
  beginning: (label) =>
    controls().find((control) => !control.disabled && (nameOf(control).startsWith(label) || control.innerText.startsWith(label))) ?? null,
  controls: () => controls().map((control) => nameOf(control) + (control.disabled ? " (disabled)" : "")),
  // Whatever reaches beyond the right edge and isn't inside something that scrolls by itself.
  overflow: () => {
    const scrolls = (element) => {
      for (let up = element.parentElement; up && up !== document.body; up = up.parentElement) {
        if (["auto", "scroll", "hidden", "clip"].includes(getComputedStyle(up).overflowX)) return true;
      }
      return false;
    };
    const wide = [...document.body.querySelectorAll("*")]
      .filter((element) => shown(element) && !element.closest("svg svg, svg *") && !scrolls(element))
      .filter((element) => element.getBoundingClientRect().right > innerWidth + 0.5)
      .map((element) => `${element.tagName} ${element.className} ${Math.round(element.getBoundingClientRect().right)}`);
    const whole = document.documentElement.scrollWidth;
    return whole > innerWidth ? [`the page is ${whole} wide`, ...wide] : wide;
  },
};

return helpers[what](...rest);
