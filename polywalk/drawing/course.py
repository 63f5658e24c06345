"""The walks of a chart: what each is called, its spots, and what the picture says of them in words."""

from __future__ import annotations

from dataclasses import dataclass
from functools import cached_property

from polywalk.drawing.scene import KeyPart, KeyRow, Point
from polywalk.drawing.subject import coordinates, floats
from polywalk.errors import DrawingError
from polywalk.walks import Pivot, Walk


@dataclass(frozen=True)
class Course:
    """One walk as it is charted.

    Parameters
    ----------
    walk : Walk
    index : int
        Its place among the walks: the look of its line.
    name : str
        Its rule, with the leaving rule and the start where those tell the walks apart.
    """

    walk: Walk
    index: int
    name: str

    @property
    def pivots(self) -> tuple[Pivot, ...]:
        """The pivots that change the basis: all but a ray."""
        return tuple(pivot for pivot in self.walk.pivots if pivot.kind != "ray")

    @cached_property
    def spots(self) -> tuple[Point, ...]:
        """(pivot number, objective) at the start and after each pivot."""
        heights = [self.walk.first.objective, *(pivot.objective_after for pivot in self.pivots)]
        return tuple((float(number), *floats((height,))) for number, height in enumerate(heights))

    @property
    def outside(self) -> int:
        """The number of pivots outside the region: those of Phase I and of the dual method, which come first."""
        return sum(pivot.outside for pivot in self.pivots)

    @property
    def text(self) -> str:
        """What the walk came to, in a few words."""
        count = len(self.pivots)
        text = f"{self.name}: {count} {'pivot' if count == 1 else 'pivots'}"
        return text if self.walk.end == "optimal" else f"{text}, {self.walk.end}"

    @property
    def rises(self) -> bool:
        """Whether the objective improves upwards."""
        goal = self.walk.model.objective
        return goal is None or goal.goal == "max"


def courses_of(walks: list[Walk]) -> list[Course]:
    """The walks with what tells them apart; raises DrawingError where they do not go together."""
    wrong = [walk for walk in walks if not isinstance(walk, Walk)]
    if wrong or not walks:
        raise DrawingError(f"expected one walk or more to chart, got {wrong[0]!r}." if wrong else "no walk to chart.")
    if any(walk.model != walks[0].model for walk in walks):
        raise DrawingError("the walks are of different models, so that their objectives say nothing together.")
    return [Course(walk, index, name) for index, (walk, name) in enumerate(zip(walks, _names(walks), strict=True))]


def _names(walks: list[Walk]) -> list[str]:
    """The rules, with what else tells the walks apart."""
    names = [walk.rule for walk in walks]
    if len({walk.leaving for walk in walks}) > 1:
        names = [f"{name} with {walk.leaving}" for name, walk in zip(names, walks, strict=True)]
    if len({walk.start for walk in walks}) > 1:
        names = [f"{name} from {coordinates(walk.start)}" for name, walk in zip(names, walks, strict=True)]
    return names


def reading(courses: list[Course]) -> str:
    """The start, where all walks share it, and how to read the marks."""
    starts = {course.walk.start for course in courses}
    begun = f"from {coordinates(courses[0].walk.start)}; " if len(starts) == 1 else ""
    if any(course.walk.stays for course in courses):
        return f"{begun}flat pieces with hollow marks are stays: the basis changes, the point does not"
    inside = " inside the region" if any(course.outside for course in courses) else ""
    return f"{begun}no stay: every pivot{inside} moves"


def key(courses: list[Course]) -> tuple[KeyPart, ...]:
    rows = [KeyRow("moved", "after a pivot"), KeyRow("stayed", "after a stay: a degenerate pivot, no move")]
    if any(course.outside for course in courses):
        rows.append(KeyRow("phase 1", "outside the region (Phase I, dual method): the objective does not count yet"))
    if any(course.walk.end == "optimal" for course in courses):
        rows.append(KeyRow("level line", "the optimal objective"))
    if len({spot for course in courses for spot in course.spots}) < sum(len(course.spots) for course in courses):
        rows.append(KeyRow("note", "where walks pass the same point, they are drawn side by side"))
    walks = tuple(KeyRow("walk", _told(course), course.index) for course in courses)
    return (KeyPart("What the marks say", tuple(rows)), KeyPart("Walks", walks))


def _told(course: Course) -> str:
    walk, count = course.walk, len(course.pivots)
    phase = f", {course.outside} of them outside the region" if course.outside else ""
    stays = f"{walk.stays} {'stay' if walk.stays == 1 else 'stays'}" if walk.stays else "no stay"
    return f"{course.name}: {count} {'pivot' if count == 1 else 'pivots'}{phase}, {stays}, {walk.end}"
