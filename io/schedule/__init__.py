"""Schedules for the workshop and the engineer: parts, cutting list, stock, members; as CSV and XLSX."""

from spanwright.io.schedule.write import write_schedules

__all__ = ["write_schedules"]
