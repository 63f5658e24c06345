"""polywalk: see small linear models exactly."""

from importlib import import_module
from importlib.metadata import version
from typing import Any

from polywalk.errors import PolywalkError
from polywalk.exact import exact
from polywalk.model import Constraint, Model, Objective
from polywalk.region import Region, project, region  # at once: the module's own name would hide the function
from polywalk.table import Table

__version__ = version("polywalk")

_ROOMS = {
    "BigModel": "polywalk.bigmodel",
    "Budget": "polywalk.budget",
    "from_algebra": "polywalk.reading",
    "from_arrays": "polywalk.reading",
    "from_highs": "polywalk.reading",
    "from_mps": "polywalk.reading",
    "from_toml": "polywalk.reading",
    "to_mps": "polywalk.reading",
    "to_toml": "polywalk.reading",
    "from_scipy": "polywalk.reading",
    "farkas": "polywalk.linear",
    "improving_ray": "polywalk.linear",
    "optimum": "polywalk.linear",
    "Walk": "polywalk.walks",
    "bases": "polywalk.walks",
    "compare": "polywalk.walks",
    "dual_walk": "polywalk.walks",
    "walk": "polywalk.walks",
    "cones": "polywalk.reviewing",
    "difference": "polywalk.reviewing",
    "explain": "polywalk.reviewing",
    "probe": "polywalk.reviewing",
    "review": "polywalk.reviewing",
    "sensitivity": "polywalk.reviewing",
    "sheet": "polywalk.sheets",
    "suspects": "polywalk.reviewing",
    "value_function": "polywalk.reviewing",
    "versions": "polywalk.reviewing",
    "completion": "polywalk.narrowing",
    "conflict": "polywalk.narrowing",
    "escape": "polywalk.narrowing",
    "section": "polywalk.narrowing",
    "shadow": "polywalk.narrowing",
    "suggest_axes": "polywalk.narrowing",
    "scenarios": "polywalk",
    "sweep": "polywalk.sweeping",
    "View": "polywalk.drawing",
    "before_after": "polywalk.drawing",
    "draw": "polywalk.drawing",
    "picture": "polywalk.drawing",
    "explore": "polywalk.explorer",
}
"""Names that are loaded on first use, and the room each lives in."""

__all__ = [  # noqa: PLE0604
    "Constraint",
    "Model",
    "Objective",
    "PolywalkError",
    "Region",
    "Table",
    "exact",
    "project",
    "region",
    *sorted(_ROOMS),
]


def __getattr__(name: str) -> Any:
    if name not in _ROOMS:
        raise AttributeError(f"module 'polywalk' has no attribute {name!r}")
    if name == "scenarios":
        return import_module("polywalk.scenarios")
    value = getattr(import_module(_ROOMS[name]), name)
    globals()[name] = value
    return value


def __dir__() -> list[str]:
    return [*__all__, "__version__"]
