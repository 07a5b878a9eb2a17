"""Factors and tables of the loading standards, each file with its source and confidence mark."""
