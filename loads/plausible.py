"""What is unusual in the loads that a user states (usual_loads.csv), in sentences with numbers."""

from __future__ import annotations

from collections.abc import Iterator

from spanwright.loads import derivation as say
from spanwright.loads.inputs import LoadsInput
from spanwright.loads.tables import read_table


def unusual_loads(loads: LoadsInput, derived: frozenset[str], *, wind_acts: bool) -> tuple[str, ...]:
    """Return a sentence for each stated load outside its usual range, and one where no wind acts.

    derived : keys of [loads] that were found from the site, which are not judged. wind_acts : in any load case.
    """
    stated = {
        "roof_imposed": loads.roof_imposed,
        "roof_permanent": loads.roof_permanent.most,
        "ceiling_permanent": loads.ceiling_permanent.most,
    }
    sentences = [
        sentence
        for key, pressure in stated.items()
        if key not in derived
        for sentence in _judged(key, f"{key} is {say.kilopascals(pressure)}", pressure)
    ]
    for wind in loads.wind:
        pressure = max(abs(wind.left), abs(wind.right))
        sentences += _judged("wind", f'wind case "{wind.name}" has a pressure of {say.kilopascals(pressure)}', pressure)
    if not wind_acts:
        sentences.append(
            "no wind acts on this roof: uplift decides many light roofs; state the wind unless none can act"
        )
    return tuple(sentences)


def _judged(quantity: str, is_so: str, pressure: float) -> Iterator[str]:
    (row,) = [row for row in read_table("usual_loads.csv") if row["quantity"] == quantity]
    value = round(pressure * 1e3, 6)
    for side, limit in (("less", row["least"]), ("more", row["most"])):
        if limit and (value < float(limit) if side == "less" else value > float(limit)):
            yield f"{is_so}, {side} than the usual {float(limit):g} kPa ({row['source']}, {row['mark']}): check it"
