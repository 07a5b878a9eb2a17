"""Marks on layers that no option names: the report says which option reads them."""

from pathlib import Path

from wireframes import PRATT, draw, imported, new_drawing

from spanwright.io.wireframe import Wireframe


def hints(wireframe: Wireframe) -> list[str]:
    return [finding.text for finding in wireframe.report.with_code("W-109")]


def marked(tmp_path: Path, **options: object) -> Wireframe:
    document = new_drawing()
    draw(document.modelspace(), PRATT, layer="STEEL")
    for joint in PRATT.top.joints:
        document.modelspace().add_circle(PRATT.xy[joint], 20, dxfattribs={"layer": "PURLIN"})
    document.blocks.new("MARK").add_circle((0, 0), 20)
    document.modelspace().add_blockref("MARK", (6000, 0), dxfattribs={"layer": "Bottom-Tie"})
    document.modelspace().add_blockref("MARK", (6000, 5000), dxfattribs={"layer": "PROPERTIES"})
    document.modelspace().add_point((4000, 0), dxfattribs={"layer": "KNEES"})
    return imported(document, tmp_path, **options)


def test_the_option_follows_from_the_layer_s_name_else_all_are_listed(tmp_path: Path) -> None:
    assert hints(marked(tmp_path)) == [
        'layer Bottom-Tie holds 1 circle and 1 block: --ties "Bottom-Tie*" reads them as ties',
        'layer KNEES holds 1 point: --knee-braces "KNEES*" reads them as knee braces',
        "layer PROPERTIES holds 1 circle: if they are marks, name the layer: --purlins (as purlins), "
        '--knee-braces (as knee braces), --ties (as ties) or --supports (as supports) "PROPERTIES*"',
        f'layer PURLIN holds {len(PRATT.top.joints)} circles: --purlins "PURLIN*" reads them as purlins',
    ]


def test_the_options_that_are_advised_read_the_marks_and_end_the_hints(tmp_path: Path) -> None:
    marks = {"purlins": ("PURLIN*",), "ties": ("Bottom-Tie*",), "knee braces": ("KNEES*",)}
    wireframe = marked(tmp_path, marks=marks, ignore=("PROP*",))
    assert hints(wireframe) == []
    assert (len(wireframe.ties), len(wireframe.knee_braces)) == (1, 1)
    assert wireframe.purlins.rule == "at joints"


def test_marks_on_layers_that_were_not_asked_for_are_told_where_the_name_says_so(tmp_path: Path) -> None:
    found = hints(marked(tmp_path, layers=("STEEL",)))
    assert [text.split()[1] for text in found] == ["Bottom-Tie", "KNEES", "PURLIN"]
