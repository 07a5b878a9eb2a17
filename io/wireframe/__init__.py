"""Wireframe import: a DXF drawing of a truss becomes joints and bars, a report, a marked copy and a project file."""
