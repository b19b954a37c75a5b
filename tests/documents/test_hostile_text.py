"""Whatever a text says, a page loads nothing but what is shipped."""

from __future__ import annotations

import re
from html.parser import HTMLParser
from pathlib import Path
from typing import Any

import jinja2
import pytest
from hypothesis import given, settings
from hypothesis import strategies as st
from jinja2 import TemplateError

from gaugelog.documents.content import RecordContent
from gaugelog.documents.fetcher import ForbiddenReference
from gaugelog.documents.fonts import Lettering
from gaugelog.documents.page import plain_environment, record_html
from gaugelog.documents.render import draw, memory_fetcher, render_record
from gaugelog.documents.shipped import templates
from tests.documents import hostile
from tests.documents.sample import sample

SIZE = "@page { size: A5 }"
ATTACK = "\"'><script>x</script><img src=http://127.0.0.1:9/x>{{ 7*7 }}{% raw %}&amp;]]>"


def test_no_hostile_reference_opens_a_file_or_a_socket(tmp_path: Path) -> None:
    canary = tmp_path / "canary.css"
    canary.write_text("p { color: red }", encoding="utf-8")
    draw("<p>warm up</p>", SIZE, [])
    with hostile.server() as (port, asked):
        page = "".join(hostile.references(canary, port))
        with hostile.listening() as heard:
            draw(f"<body>{page}</body>", SIZE, [])
    assert [] == asked
    assert [] == [each for each in heard if "canary" in each or not each.startswith("open ")]


def test_the_ear_hears_what_is_opened(tmp_path: Path) -> None:
    canary = tmp_path / "canary.css"
    canary.write_text("x", encoding="utf-8")
    with hostile.listening() as heard:
        canary.read_text(encoding="utf-8")
    assert [each for each in heard if "canary" in each]


TEMPLATES_BEYOND = (
    "../README.md",
    "../../etc/hostname",
    "/etc/hostname",
    "fonts/../../pyproject.toml",
    "..\\README.md",
    "record.html/../../README.md",
    "file:///etc/hostname",
    "http://127.0.0.1:9/x",
    "./../README.md",
    "%2e%2e/README.md",
)


@pytest.mark.parametrize("name", TEMPLATES_BEYOND)
def test_a_template_reaches_nothing_beyond_its_folder(name: str) -> None:
    made = plain_environment(Lettering())
    with hostile.listening() as heard:
        for page in (f"{{% include '{name}' %}}", f"{{% extends '{name}' %}}"):
            with pytest.raises(TemplateError):
                made.from_string(page.replace("\\", "\\\\")).render()
        with pytest.raises(TemplateError):
            made.get_template(name)
    # The library loads a module of its own to tell of an error.
    allowed = (f"open {templates()}", f"open {Path(jinja2.__file__).parent}")
    assert [] == [each for each in heard if not each.startswith(allowed)]


@pytest.mark.parametrize(
    "address",
    ["file:///etc/hostname", "http://127.0.0.1/x", "data:text/plain,x", "gaugelog:../record.css"],
)
def test_only_listed_names_are_served(address: str) -> None:
    fetcher = memory_fetcher()
    with pytest.raises(ForbiddenReference):
        fetcher.fetch(address)
    assert [address] == fetcher.refused


def test_a_listed_name_is_served_from_memory() -> None:
    assert b"@page" in memory_fetcher().fetch("gaugelog:record.css").read()


def _attacked(value: Any) -> Any:
    """Every free text of the data replaced by an attack."""
    if isinstance(value, dict):
        return {name: _kept(name, each) for name, each in value.items()}
    return [_attacked(each) for each in value] if isinstance(value, list) else value


FREE = re.compile(
    "title|client|contract|document|site|agreed_by|label|description|drawing|name|source|zone|"
    "purpose|quantity|datum|side|axis|maker|type|pattern|lot|arrangement|cable|connector|note|"
    "typed|prompt|means|reason|instruction|meaning|cautions|permits|program|head|number|serial|"
    "formula|basis|family|edition|outcome|subject|check|stage|rule|range|initials|part|roles|"
    "marks|pins|granted_by|certificate_number|calibrated_by|removal_allowed|forbidden_cleaners"
)
CHOSEN = {"range", "number", "quantity", "type"}


def _kept(name: str, value: Any) -> Any:
    if isinstance(value, str) and FREE.fullmatch(name):
        return ATTACK
    if isinstance(value, list) and value and isinstance(value[0], str) and FREE.fullmatch(name):
        return [ATTACK for _ in value]
    if name in {"marks", "pins"}:
        return {ATTACK + key: ATTACK for key in value}
    return _attacked(value)


def attacked() -> RecordContent:
    """The sample with every free text hostile."""
    return RecordContent.model_validate(_attacked(sample().model_dump(mode="json")))


class _Tags(HTMLParser):
    def __init__(self) -> None:
        super().__init__()
        self.names: list[str] = []
        self.text = ""

    def handle_starttag(self, tag: str, attrs: list[tuple[str, str | None]]) -> None:
        self.names.append(tag)

    def handle_data(self, data: str) -> None:
        self.text += data


def _parsed(content: RecordContent) -> _Tags:
    tags = _Tags()
    tags.feed(record_html(content))
    return tags


def test_hostile_text_adds_no_element_to_the_page() -> None:
    names = _parsed(attacked()).names
    assert "script" not in names
    assert "img" not in names


def test_hostile_text_is_shown_as_it_was_typed() -> None:
    text = _parsed(attacked()).text
    assert ATTACK in text
    assert "49" not in re.findall(r"\b49\b", text)


@given(st.text(max_size=60))
@settings(max_examples=25, deadline=None)
def test_any_text_is_shown_as_it_is_or_by_its_code_points(text: str) -> None:
    campaign = {**sample().campaign.model_dump(), "contract": f"[{text}]"}
    assert f"[{Lettering()(text)}]" in _parsed(sample(campaign=campaign)).text


def test_a_record_full_of_hostile_text_is_drawn_all_the_same() -> None:
    with hostile.listening() as heard:
        drawing = render_record(attacked())
    assert {"technician", "reviewer"} == set(drawing.boxes)
    assert [] == [each for each in heard if not each.startswith("open ")]
