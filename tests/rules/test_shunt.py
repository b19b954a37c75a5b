"""A shunt's reading depends on where it lies; trap 1 of the outside cases, worked by hand."""

from __future__ import annotations

import pytest

from gaugelog.physics.circuit import circuit_of
from gaugelog.physics.conformity import Words
from gaugelog.rules.shunt import ShuntFound, judge_shunt, shunt_place, shunt_places

CIRCUIT = circuit_of("quarter three-wire", 3, 120.0, 2.0, wire=1.5)


def _found(place: str | None, measured: float) -> ShuntFound:
    return judge_shunt(CIRCUIT, 59_880.0, place, measured * 1e-6, setting=2.0, least_tolerance=5e-6)


@pytest.mark.parametrize(
    ("place", "predicted"),
    [("arm 1", -988.6), ("arm 2", 988.6), ("module pins of arm 1", -1038.5)],
)
def test_each_place_reads_its_own_strain(place: str, predicted: float) -> None:
    found = _found(place, predicted)
    assert found.predicted is not None
    assert pytest.approx(predicted * 1e-6, abs=0.05e-6) == found.predicted
    assert found.judgement.word is Words.PASS


def test_without_the_place_there_is_no_verdict() -> None:
    found = _found(None, -1038)
    assert found.judgement.word is Words.UNDECIDED
    assert found.predicted is None


def test_the_reading_of_another_place_fails_and_names_it() -> None:
    found = _found("arm 1", -1038)
    assert found.judgement.word is Words.FAIL
    assert "module pins of arm 1" in found.hint


def test_the_opposite_reading_is_told_with_the_arm_that_gives_it() -> None:
    assert "arm 2" in _found("arm 1", 988.6).hint


def test_places_without_leads_in_arm_one_are_the_arms_only() -> None:
    assert "module pins of arm 1" in shunt_places(CIRCUIT)


@pytest.mark.parametrize(
    ("name", "wires", "between", "place"),
    [
        ("quarter three-wire", 3, ("signal+", "supply-"), "module pins of arm 1"),
        ("quarter three-wire", 3, ("completion", "supply+"), "arm 2"),
        ("half bending", 3, ("signal+", "supply+"), "module pins of arm 2"),
        ("half bending", 3, ("supply+", "signal-"), "arm 3"),
        ("full bending", 4, ("supply-", "signal-"), "module pins of arm 4"),
        ("full bending", 6, ("sense-", "signal+"), "sense pin of arm 1"),
        ("full bending", 4, ("sense-", "signal+"), None),
        ("half bending", 5, ("supply+", "signal-"), None),
        ("full bending", 4, ("supply+", "supply-"), None),
    ],
)
def test_the_pins_tell_the_place_of_a_shunt(
    name: str, wires: int, between: tuple[str, str], place: str | None
) -> None:
    assert place == shunt_place(circuit_of(name, wires, 350.0, 2.0, wire=1.0), between)


@pytest.mark.parametrize(("arm", "sign"), [(1, -1), (2, 1), (3, -1), (4, 1)])
def test_a_shunt_over_opposite_arms_reads_alike_and_over_neighbours_the_other_way(
    arm: int, sign: int
) -> None:
    # −ΔR/(K R B) with ΔR = R²/(R + S): 350²/100350 = 1.2207 Ω, K = 2, B = 4: ∓436 µm/m.
    circuit = circuit_of("full bending", 4, 350.0, 2.0)
    judged = judge_shunt(
        circuit,
        100e3,
        f"module pins of arm {arm}",
        sign * 436e-6,
        setting=2.0,
        least_tolerance=2e-6,
        name="full bending",
    )
    assert judged.judgement.word is Words.PASS
