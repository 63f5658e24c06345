"""One question asked of many models, by whatever executor there is."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterable, Iterator, Mapping
from concurrent.futures import CancelledError, Executor, Future
from math import ceil
from typing import Any

from polywalk.errors import ModelError, SolverError, unknown
from polywalk.model import Model
from polywalk.progress import progress
from polywalk.sweeping.results import Item, Sweep, merged
from polywalk.sweeping.work import QUESTIONS, answers, failure

Models = list[tuple[str, Model]]

LARGEST_CHUNK = 50
"""Models that travel together: enough to outweigh the way, few enough that progress is seen and little is lost."""

SHARE = 8
"""Chunks for each processor, so that all are busy to the end."""


def sweep(
    models: Mapping[str, Model] | Iterable[Model],
    what: str | Callable[[Model], Any] = "review",
    executor: Executor | None = None,
) -> Sweep:
    """Ask one question of many models.

    Parameters
    ----------
    models : mapping of name to Model, or iterable of Model
        Without names they are called by their own names, or "model 1" and so on where these are empty or repeat.
    what : str or callable, optional
        "review", "region", "optimum", "walk", "sensitivity", or a function of one model that can be pickled.
    executor : concurrent.futures.Executor, optional
        Where the work is done: a ProcessPoolExecutor for the processors of this machine, the executor of a cluster
        (dask: ``Client(...).get_executor()``). It is used, not shut down. By default the work is done right here.

    Returns
    -------
    Sweep
        With ``items``, ``item(name)``, ``results``, ``groups``, ``alone`` (models like no other) and ``failed``.
        Results in the order of the models. A model that fails, or whose worker dies, has its error in its item, and
        nothing of the others is lost; Ctrl-C keeps what is done and marks the rest.

    Raises
    ------
    UnknownName, ModelError
        A question that is none of these, something that is no Model.

    Examples
    --------
    >>> import polywalk as pw
    >>> hours = [pw.scenarios.harbour_row().with_rhs("quay pipe", size) for size in (8, 7, -1)]
    >>> print(pw.sweep(hours, what="optimum").results[1].value)
    287

    On all processors (in a script under ``if __name__ == "__main__":``)::

        from concurrent.futures import ProcessPoolExecutor
        with ProcessPoolExecutor() as pool:
            found = pw.sweep(hours, executor=pool)

    References
    ----------
    Quinlan, PEP 3148: futures, execute computations asynchronously, 2009 (executors).
    """
    if isinstance(what, str) and what not in QUESTIONS:
        raise unknown("question", what, QUESTIONS, "a sweep")
    listed = _named(models)
    label = what if isinstance(what, str) else getattr(what, "__name__", "results")
    chunks = _chunks(listed)
    if executor is None:
        done: Iterator[list[Item]] = (answers(what, [pair]) for pair in listed)
        return _gathered(label, done, [[pair] for pair in listed])
    return _spread(label, what, executor, chunks)


def _named(models: Mapping[str, Model] | Iterable[Model]) -> Models:
    if isinstance(models, Mapping):
        listed = list(models.items())
    else:
        given = list(models)
        names = [getattr(model, "name", "") for model in given]
        own = all(names) and len(set(names)) == len(names)
        listed = [
            (name if own else f"model {k}", model) for k, (name, model) in enumerate(zip(names, given, strict=True), 1)
        ]
    for name, model in listed:
        if not isinstance(model, Model):
            raise ModelError(f"{name!r}: expected a Model, got {type(model).__name__}.", name)
    return listed


def _chunks(listed: Models) -> list[Models]:
    size = max(1, min(LARGEST_CHUNK, ceil(len(listed) / (SHARE * (os.cpu_count() or 1)))))
    return [listed[start : start + size] for start in range(0, len(listed), size)]


def _spread(label: str, what: Any, executor: Executor, chunks: list[Models]) -> Sweep:
    futures: list[Future[list[Item]] | BaseException] = []
    for chunk in chunks:
        try:
            futures.append(executor.submit(answers, what, chunk))
        except Exception as error:  # a pool broken meanwhile takes no more work
            futures.append(error)
    try:
        done = (_result(future, chunk) for future, chunk in zip(futures, chunks, strict=True))
        return _gathered(label, done, chunks)
    finally:
        for future in futures:
            if isinstance(future, Future):
                future.cancel()


def _gathered(label: str, done: Iterator[list[Item]], chunks: list[Models]) -> Sweep:
    """All items in order; Ctrl-C marks those not done yet."""
    total = sum(map(len, chunks))
    found: list[Item] = []
    counted = (item for part in done for item in part)
    try:
        found.extend(progress(counted, total, "models"))
    except KeyboardInterrupt:
        names = [name for chunk in chunks for name, _ in chunk][len(found) :]
        stopped = [
            failure(name, SolverError("interrupted before it was done; sweep it again.", name)) for name in names
        ]
        return merged(label, (found, stopped), (f"interrupted: {len(names)} of {total} models were not done",))
    return merged(label, (found,))


def _result(future: Future[list[Item]] | BaseException, chunk: Models) -> list[Item]:
    if isinstance(future, BaseException):
        return _failures(future, chunk)
    try:
        return future.result()
    except (Exception, CancelledError) as error:
        return _failures(error, chunk)


def _failures(error: BaseException, chunk: Models) -> list[Item]:
    return [failure(name, _lost(error, chunk)) for name, _ in chunk]


def _lost(error: BaseException, chunk: Models) -> SolverError:
    """What happened to a chunk that never came back."""
    span = repr(chunk[0][0]) if len(chunk) == 1 else f"one of {chunk[0][0]!r} to {chunk[-1][0]!r}"
    reason = str(error).strip().split("\n")[0] or type(error).__name__
    return SolverError(
        f"the worker that had {span} died or could not take the work ({reason}); sweep these models again, "
        "in a new pool or without an executor.",
        error,
    )
