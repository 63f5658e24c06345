"""Which constraints make vertices degenerate: those that could go there without the point losing its place."""

from __future__ import annotations

from polywalk.region import Region
from polywalk.region.spans import rank


def crowding(region: Region) -> dict[str, tuple[int, ...]]:
    """For each constraint the numbers of the degenerate vertices that the others active there fix without it.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.reviewing.crowding import crowding
    >>> model = pw.from_algebra(maximize="x", bounds={"x": (0, 1), "y": (0, 1)},
    ...                         constraints={"both": "x + y <= 2", "x cap": "2*x <= 2"})
    >>> crowding(pw.region(model))
    {'both': (3,), 'x cap': (2, 3), 'x upper': (2, 3), 'y upper': (3,)}
    """
    found: dict[str, list[int]] = {}
    rows = {row.name: row.coefficients for row in region.model.constraints}
    for number, vertex in enumerate(region.vertices):
        if not vertex.degenerate:
            continue
        for name in vertex.active:
            if rank([rows[other] for other in vertex.active if other != name]) == region.model.n:
                found.setdefault(name, []).append(number)
    return {name: tuple(found[name]) for name in rows if name in found}
