"""The record as data, and how it is gathered from the ledger."""

from __future__ import annotations

from gaugelog.documents.content.build import build
from gaugelog.documents.content.model import RECORD_FORMAT, RecordContent

__all__ = ["RECORD_FORMAT", "RecordContent", "build"]
