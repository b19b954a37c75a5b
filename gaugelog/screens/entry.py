"""The fields of the step in hand, together: asked, half typed, carried, expired, at fault."""

from __future__ import annotations

from collections.abc import Iterable, Sequence
from datetime import datetime

from textual.containers import Vertical
from textual.widgets import Input

from gaugelog.errors import Fault
from gaugelog.ledger.routes import StepInput
from gaugelog.screens.drafts import Draft
from gaugelog.screens.fields import OWN, FieldRow
from gaugelog.screens.room import show


class Entry(Vertical):
    """Rows of fields, used again from step to step: one that is not wanted now is not shown."""

    def __init__(self, *, id: str | None = None) -> None:
        super().__init__(id=id)
        self._rows: list[FieldRow] = []

    @property
    def live(self) -> list[FieldRow]:
        """The fields that are asked for now."""
        return [row for row in self._rows if row.display]

    async def ask(
        self, items: Sequence[StepInput], half: dict[str, str], draft: Draft, now: datetime
    ) -> None:
        """Ask for these; `half` is what was half typed here, `draft` what may be offered again."""
        if len(items) > len(self._rows):
            more = [FieldRow() for _ in range(len(items) - len(self._rows))]
            await self.mount(*more)
            self._rows += more
        for row, item in zip(self._rows, items, strict=False):
            row.ask(item, half.get(item.name, ""), draft.offered(item, now))
        for row in self._rows[len(items) :]:
            show(row, False)

    def hold_back(self, held: bool) -> None:
        """Let nothing be typed, or let it."""
        for row in self._rows:
            row.disabled = held

    def row_of(self, field: Input) -> FieldRow | None:
        """The row that a field belongs to."""
        return next((row for row in self.live if row.input is field), None)

    def after(self, row: FieldRow) -> FieldRow | None:
        """Where Enter leads from a row: the next empty one, else a required one; None: do it."""
        live = self.live
        rest = live[live.index(row) + 1 :]
        following = next((each for each in rest if each.empty), None)
        return following or next((each for each in live if each.empty and each.item.required), None)

    def focus_first(self) -> bool:
        """Go to the first empty field, or the last; returns whether there is any."""
        free = [row for row in self.live if not row.disabled]
        first = next((row for row in free if row.empty), free[-1] if free else None)
        if first is not None:
            first.input.focus()
        return first is not None

    def typed(self) -> dict[str, str]:
        """What the route's inputs were given, each with its unit."""
        return {
            row.item.name: row.value
            for row in self.live
            if row.item.name not in OWN and not row.empty
        }

    def half_typed(self) -> dict[str, str]:
        """What stands in the fields, as typed; what is carried is not typed."""
        return {
            row.item.name: row.input.value
            for row in self.live
            if not row.empty and row.carried is None
        }

    def own(self, item: StepInput) -> str:
        """What one of the screen's own fields was given; empty when it is not asked for."""
        return next((row.value for row in self.live if row.item == item), "")

    def say_faults(self, faults: Iterable[Fault]) -> list[Fault]:
        """Say each fault beside its field, and go there; returns those of no field."""
        strangers = []
        for fault in faults:
            name = fault.where.rpartition(", ")[2]
            row = next((each for each in self.live if name in _names(each)), None)
            if row is None:
                strangers.append(fault)
            else:
                row.say_fault(f"{fault.what} {fault.remedy}")
                row.input.focus()
        return strangers

    def carry(self, draft: Draft, now: datetime) -> None:
        """Remember in `draft` what was typed and may be offered at the next step."""
        for row in self.live:
            if row.carried is None and not row.empty:
                draft.carry(row.item, row.value, now)

    def expire(self, draft: Draft, now: datetime) -> None:
        """Show the age of what is carried, and take away what is too old."""
        for row in self.live:
            if row.carried is not None:
                row.carried = draft.offered(row.item, now)
                row.say_age() if row.carried is not None else row.expire()


def _names(row: FieldRow) -> set[str]:
    return {row.item.name, row.item.check} - {""}
