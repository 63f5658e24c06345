"""``python -m polywalk``: a model file, or the demo, in a terminal: vertices, findings, walks, and a picture."""

from __future__ import annotations

import argparse
import os
import sys
from collections.abc import Sequence
from dataclasses import replace
from pathlib import Path

from polywalk.bigmodel import BigModel
from polywalk.drawing import draw
from polywalk.drawing.writing import write
from polywalk.errors import DrawingError, ModelError, PolywalkError
from polywalk.model import Model
from polywalk.narrowing import conflict, escape, section, shadow, suggest_axes
from polywalk.narrowing.culprits import ADDED_UP, folded
from polywalk.narrowing.widening import VALUE_AXES
from polywalk.reading.mps import from_mps
from polywalk.reading.toml import from_toml
from polywalk.region import region
from polywalk.reviewing import Review, review
from polywalk.scenarios import harbour_row
from polywalk.walks import ENTERING, Walk, walk
from polywalk.walks.rules import entering_rule

RULES = ("dantzig", "bland")
DEMO_PICTURE = Path("harbour-row.html")
DRAWN = 3
"""Variables of a picture."""

CLEAN, BAD_INPUT, FOUND_ERRORS, INTERRUPTED = 0, 2, 3, 130

EXAMPLES = """\
without a file:
  the demo model Harbour Row, and its picture in harbour-row.html

examples:
  python -m polywalk
  python -m polywalk plant.mps --onto a b c --rules bland dantzig --html out.html
  python -m polywalk plant.mps.gz --onto "pump[7]" objective --within 5%
  python -m polywalk plant.toml --onto pump tank --section

exit codes:
  0    clean: no finding of severity error
  2    bad input: a file, name or option that cannot be used; the reason is on the error stream
  3    the review has findings of severity error, among them no plan at all and no end of improvement
  130  interrupted by Ctrl-C
"""


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command.

    Parameters
    ----------
    arguments : sequence of str, optional
        The words after ``python -m polywalk``; default: those of this process.

    Returns
    -------
    int
        0 clean, 2 bad input, 3 findings of severity error, 130 interrupted.

    Examples
    --------
    >>> from polywalk.__main__ import main
    >>> main(["--html", "no such folder/picture.html"])  # the reason goes to the error stream
    2
    """
    wanted = _parser().parse_args(arguments)
    target: Path | None = wanted.html
    if target is not None and (target.is_dir() or not target.parent.is_dir()):
        return _failed(target, "it is a folder" if target.is_dir() else f"there is no folder {str(target.parent)!r}")
    try:
        return _demo(wanted) if wanted.file is None else _file(wanted)
    except PolywalkError as error:
        print(error, file=sys.stderr)
        return BAD_INPUT
    except BrokenPipeError:  # the reader of a pipe has seen enough
        os.dup2(os.open(os.devnull, os.O_WRONLY), sys.stdout.fileno())
        return CLEAN
    except KeyboardInterrupt:
        print("interrupted", file=sys.stderr)
        return INTERRUPTED


def _parser() -> argparse.ArgumentParser:
    parser = argparse.ArgumentParser(
        prog="python -m polywalk",
        description="Show a linear model brought down to one to three decisions: its vertices with their active\n"
        "constraints, a review, the pivots of walks, and a picture to turn in a browser.",
        epilog=EXAMPLES,
        formatter_class=argparse.RawDescriptionHelpFormatter,
    )
    parser.add_argument(
        "file", nargs="?", metavar="FILE", help="an MPS file (.mps, .mps.gz) or a model file (.toml, .toml.gz)"
    )
    parser.add_argument(
        "--onto",
        nargs="+",
        default=[],
        metavar="NAME",
        help='one to three variables, "objective" or "suboptimality" (its distance from the optimum); by default those '
        "of a small model, else the three that plans near the optimum disagree on most",
    )
    parser.add_argument(
        "--section",
        action="store_true",
        help="set the other variables to their values at the optimum; by default they stay free (the shadow)",
    )
    parser.add_argument(
        "--within",
        metavar="DISTANCE",
        help="only plans that near the optimum: 5%% of it, or 20 in the objective's own unit (not with --section)",
    )
    parser.add_argument(
        "--rules",
        nargs="+",
        default=RULES,
        metavar="RULE",
        help=f"pivot rules to walk by: {', '.join(rule.name for rule in ENTERING)} (default: {' '.join(RULES)})",
    )
    parser.add_argument(
        "--html",
        type=Path,
        metavar="PATH",
        help=f"where the picture goes (default: {DEMO_PICTURE} for the demo, no picture for a file)",
    )
    return parser


def _demo(wanted: argparse.Namespace) -> int:
    for option in ("onto", "section", "within"):
        if getattr(wanted, option):
            raise ModelError(f"--{option} is for a model in a file; name the file first.", option)
    model = harbour_row()
    walks = [walk(model, rule=rule) for rule in wanted.rules]
    print("\n\n".join(str(part) for part in (model, region(model), *walks)))
    counts = ", ".join(f"{len(trace.pivots)} pivots by {trace.rule}" for trace in walks)
    print(f"\nFrom the same start to the same optimum: {counts}.")
    return _drawn(wanted.html or DEMO_PICTURE, model, walks)


def _file(wanted: argparse.Namespace) -> int:
    for rule in wanted.rules:
        entering_rule(rule)  # a slip is told before the long work
    if wanted.section and wanted.within:
        raise ModelError("--within has no meaning with --section, which stays at the optimum; leave one out.", "within")
    source = read(wanted.file)
    print(source)
    model = _narrowed(source, wanted)
    if model.n > DRAWN or model.name.endswith(ADDED_UP):  # only a conflict or a way out is ever so large
        why = (
            f"its {model.n} variables are more than {DRAWN}"
            if model.n > DRAWN
            else "it is a sum of the big model's rows"
        )
        print(f"\nNeither reviewed nor drawn: {why}.")
        return FOUND_ERRORS
    found = _reviewed(model, has_goal := _has_goal(source))
    print(f"\n{region(model)}\n\n{found}")
    walks = _walks(model, wanted.rules, has_goal)
    code = FOUND_ERRORS if any(one.severity == "error" for one in found.findings) else CLEAN
    return code if wanted.html is None else _drawn(wanted.html, model, walks) or code


def read(path: str) -> Model | BigModel:
    """The model of a file, by its ending: a model file of polywalk (.toml, .toml.gz), else MPS."""
    if path.lower().endswith((".toml", ".toml.gz")):
        return from_toml(path)
    return from_mps(path)


def _narrowed(source: Model | BigModel, wanted: argparse.Namespace) -> Model:
    """The small model: the source itself, its conflict or way out, a section or a shadow."""
    if not wanted.onto and source.n <= DRAWN and not wanted.within:
        return source if isinstance(source, Model) else source.to_model()
    big = source if isinstance(source, BigModel) else BigModel.from_model(source)
    for name in [one for one in wanted.onto if one not in VALUE_AXES]:
        big.index(name)  # a slip is told before the long work
    wrong, has_goal = conflict(source), big.goal is not None
    way_out = escape(source) if wrong is None and has_goal else None
    wrong = wrong or (None if wanted.onto else way_out)
    if wrong is not None:
        print(f"\n{folded(wrong) if wrong.n > DRAWN else wrong}")
        return wrong
    if way_out is not None:
        print(f"\nThere is no optimum, for the objective improves without end; see the\n{way_out}")
    onto = wanted.onto or _suggested(source, has_goal)
    part = section(source, onto) if wanted.section else shadow(source, onto, within=wanted.within)
    print(f"\n{part}")
    return part.model


def _reviewed(model: Model, has_goal: bool) -> Review:
    """The review; a shadow misses no objective that its big model has."""
    found = review(model)
    if model.objective is None and has_goal:
        kept = tuple(one for one in found.findings if one.code != "no-objective")
        found = replace(found, findings=kept, checked=tuple(one for one in found.checked if "no-objective" not in one))
    return found


def _has_goal(source: Model | BigModel) -> bool:
    return (source.objective if isinstance(source, Model) else source.goal) is not None


def _suggested(source: Model | BigModel, has_goal: bool) -> tuple[str, ...]:
    if not has_goal:
        raise ModelError(f"{source.n} variables and no objective: name one to three of them with --onto.", source.name)
    print(f"\n{(found := suggest_axes(source))}")
    return found.names


def _walks(model: Model, rules: Sequence[str], has_goal: bool) -> list[Walk]:
    if model.objective is None:
        why = "there is no objective to walk by"
        if has_goal:
            why = "the objective depends on other variables too; take it as an axis, with --onto ... objective"
        print(f"\nNo walks: {why}.")
        return []
    if (found := region(model)).status == "empty" or found.lines:
        print(f"\nNo walks: the region {'is empty' if found.status == 'empty' else 'has a line and no vertex'}.")
        return []
    walks = [walk(model, rule=rule) for rule in rules]
    print("".join(f"\n{trace}\n" for trace in walks), end="")
    return walks


def _drawn(target: Path, model: Model, walks: Sequence[Walk]) -> int:
    try:
        write(target, draw(region(model), walks=walks).to_html(include_plotlyjs=True).encode())
    except DrawingError as error:
        return _failed(target, str(error))
    print(f"\nThe picture, to be opened in a browser: {target}")
    return CLEAN


def _failed(target: Path, reason: str) -> int:
    told = f"The picture could not be written to {target}: {reason.rstrip('.')}; name another file with --html."
    print(told, file=sys.stderr)
    return BAD_INPUT


if __name__ == "__main__":
    if hasattr(sys.stdout, "reconfigure"):
        sys.stdout.reconfigure(errors="replace")  # a terminal without ≤ shows a question mark, not a traceback
    sys.exit(main())
