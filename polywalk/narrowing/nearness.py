"""Floats beside the hull: how near points lie to facets, measured by the shadow's own size."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from fractions import Fraction

import numpy as np
from numpy.typing import NDArray

from polywalk.narrowing.hull import Integers

Floats = NDArray[np.float64]


class Nearness:
    """The hull's points and facets in floats; a distance counts by the width of the points in its direction.

    Parameters
    ----------
    size : int
        How many columns are looked at.
    touch : float
        The distance, as a share of the width, below which a point lies on a facet.

    Examples
    --------
    >>> from polywalk.narrowing.nearness import Nearness
    >>> near = Nearness(2, 1e-9)
    >>> for point in [(1, 0, 0), (1, 4, 0), (1, 0, 4)]:
    ...     near.see(point)
    >>> near.hold((1, 1), 4), near.on_one_facet([1, 2]), near.on_one_facet([0, 1])
    (None, True, False)
    """

    def __init__(self, size: int, touch: float) -> None:
        self.touch = touch
        self._points: Floats = np.empty((0, size + 1))
        self._facets: Floats = np.empty((0, size + 1))
        self._widths: Floats | None = None

    def see(self, generator: Integers) -> None:
        """A point or ray more."""
        size = generator[0] or max(map(abs, generator))
        self._points = np.vstack([self._points, [value / size for value in generator]])
        self._widths = None

    def hold(self, direction: Integers, limit: Fraction) -> None:
        """A facet more, direction . x <= limit."""
        size = max(map(abs, direction))
        row = [float(limit / size), *(-value / size for value in direction)]
        self._facets = np.vstack([self._facets, row])

    def widths(self) -> Floats:
        """How wide the points lie in every column; 1 where they do not differ."""
        if self._widths is None:
            points = self._points[self._points[:, 0] > 0, 1:]
            spans: Floats = points.max(axis=0) - points.min(axis=0)
            self._widths = np.where(spans > 0, spans, 1.0)
        return self._widths

    def middle(self) -> Floats:
        """Half way between the least and the greatest value in every column."""
        points = self._points[self._points[:, 0] > 0, 1:]
        half: Floats = (points.max(axis=0) + points.min(axis=0)) / 2
        return half

    def share(self, direction: Integers, gap: Fraction) -> float:
        """A gap in a direction as a share of the width there; more than 0 where the gap is."""
        size = max(map(abs, direction))
        row = np.array([abs(value) / size for value in direction])
        return max(float(gap / size) / float((row * self.widths()).max()), 5e-324 if gap > 0 else 0.0)

    def on_one_facet(self, places: Sequence[int]) -> bool:
        """Whether all these generators lie on one of the facets held."""
        return bool(len(self._facets)) and bool(self._on(places).all(axis=0).any())

    def incidence(self) -> NDArray[np.bool_]:
        """Which generator (row) lies on which facet held (column)."""
        return self._on(range(len(self._points)))

    def _on(self, places: Iterable[int]) -> NDArray[np.bool_]:
        points = self._points[list(places)]
        slopes = np.abs(self._facets[:, 1:])
        scales = np.where(points[:, :1] > 0, (slopes * self.widths()).max(axis=1), slopes.max(axis=1))
        near: NDArray[np.bool_] = np.abs(points @ self._facets.T) <= self.touch * scales
        return near
