"""A circuit from grid to module: four arms of elements in series, lead wires, a layout.

From the circuit comes its network of resistors, and from that the zero it must read, the output
under strain, and what a shunt or a leak between any two nodes does (`prediction`).
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from typing import Literal

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import arrangement
from gaugelog.physics.layouts import Layout, layout_for
from gaugelog.physics.validity import OutOfDomain, above, finite, not_negative, positive

ElementKind = Literal["grid", "dummy", "completion", "trim"]


@dataclass(frozen=True, slots=True)
class Element:
    """One element of an arm: its resistance in ohm, and for a grid its factor and strain."""

    name: str
    kind: ElementKind
    resistance: Number
    factor: Number = 0.0
    strain: Number = 0.0

    def __post_init__(self) -> None:
        """Refuse a resistance that cannot be, and a strain that leaves none."""
        positive(f"resistance of {self.name}", self.resistance)
        above(f"strain times factor of {self.name}", self.factor * self.strain, -1.0)

    @property
    def value(self) -> Number:
        """Resistance under its strain, ohm: R (1 + K ε)."""
        return self.resistance * (1 + self.factor * self.strain)


Arm = tuple[Element, ...]
"""Elements in series, in order round the bridge."""


@dataclass(frozen=True, slots=True)
class Circuit:
    """A bridge as wired. `wires` gives each wire's resistance in ohm by its module pin."""

    layout: Layout
    arms: tuple[Arm, Arm, Arm, Arm]
    wires: Mapping[str, Number] = field(hash=False)

    def __post_init__(self) -> None:
        """Refuse wires that the layout lacks or does not have, an empty arm, a name used twice."""
        odd = set(self.wires) ^ set(self.layout.wires)
        if odd:
            raise OutOfDomain(
                "wires",
                f"of circuit {self.layout.name} must be {', '.join(self.layout.wires)}; "
                f"{', '.join(sorted(odd))} does not fit.",
            )
        for pin, resistance in self.wires.items():
            not_negative(f"resistance of the {pin} wire", resistance)
        for number, arm in enumerate(self.arms, start=1):
            if not arm:
                raise OutOfDomain("arms", f"must each hold an element; arm {number} is empty.")
        names = [element.name for element in self.elements]
        twice = sorted({name for name in names if names.count(name) > 1})
        if twice:
            raise OutOfDomain("arms", f"must name each element once; {', '.join(twice)} recurs.")

    @property
    def elements(self) -> tuple[Element, ...]:
        """Every element, arm by arm."""
        return tuple(element for arm in self.arms for element in arm)

    def strained(self, strains: Mapping[str, Number]) -> Circuit:
        """The circuit with the strain of some elements, named by `strains`, as a ratio."""
        unknown = set(strains) - {element.name for element in self.elements}
        if unknown:
            raise OutOfDomain("strains", f"name no element: {', '.join(sorted(unknown))}.")
        return self._with(
            {
                element.name: replace(
                    element, strain=finite(f"strain of {element.name}", strains[element.name])
                )
                for element in self.elements
                if element.name in strains
            }
        )

    def altered(self, name: str, resistance: Number) -> Circuit:
        """The circuit with another resistance, in ohm, for the element called `name`."""
        return self._with({name: replace(self.element(name), resistance=resistance)})

    def element(self, name: str) -> Element:
        """The element called `name`; an unknown name lists those there are."""
        for element in self.elements:
            if element.name == name:
                return element
        known = ", ".join(element.name for element in self.elements)
        raise OutOfDomain("element", f"must be one of {known}, not {name!r}.")

    def _with(self, others: Mapping[str, Element]) -> Circuit:
        one, two, three, four = (
            tuple(others.get(element.name, element) for element in arm) for arm in self.arms
        )
        return replace(self, arms=(one, two, three, four))


def circuit_of(
    name: str,
    wires: int,
    resistance: Number,
    factor: Number,
    wire: Number = 0.0,
    completion: Number | None = None,
) -> Circuit:
    """The circuit of an arrangement with equal grids and equal wires, to start a figure from.

    Grids are called `grid 1` to `grid 4` by their arm, the dummy of a half bridge `dummy 2`;
    other arms hold `resistor 2` and so on, of `completion` ohm, or the grid's resistance where
    none is given.
    Source: the circuits of common practice.
    """
    chosen, placed = arrangement(name), layout_for(name, wires)
    rest = resistance if completion is None else completion
    one, two, three, four = (
        (_filling(number, active, number in placed.outside, chosen.kind, resistance, factor, rest),)
        for number, active in enumerate(chosen.active, start=1)
    )
    return Circuit(placed, (one, two, three, four), dict.fromkeys(placed.wires, wire))


def _filling(
    number: int,
    active: bool,
    outside: bool,
    kind: str,
    resistance: Number,
    factor: Number,
    completion: Number,
) -> Element:
    """What an arm of an arrangement holds: a grid, a half bridge's dummy, or a resistor."""
    if active:
        return Element(f"grid {number}", "grid", resistance, factor)
    if outside and kind == "half":
        return Element(f"dummy {number}", "dummy", resistance, factor)
    return Element(f"resistor {number}", "completion", completion)
