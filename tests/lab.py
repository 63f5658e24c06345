"""What the browser tests ask of a page with JupyterLab. Everything waits for states, nothing for times."""

from __future__ import annotations

from pathlib import Path
from typing import Any

import nbformat

PATIENCE = 60_000

READY = """async () => {
  for (let k = 0; !window.jupyterapp?.shell?.currentWidget?.sessionContext; k++)
    await new Promise((done) => setTimeout(done, 100));
  const panel = window.jupyterapp.shell.currentWidget;
  await panel.context.ready;
  await panel.sessionContext.ready;
  await panel.sessionContext.session.kernel.info;
}"""

LIGHT = """async () => {
  await window.jupyterapp.commands.execute('apputils:change-theme', { theme: 'JupyterLab Light' });
  if (window.innerWidth < 600) window.jupyterapp.shell.collapseLeft?.();
}"""

DARK = "() => window.jupyterapp.commands.execute('apputils:change-theme', { theme: 'JupyterLab Dark' })"

RUN = "() => window.jupyterapp.commands.execute('notebook:run-all-cells')"

ASK = """async (code) => {
  const kernel = window.jupyterapp.shell.currentWidget.sessionContext.session.kernel;
  const future = kernel.requestExecute({ code, store_history: false });
  let text = "";
  future.onIOPub = ({ header, content }) => {
    if (header.msg_type === "stream") text += content.text;
    if (header.msg_type === "error") text += "ERROR " + content.evalue;
  };
  await future.done;
  return text.trim();
}"""

END = """async () => {
  const panel = window.jupyterapp?.shell?.currentWidget;
  if (panel?.sessionContext) await panel.sessionContext.shutdown();
}"""

DRAWN = """(k) => {
  const plot = document.querySelectorAll('.polywalk-figure')[k];
  const full = plot?._fullLayout;
  return Boolean(full && plot.dataset.drawn && (!full.scene || full.scene._scene?.glplot));
}"""

# Where the vertices are, in client pixels: the formulas of plotly.js's own projection, written out once more.
PIXELS = """(k) => {
  const plot = document.querySelectorAll('.polywalk-figure')[k];
  const trace = plot.data.find((one) => one.name === 'vertices');
  const full = plot._fullLayout;
  if (!full.scene) {
    const box = plot.getBoundingClientRect();
    return trace.x.map((x, i) => [
      trace.customdata[i][0] ?? trace.customdata[i],
      box.left + full.xaxis._offset + full.xaxis.d2p(x), box.top + full.yaxis._offset + full.yaxis.d2p(trace.y[i])]);
  }
  const scene = full.scene._scene, p = scene.glplot.cameraParams;
  const box = scene.glplot.canvas.getBoundingClientRect();
  const by = (m, v) => [0, 1, 2, 3].map((r) => m[r] * v[0] + m[4 + r] * v[1] + m[8 + r] * v[2] + m[12 + r] * v[3]);
  return trace.x.map((x, i) => {
    const at = [x, trace.y[i], trace.z[i]].map((value, j) => value * scene.dataScale[j]);
    const [X, Y, , W] = by(p.projection, by(p.view, by(p.model, [...at, 1])));
    return [trace.customdata[i][0] ?? trace.customdata[i],
      box.left + (0.5 + 0.5 * X / W) * box.width, box.top + (0.5 - 0.5 * Y / W) * box.height];
  });
}"""

CAMERA = "(k) => document.querySelectorAll('.polywalk-figure')[k]._fullLayout.scene._scene.getCamera().eye"
ZOOM = "(k) => document.querySelectorAll('.polywalk-figure')[k]._fullLayout.scene._scene.glplot.getAspectratio().x"
DRAWINGS = "(k) => Number(document.querySelectorAll('.polywalk-figure')[k].dataset.drawn ?? 0)"


class Lab:
    """One notebook in one page."""

    def __init__(self, page: Any, address: str, root: Path, shots: Path, name: str) -> None:
        self.page, self.address, self.root, self.shots, self.name = page, address, root, shots, name
        self.errors: list[str] = []
        page.set_default_timeout(PATIENCE)
        page.on("pageerror", lambda error: self.errors.append(f"{error}\n{error.stack}"))

    def open(self, *cells: str, where: str = "lab/tree") -> None:
        """Write a notebook with these cells, open it (in JupyterLab, or under "notebooks" in Notebook 7) and run it."""
        book = nbformat.v4.new_notebook(cells=[nbformat.v4.new_code_cell(cell) for cell in cells])
        book.metadata["kernelspec"] = {"name": "python3", "display_name": "Python 3", "language": "python"}
        nbformat.write(book, self.root / f"{self.name}.ipynb")
        self.page.goto(f"{self.address}/{where}/{self.name}.ipynb?reset")
        self.page.evaluate(READY)
        self.page.evaluate(LIGHT)
        self.page.evaluate(RUN)

    def drawn(self, which: int = 0) -> None:
        """Wait until that figure is on the page."""
        self.page.wait_for_function(DRAWN, arg=which)
        self.frames()

    def frames(self) -> None:
        """Wait for two frames of animation."""
        self.page.evaluate("() => new Promise((d) => requestAnimationFrame(() => requestAnimationFrame(d)))")

    def redrawn(self, since: int, which: int = 0) -> None:
        """Wait until that figure was drawn again."""
        self.page.wait_for_function(f"([k, n]) => ({DRAWINGS})(k) > n", arg=[which, since])

    def drawings(self, which: int = 0) -> int:
        """How often that figure was drawn."""
        return int(self.page.evaluate(DRAWINGS, which))

    def ask(self, code: str) -> str:
        """What the kernel prints."""
        return str(self.page.evaluate(ASK, code))

    def until(self, code: str, answer: str) -> None:
        """Ask the kernel until it prints the answer."""
        for _ in range(200):
            said = self.ask(code)
            if said == answer:
                return
            self.page.wait_for_timeout(50)
        raise AssertionError(f"{code} printed {said!r}, expected {answer!r}")

    def vertices(self, which: int = 0) -> dict[int, tuple[float, float]]:
        """The vertices' places on the page."""
        self.page.locator(".polywalk-figure").nth(which).scroll_into_view_if_needed()
        return {int(index): (x, y) for index, x, y in self.page.evaluate(PIXELS, which)}

    def camera(self, which: int = 0) -> tuple[float, ...]:
        """Where the eye is."""
        eye = self.page.evaluate(CAMERA, which)
        return tuple(eye[axis] for axis in "xyz")

    def zoom(self, which: int = 0) -> float:
        """How large the scene is drawn."""
        return float(self.page.evaluate(ZOOM, which))

    def dark(self) -> None:
        """The dark theme."""
        self.page.evaluate(DARK)
        self.until("print(explorer.state.dark)", "True")

    def panel(self, title: str) -> None:
        """Open a panel of the explorer."""
        tab = self.page.locator(".polywalk-tabs").first.get_by_role("tab", name=title)
        tab.click()
        self.page.wait_for_function("(tab) => tab.ariaSelected === 'true'", arg=tab.element_handle())

    def verdict(self) -> str:
        """The line on top of the explorer."""
        return str(self.page.locator(".polywalk-verdict").first.inner_text())

    def shoot(self, what: str) -> None:
        """Keep a screenshot."""
        self.page.screenshot(path=self.shots / f"{self.name}-{what}.png")

    def close(self) -> None:
        """End the notebook's kernel."""
        self.page.evaluate(END)


def apart(places: dict[int, tuple[float, float]], pixels: float = 26) -> dict[int, tuple[float, float]]:
    """The places that are farther than this from every other one."""
    return {
        index: (x, y)
        for index, (x, y) in places.items()
        if all(abs(x - u) + abs(y - v) > pixels for other, (u, v) in places.items() if other != index)
    }
