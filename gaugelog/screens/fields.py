"""Fields of a step: prompt, place to type, unit always visible; age of what is carried; faults."""

from __future__ import annotations

from collections.abc import Iterator
from datetime import timedelta

from textual.app import ComposeResult
from textual.containers import Horizontal, Vertical
from textual.content import Content
from textual.widgets import Input

from gaugelog.ledger.base import SYMBOLS
from gaugelog.ledger.checks import CHECKS
from gaugelog.ledger.routes import StepInput
from gaugelog.screens.drafts import Carried
from gaugelog.screens.room import show
from gaugelog.screens.words import BAD, CALM, WAIT, Words, plain, show_unseen

REASON = StepInput(name="~reason", kind="text", prompt="Why is it measured again?")
NOTE = StepInput(name="~note", kind="text", prompt="Note, kept with the step", required=False)
WHEN = StepInput(name="~at", kind="text", prompt="Observed at, if not now (14:30)", required=False)
OWN = frozenset({REASON.name, NOTE.name, WHEN.name})
"""Names of the fields that are the screen's, not the route's."""

SCANNED = frozenset({"gauge", "consumable", "instrument"})
"""Kinds of input that a scanner types."""

_FEW_UNITS = 2


def takes_bare_number(item: StepInput) -> bool:
    """Whether a number may be typed alone, because the unit beside the field is the only one.

    Not for an insulation: its units lie decades apart, and a wrong one would still look right.
    """
    if item.kind == "quantity":
        return bool(item.unit)
    return item.kind == "reading" and len(CHECKS[item.check].units) <= _FEW_UNITS


def unit_text(item: StepInput) -> str:
    """The unit as it stands beside the field."""
    if item.kind == "reading" and not takes_bare_number(item):
        units = [SYMBOLS.get(unit, unit) for unit in CHECKS[item.check].units]
        return f"{units[-3]}, {units[-2]}" if len(units) > _FEW_UNITS else units[0]
    return "y" if item.kind == "yes" else SYMBOLS.get(item.unit, item.unit)


def completed(item: StepInput, typed: str) -> str:
    """What was typed, with the unit that stands beside the field where it is a bare number."""
    text = typed.strip()
    bare = text[-1:].isdigit() or text.endswith(".")
    if text and bare and takes_bare_number(item) and item.unit:
        return f"{text} {SYMBOLS.get(item.unit, item.unit)}"
    return text


class FieldRow(Vertical):
    """One field; asks for one input after the other, as the steps come."""

    def __init__(self) -> None:
        super().__init__(classes="row")
        self.item = NOTE
        self.carried: Carried | None = None

    def compose(self) -> ComposeResult:
        """Prompt, brackets around the field, unit; a line beneath for age or fault."""
        yield Horizontal(
            Words(classes="asks"),
            Words("[", classes="bracket"),
            Input(compact=True, select_on_focus=False),
            Words("]", classes="bracket"),
            Words(classes="unit"),
            classes="field",
        )
        yield Words(classes="beneath")

    @property
    def input(self) -> Input:
        """Where it is typed."""
        return self.query_one(Input)

    @property
    def value(self) -> str:
        """What is typed, completed by the unit that stands beside it."""
        return completed(self.item, self.input.value)

    @property
    def empty(self) -> bool:
        """Whether nothing is typed."""
        return not self.input.value.strip()

    def ask(self, item: StepInput, typed: str, carried: Carried | None) -> None:
        """Ask for an input; `typed` is what was half typed, `carried` what may be offered again."""
        self.item, self.carried = item, None if typed else carried
        show(self, True)
        prompt = item.prompt if item.required else f"{item.prompt} (may be left out)"
        self.query_one(".asks", Words).say(prompt)
        self.query_one(".unit", Words).say(unit_text(item))
        value = typed or (carried.typed if carried is not None and item.kind != "reading" else "")
        with self.input.prevent(Input.Changed):
            self.input.value = value
            self.input.cursor_position = len(value)
        self.say_age()

    def say_age(self) -> None:
        """Show how old a carried value is and how long it is still offered."""
        if self.carried is None:
            self.beneath(plain(""))
            return
        age, left = _minutes(self.carried.age), _minutes(self.carried.left)
        self.beneath(plain(f"carried, {age} old; no longer offered in {left}", CALM))

    def say_fault(self, text: str) -> None:
        """Show what is wrong with the value."""
        self.beneath(plain(f"✗ {text}", BAD))
        if self.item.kind in SCANNED:
            self.input.action_select_all()  # the next code takes its place

    def changed(self) -> None:
        """The person typed: it is carried no more, and a fault may be mended."""
        show_unseen(self.input)
        self.carried = None
        self.beneath(plain(""))

    def expire(self) -> None:
        """Take a carried value away; it is too old to be offered."""
        with self.input.prevent(Input.Changed):
            self.input.value = ""
        self.carried = None
        self.beneath(plain("what was carried is too old; enter it anew", WAIT))

    def beneath(self, text: Content) -> None:
        """Say something under the field."""
        line = self.query_one(".beneath", Words)
        line.say(text)
        show(line, bool(text.plain))


def _minutes(span: timedelta) -> str:
    minutes = span.total_seconds() / 60
    return f"{minutes:.0f} min" if minutes < 120 else f"{minutes / 60:.0f} h"


def inputs_of(
    step_inputs: tuple[StepInput, ...], again: bool, extra: tuple[StepInput, ...]
) -> Iterator[StepInput]:
    """What is asked for at a step: why again, the route's inputs, then what was added."""
    if again:
        yield REASON
    yield from step_inputs
    yield from extra
