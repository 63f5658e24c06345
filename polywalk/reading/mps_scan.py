"""A look through an MPS file before HiGHS reads it: HiGHS passes over much that is broken, and says no line numbers.

Nothing of the model is taken from here but names that other programs cannot hold, which stand in comments.
"""

from __future__ import annotations

import json
from collections.abc import Iterator

from polywalk.reading.mps_lines import Scan, read_bound, read_column, read_row, read_sense, read_side
from polywalk.reading.textfile import Source

LINEAR = ("NAME", "OBJSENSE", "ROWS", "COLUMNS", "RHS", "RANGES", "BOUNDS", "ENDATA")
CURVED = ("QUADOBJ", "QMATRIX", "QSECTION", "QCMATRIX", "CSECTION", "SOS", "SOS1", "SOS2", "INDICATORS", "GENCONS")
REMARK = "* polywalk "
"""A comment of our own writer: a kind, then a JSON list."""

READERS = {
    "OBJSENSE": read_sense,
    "ROWS": read_row,
    "COLUMNS": read_column,
    "RHS": read_side,
    "RANGES": read_side,
    "BOUNDS": read_bound,
}


def scan(path: Source, text: str) -> Scan:
    """Look through the text.

    Raises
    ------
    FileError
        A file cut short, a section or line that is none, a name that is not there, text where a number belongs,
        with the line.
    """
    found = Scan(path)
    for line in _lines(found, text):
        if not line[0].isspace() and _opens(found, line):
            if found.section == "ENDATA":
                _whole(found)
                return found
            continue
        if found.section not in READERS:
            raise found.error(f"expected a section such as ROWS, got {line.strip()[:40]!r}; is this an MPS file?")
        READERS[found.section](found, line)
    if not found.senses:
        raise found.error("expected the sections ROWS, COLUMNS and ENDATA, got none of ROWS; is this an MPS file?")
    raise found.error("the file ends without ENDATA; it was cut short")


def _lines(found: Scan, text: str) -> Iterator[str]:
    for number, line in enumerate(text.splitlines(), 1):
        found.line = number
        if line.startswith(REMARK):
            kind, _, rest = line.removeprefix(REMARK).partition(" ")
            _remark(found, kind, rest)
        elif line.strip() and not line.startswith("*"):
            yield line


def _remark(found: Scan, kind: str, rest: str) -> None:
    try:
        given = json.loads(rest)
    except ValueError:
        given = None
    if not isinstance(given, list) or not given or not all(isinstance(item, str) for item in given):
        raise found.error(f"expected a list of texts in a comment of polywalk, got {rest[:40]!r}; remove the comment")
    found.remarks.setdefault(kind, []).append(given)


def _opens(found: Scan, line: str) -> bool:
    """Whether the line opens a section; words in the first column may also be data in free format."""
    words = line.split()
    head = words[0].upper()
    if head in CURVED:
        raise found.error(f"the section {head} is not linear; polywalk reads linear models only")
    if head not in LINEAR or (len(words) > 1 and head not in {"NAME", "OBJSENSE"} and found.section == head):
        if found.section in {"", "NAME"} or (len(words) == 1 and found.section != "OBJSENSE"):
            raise found.error(f"{words[0]!r} is no section ({', '.join(LINEAR)}); is this an MPS file?")
        return False
    found.section = head
    if head == "NAME":
        found.name = line[4:].strip()
    if head == "OBJSENSE" and len(words) > 1:
        read_sense(found, words[1])
    return True


def _whole(found: Scan) -> None:
    if not found.columns:
        raise found.error("expected at least one variable in a section COLUMNS, got none")
    for name in found.columns:
        if name in found.integers and name not in found.bounded:
            found.note(
                "integer variables without a bound were given the upper bound 1, as the format's age has it", name
            )
