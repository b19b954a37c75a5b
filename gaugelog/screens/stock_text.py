"""What the stock screen tells of a lot, a consumable, an instrument."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator

from textual.content import Content

from gaugelog.ledger.base import Quantity
from gaugelog.ledger.instruments import InstrumentRange
from gaugelog.screens.columns import Cell, Column, heading, line, widths
from gaugelog.screens.words import BAD, CALM, lines, plain
from gaugelog.work.stocked import ConsumableShown, InstrumentShown, LotShown, PackShown

_FEW_DAYS = 99


def until(day: str | None, days_left: int | None) -> str:
    """A date with the days until then; `2027-03-01, 12 d left`."""
    if day is None or days_left is None:
        return ""
    if days_left < 0:
        return f"{day}, {-days_left} d ago"
    return f"{day}, {days_left} d left" if days_left <= _FEW_DAYS else day


def lot_text(shown: LotShown) -> Content:
    """Figures of the certificate, then each pack with its pieces."""
    lot = shown.lot
    factors = ", ".join(
        f"{each.gauge_factor} ± {each.gauge_factor_tolerance}" for each in lot.grids
    )
    told = [
        plain(f"lot {lot.label}: {lot.type}, {lot.pattern}, by {lot.maker}", "bold"),
        *_barred(shown.barred),
        plain(f"{lot.nominal_resistance} ± {lot.resistance_tolerance}; gauge factor {factors}"),
        plain(
            f"{shown.left} free on the shelf, {shown.wanted} still wanted by the plan; "
            f"{shown.count('in service')} in service, {shown.count('removed')} removed, "
            f"{shown.count('scrapped')} scrapped"
        ),
        plain(""),
    ]
    return lines(*told, *(each for pack in shown.packs for each in _pack(pack)))


def _pack(pack: PackShown) -> Iterator[Content]:
    yield plain(f"pack {pack.label}: {pack.left} of {len(pack.gauges)} left")
    yield from _barred(pack.barred)
    away = [gauge for gauge in pack.gauges if gauge.state != "on shelf"]
    for gauge in away:
        where = f" at {gauge.point}" if gauge.point else ""
        yield plain(f"  {gauge.label} {gauge.state}{where}", CALM)
    own = Counter(gauge.barred for gauge in pack.gauges if gauge.barred.startswith("gauge"))
    yield from (plain(f"  ✗ {why}", BAD) for why in own)


def consumable_text(shown: ConsumableShown) -> Content:
    """What its data sheet allows, and its cure."""
    lot = shown.lot
    told = [
        plain(f"{lot.type} {lot.label}: {lot.name}, by {lot.maker}", "bold"),
        *_barred(shown.barred),
        plain(f"received {lot.received_on}; {_expiry(lot.expires)}"),
    ]
    told += [plain(each) for each in _surroundings(shown)]
    told += [plain(f"cures {each.duration} at {each.temperature} or above") for each in lot.cure]
    return lines(*told)


def _expiry(expires: str | None) -> str:
    return f"expires {expires}" if expires else "does not expire"


def _surroundings(shown: ConsumableShown) -> Iterator[str]:
    lot = shown.lot
    for name, low, high in (
        ("air", lot.temperature_min, lot.temperature_max),
        ("humidity", lot.humidity_min, lot.humidity_max),
    ):
        if low is not None or high is not None:
            yield f"use at {name} {_between(low, high)}"
    if lot.pot_life is not None:
        yield f"pot life {lot.pot_life}"
    if lot.wire_resistance is not None:
        yield f"one wire {lot.wire_resistance}"


def _between(low: Quantity | None, high: Quantity | None) -> str:
    if low is not None and high is not None:
        return f"{low} to {high}"
    return f"from {low}" if low is not None else f"up to {high}"


_RANGES = (
    Column("range"),
    Column("from", number=True),
    Column("to", number=True),
    Column("± of reading", number=True),
    Column("± fixed", number=True),
    Column("resolution", number=True),
)


def instrument_text(shown: InstrumentShown) -> Content:
    """Its certificate, and each range with its accuracy."""
    meter = shown.instrument
    rows = [_range(each) for each in meter.ranges]
    wide = widths(_RANGES, rows, 999)
    return lines(
        plain(f"{meter.label}: {meter.type}, by {meter.maker}, serial {meter.serial}", "bold"),
        plain(
            f"certificate {meter.certificate_number} of {meter.calibrated_on}, by "
            f"{meter.calibrated_by}; due {meter.due}"
        ),
        heading(_RANGES, wide),
        *(line(_RANGES, row, wide) for row in rows),
    )


def _range(span: InstrumentRange) -> tuple[Cell, ...]:
    volts = f", {span.test_voltage}" if span.test_voltage is not None else ""
    return (
        Cell(f"{span.quantity} {span.name}{volts}"),
        *(
            Cell(str(each))
            for each in (span.low, span.high, span.gain, span.offset, span.resolution)
        ),
    )


def _barred(why: str) -> list[Content]:
    return [plain(f"✗ {why}", BAD)] if why else []
