"""Jobs at some step of the route, made once for each worker, copied for each test."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

import pytest

from tests.screens.pilot import Job, Prepared, prepared

At = Callable[[int], Job]


@pytest.fixture(scope="session")
def _prepared(tmp_path_factory: pytest.TempPathFactory) -> Callable[[int], Prepared]:
    made: dict[int, Prepared] = {}

    def at(count: int) -> Prepared:
        if count not in made:
            made[count] = prepared(tmp_path_factory.mktemp(f"at{count}"), count)
        return made[count]

    return at


@pytest.fixture
def at(_prepared: Callable[[int], Prepared], tmp_path: Path) -> At:
    """A copy of the job whose point FB-1 has walked so many steps."""
    return lambda count: _prepared(count).copy(tmp_path / f"job{count}")
