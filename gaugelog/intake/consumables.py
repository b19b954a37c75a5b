"""Consumables from tables: a row a lot of adhesive, coating, solder, cable or cleaner."""

from __future__ import annotations

from collections.abc import Sequence
from typing import cast, get_args

from gaugelog.intake.fields import Fields, distinct
from gaugelog.intake.lots import NewId, Papers
from gaugelog.intake.papers import COLUMN as CERTIFICATE
from gaugelog.intake.received import Placed, check_dates
from gaugelog.intake.tables import Columns
from gaugelog.intake.typed import number_of
from gaugelog.ledger.base import Quantity
from gaugelog.ledger.stock import ConsumableKind, ConsumableReceived, CurePoint

CONSUMABLE_COLUMNS = Columns(
    needed=("consumable", "kind", "maker", "name", "received_on"),
    others=(
        "expires",
        "pot_life_min",
        "cure_schedule",
        "temperature_min_degC",
        "temperature_max_degC",
        "humidity_min_percent",
        "humidity_max_percent",
        "wire_resistance_ohm_per_m",
        CERTIFICATE,
    ),
)


def read_consumables(
    rows: Sequence[Placed], new_id: NewId, papers: Papers
) -> tuple[ConsumableReceived, ...]:
    """The lots of these rows; the certificates that they name are added to `papers`."""
    found = tuple(_consumable(each.row, new_id) for each in rows)
    distinct([each.row for each in rows], "consumable", [item.label for item in found])
    for each, item in zip(rows, found, strict=True):
        paper = each.paper
        if paper is not None:
            papers[item.id] = (paper,)
    return found


def _consumable(row: Fields, new_id: NewId) -> ConsumableReceived:
    kind = row.choice("kind", get_args(ConsumableKind))
    found = ConsumableReceived(
        id=new_id(),
        label=row.label("consumable"),
        type=cast("ConsumableKind", kind),
        maker=row.text("maker"),
        name=row.text("name"),
        expires=row.maybe_day("expires"),
        received_on=row.day("received_on"),
        pot_life=row.maybe_number("pot_life_min", "min", positive=True),
        temperature_min=row.maybe_number("temperature_min_degC", "degC"),
        temperature_max=row.maybe_number("temperature_max_degC", "degC"),
        humidity_min=row.maybe_number("humidity_min_percent", "%RH"),
        humidity_max=row.maybe_number("humidity_max_percent", "%RH"),
        cure=_cure(row),
        wire_resistance=row.maybe_number("wire_resistance_ohm_per_m", "ohm/m", positive=True),
    )
    check_dates(row, found.received_on, found.expires)
    return found


def _cure(row: Fields) -> tuple[CurePoint, ...]:
    """`150=60; 175=30`: at 150 °C or above 60 min, at 175 °C or above 30 min."""
    found: list[CurePoint] = []
    for part in row.text("cure_schedule", needed=False).split(";"):
        if not part.strip():
            continue
        hot, _, long = (piece.strip() for piece in part.partition("="))
        celsius, minutes = number_of(hot), number_of(long)
        if celsius is None or minutes is None or float(minutes) <= 0:
            comma = " Write decimal points, no commas." if "," in part else ""
            remedy = f"Like: 150=60; 175=30, each °C=minutes.{comma}"
            row.fault("cure_schedule", f"“{part.strip()[:40]}” is no °C=minutes.", remedy)
            return ()
        found.append(
            CurePoint(
                temperature=Quantity(value=celsius, unit="degC"),
                duration=Quantity(value=minutes, unit="min"),
            )
        )
    return tuple(sorted(found, key=lambda point: point.temperature.si()))
