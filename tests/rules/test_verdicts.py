"""Verdicts of resistance and insulation through the rules; the figures are worked by hand."""

from __future__ import annotations

import pytest

from gaugelog.errors import Faulty
from gaugelog.intake.typed import parse_reading
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.campaign import CheckCriterion, CriteriaAgreed
from gaugelog.ledger.instruments import InstrumentRange
from gaugelog.ledger.points import Place, PlannedGrid, PointPlanned
from gaugelog.ledger.stock import GridData, LotReceived
from gaugelog.rules.accuracy import RangeTaken
from gaugelog.rules.limits import Basis, limits_for
from gaugelog.rules.plausible import demand_plausible
from gaugelog.rules.verdicts import Judged, Taken, judge_change, judge_value


def q(value: str, unit: str) -> Quantity:
    """A quantity."""
    return Quantity(value=value, unit=unit)


def _criterion(check: str, stage: str, **figures: Quantity) -> CheckCriterion:
    return CheckCriterion(
        check=check,
        stage=stage,
        source="common practice",
        **figures,  # type: ignore[arg-type]
    )


CRITERIA = CriteriaAgreed(
    id="k",
    campaign="c",
    title="t",
    edition="1",
    coverage="2",
    conditional_pass="goes on",
    conditional_fail="blocks",
    checks=(
        _criterion("insulation", "bonded", at_least=q("10", "Gohm")).model_copy(
            update={"physics": ("permitted error",)}
        ),
        _criterion("resistance", "bonded", at_most=q("0.3", "%")),
    ),
)
LOT = LotReceived(
    id="l",
    label="L-1",
    maker="m",
    type="t",
    nominal_resistance=q("350", "ohm"),
    resistance_tolerance=q("0.3", "%"),
    grid_length=q("6", "mm"),
    grid_width=q("3", "mm"),
    grids=(
        GridData(
            number=1,
            gauge_factor=q("2", "1"),
            gauge_factor_tolerance=q("1", "%"),
            transverse_sensitivity=q("0", "%"),
            angle=q("0", "deg"),
        ),
    ),
    received_on="2026-01-01",
    packs=(),
)
POINT = PointPlanned(
    id="p",
    label="P1",
    campaign="c",
    article="a",
    zone="z",
    quantity="strain",
    purpose="x",
    load="static",
    strain_min=q("0", "um/m"),
    strain_max=q("100", "um/m"),
    temperature_min=q("0", "degC"),
    temperature_max=q("30", "degC"),
    permitted_error=q("5", "um/m"),
    place=Place(
        datum="d",
        x=q("0", "mm"),
        y=q("0", "mm"),
        side="top",
        axis="long",
        angle=q("0", "deg"),
        tolerance=q("1", "mm"),
        angle_tolerance=q("2", "deg"),
    ),
    lot="l",
    route="r",
    grids=(PlannedGrid(id="g", label="P1", number=1),),
)
BASIS = Basis(POINT, LOT, CRITERIA, "laboratory")


def _range(quantity: str, gain: str, offset: Quantity, resolution: Quantity) -> InstrumentRange:
    return InstrumentRange(
        name=quantity,
        quantity=quantity,
        low=q("0", offset.unit),
        high=q("100000", offset.unit),
        gain=q(gain, "%"),
        offset=offset,
        resolution=resolution,
    )


INSULATION = _range("insulation", "10", q("0", "Gohm"), q("0", "Gohm"))
RESISTANCE = _range("resistance", "0.05", q("0.1", "ohm"), q("0.01", "ohm"))


def _insulation(typed: str) -> Judged:
    reading = parse_reading(typed, "insulation")
    taken = Taken(reading.quantity, reading.qualifier, RangeTaken("IT", INSULATION))
    return judge_value(BASIS, "insulation", "bonded", taken)


@pytest.mark.parametrize(
    ("typed", "word", "probability", "blocks"),
    [
        ("12.0 Gohm", "pass", 0.998, False),
        ("11.0 Gohm", "conditional pass", 0.942, False),
        ("9.5 Gohm", "conditional fail", 0.181, True),
        ("8.9 Gohm", "fail", 0.016, True),
    ],
)
def test_insulation_against_a_floor_of_10_gigaohm(
    typed: str, word: str, probability: float, blocks: bool
) -> None:
    # JCGM 106:2012, 7.3 and ILAC-G8:09/2019: ±10 % of reading rectangular, k = 2.
    verdict = _insulation(typed).verdict
    assert word == verdict.word
    assert verdict.probability is not None
    assert float(verdict.probability) == pytest.approx(probability, abs=5e-4)
    assert blocks == verdict.blocks


def test_a_bound_far_above_the_floor_passes_without_a_probability() -> None:
    verdict = _insulation(">20 GΩ").verdict
    assert verdict.word == "pass"
    assert verdict.probability is None


def test_a_bound_below_the_floor_is_undecided_and_blocks() -> None:
    verdict = _insulation(">5 GΩ").verdict
    assert verdict.word == "undecided"
    assert verdict.blocks


def test_milli_or_mega_is_refused_before_it_is_a_reading() -> None:
    with pytest.raises(Faulty, match="1 fault"):
        _insulation("12.5 mohm")


def test_the_strictest_limit_rules_and_both_are_told() -> None:
    limits = limits_for(BASIS, "insulation", "bonded")
    assert [(limit.origin, limit.rules) for limit in limits] == [
        ("criteria", True),
        ("permitted error", False),
    ]
    # R (1/(K ε) − 1) = 350 (1/(2 · 5e-6) − 1) = 34.99965 MΩ.
    assert str(limits[1].at_least) == "34.99965 MΩ"


def test_physics_rules_where_the_permitted_error_is_small() -> None:
    fine = POINT.model_copy(update={"permitted_error": q("0.005", "um/m")})
    limits = limits_for(Basis(fine, LOT, CRITERIA, "laboratory"), "insulation", "bonded")
    assert [limit.rules for limit in limits] == [False, True]


def _resistance(typed: str, meter: str) -> Taken:
    reading = parse_reading(typed, "resistance")
    return Taken(reading.quantity, reading.qualifier, RangeTaken(meter, RESISTANCE))


def _change(second_meter: str) -> Judged:
    before, after = _resistance("350.4 ohm", "RM-1"), _resistance("351.2 ohm", second_meter)
    return judge_change(BASIS, "bonded", before, after)


def test_a_change_on_one_meter_cancels_gain_and_offset() -> None:
    # 0.8/350.4 = 0.2283 %; u = √2 · 0.01/√12 = 0.004 Ω (GUM F.1.2.3).
    found = _change("RM-1")
    assert found.result is not None
    assert float(found.result.value) == pytest.approx(0.228, abs=5e-4)
    assert found.verdict.standard_uncertainty is not None
    ohms = found.verdict.standard_uncertainty.si() * 350.4
    assert ohms == pytest.approx(0.004, abs=5e-4)
    assert found.verdict.word == "pass"


def test_a_change_by_two_meters_is_a_conditional_pass() -> None:
    # u = √2 · (0.175 + 0.1)/√3 = 0.225 Ω; P 0.868 of lying within 0.3 % of 350.4 Ω.
    found = _change("RM-2")
    assert found.verdict.standard_uncertainty is not None
    ohms = found.verdict.standard_uncertainty.si() * 350.4
    assert ohms == pytest.approx(0.225, abs=5e-4)
    assert found.verdict.word == "conditional pass"
    assert found.verdict.probability is not None
    assert float(found.verdict.probability) == pytest.approx(0.868, abs=5e-4)


def test_a_fall_of_resistance_is_held_to_the_same_figure() -> None:
    before, after = _resistance("351.6 ohm", "RM-1"), _resistance("350.2 ohm", "RM-1")
    assert judge_change(BASIS, "bonded", before, after).verdict.word == "fail"


def test_an_open_grid_fails_the_change() -> None:
    found = judge_change(
        BASIS, "bonded", _resistance("350.4 ohm", "RM-1"), _resistance("OL", "RM-1")
    )
    assert found.verdict.word == "fail"
    assert found.verdict.blocks


@pytest.mark.parametrize(("typed", "hint"), [("35.12", "decimal point"), ("120", "120 Ω gauge")])
def test_what_is_not_this_gauges_is_refused(typed: str, hint: str) -> None:
    with pytest.raises(Faulty) as caught:
        demand_plausible("resistance", q(typed, "ohm"), LOT, "here")
    assert hint in caught.value.faults[0].remedy


def test_without_a_criterion_a_reading_is_recorded() -> None:
    taken = _resistance("350.4 ohm", "RM-1")
    verdict = judge_value(BASIS, "resistance", "coated", taken).verdict
    assert (verdict.word, verdict.blocks) == ("pass", False)
    assert "no limit" in verdict.reason
