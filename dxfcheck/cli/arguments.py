"""The arguments: what the command understands, refused in one line where it does not."""

from __future__ import annotations

import argparse
import math
import sys
from collections.abc import Sequence
from dataclasses import dataclass, field
from typing import NoReturn

from dxfcheck import __version__
from dxfcheck.cli.accept_arguments import AcceptRequest, accept_request, add_accept, joined_places
from dxfcheck.cli.compare_arguments import COMPARE_STATUSES, CompareRequest, add_compare, compare_request
from dxfcheck.cli.messages import say
from dxfcheck.cli.output import prepare_output
from dxfcheck.cli.status import FAIL_LEVELS, UNUSABLE
from dxfcheck.errors import OptionInvalid
from dxfcheck.options import settings_from
from dxfcheck.reports.caution import CAUTION
from dxfcheck.settings import Settings

__all__ = ["Request", "parse_arguments"]

STATUSES = """exit status:
  0    nothing at or above the fail level
  1    findings at or above it
  2    the command could not do its work: wrong options or settings, a path
       that is not there, a file that is no DXF
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
    """What was asked for; ``jobs`` is None where the command may choose, ``json`` '-' for standard output.

    ``settings`` are what the options state; ``settings_file`` takes the place of the one above each drawing.
    """

    command: str
    paths: tuple[str, ...] = ()
    settings: Settings = field(default_factory=Settings)
    fail_on: str = "error"
    jobs: int | None = None
    json: str | None = None
    quiet: bool = False
    working: bool = False
    rule: str | None = None
    settings_file: str | None = None
    starter: bool = False
    accept: AcceptRequest | None = None
    compare: CompareRequest | None = None


class _Parser(argparse.ArgumentParser):
    """A parser whose refusals are one line."""

    def error(self, message: str) -> NoReturn:
        """Say what is wrong and where help is, and leave with status 2."""
        say(f"{message} (see '{self.prog} --help')")
        self.exit(UNUSABLE)


def parse_arguments(arguments: Sequence[str] | None) -> Request:
    """The request; SystemExit after --help, --version or wrong usage, OptionInvalid for a value that cannot be used."""
    prepare_output()
    stated = _parser().parse_args(joined_places(sys.argv[1:] if arguments is None else arguments))
    if stated.command == "explain":
        return Request(command="explain", rule=stated.rule)
    checking = stated.command == "check"
    listing = stated.command == "settings"
    settings = settings_from(
        drives=stated.drive,
        frame=stated.frame.split(",") if stated.frame is not None else (),
        units=stated.units,
        tolerance=stated.tolerance,
        expect_mobility=stated.expect_mobility if checking or listing else None,
    )
    if stated.command == "accept":
        return Request(
            command="accept", settings=settings, settings_file=stated.settings, accept=accept_request(stated)
        )
    if stated.command == "compare":
        return Request(
            command="compare",
            settings=settings,
            settings_file=stated.settings,
            json=stated.json,
            compare=compare_request(stated),
        )
    return Request(
        command=stated.command,
        paths=(stated.path,) if listing else tuple(stated.paths),
        settings=settings,
        fail_on=stated.fail_on if checking else "never",
        jobs=None if listing else stated.jobs,
        json=stated.json,
        quiet=stated.quiet if checking else False,
        working=_working(stated) if checking else False,
        settings_file=stated.settings,
        starter=stated.starter if listing else False,
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
    _add_settings(_command(commands, "settings", "the settings that hold for a drawing or folder, and who states each"))
    accept = _command(commands, "accept", "accept findings of a drawing, with the reason, in its settings file")
    add_accept(accept)
    _add_settings_options(accept)
    compare = _command(commands, "compare", "what changed between two drawings as a mechanism", COMPARE_STATUSES)
    add_compare(compare)
    _add_settings_options(compare)
    explain = _command(commands, "explain", "what a rule looks for, why it matters, how to mend it")
    explain.add_argument("rule", nargs="?", metavar="RULE", help="a rule's name; all rules in a table without it")
    return parser


def _command(
    commands: argparse._SubParsersAction[_Parser], name: str, description: str, statuses: str = STATUSES
) -> argparse.ArgumentParser:
    return commands.add_parser(
        name,
        help=description,
        description=f"{description[0].upper()}{description[1:]}.",
        epilog=statuses,
        formatter_class=argparse.RawDescriptionHelpFormatter,
        allow_abbrev=False,
    )


def _add_drawings(parser: argparse.ArgumentParser) -> None:
    """What check and read have in common: the drawings and how they are to be understood."""
    add = parser.add_argument
    add("paths", nargs="+", metavar="PATH", help="a DXF file, or a folder: every *.dxf below it")
    _add_settings_options(parser)
    add("--jobs", type=_jobs, metavar="N", help="drawings checked at the same time")
    add("--json", metavar="FILE", help="write a JSON report; - is standard output, and then no other report")


def _add_settings(parser: argparse.ArgumentParser) -> None:
    """What the command settings understands."""
    add = parser.add_argument
    add("path", nargs="?", default=".", metavar="PATH", help="a DXF file or a folder; by default the current folder")
    _add_settings_options(parser)
    add("--expect-mobility", type=_whole, metavar="N", help="the mobility each mechanism ought to have")
    add("--starter", action="store_true", help="print a settings file to start from, made from what is drawn")
    add("--json", metavar="FILE", help="write them for programs; - is standard output, and then no other report")


def _add_settings_options(parser: argparse.ArgumentParser) -> None:
    """The options that state settings, or where they stand."""
    add = parser.add_argument
    add("--settings", metavar="FILE", help="a settings file, in place of the nearest dxfcheck.toml above each drawing")
    add("--drive", action="append", default=[], metavar="TEXT", help=DRIVE)
    add("--frame", metavar="PINS", help="pins that are fixed: A,D")
    add("--units", metavar="UNIT", help="the length unit of the drawing, whatever its header says: mm")
    add("--tolerance", type=_length, metavar="T", help="how far apart ends may lie and still meet, in that unit")


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
    add("--working", action="store_true", help="the speeds of each mechanism worked out as by hand, step by step")


def _working(stated: argparse.Namespace) -> bool:
    """Whether the hand working is asked for; OptionInvalid where there would be no place to print it."""
    if stated.working and stated.quiet:
        msg = "--quiet leaves no room for the working; take one of the two"
        raise OptionInvalid(msg)
    if stated.working and stated.json == "-":
        msg = "--json - prints nothing else, so no working; give --json a file name"
        raise OptionInvalid(msg)
    return bool(stated.working)


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
