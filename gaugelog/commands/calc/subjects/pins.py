"""`gaugelog calc pins`: what resistances between the pins of a connector say about the wiring."""

from __future__ import annotations

from gaugelog.commands.calc.bounds import NOT_NEGATIVE, NOT_ZERO, POSITIVE, whole
from gaugelog.commands.calc.dimensions import (
    COUNT,
    FACTOR,
    INSULATION,
    PERCENT,
    RESISTANCE,
)
from gaugelog.commands.calc.model import Answer, Argument, Subject, Values
from gaugelog.commands.calc.quantities import show
from gaugelog.commands.calc.sheet import Sheet
from gaugelog.commands.calc.subjects.pinreadings import TypedReading, readings
from gaugelog.errors import Fault, Faulty
from gaugelog.physics import change, pin_network, pins
from gaugelog.physics.arrangements import ARRANGEMENTS
from gaugelog.physics.circuit import Circuit, circuit_of
from gaugelog.physics.network import resistance_between
from gaugelog.physics.pin_network import ARTICLE, SHIELD
from gaugelog.physics.pin_next import RIVAL
from gaugelog.rules.pinwork import MEANINGS


def _compute(values: Values) -> Answer:
    sheet = Sheet()
    circuit = circuit_of(
        values["arrangement"],
        int(values["wires"]),
        *(values["resistance"], values["factor"], values["wire"], values["completion"]),
    )
    plugged = values["plugged"] == "yes"
    if values["readings"] is None:
        _table(sheet, circuit, plugged)
    else:
        _diagnose(sheet, values, circuit, plugged)
    return sheet.answer()


def _table(sheet: Sheet, circuit: Circuit, plugged: bool) -> None:
    """What a sound circuit shows between every two pins."""
    for (one, other), ohm in sheet.by(pin_network.pin_table, circuit, plugged=plugged).items():
        sheet.put(f"{one} to {other}", _ohm(ohm))
    rule = sheet.by(pin_network.three_quarters_rule, circuit)
    if rule is not None and not plugged:
        sheet.put("3/4 rule: across supply or signal", rule.pair, RESISTANCE)
        sheet.put("3/4 rule: supply to signal", rule.mixed, RESISTANCE)


def _ohm(value: float) -> str:
    return "overload" if value == float("inf") else show(value, RESISTANCE, 5)


def _diagnose(sheet: Sheet, values: Values, circuit: Circuit, plugged: bool) -> None:
    _refuse_strangers(values, circuit, plugged)
    measured = [_measured(sheet, values, each) for each in values["readings"]]
    for each in measured:
        expected = _expected(sheet, circuit, each.between, plugged)
        sheet.put(f"{' to '.join(each.between)} should read", _ohm(expected))
    found = sheet.by(
        pins.diagnose,
        *(circuit, measured),
        part_spread=values["part_spread"],
        wire_spread=values["wire_spread"],
        plugged=plugged,
    )
    for number, answer in enumerate(found.answers, start=1):
        behind = answer.misfit - found.answers[0].misfit > RIVAL
        _answer(sheet, f"answer {number}", answer, " (far behind)" if behind else "")
        if behind:
            break
    _next(sheet, found)


def _expected(sheet: Sheet, circuit: Circuit, between: tuple[str, str], plugged: bool) -> float:
    """What a sound circuit shows there; bare metal and shield lead nowhere."""
    if {ARTICLE, SHIELD} & set(between):
        return float("inf")
    network = pin_network.pin_network(circuit, plugged=plugged)
    return float(sheet.by(resistance_between, network, *between))


def _answer(sheet: Sheet, name: str, answer: pins.Answer, behind: str) -> None:
    kinds = dict.fromkeys(defect.kind for defect in answer.defects)
    sheet.put(name, answer.sentence + behind)
    sheet.put(f"{name} means", "; or ".join(MEANINGS[kind] for kind in kinds))
    sheet.put(f"{name} misfit", f"{answer.misfit:.3g}")


def _next(sheet: Sheet, found: pins.Diagnosis) -> None:
    if found.next_measurement is None:
        sheet.put("next", "nothing more to measure: one answer stands apart")
    else:
        sheet.put("next", found.next_measurement.sentence)
    if not found.explained:
        sheet.warn(
            [
                "No single defect explains the figures: there may be two, the circuit may be "
                "another than planned, or a figure was misread."
            ]
        )


def _refuse_strangers(values: Values, circuit: Circuit, plugged: bool) -> None:
    """Every terminal that this circuit does not have, at once."""
    own = {*pin_network.pins_of(circuit, plugged=plugged), *circuit.layout.wires.values()}
    own |= {ARTICLE, SHIELD}
    ends = {end for each in values["readings"] for end in each.between}
    faults = [
        Fault("readings", f"{end} is no terminal of this circuit.", f"It has {_listed(own)}.")
        for end in sorted(ends - own)
    ]
    if faults:
        raise Faulty(faults)


def _listed(names: set[str]) -> str:
    return ", ".join(sorted(names))


def _measured(sheet: Sheet, values: Values, typed: TypedReading) -> pins.PinReading:
    """A reading with its standard uncertainty, by its own width or the meter's accuracy."""
    if typed.stated is None:
        bound = typed.bound or values["range"]
        return pins.PinReading(typed.between, bound, max(bound * 0.01, 1e-9), overload=True)
    ohm = float(typed.stated.value or 0.0)
    own = typed.stated.around(ohm).uncertainty
    if not own:
        own = sheet.by(change.instrument_uncertainty, ohm, values["accuracy"], values["least"], 0.0)
    return pins.PinReading(typed.between, ohm, own)


SUBJECT = Subject(
    "pins",
    "What is wrong with the wiring, from resistances between pins; without readings, the table",
    (
        Argument("arrangement", "of the bridge", choices=tuple(ARRANGEMENTS)),
        Argument("wires", "number of wires to the module", COUNT, bound=whole(2, 6), example="3"),
        Argument("resistance", "of each grid", RESISTANCE, "350 ohm", bound=POSITIVE),
        Argument("factor", "gauge factor", FACTOR, "2.0", bound=NOT_ZERO),
        Argument("wire", "resistance of one lead wire", RESISTANCE, "1 ohm", bound=NOT_NEGATIVE),
        Argument("completion", "resistors of the module", RESISTANCE, "", bound=POSITIVE),
        Argument("plugged", "the module is measured too", choices=("no", "yes"), default="no"),
        Argument(
            "readings",
            "resistances between terminals, ARTICLE and SHIELD among them; OL for an overload",
            default="",
            read=readings,
            example="supply+ to signal+ = 350.2 ohm, signal+ to ARTICLE > 20 Mohm",
        ),
        Argument("accuracy", "of the meter, ± of reading", PERCENT, "0.2 %", bound=NOT_NEGATIVE),
        Argument("least", "of the meter, ± beside it", RESISTANCE, "0.1 ohm", bound=POSITIVE),
        Argument("range", "what an overload exceeds", INSULATION, "20 Mohm", bound=POSITIVE),
        Argument("part_spread", "of grids, one sigma", PERCENT, "0.2 %", bound=NOT_NEGATIVE),
        Argument("wire_spread", "of wires, one sigma", PERCENT, "2 %", bound=NOT_NEGATIVE),
    ),
    _compute,
)
