"""The notebook widget: only wiring and layout; everything shown is computed on the floors below."""

from polywalk.explorer.explorer import Explorer, explore

__all__ = ["Explorer", "explore"]
