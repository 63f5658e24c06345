// A table whose rows can be selected by click and by keyboard; the `selected` trait holds the row's number or null.

function cell(tag, text, number) {
  const made = document.createElement(tag);
  made.textContent = text;
  if (number) made.className = "number";
  return made;
}

function render({ model, el }) {
  const scroll = document.createElement("div");
  const table = document.createElement("table");
  scroll.className = "polywalk-scroll";
  table.className = "polywalk-rows";
  table.setAttribute("role", "grid");
  scroll.dataset.lmSuppressShortcuts = "true"; // the arrow keys and letters belong to the table, not to JupyterLab
  scroll.append(table);
  el.append(scroll);
  const lines = () => [...table.tBodies[0].rows];

  const select = (place, focus) => {
    model.set("selected", place);
    model.save_changes();
    mark();
    if (focus) lines()[place]?.focus();
  };
  const mark = () => {
    const selected = model.get("selected");
    lines().forEach((line, place) => {
      line.setAttribute("aria-selected", String(place === selected));
      line.tabIndex = place === (selected ?? 0) ? 0 : -1;
    });
    const line = lines()[selected];
    if (!line) return;
    const head = table.tHead.offsetHeight;
    if (line.offsetTop - head < scroll.scrollTop) scroll.scrollTop = line.offsetTop - head;
    const below = line.offsetTop + line.offsetHeight - scroll.clientHeight;
    if (below > scroll.scrollTop) scroll.scrollTop = below;
  };
  const fill = () => {
    const focused = table.contains(document.activeElement);
    const numbers = model.get("numbers");
    const head = document.createElement("thead");
    const body = document.createElement("tbody");
    const titles = document.createElement("tr");
    model.get("columns").forEach((title, k) => {
      const made = cell("th", title, numbers.includes(k));
      made.scope = "col";
      titles.append(made);
    });
    head.append(titles);
    model.get("rows").forEach((row, place) => {
      const line = document.createElement("tr");
      row.forEach((text, k) => line.append(cell("td", text, numbers.includes(k))));
      line.addEventListener("click", () => select(place, true));
      body.append(line);
    });
    table.replaceChildren(head, body);
    table.setAttribute("aria-label", model.get("label"));
    mark();
    if (focused) lines()[model.get("selected") ?? 0]?.focus();
  };
  const pressed = (event) => { // at the window, first of all: the page around keeps arrow keys from what is inside
    if (!table.contains(event.target)) return;
    const last = lines().length - 1;
    const now = lines().indexOf(document.activeElement);
    const next = { ArrowDown: now + 1, ArrowUp: now - 1, Home: 0, End: last, Enter: now, " ": now }[event.key];
    if (next === undefined || now < 0) return;
    event.preventDefault();
    event.stopPropagation();
    select(Math.min(last, Math.max(0, next)), true);
  };
  window.addEventListener("keydown", pressed, true);

  fill();
  for (const name of ["columns", "rows", "numbers", "label"]) model.on(`change:${name}`, fill);
  model.on("change:selected", mark);
  return () => {
    window.removeEventListener("keydown", pressed, true);
    for (const name of ["columns", "rows", "numbers", "label"]) model.off(`change:${name}`, fill);
    model.off("change:selected", mark);
  };
}

export default { render };
