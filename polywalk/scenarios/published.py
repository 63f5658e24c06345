"""Published models on which a pivot rule circles for ever, by their usual names."""

from __future__ import annotations

from typing import Literal

from polywalk.model import Model
from polywalk.reading import from_algebra


def beale() -> Model:
    """Four variables, three rows: Dantzig's rule with lowest-index ties circles through six bases for ever.

    Optimum -1/20 at (1/25, 0, 1, 0).

    Returns
    -------
    Model

    Examples
    --------
    >>> from polywalk.scenarios import beale
    >>> beale().n
    4

    References
    ----------
    Beale, Cycling in the dual simplex algorithm, Naval Research Logistics Quarterly 2 (1955), 269-275
    (coefficients from memory).
    """
    return _four_variables(
        "Beale",
        "min",
        "-3/4*x1 + 150*x2 - 1/50*x3 + 6*x4",
        ("x1/4 - 60*x2 - x3/25 + 9*x4 <= 0", "x1/2 - 90*x2 - x3/50 + 3*x4 <= 0", "x3 <= 1"),
    )


def chvatal() -> Model:
    """Four variables, three rows: Dantzig's rule with lowest-index ties circles through six bases. Optimum 1.

    Returns
    -------
    Model

    Examples
    --------
    >>> from polywalk.scenarios import chvatal
    >>> chvatal().objective.goal
    'max'

    References
    ----------
    Chvátal, Linear Programming, Freeman 1983, chapter 3 (coefficients from memory).
    """
    return _four_variables(
        "Chvátal",
        "max",
        "10*x1 - 57*x2 - 9*x3 - 24*x4",
        ("0.5*x1 - 5.5*x2 - 2.5*x3 + 9*x4 <= 0", "0.5*x1 - 1.5*x2 - 0.5*x3 + x4 <= 0", "x1 <= 1"),
    )


def kuhn() -> Model:
    """Four variables, three rows: Dantzig's rule circles when leaving ties go to the first row. Optimum -2.

    Returns
    -------
    Model

    Examples
    --------
    >>> from polywalk.scenarios import kuhn
    >>> kuhn().n
    4

    References
    ----------
    Balinski & Tucker, Duality theory of linear programs, SIAM Review 11 (1969), 347-377, who credit Kuhn
    (coefficients from memory).
    """
    return _four_variables(
        "Kuhn",
        "min",
        "-2*x1 - 3*x2 + x3 + 12*x4",
        (
            "-2*x1 - 9*x2 + x3 + 9*x4 <= 0",
            "x1/3 + x2 - x3/3 - 2*x4 <= 0",
            "2*x1 + 3*x2 - x3 - 12*x4 <= 2",
        ),
    )


def circling() -> Model:
    """Three decisions, so it can be drawn: Dantzig's rule circles through six bases without leaving the origin.

    Optimum 2 at (2, 1, 0); the region has 5 vertices and 5 facets. Found by search, starting from Marshall &
    Suurballe; no published source. With two decisions no rule of ties can circle (their theorem).

    Returns
    -------
    Model

    Examples
    --------
    >>> from polywalk.scenarios import circling
    >>> circling().variables
    ('x', 'y', 'z')

    References
    ----------
    Marshall & Suurballe, A note on cycling in the simplex method, Naval Research Logistics Quarterly 16 (1969).
    """
    rows = ("x - 5*y + 4*z <= 0", "x - 4*y + 2*z <= 0", "x/2 - y + z/3 <= 0", "y <= 1")
    return from_algebra(
        maximize="x + 0*y - 2*z",
        constraints={f"row {number}": text for number, text in enumerate(rows, 1)},
        bounds=dict.fromkeys("xyz", (0, None)),
        name="Circling at the origin",
    )


def _four_variables(name: str, goal: Literal["min", "max"], objective: str, rows: tuple[str, ...]) -> Model:
    return from_algebra(
        minimize=objective if goal == "min" else None,
        maximize=objective if goal == "max" else None,
        constraints={f"row {number}": text for number, text in enumerate(rows, 1)},
        bounds={f"x{j}": (0, None) for j in range(1, 5)},
        name=name,
    )
