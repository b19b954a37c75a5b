"""What is in stock: lots with what is left and still wanted, packs, consumables, instruments."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator, Sequence
from dataclasses import dataclass
from datetime import date

from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow
from gaugelog.ledger.points import GridRow, PointRow
from gaugelog.ledger.standing import StandingRow
from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow, GaugeRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.barred import why_barred, why_gauge_barred
from gaugelog.rules.progress import worst_state
from gaugelog.work.logbook import Logbook


@dataclass(frozen=True, slots=True)
class GaugeShown:
    """A piece: its label, its state, the point it is at, why it must not be used."""

    label: str
    state: str
    point: str
    barred: str


@dataclass(frozen=True, slots=True)
class PackShown:
    """A pack of a lot with its pieces."""

    label: str
    gauges: tuple[GaugeShown, ...]
    barred: str

    @property
    def left(self) -> int:
        """How many pieces are on the shelf and may be used."""
        return _left(self.gauges)


@dataclass(frozen=True, slots=True)
class LotShown:
    """A gauge lot: its figures, its packs, and how many points still want a piece of it."""

    lot: LotReceived
    packs: tuple[PackShown, ...]
    wanted: int
    barred: str
    days_left: int | None
    """Days until it expires, below zero when it did; None when it does not."""

    @property
    def left(self) -> int:
        """How many pieces are on the shelf and may be used."""
        return sum(pack.left for pack in self.packs)

    def count(self, state: str) -> int:
        """How many pieces are in a state, barred ones too."""
        return sum(gauge.state == state for pack in self.packs for gauge in pack.gauges)


@dataclass(frozen=True, slots=True)
class ConsumableShown:
    """A consumable lot: what was received, how long it lasts, why it must not be used."""

    lot: ConsumableReceived
    days_left: int | None
    barred: str


@dataclass(frozen=True, slots=True)
class InstrumentShown:
    """An instrument under its certificate, and the days until it is due again."""

    instrument: InstrumentAdded
    days_left: int


@dataclass(frozen=True, slots=True)
class Stock:
    """Everything in stock, as received."""

    lots: tuple[LotShown, ...]
    consumables: tuple[ConsumableShown, ...]
    instruments: tuple[InstrumentShown, ...]


def stocked(logbook: Logbook) -> Stock:
    """What is in stock, and how it stands today where this machine is."""
    today = logbook.clock.now().local.date()
    with logbook.reading() as view:
        return Stock(
            tuple(_lots(view, today)),
            tuple(_consumables(view, today)),
            tuple(_instruments(view, today)),
        )


def _lots(view: View, today: date) -> Iterator[LotShown]:
    points = view.all(PointRow)
    labels = {row.id: row.label for row in points}
    wanted = Counter(row.lot for row in points if not row.gauge and _stands(view, row))
    barred = {row.id for row in view.all(StandingRow) if row.standing != "free"}
    for row in view.all(LotRow):
        lot = LotReceived.model_validate_json(row.data)
        pieces = view.all(GaugeRow, lot=row.id)
        packs = tuple(_packs(view, pieces, labels, barred))
        yield LotShown(
            lot, packs, wanted[row.id], why_barred(view, row.id), _days(lot.expires, today)
        )


def _stands(view: View, point: PointRow) -> bool:
    return worst_state([grid.state for grid in view.all(GridRow, point=point.id)]) != "withdrawn"


def _packs(
    view: View, pieces: Sequence[GaugeRow], labels: dict[str, str], barred: set[str]
) -> Iterator[PackShown]:
    for pack in dict.fromkeys(each.pack for each in pieces):
        mine = [each for each in pieces if each.pack == pack]
        gauges = tuple(_gauge(view, each, labels, barred) for each in mine)
        yield PackShown(mine[0].label.rpartition("/")[0], gauges, why_barred(view, pack))


def _gauge(view: View, row: GaugeRow, labels: dict[str, str], barred: set[str]) -> GaugeShown:
    held = not barred.isdisjoint((row.id, row.pack, row.lot))
    why = why_gauge_barred(view, row) if held else ""
    return GaugeShown(row.label, row.state, labels.get(row.point, ""), why)


def _left(gauges: Sequence[GaugeShown]) -> int:
    return sum(gauge.state == "on shelf" and not gauge.barred for gauge in gauges)


def _consumables(view: View, today: date) -> Iterator[ConsumableShown]:
    for row in view.all(ConsumableRow):
        lot = ConsumableReceived.model_validate_json(row.data)
        yield ConsumableShown(lot, _days(lot.expires, today), why_barred(view, row.id))


def _instruments(view: View, today: date) -> Iterator[InstrumentShown]:
    for row in view.all(InstrumentRow):
        added = InstrumentAdded.model_validate_json(row.data)
        yield InstrumentShown(added, (date.fromisoformat(added.due) - today).days)


def _days(expires: str | None, today: date) -> int | None:
    return None if expires is None else (date.fromisoformat(expires) - today).days
