"""What good work reaches beyond the limit: which readings fall short of it."""

from __future__ import annotations

import pytest

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CheckCriterion
from gaugelog.ledger.readings import Qualifier, ReadingTaken, Verdict
from gaugelog.rules.expected import is_short
from tests.rules.test_verdicts import q

VERDICT = Verdict(word="pass", blocks=False, reason="It passes.", rule="insulation 1")


def _reading(
    value: Quantity | None, qualifier: Qualifier = "=", result: Quantity | None = None
) -> ReadingTaken:
    return ReadingTaken(
        id="r",
        point="p",
        subject="g",
        step="s",
        check="insulation",
        stage="bonded",
        attempt=1,
        typed="t",
        qualifier=qualifier,
        value=value,
        gauge="g",
        instrument="i",
        range="20 GΩ",
        observed_at="2026-11-17T08:00:00Z",
        observed_by="t.okoro",
        result=result,
        verdict=VERDICT,
    )


def _criterion(**figures: Quantity) -> CheckCriterion:
    return CheckCriterion(
        check="insulation",
        stage="bonded",
        source="common practice",
        **figures,  # type: ignore[arg-type]
    )


FLOOR = _criterion(at_least=q("10", "Gohm"), expected=q("20", "Gohm"))
CEILING = _criterion(at_most=q("0.3", "%"), expected=q("0.1", "%"))


@pytest.mark.parametrize(
    ("value", "qualifier", "short"),
    [
        ("19.9", "=", True),
        ("20", "=", False),
        ("25", "=", False),
        ("15", ">", False),
        ("20", ">", False),
        ("15", "<", True),
    ],
)
def test_insulation_short_of_what_is_expected(
    value: str, qualifier: Qualifier, short: bool
) -> None:
    assert short == is_short(FLOOR, _reading(q(value, "Gohm"), qualifier))


@pytest.mark.parametrize(("change", "short"), [("0.05", False), ("-0.2", True), ("0.2", True)])
def test_a_change_beyond_what_is_expected_either_way(change: str, short: bool) -> None:
    assert short == is_short(CEILING, _reading(q("350", "ohm"), result=q(change, "%")))


def test_nothing_is_short_where_nothing_is_expected_or_read() -> None:
    assert not is_short(_criterion(at_least=q("10", "Gohm")), _reading(q("11", "Gohm")))
    assert not is_short(FLOOR, _reading(None, "overload"))
