"""Many models at once: order, groups, failures kept, workers that die, Ctrl-C, and a cluster's executor."""

import pickle
import sys
from concurrent.futures import ProcessPoolExecutor, ThreadPoolExecutor
from dataclasses import replace
from multiprocessing import get_context
from pathlib import Path

import pytest

import polywalk as pw
from polywalk.errors import ModelError, SolverError, UnknownName
from polywalk.sweeping.work import general

sys.path.insert(0, str(Path(__file__).parent))
import asked


def plants(count):
    """Harbour Row with another pipe each time; every fifth cannot be run at all."""
    row = pw.scenarios.harbour_row()
    sizes = [12 - k % 4 if k % 5 else -1 for k in range(1, count + 1)]
    return [replace(row.with_rhs("harbour main", size), name=f"model {k}") for k, size in enumerate(sizes, 1)]


@pytest.fixture(scope="module")
def pool():
    with ProcessPoolExecutor(2, mp_context=get_context("spawn")) as executor:
        yield executor


def test_results_come_in_order_and_are_those_of_the_function():
    models = plants(10)
    found = pw.sweep(models, what="region")
    assert [item.name for item in found.items] == [f"model {k}" for k in range(1, 11)]
    assert found.results == tuple(pw.region(model) for model in models)
    assert found.failed == ()


def test_processes_threads_and_this_process_agree(pool):
    models = plants(30)
    here = pw.sweep(models, what="region")
    assert pw.sweep(models, what="region", executor=pool) == here
    with ThreadPoolExecutor(2) as threads:
        assert pw.sweep(models, what="region", executor=threads) == here


def test_groups_are_few_and_cover_every_model():
    found = pw.sweep(plants(40), what="region")
    assert {group.kind for group in found.groups} == {"shape"}
    assert len(found.groups) <= 5
    assert sorted(name for group in found.groups for name in group.names) == sorted(item.name for item in found.items)
    empty = next(group for group in found.groups if group.what == "empty")
    assert (empty.names[0], len(empty.names)) == ("model 5", 8)
    assert all(found.item(name).result.status == "empty" for name in empty.names)
    sizes = [len(group.names) for group in found.groups]
    assert sizes == sorted(sizes, reverse=True)


def test_a_review_of_many_tells_its_findings_once(pool):
    found = pw.sweep({f"hour {k}": model for k, model in enumerate(plants(20), 1)}, executor=pool)
    assert found.what == "review"
    assert found.groups[0].kind == "error"
    assert found.groups[0].names == ("hour 5", "hour 10", "hour 15", "hour 20")
    assert found.item("hour 5").result.findings[0].severity == "error"
    assert len(found.groups) < 25
    assert "hour 5" in str(found)


def test_a_result_travels_packed_and_is_unpacked_when_read():
    item = pw.sweep(plants(1), what="region").items[0]
    once = pickle.loads(pickle.dumps(item))
    twice = pickle.loads(pickle.dumps(once))
    assert "result" not in vars(once)
    assert once.result == item.result
    assert "result" in vars(once)
    assert "result" not in vars(twice)
    assert twice == item
    with pytest.raises(AttributeError, match="nonsense"):
        item.nonsense  # noqa: B018


def test_the_odd_one_out_is_named_with_its_numbers():
    row = pw.scenarios.harbour_row()
    models = {f"main {k}": row.with_rhs("harbour main", 12 + k % 3) for k in range(40)}
    models["slip"] = row.with_rhs("harbour main", -12)
    found = pw.sweep(models)
    worst = found.groups[0]
    assert (worst.kind, worst.names) == ("error", ("slip",))
    assert "#" not in worst.what
    assert not any(group.what.startswith("conflict") for group in found.groups)
    assert next(iter(found.alone)) == "slip"
    assert found.alone["slip"] == sum(group.names == ("slip",) for group in found.groups) > 2
    assert f"like no other, in so many lines: slip ({found.alone['slip']})" in str(found)
    shared = [group for group in found.groups if len(group.names) > 1]
    assert any("#" in group.what for group in shared)
    assert "like no other" not in str(pw.sweep(dict(list(models.items())[:3])))


def test_a_failure_stays_with_its_model(pool):
    for executor in (None, pool):
        found = pw.sweep(plants(8), what=asked.refuses_three, executor=executor)
        assert [item.name for item in found.failed] == ["model 3"]
        assert found.item("model 3").error.culprit == "model 3"
        assert found.results[3] == pw.region(plants(8)[3])
        assert (found.groups[0].kind, found.groups[0].what) == ("failed", "3 is not to be had")
        assert "7 done, 1 failed" in str(found)


def test_a_worker_that_dies_is_told_and_what_was_done_is_kept():
    with ProcessPoolExecutor(1, mp_context=get_context("spawn")) as executor:
        found = pw.sweep(plants(6), what=asked.dies_at_three, executor=executor)
    assert [item.name for item in found.items] == [f"model {k}" for k in range(1, 7)]
    lost = found.item("model 3").error
    assert isinstance(lost, SolverError)
    assert "died" in str(lost)
    assert "model 3" in str(lost)
    assert found.results[0] == pw.region(plants(6)[0])
    assert found.results[1] is not None
    again = pw.sweep([model for model in plants(6) if found.item(model.name).error], what="region")
    assert again.failed == ()


def test_a_pool_that_is_shut_loses_nothing_silently():
    executor = ThreadPoolExecutor(1)
    executor.shutdown()
    found = pw.sweep(plants(3), what="region", executor=executor)
    assert len(found.failed) == 3
    assert "could not take the work" in str(found)


def test_what_cannot_travel_is_told(pool):
    found = pw.sweep(plants(2), what=lambda model: model, executor=pool)
    assert len(found.failed) == 2
    assert "pickle" in str(found).lower()


def test_results_that_cannot_be_pickled_come_back_from_threads():
    with ThreadPoolExecutor(2) as threads:
        found = pw.sweep(plants(3), what=lambda model: lambda: model.name, executor=threads)
    assert [result() for result in found.results] == ["model 1", "model 2", "model 3"]


def test_ctrl_c_keeps_what_is_done():
    found = pw.sweep(plants(6), what=asked.presses_ctrl_c)
    assert [item.name for item in found.failed] == ["model 3", "model 4", "model 5", "model 6"]
    assert found.results[1] is not None
    assert "interrupted: 4 of 6 models were not done" in str(found)


def test_names():
    models = [replace(model, name="") for model in plants(2)]
    assert [item.name for item in pw.sweep(models, what="optimum").items] == ["model 1", "model 2"]
    assert [item.name for item in pw.sweep({"a": models[0]}, what="walk").items] == ["a"]
    assert pw.sweep([], what="region").items == ()
    with pytest.raises(UnknownName, match="the sweep has no model 'b'"):
        pw.sweep({"a": models[0]}, what="region").item("b")


def test_refusals():
    with pytest.raises(UnknownName, match="did you mean 'region'"):
        pw.sweep([], what="regions")
    with pytest.raises(ModelError, match="'model 2': expected a Model, got int"):
        pw.sweep([plants(1)[0], 3])


@pytest.mark.parametrize(
    ("text", "plain"),
    [
        ("demand[7] misses 2.5 of 1/3", "demand[#] misses # of #"),
        ("x2 and row 12 by -3e-5", "x2 and row # by #"),
        ("≈0.333333 of 3-D", "# of 3-D"),
        ("no number", "no number"),
    ],
)
def test_numbers_that_differ_are_one_text(text, plain):
    assert general(text) == plain


def test_a_local_cluster():
    from distributed import Client, LocalCluster

    with (
        LocalCluster(n_workers=2, threads_per_worker=1, processes=True, dashboard_address=None) as cluster,
        Client(cluster) as client,
    ):
        found = pw.sweep(plants(20), what="region", executor=client.get_executor())
    assert found == pw.sweep(plants(20), what="region")
