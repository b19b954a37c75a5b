"""Asks ngspice, a circuit simulator, for node voltages; many circuits in one run."""

from __future__ import annotations

import subprocess
from dataclasses import dataclass
from pathlib import Path

from gaugelog.physics.network import Network

Ends = tuple[str, str]


@dataclass(frozen=True)
class Bench:
    """A network on the bench: 1 V between `supply` or 1 A through `current`, and followers.

    `followers` maps a node that a buffer drives to the node whose voltage it follows.
    """

    network: Network
    supply: Ends | None = None
    current: Ends | None = None
    followers: tuple[Ends, ...] = ()


def voltages(benches: list[Bench], folder: Path) -> list[dict[str, float]]:
    """Voltage of every node of every bench, by the lower end of its supply or current."""
    lines, names = ["* benches"], list[dict[str, str]]()
    for number, bench in enumerate(benches):
        wired, known = _wired(number, bench)
        lines += wired
        names.append(known)
    found = _run(lines, folder)
    return [
        {node: 0.0 if name == "0" else found[name] for node, name in known.items()}
        for known in names
    ]


def resistances(pairs: list[tuple[Network, str, str]], folder: Path) -> list[float]:
    """Resistance between two nodes of each network: the voltage that 1 A makes."""
    benches = [Bench(network, current=(high, low)) for network, high, low in pairs]
    return [
        found[high] for found, (_, high, _) in zip(voltages(benches, folder), pairs, strict=True)
    ]


def _wired(number: int, bench: Bench) -> tuple[list[str], dict[str, str]]:
    ends = bench.supply or bench.current
    assert ends is not None
    known = {node: f"n{number}x{place}" for place, node in enumerate(bench.network.nodes)}
    known[ends[1]] = "0"
    lines = [
        f"R{number}x{place} {known[each.start]} {known[each.end]} {each.resistance!r}"
        for place, each in enumerate(bench.network.resistors)
    ]
    if bench.supply:
        lines.append(f"V{number} {known[ends[0]]} 0 1")
    else:
        lines.append(f"I{number} 0 {known[ends[0]]} 1")
    lines += [
        f"E{number}x{place} {known[driven]} 0 {known[followed]} 0 1"
        for place, (driven, followed) in enumerate(bench.followers)
    ]
    return lines, known


def _run(lines: list[str], folder: Path) -> dict[str, float]:
    deck, raw = folder / "deck.cir", folder / "deck.raw"
    control = [".control", "set filetype=ascii", "op", f"write {raw}", ".endc", ".end"]
    deck.write_text("\n".join([*lines, *control]) + "\n", encoding="utf-8")
    done = subprocess.run(
        ["ngspice", "-b", str(deck)], capture_output=True, text=True, check=False, cwd=folder
    )
    assert raw.exists(), done.stdout + done.stderr
    return _read(raw)


def _read(raw: Path) -> dict[str, float]:
    head, _, body = raw.read_text(encoding="utf-8").partition("Values:")
    listed = head.partition("\nVariables:\n")[2].splitlines()
    names = [line.split()[1] for line in listed]
    values = body.split()[1:]
    return {
        name.removeprefix("v(").removesuffix(")"): float(value)
        for name, value in zip(names, values, strict=True)
    }
