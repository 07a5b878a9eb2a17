"""The schedules as a workshop opens them: read back, added up, and with hostile titles."""

from __future__ import annotations

import csv
import zipfile
from dataclasses import replace
from datetime import datetime
from functools import cache
from pathlib import Path
from typing import Any

import numpy as np
import openpyxl
import pytest
from demos import DEMOS, demo, with_any_legs
from openpyxl.worksheet.worksheet import Worksheet

from spanwright.design.cautions import CAUTIONS, SHORT_CAUTION
from spanwright.design.packs import packs_by_bar
from spanwright.design.result import Design
from spanwright.design.run import design
from spanwright.design.standard import Ends
from spanwright.io.files import input_hash
from spanwright.io.results.members import members
from spanwright.io.schedule import write_schedules
from spanwright.truss.errors import OutputError

SHEETS = ["Parts", "Cutting", "Stock", "Members", "Notes"]
HEAD = 5
"""Row of the column heads, below four rows of headings."""


@cache
def done(name: str) -> Design:
    return design(demo(name))


@pytest.fixture(params=DEMOS)
def result(request: pytest.FixtureRequest) -> Design:
    return done(request.param)


def with_title(result: Design, title: str, mark: str | None = None) -> Design:
    project = replace(result.setting.project, title=title, mark=mark or result.setting.project.mark)
    pieces = tuple(replace(p, mark=p.mark.replace(result.setting.project.mark, project.mark)) for p in result.pieces)
    return replace(result, setting=replace(result.setting, project=project), pieces=pieces)


def workbook(result: Design, folder: Path) -> dict[str, Worksheet]:
    write_schedules(result, folder)
    book = openpyxl.load_workbook(folder / "schedule.xlsx")
    assert book.sheetnames == SHEETS
    return {name: book[name] for name in SHEETS}


def table(sheet: Worksheet) -> list[dict[str, Any]]:
    """Return the rows below the heads by column head; of two columns with one head the first is kept."""
    heads = [str(cell.value) for cell in sheet[HEAD]]
    rows = []
    for row in sheet.iter_rows(min_row=HEAD + 1, values_only=True):
        named: dict[str, Any] = {}
        for head, cell in zip(heads, row, strict=True):
            named.setdefault(head, cell)
        rows.append(named)
    return rows


def page_texts(sheet: Worksheet) -> tuple[str, str]:
    """Return the whole texts of page header and footer, without the commands that place their parts."""
    header, footer = sheet.oddHeader, sheet.oddFooter
    assert header is not None
    assert footer is not None
    texts = [" ".join(str(part.text) for part in (item.left, item.center, item.right)) for item in (header, footer)]
    return texts[0], texts[1]


def csv_rows(folder: Path) -> list[dict[str, str]]:
    with (folder / "schedule.csv").open(encoding="utf-8", newline="") as file:
        return list(csv.DictReader(file))


def test_the_parts_sheet_lists_every_mark_with_its_figures(result: Design, tmp_path: Path) -> None:
    *rows, total = table(workbook(result, tmp_path)["Parts"])
    assert [row["Mark"] for row in rows] == [piece.mark for piece in result.pieces]
    for row, piece in zip(rows, result.pieces, strict=True):
        assert (row["Per truss"], row["Total"], row["Trusses"]) == (
            piece.per_truss,
            piece.quantity,
            result.setting.project.quantity,
        )
        assert row["Cut length, mm"] == piece.cut_length
        assert row["Mass total, kg"] == pytest.approx(piece.total_mass, abs=0.051)
        assert row["Paint area total, m2"] == pytest.approx(piece.total_paint_area, abs=0.0051)
        assert (row["Section"], row["Grade"], row["Hand"] or "") == (piece.section, piece.grade, piece.hand)
        assert (row["End 1"], row["End 2"]) == piece.ends
    assert total["Truss"] == "Total"


def test_totals_are_the_sums_of_what_stands_above_them(result: Design, tmp_path: Path) -> None:
    *rows, total = table(workbook(result, tmp_path)["Parts"])
    for head, decimals in (("Total", 0), ("Mass total, kg", 1), ("Paint area total, m2", 2)):
        assert total[head] == round(sum(row[head] for row in rows), decimals)
    mass = sum(piece.total_mass for piece in result.pieces)
    assert total["Mass total, kg"] == pytest.approx(mass, abs=0.05 * len(rows))
    assert [total[head] for head in ("Cut length, mm", "Mass each, kg", "Mark")] == [None, None, None]


def test_the_csv_holds_the_same_parts_under_a_plain_first_line(result: Design, tmp_path: Path) -> None:
    *rows, _ = table(workbook(result, tmp_path)["Parts"])
    first = (tmp_path / "schedule.csv").read_bytes().split(b"\r\n")[0]
    assert first.startswith(b"status,truss,mark,hand,per_truss,trusses,quantity,description,section,grade,")
    for row, line in zip(rows, csv_rows(tmp_path), strict=True):
        assert (line["mark"], line["section"], line["grade"]) == (row["Mark"], row["Section"], row["Grade"])
        assert int(line["quantity"]) == row["Total"]
        assert float(line["cut_length_mm"]) == row["Cut length, mm"]
        assert float(line["mass_total_kg"]) == row["Mass total, kg"]
        assert float(line["paint_area_total_m2"]) == row["Paint area total, m2"]


def test_every_line_of_the_csv_is_an_estimate_with_caution_and_hash(result: Design, tmp_path: Path) -> None:
    write_schedules(result, tmp_path)
    for line in csv_rows(tmp_path):
        assert line["status"] == "ESTIMATE"
        assert "no gussets, cleats, bearings, splices, bolts or welds" in line["note"]
        assert SHORT_CAUTION in line["note"]
        assert line["input_sha256"] == input_hash(result.setting.project.source)


def test_every_sheet_is_headed_as_an_estimate_with_title_caution_and_hash(result: Design, tmp_path: Path) -> None:
    project = result.setting.project
    for sheet in workbook(result, tmp_path).values():
        title, status, caution, origin = (str(sheet.cell(row, 1).value) for row in range(1, HEAD))
        assert project.title in title
        assert f"{project.mark}, {project.quantity} off" in title
        assert status.startswith("ESTIMATE: no gussets, cleats, bearings, splices, bolts or welds")
        assert caution == SHORT_CAUTION
        assert input_hash(project.source) in origin


def test_sheets_print_on_a4_landscape_with_heads_repeated(result: Design, tmp_path: Path) -> None:
    for sheet in workbook(result, tmp_path).values():
        setup = sheet.page_setup
        assert (setup.orientation, setup.paperSize, setup.fitToHeight) == ("landscape", 9, 0)
        assert sheet.sheet_properties.pageSetUpPr is not None
        assert sheet.sheet_properties.pageSetUpPr.fitToPage
        assert sheet.print_title_rows == f"${HEAD}:${HEAD}"
        assert sheet.freeze_panes == f"A{HEAD + 1}"
        header, footer = page_texts(sheet)
        assert "ESTIMATE" in header
        assert input_hash(result.setting.project.source) in footer


def test_the_member_schedule_agrees_with_the_results(result: Design, tmp_path: Path) -> None:
    rows = table(workbook(result, tmp_path)["Members"])
    packs = packs_by_bar(result.setting, result.demand, result.choices)
    for bar, (row, member) in enumerate(zip(rows, members(result), strict=True)):
        assert row["Member"] == member["bar"]
        assert row["Joints"] == " - ".join(member["joints"])
        assert row["Section"] == member["section"]
        assert row["Length c/c, mm"] == round(member["length_mm"])
        assert row["Buckling length out of plane, mm"] == round(member["buckling"]["out_of_plane_mm"])
        assert (row["Greatest tension (+), kN"] or 0.0) == pytest.approx(member["tension"]["max_N"] / 1e3, abs=0.051)
        assert (row["Greatest compression (-), kN"] or 0.0) <= 0.0
        assert row["Packs between joints"] == (packs[bar] or None)
        assert result.utilisation[bar] <= row["Utilisation"] < result.utilisation[bar] + 0.01
        assert row["Governing check"] == member["governing"]["check"]
        assert row["Grade"] == "S355JR"


def test_moments_stand_where_the_chord_bends(tmp_path: Path) -> None:
    """The ridge pair of the store stands between joints: the chord bends, least far from the ridge; webs never."""
    store = done("pratt_store")
    moments = {
        row["Member"]: row["Greatest moment (sagging +), kNm"] for row in table(workbook(store, tmp_path)["Members"])
    }
    assert abs(moments["TC6"]) == max(abs(moment) for moment in moments.values() if moment)
    assert all(moments[bar] is None for bar in moments if not bar.startswith("TC"))


def test_a_moment_that_hogs_is_negative(tmp_path: Path) -> None:
    store = done("pratt_store")
    demand = replace(store.demand, sag=np.full_like(store.demand.sag, 2e6), hog=np.full_like(store.demand.hog, 3e6))
    rows = table(workbook(replace(store, demand=demand), tmp_path)["Members"])
    assert {row["Greatest moment (sagging +), kNm"] for row in rows} == {-3.0}


def test_the_cutting_list_cuts_what_the_parts_list_asks_for(result: Design, tmp_path: Path) -> None:
    sheets = workbook(result, tmp_path)
    stock = result.setting.project.members.stock_length
    cut: dict[str, int] = {}
    *rows, total = table(sheets["Cutting"])
    for row in rows:
        parts = row["From each bar, longest first: number x mark (cut length, mm)"]
        for part in parts.split(", "):
            number, mark = part.split(" (")[0].split(" x ")
            cut[mark] = cut.get(mark, 0) + int(number) * row["Bars cut alike"]
    assert cut == {piece.mark: piece.quantity for piece in result.pieces if piece.cut_length <= stock}
    *kinds, all_bars = table(sheets["Stock"])
    assert total["Bars cut alike"] == all_bars["Bars"] == sum(kind["Bars"] for kind in kinds)
    too_long = "; ".join(str(kind["Too long for a bar: not counted, to be spliced first"]) for kind in kinds)
    assert all((piece.mark in too_long) == (piece.cut_length > stock) for piece in result.pieces)


def test_the_notes_hold_size_warnings_cautions_and_defaults(result: Design, tmp_path: Path) -> None:
    notes = table(workbook(result, tmp_path)["Notes"])
    texts = [note["Text"] for note in notes]
    assert set(CAUTIONS) | set(result.warnings) | set(result.setting.standard.verify_notes()) <= set(texts)
    kinds = {note["Note"]: note["Text"] for note in notes}
    assert " long, " in kinds["Overall size"]
    assert "to lift, with 8 % for gussets and fixings" in kinds["Mass of one truss"]
    assert "contact faces of pairs included" in kinds["Paint area"]
    assert "1.5 times the connected leg" in kinds["Ends required"]
    defaults = [f"{key} = {value}" for key, value in result.setting.project.defaults_used]
    assert [note["Text"] for note in notes if note["Note"] == "Default used"] == defaults


def test_bolted_ends_are_required_in_words(tmp_path: Path) -> None:
    shed = done("howe_workshop")
    project = replace(shed.setting.project, ends=Ends("bolted", bolts=3, bolt_diameter=16.0))
    bolted = replace(shed, setting=replace(shed.setting, project=project))
    notes = {note["Note"]: note["Text"] for note in table(workbook(bolted, tmp_path)["Notes"])}
    assert "3 bolts M16 8.8 in one line at each end, holes punched" in notes["Ends required"]


def test_the_same_design_gives_the_same_bytes(result: Design, tmp_path: Path) -> None:
    folders = [tmp_path / "a", tmp_path / "b"]
    for folder in folders:
        folder.mkdir()
        write_schedules(design(result.setting.project), folder)
    for name in ("schedule.csv", "schedule.xlsx"):
        first, second = ((folder / name).read_bytes() for folder in folders)
        assert first == second
    # and on another day
    assert openpyxl.load_workbook(folders[0] / "schedule.xlsx").properties.created == datetime(2000, 1, 1)


HOSTILE = [
    "=cmd()|' /C calc'!A0",
    "+1+1",
    "@SUM(A1)",
    "-2",
    "&G & <b>shed</b> &P &[Picture]",
    "12 m shed",
    "Skuur 屋根 крыша سقف 🏠",
    "x" * 5000,
    "http://example.com/",
    '"quoted", with; separators\u2028',
]


@pytest.mark.parametrize("title", HOSTILE)
def test_a_hostile_title_does_no_harm(title: str, tmp_path: Path) -> None:
    sheets = workbook(with_title(done("howe_workshop"), title), tmp_path)
    for sheet in sheets.values():
        for row in sheet.iter_rows():
            assert all(cell.data_type in ("s", "n") for cell in row)
        assert "H1, 8 off" in page_texts(sheet)[0]
    with zipfile.ZipFile(tmp_path / "schedule.xlsx") as archive:
        assert not any("media" in name or "hyperlink" in name for name in archive.namelist())
        pages = [archive.read(name).decode() for name in archive.namelist() if name.startswith("xl/worksheets/sheet")]
    assert not any("<f>" in page or "<hyperlink" in page for page in pages)
    notes = {note["Note"]: note["Text"] for note in table(sheets["Notes"])}
    assert title[:1000] in notes["Truss"]


@pytest.mark.parametrize("mark", ["=R1", "+R1", "-R1", "@R1"])
def test_a_mark_that_looks_like_a_formula_is_neutralised(mark: str, tmp_path: Path) -> None:
    sheets = workbook(with_title(done("howe_workshop"), "shed", mark), tmp_path)
    first, *_ = table(sheets["Parts"])
    assert (first["Truss"], first["Mark"]) == (f"'{mark}", f"'{mark}-TC1L")
    line, *_ = csv_rows(tmp_path)
    assert (line["truss"], line["mark"]) == (f"'{mark}", f"'{mark}-TC1L")


def test_the_page_header_stays_within_what_a_spreadsheet_takes(tmp_path: Path) -> None:
    """255 characters (the file format's limit)."""
    for title in HOSTILE:
        for sheet in workbook(with_title(done("howe_workshop"), title, "&" * 60), tmp_path).values():
            assert all(len(text) < 250 for text in page_texts(sheet))


def test_columns_are_wide_enough_for_their_words(result: Design, tmp_path: Path) -> None:
    """No single word of a table is cut or broken: wrapping happens at spaces."""
    for sheet in workbook(result, tmp_path).values():
        widths = [column_width(sheet, at) for at in range(1, sheet.max_column + 1)]
        for row in sheet.iter_rows(min_row=HEAD, values_only=True):
            for cell, width in zip(row, widths, strict=True):
                longest = max((len(word) for word in str(cell if cell is not None else "").split()), default=0)
                assert longest <= width


def column_width(sheet: Worksheet, column: int) -> float:
    """Return the width of a column; the reader keeps one entry for neighbours of one width."""
    for entry in sheet.column_dimensions.values():
        if int(entry.min or 0) <= column <= int(entry.max or 0):
            return float(entry.width)
    raise AssertionError(column)


def test_every_unequal_angle_says_its_way_round_in_every_list(tmp_path: Path) -> None:
    """Turned the other way the member fails: csv, xlsx, and the member sheet by the full name of the section."""
    result = design(with_any_legs(demo("howe_workshop")))
    sheets = workbook(result, tmp_path)
    told = {
        f"{choice.name}": "legs together" if choice.section.pieces > 1 else "leg to the gusset"
        for choice in result.choices
        if choice.section.leg_connected[0] != choice.section.leg_outstanding[0]
    }
    assert told
    by_mark = {piece.mark: piece for piece in result.pieces}
    for rows, mark, remarks in ((table(sheets["Parts"]), "Mark", "Remarks"), (csv_rows(tmp_path), "mark", "remarks")):
        for row in rows:
            piece = by_mark.get(row[mark])
            if piece is not None and piece.description != "packing plate":
                name = result.choice_for(result.setting.truss.bar(piece.bars[0]))[0].name
                leg = "short" if "short" in name else "long"
                assert f"{leg} {told[name]}" in row[remarks].split("; ")
    for row in table(sheets["Members"]):
        assert row["Section"] in told


def test_a_folder_that_cannot_be_written_is_named(tmp_path: Path) -> None:
    with pytest.raises(OutputError, match=r"schedule\.csv"):
        write_schedules(done("howe_workshop"), tmp_path / "missing")
