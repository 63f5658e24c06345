"""Findings and reviews as text, tables and notebook output. Nothing here decides anything."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable
from html import escape
from typing import TYPE_CHECKING

from polywalk.reviewing.codes import SEVERITIES
from polywalk.table import Table, cell

if TYPE_CHECKING:
    from polywalk.reviewing.findings import Finding, Review


MOST = 12
"""So many findings of one code are told in print; all are in the table."""


def finding_text(finding: Finding) -> str:
    """Title, explanation, remedy: three lines."""
    lines = [f"{finding.code} ({finding.severity}): {finding.title}", finding.explanation]
    return "\n".join([*lines, f"Remedy: {finding.remedy}"] if finding.remedy else lines)


def finding_table(finding: Finding) -> Table:
    """The evidence as rows: what kind, about what, the value."""
    rows: list[tuple[object, ...]] = [("constraint", name, None) for name in finding.constraints]
    rows += [("variable", name, None) for name in finding.variables]
    rows += [("point", place, None) for place in finding.points]
    rows += [("direction", way, None) for way in finding.rays]
    for k, proof in enumerate(finding.proofs):
        kind = "multiplier" if len(finding.proofs) == 1 else f"multiplier (proof {k + 1})"
        rows += [(kind, name, value) for name, value in proof.multipliers]
    rows += [("amount", name, value) for name, value in finding.amounts]
    notes = (finding.explanation, *([f"Remedy: {finding.remedy}"] if finding.remedy else []))
    title = f"{finding.code} ({finding.severity}): {finding.title}"
    return Table(title, ("evidence", "of", "value"), tuple(rows), notes)


def review_table(review: Review) -> Table:
    """One row a finding; those accepted come last, with the reason."""
    rows: list[tuple[object, ...]] = [
        (item.severity, item.code, item.title, item.constraints) for item in review.findings
    ]
    rows += [
        ("accepted", item.code, f"{item.title} (accepted: {why})", item.constraints) for item, why in review.accepted
    ]
    return Table(headline(review), ("severity", "code", "finding", "constraints") if rows else (), tuple(rows))


def review_text(review: Review) -> str:
    """The headline, every finding in full, and what was checked."""
    lines = [headline(review)]
    told: Counter[str] = Counter()
    for item in review.findings:
        told[item.code] += 1
        if told[item.code] > MOST:
            continue
        lines += ["", f"{item.severity.upper()}  {item.title}  [{item.code}]", f"  {item.explanation}"]
        lines += [f"  Remedy: {item.remedy}"] if item.remedy else []
    more = [f"{count - MOST} more {code}" for code, count in told.items() if count > MOST]
    lines += ["", f"and {listed(more)}, listed in .findings and .frame()"] if more else []
    lines += ["", "accepted:"] if review.accepted else []
    lines += [f"  {item.title} [{item.code}], because {why}" for item, why in review.accepted]
    return "\n".join([*lines, "", "checked:", *(f"  {line}" for line in review.checked)])


def review_html(review: Review) -> str:
    """The same for a notebook: a table whose rows open up."""
    parts = [f"<div><b>{escape(headline(review))}</b></div>"]
    parts += [_unfolding(item) for item in review.findings]
    for item, why in review.accepted:
        parts.append(
            f"<div><i>accepted</i>: {escape(item.title)} <code>{item.code}</code>, because {escape(why)}</div>"
        )
    listed = "".join(f"<li>{escape(line)}</li>" for line in review.checked)
    return "".join(parts) + f"<details><summary>What was checked</summary><ul>{listed}</ul></details>"


def _unfolding(item: Finding) -> str:
    opened = " open" if item.severity == "error" else ""
    remedy = f"<div><b>Remedy:</b> {escape(item.remedy)}</div>" if item.remedy else ""
    return (
        f"<details{opened}><summary><b>{item.severity}</b> {escape(item.title)} <code>{item.code}</code></summary>"
        f"<div>{escape(item.explanation)}</div>{remedy}{_evidence(item)}</details>"
    )


def _evidence(item: Finding) -> str:
    rows = "".join(
        f"<tr>{''.join(f'<td>{escape(cell(value))}</td>' for value in row)}</tr>" for row in finding_table(item).rows
    )
    return f"<table><tbody>{rows}</tbody></table>" if rows else ""


def headline(review: Review) -> str:
    """The model and how many findings of each severity."""
    name = review.model.name or "Review"
    if not review.findings:
        return f"{name}: nothing to report; all {len(review.checked)} checks passed"
    counts = [(kind, sum(item.severity == kind for item in review.findings)) for kind in SEVERITIES]
    found = listed(f"{count} {kind}{'' if count == 1 else 's'}" for kind, count in counts if count)
    return f"{name}: no error, no warning, {found}" if review.clean else f"{name}: {found}"


def listed(names: Iterable[str]) -> str:
    """Names as a sentence lists them: "a, b and c"."""
    whole = list(names)
    return " and ".join([", ".join(whole[:-1]), whole[-1]]) if len(whole) > 1 else "".join(whole)
