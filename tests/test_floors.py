"""DESIGN's floors, read from the imports: strictly down between rooms; what `import polywalk` loads and offers."""

import ast
import json
import subprocess
import sys
from pathlib import Path

import pytest

import polywalk

PACKAGE = Path(polywalk.__file__).parent

FLOORS = {
    7: ("__main__", "explorer"),
    6: ("sheets",),
    5: ("drawing", "sweeping"),
    4: ("reviewing", "scenarios"),
    3: ("walks", "narrowing"),
    2: ("region", "linear", "reading"),
    1: ("errors", "exact", "table", "rows", "model", "sides", "bigmodel", "budget", "progress"),
}
"""Room -> floor, as in DESIGN section 2."""

GROUND = {"errors": (), "exact": ("errors",), "table": ("errors", "exact"), "rows": ("exact",)}
GROUND |= {"model": ("errors", "exact", "table", "rows")}
GROUND |= {"sides": ("exact", "model"), "bigmodel": ("errors", "exact", "table", "model", "sides")}
GROUND |= {"budget": ("errors",), "progress": ()}
"""Who may import whom on the ground floor: errors < exact < table, rows < model < sides < bigmodel; errors < budget."""

FLOOR = {room: floor for floor, rooms in FLOORS.items() for room in rooms}
LATE = ("plotly", "matplotlib", "ipywidgets", "anywidget", "scipy.optimize", "pandas", "sympy", "IPython")
"""Loaded on first use only."""


def room_of(path):
    return path.relative_to(PACKAGE).parts[0].removesuffix(".py")


def imported_modules(path):
    """Every module a file imports from the package, at its top or inside a function."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from (name.name for name in node.names if name.name.split(".")[0] == "polywalk")
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path.name}: relative imports hide the room; write polywalk.<room>"
            if node.module and node.module.split(".")[0] == "polywalk":
                yield node.module if node.module != "polywalk" else f"polywalk.{node.names[0].name}"


def edges():
    """(file, importing room, imported room) of all imports between rooms; the front door stands above the house."""
    for path in sorted(PACKAGE.rglob("*.py")):
        if path == PACKAGE / "__init__.py":
            continue
        for module in imported_modules(path):
            parts = module.split(".")
            assert len(parts) > 1, f"{path.name}: inside the package import polywalk.<room>, never polywalk itself"
            if parts[1] != room_of(path):
                yield path.relative_to(PACKAGE), room_of(path), parts[1]


def is_allowed(room, other):
    if FLOOR[room] == 1:
        return other in GROUND[room]
    return FLOOR[other] < FLOOR[room]


def test_every_room_has_a_floor():
    rooms = {room_of(path) for path in PACKAGE.rglob("*.py")} - {"__init__"}
    assert rooms <= set(FLOOR)
    assert {"errors", "exact", "table", "rows", "model", "region", "reading", "scenarios"} <= rooms


def test_imports_point_strictly_down():
    found = list(edges())
    assert len(found) > 30  # the reading of imports itself works
    wrong = [f"{path} imports {other}" for path, room, other in found if not is_allowed(room, other)]
    assert wrong == []


@pytest.mark.parametrize(
    ("room", "other", "allowed"),
    [
        ("region", "model", True),
        ("region", "linear", False),
        ("model", "table", True),
        ("table", "model", False),
        ("budget", "exact", False),
        ("budget", "errors", True),
        ("drawing", "explorer", False),
        ("explorer", "walks", True),
    ],
)
def test_the_rule_itself(room, other, allowed):
    assert is_allowed(room, other) is allowed


def loaded_after(code):
    script = f"{code}\nimport sys, json; print(json.dumps(sorted(sys.modules)))"
    answer = subprocess.run([sys.executable, "-c", script], capture_output=True, text=True, check=True, timeout=120)
    return set(json.loads(answer.stdout.splitlines()[-1]))


@pytest.mark.parametrize(
    "code",
    [
        "import polywalk",
        "import polywalk as pw; pw.walk(pw.scenarios.harbour_row(), rule='bland'); pw.optimum(pw.scenarios.beale())",
        "import polywalk as pw; pw.from_arrays([1, 1], [[1, 2]], [3]); pw.from_scipy([1], constraints=([[1]], 0, 1))",
    ],
)
def test_light_work_loads_no_heavy_library(code):
    modules = loaded_after(code)
    assert "polywalk" in modules
    assert modules.isdisjoint(LATE)


def test_rooms_load_on_first_use():
    assert "polywalk.reading" not in loaded_after("import polywalk")
    assert "polywalk.reading" in loaded_after("import polywalk; polywalk.from_algebra")
    assert "plotly" in loaded_after("import polywalk as pw; pw.draw(pw.scenarios.cube(2))")


NAMES = {"Budget", "Constraint", "Model", "Objective", "PolywalkError", "Region", "Table", "View", "Walk", "draw"}
NAMES |= {"exact", "explore", "from_algebra", "from_arrays", "from_scipy", "optimum", "picture", "project", "region"}
NAMES |= {"compare", "bases", "dual_walk", "farkas", "improving_ray", "scenarios", "walk"}
NAMES |= {"before_after", "probe", "review", "suspects"}
NAMES |= {"BigModel", "from_highs", "from_mps", "from_toml", "sweep", "to_mps", "to_toml"}
NAMES |= {"cones", "difference", "explain", "sensitivity", "sheet", "value_function", "versions"}
NAMES |= {"completion", "conflict", "escape", "section", "shadow", "suggest_axes"}


def test_public_names_are_pinned():
    assert set(polywalk.__all__) == NAMES
    assert len(polywalk.__all__) == len(NAMES)
    assert set(dir(polywalk)) == NAMES | {"__version__"}


@pytest.mark.parametrize("name", sorted(NAMES))
def test_every_public_name_is_there_and_documented(name):
    found = getattr(polywalk, name)
    assert found.__doc__


def test_an_unknown_name_is_an_attribute_error():
    with pytest.raises(AttributeError, match="has no attribute 'tableau'"):
        polywalk.tableau  # noqa: B018
    assert not hasattr(polywalk, "__wrapped__")


def test_version_comes_from_the_metadata():
    from importlib.metadata import version

    assert polywalk.__version__ == version("polywalk")
