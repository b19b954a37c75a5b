"""The examples in the docstrings hold."""

from __future__ import annotations

import doctest
from types import ModuleType

import pytest

from gaugelog.intake import texts, typed, units


@pytest.mark.parametrize("module", [texts, typed, units], ids=lambda module: module.__name__)
def test_examples_hold(module: ModuleType) -> None:
    done = doctest.testmod(module)
    assert 0 == done.failed
    assert 0 < done.attempted
