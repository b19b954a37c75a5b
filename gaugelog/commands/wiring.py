"""`gaugelog wiring`: which wire goes to which pin, what is used twice, which channels are spare."""

from __future__ import annotations

from pathlib import Path
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.outputs import write_out
from gaugelog.commands.paper import PaperAsked, demand_paper
from gaugelog.commands.session import Json, open_logbook
from gaugelog.commands.talk import as_json, put, put_json, put_table, say
from gaugelog.errors import ExitCode, Fault, Faulty
from gaugelog.visible import counted

if TYPE_CHECKING:
    from gaugelog.ledger.campaign import Paper
    from gaugelog.work.logbook import Logbook
    from gaugelog.work.wiring import CircuitWired, WiringMap

group = typer.Typer(help="The wiring map: show it, export it.")


@group.command()
def show(ctx: typer.Context, json: Json = False) -> None:
    """Show circuits with their grids and wires, conflicts, and spare channels.

    Exit code 1 when a channel, a pin or a mark is used twice.
    """
    from gaugelog.work.wiring import wiring_map

    wiring = wiring_map(open_logbook(ctx))
    if json:
        put_json(as_json(wiring))
    else:
        _show(wiring)
    if wiring.conflicts:
        raise typer.Exit(int(ExitCode.TROUBLE))


def _show(wiring: WiringMap) -> None:
    put_table(
        "Circuits",
        ["channel", "circuit", ">arm", "grid", "place"],
        [row for circuit in wiring.circuits for row in _grid_rows(circuit)],
        empty="The plan has no circuit.",
    )
    put_table(
        "Wires",
        ["circuit", "connector", "wire", "pin", "mark", "cable", ">m"],
        [row for circuit in wiring.circuits for row in _wire_rows(circuit)],
        empty="No pin and no mark is given.",
    )
    if wiring.spare:
        put("Spare channels: " + ", ".join(each.channel for each in wiring.spare))
    put(*(f"✗ {conflict}" for conflict in wiring.conflicts))


def _grid_rows(circuit: CircuitWired) -> list[list[str]]:
    names = [circuit.channel or "?", circuit.circuit]
    rows = [
        [str(each.arm), f"{each.grid} (dummy)" if each.dummy else each.grid, each.place]
        for each in circuit.grids
    ]
    return _grouped(names, rows or [["", "", ""]])


def _wire_rows(circuit: CircuitWired) -> list[list[str]]:
    wires = [[each.function, each.pin or "–", each.mark or "–"] for each in circuit.wires]
    cable = [circuit.cable or "–", f"{circuit.length_m:g}"]
    rows = [[*wire, *(cable if not place else ["", ""])] for place, wire in enumerate(wires)]
    return _grouped([circuit.circuit, circuit.connector or "–"], rows)


def _grouped(names: list[str], rows: list[list[str]]) -> list[list[str]]:
    """Rows under their names, which stand in the first one only."""
    blank = [""] * len(names)
    return [[*(blank if place else names), *row] for place, row in enumerate(rows)]


@group.command()
def export(
    ctx: typer.Context,
    file: Annotated[Path, typer.Argument(help="The file: .csv, .xlsx or .pdf.")],
    paper: PaperAsked = "",
) -> None:
    """Write the wiring map to a file: a table to work on, or pages to take along.

    CSV and XLSX have a row a wire, and then a row a pin of each spare channel. The file's path
    goes to stdout.
    """
    from gaugelog.work.wiring import wiring_map

    kind, size = _demand_kind(file, paper)
    logbook = open_logbook(ctx)
    wiring = wiring_map(logbook)
    data = _written(logbook, wiring, kind, size)
    write_out(file, data)
    for conflict in wiring.conflicts:
        say(f"  ✗ {conflict}")
    circuits = counted(len(wiring.circuits), "circuit")
    say(f"{circuits}, {counted(len(wiring.spare), 'spare channel')}.")
    put(str(file))


def _demand_kind(file: Path, paper: str) -> tuple[str, Paper | None]:
    kind = file.suffix.lower()
    faults = []
    if kind not in {".csv", ".xlsx", ".pdf"}:
        what = f"“{file.name}” ends in none of .csv, .xlsx, .pdf."
        faults.append(Fault("file", what, "The ending says what is written."))
    size = None
    try:
        size = demand_paper(paper)
    except Faulty as error:
        faults += error.faults
    if faults:
        raise Faulty(faults, "nothing was written")
    return kind, size


def _written(logbook: Logbook, wiring: WiringMap, kind: str, paper: Paper | None) -> bytes:
    from gaugelog.documents import spreadsheet
    from gaugelog.documents.wiring_map import wiring_pdf, wiring_rows
    from gaugelog.rules.pages import paper_of

    moment = logbook.clock.now()
    if kind == ".pdf":
        with logbook.reading() as view:
            size = paper or paper_of(view)
        return wiring_pdf(wiring, moment, size).pdf
    rows = wiring_rows(wiring)
    if kind == ".xlsx":
        return spreadsheet.xlsx_bytes("Wiring", rows, moment.utc)
    return spreadsheet.csv_bytes(rows)
