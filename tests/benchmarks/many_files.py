"""Many small drawings, as a ratio: `OPENBLAS_NUM_THREADS=1 python tests/benchmarks/many_files.py [DRAWINGS [PAIRS]]`.

Prints how many times longer a plain loop of `ezdxf.readfile` over a folder takes than `dxfcheck check --jobs 2` over
the same folder, analysis and report included. Whole processes from start to end, in turn; the median of the pairs.
"""

from __future__ import annotations

import os
import shutil
import statistics
import subprocess
import sys
import tempfile
import time
from pathlib import Path

import ezdxf

ROOT = Path(__file__).parents[2]
DRAWINGS, PAIRS = 1000, 5
FEWEST, MOST = 20, 60
"""Entities of the fixtures that are copied."""
LIMIT = 1.3
FOUND = 1
"""The exit status that says no more than that there are findings."""
PLAIN = "import sys, glob, ezdxf\nfor path in sorted(glob.glob(sys.argv[1] + '/*.dxf')): ezdxf.readfile(path)"


def fill(folder: Path, count: int) -> None:
    """So many copies of the fixtures of few entities, in turn."""
    fixtures = sorted((ROOT / "fixtures").glob("*.dxf"))
    small = [path for path in fixtures if FEWEST <= len(ezdxf.readfile(path).modelspace()) <= MOST]
    for number in range(count):
        source = small[number % len(small)]
        shutil.copyfile(source, folder / f"{number:04d} {source.name}")


def seconds(*arguments: str) -> float:
    """Wall time of a Python process that does its work, with its output thrown away."""
    start = time.perf_counter()
    done = subprocess.run([sys.executable, *arguments], check=False, stdout=subprocess.DEVNULL)
    taken = time.perf_counter() - start
    if done.returncode > FOUND:
        sys.exit(done.returncode)
    return taken


def ratio(folder: Path, pairs: int, *options: str) -> float:
    """The plain loop over ours, the median of so many pairs."""
    check = ("-m", "dxfcheck", "check", "--jobs", "2", *options, str(folder))
    return statistics.median(seconds("-c", PLAIN, str(folder)) / seconds(*check) for _ in range(pairs))


def main() -> None:
    """Print each ratio beside the least it should be."""
    count, pairs = [int(text) for text in sys.argv[1:]] + [DRAWINGS, PAIRS][len(sys.argv) - 1 :]
    os.environ["PYTHONPATH"] = str(ROOT)
    os.environ.pop("PYTHONDONTWRITEBYTECODE", None)  # as users run it: compiled once
    with tempfile.TemporaryDirectory() as folder:
        fill(Path(folder), count)
        print(f"{'ratio':>6}  {'limit':>5}")
        for options in (("--quiet",), ()):
            found = ratio(Path(folder), pairs, *options)
            print(f"{found:6.2f}  {LIMIT:5.1f}  {count} small drawings in two processes {' '.join(options)}")


if __name__ == "__main__":
    main()
