"""One table, three readers: plain text, a notebook and pandas. Results hand out tables; nothing here computes."""

from __future__ import annotations

from dataclasses import dataclass
from fractions import Fraction
from html import escape
from typing import Any

from polywalk.exact import full, short

MARKUP = frozenset("\\|`*_~<>[]#&$@!")
"""What Markdown, HTML in it, or a tracker (mentions, issue numbers, TeX) would not show as it stands."""


@dataclass(frozen=True, repr=False)
class Table:
    """Rows under headings, with a title above and notes below.

    Parameters
    ----------
    title : str
        One line above the table.
    columns : tuple of str
        The headings.
    rows : tuple of tuple
        One value for each heading: text, Fraction, int, bool, None or a tuple of these.
    notes : tuple of str, optional
        Lines below the table.

    Examples
    --------
    >>> from fractions import Fraction
    >>> from polywalk import Table
    >>> print(Table("plans", ("plan", "cost"), (("a", Fraction(9, 2)),)))
    plans
    plan  cost
    a     4.5
    """

    title: str
    columns: tuple[str, ...]
    rows: tuple[tuple[object, ...], ...]
    notes: tuple[str, ...] = ()

    def __str__(self) -> str:
        lines = [self.columns, *(tuple(cell(value) for value in row) for row in self.rows)]
        widths = [max(len(line[k]) for line in lines) for k in range(len(self.columns))]
        shown = ["  ".join(text.ljust(width) for text, width in zip(line, widths, strict=True)) for line in lines]
        body = [line.rstrip() for line in shown] if self.columns else []
        return "\n".join([self.title, *body, *self.notes])

    __repr__ = __str__

    def _repr_html_(self) -> str:
        head = "".join(f'<th scope="col">{escape(name)}</th>' for name in self.columns)
        body = "".join(f"<tr>{''.join(_html_cell(value) for value in row)}</tr>" for row in self.rows)
        notes = "".join(f"<div>{escape(note)}</div>" for note in self.notes)
        return (
            f'<table><caption style="text-align:left">{escape(self.title)}</caption>'
            f"<thead><tr>{head}</tr></thead><tbody>{body}</tbody></table>{notes}"
        )

    def markdown(self) -> str:
        """The table for a ticket: a bold title, a pipe table and the notes; every name stays text.

        Whatever Markdown would read as markup is written so that it shows as typed, and wakes no mention or link.

        Examples
        --------
        >>> from polywalk import Table
        >>> print(Table("plans", ("plan", "cost"), (("a|b", 9),)).markdown())
        **plans**
        <BLANKLINE>
        | plan | cost |
        | :--- | ---: |
        | a&#124;b | 9 |
        """
        sides = [all(_is_number(row[k]) for row in self.rows if row[k] is not None) for k in range(len(self.columns))]
        lines = [self.columns, *((cell(value) for value in row) for row in self.rows)] if self.columns else []
        body = [f"| {' | '.join(map(_markdown, line))} |" for line in lines]
        if body:
            body.insert(1, f"| {' | '.join('---:' if right and self.rows else ':---' for right in sides)} |")
        notes = [f"\n{_markdown(note)}" for note in self.notes]
        return "\n".join([f"**{_markdown(self.title)}**", *(["", *body] if body else []), *notes])

    def frame(self) -> Any:
        """The rows as a pandas DataFrame; numbers stay exact fractions.

        Returns
        -------
        pandas.DataFrame

        Raises
        ------
        ImportError
            Where pandas is not installed.

        Examples
        --------
        >>> from polywalk import Table
        >>> Table("plans", ("plan",), (("a",), ("b",))).frame().shape
        (2, 1)
        """
        import pandas as pd

        return pd.DataFrame([list(row) for row in self.rows], columns=list(self.columns))


class Shown:
    """A result that shows itself through its table: in print, in a notebook and as a DataFrame."""

    def table(self) -> Table:
        """The result as a table."""
        raise NotImplementedError

    def markdown(self) -> str:
        """The table as Markdown, for a ticket."""
        return self.table().markdown()

    def frame(self) -> Any:
        """The table as a pandas DataFrame; numbers stay exact fractions."""
        return self.table().frame()

    def __str__(self) -> str:
        return str(self.table())

    def __repr__(self) -> str:
        return str(self.table())

    def _repr_html_(self) -> str:
        return self.table()._repr_html_()


def cell(value: object) -> str:
    """The value as the short text of a table cell."""
    if value is None:
        return ""
    if isinstance(value, bool):
        return "yes" if value else "no"
    if isinstance(value, Fraction):
        return short(value)
    if isinstance(value, tuple):
        numbers = any(isinstance(item, Fraction) for item in value)
        text = ", ".join(cell(item) for item in value)
        return f"({text})" if numbers else text
    return str(value)


def _is_number(value: object) -> bool:
    return isinstance(value, Fraction | int) and not isinstance(value, bool)


def _markdown(text: str) -> str:
    """Text as Markdown shows it literally: what could be markup, HTML or a mention becomes a character reference."""
    flat = " ".join(text.split())
    return "".join(f"&#{ord(letter)};" if letter in MARKUP else letter for letter in flat)


def _html_cell(value: object) -> str:
    hover = f' title="{escape(_exact_text(value))}"' if _exact_text(value) != cell(value) else ""
    side = "right" if _is_number(value) else "left"
    return f'<td style="text-align:{side}"{hover}>{escape(cell(value))}</td>'


def _exact_text(value: object) -> str:
    if isinstance(value, Fraction):
        return full(value)
    if isinstance(value, tuple) and any(isinstance(item, Fraction) for item in value):
        return f"({', '.join(_exact_text(item) for item in value)})"
    return cell(value)
