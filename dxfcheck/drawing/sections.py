"""What of a DXF file need not be read: what holds no geometry, left out before ezdxf parses it.

A third of a small file of today's versions is the OBJECTS section (dictionaries, plot settings, styles), a quarter the
variables of the HEADER; both together take ezdxf a third of its time. It makes what it needs of them itself.
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
_HEADER = re.compile(r"^ *0\s*\n *SECTION\s*\n *2\s*\n *HEADER[ \t]*\n", re.MULTILINE)
_VARIABLE = re.compile(r"^ *9[ \t]*\n(?=[ \t]*\$)", re.MULTILINE)
_READ = re.compile(r"[ \t]*\$(?:ACADVER|ACADMAINTVER|DWGCODEPAGE|HANDSEED|HANDLING|INSUNITS|MEASUREMENT)\s")
"""The variables that this program or ezdxf looks at."""


def without_idle_sections(text: str) -> str:
    """The text of a DXF file (line ends as newlines) without its CLASSES, and its OBJECTS where nothing refers to them.

    Of the HEADER only those variables are left that are looked at. A section without an end is left in: the file is
    damaged, and that is to be seen.
    """
    text = _with_short_header(text)
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


def _with_short_header(text: str) -> str:
    header = _HEADER.search(text)
    end = None if header is None else _END.search(text, header.end())
    if header is None or end is None:
        return text
    first, *variables = _VARIABLE.split(text[header.end() : end.start()])
    read = "".join(f"9\n{variable}" for variable in variables if _READ.match(variable))
    return f"{text[: header.end()]}{first}{read}{text[end.start() :]}"


def _is_idle(objects: str) -> bool:
    return _NEEDED.search(objects) is None and len(_LAYOUT.findall(objects)) <= _OWN_LAYOUTS
