"""Lettering against matplotlib's own measure, against ezdxf's reading of DXF text, and as invariants."""

import pytest
from ezdxf.tools.text import plain_text
from hypothesis import given
from hypothesis import strategies as st
from matplotlib.font_manager import FontProperties
from matplotlib.textpath import TextPath

from spanwright.io.drawing.lettering import TEXT, cut_to, printable, width_of, wrapped

ANY_TEXT = st.text(max_size=60) | st.text("%^\\{}ucdpUM+0123456789 PA;", max_size=30)


@given(ANY_TEXT)
def test_a_reader_of_dxf_sees_what_is_printable(text: str) -> None:
    assert plain_text(printable(text)) == printable(text)


@given(ANY_TEXT)
def test_what_is_printable_stays_so(text: str) -> None:
    assert printable(printable(text)) == printable(text)


@given(st.text(st.characters(min_codepoint=33, max_codepoint=126, exclude_characters="%\\^"), max_size=40))
def test_plain_words_are_left_alone(text: str) -> None:
    assert printable(text) == text


@pytest.mark.parametrize("text", ["%%c", "%%%u", "%%%%%%d", "\\U+0041", "\\M+18140", "\\\\U+00"])
def test_codes_of_the_format_are_broken_up(text: str) -> None:
    assert not any(code in printable(text) for code in ("%%", "\\U+", "\\M+"))
    assert printable(text).replace(" ", "") == text


@pytest.mark.parametrize("text", ["P1-TC1L + P1-TC1R", "1506", "L 80x60x8, short leg connected", "\u0416\u00d8"])
def test_widths_are_those_of_the_font(text: str) -> None:
    """DejaVu Sans: capitals are 0.729 of the size; the width factor of the style is 0.85."""
    path = TextPath((0.0, 0.0), text, size=TEXT / 0.729, prop=FontProperties(family="DejaVu Sans"))
    drawn = path.get_extents().width * 0.85
    assert drawn <= width_of(text) + 0.05
    assert width_of(text) < 1.05 * drawn + 0.6  # kerning; the blank beside the first and the last letter


@given(ANY_TEXT, st.floats(5.0, 60.0))
def test_what_is_cut_fits_and_begins_alike(text: str, room: float) -> None:
    cut = cut_to(text, room)
    assert width_of(cut) <= room + 1e-9
    assert printable(text).startswith(cut.rstrip("\u2026").rstrip())


@given(st.lists(st.text("abcdefgWi.", min_size=1, max_size=12), min_size=1, max_size=30), st.floats(30.0, 120.0))
def test_wrapped_lines_fit_and_lose_no_word(words: list[str], room: float) -> None:
    lines = wrapped(" ".join(words), room)
    assert max(width_of(line) for line in lines) <= room + 1e-9
    assert " ".join(lines).split() == words
