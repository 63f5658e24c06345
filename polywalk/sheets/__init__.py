"""The design-review sheet: one HTML file that explains a model to people who have no Python."""

from polywalk.sheets.sheet import SECTIONS, Sheet, sheet

__all__ = ["SECTIONS", "Sheet", "sheet"]
