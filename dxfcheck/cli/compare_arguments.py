"""The arguments of `dxfcheck compare`, refused in one line where they cannot be used."""

from __future__ import annotations

import argparse
import math
from typing import NamedTuple

from dxfcheck.errors import OptionInvalid
from dxfcheck.tolerances.findings import COMPARED_ALLOWANCE_PERCENT

__all__ = ["COMPARE_STATUSES", "CompareRequest", "add_compare", "compare_request"]

COMPARE_STATUSES = """exit status:
  0    no change in mobility, links, joints or drives, and no speed changed by
       more than --allow
  1    there is such a change
  2    the command could not do its work: wrong options or settings, a path
       that is not there, a file that is no DXF
  3    a fault of dxfcheck itself
  130  interrupted
With --from-git the status is 0 unless the options are wrong, as git stops at
any other.
"""

NOTHING = "/dev/null"
"""What git names in place of a file that is not there on one side."""

GIT_UNMERGED, GIT_CHANGED, GIT_RENAMED = 1, 7, 9
"""How many arguments git hands to a diff command: a path alone for one that is not merged; path, old file, hash and
mode, new file, hash and mode; the same with the new path and what became of the old one (git, gitdiff and
GIT_EXTERNAL_DIFF in git(1), from memory)."""


class CompareRequest(NamedTuple):
    """Two drawings to compare. ``allow`` is per cent of a speed.

    With ``git`` the drawings stand for ``paths`` in the repository (two where it was renamed), ``versions`` say which,
    and either drawing may be '' for none; both are where git only says that the path is not merged.
    """

    old: str
    new: str
    allow: float
    git: bool = False
    paths: tuple[str, str] = ("", "")
    versions: tuple[str, str] = ("", "")


def add_compare(parser: argparse.ArgumentParser) -> None:
    """What compare understands."""
    add = parser.add_argument
    add("paths", nargs="+", metavar="DRAWING", help="two DXF files: OLD NEW")
    add(
        "--allow",
        type=_percent,
        default=COMPARED_ALLOWANCE_PERCENT,
        metavar="PERCENT",
        help=f"by how much a speed may change: {COMPARED_ALLOWANCE_PERCENT:g} by default",
    )
    add("--json", metavar="FILE", help="write a JSON report; - is standard output, and then no other report")
    add("--from-git", action="store_true", help="the drawings are the arguments that git hands to a diff command")


def compare_request(stated: argparse.Namespace) -> CompareRequest:
    """The request that was stated; OptionInvalid for another number of drawings than fits."""
    paths, allow = tuple(stated.paths), stated.allow
    if not stated.from_git:
        if len(paths) != 2:
            msg = f"compare takes two drawings, OLD and NEW, not {len(paths)}"
            raise OptionInvalid(msg)
        return CompareRequest(*paths, allow)
    if stated.json is not None:
        msg = "--from-git prints for git; leave --json out"
        raise OptionInvalid(msg)
    if len(paths) == GIT_UNMERGED:
        return CompareRequest("", "", allow, git=True, paths=(paths[0], paths[0]))
    if len(paths) not in (GIT_CHANGED, GIT_RENAMED):
        msg = f"--from-git takes what git hands to a diff command, 1, 7 or 9 arguments, not {len(paths)}"
        raise OptionInvalid(msg)
    path, old, old_hash, _, new, new_hash, _ = paths[:GIT_CHANGED]
    renamed = paths[GIT_CHANGED] if len(paths) == GIT_RENAMED else path
    old, new = ("" if file == NOTHING else file for file in (old, new))
    return CompareRequest(old, new, allow, git=True, paths=(path, renamed), versions=(old_hash, new_hash))


def _percent(text: str) -> float:
    try:
        value = float(text.strip().removesuffix("%"))
    except ValueError:
        value = math.nan
    if not (math.isfinite(value) and value >= 0):
        msg = f"must be per cent, 0 or more, not {text!r}"
        raise argparse.ArgumentTypeError(msg)
    return value
