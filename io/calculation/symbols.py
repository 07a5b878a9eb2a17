"""How the symbols of the rules look in print, in Typst's notation for mathematics."""

from __future__ import annotations

GREEK = {
    "alpha",
    "beta",
    "gamma",
    "delta",
    "epsilon",
    "theta",
    "kappa",
    "lambda",
    "mu",
    "rho",
    "sigma",
    "tau",
    "phi",
    "chi",
    "omega",
    "Omega",
}

TABLE = {
    "fy": 'f_"y"',
    "fu": 'f_"u"',
    "KL_r": "(K L slash r)",
    "L_ra": '(L slash r_"a")',
    "a_r": '(a slash r_"1")',
    "r_02": "overline(r)_0^2",
    "cos2": "cos 2 alpha",
    "c": "cos alpha",
    "s": "sin alpha",
}
"""Symbols that do not follow from their spelling; `symbol` makes the others."""

SITE = (
    *("vb", "vb0", "vm", "vp", "qp", "cr", "co", "cg", "cprob", "cpe", "cpi", "kr", "Iv", "zc", "zg", "z0", "zmin"),
    *("sk", "Ce", "Ct", "Cesl"),
)
"""Symbols of the loading standards that run a letter and its subscript together."""

BASES = {"KL": "K L", "lam": "lambda"}
"""What stands before a subscript, where it is neither one letter nor a Greek name."""

BRACED = {"KL", "KL_out", "r_02", "cos2", "c", "s"}
"""Symbols that need brackets where they are raised to a power."""


def symbol(name: str) -> str:
    """Return a rule's symbol ("f_ey") as mathematics: one letter or Greek name, an upright subscript, else a word."""
    if name in TABLE:
        return TABLE[name]
    if name in SITE:
        return f"{name[0]}_{_upright(name[1:])}"
    head, _, tail = name.partition("_")
    if not (len(head) == 1 or head in GREEK or head in BASES):
        return _upright(name.replace("_", " "))
    base = BASES.get(head, head)
    return f"{base}_{_upright(tail)}" if tail else base


def _upright(word: str) -> str:
    return f'"{word}"'


_POWERS = {"2": "²", "3": "³", "4": "⁴", "6": "⁶"}


def unit(name: str) -> str:
    """Return a unit ("mm2", "kg/m3"; "-" for none) as it is printed."""
    return "" if name == "-" else "".join(_POWERS.get(sign, sign) for sign in name)
