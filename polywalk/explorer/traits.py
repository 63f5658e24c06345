"""The explorer's traits: what a notebook can read, observe and set."""

from __future__ import annotations

from traitlets import Any as AnyTrait
from traitlets import Bool, Dict, HasTraits, Instance, Int, Tuple, Unicode

from polywalk.explorer.settling import Settled
from polywalk.model import Model
from polywalk.region import Region
from polywalk.reviewing import Review

SETTABLE = ("off", "rules", "leaving", "start", "axes", "step", "vertex", "number", "finding", "camera", "dark")
"""In this order, for another rule begins its walk anew and a step moves the selection along."""


class Traits(HasTraits):
    """What the explorer shows.

    Traits
    ------
    model : Model
        The model as edited, without the constraints that are switched off.
    off : tuple of str
        The constraints that are switched off.
    vertex : int or None
        Index of the selected vertex in ``region.vertices``.
    number : ("right-hand side", constraint) or ("cost", variable)
        Which number the slider changes; a right-hand side also selects its constraint's row.
    finding : int or None
        Index of the selected finding in ``review.findings``; its evidence is marked in the picture.
    rules : tuple of str
        The pivot rules that are walked; the first is the one that is stepped through.
    leaving : str
        The leaving rule of all walks.
    start : None or whatever ``walk`` takes as its start
    step : int or None
        The first walk is shown up to this pivot (0: its start); None shows it whole.
    axes : tuple of str or None
        The variables that are drawn; None draws all of a model with at most three.
    camera : dict or None
        As in plotly's ``layout.scene.camera``; follows what the user does in the page.
    dark : bool
        Whether the page is dark.
    whole : Model, read only
        The model with every constraint, those that are switched off, too.
    region : Region or None, read only
        None while a large model's vertices are not listed.
    walks, refusal : tuple of Walk, str, read only
        The walks, and why there is none (""  where there is).
    settled, review : Settled or None, Review or None, read only
        What was found when the input rested last, and the review in it.
    stale : bool, read only
        Whether the model has changed since then.
    picture : (Region or None, View), read only
        What is drawn.
    version : int, read only
        Counts the changes of the state: one for each, when all else has settled.
    """

    model = Instance(Model)
    off = Tuple()
    vertex = Int(None, allow_none=True)
    number = Tuple()
    finding = Int(None, allow_none=True)
    rules = Tuple(("dantzig",))
    leaving = Unicode("lowest-index")
    start = AnyTrait(None, allow_none=True)
    step = Int(None, allow_none=True)
    axes = Tuple(default_value=None, allow_none=True)
    camera = Dict(default_value=None, allow_none=True)
    dark = Bool(False)
    whole = Instance(Model, read_only=True)
    region = Instance(Region, allow_none=True, read_only=True)
    walks = Tuple(read_only=True)
    refusal = Unicode("", read_only=True)
    settled = Instance(Settled, allow_none=True, read_only=True)
    review = Instance(Review, allow_none=True, read_only=True)
    stale = Bool(True, read_only=True)
    picture = Tuple(read_only=True)
    version = Int(0, read_only=True)
