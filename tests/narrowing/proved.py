"""Whether a shadow's multipliers prove its facets, by the checker that imports nothing from polywalk."""

from __future__ import annotations

from checker import implies, proves_empty

from polywalk.narrowing import Shadow


def every_facet_is_proved(found: Shadow) -> bool:
    """Whether every facet's multipliers add up, row by row of the big model, to exactly that facet."""
    model = found.whole.to_model()
    for name, value in found.held:
        model = model.with_rhs(name, value)
    rows = [(row.coefficients, row.sense, row.rhs) for row in model.constraints]
    return all(_proved(found, model, rows, facet) for facet in found.facets)


def _proved(found, model, rows, facet) -> bool:
    row = found.model.constraint(facet.constraint)
    target = [0] * model.n
    for name, value in zip(found.model.variables, row.coefficients, strict=True):
        target[model.index(name)] = value
    if row.is_constant:
        return proves_empty(rows, _weights(model, facet.multipliers, 1))
    halves = {"<=": [(1, facet.multipliers)], ">=": [(-1, facet.multipliers)]}
    halves["=="] = [(1, facet.multipliers), (-1, facet.backward)]
    return all(
        implies(rows, _weights(model, multipliers, sign), [sign * value for value in target], sign * row.rhs)
        for sign, multipliers in halves[row.sense]
    )


def _weights(model, multipliers, sign):
    named = dict(multipliers)
    assert set(named) <= {row.name for row in model.constraints}
    return [sign * named.get(row.name, 0) for row in model.constraints]
