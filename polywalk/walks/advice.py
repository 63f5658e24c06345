"""Which rule to trust, in a sentence that follows from the standings and claims nothing beyond them."""

from __future__ import annotations

from collections.abc import Sequence
from fractions import Fraction

from polywalk.exact import short
from polywalk.walks.standings import Standing

MOST_NAMED = 3
"""Past this many starts a sentence names the first ones and counts the rest."""


def rank(standing: Standing) -> tuple[int, int, Fraction]:
    """What pairs are ordered by, best first: starts without an end, worst case, mean number of pivots."""
    return len(standing.unfinished), max(standing.pivots, default=0), standing.mean or Fraction(0)


def best(standings: Sequence[Standing]) -> list[Standing]:
    """The pairs that no other is ranked above, in the order they were compared."""
    top = min(rank(standing) for standing in standings)
    return [standing for standing in standings if rank(standing) == top]


def advice(standings: Sequence[Standing]) -> str:
    """The recommendation.

    Parameters
    ----------
    standings : sequence of Standing
        One a pair, all over the same starts; none where nothing was finished.
    """
    if not standings:
        return "recommendation: none, since no start was walked from by every rule."
    chosen = best(standings)
    failing = [standing for standing in standings if standing.unfinished]
    if chosen[0].unfinished:
        text = _least_bad(chosen, standings)
        failing = [standing for standing in failing if standing not in chosen]
    else:
        text = _good(chosen, standings)
    warnings = "".join(f"; {_warning(standing, standings)}" for standing in failing)
    return f"recommendation: {text}{warnings}. It holds for this model and these starts, and proves nothing for others."


def _good(chosen: list[Standing], standings: Sequence[Standing]) -> str:
    names, several = _names(chosen, standings), len(chosen) > 1
    first = chosen[0]
    needs = "each need" if several else "needs"
    if len(first.tallies) == 1:
        count = f"{needs} {_pivots(first.pivots[-1])} from {first.tallies[0].start.name}"
    else:
        ends = "end" if several else "ends"
        mean = f", {short(first.mean)} on average" if first.mean is not None else ""
        count = f"{ends} from all {len(first.tallies)} starts and {needs} at most {_pivots(first.pivots[-1])}{mean}"
    return f"{names} {count}{_reason(chosen, standings)}{_unbeatable(first)}"


def _reason(chosen: list[Standing], standings: Sequence[Standing]) -> str:
    """By what the chosen pairs are ahead of the others that end everywhere, if by anything."""
    others = [one for one in standings if one not in chosen and not one.unfinished]
    if len(standings) == 1:
        return "; nothing else was compared"
    if len(chosen) == len(standings):
        return ", all that were compared: nothing here tells them apart"
    if not others:
        return ", and nothing else compared ends from every start" if len(chosen[0].tallies) > 1 else ""
    if min(one.pivots[-1] for one in others) > chosen[0].pivots[-1]:
        return ", fewer than any other" if len(chosen[0].tallies) == 1 else ", the lowest worst case of all compared"
    return ", the lowest mean among those with the lowest worst case"


def _unbeatable(standing: Standing) -> str:
    """Said where every walk took as few pivots as the shortest improving path has moves."""
    alike = all(tally.improving is not None and tally.pivots == tally.improving for tally in standing.tallies)
    return ", and no rule can need fewer" if alike else ""


def _least_bad(chosen: list[Standing], standings: Sequence[Standing]) -> str:
    count, all_starts = len(chosen[0].unfinished), len(chosen[0].tallies)
    if all_starts == 1:
        return f"none of these: {_names(standings, standings)} all fail to end from {chosen[0].tallies[0].start.name}"
    fails = "fail" if len(chosen) > 1 else "fails"
    return (
        f"none of these ends from every start; {_names(chosen, standings)} {fails} from the fewest, "
        f"{count} of {all_starts}"
    )


def _warning(standing: Standing, standings: Sequence[Standing]) -> str:
    cycles = [start.name for start in standing.cycles]
    stopped = [start.name for start in standing.unfinished if start not in standing.cycles]
    parts = [f"cycles from {_listed(cycles)}"] if cycles else []
    parts += [f"was stopped at the limit from {_listed(stopped)}"] if stopped else []
    return f"{_names([standing], standings)} {' and '.join(parts)}"


def _names(chosen: Sequence[Standing], standings: Sequence[Standing]) -> str:
    """The pairs by name; the leaving rule is left out where all that were compared share it."""
    shared = len({standing.pair.leaving for standing in standings}) == 1
    names = [one.pair.rule if shared else f"{one.pair.rule} with {one.pair.leaving}" for one in chosen]
    return names[0] if len(names) == 1 else f"{', '.join(names[:-1])} and {names[-1]}"


def _listed(names: list[str]) -> str:
    more = len(names) - MOST_NAMED
    shown = names if more <= 0 else [*names[:MOST_NAMED], f"{more} more"]
    return shown[0] if len(shown) == 1 else f"{'; '.join(shown[:-1])} and {shown[-1]}"


def _pivots(number: int) -> str:
    return f"{number} pivot" if number == 1 else f"{number} pivots"
