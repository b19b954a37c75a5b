"""The kinds of quantity that people type at the bench, each with its SI unit and an example."""

from __future__ import annotations

from dataclasses import dataclass, replace


@dataclass(frozen=True)
class Dimension:
    """A kind of quantity: the SI unit it is kept in, the unit it is shown in, an example.

    `base` and `shown` are unit names of the pint registry; `symbol` is how people write `shown`.
    `larger` are units, each with its symbol, that show larger values from 1 upwards. `only` is a
    pattern of the units of this kind, where others would be bare numbers too: µm/m and mV/V.
    """

    name: str
    base: str
    shown: str
    symbol: str
    example: str
    larger: tuple[tuple[str, str], ...] = ()
    only: str = ""


_OF_STRAIN = (
    "(?:ue|µe|µε|ustrain|microstrain|micrometers?/meter|%|percent|ppm|[muµn]?m/m|[uµ]?in/in)"
)
_OF_RATIO = "(?:%|percent|ppm|m/m|mm/mm)"


RESISTANCE = Dimension(
    "resistance", "ohm", "ohm", "Ω", "350 ohm", (("megaohm", "MΩ"), ("gigaohm", "GΩ"))
)
INSULATION = Dimension(
    "insulation", "ohm", "megaohm", "MΩ", "12.5 Gohm", (("gigaohm", "GΩ"), ("teraohm", "TΩ"))
)
CONDUCTANCE = Dimension("conductance", "siemens", "nanosiemens", "nS", "1 nS")
RESISTANCE_PER_LENGTH = Dimension("resistance per length", "ohm/m", "ohm/m", "Ω/m", "0.123 ohm/m")
STRAIN = Dimension("strain", "", "micrometer/meter", "µm/m", "350 ue", only=_OF_STRAIN)
STRAINS = replace(STRAIN, example="400, 300, -200 ue")
GRADIENT = Dimension("strain gradient", "1/m", "micrometer/meter/mm", "µm/m per mm", "20 ue/mm")
STIFFNESS = Dimension("stiffness", "newton/meter", "kilonewton/mm", "kN/mm", "20 kN/mm")
LENGTH = Dimension("length", "m", "mm", "mm", "3 mm")
THICKNESS = Dimension("thickness", "m", "micrometer", "µm", "30 um", (("mm", "mm"),))
DISTANCE = Dimension("distance", "m", "m", "m", "50 m")
AREA = Dimension("area", "m^2", "mm^2", "mm²", "0.5 mm2 or 28 AWG")
VOLTAGE = Dimension("voltage", "V", "V", "V", "5 V")
SIGNAL = Dimension("voltage", "V", "nanovolt", "nV", "2 uV", (("microvolt", "µV"),))
NOISE_DENSITY = Dimension(
    "noise density", "V/hertz^0.5", "nanovolt/hertz^0.5", "nV/√Hz", "8 nV/Hz^0.5"
)
CURRENT = Dimension("current", "ampere", "milliampere", "mA", "10 mA")
RATIO = Dimension("ratio", "", "", "", "2.1 or 5 %", only=_OF_RATIO)
"""A bare number; those below are the same with another example."""
FACTOR = replace(RATIO, example="2.05")
POISSONS_RATIO = replace(RATIO, example="0.3")
SHARE = replace(RATIO, example="1 %")
COUNT = replace(RATIO, example="4")
PERCENT = Dimension("percentage", "", "percent", "%", "0.5 %", only=_OF_RATIO)
OUTPUT = Dimension("bridge output", "", "millivolt/volt", "mV/V", "0.85 mV/V", only="[muµ]?V/V")
TEMPERATURE = Dimension("temperature", "degC", "degC", "°C", "20 degC or 68 degF")
DIFFERENCE = Dimension("temperature difference", "kelvin", "kelvin", "K", "35 K")
EXPANSION = Dimension("expansion", "1/kelvin", "ppm/kelvin", "ppm/K", "11.7 ppm/K")
ANGLE = Dimension(
    "angle", "radian", "degree", "°", "45 deg", only="°|deg(?:rees?)?|m?rad(?:ians?)?"
)
STRESS = Dimension("stress", "pascal", "megapascal", "MPa", "85 MPa")
MODULUS = Dimension("modulus of elasticity", "pascal", "gigapascal", "GPa", "206 GPa")
FORCE = Dimension("force", "newton", "newton", "N", "30 kN", (("kilonewton", "kN"),))
TORQUE = Dimension(
    "torque",
    "newton*meter",
    "newton*meter",
    "N·m",
    "500 N*m",
    (("kilonewton*meter", "kN·m"),),
)
POWER_DENSITY = Dimension("power density", "W/m^2", "kW/m^2", "kW/m²", "2 W/in^2")
POWER = Dimension("power", "watt", "milliwatt", "mW", "20 mW")
FREQUENCY = Dimension("frequency", "hertz", "hertz", "Hz", "10 kHz", (("kilohertz", "kHz"),))
SPEED = Dimension("speed", "m/s", "m/s", "m/s", "5000 m/s")
DENSITY = Dimension("density", "kg/m^3", "kg/m^3", "kg/m³", "7850 kg/m^3")
TIME = Dimension("time", "second", "second", "s", "30 min", (("minute", "min"), ("hour", "h")))
MOMENT = Dimension(
    "time", "second", "microsecond", "µs", "20 us", (("millisecond", "ms"), ("second", "s"))
)
HUMIDITY = Dimension("relative humidity", "", "percent", "%", "55 %", only="%.*|percent")
