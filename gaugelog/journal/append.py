"""How facts get into the journal: chained, counted within their deed, the last entry signed."""

from __future__ import annotations

from collections.abc import Collection, Sequence
from dataclasses import dataclass, replace

from gaugelog import __version__
from gaugelog.errors import Refused
from gaugelog.journal.certificates import certificate_issued, journal_begun
from gaugelog.journal.clock import Moment
from gaugelog.journal.entry import FORMAT, Body, Entry, Fact, Head, Header, sha256
from gaugelog.journal.head import NO_HASH
from gaugelog.journal.keys import Signer
from gaugelog.journal.storage.port import Reader, Writer


def append(
    writer: Writer,
    chain: str,
    facts: Sequence[Fact],
    signer: Signer,
    moment: Moment,
    deed: str,
) -> list[Entry]:
    """Keep the facts of one deed at the end of `chain`, the last entry signed by `signer`.

    `deed` is an id made by the caller: a deed that is there already is given back, so that a
    caller who never heard the answer can ask again. Raises Refused when the deed that is there
    kept other facts, and NotCanonical when a fact holds what the journal can't keep.
    """
    if not facts:
        raise ValueError("facts is empty; a deed keeps at least one fact.")
    there = writer.deed(deed)
    if there:
        return _same_deed(there, facts, signer)
    head = writer.head(chain) or Head(chain, 0, NO_HASH)
    first = _Deed(deed, signer, moment).header(head, _other_heads(writer, chain), len(facts))
    entries = _chained(first, facts)
    last = entries[-1]
    entries[-1] = replace(last, signature=signer.sign(last.header_bytes))
    for entry in entries:
        writer.insert(entry)
    return entries


def begin(
    writer: Writer,
    facts: Sequence[Fact],
    signer: Signer,
    moment: Moment,
    chain: str,
    deed: str,
    *,
    name: str = "",
    program: str = f"gaugelog {__version__}",
) -> list[Entry]:
    """Keep the first deed of a logbook: its authority, its custodian's certificate, and `facts`.

    `signer` is the custodian, certified by the authority; `name` is the logbook's. Raises
    Refused when the journal has begun.
    """
    if not writer.deed(deed) and writer.chains():
        raise Refused("The journal has begun already.", "Append to it instead.")
    first = [
        journal_begun(signer.chain[0], program=program, name=name),
        certificate_issued(signer.person, signer.certificate, "custodian of the new logbook"),
    ]
    return append(writer, chain, [*first, *facts], signer, moment, deed)


def touched_since(reader: Reader, about: Collection[str], seq: int, chain: str) -> list[Entry]:
    """The entries of `chain` numbered above `seq` that concern any of the subjects `about`."""
    subjects = frozenset(about)
    return [
        entry
        for entry in reader.entries(chain, after=seq)
        if not subjects.isdisjoint(entry.body.about)
    ]


def _same_deed(there: list[Entry], facts: Sequence[Fact], signer: Signer) -> list[Entry]:
    same = [entry.fact for entry in there] == [_as_read(fact) for fact in facts]
    if same and there[0].header.actor == signer.person:
        return there
    raise Refused(
        f"Deed {there[0].header.deed} was done before with other facts.",
        "Give each deed an id of its own.",
    )


def _as_read(fact: Fact) -> Fact:
    # What is read back has lists where the caller may have had tuples.
    return Entry(b"", Body.of(fact).to_bytes()).body.as_fact(fact.kind, fact.version)


@dataclass(frozen=True, slots=True)
class _Deed:
    """Who does which deed, and when."""

    id: str
    signer: Signer
    moment: Moment

    def header(self, head: Head, others: tuple[Head, ...], count: int) -> Header:
        """The header of the deed's first entry, which follows `head`, still without its fact."""
        return Header(
            format=FORMAT,
            chain=head.chain,
            seq=head.seq + 1,
            heads=others,
            deed=self.id,
            index=1,
            count=count,
            time=self.moment.text,
            offset=self.moment.offset,
            boot=self.moment.boot,
            uptime_ms=self.moment.uptime_ms,
            actor=self.signer.person,
            certificate=self.signer.fingerprint,
            kind="",
            version=1,
            body="",
            previous=head.hash.hex(),
        )


def _other_heads(reader: Reader, chain: str) -> tuple[Head, ...]:
    heads = (reader.head(other) for other in reader.chains() if other != chain)
    return tuple(head for head in heads if head is not None)


def _chained(first: Header, facts: Sequence[Fact]) -> list[Entry]:
    entries: list[Entry] = []
    previous = first.previous
    for place, fact in enumerate(facts):
        body = Body.of(fact).to_bytes()
        header = replace(
            first,
            seq=first.seq + place,
            index=place + 1,
            kind=fact.kind,
            version=fact.version,
            body=sha256(body),
            previous=previous,
        )
        entry = Entry(header.to_bytes(), body)
        previous = entry.hash.hex()
        entries.append(entry)
    return entries
