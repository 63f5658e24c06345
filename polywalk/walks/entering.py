"""Entering rules, each as its textbook states it: which of the improving slacks is let go.

``columns`` are those whose slack improves the objective as it grows (in Phase I: lowers the auxiliary), in index
order and never empty. Where a rule finds several equally good it takes the lowest index, the first of them. Every rule
is finite with lexicographic leaving; without degeneracy every rule is finite.
"""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction

from polywalk.linear import Dictionary
from polywalk.walks.setting import Setting


def dantzig(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column with the largest reduced cost, in the slacks as typed.

    Multiplying a constraint by a number changes its slack's reduced cost, and so may change the walk. With
    lowest-index, first-row or largest-pivot leaving it may cycle at a degenerate vertex (Beale 1955).

    References
    ----------
    Dantzig, Maximization of a linear function of variables subject to linear inequalities, 1951;
    Linear Programming and Extensions, 1963.
    """
    return max(columns, key=dictionary.gain)  # of equal gains max keeps the first


def bland(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column with the lowest index. With lowest-index leaving it never cycles; with other ties it is not promised.

    References
    ----------
    Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
    """
    return columns[0]


def greatest_improvement(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column whose whole step improves the objective the most; one that nothing stops improves it for ever.

    At a degenerate vertex all improvements may be 0; then the lowest index enters, and it may cycle.

    References
    ----------
    Dantzig, Linear Programming and Extensions, 1963; Jeroslow, The simplex algorithm with the pivot rule of maximizing
    criterion improvement, Discrete Math. 4, 1973.
    """

    def improvement(column: int) -> tuple[bool, Fraction]:
        whole = whole_improvement(dictionary, column)
        return whole is None, whole or Fraction(0)

    return max(columns, key=improvement)


def steepest_edge(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column that improves the objective most per unit of length, measured over all slacks as typed.

    The length of a unit step is the root of the sum of the squared rates of all slacks, the entering one's 1 included;
    squares are compared, exactly. It may cycle.

    References
    ----------
    Goldfarb & Reid, A practicable steepest-edge simplex algorithm, Math. Programming 12, 1977.
    """
    return max(columns, key=lambda column: slope_squared(dictionary, column))


def steepest_edge_decisions(dictionary: Dictionary, columns: Sequence[int]) -> int:
    """The column that improves the objective most per unit of length, measured over the decisions alone.

    This is the edge that is steepest in the picture, whatever the constraints are multiplied by; squares are compared,
    exactly. It may cycle.

    References
    ----------
    Goldfarb & Reid, A practicable steepest-edge simplex algorithm, Math. Programming 12, 1977 (the norm is chosen
    here).
    """
    return max(columns, key=lambda column: slope_squared_of_decisions(dictionary, column))


def random_edge(dictionary: Dictionary, columns: Sequence[int], setting: Setting) -> int:
    """Any of the columns, each with the same chance; the walk's seed makes it repeatable.

    With lowest-index, lexicographic or random leaving it ends with probability 1. No cycle is ever reported: an old
    basis says nothing about the next lot.

    References
    ----------
    Dantzig, Linear Programming and Extensions, 1963; Gärtner, Henk & Ziegler, Randomized simplex algorithms on
    Klee-Minty cubes, Combinatorica 18, 1998.
    """
    return setting.lots.choice(columns)


def shadow_vertex(dictionary: Dictionary, columns: Sequence[int], setting: Setting) -> int:
    """The column that improves first as the objective turns from the start objective to the model's own.

    The start is optimal for the start objective; every vertex passed is optimal for a mixture of both, so the walk runs
    along the outline of the region's shadow on the plane of both. By default the start objective is to keep the slacks
    held at the start at 0 (minus their sum, as typed). In Phase I always the default, beside the auxiliary. At a
    degenerate vertex it may cycle.

    References
    ----------
    Gass & Saaty, The computational algorithm for the parametric objective function, Naval Res. Logist. Quart. 2, 1955;
    Borgwardt, The Simplex Method: A Probabilistic Analysis, 1987.
    """
    loss = dictionary.combination(setting.start_weights)
    return max(columns, key=lambda column: Fraction(loss[column + 1], dictionary.aim[column + 1]))


# what the rules compare, in the units of the model


def slope(dictionary: Dictionary, column: int) -> Fraction:
    """How fast the objective (in Phase I the auxiliary) improves per unit of the column's slack."""
    unit = dictionary.slacks.cost[1] if dictionary.phase == 2 else 1
    return Fraction(dictionary.gain(column), dictionary.denominator * unit)


def whole_improvement(dictionary: Dictionary, column: int) -> Fraction | None:
    """How much the column's whole step improves the objective; None where nothing stops it."""
    rows = dictionary.first_to_run_out(column)
    if not rows:
        return None
    line = dictionary.rows[rows[0]]
    step = Fraction(line[0], -line[column + 1] * dictionary.slacks.scales[dictionary.nonbasic[column]])
    return slope(dictionary, column) * step


def slope_squared(dictionary: Dictionary, column: int) -> Fraction:
    """The square of the improvement per unit of length over all slacks; the auxiliary counts as one."""
    slacks, place = dictionary.slacks, column + 1
    unit, common = slacks.scales[dictionary.nonbasic[column]], slacks.common_scale
    whole, moved = dictionary.denominator * common, 0  # the entering slack moves by whole, in these units
    for k, line in zip(dictionary.basic, dictionary.rows, strict=True):
        if line[place] and slacks.blocks[k]:
            moved += (line[place] * unit * (common // slacks.scales[k])) ** 2
    return slope(dictionary, column) ** 2 * Fraction(whole**2, whole**2 + moved)


def slope_squared_of_decisions(dictionary: Dictionary, column: int) -> Fraction:
    """The square of the improvement per unit of length over the decisions, whose own slacks have scale 1."""
    n, place, eased = dictionary.slacks.model.n, column + 1, dictionary.relaxed_slacks
    own = dict.fromkeys(eased, 0) | {dictionary.nonbasic[column]: dictionary.denominator}
    own |= {k: line[place] for k, line in zip(dictionary.basic, dictionary.rows, strict=True)}
    short = own.get(dictionary.slacks.auxiliary, 0)
    moved = sum((move - short if k in eased else move) ** 2 for k, move in own.items() if k < n)
    unit = dictionary.slacks.cost[1] if dictionary.phase == 2 else 1
    return Fraction(dictionary.aim[place] ** 2, moved * unit**2)
