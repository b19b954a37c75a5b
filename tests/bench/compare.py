"""Speed against a floor measured in the same run: interleaved runs, medians, one ratio."""

from __future__ import annotations

import statistics
import time
from collections.abc import Callable
from dataclasses import dataclass


@dataclass(frozen=True)
class Comparison:
    """Median seconds of ours and of the floor, and their ratio."""

    ours: float
    floor: float

    @property
    def ratio(self) -> float:
        """How many times longer ours takes than the floor."""
        return self.ours / self.floor

    def line(self, name: str) -> str:
        """One line for the table: name, both medians, ratio."""
        return (
            f"{name}: {self.ours * 1e3:.3f} ms against {self.floor * 1e3:.3f} ms = {self.ratio:.2f}"
        )


def compare(
    ours: Callable[[], object], floor: Callable[[], object], repeats: int = 9
) -> Comparison:
    """Time `ours` and `floor` in turn `repeats` times, after one warm-up of each."""
    ours()
    floor()
    pairs = [(_seconds(ours), _seconds(floor)) for _ in range(repeats)]
    return Comparison(
        statistics.median(pair[0] for pair in pairs), statistics.median(pair[1] for pair in pairs)
    )


def _seconds(act: Callable[[], object]) -> float:
    start = time.perf_counter()
    act()
    return time.perf_counter() - start
