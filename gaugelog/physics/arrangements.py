"""Bridge arrangements: what each of the four arms feels of the strain that is looked for.

Arms are numbered round the bridge, 1 and 3 opposite. An arm feels the strain times its share:
1 for a grid along it, −1 for a grid on the other side of a bent part, −ν for a grid across it, 0
for a dummy or a resistor.
"""

from __future__ import annotations

from dataclasses import dataclass

from gaugelog.physics._maths import Number
from gaugelog.physics.validity import OutOfDomain, between

Shares = tuple[Number, Number, Number, Number]
"""What arms 1 to 4 feel, as multiples of the strain looked for."""

POISSON_LOW, POISSON_HIGH = -1.0, 0.5
"""Bounds of Poisson's ratio of an isotropic material (theory of elasticity)."""


@dataclass(frozen=True, slots=True)
class Arrangement:
    """A way to place grids in a bridge.

    `along` and `across` give, arm by arm, the grid's share of the strain and of the strain
    across it (Poisson). `outside` numbers the arms that lie at the article, not in the module.
    """

    name: str
    along: tuple[int, int, int, int]
    across: tuple[int, int, int, int]
    outside: frozenset[int]
    looked_for: str

    def shares(self, poisson: Number = 0.0) -> Shares:
        """Each arm's share of the strain looked for; `poisson` counts where a grid lies across."""
        between("poisson", poisson, POISSON_LOW, POISSON_HIGH)
        one, two, three, four = (
            along - across * poisson for along, across in zip(self.along, self.across, strict=True)
        )
        return one, two, three, four

    @property
    def needs_poisson(self) -> bool:
        """Whether a grid lies across the strain, so that Poisson's ratio counts."""
        return any(self.across)

    @property
    def active(self) -> tuple[bool, bool, bool, bool]:
        """Whether each arm holds a grid that feels strain."""
        one, two, three, four = (
            bool(along or across) for along, across in zip(self.along, self.across, strict=True)
        )
        return one, two, three, four

    @property
    def kind(self) -> str:
        """`quarter`, `half` or `full`, by the arms outside the module."""
        return {1: "quarter", 2: "half", 4: "full"}[len(self.outside)]


_NONE = (0, 0, 0, 0)
_AXIAL = "strain along the grid"
_QUARTER, _HALF, _FULL = frozenset({1}), frozenset({1, 2}), frozenset({1, 2, 3, 4})

ARRANGEMENTS: dict[str, Arrangement] = {
    each.name: each
    for each in (
        Arrangement("quarter two-wire", (1, 0, 0, 0), _NONE, _QUARTER, _AXIAL),
        Arrangement("quarter three-wire", (1, 0, 0, 0), _NONE, _QUARTER, _AXIAL),
        Arrangement("half with dummy", (1, 0, 0, 0), _NONE, _HALF, _AXIAL),
        Arrangement("half bending", (1, -1, 0, 0), _NONE, _HALF, "bending strain"),
        Arrangement("half Poisson", (1, 0, 0, 0), (0, 1, 0, 0), _HALF, _AXIAL),
        Arrangement("opposite arms", (1, 0, 1, 0), _NONE, _FULL, _AXIAL),
        Arrangement("full bending", (1, -1, 1, -1), _NONE, _FULL, "bending strain"),
        Arrangement("full torsion", (1, -1, 1, -1), _NONE, _FULL, "strain at 45° to the axis"),
        Arrangement("full Poisson", (1, 0, 1, 0), (0, 1, 0, 1), _FULL, _AXIAL),
    )
}
"""Every arrangement by its name. Full torsion looks for half the engineering shear strain."""


def arrangement(name: str) -> Arrangement:
    """The arrangement called `name`; an unknown name lists those there are."""
    found = ARRANGEMENTS.get(name)
    if found is None:
        known = ", ".join(ARRANGEMENTS)
        raise OutOfDomain("arrangement", f"must be one of {known}, not {name!r}.")
    return found


def bridge_factor(name: str, poisson: Number = 0.0) -> Number:
    """How many times the output of one active arm the arrangement gives: s1 − s2 + s3 − s4.

    Units: none; 1 for a quarter bridge, 2(1 + ν) for a full bridge with Poisson arms, 4 for a
    full bending or torsion bridge. Source: Dally and Riley, Experimental Stress Analysis,
    chapter on the Wheatstone bridge (from memory).

    >>> bridge_factor("full bending")
    4.0
    """
    one, two, three, four = arrangement(name).shares(poisson)
    return one - two + three - four
