"""Which short texts name which pins, and the names of the pins that none names (reading rule 8)."""

from __future__ import annotations

import re
from collections.abc import Collection, Iterable, Mapping, Sequence
from functools import lru_cache
from typing import NamedTuple

import numpy as np

from dxfcheck.drawing.primitives import Text
from dxfcheck.reading.lines.pins import PinSite
from dxfcheck.reading.lines.roles import is_label_layer
from dxfcheck.reading.lines.tolerance import Tolerance
from dxfcheck.reading.texts.text_places import texts_near
from dxfcheck.tolerances.sheet import LABEL_LENGTH, LABEL_REACH_IN_DIAMETERS, LABEL_REACH_IN_HEIGHTS

__all__ = ["PinNames", "name_pins", "natural_key"]

_LABEL = re.compile(r"[^\W_][\w'\u2032\u2033*]*")  # a letter or digit, then also primes (B', B\u2032) and stars


class PinNames(NamedTuple):
    """Names of pins by index of their site, and the index (into the texts given) of the label each was read from."""

    names: Mapping[int, str]
    labels: Mapping[int, int]


@lru_cache(maxsize=4096)
def natural_key(name: str) -> tuple[tuple[int, int | str], ...]:
    """Sort key in which A2 comes before A10."""
    parts = re.findall(r"\d+|\D+", name)
    return tuple((0, int(part)) if part.isdecimal() else (1, part) for part in parts)


def name_pins(
    pins: Sequence[PinSite],
    used: Collection[int],
    first: Collection[int],
    texts: Sequence[Text],
    tolerance: Tolerance,
) -> PinNames:
    """Names for the pins that carry a link (``used``): the nearest label, else P1, P2 ... by x, then y.

    Those of linkages (``first``) are numbered before the holes of other parts.
    """
    candidates = [index for index, text in enumerate(texts) if _may_be_label(text)]
    labels: dict[int, int] = {}
    taken: set[int] = set()
    for _, _, pin, text in sorted(_near(pins, sorted(used), texts, candidates)):
        if pin not in labels and text not in taken:
            labels[pin] = text
            taken.add(text)
    names = {pin: texts[text].content.strip() for pin, text in labels.items()}
    step = max(tolerance.t, np.finfo(np.float64).tiny)
    spoken = set(names.values())
    number = 0

    def place(pin: int) -> tuple[bool, int, int, int]:
        at = pins[pin].at
        return pin not in first, round(at.real / step), round(at.imag / step), pin

    for pin in sorted(used, key=place):
        if pin in names:
            continue
        number += 1
        while f"P{number}" in spoken:
            number += 1
        names[pin] = f"P{number}"
    return PinNames(names, labels)


def _may_be_label(text: Text) -> bool:
    content = text.content.strip()
    return len(content) <= LABEL_LENGTH and bool(_LABEL.fullmatch(content)) and is_label_layer(text.source)


def _near(
    pins: Sequence[PinSite], used: Sequence[int], texts: Sequence[Text], candidates: Sequence[int]
) -> Iterable[tuple[bool, float, int, int]]:
    """Pairs of a pin and a label within reach of it: (is a mere number, distance, pin, text)."""
    if not used or not candidates:
        return
    written = [texts[number] for number in candidates]
    centres = np.array([pins[pin].at for pin in used], dtype=np.complex128)
    largest = max(_reach(pins[pin], 0.0) for pin in used)
    reaches = np.array([max(largest, LABEL_REACH_IN_HEIGHTS * text.height) for text in written])
    for number, place, distance in zip(
        *(each.tolist() for each in texts_near(written, reaches, centres, centres)), strict=True
    ):
        pin = pins[used[place]]
        if distance <= _reach(pin, written[number].height):
            yield written[number].content.strip().isdecimal(), distance, pin.number, candidates[number]


def _reach(pin: PinSite, height: float) -> float:
    return max(LABEL_REACH_IN_DIAMETERS * 2.0 * pin.radius, LABEL_REACH_IN_HEIGHTS * height)
