"""One drawing on the terminal: the verdict first, then its mechanisms, then what to mend."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterable, Sequence

from dxfcheck.analysis.results import Analysis
from dxfcheck.inspection import DrawingReport, MechanismReport
from dxfcheck.reports.caution import CAUTION
from dxfcheck.reports.terminal_accepted import accepted_lines
from dxfcheck.reports.terminal_brief import MECHANISMS_IN_FULL, brief_mechanisms, few_of_each_rule
from dxfcheck.reports.terminal_layout import Column, Line, count_of, fold, place, table
from dxfcheck.reports.terminal_mechanism import mechanism_lines
from dxfcheck.rules.finding import SEVERITIES, Finding

__all__ = ["caution_lines", "drawing_lines", "quiet_lines", "quiet_summary", "summary_lines", "unit_name", "verdict"]

STYLES = {"error": "bold red", "warning": "yellow", "note": "cyan"}
INDENT = " " * 11


def drawing_lines(report: DrawingReport, width: int, *, working: bool = False) -> list[Line]:
    """Everything about one drawing; ``working`` adds to each mechanism shown in full how it is solved by hand."""
    lines = verdict_line(report, width)
    if report.status == "unreadable":
        return lines
    lines += map(Line, fold(how_measured(report), width, "  ", "  "))
    unit = unit_name(report)
    for number, mechanism in enumerate(report.mechanisms[:MECHANISMS_IN_FULL]):
        lines += [Line(""), *mechanism_lines(mechanism, unit, width)]
        if working:
            lines += _working(mechanism, unit, width, legend=number == 0)
    if len(report.mechanisms) > MECHANISMS_IN_FULL:
        lines += [Line(""), *brief_mechanisms(report.mechanisms[MECHANISMS_IN_FULL:], unit, width)]
    counting = [finding for finding in report.findings if finding.accepted is None]
    if counting:
        lines += [Line(""), Line("Findings", "bold")]
        for item in few_of_each_rule(counting):
            lines += (
                map(Line, fold(item, width, "  ", INDENT)) if isinstance(item, str) else _finding_lines(item, width)
            )
    return lines + accepted_lines([finding for finding in report.findings if finding.accepted is not None], width)


def _working(mechanism: MechanismReport, unit: str, width: int, *, legend: bool) -> list[Line]:
    # Loaded on use: it brings in numpy and networkx, which printing what others found does not need.
    from dxfcheck.reports.terminal_working import working_lines  # noqa: PLC0415

    return [Line(""), *working_lines(mechanism, unit, width, legend=legend)]


def verdict_line(report: DrawingReport, width: int) -> list[Line]:
    """The line that answers: does it hang together, can it move, what is wrong."""
    path = f"{report.path}:"
    lines = fold(verdict(report), width, f"{path} ", "  ")
    return [Line(lines[0], "bold", len(path)), *map(Line, lines[1:])]


def verdict(report: DrawingReport) -> str:
    """What a drafter wants to know first, without the file's name."""
    if report.status == "unreadable":
        return f"not read: {reason(report)}"
    return f"{_motion(report)}; {severities(report.findings)}"


def reason(report: DrawingReport) -> str:
    """Why a drawing was not read, without its path in front."""
    return (report.error or "no reason known").removeprefix(f"{report.path}: ")


def _motion(report: DrawingReport) -> str:
    count = len(report.mechanisms)
    if count == 0:
        return "holds no linkage"
    if count == 1:
        linkage, analysis = report.mechanisms[0].linkage, report.mechanisms[0].analysis
        moves = _how_it_moves(analysis, grounded=linkage.grounded)
        return f"1 mechanism, {moves}{_driven(report)}"
    freedoms = Counter((_for_an_instant(each.analysis), each.analysis.mobility.at_pose) for each in report.mechanisms)
    several = [
        f"{number} cannot move" if freedom == 0 else f"{number} with {count_of(freedom, 'freedom')}{instant}"
        for (instant, freedom), number in sorted(freedoms.items())
    ]
    return f"{count} mechanisms, {', '.join(several)}{_driven(report)}"


def _for_an_instant(analysis: Analysis) -> str:
    """What to say of freedoms that a finite step showed to be none."""
    return " for an instant only" if analysis.finite is not None and analysis.finite.verdict == "locked" else ""


def _how_it_moves(analysis: Analysis, *, grounded: bool) -> str:
    freedoms = analysis.mobility.at_pose
    moves = f"moves with {count_of(freedoms, 'freedom')}" if freedoms else "cannot move"
    moves += _for_an_instant(analysis)
    return moves if grounded else f"tied to no frame, {moves} within itself"


def _driven(report: DrawingReport) -> str:
    """Whether the speeds rest on a stated drive; nothing where nothing could be driven."""
    moving = [m for m in report.mechanisms if m.linkage.grounded and m.analysis.mobility.at_pose > 0]
    if not moving:
        return ""
    if not all(mechanism.analysis.solved for mechanism in moving):
        return ", speeds not settled"
    assumed = any(drive.source == "assumed" for mechanism in moving for drive in mechanism.linkage.drives)
    return ", drive assumed" if assumed else ", driven as stated"


def severities(findings: Sequence[Finding]) -> str:
    """'1 error, 2 warnings, 3 accepted', 'no findings'."""
    counts = _counts(findings)
    counted = ", ".join(count_of(counts[severity], severity) for severity in SEVERITIES if counts[severity])
    if not counts["accepted"]:
        return counted or "no findings"
    return f"{counted}, {counts['accepted']} accepted" if counted else f"no findings but {counts['accepted']} accepted"


def _counts(findings: Iterable[Finding]) -> Counter[str]:
    """How many findings of each weight; what was accepted is counted by itself."""
    return Counter("accepted" if finding.accepted else finding.severity for finding in findings)


def how_measured(report: DrawingReport) -> str:
    """The unit and where it was learnt, the tolerance, and how much there was to read."""
    unit = report.unit
    if unit is None or unit.name == "unitless":
        lengths = "lengths in drawing units, as the file names none"
    else:
        lengths = f"lengths in {unit.name} ({_UNIT_SOURCES.get(unit.source, unit.source)})"
    parts = [count_of(report.entities, "entity", "entities"), lengths]
    if report.tolerance is not None:
        name = unit_name(report)
        parts.append(f"ends within {report.tolerance:.2g} {'units' if name == 'unit' else name} meet")
    if report.settings_files or report.rules_off:
        parts.append(f"settings: {', '.join(report.settings_files) or 'stated'}")
    if report.rules_off:
        parts.append(f"{count_of(len(report.rules_off), 'rule')} off")
    return "; ".join(parts)


_UNIT_SOURCES = {
    "header": "from the file's header",
    "option": "from the option",
    "settings": "from the settings",
    "assumed": "assumed",
}


def unit_name(report: DrawingReport) -> str:
    """The length unit for column headings; 'unit' where the drawing has none."""
    return "unit" if report.unit is None or report.unit.name == "unitless" else report.unit.name


def _finding_lines(finding: Finding, width: int) -> list[Line]:
    """Weight, rule and place; then what; then how to mend it."""
    head = "  ".join((finding.rule, *_whereabouts(finding)))
    lead = f"  {finding.severity:<9}"
    first, *more = fold(head, width, lead, INDENT)
    lines = [Line(first, STYLES[finding.severity], len(lead)), *map(Line, more)]
    lines += map(Line, fold(finding.message, width, INDENT, INDENT))
    lines += map(Line, fold(f"To mend: {finding.remedy}", width, INDENT, INDENT))
    return lines


def _whereabouts(finding: Finding) -> list[str]:
    """The place, the mechanism, the layer and the handles, as far as they are known."""
    parts = [] if finding.at is None else [f"at {place(finding.at)}"]
    if finding.mechanism:
        parts.append(f"in {finding.mechanism}")
    if finding.layer is not None:
        parts.append(f"layer {finding.layer}")
    if finding.handles:
        parts.append(f"{'handle' if len(finding.handles) == 1 else 'handles'} {', '.join(finding.handles)}")
    return [", ".join(parts)] if parts else []


def quiet_lines(report: DrawingReport) -> list[Line]:
    """One unbroken line a finding, for grep and for hooks; what was accepted is only counted at the end."""
    if report.status == "unreadable":
        return [Line(f"{report.path}: {verdict(report)}")]
    lines = []
    for finding in report.findings:
        if finding.accepted is not None:
            continue
        at = "" if finding.at is None else f" at {place(finding.at)}"
        lines.append(Line(f"{report.path}: {finding.severity} {finding.rule}{at}: {finding.message}"))
    return lines


def quiet_summary(reports: Sequence[DrawingReport]) -> Line:
    """One line on all drawings."""
    unreadable = sum(report.status == "unreadable" for report in reports)
    findings = [finding for report in reports for finding in report.findings]
    not_read = f", {unreadable} not read" if unreadable else ""
    return Line(f"{count_of(len(reports), 'drawing')}{not_read}: {severities(findings)}")


def summary_lines(reports: Sequence[DrawingReport], width: int) -> list[Line]:
    """A row for each of several drawings."""
    counts = [_counts(report.findings) for report in reports]
    columns = [
        Column("drawing", "", [report.path for report in reports], numeric=False),
        Column("mechanisms", "", [_unless_unread(report, len(report.mechanisms)) for report in reports]),
        Column("freedoms", "", [_freedoms(report) for report in reports]),
    ]
    headings: dict[str, str] = {severity: f"{severity}s" for severity in SEVERITIES}
    if any(count["accepted"] for count in counts):
        headings["accepted"] = "accepted"
    for counted, heading in headings.items():
        cells = [_unless_unread(report, count[counted]) for report, count in zip(reports, counts, strict=True)]
        columns.append(Column(heading, "", cells))
    return [Line("Summary", "bold"), *table(columns, width), Line("  " + quiet_summary(reports).text)]


def _unless_unread(report: DrawingReport, number: int) -> str:
    return "not read" if report.status == "unreadable" else str(number)


def _freedoms(report: DrawingReport) -> str:
    """The freedoms at the pose of each mechanism; the range where there are many."""
    if report.status == "unreadable":
        return "not read"
    freedoms = [mechanism.analysis.mobility.at_pose for mechanism in report.mechanisms]
    if not freedoms:
        return "-"
    least, most = min(freedoms), max(freedoms)
    return str(least) if least == most else f"{least} to {most}"


def caution_lines(width: int) -> list[Line]:
    """What the report does not say; it ends every run."""
    return [Line(text, "dim") for text in fold(CAUTION, width)]
