"""The command line: a file a command group; wires the parts together."""

from __future__ import annotations

import errno
import gc
import os
import sys
from collections.abc import Sequence
from typing import TYPE_CHECKING

if TYPE_CHECKING:
    from gaugelog.errors import GaugelogError

_SELDOM = 100_000
"""New objects between two searches for cyclic garbage."""


def main() -> None:
    """Run the command line on the process's arguments and exit with its code."""
    # Starting makes many objects and next to no garbage; a search for it now and then is enough.
    gc.set_threshold(_SELDOM)
    # We have no plugins for validation, and looking for some in every package takes long.
    os.environ.setdefault("PYDANTIC_DISABLE_PLUGINS", "__all__")
    code = run(sys.argv[1:])
    _drop_what_is_stuck()
    sys.exit(code)


def run(arguments: Sequence[str]) -> int:
    """Run the command line on `arguments`; returns the exit code, never a traceback.

    What stops the program is told on stderr in plain words, with what to do. With `--debug`
    among the arguments the traceback of an unexpected error is shown too.
    """
    from gaugelog.commands.talk import be_heard, say, tell_error, tell_unexpected
    from gaugelog.errors import ExitCode, GaugelogError

    try:
        be_heard()
        code = _run(arguments)
        sys.stdout.flush()
    except GaugelogError as error:
        tell_error(error)
        return int(error.exit_code)
    except OSError as error:
        if error.errno == errno.EPIPE:
            return int(ExitCode.TROUBLE)
        trouble = _of_file(error)
        tell_error(trouble)
        return int(trouble.exit_code)
    except KeyboardInterrupt:
        code = int(ExitCode.STOPPED)
    except Exception as error:
        return tell_unexpected(error, debug="--debug" in arguments)
    if code == ExitCode.STOPPED:
        say("gaugelog: stopped. A deed is kept whole or not at all: see `gaugelog journal show`.")
    return code


def _run(arguments: Sequence[str]) -> int:
    from typer.exceptions import Abort, TyperException

    from gaugelog.commands.application import application
    from gaugelog.commands.talk import tell_usage
    from gaugelog.errors import ExitCode

    try:
        typed = list(arguments)
        code = application(typed)(args=typed, prog_name="gaugelog", standalone_mode=False)
    except TyperException as error:
        tell_usage(error)
        return int(ExitCode.USAGE)
    except Abort:  # the end of the input at a question
        return int(ExitCode.STOPPED)
    except SystemExit as end:
        code = end.code
    return code if isinstance(code, int) else int(code is not None)


def _of_file(error: OSError) -> GaugelogError:
    """What the system said about a file, in a sentence; a nameless one is most likely stdout."""
    from gaugelog.errors import StorageTrouble

    reason = error.strerror or type(error).__name__
    if not error.filename:
        return StorageTrouble(
            f"Not all could be written: {reason}.", "Make room there, or name another place."
        )
    return StorageTrouble(
        f"{error.filename} can't be read or written: {reason}.",
        "Name another place, or mend this one.",
    )


def _drop_what_is_stuck() -> None:
    """Let go of output that can't be written, or Python complains of it once more at its end."""
    for stream in (sys.stdout, sys.stderr):
        try:
            stream.flush()
        except OSError:
            os.dup2(os.open(os.devnull, os.O_WRONLY), stream.fileno())
