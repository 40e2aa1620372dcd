from __future__ import annotations

from dataclasses import replace

import pytest

from dxfcheck.reading.drives.drive_names import Place, index_names
from tests.drive_models import dibber


@pytest.mark.parametrize(
    ("name", "links"),
    [("B-O", [1]), ("OB", [1]), ("BO", [1]), ("block at C", [3]), ("C", [3]), ("B", []), ("frame", []), ("BB", [])],
)
def test_a_name_is_a_link_or_two_of_its_pins_or_its_only_one(name: str, links: list[int]) -> None:
    expected = {0: [Place(0, link) for link in links]} if links else {}
    assert index_names([dibber()]).homes(name) == expected


def test_links_of_several_mechanisms_may_share_a_name() -> None:
    assert index_names([dibber(), dibber()]).homes("OB") == {0: [Place(0, 1)], 1: [Place(1, 1)]}


def test_an_assembly_on_no_frame_has_no_names() -> None:
    assert not index_names([replace(dibber(), grounded=False)]).homes("OB")
