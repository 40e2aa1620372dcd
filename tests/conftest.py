"""What all tests share: the same examples on every run, and golden files that one option rewrites."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest
from hypothesis import settings

GOLDEN = Path(__file__).parent / "golden"

settings.register_profile("same-every-run", derandomize=True, deadline=None, database=None)
settings.load_profile("same-every-run")


def pytest_addoption(parser: pytest.Parser) -> None:
    parser.addoption("--rewrite-golden", action="store_true", help="write what is printed now to tests/golden")


@pytest.fixture
def golden(request: pytest.FixtureRequest) -> Callable[[str, str], None]:
    """Hold a text against the golden file of that name, byte for byte."""

    def compare(name: str, text: str) -> None:
        path = GOLDEN / name
        if request.config.getoption("--rewrite-golden"):
            path.write_text(text, encoding="utf-8")
        assert text == path.read_text(encoding="utf-8"), f"{name} differs; if it is meant, run with --rewrite-golden"

    return compare
