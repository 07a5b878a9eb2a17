"""What the calculation is made of: sections of blocks, each plain text and numbers; the template gives the looks.

The data handed to the template is `asdict` of these, with `kind` telling blocks apart.
"""

from __future__ import annotations

from dataclasses import dataclass
from typing import Literal

Align = Literal["left", "right", "center"]
Row = tuple[str, ...]


@dataclass(frozen=True)
class Paragraph:
    """A paragraph. small : in the size of notes."""

    text: str
    small: bool = False
    kind: str = "paragraph"


@dataclass(frozen=True)
class Points:
    """Sentences, each a point of a list."""

    items: tuple[str, ...]
    kind: str = "points"


@dataclass(frozen=True)
class Fields:
    """Values beside their names."""

    rows: tuple[tuple[str, str], ...]
    kind: str = "fields"


@dataclass(frozen=True)
class Column:
    """A column of a table.

    head, unit : printed above it. align : numbers stand on the right, with equal decimals, so that their points align.
    share : of the width that narrow columns leave, 0 for a narrow column.
    """

    head: str
    unit: str = ""
    align: Align = "right"
    share: float = 0.0


@dataclass(frozen=True)
class Table:
    """A table whose head is repeated on every page.

    rows : cells as text, one a column. title : above it. note : below it.
    bold : indices of rows that stand out; strong : (row, column) of cells that do.
    dense : in smaller letters. side_by_side : how many times the columns are repeated across the page.
    """

    columns: tuple[Column, ...]
    rows: tuple[Row, ...]
    title: str = ""
    note: str = ""
    bold: tuple[int, ...] = ()
    strong: tuple[tuple[int, int], ...] = ()
    dense: bool = False
    side_by_side: int = 1
    kind: str = "table"


@dataclass(frozen=True)
class Derivation:
    """How one load came about: its name, its kind and its lines."""

    name: str
    about: str
    lines: tuple[str, ...]


@dataclass(frozen=True)
class Derivations:
    """Derivations, in two columns."""

    entries: tuple[Derivation, ...]
    kind: str = "derivations"


@dataclass(frozen=True)
class Picture:
    """A picture on a page of its own: the text of an SVG file."""

    svg: str
    caption: str
    kind: str = "picture"


@dataclass(frozen=True)
class Value:
    """A value of a worked member: its name in formulas, the printed number, and both as mathematics."""

    name: str
    number: str
    symbol: str
    shown: str
    unit: str
    meaning: str
    clause: str


@dataclass(frozen=True)
class Step:
    """A step of a worked member: a value with the formula that gives it, in symbols and with numbers put in.

    expression : the formula as the rule states it, "" where there is none. formula, numbers : mathematics, "" where
        they would repeat the symbol or the result. wide : whether the numbers must be free to break. reasons : of a
        formula with cases, the conditions that chose among them with numbers put in, as mathematics.
    """

    value: Value
    expression: str = ""
    formula: str = ""
    numbers: str = ""
    wide: bool = False
    reasons: tuple[str, ...] = ()


@dataclass(frozen=True)
class Steps:
    """Values on the way, with their formulas."""

    steps: tuple[Step, ...]
    kind: str = "steps"


@dataclass(frozen=True)
class RuleWork:
    """What one rule adds to a check: the values it takes that are printed nowhere else, and its steps."""

    given: tuple[Value, ...]
    steps: tuple[Step, ...]


@dataclass(frozen=True)
class Taken:
    """The result of a rule that is worked already, under the check named."""

    value: Value
    under: str


@dataclass(frozen=True)
class CheckWork:
    """One check of a worked member. combination : that governs it, "" where it depends on none.

    taken : results of rules that earlier checks worked; they come first.
    """

    name: str
    clause: str
    combination: str
    taken: tuple[Taken, ...]
    rules: tuple[RuleWork, ...]
    result: str
    passes: bool
    governs: bool


@dataclass(frozen=True)
class MemberWork:
    """One member worked in full. common : values that mean the same in every check."""

    title: str
    fields: tuple[tuple[str, str], ...]
    common: tuple[Value, ...]
    checks: tuple[CheckWork, ...]
    idle: tuple[str, ...]
    kind: str = "member"


@dataclass(frozen=True)
class Task:
    """One member to redo by hand: what is given, and what comes out."""

    title: str
    given: tuple[Value, ...]
    results: tuple[tuple[str, str], ...]


@dataclass(frozen=True)
class Tasks:
    """A page for the hand."""

    entries: tuple[Task, ...]
    kind: str = "tasks"


@dataclass(frozen=True)
class Mark:
    """Something drawn at a point of the sketch, m.

    shape : "pinned", "sliding", "counted", "open", "brace", "tie" or "bearing"; of a joint's name, where it stands.
    """

    shape: str
    x: float
    y: float
    label: str = ""


@dataclass(frozen=True)
class Stroke:
    """A line of the sketch, m. style : "chord", "web", "brace" or "loose". label : beside its middle."""

    style: str
    start: tuple[float, float]
    end: tuple[float, float]
    label: str = ""


@dataclass(frozen=True)
class Dimension:
    """A dimension between two places, m.

    row : below the sketch, from 1 on; upright: 1 on its right, -1 on its left.
    """

    start: tuple[float, float]
    end: tuple[float, float]
    text: str
    row: int
    upright: bool = False


@dataclass(frozen=True)
class Sketch:
    """A line drawing to scale. width, height : m, of what is drawn, from (left, bottom)."""

    strokes: tuple[Stroke, ...]
    marks: tuple[Mark, ...]
    names: tuple[Mark, ...]
    dimensions: tuple[Dimension, ...]
    left: float
    bottom: float
    width: float
    height: float
    caption: str
    kind: str = "sketch"


Block = Paragraph | Points | Fields | Table | Derivations | Picture | Steps | MemberWork | Tasks | Sketch


@dataclass(frozen=True)
class Section:
    """A section of the document, with its blocks. level : 1, or 2 within another. apart : begins on a new page."""

    title: str
    blocks: tuple[Block, ...]
    level: int = 1
    apart: bool = False
