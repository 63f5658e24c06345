"""Published models that are hard on pivot rules, by their usual names, and two plain solids."""

from __future__ import annotations

from collections.abc import Callable
from fractions import Fraction
from itertools import product
from typing import Literal

from polywalk.errors import ModelError, unknown
from polywalk.exact import exact
from polywalk.model import Model
from polywalk.reading import from_algebra


def klee_minty(n: int = 3, form: str = "2/5", epsilon: object = "1/4") -> Model:
    """The squashed cube on which Dantzig's rule visits every vertex.

    Parameters
    ----------
    n : int, optional
        Number of variables, from 1 to 12; the cube has 2**n vertices.
    form : {"2/5", "10/100", "unit"}, optional
        "2/5": maximize sum_j 2^(n-j) x_j with 2 sum_(i<j) 2^(j-i) x_i + x_j <= 5^j.
        "10/100": maximize sum_j 10^(n-j) x_j with 2 sum_(i<j) 10^(j-i) x_i + x_j <= 100^(j-1).
        "unit": maximize x_n with epsilon x_(j-1) <= x_j <= 1 - epsilon x_(j-1); Dantzig's rule needs one pivot here.
    epsilon : number, optional
        For "unit" only; above 0 and below 1/2.

    Returns
    -------
    Model

    Raises
    ------
    ModelError, UnknownName
        A size or epsilon out of its range, another form.

    Examples
    --------
    >>> from polywalk.scenarios import klee_minty
    >>> print(klee_minty(2))
    Klee-Minty, 2 variables: maximize 2 x1 + x2
    constraint  rule            origin
    row 1       x1 ≤ 5
    row 2       4 x1 + x2 ≤ 25
    x1 lower    x1 ≥ 0          bounds
    x2 lower    x2 ≥ 0          bounds

    References
    ----------
    Klee & Minty, How good is the simplex algorithm?, in: Inequalities III, Academic Press 1972, 159-175.
    """
    _check_size(n, 12)
    if form not in _FORMS:
        raise unknown("form", form, _FORMS, "Klee-Minty")
    goal, rows, bounds = _FORMS[form](n, exact(epsilon))
    return from_algebra(maximize=goal, constraints=rows, bounds=bounds, name=f"Klee-Minty, {n} variables")


_Parts = tuple[str, dict[str, str], dict[str, object]]


def _powers(n: int, base: int, limits: list[int]) -> _Parts:
    rows = {}
    for j, limit in enumerate(limits, 1):
        terms = [f"{2 * base ** (j - i)}*x{i}" for i in range(1, j)]
        rows[f"row {j}"] = " + ".join([*terms, f"x{j}"]) + f" <= {limit}"
    goal = " + ".join(f"{base ** (n - j)}*x{j}" for j in range(1, n + 1))
    return goal, rows, {f"x{j}": (0, None) for j in range(1, n + 1)}


def _two_five(n: int, _: Fraction) -> _Parts:
    return _powers(n, 2, [5**j for j in range(1, n + 1)])


def _ten_hundred(n: int, _: Fraction) -> _Parts:
    return _powers(n, 10, [100 ** (j - 1) for j in range(1, n + 1)])


def _unit(n: int, epsilon: Fraction) -> _Parts:
    if not 0 < epsilon < Fraction(1, 2):
        raise ModelError(f"Klee-Minty: expected an epsilon above 0 and below 1/2, got {epsilon}.", epsilon)
    rows = {"row 1": "0 <= x1 <= 1"}
    for j in range(2, n + 1):
        rows[f"row {j}"] = f"{epsilon}*x{j - 1} <= x{j} <= 1 - {epsilon}*x{j - 1}"
    return f"x{n}", rows, {}


_FORMS: dict[str, Callable[[int, Fraction], _Parts]] = {"2/5": _two_five, "10/100": _ten_hundred, "unit": _unit}


def beale() -> Model:
    """Four variables, three rows: Dantzig's rule with lowest-index ties circles through six bases for ever.

    Optimum -1/20 at (1/25, 0, 1, 0).

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

    Examples
    --------
    >>> from polywalk.scenarios import chvatal
    >>> chvatal().objective.goal
    'max'

    References
    ----------
    Chvatal, Linear Programming, Freeman 1983, chapter 3.
    """
    return _four_variables(
        "Chvátal",
        "max",
        "10*x1 - 57*x2 - 9*x3 - 24*x4",
        ("0.5*x1 - 5.5*x2 - 2.5*x3 + 9*x4 <= 0", "0.5*x1 - 1.5*x2 - 0.5*x3 + x4 <= 0", "x1 <= 1"),
    )


def kuhn() -> Model:
    """Four variables, three rows: Dantzig's rule circles when leaving ties go to the first row. Optimum -2.

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


def cube(n: int = 3) -> Model:
    """The unit cube, maximizing the sum of all variables: 2**n vertices, 2n facets.

    Examples
    --------
    >>> from polywalk.scenarios import cube
    >>> len(cube(3).constraints)
    6

    References
    ----------
    Ziegler, Lectures on Polytopes, Springer 1995.
    """
    _check_size(n, 12)
    names = [f"x{j}" for j in range(1, n + 1)]
    return from_algebra(maximize=" + ".join(names), bounds=dict.fromkeys(names, (0, 1)), name=f"Cube, {n} variables")


def cross_polytope(n: int = 3) -> Model:
    """All points with sum of absolute values at most 1, free variables, maximizing the first: 2n vertices, 2**n facets.

    Examples
    --------
    >>> from polywalk.scenarios import cross_polytope
    >>> cross_polytope(2).constraint("side +-").text(("x1", "x2"))
    'x1 - x2 ≤ 1'

    References
    ----------
    Ziegler, Lectures on Polytopes, Springer 1995.
    """
    _check_size(n, 8)
    rows = {}
    for signs in product("+-", repeat=n):
        terms = "".join(f"{sign}x{j}" for j, sign in enumerate(signs, 1))
        rows[f"side {''.join(signs)}"] = f"{terms} <= 1"
    return from_algebra(maximize="x1", constraints=rows, name=f"Cross-polytope, {n} variables")


def _check_size(n: object, largest: int) -> None:
    if not isinstance(n, int) or isinstance(n, bool) or not 1 <= n <= largest:
        raise ModelError(f"expected a whole number of variables from 1 to {largest}, got {n!r}.", n)
