"""Many models at once, on one machine or on many: results in order, failures kept, and what they have in common."""

from polywalk.sweeping.results import Group, Item, Sweep
from polywalk.sweeping.run import sweep

__all__ = ["Group", "Item", "Sweep", "sweep"]
