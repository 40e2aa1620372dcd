"""`dxfcheck settings`: what holds for a drawing or a folder and who states it, or a settings file to start from."""

from __future__ import annotations

import os
import sys
from pathlib import Path

from dxfcheck.cli.arguments import Request
from dxfcheck.cli.messages import say
from dxfcheck.cli.output import drop_output
from dxfcheck.cli.paths import find_targets
from dxfcheck.cli.status import CLEAN, UNUSABLE
from dxfcheck.configuration.effective import settings_for
from dxfcheck.configuration.listing import listed_settings
from dxfcheck.configuration.lookup import find_settings_file, hidden_settings_files, shown_path
from dxfcheck.configuration.path_patterns import matches_path, relative_path
from dxfcheck.configuration.problems import quoted
from dxfcheck.configuration.settings_file import DrawingTable, SettingsFile, read_settings_file
from dxfcheck.configuration.settings_keys import DRAWINGS
from dxfcheck.errors import OptionInvalid
from dxfcheck.reports.files import refuse_target, write_whole
from dxfcheck.reports.settings_report import SettingsReport, settings_as_json, settings_lines
from dxfcheck.reports.terminal_stream import LineStream

__all__ = ["run_settings"]

STANDARD_OUTPUT = "-"


def run_settings(request: Request) -> int:
    """Print the settings, or a file to start from; OptionInvalid for a path that is not there.

    SettingsInvalid carries everything that is wrong with the settings file.
    """
    path = request.paths[0]
    if "\0" in path or not os.path.exists(path):  # noqa: PTH110 - Path.exists raises below a folder that is locked
        msg = f"{path}: there is no such file or folder; check the path"
        raise OptionInvalid(msg)
    try:
        return _print_starter(request) if request.starter else _print_settings(request)
    except BrokenPipeError:
        drop_output()
        return CLEAN
    except OSError as error:
        drop_output()
        msg = f"the settings cannot be written to standard output: {error.strerror or error}"
        raise OptionInvalid(msg) from error


def _print_settings(request: Request) -> int:
    if request.json is not None and request.json != STANDARD_OUTPUT:
        refuse_target(Path(request.json))
    report = _report(request)
    if request.json == STANDARD_OUTPUT:
        sys.stdout.write(settings_as_json(report))
        return CLEAN
    stream = LineStream(sys.stdout)
    stream.print(settings_lines(report, stream.width))
    if request.json is not None:
        write_whole(Path(request.json), settings_as_json(report))
    return CLEAN


def _report(request: Request) -> SettingsReport:
    path = Path(request.paths[0])
    named = request.settings_file
    found = find_settings_file(path) if named is None else Path(named)
    file = read_settings_file(found) if found is not None else None
    effective = settings_for(path, file, request.settings)
    used, unused = _tables(path, file)
    idle = _idle_tables(path, file) if file is not None and path.is_dir() else ()
    return SettingsReport(
        path=str(path),
        folder=path.is_dir(),
        file=file.shown if file is not None else None,
        hidden=tuple(shown_path(each) for each in hidden_settings_files(path)) if named is None else (),
        used=used,
        unused=tuple(table for table in unused if table not in idle),
        idle=idle,
        settings=listed_settings(effective),
    )


def _tables(path: Path, file: SettingsFile | None) -> tuple[tuple[str, ...], tuple[str, ...]]:
    """The tables of single drawings that apply to this path, and those that do not."""
    used: list[str] = []
    unused: list[str] = []
    for table in file.tables if file is not None else ():
        applies = file is not None and matches_path(relative_path(path, file.folder), table.pattern)
        (used if applies else unused).append(_table_name(table))
    return tuple(used), tuple(unused)


def _idle_tables(path: Path, file: SettingsFile) -> tuple[str, ...]:
    """The tables that fit no drawing below the file's folder, or below the path where that lies elsewhere."""
    if not file.tables:
        return ()
    folder = file.folder if path.resolve().is_relative_to(file.folder) else path
    targets = [target for target in find_targets([str(folder)]) if target.problem is None]
    paths = [relative_path(Path(target.path), file.folder) for target in targets]
    return tuple(
        _table_name(table) for table in file.tables if not any(matches_path(each, table.pattern) for each in paths)
    )


def _table_name(table: DrawingTable) -> str:
    return f"{DRAWINGS} {quoted(table.pattern)} (line {table.line})"


def _print_starter(request: Request) -> int:
    if request.json is not None:
        msg = "a settings file to start from is no JSON report; leave --json or --starter out"
        raise OptionInvalid(msg)
    # Loaded on use: without --starter no drawing is read, and what reads them is slow to load.
    from dxfcheck.cli.workers import inspect_all  # noqa: PLC0415
    from dxfcheck.reports.settings_starter import starter_text  # noqa: PLC0415

    path = Path(request.paths[0])
    reports = [outcome.report for outcome in inspect_all(find_targets([str(path)]), request.settings, None)]
    unread = [report for report in reports if report.status == "unreadable"]
    for report in unread:
        say(f"{report.path}: {report.error}")
    if len(unread) == len(reports):
        return UNUSABLE
    folder = path if path.is_dir() else path.parent
    _tell_of_others(folder)
    sys.stdout.write(starter_text(reports, folder))
    return UNUSABLE if unread else CLEAN


def _tell_of_others(folder: Path) -> None:
    """Say which settings file one in this folder would replace or hide; one just made by the shell is empty."""
    files = (find_settings_file(folder), *hidden_settings_files(folder))
    there = next((file for file in files if file is not None and file.stat().st_size), None)
    if there is not None and there.parent == folder.resolve():
        say(f"{shown_path(there)} is there already; what it states is not in this one")
    elif there is not None:
        say(f"a settings file in {folder} hides {shown_path(there)}; copy what it states")
