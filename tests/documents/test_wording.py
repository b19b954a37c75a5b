from __future__ import annotations

from decimal import Decimal

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.documents import wording
from gaugelog.documents.content.workdone import ReadingShown
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.readings import LimitFound
from gaugelog.ledger.routes import Window
from tests.documents.sample import limit, q, readings, sample


def _reading(number: int, **changes: object) -> ReadingShown:
    return ReadingShown.model_validate({**readings()[number], **changes})


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("350.4", "350.4"),
        ("-200", "−200"),
        ("2.5E-3", "0.0025"),
        ("+3", "3"),
        ("1234", "1234"),
        ("174650", "174\u202f650"),
        ("1234567.25", "1\u202f234\u202f567.25"),
        ("1e9", "1\u202f000\u202f000\u202f000"),
    ],
)
def test_numbers_have_a_true_minus_and_groups_of_three(text: str, shown: str) -> None:
    assert shown == wording.number(text)


def test_a_quantity_keeps_its_unit_beside_its_number() -> None:
    assert "12.5\u00a0GΩ" == wording.quantity(Quantity(value="12.5", unit="Gohm"))
    assert "0°" == wording.quantity(Quantity(value="0", unit="deg"))
    assert "2.07" == wording.quantity(Quantity(value="2.07", unit="1"))
    assert "–" == wording.quantity(None)


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("0.54801", "0.55"),
        ("1386", "1400"),
        ("0.0023", "0.0023"),
        ("0.00901", "0.0091"),
        ("0", "0"),
    ],
)
def test_an_uncertainty_is_rounded_up_to_two_digits(text: str, shown: str) -> None:
    assert shown == wording.rounded(text, up=True)


@given(st.decimals(min_value="1e-12", max_value="1e12", allow_nan=False))
def test_rounding_up_never_understates(value: Decimal) -> None:
    shown = Decimal(wording.rounded(format(value, "f"), up=True))
    assert value <= shown <= value * Decimal("1.11")


@pytest.mark.parametrize(
    ("value", "shown"),
    [
        ("33813953.488372", "33814000"),
        ("0.22831050228310502", "0.22831"),
        ("10", "10"),
        ("348.95", "348.95"),
        ("100000000", "100000000"),
    ],
)
def test_a_worked_out_figure_has_five_digits_at_most(value: str, shown: str) -> None:
    tidied = wording.tidy(Quantity(value=value, unit="ohm"))
    assert tidied is not None
    assert shown == tidied.value


def test_the_expanded_uncertainty_is_coverage_times_standard() -> None:
    # 9.5 GΩ, ±10 % rectangular: u = 0.95/√3 = 0.548 GΩ, U = 1.096 GΩ at k = 2 (issue's numbers).
    assert "±\u00a01.1\u00a0GΩ" == wording.expanded(_reading(2))


def test_a_result_that_was_worked_out_is_shown_with_its_sign() -> None:
    assert "+0.2283\u00a0%" == wording.judged(_reading(1))
    assert "−0.1\u00a0%" == wording.judged(_reading(1, result=q("-0.1", "%")))


def test_a_bound_keeps_its_qualifier_and_an_overload_its_word() -> None:
    assert ">\u00a020\u00a0GΩ" == wording.judged(_reading(4))
    assert "overload" == wording.judged(_reading(4, qualifier="overload", value=None))


@pytest.mark.parametrize(
    ("probability", "shown"),
    [
        ("0.9982", "0.998"),
        ("1", ">\u00a00.999"),
        ("0.99962", ">\u00a00.999"),
        ("0.00003", "<\u00a00.001"),
        ("0.181", "0.181"),
        (None, "–"),
    ],
)
def test_a_probability_never_reads_as_certainty(probability: str | None, shown: str) -> None:
    verdict = {**readings()[0]["verdict"], "probability": probability}
    assert shown == wording.probability(_reading(0, verdict=verdict))


def test_a_limit_reads_as_floor_ceiling_or_span() -> None:
    low, high = q("10", "Gohm"), q("0.3", "%")
    span = limit("criteria", "lot", q("348.95", "ohm"), q("351.05", "ohm"))
    either = limit("criteria", "s", q("-0.3", "%"), high)
    bounds = [limit("criteria", "s", low, None), limit("criteria", "s", None, high), span, either]
    assert [
        "≥\u00a010\u00a0GΩ",
        "≤\u00a00.3\u00a0%",
        "348.95\u00a0Ω to 351.05\u00a0Ω",
        "within ±0.3\u00a0%",
    ] == [wording.bound(LimitFound.model_validate(each)) for each in bounds]


def test_a_window_reads_as_a_clause() -> None:
    hour = Quantity(value="60", unit="min")
    assert "not before 60\u00a0min after bond" == wording.window(
        Window(bound="not before", duration=hour, after="bond")
    )
    assert "within 60\u00a0min of clean" == wording.window(
        Window(bound="within", duration=hour, after="clean")
    )


@pytest.mark.parametrize(
    ("offset", "shown"),
    [
        ("+01:00", "2026-12-01 15:42"),
        ("-03:30", "2026-12-01 11:12"),
        ("+14:00", "2026-12-02 04:42"),
    ],
)
def test_times_are_told_in_the_one_zone_of_the_page(offset: str, shown: str) -> None:
    assert shown == wording.WallTime(offset).when("2026-12-01T14:42:10.123456Z")


def test_an_exact_time_carries_its_offset() -> None:
    at = sample().drawn.at
    assert "2026-12-01 15:42:10 UTC+01:00" == wording.WallTime("+01:00").exactly(at)
