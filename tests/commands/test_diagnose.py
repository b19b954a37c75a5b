"""`gaugelog diagnose` as it is typed."""

from __future__ import annotations

import json
from pathlib import Path

from tests.commands.conftest import Command


def test_the_table_is_there_to_measure_against(command: Command, demo: Path) -> None:
    told = command("diagnose", "FB-1")
    assert 0 == told.code
    assert "supply- (" in told.out
    assert "should read" in told.out


def test_an_answer_says_what_it_means_and_what_is_next(command: Command, demo: Path) -> None:
    told = command(
        *("diagnose", "FB-1", "supply- to signal+ = 352.5 ohm", "completion to signal+ = OL"),
        *("--meter", "RM-2"),
    )
    assert 0 == told.code
    assert "1. open circuit in completion wire" in told.out
    assert "Next:" in told.out


def test_it_can_be_had_as_data(command: Command, demo: Path) -> None:
    told = command("diagnose", "FB-1", "supply- to signal+ = OL", "--meter", "RM-2", "--json")
    data = json.loads(told.out)
    assert "C-1" == data["circuit"]
    assert data["answers"][0]["sentence"]


def test_faults_are_told_and_end_with_their_code(command: Command, demo: Path) -> None:
    told = command("diagnose", "FB-1", "supply- to signal+ = 3,1 ohm")
    assert 3 == told.code
    assert "meter" in told.err
