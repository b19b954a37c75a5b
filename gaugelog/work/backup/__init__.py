"""A logbook in one file: made while work goes on, restored with an entry that says so."""

from __future__ import annotations

from gaugelog.work.backup.archive import Archive, opened
from gaugelog.work.backup.make import BackedUp, backup
from gaugelog.work.backup.restore import Restored, restore

__all__ = ["Archive", "BackedUp", "Restored", "backup", "opened", "restore"]
