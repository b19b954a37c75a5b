"""Layouts: where the arms of a bridge end and where its lead wires run.

Nodes at the module carry the names of its pins; nodes at the article end in ` tab`. With remote
sense the module measures the supply at the bridge.
"""

from __future__ import annotations

from collections.abc import Mapping
from dataclasses import dataclass, field

from gaugelog.physics.arrangements import arrangement
from gaugelog.physics.validity import OutOfDomain

Ends = tuple[str, str]

SUPPLY_PLUS, SUPPLY_MINUS = "supply+", "supply-"
SIGNAL_PLUS, SIGNAL_MINUS = "signal+", "signal-"
SENSE_PLUS, SENSE_MINUS = "sense+", "sense-"
COMPLETION = "completion"
HALF_PLUS, HALF_MINUS = "half+", "half-"
"""Ends of a module's own half bridge where buffers drive it from the sense wires."""


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
        raise OutOfDomain("wires", f"of circuit {name} must number {counts}, not {wires}.")
    return fitting[wires]
