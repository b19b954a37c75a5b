"""Whatever stands in a file or a cell: it is understood, or told as faults; never a defect."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from hypothesis import HealthCheck, given, settings
from hypothesis import strategies as st

from gaugelog.intake.circuits import COLUMNS as CIRCUIT_COLUMNS
from gaugelog.intake.consumables import CONSUMABLE_COLUMNS
from gaugelog.intake.files import toml_of
from gaugelog.intake.grids import COLUMNS as GRID_COLUMNS
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.lots import LOT_COLUMNS
from gaugelog.intake.route import read_route, shipped_routes
from gaugelog.intake.stock import load_stock
from tests.intake.conftest import DEMO, counter, set_cell, told, understood

PLAN_FILES = ("campaign.toml", "criteria.toml", "grids.csv", "circuits.csv")
ROUTE = shipped_routes()["room-temperature-bond-metal"]

_HOSTILE = [
    "",
    " ",
    "nan",
    "-inf",
    "1e999",
    "0x10",
    "1_000",
    "0,5",
    "\u0661\u0662",
    "=1+1",
    "../../etc",
    "{{ 7 }}",
    "<b>x</b>",
    "[bold]x",
    "\x1b[31m",
    "\u202eabc",
    "\U0001f600",
    "a" * 100_000,
    '"',
    "2026-13-45",
    "grid",
    "grid  ",
    "module -1 ohm",
    "+ + +",
    "signal+=;=",
]
cells = st.one_of(
    st.sampled_from(_HOSTILE),
    st.text(alphabet=st.characters(exclude_categories=["Cs"]), max_size=60),
    st.decimals(allow_nan=True, allow_infinity=True).map(str),
)
often = settings(
    max_examples=60, deadline=None, suppress_health_check=[HealthCheck.function_scoped_fixture]
)


def fresh(folder: Path, name: str) -> Path:
    """The demo's own file in `folder`, whatever an example before left there."""
    file = folder / Path(name).name
    file.write_bytes((DEMO / name).read_bytes())
    return file


def whole_faults(act: Callable[[], object]) -> None:
    """Hold that `act` understands, or names faults that all have a place and a sentence."""
    faults = told(act)
    assert faults is None or (faults and all(fault.where and fault.what for fault in faults))


@often
@given(
    file=st.sampled_from(PLAN_FILES),
    where=st.floats(min_value=0, max_value=1),
    garbage=st.one_of(st.sampled_from(_HOSTILE), st.text(min_size=1, max_size=40)),
)
def test_garbage_anywhere_in_a_plan(plan: Path, file: str, where: float, garbage: str) -> None:
    text = (DEMO / "plan" / file).read_text(encoding="utf-8")
    cut = int(where * len(text))
    spoiled = text[:cut] + garbage + text[cut + len(garbage) :]
    (plan / file).write_bytes(spoiled.encode("utf-8", "surrogatepass"))
    whole_faults(lambda: understood(plan))
    fresh(plan, f"plan/{file}")


@often
@given(column=st.sampled_from(GRID_COLUMNS.needed), cell=cells)
def test_garbage_in_a_cell_of_the_grids(plan: Path, column: str, cell: str) -> None:
    set_cell(fresh(plan, "plan/grids.csv"), 2, column, cell)
    whole_faults(lambda: understood(plan))


@often
@given(column=st.sampled_from(CIRCUIT_COLUMNS.known), cell=cells)
def test_garbage_in_a_cell_of_the_circuits(plan: Path, column: str, cell: str) -> None:
    set_cell(fresh(plan, "plan/circuits.csv"), 3, column, cell)
    whole_faults(lambda: understood(plan))


@often
@given(column=st.sampled_from(LOT_COLUMNS.known), cell=cells)
def test_garbage_in_a_cell_of_the_lots(tmp_path: Path, column: str, cell: str) -> None:
    file = fresh(tmp_path, "lots.csv")
    set_cell(file, 3, column, cell)
    whole_faults(lambda: load_stock([file], counter()))


@often
@given(column=st.sampled_from(CONSUMABLE_COLUMNS.known), cell=cells)
def test_garbage_in_a_cell_of_the_consumables(tmp_path: Path, column: str, cell: str) -> None:
    file = fresh(tmp_path, "consumables.csv")
    set_cell(file, 2, column, cell)
    whole_faults(lambda: load_stock([file], counter()))


@often
@given(data=st.binary(max_size=200))
def test_any_bytes_as_stock_or_instruments(tmp_path: Path, data: bytes) -> None:
    file = tmp_path / "file"
    file.write_bytes(data)
    whole_faults(lambda: load_stock([file], counter()))
    whole_faults(lambda: load_instruments(file, counter()))


@often
@given(where=st.floats(min_value=0, max_value=1), garbage=st.text(min_size=1, max_size=30))
def test_garbage_anywhere_in_a_route(where: float, garbage: str) -> None:
    text = ROUTE.decode()
    cut = int(where * len(text))
    spoiled = (text[:cut] + garbage + text[cut + len(garbage) :]).encode("utf-8", "surrogatepass")
    whole_faults(lambda: read_route("own.toml", spoiled, counter()))


_keys = st.text("abcdefghij", min_size=1, max_size=8)
_scalars = st.one_of(
    st.booleans().map(lambda value: str(value).lower()),
    st.integers().map(str),
    st.integers(min_value=10**18, max_value=10**30).map(hex),
    st.floats().map(repr),
    st.just("2026-12-01T10:00:00Z"),
    st.just("07:30:00"),
    st.just("[]"),
    st.just("{}"),
    st.just("[[1], [2]]"),
    st.just('{ a = { b = "c" } }'),
)


@often
@given(
    key=st.sampled_from(
        ["label", "title", "surroundings", "articles", "poisson_ratio", "pins", "permits", "arm"]
    ),
    scalar=_scalars,
    other=_keys,
)
def test_a_value_of_any_type_at_any_key_of_the_campaign(
    plan: Path, key: str, scalar: str, other: str
) -> None:
    file = fresh(plan, "plan/campaign.toml")
    lines = file.read_text(encoding="utf-8").splitlines()
    lines = [
        f"{line.partition('=')[0]}= {scalar}" if line.strip().startswith(f"{key} =") else line
        for line in lines
    ]
    file.write_text("\n".join([*lines, f"{other} = {scalar}"]), encoding="utf-8")
    whole_faults(lambda: understood(plan))


def test_numbers_of_thousands_of_digits_and_deep_nests_are_told() -> None:
    for data in (b"a = " + b"9" * 5000, b"a = " + b"[" * 5000 + b"]" * 5000):
        faults = told(lambda data=data: toml_of("f.toml", data))  # type: ignore[misc]
        assert faults is not None
        assert "f.toml" == faults[0].where
