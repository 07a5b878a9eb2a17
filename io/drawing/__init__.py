"""drawing.dxf and drawing.pdf: the truss as a drawing office would draw it."""
