"""The house is in order: style, types, rooms, pins, and what the README and the changelog say."""

from __future__ import annotations

import re
import subprocess
import sys
import tomllib
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
