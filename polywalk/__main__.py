"""``python -m polywalk``: the demo model, its vertices, the walks of two rules, and its picture as one HTML file."""

from __future__ import annotations

import argparse
import os
import sys
import tempfile
from collections.abc import Sequence
from pathlib import Path

from polywalk.drawing import draw
from polywalk.region import region
from polywalk.scenarios import harbour_row
from polywalk.walks import Walk, walk

RULES = ("dantzig", "bland")


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the demo.

    Parameters
    ----------
    arguments : sequence of str, optional
        The words after ``python -m polywalk``; default: those of this process.

    Returns
    -------
    int
        0, or 2 where the picture could not be written.

    Examples
    --------
    >>> from polywalk.__main__ import main
    >>> main(["--html", "no such folder/picture.html"])  # the reason goes to the error stream
    2
    """
    target: Path = _parser().parse_args(arguments).html
    if not target.parent.is_dir():
        return _failed(target, f"there is no folder {str(target.parent)!r}")
    model = harbour_row()
    found, walks = region(model), [walk(model, rule=rule) for rule in RULES]
    print("\n\n".join(str(part) for part in (model, found, *walks)))
    print(f"\n{_comparison(walks)}")
    try:
        _write(target, draw(found, walks=walks).to_html(include_plotlyjs=True))
    except OSError as error:
        return _failed(target, error.strerror or str(error))
    print(f"\nThe picture, to be opened in a browser: {target}")
    return 0


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="python -m polywalk",
        description="Show the demo model Harbour Row: its rows, its vertices with their active constraints, the "
        "pivots of Dantzig's and of Bland's rule, and a picture to turn in a browser.",
    )
    parser.add_argument(
        "--html",
        type=Path,
        default=Path("harbour-row.html"),
        metavar="PATH",
        help="where the picture goes (%(default)s)",
    )
    return parser


def _comparison(walks: Sequence[Walk]) -> str:
    counts = ", ".join(f"{len(trace.pivots)} pivots by {trace.rule}" for trace in walks)
    return f"From the same start to the same optimum: {counts}."


def _write(target: Path, text: str) -> None:
    """The whole file or none of it: written beside the target, then put in its place."""
    handle, name = tempfile.mkstemp(dir=target.parent, prefix=target.name, suffix=".part")
    part = Path(name)
    try:
        with os.fdopen(handle, "w", encoding="utf-8") as file:
            file.write(text)
        part.chmod(0o644)  # a temporary file is private; a picture is for sharing
        part.replace(target)
    except BaseException:
        part.unlink(missing_ok=True)
        raise


def _failed(target: Path, reason: str) -> int:
    print(f"The picture could not be written to {target}: {reason}; name another file with --html.", file=sys.stderr)
    return 2


if __name__ == "__main__":
    if hasattr(sys.stdout, "reconfigure"):
        sys.stdout.reconfigure(errors="replace")  # a terminal without ≤ shows a question mark, not a traceback
    sys.exit(main())
