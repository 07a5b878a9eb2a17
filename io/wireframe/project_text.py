"""The project file that an import writes: what was recognised, and what only the user knows as remarks to complete."""

from __future__ import annotations

from spanwright.io.wireframe.importer import Wireframe
from spanwright.io.wireframe.purlin_marks import MarkedPurlins
from spanwright.truss.decimals import decimal

_ACTIONS = """\
# actions = "SANS 10160:2011"       # REQUIRED. Loading standard and edition: sets the load factors
"""
_CHOICES = '"at joints", a greatest spacing "1.5 m", or a list of distances up the slope from the roof\'s edge'
_SPACING = """\
# spacing = "5 m"                   # REQUIRED. Truss to truss
"""
_RESTRAINT = """\
# anchored_purlins = "all"          # REQUIRED. Lines that end at a node of a braced bay or diaphragm: "all", "none", or
#                                     their numbers counted from the left eaves, such as [1, 4, 7]
# anchored_by = "roof bracing"      # REQUIRED. What takes their forces: "roof bracing", "diaphragm" or "nothing"
# bearings_held = true              # REQUIRED. Are the bearing joints held sideways, by an eaves strut to a braced bay?
"""
_LOADS = """\
[loads]
# roof_permanent = "0.25 kPa"       # REQUIRED. On the slope; or { most = "0.25 kPa", least = "0.18 kPa" }
# roof_imposed = "0.30 kPa"         # REQUIRED. On plan
# wind = "none"                     # REQUIRED. Or a table [[loads.wind]] for each wind case
"""


def project_text(wireframe: Wireframe, drawing_name: str) -> str:
    """Return a project file (TOML) with the joints, bars, bearings and restraint that were recognised.

    Keys that have no safe default stand as remarks that begin with `# ` and hold REQUIRED: take the `# ` away and
    choose. Where purlins are marked that no rule tells, their key holds what is refused until it is changed.
    Coordinates are written to the last digit, so that a truss drawn from here comes back unchanged.
    """
    given, report = wireframe.given, wireframe.report
    warnings = sum(finding.severity == "warning" for finding in report.findings)
    lines = [
        f"# Read from {_printable(drawing_name)}: span {decimal(report.facts.span / 1000)} m, "
        f"{len(given.joints)} joints, {len(given.bars)} bars; {warnings} warnings, see the report of the import.",
        "# Complete the lines marked REQUIRED: take the # away and choose.",
        "",
        f"title = {_text(drawing_name)}",
        'standard = "SANS 10162-1"',
        _ACTIONS,
        "[truss]",
        f"{_SPACING}overhang = {_length(given.overhang)}",
        "bars = [",
        *(
            f"    [{_text(start)}, {_text(end)}, {_text(role)}, {_text(name)}],"
            for name, (start, end, role) in zip(given.bar_names, given.bars, strict=True)
        ),
        "]",
        "",
        "[truss.joints]",
        *(f"{name} = [{_length(x)}, {_length(y)}]" for name, x, y in given.joints),
        "",
        "[truss.joint_supports]",
        *(f"{name} = {_text(kind)}" for name, kind in given.supports),
        "",
        "[restraint]",
        *_purlins(wireframe.purlins),
        f"knee_braces = {_joints(wireframe.knee_braces)}",
        f"bottom_ties = {_joints(wireframe.ties)}",
        f"{_RESTRAINT}",
        _LOADS,
    ]
    return "\n".join(lines)


def _purlins(marked: MarkedPurlins) -> list[str]:
    lines = []
    if marked.ridge_pair is not None:
        lines.append(f'ridge_purlins = "pair, {decimal(marked.ridge_pair)} mm from the apex"')
    if marked.rule is None:
        if marked.purlins:
            listed = ", ".join(f"{purlin.along:.1f}" for purlin in marked.purlins)
            lines.append(f"# purlins are marked along the top chord, from its first joint, at {listed} mm")
            return [*lines, f'purlins = "as marked"              # REQUIRED. {_CHOICES}']
        return [*lines, f'# purlins = "at joints"            # {_CHOICES}']
    if marked.rule == "at joints":
        return [*lines, 'purlins = "at joints"']
    return [*lines, "purlins = [" + ", ".join(_length(distance) for distance in marked.rule) + "]"]


def _joints(names: tuple[str, ...]) -> str:
    return "[" + ", ".join(_text(name) for name in names) + "]" if names else '"none"'


def _length(value: float) -> str:
    """Return a length in mm to its last digit."""
    return f'"{int(value)} mm"' if value == int(value) else f'"{value!r} mm"'


def _text(text: str) -> str:
    """Return text as a basic string of TOML."""
    escaped = _printable(text).replace("\\", "\\\\").replace('"', '\\"')
    return f'"{escaped}"'


def _printable(text: str) -> str:
    return "".join(c if c.isprintable() else "?" for c in text)
