"""What a person enters at a step, understood: gauges, lots, meters and values by their labels."""

from __future__ import annotations

from collections.abc import Callable, Mapping
from dataclasses import dataclass, field
from datetime import date, datetime
from pathlib import Path

from gaugelog.errors import Fault, Faulty
from gaugelog.intake.pictures import Picture, load_pictures
from gaugelog.intake.typed import TypedReading, parse_quantity, parse_reading
from gaugelog.journal.clock import Moment
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.instruments import InstrumentAdded
from gaugelog.ledger.points import PointPlanned, PointRow
from gaugelog.ledger.routes import EXPECTED_SIGN, RouteStep, StepInput
from gaugelog.ledger.steps import Entered
from gaugelog.ledger.stock import ConsumableReceived, ConsumableRow, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.rules.article import article_of, forbids_cleaner
from gaugelog.rules.barred import why_barred, why_gauge_barred
from gaugelog.rules.proof import SIGNS
from gaugelog.rules.shift import shift_demand, why_unchecked

LONGEST_TEXT = 2000
_YES, _NO = frozenset({"yes", "y", "ok", "done"}), frozenset({"no", "n"})


@dataclass
class Understood:
    """The inputs of one step as understood; `readings` and `photos` by the name of their input."""

    entered: dict[str, Entered] = field(default_factory=dict)
    readings: dict[str, TypedReading] = field(default_factory=dict)
    instrument: InstrumentAdded | None = None
    consumables: list[ConsumableReceived] = field(default_factory=list)
    photos: dict[str, Picture] = field(default_factory=dict)

    @property
    def quantities(self) -> dict[str, Quantity]:
        """The quantities among the inputs, by the name of their input."""
        return {
            name: entry.quantity
            for name, entry in self.entered.items()
            if entry.quantity is not None
        }


@dataclass(frozen=True, slots=True)
class Asked:
    """What inputs are understood against: the view, the point, the step, the day of it."""

    view: View
    point: PointRow
    step: RouteStep
    day: date
    """The calendar day where the work is done: lots expire and meters fall due at its end."""
    observed: datetime
    """When the step was observed, UTC."""
    now: Moment
    """When it is entered, by the clock of this machine."""


def understand(asked: Asked, typed: Mapping[str, str]) -> Understood:
    """Understand what was typed. Raises Faulty naming every fault of every input at once."""
    found = Understood()
    faults = _strangers(asked.step, typed)
    for item in asked.step.inputs:
        text = typed.get(item.name, "").strip()
        where = f"point {asked.point.label}, step {asked.step.id}, {item.name}"
        if not text:
            if item.required:
                faults.append(Fault(where, "is missing.", f"Enter: {item.prompt}."))
            continue
        try:
            _READ[item.kind](asked, item, text, where, found)
        except Faulty as error:
            faults += [Fault(where, fault.what, fault.remedy) for fault in error.faults]
    if found.readings and found.instrument is None and not faults:
        where = f"point {asked.point.label}, step {asked.step.id}"
        faults.append(Fault(where, "has a reading but no instrument.", "Name the meter."))
    if faults:
        raise Faulty(faults)
    return found


def _strangers(step: RouteStep, typed: Mapping[str, str]) -> list[Fault]:
    known = [item.name for item in step.inputs]
    listed = ", ".join(known) or "none"
    return [
        Fault(f"step {step.id}, {name}", "is not asked for here.", f"Asked for: {listed}.")
        for name in typed
        if name not in known
    ]


def _fault(what: str, remedy: str = "") -> Faulty:
    return Faulty([Fault("", what, remedy)])


def _gauge(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    gauge = asked.view.gauge(text)
    if gauge is None:
        raise _fault(f"no gauge is called “{text}”.", "Give pack and number, like K7-03/4.")
    if gauge.lot != asked.point.lot:
        lot = asked.view.get(LotRow, asked.point.lot)
        planned = lot.label if lot is not None else "another lot"
        raise _fault(f"{gauge.label} is not of lot {planned}, which is planned here.")
    if gauge.state != "on shelf" and gauge.id != asked.point.gauge:
        raise _fault(f"{gauge.label} is {gauge.state}.", "Take one from the shelf.")
    _demand_free(why_gauge_barred(asked.view, gauge))
    _demand_in_date(asked, gauge.lot)
    found.entered[item.name] = Entered(typed=text, id=gauge.id)


def _demand_free(barred: str) -> None:
    if barred:
        raise _fault(f"{barred.rstrip('.')}.", "Take another, or have it freed.")


def _demand_in_date(asked: Asked, lot: str) -> None:
    """A gauge may be bonded on the last day its lot names, and no later."""
    row = asked.view.get(LotRow, lot)
    expires = LotReceived.model_validate_json(row.data).expires if row is not None else None
    if row is not None and expires and date.fromisoformat(expires) < asked.day:
        raise _fault(f"{row.label} expired on {expires}.", "Take a lot that is in date.")


def _demand_allowed(asked: Asked, lot: ConsumableRow) -> None:
    article = article_of(asked.view, PointPlanned.model_validate_json(asked.point.data))
    word = forbids_cleaner(article, lot.name)
    if word:
        by = f", by {article.surface.agreed_by}" if article.surface.agreed_by else ""
        raise _fault(
            f"{lot.label} is {lot.name}; {article.label} must not be cleaned with {word}{by}.",
            "Take another cleaner.",
        )


def _consumable(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    lot = asked.view.consumable(text)
    if lot is None:
        raise _fault(f"no consumable lot is called “{text}”.", "See `gaugelog stock list`.")
    if item.type and lot.type != item.type:
        raise _fault(f"{lot.label} is a lot of {lot.type}, not of {item.type}.")
    if lot.expires and date.fromisoformat(lot.expires) < asked.day:
        raise _fault(f"{lot.label} expired on {lot.expires}.", "Take a lot that is in date.")
    if lot.type == "cleaner":
        _demand_allowed(asked, lot)
    _demand_free(why_barred(asked.view, lot.id))
    if lot.type == "adhesive":
        _demand_in_date(asked, asked.point.lot)
    found.entered[item.name] = Entered(typed=text, id=lot.id)
    found.consumables.append(ConsumableReceived.model_validate_json(lot.data))


def _instrument(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    row = asked.view.instrument(text)
    if row is None:
        raise _fault(f"no instrument is called “{text}”.", "See `gaugelog instrument list`.")
    if date.fromisoformat(row.due) < asked.day:
        raise _fault(f"{row.label} was due for calibration on {row.due}.", "Take another.")
    body = InstrumentAdded.model_validate_json(row.data)
    if date.fromisoformat(body.calibrated_on) > asked.day:
        raise _fault(f"{row.label} was calibrated only on {body.calibrated_on}.")
    if item.type and all(span.quantity != item.type for span in body.ranges):
        raise _fault(f"{row.label} does not measure {item.type}.", "Take one that does.")
    _demand_checked(asked, item, body)
    found.entered[item.name] = Entered(typed=text, id=row.id)
    found.instrument = body


def _demand_checked(asked: Asked, item: StepInput, meter: InstrumentAdded) -> None:
    """What the criteria ask of a meter at the start of a shift, for what is read on it here."""
    kinds = [CHECKS[each.check] for each in asked.step.inputs if each.check]
    readings = [kind.quantity for kind in kinds if not kind.attribute]
    measured = dict.fromkeys(readings or [item.type])
    demand = shift_demand(asked.view, asked.point.campaign)
    remedy = f"Take another, or: gaugelog instrument check {meter.label} reference=… reads=…"
    faults = [
        Fault("", what, remedy)
        for what in why_unchecked(asked.view, meter, measured, asked.observed, demand, asked.now)
    ]
    if faults:
        raise Faulty(faults)


def _reading(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    found.readings[item.name] = parse_reading(text, item.check)


def _quantity(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    found.entered[item.name] = Entered(typed=text, quantity=parse_quantity(text, (item.unit,)))


def _text(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    if len(text) > LONGEST_TEXT:
        raise _fault(f"has {len(text)} characters; {LONGEST_TEXT} are kept at most.")
    if item.type == EXPECTED_SIGN and text.casefold() not in SIGNS:
        raise _fault(f"“{text[:40]}” is no sign.", "Type + or −, or tension or compression.")
    found.entered[item.name] = Entered(typed=text)


def _yes(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    word = text.casefold()
    if word in _NO:
        raise _fault("is no, so the step is not done.", "Put it right, or note it and stop here.")
    if word not in _YES:
        raise _fault(f"“{text}” is neither yes nor no.", "Type yes when it is so.")
    found.entered[item.name] = Entered(typed="yes")


def _photo(asked: Asked, item: StepInput, text: str, where: str, found: Understood) -> None:
    found.photos[item.name] = load_pictures([Path(text).expanduser()])[0]


_READ: dict[str, Callable[[Asked, StepInput, str, str, Understood], None]] = {
    "gauge": _gauge,
    "consumable": _consumable,
    "instrument": _instrument,
    "reading": _reading,
    "quantity": _quantity,
    "text": _text,
    "yes": _yes,
    "photo": _photo,
}
