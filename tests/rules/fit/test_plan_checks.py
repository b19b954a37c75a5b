"""Plan checks on the demo's own plan, changed as a planner might: each with figure and source."""

from __future__ import annotations

import shutil
from collections.abc import Callable
from pathlib import Path

import pytest

from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder
from gaugelog.rules.fit import PlanFinding
from gaugelog.work import people, plan, stock
from gaugelog.work.people import Newcomer
from gaugelog.work.standing import set_standing

DEMO = Path(__file__).parents[2] / "small_job"
WORD = "long enough"

Change = tuple[str, str, str]
Check = Callable[..., list[PlanFinding]]


@pytest.fixture
def check(tmp_path: Path) -> Check:
    """Load the demo's plan with changes (file, old, new) and give what the check finds."""

    def found(*changes: Change, quarantined: tuple[str, ...] = ()) -> list[PlanFinding]:
        files = tmp_path / "files"
        shutil.copytree(DEMO, files)
        for file, old, new in changes:
            text = (files / file).read_text(encoding="utf-8")
            assert old in text, old
            (files / file).write_text(text.replace(old, new), encoding="utf-8")
        keys = KeyFolder(tmp_path / "keys", 1000)
        custodian = Newcomer("p.lind", "P. Lind", "PL", ("custodian", "planner"))
        book = people.start(
            tmp_path / "book",
            keys_of=lambda _id: keys,
            name="Job",
            custodian=custodian,
            passphrase=WORD,
        )
        key = keys.unlock("p.lind", WORD)
        received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
        stock.receive(book, key, received)
        for label in quarantined:
            set_standing(book, key, label=label, standing="quarantined", reason="burnt")
        plan.load(book, key, plan.understand(book, files / "plan"))
        return plan.check(book)

    return found


def _of(findings: list[PlanFinding], level: str) -> list[PlanFinding]:
    return [finding for finding in findings if finding.level == level]


def _one(findings: list[PlanFinding], level: str, words: str) -> PlanFinding:
    (found,) = [each for each in _of(findings, level) if words in each.what]
    return found


GRID = ("lots.csv", "0.4,6,2.8,", "0.4,3.0,2.5,")
FIVE_VOLT = ("plan/campaign.toml", 'excitation = "2.5 V"', 'excitation = "5 V"')
LIMIT = ("plan/campaign.toml", 'heat_sink = "thick steel"', 'heat_sink_limit = "2 W/in2"')
OHMS_120 = (
    ("lots.csv", "350,350,", "350,120,"),
    ("plan/campaign.toml", 'completion = "350 ohm"', 'completion = "120 ohm"'),
    ("plan/circuits.csv", "module 350 ohm", "module 120 ohm"),
)


def test_the_demos_plan_is_not_refused(check: Check) -> None:
    assert _of(check(), "refusal") == []


def test_the_power_of_a_350_ohm_grid_is_carried_off(check: Check) -> None:
    # V²/(4 R): 17.86 mW, over 3.0 × 2.5 mm 2.38 kW/m²; the limit 2 W/in² is 3.10 kW/m².
    found = check(GRID, FIVE_VOLT, LIMIT)
    ok = [each for each in _of(found, "ok") if "heat off" in each.what]
    assert len(ok) == 2
    assert "17.86 mW, 2.38 kW/m²" in ok[0].figure


def test_the_power_of_a_120_ohm_grid_is_refused_with_the_largest_supply(check: Check) -> None:
    found = check(GRID, FIVE_VOLT, LIMIT, *OHMS_120)
    hot = [each for each in _of(found, "refusal") if "too hot" in each.what]
    assert len(hot) == 2
    assert "52.08 mW" in hot[0].figure
    assert "3.34 V" in hot[0].figure


def test_an_expansion_class_per_fahrenheit_is_asked_about(check: Check) -> None:
    # (11.7 − 6) · 35 = 199.5 µm/m; 6 ppm/°F would leave (11.7 − 10.8) · 35 = 31.5.
    found = check(
        ("lots.csv", "2026-09-14,11,", "2026-09-14,6,"), ("plan/grids.csv", ",-5,35,5,", ",0,35,5,")
    )
    asked = [each for each in _of(found, "warning") if each.subject == "FB-1"]
    assert "199.5 µm/m over 35 K" in asked[0].figure
    assert "ppm/°F meant" in asked[0].what
    assert "31.5" in asked[0].what


def test_long_thin_leads_are_warned_of(check: Check) -> None:
    # 50 m of 0.14 mm² copper: 6.157 Ω a wire, 4.88 % lost by a three-wire 120 Ω circuit.
    found = check(*OHMS_120, ("plan/circuits.csv", ",3,18,0.055,", ",3,50,0.12315,"))
    lost = _one(found, "warning", "lead wires take sensitivity")
    assert lost.figure.startswith("4.88 %, 6.15")


def test_strain_beyond_the_lots_limit_is_refused(check: Check) -> None:
    found = check(("plan/grids.csv", ",-50,600,", ",-50,30000,"))
    assert "30000 µm/m of 20000 µm/m" in _one(found, "refusal", "exceeds the limit").figure


def test_temperature_beyond_the_lots_is_refused(check: Check) -> None:
    found = check(("plan/grids.csv", ",-5,35,5,", ",-60,35,5,"))
    assert "-60 °C to 35 °C" in _one(found, "refusal", "temperature range leaves").figure


def test_output_beyond_the_channels_range_is_refused(check: Check) -> None:
    found = check(("plan/campaign.toml", 'range = "10 mV/V"', 'range = "0.2 mV/V"'))
    assert "of ±0.2 mV/V" in _one(found, "refusal", "exceeds the channel's range").figure


def test_a_zero_beyond_the_balance_range_is_warned_of(check: Check) -> None:
    found = check(("plan/campaign.toml", 'balance_range = "4 mV/V"', 'balance_range = "0.5 mV/V"'))
    warned = [each for each in _of(found, "warning") if "balance range" in each.what]
    assert [each.figure for each in warned] == ["±0.75 mV/V of ±0.5 mV/V"] * 2


def test_stock_that_is_short_is_refused(check: Check) -> None:
    found = check(("lots.csv", "K7-03,5", "K7-03,1"), ("lots.csv", "K7-04,5", "K8-04,1"))
    assert _one(found, "warning", "no gauge is spare").figure == "2 wanted, 2 on the shelf"


def test_a_channel_used_twice_is_refused(check: Check) -> None:
    found = check(("plan/circuits.csv", ",M1,2,", ",M1,1,"))
    assert _one(found, "refusal", "is used by C-1, C-2").subject == "channel M1/1"


def test_a_pin_used_twice_is_refused(check: Check) -> None:
    found = check(("plan/campaign.toml", 'connector = "J2"', 'connector = "J1"'))
    refused = [each for each in _of(found, "refusal") if "pin" in each.what]
    assert len(refused) == 3
    assert "M1/1, M1/2" in refused[0].what


def test_a_completion_for_another_gauge_is_refused(check: Check) -> None:
    found = check(("plan/campaign.toml", 'completion = "350 ohm"', 'completion = "120 ohm"'))
    refused = [each for each in _of(found, "refusal") if "another gauge" in each.what]
    assert [each.figure for each in refused] == ["120 Ω for 350 Ω"] * 2


def test_a_grid_in_no_circuit_is_refused(check: Check) -> None:
    found = check(
        (
            "plan/circuits.csv",
            "C-2,quarter three-wire,grid FB-2",
            "C-2,quarter three-wire,grid FB-1",
        )
    )
    assert _one(found, "refusal", "is in no circuit").subject == "FB-2"
    assert _one(found, "refusal", "in more than one circuit").subject == "FB-1"


def test_abrasion_where_nothing_may_be_removed_is_refused(check: Check) -> None:
    old = 'removal_allowed = "paint and mill scale, no base metal"'
    found = check(("plan/campaign.toml", old, 'removal_allowed = "none"'))
    assert _one(found, "refusal", "nothing may be removed").source.startswith("Works Department")


def test_the_lead_wires_of_the_plan_are_those_of_the_reel(check: Check) -> None:
    found = [each for each in check() if "cable in stock" in each.what]
    assert {("ok", "0.055 Ω/m planned, 0.055 Ω/m of CB-19")} == {
        (each.level, each.figure) for each in found
    }


def test_a_reel_of_another_resistance_than_planned_is_warned_of(check: Check) -> None:
    found = check(("consumables.csv", ",0.055", ",0.072"))
    warned = [each for each in _of(found, "warning") if "is not that of the cable" in each.what]
    assert ["C-1", "C-2"] == [each.subject for each in warned]
    assert "0.055 Ω/m planned, 0.072 Ω/m of CB-19" == warned[0].figure


def test_a_reel_whose_resistance_nobody_knows_is_warned_of(check: Check) -> None:
    found = check(("consumables.csv", ",0.055", ","))
    assert "0.055 Ω/m planned" in {each.figure for each in _of(found, "warning")}


def test_a_name_that_is_no_reel_is_taken_as_a_cable_and_said_to_be(check: Check) -> None:
    found = _of(check(("plan/circuits.csv", "CB-19", "CB-91")), "warning")
    assert ["C-1", "C-2"] == [
        each.subject for each in found if "cable CB-91 is no lot in stock" in each.what
    ]


def test_what_is_no_cable_or_is_in_quarantine_does_for_none(check: Check) -> None:
    found = check(("plan/circuits.csv", "CB-19", "SO-17"))
    assert "SO-17 is a lot of solder, not of cable" in {each.what for each in _of(found, "refusal")}


def test_a_reel_in_quarantine_is_refused(check: Check) -> None:
    refused = _of(check(quarantined=("CB-19",)), "refusal")
    assert ["C-1", "C-2"] == [
        each.subject for each in refused if "cable CB-19 is quarantined" in each.what
    ]
