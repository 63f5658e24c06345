"""From a model to its region."""

from __future__ import annotations

from polywalk.budget import Budget
from polywalk.model import Model
from polywalk.region.generators import Generators, generators
from polywalk.region.parts import Ray, Vertex
from polywalk.region.results import Region, Status


def region(model: Model, budget: Budget | None = None) -> Region:
    """The region of all points that satisfy the model's constraints, exactly.

    Lower-dimensional, unbounded and empty regions, and regions with a line, are ordinary results. A constraint that
    only touches the region is active where it touches. Integer marks are not applied.

    Parameters
    ----------
    model : Model
        Any number of variables and constraints.
    budget : Budget, optional
        Time and memory for a large model, whose vertices are listed in a child process; given one, any model is.

    Returns
    -------
    Region

    Raises
    ------
    BudgetError
        The budget gave out before the vertices were listed.

    Examples
    --------
    >>> import polywalk as pw
    >>> from polywalk.model import Constraint
    >>> cap = Constraint("cap", (pw.exact(1),), "<=", pw.exact("3/2"))
    >>> half_line = pw.region(pw.Model(("x",), (cap,)))
    >>> half_line.status, half_line.vertices[0].point, half_line.rays[0].direction
    ('unbounded', (Fraction(3, 2),), (Fraction(-1, 1),))

    References
    ----------
    Motzkin, Raiffa, Thompson & Thrall, The double description method, Contributions to the Theory of Games II, 1953;
    Fukuda & Prodon, Double description method revisited, LNCS 1120, 1996 (by cddlib).
    """
    found = generators(model, budget)
    names = [row.name for row in model.constraints]
    active = [tuple([names[place] for place in places]) for places in found.active]
    count = len(found.points)
    corners = () if found.lines else found.points
    return Region(
        model=model,
        status=_status(found),
        vertices=tuple([Vertex(point, active[k], model) for k, point in enumerate(corners)]),
        rays=tuple([Ray(way, active[count + k], model) for k, way in enumerate(found.rays)]),
        lines=found.lines,
        base=found.points,
        _active=found.active,
    )


def _status(found: Generators) -> Status:
    if not found.points:
        return "empty"
    return "unbounded" if found.rays or found.lines else "bounded"
