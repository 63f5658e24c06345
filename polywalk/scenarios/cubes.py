"""Cubes that are hard on pivot rules, by their usual names, and two plain solids."""

from __future__ import annotations

from collections.abc import Callable
from fractions import Fraction
from itertools import product

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
    ModelError, UnknownName, NumberError
        A size or epsilon out of its range, another form, an epsilon that is no number.

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


def goldfarb(n: int = 3) -> Model:
    """The squashed cube whose shadow on its last two variables shows all of its 2**n vertices.

    Maximize x_n with 0 <= x_1 <= 1, beta x_1 <= x_2 <= delta - beta x_1 and, for j from 3 on,
    beta (x_(j-1) - gamma x_(j-2)) <= x_j <= delta^(j-1) - beta (x_(j-1) - gamma x_(j-2)); here beta = 2, gamma = 1/4,
    delta = 5. The shadow-vertex rule with the start objective x_(n-1) - x_n walks from 0 through every vertex.

    Parameters
    ----------
    n : int, optional
        Number of variables, from 2 to 12.

    Returns
    -------
    Model

    Raises
    ------
    ModelError
        A size out of its range.

    Examples
    --------
    >>> from polywalk.scenarios import goldfarb
    >>> print(goldfarb(2))
    Goldfarb, 2 variables: maximize x2
    constraint   rule           origin
    row 1 lower  x1 ≥ 0
    row 1 upper  x1 ≤ 1
    row 2 lower  2 x1 - x2 ≤ 0
    row 2 upper  2 x1 + x2 ≤ 5
    free (no bound of their own): x2

    References
    ----------
    Goldfarb, On the complexity of the simplex method, in: Advances in Optimization and Numerical Analysis, Kluwer 1994,
    25-38; Amenta & Ziegler, Deformed products and maximal shadows of polytopes, Contemporary Math. 223, 1999 (the
    form is from memory; that its shadow has 2**n vertices is computed for n = 2 to 7).
    """
    _check_size(n, 12, 2)
    rows = {"row 1": "0 <= x1 <= 1"}
    for j in range(2, n + 1):
        rest = f"2*x{j - 1}" + (f" - 1/2*x{j - 2}" if j > 2 else "")
        rows |= {f"row {j} lower": f"{rest} - x{j} <= 0", f"row {j} upper": f"{rest} + x{j} <= {5 ** (j - 1)}"}
    names = " + ".join(f"0*x{j}" for j in range(1, n))
    return from_algebra(maximize=f"{names} + x{n}", constraints=rows, name=f"Goldfarb, {n} variables")


def cube(n: int = 3) -> Model:
    """The unit cube, maximizing the sum of all variables: 2**n vertices, 2n facets.

    Parameters
    ----------
    n : int, optional
        Number of variables, from 1 to 12.

    Returns
    -------
    Model

    Raises
    ------
    ModelError
        A size out of its range.

    Examples
    --------
    >>> from polywalk.scenarios import cube
    >>> len(cube(3).constraints)
    6

    References
    ----------
    Ziegler, Lectures on Polytopes, Springer 1995, lecture 0 (cubes and cross-polytopes).
    """
    _check_size(n, 12)
    names = [f"x{j}" for j in range(1, n + 1)]
    return from_algebra(maximize=" + ".join(names), bounds=dict.fromkeys(names, (0, 1)), name=f"Cube, {n} variables")


def cross_polytope(n: int = 3) -> Model:
    """All points with sum of absolute values at most 1, free variables, maximizing the first: 2n vertices, 2**n facets.

    Parameters
    ----------
    n : int, optional
        Number of variables, from 1 to 8.

    Returns
    -------
    Model

    Raises
    ------
    ModelError
        A size out of its range.

    Examples
    --------
    >>> from polywalk.scenarios import cross_polytope
    >>> cross_polytope(2).constraint("side +-").text(("x1", "x2"))
    'x1 - x2 ≤ 1'

    References
    ----------
    Ziegler, Lectures on Polytopes, Springer 1995, lecture 0 (cubes and cross-polytopes).
    """
    _check_size(n, 8)
    rows = {}
    for signs in product("+-", repeat=n):
        terms = "".join(f"{sign}x{j}" for j, sign in enumerate(signs, 1))
        rows[f"side {''.join(signs)}"] = f"{terms} <= 1"
    return from_algebra(maximize="x1", constraints=rows, name=f"Cross-polytope, {n} variables")


def _check_size(n: object, largest: int, least: int = 1) -> None:
    if not isinstance(n, int) or isinstance(n, bool) or not least <= n <= largest:
        raise ModelError(f"expected a whole number of variables from {least} to {largest}, got {n!r}.", n)
