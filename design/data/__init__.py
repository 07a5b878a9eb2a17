"""Section dimensions, steels and factors, each file with its source and confidence mark."""
