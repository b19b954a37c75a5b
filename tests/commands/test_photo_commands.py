"""Photos as a user adds and lists them, on a played demo."""

from __future__ import annotations

import json
from pathlib import Path

import pytest

from gaugelog.journal.entry import sha256
from tests.commands.conftest import PASSPHRASE, Command, Outcome
from tests.pictures import SECRETS, camera_jpeg, camera_png


@pytest.fixture
def act(demo: Path, command: Command) -> Command:
    """Run a command as the demo's technician."""
    rows = json.loads(command("person", "list", "--json").out)
    who = next(row["id"] for row in rows if row["roles"] == ["technician"])

    def typed(*words: str) -> Outcome:
        return command(*words, "--as", who, secrets=f"{PASSPHRASE}\n")

    return typed


def open_point(act: Command, command: Command) -> str:
    """A point of the demo that is in work again."""
    point = accepted_point(command)
    assert 0 == act("amend", point, "--reason", "photos are wanted").code
    return point


def accepted_point(command: Command) -> str:
    """A point of the demo that is accepted."""
    rows = json.loads(command("record", "--json").out)
    return str(next(row["point"] for row in rows if row["state"] == "accepted"))


def test_photos_are_added_listed_and_drawn(demo: Path, act: Command, command: Command) -> None:
    point = open_point(act, command)
    (demo / "IMG_1.jpg").write_bytes(camera_jpeg())
    (demo / "IMG_2.png").write_bytes(camera_png())
    files = (str(demo / "IMG_1.jpg"), str(demo / "IMG_2.png"))
    told = act("photo", "add", point, *files, "--note", "[bold]as found[/bold]")
    assert 0 == told.code, told.err
    digest = sha256(camera_jpeg())
    assert f"{point}: IMG_1.jpg, JPEG, 640 × 480 pixels, is kept; SHA-256 {digest}" in told.err
    rows = json.loads(command("photo", "list", point, "--json").out)
    assert [("IMG_1.jpg", digest), ("IMG_2.png", sha256(camera_png()))] == [
        (row["name"], row["file"]) for row in rows
    ]
    assert "[bold]as found[/bold]" in command("photo", "list").out
    told = command("record", point, "--draft", "--out", str(demo / "draft.pdf"))
    assert 0 == told.code, told.err
    assert b"SECRET" not in (demo / "draft.pdf").read_bytes()
    assert "photo.kept: IMG_2.png, 640 × 480 pixels" in command("journal", "show", point).out


def test_photos_are_written_out_for_a_client_without_the_cameras_data(
    demo: Path, act: Command, command: Command
) -> None:
    point = open_point(act, command)
    (demo / "IMG_2.png").write_bytes(camera_png())
    assert 0 == act("photo", "add", point, str(demo / "IMG_2.png")).code
    told = command("photo", "export", point, str(demo / "out"))
    copies = [Path(line) for line in told.out.split()]
    assert (0, f"{point}-photo-1.jpg") == (told.code, copies[-1].name.replace("-2.", "-1."))
    assert copies[-1].read_bytes().startswith(b"\xff\xd8")
    assert not any(secret in path.read_bytes() for path in copies for secret in SECRETS)
    told = command("photo", "export", point, str(demo / "whole"), "--originals")
    assert camera_png() == Path(told.out.split()[-1]).read_bytes()
    assert 6 == command("photo", "export", point, str(demo / "IMG_2.png" / "out")).code


def test_every_file_that_is_no_photo_is_told_and_none_is_kept(
    demo: Path, act: Command, command: Command
) -> None:
    (demo / "good.jpg").write_bytes(camera_jpeg())
    (demo / "cut.jpg").write_bytes(camera_jpeg()[:2000])
    names = ("good.jpg", "cut.jpg", "README.md", "none.jpg")
    told = act("photo", "add", open_point(act, command), *(str(demo / name) for name in names))
    assert 3 == told.code, told.err
    assert ["good.jpg" in told.err, "cut.jpg" in told.err, "none.jpg" in told.err] == [
        False,
        True,
        True,
    ]
    assert [] == json.loads(command("photo", "list", "--json").out)


def test_an_accepted_point_takes_no_photo(demo: Path, act: Command, command: Command) -> None:
    (demo / "late.jpg").write_bytes(camera_jpeg())
    told = act("photo", "add", accepted_point(command), str(demo / "late.jpg"))
    assert (4, True) == (told.code, "is accepted; no photo can be added now" in told.err)


def test_a_record_whose_photo_is_gone_is_not_drawn(
    demo: Path, act: Command, command: Command
) -> None:
    point = open_point(act, command)
    (demo / "IMG_1.jpg").write_bytes(camera_jpeg())
    assert 0 == act("photo", "add", point, str(demo / "IMG_1.jpg")).code
    digest = sha256(camera_jpeg())
    place = demo / "logbook" / "evidence" / digest[:2] / digest
    place.write_bytes(camera_png())
    told = command("record", point, "--draft", "--out", str(demo / "draft.pdf"))
    assert (6, True) == (
        told.code,
        f"The photo IMG_1.jpg: The file {digest} was altered" in told.err,
    )
    place.unlink()
    assert 6 == command("record", point, "--draft", "--out", str(demo / "draft.pdf")).code
    told = command("journal", "check")
    assert (1, True) == (told.code, digest in told.out + told.err)
