"""The house is in order: style, types, rooms, pins, and what the README and the changelog say."""

from __future__ import annotations

import ast
import re
import subprocess
import sys
import tomllib
from itertools import pairwise
from pathlib import Path

import pytest

import gaugelog

ROOT = Path(__file__).parent.parent


def _run(*arguments: str) -> None:
    done = subprocess.run(
        [sys.executable, "-m", *arguments], cwd=ROOT, capture_output=True, text=True, check=False
    )
    assert 0 == done.returncode, done.stdout + done.stderr


def test_ruff_finds_nothing() -> None:
    _run("ruff", "check", ".")


def test_every_file_is_formatted() -> None:
    _run("ruff", "format", "--check", ".")


def test_types_hold_strictly_in_program_and_tests() -> None:
    _run("mypy")


def test_rooms_import_only_from_lower_floors() -> None:
    program = Path(sys.executable).with_name("lint-imports")
    done = subprocess.run([program], cwd=ROOT, capture_output=True, text=True, check=False)
    assert 0 == done.returncode, done.stdout + done.stderr


def test_constraints_carry_no_host_and_no_path() -> None:
    text = (ROOT / "constraints.txt").read_text(encoding="utf-8")
    lines = [line for line in text.splitlines() if line]
    assert lines
    assert [] == [line for line in lines if not re.fullmatch(r"[\w.-]+==[\w.+-]+( ;.*)?", line)]


def test_the_version_stands_once() -> None:
    project = tomllib.loads((ROOT / "pyproject.toml").read_text(encoding="utf-8"))
    assert gaugelog.__version__ == project["project"]["version"]
    assert f"## {gaugelog.__version__}" in (ROOT / "CHANGELOG.md").read_text(encoding="utf-8")


@pytest.mark.parametrize("name", ["README.md", "DEVELOPERS.md"])
def test_links_between_documents_lead_somewhere(name: str) -> None:
    text = (ROOT / name).read_text(encoding="utf-8")
    targets = re.findall(r"\]\(([^)#]+)\)", text)
    assert [] == [target for target in targets if not (ROOT / target).exists()]


def test_every_error_that_stops_the_program_says_what_to_do() -> None:
    errors = {"Refused", "KeyTrouble", "StorageTrouble", "MachineTrouble"}
    mute = [
        f"{file.relative_to(ROOT)}:{call.lineno}"
        for file in sorted((ROOT / "gaugelog").rglob("*.py"))
        for call in ast.walk(ast.parse(file.read_text(encoding="utf-8")))
        if isinstance(call, ast.Call) and isinstance(call.func, ast.Name)
        if call.func.id in errors and len(call.args) + len(call.keywords) < len(("what", "remedy"))
    ]
    assert [] == mute


_NAMES_OF_OUR_OWN = {
    "usual",
    "wanted",
    "kinds",
    "pattern",
    "values['body']",
    "type(value).__name__",
}
"""What may stand behind the article: figures, and words of our own that begin with no vowel."""


def test_no_article_stands_before_a_word_that_comes_from_data() -> None:
    crooked = [
        f"{file.relative_to(ROOT)}:{text.lineno}: a {{{ast.unparse(word.value)}}}"
        for file in sorted((ROOT / "gaugelog").rglob("*.py"))
        for text in ast.walk(ast.parse(file.read_text(encoding="utf-8")))
        if isinstance(text, ast.JoinedStr)
        for before, word in pairwise(text.values)
        if isinstance(before, ast.Constant) and isinstance(word, ast.FormattedValue)
        if re.search(r"(^|[\s(“])[Aa]n? “?$", str(before.value))
        if ast.unparse(word.value) not in _NAMES_OF_OUR_OWN
    ]
    assert [] == crooked
