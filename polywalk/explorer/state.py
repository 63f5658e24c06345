"""What the explorer shows, as traits that a notebook can read, observe and set. Nothing is computed here."""

from __future__ import annotations

from typing import Any

from traitlets import Any as AnyTrait
from traitlets import Bool, Dict, HasTraits, Instance, Int, Tuple, Unicode, observe, validate

from polywalk.drawing import View
from polywalk.drawing.view import Mode
from polywalk.errors import DrawingError, UnknownName, WalkError, unknown
from polywalk.model import Model
from polywalk.region import Region, region
from polywalk.walks import Walk, walk
from polywalk.walks.rules import ENTERING

LARGEST_PICTURE = 3
SETTABLE = ("rules", "start", "axes", "step", "vertex", "camera", "dark")
"""In this order, for another rule begins its walk anew and a step moves the selection along."""

RULES = tuple(rule.name for rule in ENTERING)


class State(HasTraits):
    """The explorer's state. A value that does not fit raises an error that says why, and changes nothing.

    Traits
    ------
    model : Model
    vertex : int or None
        Index of the selected vertex in ``region.vertices``.
    rules : tuple of str
        The pivot rules that are walked; the first is the one that is stepped through.
    start : None or whatever ``walk`` takes as its start
    step : int or None
        The first walk is shown up to this pivot (0: its start); None shows it whole.
    axes : tuple of str or None
        The variables that are drawn; None draws all of a model with at most three.
    camera : dict or None
        As in plotly's ``layout.scene.camera``; follows what the user does in the page.
    dark : bool
        Whether the page is dark.
    region, walks, refusal, picture : read only
        The model's region, its walks, why there is no walk ("" where there is), and the pair (region, view) that is
        drawn: one change of it for each change of the state, when all else has settled.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.explorer.state import State
    >>> square = pw.from_algebra(maximize="x + 2*y", bounds={"x": (0, 1), "y": (0, 1)})
    >>> state = State(model=square)
    >>> state.go(+1)
    >>> state.step, state.walks[0].pivots[0].entering
    (1, 'y')
    """

    model = Instance(Model)
    vertex = Int(None, allow_none=True)
    rules = Tuple(("dantzig",))
    start = AnyTrait(None, allow_none=True)
    step = Int(None, allow_none=True)
    axes = Tuple(default_value=None, allow_none=True)
    camera = Dict(default_value=None, allow_none=True)
    dark = Bool(False)
    region = Instance(Region, read_only=True)
    walks = Tuple(read_only=True)
    refusal = Unicode("", read_only=True)
    picture = Tuple(read_only=True)

    def __init__(self, model: Model, **traits: Any) -> None:
        super().__init__()
        for name in traits:
            if name not in SETTABLE:
                raise unknown("trait", name, SETTABLE, "the explorer")
        self.model = model
        for name in SETTABLE:
            if name in traits:
                setattr(self, name, traits[name])

    @validate("model")
    def _enumerated(self, proposal: Any) -> Model:
        self._next_region = region(proposal["value"])
        model: Model = proposal["value"]
        return model

    @validate("vertex")
    def _there(self, proposal: Any) -> int | None:
        index: int | None = proposal["value"]
        count = len(self.region.vertices)
        if index is not None and not 0 <= index < count:
            known = f"0 to {count - 1}" if count else "but the region has none"
            raise UnknownName(f"expected the index of a vertex, {known}, got {index}.", index)
        return index

    @validate("rules")
    def _known(self, proposal: Any) -> tuple[str, ...]:
        if not proposal["value"]:
            raise WalkError("expected at least one pivot rule, got none.", ())
        for rule in proposal["value"]:
            if rule not in RULES:
                raise unknown("pivot rule", rule, RULES, "the explorer")
        return tuple(proposal["value"])

    @validate("start")
    def _startable(self, proposal: Any) -> Any:
        start = proposal["value"]
        if start is not None:
            walk(self.model, rule=self.rules[0], start=start)
        return start

    @validate("step")
    def _within(self, proposal: Any) -> int | None:
        step: int | None = proposal["value"]
        if step is not None and not 0 <= step <= self.last:
            raise WalkError(f"expected a step from 0 to {self.last}, got {step}.", step)
        return step

    @validate("axes")
    def _drawable(self, proposal: Any) -> tuple[str, ...] | None:
        axes: tuple[str, ...] | None = proposal["value"]
        if axes is None:
            return _first_axes(self.model)
        if not 1 <= len(set(axes)) == len(axes) <= LARGEST_PICTURE:
            raise DrawingError(f"expected one to three different variables as axes, got {axes!r}.", axes)
        for name in axes:
            self.model.index(name)
        return axes

    @property
    def last(self) -> int:
        """The number of pivots of the walk that is stepped through."""
        return len(self.walks[0].pivots) if self.walks else 0

    def go(self, by: int) -> None:
        """Step on (+1) or back (-1) in the first walk; from the whole walk, on is its first pivot."""
        if self.step is None:
            self.step = min(1, self.last) if by > 0 else max(0, self.last - 1)
        else:
            self.step = min(self.last, max(0, self.step + by))

    def choose(self, by: int) -> None:
        """Select the next (+1) or previous (-1) vertex."""
        count = len(self.region.vertices)
        if count:
            self.vertex = 0 if self.vertex is None else (self.vertex + by) % count

    @property
    def view(self) -> View:
        """What is drawn of the region."""
        view: View = self.picture[1]
        return view

    @observe("model")
    def _replaced(self, change: Any) -> None:
        with self.hold_trait_notifications():
            kept = None if self.vertex is None else self.region.vertices[self.vertex].point
            self.set_trait("region", self._next_region)
            self.vertex = self._at(kept)
            if self.axes is None or not set(self.axes) <= set(self.model.variables):
                self.axes = _first_axes(self.model)  # type: ignore[assignment]
            self._walk()
        self._draw()

    @observe("rules", "start")
    def _walk_again(self, change: Any) -> None:
        with self.hold_trait_notifications():
            self._walk()
        self._draw()

    @observe("step")
    def _follow(self, change: Any) -> None:
        if self.step is not None and self.walks:
            self.vertex = self._at(self.walks[0].points[self.step])
        self._draw()

    @observe("vertex", "axes", "dark")
    def _look(self, change: Any) -> None:
        self._draw()

    def _walk(self) -> None:
        walks: tuple[Walk, ...] = ()
        refusal = ""
        try:
            walks = tuple(walk(self.model, rule=rule, start=self.start) for rule in self.rules)
        except WalkError as error:
            refusal = str(error)
        self.step = None
        self.set_trait("refusal", refusal)
        self.set_trait("walks", walks)

    def _draw(self) -> None:
        whole = self.axes is None or set(self.axes) == set(self.model.variables)
        vertex = self.vertex if whole else None
        mode: Mode = "dark" if self.dark else "light"
        view = View(axes=self.axes, vertex=vertex, walks=self.walks, step=self.step, mode=mode)
        self.set_trait("picture", (self.region, view))

    def _at(self, point: Any) -> int | None:
        found = [k for k, vertex in enumerate(self.region.vertices) if vertex.point == point]
        return found[0] if found else None


def _first_axes(model: Model) -> tuple[str, ...] | None:
    """The first variables where a model has more than a picture can show."""
    return None if model.n <= LARGEST_PICTURE else model.variables[:LARGEST_PICTURE]
