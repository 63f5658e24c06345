"""Seeing a solid on paper: the direction to the eye, and the parallel projection along it."""

from __future__ import annotations

from collections.abc import Sequence
from dataclasses import dataclass
from itertools import combinations, pairwise
from math import cos, hypot, radians, sin

from polywalk.drawing.scene import Point
from polywalk.drawing.shape import Shape
from polywalk.drawing.space import cross, inner
from polywalk.errors import DrawingError

Eye = tuple[float, float, float]

TURNS = tuple(side + turn for side in (-90, 0, 90, 180) for turn in (62, 52, 38, 28))
"""Angles about the vertical axis, in degrees, among which a picture chooses; 45 would hide a cube's corners."""

TILTS = (16, 24, 32)
"""Angles above the horizontal, in degrees."""

FOREIGN = 0.55
"""Worth of a view that does not have both horizontal axes running to the right, as people expect them."""

MOST_CORNERS = 24
"""Past this many corners the choice would cost more than the picture; the usual view is taken."""


def eye(turn: float, tilt: float) -> Eye:
    """The direction to the eye from its two angles in degrees."""
    flat = cos(radians(tilt))
    return (flat * cos(radians(turn)), flat * sin(radians(turn)), sin(radians(tilt)))


USUAL = eye(-55, 24)
"""The view where nothing speaks for another one."""

STEEP = 1e-9
"""Below this horizontal share the eye is straight above: rounding would choose which way is right."""


ISOMETRIC = (1.0, -1.0, 1.0)
"""The direction from which all three axes are seen equally long, the first two running to the right."""

ALONG = ((1.0, 0.0, 0.0), (0.0, -1.0, 0.0), (0.0, 0.0, 1.0))
"""The directions along each axis, chosen so that the axes seen run to the right and up."""


def named_eye(camera: Eye | str | None, axes: Sequence[str]) -> Eye | None:
    """The direction of a camera: three numbers as they are, "isometric", or "along" and the name of an axis.

    Raises
    ------
    DrawingError
        Another name, or no direction.
    """
    if camera is None:
        return None
    if not isinstance(camera, str):
        if len(camera) != 3 or not any(camera):
            raise DrawingError(f"expected a camera of three numbers that are not all 0, got {camera!r}.", camera)
        return camera
    known = {"isometric": ISOMETRIC} | {f"along {name}": way for name, way in zip(axes, ALONG, strict=False)}
    if camera not in known:
        raise DrawingError(f"expected the camera {', '.join(known)} or three numbers, got {camera!r}.", camera)
    return known[camera]


@dataclass(frozen=True)
class Camera:
    """A parallel projection: scaled coordinates to right, up and towards the eye."""

    toward: Eye
    scale: Point

    @property
    def frame(self) -> tuple[Point, Point, Point]:
        """The unit vectors to the right, up, and towards the eye."""
        size = hypot(*self.toward)
        toward = tuple(value / size for value in self.toward)
        flat = hypot(toward[0], toward[1])
        right = (-toward[1] / flat, toward[0] / flat, 0.0) if flat > STEEP else (1.0, 0.0, 0.0)
        return right, cross(toward, right), toward

    def scaled(self, point: Sequence[float]) -> Point:
        """A point in drawn lengths."""
        return tuple(value * unit for value, unit in zip(point, self.scale, strict=True))

    def see(self, point: Sequence[float]) -> Point:
        """Right, up and depth (towards the eye) of a point."""
        return tuple(inner(self.scaled(point), way) for way in self.frame)


def best_eye(shape: Shape, away: Sequence[Point], scale: Point, planes: Sequence[tuple[Point, ...]] = ()) -> Eye:
    """The direction from which the region looks large, no corner hides another, and open sides turn away.

    Parameters
    ----------
    shape : Shape
        What is drawn.
    away : sequence of (3,) tuple of float
        Directions in which the region has no end; seen from there it would look closed.
    scale : (3,) tuple of float
        Drawn length of a unit along each axis.
    planes : sequence of tuple of (3,) tuple of float
        Polygons that should not be seen from their edge.
    """
    edges = shape.edges + shape.open_edges
    if len(scale) < 3 or len(shape.corners) > MOST_CORNERS or not edges:
        return USUAL

    def quality(way: tuple[int, int]) -> float:
        camera = Camera(eye(*way), scale)
        lit = all(inner(camera.scaled(ray), camera.toward) <= 0 for ray in away)
        usual = 1.0 if -90 < way[0] < 0 else FOREIGN
        open_planes = min([1.0, *(_openness(plane, camera) for plane in planes)])
        return round(_gap(shape, camera) * _area(shape, camera) * (1.0 if lit else 0.4) * usual * open_planes, 6)

    return eye(*max(((turn, tilt) for turn in TURNS for tilt in TILTS), key=quality))


def _openness(plane: tuple[Point, ...], camera: Camera) -> float:
    """From 0 for a plane seen from its edge to 1 for one that faces the eye."""
    first, *rest = (camera.scaled(point) for point in plane)
    arms = [tuple(x - y for x, y in zip(point, first, strict=True)) for point in rest]
    normal = max((cross(a, b) for a, b in pairwise(arms)), key=lambda vector: inner(vector, vector))
    return abs(inner(normal, camera.frame[2])) / (hypot(*normal) or 1.0)


def _gap(shape: Shape, camera: Camera) -> float:
    """The least distance on paper between a corner and another corner or an edge it does not belong to."""
    flat = {corner: camera.see(corner)[:2] for corner in shape.corners}
    edges = [(flat[a], flat[b], a, b) for a, b in shape.edges + shape.open_edges]
    gaps = [hypot(p[0] - q[0], p[1] - q[1]) for p, q in combinations(flat.values(), 2)]
    for corner, seen in flat.items():
        gaps += [2 * _distance(seen, p, q) for p, q, a, b in edges if corner not in (a, b)]
    return min(gaps)


def _area(shape: Shape, camera: Camera) -> float:
    """How large the region looks: the area of the convex hull of its corners on paper (Andrew's chain, 1979)."""
    seen = sorted({camera.see(corner)[:2] for corner in shape.corners})
    chains: list[list[Point]] = []
    for points in (seen, seen[::-1]):
        chain: list[Point] = []
        for point in points:
            while len(chain) > 1 and _turn(chain[-2], chain[-1], point) <= 0:
                chain.pop()
            chain.append(point)
        chains.append(chain[:-1])
    hull = chains[0] + chains[1]
    return sum(a[0] * b[1] - a[1] * b[0] for a, b in zip(hull, hull[1:] + hull[:1], strict=True)) / 2


def _turn(start: Point, middle: Point, end: Point) -> float:
    return (middle[0] - start[0]) * (end[1] - start[1]) - (middle[1] - start[1]) * (end[0] - start[0])


def _distance(point: Point, start: Point, end: Point) -> float:
    """From a point to a segment, in the plane."""
    along = (end[0] - start[0], end[1] - start[1])
    arm = (point[0] - start[0], point[1] - start[1])
    share = (arm[0] * along[0] + arm[1] * along[1]) / (along[0] ** 2 + along[1] ** 2 or 1.0)
    share = min(max(share, 0.0), 1.0)
    return hypot(arm[0] - share * along[0], arm[1] - share * along[1])
