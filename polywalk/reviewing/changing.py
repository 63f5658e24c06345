"""The difference of two versions of a model told: sentences and tables. Nothing here decides anything."""

from __future__ import annotations

from collections.abc import Iterator
from fractions import Fraction
from typing import TYPE_CHECKING

from polywalk.exact import short
from polywalk.region import Region, vertex_name
from polywalk.reviewing.parts import Part
from polywalk.reviewing.rows import RowChange
from polywalk.reviewing.telling import listed
from polywalk.table import Table, cell

if TYPE_CHECKING:
    from polywalk.reviewing.difference import Difference
    from polywalk.reviewing.versions import Versions

DIMENSIONS = {1: "length", 2: "area", 3: "volume"}


def sentences(found: Difference) -> Iterator[str]:
    """What a reader wants to know first."""
    yield _sizes(found)
    counts = {change: len(found.vertices(change)) for change in ("lost", "gained", "kept")}
    lost = "1 vertex is lost" if counts["lost"] == 1 else f"{counts['lost']} vertices are lost"
    yield f"{lost}, {counts['gained']} gained and {counts['kept']} kept."
    yield _optimum(found)
    for words, names in (
        ("New", [row.name for row in found.rows if row.change == "added"]),
        ("Removed", [row.name for row in found.rows if row.change == "removed"]),
        ("Changed", [_rules(row) for row in found.rows if row.change == "changed"]),
        ("Now redundant", [row.name for row in found.rows if row.became_redundant]),
        ("No longer redundant", [row.name for row in found.rows if row.became_needed]),
        ("Now active at the optimum", [row.name for row in found.rows if row.became_active]),
        ("No longer active at the optimum", [row.name for row in found.rows if row.became_idle]),
        ("Findings that appeared", [item.title for item in found.appeared]),
        ("Findings that went", [item.title for item in found.gone]),
    ):
        if names:
            yield f"{words}: {'; '.join(names)}."


def _rules(row: RowChange) -> str:
    assert row.before is not None
    assert row.after is not None
    return f"{row.name} ({row.before.rule}, now {row.after.rule})"


def _sizes(found: Difference) -> str:
    if not found.cut_off.pieces and not found.added.pieces:
        return "Both versions allow exactly the same plans."
    gone = _share(found.cut_off, found.before) if found.cut_off.pieces else "nothing"
    more = size(found.added) if found.added.pieces else "nothing"
    if found.after.status == "empty":
        return f"The change cuts off every plan ({gone}): the later version is empty."
    return f"The change cuts off {gone} and adds {more}."


def _share(part: Part, whole: Region) -> str:
    """A cut-off part, with what it is a share of."""
    if part.dimension == part.n and part.volume is not None and whole.volume:
        percent = f"{float(100 * part.volume / whole.volume):.2g}%"
        return f"{short(part.volume)} of {short(whole.volume)} ({percent})"
    if part.dimension == whole.dimension and part.measure is not None and whole.measure:
        return f"{size(part)} of {whole.measure:.6g} ({100 * part.measure / whole.measure:.2g}%)"
    return size(part)


def size(part: Part) -> str:
    """The size of a part in words: its volume, or its measure where it is flat."""
    if not part.pieces:
        return "nothing"
    if part.dimension < part.n:
        flat = f"a part without {DIMENSIONS.get(part.n, 'volume')} (dimension {part.dimension})"
        if not part.dimension:
            return f"{flat}, {len(part.pieces)} {'point' if len(part.pieces) == 1 else 'points'}"
        amount = "infinite" if part.measure is None else f"about {part.measure:.6g}"
        return f"{flat}, {DIMENSIONS.get(part.dimension, 'measure')} {amount}"
    return "an infinite part" if part.volume is None else short(part.volume)


def _optimum(found: Difference) -> str:
    one, other = found.before, found.after
    if found.gain is None:
        same = one.outcome == other.outcome
        return f"The model was and stays {_end(one)}." if same else f"Before: {_end(one)}; after: {_end(other)}."
    places = ("" if _places(one) == _places(other) else f", and moves from {_places(one)} to {_places(other)}") or (
        f", still at {_places(one)}"
    )
    if one.model.objective != other.model.objective:
        places += "; the objective itself is another one"
    if not found.gain:
        return f"The optimal value stays {cell(one.value)}{places}."
    verb = "rises" if found.gain > 0 else "falls"
    amount = short(abs(found.gain))
    return f"The optimal value {verb} by {amount}, from {cell(one.value)} to {cell(other.value)}{places}."


def _end(region: Region) -> str:
    names = {"optimal": f"optimal with {cell(region.value)}", "empty": "empty: no plan satisfies every constraint"}
    names |= {"unbounded": "without an optimum: the objective improves without end", "no objective": "no objective"}
    return names[region.outcome]


def _places(region: Region) -> str:
    points = [region.base[k] for k in region.optimal.vertices] if region.optimal else []
    return listed(cell(point) for point in points)


def tables(found: Difference) -> tuple[Table, ...]:
    """Versions, constraints, vertices, findings."""
    return _overview(found), _rows(found), _corners(found), _findings(found)


def _overview(found: Difference) -> Table:
    rows = (_version("before", found.before, None), _version("after", found.after, found))
    return Table("before and after", VERSION, rows, found.summary)


VERSION = ("version", "region", "vertices", "volume", "cut off", "added", "optimum", "at")


def _version(name: str, region: Region, step: Difference | None) -> tuple[object, ...]:
    volume = region.volume if region.volume is not None else "infinite" if region.status == "unbounded" else None
    if region.dimension < region.model.n and region.status == "unbounded":
        volume = Fraction(0)
    told = ("", "") if step is None else (_amount(step.cut_off), _amount(step.added))
    value = region.value if region.value is not None else region.outcome
    kind = region.status if region.dimension in {-1, region.model.n} else f"{region.status}, flat"
    return (name, kind, len(region.vertices), volume, *told, value, _places(region))


def _amount(part: Part) -> object:
    return "infinite" if part.volume is None else size(part) if 0 <= part.dimension < part.n else part.volume


def _rows(found: Difference) -> Table:
    versions = ("rule before", "rule after", "standing before", "standing after")
    columns = ("constraint", "change", *versions, "at the optimum")
    rows = []
    for row in found.rows:
        one, other = row.before, row.after
        binds = "; ".join(
            words
            for words, told in (
                ("now active", row.became_active),
                ("no longer active", row.became_idle),
                ("active in both", bool(one and one.binds and other and other.binds)),
            )
            if told
        )
        rule = other.rule if other and row.change != "same" else "the same" if other else ""
        told = (one.rule if one else "", rule, one.standing if one else "", other.standing if other else "")
        rows.append((row.name, row.change, *told, binds))
    return Table("constraints before and after", columns, tuple(rows))


def _corners(found: Difference) -> Table:
    variables = found.before.model.variables
    columns = ("change", *variables, "name before", "name after", "active before", "active after")
    order = ("lost", "gained", "kept")
    rows = []
    for corner in sorted(found.corners, key=lambda corner: order.index(corner.change)):
        old = None if corner.before is None else found.before.vertices[corner.before]
        new = None if corner.after is None else found.after.vertices[corner.after]
        names = [None if k is None else vertex_name(k) for k in (corner.before, corner.after)]
        rows.append((corner.change, *corner.point, *names, old.active if old else "", new.active if new else ""))
    return Table("vertices lost, gained and kept", columns if rows else (), tuple(rows))


def _findings(found: Difference) -> Table:
    rows = [("appeared", item.severity, item.code, item.title) for item in found.appeared]
    rows += [("went", item.severity, item.code, item.title) for item in found.gone]
    title = "findings that appeared or went" if rows else "no finding appeared or went"
    return Table(title, ("change", "severity", "code", "finding") if rows else (), tuple(rows))


def versions_table(found: Versions) -> Table:
    """One row a version, its changes against the one before it."""
    steps: list[Difference | None] = [None, *found.steps]
    rows = []
    for name, region, step in zip(found.names, found.regions, steps, strict=True):
        moves = [len(step.vertices(change)) if step else None for change in ("lost", "gained")]
        fresh = [len(step.appeared), len(step.gone)] if step else [None, None]
        rows.append((*_version(name, region, step), *moves, *fresh, step.gain if step else None))
    columns = (*VERSION, "vertices lost", "gained", "findings appeared", "went", "change of the optimum")
    note = "cut off, added, lost, gained, appeared and went: against the version in the row above"
    return Table(f"{len(rows)} versions", columns, tuple(rows), (note,) if len(rows) > 1 else ())
