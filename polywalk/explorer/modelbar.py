"""Undo, redo and reset of the model's edits; the model as Python text; the picture as a file."""

from __future__ import annotations

from dataclasses import replace

import ipywidgets as widgets

from polywalk.drawing import picture
from polywalk.errors import DrawingError
from polywalk.explorer.forms import Panel, button, column, row, text_box
from polywalk.reading.python_text import to_python


class ModelBar(Panel):
    """One row of buttons, and the text when it is asked for."""

    def build(self) -> None:
        message, state = self.message, self.state
        self.undo = button(message, "Undo", state.undo, "Undo the last edit of the model")
        self.redo = button(message, "Redo", state.redo, "Take back the last undo")
        self.reset = button(message, "Reset", state.reset, "The model as it was given")
        self.copy = button(message, "Python text", self._text, "The edited model as Python text, to copy")
        self.file = text_box(self.message, "File", "150px", value="region.svg")
        self.save = button(message, "Save picture", self._saved, "Save the picture as it is: .svg, .png or .pdf")
        self.text = widgets.Textarea(description="Model", disabled=False, rows=8, layout={"width": "auto"})
        self.text.layout.display = "none"
        buttons = row(self.message, self.undo, self.redo, self.reset, self.copy, self.save, self.file)
        self.box = column(self.message, buttons, self.text)

    def _text(self) -> None:
        hidden = self.text.layout.display == "none"
        self.text.layout.display = None if hidden else "none"
        self.show()

    def _saved(self) -> None:
        state = self.state
        if state.region is None:
            raise DrawingError("the vertices of this model are not listed yet, so there is no picture to save.")
        eye = None if state.camera is None else tuple(state.camera["eye"][axis] for axis in "xyz")
        view = replace(state.view, mode="light", camera=eye or state.view.camera)
        picture(state.region, self.file.value, view=view)
        self.message.note(f"The picture is saved as {self.file.value}.")

    def show(self) -> None:
        history = self.state.history
        self.undo.disabled, self.redo.disabled = not history.can_undo, not history.can_redo
        self.reset.disabled = history.now == history.first
        if self.text.layout.display != "none":
            self.text.value = f"import polywalk as pw\n\nmodel = {to_python(self.state.model)}\n"
