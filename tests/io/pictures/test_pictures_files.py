"""The files: valid, at the size of the sheet, the same bytes in every run, whatever the user's settings."""

import subprocess
import sys
from pathlib import Path
from xml.etree import ElementTree

import matplotlib
import pytest
from pictured import drawn
from PIL import Image

from spanwright.design.result import Design
from spanwright.io.files import input_hash
from spanwright.io.pictures import write_pictures
from spanwright.truss.errors import OutputError

NAMES = ("restraint.png", "restraint.svg", "utilisation.png", "utilisation.svg")
A4_INCHES = (297.0 / 25.4, 210.0 / 25.4)  # ISO 216


def contents(folder: Path) -> dict[str, bytes]:
    return {path.name: path.read_bytes() for path in folder.iterdir()}


def words_in(path: Path) -> list[str]:
    texts = ElementTree.parse(path).getroot().iter("{http://www.w3.org/2000/svg}text")
    return ["".join(text.itertext()) for text in texts]


def written(design: Design, folder: Path) -> Path:
    folder.mkdir()
    write_pictures(design, folder)
    return folder


@pytest.fixture(scope="module")
def loose(tmp_path_factory: pytest.TempPathFactory) -> Path:
    """A folder with the pictures of the roof with loose purlins."""
    return written(drawn("loose"), tmp_path_factory.mktemp("pictures") / "first")


def test_a_second_run_gives_the_same_bytes(loose: Path, tmp_path: Path) -> None:
    assert tuple(sorted(contents(loose))) == NAMES
    assert contents(written(drawn("loose"), tmp_path / "second")) == contents(loose)


def test_the_users_own_settings_change_nothing_and_come_back(loose: Path, tmp_path: Path) -> None:
    own = {"font.size": 20.0, "savefig.bbox": "tight", "figure.constrained_layout.use": True, "svg.fonttype": "path"}
    with matplotlib.rc_context(own):  # type: ignore[arg-type]  # its stub lists every key as a literal
        before = dict(matplotlib.rcParams)
        styled = contents(written(drawn("loose"), tmp_path / "styled"))
        assert dict(matplotlib.rcParams) == before
    assert styled == contents(loose)


def test_pngs_are_a4_sheets_so_that_the_scale_holds_in_print(loose: Path) -> None:
    for name in ("utilisation.png", "restraint.png"):
        with Image.open(loose / name) as image:
            image.load()
            inches = [pixels / dpi for pixels, dpi in zip(image.size, image.info["dpi"], strict=True)]
        assert inches == pytest.approx(A4_INCHES, abs=0.01)


def test_svgs_are_a4_sheets_with_text_as_text(loose: Path) -> None:
    for name in ("utilisation.svg", "restraint.svg"):
        root = ElementTree.parse(loose / name).getroot()
        points = [float(root.attrib[side].removesuffix("pt")) for side in ("width", "height")]
        assert points == pytest.approx([72.0 * inch for inch in A4_INCHES], abs=0.01)
        assert len(words_in(loose / name)) > 50


@pytest.mark.parametrize("name", ["utilisation.svg", "restraint.svg"])
def test_both_say_what_every_output_must_say(loose: Path, name: str) -> None:
    setting, page = drawn("loose").setting, "\n".join(words_in(loose / name))
    for words in (
        setting.project.title,
        setting.project.mark,
        setting.standard.name,
        setting.project.actions,
        "Tension +, compression \u2212",
        "anchored by roof bracing: 14 of 16 purlin lines counted",
        "competent, licensed engineer",
        f"input {input_hash(setting.project.source)}",
        "NOT PASSING",
    ):
        assert words in page


def test_text_of_the_user_is_taken_as_text(tmp_path: Path) -> None:
    write_pictures(drawn("odd words"), tmp_path)
    page = "\n".join(words_in(tmp_path / "utilisation.svg"))
    assert "A <b> & $x_2$ \u4e2d long" in page
    assert "\u2026" in page


def test_a_folder_that_cannot_be_written_is_the_users_mistake(tmp_path: Path) -> None:
    with pytest.raises(OutputError, match="cannot be written"):
        write_pictures(drawn("howe"), tmp_path / "missing")


def test_pyplot_is_not_imported() -> None:
    code = "import sys, spanwright.io.pictures; sys.exit('matplotlib.pyplot' in sys.modules)"
    assert subprocess.run([sys.executable, "-P", "-c", code], check=False).returncode == 0
