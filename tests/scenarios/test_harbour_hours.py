"""Harbour Row over many hours: sizes, structure, and that it has an optimum at every length."""

import numpy as np
import pytest

from polywalk.errors import ModelError
from polywalk.linear import optimum
from polywalk.reading.highs import quiet_solver
from polywalk.reading.mps_write import to_mps
from polywalk.scenarios import harbour_day, harbour_year


def solved(big, folder):
    to_mps(big, folder / "hours.mps")
    solver = quiet_solver()
    solver.readModel(str(folder / "hours.mps"))
    solver.run()
    return solver


def test_sizes_and_names():
    big = harbour_year()
    assert (big.n, big.m) == (35_040, 52_561)
    assert big.nonzeros == 8_760 * 13 + 8_760
    assert {"pump[7]", "chips[8760]", "tank[1]", "level[24]"} <= set(big.variables)
    assert big.row("storage[1]") == {"tank[1]": 1, "level[1]": 1, "level[8760]": -0.99}
    assert big.unit("level[3]") == "MWh"


def test_the_numbers_are_believable():
    big = harbour_year()
    demand = big.row_lower[[big.row_index(f"demand[{t}]") for t in range(1, 8_761)]]
    assert 1.5 < demand.min() < 3
    assert 9 < demand.max() < 12
    cost = big.cost[::4]
    assert 14 < cost.min() < 25
    assert 45 < cost.max() < 62


@pytest.mark.parametrize("hours", [2, 3, 5, 12, 24, 168, 1_000])
def test_an_optimum_at_every_length(tmp_path, hours):
    solver = solved(harbour_year(hours), tmp_path)
    assert solver.modelStatusToString(solver.getModelStatus()) == "Optimal"


def test_the_year_has_an_optimum_in_which_the_tank_works(tmp_path):
    big = harbour_year()
    solver = solved(big, tmp_path)
    assert solver.modelStatusToString(solver.getModelStatus()) == "Optimal"
    point = np.array(solver.getSolution().col_value)
    assert np.ptp(point[3::4]) > 11
    assert (point[2::4] > 0.1).any()
    assert (point[2::4] < -0.1).any()
    assert {round(value, 6) for value in point[1::4]} > {0.0}


def test_the_exact_optimum_of_a_short_time_is_that_of_highs(tmp_path):
    big = harbour_year(4)
    value = solved(big, tmp_path).getInfoValue("objective_function_value")[1]
    assert float(optimum(big.to_model()).value) == pytest.approx(value, rel=1e-9)


def test_a_day():
    assert harbour_day() == harbour_year(24)


@pytest.mark.parametrize("hours", [1, 0, -3, 2.5, True, "24"])
def test_a_length_that_is_none(hours):
    with pytest.raises(ModelError, match="at least 2 whole hours"):
        harbour_year(hours)
