"""What was done and found at a point, gathered from the ledger for its record."""

from __future__ import annotations

import json
from collections.abc import Iterable, Iterator, Sequence
from dataclasses import dataclass
from typing import TYPE_CHECKING

from gaugelog.documents.content.fromplan import Planned, certificates_shown, needed
from gaugelog.documents.content.model import ConsumableShown, InstrumentShown, MeterCheckShown
from gaugelog.documents.content.workdone import InputShown, ReadingShown, StepShown
from gaugelog.ledger.instruments import InstrumentAdded, InstrumentRow
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.routes import RouteStep
from gaugelog.ledger.shiftchecks import MeterChecked, MeterCheckRow
from gaugelog.ledger.steps import Entered, StepRow
from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow, GaugeRow
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.taken import readings_at

if TYPE_CHECKING:
    from gaugelog.ledger.view import View


def steps_shown(view: View, plan: Planned) -> tuple[StepShown, ...]:
    """Every step of the route on each of its subjects, done or open, in the route's order."""
    rows = {(row.step, row.subject): row for row in view.all(StepRow, point=plan.point.id)}
    return tuple(
        _step(view, number, step, label, rows.get((step.id, subject)))
        for number, step in enumerate(plan.route.steps, start=1)
        for subject, label in plan.subjects(step.subject)
    )


def _step(view: View, number: int, step: RouteStep, label: str, row: StepRow | None) -> StepShown:
    card = {
        "number": number,
        "step": step.id,
        "title": step.title,
        "subject": label,
        "hold": step.hold,
        "instruction": step.instruction,
        "windows": step.windows,
    }
    if row is None:
        return StepShown.model_validate({**card, "outcome": "open"})
    return StepShown.model_validate(
        {
            **card,
            "outcome": row.outcome,
            "by": row.by,
            "observed_at": row.observed_at,
            "entered_at": row.entered_at,
            "note": row.note,
            "flags": json.loads(row.flags),
            "inputs": tuple(_inputs(view, step, row)),
        }
    )


def _inputs(view: View, step: RouteStep, row: StepRow) -> Iterator[InputShown]:
    given = entered(row)
    for asked in step.inputs:
        if asked.name in given and asked.kind != "reading":
            answer = given[asked.name]
            if asked.kind == "photo":
                yield InputShown(prompt=asked.prompt, typed=answer.typed, photo=answer.id)
                continue
            means = _label(view, asked.kind, answer.id) if answer.id else ""
            yield InputShown(prompt=asked.prompt, typed=answer.typed, means=means)


def entered(row: StepRow) -> dict[str, Entered]:
    """What was entered in a step, by the name of the input."""
    return {
        name: Entered.model_validate(each) for name, each in json.loads(row.data or "{}").items()
    }


def _label(view: View, kind: str, known: str) -> str:
    if kind == "consumable":
        lot = view.get(ConsumableRow, known)
        return f"{lot.label}, {lot.name}" if lot is not None else ""
    if kind == "instrument":
        instrument = view.get(InstrumentRow, known)
        return instrument.label if instrument is not None else ""
    gauge = view.get(GaugeRow, known) if kind == "gauge" else None
    return gauge.label if gauge is not None else ""


def readings_shown(view: View, plan: Planned) -> tuple[ReadingShown, ...]:
    """Every attempt of every check, in the order they were entered."""
    rows = readings_at(view, plan.point.id)
    labels = dict(plan.subjects("grid") + plan.subjects("circuit") + plan.subjects("place"))
    meters = _meters(view, rows)
    return tuple(_reading(view, plan, row, labels, meters) for row in rows)


def _meters(view: View, rows: Sequence[ReadingRow]) -> dict[str, str]:
    """The instrument of each reading; with its certificate where it had several at this point."""
    under = {row.id: certificate_at(view, row.instrument, row.seq) for row in rows}
    had: dict[str, set[str]] = {}
    for meter in under.values():
        had.setdefault(meter.id, set()).add(meter.certificate_number)
    return {
        reading: f"{meter.label} ({meter.certificate_number})"
        if len(had[meter.id]) > 1
        else meter.label
        for reading, meter in under.items()
    }


def _reading(
    view: View, plan: Planned, row: ReadingRow, labels: dict[str, str], meters: dict[str, str]
) -> ReadingShown:
    taken = ReadingTaken.model_validate_json(row.data)
    fields = {
        name: getattr(taken, name)
        for name in ReadingShown.model_fields
        if name in ReadingTaken.model_fields
    }
    return ReadingShown.model_validate(
        {
            **fields,
            "subject": labels.get(row.subject, row.subject),
            "latest": bool(row.latest),
            "earlier_gauge": _earlier_gauge(view, plan, taken),
            "instrument": meters[row.id],
            "entered_at": row.entered_at,
            "entered_by": row.entered_by,
        }
    )


def _earlier_gauge(view: View, plan: Planned, taken: ReadingTaken) -> str:
    """The gauge of a reading that has left; a reading of a shared circuit may name another's."""
    if taken.gauge is None or taken.gauge == plan.row.gauge:
        return ""
    gauge = view.get(GaugeRow, taken.gauge)
    if gauge is None:
        return taken.gauge
    elsewhere = taken.point != plan.point.id and gauge.state == "in service"
    return "" if elsewhere else gauge.label


def instruments_shown(view: View, plan: Planned) -> tuple[InstrumentShown, ...]:
    """The instruments that were used, each with the ranges that were used.

    One that was calibrated anew meanwhile stands there once for each certificate it was used under.
    """
    used: dict[tuple[str, str], InstrumentAdded] = {}
    ranges: dict[tuple[str, str], set[str]] = {}
    checks: dict[tuple[str, str], dict[str, None]] = {}
    for use in _uses(view, plan):
        meter = certificate_at(view, use.instrument, use.seq)
        key = meter.id, meter.certificate_number
        used[key] = meter
        ranges.setdefault(key, set()).update(use.ranges)
        checks.setdefault(key, {}).update(dict.fromkeys(use.checks))
    shown = (_instrument(view, meter, ranges[key], checks[key]) for key, meter in used.items())
    return tuple(sorted(shown, key=lambda each: (each.label, each.calibrated_on)))


@dataclass(frozen=True, slots=True)
class _Use:
    """A use of an instrument: the entry that tells of it; range and check, if it was read."""

    instrument: str
    seq: int
    ranges: tuple[str, ...] = ()
    checks: tuple[str, ...] = ()


def _uses(view: View, plan: Planned) -> Iterator[_Use]:
    for row in readings_at(view, plan.point.id):
        taken = ReadingTaken.model_validate_json(row.data)
        check = (taken.shift_check,) if taken.shift_check is not None else ()
        yield _Use(row.instrument, row.seq, (taken.range,), check)
    for step, instrument in _entered_ids(view, plan, "instrument"):
        yield _Use(instrument, step.seq)


def _check(view: View, check: str) -> MeterCheckShown:
    row = needed(view.get(MeterCheckRow, check))
    body = MeterChecked.model_validate_json(row.data)
    return MeterCheckShown.model_validate(
        {name: getattr(body, name) for name in MeterCheckShown.model_fields}
    )


def _instrument(
    view: View, body: InstrumentAdded, ranges: set[str], checks: Iterable[str]
) -> InstrumentShown:
    own = {"certificates", "checks"}
    fields = {n: getattr(body, n) for n in InstrumentShown.model_fields if n not in own}
    fields["checks"] = tuple(_check(view, each) for each in checks)
    fields["certificates"] = certificates_shown(view, body.id, body.certificate_number)
    fields["ranges"] = tuple(each for each in body.ranges if each.name in ranges)
    return InstrumentShown.model_validate(fields)


def consumables_shown(view: View, plan: Planned) -> tuple[ConsumableShown, ...]:
    """The lots that were used, the cable's among them where the plan names one."""
    lots = dict.fromkeys(lot for _row, lot in _entered_ids(view, plan, "consumable"))
    for circuit in plan.circuits:
        if circuit.leads.cable:
            named = view.all(ConsumableRow, label=circuit.leads.cable)
            lots.update(dict.fromkeys(row.id for row in named))
    return tuple(_consumable(view, lot) for lot in lots)


def _consumable(view: View, lot: str) -> ConsumableShown:
    body = ConsumableReceived.model_validate_json(needed(view.get(ConsumableRow, lot)).data)
    own = {"certificates"}
    fields = {n: getattr(body, n) for n in ConsumableShown.model_fields if n not in own}
    return ConsumableShown.model_validate({**fields, "certificates": certificates_shown(view, lot)})


def _entered_ids(view: View, plan: Planned, kind: str) -> Iterator[tuple[StepRow, str]]:
    """Ids entered for inputs of this kind, in the route's order, with the step of each."""
    asked = {step.id: {i.name for i in step.inputs if i.kind == kind} for step in plan.route.steps}
    order = {step.id: number for number, step in enumerate(plan.route.steps)}
    rows = sorted(
        view.all(StepRow, point=plan.point.id), key=lambda row: order.get(row.step, len(order))
    )
    for row in rows:
        for name, answer in entered(row).items():
            if name in asked.get(row.step, ()) and answer.id:
                yield row, answer.id
