"""A record of an invented job, filled by hand, for tests that need no logbook."""

from __future__ import annotations

from typing import Any

from gaugelog.documents.content import RecordContent

HEAD = "142:K7Q2MZ4XA5N3WPB6RTYC2DHEJL"


def q(value: str, unit: str) -> dict[str, str]:
    """A quantity as the record's JSON has it."""
    return {"value": value, "unit": unit}


def sample(**changes: Any) -> RecordContent:
    """A submitted record of one quarter bridge, with a failed attempt that was put right."""
    data: dict[str, Any] = {
        "number": "FB7-P1-R1",
        "revision": 1,
        "state": "submitted",
        "drawn": {
            "at": "2026-12-01T14:42:10.123456Z",
            "offset": "+01:00",
            "head": HEAD,
            "program": "Gaugelog 0.1.0",
        },
        "campaign": {
            "label": "FB7",
            "title": "Proof load of footbridge 7 over the mill race",
            "client": "Town of Ostermoor, Works Office",
            "contract": "WO-2026/118",
            "document": "FB7-TP-02",
            "site": "Mill Lane, Ostermoor",
            "surroundings": "field",
            "plan_revision": 2,
        },
        "criteria": {
            "title": "Field criteria for room-temperature bonds",
            "edition": "2",
            "agreed_by": "Ruta Vellinga, Works Office, 2026-11-20",
            "coverage": "2",
            "conditional_pass": "goes on",
            "conditional_fail": "blocks",
        },
        "article": {
            "label": "FB7",
            "description": "Welded steel footbridge, one span of 24 m",
            "drawing": "FB7-210",
            "drawing_revision": "C",
            "material": {
                "name": "structural steel",
                "modulus": q("210", "GPa"),
                "poisson_ratio": q("0.3", "1"),
                "expansion": q("12", "ppm/K"),
                "source": "Design basis FB7-DB-01, table 2",
            },
            "zone": "girder-mid",
            "zone_description": "Lower flange of the north girder at mid-span, downstream face",
            "surface": {
                "largest_process_temperature": q("60", "degC"),
                "removal_allowed": "paint, and 0.1 mm of metal at most",
                "forbidden_cleaners": ["chlorinated solvents"],
                "agreed_by": "Works Office",
            },
            "permits": [
                "Work at height: harness, and site permit WH-31.",
                "No grinding sparks above the water.",
            ],
        },
        "point": {
            "id": "point0001",
            "label": "P1",
            "quantity": "strain along the girder",
            "purpose": "Bending at mid-span under the proof load",
            "load": "static",
            "strain_min": q("-200", "um/m"),
            "strain_max": q("900", "um/m"),
            "temperature_min": q("-5", "degC"),
            "temperature_max": q("35", "degC"),
            "duration": q("90", "d"),
            "permitted_error": q("10", "um/m"),
            "place": {
                "datum": "north bearing, centre of the lower flange",
                "x": q("12000", "mm"),
                "y": q("0", "mm"),
                "side": "underside",
                "axis": "length of the girder",
                "angle": q("0", "deg"),
                "tolerance": q("1", "mm"),
                "angle_tolerance": q("2", "deg"),
            },
        },
        "grids": [
            {
                "id": "grid0001",
                "label": "P1-1",
                "number": 1,
                "state": "awaiting review",
                "circuit": "C1",
            }
        ],
        "gauge": {
            "id": "gauge0001",
            "label": "L42-A/3",
            "generation": 1,
            "lot": "L42",
            "maker": "Norrfolje Gauge Works",
            "type": "NF-6-350-11",
            "pattern": "single",
            "nominal_resistance": q("350", "ohm"),
            "resistance_tolerance": q("0.3", "%"),
            "grid_length": q("6", "mm"),
            "grid_width": q("2.9", "mm"),
            "grids": [
                {
                    "number": 1,
                    "gauge_factor": q("2.07", "1"),
                    "gauge_factor_tolerance": q("1.0", "%"),
                    "transverse_sensitivity": q("0.4", "%"),
                    "angle": q("0", "deg"),
                }
            ],
            "expansion_class": q("11", "ppm/K"),
            "temperature_min": q("-70", "degC"),
            "temperature_max": q("150", "degC"),
            "strain_limit": q("30000", "um/m"),
            "test_voltage_max": q("50", "V"),
            "expires": "2028-03-31",
            "received_on": "2026-10-12",
            "certificate": "9d" * 32,
        },
        "circuits": [circuit()],
        "route": {
            "label": "room_temperature_bond_on_metal",
            "title": "Room-temperature bond on metal",
            "edition": "1",
            "family": "room-temperature bond on metal",
            "basis": "Order of work after the subjects of ASTM E1237",
            "file": "5c" * 32,
        },
        "steps": steps(),
        "readings": readings(),
        "instruments": instruments(),
        "consumables": [
            {
                "id": "cons0001",
                "label": "AD-19",
                "type": "adhesive",
                "maker": "Klevby",
                "name": "Cyanoacrylate 2",
                "received_on": "2026-10-12",
                "expires": "2027-04-30",
            },
            {
                "id": "cons0002",
                "label": "CO-07",
                "type": "coating",
                "maker": "Klevby",
                "name": "Nitrile coat N",
                "received_on": "2026-10-12",
                "expires": "2027-08-31",
            },
        ],
        "people": [
            {
                "id": "t.okondo",
                "name": "Tamsin Okondo-Havlíčková",
                "initials": "TO",
                "roles": ["technician"],
                "qualifications": [
                    {
                        "name": "Strain gauge installer, level 2",
                        "until": "2028-06-30",
                        "granted_by": "Ostermoor Training Board",
                    }
                ],
                "part": ["steps", "readings", "submission"],
            },
            {
                "id": "w.brandt",
                "name": "Wiebke Brandt-Ilesanmi",
                "initials": "WB",
                "roles": ["reviewer"],
                "part": ["holds"],
            },
        ],
        "signing": {
            "person": "t.okondo",
            "name": "Tamsin Okondo-Havlíčková",
            "meaning": "I did the work recorded here; the readings are as I took them.",
        },
        "cautions": [
            "Work at height: harness, and site permit WH-31.",
            "No grinding sparks above the water.",
            "Solvents: gloves, ventilation, no flame nearby. The site's permit rules.",
            "Cyanoacrylate bonds skin at once. Wear eye protection.",
            "Insulation: never more than 50 V across a bonded gauge.",
        ],
    }
    data.update(changes)
    return RecordContent.model_validate(data)


def circuit() -> dict[str, Any]:
    """A quarter bridge on three wires."""
    resistor = {"kind": "completion", "label": "350 Ω", "inside_module": True}
    return {
        "id": "circuit0001",
        "label": "C1",
        "arrangement": "quarter three-wire",
        "arms": [
            [{"kind": "grid", "label": "P1-1", "inside_module": False}],
            [resistor],
            [resistor],
            [resistor],
        ],
        "leads": {
            "wires": 3,
            "length": q("18", "m"),
            "resistance_per_length": q("0.09", "ohm/m"),
            "cable": "CB-3",
            "marks": {"supply-": "W1", "signal+": "W2", "completion": "W3"},
        },
        "channel": {
            "label": "M1/3",
            "module_type": "eight-channel bridge module",
            "module_serial": "BM-2207",
            "connector": "X3",
            "pins": {"completion": "A", "signal+": "B", "supply-": "D"},
            "excitation": q("2.5", "V"),
            "excitation_kind": "d.c.",
            "range": q("10", "mV/V"),
            "shunt": {"value": q("174650", "ohm"), "arm": 1, "between": ["signal+", "supply-"]},
        },
    }


STEPS = (
    ("receive", "Receive and identify the gauge", "grid", "done", "08:05", ""),
    ("received", "Read the resistance as received", "grid", "done", "08:12", ""),
    ("permits", "Check permits and the place", "place", "done", "08:20", ""),
    ("clean", "Clean the surface", "place", "done", "08:31", ""),
    ("abrade", "Abrade", "place", "done", "08:40", "Paint taken off over 60 × 40 mm."),
    ("layout", "Lay out the lines", "place", "done", "08:52", ""),
    ("layout-hold", "Layout before bonding", "place", "released", "09:05", ""),
    ("bond", "Bond the gauge", "grid", "done", "09:24", ""),
    ("cure", "Let the adhesive cure", "grid", "done", "10:26", ""),
    ("bonded", "Read resistance and insulation as bonded", "grid", "done", "10:41", ""),
    ("wire", "Wire the gauge", "circuit", "done", "11:15", ""),
    ("coat-hold", "Inspect before coating", "grid", "released", "11:32", ""),
    ("coat", "Coat", "grid", "done", "11:50", ""),
    ("primer", "Second coat", "grid", "skipped", "11:58", "Dry season, agreed with the client."),
    ("coated", "Read the insulation as coated", "grid", "done", "14:20", ""),
)


def steps() -> list[dict[str, Any]]:
    """The steps of the sample's route, all behind it."""
    labels = {"place": "P1", "grid": "P1-1", "circuit": "C1"}
    made = []
    for number, (step, title, subject, outcome, hour, note) in enumerate(STEPS, start=1):
        hold = outcome == "released"
        made.append(
            {
                "number": number,
                "step": step,
                "title": title,
                "subject": labels[subject],
                "hold": hold,
                "instruction": "Do it as the card says.",
                "outcome": outcome,
                "by": "w.brandt" if hold else "t.okondo",
                "observed_at": f"2026-12-01T{hour}:00Z",
                "entered_at": f"2026-12-01T{hour}:30Z",
                "note": note,
                "inputs": _inputs(step),
                "windows": [
                    {"bound": "not before", "duration": q("60", "min"), "after": "bond"},
                ]
                if step == "cure"
                else [],
            }
        )
    return made


def _inputs(step: str) -> list[dict[str, str]]:
    known: dict[str, list[dict[str, str]]] = {
        "receive": [{"prompt": "Gauge", "typed": "L42-A/3"}],
        "clean": [{"prompt": "Cleaner", "typed": "CL-2", "means": "CL-2, Degreaser"}],
        "bond": [
            {"prompt": "Adhesive lot", "typed": "ad-19", "means": "AD-19, Cyanoacrylate 2"},
            {"prompt": "Surface temperature", "typed": "14.5 °C"},
            {"prompt": "Relative humidity", "typed": "48 %RH"},
        ],
        "coat": [{"prompt": "Coating lot", "typed": "CO-07", "means": "CO-07, Nitrile coat N"}],
    }
    return known.get(step, [])


def readings() -> list[dict[str, Any]]:
    """Five attempts of four checks; the first insulation of the bonded gauge failed."""
    return [
        {
            **_reading("r1", "resistance", "received", "350.4 ohm", q("350.4", "ohm"), "08:12"),
            "limits": [
                limit(
                    "criteria", "350 Ω ± 0.3 % of the lot", q("348.95", "ohm"), q("351.05", "ohm")
                )
            ],
            "verdict": verdict(
                "pass", "0.9982", q("0.160", "ohm"), q("0.32", "ohm"), "resistance 1"
            ),
        },
        {
            **_reading("r2", "resistance", "bonded", "351.2 ohm", q("351.2", "ohm"), "10:41"),
            "result": q("0.2283", "%"),
            "compared_with": "r1",
            "limits": [
                limit("criteria", "common practice, room-temperature cure", None, q("0.3", "%"))
            ],
            "verdict": verdict("pass", "1.0000", q("0.00117", "%"), q("0.0023", "%"), "change 1"),
        },
        {
            **_reading("r3", "insulation", "bonded", "9.5 Gohm", q("9.5", "Gohm"), "10:44"),
            "latest": False,
            "limits": _floors(),
            "verdict": {
                **verdict("conditional fail", "0.181", q("0.548", "Gohm"), q("1.10", "Gohm")),
                "blocks": True,
                "reason": "Below the limit by less than the guard band.",
            },
        },
        {
            **_reading("r4", "insulation", "bonded", "12.0 Gohm", q("12.0", "Gohm"), "11:06"),
            "attempt": 2,
            "reason": "Flux left at the tab was cleaned off; the gauge dried for 15 minutes.",
            "limits": _floors(),
            "verdict": verdict("pass", "0.998", q("0.693", "Gohm"), q("1.39", "Gohm")),
        },
        {
            **_reading("r5", "insulation", "coated", ">20 GΩ", q("20", "Gohm"), "14:20"),
            "qualifier": ">",
            "limits": _floors(),
            "verdict": {
                **verdict("pass", None, q("1.15", "Gohm"), q("2.31", "Gohm")),
                "reason": "The bound less its uncertainty passes; a bound has no probability.",
            },
        },
    ]


def _reading(
    name: str, check: str, stage: str, typed: str, value: dict[str, str], hour: str
) -> dict[str, Any]:
    insulation = check == "insulation"
    return {
        "id": name,
        "check": check,
        "stage": stage,
        "subject": "P1-1",
        "attempt": 1,
        "latest": True,
        "typed": typed,
        "qualifier": "=",
        "value": value,
        "instrument": "IM-2" if insulation else "OM-1",
        "range": "20 GΩ" if insulation else "1 kΩ",
        "test_voltage": q("50", "V") if insulation else None,
        "observed_at": f"2026-12-01T{hour}:00Z",
        "observed_by": "t.okondo",
        "entered_at": f"2026-12-01T{hour}:30Z",
        "entered_by": "t.okondo",
    }


def _floors() -> list[dict[str, Any]]:
    return [
        limit("criteria", "common practice, field", q("10", "Gohm"), None),
        limit(
            "permitted error",
            "Parallel leakage across the gauge, half of 10 µm/m",
            q("33.8", "Mohm"),
            None,
            rules=False,
        ),
    ]


def limit(
    origin: str,
    source: str,
    low: dict[str, str] | None,
    high: dict[str, str] | None,
    *,
    rules: bool = True,
) -> dict[str, Any]:
    """A limit that applied to a reading."""
    return {
        "origin": origin,
        "at_least": low,
        "at_most": high,
        "source": source,
        "formula": "",
        "rules": rules,
    }


def verdict(
    word: str,
    probability: str | None,
    uncertainty: dict[str, str],
    guard: dict[str, str],
    rule: str = "insulation 1",
) -> dict[str, Any]:
    """A verdict that blocks nothing."""
    return {
        "word": word,
        "blocks": False,
        "probability": probability,
        "standard_uncertainty": uncertainty,
        "guard_band": guard,
        "coverage": "2",
        "reason": "",
        "rule": rule,
    }


def instruments() -> list[dict[str, Any]]:
    """The two meters of the sample."""
    common = {
        "maker": "Havelstad Instruments",
        "calibrated_by": "Calibration room 4, Ostermoor",
        "calibrated_on": "2026-05-04",
        "due": "2027-05-04",
    }
    return [
        {
            **common,
            "id": "instr0001",
            "label": "OM-1",
            "type": "six-digit ohmmeter",
            "serial": "88120",
            "certificate_number": "CR4-1180",
            "ranges": [
                {
                    "name": "1 kΩ",
                    "quantity": "resistance",
                    "low": q("0", "ohm"),
                    "high": q("1000", "ohm"),
                    "gain": q("0.05", "%"),
                    "offset": q("0.1", "ohm"),
                    "resolution": q("0.01", "ohm"),
                }
            ],
        },
        {
            **common,
            "id": "instr0002",
            "label": "IM-2",
            "type": "insulation meter, 15 to 50 V",
            "serial": "88342",
            "certificate_number": "CR4-1181",
            "ranges": [
                {
                    "name": "20 GΩ",
                    "quantity": "insulation",
                    "low": q("0.1", "Gohm"),
                    "high": q("20", "Gohm"),
                    "gain": q("10", "%"),
                    "offset": q("0", "Gohm"),
                    "resolution": q("0.1", "Gohm"),
                    "test_voltage": q("50", "V"),
                }
            ],
        },
    ]
