"""The words of a picture of bases: its key, its letters, what a basis says when pointed at."""

from __future__ import annotations

from polywalk.drawing.letters import width
from polywalk.drawing.scene import KeyPart, KeyRow
from polywalk.drawing.tags import letters
from polywalk.region import vertex_name
from polywalk.walks import Bases, Route, basis_name

LETTER, ROOM = 9.5, 28.0
"""Size of the letters in a disc, and their most width in pixels; past it bases are drawn with their number alone."""

MOST_LISTED = 24
"""Past this many bases the key does not list them by name: their letters say what they hold."""

ABREAST = 4
"""How many bases a line of the key tells by letters."""


def letters_of(bases: Bases) -> dict[str, str]:
    """The letter of each constraint that some bases hold and others do not, the same as in any picture of the model."""
    everywhere = set.intersection(*(set(basis.held) for basis in bases.members)) if len(bases.members) > 1 else set()
    known = letters(row.name for row in bases.model.constraints)
    return {name: known[name] for name in bases.vertex.active if name not in everywhere and _held(bases, name)}


def _held(bases: Bases, name: str) -> bool:
    return any(name in basis.held for basis in bases.members)


def spelled(bases: Bases, number: int) -> str:
    """What tells a basis from the others: the letters of the constraints it holds; doubled letters apart."""
    known = letters_of(bases)
    found = [known[name] for name in bases.members[number].held if name in known]
    return (" " if any(len(letter) > 1 for letter in found) else "").join(found)


def lettered(bases: Bases) -> bool:
    """Whether discs have room for the letters of the constraints held."""
    return max(width(spelled(bases, number), LETTER) for number in range(len(bases.members))) <= ROOM


def hover(bases: Bases, number: int) -> str:
    """Everything about one basis, as lines of plain text."""
    basis = bases.members[number]
    lines = [f"{basis.name}{' (optimal)' if basis.optimal else ''}: {', '.join(basis.held)}"]
    onward = ", ".join(map(basis_name, bases.onward[number]))
    lines += [f"a degenerate pivot may lead to {onward}"] if onward else []
    ways = ", ".join(found.target for found in bases.exits if found.basis == number and found.improves)
    return "\n".join(lines + ([f"a step may lead to {ways}"] if ways else []))


def key(bases: Bases, shown: tuple[int, ...], routes: tuple[Route, ...], few: bool) -> tuple[KeyPart, ...]:
    """All parts of the key that have rows."""
    parts = (
        KeyPart("What the marks say", tuple(_marks(bases, routes, few))),
        KeyPart("Walks", tuple(KeyRow("walk", route.story, index) for index, route in enumerate(routes))),
        KeyPart(f"Constraints that meet at {vertex_name(bases.number)}", tuple(_constraints(bases))),
        KeyPart("Bases, with the constraints held active", _listed(bases, shown)),
    )
    return tuple(part for part in parts if part.rows)


def _marks(bases: Bases, routes: tuple[Route, ...], few: bool) -> list[KeyRow]:
    name = vertex_name(bases.number)
    rows = []
    if len(bases.optimal) < len(bases.members):
        how = "the constraints held active, by letter" if lettered(bases) else "its number; the list says what it holds"
        rows.append(KeyRow("basis", f"a basis of {name}: {how}"))
    if bases.optimal:
        rows.append(KeyRow("optimal basis", "an optimal basis: no slack improves the objective"))
    if any(route.places for route in routes):
        rows.append(KeyRow("first basis", "where a walk starts or arrives; its numbers are those of its pivots"))
    if any(pivot.improves for pivot in bases.pivots):
        rows.append(
            KeyRow(
                "pivot" if few else "faint pivot",
                "a degenerate pivot that improves at step 0: the point stays, the basis changes",
            )
        )
    if few and not all(pivot.improves for pivot in bases.pivots):
        rows.append(KeyRow("exchange", "one constraint apart, but no simplex pivot leads from one to the other"))
    if any(found.improves for found in bases.exits):
        rows.append(KeyRow("exit" if few else "faint exit", f"an edge that leaves {name} and improves the objective"))
    if few and not all(found.improves for found in bases.exits):
        rows.append(KeyRow("other exit", f"an edge that leaves {name} without improving it"))
    return rows


def _constraints(bases: Bases) -> list[KeyRow]:
    known, model = letters_of(bases), bases.model
    rows = []
    for name in bases.vertex.active:
        note = "" if name in known else "   (in every basis)" if _held(bases, name) else "   (in no basis)"
        text = f"{name}: {model.constraint(name).text(model.variables)}{note}"
        rows.append(KeyRow("point", text, tag=known.get(name, "")))
    return rows


def _listed(bases: Bases, shown: tuple[int, ...]) -> tuple[KeyRow, ...]:
    """What each basis holds: by name, or where there are many by letters, unless they stand in the discs."""
    if len(shown) <= MOST_LISTED:
        return tuple(KeyRow("point", ", ".join(bases.members[k].held), tag=basis_name(k)) for k in shown)
    if lettered(bases):
        return (KeyRow("point", f"{len(shown)} bases, each named by its letters; pw.bases(...) prints them all"),)
    texts = [f"{basis_name(k)} {spelled(bases, k)}" for k in shown]
    return tuple(KeyRow("point", "   ".join(texts[k : k + ABREAST])) for k in range(0, len(texts), ABREAST))
