"""Gauge lots and consumables from CSV or XLSX: a row a pack, a row a consumable lot."""

from __future__ import annotations

import re
from collections.abc import Sequence
from dataclasses import dataclass, field
from pathlib import Path

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.consumables import CONSUMABLE_COLUMNS, read_consumables
from gaugelog.intake.fields import Gathered
from gaugelog.intake.files import read_bytes
from gaugelog.intake.lots import LOT_COLUMNS, NewId, Papers, read_lots
from gaugelog.intake.received import Placed
from gaugelog.intake.tables import Columns, heading_of, rows_of
from gaugelog.ledger.stock import ConsumableReceived, LotReceived

_KINDS = (LOT_COLUMNS, CONSUMABLE_COLUMNS)
_FEWEST = 3
"""Columns of a kind that tell that a table is meant to be of it."""


@dataclass(frozen=True, slots=True)
class Stock:
    """What was received."""

    lots: tuple[LotReceived, ...]
    consumables: tuple[ConsumableReceived, ...]
    papers: Papers = field(default_factory=dict)
    """The certificates' files, by the id of what they came with."""


def load_stock(files: Sequence[Path], new_id: NewId) -> Stock:
    """Understand stock files; which kind a file is shows in its heading.

    Raises Faulty naming every fault of every file at once.
    """
    faults: Gathered = []
    lots: list[Placed] = []
    consumables: list[Placed] = []
    for path in files:
        try:
            columns, data = stock_table(path)
            found = rows_of(path.name, data, columns, faults)
            into = lots if columns is LOT_COLUMNS else consumables
            into += [Placed(row, path.parent) for row in found]
        except Faulty as error:
            faults += error.faults
    papers: Papers = {}
    stock = Stock(
        read_lots(lots, new_id, papers), read_consumables(consumables, new_id, papers), papers
    )
    if faults:
        raise Faulty(faults)
    return stock


def stock_table(path: Path) -> tuple[Columns, bytes]:
    """Which kind of table a file holds, and its bytes.

    Raises Faulty, with the one fault, when it is neither of gauge lots nor of consumables.
    """
    data = read_bytes(path)
    if path.suffix.casefold() == ".toml":
        remedy = "Instruments: gaugelog instrument add FILE; a plan: gaugelog plan load FOLDER."
        raise Faulty([Fault(path.name, "is TOML, no table of what was received.", remedy)])
    cells = {cell.strip().casefold().replace("gage", "gauge") for cell in _cells(path.name, data)}
    there = [sum(each.casefold() in cells for each in columns.needed) for columns in _KINDS]
    if max(there) < _FEWEST:
        names = " or ".join(", ".join(columns.needed[:4]) for columns in _KINDS)
        remedy = f"Row 1 names the columns: {names} …"
        raise Faulty([Fault(path.name, "holds neither gauge lots nor consumables.", remedy)])
    return _KINDS[there.index(max(there))], data


def _cells(name: str, data: bytes) -> list[str]:
    """The cells of row 1, also where another sign than the comma stands between them."""
    return [cell for each in heading_of(name, data) for cell in re.split(r"[;\t]", each)]
