"""calculation.pdf as a checking engineer gets it: text, bookmarks, properties, fonts, pages, no harm by any name."""

from __future__ import annotations

import os
import re
import subprocess
import sys
from dataclasses import replace
from io import BytesIO
from pathlib import Path
from typing import Any

import pytest
import typst
from calculated import FAMILIES, altered, blocks, designed, section, with_warnings
from demos import DEMOS, FOLDER
from pypdf import PdfReader

from spanwright.design.result import Design
from spanwright.io.calculation.document import document, write_calculation
from spanwright.io.calculation.typesetting import typeset
from spanwright.io.files import input_hash
from spanwright.truss.errors import OutputError

HOSTILE = r'=cmd|x #panic("no") $a_1$ *b* _i_ <l> @r \\ // /* `c` [x] {y} ~ --- "q" \u{202e}'
FIRST_SECTIONS = (
    "1 Result",
    "2 Scope and basis",
    "3 Assumptions, and what is not covered",
    "4 Geometry and supports",
    "5 Restraint",
    "6 Loads",
    "7 Combinations",
    "8 Reactions",
    "9 Bar forces",
    "10 Buckling lengths",
    "11 Members",
)


@pytest.fixture(scope="module")
def folder(tmp_path_factory: pytest.TempPathFactory) -> Path:
    return tmp_path_factory.mktemp("calculation")


@pytest.fixture(scope="module")
def reader(folder: Path) -> PdfReader:
    return PdfReader(write_calculation(designed("pratt_store"), folder))


@pytest.fixture(scope="module")
def texts(reader: PdfReader) -> list[str]:
    return [page.extract_text() for page in reader.pages]


def text_of(reader: PdfReader) -> str:
    return "\n".join(page.extract_text() for page in reader.pages)


def pages(design: Design, **options: Any) -> PdfReader:
    return PdfReader(BytesIO(typeset(document(design, **options))))


def test_it_has_bookmarks_in_the_order_of_a_calculation(reader: PdfReader) -> None:
    titles = [entry.title for entry in reader.outline if not isinstance(entry, list)]
    assert tuple(titles[: len(FIRST_SECTIONS)]) == FIRST_SECTIONS
    assert {"15 Hand checks", "16 Warnings", "17 For the hand"} <= set(titles)
    groups = [group for group in reader.outline if isinstance(group, list)]
    inner = [entry.title for group in groups for entry in group if not isinstance(entry, list)]
    assert inner[0] == "11.1 Member checks: top chord" and inner[-1] == "11.5 All members"


def test_it_has_properties_and_every_page_its_number_and_the_mark_of_the_input(
    reader: PdfReader, texts: list[str]
) -> None:
    project = designed("pratt_store").setting.project
    properties = reader.metadata
    assert properties is not None and properties.title is not None
    assert project.title in properties.title and project.mark in properties.title
    assert input_hash(project.source) in str(properties.get("/Keywords"))
    for number, text in enumerate(texts, 1):
        assert f"Page {number} of {len(texts)}" in text
        assert f"input {input_hash(project.source)}" in text
        assert "competent, licensed engineer" in text


def test_it_is_a4_upright(reader: PdfReader) -> None:
    for page in reader.pages:
        assert (float(page.mediabox.width), float(page.mediabox.height)) == pytest.approx((595.28, 841.89), abs=0.1)


def test_every_font_is_embedded(reader: PdfReader) -> None:
    seen = set()
    for page in reader.pages:
        fonts: Any = page["/Resources"]
        for font in fonts["/Font"].values():
            inner = font.get_object()["/DescendantFonts"][0].get_object()
            descriptor = inner["/FontDescriptor"].get_object()
            assert {"/FontFile", "/FontFile2", "/FontFile3"} & descriptor.keys()
            seen.add(descriptor["/FontName"])
    assert any("Libertinus" in name for name in seen)


def test_it_says_what_a_checker_expects(texts: list[str]) -> None:
    """Common practice: the contents of a calculation package."""
    text = "\n".join(texts)
    found = designed("pratt_store")
    assert "SANS 10162-1:2011" in text and "SANS 10160:2011" in text and "S355JR" in text
    for combination in found.analysis.combinations:
        assert combination.name.split(" + ")[0] in text
    for bar in found.setting.truss.bar_names:
        assert re.search(rf"\b{bar}\b", text)
    for line in ("0.220 kPa x 5.000 m = 1.100 kN/m of slope", "knee brace B4 to purlin line 5 to roof bracing"):
        assert line in text.replace("\n", " ")
    for word in ("Prepared", "Checked", "Approved", "Date of issue", "Revision", "What this roof cannot lose"):
        assert word in text


@pytest.mark.parametrize("name", DEMOS)
def test_a_demo_takes_twelve_to_twenty_five_pages(name: str) -> None:
    assert 12 <= len(pages(designed(name)).pages) <= 25


def test_a_truss_of_57_bars_takes_no_more_than_25_pages_with_its_two_pictures() -> None:
    wide = altered("pratt_store", "panels     = 12", "panels     = 14")
    assert len(wide.setting.truss.bar_names) == 57
    assert len(pages(wide).pages) + 2 <= 25


def test_every_member_can_be_worked() -> None:
    found = designed("howe_workshop")
    data = document(found, every_member=True)
    titles = [member["title"] for member in blocks(data, "member")]
    assert {title.split(",")[0] for title in titles} == set(found.setting.truss.bar_names)
    assert len(PdfReader(BytesIO(typeset(data))).pages) > 40


@pytest.mark.parametrize("name", [name for name in FAMILIES if name not in DEMOS])
def test_every_family_is_typeset(name: str) -> None:
    assert len(pages(designed(name)).pages) > 10


def test_tables_repeat_their_heads_on_the_next_page(texts: list[str]) -> None:
    start = next(at for at, text in enumerate(texts) if at and "8 Reactions" in text)
    rest = texts[start + 1].partition("Greatest, factored")[0]
    assert "man at" in rest and "load right" in rest


def test_the_first_page_has_every_mass_of_a_truss_and_the_way_of_deflection(texts: list[str]) -> None:
    found, first = designed("pratt_store"), texts[0].replace("\n", " ")
    assert f"joint to joint {found.mass:.0f} kg" in first
    assert f"{found.assembly.mass:.0f} kg; to lift" in first and f"{found.assembly.lift_mass:.0f} kg." in first
    assert re.search(r"variable [\d.]+ mm up of 60.0 mm allowed", first)


def test_the_restraint_drawing_explains_its_signs_and_no_others() -> None:
    """The feed store has knee braces and no bottom tie; every purlin line of it counts."""
    (drawing,) = [
        block
        for block in section(document(designed("pratt_store")), "Restraint")["blocks"]
        if block["kind"] == "sketch"
    ]
    assert {mark["shape"] for mark in drawing["marks"]} == {"counted", "brace", "bearing"}
    assert "Open circle: foot of a knee brace" in drawing["caption"]
    for absent in ("Open square", "Diamond", "Dotted"):
        assert absent not in drawing["caption"]


def test_a_purlin_between_joints_says_how_its_load_is_shared(texts: list[str]) -> None:
    text = " ".join(" ".join(texts).split())
    assert re.search(r"0\.938 kN down, shared by the joints as supports of a continuous beam: of its part across", text)
    assert "its part along the slope, 0.082 kN, to T6" in text  # 0.938 kN x sin 5°


def test_numbers_of_a_column_stand_on_one_point() -> None:
    """Every number of a column has as many signs behind its point, spaces of a figure's width included."""
    for table in blocks(document(designed("pratt_store")), "table"):
        for at, column in enumerate(table["columns"]):
            cells = [row[at] for row in table["rows"]]
            if column["align"] == "right" and any("." in cell for cell in cells):
                behind = {len(cell) - cell.index(".") for cell in cells if "." in cell}
                assert len(behind) == 1, (column["head"], cells)


# The same input gives the same bytes


def test_the_same_design_and_date_give_the_same_bytes_in_another_process(folder: Path) -> None:
    here = write_calculation(designed("howe_workshop"), folder, date="2025-03-01").read_bytes()
    script = (
        "import sys, spanwright\nfrom pathlib import Path\n"
        "from spanwright.io.calculation.document import write_calculation\n"
        "found = spanwright.design_truss(spanwright.read_project(sys.argv[1]))\n"
        "write_calculation(found, Path(sys.argv[2]), date='2025-03-01')"
    )
    there = folder / "there"
    subprocess.run(
        [sys.executable, "-c", script, str(FOLDER / "howe_workshop" / "roof.toml"), str(there)],
        check=True,
        env={**os.environ, "PYTHONHASHSEED": "7", "TZ": "Asia/Tokyo"},
    )
    assert (there / "calculation.pdf").read_bytes() == here
    assert write_calculation(designed("howe_workshop"), folder, date="2025-03-02").read_bytes() != here


def test_a_date_is_printed_where_given_and_left_for_signature_otherwise() -> None:
    dated = document(designed("howe_workshop"), date="2025-03-01")["block"]["signed"]
    blank = document(designed("howe_workshop"))["block"]["signed"]
    assert dict(dated)["Date of issue"] == "2025-03-01"
    assert set(dict(blank).values()) == {""}


# Names that could do harm


def renamed(text: str, **block: str) -> Design:
    found = designed("howe_workshop")
    project = replace(found.setting.project, title=text, mark=text[:20], title_block={"owner": text, **block})
    return replace(found, setting=replace(found.setting, project=project), warnings=(text,))


def test_hostile_text_is_printed_as_it_is() -> None:
    first = pages(renamed(HOSTILE)).pages[0].extract_text()
    for part in ('#panic("no")', "$a_1$", "*b*", "<l> @r", "{y}", "---"):
        assert part in first.replace("\n", " ")
    assert "\u202e" not in first


def test_long_titles_and_words_stay_on_the_page() -> None:
    for page in pages(renamed("Store " * 60, client="A" * 400, number="a.b_c/" * 60)).pages[:3]:
        edges: list[float] = []

        def note(*placed: Any, edges: list[float] = edges) -> None:
            edges.append(float(placed[2][4]))

        page.extract_text(visitor_text=note)
        assert max(edges) < 595.28 - 0.5 * 18.0


def test_other_scripts_are_printed_or_said_to_be_missing() -> None:
    read = pages(renamed("Łódź Ωμέγα Склад עברית 倉庫 😀"))
    first = read.pages[0].extract_text()
    assert "Łódź Ωμέγα Склад" in first
    assert "U+5009, U+5EAB" in first
    assert "□□" in first
    properties = read.metadata
    assert properties is not None and "Склад" in str(properties.title)


def test_many_warnings_run_over_pages() -> None:
    last = pages(with_warnings("howe_workshop", 80)).pages[-2:]
    assert "Warning 79:" in "".join(page.extract_text() for page in last)


def test_a_design_that_fails_says_so_on_every_page() -> None:
    failing = altered("howe_workshop", 'bottom_chord = "2L"', 'bottom_chord = "2L 50x50x5"')
    assert not failing.passes
    found = [page.extract_text() for page in pages(failing).pages]
    assert all("NOT PASSING" in text for text in found)
    assert any("FAILS" in text for text in found)


def test_both_ends_pinned_lists_both_readings_of_the_supports() -> None:
    pinned = altered("howe_workshop", 'spacing = "6 m"', 'spacing = "6 m"\nsupports = "both pinned"')
    text = text_of(pages(pinned)).replace("\n", " ")
    half = len(pinned.analysis.combinations) // 2
    assert f"C{half + 1} to C{2 * half} are the same in this order, one end sliding" in text


def test_a_design_made_without_a_file_is_typeset() -> None:
    found = designed("howe_workshop")
    project = replace(found.setting.project, source="", source_name="", defaults_used=())
    assert len(pages(replace(found, setting=replace(found.setting, project=project))).pages) > 10


# Pictures and failures


def picture(mark: str) -> str:
    return (
        '<svg xmlns="http://www.w3.org/2000/svg" width="842pt" height="595pt" viewBox="0 0 842 595">'
        f'<text x="50" y="50" font-family="DejaVu Sans">SEEN, input {mark}</text></svg>'
    )


def test_pictures_of_the_same_input_are_embedded_and_others_are_not(tmp_path: Path) -> None:
    found = designed("howe_workshop")
    mark = input_hash(found.setting.project.source)
    (tmp_path / "restraint.svg").write_text(picture(mark), encoding="utf-8")
    (tmp_path / "utilisation.svg").write_text(picture("0" * 12), encoding="utf-8")
    read = PdfReader(write_calculation(found, tmp_path))
    last = read.pages[-1]
    assert float(last.mediabox.width) > float(last.mediabox.height)
    assert "SEEN" in last.extract_text() and f"Page {len(read.pages)} of" in last.extract_text()
    assert text_of(read).count("SEEN") == 1


@pytest.mark.parametrize("trouble", [RuntimeError("no room"), typst.TypstError("no room", "here", [], [])])
def test_a_failing_compiler_says_why(trouble: Exception, monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> None:
    def refuse(*_: object, **__: object) -> bytes:
        raise trouble

    monkeypatch.setattr(typst, "compile", refuse)
    with pytest.raises(OutputError, match=r"could not be typeset: .*no room"):
        write_calculation(designed("howe_workshop"), tmp_path)
    assert not list(tmp_path.iterdir())


def test_without_the_compiler_it_says_what_to_install(monkeypatch: pytest.MonkeyPatch, tmp_path: Path) -> None:
    monkeypatch.setitem(sys.modules, "typst", None)
    with pytest.raises(OutputError, match="pip install typst"):
        write_calculation(designed("howe_workshop"), tmp_path)


def test_hand_checks_are_printed_with_their_verdicts() -> None:
    table = section(document(designed("pratt_store")), "Hand checks")["blocks"][1]
    assert {row[-1] for row in table["rows"]} <= {"pass", "within", "OUTSIDE"}
    assert len(table["rows"]) > 30


def test_the_page_for_the_hand_has_three_members_and_fits_one_page(texts: list[str]) -> None:
    (tasks,) = blocks(document(designed("pratt_store")), "tasks")
    assert len(tasks["entries"]) == 3
    assert len({entry["title"].split(": ")[1] for entry in tasks["entries"]}) == 3
    (page,) = [text for text in texts[1:] if "17 For the hand" in text]
    assert page.count("factored resistance") == 3


def test_loads_of_purlin_lines_are_those_of_the_case() -> None:
    """The purlin lines of a wind case, added up, are the loads of that case (no load enters otherwise here)."""
    found = designed("pratt_store")
    tables = [
        block
        for block in section(document(found), "Loads")["blocks"]
        if block["kind"] == "table" and block["columns"][0]["head"] == "line"
    ]
    columns = {
        column["head"]: [row[at] for row in table["rows"]]
        for table in tables
        for at, column in enumerate(table["columns"])
        if at
    }
    checked = 0
    for at, case in enumerate(found.analysis.cases, 1):
        if case.kind in ("imposed", "wind"):
            cells = [cell for cell in columns[f"L{at} up"] if cell != "\u2013"]
            up = sum(float(cell.replace("\u2212", "-")) for cell in cells)
            assert up == pytest.approx(case.joint_loads[:, 1].sum() / 1e3, abs=0.0005 * len(cells))
            checked += 1
    assert checked == 5
