"""Long walks without Python's search for garbage, where next to nothing is garbage."""

from __future__ import annotations

import gc
from collections.abc import Iterator
from contextlib import contextmanager


@contextmanager
def no_collection() -> Iterator[None]:
    """Hold the search for cyclic garbage off: in a long walk it takes a good part of the time.

    What is no longer referred to is freed all the same; only cycles wait until the end.
    """
    was_on = gc.isenabled()
    gc.disable()
    try:
        yield
    finally:
        if was_on:
            gc.enable()
