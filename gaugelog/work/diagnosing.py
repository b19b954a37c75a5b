"""Diagnosis at a point: what is wrong with its circuit, from resistances between its pins.

Nothing of this is kept: it says where to look, and the check that failed is what the record tells.
"""

from __future__ import annotations

import math
from collections.abc import Sequence
from dataclasses import dataclass, replace
from datetime import date
from itertools import combinations

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.intake.pinreadings import PinTyped, parse_pin_reading
from gaugelog.ledger.campaign import Channel, ChannelRow
from gaugelog.ledger.circuits import CircuitRow
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.points import GridRow
from gaugelog.ledger.view import View
from gaugelog.physics.circuit import Circuit
from gaugelog.physics.network import resistance_between
from gaugelog.physics.pin_network import (
    ARTICLE,
    SHIELD,
    pin_network,
    pin_resistance,
    pins_of,
)
from gaugelog.physics.pin_next import RIVAL
from gaugelog.physics.pins import Diagnosis, PinReading, diagnose
from gaugelog.rules.accuracy import RangeTaken, range_for
from gaugelog.rules.pinwork import MEANINGS, terminal_called, terminals_of
from gaugelog.rules.wired import Wired, planned_circuit, wired
from gaugelog.work.logbook import Logbook

MOST_READINGS = 60
_OUTCOME = "nothing was diagnosed"
_READ_SPREAD, _PLANNED_SPREAD = 5e-4, 2e-3
"""How far an element may lie from the value it is taken for, relative, one sigma: grids that were
measured here and then soldered, and grids by their nominal value (common practice)."""


@dataclass(frozen=True, slots=True)
class Terminal:
    """Where a meter can be put: a wire's function, and its pin as the connector labels it."""

    name: str
    pin: str


@dataclass(frozen=True, slots=True)
class PinPair:
    """Two terminals and what a sound circuit shows between them, ohm (infinite to bare metal)."""

    between: tuple[str, str]
    expected: float
    typed: str = ""
    """What was measured, as typed."""


@dataclass(frozen=True, slots=True)
class PinAnswer:
    """One answer: defects that the figures cannot tell apart, and what they mean."""

    sentence: str
    means: str
    misfit: float
    far_behind: bool
    """Whether the best answer explains the figures far better."""


@dataclass(frozen=True, slots=True)
class PinsFound:
    """What resistances between pins say of a circuit; without any, the table to measure against."""

    point: str
    circuit: str
    arrangement: str
    terminals: tuple[Terminal, ...]
    pairs: tuple[PinPair, ...]
    answers: tuple[PinAnswer, ...] = ()
    next: str = ""
    explained: bool = True
    """Whether any single defect explains the figures."""


def circuits_of(logbook: Logbook, point: str) -> list[str]:
    """Labels of the circuits that a point's grids are wired in, in the order of the grids."""
    with logbook.reading() as view:
        return [row.label for row in _circuits(view, point)]


def diagnose_point(
    logbook: Logbook, point: str, typed: Sequence[str] = (), *, meter: str = "", circuit: str = ""
) -> PinsFound:
    """What resistances such as "A to B = 350.2 ohm" say of a point's circuit, module unplugged.

    Terminals are named by the function of their wire or by their pin's label. `circuit` may be
    left out where the point has one. Raises Faulty naming every fault of every reading at once,
    Refused where the point has no such circuit or no gauge yet.
    """
    day = logbook.clock.now().local.date()
    with logbook.reading() as view:
        row = _one_circuit(view, point, circuit)
        known = wired(view, planned_circuit(view, row.id))
        channel = view.get(ChannelRow, row.channel)
        instrument = _instrument(view, meter, day) if typed else None
    labels = Channel.model_validate_json(channel.data).pins if channel is not None else {}
    terminals = terminals_of(known.circuit, labels)
    about = PinsFound(
        point,
        row.label,
        row.arrangement,
        tuple(Terminal(name, pin) for name, pin in terminals.items()),
        _table(known),
    )
    if instrument is None:
        return about
    return _answered(about, known, _understood(typed, terminals, instrument))


def _circuits(view: View, point: str) -> list[CircuitRow]:
    row = view.point(point)
    if row is None:
        raise Refused(f"No point is called “{point}”.", "See `gaugelog plan show`.")
    ids = dict.fromkeys(grid.circuit for grid in view.all(GridRow, point=row.id))
    found = [view.get(CircuitRow, circuit) for circuit in ids if circuit]
    return [circuit for circuit in found if circuit is not None]


def _one_circuit(view: View, point: str, circuit: str) -> CircuitRow:
    found = _circuits(view, point)
    if not found:
        raise Refused(f"{point} is wired in no circuit.", "There are no pins to measure at.")
    if not circuit and len(found) == 1:
        return found[0]
    for row in found:
        if row.label.casefold() == circuit.casefold():
            return row
    listed = ", ".join(row.label for row in found)
    what = f"is not a circuit of {point}." if circuit else f"Which circuit of {point}?"
    raise Faulty([Fault(circuit or "circuit", what, f"It has {listed}.")], _OUTCOME)


def _instrument(view: View, meter: str, day: date) -> InstrumentAdded:
    if not meter:
        fault = Fault("meter", "is missing.", "Name the meter the resistances are from.")
        raise Faulty([fault], _OUTCOME)
    row = view.instrument(meter)
    if row is None:
        what = f"no instrument is called “{meter}”."
        raise Faulty([Fault("meter", what, "See `gaugelog instrument list`.")], _OUTCOME)
    if date.fromisoformat(row.due) < day:
        what = f"{row.label} was due for calibration on {row.due}."
        raise Faulty([Fault("meter", what, "Take another.")], _OUTCOME)
    return InstrumentAdded.model_validate_json(row.data)


def _table(known: Wired) -> tuple[PinPair, ...]:
    pairs = combinations(pins_of(known.circuit), 2)
    return tuple(PinPair(pair, float(pin_resistance(known.circuit, *pair))) for pair in pairs)


@dataclass(frozen=True, slots=True)
class _Understood:
    typed: PinTyped
    reading: PinReading


def _understood(
    typed: Sequence[str], terminals: dict[str, str], instrument: InstrumentAdded
) -> list[_Understood]:
    if len(typed) > MOST_READINGS:
        what = f"{len(typed)} resistances are given; {MOST_READINGS} are understood at most."
        raise Faulty([Fault("readings", what)], _OUTCOME)
    found: list[_Understood] = []
    faults: list[Fault] = []
    for text in typed:
        try:
            found.append(_one(text, terminals, instrument))
        except Faulty as error:
            faults += error.faults
    if faults:
        raise Faulty(faults, _OUTCOME)
    return found


def _one(text: str, terminals: dict[str, str], instrument: InstrumentAdded) -> _Understood:
    typed = parse_pin_reading(text)
    ends = [terminal_called(end, terminals) for end in typed.ends]
    strangers = [end for end, known in zip(typed.ends, ends, strict=True) if known is None]
    if strangers:
        names = [f"{name} ({pin})" if pin else name for name, pin in terminals.items()]
        raise Faulty(
            [
                Fault(end, "is no terminal of this circuit.", f"It has {', '.join(names)}.")
                for end in strangers
            ]
        )
    one, other = (str(end) for end in ends)
    span = _range(instrument, typed)
    quantity = typed.reading.quantity
    if quantity is None or typed.reading.qualifier == ">":
        least = quantity.si() if quantity is not None else span.range.high.si()
        return _Understood(typed, PinReading((one, other), least, least * 0.01, overload=True))
    value = quantity.si()
    doubt = max(span.uncertainty(value), span.range.resolution.si(), 1e-9)
    return _Understood(typed, PinReading((one, other), value, doubt))


def _range(instrument: InstrumentAdded, typed: PinTyped) -> RangeTaken:
    """The range of the meter that shows this resistance, be it an insulation tester's."""
    reading = typed.reading
    try:
        return range_for(instrument, "resistance", reading.quantity, reading.qualifier)
    except Faulty as error:
        if all(span.quantity != "insulation" for span in instrument.ranges):
            if reading.qualifier == ">":
                return range_for(instrument, "resistance", None, "overload")
            raise error from None
        return range_for(instrument, "insulation", reading.quantity, reading.qualifier)


def _answered(about: PinsFound, known: Wired, readings: Sequence[_Understood]) -> PinsFound:
    all_read = set(known.uncertainties) <= set(known.read)
    spread = _READ_SPREAD if all_read else _PLANNED_SPREAD
    found = diagnose(known.circuit, [each.reading for each in readings], part_spread=spread)
    return replace(
        about,
        pairs=tuple(_compared(known.circuit, each) for each in readings),
        answers=tuple(_answers(found)),
        next=found.next_measurement.sentence if found.next_measurement else "",
        explained=found.explained,
    )


def _compared(circuit: Circuit, each: _Understood) -> PinPair:
    between = each.reading.between
    apart = {ARTICLE, SHIELD} & set(between)
    sound = math.inf if apart else float(resistance_between(pin_network(circuit), *between))
    return PinPair(between, sound, each.typed.reading.typed)


def _answers(found: Diagnosis) -> list[PinAnswer]:
    """The answers down to the first that is far behind the best."""
    best = found.answers[0].misfit
    told: list[PinAnswer] = []
    for answer in found.answers:
        kinds = dict.fromkeys(defect.kind for defect in answer.defects)
        behind = answer.misfit - best > RIVAL
        means = "; or ".join(MEANINGS[kind] for kind in kinds)
        told.append(PinAnswer(answer.sentence, means, answer.misfit, behind))
        if behind:
            break
    return told
