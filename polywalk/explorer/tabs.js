// Headings as a tab list: click, or arrow keys; the `shown` trait holds the number of the open one.

function render({ model, el }) {
  const list = document.createElement("div");
  list.className = "polywalk-tabs";
  list.setAttribute("role", "tablist");
  list.setAttribute("aria-label", model.get("label"));
  list.dataset.lmSuppressShortcuts = "true";
  el.append(list);

  const open = (place, focus) => {
    model.set("shown", place);
    model.save_changes();
    mark();
    if (focus) list.children[place].focus();
  };
  const mark = () => {
    [...list.children].forEach((tab, place) => {
      const here = place === model.get("shown");
      tab.setAttribute("aria-selected", String(here));
      tab.tabIndex = here ? 0 : -1;
    });
  };
  const fill = () => {
    const tabs = model.get("titles").map((title, place) => {
      const tab = list.children[place] ?? document.createElement("button");
      tab.type = "button";
      tab.setAttribute("role", "tab");
      tab.textContent = title;
      tab.onclick = () => open(place, true);
      return tab;
    });
    if (list.children.length !== tabs.length) list.replaceChildren(...tabs);
    mark();
  };
  const pressed = (event) => { // at the window, first of all: the page around keeps arrow keys from what is inside
    if (!list.contains(event.target)) return;
    const last = list.children.length - 1;
    const now = model.get("shown");
    const next = { ArrowRight: now + 1, ArrowLeft: now - 1, Home: 0, End: last }[event.key];
    if (next === undefined) return;
    event.preventDefault();
    event.stopPropagation();
    open((next + last + 1) % (last + 1), true);
  };
  window.addEventListener("keydown", pressed, true);

  fill();
  model.on("change:titles", fill);
  model.on("change:shown", mark);
  return () => {
    window.removeEventListener("keydown", pressed, true);
    model.off("change:titles", fill);
    model.off("change:shown", mark);
  };
}

export default { render };
