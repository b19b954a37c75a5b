"""What standards ask a signed record to carry, held against the record and journal of a demo."""

from __future__ import annotations

import json
import subprocess
from pathlib import Path

import pytest

from tests.commands.conftest import (  # noqa: F401 (fixtures, by name)
    Command,
    _cheap_keys,
    _played,
    command,
    demo,
)
from tests.foreign import needs
from tests.outside.cases import case

pytestmark = pytest.mark.xdist_group("demo")


def _text(record: Path) -> str:
    """The record's text as Poppler reads it, white space folded."""
    told = subprocess.run(["pdftotext", record, "-"], capture_output=True, text=True, check=True)
    return " ".join(told.stdout.split())


@needs("pdftotext")
def test_each_signature_shows_name_time_and_meaning(demo: Path) -> None:  # noqa: F811
    assert "printed name of the signer" in case("C16-01").expected["required"]["value"]
    text = _text(demo / "records" / "FB-1-r1.pdf")
    for shown in (
        "Tobe Okoro (TO)",
        "I did or saw the work recorded here and submit it for review.",
        "2026-11-17 17:12:00 UTC+01:00",
        "Quilla Reyes (QR)",
        "I reviewed this record against its criteria and accept it.",
        "2026-11-17 18:14:00 UTC+01:00",
    ):
        assert shown in text, shown


def test_every_change_is_timed_and_hides_nothing(demo: Path, command: Command) -> None:  # noqa: F811
    assert (
        "a change never hides what was there before"
        in (case("C16-03").expected["required"]["value"])
    )
    entries = json.loads(command("journal", "show", "FB-2", "--json", "--last", "99").out)
    assert all(entry["header"]["time"].endswith("Z") for entry in entries)
    readings = [e for e in entries if e["header"]["kind"] == "reading.taken"]
    typed = [e["body"]["fact"]["typed"] for e in readings]
    assert "0.42 GΩ" in typed, "the failed attempt is kept"
    assert "18.6 GΩ" in typed, "beside the one that replaced it"


def test_a_signature_takes_an_id_and_a_passphrase(demo: Path, command: Command) -> None:  # noqa: F811
    assert any("at least two" in each for each in case("C16-04").expected["required"]["value"])
    nobody = command("accept", "FB-1", secrets="gauge it twice\n")
    wrong = command("accept", "FB-1", "--as", "q.reyes", secrets="not the phrase\n")
    assert (nobody.code, wrong.code) == (5, 5)


@needs("pdftotext")
def test_there_is_enough_to_repeat_the_work(demo: Path) -> None:  # noqa: F811
    assert any("repeat the work" in each for each in case("C16-06").expected["required"]["value"])
    text = _text(demo / "records" / "FB-2-r1.pdf")
    for shown in ("K7-03/2", "L-3504", "AD-612", "RM-2", "IT-5", "CAL-26-0722", "13.0 degC"):
        assert shown in text, shown


@needs("pdftotext")
def test_the_record_carries_what_a_report_carries(demo: Path) -> None:  # noqa: F811
    # ISO/IEC 17025:2017, 7.8.2.1 a) to p), as far as it concerns an installation record.
    assert "customer name and contact" in case("C16-08").expected["required"]["value"]
    text = _text(demo / "records" / "FB-1-r1.pdf")
    wanted = {
        "title": "Record of a strain gauge installation",
        "who did it, and where they are": "Saltmere Measurement, 4 Weir Yard, Tarnwick",
        "place of the work": "Tarnwick, north bank",
        "unique identification": "Record TARN-BRIDGE-FB-1-R1",
        "parts recognisable, clear end": "Page 5 of 5",
        "customer": "Borough of Tarnwick",
        "method": "Room-temperature bond of a foil gauge on metal, edition 2",
        "item": "Main girder, south side",
        "date of receipt": "2026-09-14",
        "dates of the work": "2026-11-17",
        "results only of the item": "concerns only the gauge named on it",
        "results with units": "350.12",
        "persons authorising": "q.reyes",
    }
    assert [] == [what for what, shown in wanted.items() if shown not in text]


@needs("pdftotext")
@pytest.mark.parametrize("record", ["FB-1-r1.pdf", "FB-2-r1.pdf"])
def test_the_title_reads_as_one_line_and_stands_first(
    demo: Path,  # noqa: F811
    record: str,
) -> None:
    read = ["pdftotext", "-layout", str(demo / "records" / record), "-"]
    told = subprocess.run(read, capture_output=True, text=True, check=True).stdout
    first, second = [" ".join(line.split()) for line in told.splitlines() if line.strip()][:2]
    title = "Record of a strain gauge installation Valid only with both signatures"
    assert title == first
    assert second.startswith(record[:4])


@needs("pdftotext")
def test_the_decision_rule_is_agreed_and_told(demo: Path) -> None:  # noqa: F811
    assert any("the rule used" in each for each in case("C16-10").expected["required"]["value"])
    text = _text(demo / "records" / "FB-1-r1.pdf")
    for shown in ("ILAC-G8:09/2019", "k = 2", "agreed by", "conditional pass"):
        assert shown in text, shown
