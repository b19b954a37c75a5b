from __future__ import annotations

import logging
import sys

import pytest

from gaugelog.documents.pango import need_pango
from gaugelog.documents.quiet import quiet
from gaugelog.errors import MachineTrouble


def test_what_a_library_says_is_kept_and_not_shown(caplog: pytest.LogCaptureFixture) -> None:
    with quiet("pyhanko") as kept:
        logging.getLogger("pyhanko").warning("a word of %s", "warning")
    assert ["a word of warning"] == kept
    assert "a word of warning" not in caplog.text


def test_the_loggers_are_as_before_afterwards() -> None:
    logger = logging.getLogger("pyhanko")
    before = (logger.propagate, list(logger.handlers))
    with pytest.raises(RuntimeError), quiet():
        raise RuntimeError
    assert before == (logger.propagate, list(logger.handlers))


def test_a_library_that_can_not_be_loaded_is_trouble_of_the_machine(
    monkeypatch: pytest.MonkeyPatch,
) -> None:
    class _Broken:
        def find_spec(self, name: str, path: object = None, target: object = None) -> None:
            if name == "weasyprint":
                raise OSError("cannot load library 'libpango-1.0-0'")

    monkeypatch.delitem(sys.modules, "weasyprint", raising=False)
    monkeypatch.setattr(sys, "meta_path", [_Broken(), *sys.meta_path])
    with pytest.raises(MachineTrouble, match="Pango") as caught:
        need_pango()
    assert "apt install libpango-1.0-0" in caught.value.remedy
