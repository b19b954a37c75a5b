"""Jobs to work on; see `job`."""

from __future__ import annotations

from pathlib import Path

import pytest

from tests.work.job import Job, released_job


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A logbook with a released plan of two points."""
    return released_job(tmp_path)
