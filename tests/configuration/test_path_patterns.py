from __future__ import annotations

from pathlib import Path

import pytest

from dxfcheck.configuration.path_patterns import escaped_pattern, matches_path, relative_path, trouble_with_pattern


@pytest.mark.parametrize(
    ("pattern", "path", "fits"),
    [
        ("press.dxf", "press.dxf", True),
        ("press.dxf", "line 2/press.dxf", False),
        ("*.dxf", "press.dxf", True),
        ("*.dxf", "PRESS.DXF", False),
        ("*.dxf", "line 2/press.dxf", False),
        ("received/*.dxf", "received/press.dxf", True),
        ("received/*.dxf", "received/old/press.dxf", False),
        ("received/**", "received/old/press.dxf", True),
        ("**/press.dxf", "press.dxf", True),
        ("**/press.dxf", "a/b/press.dxf", True),
        ("a/**/press.dxf", "a/press.dxf", True),
        ("a/**/press.dxf", "b/press.dxf", False),
        ("press?.dxf", "press2.dxf", True),
        ("press?.dxf", "press/.dxf", False),
        ("press[12].dxf", "press2.dxf", True),
        ("press[!12].dxf", "press2.dxf", False),
        ("press[^1].dxf", "press1.dxf", True),
        ("press[.dxf", "press[.dxf", True),
        ("press.dxf", "pressxdxf", False),
        ("Bühne/*.dxf", "Bühne/heber.dxf", True),
    ],
)
def test_a_pattern_fits_a_whole_path(pattern: str, path: str, *, fits: bool) -> None:
    assert matches_path(path, pattern) is fits


@pytest.mark.parametrize("path", ["plain.dxf", "a[1].dxf", "what?.dxf", "all*.dxf"])
def test_an_escaped_path_fits_itself_alone(path: str) -> None:
    assert matches_path(path, escaped_pattern(path))
    assert not matches_path(path.replace("[1]", "1").replace("?", "x").replace("*", "x") + "x", escaped_pattern(path))


@pytest.mark.parametrize("pattern", ["", "  ", "/srv/*.dxf", "C:/x.dxf", "a\\*.dxf", "received/", "./a.dxf", "~/a.dxf"])
def test_a_pattern_that_could_never_fit_is_refused(pattern: str) -> None:
    trouble = trouble_with_pattern(pattern)
    assert trouble is not None
    assert all(trouble)


def test_other_patterns_are_not() -> None:
    assert trouble_with_pattern("../received/**/*.dxf") is None


def test_paths_run_from_the_folder_of_the_file(tmp_path: Path) -> None:
    assert relative_path(tmp_path / "a" / "b.dxf", tmp_path) == "a/b.dxf"
    assert relative_path(tmp_path / "b.dxf", tmp_path / "a") == "../b.dxf"
