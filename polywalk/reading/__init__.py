"""Sources of models: algebra typed as text, and the arguments of scipy's two solvers."""

from polywalk.reading.algebra import from_algebra
from polywalk.reading.arrays import from_arrays
from polywalk.reading.milp import from_scipy

__all__ = ["from_algebra", "from_arrays", "from_scipy"]
