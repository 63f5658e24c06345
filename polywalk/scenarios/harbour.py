"""Harbour Row, our own scenario: one hour of a small district-heat network, and the mistakes made in modelling it."""

from __future__ import annotations

from collections.abc import Callable
from dataclasses import replace

from polywalk.errors import unknown
from polywalk.model import Model
from polywalk.reading import from_algebra

EARNINGS = "50*(pump + chips + tank) - 27*pump - 32*chips - 18*tank"


def harbour_row(variant: str = "base") -> Model:
    """One hour at Harbour Row: which source should feed how much heat into the harbour main?

    A heat pump on sea water (``pump``), a wood-chip boiler (``chips``) and a hot-water tank charged last night
    (``tank``) feed one main to the town, all in MW of heat. The town takes whatever the main can carry at
    50 EUR/MWh; a MWh costs 27 EUR from the pump, 32 from chips and 18 from the tank. Maximized is what is earned,
    in EUR/h. The numbers are made up to be believable; no real plant stands behind them.

    - "harbour main": the pipe to the town carries 12 MW in all.
    - "grid connection": the pump gives 2.5 MW of heat per MW of power, and the grid allows it 2 MW of power.
    - "return temperature": the pump's water is hot enough up to 4 MW; beyond, the boiler tops it up MW for MW.
    - "reheating": the tank's water has cooled; beyond 2 MW the boiler must reheat it MW for MW.
    - "quay pipe": pump and tank share one pipe along the quay, of 8 MW.
    - "tank upper": the tank's valve lets 4 MW through. No source takes heat in, so each has a lower bound of 0.

    Parameters
    ----------
    variant : str, optional
        "base"
            Bounded, 13 vertices; best at (4, 4, 4) with 292 EUR/h. At (5, 1, 3), not the best, four constraints meet.
        "infeasible"
            The winter contract with the town, at least 14 MW, was pasted into a summer model whose main carries 12.
        "unbounded"
            The boiler's own rating never binds behind the main, so no one typed it; then an edit lost the row of
            the main, and selling heat from chips has no end.
        "flat"
            "harbour main" was typed with == where <= was meant: every plan must fill the pipe.
        "tied"
            The pump's price of 27 was copied into the chips' place: every plan from (4, 4, 4) to (0, 8, 4) is best.
        "degenerate"
            Boiler and tank got a circulation pump of 8 MW, which just reaches the best plan: four constraints meet
            at (4, 4, 4), so its shadow prices are not unique.
        "two decisions"
            The tank is set to 2 MW, which leaves pump and chips: a flat picture.

    Returns
    -------
    Model

    Raises
    ------
    UnknownName
        For another variant.

    Examples
    --------
    >>> from polywalk.scenarios import harbour_row
    >>> print(harbour_row())
    Harbour Row: maximize 23 pump + 18 chips + 32 tank
    constraint          rule                      origin
    harbour main        pump + chips + tank ≤ 12
    grid connection     0.4 pump ≤ 2
    return temperature  pump - chips ≤ 4
    reheating           -chips + tank ≤ 2
    quay pipe           pump + tank ≤ 8
    pump lower          pump ≥ 0                  bounds
    chips lower         chips ≥ 0                 bounds
    tank lower          tank ≥ 0                  bounds
    tank upper          tank ≤ 4                  bounds
    units: pump in MW, chips in MW, tank in MW

    References
    ----------
    Own model; no published source.
    """
    if variant not in VARIANTS:
        raise unknown("variant", variant, VARIANTS, "Harbour Row")
    model = VARIANTS[variant](_base())
    return model if variant == "base" else replace(model, name=f"Harbour Row, {variant}")


def _base() -> Model:
    return from_algebra(
        maximize=EARNINGS,
        constraints={
            "harbour main": "pump + chips + tank <= 12",
            "grid connection": "pump/2.5 <= 2",
            "return temperature": "pump <= 4 + chips",
            "reheating": "tank <= 2 + chips",
            "quay pipe": "pump + tank <= 8",
        },
        bounds={"pump": (0, None), "chips": (0, None), "tank": (0, 4)},
        units={"pump": "MW", "chips": "MW", "tank": "MW"},
        name="Harbour Row",
    )


def _infeasible(model: Model) -> Model:
    return model.with_constraint("town contract", {"pump": 1, "chips": 1, "tank": 1}, ">=", 14)


def _unbounded(model: Model) -> Model:
    return model.without("harbour main")


def _flat(model: Model) -> Model:
    rows = tuple(replace(row, sense="==") if row.name == "harbour main" else row for row in model.constraints)
    return replace(model, constraints=rows)


def _tied(model: Model) -> Model:
    return model.with_objective({"pump": 50 - 27, "chips": 50 - 27, "tank": 50 - 18}, "max")


def _degenerate(model: Model) -> Model:
    return model.with_constraint("circulation pump", {"chips": 1, "tank": 1}, "<=", 8)


def _two_decisions(_: Model) -> Model:
    return from_algebra(
        maximize=EARNINGS.replace("tank", "2"),
        constraints={
            "harbour main": "pump + chips + 2 <= 12",
            "grid connection": "pump/2.5 <= 2",
            "return temperature": "pump <= 4 + chips",
            "quay pipe": "pump + 2 <= 8",
        },
        bounds={"pump": (0, None), "chips": (0, None)},
        units={"pump": "MW", "chips": "MW"},
    )


VARIANTS: dict[str, Callable[[Model], Model]] = {
    "base": lambda model: model,
    "infeasible": _infeasible,
    "unbounded": _unbounded,
    "flat": _flat,
    "tied": _tied,
    "degenerate": _degenerate,
    "two decisions": _two_decisions,
}
"""The variants by name, each an edit of the base."""
