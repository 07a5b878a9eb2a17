"""The report as text for the screen, and as a record for `results.json`."""

from __future__ import annotations

from collections import Counter, defaultdict
from typing import Any

from spanwright.io.wireframe.report import OUTCOMES, Facts, Finding, Report, TallyRow, place_text
from spanwright.truss.decimals import decimal

_SHOWN = 12  # findings of one code, and handles of one row, on the screen; the record has all


def report_text(report: Report) -> str:
    """Return the report as lines of text: what was understood, the findings by code, the closing table.

    Of many findings of one code the first are shown; `report_record` has all.
    """
    lines = [f"Wireframe {_printable(report.drawing)}", *_facts(report.facts), ""]
    by_code: defaultdict[str, list[Finding]] = defaultdict(list)
    for finding in report.findings:
        by_code[finding.code].append(finding)
    for severity in ("warning", "note"):
        for code, findings in sorted(by_code.items()):
            if findings[0].severity == severity:
                lines += _findings(code, findings, report.facts.unit)
    return "\n".join([*lines, "", *_closing_table(report)]) + "\n"


def report_record(report: Report) -> dict[str, Any]:
    """Return the report as plain values for JSON, with units in the key names; places are in drawing units.

    Characters that cannot be printed are "?".
    """
    facts = report.facts
    return {
        "file": _printable(report.drawing),
        "unit": facts.unit,
        "unit_stated_by": facts.unit_from,
        "plane": facts.vertical,
        "tolerance_mm": facts.tolerance,
        "span_mm": facts.span,
        "depth_mm": facts.depth,
        "joints": facts.joints,
        "bars": facts.bars,
        "findings": [
            {
                "code": finding.code,
                "severity": finding.severity,
                "meaning": finding.meaning,
                "entity": finding.handle,
                "layer": _printable(finding.layer),
                "blocks": [_printable(block) for block in finding.blocks],
                "at": list(finding.at),
                "found": _printable(finding.text),
                "done": _printable(finding.done),
            }
            for finding in report.findings
        ],
        "read": report.read,
        "entities": [
            {
                "kind": row.kind,
                "layer": _printable(row.layer),
                "outcome": row.outcome,
                "reason": _printable(row.reason),
                "count": row.count,
                "handles": list(row.handles),
            }
            for row in report.tally
        ],
    }


def _facts(facts: Facts) -> list[str]:
    if not facts.unit:
        return []
    lines = [f"  unit {facts.unit}, stated by {facts.unit_from}"]
    if facts.tolerance:
        lines += [f"  {facts.vertical}", f"  line ends within {decimal(facts.tolerance, 3)} mm are one joint"]
    if facts.joints:
        size = f"span {decimal(facts.span / 1000, 4)} m, depth {decimal(facts.depth / 1000, 4)} m"
        lines.append(f"  {size}, {facts.joints} joints, {facts.bars} bars")
    return lines


def _findings(code: str, findings: list[Finding], unit: str) -> list[str]:
    first = findings[0]
    count = f" ({len(findings)})" if len(findings) > 1 else ""
    lines = [f"{code} {first.severity}: {first.meaning}{count}"]
    lines += [f"    {line_of(finding, unit)}" for finding in findings[:_SHOWN]]
    if len(findings) > _SHOWN:
        lines.append(f"    and {len(findings) - _SHOWN} more")
    return lines


def line_of(finding: Finding, unit: str = "") -> str:
    """Return a finding on one line: what, what was done, where; `unit` is that of the drawing, if known."""
    said = f"{finding.text}; {finding.done}" if finding.done else finding.text
    where = []
    if finding.at:
        where.append(f"at {place_text(finding.at)} (drawing units{', ' + unit if unit else ''})")
    if finding.layer:
        where.append(f'layer "{finding.layer}"')
    if finding.handle:
        where.append(f"entity {finding.handle}")
    if finding.blocks:
        where.append("in block " + " > ".join(finding.blocks))
    return _printable(f"{said} [{', '.join(where)}]" if where else said)


def _closing_table(report: Report) -> list[str]:
    totals = Counter({outcome: report.count(outcome) for outcome in OUTCOMES})
    lines = [f"read {report.read} entities: " + ", ".join(f"{totals[outcome]} {outcome}" for outcome in OUTCOMES)]
    for outcome in OUTCOMES:
        rows = [row for row in report.tally if row.outcome == outcome]
        lines += [_printable(_row(row)) for row in rows]
    return lines


def _row(row: TallyRow) -> str:
    shown = ", ".join(row.handles[:_SHOWN])
    more = f", and {row.count - _SHOWN} more" if row.count > _SHOWN else ""
    return f'  {row.count:>6} {row.kind:<12} layer "{row.layer}": {row.outcome}, {row.reason} ({shown}{more})'


def _printable(text: str) -> str:
    return "".join(c if c.isprintable() else "?" for c in text)
