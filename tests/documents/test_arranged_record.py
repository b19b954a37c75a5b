"""The record of a point that shares its circuit, of a dummy, and of a rosette."""

from __future__ import annotations

from pathlib import Path

import pytest

from gaugelog.documents.content import RecordContent, build
from gaugelog.documents.page import record_html
from gaugelog.work.ports import RecordRequest
from tests.work.test_arrangements import walk


def content(home: Path, name: str, label: str) -> RecordContent:
    """The draft record of a point of a walked arrangement."""
    job = walk(home, name).job
    with job.book.reading() as view:
        row = view.point(label)
        assert row is not None
        request = RecordRequest(row.id, 1, job.book.head().printed, job.book.clock.now(), "")
        return build(view, request)


@pytest.fixture(scope="module")
def dummy(tmp_path_factory: pytest.TempPathFactory) -> RecordContent:
    """The record of the dummy of a half bridge."""
    return content(tmp_path_factory.mktemp("dummy"), "half with dummy", "B")


@pytest.fixture(scope="module")
def rosette(tmp_path_factory: pytest.TempPathFactory) -> RecordContent:
    """The record of a rectangular rosette."""
    return content(tmp_path_factory.mktemp("rosette"), "rectangular rosette", "A")


def test_a_circuits_steps_and_readings_stand_in_each_points_record(dummy: RecordContent) -> None:
    # Point A's turn came first, so the readings of C-1 were entered there.
    shared = [(each.check, each.subject) for each in dummy.readings if each.subject == "C-1"]
    kinds = ("zero offset", "shunt", "channel", "polarity", "noise", "zero drift")
    assert [(kind, "C-1") for kind in kinds] == shared
    steps = {each.step: each.outcome for each in dummy.steps if each.subject == "C-1"}
    assert ("done", "done", "skipped") == (steps["wires"], steps["zero"], steps["loop"])
    assert "QB-1" in [each.label for each in dummy.instruments]


def test_a_dummy_says_what_it_compensates(dummy: RecordContent) -> None:
    assert dummy.point.dummy
    assert ("C-1",) == dummy.grids[0].serves
    assert "feels no strain; compensates C-1" in record_html(dummy)


def test_each_grid_of_a_rosette_shows_its_own_figures(rosette: RecordContent) -> None:
    shown = [
        (
            grid.label,
            grid.circuit,
            str(grid.gauge_factor),
            str(grid.transverse_sensitivity),
            str(grid.angle),
        )
        for grid in rosette.grids
    ]
    assert [
        ("A.1", "C-1", "2.08", "0.4 %", "0 °"),
        ("A.2", "C-2", "2.10", "0.6 %", "45 °"),
        ("A.3", "C-3", "2.07", "0.5 %", "90 °"),
    ] == shown


def test_a_rosettes_page_tells_numbering_and_viewing_side(rosette: RecordContent) -> None:
    html = record_html(rosette)
    assert "rectangular, grids numbered counter-clockwise seen from the gauge side" in html
    assert 3 == html.count("<svg ")


def test_the_layout_is_part_of_the_record(dummy: RecordContent, rosette: RecordContent) -> None:
    assert "half three-wire" == dummy.circuits[0].layout
    assert ["quarter three-wire"] * 3 == [each.layout for each in rosette.circuits]
