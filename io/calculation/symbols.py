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
    "lam": "lambda",
    "fy": 'f_"y"',
    "fu": 'f_"u"',
    "KL": "K L",
    "KL_r": "(K L slash r)",
    "L_ra": '(L slash r_"a")',
    "a_r": '(a slash r_"1")',
    "lam_1": 'lambda_"1"',
    "r_02": "overline(r)_0^2",
    "cos2": "cos 2 alpha",
    "c": "cos alpha",
    "s": "sin alpha",
}
"""Symbols that do not follow from their spelling; `symbol` makes the others."""

BRACED = {"r_02", "cos2", "c", "s"}
"""Symbols that need brackets where something is raised or multiplied onto them."""


def symbol(name: str) -> str:
    """Return a rule's symbol ("f_ey") as mathematics: one letter or Greek name, an upright subscript, else a word."""
    if name in TABLE:
        return TABLE[name]
    head, _, tail = name.partition("_")
    if not (len(head) == 1 or head in GREEK or head in TABLE):
        return _upright(name.replace("_", " "))
    base = TABLE.get(head, head)
    return f"{base}_{_upright(tail)}" if tail else base


def _upright(word: str) -> str:
    return f'"{word}"'


UNITS = {"-": "", "mm2": "mm²", "mm3": "mm³", "mm4": "mm⁴", "mm6": "mm⁶", "1/mm3": "1/mm³"}
"""Units as they are printed, where that differs from how a rule spells them."""


def unit(name: str) -> str:
    """Return a rule's unit as it is printed."""
    return UNITS.get(name, name)
