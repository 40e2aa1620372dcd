"""What of a DXF file need not be read: sections that hold no geometry, left out before ezdxf parses them.

A third of a small file of today's versions is the OBJECTS section (dictionaries, plot settings, styles), which takes
ezdxf a quarter of its time. It makes the objects that it needs itself where there are none.
"""

from __future__ import annotations

import re

__all__ = ["without_idle_sections"]

_SECTION = re.compile(r"^ *0\s*\n *SECTION\s*\n *2\s*\n *(CLASSES|OBJECTS)[ \t]*\n", re.MULTILINE)
_END = re.compile(r"^[ \t]*0[ \t]*\n[ \t]*ENDSEC[ \t]*\n", re.MULTILINE)
_NEEDED = re.compile(r"^[ \t]*0[ \t]*\n[ \t]*(?:\w*IMAGE\w*|\w+DEFINITION|GEODATA)[ \t]*\n", re.MULTILINE)
"""Objects that entities of the drawing refer to: without them ezdxf would drop those entities."""
_LAYOUT = re.compile(r"^[ \t]*0[ \t]*\n[ \t]*LAYOUT[ \t]*\n", re.MULTILINE)
_OWN_LAYOUTS = 2
"""Model space and one paper layout, which ezdxf makes itself; what lies on further ones needs their objects."""


def without_idle_sections(text: str) -> str:
    """The text of a DXF file (line ends as newlines) without its CLASSES, and its OBJECTS where nothing refers to them.

    A section without an end is left in: the file is damaged, and that is to be seen.
    """
    kept: list[str] = []
    done = 0
    for section in _SECTION.finditer(text):
        end = _END.search(text, section.end())
        if end is None:
            return text
        if section[1] == "CLASSES" or _is_idle(text[section.end() : end.start()]):
            kept.append(text[done : section.start()])
            done = end.end()
    return "".join(kept) + text[done:]


def _is_idle(objects: str) -> bool:
    return _NEEDED.search(objects) is None and len(_LAYOUT.findall(objects)) <= _OWN_LAYOUTS
