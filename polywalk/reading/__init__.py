"""Sources of models: algebra typed as text."""

from polywalk.reading.algebra import from_algebra

__all__ = ["from_algebra"]
