"""Wind speeds of other return periods than 50 years: one formula of EN 1991-1-4 cl. 4.2 and SANS 10160-3 cl. 7.2."""

from __future__ import annotations

import math

REFERENCE = 50.0
"""Years between exceedances of a basic wind speed."""


def return_period_factor(years: float, shape: float, exponent: float) -> float:
    """Return cprob, the factor on the basic wind speed: 1 for 50 years.

    shape : K of the distribution of yearly extremes. exponent : n.
    """

    def reduced(period: float) -> float:
        return 1.0 - shape * math.log(-math.log(1.0 - 1.0 / period))

    return math.pow(reduced(years) / reduced(REFERENCE), exponent)


def return_period_formula(shape: float, exponent: float) -> str:
    """Return the formula as printed, with T for the return period in years."""
    base = f"(1 - {shape:g}*log(-log(1 - 1/T)))/(1 - {shape:g}*log(-log({1 - 1 / REFERENCE:g})))"
    return f"({base})**{exponent:g}"
