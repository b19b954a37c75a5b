"""Text as people really type it: it is kept in one form, or refused in a sentence."""

from __future__ import annotations

import unicodedata
from pathlib import Path

import pytest
from hypothesis import given
from hypothesis import strategies as st

from gaugelog.errors import ExitCode, Faulty
from gaugelog.intake.plan import PlanFacts
from gaugelog.intake.stock import load_stock
from gaugelog.journal.canonical import canonical
from gaugelog.journal.ids import new_id
from gaugelog.work import plan, reviews, steps, stock
from gaugelog.work.history import check_logbook
from gaugelog.work.kept import fit_to_keep, name_to_keep, text_to_keep
from tests.work.job import DEMO, Job, PlainMaker, start_job

APART = "Stu\u0308ck"
"""`Stück` with its umlaut as a character of its own, as some systems type it."""


@given(st.text(st.characters(exclude_categories=["Cs"])))
def test_every_text_can_be_kept_and_looks_as_it_did(text: str) -> None:
    kept = text_to_keep(text)
    assert canonical(kept)
    assert unicodedata.normalize("NFC", text) == kept


@given(
    st.recursive(
        st.none() | st.booleans() | st.integers(-9, 9) | st.text(max_size=4),
        lambda inner: st.lists(inner) | st.dictionaries(st.sampled_from("abc"), inner),
        max_leaves=8,
    )
)
def test_whatever_a_fact_holds_is_kept_as_it_is_or_in_normal_form(value: object) -> None:
    once = fit_to_keep(value)  # type: ignore[arg-type]
    assert canonical(once)
    assert once == fit_to_keep(once)


def test_bytes_of_another_encoding_are_refused_and_shown() -> None:
    with pytest.raises(Faulty) as caught:
        text_to_keep("S\udcfcd")
    assert ExitCode.FAULTS == caught.value.exit_code
    assert "“S‹U+DCFC›d”" in caught.value.faults[0].what


def test_a_file_name_beyond_ascii_can_name_its_digest() -> None:
    assert name_to_keep("plan/route 2.toml") == "plan/route 2.toml"
    assert name_to_keep("ru\u0308ta.toml") == "r%C3%BCta.toml"


def test_notes_and_meanings_typed_with_marks_apart_are_kept(job: Job) -> None:
    job.do("t.okoro", {"safe": "yes"}, note=APART)
    with job.book.storage.reading() as reader:
        note = list(reader.entries())[-1].body.fact["note"]
    assert note == "Stück"
    assert check_logbook(job.book).ok


def test_a_meaning_typed_with_marks_apart_can_be_signed(job: Job) -> None:
    job.walk()
    technician = job.keys["t.okoro"]
    reviews.submit(job.book, technician, PlainMaker(), point="FB-1", meaning=f"I submit {APART}.")
    assert job.state() == "awaiting review"


def test_a_note_that_is_no_text_keeps_nothing(job: Job) -> None:
    before = job.book.head()
    with pytest.raises(Faulty, match="nothing was stored"):
        job.do("t.okoro", {"safe": "yes"}, note="\udcff")
    assert before == job.book.head()


def _plan_with_own_route(home: Path, old: str, new: str) -> Path:
    """The demo's plan with its route in a file `rüta.toml` of the user's own, one word changed."""
    folder = home / "plan"
    folder.mkdir()
    for file in (DEMO / "plan").iterdir():
        text = file.read_text(encoding="utf-8")
        changed = text.replace("room-temperature-bond-metal", "rüta.toml")
        (folder / file.name).write_text(changed, encoding="utf-8")
    shipped = Path(plan.__file__).parents[1] / "intake/routes/room-temperature-bond-metal.toml"
    route = shipped.read_text(encoding="utf-8").replace(old, new)
    (folder / "rüta.toml").write_text(route, encoding="utf-8")
    return folder


def test_a_route_file_may_have_any_name(tmp_path: Path) -> None:
    job = start_job(tmp_path)
    planner = job.keys["c.ward"]
    loaded = plan.load(job.book, planner, _understood(job, tmp_path, "x", "x"))
    assert "r%C3%BCta.toml" in loaded.files
    assert check_logbook(job.book).ok


def test_an_input_that_no_entry_can_name_is_refused_when_the_plan_is_loaded(
    tmp_path: Path,
) -> None:
    job = start_job(tmp_path)
    facts = _understood(job, tmp_path, 'name = "finish"', 'name = "körnung"')
    with pytest.raises(Faulty) as caught:
        plan.load(job.book, job.keys["c.ward"], facts)
    assert caught.value.faults[0].where.endswith("step clean, input körnung")
    assert steps.worklist(job.book) == []


def _understood(job: Job, home: Path, old: str, new: str) -> PlanFacts:
    received = load_stock([DEMO / "lots.csv"], new_id=new_id)
    stock.receive(job.book, job.keys["c.ward"], received)
    return plan.understand(job.book, _plan_with_own_route(home, old, new))


@pytest.mark.parametrize("meaning", ["", "  ", "\n"])
def test_nothing_is_signed_off_without_a_meaning(job: Job, meaning: str) -> None:
    job.walk()
    maker, keys = PlainMaker(), job.keys
    before = job.book.head()
    with pytest.raises(Faulty, match="nothing was stored"):
        reviews.submit(job.book, keys["t.okoro"], maker, point="FB-1", meaning=meaning)
    with pytest.raises(Faulty, match="nothing was stored"):
        plan.release(job.book, keys["c.ward"], meaning=meaning)
    assert before == job.book.head()
    job.submit()
    with pytest.raises(Faulty, match="nothing was stored"):
        reviews.accept(job.book, keys["q.reyes"], maker, point="FB-1", meaning=meaning)
    assert job.state() == "awaiting review"
