"""The names along one side of a model, and how each labelled array is put into their order."""

from __future__ import annotations

from collections.abc import Hashable, Iterable, Sequence
from dataclasses import dataclass

from polywalk.errors import DuplicateName, ModelError
from polywalk.reading.grid import Labels

Source = tuple[str, int, Labels | None]
"""Which array, how many entries it has along this side, and their labels."""


@dataclass(frozen=True)
class Axis:
    """The names of the variables, or of the rows, in the model's order.

    ``named`` tells whether labels decide (then labelled arrays are reordered) or only positions do.
    """

    kind: str
    names: tuple[str, ...]
    named: bool

    def order(self, where: str, labels: Labels | None) -> Sequence[int]:
        """Where each name of the axis stands in an array with these labels."""
        plain = range(len(self.names))
        if labels is None or not self.named:
            return plain
        names = _names(self.kind, where, labels)
        if set(names) == set(self.names):
            places = {name: place for place, name in enumerate(names)}
            return [places[name] for name in self.names]
        if _is_numbering(labels):
            return plain
        raise _different(self.kind, where, names, self.names)


def axis(kind: str, prefix: str, sources: Iterable[Source], given: Sequence[str] | None = None) -> Axis:
    """The axis of several arrays: names that were given, else the first labels, else numbers after a prefix.

    pandas numbers rows 0, 1, 2 ... when no one named them: such a numbering counts as no labels.

    Raises
    ------
    ModelError
        Arrays of different lengths, or labelled arrays whose labels differ.
    DuplicateName
        A label that occurs twice.
    """
    listed = list(sources)
    size = _common_size(kind, listed)
    if given is not None:
        names = tuple(given) if not isinstance(given, str) else (given,)
        if len(names) != size:
            raise ModelError(f"expected {size} names of {kind}s, got {len(names)}: {', '.join(names)}.", given)
        return Axis(kind, names, named=True)
    for where, _, labels in listed:
        if labels is not None and not _is_numbering(labels):
            return Axis(kind, _names(kind, where, labels), named=True)
    return Axis(kind, tuple(f"{prefix}{number}" for number in range(1, size + 1)), named=False)


def _common_size(kind: str, sources: list[Source]) -> int:
    first, size, _ = sources[0]
    for where, other, _ in sources[1:]:
        if other != size:
            raise ModelError(
                f"{where} has {other} {kind}s but {first} has {size}; both need one entry a {kind}.", (first, where)
            )
    return size


def _is_numbering(labels: Labels) -> bool:
    return labels == tuple(range(len(labels)))


def _names(kind: str, where: str, labels: Labels) -> tuple[str, ...]:
    names = tuple(_name(kind, label) for label in labels)
    seen: set[str] = set()
    for name in names:
        if name in seen:
            raise DuplicateName(f"{where}: the label {name!r} occurs twice; give each {kind} a label of its own.", name)
        seen.add(name)
    return names


def _name(kind: str, label: Hashable) -> str:
    """Text as it is; 7 becomes x[7] or row 7; ("pump", 7) becomes pump[7]."""
    if isinstance(label, tuple) and label:
        return f"{label[0]}[{','.join(str(part) for part in label[1:])}]"
    if isinstance(label, str):
        return label
    return f"x[{label}]" if kind == "variable" else f"row {label}"


def _different(kind: str, where: str, names: Sequence[str], expected: Sequence[str]) -> ModelError:
    missing = [name for name in expected if name not in names]
    surplus = [name for name in names if name not in expected]
    parts = [f"lacks {', '.join(missing[:5])}"] * bool(missing) + [f"has {', '.join(surplus[:5])} instead"] * bool(
        surplus
    )
    return ModelError(
        f"{where}: its labels are not those of the {kind}s: it {' and '.join(parts)}; rename them, or pass "
        "to_numpy() if the order alone is right.",
        where,
    )
