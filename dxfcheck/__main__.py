"""The command as a process of its own: `dxfcheck ...` and `python -m dxfcheck ...`."""

from __future__ import annotations

import gc
import sys

from dxfcheck.cli import main

__all__ = ["run"]


def run() -> None:
    """Run the command and leave with its exit status."""
    # What is made of a drawing goes with the process. Looking for cycles in it, and taking it apart at the end, would
    # take a third as long as the check itself.
    gc.disable()
    status = main()
    gc.freeze()
    sys.exit(status)


if __name__ == "__main__":  # a worker process imports this file too
    run()
