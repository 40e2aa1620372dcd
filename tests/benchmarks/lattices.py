"""Scissor lattices of up to 5,000 links, and a sheet of 1,000 four-bars: `python tests/benchmarks/lattices.py`.

Prints, for each size, the processor time of `ezdxf.readfile` on the drawing and of the analysis of what is drawn on it,
their ratio, and the greatest error against the closed form; then by which power of the links the analysis grows. Beside
it what one matrix for the whole lattice does: its rank by singular values, and scipy.sparse's direct solver. Last, the
peak memory of a process that reads and analyses, over one that reads only. Set OPENBLAS_NUM_THREADS=1.
"""

from __future__ import annotations

import cmath
import gc
import math
import subprocess
import sys
import tempfile
import time
from collections.abc import Callable
from functools import cache, partial
from pathlib import Path
from statistics import median

import ezdxf
import numpy as np
from scipy.sparse import csc_matrix
from scipy.sparse.linalg import spsolve

sys.path.insert(0, str(Path(__file__).parents[2]))
from dxfcheck.analysis import analyse
from dxfcheck.analysis.freedom.constraints import CELLS, ROWS, bodies_of, constraint_matrix, freedom_of, rows_of_joint
from dxfcheck.analysis.topology import topology_of
from dxfcheck.collector import collector_paused
from dxfcheck.linkage import Linkage
from dxfcheck.tolerances.analysis import RANK_RELATIVE
from tests.analysis.lattices import ARM, LEAN, error_of, scissor_lattice
from tests.benchmarks.ratios import TIPPER, draw_four_bars, plain_four_bar
from tests.model import linkage

ROOT = Path(__file__).parents[2]
SIZES = (10, 100, 500, 1000, 2000, 5000)
FOUR_BARS = 1000
DENSE = 1000
RUNS = 5


def draw_lattice(path: Path, links: int) -> None:
    """A lattice as lines and rings alone: a line an arm, a ring a pin."""
    document = ezdxf.new("R2010")
    document.units = 4
    space = document.modelspace()
    step = cmath.rect(ARM, LEAN)
    for level in range(links // 2):
        low, high = level * step.imag, (level + 1) * step.imag
        space.add_line((0, low), (step.real, high))
        space.add_line((step.real, low), (0, high))
        space.add_circle((step.real / 2, (low + high) / 2), 3)
        space.add_circle((0, low), 3)
        space.add_circle((step.real, low), 3)
    document.saveas(path)


@cache
def four_bar() -> Linkage:
    """The tray tipper of the benchmarks of whole checks."""
    points = dict(zip("ABCD", TIPPER, strict=True))
    pins = {"A": "ground crank", "B": "crank coupler", "C": "coupler rocker", "D": "ground rocker"}
    return linkage(points, pins, turn={"crank": 1.0})


def seconds(work: Callable[[], object]) -> float:
    """Processor time of one call, with the collector paused as the command does."""
    gc.collect()
    with collector_paused():
        start = time.process_time()
        work()
        return time.process_time() - start


def side_by_side(reading: Callable[[], object], analysis: Callable[[], object]) -> tuple[float, float, float]:
    """Least time of each in several turns, and the median of their ratios: both share the machine's moods."""
    pairs = [(seconds(reading), seconds(analysis)) for _ in range(RUNS)]
    return min(one for one, _ in pairs), min(other for _, other in pairs), median(other / one for one, other in pairs)


def analyse_anew(model: Linkage) -> None:
    """One analysis that remembers no topology from the one before."""
    forget_topologies()
    analyse(model)


def forget_topologies() -> None:
    """Empties the caches by which a sheet of many equal linkages is spared most of the work."""
    for name, module in list(sys.modules.items()):
        if name.startswith("dxfcheck.analysis."):
            for value in vars(module).values():
                clear = getattr(value, "cache_clear", None)
                if clear is not None:
                    clear()


def print_sizes(folder: Path) -> None:
    """Reading and analysis at every size, and the power of growth."""
    print(
        f"{'links':>8}{'readfile ms':>13}{'analysis ms':>13}{'ratio':>8}{'freedom':>9}{'error':>10}{'second way':>12}"
    )
    taken = {}
    for links in SIZES:
        path = folder / f"lattice-{links}.dxf"
        draw_lattice(path, links)
        model = scissor_lattice(links)
        reading, taken[links], ratio = side_by_side(partial(ezdxf.readfile, path), partial(analyse_anew, model))
        result = analyse(model)
        print(
            f"{links:8}{1e3 * reading:13.1f}{1e3 * taken[links]:13.1f}{ratio:8.2f}"
            f"{result.mobility.at_pose:9}{error_of(model, result):10.1e}{result.disagreement or 0.0:12.1e}"
        )
    print(f"grows as links to the power {math.log(taken[5000] / taken[500]) / math.log(10):.2f} from 500 to 5,000")
    sheet = folder / "four-bars.dxf"
    draw_four_bars(sheet, plain_four_bar, FOUR_BARS)
    reading, analysis, ratio = side_by_side(partial(ezdxf.readfile, sheet), analyse_sheet)
    print(f"{FOUR_BARS:,} four-bars: readfile {1e3 * reading:.0f} ms, analysis {1e3 * analysis:.0f} ms, ", end="")
    print(f"ratio {ratio:.2f}")


def analyse_sheet() -> None:
    """So many four-bars, as the command does on a sheet of many mechanisms."""
    model = four_bar()
    for _ in range(FOUR_BARS):
        analyse(model, bounds_shown=False)


def print_whole_matrix() -> None:
    """One rank of the whole matrix, by singular values."""
    for links in (100, DENSE):
        model = scissor_lattice(links)
        topology, bodies = topology_of(model), bodies_of(model)
        matrix = constraint_matrix(model, topology, bodies)
        start = time.process_time()
        freedom = freedom_of(matrix, lambda: RANK_RELATIVE)
        taken = time.process_time() - start
        gap = freedom.gap or (0.0, 0.0)
        print(
            f"one matrix for {links} links: {taken:.2f} s, freedom {len(freedom.motions)}, "
            f"smallest value that counts {gap[0]:.1e} of the greatest"
        )


def driven_system(model: Linkage) -> tuple[csc_matrix, np.ndarray]:
    """All constraints and the drive as a sparse square system over (w, vx, vy) of the moving links."""
    bodies = bodies_of(model)
    cells: list[tuple[float, int, int]] = []
    height = 0
    for joint, place in zip(model.joints, topology_of(model).joints, strict=True):
        for link, sign in ((joint.first, -1.0), (joint.second, 1.0)):
            values = ROWS[place.acts_as](joint, bodies[link], sign, bodies)
            cells += [
                (value, height + down, 3 * (link - 1) + right)
                for value, (down, right) in zip(values, CELLS[place.acts_as], strict=True)
                if link
            ]
        height += rows_of_joint(place.acts_as)
    (drive,) = model.drives
    cells.append((1.0, height, 3 * (drive.link - 1)))
    wanted = np.zeros(height + 1)
    wanted[height] = drive.rate * bodies[drive.link].size
    values, rows, columns = zip(*cells, strict=True)
    return csc_matrix((values, (rows, columns)), shape=(height + 1, 3 * (len(model.links) - 1))), wanted


def print_sparse_solver() -> None:
    """scipy.sparse's direct solver on the same system, set up beforehand."""
    for links in (DENSE, SIZES[-1]):
        model = scissor_lattice(links)
        rows, wanted = driven_system(model)
        start = time.process_time()
        speeds = spsolve(rows, wanted)
        taken = time.process_time() - start
        bodies = bodies_of(model)
        turns = [float(speeds[3 * link - 3]) / bodies[link].size for link in range(1, links + 1)]
        error = max(abs(turn - (-1.0 if number % 2 else 1.0)) for number, turn in enumerate(turns))
        print(f"scipy.sparse, {links} links: {1e3 * taken:.0f} ms for the solving alone, error {error:.1e}, no rank")


def print_memory(folder: Path) -> None:
    """Peak memory of processes that read the largest lattice, and that analyse it besides."""
    path = folder / f"lattice-{SIZES[-1]}.dxf"
    bare, ours = (peak_memory(work, path) for work in (READS, READS + ANALYSES))
    print(f"peak memory: reading {bare / 1024:.0f} MB, with the analysis {ours / 1024:.0f} MB, ratio {ours / bare:.2f}")


READS = "import sys, ezdxf; sheet = ezdxf.readfile(sys.argv[1]); "
ANALYSES = (
    "from dxfcheck.analysis import analyse; from tests.analysis.lattices import scissor_lattice; "
    f"analyse(scissor_lattice({SIZES[-1]})); "
)
STARTS_IT = (
    "import resource, subprocess, sys; subprocess.run([sys.executable, *sys.argv[1:]], check=True); "
    "print(resource.getrusage(resource.RUSAGE_CHILDREN).ru_maxrss)"
)


def peak_memory(work: str, path: Path) -> int:
    """In kilobytes. A process between the two starts it, since a child is told the size of its parent as its own."""
    done = subprocess.run(
        [sys.executable, "-c", STARTS_IT, "-c", work, str(path)], check=True, capture_output=True, text=True, cwd=ROOT
    )
    return int(done.stdout)


def main() -> None:
    """Print everything."""
    with tempfile.TemporaryDirectory() as folder:
        print_sizes(Path(folder))
        print_whole_matrix()
        print_sparse_solver()
        print_memory(Path(folder))


if __name__ == "__main__":
    main()
