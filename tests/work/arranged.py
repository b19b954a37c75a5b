"""A job with a circuit of one arrangement, and its points walked from plan to draft record."""

from __future__ import annotations

import csv
from dataclasses import dataclass
from pathlib import Path

from gaugelog.intake.instruments import load_instruments
from gaugelog.intake.stock import load_stock
from gaugelog.journal.ids import new_id
from gaugelog.ledger.points import PointRow
from gaugelog.ledger.stock import LotRow
from gaugelog.rules.fit import PlanFinding
from gaugelog.work import instruments, plan, steps, stock
from tests.work.job import DEMO, TYPED, Job, start_job

LOTS = (
    "lot,pack,pieces,maker,type,pattern,grid_angles_deg,resistance_ohm,"
    "resistance_tolerance_percent,gauge_factor,gauge_factor_tolerance_percent,"
    "transverse_sensitivity_percent,grid_length_mm,grid_width_mm,received_on,"
    "expansion_class_ppm_per_K,strain_limit_um_per_m,test_voltage_max_V\n"
    "S-1,S,20,Lindmoor Foil Works,linear,,,350,0.3,2.08,1,0.4,6,2.8,2026-09-14,11,20000,50\n"
    "T-1,T,20,Lindmoor Foil Works,tee,tee,0; 90,350,0.3,2.08; 2.06,1,0.4; -0.2,6,2.8,2026-09-14,"
    "11,20000,50\n"
    "P-1,P,20,Lindmoor Foil Works,shear,shear pair,0; 90,350,0.3,2.05; 2.05,1,0.4,6,2.8,"
    "2026-09-14,11,20000,50\n"
    "R-1,R,20,Lindmoor Foil Works,rosette,rectangular,0; 45; 90,350,0.3,2.08; 2.10; 2.07,1,"
    "0.4; 0.6; 0.5,6,2.8,2026-09-14,11,20000,50\n"
    "D-1,D,20,Lindmoor Foil Works,delta,delta,0; 60; 120,350,0.3,2.08; 2.09; 2.08,1,0.4,6,2.8,"
    "2026-09-14,11,20000,50\n"
)

_POINT = {
    "article": "girder",
    "zone": "midspan",
    "purpose": "Strain under the test vehicle",
    "load": "static",
    "strain_min_um_per_m": "-600",
    "strain_max_um_per_m": "600",
    "temperature_min_degC": "-5",
    "temperature_max_degC": "35",
    "permitted_error_um_per_m": "5",
    "datum": "midspan mark",
    "x_mm": "0",
    "y_mm": "0",
    "side": "underside",
    "axis": "length of the girder",
    "axis_deg": "0",
    "place_tolerance_mm": "1",
    "axis_tolerance_deg": "2",
    "lot": "S-1",
    "route": "room-temperature-bond-metal",
}
_COUNT = {"single": 1, "tee": 2, "shear pair": 2, "rectangular": 3, "delta": 3}
_LOT = {"tee": "T-1", "shear pair": "P-1", "rectangular": "R-1", "delta": "D-1"}
_WAY = {"numbering": "counter-clockwise", "seen_from": "gauge side"}

MODULE = "module 350 ohm"


@dataclass(frozen=True)
class Sketch:
    """A plan in short: points (label, pattern; `dummy` for a dummy) and circuits by their arms.

    A circuit is its arrangement, its four arms and its number of wires.
    """

    points: tuple[tuple[str, str], ...]
    circuits: tuple[tuple[str, tuple[str, str, str, str], int], ...]
    supply: str = "separate"
    shunt: tuple[int, str, str] = (1, "supply-", "signal+")
    """Arm and pins of each channel's shunt of 100 kΩ."""


def write_plan(folder: Path, sketch: Sketch) -> Path:
    """The files of a plan in `folder`, with the demo's campaign and criteria; its own channels."""
    folder.mkdir()
    criteria = (DEMO / "plan" / "criteria.toml").read_text(encoding="utf-8")
    campaign = (DEMO / "plan" / "campaign.toml").read_text(encoding="utf-8")
    head = campaign[: campaign.index("  [[module.channel]]")]
    channels = "".join(_channel(sketch, number) for number, _ in enumerate(sketch.circuits, 1))
    (folder / "criteria.toml").write_text(criteria, encoding="utf-8")
    (folder / "campaign.toml").write_text(head + channels, encoding="utf-8")
    _table(folder / "grids.csv", [row for point in sketch.points for row in _rows(*point)])
    _table(folder / "circuits.csv", [_circuit(*each) for each in enumerate(sketch.circuits, 1)])
    return folder


def _channel(sketch: Sketch, number: int) -> str:
    arm, low, high = sketch.shunt
    return (
        f'  [[module.channel]]\n  label = "{number}"\n  connector = "J{number}"\n'
        '  excitation = "2.5 V"\n  range = "10 mV/V"\n'
        f'  supply = "{sketch.supply}"\n'
        f'  shunt = {{ value = "100 kohm", arm = {arm}, between = ["{low}", "{high}"] }}\n'
    )


def _rows(label: str, pattern: str) -> list[dict[str, str]]:
    dummy, pattern = pattern == "dummy", "single" if pattern == "dummy" else pattern
    first = {"point": label, **_POINT, "pattern": pattern, "lot": _LOT.get(pattern, "S-1")}
    first |= _WAY if pattern not in {"single", "tee"} else {}
    if dummy:
        first |= {"dummy": "yes", "strain_min_um_per_m": "0", "strain_max_um_per_m": "0"}
    count = _COUNT[pattern]
    others = [{"point": label, "grid": str(number)} for number in range(2, count + 1)]
    return [first | ({"grid": "1"} if count > 1 else {}), *others]


def _circuit(number: int, circuit: tuple[str, tuple[str, str, str, str], int]) -> dict[str, str]:
    arrangement, arms, wires = circuit
    return {
        "circuit": f"C-{number}",
        "arrangement": arrangement,
        **{f"arm{place}": arm for place, arm in enumerate(arms, 1)},
        "wires": str(wires),
        "length_m": "9",
        "wire_ohm_per_m": "0.055",
        "module": "M1",
        "channel": str(number),
    }


def _table(file: Path, rows: list[dict[str, str]]) -> None:
    columns = list(dict.fromkeys(column for row in rows for column in row))
    with file.open("w", encoding="utf-8", newline="") as target:
        writer = csv.DictWriter(target, columns, restval="", lineterminator="\n")
        writer.writeheader()
        writer.writerows(rows)


def planned_job(home: Path, sketch: Sketch) -> Job:
    """A logbook with stock and meters and the sketch's plan as a draft."""
    job = start_job(home)
    planner = job.keys["c.ward"]
    (home / "lots.csv").write_text(LOTS, encoding="utf-8")
    files = [home / "lots.csv", DEMO / "consumables.csv"]
    stock.receive(job.book, planner, load_stock(files, new_id=new_id))
    instruments.add(job.book, planner, load_instruments(DEMO / "instruments.toml", new_id=new_id))
    plan.load(job.book, planner, plan.understand(job.book, write_plan(home / "plan", sketch)))
    return job


def released(home: Path, sketch: Sketch) -> Job:
    """The same with the plan released."""
    job = planned_job(home, sketch)
    plan.release(job.book, job.keys["c.ward"], meaning="I release.")
    return job


def refusals(home: Path, sketch: Sketch) -> list[PlanFinding]:
    """What the plan check refuses."""
    found = plan.check(planned_job(home, sketch).book)
    return [finding for finding in found if finding.level == "refusal"]


class Walker:
    """Walks the points of a job; `readings` are what is typed on each circuit, by step.

    A reading that a circuit does not have (a loop of wires, where none is) is skipped.
    """

    def __init__(self, job: Job) -> None:
        self.job = job
        self.readings: dict[str, dict[str, str]] = {}
        with job.book.reading() as view:
            self.points = [row.label for row in view.all(PointRow)]
        self.done: list[tuple[str, str, str]] = []
        """Point, step and subject of everything that was done, in order."""

    def all(self) -> None:
        """Every point to the end, each as far as it goes before the next one's turn."""
        moved = True
        while moved:
            moved = sum(self.to(point) for point in self.points) > 0

    def to(self, point: str, step: str = "") -> bool:
        """Walk a point before `step`, or to the end, or until it waits; whether it moved."""
        moved = False
        while (found := steps.next_step(self.job.book, point)).step is not None:
            # Windows that open later are waited out by the minutes between steps.
            if found.step.id == step or any("waits for" in block for block in found.blocks):
                return moved
            self._do(point, found.step.id, found.subject_label)
            moved = True
        return moved

    def _do(self, point: str, step: str, subject: str) -> None:
        who, typed = TYPED[step]
        own = self.readings.get(subject, {})
        if step in {"loop", "shunt"} and step not in own:
            key = self.job.keys["t.okoro"]
            self.job.clock.advance(60)
            steps.skip(self.job.book, key, point=point, reason=f"no {step} here")
        else:
            piece = {"gauge": self._piece(point)} if step == "gauge" else {}
            given = {**typed, **piece, **({step: own[step]} if step in own else {})}
            given |= {"channel": subject.removeprefix("C-")} if "channel" in given else {}
            self.job.do(who, given, point, minutes=35 if step != "bond" else 5)
        self.done.append((point, step, subject))

    def _piece(self, point: str) -> str:
        with self.job.book.reading() as view:
            row = view.point(point)
            assert row is not None
            pack = {each.id: each.label for each in view.all(LotRow)}[row.lot][0]
        return f"{pack}/{self.points.index(point) + 1}"
