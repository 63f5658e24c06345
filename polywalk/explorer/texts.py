"""The explorer's sentences as HTML; every name is escaped, every number was computed elsewhere."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction
from html import escape

from polywalk.exact import full, short
from polywalk.explorer.state import State
from polywalk.linear import optimum
from polywalk.model import Model
from polywalk.region import Region, vertex_name
from polywalk.reviewing.codes import SEVERITIES
from polywalk.table import cell

OUTCOME = {
    "unbounded": "no optimum: the objective improves without end",
    "empty": "no plan satisfies every constraint",
    "no objective": "no objective",
}
UNLISTED = OUTCOME | {"infeasible": OUTCOME["empty"]}


def number(value: Fraction, unit: str = "") -> str:
    """The number as it fits, exact on hover, with its unit."""
    text = escape(short(value))
    shown = text if full(value) == short(value) else f'<span title="{escape(full(value))}">{text}</span>'
    return f"{shown} {escape(unit)}".rstrip()


def count(number_of: int, word: str, plural: str = "") -> str:
    """ "1 ray", "2 rays"."""
    return f"{number_of} {word if number_of == 1 else plural or word + 's'}"


def verdict(state: State) -> str:
    """Status, optimum, number of vertices, and findings by severity, in one line."""
    model = state.model
    name = f"<b>{escape(model.name)}</b>: " if model.name else ""
    off = [f"{count(len(state.off), 'constraint')} switched off"] if state.off else []
    parts = [*(_region(state.region) if state.region else _unlisted(model)), *off]
    return f'<p class="polywalk-verdict" role="status">{name}{"; ".join(parts)}. {findings(state)}</p>'


def _unlisted(model: Model) -> list[str]:
    """What is known of a large model before its vertices are listed."""
    found = optimum(model)
    value = f"optimum {number(found.value)}" if found.value is not None else UNLISTED[found.outcome]
    size = f"{count(model.n, 'variable')}, {count(len(model.constraints), 'constraint')}"
    return [value, f"{size}; vertices not listed yet"]


def _region(region: Region) -> list[str]:
    parts = (
        ["empty region"] if region.status == "empty" else [f"{region.status} region of dimension {region.dimension}"]
    )
    if region.outcome == "optimal" and region.value is not None and region.optimal is not None:
        names = [vertex_name(index) for index in region.optimal.vertices if region.vertices]
        place = f" at {', '.join(names)}" if names else ""
        parts.append(f"optimum {number(region.value)}{place}")
    else:
        parts.append(OUTCOME[region.outcome])
    if region.status != "empty":
        parts.append(count(len(region.vertices), "vertex", "vertices"))
        crowded = sum(vertex.degenerate for vertex in region.vertices)
        parts += [f"{crowded} of them degenerate"] if crowded else []
        parts += [count(len(region.rays), "ray")] if region.rays else []
    return parts


def findings(state: State) -> str:
    """How many findings of each severity; whether they are of an earlier model."""
    if state.review is None:
        return '<span class="polywalk-stale">Not reviewed yet.</span>'
    kinds = [item.severity for item in state.review.findings]
    counts = [count(kinds.count(kind), kind) for kind in SEVERITIES if kind in kinds]
    told = f"Findings: {', '.join(counts) if counts else 'none'}."
    return f'<span class="polywalk-stale">({told} Stale: of the model before.)</span>' if state.stale else told


def grid(columns: tuple[str, ...], lines: Sequence[tuple[str, ...]], numbers: set[int], caption: str = "") -> str:
    """A small table of ready HTML cells."""

    def row(tag: str, cells: tuple[str, ...]) -> str:
        scope = ' scope="col"' if tag == "th" else ""
        marks = [' class="number"' if k in numbers else "" for k in range(len(cells))]
        return "".join(f"<{tag}{scope}{mark}>{text}</{tag}>" for mark, text in zip(marks, cells, strict=True))

    body = "".join(f"<tr>{row('td', line)}</tr>" for line in lines)
    told = f"<caption>{caption}</caption>" if caption else ""
    head = f"<thead><tr>{row('th', columns)}</tr></thead>"
    return f'<div class="polywalk-wide"><table>{told}{head}<tbody>{body}</tbody></table></div>'


def point(values: tuple[Fraction, ...]) -> str:
    """A point in parentheses."""
    return escape(cell(values))
