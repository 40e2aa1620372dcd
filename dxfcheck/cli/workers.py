"""Many drawings, one after the other or side by side, always in the order asked for."""

from __future__ import annotations

import os
from collections.abc import Callable, Iterator, Sequence
from functools import partial
from pathlib import Path

from dxfcheck.cli.messages import fault_text
from dxfcheck.cli.outcome import Outcome
from dxfcheck.cli.paths import Target
from dxfcheck.collector import collect_new, keep_all
from dxfcheck.errors import DrawingUnreadable, OptionInvalid
from dxfcheck.inspection import DrawingReport
from dxfcheck.settings import Settings

__all__ = ["faulty", "inspect_all", "inspect_one", "size_of"]

WORTH_A_POOL = 2_000_000
"""Bytes of drawing, about two seconds of work: from here on starting processes pays."""


def inspect_all(
    targets: Sequence[Target],
    settings: Settings,
    jobs: int | None,
    *,
    with_evidence: bool = False,
    with_bounds: bool = True,
) -> Iterator[Outcome]:
    """One outcome for each target, in order; OptionInvalid where a setting turns out unusable.

    ``with_evidence`` keeps how each thing was read, which takes a little longer and only `read` shows, ``with_bounds``
    what speeds may be off by, which --quiet does not show.
    """
    inspect = partial(inspect_one, settings, with_evidence=with_evidence, with_bounds=with_bounds)
    workers = min(jobs or _sensible_jobs(targets), len(targets))
    if workers <= 1:
        return _in_turn(targets, inspect)
    # Loaded on use: what starts processes takes longer to load than a small drawing to check.
    from dxfcheck.cli.pool import inspect_side_by_side  # noqa: PLC0415

    return inspect_side_by_side(targets, inspect, workers)


def _in_turn(targets: Sequence[Target], inspect: Callable[[Target], Outcome]) -> Iterator[Outcome]:
    if len(targets) > 1:
        # Loaded on use: a run that hands its drawings to other processes needs none of it here.
        import dxfcheck.cli.loaded  # noqa: F401, PLC0415

        keep_all()
    for target in targets:
        yield inspect(target)
        if len(targets) > 1:
            collect_new()


def _unreadable(path: str, error: str) -> DrawingReport:
    return DrawingReport(path=path, status="unreadable", error=error)


def _sensible_jobs(targets: Sequence[Target]) -> int:
    """All cores for much work, one process for little: starting others takes as long as a dozen small drawings."""
    if len(targets) <= 1 or sum(size_of(target) for target in targets) < WORTH_A_POOL:
        return 1
    return len(os.sched_getaffinity(0)) if hasattr(os, "sched_getaffinity") else os.cpu_count() or 1


def size_of(target: Target) -> int:
    """Bytes of the drawing's file; 0 where there is none."""
    try:
        return Path(target.path).stat().st_size
    except (OSError, ValueError):
        return 0


def inspect_one(settings: Settings, target: Target, *, with_evidence: bool, with_bounds: bool = True) -> Outcome:
    """One drawing; whatever goes wrong with it is its own outcome, so that the others are still checked.

    ``settings`` hold where the target has none of its own.
    """
    if target.problem is not None:
        return Outcome(_unreadable(target.path, target.problem))
    # Loaded on use: ezdxf and networkx are not wanted in the process that only hands out work.
    from dxfcheck.inspection import inspect_drawing  # noqa: PLC0415

    try:
        chosen = target.settings or settings
        report = inspect_drawing(target.path, chosen, with_evidence=with_evidence, with_bounds=with_bounds)
        return Outcome(report)
    except DrawingUnreadable as error:
        return Outcome(_unreadable(target.path, f"{error.reason}; {error.remedy}"))
    except OptionInvalid:
        raise
    except Exception as error:  # noqa: BLE001 - a fault of ours in one drawing must not end the run
        return faulty(target, error)


def faulty(target: Target, error: BaseException) -> Outcome:
    """The outcome of a drawing in which a fault of our own came up."""
    text = fault_text(error, target.path)
    return Outcome(_unreadable(target.path, text.removeprefix(f"{target.path}: ")), text)
