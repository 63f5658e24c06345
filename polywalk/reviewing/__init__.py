"""From a model to findings: the modelling mistake, its proof, and the smallest change that explains it."""

from polywalk.reviewing.codes import CODES
from polywalk.reviewing.expectations import EXPECTATIONS
from polywalk.reviewing.findings import Finding, Proof, Review
from polywalk.reviewing.limits import Limits
from polywalk.reviewing.review import CHECKS, review

__all__ = ["CHECKS", "CODES", "EXPECTATIONS", "Finding", "Limits", "Proof", "Review", "review"]
