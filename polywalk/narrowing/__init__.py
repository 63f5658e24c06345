"""A big model brought down to two or three decisions: sections, shadows, conflicts, escapes."""

from polywalk.narrowing.answer import Completion
from polywalk.narrowing.axes import Axes, AxisRange, suggest_axes
from polywalk.narrowing.completion import completion
from polywalk.narrowing.conflict import conflict
from polywalk.narrowing.escape import escape
from polywalk.narrowing.results import Shadow, ShadowFacet
from polywalk.narrowing.section import Section, Snap, section
from polywalk.narrowing.settling import Settled
from polywalk.narrowing.shadow import shadow

__all__ = [
    "Axes",
    "AxisRange",
    "Completion",
    "Section",
    "Settled",
    "Shadow",
    "ShadowFacet",
    "Snap",
    "completion",
    "conflict",
    "escape",
    "section",
    "shadow",
    "suggest_axes",
]
