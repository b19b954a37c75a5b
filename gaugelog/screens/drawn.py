"""A circuit drawn in characters: arms at the article, wires in the middle, pins at the right."""

from __future__ import annotations

from collections.abc import Iterator, Sequence
from dataclasses import dataclass

from rich.cells import cell_len

from gaugelog.work.bridges import Bridge, BridgeArm, BridgeWire

_NODE = 4
"""The column that tabs and arms stand in."""


@dataclass(frozen=True, slots=True)
class _Marks:
    """How wide the marks and the pins are drawn, so that they stand under one another."""

    mark: int
    pin: int
    run: int
    """Cells from the tab to the pin."""


def bridge_drawn(bridge: Bridge, width: int) -> list[str]:
    """The lines of the drawing, none wider than `width` where the labels let it."""
    wires = [*bridge.wires, *bridge.others]
    if not bridge.arms:
        return [_plainly(wire) for wire in wires]
    marks = _marks(wires, width)
    drawn = [_heads(bridge, marks)]
    for chain in _chains([arm for arm in bridge.arms if arm.outside]):
        drawn += _chain(chain, bridge.wires, marks)
    drawn += [_loose(wire, marks) for wire in bridge.others]
    inside = [f"arm {arm.number}: {_parts(arm)}" for arm in bridge.arms if not arm.outside]
    if inside:
        drawn += ["", f" in the module: {', '.join(inside)}"]
    return drawn


def _marks(wires: Sequence[BridgeWire], width: int) -> _Marks:
    mark = max((cell_len(wire.mark) for wire in wires), default=0)
    pin = max((cell_len(wire.pin) for wire in wires), default=0)
    function = max((cell_len(wire.function) for wire in wires), default=0)
    free = width - _NODE - pin - function - 5
    return _Marks(mark, pin, min(max(free, mark + 8), 34))


def _heads(bridge: Bridge, marks: _Marks) -> str:
    cable = f"{bridge.cable} {bridge.length_m:g} m".strip()
    left = "   article".ljust(_NODE + (marks.run - cell_len(cable)) // 2)
    middle = f"{left} {cable}"
    return f"{middle.ljust(_NODE + marks.run + 1)} {bridge.channel} {bridge.connector}".rstrip()


def _chains(arms: Sequence[BridgeArm]) -> Iterator[list[BridgeArm]]:
    """Arms that hang together, one after the other."""
    chain: list[BridgeArm] = []
    for arm in arms:
        if chain and chain[-1].ends[1] != arm.ends[0]:
            yield chain
            chain = []
        chain.append(arm)
    if chain:
        yield chain


def _chain(chain: Sequence[BridgeArm], wires: Sequence[BridgeWire], marks: _Marks) -> list[str]:
    ring = chain[-1].ends[1] == chain[0].ends[0]
    lines: list[str] = []
    for place, arm in enumerate(chain):
        left = " ┌──" if ring and place == 0 else " │  " if ring else "    "
        lines += _tab(arm.ends[0], wires, left, marks, ring)
        lines.append(f"{' │ ' if ring else '   '}[{arm.number}] {_parts(arm)}")
    if ring:
        lines.append(" └──┘")
    else:
        lines += _tab(chain[-1].ends[1], wires, "    ", marks, False, last=True)
    return lines


def _tab(
    tab: str,
    wires: Sequence[BridgeWire],
    left: str,
    marks: _Marks,
    ring: bool,
    last: bool = False,
) -> Iterator[str]:
    """A tab with its wires, one a line; below the first the arm that follows goes on."""
    mine = [wire for wire in wires if wire.tab == tab]
    if not mine:
        yield f"{left}●"
    below = f"{' │  ' if ring else '    '}{' ' if last else '│'}"
    for place, wire in enumerate(mine):
        fork = _fork(place, len(mine))
        yield f"{left if place == 0 else below[:_NODE]}{'●' if place == 0 else below[_NODE]}" + (
            _run(fork, wire, marks)
        )


def _fork(place: int, count: int) -> str:
    if count == 1:
        return "───"
    return "─┬─" if place == 0 else " └─" if place == count - 1 else " ├─"


def _run(start: str, wire: BridgeWire, marks: _Marks) -> str:
    """A wire from its tab to its pin; its mark in the middle."""
    mark = f" {wire.mark} " if wire.mark else ""
    before = max((marks.run - marks.mark) // 2 - len(start), 1)
    run = start + "─" * before + mark
    run += "─" * (marks.run - cell_len(run))
    return f"{run} {wire.pin:>{marks.pin}}  {wire.function}"


def _loose(wire: BridgeWire, marks: _Marks) -> str:
    """A pin that no tab is wired to, such as the shield's; it may have a wire or not."""
    if not wire.mark:
        return f"{'no wire':>{_NODE + 1 + marks.run}} {wire.pin:>{marks.pin}}  {wire.function}"
    return f"{' ' * (_NODE + 1)}{_run('   ', wire, marks).replace('─', '┄')}"


def _parts(arm: BridgeArm) -> str:
    return " + ".join(arm.parts)


def _plainly(wire: BridgeWire) -> str:
    return f" pin {wire.pin or '–'}  {wire.function}  wire {wire.mark or '–'}"
