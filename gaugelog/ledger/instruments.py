"""Instruments: meters and references, with certificate, due date and accuracy by range."""

from __future__ import annotations

from collections.abc import Iterator
from typing import ClassVar

from sqlmodel import Field, SQLModel

from gaugelog.ledger.base import DateText, DecimalText, FactBody, Id, Part, Quantity
from gaugelog.ledger.rows import At, Change, Known, Put


class InstrumentRange(Part):
    """One range of an instrument and its accuracy, each part a rectangular half-width."""

    name: str
    quantity: str
    """`resistance`, `insulation`, `voltage`, `temperature`, `humidity` …"""
    low: Quantity
    high: Quantity
    gain: Quantity
    """Per cent of the reading."""
    offset: Quantity
    """In the unit of the quantity, whatever the reading."""
    resolution: Quantity
    test_voltage: Quantity | None = None


class ReferenceValue(Part):
    """One known value of a reference: a resistor, a setting of a decade box."""

    quantity: str
    value: Quantity
    uncertainty: Quantity
    """Expanded, as certified, in the unit of the quantity."""
    coverage: DecimalText = "2"


class InstrumentAdded(FactBody):
    """An instrument with its present certificate; added again when it is calibrated anew."""

    kind: ClassVar[str] = "instrument.added"

    id: Id
    label: str
    type: str
    maker: str
    serial: str
    certificate_number: str
    calibrated_by: str
    calibrated_on: DateText
    due: DateText
    ranges: tuple[InstrumentRange, ...]
    certificate: str = ""
    """Digest of the certificate among the evidence, or empty."""
    values: tuple[ReferenceValue, ...] = ()
    """Of a reference: what it is known to be."""


class InstrumentRow(SQLModel, table=True):
    """An instrument under its present certificate."""

    __tablename__ = "instrument"

    id: str = Field(primary_key=True)
    label: str = Field(index=True)
    type: str
    serial: str
    due: str
    data: str
    """The whole of `InstrumentAdded` as JSON."""
    seq: int


class CalibrationRow(SQLModel, table=True):
    """One certificate of an instrument: in force from its entry until the next one's."""

    __tablename__ = "calibration"

    id: str = Field(primary_key=True)
    """The instrument's id and the entry's number."""
    instrument: str = Field(index=True)
    data: str
    """The whole of `InstrumentAdded` as JSON."""
    seq: int


def apply_instrument_added(_known: Known, at: At, fact: InstrumentAdded) -> Iterator[Change]:
    """The instrument is known under this certificate; those it had before are kept beside it."""
    yield Put(
        "instrument",
        {
            "id": fact.id,
            "label": fact.label,
            "type": fact.type,
            "serial": fact.serial,
            "due": fact.due,
            "data": at.data,
            "seq": at.seq,
        },
    )
    yield Put(
        "calibration",
        {
            "id": f"{fact.id}/{at.seq}",
            "instrument": fact.id,
            "data": at.data,
            "seq": at.seq,
        },
    )
