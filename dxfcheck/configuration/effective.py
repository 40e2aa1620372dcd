"""What holds for one drawing: options before tables of its settings file before the rest of it, and who said so."""

from __future__ import annotations

import os
from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, replace
from datetime import UTC, date, datetime
from operator import itemgetter
from pathlib import Path
from typing import Any, NamedTuple, cast

from dxfcheck.configuration.accept_tables import AcceptTable
from dxfcheck.configuration.path_patterns import is_pattern, matches_path, relative_path
from dxfcheck.configuration.settings_file import DrawingTable, SettingsFile
from dxfcheck.configuration.settings_keys import ANY_NAME, DRAWINGS, KEYS
from dxfcheck.configuration.stated_values import Statement
from dxfcheck.settings import Acceptance, LayerRoles, Requirement, RuleWeight, Settings

__all__ = ["Effective", "Stated", "lost_drawings", "settings_for", "today"]

_ORDER = {name: place for place, name in enumerate(KEYS)}


class Stated(NamedTuple):
    """A statement that holds for a drawing, with the table of drawings it stands in, None for the file's own."""

    statement: Statement
    table: DrawingTable | None = None

    def where(self, file: SettingsFile) -> str:
        """'dxfcheck.toml:12', 'dxfcheck.toml:30 (drawings "received/*.dxf")'."""
        place = f"{file.shown}:{self.statement.line}"
        return place if self.table is None else f'{place} ({DRAWINGS} "{self.table.pattern}")'


@dataclass(frozen=True, slots=True, kw_only=True)
class Effective:
    """The settings of one drawing, and what they were made of: options, and what a file states."""

    settings: Settings
    options: Settings
    stated: tuple[Stated, ...] = ()
    file: SettingsFile | None = None
    accepted: tuple[AcceptTable, ...] = ()


def today() -> date:
    """The day on which this is run, where it is run."""
    return datetime.now(tz=UTC).astimezone().date()


def settings_for(drawing: Path, file: SettingsFile | None, options: Settings, *, day: date | None = None) -> Effective:
    """The settings of a drawing (or of a folder: without the tables of single drawings).

    Options come before settings; of the settings, later tables of this drawing before earlier ones and before the
    file's own. Settings that are stated by name come together by name, all others take one another's place.
    Acceptances whose last day lies before ``day`` (today where None) are expired.
    """
    if file is None:
        return Effective(settings=options, options=options)
    stated = tuple(_merged(drawing, file).values())
    accepted = tuple(_accepted_on(drawing, file))
    settings = options
    if stated or accepted:
        by_key = {each.statement.key: each.statement.value for each in stated}
        acceptances = tuple(_dated(table.acceptance, day or today()) for table in accepted)
        settings = replace(
            _stand_behind(options, by_key),
            requirements=(*options.requirements, *_requirements(stated)),
            rule_weights=tuple(sorted(_weights(stated))),
            acceptances=(*options.acceptances, *acceptances),
            files=(*options.files, file.shown),
        )
    return Effective(settings=settings, options=options, stated=stated, file=file, accepted=accepted)


def _merged(drawing: Path, file: SettingsFile) -> dict[tuple[str, str], Stated]:
    merged = {(each.key, each.name): Stated(each) for each in file.statements}
    path = relative_path(drawing, file.folder) if file.tables else ""
    for table in file.tables:
        if matches_path(path, table.pattern):
            lifted = {each.key for each in table.statements if _lifts_all(each)}
            merged = {key: each for key, each in merged.items() if key[0] not in lifted}
            merged.update({(each.key, each.name): Stated(each, table) for each in table.statements})
    return dict(sorted(merged.items(), key=lambda each: _ORDER[each[0][0]]))


def _lifts_all(statement: Statement) -> bool:
    """Whether it lifts the limits of all parts: those that were stated for single ones as well."""
    value = statement.value
    return isinstance(value, Requirement) and value.lifts and statement.name == ANY_NAME


def _stand_behind(options: Settings, stated: Mapping[str, Any]) -> Settings:
    """The options, with what a file states where no option says it."""
    by_option = options.unit is not None or "reading.units" not in stated
    layers = {
        role: tuple(stated[f"reading.layers.{role}"])
        for role in ("frame", "pitch", "construction")
        if f"reading.layers.{role}" in stated
    }
    return replace(
        options,
        unit=options.unit if by_option else stated["reading.units"],
        unit_source="option" if by_option else "settings",
        tolerance=options.tolerance if options.tolerance is not None else stated.get("reading.tolerance"),
        settings_drives=stated.get("drives", ()),
        frame_pins=options.frame_pins or stated.get("reading.frame-pins", ()),
        part_blocks=options.part_blocks or stated.get("reading.part-blocks", ()),
        layers=options.layers if options.layers != LayerRoles() else replace(options.layers, **layers),
        transmission_angle=stated.get("limits.transmission-angle", options.transmission_angle),
        doubtful_speed=stated.get("limits.doubtful-speed", options.doubtful_speed),
        expected_mobility=(
            options.expected_mobility if options.expected_mobility is not None else stated.get("expect.mobility")
        ),
    )


def _requirements(stated: tuple[Stated, ...]) -> Iterator[Requirement]:
    for each in stated:
        if isinstance(each.statement.value, Requirement):
            yield each.statement.value


def _weights(stated: tuple[Stated, ...]) -> Iterator[tuple[str, RuleWeight]]:
    for each in stated:
        if each.statement.key == "rules.*":
            yield each.statement.name, cast("RuleWeight", each.statement.value)


def _accepted_on(drawing: Path, file: SettingsFile) -> Sequence[AcceptTable]:
    return file.accepted_on.get(os.path.realpath(drawing), ()) if file.accepted_on else ()


def _dated(acceptance: Acceptance, day: date) -> Acceptance:
    over = acceptance.until is not None and acceptance.until < day
    return replace(acceptance, expired=True) if over else acceptance


def lost_drawings(file: SettingsFile) -> tuple[tuple[str, int], ...]:
    """Drawings that the file names, not by a pattern, and that are not there, each with the line that names it."""
    named = [(table.drawing, table.line) for table in file.accepted]
    named += [(table.pattern, table.line) for table in file.tables if not is_pattern(table.pattern)]
    lost = {path for path in dict(named) if not (file.folder / path).exists()}
    return tuple((path, line) for path, line in sorted(named, key=itemgetter(1)) if path in lost)
