"""The house stays as it was built: imports run one way, and each library has its room."""

from __future__ import annotations

import ast
from collections.abc import Iterator
from pathlib import Path

import pytest

PACKAGE = Path(__file__).parent.parent / "dxfcheck"
SOURCES = sorted(PACKAGE.rglob("*.py"))

# A room may import from its own and from those before it. The package itself (dxfcheck/__init__.py) only hands out
# names on demand, and offers every room its version.
ROOMS = [
    "errors",
    "geometry",
    "tolerances",
    "settings",
    "collector",
    "drawing",
    "linkage",
    "reading",
    "options",
    "analysis",
    "requirements",
    "rules",
    "configuration",
    "inspection",
    "comparison",
    "reports",
    "cli",
    "__main__",
]
STEPS = [
    "reading.reading",
    "reading.lines",
    "reading.shapes",
    "reading.frames",
    "reading.bodies",
    "reading.slides",
    "reading.gears",
    "reading.parts",
    "reading.texts",
    "reading.drives",
    "reading.requirements",
    "reading.mechanisms",
    "reading.lengths",
    "reading.observations",
    "reading.records",
    "reading.read",
]
"""Within the reading, too, each step builds on those before it."""
HOMES = {
    "ezdxf": ("drawing",),
    "networkx": ("analysis",),
    "rich": ("reports.terminal", "cli"),
    "argparse": ("cli",),
    "tomllib": ("configuration",),
}
LONGEST_FILE = 400
LONGEST_FUNCTION = 60


def module_name(path: Path) -> str:
    """'drawing.load' for dxfcheck/drawing/load.py; '' for the package itself."""
    parts = path.relative_to(PACKAGE).with_suffix("").parts
    return ".".join(part for part in parts if part != "__init__")


def imported(path: Path) -> Iterator[tuple[str, int]]:
    """Every module a file imports, at its top or inside a function, with the line."""
    for node in ast.walk(ast.parse(path.read_text(encoding="utf-8"))):
        if isinstance(node, ast.Import):
            yield from ((alias.name, node.lineno) for alias in node.names)
        elif isinstance(node, ast.ImportFrom):
            assert node.level == 0, f"{path}:{node.lineno}: relative import"
            assert node.module is not None
            yield node.module, node.lineno
            if node.module in {"dxfcheck", *(f"dxfcheck.{room}" for room in ROOMS)}:
                yield from (
                    (f"{node.module}.{alias.name}", node.lineno) for alias in node.names if alias.name != "__version__"
                )


def complaints(path: Path) -> Iterator[str]:
    """What is wrong with the imports of one file."""
    module = module_name(path)
    room = module.partition(".")[0]
    for name, line in imported(path):
        package, _, inner = name.partition(".")
        if package == "dxfcheck" and inner and room and ROOMS.index(inner.partition(".")[0]) > ROOMS.index(room):
            yield f"{module}:{line} imports {name}, which comes after it"
        if inner.startswith("reading.") and room == "reading" and _step(inner) > _step(module):
            yield f"{module}:{line} imports {name}, a later step of the reading"
        if package in HOMES and not module.startswith(HOMES[package]):
            yield f"{module}:{line} imports {package}, which belongs to {' and '.join(HOMES[package])}"


def _step(module: str) -> int:
    """The place of a module among the steps of the reading; first for the package itself."""
    return next((place for place, step in enumerate(STEPS) if f"{module}.".startswith(f"{step}.")), -1)


@pytest.mark.parametrize("path", SOURCES, ids=module_name)
def test_imports_run_backwards_only_and_libraries_stay_in_their_rooms(path: Path) -> None:
    assert not list(complaints(path))


@pytest.mark.parametrize("path", SOURCES, ids=module_name)
def test_files_and_functions_are_small_enough_to_read(path: Path) -> None:
    text = path.read_text(encoding="utf-8")
    assert len(text.splitlines()) <= LONGEST_FILE
    functions = [n for n in ast.walk(ast.parse(text)) if isinstance(n, ast.FunctionDef | ast.AsyncFunctionDef)]
    assert not [f.name for f in functions if (f.end_lineno or 0) - f.lineno >= LONGEST_FUNCTION]


def test_no_file_is_a_drawer_for_odds_and_ends() -> None:
    assert not [path for path in SOURCES if path.stem in {"utils", "helpers", "misc", "common"}]


def test_every_step_of_the_reading_has_its_place() -> None:
    inside = {module_name(path) for path in SOURCES if module_name(path).startswith("reading.")}
    assert not [module for module in inside if _step(module) < 0]


def test_every_file_belongs_to_a_known_room() -> None:
    assert {module_name(path).partition(".")[0] for path in SOURCES} - {""} <= set(ROOMS)


@pytest.mark.parametrize(
    ("where", "source", "complaint"),
    [
        ("reading/pins.py", "from dxfcheck.rules.finding import Finding", "comes after it"),
        ("rules/pose.py", "import dxfcheck.cli.run", "comes after it"),
        ("rules/pose.py", "from dxfcheck import inspection", "comes after it"),
        ("linkage.py", "def load():\n    from dxfcheck.analysis import analyse", "comes after it"),
        ("reading/pins.py", "import ezdxf.math", "belongs to drawing"),
        ("reading/lines/pins.py", "from dxfcheck.reading.bodies.body import Body", "a later step"),
        ("rules/pose.py", "from networkx import Graph", "belongs to analysis"),
        ("reports/json_report.py", "from rich.text import Text", "belongs to reports.terminal and cli"),
    ],
)
def test_a_wrong_import_is_noticed(
    where: str, source: str, complaint: str, tmp_path: Path, monkeypatch: pytest.MonkeyPatch
) -> None:
    monkeypatch.setitem(globals(), "PACKAGE", tmp_path)
    path = tmp_path / where
    path.parent.mkdir(parents=True, exist_ok=True)
    path.write_text(source, encoding="utf-8")
    assert [found for found in complaints(path) if complaint in found]
