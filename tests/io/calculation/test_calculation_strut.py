"""The worked page of one member that `spanwright strut --pdf` writes."""

from __future__ import annotations

from pathlib import Path

import pytest
from pypdf import PdfReader

from spanwright.io.command_line import main

ARGUMENTS = ("--in-plane", "1.6 m", "--out-of-plane", "3.2 m")


@pytest.mark.parametrize(
    ("section", "force", "status"),
    [("2L 80x80x6", "-120 kN", 0), ("L 60x60x6", "-25 kN", 1), ("CHS 76.1x3.6", "-90 kN", 1)],
)
def test_the_page_holds_what_the_screen_shows(
    section: str, force: str, status: int, tmp_path: Path, capsys: pytest.CaptureFixture[str]
) -> None:
    path = tmp_path / "pages" / "strut.pdf"
    assert main(["strut", "--section", section, "--force", force, *ARGUMENTS, "--pdf", str(path)]) == status
    shown = capsys.readouterr().out
    pages = [page.extract_text() for page in PdfReader(path).pages]
    text = "\n".join(pages)
    assert section in text and force in text and "SANS 10162-1" in text
    assert "governs this member" in text
    assert ("FAILS" in shown) == ("FAILS" in text)
    assert len(pages) <= 3


def test_without_the_option_no_page_is_written(tmp_path: Path, monkeypatch: pytest.MonkeyPatch) -> None:
    monkeypatch.chdir(tmp_path)
    assert main(["strut", "--section", "2L 80x80x6", "--force", "-120 kN", *ARGUMENTS]) == 0
    assert not list(tmp_path.iterdir())
