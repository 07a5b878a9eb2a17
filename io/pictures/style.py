"""Sizes, greys and the scale of utilisation that both pictures share. Lengths in mm on paper, text sizes in points."""

from __future__ import annotations

from bisect import bisect_left
from dataclasses import dataclass

import numpy as np

from spanwright.truss.arrays import FloatArray

PAGE = (297.0, 210.0)
"""A4 landscape (ISO 216), mm."""

MARGIN = 10.0
"""Left free on all sides (ISO 5457), mm."""

DENOMINATORS = (
    5,
    10,
    20,
    25,
    30,
    40,
    50,
    60,
    75,
    80,
    100,
    125,
    150,
    200,
    250,
    300,
    400,
    500,
    600,
    750,
    1000,
    2000,
    5000,
)
"""Drawing scales 1:n: those of ISO 5455 and the steps between that are usual on structural drawings."""

INK = "#000000"
SOFT = "#505050"
FAINT = "#a8a8a8"
PALE = "#e4e4e4"
PAPER = "#ffffff"

# Line widths by ISO 128-2: thin 0.18 and 0.25, thick 0.35 and 0.5, mm.
HAIR = 0.18
THIN = 0.25
THICK = 0.35
BOLD = 0.5

TITLE = 14.0
HEADING = 9.0
BODY = 7.2
SMALL = 6.0
LEAST = 5.0
"""Sizes of letters; `LEAST` only where there is no room for larger ones."""

ROOMY = 20.0
"""mm on paper: where half of the bars are at least this long, members are drawn at full width."""

THINNEST = 0.5
"""Share of the full width below which no member is drawn."""


@dataclass(frozen=True)
class Pen:
    """How stout members and signs are drawn, all in mm; `factor` is 1, and less where bars stand close."""

    factor: float

    @property
    def strut(self) -> float:
        """Width of a member in compression: struts stout and ties slender, as in graphic statics."""
        return 2.2 * self.factor

    @property
    def tie(self) -> float:
        """Width of a member in tension."""
        return 1.0 * self.factor

    @property
    def casing(self) -> float:
        """Dark edge of a member on either side, so that pale bands show on white paper."""
        return max(0.28 * self.factor, HAIR)

    @property
    def joint(self) -> float:
        """Radius of a joint."""
        return 0.9 * self.factor

    @property
    def square(self) -> float:
        """Side of a purlin's square."""
        return max(2.2 * self.factor, 1.5)

    @property
    def balloon(self) -> float:
        """Radius of the disc with the letter of a group on the member that governs it."""
        return max(1.45 * self.factor, 1.25)

    @property
    def lift(self) -> float:
        """Distance of a purlin's foot from the centre line of the top chord."""
        return self.strut / 2.0 + self.casing


def pen_for(lengths: FloatArray) -> Pen:
    """Return the pen for bars of these lengths on paper, (b,) mm."""
    return Pen(float(np.clip(np.median(lengths) / ROOMY, THINNEST, 1.0)))


@dataclass(frozen=True)
class Band:
    """A band of utilisation: from the band before up to `most`, drawn in `colour`."""

    most: float
    colour: str
    words: str


BANDS = (
    Band(0.50, "#ffffcc", "to 0.50"),
    Band(0.70, "#a1dab4", "0.50 to 0.70"),
    Band(0.85, "#41b6c4", "0.70 to 0.85"),
    Band(0.95, "#2c7fb8", "0.85 to 0.95"),
    Band(1.00, "#253494", "0.95 to 1.00"),
)
"""From pale to dark, so that what is used little stays quiet, and the order holds in grey and for the colour-blind
(ColorBrewer YlGnBu, five classes, stated by its authors to be safe for both)."""

OVER = len(BANDS)
"""Index of "over 1.00", which is no colour: black with white bars across."""

_EDGES = tuple(band.most for band in BANDS)


def band_of(utilisation: float) -> int:
    """Return the index of the band that a utilisation lies in, compared unrounded; `OVER` beyond 1."""
    return bisect_left(_EDGES, utilisation)
