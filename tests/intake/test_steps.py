"""Steps of a route: what would make a step impossible or ambiguous is told before it is planned."""

from __future__ import annotations

import pytest

from gaugelog.intake.route import read_route, shipped_routes
from tests.intake.conftest import counter, lines_of

ROUTE = shipped_routes()["room-temperature-bond-metal"].decode()


def refusal(before: str, after: str) -> list[str]:
    """The lines that refuse the shipped route with one change."""
    assert before in ROUTE
    changed = ROUTE.replace(before, after, 1)
    return lines_of(lambda: read_route("own.toml", changed.encode(), counter()))


@pytest.mark.parametrize(
    ("before", "after", "what"),
    [
        ('stage = "received"', "", "stage: is missing."),
        ('stage = "received"', 'stage = "reborn"', "stage: “reborn” is not one of received"),
        ('check = "resistance"', "", "check: is missing."),
        ('check = "resistance"', 'check = "weight"', "check: “weight” is not one of"),
        ('unit = "Ω"', 'unit = "GΩ"', "unit: “GΩ” is no unit of it."),
        ('unit = "mm"', 'unit = "cubit"', "unit: “cubit” is no unit."),
        ('unit = "min"', 'unit = "degC"', "unit: is no unit of time."),
        ('type = "cleaner"', 'type = "soap"', "type: “soap” is not one of adhesive"),
        ('type = "cleaner"', "", "type: is missing."),
        ('type = "resistance"', 'type = "weight"', "type: “weight” is not one of resistance"),
        ('subject = "place"', 'subject = "sky"', "subject: “sky” is not one of place"),
        ('refused_to = "layout"', "", "refused_to: is missing."),
        ('refused_to = "layout"', 'refused_to = "coat"', "“coat” is no earlier step."),
        ('refused_to = "layout"', 'refused_to = "layout-hold"', "is no earlier step."),
        ('after = "condition"', 'after = "coated"', "window: “coated” is no earlier step."),
        ('duration = "45 min"', 'duration = "45"', "duration: “45” has no unit."),
        ('duration = "45 min"', 'duration = "0 min"', "duration: “0 min” must be above 0."),
        ('duration = "45 min"', 'duration = "45 mm"', "duration: “45 mm” has the unit mm."),
        ("\nhold = true", '\nhold = true\nskip = "planner"', "skip: must be never at a hold."),
        ("\nhold = true", '\nhold = "yes"', "hold: is text"),
        ('kind = "gauge"', 'kind = "text"', "step: asks for the gauge 0 times."),
        ('id = "clean"', 'id = "access"', "id: “access” stands twice."),
        ('name = "safe"', 'name = "safe and sound"', "can't be a label"),
        ('edition = "2"', "edition = 2", "edition: is a number, not text."),
        ('edition = "2"', 'edition = "2"\nauthor = "x"', "author: is not known here."),
    ],
)
def test_a_slip_is_told_at_its_key(before: str, after: str, what: str) -> None:
    assert any(what in line for line in refusal(before, after))


def test_a_hold_asks_for_nothing() -> None:
    entry = '\n  [[step.input]]\n  name = "n"\n  kind = "text"\n  prompt = "p"'
    asked = '\nreaches = "ready to coat"' + entry
    (line,) = refusal('\nreaches = "ready to coat"', asked)
    assert "input: is asked for at a hold." in line


def test_a_refusal_goes_back_from_a_hold_only() -> None:
    lines = refusal('skip = "with reason"', 'skip = "with reason"\nrefused_to = "coat"')
    assert ["own.toml, step[15].refused_to: belongs to a hold only."] == lines


def test_a_reading_asks_for_the_one_meter_it_is_read_on() -> None:
    meter = 'kind = "instrument"\n  type = "resistance"'
    assert "has a reading and 0 instruments" in refusal(meter, 'kind = "text"')[0]


def test_a_gauge_is_taken_before_anything_is_read_on_it() -> None:
    start = ROUTE.index('  [[step.input]]\n  name = "gauge"')
    end = ROUTE.index("  [[step.input]]", start + 1)
    taken, without = ROUTE[start:end], ROUTE[:start] + ROUTE[end:]
    bond = '  [[step.input]]\n  name = "adhesive"'
    later = without.replace(bond, taken + bond)
    lines = lines_of(lambda: read_route("own.toml", later.encode(), counter()))
    assert ["own.toml, step[2].input: has a reading before the gauge is taken."] == lines


def test_the_gauge_is_taken_for_a_grid() -> None:
    before = 'subject = "grid"\nstage = "received"'
    lines = refusal(before, 'subject = "place"\nstage = "received"')
    assert ["own.toml, step[2].subject: takes the gauge, so it must be grid or gauge."] == lines


def test_one_check_is_read_once_a_stage() -> None:
    lines = refusal('subject = "grid"\nstage = "coated"', 'subject = "grid"\nstage = "bonded"')
    (line,) = lines
    assert "reads insulation at the stage bonded again after step insulation" in line


def test_a_window_that_closes_before_it_opens_is_told() -> None:
    window = '  [[step.window]]\n  bound = "{}"\n  duration = "{}"\n  after = "condition"\n'
    both = window.format("not before", "1 h") + window.format("within", "45 min")
    lines = refusal(window.format("within", "45 min"), both)
    assert any("closes 45 min after condition, before it opens at 1 h" in line for line in lines)


def test_a_route_without_steps_is_told() -> None:
    bare = ROUTE[: ROUTE.index("[[step]]")]
    lines = lines_of(lambda: read_route("own.toml", bare.encode(), counter()))
    assert ["own.toml, step: is missing."] == lines
