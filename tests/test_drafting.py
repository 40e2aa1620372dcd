"""The drawing code itself: what must hold of its plans and marks before any reading."""

from __future__ import annotations

import math

import pytest

from fixtures.drafting import (
    Arc,
    Habit,
    Line,
    Motion,
    Outline,
    Part,
    Plan,
    Ring,
    Slide,
    Slot,
    Telescope,
    Wheel,
    band,
    draft,
    loose,
    mechanisms_gears,
    mechanisms_slides,
    on_sheet,
    on_slot,
    slot_direction,
)

PLANS = {
    name: getattr(module, name)
    for module in (mechanisms_slides, mechanisms_gears)
    for name in module.__all__
    if name.isupper()
}
MIRRORED = Motion(turn=0.4, scale=2.0, shift=30 - 7j, mirrored=True)


def arcs(outline: Outline) -> list[tuple[complex, float]]:
    found = [(piece.centre, piece.radius) for piece in loose(outline) if isinstance(piece, Arc)]
    return sorted(found, key=lambda arc: (round(arc[0].real, 6), round(arc[0].imag, 6), arc[1]))


@pytest.mark.parametrize("name", PLANS)
def test_every_sliding_and_rolling_demonstration_has_one_freedom(name: str) -> None:
    assert PLANS[name].mobility() == 1


@pytest.mark.parametrize("cells", [1, 2, 5])
def test_a_scissor_lift_has_one_freedom_whatever_its_height(cells: int) -> None:
    plan = mechanisms_slides.lift_table(cells)
    assert plan.mobility() == 1
    assert len(plan.link_names()) == 2 * cells + 4


def test_second_links_of_one_name_are_numbered_and_pins_are_in_natural_order() -> None:
    plan = Plan(
        points={"B10": 0j, "B9": 50 + 0j},
        parts=(Part(pins=("B10", "B9")), Part(pins=("B9", "B10"), ordinal=2, shape="bent")),
        frame=(),
        slides=(Slide(pin="B9", along=1j, reach=(20, 20)),),
        wheels=(Wheel(pin="B10", radii=(20,)),),
    )
    assert plan.link_names() == ("B9-B10", "B9-B10 (2)", "block at B9", "B10")
    assert [part.name for part in plan.parts] == ["B9-B10", "B9-B10 (2)"]


def test_an_obround_is_the_same_shape_mirrored_and_drawn_from_its_other_end() -> None:
    for bend in (0.0, 0.3, -0.5):
        outline = band("slot", "0", 0j, 60 + 20j, bend=bend, half_width=5)
        (mirrored,) = on_sheet((outline,), Habit(motion=MIRRORED))
        (turned,) = on_sheet((outline,), Habit(motion=MIRRORED, reversal=1))
        expected = [(MIRRORED(centre), 2 * radius) for centre, radius in arcs(outline)]
        for other in (mirrored, turned):
            assert isinstance(other, Outline)
            found = arcs(other)
            assert len(found) == len(expected)
            for centre, radius in expected:
                assert any(abs(centre - at) < 1e-9 and abs(radius - size) < 1e-9 for at, size in found)


def test_a_curved_slots_sides_are_as_far_from_its_pin_as_its_half_width() -> None:
    slot = Slot(pin="P", first=0j, last=80 + 10j, bend=0.4, width=12)
    at = on_slot(slot, 0.3)
    sides = [
        arc for arc in loose(band("s", "0", slot.first, slot.last, bend=0.4, half_width=6)) if isinstance(arc, Arc)
    ]
    distances = sorted(abs(abs(at - arc.centre) - arc.radius) for arc in sides if arc.radius != pytest.approx(6))
    assert distances == pytest.approx([6, 6])
    assert on_slot(slot, 1.0) == pytest.approx(slot.last)
    assert slot_direction(slot, at).real > 0


@pytest.mark.parametrize("guides", ["under", "rails", "cylinder"])
@pytest.mark.parametrize("gap", [0.0, 0.5])
def test_guides_beside_a_block_are_as_far_off_its_side_as_the_habit_says(guides: str, gap: float) -> None:
    plan = mechanisms_slides.DIBBER_OFFSET
    marks = draft(plan, Habit(guides=guides, guide_gap=gap, radius=4))  # type: ignore[arg-type] # a name of its list
    centre, along = plan.points["C"], plan.slides[0].along
    beside = [
        abs(((mark.start - centre) / along).imag)
        for mark in marks
        if isinstance(mark, Line) and mark.part == "guide C" and abs(((mark.end - mark.start) / along).imag) < 1e-9
    ]
    assert beside == pytest.approx([6.8 * (1 + gap)] * (1 if guides == "under" else 2))


def test_a_telescopes_rod_ends_inside_its_barrel_on_the_axis() -> None:
    plan = Plan(points={"A": 0j, "B": 200j}, parts=(), frame=("A", "B"), telescopes=(Telescope(rear="A", front="B"),))
    marks = draft(plan, Habit(radius=4, ends="rim"))
    barrel = next(mark for mark in marks if isinstance(mark, Outline) and mark.part == "barrel A-B")
    rod = next(mark for mark in marks if isinstance(mark, Line) and mark.part == "rod A-B")
    assert (rod.start, rod.end) == (196j, 70j)
    assert {round(point.imag, 9) for point in barrel.points} == {round(-2.2 * 4, 9), 120.0}


def test_cut_parts_have_a_hole_each_and_no_ring_between_them() -> None:
    marks = draft(mechanisms_gears.LASER_CUT_BARS, Habit(radius=5))
    at_second = [mark.part for mark in marks if isinstance(mark, Ring) and mark.part.startswith(("hole B", "pin B"))]
    assert at_second == ["hole B of A-B", "hole B of B-C-E"]


def test_gears_of_the_demonstrations_roll_as_counted() -> None:
    assert list(mechanisms_gears.MIXER.rolling()) == [("A", "P-Q"), ("P-Q", "frame")]
    assert list(mechanisms_gears.TRAY_RACK.rolling()) == [("A-B", "C"), ("C", "D")]
    assert math.isclose(sum(wheel.radii[0] for wheel in mechanisms_gears.PICKER.wheels), 150)
