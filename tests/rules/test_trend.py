"""A fall of insulation is flagged, never a verdict by itself."""

from __future__ import annotations

from hypothesis import given
from hypothesis import strategies as st

from gaugelog.rules.trend import insulation_trend


def test_a_fifteenfold_fall_is_flagged() -> None:
    # Common practice: more than tenfold is investigated, even above the floor.
    found = insulation_trend([("bonded", 25e9), ("cabled", 18e9), ("coated", 1.2e9)])
    assert found is not None
    assert (found.before, found.after) == ("cabled", "coated")
    assert "15 times" in found.sentence


def test_tenfold_exactly_is_not_flagged() -> None:
    assert insulation_trend([("bonded", 10e9), ("coated", 1e9)]) is None


@given(st.lists(st.floats(min_value=1e6, max_value=1e13), max_size=5))
def test_insulation_that_only_rises_is_never_flagged(values: list[float]) -> None:
    assert (
        insulation_trend([(str(place), each) for place, each in enumerate(sorted(values))]) is None
    )
