"""`python -m dxfcheck` is the command dxfcheck."""

from __future__ import annotations

import sys

from dxfcheck.cli import main

__all__: list[str] = []

if __name__ == "__main__":  # a worker process imports this file too
    sys.exit(main())
