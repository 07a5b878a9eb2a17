"""Member rules of SANS 10162-1:2011."""
