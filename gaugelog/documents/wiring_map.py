"""The wiring map as it leaves: a table for spreadsheets, and pages in the look of the record."""

from __future__ import annotations

import json
from dataclasses import asdict
from typing import TYPE_CHECKING

from gaugelog.documents import wording
from gaugelog.documents.fonts import Lettering
from gaugelog.documents.page import notices_of, plain_environment, texts_in
from gaugelog.documents.pango import need_pango
from gaugelog.documents.render import Drawing, draw
from gaugelog.documents.shipped import template_bytes
from gaugelog.journal.clock import Moment
from gaugelog.ledger.campaign import Paper

if TYPE_CHECKING:
    from gaugelog.documents.spreadsheet import Row
    from gaugelog.work.wiring import CircuitWired, WiringMap

COLUMNS = (
    "use",
    "circuit",
    "arrangement",
    "arm",
    "grid",
    "place",
    "channel",
    "connector",
    "function",
    "pin",
    "mark",
    "cable",
    "length_m",
    "conflict",
)
ATTACHMENT = "wiring.json"


def wiring_rows(wiring: WiringMap) -> list[Row]:
    """The map as a table: a row a wire, then a row a pin of each spare channel.

    A circuit with several grids has them in one cell, in the order of their arms.
    """
    rows: list[Row] = [COLUMNS]
    for circuit in wiring.circuits:
        rows += _circuit_rows(circuit)
    for spare in wiring.spare:
        for function, pin in (spare.pins or {"": ""}).items():
            channel = (spare.channel, spare.connector, function, pin)
            rows.append(("spare", "", "", "", "", "", *channel, "", "", "", ""))
    return rows


def _circuit_rows(circuit: CircuitWired) -> list[Row]:
    grids = [f"{each.grid} (dummy)" if each.dummy else each.grid for each in circuit.grids]
    first = (
        "in use",
        circuit.circuit,
        circuit.arrangement,
        "; ".join(str(each.arm) for each in circuit.grids),
        "; ".join(grids),
        "; ".join(dict.fromkeys(each.place for each in circuit.grids)),
        circuit.channel,
        circuit.connector,
    )
    last = (circuit.cable, circuit.length_m)
    ends = [(wire.function, wire.pin, wire.mark, wire.conflict) for wire in circuit.wires]
    return [
        (*first, function, pin, mark, *last, "; ".join(filter(None, (circuit.conflict, conflict))))
        for function, pin, mark, conflict in ends or [("", "", "", "")]
    ]


def wiring_pdf(wiring: WiringMap, moment: Moment, paper: Paper = "a4") -> Drawing:
    """The map as PDF/A pages with its data attached.

    Raises MachineTrouble when pages can't be drawn here.
    """
    need_pango()
    from weasyprint import Attachment

    attachment = Attachment(
        string=json.dumps(asdict(wiring), ensure_ascii=False, indent=1),
        name=ATTACHMENT,
        description="The data of this wiring map",
        created=moment.utc,
        modified=moment.utc,
        relationship="Data",
    )
    paper_css = template_bytes(f"record-{paper}.css").decode()
    return draw(wiring_html(wiring, moment), paper_css, [attachment])


def wiring_html(wiring: WiringMap, moment: Moment) -> str:
    """The pages of the map. Foreign text is escaped and made drawable."""
    lettering = Lettering()
    for text in texts_in(asdict(wiring)):
        lettering(text)
    environment = plain_environment(lettering)
    environment.filters["day"] = wording.WallTime(moment.offset).day
    return environment.get_template("wiring.html").render(
        wiring=wiring,
        at=moment.utc.isoformat(),
        notices=notices_of(lettering),
        standing="Released plan" if wiring.state == "released" else "DRAFT plan, not released",
    )
