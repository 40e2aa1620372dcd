"""Drawings inspected side by side, in processes that go when their parent goes."""

from __future__ import annotations

import gc
import multiprocessing
import os
import signal
import threading
from collections.abc import Callable, Iterator, Sequence
from concurrent.futures import ProcessPoolExecutor
from concurrent.futures.process import BrokenProcessPool
from multiprocessing.connection import wait
from multiprocessing.context import BaseContext

from dxfcheck.cli.outcome import Outcome
from dxfcheck.cli.paths import Target
from dxfcheck.cli.workers import faulty, size_of
from dxfcheck.collector import collect_new, keep_all

__all__ = ["batches_of", "inspect_side_by_side"]


Inspect = Callable[[Target], Outcome]
"""What a worker does with one drawing; sent to it, so no lambda."""

BATCH_BYTES = 200_000
BATCH_DRAWINGS = 10
"""A worker is handed small drawings by the batch, as each message between processes costs both sides time; a large
drawing goes alone. About a fifth of a second of work: no worker waits longer than that for the others at the end."""

BATCHES_A_WORKER = 4
"""Where there are few drawings each worker still gets about so many batches, so that all end together."""


def inspect_side_by_side(targets: Sequence[Target], inspect: Inspect, workers: int) -> Iterator[Outcome]:
    """One outcome for each target, in their order; a worker that dies takes only its own drawing with it."""
    left = batches_of(targets, min(BATCH_DRAWINGS, len(targets) // (workers * BATCHES_A_WORKER)))
    while left:
        try:
            for outcomes in _pooled(left, inspect, workers):
                yield from outcomes
                left = left[1:]
        except BrokenProcessPool:
            # A worker died (out of memory, or killed), and with it what was being done anywhere. Each drawing of the
            # first batch gets a process of its own, so that only the one that kills it is lost; the rest go on.
            for target in left[0]:
                yield _alone(target, inspect)
            left = left[1:]


def batches_of(targets: Sequence[Target], most: int) -> list[list[Target]]:
    """The targets in order, parted into batches of bounded size and so many drawings at most, but at least one."""
    batches: list[list[Target]] = []
    room = 0
    for target in targets:
        size = size_of(target)
        if not batches or room < size or len(batches[-1]) >= most:
            batches.append([])
            room = BATCH_BYTES
        batches[-1].append(target)
        room -= size
    return batches


def _alone(target: Target, inspect: Inspect) -> Outcome:
    try:
        return next(_pooled([[target]], inspect, 1))[0]
    except BrokenProcessPool as error:
        return faulty(target, error)


def _pooled(batches: Sequence[Sequence[Target]], inspect: Inspect, workers: int) -> Iterator[list[Outcome]]:
    pool = ProcessPoolExecutor(workers, mp_context=_context(), initializer=_start_worker)
    try:
        # Futures of our own, not pool.map: that one cancels what is left, and a pool whose workers are then ended
        # complains about cancelled futures on standard error.
        futures = [pool.submit(_inspect_batch, inspect, batch) for batch in batches]
        for future in futures:
            yield future.result()
    except BaseException:
        for child in multiprocessing.active_children():
            child.terminate()
        raise
    finally:
        pool.shutdown()


def _context() -> BaseContext:
    """Workers forked from a clean server that has loaded the libraries once, where the system can do that."""
    if "forkserver" not in multiprocessing.get_all_start_methods():
        return multiprocessing.get_context()
    context = multiprocessing.get_context("forkserver")
    context.set_forkserver_preload(["dxfcheck.cli.loaded"])
    return context


def _start_worker() -> None:
    """A worker leaves interrupts to its parent, and goes when the parent is gone."""
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    threading.Thread(target=_end_with_parent, daemon=True).start()
    gc.disable()  # as in __main__; what a drawing leaves is collected after each batch
    keep_all()


def _end_with_parent() -> None:
    parent = multiprocessing.parent_process()
    if parent is not None:
        wait([parent.sentinel])
        os._exit(1)


def _inspect_batch(inspect: Inspect, batch: Sequence[Target]) -> list[Outcome]:
    """What a worker does with one message."""
    outcomes = [inspect(target) for target in batch]
    collect_new()
    return outcomes
