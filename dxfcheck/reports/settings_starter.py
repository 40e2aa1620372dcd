"""A settings file to start from, made from what drawings hold: all of it is there to be taken, nothing is stated.

Lines of prose start with '# '; a setting that is not in force starts with '#' and its key. The tables stand open, so
that each setting can be put in force on its own.
"""

from __future__ import annotations

import math
from collections import Counter
from collections.abc import Iterator, Sequence
from pathlib import Path

from dxfcheck.configuration.path_patterns import escaped_pattern, relative_path, trouble_with_pattern
from dxfcheck.configuration.problems import quoted
from dxfcheck.configuration.settings_keys import KEYS, Key
from dxfcheck.configuration.stated_values import toml_text
from dxfcheck.errors import OptionInvalid
from dxfcheck.inspection import DrawingReport
from dxfcheck.linkage import Drive, Linkage
from dxfcheck.reading.drives.drive_text import find_statements, parse_drive
from dxfcheck.reports.terminal_layout import count_of, fold
from dxfcheck.rules.finding import SEVERITIES, Finding
from dxfcheck.settings import LayerRoles
from dxfcheck.tolerances.findings import SAME_RATE_RELATIVE

__all__ = ["starter_text"]

WIDTH = 110
DRAWINGS_IN_FULL = 20
"""So many drawings of a folder get tables of their own."""

HEAD = (
    "Settings of dxfcheck for the drawings in this folder and below it. Nothing is stated yet: lines such as "
    "'#units = \"mm\"', without a space behind the #, are settings that are not in force; take the # away to state "
    "one. 'dxfcheck settings DRAWING' shows what holds for a drawing and who states it; the README lists all settings."
)


def starter_text(reports: Sequence[DrawingReport], folder: Path) -> str:
    """The text of a settings file for ``folder``, from what was read of drawings in it.

    It is a valid settings file that states nothing, and a valid one, too, with every setting in force.
    """
    read = [report for report in reports if report.status == "checked"]
    only = read[0] if len(read) == 1 else None
    lines = [*_prose(HEAD), *_prose(f"Made from {_made_from(read, folder)}."), ""]
    lines += [*_entry("drives", _drives(only) if only else None, _drives_said(only)), ""]
    lines += ["[reading]", *_entry("reading.units", _unit(read)), *_entry("reading.tolerance", _tolerance(only))]
    lines += [*_entry("reading.frame-pins", _fixed(only) if only else None), *_entry("reading.part-blocks", None), ""]
    lines += ["[reading.layers]", *_layers(read), ""]
    lines += ["[expect]", *_entry("expect.mobility", _mobility(read)), ""]
    lines += ["[limits]", *(line for name in KEYS if name.startswith("limits.") for line in _entry(name, None)), ""]
    lines += ["[rules]", *_rules(read)]
    if only is None:
        lines += _tables(read, folder)
    return "\n".join([*lines, ""])


def _prose(text: str) -> list[str]:
    """Lines of comment; what might end a comment or hide in it is shown as '?'."""
    clean = "".join(char if char.isprintable() and not 0xD800 <= ord(char) < 0xE000 else "?" for char in text)
    return fold(clean, WIDTH, "# ", "# ")


def _entry(name: str, value: str | None, said: str = "") -> list[str]:
    """A setting with what it does, out of force; its example where the drawings suggest no value."""
    key = KEYS[name]
    return [*_prose(f"{_sentence(key)}{said}"), f"#{key.word} = {value or key.example}"]


def _sentence(key: Key) -> str:
    return f"{key.does[0].upper()}{key.does[1:]}."


def _made_from(reports: Sequence[DrawingReport], folder: Path) -> str:
    if len(reports) == 1:
        return relative_path(Path(reports[0].path), folder)
    return count_of(len(reports), "drawing")


def _unit(reports: Sequence[DrawingReport]) -> str | None:
    names = Counter(
        report.unit.name for report in reports if report.unit is not None and report.unit.metres is not None
    )
    return quoted(names.most_common(1)[0][0]) if names else None


def _tolerance(report: DrawingReport | None) -> str | None:
    return f"{report.tolerance:.3g}" if report is not None and report.tolerance else None


def _fixed(report: DrawingReport) -> str | None:
    names = sorted({pin.name for mechanism in report.mechanisms for pin in mechanism.linkage.pins if pin.fixed})
    return toml_text(names) if names else None


def _mobility(reports: Sequence[DrawingReport]) -> str | None:
    counts = {mechanism.analysis.mobility.count for report in reports for mechanism in report.mechanisms}
    return str(counts.pop()) if len(counts) == 1 else None


def _layers(reports: Sequence[DrawingReport]) -> Iterator[str]:
    """What the layers of the drawings were read as, and the patterns that are built in."""
    read_as: dict[str, Counter[str]] = {}
    for line in (line for report in reports for line in report.account):
        read_as.setdefault(line.layer, Counter())[line.read_as] += line.count
    if read_as:
        yield from _prose("The layers of the drawings, and what their entities were read as:")
    for layer, counts in sorted(read_as.items()):
        yield from _prose(
            f"  {layer or '(no layer)'}: " + ", ".join(f"{count} {word}" for word, count in counts.most_common())
        )
    for role in ("frame", "pitch", "construction"):
        yield from _entry(f"reading.layers.{role}", toml_text(getattr(LayerRoles(), role)))


def _rules(reports: Sequence[DrawingReport]) -> Iterator[str]:
    findings: dict[str, list[Finding]] = {}
    for finding in (finding for report in reports for finding in report.findings):
        findings.setdefault(finding.rule, []).append(finding)
    yield from _prose(
        'A rule is "off", or all its findings are a "note", a "warning" or an "error". '
        + ("These found something:" if findings else "None found anything here. For instance:")
    )
    for rule, found in sorted(findings.items()):
        gravest = min((finding.severity for finding in found), key=SEVERITIES.index)
        yield f"#{rule} = {quoted(gravest)}  # {count_of(len(found), 'finding')}"
    if not findings:
        yield '#unlabelled-pins = "off"'


def _drives(report: DrawingReport) -> str | None:
    texts = [
        text
        for mechanism in report.mechanisms
        for drive in mechanism.linkage.drives
        if (text := _drive_text(drive, mechanism.linkage, report)) is not None
    ]
    return toml_text(texts) if texts else None


def _drives_said(report: DrawingReport | None) -> str:
    sources = {drive.source for each in report.mechanisms for drive in each.linkage.drives} if report else set()
    said = [text for source, text in (("note", "stated on the sheet"), ("assumed", "assumed")) if source in sources]
    return f" Here {' and '.join(said)}:" if said else ""


def _drive_text(drive: Drive, linkage: Linkage, report: DrawingReport) -> str | None:
    """The drive as an option would state it, in the note's own figures where they mean the same."""
    names = _names_for(drive, linkage)
    metres = report.unit.metres if report.unit is not None else None
    rate = drive.rate * (metres or 1.0) if drive.kind == "slide" else drive.rate
    unit = "rad/s" if drive.kind == "turn" else f"{report.unit.name if metres and report.unit else 'm'}/s"
    for value in (drive.stated.rpartition("=")[2].strip(), f"{drive.rate:.9g} {unit}"):
        try:
            statement = parse_drive(f"{names} = {value}")
        except OptionInvalid:
            continue
        if statement.kind == drive.kind and math.isclose(statement.rate, rate, rel_tol=SAME_RATE_RELATIVE):
            return f"{names} = {value}"
    return None


def _names_for(drive: Drive, linkage: Linkage) -> str:
    """What an option calls the driven motion: a telescope, for one, by its two pins."""
    link, against = linkage.links[drive.link], linkage.links[drive.against]
    if drive.kind == "turn":
        return link.name if drive.against == linkage.frame else f"{link.name} against {against.name}"
    noted = [statement.name for statement in find_statements(drive.stated) if statement.name]
    if noted or drive.against == linkage.frame or link.name.startswith("block at "):
        return noted[0] if noted else link.name
    one, other = against.name, link.name
    return f"{one}-{other}" if "-" not in f"{one}{other}" else link.name


def _tables(reports: Sequence[DrawingReport], folder: Path) -> Iterator[str]:
    """What is particular to each of several drawings, in a table of its own."""
    usable = [(relative_path(Path(report.path), folder), report) for report in reports]
    usable = [(path, report) for path, report in usable if path.isprintable() and trouble_with_pattern(path) is None]
    for path, report in usable[:DRAWINGS_IN_FULL]:
        table = f"drawings.{quoted(escaped_pattern(path))}"
        yield from ("", f"[{table}]", f"#drives = {_drives(report) or KEYS['drives'].example}")
        fixed = _fixed(report)
        if fixed is not None:
            yield from (f"[{table}.reading]", f"#frame-pins = {fixed}")
    if len(usable) > DRAWINGS_IN_FULL:
        yield from ("", *_prose(f"So for {len(usable) - DRAWINGS_IN_FULL} more drawings."))
