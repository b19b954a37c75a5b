"""The record's page as HTML: the templates' environment, its filters, and what they are given."""

from __future__ import annotations

from collections import Counter
from collections.abc import Iterator
from typing import Any

from jinja2 import Environment, FileSystemLoader, StrictUndefined
from markupsafe import Markup

from gaugelog.documents import wording
from gaugelog.documents.compiled import COMPILED
from gaugelog.documents.content import RecordContent
from gaugelog.documents.diagram import bridge_diagram
from gaugelog.documents.fonts import Lettering
from gaugelog.documents.shipped import templates
from gaugelog.documents.statements import PROVES, decision_rule
from gaugelog.documents.wiring import wiring_list
from gaugelog.ledger.routes import Window

_MOODS = {
    "pass": "good",
    "done": "good",
    "released": "good",
    "conditional pass": "doubt",
    "undecided": "doubt",
    "skipped": "doubt",
    "reopened": "doubt",
    "conditional fail": "bad",
    "fail": "bad",
    "refused": "bad",
    "accepted": "good",
    "hold released": "good",
    "returned": "bad",
    "hold refused": "bad",
    "amendment": "doubt",
    "plan changed": "doubt",
    "gauge replaced": "doubt",
    "withdrawn": "doubt",
    "step reopened": "doubt",
    "note left": "doubt",
}


def record_html(content: RecordContent) -> str:
    """The whole page of a record. Foreign text is escaped and made drawable."""
    lettering = Lettering()
    for text in texts_in(content.model_dump(mode="json")):
        lettering(text)
    page = environment(content, lettering).get_template("record.html")
    return page.render(
        record=content,
        summary=summary(content),
        notices=[*to_look_into(content), *notices_of(lettering)],
        diagrams=[bridge_diagram(circuit) for circuit in content.circuits],
        wirings=[wiring_list(circuit) for circuit in content.circuits],
        titles={step.step: step.title for step in content.steps},
        decision=decision_rule(content.criteria.coverage),
        proves=PROVES,
    )


def environment(content: RecordContent, lettering: Lettering) -> Environment:
    """The environment of the templates: strict, escaping, every text made drawable."""
    made = plain_environment(lettering)
    wall = wording.WallTime(content.drawn.offset)
    made.filters.update(when=wall.when, day=wall.day, exactly=wall.exactly)
    made.filters.update(initials=_initials(content), earlier=_earlier(content))
    made.filters.update(numbered=_numbered(content))
    return made


def plain_environment(lettering: Lettering) -> Environment:
    """What every template needs, whichever document it is of."""

    def finalize(value: Any) -> Any:
        if isinstance(value, Markup):
            return Markup(lettering(str(value)))  # noqa: S704 (it was Markup before)
        return lettering(value) if isinstance(value, str) else value

    made = Environment(
        loader=FileSystemLoader(templates()),
        bytecode_cache=COMPILED,
        autoescape=True,
        undefined=StrictUndefined,
        finalize=finalize,
        trim_blocks=True,
        lstrip_blocks=True,
    )
    made.filters.update(
        q=wording.quantity,
        brief=wording.brief,
        judged=wording.judged,
        expanded=wording.expanded,
        probability=wording.probability,
        rule=wording.rule,
        told_apart=wording.told_apart,
        bound=wording.bound,
        window=_window,
        mood=lambda word: _MOODS.get(word, "plain"),
    )
    return made


def summary(content: RecordContent) -> str:
    """The latest verdicts counted, `3 pass, 1 conditional pass; 1 measured again`."""
    words = Counter(reading.verdict.word for reading in content.readings if reading.latest)
    if not words:
        return "none yet"
    counted = ", ".join(f"{count} {word}" for word, count in words.items())
    again = sum(not (each.latest or each.earlier_gauge) for each in content.readings)
    return f"{counted}; {again} measured again" if again else counted


def to_look_into(content: RecordContent) -> list[str]:
    """What was flagged in readings that stand, though it did not rule."""
    return [
        f"To look into, {reading.check} {reading.stage} of {reading.subject}: {flag}"
        for reading in content.readings
        if reading.latest
        for flag in reading.verdict.flags
    ]


def notices_of(lettering: Lettering) -> list[str]:
    """What the page says of characters that its fonts lack."""
    if not lettering.missing:
        return []
    codes = ", ".join(f"U+{ord(char):04X}" for char in sorted(lettering.missing))
    return [
        f"Some characters can't be drawn by the fonts of this page and stand as their code "
        f"points: {codes}. The attached data has them as they were entered."
    ]


def texts_in(value: Any) -> Iterator[str]:
    """Every text within plain data, the names of its parts too."""
    if isinstance(value, str):
        yield value
    elif isinstance(value, dict):
        for name, each in value.items():
            yield name
            yield from texts_in(each)
    elif isinstance(value, list | tuple):
        for each in value:
            yield from texts_in(each)


def _initials(content: RecordContent) -> Any:
    known = {person.id: person.initials or person.id for person in content.people}
    return lambda person: known.get(person, person) or "–"


def _earlier(content: RecordContent) -> Any:
    known = {each.id: f"{each.typed} ({each.check}, {each.stage})" for each in content.readings}
    return lambda reading: known.get(reading, reading)


def _numbered(content: RecordContent) -> Any:
    """A photo's number on the page, by its id."""
    known = {photo.id: number for number, photo in enumerate(content.photos, start=1)}
    return lambda photo: f"photo {known[photo]}" if photo in known else ""


def _window(each: Window, titles: dict[str, str]) -> str:
    named = each.model_copy(update={"after": f"“{titles.get(each.after, each.after)}”"})
    return wording.window(named)
