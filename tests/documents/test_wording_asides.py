"""What stands in small print beside an answer or a verdict."""

from __future__ import annotations

import pytest

from gaugelog.documents import wording
from gaugelog.documents.content.workdone import InputShown
from gaugelog.ledger.readings import Verdict
from gaugelog.rules.digits import probability_text


@pytest.mark.parametrize(
    ("typed", "means", "told"),
    [
        ("AD-612", "AD-612, cyanoacrylate", "cyanoacrylate"),
        ("ad-612", "AD-612, cyanoacrylate", "AD-612, cyanoacrylate"),
        ("k7-03/1", "K7-03/1", "K7-03/1"),
        ("RM-2", "RM-2", ""),
        ("20 degC", "", ""),
    ],
)
def test_a_label_that_was_typed_is_not_told_again(typed: str, means: str, told: str) -> None:
    entered = InputShown(prompt="Adhesive lot", typed=typed, means=means)
    assert told == wording.told_apart(entered)


def test_the_rule_that_judged_is_named_in_words() -> None:
    verdict = Verdict(word="pass", blocks=False, rule="resistance change 1")
    expected = "Judged by this program's rule for resistance change, version 1."
    assert expected == wording.rule(verdict)


@pytest.mark.parametrize(
    ("text", "shown"),
    [
        ("1", "> 0.999"),
        ("0.9995001", "> 0.999"),
        ("0.9995", "> 0.999"),
        ("0.9994", "0.999"),
        ("0.0005", "< 0.001"),
        ("0.00049", "< 0.001"),
        ("4.8e-33", "< 0.001"),
        ("0", "< 0.001"),
        ("0.5", "0.500"),
    ],
)
def test_a_probability_is_never_rounded_to_certainty(text: str, shown: str) -> None:
    assert shown == probability_text(text)
