from __future__ import annotations

import os
import signal
import subprocess
import sys
from collections.abc import Iterator
from functools import partial
from pathlib import Path

import pytest

from dxfcheck.cli import pool, workers
from dxfcheck.cli.outcome import Outcome
from dxfcheck.cli.paths import Target
from dxfcheck.cli.workers import inspect_all, inspect_one
from dxfcheck.settings import Settings

ROOT = Path(__file__).parents[2]


def no_drawings(folder: Path, count: int) -> list[Target]:
    """Files that are read at once because they are no drawings, and one that is not there."""
    targets = [Target(str(folder / f"{number}.dxf")) for number in range(count)]
    for target in targets:
        Path(target.path).write_text("not a drawing", encoding="utf-8")
    return [*targets, Target("gone.dxf", "there is no such file or folder; check the path")]


@pytest.mark.parametrize("jobs", [1, 2])
def test_outcomes_come_in_order_however_many_work(tmp_path: Path, jobs: int) -> None:
    targets = no_drawings(tmp_path, 5)
    outcomes = list(inspect_all(targets, Settings(), jobs))
    assert [outcome.report.path for outcome in outcomes] == [target.path for target in targets]
    assert all(outcome.report.status == "unreadable" and outcome.fault is None for outcome in outcomes)
    assert outcomes[-1].report.error == "there is no such file or folder; check the path"


def test_little_work_is_done_in_one_process_and_much_in_many(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    targets = no_drawings(tmp_path, 3)
    started: list[int] = []

    def start(_targets: list[Target], _settings: Settings, count: int) -> Iterator[Outcome]:
        started.append(count)
        return iter(())

    monkeypatch.setattr(pool, "inspect_side_by_side", start)
    monkeypatch.setattr(os, "sched_getaffinity", lambda _pid: set(range(8)), raising=False)
    list(inspect_all(targets, Settings(), None))
    assert started == []
    monkeypatch.setattr(workers, "WORTH_A_POOL", 10)
    list(inspect_all(targets, Settings(), None))
    assert started == [4]


def die_of(name: str, target: Target) -> Outcome:
    """What a worker does that one drawing kills."""
    if name in target.path:
        os._exit(1)
    return inspect_one(Settings(), target, with_evidence=False)


def test_a_worker_that_dies_takes_one_drawing_with_it(tmp_path: Path) -> None:
    targets = no_drawings(tmp_path, 25)
    outcomes = list(pool.inspect_side_by_side(targets, partial(die_of, "17.dxf"), 2))
    assert [outcome.report.path for outcome in outcomes] == [target.path for target in targets]
    lost = [outcome for outcome in outcomes if outcome.fault is not None]
    assert [outcome.report.path for outcome in lost] == [targets[17].path]


def test_one_unreadable_file_changes_nothing_for_the_others(tmp_path: Path) -> None:
    broken, _ = no_drawings(tmp_path, 1)
    good = Target(str(ROOT / "fixtures" / "tray-tipper.dxf"))
    side_by_side = list(inspect_all([good, broken, good], Settings(), 2))
    alone = next(inspect_all([good], Settings(), 1))
    assert [outcome.report.status for outcome in side_by_side] == ["checked", "unreadable", "checked"]
    assert side_by_side[0] == side_by_side[2] == alone


def test_small_drawings_are_handed_out_by_the_batch_and_large_ones_alone(
    tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    targets = no_drawings(tmp_path, 23)
    Path(targets[4].path).write_bytes(b" " * 1000)
    monkeypatch.setattr(pool, "BATCH_BYTES", 900)
    batches = pool.batches_of(targets, 10)
    assert [target for batch in batches for target in batch] == targets
    assert [len(batch) for batch in batches] == [4, 1, 10, 9]
    assert [len(batch) for batch in pool.batches_of(targets[:3], 0)] == [1, 1, 1]


def test_a_process_that_hands_out_its_work_loads_no_numpy() -> None:
    code = (
        "import sys; from dxfcheck.cli import main; main(['check', 'tray-tipper.dxf', 'mixer.dxf', '--jobs', '2']);"
        "sys.exit('numpy' in sys.modules or 'ezdxf' in sys.modules)"
    )
    done = subprocess.run(
        [sys.executable, "-c", code],
        capture_output=True,
        cwd=ROOT / "fixtures",
        env={**os.environ, "PYTHONPATH": str(ROOT)},
        check=False,
    )
    assert done.returncode == 0, done.stderr


INTERRUPTED = """
import os, sys
from dxfcheck.cli import main, run
from dxfcheck.cli.workers import inspect_all

def interrupt_after_the_first(*arguments, **options):
    outcomes = inspect_all(*arguments, **options)
    yield next(outcomes)
    os.kill(os.getpid(), {signal})
    yield from outcomes

if __name__ == "__main__":
    run.inspect_all = interrupt_after_the_first
    sys.exit(main(["check", {folder!r}, "--jobs", "2", "--quiet"]))
"""


def test_an_interrupt_ends_the_workers_too(tmp_path: Path) -> None:
    folder = tmp_path / "sheets"
    folder.mkdir()
    no_drawings(folder, 40)
    script = tmp_path / "interrupted.py"
    script.write_text(INTERRUPTED.format(signal=int(signal.SIGINT), folder=str(folder)), encoding="utf-8")
    # Reading to the end of both streams waits for every process that holds them, the workers among them.
    done = subprocess.run(
        [sys.executable, str(script)],
        capture_output=True,
        text=True,
        timeout=60,
        check=False,
        env={**os.environ, "PYTHONPATH": str(ROOT)},
    )
    assert done.returncode == 130
    assert done.stderr.splitlines()[-1] == "dxfcheck: interrupted"
    assert "Traceback" not in done.stderr
