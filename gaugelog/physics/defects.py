"""Defects of wiring that figures between pins may show, each as one change of a sound network.

An open, a short, a wrong value, a poor joint and a leak all change one resistance between two
nodes, known or to be fitted. Two wires swapped exchange two pins. So every defect of a circuit
is listed from its own network, not from a book of cases.
"""

from __future__ import annotations

from collections.abc import Iterator, Mapping, Sequence
from dataclasses import dataclass, field
from itertools import chain, combinations
from typing import Literal

from gaugelog.physics.network import Network, Resistor
from gaugelog.physics.pin_network import ARTICLE, SHIELD

Kind = Literal[
    "nothing", "open", "missing completion", "short", "leak", "wrong value", "joint", "swapped"
]
Family = Literal["nothing", "open", "across", "value", "joint", "swapped"]
"""How a defect changes the network; `across` is a short or a leak by its size."""

SHORT_PART = 0.02
"""A path under this part of a nominal arm is called a short, above it a leak."""


@dataclass(frozen=True, slots=True)
class Suspect:
    """A defect that may be there: which two nodes, and the resistance that is there by plan.

    `present` is infinite where nothing joins the nodes by plan. `swap` exchanges two pins.
    """

    family: Family
    where: tuple[str, ...]
    ends: tuple[str, str]
    present: float = float("inf")
    swap: Mapping[str, str] = field(default_factory=dict, hash=False)
    completion: bool = False

    @property
    def sized(self) -> bool:
        """Whether the readings must tell how large it is."""
        return self.family in ("across", "value", "joint")

    def touched(self, ends: Sequence[tuple[str, str]]) -> list[tuple[str, str]]:
        """The terminals that a meter at `ends` really touches where wires are swapped."""
        return [(self.swap.get(start, start), self.swap.get(end, end)) for start, end in ends]


@dataclass(frozen=True, slots=True)
class Defect:
    """A defect as found: its kind, where it is, and its size in ohm where it has one.

    The size of a wrong value is the value found; of a joint what it adds; of a short or a leak
    the resistance of the path.
    """

    kind: Kind
    where: tuple[str, ...] = ()
    size: float | None = None

    @property
    def place(self) -> str:
        """Where it is, in words."""
        return " and ".join(self.where)

    @property
    def sentence(self) -> str:
        """The defect as a person reads it."""
        return f"{self.what} {self.place}".rstrip()

    @property
    def what(self) -> str:
        """What it is, ready for its place to follow."""
        size = "" if self.size is None else ohm(self.size)
        return {
            "nothing": "nothing wrong that resistance shows",
            "open": "open circuit in",
            "missing completion": "no completion at",
            "short": f"short of {size} between",
            "leak": f"leak of {size} between",
            "wrong value": f"{size} instead of the planned value in",
            "joint": f"joint with {size} too much at",
            "swapped": "swapped wires of",
        }[self.kind]


def suspects(network: Network, pins: tuple[str, ...], completions: frozenset[str]) -> list[Suspect]:
    """Every single defect that a network with these pins may have; `nothing` comes first.

    `completions` names the elements that are completion resistors.
    Source: the network itself; the kinds are common practice.
    """
    wires = {f"{pin} wire" for pin in pins}
    nowhere = (pins[0], pins[0])
    swaps = (pair for pair in combinations(pins, 2) if not _exchangeable(network, *pair))
    return list(
        chain(
            [Suspect("nothing", (), nowhere)],
            (_of("open", each, completions) for each in network.resistors),
            (_of("joint", each) for each in network.resistors),
            (_of("value", each) for each in network.resistors if each.name not in wires),
            _across(network, pins),
            (Suspect("swapped", pair, nowhere, swap=_exchange(*pair)) for pair in swaps),
        )
    )


def found(suspect: Suspect, size: float | None, nominal: float) -> Defect:
    """The defect that a suspect of a fitted size is; `nominal` is an ordinary arm, ohm.

    Source: the words of the trade (common practice).
    """
    if suspect.family == "across":
        small = size is not None and size < SHORT_PART * nominal
        return Defect("short" if small else "leak", suspect.where, size)
    if suspect.family == "open":
        return Defect("missing completion" if suspect.completion else "open", suspect.where)
    if suspect.family == "value":
        return Defect("wrong value", suspect.where, size)
    added = None if size is None else size - suspect.present
    return Defect(suspect.family, suspect.where, added)


def ohm(value: float) -> str:
    """A resistance as people write it: three digits with Ω, kΩ, MΩ or GΩ.

    Source: SI prefixes.

    >>> ohm(2_100_000.0)
    '2.1 MΩ'
    """
    for scale, unit in ((1e9, "GΩ"), (1e6, "MΩ"), (1e3, "kΩ")):
        if float(f"{value:.4g}") >= scale:
            return f"{value / scale:.3g} {unit}"
    return f"{value:.1f} Ω"


def _of(family: Family, each: Resistor, completions: frozenset[str] = frozenset()) -> Suspect:
    return Suspect(
        family,
        (each.name,),
        (each.start, each.end),
        float(each.resistance),
        completion=each.name in completions,
    )


def _across(network: Network, pins: tuple[str, ...]) -> Iterator[Suspect]:
    """Paths between any two corners, any two pins, either and bare metal; across each element."""
    inner = [node for node in network.nodes if node.startswith("arm ")]
    corners = [node for node in network.nodes if node not in pins and node not in inner]
    metal = (ARTICLE, SHIELD)
    pairs = chain(
        combinations((*corners, *metal), 2),
        combinations(pins, 2),
        ((pin, each) for pin in pins for each in metal),
        ((each.start, each.end) for each in network.resistors if {each.start, each.end} & {*inner}),
    )
    for pair in dict.fromkeys(pairs):
        yield Suspect("across", pair, pair)


def _exchangeable(network: Network, first: str, second: str) -> bool:
    """Whether two wires end at one tab with one resistance, so that a swap changes nothing."""
    wires = {each.start: (each.end, each.resistance) for each in network.resistors}
    return first in wires and wires[first] == wires.get(second)


def _exchange(first: str, second: str) -> dict[str, str]:
    return {first: second, second: first}
