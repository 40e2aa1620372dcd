from __future__ import annotations

import subprocess
import sys
from pathlib import Path

import pytest

import dxfcheck
from dxfcheck import inspection
from dxfcheck.settings import Settings
from tests.reports.samples import tipper

HEAVY = "{'ezdxf', 'networkx', 'numpy'}"


def heavy_modules_after(statement: str) -> str:
    """The slow libraries loaded in a fresh process by a statement."""
    code = f"import sys\n{statement}\nsys.stderr.write(repr(sorted({HEAVY} & set(sys.modules))))"
    done = subprocess.run([sys.executable, "-c", code], capture_output=True, text=True, check=True)
    return done.stderr.splitlines()[-1]


@pytest.mark.parametrize(
    "statement",
    [
        "import dxfcheck; dxfcheck.__version__",
        "from dxfcheck.cli import main; main(['--help'])",
        "from dxfcheck.cli import main; main(['--version'])",
        "from dxfcheck.cli import main; main(['check', '--help'])",
        "from dxfcheck.cli import main; main(['check'])",
        "from dxfcheck.cli import main; main(['check', 'x.dxf', '--drive', 'nonsense'])",
        "from dxfcheck.cli import main; main(['explain'])",
        "from dxfcheck.cli import main; main(['compare', '--help'])",
        "from dxfcheck.cli import main; main(['compare', 'x.dxf'])",
        "from dxfcheck.cli import main; main(['accept', '--help'])",
        "from dxfcheck.cli import main; main(['accept', 'x.dxf'])",
        "from dxfcheck.cli import main; main(['settings'])",
    ],
)
def test_what_reads_no_drawing_loads_no_slow_library(statement: str) -> None:
    assert heavy_modules_after(statement) == "[]"


def test_every_public_name_is_there() -> None:
    for name in dxfcheck.__all__:
        assert getattr(dxfcheck, name) is not None
    assert set(dxfcheck.__all__) <= set(dir(dxfcheck))


def test_an_unknown_name_is_an_attribute_error() -> None:
    with pytest.raises(AttributeError, match="nothing_of_the_kind"):
        dxfcheck.nothing_of_the_kind  # noqa: B018


def test_check_hands_its_options_on(monkeypatch: pytest.MonkeyPatch) -> None:
    seen: list[tuple[str, Settings]] = []

    def inspect(path: str, settings: Settings) -> dxfcheck.DrawingReport:
        seen.append((path, settings))
        return tipper(path)

    monkeypatch.setattr(inspection, "inspect_drawing", inspect)
    report = dxfcheck.check(
        "a.dxf", drives=["A-B = 1 rad/s"], frame=["A"], units="in", tolerance=0.5, expect_mobility=1
    )
    assert report.path == "a.dxf"
    assert seen == [
        (
            "a.dxf",
            Settings(unit="in", tolerance=0.5, drives=("A-B = 1 rad/s",), frame_pins=("A",), expected_mobility=1),
        )
    ]


def test_check_refuses_an_option_before_it_opens_the_file() -> None:
    with pytest.raises(dxfcheck.OptionInvalid, match="above 0"):
        dxfcheck.check("not-there.dxf", tolerance=-1.0)


def test_check_uses_a_settings_file_only_where_one_is_named(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    seen: list[Settings] = []

    def inspect(path: str, settings: Settings) -> dxfcheck.DrawingReport:
        seen.append(settings)
        return tipper(path)

    monkeypatch.setattr(inspection, "inspect_drawing", inspect)
    monkeypatch.chdir(tmp_path)
    Path("dxfcheck.toml").write_text('[reading]\nunits = "in"\n', encoding="utf-8")
    dxfcheck.check("a.dxf")
    dxfcheck.check("a.dxf", settings="dxfcheck.toml", tolerance=1.0)
    assert seen == [
        Settings(),
        Settings(unit="in", unit_source="settings", tolerance=1.0, files=("dxfcheck.toml",)),
    ]
    with pytest.raises(dxfcheck.SettingsInvalid, match="no such settings file"):
        dxfcheck.check("a.dxf", settings="gone.toml")
