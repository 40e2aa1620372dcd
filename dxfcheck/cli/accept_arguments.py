"""The arguments of `dxfcheck accept`, refused in one line where they cannot be used."""

from __future__ import annotations

import argparse
import math
import re
from collections.abc import Sequence
from datetime import date
from typing import NamedTuple

from dxfcheck.geometry import Point

__all__ = ["AcceptRequest", "accept_request", "add_accept", "joined_places"]

_NEGATIVE = re.compile(r"-[0-9.]")
_DAY = re.compile(r"[0-9]{4}-[0-9]{2}-[0-9]{2}")


class AcceptRequest(NamedTuple):
    """Which findings of which drawing are accepted, why, and until which day; None where it was not stated."""

    path: str
    reason: str
    rule: str | None = None
    at: Point | None = None
    handle: str | None = None
    until: date | None = None


def add_accept(parser: argparse.ArgumentParser) -> None:
    """What accept understands."""
    add = parser.add_argument
    add("path", metavar="PATH", help="the drawing")
    add("--reason", required=True, type=_reason, metavar="TEXT", help="why it may stay as it is; shown in every report")
    add("--rule", metavar="NAME", help="only findings of this rule; a note is accepted only so")
    add("--at", type=_place, metavar="X,Y", help="only findings at this place, as the report gives it")
    add("--handle", type=_handle, metavar="H", help="only findings that name this entity")
    add("--until", type=_day, metavar="YYYY-MM-DD", help="the last day on which it holds")


def accept_request(stated: argparse.Namespace) -> AcceptRequest:
    """The request that was stated."""
    return AcceptRequest(
        path=stated.path,
        reason=stated.reason,
        rule=stated.rule,
        at=stated.at,
        handle=stated.handle,
        until=stated.until,
    )


def joined_places(arguments: Sequence[str]) -> list[str]:
    """The arguments with '--at -3,4' as '--at=-3,4': argparse takes a value with a minus and a comma for an option."""
    joined: list[str] = []
    for argument in arguments:
        if joined and joined[-1] == "--at" and _NEGATIVE.match(argument):
            joined[-1] = f"--at={argument}"
        else:
            joined.append(argument)
    return joined


def _reason(text: str) -> str:
    """The reason on one line, as reports show it."""
    reason = " ".join(text.split())
    if not reason:
        msg = "says nothing; write why the drawing may stay as it is"
        raise argparse.ArgumentTypeError(msg)
    return reason


def _place(text: str) -> Point:
    """A place such as '120.5,40' or '(120.5, 40)'."""
    try:
        x, y = (float(part) for part in text.strip().removeprefix("(").removesuffix(")").split(","))
    except ValueError:
        x = y = math.nan
    if not (math.isfinite(x) and math.isfinite(y)):
        msg = f"must be a place X,Y such as 120.5,40, not {text!r}"
        raise argparse.ArgumentTypeError(msg)
    return complex(x, y)


def _handle(text: str) -> str:
    handle = text.strip().upper()
    if not re.fullmatch("[0-9A-F]+", handle):
        msg = f"must be the handle of an entity, such as 2F, not {text!r}"
        raise argparse.ArgumentTypeError(msg)
    return handle


def _day(text: str) -> date:
    stated = text.strip()
    try:
        if _DAY.fullmatch(stated):
            return date.fromisoformat(stated)
    except ValueError:
        pass
    msg = f"must be a day such as 2027-03-31, not {text!r}"
    raise argparse.ArgumentTypeError(msg)
