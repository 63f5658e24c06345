"use strict";
// Draws the pictures that can be turned; without it, or without WebGL, the still ones stay.
(() => {
  const canDraw = (figure) => {
    if (!figure.data.some((trace) => /3d$/.test(trace.type))) return true;
    const canvas = document.createElement("canvas");
    return Boolean(canvas.getContext("webgl2") || canvas.getContext("webgl"));
  };
  for (const place of document.querySelectorAll(".turnable")) {
    const figure = JSON.parse(document.getElementById(place.dataset.from).textContent);
    if (!window.Plotly || !canDraw(figure)) continue;
    place.closest("figure").classList.add("live");
    const options = { displaylogo: false, responsive: true };
    Plotly.newPlot(place, figure.data, figure.layout, options).then(() => { place.dataset.drawn = "yes"; });
  }
  const button = document.getElementById("copy");
  const source = document.getElementById("toml");
  if (button && source) {
    button.hidden = false;
    button.addEventListener("click", async () => {
      getSelection().selectAllChildren(source);
      try {
        await navigator.clipboard.writeText(source.textContent);
        button.textContent = "Copied";
      } catch {
        button.textContent = "Selected: press Ctrl+C to copy";
      }
    });
  }
})();
