"""What acts on the truss: load cases as joint loads, and the combinations of each loading standard."""
