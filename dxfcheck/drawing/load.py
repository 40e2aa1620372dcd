"""Opening a drawing: what the file is, a strict reading, a repair where that fails, one clear line where both do."""

from __future__ import annotations

import io
import logging
import re
import stat
from collections.abc import Iterator
from contextlib import contextmanager
from pathlib import Path
from typing import NamedTuple

from ezdxf import recover
from ezdxf.document import Drawing
from ezdxf.filemanagement import read, readfile
from ezdxf.tools.codepage import toencoding

from dxfcheck.drawing.cleaning import clean
from dxfcheck.drawing.primitives import Notice
from dxfcheck.drawing.sections import without_idle_sections
from dxfcheck.drawing.shapes import LIBRARY_FAULTS
from dxfcheck.errors import DrawingUnreadable

__all__ = ["Opened", "open_drawing", "stated_encoding"]

_BINARY_DXF = b"AutoCAD Binary DXF"
_OTHER_KINDS: tuple[tuple[bytes, str], ...] = (
    (b"%PDF", "a PDF document"),
    (b"PK\x03\x04", "a ZIP archive"),
    (b"\x89PNG", "a PNG picture"),
    (b"\xff\xd8\xff", "a JPEG picture"),
    (b"GIF8", "a GIF picture"),
    (b"\x1f\x8b", "a gzip archive"),
)
_SAVE_AS_DXF = "save the drawing as DXF"
_EXPORT_AGAIN = "export it again from the program that made it"
_HEAD_LENGTH = 4096
_WORTH_CUTTING = 2_000_000
"""Bytes; in a larger file the sections that can be left out are a small part."""
_VERSION = re.compile(rb"\$ACADVER\s+1\s+(AC1\d{3})\s")
_CODE_PAGE = re.compile(rb"\$DWGCODEPAGE\s+3\s+([A-Za-z0-9_]+)\s")
_FIRST_IN_UTF8 = b"AC1021"
"""From R2007 on the encoding is UTF-8, whatever code page is named (ezdxf, documentation of ``ezdxf.read``)."""
_RECORD = re.compile(rb"(?:^|[\r\n])[ \t]*0[ \t]*(?:\r\n|\r|\n)[ \t]*[A-Z3][A-Z0-9_]{2,}[ \t]*(?:[\r\n]|$)")
"""A DXF record's start: group code 0 on a line of its own, then an upper-case name."""


class Opened(NamedTuple):
    """A drawing in ezdxf's hands, and what had to be done to get it there."""

    document: Drawing
    notices: tuple[Notice, ...]


def open_drawing(path: Path) -> Opened:
    """Read a DXF file of any version, text or binary; DrawingUnreadable, with reason and remedy, where it is none."""
    shown = clean(str(path))
    head = _head(path, shown)
    _require_dxf(head, shown)
    with _quiet_library():
        try:
            document = _read(path, head)
            document.modelspace()  # raises here, not later, where the drawing has none
            return Opened(document, ())
        except MemoryError as fault:
            raise DrawingUnreadable(shown, "there is not enough memory to read it", "split the drawing") from fault
        except LIBRARY_FAULTS as fault:
            return _repaired(path, shown, head, fault)


def _read(path: Path, head: bytes) -> Drawing:
    """The file as ezdxf reads it, without its reading the header beforehand where the first bytes tell the encoding."""
    encoding = stated_encoding(head)
    if encoding is None:
        return readfile(path)
    with path.open(encoding=encoding, errors="surrogateescape") as stream:
        if path.stat().st_size > _WORTH_CUTTING:
            return read(stream)
        return read(io.StringIO(without_idle_sections(stream.read())))


def stated_encoding(head: bytes) -> str | None:
    """The encoding of a text file that names its version, and in old ones its code page, at its beginning."""
    version = _VERSION.search(head)
    if version is None or not head.lstrip().startswith(b"0"):
        return None
    if version[1] >= _FIRST_IN_UTF8:
        return "utf-8"
    code_page = _CODE_PAGE.search(head)
    return toencoding(code_page[1].decode("ascii")) if code_page else None


def _repaired(path: Path, shown: str, head: bytes, fault: Exception) -> Opened:
    """The drawing as far as it can be repaired, with notices that say so."""
    said = _one_line(fault)
    if not head.startswith(_BINARY_DXF) and not _RECORD.search(_content(path, shown)):
        raise DrawingUnreadable(shown, "it is a text file but no DXF drawing", _SAVE_AS_DXF) from fault
    try:
        document, auditor = recover.readfile(path)
        left = len(document.modelspace())
    except LIBRARY_FAULTS as second:
        reason = f"it is damaged beyond repair ({said}; on repair: {_one_line(second)})"
        raise DrawingUnreadable(shown, reason, _EXPORT_AGAIN) from second
    entries = [*auditor.fixes, *auditor.errors]
    repairs = "; ".join(dict.fromkeys(clean(entry.message) for entry in entries[:3]))
    detail = f"{said}; repaired: {repairs or 'what could be read was kept'}"
    notices = [Notice("recovered", detail, None, None, float(len(entries)))]
    if left == 0:
        notices.append(Notice("emptied", "no entity of model space was left after the repair", None, None, None))
    return Opened(document, tuple(notices))


def _head(path: Path, shown: str) -> bytes:
    """The first bytes of a regular file that may be read; DrawingUnreadable for all else."""
    try:
        mode = path.stat().st_mode
        if stat.S_ISDIR(mode):
            raise DrawingUnreadable(shown, "it is a folder, not a file", "name a DXF file")
        if not stat.S_ISREG(mode):
            raise DrawingUnreadable(shown, "it is not a regular file", "name a DXF file")
        with path.open("rb") as file:
            return file.read(_HEAD_LENGTH)
    except FileNotFoundError as fault:
        raise DrawingUnreadable(shown, "there is no such file", "check the path") from fault
    except PermissionError as fault:
        raise DrawingUnreadable(shown, "it may not be read", "ask for permission to read it") from fault
    except (OSError, ValueError) as fault:
        raise DrawingUnreadable(shown, f"it cannot be opened ({_one_line(fault)})", "check the path") from fault


def _require_dxf(head: bytes, shown: str) -> None:
    """DrawingUnreadable where the first bytes tell that the file is something else."""
    if not head.strip():
        raise DrawingUnreadable(shown, "it is empty", _EXPORT_AGAIN)
    if head.startswith(_BINARY_DXF):
        return
    if re.match(rb"AC1\d{3}|AC[12]\.\d", head):
        raise DrawingUnreadable(shown, "it is a DWG drawing, not a DXF", _SAVE_AS_DXF)
    for mark, kind in _OTHER_KINDS:
        if head.startswith(mark):
            raise DrawingUnreadable(shown, f"it is {kind}, not a DXF drawing", _SAVE_AS_DXF)
    if head.startswith((b"\xff\xfe", b"\xfe\xff")):
        raise DrawingUnreadable(shown, "it is text in UTF-16, which DXF does not know", _EXPORT_AGAIN)
    if b"\0" in head:
        raise DrawingUnreadable(shown, "it is a binary file but no DXF drawing", _SAVE_AS_DXF)


def _content(path: Path, shown: str) -> bytes:
    """All bytes of a file that was readable a moment ago."""
    try:
        return path.read_bytes()
    except OSError as fault:
        raise DrawingUnreadable(shown, f"it cannot be read ({_one_line(fault)})", "check the path") from fault


def _one_line(fault: BaseException) -> str:
    """What a fault says, in one clean line; those that say nothing to a drafter are put into words."""
    if isinstance(fault, StopIteration | EOFError):
        return "it breaks off in the middle"
    said = fault.strerror if isinstance(fault, OSError) and fault.strerror else str(fault)
    return clean(" ".join(said.split()).rstrip(".")) or type(fault).__name__


@contextmanager
def _quiet_library() -> Iterator[None]:
    """Keep ezdxf's log records from the user's screen while it reads; what matters comes back as notices."""
    logger = logging.getLogger("ezdxf")
    before = logger.disabled
    logger.disabled = True
    try:
        yield
    finally:
        logger.disabled = before
