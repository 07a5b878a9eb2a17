"""Typesets the data of a document by the template, with the fonts that come with the packages used and no others."""

from __future__ import annotations

import json
import re
import shutil
import unicodedata
from collections.abc import Callable, Iterator
from contextlib import contextmanager
from importlib.resources import as_file, files
from importlib.util import find_spec
from pathlib import Path
from tempfile import TemporaryDirectory
from typing import Any

from spanwright.truss.errors import OutputError

TEMPLATE, PROBE = "calculation.typ", "signs.typ"
MISSING = "\u25a1"
"""Stands for a sign that no font of the document has."""

_PICTURE_FONTS = ("DejaVuSans.ttf", "DejaVuSans-Bold.ttf")
"""Fonts of the pictures; matplotlib, which draws them, carries them. They also help out for signs of other scripts."""

_UNSEEN = {"Cc", "Cf", "Cs", "Co", "Cn", "Zl", "Zp"}
"""Unicode categories that print nothing, or change how the text around them reads."""

_SOURCE = {"svg", "symbol", "shown", "formula", "numbers", "expression", "reasons"}
"""Keys whose text is no prose but made by us for a reader of its own: left as it is."""

_LONG_WORD = re.compile(r"\S{28,}")
_BREAKS = re.compile(r"[^._/,-]{16}|[._/,-]")
_BREAK = "\u200b"

_LATIN_1 = 0x100
_NAMED = re.compile(r"the text `\"(.+?)\"` could not be displayed")


def typeset(data: dict[str, Any]) -> bytes:
    """Return the PDF of a document; OutputError where the compiler is missing or fails.

    Its text is data to the template and never a part of its source. Signs without a glyph are replaced by `MISSING`
    and listed on the first page; signs that print nothing by a space.
    """
    try:
        import typst
    except ImportError as error:
        raise OutputError("the calculation needs the package typst", "pip install typst") from error
    with _fonts() as fonts, as_file(files(__package__)) as folder:

        def compiled(template: str, inputs: dict[str, str], *, archive: bool = False) -> bytes:
            return typst.compile(
                str(folder / template),
                root=str(folder),
                font_paths=fonts,
                sys_inputs=inputs,
                ignore_system_fonts=True,
                pdf_standards="a-2b" if archive else None,
            )

        try:
            shown = mapped(data, _seen)
            lacking = _without_glyph(shown, compiled)
            shown = mapped(shown, lambda text: text.translate(dict.fromkeys(map(ord, lacking), MISSING)))
            shown = mapped(shown, _breakable)
            shown["lacking"] = [f"U+{ord(sign):04X}" for sign in sorted(lacking)]
            return compiled(TEMPLATE, {"data": json.dumps(shown)})
        except RuntimeError as error:
            raise OutputError(f"the calculation could not be typeset: {error}") from error


def mapped(value: Any, change: Callable[[str], str]) -> Any:
    """Return data with every text in it changed, but for what is source and no prose."""
    match value:
        case str():
            return change(value)
        case dict():
            return {key: entry if key in _SOURCE else mapped(entry, change) for key, entry in value.items()}
        case list() | tuple():
            return [mapped(entry, change) for entry in value]
    return value


def _seen(text: str) -> str:
    """Return text with a space for every control or direction character, which could change how the rest reads."""
    if text.isascii() and text.isprintable():
        return text
    return "".join(" " if unicodedata.category(sign) in _UNSEEN else sign for sign in text)


def _breakable(text: str) -> str:
    """Return text whose very long words may be broken at points, strokes and after some letters."""
    return _LONG_WORD.sub(lambda word: _BREAKS.sub(lambda part: part[0] + _BREAK, word[0]), text)


@contextmanager
def _fonts() -> Iterator[list[str]]:
    """Give a folder with the fonts of the pictures, where matplotlib carries them."""
    spec = find_spec("matplotlib")
    carried = Path(spec.origin).parent / "mpl-data" / "fonts" / "ttf" if spec and spec.origin else None
    with TemporaryDirectory(prefix="spanwright-") as folder:
        for name in _PICTURE_FONTS:
            if carried is not None and (carried / name).is_file():
                shutil.copyfile(carried / name, Path(folder) / name)
        yield [folder]


def _without_glyph(data: Any, compiled: Callable[..., bytes]) -> set[str]:
    """Return the signs of the data that no font has: archive PDF refuses them, and says which."""
    signs: set[str] = set()

    def collect(text: str) -> str:
        signs.update(sign for sign in text if ord(sign) >= _LATIN_1)
        return text

    mapped(data, collect)
    lacking: set[str] = set()
    while signs:
        try:
            compiled(PROBE, {"signs": "".join(sorted(signs))}, archive=True)
            return lacking
        except RuntimeError as error:
            named = signs & set("".join(_NAMED.findall(getattr(error, "diagnostic", ""))))
            lacking |= named or signs
            signs -= named or signs
    return lacking
