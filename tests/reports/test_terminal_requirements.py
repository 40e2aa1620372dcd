from __future__ import annotations

from dxfcheck.reports.terminal_requirements import requirement_facts, requirements_line
from dxfcheck.requirements.verdict import Bounds, Outcome, Verdict
from dxfcheck.settings import Requirement


def verdict(outcome: Outcome, subject: str = "C", *, actual: float | None = 1500.0) -> Verdict:
    return Verdict(
        requirement=Requirement(quantity="pin-speed", subject="C", stated="v_C <= 2 m/s", where="dxfcheck.toml:4"),
        mechanism="M1",
        quantity="pin-speed",
        subject=subject,
        outcome=outcome,
        bounds=Bounds(None, 2000.0, None),
        actual=actual,
        why="the drives do not settle it at this pose" if outcome == "not known" else "",
    )


MOBILITY = Verdict(
    requirement=Requirement(quantity="mobility", stated="M = 2"),
    mechanism="M1",
    quantity="mobility",
    subject="M1",
    outcome="broken",
    bounds=Bounds(2.0, 2.0, 2.0),
    actual=1.0,
)
RATIO = Verdict(
    requirement=Requirement(quantity="speed-ratio", stated="0.4 to 0.6"),
    mechanism="M1",
    quantity="speed-ratio",
    subject="C-D",
    against="A-B",
    outcome="kept",
    bounds=Bounds(0.4, 0.6, None),
    actual=0.5,
)


def test_the_line_counts_what_is_kept_and_names_what_is_broken() -> None:
    verdicts = [verdict("kept"), verdict("broken", "D"), MOBILITY, RATIO]
    assert requirements_line(verdicts) == "2 of 4 limits and expectations kept; broken: pin-speed of D and mobility"


def test_the_line_says_what_could_not_be_judged() -> None:
    verdicts = [verdict("kept"), verdict("not known", actual=None), verdict("not judged")]
    assert requirements_line(verdicts) == "1 of 3 limits and expectations kept; 1 not known; 1 not judged"


def test_each_text_is_told_with_its_figures_and_what_is_not_known_is_a_question_mark() -> None:
    verdicts = [verdict("kept"), verdict("not known", "D", actual=None), MOBILITY, RATIO]
    facts = {(stated, where): told for stated, where, told in requirement_facts(verdicts, "mm")}
    assert facts["v_C <= 2 m/s", "dxfcheck.toml:4"] == [
        "pin-speed of C: 1500 mm/s, at most 2000 mm/s: kept",
        "pin-speed of D: ?, at most 2000 mm/s: not known (the drives do not settle it at this pose)",
    ]
    assert facts["M = 2", ""] == ["mobility: 1, expected 2: broken"]
    assert facts["0.4 to 0.6", ""] == ["speed-ratio of C-D to A-B: 0.5, from 0.4 to 0.6: kept"]


def test_many_parts_are_summed_up() -> None:
    ((_, _, facts),) = requirement_facts([verdict("kept", f"P{number}") for number in range(13)], "mm")
    assert facts[-1] == "3 more: 3 kept"
