"""Figures: a Scene of plain data from a region and a View, and two painters of it."""

from polywalk.drawing.compose import scene
from polywalk.drawing.interactive import draw, figure
from polywalk.drawing.scene import Scene
from polywalk.drawing.static import Picture, picture
from polywalk.drawing.suspect import before_after
from polywalk.drawing.view import View

__all__ = ["Picture", "Scene", "View", "before_after", "draw", "figure", "picture", "scene"]
