"""Libraries that log to the terminal, kept silent while they work."""

from __future__ import annotations

import logging
from collections.abc import Iterator
from contextlib import contextmanager


class _Keep(logging.Handler):
    def __init__(self, kept: list[str]) -> None:
        super().__init__()
        self._kept = kept

    def emit(self, record: logging.LogRecord) -> None:
        self._kept.append(record.getMessage())


@contextmanager
def quiet(*names: str) -> Iterator[list[str]]:
    """Keep what the named loggers say from the terminal; gives the list it is kept in.

    Without names: those of the libraries that sign and validate.
    """
    kept: list[str] = []
    loggers = [logging.getLogger(name) for name in names or ("pyhanko", "pyhanko_certvalidator")]
    before = [logger.propagate for logger in loggers]
    keep = _Keep(kept)
    for logger in loggers:
        logger.propagate = False
        logger.addHandler(keep)
    try:
        yield kept
    finally:
        for logger, propagated in zip(loggers, before, strict=True):
            logger.propagate = propagated
            logger.removeHandler(keep)
