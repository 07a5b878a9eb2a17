"""Wireframe import: a DXF drawing of a truss becomes joints and bars, a report, a marked copy and a project file.

    wireframe = import_wireframe("roof.dxf", Options(units="mm"))
    print(report_text(wireframe.report))
    write_marked_copy(Path("roof.dxf"), wireframe.report, Path("roof-marked.dxf"))
    Path("roof.toml").write_text(project_text(wireframe, "roof.dxf"))

Where the drawing gives no truss, RefusedDrawingError carries the report so far, which can be printed and marked up too.
Importing this package imports the DXF library; do so in the command that needs it.
"""

from spanwright.io.wireframe.importer import Wireframe, import_wireframe
from spanwright.io.wireframe.marked_copy import marked_copy, write_marked_copy
from spanwright.io.wireframe.options import Limits, Options
from spanwright.io.wireframe.project_text import project_text
from spanwright.io.wireframe.report import Finding, RefusedDrawingError, Report
from spanwright.io.wireframe.report_text import report_record, report_text

__all__ = [
    "Finding",
    "Limits",
    "Options",
    "RefusedDrawingError",
    "Report",
    "Wireframe",
    "import_wireframe",
    "marked_copy",
    "project_text",
    "report_record",
    "report_text",
    "write_marked_copy",
]
