"""Zero drift with warmth taken off, in circuits where it counts, cancels, or is not known."""

from __future__ import annotations

import pytest

from gaugelog.physics.circuit import circuit_of
from gaugelog.rules.drifting import ZeroSeen, judge_drift
from gaugelog.rules.verdicts import Judged, Taken
from gaugelog.rules.warmed import GridWarmth, Warmth
from tests.rules.beside import STRAIN, basis, strain
from tests.rules.test_verdicts import q

HALF_HOUR = 1800.0
LIMIT = basis("zero drift", at_most=q("5", "um/m"), per=q("30", "min"))

# A sheet's curve, invented: −30 + 2.6 t − 0.06 t² + 0.0003 t³ µm/m; by hand 1.7 µm/m from 20 to 30.
CURVE = (-30e-6, 2.6e-6, -0.06e-6, 0.0003e-6)


def _grid(name: str, curve: tuple[float, ...] = CURVE, class_: float | None = 11e-6) -> GridWarmth:
    return GridWarmth(name, "L-1", curve, 2.0, 2.0, 11e-6, class_)


def _quarter(*, curve: tuple[float, ...] = CURVE, wires: int = 3, wire: float = 0.0) -> Warmth:
    name = "quarter two-wire" if wires == 2 else "quarter three-wire"
    circuit = circuit_of(name, wires, 350.0, 2.0, wire)
    return Warmth(circuit, (_grid("grid 1", curve),), 2.0, name)


def _half() -> Warmth:
    circuit = circuit_of("half with dummy", 3, 350.0, 2.0)
    return Warmth(circuit, (_grid("grid 1"), _grid("dummy 2")), 2.0, "half with dummy")


def _drift(
    warmth: Warmth, end: str, *, start: float = 0.0, warm: float = 30.0, after: float = HALF_HOUR
) -> Judged:
    seen = [
        ZeroSeen(0.0, start * 1e-6, 20.0, 20.0, 0.1),
        ZeroSeen(after, float(end) * 1e-6, warm, warm, 0.1),
    ]
    return judge_drift(LIMIT, "on channel", seen, strain(end), warmth)


def _left(found: Judged) -> float:
    assert found.result is not None
    return found.result.to("um/m")


def test_the_lots_curve_is_taken_off_a_quarter_bridge() -> None:
    found = _drift(_quarter(), "4.7")
    assert 3.0 == pytest.approx(_left(found), abs=2e-3)  # 4.7 − 1.7
    assert "1.7 µm/m of thermal output" in found.verdict.reason


def test_without_warming_the_zero_is_the_drift() -> None:
    assert 2.0 == pytest.approx(_left(_drift(_quarter(), "2.5", start=0.5, warm=20.0)))


def test_a_dummy_of_the_same_lot_takes_it_off_by_itself() -> None:
    found = _drift(_half(), "2.0")
    assert 2.0 == pytest.approx(_left(found), abs=1e-3)


def test_two_wires_that_warm_feign_strain_and_three_do_not() -> None:
    # Two wires of 1 Ω, 10 K: 2 · 0.00393 · 10/(2 · 352) = 111.6 µm/m nearly; they swamp the zero.
    two = _quarter(wires=2, wire=1.0).wires(20.0, 30.0)
    assert 2 * 0.0393 / (2.0 * 352.0) == pytest.approx(two, rel=0.02)
    assert 0.0 == pytest.approx(_quarter(wire=1.0).wires(20.0, 30.0), abs=1e-9)


def test_a_drift_is_counted_over_the_time_of_the_criteria() -> None:
    # 4 µm/m in an hour are 2 µm/m in half of one.
    assert 2.0 == pytest.approx(_left(_drift(_quarter(), "4", warm=20.0, after=3600.0)))


@pytest.mark.parametrize(("end", "word"), [("3", "pass"), ("-3", "pass"), ("9", "fail")])
def test_the_rest_is_held_against_the_limit_either_way(end: str, word: str) -> None:
    assert word == _drift(_quarter(), end, warm=20.0).verdict.word


def test_a_class_alone_leaves_more_in_doubt_than_a_curve() -> None:
    curve = _quarter().uncertainty(20.0, 30.0)
    alone = _quarter(curve=()).uncertainty(20.0, 30.0)
    # Scatter of 0.135 µm/m for each kelvin, and 1/√3 µm/m more where the curve is not known.
    assert 1.35e-6 == pytest.approx(curve, rel=1e-3)
    assert 10e-6 * (0.135**2 + 1 / 3) ** 0.5 == pytest.approx(alone, rel=1e-3)


def test_the_doubt_of_a_lots_curve_cancels_against_its_dummy() -> None:
    circuit = circuit_of("half with dummy", 3, 350.0, 2.0)
    grids = (_grid("grid 1", ()), _grid("dummy 2", ()))
    both = Warmth(circuit, grids, 2.0, "half with dummy").uncertainty(20.0, 30.0)
    assert 2**0.5 * 1.35e-6 == pytest.approx(both, rel=1e-3)


def test_a_lot_of_which_nothing_is_known_is_named() -> None:
    circuit = circuit_of("quarter three-wire", 3, 350.0, 2.0)
    blank = Warmth(circuit, (_grid("grid 1", (), None),), 2.0, "quarter three-wire")
    found = _drift(blank, "1", warm=21.0)
    assert "Of lot L-1 no thermal output is known" in found.verdict.reason
    assert 1.0 == pytest.approx(_left(found))


def test_more_than_two_zeros_give_the_rate_of_all() -> None:
    seen = [
        ZeroSeen(minutes * 60.0, zero * 1e-6, 20.0, 20.0)
        for minutes, zero in ((0, 0.0), (10, 1.0), (20, 2.0), (30, 3.0))
    ]
    found = judge_drift(LIMIT, "on channel", seen, strain("3"), _quarter())
    assert 3.0 == pytest.approx(_left(found))


def test_two_zeros_at_once_tell_no_drift() -> None:
    assert "undecided" == _drift(_quarter(), "1", after=0.0).verdict.word


def test_an_overload_tells_no_drift() -> None:
    seen = [ZeroSeen(0.0, 0.0, 20.0, 20.0), ZeroSeen(60.0, 0.0, 20.0, 20.0)]
    over = Taken(None, "overload", STRAIN)
    assert "undecided" == judge_drift(LIMIT, "on channel", seen, over, _quarter()).verdict.word
