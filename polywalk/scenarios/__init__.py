"""Models to try: our own scenario Harbour Row with its variants, and published hard instances by their usual names."""

from polywalk.scenarios.cubes import cross_polytope, cube, goldfarb, klee_minty
from polywalk.scenarios.harbour import VARIANTS, harbour_row
from polywalk.scenarios.harbour_hours import harbour_day, harbour_year
from polywalk.scenarios.published import beale, chvatal, circling, kuhn

__all__ = [
    "VARIANTS",
    "beale",
    "chvatal",
    "circling",
    "cross_polytope",
    "cube",
    "goldfarb",
    "harbour_day",
    "harbour_row",
    "harbour_year",
    "klee_minty",
    "kuhn",
]
