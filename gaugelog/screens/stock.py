"""Stock: what is left of lots and packs, what expires, what must not be used, what is due."""

from __future__ import annotations

from collections.abc import Iterable

from textual.content import Content

from gaugelog.screens.columns import Cell, Column
from gaugelog.screens.listing import Listing, Row
from gaugelog.screens.stock_text import consumable_text, instrument_text, lot_text, until
from gaugelog.screens.words import BAD, GOOD, WAIT, plain
from gaugelog.work.stocked import ConsumableShown, InstrumentShown, LotShown, Stock, stocked


class StockScreen(Listing[Stock]):
    """Gauge lots, consumables and instruments; more of the one under the cursor."""

    about = (
        "Gauge lots, consumables and instruments. Left counts the pieces on the shelf that may be "
        "used, wanted the points of the plan that have no gauge yet. What expires within 30 days "
        "is marked. Quarantine, free and scrap with: gaugelog stock."
    )

    finds = "Find or scan a lot, pack, gauge or instrument"
    columns = (
        Column("label", least=6),
        Column("what", least=12),
        Column("left", number=True),
        Column("wanted", number=True),
        Column("state", least=12),
        Column("until", least=10),
    )

    def title_text(self) -> str:
        """How much there is, and how much of it must not be used."""
        if self.found is None:
            return "stock"
        rows = list(self.rows(self.found))
        held = sum(row.cells[4].text.startswith("✗") for row in rows)
        return f"stock: {len(rows)} entries, {held} not to be used"

    def read(self, person: str) -> Stock:
        """All that is in stock."""
        return stocked(self.desk.logbook)

    def nothing(self) -> str:
        """How stock is received."""
        return "Nothing is in stock. Receive it with: gaugelog stock receive FILE"

    def rows(self, found: Stock) -> Iterable[Row]:
        """Lots, consumables, instruments."""
        yield from map(_lot, found.lots)
        yield from map(_consumable, found.consumables)
        yield from map(_instrument, found.instruments)

    def more(self, found: Stock, name: str, width: int) -> Content:
        """The packs of a lot, the data of a consumable, the ranges of an instrument."""
        for lot in found.lots:
            if _lot(lot).key == name:
                return lot_text(lot)
        for consumable in found.consumables:
            if _consumable(consumable).key == name:
                return consumable_text(consumable)
        for instrument in found.instruments:
            if _instrument(instrument).key == name:
                return instrument_text(instrument)
        return plain("")


def _lot(shown: LotShown) -> Row:
    lot = shown.lot
    words = [gauge.label for pack in shown.packs for gauge in pack.gauges]
    packs = [pack.label for pack in shown.packs]
    return Row(
        lot.label,
        "Gauge lots",
        (
            Cell(lot.label, "bold"),
            Cell(f"{lot.type}, {lot.nominal_resistance}"),
            Cell(str(shown.left), BAD if shown.left < shown.wanted else ""),
            Cell(str(shown.wanted)),
            _lot_state(shown),
            Cell(until(lot.expires, shown.days_left)),
        ),
        " ".join([lot.maker, *packs, *words]),
        "lot",
    )


def _lot_state(shown: LotShown) -> Cell:
    held = _held(shown.lot.label, shown.barred, shown.days_left)
    if held is not None:
        return held
    if shown.left < shown.wanted:
        return Cell(f"! {shown.wanted - shown.left} too few", WAIT)
    if any(pack.barred or any(gauge.barred for gauge in pack.gauges) for pack in shown.packs):
        return Cell("! some held", WAIT)
    return _soon(shown.days_left)


def _consumable(shown: ConsumableShown) -> Row:
    lot = shown.lot
    state = _held(shown.lot.label, shown.barred, shown.days_left) or _soon(shown.days_left)
    what = Cell(f"{lot.type}: {lot.name}")
    cells = (Cell(lot.label, "bold"), what, Cell(""), Cell(""), state)
    return Row(
        lot.label,
        "Consumables",
        (*cells, Cell(until(lot.expires, shown.days_left))),
        f"{lot.maker} {lot.type}",
        "consumable",
    )


def _instrument(shown: InstrumentShown) -> Row:
    meter = shown.instrument
    overdue = Cell("✗ overdue", BAD) if shown.days_left < 0 else _soon(shown.days_left)
    cells = (Cell(meter.label, "bold"), Cell(meter.type), Cell(""), Cell(""), overdue)
    return Row(
        meter.label,
        "Instruments",
        (*cells, Cell(until(meter.due, shown.days_left))),
        f"{meter.maker} {meter.serial}",
        "instrument",
    )


def _held(label: str, barred: str, days_left: int | None) -> Cell | None:
    """Why it must not be used, in a word; None when it may.

    The sentence begins `lot L-3504 is quarantined:`; what follows are people's own words.
    """
    _kind, _name, standing = barred.partition(f" {label} is ")
    for word in ("quarantined", "scrapped"):
        if standing.startswith(f"{word}:"):
            return Cell(f"✗ {word}", BAD)
    return Cell("✗ expired", BAD) if days_left is not None and days_left < 0 else None


_SOON_DAYS = 30


def _soon(days_left: int | None) -> Cell:
    if days_left is not None and days_left <= _SOON_DAYS:
        return Cell("! soon", WAIT)
    return Cell("✓ good", GOOD)
