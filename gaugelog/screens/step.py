"""The step in hand: the route beside it, what to do and beware of, what to enter, the verdict."""

from __future__ import annotations

from collections.abc import Iterable
from datetime import datetime
from typing import ClassVar

from textual.binding import BindingType
from textual.containers import Horizontal, VerticalScroll
from textual.content import Content
from textual.widget import Widget
from textual.widgets import Input

from gaugelog.errors import Faulty, GaugelogError
from gaugelog.journal.ids import new_id
from gaugelog.ledger.routes import StepInput
from gaugelog.screens import step_text as text
from gaugelog.screens.attempt import Attempt
from gaugelog.screens.drafts import Draft
from gaugelog.screens.entry import Entry
from gaugelog.screens.fields import NOTE, OWN, REASON, WHEN, FieldRow, inputs_of
from gaugelog.screens.hold import HoldDialog
from gaugelog.screens.pins import METER, PinsScreen
from gaugelog.screens.rail import Rail
from gaugelog.screens.room import Room, show
from gaugelog.screens.step_keys import KEYS, cautions_wait, working_keys
from gaugelog.screens.submit import SubmitDialog
from gaugelog.screens.walk import NoteDialog, RedoDialog, SkipDialog
from gaugelog.screens.words import BAD, CALM, WAIT, Words, lines, plain
from gaugelog.work import looking, steps
from gaugelog.work.doing import StepOutcome
from gaugelog.work.looking import InHand


class StepScreen(Room):
    """One point's step in hand. Enter goes from field to field; the last one does the step."""

    about = (
        "The step in hand, beside the route of the point. Space says that you read the cautions; "
        "then fill the fields. Enter goes to the next field, and after the last one keeps the "
        "step. A number without its unit is taken in the unit beside the field. What you have half "
        "typed is put away for you when you leave. A check that fails stays open: find the cause, "
        "then measure again and say why."
    )

    BINDINGS: ClassVar[list[BindingType]] = KEYS

    def __init__(self, point: str) -> None:
        super().__init__()
        self.point = point
        self.hand: InHand | None = None
        self.draft = Draft()
        self._acknowledged: set[str] = set()
        self._added: list[StepInput] = []
        self._deed = new_id()
        self._half_typed = False

    @property
    def entry(self) -> Entry:
        """The fields."""
        return self.query_one(Entry)

    # What stands on the screen

    def title_text(self) -> str:
        """The point and its zone."""
        return self.point if self.hand is None else f"{self.point}, zone {self.hand.next.zone}"

    def body(self) -> Iterable[Widget]:
        """The route beside the step."""
        yield Horizontal(
            Rail(id="route"),
            VerticalScroll(
                Words(id="title"),
                Words(id="instruction"),
                Words(id="cautions"),
                Words(id="holding"),
                Entry(id="fields"),
                Words(id="attempts"),
                Words(id="facts"),
                id="step",
                can_focus=False,
            ),
            id="hand",
        )

    def on_mount(self) -> None:
        """Open at the step in hand, with what this person had half typed there."""
        self.seat_changed()

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
        if before is not None and not text.same(before, hand):
            self.call_later(self._show, hand, True)
            return
        self.hand = hand
        self._draw_around()
        self.entry.expire(self.draft, self._now())
        if self.focused is None:  # a window opened: the fields can be typed in again
            self._focus_first()

    def leaving(self) -> None:
        """Put away what is half typed."""
        self._keep_draft()

    def closing(self) -> None:
        """The same; it is not opened here again."""
        self._keep_draft()
        self.draft.open = False
        self._save_draft()

    def _look(self) -> InHand | None:
        try:
            return looking.in_hand(self.desk.logbook, self.point)
        except GaugelogError as error:
            self.tell_error(error)
            return None

    async def _show(self, hand: InHand, moved: bool = False) -> None:
        """Show a step anew: its fields with what was half typed or is carried."""
        if not self.app.is_running:
            return
        self.hand = hand
        self.point = hand.next.point
        if moved:
            what = f"! {self.point} was changed elsewhere meanwhile; this is the step now."
            self.tell(plain(what, WAIT))
            self._added, self._deed = [], new_id()
        await self._ask_fields()
        self._draw_around()
        self.query_one("#step", VerticalScroll).scroll_home(animate=False)
        self.draw_bar()
        self._focus_first()
        if hand.next.again:
            # What to do was read before; what to enter and what was kept are wanted now.
            self.call_after_refresh(self.entry.scroll_visible, top=True, animate=False)

    async def _ask_fields(self) -> None:
        hand = self.hand
        wanted: list[StepInput] = []
        if hand is not None and hand.next.step is not None and not hand.next.step.hold:
            wanted = [*inputs_of(hand.next.step.inputs, hand.next.again, tuple(self._added))]
        half = self.draft.at(self.point, self._step_key())
        await self.entry.ask(wanted, half, self.draft, self._now())

    def _draw_around(self) -> None:
        """Everything but what is typed."""
        hand = self.hand
        if hand is None:
            return
        found, step = hand.next, hand.next.step
        self._say("#title", text.title_text(found))
        instruction = step.instruction if step is not None else text.at_the_end(found.state)
        self._say("#instruction", plain(instruction))
        self._say("#cautions", text.cautions_text(found, self._cautions_wait()))
        self._say("#holding", text.holding_text(found))
        self._say("#attempts", text.attempts_text(hand.attempts))
        self._say("#facts", text.facts_text(found.facts))
        self.entry.hold_back(bool(found.blocks) or self._cautions_wait())
        self.query_one(Rail).look(hand)
        self.refresh_bindings()

    def _say(self, where: str, content: Content) -> None:
        words = self.query_one(where, Words)
        words.say(content)
        show(words, bool(words.text))

    # What the person does

    def on_input_changed(self, event: Input.Changed) -> None:
        """Something was typed: kept as half typed, soon."""
        event.stop()
        row = self.entry.row_of(event.input)
        if row is not None:
            row.changed()
            self._half_typed = True
            self.set_timer(0.3, self._keep_draft_if_typed)

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter: the next field that is empty, or the step itself when none is."""
        event.stop()
        row = self.entry.row_of(event.input)
        if row is None or self.busy:
            return
        if row.empty and row.item.required:
            row.say_fault("is missing.")
            return
        following = self.entry.after(row)
        if following is None:
            self.action_do()
        elif not self._told_wrong(row):
            following.input.focus()

    def _told_wrong(self, row: FieldRow) -> bool:
        """Whether what was just entered is refused; said at once, before the rest is typed."""
        if row.item.name in OWN:
            return False
        try:
            steps.rehearse(self.desk.logbook, point=self.point, typed=self.entry.typed())
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
        reason, note, at = (self.entry.own(item) for item in (REASON, NOTE, WHEN))
        attempt = Attempt(
            self.desk.logbook,
            self.desk.signer,
            self._deed,
            hand.next,
            self.entry.typed(),
            reason,
            note,
            at,
        )
        person = self._person()

        def done(what: tuple[StepOutcome, InHand]) -> None:
            self._done(*what) if person == self._person() else self.facts_changed()

        def refused(error: GaugelogError) -> None:
            self._refused(error) if person == self._person() else self.tell_error(error)

        # Handed over meanwhile, nothing of it is entered in the next person's name.
        self.in_background("Keeping it", attempt, done, refused)

    def _done(self, outcome: StepOutcome, hand: InHand) -> None:
        self.entry.carry(self.draft, self._now())
        self.tell(text.outcome_text(outcome))
        self._go_on(hand)

    def _go_on(self, hand: InHand) -> None:
        """Something was kept: show what comes next, with nothing typed."""
        self.hand = hand
        self.draft.typed, self._half_typed = {}, False
        self._added, self._deed = [], new_id()
        self.call_later(self._show, hand)
        self.call_later(self._keep_draft)

    def _refused(self, error: GaugelogError) -> None:
        """Say what is wrong beside the field it is about, and the rest below."""
        if isinstance(error, Faulty):
            rest = self.entry.say_faults(error.faults)
            self.tell(lines(*(plain(f"✗ {fault}", BAD) for fault in rest)))
            return
        self.tell_error(error)
        self.facts_changed()

    def action_hold(self) -> None:
        """Have the second person decide the hold, here and now."""
        if self.hand is not None:
            self.full.push_screen(HoldDialog(self.hand.next), self._decided)

    def action_submit(self) -> None:
        """Sign the record and hand it to review."""
        self.full.push_screen(SubmitDialog(self.point), self._signed_off)

    def action_pins(self) -> None:
        """Look for the cause of a failed check by resistances between the circuit's pins."""
        now = self._now()
        meter = self.draft.offered(METER, now)
        self._keep_draft()
        self.full.push_screen(PinsScreen(self.point, meter.typed if meter is not None else ""))

    def action_redo(self) -> None:
        """Go back to an earlier step."""
        if self.hand is not None:
            self.full.push_screen(RedoDialog(self.point, self.hand.route), self._decided)

    def action_leave(self) -> None:
        """Leave the step as it is, with a note for whoever takes it up."""
        if self.hand is not None:
            self._keep_draft()
            self.full.push_screen(NoteDialog(self.hand.next), self._noted)

    def _noted(self, outcome: StepOutcome | None) -> None:
        if outcome is not None:
            self.tell(text.outcome_text(outcome))
            self.facts_changed()

    def action_skip(self) -> None:
        """Skip the step, with a reason."""
        if self.hand is not None:
            self.full.push_screen(SkipDialog(self.hand.next), self._decided)

    def _decided(self, outcome: StepOutcome | None) -> None:
        hand = self._look() if outcome is not None else None
        if outcome is not None and hand is not None:
            self.tell(text.outcome_text(outcome))
            self._go_on(hand)

    def _signed_off(self, sentence: str | None) -> None:
        hand = self._look() if sentence is not None else None
        if sentence is not None and hand is not None:
            self.tell(plain(f"✓ {sentence}"))
            self._go_on(hand)

    async def action_add(self, what: str) -> None:
        """Add a field for a note, or for when it was observed."""
        item = NOTE if what == "note" else WHEN
        if item not in self._added:
            self._keep_draft()
            self._added.append(item)
            await self._ask_fields()
            self._draw_around()
        for row in self.entry.live:
            if row.item == item:
                row.input.focus()

    def action_scroll(self, by: int) -> None:
        """Show what does not fit."""
        pane = self.query_one("#step", VerticalScroll)
        pane.scroll_page_down(animate=False) if by > 0 else pane.scroll_page_up(animate=False)

    def check_action(self, action: str, parameters: tuple[object, ...]) -> bool | None:
        """A key is shown only where it works now."""
        if self.hand is None:
            return True
        return working_keys(self.hand.next, self._cautions_wait()).get(action, True)

    # Small things

    def _step_key(self) -> str:
        return text.step_key(self.hand) if self.hand is not None else ""

    def _cautions_wait(self) -> bool:
        found = self.hand.next if self.hand is not None else None
        return cautions_wait(found, self._step_key() in self._acknowledged)

    def _focus_first(self) -> None:
        if not self.entry.focus_first():
            self.set_focus(None)

    def _person(self) -> str:
        return self.desk.seat.person if self.desk.seat is not None else ""

    def _now(self) -> datetime:
        return self.desk.logbook.clock.now().utc

    def _keep_draft_if_typed(self) -> None:
        if self._half_typed:
            self._keep_draft()

    def _keep_draft(self) -> None:
        if self.hand is None or self.desk.seat is None:
            return
        self.draft.point, self.draft.step, self.draft.open = self.point, self._step_key(), True
        self.draft.typed = self.entry.half_typed()
        self._half_typed = False
        self._save_draft()

    def _save_draft(self) -> None:
        seat = self.desk.seat
        if seat is not None and not self.full.drafts.save(seat.person, self.draft):
            self.tell(plain("! What is half typed can't be put away; what was kept is safe.", CALM))
