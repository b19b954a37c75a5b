"""Deeds about people: start a logbook, enrol, revoke, erase a name."""

from __future__ import annotations

import secrets
from collections.abc import Callable, Iterable
from dataclasses import dataclass
from pathlib import Path
from typing import get_args

from gaugelog.errors import Fault, Faulty, GaugelogError, KeyTrouble, Refused
from gaugelog.journal.authority import Authority, check_person_id, new_key
from gaugelog.journal.canonical import canonical
from gaugelog.journal.certificates import (
    certificate_issued,
    certificate_revoked,
    certificates_of,
    sheet_erased,
)
from gaugelog.journal.clock import Clock, SystemClock
from gaugelog.journal.keyfile import check_passphrase
from gaugelog.journal.keys import KeyFolder, Signer, UnlockedKey
from gaugelog.ledger.people import (
    IdentitySheet,
    PersonEnrolled,
    PersonLeft,
    PersonRow,
    Qualification,
    Role,
)
from gaugelog.rules.who import demand_role, roles_of
from gaugelog.work.kept import demand_reason, text_to_keep
from gaugelog.work.logbook import Deed, Logbook

_LONGEST = 200


@dataclass(frozen=True, slots=True)
class Newcomer:
    """A person to be enrolled; `roles` and `qualifications` as typed."""

    person: str
    name: str
    initials: str
    roles: tuple[str, ...]
    qualifications: tuple[str, ...] = ()


def start(
    folder: Path,
    *,
    keys_of: Callable[[str], KeyFolder],
    name: str,
    custodian: Newcomer,
    passphrase: str,
    authority: tuple[bytes, str] | None = None,
    clock: Clock | None = None,
) -> Logbook:
    """Start a logbook: its authority, its custodian, its first deed.

    `keys_of` gives the key folder of a logbook id; `authority` is an organisation's PKCS#12 file
    with its passphrase, instead of an authority of the logbook's own. Raises Faulty, KeyTrouble
    or StorageTrouble; then nothing is left behind but an empty folder.
    """
    _demand(_faults(custodian))
    check_passphrase(passphrase)
    given = None if authority is None else Authority.from_pkcs12(*authority)
    ours = given or Authority.create(text_to_keep(name), clock or SystemClock())
    logbook = Logbook.create(folder, name, clock=clock)
    try:
        keys = keys_of(logbook.id)
        signer = _certified(logbook, ours, custodian.person)
        keys.save_authority(ours, passphrase)
        _save(keys, signer, passphrase)
        logbook.begin(signer, lambda deed: _keep_person(deed, custodian))
    except BaseException:
        logbook.discard()
        raise
    return logbook


def enrol(
    logbook: Logbook,
    custodian: Signer,
    authority: Authority,
    keys: KeyFolder,
    *,
    newcomer: Newcomer,
    passphrase: str,
) -> UnlockedKey:
    """Enrol a person, or one anew with a fresh key; returns the key, unlocked.

    Raises Faulty for what is wrong with the person's data, Refused when the one who acts is no
    custodian, KeyTrouble for the passphrase.
    """
    _demand(_faults(newcomer))
    check_passphrase(passphrase)
    with logbook.deed(custodian) as deed:
        demand_role(deed.view, custodian.person, "custodian")
        _demand_own_authority(deed, authority)
        if "custodian" not in newcomer.roles:
            _demand_custodian_left(deed, newcomer.person)
        _demand_own_id(deed, newcomer.person)
        fresh = _certified(logbook, authority, newcomer.person)
        again = deed.view.get(PersonRow, newcomer.person) is not None
        reason = "enrolled anew" if again else "enrolled"
        _revoke_all(deed, newcomer.person, "enrolled anew with another key")
        deed.keep_fact(certificate_issued(newcomer.person, fresh.certificate, reason))
        _keep_person(deed, newcomer)
    # Only now: a deed that was refused must not push the key in use aside.
    try:
        _save(keys, fresh, passphrase)
    except GaugelogError as error:
        raise KeyTrouble(
            f"{newcomer.person} was enrolled, but the key was not kept. {error.message}",
            "Make room or leave to write there, then enrol the person anew.",
        ) from error
    return fresh


def revoke(
    logbook: Logbook, custodian: Signer, *, person: str, reason: str, erase_name: bool = False
) -> None:
    """Revoke every certificate of a person that is in force; with `erase_name` the sheet too.

    Raises Refused when the person is unknown or the only custodian, or the one who acts is none.
    """
    demand_reason(reason)
    with logbook.deed(custodian) as deed:
        demand_role(deed.view, custodian.person, "custodian")
        row = _known(deed, person)
        _demand_custodian_left(deed, person)
        _revoke_all(deed, person, reason)
        deed.keep(PersonLeft(person=person, reason=reason), [person])
        if erase_name:
            _erase(deed, row, reason)


def _revoke_all(deed: Deed, person: str, reason: str) -> None:
    """Revoke what certificates of the person are still in force, as part of the deed."""
    certificates = certificates_of(deed.writer)
    for issued in certificates.of_person(person):
        if not certificates.is_revoked(issued.fingerprint):
            deed.keep_fact(certificate_revoked(person, issued.fingerprint, reason))


def _demand_own_id(deed: Deed, person: str) -> None:
    """Raise Faulty for an id that differs from another only by capitals: keys are files."""
    for row in deed.view.all(PersonRow):
        if row.id != person and row.id.casefold() == person.casefold():
            what = f"{person!r} differs from {row.id} only by capital letters."
            raise Faulty([Fault("person", what, "Choose an id that nobody takes for theirs.")])


def _known(deed: Deed, person: str) -> PersonRow:
    row = deed.view.get(PersonRow, person)
    if row is None:
        raise Refused(f"Nobody is enrolled as {person}.", "See `gaugelog person list`.")
    return row


def _demand_custodian_left(deed: Deed, without: str) -> None:
    """A logbook without a custodian could enrol and revoke nobody, for ever."""
    custodians = {
        row.id for row in deed.view.all(PersonRow) if "custodian" in roles_of(deed.view, row.id)
    }
    if custodians == {without}:
        raise Refused(
            f"{without} is the only custodian; without one nobody could be enrolled or revoked.",
            "Enrol another custodian first.",
        )


def _demand_own_authority(deed: Deed, authority: Authority) -> None:
    if certificates_of(deed.writer).authority != authority.certificate:
        raise Refused(
            "The authority is not the one this logbook began with; nobody could sign by it.",
            "Use the authority that lies with the custodian's keys.",
        )


def _erase(deed: Deed, row: PersonRow, reason: str) -> None:
    """Erase every sheet a person ever had: earlier ones hold the name as well as the last."""
    there = set(deed.writer.sheets())
    sheets = [
        digest
        for entry in deed.writer.of_kinds([PersonEnrolled.kind])
        if entry.body.fact["person"] == row.id
        for digest in entry.body.sheets
        if digest in there
    ]
    if not sheets:
        raise Refused(f"The name of {row.id} is erased already.", "There is nothing to do.")
    for digest in sheets:
        deed.writer.erase_sheet(digest)
        deed.keep_fact(sheet_erased(digest, reason, (row.id,)))


def _certified(logbook: Logbook, authority: Authority, person: str) -> UnlockedKey:
    key = new_key()
    certificate = authority.issue(person, key.public_key(), logbook.clock)
    return UnlockedKey(key, certificate, authority.chain)


def _save(keys: KeyFolder, key: UnlockedKey, passphrase: str) -> None:
    authority, *parents = key.chain
    keys.save(key.person, key.private_key, key.certificate, authority, passphrase, tuple(parents))


def _keep_person(deed: Deed, newcomer: Newcomer) -> None:
    sheet = IdentitySheet(
        person=newcomer.person,
        name=text_to_keep(newcomer.name),
        initials=text_to_keep(newcomer.initials),
        salt=secrets.token_hex(16),
    )
    digest = deed.writer.put_sheet(canonical(sheet.model_dump(mode="json")))
    body = PersonEnrolled(
        person=newcomer.person,
        roles=tuple(role for role in get_args(Role) if role in newcomer.roles),
        qualifications=tuple(_qualification(text) for text in newcomer.qualifications),
        sheet=digest,
    )
    deed.keep(body, [newcomer.person], sheet=digest)


def _qualification(text: str) -> Qualification:
    name, until, date = text.rpartition(" until ")
    return Qualification(name=name, until=date) if until else Qualification(name=text)


def _faults(newcomer: Newcomer) -> Iterable[Fault]:
    try:
        check_person_id(newcomer.person)
    except Faulty as error:
        yield from error.faults
    for what, text in (("name", newcomer.name), ("initials", newcomer.initials)):
        if not text.strip() or len(text) > _LONGEST:
            yield Fault(what, f"must have 1 to {_LONGEST} characters.")
    known = get_args(Role)
    for role in newcomer.roles:
        if role not in known:
            yield Fault("role", f"“{role}” is no role.", f"Roles: {', '.join(known)}.")
    if not newcomer.roles:
        yield Fault("role", "is missing.", f"Roles: {', '.join(known)}.")
    for text in newcomer.qualifications:
        yield from _qualification_faults(text)


def _qualification_faults(text: str) -> Iterable[Fault]:
    from datetime import date

    name, until, day = text.rpartition(" until ")
    if not until:
        return
    try:
        if date.fromisoformat(day).isoformat() != day:
            raise ValueError
    except ValueError:
        yield Fault("qualification", f"“{day}” is no date.", "Like: bonding until 2027-05-01.")
    if not name.strip():
        yield Fault("qualification", "has no name.", "Like: bonding until 2027-05-01.")


def _demand(faults: Iterable[Fault]) -> None:
    found = list(faults)
    if found:
        raise Faulty(found)
