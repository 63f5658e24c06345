// The figure: draws the `figure` trait with plotly.js, keeps the camera, and tells Python what was picked.
// plotly.js comes over once a page, asked for with a message and answered with a gzipped buffer.

const LIBRARY = Symbol.for("polywalk plotly.js");
const REACH = 12; // pixels from a vertex that still pick it
const STILL = 4; // pixels the mouse may move between press and release of a click
const PATIENCE = 120000; // milliseconds to wait for the kernel's answer

function library(model) {
  globalThis[LIBRARY] ??= ask(model).catch((error) => {
    delete globalThis[LIBRARY];
    throw error;
  });
  return globalThis[LIBRARY];
}

async function ask(model) {
  const packed = await new Promise((resolve, reject) => {
    const late = setTimeout(() => reject(new Error("the kernel did not send plotly.js; run the cell again")), PATIENCE);
    model.on("msg:custom", function answer(content, buffers) {
      if (content.kind !== "library") return;
      clearTimeout(late);
      model.off("msg:custom", answer);
      resolve(buffers[0]);
    });
    model.send({ kind: "library" });
  });
  const text = await new Response(new Blob([packed]).stream().pipeThrough(new DecompressionStream("gzip"))).text();
  const source = URL.createObjectURL(new Blob([text, "\nexport default globalThis.Plotly;"], { type: "text/javascript" }));
  try {
    return (await import(source)).default;
  } finally {
    URL.revokeObjectURL(source);
  }
}

function scenes(plot) {
  return Object.entries(plot._fullLayout ?? {}).filter(([, part]) => part?._scene?.glplot);
}

// The layout with the live camera and zoom: the stored camera lags behind while the scene is turned, and the wheel
// zooms an orthographic scene by its aspect ratio. `given` holds the ratios before any zoom.
function asSeen(plot, layout, given) {
  const kept = { ...layout };
  const same = plot._fullLayout?.uirevision === layout.uirevision;
  for (const [name, part] of scenes(plot)) {
    if (!same || !kept[name]) continue;
    const scene = { ...kept[name], camera: part._scene.getCamera() };
    const zoom = part._scene.glplot.getAspectratio().x / given[name];
    const ratio = Object.entries(scene.aspectratio ?? {}).map(([axis, length]) => [axis, length * zoom]);
    if (zoom > 0 && ratio.length) scene.aspectratio = Object.fromEntries(ratio);
    kept[name] = scene;
  }
  for (const [name, part] of Object.entries(layout)) given[name] = part?.aspectratio?.x;
  return kept;
}

function times(matrix, [x, y, z, w]) {
  return [0, 1, 2, 3].map((k) => matrix[k] * x + matrix[4 + k] * y + matrix[8 + k] * z + matrix[12 + k] * w);
}

// Where a trace's points are on the page: [x, y, depth] in client pixels.
function places(plot, trace) {
  const full = plot._fullLayout;
  if (trace.type === "scatter3d") {
    const scene = full[trace.scene ?? "scene"]._scene;
    const { model, view, projection } = scene.glplot.cameraParams;
    const box = scene.glplot.canvas.getBoundingClientRect();
    return trace.x.map((_, k) => {
      const point = ["x", "y", "z"].map((axis, j) => trace[axis][k] * scene.dataScale[j]);
      const [x, y, z, w] = times(projection, times(view, times(model, [...point, 1])));
      return [box.left + (0.5 + (0.5 * x) / w) * box.width, box.top + (0.5 - (0.5 * y) / w) * box.height, z / w];
    });
  }
  const box = plot.getBoundingClientRect();
  const [xaxis, yaxis] = [full.xaxis, full.yaxis];
  return trace.x.map((x, k) => [
    box.left + xaxis._offset + xaxis.d2p(x),
    box.top + yaxis._offset + yaxis.d2p(trace.y[k]),
    0,
  ]);
}

// The vertex under the pointer: the nearest within reach, the one in front where two are equally near.
function vertexAt(plot, x, y) {
  let best = null;
  for (const trace of plot.data ?? []) {
    if (trace.name !== "vertices") continue;
    places(plot, trace).forEach(([left, top, depth], k) => {
      const far = Math.hypot(left - x, top - y);
      if (far > REACH) return;
      const score = far + 2 * depth;
      if (!best || score < best.score) best = { score, vertex: [trace.customdata[k]].flat()[0] };
    });
  }
  return best?.vertex ?? null;
}

function isDark() {
  return document.body.dataset.jpThemeLight === "false";
}

function render({ model, el }) {
  const plot = document.createElement("div");
  const note = document.createElement("p");
  plot.className = "polywalk-figure";
  plot.tabIndex = 0;
  plot.dataset.lmSuppressShortcuts = "true"; // or JupyterLab takes a key pressed here for one of its own: x cuts the cell
  plot.setAttribute("role", "application");
  note.className = "polywalk-note";
  note.textContent = "Loading the picture…";
  el.append(note, plot);

  const ended = new AbortController();
  const until = { signal: ended.signal, capture: true };
  const given = {};
  let Plotly = null;
  let pressed = null;
  let waiting = false;
  let turn = Promise.resolve();

  const show = () => {
    waiting = pressed !== null || !Plotly;
    if (waiting || ended.signal.aborted) return;
    turn = turn.then(draw).catch((error) => {
      note.hidden = false;
      note.textContent = `The picture could not be drawn: ${error.message}`;
    });
  };
  const draw = async () => {
    if (pressed !== null) {
      waiting = true;
      return;
    }
    const figure = model.get("figure");
    if (!figure.data || ended.signal.aborted) return;
    const config = { displaylogo: false, responsive: false, scrollZoom: true };
    await Plotly.react(plot, figure.data, asSeen(plot, figure.layout, given), config);
    note.hidden = true;
    plot.dataset.drawn = Number(plot.dataset.drawn ?? 0) + 1;
  };
  const label = () => plot.setAttribute("aria-label", model.get("label"));
  const theme = () => model.send({ kind: "theme", dark: isDark() });

  plot.addEventListener("pointerdown", (event) => {
    if (event.button !== 0 || event.target.closest(".modebar, .legend")) return;
    plot.focus({ preventScroll: true });
    pressed = { x: event.clientX, y: event.clientY, vertex: vertexAt(plot, event.clientX, event.clientY) };
  }, until);
  for (const kind of ["pointerup", "pointercancel"]) {
    window.addEventListener(kind, (event) => {
      if (pressed === null) return;
      const { x, y, vertex } = pressed;
      pressed = null;
      const still = Math.hypot(event.clientX - x, event.clientY - y) < STILL;
      if (kind === "pointerup" && still && vertex !== null) model.send({ kind: "pick", vertex });
      if (!still) report();
      if (waiting) show();
    }, until);
  }
  plot.addEventListener("wheel", (event) => { // the page scrolls past a picture that nobody is working in
    if (!plot.contains(document.activeElement)) event.stopPropagation();
  }, until);
  const report = () => requestAnimationFrame(() => {
    for (const [, part] of scenes(plot)) model.send({ kind: "camera", camera: part._scene.getCamera() });
  });
  window.addEventListener("keydown", (event) => { // at the window: the page around keeps arrow keys from what is inside
    if (!plot.contains(event.target)) return;
    const known = ["ArrowLeft", "ArrowRight", "ArrowUp", "ArrowDown", "Home", "End"];
    if (!known.includes(event.key) || event.ctrlKey || event.altKey || event.metaKey) return;
    event.preventDefault();
    event.stopPropagation();
    model.send({ kind: "key", key: event.key });
  }, until);

  const fit = new ResizeObserver(([entry]) => {
    const width = entry.contentRect.width;
    if (!width) return;
    plot.style.height = `${Math.round(Math.min(640, Math.max(420, 0.84 * width)))}px`;
    requestAnimationFrame(() => {
      if (Plotly && plot._fullLayout && !ended.signal.aborted && plot.offsetParent) Plotly.Plots.resize(plot);
    });
  });
  fit.observe(el);
  const themes = new MutationObserver(theme);
  themes.observe(document.body, { attributes: true, attributeFilter: ["data-jp-theme-light"] });
  const aim = (content) => {
    if (content.kind === "aim" && Plotly && scenes(plot).length) Plotly.relayout(plot, { "scene.camera": content.camera });
  };
  model.on("change:figure", show);
  model.on("change:label", label);
  model.on("msg:custom", aim);

  label();
  theme();
  library(model).then(
    (loaded) => {
      Plotly = loaded;
      show();
    },
    (error) => {
      note.textContent = `plotly.js could not be loaded: ${error.message}`;
    },
  );

  return () => {
    ended.abort();
    fit.disconnect();
    themes.disconnect();
    model.off("change:figure", show);
    model.off("change:label", label);
    model.off("msg:custom", aim);
    if (Plotly) Plotly.purge(plot);
  };
}

export default { render };
