"""The examples in the formulas' docstrings come out as printed."""

from __future__ import annotations

import doctest
import importlib
import pkgutil

import pytest

from gaugelog import physics

MODULES = sorted(each.name for each in pkgutil.iter_modules(physics.__path__))


@pytest.mark.parametrize("name", MODULES)
def test_the_examples_of_the_module_come_out(name: str) -> None:
    module = importlib.import_module(f"{physics.__name__}.{name}")
    assert 0 == doctest.testmod(module).failed
