"""The exit statuses of the command."""

from __future__ import annotations

from dxfcheck.rules.finding import SEVERITIES

__all__ = ["CLEAN", "FAIL_LEVELS", "FAULT", "FOUND", "INTERRUPTED", "UNUSABLE"]

CLEAN, FOUND, UNUSABLE, FAULT, INTERRUPTED = 0, 1, 2, 3, 130
FAIL_LEVELS = (*SEVERITIES, "never")
