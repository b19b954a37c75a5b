"""Not-a-number, infinity and text in any plain argument: one clear sentence that names it."""

from __future__ import annotations

import importlib
import inspect
from collections.abc import Callable, Iterator
from math import inf, nan
from typing import Any

import pytest

from gaugelog.errors import ExitCode
from gaugelog.physics.validity import OutOfDomain

MODULES = (
    *("temperature", "transverse", "rosette", "placement", "averaging", "holeedge"),
    *("stiffening", "curvature", "excitation", "noise", "supplies", "zerowatch"),
    *("dynamics", "semiconductor", "largestrain", "weldable"),
)
USUAL = {"celsius": 50.0, "factor": 2.0, "modulus": 2e11, "supply": 5.0, "carrier": 0.4}
"""Values of arguments for which `ELSE` would not do."""
ELSE = 0.2
PLAIN = {"Number", "float"}
LIST = inspect.Parameter.VAR_POSITIONAL
FLAT = "radius"
"""An infinite radius is a flat surface in `curvature`."""

Call = tuple[str, Callable[..., Any], dict[str, float], str]


def _calls() -> Iterator[Call]:
    """Each function of plain arguments only, with values that it takes, and each argument."""
    for name in MODULES:
        module = importlib.import_module(f"gaugelog.physics.{name}")
        for function in vars(module).values():
            own = inspect.isfunction(function) and function.__module__ == module.__name__
            if not own or function.__name__.startswith("_"):
                continue
            parameters = inspect.signature(function).parameters.values()
            if any(each.annotation not in PLAIN or each.kind is LIST for each in parameters):
                continue
            values = {each.name: USUAL.get(each.name, ELSE) for each in parameters}
            yield from ((name, function, values, each) for each in values)


CALLS = [pytest.param(*call, id=f"{call[0]}.{call[1].__name__}-{call[3]}") for call in _calls()]


@pytest.mark.parametrize(("module", "function", "values", "argument"), CALLS)
def test_what_is_no_finite_number_is_refused(
    module: str, function: Callable[..., Any], values: dict[str, float], argument: str
) -> None:
    function(**values)
    bad: list[Any] = [nan, "350 ohm", None]
    if (module, argument) != ("curvature", FLAT):
        bad += [inf, -inf]
    for value in bad:
        with pytest.raises(OutOfDomain) as refused:
            function(**{**values, argument: value})
        assert refused.value.exit_code is ExitCode.FAULTS
        assert str(refused.value).endswith(".")
        assert "\n" not in str(refused.value)


def test_the_walk_meets_most_of_the_formulas() -> None:
    assert len({call[1] for call in _calls()}) > 80
