"""A picture as plain data: polygons, lines, marks, labels and a key, in the coordinates of the axes.

No plotting library is known here. A role (and an index among its kind) says what a thing is; theme.py says how
that looks; the painters only translate.
"""

from __future__ import annotations

from dataclasses import dataclass

Point = tuple[float, ...]

PAPER: tuple[float, float] = (600.0, 460.0)
"""Width and height in pixels that a drawing is laid out for, unless another paper is asked for; painters scale it."""


@dataclass(frozen=True)
class Polygon:
    """A filled convex polygon; ``index`` picks the style among its role's kind, ``hover`` is plain text."""

    points: tuple[Point, ...]
    role: str
    index: int = 0
    name: str = ""
    hover: str = ""
    shade: float = 0.0  # 0 in full light, 1 turned away from it


@dataclass(frozen=True)
class Line:
    """Polylines of one style; ``arrow`` puts a head on each, at its end or at its middle."""

    parts: tuple[tuple[Point, ...], ...]
    role: str
    index: int = 0
    name: str = ""
    hover: str = ""
    arrow: str = ""  # "", "end" or "middle"


@dataclass(frozen=True)
class Mark:
    """A point that means something; ``key`` is the vertex index where it stands for a vertex."""

    point: Point
    role: str
    index: int = 0
    text: str = ""
    hover: str = ""
    key: int | None = None


@dataclass(frozen=True)
class Spot:
    """A place where a text may stand, in pixels of the paper: its centre, its turn, the point it is joined to."""

    centre: Point
    angle: float = 0.0
    foot: Point | None = None


@dataclass(frozen=True)
class Label:
    """Text centred on a point, moved by ``shift`` pixels (right, up), turned by ``angle`` degrees.

    A label with a ``target`` is joined to that point by a thin line; a number that counts a step knows the segment
    it lies ``along``; a tag is written as its ``longer`` text where there is room. While a scene is made, a label has
    the ``spots`` it may take, and a ``shorter`` text for where none has room for the whole.
    """

    text: str
    point: Point
    role: str
    index: int = 0
    shift: tuple[float, float] = (0.0, 0.0)
    angle: float = 0.0
    target: Point | None = None
    hover: str = ""
    along: tuple[Point, Point] | None = None
    longer: str = ""
    spots: tuple[Spot, ...] = ()
    shorter: str = ""

    @property
    def names_border(self) -> bool:
        """Whether it names a constraint; the line to its point ends in a dot of the constraint's colour."""
        return bool(self.longer) and self.role in {"name", "tag", "culprit"}


@dataclass(frozen=True)
class KeyRow:
    """One line of the key: a sample of the role's look (or none), a short name and what it means."""

    role: str
    text: str
    index: int = 0
    tag: str = ""


@dataclass(frozen=True)
class KeyPart:
    """A heading and its rows."""

    heading: str
    rows: tuple[KeyRow, ...]


@dataclass(frozen=True)
class Axis:
    """One axis: title (with unit) and the drawn interval; an axis without title is not shown.

    ``spacing`` is the distance of the numbers along it; 0 leaves it to the painter.
    """

    title: str
    low: float
    high: float
    spacing: float = 0.0


@dataclass(frozen=True)
class Scene:
    """A whole picture.

    ``axes`` has two or three entries (a single decision is drawn in the plane with a hidden second axis);
    ``scale`` holds the drawn length of a unit along each axis, so that both painters keep one aspect.
    """

    axes: tuple[Axis, ...]
    scale: tuple[float, ...]
    title: str
    subtitle: str
    polygons: tuple[Polygon, ...] = ()
    lines: tuple[Line, ...] = ()
    marks: tuple[Mark, ...] = ()
    labels: tuple[Label, ...] = ()
    key: tuple[KeyPart, ...] = ()
    camera: tuple[float, float, float] = (1.0, 1.0, 1.0)
    paper: Point = PAPER

    @property
    def solid(self) -> bool:
        """Whether it has three axes."""
        return len(self.axes) == 3


@dataclass(frozen=True)
class Layer:
    """What one part of the composition adds to a scene."""

    polygons: tuple[Polygon, ...] = ()
    lines: tuple[Line, ...] = ()
    marks: tuple[Mark, ...] = ()
    labels: tuple[Label, ...] = ()
