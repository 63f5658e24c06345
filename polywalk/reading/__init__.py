"""Sources of models: algebra as text, the arguments of scipy's two solvers, files, and HiGHS."""

from importlib import import_module
from typing import Any

from polywalk.reading.algebra import from_algebra
from polywalk.reading.arrays import from_arrays
from polywalk.reading.milp import from_scipy

_LATE = {
    "from_highs": "polywalk.reading.highs",
    "from_mps": "polywalk.reading.mps",
    "from_toml": "polywalk.reading.toml",
    "to_mps": "polywalk.reading.mps_write",
    "to_toml": "polywalk.reading.toml_write",
}
"""Files are read less often than algebra; their parts load on first use."""

__all__ = ["from_algebra", "from_arrays", "from_scipy", *sorted(_LATE)]  # noqa: PLE0604


def __getattr__(name: str) -> Any:
    if name not in _LATE:
        raise AttributeError(f"module 'polywalk.reading' has no attribute {name!r}")
    return getattr(import_module(_LATE[name]), name)
