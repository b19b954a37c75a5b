"""Resistance of lead wires: from the reel, from a measured loop, or as a last resort a table."""

from __future__ import annotations

import math
from dataclasses import dataclass

from gaugelog.physics._maths import Number
from gaugelog.physics.validity import (
    Notice,
    OutOfDomain,
    above,
    between,
    finite,
    largest,
    not_negative,
    positive,
)

COPPER_RESISTIVITY = 1 / 58e6
"""Standard annealed copper at 20 °C, Ω·m (0.017241 Ω·mm²/m). Source: IEC 60028:1925."""
COPPER_COEFFICIENT = 0.00393
"""Rise of the resistance of standard annealed copper at 20 °C, 1/K. Source: IEC 60028:1925."""
REFERENCE_CELSIUS = 20.0
COPPER_MIDDLE_CELSIUS, COPPER_HALF_RANGE = 75.0, 125.0
"""One coefficient describes copper from −50 to 200 °C (common practice)."""
AWG_SMALLEST, AWG_LARGEST = -3, 50
"""Gauge numbers that may be asked for; −3 is the size called 0000."""

_SIZES = (0.5, 0.75, 1.0, 1.5, 2.5, 4.0, 6.0)
_IEC_60228 = {
    "class 1": (36.0, 24.5, 18.1, 12.1, 7.41, 4.61, 3.08),
    "class 2": (36.0, 24.5, 18.1, 12.1, 7.41, 4.61, 3.08),
    "class 5": (39.0, 26.0, 19.5, 13.3, 7.98, 4.95, 3.30),
    "class 5 tinned": (40.1, 26.7, 20.0, 13.7, 8.21, 5.09, 3.39),
}
"""Largest resistance at 20 °C, Ω/km, for the sizes above. Class 1 from memory."""


@dataclass(frozen=True, slots=True)
class WireResistance:
    """Resistance of one wire, ohm, and what it was found from."""

    resistance: Number
    basis: str


def from_reel(length: Number, per_metre: Number) -> WireResistance:
    """Resistance of one wire from the Ω/m of its own reel: the first choice.

    Units: metre, Ω/m. Source: arithmetic.
    """
    total = not_negative("length", length) * not_negative("per_metre", per_metre)
    return WireResistance(total, "Ω/m of the reel")


def from_loop(loop: Number) -> WireResistance:
    """Resistance of one wire from a measured loop of two alike: half of it.

    Units: ohm. Source: arithmetic; measuring the loop is common practice.
    """
    return WireResistance(not_negative("loop", loop) / 2, "half of the measured loop")


def from_awg(length: Number, awg: float) -> WireResistance:
    """Resistance of one solid copper wire at 20 °C by its gauge number: a last resort.

    Units: metre in, ohm out. Source: ASTM B258.
    """
    total = not_negative("length", length) * awg_per_metre(awg)
    return WireResistance(total, f"{awg:g} AWG solid, ASTM B258")


def from_mm2(length: Number, mm2: float, conductor: str = "class 5") -> WireResistance:
    """Resistance of one copper wire at 20 °C by its nominal size: a last resort.

    The largest that IEC 60228 allows; sizes that its table lacks, as those under 0.5 mm², are
    taken from the area of copper, which flatters a thin tinned strand. Units: metre in, ohm out.
    Source: IEC 60228:2004, tables for classes 2 and 5; IEC 60028:1925.
    """
    not_negative("length", length)
    if mm2 in _SIZES:
        per_metre = iec_60228_per_metre(mm2, conductor)
        return WireResistance(
            length * per_metre, f"{mm2:g} mm² {conductor}, IEC 60228 (largest allowed)"
        )
    return WireResistance(
        length * per_metre_of_area(mm2 * 1e-6), f"{mm2:g} mm² of copper, IEC 60028 by area"
    )


def awg_diameter(awg: float) -> float:
    """Diameter of a solid wire of an American gauge number, metre: 0.005 in · 92^((36 − n)/39).

    `awg` from −3 (0000) to 50. Source: ASTM B258.

    >>> round(awg_diameter(36) * 1000, 4)
    0.127
    """
    between("awg", awg, AWG_SMALLEST, AWG_LARGEST)
    return 0.000127 * float(92 ** ((36 - awg) / 39))


def awg_per_metre(awg: float) -> float:
    """Resistance of a solid copper wire at 20 °C, Ω/m, by its American gauge number.

    Source: ASTM B258 (nominal area, 0.017241 Ω·mm²/m).
    """
    return float(per_metre_of_area(math.pi / 4 * awg_diameter(awg) ** 2))


def iec_60228_per_metre(mm2: float, conductor: str = "class 5") -> float:
    """Largest resistance of a plain copper conductor at 20 °C, Ω/m, by its nominal size.

    `mm2` is one of 0.5 to 6 mm²; `conductor` is `class 1`, `class 2`, `class 5` or
    `class 5 tinned`. Source: IEC 60228:2004, tables for classes 2 and 5; class 1 from memory.
    """
    column = _IEC_60228.get(conductor)
    if column is None:
        raise OutOfDomain("conductor", f"must be one of {', '.join(_IEC_60228)}, not {conductor}.")
    if mm2 not in _SIZES:
        sizes = ", ".join(f"{size:g}" for size in _SIZES)
        raise OutOfDomain("mm2", f"must be a size of IEC 60228 ({sizes}), not {mm2:g}.")
    return column[_SIZES.index(mm2)] / 1000


def per_metre_of_area(area: Number, resistivity: Number = COPPER_RESISTIVITY) -> Number:
    """Resistance of a conductor at 20 °C from its area: ρ/A.

    Units: m², Ω·m in; Ω/m out; copper unless another resistivity is given. Source: IEC 60028.

    >>> round(50 * per_metre_of_area(0.14e-6), 3)
    6.158
    """
    return positive("resistivity", resistivity) / positive("area", area)


def at_temperature(
    resistance: Number,
    celsius: Number,
    coefficient: Number = COPPER_COEFFICIENT,
    reference: Number = REFERENCE_CELSIUS,
) -> Number:
    """Resistance of a wire at another temperature: R (1 + α (t − t0)).

    Units: ohm, °C, 1/K; `coefficient` belongs to `reference`. Source: IEC 60028:1925.
    """
    not_negative("resistance", resistance)
    rise = above("celsius", celsius, -273.15) - finite("reference", reference)
    return resistance * (1 + above("coefficient times rise", coefficient * rise, -1.0))


def iec_60228_to_20_celsius(resistance: Number, celsius: Number) -> Number:
    """Resistance of a copper conductor at 20 °C from one measured at another: R 250/(230 + t).

    Units: ohm, °C. Source: IEC 60228:2004, annex on correction factors, approximate form (from
    memory); it differs a little from `at_temperature`.
    """
    not_negative("resistance", resistance)
    return resistance * 250 / (230 + above("celsius", celsius, -230.0))


def at_temperature_notices(celsius: Number) -> tuple[Notice, ...]:
    """A notice beyond −50 to 200 °C, where one coefficient no longer describes copper."""
    if largest(celsius - COPPER_MIDDLE_CELSIUS) <= COPPER_HALF_RANGE:
        return ()
    return (
        Notice(
            "lead resistance at temperature",
            "One coefficient describes copper only from about −50 to 200 °C.",
            "common practice",
        ),
    )
