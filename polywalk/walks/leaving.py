"""Leaving rules: which slack leaves where the ratio test ties.

``rows`` are the tied ones in index order, never empty. In Phase I the auxiliary leaves on every tie, before any rule
is asked.
"""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction

from polywalk.linear import Dictionary
from polywalk.walks.setting import Setting


def lowest_index(dictionary: Dictionary, column: int, rows: Sequence[int]) -> int:
    """The tied row with the lowest index; finite together with Bland's entering rule, else it may cycle.

    References
    ----------
    Bland, New finite pivoting rules for the simplex method, Math. Oper. Res. 2, 1977.
    """
    return rows[0]


def lexicographic(dictionary: Dictionary, column: int, rows: Sequence[int], setting: Setting) -> int:
    """The row that runs out first when every slack basic at the start is thought a little larger, each its own way.

    The additions are infinitely small, each infinitely smaller than those of lower index, so no tie is left: of the
    tied rows the one with the lexicographically smallest ratios. No dictionary comes back whatever enters: finite with
    every entering rule. Each phase begins anew.

    References
    ----------
    Dantzig, Orden & Wolfe, The generalized simplex method for minimizing a linear form under linear inequality
    restraints, Pacific J. Math. 5, 1955; Charnes, Optimality and degeneracy in linear programming, Econometrica 20,
    1952.
    """
    tied, columns = list(rows), {k: j for j, k in enumerate(dictionary.nonbasic)}
    for k in setting.disturbed:
        if len(tied) == 1:
            break
        if k in columns:
            place = columns[k] + 1
            lines = {i: dictionary.rows[i] for i in tied}
            shares = {i: Fraction(line[place], line[column + 1]) for i, line in lines.items()}
            least = min(shares.values())
            tied = [i for i in tied if shares[i] == least]
        else:  # a basic slack is larger by its own addition, the others by none of it
            tied = [i for i in tied if dictionary.basic[i] != k]
    return tied[0]


def first_row(dictionary: Dictionary, column: int, rows: Sequence[int]) -> int:
    """The first of the tied rows as the dictionary stands; an entering slack takes the row of the one that left.

    So the order of the rows belongs to the state: a basis may come back with its rows exchanged and go on otherwise.
    It may cycle (Kuhn; Balinski & Tucker 1969).

    References
    ----------
    Balinski & Tucker, Duality theory of linear programs, SIAM Review 11, 1969.
    """
    return min(rows)


def largest_pivot(dictionary: Dictionary, column: int, rows: Sequence[int]) -> int:
    """The tied row that falls the fastest, in the slacks as typed: what floating-point codes prefer. It may cycle.

    References
    ----------
    Chvátal, Linear Programming, 1983, chapter 24; that it may cycle: Kuhn's example in Balinski & Tucker, SIAM
    Review 11, 1969.
    """
    return max(rows, key=lambda row: fall(dictionary, column, row))


def fall(dictionary: Dictionary, column: int, row: int) -> Fraction:
    """How fast the row's slack falls per unit of the column's, both as typed."""
    return -dictionary.rate(row, column)


def random(dictionary: Dictionary, column: int, rows: Sequence[int], setting: Setting) -> int:
    """Any of the tied rows, each with the same chance; the walk's seed makes it repeatable.

    It ends with probability 1 whatever enters, for the lexicographic choices are always among the possible ones (common
    practice, no source). No cycle is ever reported.
    """
    return setting.lots.choice(rows)
