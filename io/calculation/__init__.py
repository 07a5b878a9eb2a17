"""calculation.pdf: a document that a checking engineer can follow and sign."""
