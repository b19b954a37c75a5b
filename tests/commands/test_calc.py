"""`gaugelog calc`: figures with their formulas, every fault at once, many rows at a time."""

from __future__ import annotations

import csv
import io
import json
from dataclasses import replace
from pathlib import Path

import pytest

from gaugelog.commands import run
from gaugelog.commands.calc.each import write_each
from gaugelog.commands.calc.engine import parse_pairs, understood, work_out
from gaugelog.commands.calc.model import Family
from gaugelog.commands.calc.sources import source_of
from gaugelog.commands.calc.subjects import SUBJECTS
from gaugelog.errors import Faulty
from gaugelog.physics import leads, vessels


def _figures(subject: str, **typed: str) -> dict[str, str]:
    worked = work_out(SUBJECTS[subject], typed)
    return {figure.name: figure.shown for figure in worked.answer.figures}


def test_leads_give_the_loss_of_a_long_thin_cable() -> None:
    found = _figures(
        "leads", layout="quarter two-wire", resistance="120 ohm", length="50 m", area="0.14 mm2"
    )
    assert found["one wire"] == "6.1576 Ω"
    assert found["sensitivity lost"] == "9.308 %"
    assert found["offset"] == "24.405 mV/V"


def test_a_shunt_keeps_its_three_readings_apart() -> None:
    found = _figures("shunt", resistance="350 ohm", shunt="174650 ohm")
    assert found["simulated at the gauge"] == "-1000 µm/m"
    assert found["indicated by a linear scale"] == "-1001 µm/m"


def test_every_fault_is_named_at_once() -> None:
    with pytest.raises(Faulty) as caught:
        work_out(SUBJECTS["leads"], {"layout": "nonsense", "resistance": "5", "colour": "red"})
    assert [fault.where for fault in caught.value.faults] == ["colour", "layout", "resistance"]


def test_a_value_that_cannot_be_is_told_beside_its_name() -> None:
    with pytest.raises(Faulty, match="nothing was worked out") as caught:
        work_out(SUBJECTS["leakage"], {"resistance": "-3 ohm", "permitted": "0 ue"})
    assert [
        "resistance: must be greater than zero, not -3 Ω.",
        "permitted: must be other than zero, not 0 µm/m.",
    ] == [str(fault) for fault in caught.value.faults]


def test_every_formula_of_an_answer_names_its_source() -> None:
    assert "Dally and Riley" in source_of(leads.sensitivity_loss)
    assert "`" not in source_of(leads.sensitivity_loss)


def test_a_word_without_equals_and_a_double_name_are_faults() -> None:
    with pytest.raises(Faulty) as caught:
        parse_pairs(["resistance", "a=1", "a=2"])
    assert len(caught.value.faults) == 2


def test_many_rows_come_back_with_results_beside_them(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = tmp_path / "rows.csv"
    file.write_text("insulation,permitted\n10 Mohm,5 ue\n1 Gohm,1 ue\n", encoding="utf-8")
    assert run(["calc", "leakage", "--each", str(file)]) == 0
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    assert [row["apparent strain"] for row in rows] == ["-17.499 µm/m", "-0.175 µm/m"]


def test_faults_of_many_rows_name_row_and_column(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = tmp_path / "rows.csv"
    file.write_text("insulation\n10\nabc\n10 Mohm\n", encoding="utf-8")
    assert run(["calc", "leakage", "--each", str(file)]) == 3
    told = capsys.readouterr()
    assert "rows.csv, row 2, column insulation" in told.err
    assert "rows.csv, row 3, column insulation" in told.err
    assert told.out == ""


def test_json_carries_values_in_base_units(capsys: pytest.CaptureFixture[str]) -> None:
    assert run(["calc", "leakage", "permitted=5 ue", "--json"]) == 0
    found = json.loads(capsys.readouterr().out)
    assert found["results"][0]["unit"] == "ohm"
    assert found["results"][0]["value"] == pytest.approx(350 * (1 / (2 * 5e-6) - 1))


@pytest.mark.parametrize("name", list(SUBJECTS))
def test_each_subject_lists_its_arguments(name: str, capsys: pytest.CaptureFixture[str]) -> None:
    assert run(["calc", name]) == 0
    told = capsys.readouterr().out
    assert all(argument.name in told for argument in SUBJECTS[name].arguments)


def test_an_unknown_subject_lists_those_there_are(capsys: pytest.CaptureFixture[str]) -> None:
    assert run(["calc", "astrology"]) == 3
    assert "bridge" in capsys.readouterr().err


def test_only_inputs_given_or_taken_by_default_are_told(
    capsys: pytest.CaptureFixture[str],
) -> None:
    assert run(["calc", "leakage", "permitted=5 ue"]) == 0
    told = capsys.readouterr().out
    assert "later" not in told
    assert "resistance" in told
    assert "by leakage.insulation_needed: " in told


def test_rows_of_different_kinds_stand_in_one_table(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = tmp_path / "rows.csv"
    file.write_text(
        "what,load,area,modulus,distance,width,depth\n"
        "bar,10 kN,100 mm2,200 GPa,,,\n"
        "cantilever,10 N,,200 GPa,100 mm,20 mm,5 mm\n",
        encoding="utf-8",
    )
    assert run(["calc", "load", "--each", str(file)]) == 0
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    assert ["500 µm/m", ""] == [row["strain along the bar"] for row in rows]
    assert ["", "60 µm/m"] == [row["strain along the beam"] for row in rows]


def test_what_no_column_gives_is_given_for_all_rows_and_for_empty_cells(
    tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = tmp_path / "rows.csv"
    file.write_text("insulation,resistance\n10 Mohm,\n10 Mohm,120 ohm\n", encoding="utf-8")
    assert run(["calc", "leakage", "resistance=350 ohm", "--each", str(file)]) == 0
    rows = list(csv.DictReader(io.StringIO(capsys.readouterr().out)))
    assert ["-17.499 µm/m", "-5.9999 µm/m"] == [row["apparent strain"] for row in rows]


@pytest.mark.parametrize(
    "content", [b"", b"insulation\n", b"colour\nred\n", b"insulation;later\n", b"\xff\xfe", b'"\n']
)
def test_a_table_that_is_none_is_told(
    content: bytes, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    file = tmp_path / "rows.csv"
    file.write_bytes(content)
    assert run(["calc", "leakage", "--each", str(file)]) == 3
    assert "rows.csv" in capsys.readouterr().err


def test_a_table_that_is_not_there_is_told(capsys: pytest.CaptureFixture[str]) -> None:
    assert run(["calc", "leakage", "--each", "nowhere.csv"]) == 3
    assert "can't be read" in capsys.readouterr().err


def test_a_cell_that_starts_like_a_formula_is_guarded() -> None:
    found = [
        work_out(
            SUBJECTS["conformity"],
            {"value": "1", "uncertainty": "0.1", "at_least": "0", "qualifier": "="},
        )
    ]
    out = io.StringIO()
    write_each(found, out)
    assert "'=" in out.getvalue()


@pytest.mark.parametrize(
    ("cell", "written"),
    [
        ("=1+1", "'=1+1"),
        ("-1+2", "'-1+2"),
        ("+cmd|' /C calc'!A0", "'+cmd|' /C calc'!A0"),
        ("@SUM(1)", "'@SUM(1)"),
        ("\t=1", "‹U+0009›=1"),
        ("-12.5 °C", "-12.5 °C"),
        ("+100 µm/m", "+100 µm/m"),
        ("-3", "-3"),
    ],
)
def test_a_cell_of_many_rows_is_text_or_a_figure_to_a_spreadsheet(cell: str, written: str) -> None:
    worked = work_out(SUBJECTS["dewpoint"], {"air": "20 degC", "humidity": "50 %RH"})
    out = io.StringIO()
    write_each([replace(worked, inputs={"a": cell})], out)
    row = list(csv.reader(io.StringIO(out.getvalue(), newline="")))[1]
    assert written == row[0]


def test_a_kind_lists_its_own_arguments(capsys: pytest.CaptureFixture[str]) -> None:
    assert run(["calc", "load", "what=shear pair"]) == 0
    told = capsys.readouterr().out
    assert "plus" in told
    assert "arm" not in told.replace("armed", "")
    assert run(["calc", "budget", "of=circuit"]) == 0
    assert "What is uncertain is typed VALUE ± WIDTH" in capsys.readouterr().out


def test_a_word_is_taken_whatever_its_case() -> None:
    assert (
        "2 mV/V"
        in _figures("load", what="CELL", arrangement="Full  bending", strain="1000 ue").values()
    )


@pytest.mark.parametrize("name", list(SUBJECTS))
def test_every_argument_has_help_and_an_example(name: str) -> None:
    for argument in SUBJECTS[name].arguments:
        assert argument.help
        assert argument.like, argument.name


@pytest.mark.parametrize("name", list(SUBJECTS))
def test_every_example_of_an_argument_is_understood(name: str) -> None:
    subject = SUBJECTS[name]
    kinds = subject.kinds.values() if isinstance(subject, Family) else [subject]
    for argument in (each for kind in kinds for each in kind.arguments):
        like = argument.choices[0] if argument.choices else argument.like.split(" or ")[0]
        value, shown = understood(argument, like)
        assert value is not None
        assert shown


def test_every_default_is_understood() -> None:
    for subject in SUBJECTS.values():
        kinds = subject.kinds.values() if isinstance(subject, Family) else [subject]
        for argument in (each for kind in kinds for each in kind.arguments):
            if argument.default:
                assert understood(argument, argument.default)[1]


def test_a_source_that_names_siblings_tells_theirs() -> None:
    told = source_of(vessels.pressure_from_hoop)
    assert "Gere, Mechanics of Materials, thin-walled pressure" in told
    assert "Hooke's law in three dimensions" in told


def test_every_subject_stands_in_the_readme() -> None:
    readme = (Path(__file__).parents[2] / "README.md").read_text(encoding="utf-8")
    assert [] == [name for name in SUBJECTS if f"`{name}`" not in readme]
