"""Finding the cause of a failed check, in place: resistances between pins, and what they say."""

from __future__ import annotations

import math
from collections.abc import Iterable
from typing import ClassVar

from textual.binding import Binding, BindingType
from textual.containers import VerticalScroll
from textual.content import Content
from textual.widget import Widget
from textual.widgets import Input

from gaugelog.errors import GaugelogError
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.routes import StepInput
from gaugelog.screens.drafts import Draft
from gaugelog.screens.entry import Entry
from gaugelog.screens.room import Room
from gaugelog.screens.words import BAD, CALM, GOOD, WAIT, Words, lines, plain
from gaugelog.visible import visible
from gaugelog.work.diagnosing import PinAnswer, PinPair, PinsFound, circuits_of, diagnose_point

METER = StepInput(name="meter", kind="instrument", type="resistance", prompt="Meter")
_ARTICLE = "ARTICLE"


def pair_input(found: PinsFound, pair: PinPair) -> StepInput:
    """The field of a pair of terminals: where to measure, and what a sound circuit shows."""
    pins = {terminal.name: terminal.pin for terminal in found.terminals}
    one, other = (f"{end} ({pins[end]})" if pins.get(end) else end for end in pair.between)
    name = " to ".join(pair.between)
    if math.isinf(pair.expected):
        prompt = f"{one} to {other}: sound is open"
        return StepInput(name=name, kind="text", prompt=prompt, unit="MΩ, OL")
    sound = Quantity(value=f"{pair.expected:.2f}", unit="ohm")
    prompt = f"{one} to {other}: sound {sound}"
    return StepInput(name=name, kind="reading", check="resistance", unit="ohm", prompt=prompt)


def to_metal(found: PinsFound) -> list[PinPair]:
    """From each terminal to the bare metal of the article: open in a sound circuit."""
    return [
        PinPair((terminal.name, _ARTICLE), math.inf)
        for terminal in found.terminals
        if terminal.name != _ARTICLE
    ]


def answers_text(found: PinsFound) -> Content:
    """What the figures say: the best answer first, and what to measure next."""
    if not found.answers:
        return plain("")
    told = [_answer(each, place) for place, each in enumerate(found.answers)]
    if not found.explained:
        told.append(plain("! No single defect explains these figures; measure again.", WAIT))
    if found.next:
        told.append(plain(f"Measure next: {found.next}", "bold"))
    return lines(plain("What it says", "bold $secondary"), *told)


def _answer(each: PinAnswer, place: int) -> Content:
    sound = each.sentence.startswith("nothing wrong")
    style = CALM if each.far_behind else (GOOD if sound else BAD)
    lead = "far behind" if each.far_behind else ("most likely" if not place else "or as likely")
    return lines(
        Content.assemble(plain(f"{lead}: ", CALM), plain(each.sentence, style)),
        plain(f"   {each.means}", CALM),
    )


class PinsScreen(Room):
    """One field for each pair of terminals; each Enter asks anew what the figures say.

    Nothing of this is kept: it says where to look.
    """

    about = (
        "Unplug the circuit from its module and measure resistances between its pins; leave out "
        "what you did not measure. The values of a sound circuit stand beside the fields. The most "
        "likely cause comes first. Nothing of this is kept: what counts is the check, read again."
    )

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("up,shift+tab", "app.focus_previous", "Up", show=False),
        Binding("down,tab", "app.focus_next", "Down", show=False),
        Binding("escape", "app.pop_screen", "Back to the step"),
    ]

    def __init__(self, point: str, meter: str = "") -> None:
        super().__init__()
        self.point = point
        self._meter = meter
        self._circuit = ""

    def title_text(self) -> str:
        """The point and the circuit that is looked at."""
        return f"{self.point}, find the cause" + (f": {self._circuit}" if self._circuit else "")

    def body(self) -> Iterable[Widget]:
        """What to do, the fields, what they say."""
        yield VerticalScroll(
            Words("Unplug the module. Measure between these ends; leave out what you can't reach."),
            Entry(id="fields"),
            Words(id="answers"),
            id="step",
            can_focus=False,
        )

    def on_mount(self) -> None:
        """Lay out the table to measure against."""
        self.call_later(self._lay_out)

    async def _lay_out(self) -> None:
        book = self.desk.logbook
        try:
            self._circuit = circuits_of(book, self.point)[0]
            found = diagnose_point(book, self.point, circuit=self._circuit)
        except IndexError:
            self.tell(plain(f"✗ {self.point} is wired in no circuit; there are no pins.", BAD))
            return
        except GaugelogError as error:
            self.tell_error(error)
            return
        items = [METER, *(pair_input(found, pair) for pair in (*found.pairs, *to_metal(found)))]
        half = {METER.name: self._meter} if self._meter else {}
        entry = self.query_one(Entry)
        await entry.ask(items, half, Draft(), book.clock.now().utc)
        entry.focus_first()

    def on_input_changed(self, event: Input.Changed) -> None:
        """A fault may be mended by what is typed."""
        event.stop()
        row = self.query_one(Entry).row_of(event.input)
        if row is not None:
            row.changed()

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter: ask what the figures say, and go to the next empty field."""
        event.stop()
        entry = self.query_one(Entry)
        row = entry.row_of(event.input)
        following = entry.after(row) if row is not None else None
        if following is not None:
            following.input.focus()
        given = entry.typed()
        meter = given.pop(METER.name, "")
        typed = [f"{name} {_signed(value)}" for name, value in given.items()]
        if not typed or self.busy:
            return
        book, point, circuit = self.desk.logbook, self.point, self._circuit
        self.in_background(
            "Comparing with every single defect",
            lambda: diagnose_point(book, point, typed, meter=meter, circuit=circuit),
            lambda found: self.query_one("#answers", Words).say(answers_text(found)),
        )


def _signed(value: str) -> str:
    """A value after its sign: an overload or a bound has its own."""
    return visible(value) if value[:1] in {"<", ">", "="} else f"= {visible(value)}"
