"""Routes: shipped ones are whole and say what they must; a slip in one's own is named."""

from __future__ import annotations

import re
from pathlib import Path

import pytest

from gaugelog.intake.route import load_route, read_route, shipped_routes
from tests.intake.conftest import counter, faults_of

SHIPPED = shipped_routes()


@pytest.mark.parametrize("label", sorted(SHIPPED))
def test_a_shipped_route_is_understood_and_named_after_its_file(label: str) -> None:
    route = read_route(f"{label}.toml", SHIPPED[label], counter())
    assert label == route.label


@pytest.mark.parametrize("label", sorted(SHIPPED))
def test_a_shipped_route_holds_before_bonding_and_before_coating(label: str) -> None:
    steps = [step.id for step in read_route("r", SHIPPED[label], counter()).steps]
    assert steps.index("layout-hold") < steps.index("bond")
    assert steps.index("coating-hold") < steps.index("coat")


@pytest.mark.parametrize("label", sorted(SHIPPED))
def test_dangerous_work_carries_its_cautions(label: str) -> None:
    # The usual cautions of the trade (common practice); each defers to local codes.
    text = " ".join(
        caution
        for step in read_route("r", SHIPPED[label], counter()).steps
        for caution in step.cautions
    ).casefold()
    for danger in ("solvent", "grit", "solder", "live, pressurised", "height", "test voltage"):
        assert danger in text, danger
    assert "local codes" in text


def test_an_unknown_route_lists_the_shipped_ones(tmp_path: Path) -> None:
    found = faults_of(lambda: load_route("cold-weld", tmp_path, counter()))
    assert "room-temperature-bond-metal" in found[0].remedy


def test_a_route_outside_the_plans_folder_is_refused(tmp_path: Path) -> None:
    found = faults_of(lambda: load_route("../other.toml", tmp_path, counter()))
    assert "outside" in found[0].what


def test_a_planners_own_route_is_read_from_the_folder(tmp_path: Path) -> None:
    (tmp_path / "own.toml").write_bytes(SHIPPED["room-temperature-bond-metal"])
    route, name, data = load_route("own.toml", tmp_path, counter())
    assert name == "own.toml"
    assert data == SHIPPED["room-temperature-bond-metal"]
    assert len(route.steps) > 10


def test_every_slip_of_a_route_is_named_at_once() -> None:
    text = """
label = "mine"
title = "T"
edition = "1"
family = "f"
basis = "b"
[[step]]
id = "a"
title = "A"
subject = "socket"
instruction = "do"
  [[step.window]]
  bound = "within"
  duration = "30 min"
  after = "b"
[[step]]
id = "a"
title = "B"
subject = "grid"
instruction = "do"
hold = true
  [[step.input]]
  name = "r"
  kind = "reading"
  prompt = "p"
"""
    where = {
        fault.where for fault in faults_of(lambda: read_route("r.toml", text.encode(), counter()))
    }
    assert where == {
        "r.toml, step[1].subject",
        "r.toml, step",
        "r.toml, step[1].window",
        "r.toml, step[2].id",
        "r.toml, step[2].input",
        "r.toml, step[2].input[1].check",
        "r.toml, step[2].refused_to",
        "r.toml, step[2].stage",
    }


@pytest.mark.parametrize("label", sorted(SHIPPED))
def test_each_instruction_is_two_to_four_short_sentences(label: str) -> None:
    for step in read_route("r", SHIPPED[label], counter()).steps:
        sentences = re.split(r"(?<=[.?!])\s+", step.instruction)
        assert 2 <= len(sentences) <= 4, step.id
        assert max(len(sentence.split()) for sentence in sentences) <= 20, step.id
