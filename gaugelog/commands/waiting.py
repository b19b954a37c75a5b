"""What a person sees while a long command works: a bar on their terminal, gone when it is done."""

from __future__ import annotations

import sys
from collections.abc import Callable, Iterator
from contextlib import contextmanager

from gaugelog.commands.talk import console

Progress = Callable[[int, int], None]
"""Told how many parts are done and how many there are."""


@contextmanager
def bar(title: str) -> Iterator[Progress]:
    """A bar with its time while this lasts; nothing where stderr is no terminal."""
    if not sys.stderr.isatty():
        yield _untold
        return
    from rich.progress import BarColumn, MofNCompleteColumn, TextColumn, TimeElapsedColumn
    from rich.progress import Progress as Bars

    columns = (TextColumn("{task.description}", markup=False), BarColumn(24), MofNCompleteColumn())
    bars = Bars(*columns, TimeElapsedColumn(), console=console(stderr=True), transient=True)
    with bars:
        task = bars.add_task(title, total=None)
        yield lambda done, total: bars.update(task, completed=done, total=total)


def _untold(_done: int, _total: int) -> None:
    """Tell nobody."""
