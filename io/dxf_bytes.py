"""A drawing as bytes that are the same in every run."""

from __future__ import annotations

import io
from collections.abc import Iterator
from contextlib import contextmanager

from ezdxf._options import options as library
from ezdxf.document import Drawing


@contextmanager
def fixed_marks() -> Iterator[None]:
    """Let ezdxf put no time of day and no chance numbers into the drawings it makes and writes."""
    before = library.write_fixed_meta_data_for_testing
    library.write_fixed_meta_data_for_testing = True
    try:
        yield
    finally:
        library.write_fixed_meta_data_for_testing = before


def dxf_bytes(doc: Drawing) -> bytes:
    """Return the file of a drawing; inside `fixed_marks` the same drawing gives the same bytes.

    The section of classes is put in order first: ezdxf fills it in the order of a set, which changes from run to run.
    """
    doc.classes.add_required_classes(doc.dxfversion)
    doc.classes.classes = dict(sorted(doc.classes.classes.items()))
    stream = io.StringIO()
    doc.write(stream)
    return stream.getvalue().encode(doc.output_encoding, errors="dxfreplace")
