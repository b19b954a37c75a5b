"""The step in hand: the route beside it, what to do and beware of, what to enter, the verdict."""

from __future__ import annotations

from collections.abc import Iterable
from typing import ClassVar

from textual import events
from textual.binding import Binding, BindingType
from textual.containers import Horizontal, Vertical, VerticalScroll
from textual.widget import Widget
from textual.widgets import Input

from gaugelog.errors import Faulty, GaugelogError
from gaugelog.journal.ids import new_id
from gaugelog.ledger.routes import StepInput
from gaugelog.screens import step_text as text
from gaugelog.screens.drafts import Draft
from gaugelog.screens.fields import NOTE, OWN, REASON, WHEN, FieldRow, inputs_of
from gaugelog.screens.hold import HoldDialog
from gaugelog.screens.room import Room, show
from gaugelog.screens.submit import SubmitDialog
from gaugelog.screens.walk import RedoDialog, SkipDialog
from gaugelog.screens.words import BAD, CALM, WAIT, Words, lines, plain, told
from gaugelog.work import looking, steps
from gaugelog.work.doing import StepOutcome
from gaugelog.work.looking import InHand


class StepScreen(Room):
    """One point's step in hand. Enter goes from field to field; the last one does the step."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("space", "acknowledge", "Cautions read"),
        Binding("enter", "do", "Done"),
        Binding("f5", "hold", "Decide the hold"),
        Binding("f5", "submit", "Submit the record"),
        Binding("f7", "redo", "Earlier step"),
        Binding("f9", "skip", "Skip"),
        Binding("ctrl+n", "add('note')", "Note", show=False),
        Binding("ctrl+o", "add('when')", "Observed at", show=False),
        Binding("up,shift+tab", "app.focus_previous", "Up", show=False),
        Binding("down,tab", "app.focus_next", "Down", show=False),
        Binding("pageup", "scroll(-1)", "Page up", show=False),
        Binding("pagedown", "scroll(1)", "Page down", show=False),
        Binding("escape", "back", "Worklist"),
    ]

    def __init__(self, point: str) -> None:
        super().__init__()
        self.point = point
        self.hand: InHand | None = None
        self.draft = Draft()
        self._rows: list[FieldRow] = []
        self._acknowledged: set[str] = set()
        self._added: list[StepInput] = []
        self._deed = new_id()
        self._half_typed = False

    # What stands on the screen

    def title_text(self) -> str:
        """The point and its zone."""
        return self.point if self.hand is None else f"{self.point}, zone {self.hand.next.zone}"

    def body(self) -> Iterable[Widget]:
        """The route beside the step."""
        yield Horizontal(
            Words(id="route"),
            VerticalScroll(
                Words(id="title"),
                Words(id="instruction"),
                Words(id="cautions"),
                Words(id="holding"),
                Vertical(id="fields"),
                Words(id="attempts"),
                Words(id="facts"),
                id="step",
                can_focus=False,
            ),
            id="hand",
        )

    def on_mount(self) -> None:
        """Open at the step in hand, with what this person had half typed there."""
        super().on_mount()
        self.seat_changed()

    def on_resize(self, _event: events.Resize) -> None:
        """The route goes by the height."""
        self._draw_route()

    # What changes meanwhile

    def seat_changed(self) -> None:
        """The person who sits here now: their own half-typed fields, nobody else's."""
        seat = self.desk.seat
        if seat is None:
            return
        self.draft = self.full.drafts.load(seat.person)
        self._added, self._deed = [], new_id()
        hand = self._look()
        if hand is not None:
            self.call_later(self._show, hand)

    def facts_changed(self) -> None:
        """Look again; say so when the point went on without us."""
        before = self.hand
        hand = None if self.busy else self._look()
        if hand is None:
            return
        if before is not None and _key(before) != _key(hand):
            self.call_later(self._show, hand, True)
            return
        self.hand = hand
        self._draw_around()
        self._expire()

    def leaving(self) -> None:
        """Put away what is half typed."""
        self._keep_draft()

    def _look(self) -> InHand | None:
        try:
            return looking.in_hand(self.desk.logbook, self.point)
        except GaugelogError as error:
            self.tell_error(error)
            return None

    async def _show(self, hand: InHand, moved: bool = False) -> None:
        """Show a step anew: its fields with what was half typed or is carried."""
        self.hand = hand
        self.point = hand.next.point
        if moved:
            self.tell(
                plain(
                    f"! {self.point} was changed by someone else meanwhile; this is the step now.",
                    WAIT,
                )
            )
            self._added, self._deed = [], new_id()
        await self._ask_fields()
        self._draw_around()
        self.query_one("#step", VerticalScroll).scroll_home(animate=False)
        self.draw_bar()
        self._focus_first()

    async def _ask_fields(self) -> None:
        hand = self.hand
        wanted: list[StepInput] = []
        if hand is not None and hand.next.step is not None and not hand.next.step.hold:
            wanted = [*inputs_of(hand.next.step.inputs, hand.next.again, tuple(self._added))]
        if len(wanted) > len(self._rows):
            more = [FieldRow() for _ in range(len(wanted) - len(self._rows))]
            await self.query_one("#fields", Vertical).mount(*more)
            self._rows += more
        half = self.draft.at(self.point, self._step_key())
        now = self.desk.logbook.clock.now().utc
        for row, item in zip(self._rows, wanted, strict=False):
            row.ask(item, half.get(item.name, ""), self.draft.offered(item, now))
        for row in self._rows[len(wanted) :]:
            show(row, False)

    def _draw_around(self) -> None:
        """Everything but what is typed."""
        hand = self.hand
        if hand is None:
            return
        found, step = hand.next, hand.next.step
        self._say("#title", text.title_text(found))
        instruction = step.instruction if step is not None else _at_the_end(found.state)
        self._say("#instruction", plain(instruction))
        cautions = step.cautions if step is not None and not found.blocks else ()
        self._say("#cautions", text.cautions_text(cautions, not self._cautions_wait()))
        self._say("#holding", text.holding_text(found))
        self._say("#attempts", text.attempts_text(hand.attempts))
        self._say("#facts", text.facts_text(found.facts))
        for row in self._rows:
            row.disabled = bool(found.blocks) or self._cautions_wait()
        self._draw_route()
        self.refresh_bindings()

    def _draw_route(self) -> None:
        if self.hand is not None:
            rail = self.query_one("#route", Words)
            size = rail.content_size
            rail.say(text.route_text(self.hand, size.width or 22, size.height or 18))

    def _say(self, where: str, content: Words | object) -> None:
        words = self.query_one(where, Words)
        words.say(content)  # type: ignore[arg-type]
        show(words, bool(words.text))

    def _expire(self) -> None:
        now = self.desk.logbook.clock.now().utc
        for row in self._live():
            if row.carried is None:
                continue
            row.carried = self.draft.offered(row.item, now)
            row.say_age() if row.carried is not None else row.expire()

    # What the person does

    def on_input_changed(self, event: Input.Changed) -> None:
        """Something was typed: kept as half typed, soon."""
        event.stop()
        row = self._row_of(event.input)
        if row is not None:
            row.changed()
            self._half_typed = True
            self.set_timer(0.3, self._keep_draft_if_typed)

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter: the next field that is empty, or the step itself when none is."""
        event.stop()
        row = self._row_of(event.input)
        if row is None or self.busy:
            return
        if row.empty and row.item.required:
            row.say_fault("is missing.")
            return
        live = self._live()
        rest = live[live.index(row) + 1 :]
        following = next((each for each in rest if each.empty), None)
        missing = next((each for each in live if each.empty and each.item.required), None)
        if following is not None or missing is not None:
            if not self._told_wrong(row):
                (following or missing).input.focus()  # type: ignore[union-attr]
            return
        self.action_do()

    def _told_wrong(self, row: FieldRow) -> bool:
        """Whether what was just entered is refused; said at once, before the rest is typed."""
        if row.item.name in OWN:
            return False
        try:
            steps.rehearse(self.desk.logbook, point=self.point, typed=self._typed())
        except Faulty as error:
            mine = [fault for fault in error.faults if fault.where.endswith(f", {row.item.name}")]
            for fault in mine:
                row.say_fault(f"{fault.what} {fault.remedy}")
            return bool(mine)
        except GaugelogError:
            return False  # said when the step is done
        return False

    def action_acknowledge(self) -> None:
        """The cautions were read; the fields may be filled."""
        self._acknowledged.add(self._step_key())
        self._draw_around()
        self._focus_first()

    def action_do(self) -> None:
        """Do the step with what is typed."""
        hand = self.hand
        if hand is None or hand.next.step is None or self.busy:
            return
        desk, deed, point, typed = self.desk, self._deed, self.point, self._typed()
        reason, note, at = (self._own(item) for item in (REASON, NOTE, WHEN))
        signer = desk.signer

        def act() -> tuple[StepOutcome, InHand]:
            outcome = steps.do(
                desk.logbook,
                signer,
                point=point,
                typed=typed,
                note=note,
                reason=reason,
                at=at,
                deed=deed,
                seen=hand.next,
            )
            return outcome, looking.in_hand(desk.logbook, point)

        self.in_background("Keeping it", act, self._done, self._refused)

    def _done(self, what: tuple[StepOutcome, InHand]) -> None:
        outcome, hand = what
        self._carry()
        self.draft.typed = {}
        self._added, self._deed = [], new_id()
        self.tell(text.outcome_text(outcome))
        self.call_later(self._show, hand)
        self._half_typed = True
        self.call_later(self._keep_draft)

    def _refused(self, error: GaugelogError) -> None:
        """Say what is wrong beside the field it is about, and the rest below."""
        rest = []
        for fault in error.faults if isinstance(error, Faulty) else ():
            name = fault.where.rpartition(", ")[2]
            row = next(
                (each for each in self._live() if name in {each.item.name, each.item.check}), None
            )
            if row is None:
                rest.append(plain(f"✗ {fault}", BAD))
            else:
                row.say_fault(f"{fault.what} {fault.remedy}")
                row.input.focus()
        self.tell(lines(*rest) if isinstance(error, Faulty) else told(error))
        if not isinstance(error, Faulty):
            self.facts_changed()

    def action_hold(self) -> None:
        """Have the second person decide the hold, here and now."""
        if self.hand is not None:
            self.full.push_screen(HoldDialog(self.hand.next), self._decided)

    def action_submit(self) -> None:
        """Sign the record and hand it to review."""
        self.full.push_screen(SubmitDialog(self.point), self._signed_off)

    def action_redo(self) -> None:
        """Go back to an earlier step."""
        if self.hand is not None:
            self.full.push_screen(RedoDialog(self.point, self.hand.route), self._decided)

    def action_skip(self) -> None:
        """Skip the step, with a reason."""
        if self.hand is not None:
            self.full.push_screen(SkipDialog(self.hand.next), self._decided)

    def _decided(self, outcome: StepOutcome | None) -> None:
        hand = self._look() if outcome is not None else None
        if outcome is not None and hand is not None:
            self.tell(text.outcome_text(outcome))
            self._deed = new_id()
            self.call_later(self._show, hand)

    def _signed_off(self, sentence: str | None) -> None:
        hand = self._look() if sentence is not None else None
        if sentence is not None and hand is not None:
            self.tell(plain(f"✓ {sentence}"))
            self.call_later(self._show, hand)

    async def action_add(self, what: str) -> None:
        """Add a field for a note, or for when it was observed."""
        item = NOTE if what == "note" else WHEN
        if item not in self._added:
            self._keep_draft()
            self._added.append(item)
            await self._ask_fields()
            self._draw_around()
        for row in self._live():
            if row.item == item:
                row.input.focus()

    def action_scroll(self, by: int) -> None:
        """Show what does not fit."""
        pane = self.query_one("#step", VerticalScroll)
        pane.scroll_page_down(animate=False) if by > 0 else pane.scroll_page_up(animate=False)

    def action_back(self) -> None:
        """To the worklist; what is half typed is kept."""
        self._keep_draft()
        self.draft.open = False
        self._save_draft()
        self.full.go("worklist")

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """A key is shown only where it works now."""
        found = self.hand.next if self.hand is not None else None
        step = found.step if found is not None else None
        if found is None or action not in _WHEN_IT_WORKS:
            return True
        free = step is not None and not found.blocks
        hold = step is not None and step.hold
        works = {
            "acknowledge": self._cautions_wait(),
            "do": free and not hold and not self._cautions_wait(),
            "add": free and not hold,
            "hold": free and hold,
            "submit": step is None and found.title != "none" and not found.blocks,
            "redo": found.state not in {"planned", "awaiting review", "accepted", "withdrawn"},
            "skip": step is not None and step.skip != "never" and not hold and not found.forbidden,
        }
        return works[action]

    # Small things

    def _step_key(self) -> str:
        return _key(self.hand) if self.hand is not None else ""

    def _cautions_wait(self) -> bool:
        found = self.hand.next if self.hand is not None else None
        if found is None or found.step is None or found.step.hold or found.blocks:
            return False
        return bool(found.step.cautions) and self._step_key() not in self._acknowledged

    def _live(self) -> list[FieldRow]:
        return [row for row in self._rows if row.display]

    def _row_of(self, field: Input) -> FieldRow | None:
        return next((row for row in self._live() if row.input is field), None)

    def _typed(self) -> dict[str, str]:
        return {
            row.item.name: row.value
            for row in self._live()
            if row.item.name not in OWN and not row.empty
        }

    def _own(self, item: StepInput) -> str:
        return next((row.value for row in self._live() if row.item == item), "")

    def _focus_first(self) -> None:
        free = [row for row in self._live() if not row.disabled]
        first = next((row for row in free if row.empty), free[-1] if free else None)
        if first is not None:
            first.input.focus()
        else:
            self.set_focus(None)

    def _carry(self) -> None:
        now = self.desk.logbook.clock.now().utc
        for row in self._live():
            if row.carried is None and not row.empty:
                self.draft.carry(row.item, row.value, now)

    def _keep_draft_if_typed(self) -> None:
        if self._half_typed:
            self._keep_draft()

    def _keep_draft(self) -> None:
        if self.hand is None or self.desk.seat is None:
            return
        self.draft.point, self.draft.step, self.draft.open = self.point, self._step_key(), True
        self.draft.typed = {
            row.item.name: row.input.value
            for row in self._live()
            if not row.empty and row.carried is None
        }
        self._half_typed = False
        self._save_draft()

    def _save_draft(self) -> None:
        seat = self.desk.seat
        if seat is not None and not self.full.drafts.save(seat.person, self.draft):
            self.tell(plain("! What is half typed can't be put away; what was kept is safe.", CALM))


_WHEN_IT_WORKS = frozenset({"acknowledge", "do", "add", "hold", "submit", "redo", "skip"})


def _key(hand: InHand) -> str:
    step = hand.next.step
    return f"{step.id}/{hand.next.subject}" if step is not None else f"end/{hand.next.state}"


def _at_the_end(state: str) -> str:
    if state == "awaiting review":
        return "The record is signed once and waits for a reviewer."
    if state == "accepted":
        return "The record carries both signatures."
    if state == "withdrawn":
        return "Nothing more is done here."
    return "Every step is done. Submit the record: you sign it, a reviewer signs it after you."
