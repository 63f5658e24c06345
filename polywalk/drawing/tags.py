"""The letters that stand for constraints: the same letter for the same constraint in every picture of a model."""

from __future__ import annotations

from collections.abc import Iterable
from string import ascii_lowercase


def letters(names: Iterable[str]) -> dict[str, str]:
    """A letter for each name, by its place: a to z, then aa, bb, ...

    Examples
    --------
    >>> from polywalk.drawing.tags import letters
    >>> letters(["harbour main", "quay pipe"])
    {'harbour main': 'a', 'quay pipe': 'b'}
    """
    return {name: _letter(place) for place, name in enumerate(dict.fromkeys(names))}


def _letter(place: int) -> str:
    return ascii_lowercase[place % 26] * (1 + place // 26)
