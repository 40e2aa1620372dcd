from __future__ import annotations

from dxfcheck.drawing.primitives import Entity, Notice
from tests.rules.subjects import only
from tests.sketches import line, tipper


def off(detail: str, amount: float | None = None) -> Notice:
    """About the first entity."""
    return Notice("off-plane", detail, 0, 7 + 8j, amount)


def test_what_lies_off_the_plane_says_how_far() -> None:
    found = only("off-plane", *tipper(), notices=[off("lies 5 above the plane of the sheet", 5.0)])
    assert (found.severity, found.at, found.handles, found.layer) == ("warning", 7 + 8j, ("ring A",), "FRAME")
    assert found.message == (
        "1 entity off the plane of the sheet left out of the reading: one lies 5 above the plane of the sheet"
    )


def test_many_are_one_finding_that_counts_them_by_tilt_and_height() -> None:
    notices = [off("tilted by 30 degrees")] * 9 + [off("lies above", 5.0), off("lies below", -40.0)]
    found = only("off-plane", *tipper(), notices=notices)
    assert found.message.startswith("11 entities off the plane of the sheet")
    assert found.message.endswith("9 tilted by 30 degrees, 2 up to 40 mm above or below it")
    assert len(found.handles) == 10


def test_a_sheet_of_which_no_ring_is_left_is_an_error() -> None:
    rings = [Entity("7", "CIRCLE", "0", None, None)]
    tilted = Notice("off-plane", "tilted by 30 degrees", 1, 0j, None)
    found = only("off-plane", line(0j, 50j), entities=rings, notices=[tilted])
    assert found.severity == "error"
    assert found.message.endswith("no ring is left to read")
    assert "world's x and y" in found.remedy


def test_linework_seen_from_behind_is_a_note() -> None:
    found = only("mirrored-plane", *tipper(), notices=[Notice("mirrored-plane", "2 drawn so", 0, 7 + 8j, 2.0)])
    assert (found.severity, found.at) == ("note", 7 + 8j)
    assert found.message == "2 drawn so, seen from behind; read where they truly lie"
