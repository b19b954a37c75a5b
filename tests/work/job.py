"""A small job for tests: a logbook with people, stock, meters and a released plan, quickly."""

from __future__ import annotations

import shutil
from dataclasses import dataclass
from datetime import UTC, datetime
from pathlib import Path
from typing import Any

from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.route import shipped_routes
from gaugelog.intake.stock import load_stock
from gaugelog.journal.clock import Moment, SetClock
from gaugelog.journal.ids import new_id
from gaugelog.journal.keys import KeyFolder, Signer, UnlockedKey
from gaugelog.ledger.view import View
from gaugelog.work import instruments, people, plan, reviews, steps, stock
from gaugelog.work.logbook import Logbook
from gaugelog.work.people import Newcomer
from gaugelog.work.ports import RecordRequest, Stamp

DEMO = Path(__file__).parents[1] / "small_job"
WORD = "long enough"
START = datetime(2026, 11, 17, 8, 0, tzinfo=UTC)
CHEAP_ROUNDS = 1000

PEOPLE = (
    Newcomer("c.ward", "Cleo Ward", "CW", ("custodian", "planner")),
    Newcomer("t.okoro", "Tobe Okoro", "TO", ("technician",)),
    Newcomer("q.reyes", "Quilla Reyes", "QR", ("reviewer",)),
)

INSULATION = {
    "unplugged": "yes",
    "joined": "yes",
    "bare-metal": "yes",
    "tester": "IT-5",
    "steady": "yes",
    "discharged": "yes",
}
"""The tick-offs of an insulation reading and its tester."""

TYPED: dict[str, tuple[str, dict[str, str]]] = {
    "access": ("t.okoro", {"safe": "yes"}),
    "gauge": ("t.okoro", {"gauge": "K7-03/1", "meter": "RM-2", "resistance": "350.12 ohm"}),
    "clean": ("t.okoro", {"cleaner": "CL-301", "finish": "220 grit"}),
    "layout": ("t.okoro", {"x": "0 mm", "y": "0 mm", "axis": "0 deg"}),
    "layout-hold": ("q.reyes", {}),
    "condition": ("t.okoro", {"clean": "yes"}),
    "bond": (
        "t.okoro",
        {"adhesive": "AD-612", "air": "20 degC", "humidity": "50 %RH", "surface": "19 degC"},
    ),
    "bonded": ("t.okoro", {"meter": "RM-2", "resistance": "350.50 ohm"}),
    "insulation": ("t.okoro", {**INSULATION, "insulation": ">20 GΩ"}),
    "wires": ("t.okoro", {"solder": "SO-17", "flux-removed": "yes"}),
    "cabled": ("t.okoro", {**INSULATION, "insulation": ">20 GΩ"}),
    "coating-hold": ("q.reyes", {}),
    "coat": ("t.okoro", {"coating": "CT-088", "mixed": "15 min"}),
    "coated": ("t.okoro", {**INSULATION, "insulation": "18 GΩ"}),
    "loop": (
        "t.okoro",
        {"meter": "RM-2", "loop": "1.98 ohm", "first": "352.48 ohm", "second": "352.49 ohm"},
    ),
    "zero": ("t.okoro", {"module": "QB-1", "zero": "0.36 mV/V"}),
    "shunt": ("t.okoro", {"module": "QB-1", "shunt": "-1696 um/m"}),
    "polarity": (
        "t.okoro",
        {"module": "QB-1", "channel": "1", "expected": "+", "pushed": "31.2 um/m"},
    ),
    "press": (
        "t.okoro",
        {"module": "QB-1", "before": "0.1 um/m", "pressed": "38 um/m", "after": "0.4 um/m"},
    ),
    "noise": ("t.okoro", {"module": "QB-1", "bandwidth": "100 Hz", "noise": "0.4 um/m"}),
    "watch": ("t.okoro", {"zero": "0.4 um/m", "gauge-temperature": "19.0 degC"}),
    "drift": (
        "t.okoro",
        {"module": "QB-1", "gauge-temperature": "19.5 degC", "drift": "1.1 um/m"},
    ),
    "finish": ("t.okoro", {"labelled": "yes"}),
}
"""Who types what at each step of the shipped route, by its id, for point FB-1."""

WALK = tuple(TYPED.values())
"""The same in the order of the route."""


def before(step: str) -> int:
    """How many steps of the route come before one."""
    return list(TYPED).index(step)


LAYOUT = WALK[3][1]
FB_2_LAYOUT = {"x": "150 mm", "y": "220 mm", "axis": "90 deg"}
"""The planned places of the two points."""

MINUTES = 35
"""How long after the last step each step is done: inside every window of the route."""


class PlainMaker:
    """A record maker for tests of deeds: bytes that name what was asked for, no page."""

    def draft(self, view: View, request: RecordRequest) -> bytes:
        """A draft."""
        return f"draft {request.point}".encode()

    def submitted(self, view: View, request: RecordRequest, signer: Signer) -> bytes:
        """A record signed once."""
        return f"{request.point} r{request.revision} {signer.person} {request.head}".encode()

    def accepted(self, pdf: bytes, stamp: Stamp, signer: Signer) -> bytes:
        """A record signed twice."""
        return pdf + f" and {signer.person}".encode()


@dataclass
class Job:
    """An open logbook, its clock and its people's keys."""

    book: Logbook
    clock: SetClock
    folder: KeyFolder
    keys: dict[str, UnlockedKey]

    def do(
        self,
        who: str,
        typed: dict[str, str],
        point: str = "FB-1",
        minutes: float = MINUTES,
        **more: Any,
    ) -> steps.StepOutcome:
        """Do the next step `minutes` after the last."""
        self.clock.advance(60 * minutes)
        typed = FB_2_LAYOUT if typed == LAYOUT and point == "FB-2" else typed
        typed = {**typed, "channel": "2"} if "channel" in typed and point == "FB-2" else typed
        return steps.do(self.book, self.keys[who], point=point, typed=typed, **more)

    def walk(self, count: int = len(WALK), point: str = "FB-1", gauge: str = "K7-03/1") -> None:
        """Do the first `count` steps of a point."""
        for who, typed in WALK[:count]:
            given = {**typed, "gauge": gauge} if "gauge" in typed else typed
            self.do(who, given, point)

    def submit(self, point: str = "FB-1") -> reviews.SignedOff:
        """Submit a point as the technician."""
        self.clock.advance(60)
        return reviews.submit(
            self.book, self.keys["t.okoro"], PlainMaker(), point=point, meaning="I submit."
        )

    def accept(self, who: str = "q.reyes", point: str = "FB-1") -> reviews.SignedOff:
        """Accept a point as a reviewer."""
        self.clock.advance(60)
        return reviews.accept(
            self.book, self.keys[who], PlainMaker(), point=point, meaning="I accept."
        )

    def state(self, point: str = "FB-1") -> str:
        """The state of a point."""
        return steps.next_step(self.book, point).state


def start_job(home: Path) -> Job:
    """A logbook in `home`/book with three people, nothing else."""
    clock = SetClock(Moment(START, 0, new_id(), 1_000_000))
    folder = KeyFolder(home / "keys", CHEAP_ROUNDS)
    book = people.start(
        home / "book",
        keys_of=lambda _id: folder,
        name="Job",
        custodian=PEOPLE[0],
        passphrase=WORD,
        clock=clock,
    )
    keys = {PEOPLE[0].person: folder.unlock(PEOPLE[0].person, WORD)}
    authority = folder.unlock_authority(WORD)
    for newcomer in PEOPLE[1:]:
        keys[newcomer.person] = people.enrol(
            book, keys["c.ward"], authority, folder, newcomer=newcomer, passphrase=WORD
        )
    return Job(book, clock, folder, keys)


def released_job(home: Path, files: Path = DEMO) -> Job:
    """A logbook with the demo's stock, meters and released plan, or those of other files."""
    job = start_job(home)
    planner = job.keys["c.ward"]
    received = load_stock([files / "lots.csv", files / "consumables.csv"], new_id=new_id)
    stock.receive(job.book, planner, received)
    meters = load_instruments(files / "instruments.toml", new_id=new_id)
    instruments.add(job.book, planner, meters)
    plan.load(job.book, planner, plan.understand(job.book, files / "plan"))
    plan.release(job.book, planner, meaning="I release.")
    return job


def changed_files(home: Path, *changes: tuple[str, str, str]) -> Path:
    """A copy of the demo's files with texts replaced, each change (file, old, new).

    A file that is not there is a shipped route, copied for the planner to change.
    """
    files = home / "files"
    shutil.copytree(DEMO, files)
    for name, old, new in changes:
        path = files / name
        if not path.exists():
            path.write_bytes(shipped_routes()[path.stem])
        text = path.read_text(encoding="utf-8")
        assert old in text
        path.write_text(text.replace(old, new), encoding="utf-8")
    return files


def copied(source: Path, target: Path, clock: SetClock | None = None) -> Logbook:
    """A copy of a logbook's folder, opened."""
    shutil.copytree(source, target)
    return Logbook.open(target, clock=clock)
