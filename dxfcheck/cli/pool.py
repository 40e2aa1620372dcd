"""Drawings inspected side by side, in processes that go when their parent goes."""

from __future__ import annotations

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
from dxfcheck.cli.workers import faulty

__all__ = ["inspect_side_by_side"]


Inspect = Callable[[Target], Outcome]
"""What a worker does with one drawing; sent to it, so no lambda."""


def inspect_side_by_side(targets: Sequence[Target], inspect: Inspect, workers: int) -> Iterator[Outcome]:
    """One outcome for each target, in their order; a worker that dies takes only its own drawing with it."""
    done = 0
    try:
        for outcome in _pooled(targets, inspect, workers):
            yield outcome
            done += 1
    except BrokenProcessPool:
        # A worker died (out of memory, or killed). Each drawing left gets a process of its own, so that only the one
        # that kills it is lost.
        for target in targets[done:]:
            yield _alone(target, inspect)


def _alone(target: Target, inspect: Inspect) -> Outcome:
    try:
        return next(iter(_pooled([target], inspect, 1)))
    except BrokenProcessPool as error:
        return faulty(target, error)


def _pooled(targets: Sequence[Target], inspect: Inspect, workers: int) -> Iterator[Outcome]:
    pool = ProcessPoolExecutor(workers, mp_context=_context(), initializer=_start_worker)
    try:
        # Futures of our own, not pool.map: that one cancels what is left, and a pool whose workers are then ended
        # complains about cancelled futures on standard error.
        futures = [pool.submit(inspect, target) for target in targets]
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
    context.set_forkserver_preload(["dxfcheck.inspection", "dxfcheck.drawing.sketch"])
    return context


def _start_worker() -> None:
    """A worker leaves interrupts to its parent, and goes when the parent is gone."""
    signal.signal(signal.SIGINT, signal.SIG_IGN)
    threading.Thread(target=_end_with_parent, daemon=True).start()


def _end_with_parent() -> None:
    parent = multiprocessing.parent_process()
    if parent is not None:
        wait([parent.sentinel])
        os._exit(1)
