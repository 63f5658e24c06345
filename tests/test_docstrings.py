"""Docstrings of the public names, by the house's rule: what goes in, what comes out, errors, an example, the source."""

import ast
import builtins
import inspect
import re
import textwrap

import pytest

import polywalk as pw
from polywalk import errors

PUBLIC = {name: getattr(pw, name) for name in pw.__all__ if name != "scenarios"}
PUBLIC |= {name: getattr(pw.scenarios, name) for name in pw.scenarios.__all__ if callable(getattr(pw.scenarios, name))}
CLASSES = {name: thing for name, thing in PUBLIC.items() if inspect.isclass(thing)}

WITHOUT_SOURCE = {"Budget", "Constraint", "Model", "Objective", "PolywalkError", "Table", "View"}
"""Classes that only hold what they are given: nothing in them was published by anyone."""

CAUGHT = {"from_toml": {"UnknownName"}}
"""Errors that a helper raises and the function itself catches: from_toml tells them as a FileError."""


def sections(thing):
    """The numpydoc sections of a docstring, by title."""
    parts = re.split(r"^(\w[\w ]*)\n-+$", inspect.getdoc(thing) or "", flags=re.MULTILINE)
    return dict(zip(parts[1::2], (body.strip("\n") for body in parts[2::2]), strict=True))


def entries(section):
    """(names, type) of each entry: the lines that are not indented."""
    for line in section.splitlines():
        if line and not line.startswith(" "):
            names, _, kind = line.partition(" : ")
            yield [name.lstrip("*") for name in names.split(", ")], kind


def raised(thing):
    """The errors that are raised by the body, or by the private functions of its module that it names, and theirs."""
    first = getattr(thing, "__post_init__", None) if inspect.isclass(thing) else thing
    found, waiting, seen = set(), [first] if first else [], set()
    while waiting:
        function = waiting.pop()
        seen.add(function)
        for node in ast.walk(ast.parse(textwrap.dedent(inspect.getsource(function)))):
            if isinstance(node, ast.Raise) and isinstance(node.exc, ast.Call):
                found.add(ast.unparse(node.exc.func).split(".")[-1])
            near = function.__globals__.get(node.id) if isinstance(node, ast.Name) and node.id[0] == "_" else None
            if inspect.isfunction(near) and near not in seen:
                waiting.append(near)
    return {"UnknownName" if name == "unknown" else name for name in found}


def faults(thing):
    """What the docstring of a function or class lacks or says wrongly."""
    found, told = [], sections(thing)
    taken = [name for name in inspect.signature(thing).parameters if not name.startswith("_")]
    given = list(entries(told.get("Parameters", "")))
    if [name for names, _ in given for name in names] != taken:
        found.append(f"Parameters are not those of the signature: {', '.join(taken)}")
    found += [f"{', '.join(names)}: no type" for names, kind in given if not kind and names != ["changes"]]
    if not inspect.isclass(thing) and inspect.signature(thing).return_annotation != "None" and "Returns" not in told:
        found.append("no Returns")
    listed = [name for names, _ in entries(told.get("Raises", "")) for name in names]
    missing = raised(thing) - set(listed) - CAUGHT.get(thing.__name__, set())
    found += [f"{name} is raised and not listed" for name in sorted(missing)]
    known = {*vars(errors), *vars(builtins)}
    found += [f"no error is called {name}" for name in listed if name not in known]
    used = "" if inspect.isclass(thing) else thing.__name__  # a class is met as what a function hands back
    if not re.search(rf"^(>>>|\.\.\.) .*\b{used}\b", told.get("Examples", ""), re.MULTILINE):
        found.append("no example that uses it")
    if "References" not in told and thing.__name__ not in WITHOUT_SOURCE:
        found.append("no References")
    return found


@pytest.mark.parametrize("name", sorted(PUBLIC))
def test_a_public_docstring_keeps_the_rule(name):
    assert faults(PUBLIC[name]) == []


def results():
    """Every class that a public function hands back."""
    for thing in PUBLIC.values():
        if inspect.isfunction(thing):
            for name in re.findall(r"\w+", inspect.signature(thing).return_annotation):
                kind = thing.__globals__.get(name)
                if inspect.isclass(kind) and kind.__module__.startswith("polywalk."):
                    yield kind


@pytest.mark.parametrize("kind", sorted(set(results()), key=str), ids=lambda kind: kind.__name__)
def test_what_is_handed_back_is_described(kind):
    parts = {"no example that uses it", "no References"}  # of a result these may stand with its function
    assert set(faults(kind)) <= parts
    test_every_public_member_is_described(kind)


@pytest.mark.parametrize("kind", CLASSES.values(), ids=CLASSES)
def test_every_public_member_is_described(kind):
    members = {key: getattr(kind, key) for key in vars(kind) if not key.startswith("_")}
    fields = getattr(kind, "__dataclass_fields__", {})
    assert [key for key, member in members.items() if key not in fields and not inspect.getdoc(member)] == []


def test_what_needs_no_source_is_public():
    assert set(CLASSES) >= WITHOUT_SOURCE
    assert not any("References" in sections(CLASSES[name]) for name in WITHOUT_SOURCE)


def careless(first: int, second: int) -> "int":
    """A sum.

    Parameters
    ----------
    second, first

    Raises
    ------
    SumError
        Never.
    """
    if first < 0:
        raise errors.ModelError("never")
    if first > second:
        raise ValueError("never")
    raise errors.unknown("sum", "x", ())


def test_the_check_can_fail():
    assert faults(careless) == [
        "Parameters are not those of the signature: first, second",
        "second, first: no type",
        "no Returns",
        "ModelError is raised and not listed",
        "UnknownName is raised and not listed",
        "ValueError is raised and not listed",
        "no error is called SumError",
        "no example that uses it",
        "no References",
    ]
