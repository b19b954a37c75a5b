"""A circuit from grid to module: four arms of elements in series, lead wires, remote sense.

Nodes at the module carry the names of its pins; nodes at the article end in ` tab`. From the
circuit comes its network of resistors, and from that the zero it must read, the output under
strain, and what a shunt or a leak between any two nodes does.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field, replace
from typing import Literal

from gaugelog.physics._maths import Number
from gaugelog.physics.arrangements import arrangement
from gaugelog.physics.validity import OutOfDomain, above, finite, not_negative, positive

ElementKind = Literal["grid", "dummy", "completion", "trim"]
Ends = tuple[str, str]

SUPPLY_PLUS, SUPPLY_MINUS = "supply+", "supply-"
SIGNAL_PLUS, SIGNAL_MINUS = "signal+", "signal-"
SENSE_PLUS, SENSE_MINUS = "sense+", "sense-"
COMPLETION = "completion"
HALF_PLUS, HALF_MINUS = "half+", "half-"
"""Ends of a module's own half bridge where buffers drive it from the sense wires."""


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
class Layout:
    """Where arms end and wires run: each arm's two nodes, each wire's module pin and tab.

    `outside` numbers the arms at the article; `sensed` says that the module measures the supply
    at the bridge by sense wires and takes its own half bridge from them.
    """

    name: str
    arm_ends: tuple[Ends, Ends, Ends, Ends]
    wires: Mapping[str, str] = field(hash=False)
    outside: frozenset[int]
    sensed: bool = False

    @property
    def reference(self) -> Ends:
        """The two pins whose voltage the output is a ratio of, plus first."""
        return (SENSE_PLUS, SENSE_MINUS) if self.sensed else (SUPPLY_PLUS, SUPPLY_MINUS)


@dataclass(frozen=True, slots=True)
class Circuit:
    """A bridge as wired. `wires` gives each wire's resistance in ohm by its module pin."""

    layout: Layout
    arms: tuple[Arm, Arm, Arm, Arm]
    wires: Mapping[str, Number] = field(hash=False)

    def __post_init__(self) -> None:
        """Refuse wires that the layout lacks or does not have, and an empty arm."""
        odd = set(self.wires) ^ set(self.layout.wires)
        if odd:
            raise OutOfDomain(
                "wires",
                f"of a {self.layout.name} circuit must be {', '.join(self.layout.wires)}; "
                f"{', '.join(sorted(odd))} does not fit.",
            )
        for pin, resistance in self.wires.items():
            not_negative(f"resistance of the {pin} wire", resistance)
        for number, arm in enumerate(self.arms, start=1):
            if not arm:
                raise OutOfDomain("arms", f"must each hold an element; arm {number} is empty.")

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


def _tab(pin: str) -> str:
    return f"{pin} tab"


def _wires(*pins: str) -> dict[str, str]:
    """Each pin's tab; a sense wire ends where its supply wire does."""
    return {pin: _tab(pin.replace("sense", "supply")) for pin in pins}


_ARM_1 = (_tab(SUPPLY_MINUS), _tab(SIGNAL_PLUS))
_ARM_2 = (_tab(SIGNAL_PLUS), _tab(SUPPLY_PLUS))
_ARM_3 = (_tab(SUPPLY_PLUS), _tab(SIGNAL_MINUS))
_ARM_4 = (_tab(SIGNAL_MINUS), _tab(SUPPLY_MINUS))
_OWN_2 = (SIGNAL_PLUS, SUPPLY_PLUS)
_OWN_3 = (SUPPLY_PLUS, SIGNAL_MINUS)
_OWN_4 = (SIGNAL_MINUS, SUPPLY_MINUS)
_BUFFERED = ((HALF_PLUS, SIGNAL_MINUS), (SIGNAL_MINUS, HALF_MINUS))
_HALF_PINS = (SUPPLY_PLUS, SUPPLY_MINUS, SIGNAL_PLUS)
_FULL_PINS = (*_HALF_PINS, SIGNAL_MINUS)
_SENSE_PINS = (SENSE_PLUS, SENSE_MINUS)
_FIRST, _HALF, _ALL = frozenset({1}), frozenset({1, 2}), frozenset({1, 2, 3, 4})

_QUARTER_TWO = Layout(
    "quarter two-wire",
    (_ARM_1, _OWN_2, _OWN_3, _OWN_4),
    _wires(SUPPLY_MINUS, SIGNAL_PLUS),
    _FIRST,
)
_QUARTER_THREE = Layout(
    "quarter three-wire",
    (_ARM_1, (COMPLETION, SUPPLY_PLUS), _OWN_3, _OWN_4),
    {**_wires(SUPPLY_MINUS, SIGNAL_PLUS), COMPLETION: _tab(SIGNAL_PLUS)},
    _FIRST,
)
_HALF_THREE = Layout(
    "half three-wire", (_ARM_1, _ARM_2, _OWN_3, _OWN_4), _wires(*_HALF_PINS), _HALF
)
_HALF_FIVE = Layout(
    "half five-wire",
    (_ARM_1, _ARM_2, *_BUFFERED),
    _wires(*_HALF_PINS, *_SENSE_PINS),
    _HALF,
    sensed=True,
)
_OPPOSITE_FOUR = Layout(
    "opposite four-wire", (_ARM_1, _OWN_2, _ARM_3, _OWN_4), _wires(*_FULL_PINS), frozenset({1, 3})
)
_FULL_ARMS = (_ARM_1, _ARM_2, _ARM_3, _ARM_4)
_FULL_FOUR = Layout("full four-wire", _FULL_ARMS, _wires(*_FULL_PINS), _ALL)
_FULL_SIX = Layout(
    "full six-wire", _FULL_ARMS, _wires(*_FULL_PINS, *_SENSE_PINS), _ALL, sensed=True
)

LAYOUTS: dict[str, Layout] = {
    each.name: each
    for each in (
        _QUARTER_TWO,
        _QUARTER_THREE,
        _HALF_THREE,
        _HALF_FIVE,
        _OPPOSITE_FOUR,
        _FULL_FOUR,
        _FULL_SIX,
    )
}
"""Every layout by its name."""


def layout(name: str) -> Layout:
    """The layout called `name`; an unknown name lists those there are.

    Source: the circuits of common practice; corners as in `bridge`.
    """
    found = LAYOUTS.get(name)
    if found is None:
        raise OutOfDomain("layout", f"must be one of {', '.join(LAYOUTS)}, not {name!r}.")
    return found


def layout_for(name: str, wires: int) -> Layout:
    """The layout of an arrangement with so many wires to the module.

    Opposite arms with four wires are taken with both resistors at the article, as a full bridge;
    ask for `opposite four-wire` by name where they lie in the module.
    Source: the circuits of common practice.
    """
    chosen = arrangement(name)
    fitting = {len(each.wires): each for each in LAYOUTS.values() if each.outside == chosen.outside}
    if chosen.kind == "quarter":
        fitting = {len(LAYOUTS[name].wires): LAYOUTS[name]}
    if wires not in fitting:
        counts = " or ".join(str(count) for count in sorted(fitting))
        raise OutOfDomain("wires", f"of a {name} circuit must number {counts}, not {wires}.")
    return fitting[wires]


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
