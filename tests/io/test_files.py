"""Files are whole or absent, marked with their input, and harmless in a spreadsheet."""

from __future__ import annotations

import hashlib
from pathlib import Path

import pytest

from spanwright.io.files import input_hash, make_folder, safe_cell, write_atomically
from spanwright.truss.errors import OutputError


def test_a_file_is_replaced(tmp_path: Path) -> None:
    path = tmp_path / "results.json"
    write_atomically(path, b"old")
    write_atomically(path, b"new")
    assert path.read_bytes() == b"new"
    assert [entry.name for entry in tmp_path.iterdir()] == ["results.json"]


def test_whoever_reads_the_old_file_keeps_it_whole(tmp_path: Path) -> None:
    path = tmp_path / "results.json"
    write_atomically(path, b"old")
    with path.open("rb") as reader:
        write_atomically(path, b"new")
        assert reader.read() == b"old"


def test_an_interrupted_run_leaves_the_old_file_whole(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    path = tmp_path / "results.json"
    path.write_bytes(b"old")

    def interrupted(self: Path, content: bytes) -> int:
        with self.open("wb") as stream:
            stream.write(content[:2])
        raise KeyboardInterrupt

    monkeypatch.setattr(Path, "write_bytes", interrupted)
    with pytest.raises(KeyboardInterrupt):
        write_atomically(path, b"new and long")
    assert path.read_bytes() == b"old"
    assert [entry.name for entry in tmp_path.iterdir()] == ["results.json"]


@pytest.mark.parametrize("make", [lambda path: path / "a.csv", lambda path: path / "missing" / "a.csv"])
def test_a_place_that_cannot_be_written_is_named(tmp_path: Path, make: object) -> None:
    blocking = tmp_path / "file"
    blocking.write_text("not a folder")
    path: Path = make(blocking)  # type: ignore[operator]  # a lambda of the list above
    with pytest.raises(OutputError) as caught:
        write_atomically(path, b"")
    assert caught.value.file == str(path)
    assert caught.value.remedy
    with pytest.raises(OutputError):
        make_folder(path)


def test_folders_are_made(tmp_path: Path) -> None:
    make_folder(tmp_path / "a" / "b")
    make_folder(tmp_path / "a" / "b")
    assert (tmp_path / "a" / "b").is_dir()


def test_the_mark_of_an_input_is_the_start_of_its_sha_256() -> None:
    # FIPS 180-2, appendix B.1: SHA-256 of "abc".
    assert input_hash("abc") == "ba7816bf8f01"
    assert input_hash("Dach \u00fc") == hashlib.sha256("Dach \u00fc".encode()).hexdigest()[:12]


@pytest.mark.parametrize("start", ["=", "+", "-", "@", "\t", "\r", "\n", "\uff1d"])
def test_what_a_spreadsheet_takes_for_a_formula_is_neutralised(start: str) -> None:
    # OWASP, CSV injection: the characters that begin a formula.
    assert safe_cell(f"{start}1+1") == f"'{start}1+1"


@pytest.mark.parametrize("text", ["", "R1-TC1", "2L 80x80x6", "a=b"])
def test_plain_text_stays(text: str) -> None:
    assert safe_cell(text) == text
