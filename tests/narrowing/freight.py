"""A seeded model of 3,600 variables: shipments between depots and towns, and totals that weigh them.

Made for this project; the numbers are random, short decimals as people type them.
"""

from __future__ import annotations

import numpy as np

from polywalk.bigmodel import BigModel

DEPOTS, TOWNS, TOTALS = 44, 81, 36


def freight(seed: int, shared: int = 12, own: int = 20) -> BigModel:
    """DEPOTS x TOWNS shipments and TOTALS weighed sums of them: 44 * 81 + 36 = 3,600 variables.

    Each depot has a supply, each town a demand, each lane a capacity. A total (tonne-kilometres, hours, litres of fuel)
    weighs ``shared`` lanes that all totals count, each in its own way, and ``own`` lanes of its own.
    """
    draw = np.random.default_rng(seed)
    lanes = DEPOTS * TOWNS
    place = np.arange(lanes).reshape(DEPOTS, TOWNS)
    rows = [(place[d], np.ones(TOWNS)) for d in range(DEPOTS)] + [(place[:, t], np.ones(DEPOTS)) for t in range(TOWNS)]
    common = draw.choice(lanes, shared, replace=False)
    for k in range(TOTALS):
        alone = draw.choice(np.setdiff1d(place.ravel(), common), own, replace=False)
        used = np.concatenate([common, alone])
        weights = np.round(draw.uniform(0.5, 4.0, len(used)), 1)
        rows.append((np.append(used, lanes + k), np.append(weights, -1.0)))
    supply, demand = draw.integers(180, 260, DEPOTS), draw.integers(60, 100, TOWNS)
    n = lanes + TOTALS
    return BigModel(
        (*(f"lane[{d},{t}]" for d in range(DEPOTS) for t in range(TOWNS)), *(f"total[{k}]" for k in range(TOTALS))),
        (
            *(f"supply[{d}]" for d in range(DEPOTS)),
            *(f"demand[{t}]" for t in range(TOWNS)),
            *(f"sum[{k}]" for k in range(TOTALS)),
        ),
        np.cumsum([0, *(len(places) for places, _ in rows)]),
        np.concatenate([places for places, _ in rows]),
        np.concatenate([values for _, values in rows]),
        np.concatenate([np.full(DEPOTS, -np.inf), demand, np.zeros(TOTALS)]),
        np.concatenate([supply, np.full(TOWNS, np.inf), np.zeros(TOTALS)]),
        np.zeros(n),
        np.concatenate([draw.integers(8, 40, lanes), np.full(TOTALS, np.inf)]),
        np.concatenate([draw.integers(10, 90, lanes), np.zeros(TOTALS)]),
        "min",
        name="freight",
    )
