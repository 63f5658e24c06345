"""The text of one formula: signs people paste made plain, slips found before parsing, and errors with a caret."""

from __future__ import annotations

import ast
import keyword
import re

from polywalk.errors import AlgebraError

PLAIN = {"≤": "<=", "⩽": "<=", "≥": ">=", "⩾": ">=", "−": "-", "·": "*", "⋅": "*", "×": "*", "÷": "/"}
"""Signs pasted from documents, and what they mean. (The middle dot would otherwise be part of a name.)"""

LONGEST = 100_000

_NUMBER = r"(?:\d[\d_]*\.?[\d_]*|\.\d[\d_]*)(?:[eE][+-]?\d+)?"
_NAME = r"[^\W\d]\w*"
_TOKEN = re.compile(rf"(?P<number>{_NUMBER})|(?P<name>{_NAME})|(?P<open>[(])|(?P<close>[)\]])|(?P<other>\S)")
_SLIPS = (
    (re.compile(r"=<|=>"), "write <= or >= with the sign of comparison first"),
    (re.compile(r"!=|<>|≠"), "'not equal' cuts no closed region; write <=, >= or =="),
    (re.compile(r"(?<![<>=!])=(?!=)"), "write == for an equality"),
    (re.compile(r"===+|<==|>==|<<|>>"), "expected one of <=, >= and =="),
    (re.compile(r"[<>](?!=)"), "strict comparisons cut no closed region; write <= or >="),
    (re.compile(r"\^"), "powers are written **, and a power of a variable is not linear"),
    (re.compile(r"[\"'`]"), "quotes are no part of algebra; write names bare, such as pump[north]"),
    (re.compile(r"[#;{}@%&|~?!$€:\\]"), "this sign is no part of linear algebra"),
)


class Spelling:
    """A formula as typed and as parsed, with the way back from a place in one to the other."""

    def __init__(self, text: object, where: str) -> None:
        self.where = where
        if not isinstance(text, str):
            raise AlgebraError(f"{where}: expected algebra as text, got {text!r}.", culprit=text)
        if not text.strip():
            raise AlgebraError(f"{where}: expected algebra, got empty text.", culprit=text, place=0)
        self.text = text
        pieces, self._back = [], []
        start = len(text) - len(text.lstrip())
        for place in range(start, len(text)):
            piece = PLAIN.get(text[place], " " if text[place].isspace() else text[place])
            pieces.append(piece)
            self._back += [place] * len(piece)
        self.plain = "".join(pieces).rstrip()
        if len(text) > LONGEST:
            raise self.error(f"expected at most {LONGEST} characters, got {len(text)}", None)

    def source(self, node: ast.expr) -> str:
        """The text a node was parsed from."""
        return self.plain.encode()[node.col_offset : node.end_col_offset].decode()

    def error(self, reason: str, at: ast.AST | int | None, before: bool = False) -> AlgebraError:
        """The error with the text and a caret below the place; ``before`` points at the sign left of it."""
        place = self._place(at, before)
        shown, mark = self.text, place
        if place is not None:
            first = max(place - 60, 0)
            shown, mark = self.text[first : place + 60], place - first
        else:
            shown = shown if len(shown) <= 120 else shown[:120] + "…"
        shown = "".join(" " if sign.isspace() else sign for sign in shown)
        caret = f"\n    {' ' * mark}^" if mark is not None else ""
        at_column = f" (column {place + 1})" if place is not None else ""
        return AlgebraError(f"{self.where}{at_column}: {reason}.\n    {shown}{caret}", culprit=self.text, place=place)

    def _place(self, at: ast.AST | int | None, before: bool) -> int | None:
        if at is None:
            return None
        if isinstance(at, int):
            place = at
        else:
            place = len(self.plain.encode()[: getattr(at, "col_offset", 0)].decode(errors="ignore"))
        if before:
            left = self.plain[:place].rstrip(" (+-")
            place = max(len(left) - 1, 0)
        return self._back[min(place, len(self._back) - 1)]


def refuse_words(spelling: Spelling) -> None:
    """Refuse, with the remedy, the slips that Python's parser would report badly or not at all."""
    for pattern, remedy in _SLIPS:
        found = pattern.search(spelling.plain)
        if found:
            raise spelling.error(remedy, found.start())
    before = None
    for token in _TOKEN.finditer(spelling.plain):
        if token.lastgroup == "name" and keyword.iskeyword(token.group()):
            raise spelling.error(
                f"{token.group()!r} is a word of Python and cannot be a name; rename it, say {token.group()}_",
                token.start(),
            )
        if _missing_sign(before, token):
            raise spelling.error("a sign is missing here; products are written with *", token.start())
        before = token


def _missing_sign(before: re.Match[str] | None, token: re.Match[str]) -> bool:
    """Two operands side by side: ``3 x``, ``2(x + y)``, ``(x) y``; a name before a parenthesis is a function."""
    if before is None or token.lastgroup not in {"number", "name", "open"}:
        return False
    return before.lastgroup in {"number", "close"} or (before.lastgroup == "name" and token.lastgroup != "open")
