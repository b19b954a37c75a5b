"""What a point's strain will be worth: budget and corrections from what was planned and read."""

from __future__ import annotations

from collections.abc import Iterator
from dataclasses import dataclass

from gaugelog.errors import Refused
from gaugelog.ledger.campaign import Article, CampaignPlanned, CampaignRow
from gaugelog.ledger.circuits import CircuitPlanned
from gaugelog.ledger.instruments import InstrumentRange
from gaugelog.ledger.points import GridRow, PointPlanned, PointRow
from gaugelog.ledger.readings import ReadingRow, ReadingTaken
from gaugelog.ledger.stock import GridData, LotReceived, LotRow
from gaugelog.ledger.view import View
from gaugelog.physics.arrangements import arrangement
from gaugelog.physics.circuit_budget import circuit_budget
from gaugelog.physics.estimates import Estimate, normal, rectangular
from gaugelog.physics.leads import correction_factor
from gaugelog.physics.reading import PlannedCircuit
from gaugelog.physics.temperature import SCATTER_RATES, mismatch_output
from gaugelog.physics.transverse import uncorrected_error
from gaugelog.physics.uncertainty import Budget
from gaugelog.rules.certificate import certificate_at
from gaugelog.rules.compensated import SOURCE as COMPENSATED
from gaugelog.rules.compensated import thermal_share
from gaugelog.rules.leaked import SOURCE as LEAKED
from gaugelog.rules.leaked import middle_leak
from gaugelog.rules.taken import readings_at
from gaugelog.rules.wired import Wired, planned_circuit, wired

TRANSVERSE_WIDTH = 0.002
"""Half-width of a lot's transverse sensitivity, absolute. Common practice."""

STANDARD = "GUM (JCGM 100:2008), through the formulas that correct a reading"


@dataclass(frozen=True, slots=True)
class Correction:
    """What is to be taken off or multiplied, in words people read, with its source."""

    name: str
    value: str
    source: str


@dataclass(frozen=True, slots=True)
class PointBudget:
    """The budget of a point's strain at its largest planned strain, and its corrections."""

    strain: float
    budget: Budget
    corrections: tuple[Correction, ...]


@dataclass(frozen=True, slots=True)
class _Known:
    view: View
    point: PointPlanned
    article: Article
    lot: LotReceived
    grid: GridData
    planned: CircuitPlanned
    wired: Wired
    subjects: frozenset[str]
    """Ids of what its readings may be of: the point, the grid and its circuit."""

    @property
    def strain(self) -> float:
        """The planned strain of the largest size; 1 µm/m where none is planned."""
        return max((self.point.strain_min.si(), self.point.strain_max.si()), key=abs) or 1e-6

    @property
    def half_span(self) -> float:
        """Half of the planned range of temperature, kelvin."""
        return (self.point.temperature_max.si() - self.point.temperature_min.si()) / 2


def point_budget(view: View, row: PointRow) -> PointBudget | None:
    """The budget of the point's first grid in its circuit.

    None while no gauge is in place, and for a dummy, which feels no strain.
    """
    known = _known(view, row)
    if known is None:
        return None
    circuit = PlannedCircuit(
        strain=known.strain,
        celsius=(known.point.temperature_max.si() + known.point.temperature_min.si()) / 2,
        arrangement=known.planned.arrangement,
        layout=known.wired.circuit.layout.name,
        setting=known.grid.gauge_factor.si(),
        poisson=known.article.material.poisson_ratio.si(),
        resistance=known.wired.resistance,
    )
    found = circuit_budget(circuit, _inputs(known))
    return PointBudget(known.strain, found, _corrections(known))


def _known(view: View, row: PointRow) -> _Known | None:
    grids = [grid for grid in view.all(GridRow, point=row.id) if grid.circuit]
    lot, campaign = view.get(LotRow, row.lot), view.get(CampaignRow, row.campaign)
    if not grids or not row.gauge or lot is None or campaign is None:
        return None
    point = PointPlanned.model_validate_json(row.data)
    if point.dummy:
        return None
    articles = CampaignPlanned.model_validate_json(campaign.data).articles
    article = next((each for each in articles if each.id == point.article), None)
    planned = planned_circuit(view, grids[0].circuit)
    if article is None:
        return None
    try:
        as_wired = wired(view, planned)
    except Refused:
        return None
    body = LotReceived.model_validate_json(lot.data)
    data = body.grid(grids[0].number)
    subjects = frozenset({row.id, grids[0].id, planned.id})
    return _Known(view, point, article, body, data, planned, as_wired, subjects)


def _inputs(known: _Known) -> dict[str, Estimate]:
    factor, kt = known.grid.gauge_factor.si(), known.grid.transverse_sensitivity.si()
    resistance = known.wired.resistance
    spread = max(known.wired.uncertainties.values(), default=0.0)
    wire = next(iter(known.wired.circuit.wires.values()), 0.0)
    return {
        "factor": normal(factor, factor * known.grid.gauge_factor_tolerance.si() / 2),
        "transverse": rectangular(kt, TRANSVERSE_WIDTH),
        "misalignment": rectangular(0.0, known.point.place.angle_tolerance.si()),
        "resistance": normal(resistance, spread),
        "wire": normal(float(wire), 0.0),
        **_warmth(known),
        **_leakage(known),
        **_instrument(known),
    }


def _warmth(known: _Known) -> dict[str, Estimate]:
    """Thermal output by mismatch, not corrected, and its scatter, over half the planned span.

    Of the mismatch, as much as the circuit shows: none where its gauges cancel each other's.
    """
    half = known.half_span
    found = {"scatter": normal(0.0, SCATTER_RATES["constantan"] * half / 2)}
    if known.lot.expansion_class is not None:
        rates = known.article.material.expansion.si(), known.lot.expansion_class.si()
        shown = abs(_thermal_share(known))
        found["thermal"] = rectangular(0.0, shown * abs(float(mismatch_output(*rates, half))))
    return found


def _thermal_share(known: _Known) -> float:
    return thermal_share(known.planned, known.article.material.poisson_ratio.si())


def _insulation(known: _Known) -> float | None:
    """The insulation last read of the grid or of its circuit, at whatever point, ohm."""
    rows = [
        ReadingTaken.model_validate_json(row.data)
        for row in readings_at(known.view, known.point.id)
        if row.check == "insulation" and row.latest and row.subject in known.subjects
    ]
    values = [row.value.si() for row in rows if row.value is not None and row.value.si() > 0]
    return values[-1] if values else None


def _leakage(known: _Known) -> dict[str, Estimate]:
    """Leakage of the last insulation read, as a conductance from 0 to 1/R.

    It may lie across the grid as a whole or not at all: rectangular about 1/2R, half-width 1/2R.
    What the middle makes of a reading is among the corrections (`_leak_middle`).
    """
    insulation = _insulation(known)
    if insulation is None:
        return {}
    half = 1 / (2 * insulation)
    return {"leak": rectangular(half, half)}


def _leak_middle(known: _Known) -> list[Correction]:
    insulation = _insulation(known)
    if insulation is None:
        return []
    shown = middle_leak(
        known.wired.resistance,
        known.grid.gauge_factor.si(),
        insulation,
        _arm(known),
        known.planned.arrangement,
        known.article.material.poisson_ratio.si(),
    )
    return [
        Correction(
            "leakage, on the middle between none and all across the grid: reads too much by",
            f"{shown * 1e6:+.2g} µm/m",
            LEAKED,
        )
    ]


def _arm(known: _Known) -> int:
    """The first arm that holds a grid of the point, 1 to 4 round the bridge."""
    own = {grid.id for grid in known.point.grids}
    arms = enumerate(known.planned.arms, start=1)
    return next(number for number, arm in arms if own & {each.grid for each in arm})


def _instrument(known: _Known) -> dict[str, Estimate]:
    span = _strain_range(known)
    if span is None:
        return {}
    return {
        "gain": rectangular(1.0, span.gain.si()),
        "zero": rectangular(0.0, span.offset.si()),
        "resolution": rectangular(0.0, span.resolution.si() / 2),
    }


def _strain_range(known: _Known) -> InstrumentRange | None:
    """The range on which the module last read the shunt, in strain, as it was certified then."""
    rows = known.view.all(ReadingRow, subject=known.planned.id, check="shunt", latest=1)
    if not rows:
        return None
    name = ReadingTaken.model_validate_json(rows[-1].data).range
    module = certificate_at(known.view, rows[-1].instrument, rows[-1].seq)
    return next((each for each in module.ranges if each.name == name), None)


def _corrections(known: _Known) -> tuple[Correction, ...]:
    wire = next(iter(known.wired.circuit.wires.values()), 0.0)
    leads = float(correction_factor(known.wired.circuit.layout.name, known.wired.resistance, wire))
    found = [
        Correction(
            "lead wires: multiply by",
            f"{leads:.5f}",
            "(R + n RL)/R, Dally and Riley (from memory)",
        ),
    ]
    if not arrangement(known.planned.arrangement).needs_poisson:
        poisson = known.article.material.poisson_ratio.si()
        kt = known.grid.transverse_sensitivity.si()
        share = float(uncorrected_error(kt, -poisson))
        found.append(
            Correction(
                "transverse sensitivity, uniaxial stress: reads too much by",
                f"{100 * share:+.3f} %",
                "Kt (r + ν0)/(1 − ν0 Kt), ASTM E251 (from memory)",
            )
        )
    return (*found, *_thermal_correction(known), *_leak_middle(known))


def _thermal_correction(known: _Known) -> Iterator[Correction]:
    """Of the circuit's reading: none where its gauges cancel each other's thermal output."""
    if known.lot.expansion_class is None:
        return
    share = _thermal_share(known)
    if not share:
        yield Correction("thermal output by mismatch", "cancels", COMPENSATED)
        return
    rates = known.article.material.expansion.si(), known.lot.expansion_class.si()
    per_kelvin = float(mismatch_output(*rates, 1.0)) * share * 1e6
    yield Correction(
        "thermal output by mismatch, to be taken off",
        f"{per_kelvin:+.2f} µm/m per K",
        "(αs − αm) ΔT, Dally and Riley (from memory); the lot's own curve is better",
    )
