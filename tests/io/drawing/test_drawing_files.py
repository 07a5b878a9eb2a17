"""drawing.dxf and drawing.pdf: sound, reproducible, safe against what users write, and at the sheet's size."""

import dataclasses
import random
import subprocess
import sys
from pathlib import Path

import ezdxf
import pytest
from demos import FOLDER
from draughted import designed, texts
from ezdxf._options import options
from pypdf import PdfReader

from spanwright.io.drawing.document import write_drawing
from spanwright.io.drawing.lettering import printable
from spanwright.io.drawing.rendering import Page, SheetPipeline
from spanwright.truss.errors import OutputError

FILES = ("drawing.dxf", "drawing.pdf")


@pytest.fixture(scope="module", params=["fink_barn"])
def written(request: pytest.FixtureRequest, tmp_path_factory: pytest.TempPathFactory) -> tuple[str, Path]:
    """A demo's name and a folder with its drawing; the DXF library is left as it was."""
    folder = tmp_path_factory.mktemp("drawing")
    before, chance = options.write_fixed_meta_data_for_testing, random.getstate()
    write_drawing(designed(request.param), folder)
    assert (options.write_fixed_meta_data_for_testing, random.getstate()) == (before, chance)
    return request.param, folder


def test_an_audit_finds_nothing(written: tuple[str, Path]) -> None:
    doc = ezdxf.readfile(written[1] / "drawing.dxf")  # type: ignore[attr-defined]  # re-exported without saying so
    auditor = doc.audit()
    assert (auditor.errors, auditor.fixes) == ([], [])


def test_the_pdf_is_one_page_of_the_sheets_size_without_a_date(written: tuple[str, Path]) -> None:
    doc = ezdxf.readfile(written[1] / "drawing.dxf")  # type: ignore[attr-defined]  # re-exported without saying so
    sheet = doc.paperspace("Sheet 1").dxf
    reader = PdfReader(written[1] / "drawing.pdf")
    (page,) = reader.pages
    millimetres = [float(length) * 25.4 / 72.0 for length in page.mediabox[2:]]
    assert millimetres == pytest.approx([sheet.paper_width, sheet.paper_height], abs=0.01)
    assert reader.metadata is not None
    assert reader.metadata.creation_date is None
    assert reader.metadata.title == designed(written[0]).setting.project.title


def test_a_fresh_process_gives_the_same_bytes(written: tuple[str, Path], tmp_path: Path) -> None:
    name, first = written
    code = (
        "import sys; from pathlib import Path; import spanwright;"
        "from spanwright.io.drawing.document import write_drawing;"
        "project = spanwright.parse_project(Path(sys.argv[1]).read_text(encoding='utf-8'));"
        "write_drawing(spanwright.design_truss(project), Path(sys.argv[2]))"
    )
    command = [sys.executable, "-P", "-c", code, str(FOLDER / name / "roof.toml"), str(tmp_path)]
    subprocess.run(command, check=True, env={"PYTHONHASHSEED": "7", "HOME": str(tmp_path), **_path()})
    for file in FILES:
        assert (tmp_path / file).read_bytes() == (first / file).read_bytes()


def _path() -> dict[str, str]:
    return {"PYTHONPATH": str(Path(sys.modules["spanwright"].__path__[0]).parent)}


def test_a_place_that_cannot_be_written_is_a_message(tmp_path: Path) -> None:
    with pytest.raises(OutputError):
        write_drawing(designed("fink_barn"), tmp_path / "missing")


HOSTILE = {
    "owner": "%%c100 %%u %%d %%%%c",
    "client": "{\\P} \\U+0041 \\M+1 \\A1; ^J ^",
    "project": "tab\tnew\nline\x00\x1b end",
    "number": "\u202eright to left, zero\u200bwidth",
    "creator": "\u8fb2\u5834 \u0416\u0443\u043a \u10d0\u10d1 \U0001f3da",
    "checker": "W" * 5000,
    "supplementary_title": "long " * 400,
    "approver": "=1+1",
    "department": "",
    "status": "\ud800 lone",
}


def test_whatever_users_write_shows_as_written_and_breaks_nothing(tmp_path: Path) -> None:
    design = designed("fink_barn")
    project = dataclasses.replace(
        design.setting.project, title="{\\fArial|b1;%%uTitle^J} " * 40, title_block=HOSTILE, mark="%%c\\P\u0416"
    )
    hostile = dataclasses.replace(design, setting=dataclasses.replace(design.setting, project=project))
    write_drawing(hostile, tmp_path)
    doc = ezdxf.readfile(tmp_path / "drawing.dxf")  # type: ignore[attr-defined]  # re-exported without saying so
    auditor = doc.audit()
    assert (auditor.errors, auditor.fixes) == ([], [])
    lettered = [text.plain_text() for text in texts(doc.paperspace("Sheet 1"), "TITLE-BLOCK")]
    for words in (*HOSTILE.values(), project.title):
        shown = printable(words).strip()
        assert not shown or any(text.strip() == shown or _is_start(text.strip(), shown) for text in lettered), words
    assert len(PdfReader(tmp_path / "drawing.pdf").pages) == 1


def _is_start(text: str, whole: str) -> bool:
    """Whether a text is the beginning of a longer one, cut off with an ellipsis or broken into lines."""
    return len(text) > 5 and whole.startswith(text.rstrip("\u2026"))


def test_line_types_keep_their_length_on_paper_in_a_viewport() -> None:
    from ezdxf.addons.drawing.frontend import UniversalFrontend
    from ezdxf.addons.drawing.properties import RenderContext
    from ezdxf.filemanagement import new

    doc = new("R2010")
    doc.linetypes.add("HIDDEN", [4.5, 3.0, -1.5])
    doc.modelspace().add_line((0, 0), (5000, 0), dxfattribs={"linetype": "HIDDEN"})
    sheet = doc.paperspace("Layout1")
    sheet.page_setup(size=(420, 297), margins=(0, 0, 0, 0), units="mm")
    sheet.add_viewport((210, 150), (200, 100), (2500, 0), 100 * 50)
    page = Page()
    UniversalFrontend(RenderContext(doc), SheetPipeline(page)).draw_layout(sheet)
    dashes = [abs(end[0] - start[0]) for lines in page.lines.values() for start, end in lines if start[1] == end[1]]
    assert 3.0 in [round(dash, 6) for dash in dashes]
