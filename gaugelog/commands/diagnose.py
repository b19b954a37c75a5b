"""`gaugelog diagnose`: what is wrong with a point's wiring, from resistances between its pins."""

from __future__ import annotations

import math
from typing import TYPE_CHECKING, Annotated

import typer

from gaugelog.commands.session import Json, open_logbook
from gaugelog.commands.talk import as_json, put, put_json, put_table, say

if TYPE_CHECKING:
    from gaugelog.work.diagnosing import PinPair, PinsFound


def diagnose(
    ctx: typer.Context,
    point: Annotated[str, typer.Argument(help="Label of the point.")],
    readings: Annotated[
        list[str] | None,
        typer.Argument(
            help="Resistances, the module unplugged: 'supply+ to signal+ = 350.2 ohm', "
            "'A to ARTICLE > 20 Mohm', 'A to B = OL'; left out: what each pair should read."
        ),
    ] = None,
    meter: Annotated[str, typer.Option(help="Label of the meter they are from.")] = "",
    circuit: Annotated[
        str, typer.Option(help="Label of the circuit, where the point has several.")
    ] = "",
    json: Json = False,
) -> None:
    """Say what is wrong with a point's wiring, likeliest first, and what to measure next.

    Measure with the module unplugged and nothing live. Terminals are the wires' functions or the
    pins' own labels, ARTICLE (bare metal) and SHIELD. Nothing is kept of it.
    """
    from gaugelog.work.diagnosing import diagnose_point

    found = diagnose_point(open_logbook(ctx), point, readings or [], meter=meter, circuit=circuit)
    if json:
        put_json(as_json(found))
    else:
        _tell(found)


def _tell(found: PinsFound) -> None:
    pins = {each.name: each.pin for each in found.terminals}
    put_table(
        f"{found.point}, circuit {found.circuit}, {found.arrangement}, module unplugged",
        ["between", "and", ">should read", ">measured"],
        [_row(pair, pins) for pair in found.pairs],
        empty="This circuit shows no pin to a meter.",
    )
    if not found.answers:
        put("To ARTICLE (bare metal) and to SHIELD every pin reads open.")
        say(f"Measure, then: gaugelog diagnose {found.point} 'A to B = 350.2 ohm' --meter LABEL")
        return
    for number, answer in enumerate(found.answers, start=1):
        behind = " (far behind)" if answer.far_behind else ""
        put(f"{number}. {answer.sentence}{behind}", f"   {answer.means}")
    put(f"Next: {found.next or 'nothing more to measure: one answer stands apart.'}")
    if not found.explained:
        put(
            "! No single defect explains the figures: there may be two, the circuit may be "
            "another than planned, or a figure was misread."
        )


def _row(pair: PinPair, pins: dict[str, str]) -> list[str]:
    names = [f"{each} ({pins[each]})" if pins.get(each) else each for each in pair.between]
    return [*names, _ohm(pair.expected), pair.typed or "–"]


def _ohm(value: float) -> str:
    return "open" if math.isinf(value) else f"{value:.2f} Ω"
