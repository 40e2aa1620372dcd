"""The arguments: what the command understands, refused in one line where it does not."""

from __future__ import annotations

import argparse
import math
from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import NoReturn

from dxfcheck import __version__
from dxfcheck.cli.messages import say
from dxfcheck.cli.output import prepare_output
from dxfcheck.cli.status import FAIL_LEVELS, UNUSABLE
from dxfcheck.options import settings_from
from dxfcheck.reports.caution import CAUTION
from dxfcheck.settings import Settings

__all__ = ["Request", "parse_arguments"]

STATUSES = """exit status:
  0    nothing at or above the fail level
  1    findings at or above it
  2    the command could not do its work: wrong options, a path that is not
       there, a file that is no DXF
  3    a fault of dxfcheck itself
  130  interrupted
"""

DRIVE = (
    "a drive (repeatable): 'A-B = 10 rad/s ccw', 'A-B = 120 rpm cw', 'A-B against B-C = 3 rad/s', "
    "'block at C = 50 mm/s', or 'E-F = 50 mm/s' for the telescope between pins E and F; a slide runs along its "
    "direction, to +x (straight up where it has no x), a telescope extends"
)


@dataclass(frozen=True, slots=True, kw_only=True)
class Request:
    """What was asked for; ``jobs`` is None where the command may choose, ``json`` '-' for standard output."""

    command: str
    paths: tuple[str, ...] = ()
    settings: Settings = field(default_factory=Settings)
    fail_on: str = "error"
    jobs: int | None = None
    json: str | None = None
    quiet: bool = False
    rule: str | None = None


class _Parser(argparse.ArgumentParser):
    """A parser whose refusals are one line."""

    def error(self, message: str) -> NoReturn:
        """Say what is wrong and where help is, and leave with status 2."""
        say(f"{message} (see '{self.prog} --help')")
        self.exit(UNUSABLE)


def parse_arguments(arguments: Sequence[str] | None) -> Request:
    """The request; SystemExit after --help, --version or wrong usage, OptionInvalid for a value that cannot be used."""
    prepare_output()
    stated = _parser().parse_args(arguments)
    if stated.command == "explain":
        return Request(command="explain", rule=stated.rule)
    checking = stated.command == "check"
    settings = settings_from(
        drives=stated.drive,
        frame=stated.frame.split(",") if stated.frame is not None else (),
        units=stated.units,
        tolerance=stated.tolerance,
        expect_mobility=stated.expect_mobility if checking else None,
    )
    return Request(
        command=stated.command,
        paths=tuple(stated.paths),
        settings=settings,
        fail_on=stated.fail_on if checking else "never",
        jobs=stated.jobs,
        json=stated.json,
        quiet=stated.quiet if checking else False,
    )


def _parser() -> argparse.ArgumentParser:
    parser = _Parser(
        prog="dxfcheck",
        description="Reads planar linkages drawn as DXF sketches and reports mobility, speeds and what is wrong.",
        epilog=f"{STATUSES}\n{CAUTION}",
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )
    parser.add_argument("--version", action="version", version=f"dxfcheck {__version__}")
    commands = parser.add_subparsers(dest="command", metavar="COMMAND", required=True, parser_class=_Parser)
    check = _command(commands, "check", "check drawings: mobility, speeds, and what to mend (the main job)")
    _add_drawings(check)
    _add_check(check)
    read = _command(commands, "read", "show how drawings were read: pins, links, joints, frame, drives, the account")
    _add_drawings(read)
    explain = _command(commands, "explain", "what a rule looks for, why it matters, how to mend it")
    explain.add_argument("rule", nargs="?", metavar="RULE", help="a rule's name; all rules in a table without it")
    return parser


def _command(commands: argparse._SubParsersAction[_Parser], name: str, description: str) -> argparse.ArgumentParser:
    return commands.add_parser(
        name,
        help=description,
        description=f"{description[0].upper()}{description[1:]}.",
        epilog=STATUSES,
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )


def _add_drawings(parser: argparse.ArgumentParser) -> None:
    """What check and read have in common: the drawings and how they are to be understood."""
    add = parser.add_argument
    add("paths", nargs="+", metavar="PATH", help="a DXF file, or a folder: every *.dxf below it")
    add("--drive", action="append", default=[], metavar="TEXT", help=DRIVE)
    add("--frame", metavar="PINS", help="pins that are fixed: A,D")
    add("--units", metavar="UNIT", help="the length unit of the drawing, whatever its header says: mm")
    add("--tolerance", type=_length, metavar="T", help="how far apart ends may lie and still meet, in that unit")
    add("--jobs", type=_jobs, metavar="N", help="drawings checked at the same time")
    add("--json", metavar="FILE", help="write a JSON report; - is standard output, and then no other report")


def _add_check(parser: argparse.ArgumentParser) -> None:
    """What only check understands: what to hold the drawings against and how much to say."""
    add = parser.add_argument
    add("--expect-mobility", type=_whole, metavar="N", help="the mobility each mechanism ought to have")
    add(
        "--fail-on",
        choices=FAIL_LEVELS,
        default="error",
        metavar="LEVEL",
        help="least severity that gives status 1: error (default), warning, note, never",
    )
    add("--quiet", action="store_true", help="one line a finding, and one at the end")


def _length(text: str) -> float:
    try:
        value = float(text)
    except ValueError:
        value = math.nan
    if not (math.isfinite(value) and value > 0):
        msg = f"must be a length above 0, not {text!r}"
        raise argparse.ArgumentTypeError(msg)
    return value


def _whole(text: str) -> int:
    try:
        return int(text)
    except ValueError:
        msg = f"must be a whole number, not {text!r}"
        raise argparse.ArgumentTypeError(msg) from None


def _jobs(text: str) -> int:
    number = _whole(text)
    if number < 1:
        msg = f"must be 1 or more, not {text!r}"
        raise argparse.ArgumentTypeError(msg)
    return number
