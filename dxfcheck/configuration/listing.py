"""The settings of a drawing one by one, each with its value and who states it: for a person, and for programs."""

from __future__ import annotations

from collections.abc import Iterator
from typing import NamedTuple

from dxfcheck.configuration.accept_tables import AcceptTable
from dxfcheck.configuration.effective import Effective, Stated
from dxfcheck.configuration.problems import key_text
from dxfcheck.configuration.settings_keys import ACCEPT, ANY_NAME, SETTINGS, Key
from dxfcheck.configuration.stated_values import toml_text
from dxfcheck.settings import Settings

__all__ = ["BUILT_IN", "OPTION", "ListedSetting", "listed_settings"]

BUILT_IN = "built in"
OPTION = "option"


class ListedSetting(NamedTuple):
    """One setting: its key, its value as a settings file would have it, and where that comes from.

    ``where`` is 'option', 'built in' or the file, the line and the table of drawings; what is built in is in words.
    """

    key: str
    value: str
    where: str


def listed_settings(effective: Effective) -> tuple[ListedSetting, ...]:
    """Every setting, in the order of the list of keys; what is accepted on the drawing comes last."""
    listed = [line for key in SETTINGS for line in _lines_of(key, effective)]
    return (*listed, *(_accepted(table, effective) for table in effective.accepted))


def _lines_of(key: Key, effective: Effective) -> Iterator[ListedSetting]:
    by_option = _by_option(key, effective.options)
    if by_option is not None:
        yield ListedSetting(key.name, by_option, OPTION)
    # Drives of settings stand beside those of options, except on the same motion; all else gives way to an option.
    stated = [each for each in effective.stated if each.statement.key == key.name]
    if by_option is None or key.kind == "drives":
        yield from (_stated(key, each, effective) for each in stated)
    if by_option is None and not stated:
        yield ListedSetting(_shown(key, ""), key.otherwise, BUILT_IN)


def _stated(key: Key, stated: Stated, effective: Effective) -> ListedSetting:
    where = stated.where(effective.file) if effective.file is not None else ""
    return ListedSetting(_shown(key, stated.statement.name), stated.statement.text, where)


def _shown(key: Key, name: str) -> str:
    """'expect.speeds."block at C"', 'limits.pin-speed' for all pins, 'rules' where nothing is said of any."""
    table = key.name.removesuffix(f".{ANY_NAME}")
    return table if name in {"", ANY_NAME} else f"{table}.{key_text((name,))}"


def _by_option(key: Key, options: Settings) -> str | None:
    """What an option states for a key, as it would be written in a file; None where none does."""
    values = {
        "drives": options.drives,
        "reading.units": options.unit or (),
        "reading.tolerance": () if options.tolerance is None else options.tolerance,
        "reading.frame-pins": options.frame_pins,
        "expect.mobility": () if options.expected_mobility is None else options.expected_mobility,
    }
    value = values.get(key.name, ())
    return None if value == () else toml_text(value)


def _accepted(table: AcceptTable, effective: Effective) -> ListedSetting:
    acceptance = table.acceptance
    where = [] if acceptance.at is None else [f"at [{acceptance.at.real:g}, {acceptance.at.imag:g}]"]
    if acceptance.handle is not None:
        where.append(f"handle {acceptance.handle}")
    until = "" if acceptance.until is None else f", until {acceptance.until}"
    expired = any(each.where == acceptance.where and each.expired for each in effective.settings.acceptances)
    value = f"{' '.join((acceptance.rule, *where))}: {acceptance.reason}{until}{' (expired)' if expired else ''}"
    return ListedSetting(ACCEPT, value, acceptance.where)
