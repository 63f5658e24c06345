"""From a model to findings: the modelling mistake, its proof, and the smallest change that explains it."""

from polywalk.reviewing.codes import CODES
from polywalk.reviewing.cones import Cones, cones
from polywalk.reviewing.difference import Difference, difference
from polywalk.reviewing.expectations import EXPECTATIONS
from polywalk.reviewing.explain import Explanation, explain
from polywalk.reviewing.findings import Finding, Proof, Review
from polywalk.reviewing.limits import Limits
from polywalk.reviewing.probe import Probe, probe
from polywalk.reviewing.review import CHECKS, review
from polywalk.reviewing.sensitivity import Sensitivity, sensitivity
from polywalk.reviewing.suspects import Suspect, Suspects, suspects
from polywalk.reviewing.value import ValueFunction, value_function
from polywalk.reviewing.versions import Versions, versions

__all__ = [
    "CHECKS",
    "CODES",
    "EXPECTATIONS",
    "Cones",
    "Difference",
    "Explanation",
    "Finding",
    "Limits",
    "Probe",
    "Proof",
    "Review",
    "Sensitivity",
    "Suspect",
    "Suspects",
    "ValueFunction",
    "Versions",
    "cones",
    "difference",
    "explain",
    "probe",
    "review",
    "sensitivity",
    "suspects",
    "value_function",
    "versions",
]
