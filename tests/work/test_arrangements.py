"""Every arrangement walked from plan to record: what is asked, predicted, shared and refused."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.ledger.circuits import CircuitPlanned, CircuitRow
from gaugelog.ledger.view import View
from gaugelog.physics.prediction import added_strain, output
from gaugelog.rules.shunt import shunt_place, shunt_places
from gaugelog.rules.wired import wired
from gaugelog.work import reviews, steps
from gaugelog.work.history import check_logbook
from tests.work.arranged import MODULE, Sketch, Walker, released
from tests.work.job import Job, PlainMaker

ONE = (("A", "single"),)
TWO = (("A", "single"), ("B", "single"))
FOUR = (("A", "single"), ("B", "single"), ("C", "single"), ("D", "single"))
HALF = ("grid A", "grid B", MODULE, MODULE)
FULL = ("grid A", "grid B", "grid C", "grid D")
QUARTER = (MODULE, MODULE, MODULE)

SKETCHES = {
    "quarter two-wire": Sketch(ONE, (("quarter two-wire", ("grid A", *QUARTER), 2),)),
    "quarter three-wire": Sketch(ONE, (("quarter three-wire", ("grid A", *QUARTER), 3),)),
    "half with dummy": Sketch(
        (("A", "single"), ("B", "dummy")),
        (("half with dummy", ("grid A", "dummy B", MODULE, MODULE), 3),),
    ),
    "half bending": Sketch(TWO, (("half bending", HALF, 3),)),
    "half bending, sensed": Sketch(TWO, (("half bending", HALF, 5),)),
    "half Poisson of a tee": Sketch(
        (("A", "tee"),), (("half Poisson", ("grid A.1", "grid A.2", MODULE, MODULE), 3),)
    ),
    "opposite arms": Sketch(
        TWO,
        (("opposite arms", ("grid A", "completion 350 ohm", "grid B", "completion 350 ohm"), 4),),
    ),
    "opposite arms, module's own": Sketch(
        TWO, (("opposite arms", ("grid A", MODULE, "grid B", MODULE), 4),)
    ),
    "full bending": Sketch(FOUR, (("full bending", FULL, 4),)),
    "full bending, sensed": Sketch(FOUR, (("full bending", FULL, 6),)),
    "full torsion of two shear pairs": Sketch(
        (("A", "shear pair"), ("B", "shear pair")),
        (("full torsion", ("grid A.1", "grid A.2", "grid B.1", "grid B.2"), 4),),
        shunt=(4, "signal-", "supply-"),
    ),
    "full Poisson of two tees": Sketch(
        (("A", "tee"), ("B", "tee")),
        (("full Poisson", ("grid A.1", "grid A.2", "grid B.1", "grid B.2"), 4),),
        shunt=(2, "signal+", "supply+"),
    ),
    "rectangular rosette": Sketch(
        (("A", "rectangular"),),
        tuple(("quarter three-wire", (f"grid A.{n}", *QUARTER), 3) for n in (1, 2, 3)),
    ),
    "delta rosette": Sketch(
        (("A", "delta"),),
        tuple(("quarter three-wire", (f"grid A.{n}", *QUARTER), 3) for n in (1, 2, 3)),
    ),
}


def predictions(job: Job, sketch: Sketch) -> dict[str, dict[str, str]]:
    """What each circuit must read by nodal analysis, once every gauge has its resistance."""
    with job.book.reading() as view:
        return {row.label: _predicted(view, row, sketch) for row in view.all(CircuitRow)}


def _predicted(view: View, row: CircuitRow, sketch: Sketch) -> dict[str, str]:
    found = wired(view, CircuitPlanned.model_validate_json(row.data))
    circuit, (_, low, high) = found.circuit, sketch.shunt
    place = shunt_place(circuit, (low, high))
    assert place is not None
    nodes = shunt_places(circuit)[place]
    factors = found.factor, row.arrangement, found.poisson
    strain = float(added_strain(circuit, 100e3, nodes, *factors)) * 1e6
    wires = circuit.layout.wires
    loop = {"loop": "0.99 ohm"} if len(set(wires.values())) < len(wires) else {}
    zero = f"{float(output(circuit)) * 1e3:.3f} mV/V"
    return {"zero": zero, "shunt": f"{strain:.1f} um/m", **loop}


def walk(home: Path, name: str) -> Walker:
    """A sketch walked to the end of every route."""
    sketch = SKETCHES[name]
    job = released(home, sketch)
    walker = Walker(job)
    for _ in range(len(walker.points)):
        for point in walker.points:
            walker.to(point, "loop")
    walker.readings = predictions(job, sketch)
    walker.all()
    return walker


@pytest.mark.parametrize("name", SKETCHES)
def test_an_arrangement_is_walked_from_plan_to_record(tmp_path: Path, name: str) -> None:
    walker = walk(tmp_path, name)
    job = walker.job
    assert {"submit the record"} == {each.title for each in steps.worklist(job.book)}
    zeros = [subject for _, step, subject in walker.done if step == "zero"]
    assert sorted(zeros) == [f"C-{n}" for n, _ in enumerate(SKETCHES[name].circuits, 1)]
    for point in walker.points:
        assert reviews.draft(job.book, PlainMaker(), point=point).pdf
        job.submit(point)
        job.accept(point=point)
    assert check_logbook(job.book).ok
