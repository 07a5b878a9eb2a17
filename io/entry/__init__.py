"""Spanwright: steel roof trusses from span and pitch to a checked, drawn and scheduled design."""

__version__ = "0.1.0"
