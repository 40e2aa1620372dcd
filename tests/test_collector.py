from __future__ import annotations

import gc
import subprocess
import sys
from pathlib import Path

from dxfcheck.collector import collect_new, collector_paused

LEFT_IN_A_CYCLE = """
import gc, weakref
from dxfcheck.collector import collect_new, keep_all

class Knot:
    def __init__(self):
        self.itself = self

gc.disable()
old = weakref.ref(Knot())
keep_all()
new = weakref.ref(Knot())
collect_new()
print(old() is None, new() is None)
"""


def test_only_what_is_new_is_collected_where_the_collector_is_switched_off() -> None:
    done = subprocess.run(
        [sys.executable, "-c", LEFT_IN_A_CYCLE],
        capture_output=True,
        text=True,
        cwd=Path(__file__).parents[1],
        check=True,
    )
    assert done.stdout == "False True\n"


def test_a_process_with_its_collector_on_is_left_alone() -> None:
    frozen = gc.get_freeze_count()
    collect_new()
    assert gc.get_freeze_count() == frozen


def test_a_pause_ends_and_may_be_nested() -> None:
    with collector_paused(), collector_paused():
        assert not gc.isenabled()
    assert gc.isenabled()
