"""Keys: certified by the authority, sealed by a passphrase, shown to nobody."""

from __future__ import annotations

import pickle
import stat
from datetime import timedelta
from pathlib import Path

import pytest
from cryptography import x509
from cryptography.hazmat.primitives.asymmetric import ec, rsa
from cryptography.hazmat.primitives.hashes import SHA256
from cryptography.hazmat.primitives.serialization import (
    BestAvailableEncryption,
    Encoding,
    NoEncryption,
    PrivateFormat,
    pkcs12,
)
from cryptography.x509.oid import NameOID

from gaugelog.errors import Faulty, KeyTrouble
from gaugelog.journal.clock import SetClock
from gaugelog.journal.keys import Authority, KeyFolder, check_passphrase, new_key
from tests.journal.samples import START, authority, clock, signer

SECRET = "correct horse battery"


@pytest.fixture
def folder(tmp_path: Path) -> KeyFolder:
    keys = KeyFolder(tmp_path / "keys", kdf_rounds=10)
    save(keys)
    return keys


def save(keys: KeyFolder, person: str = "ann", secret: str = SECRET) -> None:
    own = signer(person)
    keys.save(person, own.private_key, own.certificate, own.chain[0], secret)


def test_a_key_opens_with_its_passphrase_and_signs(folder: KeyFolder) -> None:
    key = folder.unlock("ann", SECRET)
    assert "ann" == key.person
    assert signer("ann").fingerprint == key.fingerprint
    assert authority().chain == key.chain
    public = key.private_key.public_key()
    public.verify(key.sign(b"data"), b"data", ec.ECDSA(SHA256()))


def test_files_are_for_their_owner_only(folder: KeyFolder) -> None:
    assert 0o700 == stat.S_IMODE(folder.path.stat().st_mode)
    files = list(folder.path.iterdir())
    assert [0o600] * len(files) == [stat.S_IMODE(file.stat().st_mode) for file in files]


def test_a_wrong_passphrase_is_refused_and_not_repeated(folder: KeyFolder) -> None:
    with pytest.raises(KeyTrouble, match="does not open ann's key") as caught:
        folder.unlock("ann", "wrong passphrase")
    assert "wrong passphrase" not in repr(caught.value) + caught.value.remedy
    assert caught.value.__suppress_context__


def test_a_passphrase_is_the_same_however_its_accents_are_typed(folder: KeyFolder) -> None:
    save(folder, "bea", "caf\u00e9 caf\u00e9")
    assert "bea" == folder.unlock("bea", "cafe\u0301 cafe\u0301").person


@pytest.mark.parametrize("secret", ["", "seven77", "e\u0301" * 7])
def test_a_short_passphrase_is_refused(folder: KeyFolder, secret: str) -> None:
    with pytest.raises(KeyTrouble, match="fewer than eight"):
        check_passphrase(secret)
    with pytest.raises(KeyTrouble, match="fewer than eight"):
        save(folder, "bea", secret)
    assert ["ann"] == folder.people()


def test_a_missing_key_is_said_to_be_missing(folder: KeyFolder) -> None:
    with pytest.raises(KeyTrouble, match="no file with the key of bea"):
        folder.unlock("bea", SECRET)
    with pytest.raises(KeyTrouble, match="authority"):
        folder.unlock_authority(SECRET)


@pytest.mark.parametrize("data", [b"", b"garbage", b"\x30\x82\x01\x00cut off"])
def test_a_damaged_file_is_said_to_be_damaged(folder: KeyFolder, data: bytes) -> None:
    (folder.path / "ann.p12").write_bytes(data)
    with pytest.raises(KeyTrouble, match="damaged"):
        folder.unlock("ann", SECRET)


def test_a_file_cut_short_is_damaged_and_not_a_wrong_passphrase(folder: KeyFolder) -> None:
    file = folder.path / "ann.p12"
    file.write_bytes(file.read_bytes()[:-20])
    with pytest.raises(KeyTrouble, match="damaged"):
        folder.unlock("ann", SECRET)


def test_a_file_of_another_person_is_refused(folder: KeyFolder) -> None:
    save(folder, "bea")
    (folder.path / "ann.p12").write_bytes((folder.path / "bea.p12").read_bytes())
    with pytest.raises(KeyTrouble, match="holds the key of bea"):
        folder.unlock("ann", SECRET)


def test_a_renewed_key_is_in_use_and_the_older_one_stays(folder: KeyFolder) -> None:
    key = new_key()
    renewed = authority().issue("ann", key.public_key(), clock())
    folder.save("ann", key, renewed, authority().certificate, "another passphrase")
    assert renewed == folder.unlock("ann", "another passphrase").certificate
    older = folder.path / f"ann~{signer('ann').fingerprint}.p12"
    found = pkcs12.load_pkcs12(older.read_bytes(), SECRET.encode())
    assert found.cert
    assert signer("ann").certificate == found.cert.certificate.public_bytes(Encoding.DER)
    assert ["ann"] == folder.people()


def test_a_passphrase_can_be_changed_and_the_old_one_opens_nothing(folder: KeyFolder) -> None:
    folder.change_passphrase("ann", SECRET, "a new passphrase")
    assert authority().chain == folder.unlock("ann", "a new passphrase").chain
    for file in folder.path.glob("*.p12"):
        with pytest.raises(ValueError, match="password"):
            pkcs12.load_pkcs12(file.read_bytes(), SECRET.encode())


def test_nothing_secret_shows_in_a_repr_and_no_key_is_pickled(folder: KeyFolder) -> None:
    key = folder.unlock("ann", SECRET)
    assert "UnlockedKey('ann')" == repr(key)
    assert "CN=Gaugelog authority of Footbridge" in repr(authority())
    with pytest.raises(KeyTrouble, match="never written down"):
        pickle.dumps(key)


@pytest.mark.parametrize("person", ["", "../ann", "a/b", "_authority", "a" * 65, "an n", "ånn"])
def test_an_id_that_fits_no_file_name_is_refused(folder: KeyFolder, person: str) -> None:
    with pytest.raises(Faulty, match="1 fault"):
        folder.unlock(person, SECRET)
    with pytest.raises(Faulty, match="1 fault"):
        authority().issue(person, new_key().public_key(), clock())


def test_a_certificate_is_not_saved_under_another_name(folder: KeyFolder) -> None:
    own = signer("bea")
    with pytest.raises(KeyTrouble, match="not of cas"):
        folder.save("cas", own.private_key, own.certificate, own.chain[0], SECRET)


def test_a_folder_that_cannot_be_written_is_trouble_in_plain_words(tmp_path: Path) -> None:
    (tmp_path / "file").write_text("in the way")
    with pytest.raises(KeyTrouble, match="can't be written"):
        save(KeyFolder(tmp_path / "file", kdf_rounds=10))


def test_the_authority_is_sealed_and_opens_again(folder: KeyFolder) -> None:
    assert not folder.has_authority()
    folder.save_authority(authority(), SECRET)
    assert folder.has_authority()
    again = folder.unlock_authority(SECRET)
    assert authority().certificate == again.certificate
    assert ["ann"] == folder.people()
    der = again.issue("bea", new_key().public_key(), clock())
    x509.load_der_x509_certificate(der).verify_directly_issued_by(
        x509.load_der_x509_certificate(authority().certificate)
    )


def test_a_certificate_names_the_id_only_and_is_made_for_signing() -> None:
    certificate = x509.load_der_x509_certificate(signer("ann").certificate)
    assert "CN=ann" == certificate.subject.rfc4514_string()
    usage = certificate.extensions.get_extension_for_class(x509.KeyUsage).value
    assert usage.digital_signature
    assert usage.content_commitment
    assert not usage.key_cert_sign
    assert not certificate.extensions.get_extension_for_class(x509.BasicConstraints).value.ca
    assert START.utc - timedelta(days=1) == certificate.not_valid_before_utc
    assert timedelta(days=1826) == certificate.not_valid_after_utc.date() - START.utc.date()


def test_no_certificate_outlives_its_authority() -> None:
    late = SetClock(START)
    late.advance(28 * 365.25 * 86400)
    der = authority().issue("ann", new_key().public_key(), late)
    own = x509.load_der_x509_certificate(authority().certificate)
    assert own.not_valid_after_utc == x509.load_der_x509_certificate(der).not_valid_after_utc
    late.advance(3 * 365.25 * 86400)
    with pytest.raises(KeyTrouble, match="authority has expired"):
        authority().issue("ann", new_key().public_key(), late)


def _organisation(
    name: str = "Organisation", *, ca: bool = True, sign: bool = True
) -> tuple[rsa.RSAPrivateKey, x509.Certificate]:
    """An organisation's own authority: an RSA key and a certificate it signed itself."""
    key = rsa.generate_private_key(65537, 2048)
    subject = x509.Name([x509.NameAttribute(NameOID.COMMON_NAME, name)])
    usage = x509.KeyUsage(not sign, False, False, False, False, sign, sign, False, False)
    builder = (
        x509.CertificateBuilder(subject, subject, key.public_key(), x509.random_serial_number())
        .not_valid_before(START.utc)
        .not_valid_after(START.utc + timedelta(days=3650))
        .add_extension(x509.BasicConstraints(ca=ca, path_length=None), critical=True)
        .add_extension(usage, critical=True)
    )
    return key, builder.sign(key, SHA256())


def _as_pkcs12(key: rsa.RSAPrivateKey | None, certificate: x509.Certificate) -> bytes:
    encryption = BestAvailableEncryption(SECRET.encode()) if key else NoEncryption()
    return pkcs12.serialize_key_and_certificates(b"org", key, certificate, None, encryption)


def test_an_organisations_authority_takes_the_place_of_our_own(folder: KeyFolder) -> None:
    key, certificate = _organisation()
    organisation = Authority.from_pkcs12(_as_pkcs12(key, certificate), SECRET)
    folder.save_authority(organisation, SECRET)
    der = folder.unlock_authority(SECRET).issue("ann", new_key().public_key(), clock())
    x509.load_der_x509_certificate(der).verify_directly_issued_by(certificate)


@pytest.mark.parametrize(("ca", "sign"), [(False, True), (True, False)])
def test_a_certificate_that_may_not_certify_is_refused_as_authority(ca: bool, sign: bool) -> None:
    data = _as_pkcs12(*_organisation(ca=ca, sign=sign))
    with pytest.raises(KeyTrouble, match="not that of an authority"):
        Authority.from_pkcs12(data, SECRET)


def test_an_organisations_file_without_its_key_or_with_a_wrong_passphrase_is_refused() -> None:
    key, certificate = _organisation()
    with pytest.raises(KeyTrouble, match="lacks the private key"):
        Authority.from_pkcs12(_as_pkcs12(None, certificate), "")
    with pytest.raises(KeyTrouble, match="does not open"):
        Authority.from_pkcs12(_as_pkcs12(key, certificate), "wrong passphrase")


def test_a_key_that_is_not_elliptic_signs_no_entry(folder: KeyFolder) -> None:
    key, certificate = _organisation("ann")
    (folder.path / "ann.p12").write_bytes(_as_pkcs12(key, certificate))
    with pytest.raises(KeyTrouble, match="not on an elliptic curve"):
        folder.unlock("ann", SECRET)


def test_a_key_without_its_authority_is_refused(folder: KeyFolder) -> None:
    own = signer("ann")
    data = pkcs12.serialize_key_and_certificates(
        b"ann",
        own.private_key,
        x509.load_der_x509_certificate(own.certificate),
        None,
        PrivateFormat.PKCS12.encryption_builder().kdf_rounds(10).build(SECRET.encode()),
    )
    (folder.path / "ann.p12").write_bytes(data)
    with pytest.raises(KeyTrouble, match="lacks the certificate of the authority"):
        folder.unlock("ann", SECRET)
