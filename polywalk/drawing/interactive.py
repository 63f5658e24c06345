"""The interactive painter: a Scene as a plotly figure, as plain dicts or as a Figure to style and export."""

from __future__ import annotations

from typing import TYPE_CHECKING, Any

from polywalk.drawing.compose import Source, scene
from polywalk.drawing.layout import layout
from polywalk.drawing.scene import Scene
from polywalk.drawing.theme import THEMES, Theme
from polywalk.drawing.traces import traces
from polywalk.drawing.view import View, viewed

if TYPE_CHECKING:
    import plotly.graph_objects as go


def draw(source: Source, view: View | None = None, **changes: Any) -> go.Figure:
    """Draw a region as an interactive plotly figure: constraints, vertices, optimum, walks.

    Parameters
    ----------
    source : Model, Region, Bases, Comparison, Walk or sequence of Walk, ValueFunction
        As for ``polywalk.drawing.scene``; a Region saves enumerating again.
    view : View, optional
    **changes
        Fields of View, for short: ``walks=[...]``, ``axes=("pump", "tank")``, ``mode="dark"``.

    Returns
    -------
    plotly.graph_objects.Figure
        Hover tells exact and rounded numbers; the legend switches constraints, faces and walks off and on.

    Raises
    ------
    DrawingError
        More than three axes, a value that does not fit, or a field that View does not have.
    UnknownName, DuplicateName
        An axis that is no variable, or given twice.
    BudgetError
        The vertices are too many to list.

    Examples
    --------
    >>> import polywalk as pw
    >>> model = pw.from_algebra(maximize="x", constraints={"both": "x + y <= 3"}, bounds={"x": (0, 2), "y": (0, 2)})
    >>> figure = pw.draw(model, walks=[pw.walk(model)])
    >>> figure.layout.title.text
    '<b>Feasible region</b>'

    References
    ----------
    Okabe & Ito, Color Universal Design, 2008 (the colours; the drawing is our own).
    """
    import plotly.graph_objects as go

    return go.Figure(figure(source, viewed(view, changes)))


def figure(source: Source, view: View | None = None) -> dict[str, Any]:
    """The same figure as plain dicts: ``data`` and ``layout``, ready for plotly.js.

    All vertices are one trace named "vertices", whose ``customdata`` holds their indices.
    """
    looked = view or View()
    return painted(scene(source, looked), THEMES[looked.mode])


def painted(drawn: Scene, theme: Theme) -> dict[str, Any]:
    """The dicts of a scene."""
    return {"data": traces(drawn, theme), "layout": layout(drawn, theme)}
