"""The drawn tables against the figures of the other outputs."""

import pytest
from draughted import VARIANTS, arranged, designed, drawing, texts

from spanwright.io.drawing.schedules import bearing_table, member_schedule, parts, restraint_table
from spanwright.io.drawing.tables import DrawnTable, Table
from spanwright.io.results.members import members
from spanwright.io.schedule.parts import parts_table

NAMES = tuple(VARIANTS)


@pytest.mark.parametrize("name", NAMES)
def test_the_parts_list_is_the_schedules(name: str) -> None:
    rows = {row[0]: row for row in parts(designed(name)).rows}
    pieces = designed(name).pieces
    assert list(rows) == [piece.mark for piece in pieces]
    for piece in pieces:
        _, each, total, section, grade, length, mass, _, first, last, _, note = rows[piece.mark]
        assert (int(each), int(total), section, grade) == (piece.per_truss, piece.quantity, piece.section, piece.grade)
        assert float(length) == piece.cut_length
        assert float(mass) == pytest.approx(piece.mass, abs=0.006)
        assert (first, last) == piece.ends
        assert bool(note) == bool(piece.remarks)
    assert len(parts_table(designed(name)).rows) == len(rows)


@pytest.mark.parametrize("name", NAMES)
def test_the_member_schedule_names_every_member_once_with_its_figures(name: str) -> None:
    design = designed(name)
    rows = {tuple(row[2:]) for row in member_schedule(design).rows}
    for member in members(design):
        tension, compression = (round(member[key]["max_N"] / 1e3, 1) for key in ("tension", "compression"))
        wanted = (
            member["section"].split(",")[0],
            f"{member['length_mm']:.0f}",
            f"{tension:+.1f}" if tension else "-",
            f"{compression:+.1f}" if compression else "-",
        )
        assert wanted in rows


@pytest.mark.parametrize("name", NAMES)
def test_the_restraint_table_lists_all_that_stands_there_with_its_force(name: str) -> None:
    design = designed(name)
    restraint = design.setting.restraint
    rows = restraint_table(design).rows
    assert len(rows) == sum(
        len(part) for part in (restraint.lines, restraint.braces, restraint.ties, restraint.bearings)
    )
    printed = {row[0].split(" to line")[0]: row for row in rows}
    for force in design.restraint_forces:
        assert printed[force.part][4] == f"{force.force / 1e3:.1f}"
        assert printed[force.part][3] != "nothing"
    loose = [row for row in rows if row[3] == "nothing"]
    assert bool(loose) == (name == "loose")
    assert all(row[4] == "-" for row in loose)


@pytest.mark.parametrize("name", NAMES)
def test_bearing_forces_are_the_designs(name: str) -> None:
    design = designed(name)
    printed = {(row[0], row[1]): row for row in bearing_table(design).rows}
    for force in design.bearing_forces:
        shown = printed[force.joint, force.direction][2 if force.factored else 3]
        assert shown == (f"{force.value / 1e3:.1f}" if round(force.value / 1e3, 1) else "-")


@pytest.mark.parametrize("name", NAMES)
def test_every_cell_is_lettered(name: str) -> None:
    lettered = {text.plain_text() for text in texts(drawing(name).paperspace("Sheet 1"), "TABLES")}
    for table in (parts, member_schedule, restraint_table, bearing_table):
        for row in table(designed(name)).rows:
            assert {cell for cell in row if cell} <= lettered
    assert any(isinstance(block, DrawnTable) for block, _ in arranged(name).blocks)


def test_a_table_too_long_says_what_it_leaves_out() -> None:
    table = Table("T", ("A",), tuple((str(number),) for number in range(9)))
    short = table.limited(4)
    assert len(short.rows) == 4
    assert short.remarks[-1].startswith("5 more rows")
    assert table.limited(9) is table
    assert table.limited(None) is table


def test_strips_share_the_rows() -> None:
    table = Table("T", ("A", "B"), tuple((str(number), "x") for number in range(10)))
    one, two = DrawnTable(table, 1), DrawnTable(table, 2)
    assert two.size[0] > 2 * sum(table.widths)
    assert one.height - two.height == pytest.approx(5 * 4.3)
