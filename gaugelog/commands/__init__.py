"""The command line: a file a command group; wires the parts together."""

from __future__ import annotations

import sys
from collections.abc import Sequence
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from gaugelog.errors import GaugelogError


def main() -> None:
    """Run the command line on the process's arguments and exit with its code."""
    sys.exit(run(sys.argv[1:]))


def run(arguments: Sequence[str]) -> int:
    """Run the command line on `arguments`; returns the exit code, never a traceback.

    What stops the program is told on stderr in plain words, with what to do. With `--debug`
    among the arguments the traceback of an unexpected error is shown too.
    """
    from gaugelog.commands.application import application
    from gaugelog.commands.talk import tell_error, tell_unexpected
    from gaugelog.errors import GaugelogError

    try:
        application()(args=list(arguments), prog_name="gaugelog")
    except GaugelogError as error:
        tell_error(error)
        return int(error.exit_code)
    except OSError as error:
        trouble = _not_written(error)
        tell_error(trouble)
        return int(trouble.exit_code)
    except SystemExit as end:
        return _code(end)
    except Exception as error:
        return tell_unexpected(error, debug="--debug" in arguments)
    return 0


def _not_written(error: OSError) -> GaugelogError:
    """What the system said about a file, in a sentence."""
    from gaugelog.errors import StorageTrouble

    what = error.filename or "A file"
    reason = error.strerror or type(error).__name__
    return StorageTrouble(
        f"{what} can't be read or written: {reason}.", "Name another place, or mend this one."
    )


def _code(end: SystemExit) -> int:
    if end.code is None:
        return 0
    return end.code if isinstance(end.code, int) else 1
