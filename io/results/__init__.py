"""results.json: everything a machine may want of a design, with units in the key names."""
