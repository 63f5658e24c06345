// A native slider: the page keeps its own place while it is dragged, and tells Python the newest one only.

let serial = 0;

function render({ model, el }) {
  const id = `polywalk-dial-${(serial += 1)}-${Math.random().toString(36).slice(2)}`;
  const box = document.createElement("div");
  const label = document.createElement("label");
  const input = document.createElement("input");
  const marks = document.createElement("datalist");
  const told = document.createElement("output");
  box.className = "polywalk-dial";
  box.dataset.lmSuppressShortcuts = "true"; // the arrow keys belong to the slider
  label.htmlFor = input.id = id;
  told.htmlFor = id;
  marks.id = `${id}-marks`;
  input.setAttribute("list", marks.id);
  input.type = "range";
  input.min = 0;
  input.step = 1;
  box.append(label, input, told, marks);
  el.append(box);
  let held = false;

  const say = () => {
    const text = model.get("stops")[Number(input.value)] ?? "";
    told.textContent = text;
    input.setAttribute("aria-valuetext", text);
  };
  const show = () => {
    label.textContent = model.get("label");
    input.max = Math.max(0, model.get("stops").length - 1);
    input.disabled = model.get("stops").length < 2;
    marks.replaceChildren(
      ...model.get("marks").map((place) => {
        const option = document.createElement("option");
        option.value = place;
        option.label = model.get("stops")[place];
        return option;
      }),
    );
    if (!held) input.value = model.get("place");
    say();
  };
  const release = () => {
    if (!held) return;
    held = false;
    model.send({ kind: "released", place: Number(input.value) }); // a busy kernel may get it before the last place
  };
  const moved = () => {
    held = true;
    say();
    model.set("place", Number(input.value));
    model.save_changes(); // while the kernel works, only the newest state waits to be sent
  };
  input.addEventListener("input", moved);
  input.addEventListener("change", release);
  const pressed = (event) => { // at the window, first of all: the page around keeps arrow keys from what is inside
    if (event.target !== input) return;
    const steps = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1, PageUp: 10, PageDown: -10 };
    const by = { ...steps, Home: -Infinity, End: Infinity }[event.key];
    if (by === undefined || event.ctrlKey || event.altKey || event.metaKey) return;
    event.preventDefault();
    event.stopPropagation();
    input.value = Math.min(Number(input.max), Math.max(0, Number(input.value) + by));
    moved();
  };
  window.addEventListener("keydown", pressed, true);
  input.addEventListener("keyup", release);
  input.addEventListener("blur", release);

  show();
  const watched = ["label", "stops", "marks", "place"];
  for (const name of watched) model.on(`change:${name}`, show);
  return () => {
    window.removeEventListener("keydown", pressed, true);
    for (const name of watched) model.off(`change:${name}`, show);
  };
}

export default { render };
