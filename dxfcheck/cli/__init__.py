"""The command line: from arguments to an exit status. It is the only place that says one."""

from __future__ import annotations

import os
import sys
from collections.abc import Sequence
from typing import TYPE_CHECKING

from dxfcheck.cli.arguments import parse_arguments
from dxfcheck.cli.messages import fault_text, say, say_all
from dxfcheck.cli.status import FAULT, INTERRUPTED, UNUSABLE
from dxfcheck.errors import DxfCheckError, SettingsInvalid

if TYPE_CHECKING:
    from dxfcheck.cli.arguments import Request

__all__ = ["main"]


def main(arguments: Sequence[str] | None = None) -> int:
    """Run the command and return its exit status.

    Results go to standard output, all else to standard error.
    """
    try:
        return _run(parse_arguments(arguments))
    except SystemExit as stop:  # argparse leaves this way, after --help as after wrong usage
        return stop.code if isinstance(stop.code, int) else UNUSABLE
    except SettingsInvalid as error:
        say_all(error.problems)
        return UNUSABLE
    except DxfCheckError as error:
        say(str(error))
        return UNUSABLE
    except KeyboardInterrupt:
        say("interrupted")
        return INTERRUPTED
    except Exception as error:  # noqa: BLE001 - the last stop: a user sees one line, never a traceback
        say(fault_text(error))
        return FAULT
    finally:
        _close_output()


def _run(request: Request) -> int:
    # The matrices are small and the drawings many: threads inside numpy only get in one another's way. It must be said
    # before numpy is loaded, and only here: a program that imports dxfcheck has its own mind on that.
    os.environ.setdefault("OPENBLAS_NUM_THREADS", "1")
    # Loaded once the arguments are known to be good: wrong usage and --help answer before rich is loaded, and
    # explain before ezdxf is.
    if request.command == "explain":
        from dxfcheck.cli.explain import run_explain  # noqa: PLC0415

        return run_explain(request)
    if request.accept is not None:
        from dxfcheck.cli.accept import run_accept  # noqa: PLC0415

        return run_accept(request.accept, request)
    if request.compare is not None:
        from dxfcheck.cli.compare import run_compare  # noqa: PLC0415

        return run_compare(request.compare, request)
    if request.command == "settings":
        from dxfcheck.cli.settings_command import run_settings  # noqa: PLC0415

        return run_settings(request)
    from dxfcheck.cli.run import run_drawings  # noqa: PLC0415

    return run_drawings(request)


def _close_output() -> None:
    """Flush what is left; a reader that has gone (| head) is no reason for the interpreter to complain at its exit."""
    from dxfcheck.cli.output import drop_output  # noqa: PLC0415 - not needed before the end

    try:
        sys.stdout.flush()
    except (OSError, ValueError):
        drop_output()
