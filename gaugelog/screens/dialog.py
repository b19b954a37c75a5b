"""A question over a screen: fields one under the other, Enter goes on, Escape takes it back."""

from __future__ import annotations

from collections.abc import Callable, Iterator
from dataclasses import dataclass
from typing import TYPE_CHECKING, ClassVar, Generic, TypeVar, cast

from textual.app import ComposeResult
from textual.binding import Binding, BindingType
from textual.containers import Horizontal, VerticalScroll
from textual.content import Content
from textual.message import Message
from textual.screen import ModalScreen
from textual.widgets import Input

from gaugelog.errors import GaugelogError
from gaugelog.screens.keys_line import KeysLine
from gaugelog.screens.words import CALM, Words, defect, plain, show_unseen, told

if TYPE_CHECKING:
    from gaugelog.screens.app import FullScreen

T = TypeVar("T")


@dataclass(frozen=True, slots=True)
class Question:
    """One field of a dialog: its name, what it asks, whether it stays unseen, may be empty."""

    name: str
    asks: str
    secret: bool = False
    optional: bool = False
    value: str = ""


class Dialog(ModalScreen[T | None], Generic[T]):
    """Asks a few things and does one deed with the answers, on another thread.

    A subclass gives `heading`, `questions`, `doing` and `answer`. What `answer` raises is said in
    the dialog, and the secret is asked for again.
    """

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("escape", "take_back", "Back", priority=True),
        Binding("up", "app.focus_previous", "Up", show=False),
        Binding("down", "app.focus_next", "Down", show=False),
    ]

    heading = ""
    doing = ""
    about = (
        "Fill the fields; Enter goes to the next one, and after the last one it is done. Escape "
        "takes it back: nothing is kept."
    )
    """How it is used, for the help."""

    @dataclass
    class Answered(Message):
        """The deed has ended; `act` runs on the thread that draws."""

        act: Callable[[], None]

    def __init__(self) -> None:
        super().__init__()
        self._busy = False

    @property
    def full(self) -> FullScreen:
        """The program this dialog belongs to."""
        return cast("FullScreen", self.app)

    def explained(self) -> Content:
        """What the dialog says above its fields."""
        return plain("")

    def questions(self) -> tuple[Question, ...]:
        """The fields, in order."""
        return ()

    def listed(self) -> Content:
        """What may be looked up while the fields are filled; it stands below them."""
        return plain("")

    def answer(self, given: dict[str, str]) -> T:
        """Do the deed with what was given; on another thread. Raises GaugelogError."""
        raise NotImplementedError

    def answered(self, result: T) -> None:
        """The deed is done: close with what came of it."""
        self.dismiss(result)

    def compose(self) -> ComposeResult:
        """Heading, explanation, fields, what went wrong."""
        with _Box(id="dialog"):
            yield Words(plain(self.heading, "bold"), classes="heading")
            yield Words(self.explained(), classes="explained")
            for question in self.questions():
                yield from _field(question)
            yield Words(id="trouble")
            if self.listed().plain:
                yield Words(self.listed())
        yield KeysLine()

    def on_mount(self) -> None:
        """Begin at the first field that is empty."""
        fields = list(self.query(Input))
        for field in fields:
            if not field.value:
                field.focus()
                return
        if fields:
            fields[0].focus()

    def on_input_changed(self, event: Input.Changed) -> None:
        """What is pasted is shown as it is; a secret is left alone."""
        event.stop()
        if not event.input.password:
            show_unseen(event.input)

    def on_input_submitted(self, event: Input.Submitted) -> None:
        """Enter: the next empty field, or the deed when none is left."""
        event.stop()
        if self._busy:
            return
        named = {question.name: question for question in self.questions()}
        fields = list(self.query(Input))
        here = fields.index(event.input)
        question = named[event.input.id or ""]
        if not event.value.strip() and not question.optional:
            self.trouble(plain(f"{question.asks}: this can't be left out."))
            return
        for field in fields[here + 1 :]:
            if not field.value:
                field.focus()
                return
        self._do({field.id or "": field.value for field in fields})

    def trouble(self, text: Content) -> None:
        """Say what is wrong, in the dialog."""
        self.query_one("#trouble", Words).say(text)

    def action_take_back(self) -> None:
        """Close without a deed."""
        if not self._busy:
            self.dismiss(None)

    def _do(self, given: dict[str, str]) -> None:
        self._busy = True
        self.trouble(plain(f"… {self.doing}", CALM))

        def work() -> None:
            try:
                result = self.answer(given)
            except GaugelogError as error:
                self._finish(lambda error=error: self._refused(told(error)))  # type: ignore[misc]
            except Exception as error:  # a defect: said plainly, and asked again
                self._finish(lambda error=error: self._refused(defect(error)))  # type: ignore[misc]
            else:
                self._finish(lambda: self.answered(result))

        self.run_worker(work, thread=True, exit_on_error=False)

    def _finish(self, act: Callable[[], object]) -> None:
        self.post_message(self.Answered(lambda: (act(), None)[1]))

    def on_dialog_answered(self, message: Dialog.Answered) -> None:
        """The deed ended: close, or say why not."""
        message.stop()
        self._busy = False
        message.act()

    def _refused(self, why: Content) -> None:
        self.trouble(why)
        for field in self.query(Input):
            if field.password:
                field.value = ""
                field.focus()


class _Box(VerticalScroll, can_focus=False, inherit_bindings=False):
    """What is too long scrolls by the page; up and down are left to go from field to field."""

    BINDINGS: ClassVar[list[BindingType]] = [
        Binding("pageup", "page_up", "Page up", show=False),
        Binding("pagedown", "page_down", "Page down", show=False),
    ]


def _field(question: Question) -> Iterator[Horizontal]:
    row = Horizontal(
        Words(question.asks, classes="asks"),
        Words("[", classes="bracket"),
        Input(question.value, id=question.name, password=question.secret, compact=True),
        Words("]", classes="bracket"),
        classes="field",
    )
    yield row
