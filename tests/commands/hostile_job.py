"""A job with hostile text in every field that takes free text, found by trying each field."""

from __future__ import annotations

import csv
import io
import json
import shutil
import tomllib
from collections.abc import Callable, Iterator
from datetime import date
from pathlib import Path
from typing import Any

from gaugelog.errors import Faulty
from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.plan import load_plan
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id

SMALL_JOB = Path(__file__).parents[1] / "small_job"
Path_ = tuple[str | int, ...]

HOSTILE = (
    "=1+1[red]m[/red][link=file:///x]l[/link]<script>s</script><b>b</b>&amp;{{ 7*7 }}{% raw %}"
    "../../../etc/x\u202er\u2066i\u200fz\u2028n\U0001f600שלום%s$(id);'\""
)
"""What a file may hold: markup of every outlet, bidi controls, a formula, path parts, emoji."""

REFUSED = ("\x1b[31mred", "nul\x00", "\x1b]8;;http://127.0.0.1:9/\x07l", "a" * 100_000)
"""What no field keeps."""


class Sheet:
    """A CSV table to be spoilt: a field is a column, in every row."""

    def __init__(self, file: Path) -> None:
        self.file = file
        self._rows = list(csv.DictReader(io.StringIO(file.read_text(encoding="utf-8"))))

    def fields(self) -> list[str]:
        """The columns."""
        return list(self._rows[0])

    def put(self, field: Any, text: str) -> Callable[[], None]:
        """Put the text into a column and write the file; returns what takes it back."""
        before = [row[field] for row in self._rows]
        for row in self._rows:
            row[field] = text
        self._write()

        def back() -> None:
            for row, cell in zip(self._rows, before, strict=True):
                row[field] = cell
            self._write()

        return back

    def _write(self) -> None:
        out = io.StringIO(newline="")
        writer = csv.DictWriter(out, list(self._rows[0]))
        writer.writeheader()
        writer.writerows(self._rows)
        self.file.write_bytes(out.getvalue().encode("utf-8", "surrogatepass"))


class Tree:
    """A TOML file to be spoilt: a field is the path of keys to a text."""

    def __init__(self, file: Path) -> None:
        self.file = file
        self._data = tomllib.loads(file.read_text(encoding="utf-8"))

    def fields(self) -> list[Path_]:
        """The paths of all texts."""
        return list(_texts(self._data))

    def put(self, field: Any, text: str) -> Callable[[], None]:
        """Put the text at a path and write the file; returns what takes it back."""
        holder: Any = self._data
        for key in field[:-1]:
            holder = holder[key]
        before, holder[field[-1]] = holder[field[-1]], text
        self._write()

        def back() -> None:
            holder[field[-1]] = before
            self._write()

        return back

    def _write(self) -> None:
        lines = [f"{json.dumps(key)} = {_inline(value)}" for key, value in self._data.items()]
        self.file.write_text("\n".join(lines) + "\n", encoding="utf-8")


def _texts(value: Any, path: Path_ = ()) -> Iterator[Path_]:
    if isinstance(value, str):
        yield path
    elif isinstance(value, dict):
        for key, each in value.items():
            yield from _texts(each, (*path, key))
    elif isinstance(value, list):
        for place, each in enumerate(value):
            yield from _texts(each, (*path, place))


def _inline(value: Any) -> str:
    """A value as TOML on one line."""
    if isinstance(value, dict):
        return f"{{ {', '.join(f'{json.dumps(k)} = {_inline(v)}' for k, v in value.items())} }}"
    if isinstance(value, list):
        return f"[{', '.join(map(_inline, value))}]"
    if isinstance(value, date):
        return value.isoformat()
    return json.dumps(value, ensure_ascii=False).replace("\x7f", "\\u007f")


def spoilable(folder: Path) -> list[tuple[Sheet | Tree, Callable[[], object]]]:
    """Each of the planner's files in `folder`, and how it is understood."""

    def stock() -> object:
        return load_stock([folder / "lots.csv", folder / "consumables.csv"], new_id=new_id)

    def meters() -> object:
        return load_instruments(folder / "instruments.toml", new_id=new_id)

    def plan() -> object:
        return load_plan(folder / "plan", lots={"L-3504": "lot1"}, new_id=new_id)

    sheets: list[tuple[Sheet | Tree, Callable[[], object]]] = [
        *((Sheet(folder / name), stock) for name in ("lots.csv", "consumables.csv")),
        *((Sheet(folder / "plan" / name), plan) for name in ("grids.csv", "circuits.csv")),
        *((Tree(folder / "plan" / name), plan) for name in ("campaign.toml", "criteria.toml")),
        (Tree(folder / "instruments.toml"), meters),
    ]
    return sheets


def every_field() -> Iterator[tuple[int, Any]]:
    """Each file by its place in `spoilable`, and each of its fields."""
    for number, (file, _) in enumerate(spoilable(SMALL_JOB)):
        for field in file.fields():
            yield number, field


def spoil(folder: Path, text: str = HOSTILE) -> list[str]:
    """The small job in `folder` with `text` in every field that keeps it; returns which do."""
    shutil.copytree(SMALL_JOB, folder, dirs_exist_ok=True)
    kept: list[str] = []
    for file, understood in spoilable(folder):
        for field in file.fields():
            back = file.put(field, f"{text}{len(kept)}")
            try:
                understood()
            except Faulty:
                back()
            else:
                kept.append(f"{file.file.name} {field}")
    return kept
