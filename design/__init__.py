"""The project, sections, member rules, sizing, pieces, and the run that joins them."""
