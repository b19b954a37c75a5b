"""Stock files: a row a pack, a row a consumable; every fault of every file at once."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.intake.lots import unlike
from gaugelog.intake.papers import Paper
from gaugelog.intake.stock import load_stock
from tests.intake.conftest import DEMO, change, counter, faults_of


def _copy(name: str, folder: Path) -> Path:
    target = folder / name
    target.write_bytes((DEMO / name).read_bytes())
    return target


def test_packs_of_one_lot_become_one_lot() -> None:
    stock = load_stock([DEMO / "lots.csv", DEMO / "consumables.csv"], counter())
    assert [lot.label for lot in stock.lots] == ["L-3504"]
    assert [pack.label for pack in stock.lots[0].packs] == ["K7-03", "K7-04"]
    assert [len(pack.pieces) for pack in stock.lots[0].packs] == [5, 5]
    assert len(stock.consumables) == 6


def test_every_piece_has_an_id_of_its_own() -> None:
    stock = load_stock([DEMO / "lots.csv"], counter())
    pieces = [piece for pack in stock.lots[0].packs for piece in pack.pieces]
    assert len(pieces) == len(set(pieces))


def test_figures_that_differ_within_a_lot_are_told(tmp_path: Path) -> None:
    file = _copy("lots.csv", tmp_path)
    change(
        file,
        "K7-04,5,Lindmoor Foil Works,6 mm linear foil 350,350,0.3,2.08",
        "K7-04,5,A,B,350,0.3,2.1",
    )
    found = faults_of(lambda: load_stock([file], counter()))
    columns = ["maker", "type", "gauge_factor"]
    assert [f"lots.csv, row 3, column {column}" for column in columns] == [
        fault.where for fault in found
    ]


def test_all_faults_of_all_files_are_named_at_once(tmp_path: Path) -> None:
    lots, others = _copy("lots.csv", tmp_path), _copy("consumables.csv", tmp_path)
    change(lots, "K7-03,5", "K7-03,five")
    change(lots, "K7-04,5", "K7-03,0")
    change(others, "AD-612,adhesive", "AD 612,glue")
    change(others, "2027-09-30", "30.9.2027")
    where = [fault.where for fault in faults_of(lambda: load_stock([lots, others], counter()))]
    assert where == [
        "lots.csv, row 2, column pieces",
        "lots.csv, row 3, column pieces",
        "lots.csv, row 3, column pack",
        "consumables.csv, row 2, column kind",
        "consumables.csv, row 2, column consumable",
        "consumables.csv, row 3, column expires",
    ]


def test_negative_and_zero_figures_are_told(tmp_path: Path) -> None:
    file = _copy("lots.csv", tmp_path)
    change(file, "350,350,0.3,2.08", "350,-350,0,2.08")
    columns = {
        fault.where.rsplit(" ", 1)[1] for fault in faults_of(lambda: load_stock([file], counter()))
    }
    assert {"resistance_ohm", "resistance_tolerance_percent"} <= columns


@pytest.mark.parametrize(
    ("name", "said"),
    [
        ("instruments.toml", "is TOML, no table of what was received."),
        ("plan/grids.csv", "holds neither gauge lots nor consumables."),
        ("plan/circuits.csv", "holds neither gauge lots nor consumables."),
        ("plan/campaign.toml", "is TOML, no table of what was received."),
    ],
)
def test_another_kind_of_file_is_one_fault(name: str, said: str) -> None:
    found = faults_of(lambda: load_stock([DEMO / name, DEMO / "lots.csv"], counter()))
    assert [(Path(name).name, said)] == [(fault.where, fault.what) for fault in found]


@pytest.mark.parametrize("data", [b"just a note\n", b"\x89PNG\r\n\x1a\n\0", b'"'])
def test_a_text_or_a_picture_given_for_a_table_is_one_fault(tmp_path: Path, data: bytes) -> None:
    (tmp_path / "a.csv").write_bytes(data)
    (fault,) = faults_of(lambda: load_stock([tmp_path / "a.csv"], counter()))
    assert "a.csv" == fault.where.split(",")[0]


def test_the_certificate_that_a_row_names_is_read_from_beside_the_table(tmp_path: Path) -> None:
    lots, others = _copy("lots.csv", tmp_path), _copy("consumables.csv", tmp_path)
    for file, first in ((lots, "L-3504"), (others, "AD-612")):
        head, *rows = file.read_text(encoding="utf-8").splitlines()
        named = [f"{row},{'cert.pdf' if row.startswith(first) else ''}" for row in rows]
        file.write_text("\n".join([f"{head},certificate_file", *named]), encoding="utf-8")
    found = faults_of(lambda: load_stock([lots, others], counter()))
    assert [
        "lots.csv, row 2, column certificate_file",
        "lots.csv, row 3, column certificate_file",
        "consumables.csv, row 2, column certificate_file",
    ] == [fault.where for fault in found]
    assert found[0].what.startswith("cert.pdf can't be read: ")
    (tmp_path / "cert.pdf").write_bytes(b"%PDF-1.7 certificate")
    stock = load_stock([lots, others], counter())
    adhesive = next(item for item in stock.consumables if item.label == "AD-612")
    paper = Paper("cert.pdf", b"%PDF-1.7 certificate")
    assert {stock.lots[0].id: (paper,), adhesive.id: (paper,)} == stock.papers


def test_a_missing_file_is_told(tmp_path: Path) -> None:
    found = faults_of(lambda: load_stock([tmp_path / "none.csv"], counter()))
    assert "can't be read" in found[0].what


def test_semicolons_are_told_with_what_to_do(tmp_path: Path) -> None:
    file = tmp_path / "lots.csv"
    file.write_text("lot;pack;pieces\nA;B;3\n", encoding="utf-8")
    found = faults_of(lambda: load_stock([file], counter()))
    assert "semicolons" in found[0].what


def test_another_encoding_is_told_with_its_line(tmp_path: Path) -> None:
    file = _copy("consumables.csv", tmp_path)
    file.write_bytes(file.read_bytes() + "X-1,other,Bräu,name,2026-01-01,,,\n".encode("latin-1"))
    found = faults_of(lambda: load_stock([file], counter()))
    assert found[0].where == "consumables.csv, line 8"


def test_a_byte_order_mark_and_windows_lines_do_no_harm(tmp_path: Path) -> None:
    file = tmp_path / "consumables.csv"
    text = (DEMO / "consumables.csv").read_text(encoding="utf-8").replace("\n", "\r\n")
    file.write_bytes(b"\xef\xbb\xbf" + text.encode())
    assert len(load_stock([file], counter()).consumables) == 6


ROSETTE = (
    "lot,pack,pieces,maker,type,pattern,grid_angles_deg,resistance_ohm,"
    "resistance_tolerance_percent,gauge_factor,gauge_factor_tolerance_percent,"
    "transverse_sensitivity_percent,grid_length_mm,grid_width_mm,received_on\n"
    "R-1,R1-01,5,Lindmoor Foil Works,6 mm rosette,{pattern},{angles},350,0.4,"
    "{factor},1,0.4; 0.5; 0.4,6,2.8,2026-09-14\n"
)


def _rosette(folder: Path, **cells: str) -> Path:
    usual = {"pattern": "rectangular", "angles": "0; 45; 90", "factor": "2.08; 2.09; 2.08"}
    file = folder / "rosettes.csv"
    file.write_text(ROSETTE.format(**usual | cells), encoding="utf-8")
    return file


def test_a_rosettes_grids_have_figures_of_their_own(tmp_path: Path) -> None:
    (lot,) = load_stock([_rosette(tmp_path)], counter()).lots
    assert "rectangular" == lot.pattern
    assert [1, 2, 3] == [grid.number for grid in lot.grids]
    assert ["2.08", "2.09", "2.08"] == [grid.gauge_factor.value for grid in lot.grids]
    assert ["0.4", "0.5", "0.4"] == [grid.transverse_sensitivity.value for grid in lot.grids]
    assert ["1", "1", "1"] == [grid.gauge_factor_tolerance.value for grid in lot.grids]
    assert ["0", "45", "90"] == [grid.angle.value for grid in lot.grids]


def test_a_pattern_may_be_called_a_rosette(tmp_path: Path) -> None:
    (lot,) = load_stock([_rosette(tmp_path, pattern="Rectangular rosette")], counter()).lots
    assert "rectangular" == lot.pattern


@pytest.mark.parametrize(
    ("cells", "column", "what"),
    [
        ({"pattern": "star"}, "pattern", "“star” is not one of single, tee, shear pair"),
        ({"factor": "2.08; 2.09"}, "gauge_factor", "gives 2 values for 3 grids."),
        ({"factor": "2.08; x; 2.08"}, "gauge_factor", "“x” is no number of this trade."),
        ({"factor": "2.08; 0; 2.08"}, "gauge_factor", "“0” must be above 0."),
        ({"factor": ""}, "gauge_factor", "is missing."),
        ({"angles": ""}, "grid_angles_deg", "is missing; a rectangular gauge has 3 grids."),
        ({"angles": "0; 60; 120"}, "grid_angles_deg", "not the angles of a rectangular gauge."),
        ({"angles": "45; 90; 135"}, "grid_angles_deg", "not the angles of a rectangular gauge."),
    ],
)
def test_figures_that_do_not_make_up_the_pattern_are_told(
    tmp_path: Path, cells: dict[str, str], column: str, what: str
) -> None:
    file = _rosette(tmp_path, **cells)
    (found,) = faults_of(lambda: load_stock([file], counter()))
    assert f"rosettes.csv, row 2, column {column}" == found.where
    assert what in found.what


def test_several_figures_for_a_gauge_of_one_grid_are_told(tmp_path: Path) -> None:
    file = _rosette(tmp_path, pattern="", angles="")
    whats = [fault.what for fault in faults_of(lambda: load_stock([file], counter()))]
    assert ["gives 3 values for one grid."] * 2 == whats


CURVE = "-31.2; 2.4; −0.0571; 2.9e-4; -4.1e-7"


def _with_curve(folder: Path, curve: str, factor: str, second: str | None = None) -> Path:
    """The lots' file with a curve in each row; `second` in the second one."""
    file = _copy("lots.csv", folder)
    head, *rows = file.read_text(encoding="utf-8").splitlines()
    curves = (curve, curve if second is None else second)
    lines = [f"{head},thermal_output_um_per_m,thermal_output_factor"]
    lines += [f"{row},{each},{factor}" for row, each in zip(rows, curves, strict=True)]
    file.write_text("\n".join(lines) + "\n", encoding="utf-8")
    return file


def test_the_curve_of_thermal_output_is_kept_as_it_stands_on_the_sheet(tmp_path: Path) -> None:
    (lot,) = load_stock([_with_curve(tmp_path, CURVE, "2.0")], counter()).lots
    assert ("-31.2", "2.4", "-0.0571", "2.9e-4", "-4.1e-7") == lot.thermal_output
    assert "2.0" == lot.thermal_output_factor


def test_a_lot_may_have_no_curve(tmp_path: Path) -> None:
    (lot,) = load_stock([_with_curve(tmp_path, "", "")], counter()).lots
    assert ((), None) == (lot.thermal_output, lot.thermal_output_factor)


@pytest.mark.parametrize(
    ("curve", "factor", "column"),
    [
        ("-31.2; two", "2.0", "thermal_output_um_per_m"),
        ("-31.2; 2.4", "0", "thermal_output_factor"),
        ("", "2.0", "thermal_output_factor"),
    ],
)
def test_a_curve_that_can_not_be_understood_is_told(
    tmp_path: Path, curve: str, factor: str, column: str
) -> None:
    file = _with_curve(tmp_path, curve, factor)
    found = faults_of(lambda: load_stock([file], counter()))
    assert f"lots.csv, row 2, column {column}" == found[0].where


def test_one_lot_has_one_curve(tmp_path: Path) -> None:
    file = _with_curve(tmp_path, "-31.2; 2.4", "2.0", second="-31.2; 2.5")
    (fault,) = faults_of(lambda: load_stock([file], counter()))
    assert "lots.csv, row 3, column thermal_output_um_per_m" == fault.where


def test_more_packs_under_another_curve_are_another_certificate(tmp_path: Path) -> None:
    (first,) = load_stock([_with_curve(tmp_path, CURVE, "2.0")], counter()).lots
    (plain,) = load_stock([DEMO / "lots.csv"], counter()).lots
    assert ["thermal_output_um_per_m", "thermal_output_factor"] == unlike(first, plain)
