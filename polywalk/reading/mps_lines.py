"""The lines of an MPS file, section by section: what a look through the file gathers, and what it refuses."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass, field
from math import isnan

from polywalk.errors import FileError
from polywalk.exact import exact
from polywalk.reading.textfile import Source

WORDS = ("MIN", "MAX", "MINIMIZE", "MAXIMIZE", "MINIMISE", "MAXIMISE")
FIXED = ((1, 3), (4, 12), (14, 22), (24, 36), (39, 47), (49, 61))
"""Where the six fields of a line in fixed format stand."""

NUMBERLESS = ("FR", "MI", "PL", "BV")
BOUND_TYPES = ("LO", "UP", "FX", "LI", "UI", *NUMBERLESS)

TINY = 1e-12
"""At and below this size HiGHS drops a coefficient, however its options are set."""

NO_BOUND = 1e20
"""From this size on HiGHS reads a bound or side as none."""


@dataclass
class Scan:
    """What the file holds: names by section, and what HiGHS will alter.

    ``altered`` maps what happens to the places it happens at, as text; ``spaced`` is whether names with spaces,
    which only fixed format can hold, were met.
    """

    path: Source
    name: str = ""
    senses: dict[str, str] = field(default_factory=dict)
    columns: dict[str, None] = field(default_factory=dict)
    integers: set[str] = field(default_factory=set)
    bounded: set[str] = field(default_factory=set)
    lowered: set[str] = field(default_factory=set)
    sides: dict[str, float] = field(default_factory=dict)
    remarks: dict[str, list[list[str]]] = field(default_factory=dict)
    altered: dict[str, list[str]] = field(default_factory=dict)
    cells: set[tuple[str, str]] = field(default_factory=set)
    section: str = ""
    line: int = 0
    objective: str | None = None
    marked: bool = False
    spaced: bool = False

    def error(self, reason: str) -> FileError:
        """The error, with file, line and section."""
        where = f"{self.path}, line {self.line}" + (f" ({self.section})" if self.section else "")
        return FileError(f"{where}: {reason}.", self.path, self.line)

    def note(self, what: str, place: str) -> None:
        """Keep what HiGHS will alter."""
        self.altered.setdefault(what, []).append(place)

    def number(self, text: str, place: str) -> float:
        """The number as HiGHS will hold it; Fortran's D is an exponent, too."""
        plain = text.replace("d", "e").replace("D", "e")
        try:
            value = float(plain)
        except ValueError:
            raise self.error(f"expected a number for {place}, got {text!r}") from None
        if isnan(value):
            raise self.error(f"expected a number for {place}, got {text!r}")
        if abs(value) == float("inf"):
            if "inf" not in plain.lower():
                raise self.error(f"{text!r} is beyond the range of floats; scale the unit it is given in")
        elif len(text) > 15 and exact(plain) != exact(value):
            self.note("numbers have more digits than a float keeps and were rounded", place)
        return value

    def pairs(self, kind: str) -> tuple[tuple[str, str], ...]:
        """The pairs of texts that comments of this kind hold."""
        return tuple((given[0], given[-1]) for given in self.remarks.get(kind, []))

    def row(self, name: str) -> str:
        """The sense of a row that must have been named."""
        if name not in self.senses:
            raise self.error(f"the row {name!r} is not in the section ROWS")
        return self.senses[name]


def read_sense(found: Scan, line: str) -> None:
    """A line of OBJSENSE."""
    if line.strip().upper() not in WORDS:
        raise found.error(f"expected MIN or MAX, got {line.strip()!r}")


def read_row(found: Scan, line: str) -> None:
    """A line of ROWS."""
    words = line.split()
    kind, name = words[0].upper(), line.split(maxsplit=1)[-1].strip()
    found.spaced = found.spaced or len(words) > 2
    if kind not in {"N", "L", "G", "E"} or len(words) < 2:
        raise found.error(f"expected N, L, G or E and the name of a row, got {line.strip()[:40]!r}")
    if name in found.senses:
        raise found.error(f"the row {name!r} is given twice")
    if kind == "N" and found.objective is None:
        found.objective = name
    elif kind == "N":
        found.note("further free rows (N) were left out", name)
    found.senses[name] = kind


def _fields(found: Scan, line: str, counts: tuple[int, ...]) -> list[str]:
    """The words of a line, or the six fields of fixed format where names with spaces spoil the count."""
    words = line.split()
    if len(words) in counts and not found.spaced:
        return words
    cut = [line[start:stop].strip() for start, stop in FIXED]
    cut = [part for part in cut[1:] if part]
    if len(cut) in counts:
        found.spaced = found.spaced or len(cut) != len(words)
        return cut
    raise found.error(f"expected {' or '.join(map(str, counts))} entries, got {len(words)}: {line.strip()[:60]!r}")


def read_column(found: Scan, line: str) -> None:
    """A line of COLUMNS."""
    if "'MARKER'" in line:
        if "'INTORG'" not in line and "'INTEND'" not in line:
            raise found.error(f"expected 'INTORG' or 'INTEND' beside 'MARKER', got {line.strip()[:40]!r}")
        found.marked = "'INTORG'" in line
        return
    name, *pairs = _fields(found, line, (3, 5))
    if name not in found.columns:
        found.columns[name] = None
        if found.marked:
            found.integers.add(name)
    elif next(reversed(found.columns)) != name:
        raise found.error(f"the variable {name!r} comes back after another one; the lines of a variable stay together")
    for row, text in zip(pairs[::2], pairs[1::2], strict=True):
        value = found.number(text, f"{name!r} in {row!r}")
        if found.row(row) == "N" and row != found.objective:
            continue
        if (row, name) in found.cells:
            found.note("coefficients given a second time were left out", f"{name!r} in {row!r}")
        found.cells.add((row, name))
        if 0 < abs(value) <= TINY and row != found.objective:
            found.note(f"coefficients of at most {TINY:g} were left out", f"{name!r} in {row!r}")


def _pairs(found: Scan, line: str) -> Iterator[tuple[str, float]]:
    words = _fields(found, line, (2, 3, 4, 5))
    words = words[len(words) % 2 :]  # an odd count starts with the name of the set
    for row, text in zip(words[::2], words[1::2], strict=True):
        found.row(row)
        value = found.number(text, f"{row!r}")
        if NO_BOUND <= abs(value) < float("inf"):
            found.note(f"sides and bounds of {NO_BOUND:g} and more mean none", f"{row!r}")
        yield row, value


def read_side(found: Scan, line: str) -> None:
    """A line of RHS or RANGES."""
    for row, value in _pairs(found, line):
        if found.section == "RHS":
            found.sides[row] = value
        elif "ranges" not in found.remarks and _misses(found.senses[row], found.sides.get(row, 0.0), value):
            found.note("sides made of a right-hand side and a range were rounded when these were added up", repr(row))


def _misses(sense: str, side: float, span: float) -> bool:
    """Whether adding in floats gives another decimal than adding the decimals."""
    if sense == "L" or (sense == "E" and span < 0):
        return exact(side - abs(span)) != exact(side) - exact(abs(span))
    return sense != "N" and exact(side + abs(span)) != exact(side) + exact(abs(span))


def read_bound(found: Scan, line: str) -> None:
    """A line of BOUNDS."""
    words = line.split()
    kind = words[0].upper()
    if kind in {"SC", "SI"}:
        raise found.error("semi-continuous variables (SC, SI) are no linear region; give them plain bounds")
    if kind not in BOUND_TYPES:
        raise found.error(f"expected a type of bound ({', '.join(BOUND_TYPES)}), got {words[0]!r}")
    rest = (
        words[1:]
        if len(words) <= 4 and not found.spaced
        else [part for part in (line[a:b].strip() for a, b in FIXED[1:4]) if part]
    )
    text = None
    if kind not in NUMBERLESS or len(rest) == 3:
        text = rest.pop() if rest else None
    if not rest or (text is None and kind not in NUMBERLESS):
        raise found.error(f"expected a type, a variable and a number, got {line.strip()[:60]!r}")
    name = rest[-2] if len(rest) == 2 and rest[-1] not in found.columns and rest[-2] in found.columns else rest[-1]
    if name not in found.columns:
        raise found.error(f"the variable {name!r} is not in the section COLUMNS")
    value = found.number(text, f"the bound of {name!r}") if text is not None and kind not in NUMBERLESS else 0.0
    if NO_BOUND <= abs(value) < float("inf"):
        found.note(f"sides and bounds of {NO_BOUND:g} and more mean none", f"{name!r}")
    found.bounded.add(name)
    if kind in {"LO", "FX", "MI", "FR", "LI"}:
        found.lowered.add(name)
    if kind in {"UP", "UI"} and value < 0 and name not in found.lowered:
        found.note("variables with a negative upper bound and no lower one kept the lower bound 0", name)
