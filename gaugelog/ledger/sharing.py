"""Circuits that span several points: which points, and for which of them its steps count.

A step on a circuit is done once and counts for every point that has the circuit as its own. A
dummy that serves several circuits has the first of them as its own.
"""

from __future__ import annotations

from collections.abc import Iterator
from functools import lru_cache

from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.rows import Known, Row, have


@lru_cache(maxsize=4096)
def _grids(data: str) -> tuple[str, ...]:
    return CircuitPlanned.model_validate_json(data).grids


def points_in(known: Known, circuit: str) -> tuple[str, ...]:
    """The ids of the points that have a grid or dummy in a circuit, each once; none if unknown."""
    return tuple(dict.fromkeys(row["point"] for row in _rows(known, circuit)))


def sharers(known: Known, point: str, circuit: str) -> tuple[str, ...]:
    """The ids of the other points that have the circuit as their own; none for another subject."""
    rows = _rows(known, circuit)
    own = dict.fromkeys(row["point"] for row in rows if row["circuit"] == circuit)
    return tuple(each for each in own if each != point)


def _rows(known: Known, circuit: str) -> Iterator[Row]:
    found = known.get("circuit", circuit)
    for grid in _grids(found["data"]) if found is not None else ():
        yield have(known, "grid", grid)
