"""Models to try: our own scenario Harbour Row with its variants, and published hard instances by their usual names."""

from polywalk.scenarios.harbour import VARIANTS, harbour_row
from polywalk.scenarios.published import beale, chvatal, circling, cross_polytope, cube, klee_minty, kuhn

__all__ = [
    "VARIANTS",
    "beale",
    "chvatal",
    "circling",
    "cross_polytope",
    "cube",
    "harbour_row",
    "klee_minty",
    "kuhn",
]
