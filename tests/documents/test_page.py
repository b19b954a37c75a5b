from __future__ import annotations

import re
from pathlib import Path
from typing import Any

import pytest

from gaugelog.documents import shipped
from gaugelog.documents.page import record_html, summary
from gaugelog.errors import MachineTrouble
from tests.documents.sample import HEAD, readings, sample


def _text(**changes: Any) -> str:
    """The page's words, without marks, on one line."""
    words = re.sub(r"<[^>]+>", " ", record_html(sample(**changes)))
    return re.sub(r"[\s\u00a0]+", " ", words)


def test_a_record_says_it_is_valid_only_with_both_signatures() -> None:
    page = record_html(sample())
    assert "Valid only with both signatures" in page
    assert 'id="technician"' in page
    assert 'id="reviewer"' in page


def test_a_draft_is_marked_and_has_no_place_to_sign() -> None:
    page = record_html(sample(state="draft", signing=None))
    assert 'class="watermark"' in page
    assert 'id="technician"' not in page
    assert "Valid only with both signatures" not in page


def test_number_and_head_are_given_to_the_footers() -> None:
    page = record_html(sample())
    assert 'data-number="Record FB7-P1-R1"' in page
    assert f'data-head="Journal head {HEAD}"' in page


def test_every_attempt_is_shown_with_its_reason() -> None:
    text = _text()
    assert 2 == text.count("Insulation , bonded")
    assert "A later attempt stands in its place." in text
    assert "Measured again: Flux left at the tab was cleaned off" in text


def test_the_limit_that_rules_and_the_others_are_told_apart() -> None:
    text = _text()
    assert "By the criteria: common practice, field." in text
    assert "Also ≥ 33.8 MΩ by the permitted error: Parallel leakage" in text


def test_a_change_names_the_reading_it_is_held_against() -> None:
    assert "Held against the reading 350.4 ohm (resistance, received)." in _text()


def test_the_decision_rule_is_stated_with_the_coverage_agreed() -> None:
    assert "k = 2); the guard band is w = U" in _text()
    assert "JCGM 106" in _text()


def test_a_skipped_step_shows_its_reason() -> None:
    assert re.search(r"Second coat P1-1 skipped .* Dry season, agreed with the client\.", _text())


def test_times_of_the_work_and_of_entry_are_both_shown_where_they_differ() -> None:
    steps = [step.model_dump(mode="json") for step in sample().steps]
    steps[0]["entered_at"] = "2026-12-01T16:00:00Z"
    assert "2026-12-01 09:05 entered 2026-12-01 17:00" in _text(steps=steps)


def test_what_a_signature_does_not_prove_is_said() -> None:
    assert "who held a key" in _text()
    assert "This record is no safety approval." in _text()


def test_a_point_without_gauge_and_readings_makes_a_page_too() -> None:
    text = _text(state="draft", signing=None, gauge=None, readings=[], instruments=[])
    assert "No gauge has been taken for this point yet." in text
    assert "No reading has been taken yet." in text
    assert "Checks none yet" in text


def test_a_letter_that_can_not_be_drawn_puts_a_notice_on_the_page() -> None:
    text = _text(campaign={**sample().campaign.model_dump(), "client": "漢字 Works"})
    assert "‹U+6F22›‹U+5B57› Works" in text
    assert "stand as their code points: U+5B57, U+6F22" in text


def test_a_page_of_drawable_letters_has_no_notice() -> None:
    assert "code points" not in _text()


def test_the_summary_counts_latest_verdicts_and_repeats() -> None:
    assert "4 pass; 1 measured again" == summary(sample())
    first = {**readings()[0]}
    first["verdict"] = {**first["verdict"], "word": "conditional pass"}
    assert "1 conditional pass" == summary(sample(readings=[first]))


def test_a_missing_template_is_said_plainly(monkeypatch: pytest.MonkeyPatch) -> None:
    shipped.templates.cache_clear()
    monkeypatch.setattr(shipped, "_PACKAGE", Path("/nowhere/at/all"))
    with pytest.raises(MachineTrouble, match="templates"):
        shipped.templates()
    monkeypatch.undo()
    shipped.templates.cache_clear()
