"""The order in which entries of several chains are read: a function of the set of entries only.

An entry comes after the one before it in its chain, and after the heads of other chains that its
writer knew. Where that leaves a choice, the chain whose id sorts first goes first. So laptops that
hold the same entries hold the same ledger, in whatever order they came by them.
"""

from __future__ import annotations

from collections import defaultdict
from collections.abc import Callable, Iterable, Iterator, Mapping
from typing import TypeVar

from gaugelog.journal.entry import Entry
from gaugelog.journal.head import Head

T = TypeVar("T")


def ledger_order(entries: Iterable[Entry]) -> list[Entry]:
    """Return the entries in causal order, then by chain id.

    A head that no entry of the set answers to is not waited for.
    """
    chains: dict[str, list[Entry]] = defaultdict(list)
    for entry in entries:
        chains[entry.header.chain].append(entry)
    for chain in chains.values():
        chain.sort(key=lambda entry: (entry.header.seq, entry.hash))
    return list(merged(chains, heads_known, lambda entry: entry.header.seq))


def heads_known(entry: Entry) -> tuple[Head, ...]:
    """The heads of other chains that the writer of `entry` knew."""
    return entry.header.heads


def merged(
    chains: Mapping[str, Iterable[T]],
    heads: Callable[[T], tuple[Head, ...]],
    seq: Callable[[T], int],
) -> Iterator[T]:
    """Merge chains, each in its own order, into the one order; holds one item a chain in memory.

    Where every chain waits for an entry that is not there, the first by id goes on.
    """
    if len(chains) == 1:
        yield from next(iter(chains.values()))
        return
    sources = {chain: iter(chains[chain]) for chain in sorted(chains)}
    waiting: dict[str, T] = {}
    reached: dict[str, int] = {}
    for chain in list(sources):
        _draw(chain, sources, waiting)
    while waiting:
        chain = _next_chain(waiting, reached, heads)
        item = waiting.pop(chain)
        reached[chain] = seq(item)
        yield item
        _draw(chain, sources, waiting)


def _draw(chain: str, sources: Mapping[str, Iterator[T]], waiting: dict[str, T]) -> None:
    for item in sources[chain]:
        waiting[chain] = item
        return


def _next_chain(
    waiting: Mapping[str, T],
    reached: Mapping[str, int],
    heads: Callable[[T], tuple[Head, ...]],
) -> str:
    first = min(waiting)
    for chain in sorted(waiting):
        # A chain that has run out is not waited for: what was known of it is not in the set.
        known = heads(waiting[chain])
        if all(
            head.chain not in waiting or reached.get(head.chain, 0) >= head.seq for head in known
        ):
            return chain
    return first
