"""The screen's speed: first frame, Enter to the next step, a worklist of two thousand points."""

from __future__ import annotations

import asyncio
import sqlite3
import statistics
import subprocess
import sys
import time
from collections.abc import Awaitable, Callable, Sequence
from pathlib import Path
from typing import Any

import pytest
from cryptography.hazmat.primitives.asymmetric import ec
from cryptography.hazmat.primitives.hashes import SHA256
from textual.app import App, ComposeResult
from textual.containers import Horizontal, VerticalScroll
from textual.widgets import DataTable, Input, OptionList, Static

from gaugelog.screens import app as app_module
from gaugelog.screens.rail import Rail
from gaugelog.screens.step import StepScreen
from gaugelog.screens.words import Words
from gaugelog.screens.worklist import WorklistScreen
from gaugelog.work import looking, steps
from tests.bench.compare import Comparison, compare
from tests.screens.pilot import LARGE, Seen, run_screen
from tests.work.job import Job, released_job

pytestmark = [pytest.mark.bench, pytest.mark.xdist_group("bench")]

POINTS = 2000
_TIMES = 20

OURS = """
import os
import sys
from pathlib import Path
from gaugelog.screens.app import FullScreen

class Once(FullScreen):
    def on_mount(self):
        self.call_later(self._wait)

    def _wait(self):
        self.screen.call_after_refresh(lambda: os._exit(0))  # the first frame is there

home = Path(sys.argv[1])

def desk():
    from gaugelog.journal.keys import KeyFolder
    from gaugelog.screens.desk import Desk
    from gaugelog.work.logbook import Logbook
    return Desk(Logbook.open(home / "book"), KeyFolder(home / "keys"), None, home / "drafts")

Once(desk).run(headless=True)
sys.exit("no frame came")
"""

BARE = """
import os
import sys
import sqlmodel
from textual.app import App
from textual.widgets import Input, Static

class Bare(App):
    def compose(self):
        for number in range({statics}):
            yield Static(f"line {{number}}")
        yield Input()
        yield Input()

    def on_mount(self):
        self.call_later(self._wait)

    def _wait(self):
        self.screen.call_after_refresh(lambda: os._exit(0))  # the first frame is there

Bare().run(headless=True)
sys.exit("no frame came")
"""


@pytest.fixture
def job(tmp_path: Path) -> Job:
    """A released job."""
    return released_job(tmp_path)


def _told(found: Comparison, name: str, capsys: pytest.CaptureFixture[str]) -> None:
    with capsys.disabled():
        print("\n" + found.line(name))


def test_the_first_frame(job: Job, tmp_path: Path, capsys: pytest.CaptureFixture[str]) -> None:
    widgets: list[int] = []

    async def count(seen: Seen) -> None:
        widgets.append(len(list(seen.app.screen.walk_children())))

    run_screen(job.book, job.folder, count)
    job.book.storage.close()
    ours, bare = tmp_path / "ours.py", tmp_path / "bare.py"
    ours.write_text(OURS, encoding="utf-8")
    bare.write_text(BARE.format(statics=widgets[0] - 2), encoding="utf-8")

    def run(*command: str) -> None:
        subprocess.run([sys.executable, *command], capture_output=True, check=True)

    found = compare(lambda: run(str(ours), str(tmp_path)), lambda: run(str(bare)), repeats=9)
    _told(found, f"first frame, {widgets[0]} widgets", capsys)
    assert found.ratio <= 1.5


async def _until(done: Callable[[], bool]) -> None:
    while not done():
        await asyncio.sleep(0.002)


async def _drawn(app: App[Any]) -> None:
    """Until everything that waits to be drawn is drawn."""
    drawn = asyncio.Event()
    app.screen.call_after_refresh(drawn.set)
    await drawn.wait()


Texts = dict[str, str]
"""What stands in each piece of text of a step, by its id."""

_PIECES = ("title", "instruction", "cautions", "holding", "attempts", "facts")
_FIELDS = 3


def _texts(room: StepScreen) -> Texts:
    found = {name: room.query_one(f"#{name}", Words).text for name in _PIECES}
    rail = room.query_one(Rail)
    return {**found, "route": str(rail.render()), "talk": room.talk}


class _Bare(App[None]):
    """As much text as two steps have and as many fields, no work: Enter commits and redraws."""

    CSS_PATH = Path(app_module.__file__).with_name("look.tcss")

    def __init__(self, states: tuple[Texts, Texts], commit: Callable[[], None]) -> None:
        super().__init__()
        self._states, self._commit = states, commit
        self.shown = 0

    def compose(self) -> ComposeResult:
        with Horizontal(id="hand"):
            yield Static(id="route", markup=False)
            with VerticalScroll(id="step"):
                for name in _PIECES:
                    yield Static(id=name, markup=False)
                for number in range(_FIELDS):
                    yield Horizontal(
                        Static("A prompt of a field", classes="asks"),
                        Input(id=f"i{number}", compact=True),
                        Static("unit", classes="unit"),
                        classes="field",
                        id=f"f{number}",
                    )
        yield Static(id="talk", markup=False)
        yield Static("f1 Help  f2 Worklist", id="keys")

    def on_mount(self) -> None:
        self.show()

    def show(self) -> None:
        for name, text in self._states[self.shown % 2].items():
            piece = self.query_one(f"#{name}", Static)
            piece.update(text)
            piece.display = bool(text)
        for number in range(1, _FIELDS):
            self.query_one(f"#f{number}").display = self.shown % 2 == 1
        self.query_one(Input).focus()

    def on_input_submitted(self) -> None:
        self._commit()
        self.shown += 1
        self.show()


def _commit(folder: Path) -> Callable[[], None]:
    connection = sqlite3.connect(folder / "bare.db", isolation_level=None)
    connection.execute("PRAGMA journal_mode = WAL")
    connection.execute("PRAGMA synchronous = FULL")
    connection.execute("CREATE TABLE entry (seq INTEGER PRIMARY KEY, header BLOB, body BLOB)")
    key = ec.generate_private_key(ec.SECP256R1())

    def act() -> None:
        connection.execute("BEGIN IMMEDIATE")
        signature = key.sign(b"h" * 700, ec.ECDSA(SHA256()))
        connection.execute(
            "INSERT INTO entry (header, body) VALUES (?, ?)", (b"h" * 700 + signature, b"b" * 1500)
        )
        connection.execute("COMMIT")

    return act


def test_enter_to_the_next_step_drawn(
    job: Job, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    ours: list[float] = []
    states: list[Texts] = []

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        await seen.type("FB-1")
        for _ in range(_TIMES):
            room = seen.room
            assert isinstance(room, StepScreen)
            await seen.keys("space")
            room.entry.live[0].input.value = "yes"
            await seen.rest()
            states.append(_texts(room))
            start = time.perf_counter()
            await room.entry.live[0].input.action_submit()
            await _until(lambda room=room: len(room.entry.live) == _FIELDS)  # type: ignore[misc]
            await _drawn(seen.app)
            ours.append(time.perf_counter() - start)
            await seen.rest()
            states.append(_texts(room))
            steps.redo(job.book, job.keys["t.okoro"], point="FB-1", step="access", reason="again")
            room.facts_changed()
            await seen.rest()

    run_screen(job.book, job.folder, play, size=LARGE)
    floor: list[float] = []

    async def bare() -> None:
        app = _Bare((states[0], states[1]), _commit(tmp_path))
        async with app.run_test(size=LARGE) as pilot:
            for number in range(1, 2 * _TIMES + 1):
                await pilot.pause()
                start = time.perf_counter()
                await app.query_one(Input).action_submit()
                await _until(lambda number=number: app.shown == number)  # type: ignore[misc]
                await _drawn(app)
                floor.append(time.perf_counter() - start)

    asyncio.run(bare())
    # The least of each: what else the machine does can only add to it.
    found = Comparison(min(ours), min(floor[::2]))
    _told(found, "Enter to the next step drawn", capsys)
    assert found.ratio <= 2


def _many(job: Job) -> None:
    """The ledger with two thousand points: the first one's rows, again under other ids."""
    with job.book.storage.writing() as writer:
        connection = writer.connection
        point = dict(_row(connection, "SELECT * FROM point WHERE label = 'FB-1'"))
        grid = dict(_row(connection, "SELECT * FROM grid WHERE label = 'FB-1'"))
        for number in range(POINTS - 2):
            new_point, new_grid = f"{point['id']}{number}", f"{grid['id']}{number}"
            data = point["data"].replace(grid["id"], new_grid).replace(point["id"], new_point)
            label, zone = f"MP-{number:04d}", f"span {number // 100}"
            _insert(
                connection,
                "point",
                {**point, "id": new_point, "label": label, "zone": zone, "data": data},
            )
            _insert(
                connection, "grid", {**grid, "id": new_grid, "point": new_point, "label": label}
            )


def _row(connection: sqlite3.Connection, query: str) -> list[tuple[str, Any]]:
    cursor = connection.execute(query)
    names = [column[0] for column in cursor.description]
    return list(zip(names, cursor.fetchone(), strict=True))


def _insert(connection: sqlite3.Connection, table: str, row: dict[str, Any]) -> None:
    marks = ", ".join("?" * len(row))
    names = ", ".join(f'"{name}"' for name in row)
    statement = f"INSERT INTO {table} ({names}) VALUES ({marks})"  # noqa: S608 (our own names)
    connection.execute(statement, tuple(row.values()))


class _BareTable(App[None]):
    """A table of as many rows and columns."""

    def __init__(self, rows: Sequence[tuple[str, ...]]) -> None:
        super().__init__()
        self.rows = rows

    def compose(self) -> ComposeResult:
        yield DataTable()

    def fill(self, wanted: str = "") -> None:
        table = self.query_one(DataTable)
        table.clear()
        table.add_rows(row for row in self.rows if wanted in row[0])


async def _timed(app: App[Any], act: Callable[[], Awaitable[None] | None]) -> float:
    start = time.perf_counter()
    waiting = act()
    if waiting is not None:
        await waiting
    await _drawn(app)
    return time.perf_counter() - start


def test_a_worklist_of_two_thousand_points(job: Job, capsys: pytest.CaptureFixture[str]) -> None:
    _many(job)
    start = time.perf_counter()
    listed = looking.for_person(job.book, "t.okoro")
    read = time.perf_counter() - start
    assert POINTS == len(listed)
    ours: dict[str, list[float]] = {"open": [], "scroll": [], "filter": []}

    async def play(seen: Seen) -> None:
        await seen.sign_on()
        room = seen.room
        assert isinstance(room, WorklistScreen)
        table, find = room.query_one(OptionList), room.query_one("#find", Input)
        for _ in range(5):
            ours["open"].append(await _timed(seen.app, room._draw))
            ours["scroll"].append(await _timed(seen.app, table.action_page_down))
            _set(find, "MP-19")
            ours["filter"].append(await _timed(seen.app, room._draw))
            _set(find, "")
            await seen.rest()

    run_screen(job.book, job.folder, play, size=LARGE)
    rows = [
        (each.next.point, each.next.zone, each.next.state, each.next.title, "do the step")
        for each in listed
    ]
    floor: dict[str, list[float]] = {"open": [], "scroll": [], "filter": []}

    async def bare() -> None:
        app = _BareTable(rows)
        async with app.run_test(size=LARGE) as pilot:
            table = app.query_one(DataTable)
            table.add_columns("point", "zone", "state", "next step", "what holds")
            for _ in range(5):
                floor["open"].append(await _timed(app, app.fill))
                floor["scroll"].append(await _timed(app, table.action_page_down))
                floor["filter"].append(await _timed(app, lambda: app.fill("MP-19")))
                await pilot.pause()

    asyncio.run(bare())
    with capsys.disabled():
        print(f"\n{POINTS} points read from the ledger: {read * 1e3:.0f} ms")
    for name, times in ours.items():
        found = Comparison(statistics.median(times), statistics.median(floor[name]))
        _told(found, f"worklist of {POINTS}, {name}", capsys)
        # The issue sets no bound; this one keeps a slip of an order of magnitude from passing.
        assert found.ratio <= 5


def _set(field: Input, text: str) -> None:
    with field.prevent(Input.Changed):
        field.value = text
