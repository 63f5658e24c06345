"""Pivot walks through a region: rules, starts, and every pivot with all it was decided by."""

from polywalk.walks.bases import Bases, bases
from polywalk.walks.basis import Basis, Exchange, Exit, basis_name
from polywalk.walks.compare import compare
from polywalk.walks.comparison import Comparison
from polywalk.walks.dual import DUAL_LEAVING, dual_walk
from polywalk.walks.dual_pivots import DualPivot, DualRatio
from polywalk.walks.order import ORDERS
from polywalk.walks.pivots import Pivot, Ratio
from polywalk.walks.results import Walk
from polywalk.walks.routes import Route
from polywalk.walks.rules import ENTERING, LEAVING
from polywalk.walks.trace import walk

__all__ = [
    "DUAL_LEAVING",
    "ENTERING",
    "LEAVING",
    "ORDERS",
    "Bases",
    "Basis",
    "Comparison",
    "DualPivot",
    "DualRatio",
    "Exchange",
    "Exit",
    "Pivot",
    "Ratio",
    "Route",
    "Walk",
    "bases",
    "basis_name",
    "compare",
    "dual_walk",
    "walk",
]
