"""Harbour Row over many hours: the tank couples them. Built by a function, as sparse as it is large."""

from __future__ import annotations

from math import pi

import numpy as np
from numpy.typing import NDArray

from polywalk.bigmodel import BigModel
from polywalk.errors import ModelError

Floats = NDArray[np.float64]
Places = NDArray[np.int64]
Family = tuple[str, tuple[tuple[Places, Floats], ...], Floats, Floats]
"""Rows of one kind, one an hour: name, (columns, coefficients) of each term, lower and upper sides."""

DAY, YEAR = 24, 8_760
PARTS = ("pump", "chips", "tank", "level")
"""The decisions of an hour, in the order of the model's variables."""

VOLUME = 12.0
"""MWh of heat that the tank holds."""

LOSS = 0.01
"""Of the tank's heat, lost in an hour."""

CHIPS_PRICE = 32.0
"""EUR/MWh of heat from the boiler."""

TIMBER = 0.6
"""The share of the demand that chips may give over the whole time: the yard's contract."""


def harbour_day() -> BigModel:
    """Harbour Row over one winter day: `harbour_year` (24).

    Returns
    -------
    BigModel

    Examples
    --------
    >>> from polywalk.scenarios import harbour_day
    >>> print(harbour_day())
    Harbour Row, 24 hours: minimize 48 of 96 variables, 145 rows, 336 nonzeros
    part       count  of which
    variables  96     0 free, 72 with two bounds, 0 fixed, 0 integer
    rows       145    48 equalities, 0 with two sides, 0 without a side

    References
    ----------
    See `harbour_year`.
    """
    return harbour_year(DAY)


def harbour_year(hours: int = YEAR) -> BigModel:
    """Harbour Row over many hours, the first being midnight on 1 January: the cheapest way to meet the town's demand.

    For every hour t = 1, 2, ... there are ``pump[t]`` and ``chips[t]`` (heat in MW), ``tank[t]`` (heat out of the tank
    in MW, negative while it is charged) and ``level[t]`` (heat in the tank at the end of the hour, MWh). Minimized is
    the cost in EUR. The numbers are made up to be believable; no real plant stands behind them.

    - "demand[t]": pump, chips and tank together give what the town takes: about 2 to 11 MW, by season and hour.
    - "storage[t]": what was in the tank, less 1 % of it an hour and what is taken out, is what is in it at the end;
      before the first hour it holds what is in it after the last one.
    - "grid connection[t]": 2 MW of power at 2.5 MW of heat for each in July, 2.1 in January.
    - "return temperature[t]": the pump's water is hot enough up to 4 MW; beyond, the boiler tops it up MW for MW.
    - "reheating[t]": beyond 2 MW from the tank the boiler must reheat MW for MW.
    - "quay pipe[t]": pump and tank share a pipe of 8 MW.
    - "timber": over the whole time chips give at most 60 % of the demand.
    - Bounds: the boiler gives up to 8 MW, the tank's valve lets 4 MW through either way, the tank holds 12 MWh.

    A MWh of heat costs 32 EUR from chips; from the pump it costs what its power does (45 to 125 EUR/MWh by season, day
    of the week and hour), divided by the 2.1 to 2.5 MWh of heat that a MWh of power gives.

    Parameters
    ----------
    hours : int, optional
        At least 2; a year by default, 35,040 variables.

    Returns
    -------
    BigModel
        Feasible, with an optimum.

    Raises
    ------
    ModelError
        For fewer than two hours, or another kind of number.

    Examples
    --------
    >>> from polywalk.scenarios import harbour_year
    >>> year = harbour_year()
    >>> year.n, year.m, year.row("quay pipe[7]")
    (35040, 52561, {'pump[7]': 1.0, 'tank[7]': 1.0})

    References
    ----------
    Own model; no published source.
    """
    if isinstance(hours, bool) or not isinstance(hours, int) or hours < 2:
        raise ModelError(f"expected at least 2 whole hours, got {hours!r}.", hours)
    return _assembled(hours)


def _weather(hours: int) -> tuple[Floats, Floats, Floats]:
    """The town's demand (MW), the price of power (EUR/MWh), and the pump's MWh of heat for each of power, by hour."""
    hour = np.arange(hours)
    winter = (1 + np.cos(2 * pi * (hour / DAY - 15) / 365)) / 2  # 1 in mid-January, 0 in mid-July
    clock = hour % DAY
    morning, evening = np.exp(-(((clock - 7) / 2) ** 2)), np.exp(-(((clock - 19) / 2.5) ** 2))
    spell = np.sin(2 * pi * hour / (DAY * 9.5))  # weather comes and goes in about nine and a half days
    demand = 2.6 + 5 * winter + (0.6 + 1.2 * winter) * morning + (0.4 + 0.8 * winter) * evening
    demand += (0.3 + 0.7 * winter) * spell
    weekend = (hour // DAY) % 7 >= 5
    price = 60 + 20 * winter + 18 * morning + 28 * evening - 10 * weekend - 8 * spell
    heat_per_power = 2.5 - 0.4 * winter
    return np.round(demand, 2), np.round(price, 1), np.round(heat_per_power, 2)


def _assembled(hours: int) -> BigModel:
    demand, price, factor = _weather(hours)
    hour, one, inf = np.arange(hours), np.ones(hours), np.full(hours, np.inf)
    pump, chips, tank, level = (hour * len(PARTS) + place for place in range(len(PARTS)))
    before = np.roll(level, 1)  # the first hour follows the last one
    families = (
        ("demand", ((pump, one), (chips, one), (tank, one)), demand, demand),
        ("storage", ((tank, one), (level, one), (before, (LOSS - 1) * one)), 0 * one, 0 * one),
        ("grid connection", ((pump, np.round(1 / factor, 3)),), -inf, 2 * one),
        ("return temperature", ((pump, one), (chips, -one)), -inf, 4 * one),
        ("reheating", ((tank, one), (chips, -one)), -inf, 2 * one),
        ("quay pipe", ((pump, one), (tank, one)), -inf, 8 * one),
    )
    rows, columns, values = _cells(families, hours)
    order = np.lexsort((columns, rows))
    counts = np.bincount(rows, minlength=len(families) * hours)
    numbers = range(1, hours + 1)
    cost = np.stack([np.round(price / factor, 2), CHIPS_PRICE * one, 0 * one, 0 * one], axis=1).ravel()
    return BigModel(
        variables=tuple(f"{part}[{t}]" for t in numbers for part in PARTS),
        rows=(*(f"{family[0]}[{t}]" for t in numbers for family in families), "timber"),
        indptr=np.concatenate([[0], np.cumsum(counts), [len(values) + hours]]),
        indices=np.concatenate([columns[order], chips]),
        data=np.concatenate([values[order], one]),
        row_lower=np.append(np.stack([family[2] for family in families], axis=1).ravel(), -np.inf),
        row_upper=np.append(np.stack([family[3] for family in families], axis=1).ravel(), _timber(demand)),
        lower=np.tile([0.0, 0.0, -4.0, 0.0], hours),
        upper=np.tile([np.inf, 8.0, 4.0, VOLUME], hours),
        cost=cost,
        goal="min",
        units=tuple((f"{part}[{t}]", "MWh" if part == "level" else "MW") for t in numbers for part in PARTS),
        name=f"Harbour Row, {hours:,} hours",
    )


def _timber(demand: Floats) -> float:
    return round(TIMBER * float(demand.sum()), 1)


def _cells(families: tuple[Family, ...], hours: int) -> tuple[Places, Places, Floats]:
    """Row, column and value of every coefficient; the rows of an hour stand together."""
    parts = [
        (np.arange(hours) * len(families) + place, columns, values)
        for place, family in enumerate(families)
        for columns, values in family[1]
    ]
    rows, columns, values = (np.concatenate([part[k] for part in parts]) for k in range(3))
    return rows, columns, values
