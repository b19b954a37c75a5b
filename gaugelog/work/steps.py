"""Deeds at the article: what comes next, do a step, decide a hold, skip, go back."""

from __future__ import annotations

from collections.abc import Callable, Iterable, Mapping
from dataclasses import replace
from functools import partial

from gaugelog.errors import Fault, Faulty, Refused
from gaugelog.journal.keys import Signer
from gaugelog.ledger.points import PointPlanned, PointRow
from gaugelog.ledger.readings import ReadingTaken
from gaugelog.ledger.routes import RouteStep, StepInput
from gaugelog.ledger.steps import Entered, HoldDecided, StepDone, StepReopened, StepSkipped
from gaugelog.rules.air import air_troubles
from gaugelog.rules.expected import short_of_expected
from gaugelog.rules.facts import plan_facts
from gaugelog.rules.flagged import flags_at
from gaugelog.rules.mixed import mixed_troubles, unmixed_flags
from gaugelog.rules.order import order_flag
from gaugelog.rules.piece import demand_one_piece
from gaugelog.rules.placed import axis_effect, placed_troubles, poisson_at
from gaugelog.rules.progress import NextStep, demand_step, demand_walked, remedy_for, state_of
from gaugelog.rules.progress import next_step as progress
from gaugelog.rules.qualified import demand_qualified, lapsed_flags
from gaugelog.rules.who import demand_role, roles_of
from gaugelog.work.doing import (
    Doing,
    StepOutcome,
    about,
    day_of,
    observed_at,
    point_row,
    shown,
    utc_text,
)
from gaugelog.work.holds import decide
from gaugelog.work.inputs import Asked, Understood, understand
from gaugelog.work.judging import Observation
from gaugelog.work.kept import demand_reason
from gaugelog.work.logbook import Deed, Logbook
from gaugelog.work.photos import Shows, keep_photo
from gaugelog.work.readings import reading_taken

__all__ = ["StepOutcome", "do", "next_step", "redo", "skip", "worklist"]


def next_step(logbook: Logbook, point: str) -> NextStep:
    """What a point needs now, with what the plan says of it.

    Raises Refused when there is no such point.
    """
    with logbook.reading() as view:
        row = point_row(view, point)
        found = progress(view, row, logbook.clock.now())
        if found.step is None:
            return found
        facts = plan_facts(view, row, found.step, found.subject, found.number)
        return replace(found, facts=tuple(facts), flags=flags_at(view, row))


def rehearse(
    logbook: Logbook, *, point: str, typed: Mapping[str, str], at: str = "", reason: str = ""
) -> None:
    """Look whether a step could be done with these inputs, before anyone signs. Keeps nothing.

    Raises Faulty and Refused as `do` would for what is typed and for the time.
    """
    moment = logbook.clock.now()
    with logbook.reading() as view:
        row = point_row(view, point)
        observed = observed_at(at, moment)
        order_flag(view, row, observed, moment, reason)
        step = _open(progress(view, row, moment, observed))
        if not step.hold:
            understand(Asked(view, row, step, day_of(observed, moment), observed, moment), typed)


def worklist(logbook: Logbook) -> list[NextStep]:
    """What every point needs now."""
    now = logbook.clock.now()
    with logbook.reading() as view:
        return [progress(view, row, now) for row in view.all(PointRow)]


def do(  # noqa: PLR0913 (what the person says is each its own word)
    logbook: Logbook,
    signer: Signer,
    *,
    point: str,
    typed: Mapping[str, str],
    note: str = "",
    reason: str = "",
    refuse: str = "",
    at: str = "",
    deed: str | None = None,
    seen: NextStep | None = None,
) -> StepOutcome:
    """Do the next step of a point; a hold is decided, by a second person.

    A reading that blocks is kept by itself and the step stays open. `at` is when the step was
    observed, if not now. `reason` says why a check is measured again, or why `at` lies before an
    earlier step; `refuse` why a hold is refused. `deed` is the caller's own id, so that a retry
    is recognised; `seen` is the step the person looked at, so that nothing is kept when the
    point went on meanwhile. Raises Faulty with every fault of the input, Refused when a rule
    forbids the step now.
    """
    with logbook.deed(signer, deed) as making:
        row = point_row(making.view, point)
        if making.repeated:
            return _told_again(making, row)
        observed = observed_at(at, making.moment)
        order = order_flag(making.view, row, observed, making.moment, reason)
        found = progress(making.view, row, making.moment, observed)
        _demand_as_seen(found, seen)
        doing = Doing(making, row, found, _open(found), observed, order)
        if doing.step.hold:
            return decide(doing, typed, note, refuse)
        if refuse:
            raise Refused(
                f"“{found.title}” is no hold; there is nothing to refuse.",
                f"Do it, or go back: gaugelog step redo {found.point}",
            )
        return _do(doing, typed, note, reason)


def skip(
    logbook: Logbook, signer: Signer, *, point: str, reason: str, seen: NextStep | None = None
) -> StepOutcome:
    """Skip the next step of a point, with a reason, where its skip rule lets the person.

    Raises Faulty without a reason, Refused when it does not, or the point went on since the person
    had `seen` it.
    """
    demand_reason(reason)
    with logbook.deed(signer) as making:
        row = point_row(making.view, point)
        found = progress(making.view, row, making.moment)
        _demand_as_seen(found, seen)
        if found.step is None:
            raise Refused(
                f"{row.label} has no step left.", f"See `gaugelog step next {row.label}`."
            )
        if found.forbidden:
            raise Refused(
                f"“{found.title}” can't be skipped now: {' '.join(found.forbidden)}",
                f"See `gaugelog step next {row.label}`.",
            )
        _demand_may_skip(making, found)
        body = StepSkipped(
            point=row.id,
            subject=found.subject,
            step=found.step.id,
            reason=reason,
            skipped_by=signer.person,
        )
        making.keep(body, about(making.view, row, found.subject))
        return StepOutcome(True, (), (f"“{found.title}” is skipped: {reason}",))


def redo(logbook: Logbook, signer: Signer, *, point: str, step: str, reason: str) -> StepOutcome:
    """Go back to a step: it and those after it are to be done again.

    Raises Faulty without a reason, Refused when the point is under review or accepted, or the
    step is ahead of the work.
    """
    demand_reason(reason)
    with logbook.deed(signer) as making:
        row = point_row(making.view, point)
        demand_role(making.view, signer.person, "technician")
        state = state_of(making.view, row)
        if state in {"planned", "awaiting review", "accepted", "withdrawn"}:
            raise Refused(
                f"{row.label} is {state}; no step can be done again now.",
                remedy_for(row.label, state),
            )
        wanted = demand_step(making.view, row, step)
        demand_walked(making.view, row, wanted)
        body = StepReopened(point=row.id, step=step, reason=reason, reopened_by=signer.person)
        making.keep(body, about(making.view, row, row.id))
        return StepOutcome(True, (), (f"Work goes on from “{wanted.title}”.",))


def _told_again(making: Deed, row: PointRow) -> StepOutcome:
    """The outcome of a deed that was kept before: nothing is entered twice.

    Raises Refused when that deed was another person's, or did something else.
    """
    bodies = [entry.body for entry in making.repeated]
    others = {entry.header.actor for entry in making.repeated} - {making.signer.person}
    if others or any(row.id not in body.about for body in bodies):
        raise Refused(f"Deed {making.id} was another one.", "Give each deed an id of its own.")
    kinds = [entry.header.kind for entry in making.repeated]
    readings = [
        ReadingTaken.model_validate(body.fact)
        for kind, body in zip(kinds, bodies, strict=True)
        if kind == ReadingTaken.kind
    ]
    settled = not {StepDone.kind, HoldDecided.kind}.isdisjoint(kinds)
    return StepOutcome(
        settled, shown(readings), ("This was kept before; nothing is entered twice.",)
    )


def _do(doing: Doing, typed: Mapping[str, str], note: str, reason: str) -> StepOutcome:
    view, row = doing.making.view, doing.row
    demand_role(view, doing.making.signer.person, "technician")
    demand_qualified(view, doing.making.signer.person, doing.step, doing.day)
    got = understand(
        Asked(view, row, doing.step, doing.day, doing.observed, doing.making.moment), typed
    )
    _demand_air(doing, got)
    _demand_pot_life(doing, got)
    _demand_place(doing, got)
    demand_one_piece(view, row, doing.step, doing.found.subject, got.entered)
    readings = _readings(doing, got, reason)
    for reading in readings:
        others = [each for each in (reading.id, reading.gauge, reading.instrument) if each]
        doing.making.keep(reading, about(view, row, reading.subject, *others))
    photos = _keep_photos(doing, got, readings, note)
    if any(reading.verdict.blocks for reading in readings):
        return StepOutcome(False, shown(readings), _blocked_lines(row, doing.step))
    got.entered.update(photos)
    _keep_done(doing, got, readings, note)
    done = f"{row.label}: “{doing.step.title}” is done."
    return StepOutcome(True, shown(readings), (done, *_short(doing, readings)))


def _demand_air(doing: Doing, got: Understood) -> None:
    troubles = air_troubles(doing.step, got.quantities, got.consumables)
    if troubles:
        raise Refused(
            f"{doing.row.label}: “{doing.step.title}” can't be done in this air: "
            f"{' '.join(troubles)}",
            "Warm the surface, dry the air or wait; then measure again.",
        )


def _demand_pot_life(doing: Doing, got: Understood) -> None:
    troubles = mixed_troubles(doing.step, got.quantities, got.consumables)
    if troubles:
        title = doing.step.title
        raise Refused(
            f"{doing.row.label}: “{title}” can't be done: {' '.join(troubles)}", "Mix afresh."
        )


def _demand_place(doing: Doing, got: Understood) -> None:
    planned = PointPlanned.model_validate_json(doing.row.data)
    troubles = placed_troubles(doing.step, got.quantities, planned)
    if troubles:
        raise Refused(
            f"{doing.row.label}: the layout is out of tolerance. {' '.join(troubles)}",
            "Lay it out again, or have the planner change the place or its tolerance.",
        )


def _axis_flag(doing: Doing, got: Understood) -> list[str]:
    planned = PointPlanned.model_validate_json(doing.row.data)
    poisson = poisson_at(doing.making.view, planned)
    effect = axis_effect(doing.step, got.quantities, planned, poisson)
    return [effect] if effect else []


def _blocked_lines(row: PointRow, step: RouteStep) -> tuple[str, ...]:
    return (
        f"The reading is kept; “{step.title}” stays open.",
        f"Find the cause, then measure again: gaugelog step do {row.label} … --reason WHY",
    )


def _readings(doing: Doing, got: Understood, reason: str) -> list[ReadingTaken]:
    if got.instrument is None:
        return []
    kinds = {item.name: item for item in doing.step.inputs}
    seen = Observation(
        doing.making.view,
        doing.row,
        doing.step,
        doing.found.subject,
        utc_text(doing.observed),
        doing.making.signer.person,
        reason,
        doing.making.moment,
        {kinds[name].type: each for name, each in got.quantities.items() if kinds[name].type},
        {kinds[name].type: each.typed for name, each in got.entered.items() if kinds[name].type},
    )
    return _each(
        partial(reading_taken, seen, kinds[name].check, typed, got.instrument, _gauge(doing, got))
        for name, typed in got.readings.items()
    )


def _gauge(doing: Doing, got: Understood) -> str:
    """The piece that the step is done on: the one that it takes, else the one in place."""
    kinds = {item.name: item.kind for item in doing.step.inputs}
    taken = (entry.id for name, entry in got.entered.items() if kinds[name] == "gauge")
    return next((each for each in taken if each), doing.row.gauge)


def _keep_photos(
    doing: Doing, got: Understood, readings: list[ReadingTaken], note: str
) -> dict[str, Entered]:
    """Keep the photos of the step, also of one that a reading keeps open; what was entered."""
    subject, when = doing.found.subject, utc_text(doing.observed)
    gauge = _gauge(doing, got)
    shows = Shows(doing.row, doing.step.id, subject, gauge, when, readings, note)
    kept = {name: keep_photo(doing.making, shows, each) for name, each in got.photos.items()}
    return {name: Entered(typed=fact.name, id=fact.id) for name, fact in kept.items()}


def _each(takings: Iterable[Callable[[], ReadingTaken]]) -> list[ReadingTaken]:
    """Every reading; what is wrong with several of them is named at once."""
    found: list[ReadingTaken] = []
    faults: list[Fault] = []
    for take in takings:
        try:
            found.append(take())
        except Faulty as error:
            faults += error.faults
    if faults:
        raise Faulty(faults)
    return found


def _short(doing: Doing, readings: list[ReadingTaken]) -> list[str]:
    """What is within its limit and yet short of what the criteria expect."""
    view, campaign = doing.making.view, doing.row.campaign
    return [each for reading in readings for each in short_of_expected(view, campaign, reading)]


def _keep_done(doing: Doing, got: Understood, readings: list[ReadingTaken], note: str) -> None:
    entered = {**got.entered, **_entered_readings(got, doing.step.inputs, readings)}
    flags = [window.sentence for window in doing.found.windows if not window.judged]
    flags += [doing.order] if doing.order else []
    flags += _axis_flag(doing, got)
    flags += unmixed_flags(doing.step, got.quantities, got.consumables)
    flags += lapsed_flags(doing.making.view, doing.making.signer.person, doing.day)
    flags += [
        f"{reading.check} {reading.stage}: {reading.verdict.word}"
        for reading in readings
        if reading.verdict.word != "pass"
    ]
    flags += [flag for reading in readings for flag in reading.verdict.flags]
    flags += _short(doing, readings)
    body = StepDone(
        point=doing.row.id,
        subject=doing.found.subject,
        step=doing.step.id,
        inputs=entered,
        observed_at=utc_text(doing.observed),
        done_by=doing.making.signer.person,
        note=note,
        flags=tuple(flags),
    )
    used = [entry.id for entry in entered.values() if entry.id]
    concerned = about(doing.making.view, doing.row, doing.found.subject, *used)
    doing.making.keep(body, concerned)


def _entered_readings(
    got: Understood, inputs: tuple[StepInput, ...], readings: list[ReadingTaken]
) -> dict[str, Entered]:
    names = [item.name for item in inputs if item.name in got.readings]
    return {
        name: Entered(typed=reading.typed, id=reading.id)
        for name, reading in zip(names, readings, strict=True)
    }


def _open(found: NextStep) -> RouteStep:
    """The step that is open and may be done now. Raises Refused when there is none."""
    if found.blocks:
        raise Refused(
            f"{found.point}: “{found.title}” can't be done now: {' '.join(found.blocks)}",
            f"See `gaugelog step next {found.point}`; go back with `gaugelog step redo`.",
        )
    if found.step is None:
        raise Refused(f"{found.point} has no step left.", f"Next: gaugelog submit {found.point}")
    return found.step


def _demand_as_seen(found: NextStep, seen: NextStep | None) -> None:
    """Raise Refused when another step is open than the one the person looked at."""
    if seen is not None and (seen.step, seen.subject) != (found.step, found.subject):
        raise Refused(
            f"{found.point} went on meanwhile: it is at “{found.title}” now; nothing was kept.",
            "Look at it again.",
        )


def _demand_may_skip(making: Deed, found: NextStep) -> None:
    rule = found.step.skip if found.step is not None else "never"
    if rule == "never" or (found.step is not None and found.step.hold):
        raise Refused(f"“{found.title}” can't be skipped.", "Do it, or ask the planner.")
    if rule == "planner" and "planner" not in roles_of(making.view, making.signer.person):
        raise Refused(f"“{found.title}” can only be skipped by a planner.", "Ask one.")
    demand_role(making.view, making.signer.person, "technician", "planner")
