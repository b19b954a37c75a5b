"""The shipped route keeps the order of work and the figures that the trade agrees on."""

from __future__ import annotations

import pytest

from gaugelog.intake.route import read_route, shipped_routes
from gaugelog.ledger.routes import RouteAdopted, RouteStep

LABEL = "room-temperature-bond-metal"

# Subjects of ASTM E1237 in their order (from memory of its headings): selection and receipt of
# gauges; surface preparation (degrease, abrade, layout lines, condition, neutralise); bonding and
# cure; lead wires; verification (resistance, insulation); protective coating; final checks.
ASTM_E1237 = (
    "gauge",
    "clean",
    "layout",
    "condition",
    "bond",
    "bonded",
    "wires",
    "cabled",
    "coat",
    "coated",
    "finish",
)

# What each dangerous step must warn of: common practice in safety data sheets and tool manuals.
CAUTIONS = {
    "access": ("live", "pressurised", "height", "permits", "licensed"),
    "clean": ("solvents burn", "ventilate", "grit", "dust", "local codes"),
    "condition": ("acid", "eye protection"),
    "bond": ("cyanoacrylate", "skin", "local codes"),
    "wires": ("burn", "flux fumes", "hot-work permit"),
    "insulation": ("unplug", "test voltage"),
    "coat": ("ventilate", "no flame", "local codes"),
    "coated": ("unplug", "test voltage", "discharge"),
}


@pytest.fixture(scope="module")
def route() -> RouteAdopted:
    return read_route("r.toml", shipped_routes()[LABEL], lambda: "id")


def step(route: RouteAdopted, name: str) -> RouteStep:
    return next(each for each in route.steps if each.id == name)


def test_the_order_of_work_follows_the_subjects_of_astm_e1237(route: RouteAdopted) -> None:
    # ASTM E1237, the order of its subjects (from memory of its headings)
    order = [each.id for each in route.steps]
    assert sorted(ASTM_E1237, key=order.index) == list(ASTM_E1237)
    assert "ASTM E1237" in route.basis


@pytest.mark.parametrize("name", CAUTIONS)
def test_dangerous_steps_carry_their_cautions(route: RouteAdopted, name: str) -> None:
    # common practice: what safety data sheets and tool manuals warn of
    text = " ".join(step(route, name).cautions).casefold()
    assert [] == [word for word in CAUTIONS[name] if word not in text]


def test_a_second_person_looks_before_what_can_not_be_undone(route: RouteAdopted) -> None:
    # common practice: layout is witnessed before bonding, the work before the coating hides it
    order = [each.id for each in route.steps]
    holds = [each.id for each in route.steps if each.hold]
    assert ["layout-hold", "coating-hold"] == holds
    assert order.index("layout") < order.index("layout-hold") < order.index("bond")
    assert order.index("insulation") < order.index("coating-hold") < order.index("coat")


def test_bonding_follows_neutralising_within_the_hour(route: RouteAdopted) -> None:
    # common practice: 30 to 45 minutes for steel, never above an hour
    (window,) = step(route, "bond").windows
    assert ("within", "condition") == (window.bound, window.after)
    assert 30 * 60 <= window.duration.si() <= 60 * 60


def test_nothing_is_measured_before_its_cure(route: RouteAdopted) -> None:
    # common practice: minutes for a cyanoacrylate under thumb pressure, longer for a coating
    for name, after in (("bonded", "bond"), ("coated", "coat")):
        (window,) = step(route, name).windows
        assert ("not before", after) == (window.bound, window.after)
        assert window.duration.si() >= 60


def test_checks_are_read_in_the_order_of_the_work(
    route: RouteAdopted,
) -> None:
    # ASTM E1237 (from memory): resistance, then insulation; on the channel last, common practice
    read = [
        (item.check, each.stage)
        for each in route.steps
        for item in each.inputs
        if item.kind == "reading"
    ]
    assert [
        ("resistance", "received"),
        ("resistance", "bonded"),
        ("insulation", "bonded"),
        ("insulation", "cabled"),
        ("insulation", "coated"),
        ("lead loop", "cabled"),
        ("lead symmetry", "cabled"),
        ("zero offset", "on channel"),
        ("shunt", "on channel"),
        ("channel", "on channel"),
        ("polarity", "on channel"),
        ("press", "on channel"),
        ("noise", "on channel"),
        ("zero drift", "on channel"),
    ] == read


def test_the_insulation_tester_is_bounded_to_what_a_foil_gauge_bears(route: RouteAdopted) -> None:
    # common practice: 15 V to 50 V d.c., never a 250 V or 500 V insulation tester
    text = " ".join(step(route, "insulation").cautions)
    assert "15 V to 50 V" in text
    assert "Never put a 250 V or 500 V" in text
