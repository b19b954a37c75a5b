"""Whatever is typed, the calculator answers or names the arguments; never a traceback."""

from __future__ import annotations

import json
import re
from collections.abc import Mapping

import pytest
from hypothesis import given, settings
from hypothesis import strategies as st

from gaugelog.commands import run
from gaugelog.commands.calc.engine import work_out
from gaugelog.commands.calc.model import Argument, Family, Subject
from gaugelog.commands.calc.subjects import SUBJECTS
from gaugelog.errors import Fault, Faulty

KINDS: list[tuple[str, str, Subject]] = [
    (name, word, kind)
    for name, subject in SUBJECTS.items()
    for word, kind in (subject.kinds.items() if isinstance(subject, Family) else [("", subject)])
]
NUMBERS = ("0", "1", "-1", "0.3", "2", "350", "12.5", "-0.25", "1e9", "1e-9", "1e300", "-1e-300")
NONSENSE = (
    "nan",
    "inf ohm",
    "5 ohm**9**9",
    "=1+1",
    "1,5 ohm",
    "±",
    "%",
    "\u202e5 ohm",
    "0 = 0",
    "\x00",
)
_NUMBER = re.compile(r"\d+(?:\.\d+)?")


def _texts(argument: Argument) -> st.SearchStrategy[str]:
    """Texts near what the argument takes, with numbers of every size, and some nonsense."""
    nonsense = st.sampled_from(NONSENSE) | st.text(max_size=12)
    if argument.name == "draws":
        return st.just("1000")
    if argument.choices:
        return st.sampled_from(argument.choices) | nonsense
    number = st.sampled_from(NUMBERS) | st.floats().map(repr)
    example = argument.like.split(" or ")[0]
    near = st.lists(number, min_size=8, max_size=8).map(
        lambda numbers: _NUMBER.sub(lambda _: numbers.pop() if numbers else "7", example)
    )
    if argument.many:
        unit = _NUMBER.sub("", example.rsplit(",", 1)[-1]).strip(" -.")
        few = st.lists(number, min_size=1, max_size=4)
        near |= few.map(lambda numbers: f"{', '.join(numbers)} {unit}")
    return near | near | near | near | nonsense


@st.composite
def _typed(draw: st.DrawFn, kind: Subject) -> dict[str, str]:
    """What may be typed for a kind: all that is needed, some of the rest."""
    typed = {}
    for argument in kind.arguments:
        if argument.default is None or draw(st.integers(0, 2)) == 0:
            typed[argument.name] = draw(_texts(argument))
    return typed


def _chosen(name: str, word: str) -> dict[str, str]:
    """What chooses a kind of a family."""
    subject = SUBJECTS[name]
    return {subject.by: word} if isinstance(subject, Family) else {}


def _answered_or_told(subject: str, typed: Mapping[str, str]) -> None:
    faults: tuple[Fault, ...] = ()
    told: object = ()
    try:
        told = work_out(SUBJECTS[subject], typed).as_json()["results"]
    except Faulty as error:
        faults = error.faults
    assert faults or told, typed
    assert all(fault.where and fault.what.endswith(".") for fault in faults), faults
    json.dumps(told, allow_nan=False)


@pytest.mark.parametrize(
    ("name", "word", "kind"), KINDS, ids=[f"{name} {word}".strip() for name, word, _ in KINDS]
)
@pytest.mark.parametrize("examples", [8, pytest.param(400, marks=pytest.mark.slow)])
def test_garbage_is_answered_or_told(name: str, word: str, kind: Subject, examples: int) -> None:
    chosen = _chosen(name, word)

    @settings(max_examples=examples, deadline=None, database=None)
    @given(_typed(kind))
    def answered_or_told(typed: dict[str, str]) -> None:
        _answered_or_told(name, {**chosen, **typed})

    answered_or_told()


@settings(max_examples=25, deadline=None, database=None)
@given(st.sampled_from(sorted(SUBJECTS)), st.lists(st.text(max_size=20), max_size=4))
def test_any_words_end_in_a_known_exit_code(subject: str, words: list[str]) -> None:
    assert run(["calc", subject, "--json", "--", *words]) in (0, 3)


@settings(max_examples=25, deadline=None, database=None)
@given(st.data())
def test_any_text_for_any_argument_is_answered_or_told(data: st.DataObject) -> None:
    name, word, kind = data.draw(st.sampled_from(KINDS))
    texts = {argument.name: data.draw(st.text(max_size=30)) for argument in kind.arguments}
    _answered_or_told(name, {**texts, **_chosen(name, word)})


def test_every_slip_of_a_kind_is_told_at_once() -> None:
    typed = {"what": "shaft", "diameter": "-5 mm", "bore": "1", "modulus": "200 Gpb", "colour": "x"}
    with pytest.raises(Faulty) as caught:
        work_out(SUBJECTS["load"], typed)
    assert ["colour", "diameter", "bore", "modulus"] == [each.where for each in caught.value.faults]


def test_nothing_that_takes_long_is_asked_of_the_units() -> None:
    with pytest.raises(Faulty):
        work_out(SUBJECTS["leakage"], {"permitted": "5 ue**9**9**9"})
