"""Speed, as ratios within one run: `OPENBLAS_NUM_THREADS=1 python tests/benchmarks/ratios.py`.

Prints how long a check takes beside what nobody can save: starting Python with the same libraries, and reading the
same file with ezdxf. Own work is the whole check and its terminal report, less `ezdxf.readfile` as anyone calls it
(the check itself reads with the cycle collector paused, which takes less).
"""

from __future__ import annotations

import cmath
import gc
import io
import math
import random
import statistics
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable, Iterator
from itertools import pairwise
from pathlib import Path

import ezdxf
from ezdxf.document import Drawing
from ezdxf.layouts import Modelspace

from dxfcheck.collector import collector_paused
from dxfcheck.inspection import inspect_drawing
from dxfcheck.reports.terminal import TerminalReport
from dxfcheck.settings import Settings

sys.path.insert(0, str(Path(__file__).parents[2]))
from fixtures.drafting import Habit, write_plan, write_plans
from fixtures.drafting.mechanisms_slides import lift_table, slider_cranks

RUNS = 5
TIPPER = (0j, cmath.rect(60.0, math.pi / 3), 196.66462554 + 119.95442j, 200 + 0j)
SMALL = Path(__file__).parents[2] / "fixtures" / "tray-tipper.dxf"
BARE = "import sys, ezdxf, numpy, networkx, rich.console; ezdxf.readfile(sys.argv[1])"


def new_sheet() -> Drawing:
    """An empty drawing in millimetres."""
    document = ezdxf.new("R2010")
    document.units = 4
    return document


def places(count: int) -> Iterator[complex]:
    """Lower left corners of so many mechanisms in rows."""
    columns = math.isqrt(count - 1) + 1
    return (complex(number % columns * 400, number // columns * 300) for number in range(count))


def plain_four_bar(space: Modelspace, corner: complex) -> None:
    """Seven entities: four rings, those of the fixed pins on the frame layer, and three lines to their centres."""
    pins = [corner + pin for pin in TIPPER]
    for number, pin in enumerate(pins):
        layer = "FRAME" if number in (0, 3) else "PINS"
        space.add_circle((pin.real, pin.imag), 4, dxfattribs={"layer": layer})
    for start, end in pairwise(pins):
        space.add_line((start.real, start.imag), (end.real, end.imag), dxfattribs={"layer": "LINKS"})


def drafted_four_bar(space: Modelspace, corner: complex) -> None:
    """As a drafter draws it: trimmed at the rims, hatched frame symbols, labels, a drive note; all on layer 0."""
    pins = [corner + pin for pin in TIPPER]

    def line(start: complex, end: complex) -> None:
        space.add_line((start.real, start.imag), (end.real, end.imag))

    for pin in pins:
        space.add_circle((pin.real, pin.imag), 4)
    for start, end in pairwise(pins):
        along = 4 * (end - start) / abs(end - start)
        line(start + along, end - along)
    for pin in (pins[0], pins[3]):
        line(pin + complex(-2, -math.sqrt(12)), pin + complex(-8, -18))
        line(pin + complex(2, -math.sqrt(12)), pin + complex(8, -18))
        line(pin + complex(-14, -18), pin + complex(14, -18))
        for stroke in range(4):
            line(pin + complex(-10 + 6 * stroke, -18), pin + complex(-14 + 6 * stroke, -22))
    for label, pin in zip("ABCD", pins, strict=True):
        space.add_text(label, height=5).set_placement((pin.real + 5, pin.imag + 5))
    space.add_text("ω_AB = 10 rad/s", height=5).set_placement((corner.real + 20, corner.imag + 20))


def draw_four_bars(path: Path, four_bar: Callable[[Modelspace, complex], None], count: int) -> None:
    """A sheet of four-bars and nothing else."""
    document = new_sheet()
    for corner in places(count):
        four_bar(document.modelspace(), corner)
    document.saveas(path)


def draw_busy_sheet(path: Path) -> None:
    """60,000 lines of other parts in outlines of six, ten four-bars among them."""
    document = new_sheet()
    space = document.modelspace()
    for corner in places(10):
        drafted_four_bar(space, corner)
    dice = random.Random(1)  # noqa: S311 - a sheet, no secret
    for number in range(10_000):
        middle = complex(number % 100 * 40, 1200 + number // 100 * 40)
        corners = [middle + cmath.rect(dice.uniform(5, 18), math.tau * turn / 6) for turn in range(6)]
        for start, end in zip(corners, corners[1:] + corners[:1], strict=True):
            space.add_line((start.real, start.imag), (end.real, end.imag))
    document.saveas(path)


def seconds(work: Callable[[], object]) -> float:
    """Processor time of one call, in a process that has nothing left to collect from the one before."""
    gc.collect()
    start = time.process_time()
    work()
    return time.process_time() - start


def own_share(path: Path) -> float:
    """What a check takes beyond `ezdxf.readfile` on the same file, over that, the median of several pairs."""

    def check() -> None:
        with collector_paused():  # as the command does for one drawing
            report = inspect_drawing(str(path), Settings(), with_evidence=False)
            terminal = TerminalReport(io.StringIO())
            terminal.drawing(report)
            terminal.end([report])

    check()
    shares = []
    for _ in range(RUNS):
        reading = seconds(lambda: ezdxf.readfile(path))
        shares.append(seconds(check) / reading - 1.0)
    return statistics.median(shares)


def process_share(path: Path) -> float:
    """A whole `dxfcheck check` over a bare process with the same libraries that reads the same file."""

    def run(*arguments: str) -> float:
        start = time.perf_counter()
        subprocess.run([sys.executable, *arguments, str(path)], check=False, capture_output=True)
        return time.perf_counter() - start

    pairs = [(run("-m", "dxfcheck", "check"), run("-c", BARE)) for _ in range(RUNS + 2)]
    return statistics.median(ours / bare for ours, bare in pairs[1:])


def main() -> None:
    """Print each ratio beside its limit."""
    print(f"{'ratio':>6}  {'limit':>5}")
    print(f"{process_share(SMALL):6.2f}  {1.4:5.1f}  small drawing, whole process over a bare one")
    with tempfile.TemporaryDirectory() as folder:
        sheet = Path(folder) / "sheet.dxf"
        draw_busy_sheet(sheet)
        print(
            f"{own_share(sheet):6.2f}  {0.5:5.1f}  60,000 lines of other parts, ten four-bars: own work over readfile"
        )
        draw_four_bars(sheet, drafted_four_bar, 1000)
        print(
            f"{own_share(sheet):6.2f}  {1.0:5.1f}  1,000 four-bars as drafted (26 entities each): own work over reading"
        )
        draw_four_bars(sheet, plain_four_bar, 1000)
        print(f"{own_share(sheet):6.2f}  {1.0:5.1f}  1,000 four-bars, bare (7 entities each): own work over reading")
        drafted = Habit(
            radius=4,
            frame="symbol",
            guides="under",
            guide_frame="strokes",
            blocks="lines",
            ends="rim",
            named_layers=False,
        )
        write_plans(sheet, slider_cranks(1000), drafted)
        print(f"{own_share(sheet):6.2f}  {1.5:5.1f}  1,000 slider-cranks as drafted (31 entities each): own work")
        write_plans(sheet, slider_cranks(1000), Habit(radius=4))
        print(
            f"{own_share(sheet):6.2f}  {1.5:5.1f}  1,000 slider-cranks, bare (14 entities each): own work over reading"
        )
        write_plan(sheet, lift_table(40), Habit(radius=3))
        print(f"{own_share(sheet):6.2f}  {1.5:5.1f}  a lift table of 40 scissor cells: own work over reading")


if __name__ == "__main__":
    main()
