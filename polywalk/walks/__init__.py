"""Pivot walks through a region: rules, starts, and every pivot with all it was decided by."""

from polywalk.walks.order import ORDERS
from polywalk.walks.pivots import Pivot, Ratio
from polywalk.walks.results import Walk
from polywalk.walks.rules import ENTERING, LEAVING
from polywalk.walks.trace import walk

__all__ = ["ENTERING", "LEAVING", "ORDERS", "Pivot", "Ratio", "Walk", "walk"]
