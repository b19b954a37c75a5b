"""Instruments from TOML: one [[instrument]] each, with a [[instrument.range]] for each range."""

from __future__ import annotations

from collections.abc import Callable
from pathlib import Path

from gaugelog.errors import Faulty
from gaugelog.intake.fields import Fields, Gathered, distinct
from gaugelog.intake.files import read_bytes, toml_of
from gaugelog.intake.papers import Paper, paper_of
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRange, ReferenceValue

QUANTITY_UNITS: dict[str, tuple[str, ...]] = {
    "resistance": ("ohm", "kohm"),
    "insulation": ("ohm", "kohm", "Mohm", "Gohm", "Tohm"),
    "voltage": ("V", "mV", "uV"),
    "bridge output": ("mV/V",),
    "strain": ("um/m",),
    "temperature": ("degC",),
    "humidity": ("%RH",),
}
"""What an instrument may measure, and the units its ranges are given in."""


def load_instruments(
    path: Path, new_id: Callable[[], str], papers: dict[str, Paper] | None = None
) -> tuple[InstrumentAdded, ...]:
    """Understand an instruments file. Raises Faulty naming every fault at once.

    The certificates' files that it names are added to `papers`, by the id of the instrument.
    """
    given = papers if papers is not None else {}
    faults: Gathered = []
    top = Fields(path.name, toml_of(path.name, read_bytes(path)), faults, joint=", ")
    tables = top.tables("instrument")
    found = [_instrument(each, new_id) for each in tables]
    for each, item in zip(tables, found, strict=True):
        paper = paper_of(each, path.parent)
        if paper is not None:
            given[item.id] = paper
        each.done()
    distinct(tables, "label", [item.label for item in found])
    top.done()
    if faults:
        raise Faulty(faults)
    return tuple(found)


def _instrument(each: Fields, new_id: Callable[[], str]) -> InstrumentAdded:
    ranges = each.tables("range", needed=not each.has("value"))
    values = each.tables("value", needed=False)
    read = tuple(_range(span) for span in ranges)
    distinct(ranges, "name", [span.name for span in read])
    found = InstrumentAdded(
        id=new_id(),
        label=each.label("label"),
        type=each.text("type"),
        maker=each.text("maker"),
        serial=each.text("serial"),
        certificate_number=each.text("certificate_number"),
        calibrated_by=each.text("calibrated_by"),
        calibrated_on=each.day("calibrated_on"),
        due=each.day("due"),
        ranges=read,
        values=tuple(_value(known) for known in values),
    )
    if each.sound("due", "calibrated_on") and found.due < found.calibrated_on:
        each.fault("due", "lies before the calibration.")
    return found


def _value(known: Fields) -> ReferenceValue:
    """What a reference is known to be, with the expanded uncertainty of its certificate."""
    quantity = known.choice("quantity", tuple(QUANTITY_UNITS))
    units = QUANTITY_UNITS[quantity]
    coverage = known.maybe_number("coverage", "1", positive=True)
    found = ReferenceValue(
        quantity=quantity,
        value=known.quantity("value", units),
        uncertainty=known.quantity("uncertainty", units, positive=True),
        coverage=coverage.value if coverage is not None else "2",
    )
    known.done()
    return found


def _range(span: Fields) -> InstrumentRange:
    quantity = span.choice("quantity", tuple(QUANTITY_UNITS))
    units = QUANTITY_UNITS[quantity]
    found = InstrumentRange(
        name=span.text("name"),
        quantity=quantity,
        low=span.quantity("low", units),
        high=span.quantity("high", units),
        gain=span.quantity("gain", ("%",)),
        offset=span.quantity("offset", units),
        resolution=span.quantity("resolution", units),
        test_voltage=span.maybe_quantity("test_voltage", ("V",), positive=True),
    )
    if span.sound("low", "high") and found.high.si() <= found.low.si():
        span.fault("high", "must be above low.")
    for name in ("gain", "offset", "resolution"):
        if span.sound(name) and getattr(found, name).si() < 0:
            span.fault(name, "must not be below 0.")
    span.done()
    return found
