"""The exact dictionary, the exact optimum, and the proofs of either."""

from polywalk.linear.certificates import Farkas, ImprovingRay, farkas, improving_ray
from polywalk.linear.crash import Crash, Swap, crash
from polywalk.linear.dictionary import Dictionary, dictionary_of
from polywalk.linear.program import Optimum, optimum
from polywalk.linear.slacks import Slack, Slacks, slacks_of

__all__ = [
    "Crash",
    "Dictionary",
    "Farkas",
    "ImprovingRay",
    "Optimum",
    "Slack",
    "Slacks",
    "Swap",
    "crash",
    "dictionary_of",
    "farkas",
    "improving_ray",
    "optimum",
    "slacks_of",
]
