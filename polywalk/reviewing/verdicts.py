"""The three words for a number someone else computed: exact, within solver tolerance, or wrong and by how much."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from typing import Literal

from polywalk.exact import rounded, short
from polywalk.reviewing.tolerances import within

Word = Literal["exact", "within solver tolerance", "wrong"]


@dataclass(frozen=True)
class Verdict:
    """How far a number is from the exact one.

    Parameters
    ----------
    word : {"exact", "within solver tolerance", "wrong"}
    off : Fraction
        By how much, at least 0.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk.reviewing.verdicts import judged
    >>> print(judged(Fraction(1, 10**9), Fraction(4), Fraction(1, 10**6)))
    within solver tolerance (off by 1e-09)
    """

    word: Word
    off: Fraction

    @property
    def right(self) -> bool:
        """Whether it is exact or within solver tolerance."""
        return self.word != "wrong"

    def __str__(self) -> str:
        if self.word == "exact":
            return self.word
        amount = short(self.off) if self.off >= Fraction(1, 1000) else rounded(self.off)
        return f"wrong by {amount}" if self.word == "wrong" else f"{self.word} (off by {amount})"


def judged(off: Fraction, size: Fraction, tolerance: Fraction) -> Verdict:
    """The verdict on a number that is off by so much from one of this size."""
    word: Word = "exact" if off == 0 else "within solver tolerance" if within(off, size, tolerance) else "wrong"
    return Verdict(word, abs(off))


def worst(verdicts: list[Verdict]) -> Verdict:
    """The worst of several: the largest amount among those of the worst word; exact where there is none."""
    order: tuple[Word, ...] = ("exact", "within solver tolerance", "wrong")
    return max(verdicts, key=lambda one: (order.index(one.word), one.off), default=Verdict("exact", Fraction(0)))
