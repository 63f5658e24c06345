"""A big model brought down to two or three decisions: sections, shadows, conflicts, escapes."""

from polywalk.narrowing.results import Shadow, ShadowFacet
from polywalk.narrowing.shadow import shadow

__all__ = ["Shadow", "ShadowFacet", "shadow"]
