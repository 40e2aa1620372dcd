"""dxfcheck: reads a planar linkage drawn as a DXF sketch and reports mobility, speeds and what is wrong on the sheet.

    from dxfcheck import check
    report = check("fixtures/tray-tipper.dxf", drives=["A-B = 10 rad/s ccw"])

Importing this package is cheap: names are loaded when first asked for, so that ``dxfcheck --help`` answers at once.
"""

from __future__ import annotations

import importlib
from pathlib import Path
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    import os
    from collections.abc import Sequence

    from dxfcheck.errors import DrawingUnreadable, DxfCheckError, OptionInvalid, SettingsInvalid
    from dxfcheck.inspection import DrawingReport, MechanismReport
    from dxfcheck.reports.json_report import report_as_dict
    from dxfcheck.rules.finding import Finding

__version__ = "0.1.0"

__all__ = [
    "DrawingReport",
    "DrawingUnreadable",
    "DxfCheckError",
    "Finding",
    "MechanismReport",
    "OptionInvalid",
    "SettingsInvalid",
    "__version__",
    "check",
    "report_as_dict",
]

_HOME = {
    "DrawingReport": "dxfcheck.inspection",
    "DrawingUnreadable": "dxfcheck.errors",
    "DxfCheckError": "dxfcheck.errors",
    "Finding": "dxfcheck.rules.finding",
    "MechanismReport": "dxfcheck.inspection",
    "OptionInvalid": "dxfcheck.errors",
    "SettingsInvalid": "dxfcheck.errors",
    "report_as_dict": "dxfcheck.reports.json_report",
}


def check(
    path: str | os.PathLike[str],
    *,
    drives: Sequence[str] = (),
    frame: Sequence[str] = (),
    units: str | None = None,
    tolerance: float | None = None,
    expect_mobility: int | None = None,
    settings: str | os.PathLike[str] | None = None,
) -> DrawingReport:
    """Check one drawing; the options are those of ``dxfcheck check``.

    ``drives`` are texts such as 'A-B = 10 rad/s ccw', ``frame`` names of fixed pins, ``units`` the length unit,
    ``tolerance`` the coincidence tolerance in it. ``settings`` is a settings file; without one none is looked for, so
    that the result does not depend on the folder. A file that cannot be read gives a report of status 'unreadable';
    OptionInvalid where an option cannot be used, SettingsInvalid where the settings file cannot. Time grows with the
    entities, about 0.1 ms each.
    """
    # Loaded on use: these bring in ezdxf and networkx, which importing dxfcheck must not.
    from dxfcheck.inspection import inspect_drawing  # noqa: PLC0415
    from dxfcheck.options import settings_from  # noqa: PLC0415

    stated = settings_from(
        drives=drives, frame=frame, units=units, tolerance=tolerance, expect_mobility=expect_mobility
    )
    if settings is not None:
        from dxfcheck.configuration.effective import settings_for  # noqa: PLC0415 - not needed without a file
        from dxfcheck.configuration.settings_file import read_settings_file  # noqa: PLC0415

        stated = settings_for(Path(path), read_settings_file(Path(settings)), stated).settings
    return inspect_drawing(str(path), stated)


def __getattr__(name: str) -> object:
    """Load a public name when it is first asked for."""
    if name not in _HOME:
        msg = f"module {__name__!r} has no attribute {name!r}"
        raise AttributeError(msg)
    return getattr(importlib.import_module(_HOME[name]), name)


def __dir__() -> list[str]:
    """The public names, loaded or not."""
    return sorted({*globals(), *__all__})
