from __future__ import annotations

from dxfcheck.drawing.primitives import Entity, Fate, Primitive, Sketch, Source
from dxfcheck.reading.reading import AccountLine
from dxfcheck.reading.records.account import make_account
from tests.sketches import line, ring, sketch, text

LINK = Fate("link", "part of a link")
PIN = Fate("pin", "a ring where links meet or end")
NOTE = Fate("note", "text")


def block_of(*primitives: Primitive) -> Sketch:
    """One block reference that holds several primitives."""
    plain = sketch()
    entity = Entity("9", "INSERT", "PARTS", None, None)
    return Sketch(
        path=plain.path,
        unit=plain.unit,
        entities=(entity,),
        primitives=primitives,
        notices=(),
        diagonal=1.0,
    )


def test_entities_of_one_type_layer_and_fate_share_a_line() -> None:
    drawn = sketch(line(0j, 1j), line(0j, 2j), line(0j, 3j, layer="RODS"), ring(0j), text("A", 0j))
    account = make_account(drawn, {0: LINK, 1: LINK, 2: LINK, 3: PIN, 4: NOTE})
    assert account == (
        AccountLine("LINE", "0", *LINK, 2),
        AccountLine("LINE", "RODS", *LINK, 1),
        AccountLine("CIRCLE", "0", *PIN, 1),
        AccountLine("TEXT", "0", *NOTE, 1),
    )


def test_other_reasons_are_other_lines() -> None:
    drawn = sketch(line(0j, 1j), line(0j, 2j))
    account = make_account(drawn, {0: Fate("skipped", "a speck"), 1: Fate("skipped", "an arrow")})
    assert [each.why for each in account] == ["a speck", "an arrow"]


def test_a_block_reference_counts_once_as_the_most_telling_of_its_parts() -> None:
    source = Source(0, "9", "PARTS", "CONTINUOUS", ())
    drawn = block_of(*(thing.make(source) for thing in (text("A", 0j), ring(0j), line(0j, 1j))))
    assert make_account(drawn, {0: NOTE, 1: PIN, 2: LINK}) == (AccountLine("INSERT", "PARTS", *LINK, 1),)


def test_an_entity_whose_fate_was_sealed_on_loading_keeps_it() -> None:
    off = Entity("7", "LINE", "OFF", Fate("skipped", "layer is off"), None)
    account = make_account(sketch(line(0j, 1j), entities=[off, off]), {0: LINK})
    assert account[1] == AccountLine("LINE", "OFF", "skipped", "layer is off", 2)


def test_an_entity_with_nothing_in_it_is_accounted_for_too() -> None:
    empty = Entity("8", "INSERT", "0", None, None)
    (only,) = make_account(sketch(entities=[empty]), {})
    assert (only.read_as, only.why, only.count) == ("skipped", "nothing in it to read", 1)
