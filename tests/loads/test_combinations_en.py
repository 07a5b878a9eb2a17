"""Combinations of EN 1990, by expression 6.10 and by 6.10a and 6.10b."""

from __future__ import annotations

from itertools import chain, product

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st

from spanwright.loads.cases import Case, CaseKind
from spanwright.loads.combinations import (
    ACTIONS,
    Combination,
    combination_cautions,
    combination_factors,
    combine,
    factor_matrix,
)
from spanwright.loads.site_inputs import SiteInput
from spanwright.truss.errors import InputError, UnknownNameError

ONE, TWO = "EN 1990:2002, 6.10", "EN 1990:2002, 6.10a and 6.10b"
NOTHING = np.zeros((2, 2))
KINDS: dict[str, CaseKind] = {
    "most": "permanent",
    "least": "permanent",
    "imposed": "imposed",
    "imposed left": "imposed",
    "man": "man",
    "snow": "snow",
    "drift": "snow",
    "big fall": "exceptional snow",
    "gale": "wind",
    "storm": "wind",
}
CASES = tuple(Case(name, kind, NOTHING, np.zeros(0)) for name, kind in KINDS.items())
SNOW, WIND, IMPOSED = ("snow", "drift"), ("gale", "storm"), ("imposed", "imposed left", "man")


def site(altitude: float = 0.0, national: str = "") -> SiteInput:
    return SiteInput(40e3, 6e3, altitude=altitude, national=national)


def names(combinations: tuple[Combination, ...], *limit_states: str) -> set[str]:
    return {one.name for one in combinations if one.limit_state in limit_states}


def sums(permanent: str, *factors: tuple[str, tuple[str, ...]]) -> set[str]:
    """Return the names of a row: every way to take one case of each kind."""
    choices = [[f"{factor} {case}" for case in cases] for factor, cases in factors]
    return {" + ".join((permanent, *chosen)) for chosen in product(*choices)}


def full(permanent: str, snow: str = "0.75", wind: str = "0.9") -> set[str]:
    """Return permanent with each variable action leading, with and without those that accompany it."""
    return {permanent}.union(
        sums(permanent, ("1.5", IMPOSED)),
        sums(permanent, ("1.5", SNOW)),
        sums(permanent, ("1.5", WIND)),
        sums(permanent, ("1.5", SNOW), (wind, WIND)),
        sums(permanent, (snow, SNOW), ("1.5", WIND)),
    )


ACCIDENTAL = set(
    chain.from_iterable(
        sums(f"1.0 {g}", ("1.0", ("big fall",))) | sums(f"1.0 {g}", ("1.0", ("big fall",)), ("0.2", WIND))
        for g in ("most", "least")
    )
)


def test_every_row_of_6_10() -> None:
    """EN 1990 cl. 6.4.3.2 with Tables A1.1 and A1.2(B): gG 1.35 and 1.00, gQ 1.5, psi0 of snow 0.5 and wind 0.6, seen
    in Steel Buildings in Europe, Multi-Storey, Part 3: Actions pp. 4, 5; exceptional snow by 6.11b, psi1 from memory.
    """
    combinations = combine(CASES, ONE)
    assert names(combinations, "STR") == full("1.35 most") | full("1.0 least") | ACCIDENTAL
    assert names(combinations, "EQU") == sums("0.9 least", ("1.5", WIND))


def test_every_row_of_6_10a_and_6_10b() -> None:
    """EN 1990 cl. 6.4.3.2, xi = 0.85, seen as above; 0.85 x 1.35 = 1.1475."""
    combinations = combine(CASES, TWO)
    first = {"1.35 most"}.union(
        sums("1.35 most", ("0.75", SNOW)),
        sums("1.35 most", ("0.9", WIND)),
        sums("1.35 most", ("0.75", SNOW), ("0.9", WIND)),
    )
    second = full("1.1475 most") - {"1.1475 most"}  # alone it lies within 1.35 most and 1.0 least
    assert names(combinations, "STR") == first | second | full("1.0 least") | ACCIDENTAL


def test_serviceability() -> None:
    """EN 1990 cl. 6.5.3: characteristic G + S + 0.6W and G + W + 0.5S, seen in Steel Buildings in Europe,
    Single-Storey, Part 3: Actions p. 6; quasi-permanent G, from memory.
    """
    imposed = IMPOSED[:2]
    combinations = combine(CASES, ONE)
    assert names(combinations, "SLS") == set().union(
        sums("1.0 most", ("1.0", imposed)),
        sums("1.0 most", ("1.0", SNOW)),
        sums("1.0 most", ("1.0", WIND)),
        sums("1.0 least", ("1.0", WIND)),
        sums("1.0 most", ("1.0", SNOW), ("0.6", WIND)),
        sums("1.0 most", ("0.5", SNOW), ("1.0", WIND)),
    )
    alone = {f"1.0 {case}" for case in (*imposed, *SNOW, *WIND)}
    together = {f"1.0 {s} + 0.6 {w}" for s in SNOW for w in WIND} | {f"0.5 {s} + 1.0 {w}" for s in SNOW for w in WIND}
    assert names(combinations, "SLS variable") == alone | together
    assert names(combinations, "SLS quasi-permanent") == {"1.0 most"}


def test_above_1000_m_snow_lasts_longer() -> None:
    """EN 1990 Table A1.1: psi0 0.7 and psi2 0.2 above 1000 m, from memory."""
    combinations = combine(CASES, ONE, site(1000.1e3))
    assert full("1.35 most", snow="1.05") <= names(combinations, "STR")
    assert names(combinations, "SLS quasi-permanent") == {"1.0 most", "1.0 most + 0.2 snow", "1.0 most + 0.2 drift"}
    assert combine(CASES, ONE, site(1000e3)) == combine(CASES, ONE) == combine(CASES, ONE, site(0.0, "recommended"))


@pytest.mark.parametrize("nation", ["Finland", "Iceland", "Norway", "Sweden"])
def test_in_the_north_snow_lasts_at_every_altitude(nation: str) -> None:
    """EN 1990 Table A1.1, from memory."""
    high = combine(CASES, TWO, site(1200e3))
    assert combine(CASES, TWO, site(0.0, nation)) == combine(CASES, TWO, site(1200e3, nation)) == high


def test_the_united_kingdom() -> None:
    """UK annex to EN 1990, from memory: xi 0.925, psi0 of wind 0.5 and of imposed load on roofs 0.7."""
    strength = names(combine(CASES, TWO, site(0.0, "United Kingdom")), "STR")
    assert "1.24875 most + 1.5 snow + 0.75 gale" in strength
    assert "1.35 most + 1.05 imposed" in strength
    assert not any("0.9 " in name for name in strength)


@pytest.mark.parametrize("actions", [ONE, TWO])
def test_imposed_never_meets_snow_or_wind(actions: str) -> None:
    """EN 1991-1-1 cl. 3.3.2 for category H, from memory."""
    for combination in combine(CASES, actions):
        kinds = {KINDS[name] for name, _ in combination.factors} - {"permanent"}
        assert len(kinds) == 1 or kinds <= {"snow", "wind"} or kinds == {"exceptional snow", "wind"} or not kinds
        assert len(kinds) + 1 >= len(combination.factors)


HOIST = Case("hoist", "imposed", NOTHING, np.zeros(0), psi=0.7)


@pytest.mark.parametrize(("actions", "heavy"), [(ONE, "1.35"), (TWO, "1.1475")])
def test_a_hoist_leads_and_accompanies(actions: str, heavy: str) -> None:
    """EN 1990 cl. 6.4.3.2 and 6.5.3 with a variable action that is no load of category H, its psi0 0.7: 1.5 x 0.7."""
    combinations = combine((*CASES, HOIST), actions)
    for permanent in (f"{heavy} most", "1.0 least"):
        assert names(combinations, "STR") >= set().union(
            sums(permanent, ("1.5", (*IMPOSED, *SNOW, *WIND)), ("1.05", ("hoist",))),
            sums(permanent, ("1.5", SNOW), ("0.9", WIND), ("1.05", ("hoist",))),
            sums(permanent, ("0.75", SNOW), ("1.5", WIND), ("1.05", ("hoist",))),
            sums(permanent, ("0.75", SNOW), ("1.5", ("hoist",))),
            sums(permanent, ("0.9", WIND), ("1.5", ("hoist",))),
            sums(permanent, ("0.75", SNOW), ("0.9", WIND), ("1.5", ("hoist",))),
            sums(permanent, ("1.5", ("hoist",))),
        )
    assert names(combinations, "EQU") == sums("0.9 least", ("1.5", WIND)) | sums(
        "0.9 least", ("1.5", WIND), ("1.05", ("hoist",))
    )
    assert {"1.0 most + 0.6 gale + 1.0 hoist", "1.0 most + 1.0 imposed + 0.7 hoist"} <= names(combinations, "SLS")
    assert {"0.5 snow + 1.0 hoist", "1.0 gale + 0.7 hoist"} <= names(combinations, "SLS variable")
    assert {one.name for one in combine(CASES, actions)} < {one.name for one in combinations}


def test_in_6_10a_a_hoist_accompanies_permanent_load_alone() -> None:
    strength = names(combine((*CASES, HOIST), TWO), "STR")
    assert {"1.35 most + 1.05 hoist", "1.35 most + 0.75 snow + 0.9 gale + 1.05 hoist"} <= strength
    assert "1.35 most + 1.5 hoist" not in strength


def test_imposed_load_with_a_psi0_accompanies_a_hoist() -> None:
    """UK annex to EN 1990, from memory: psi0 of imposed load on roofs 0.7."""
    strength = names(combine((*CASES, HOIST), ONE, site(0.0, "United Kingdom")), "STR")
    assert {"1.35 most + 1.05 imposed + 1.5 hoist", "1.35 most + 1.05 man + 1.5 hoist"} <= strength


def _by_hand(effect: dict[str, float], actions: str) -> float:
    """Return the greatest effect by EN 1990 6.10 or the worse of 6.10a and 6.10b, over every subset of actions that may
    act together, each at 1.5 or 1.5 psi0, and over both permanent sets.
    """
    psi = {"imposed": 0.0, "man": 0.0, "snow": 0.5, "wind": 0.6}
    alone = [(case,) for case in (*IMPOSED, *SNOW, *WIND)]
    together: list[tuple[str, ...]] = [(), *alone, *product(SNOW, WIND)]
    heavy = {"1": (1.35, None), "a": (1.35, psi), "b": (0.85 * 1.35, None)}
    worst = -np.inf
    for acting in together:
        for which in "1" if actions == ONE else "ab":
            factor, all_accompany = heavy[which]
            for leading in acting or (None,):
                variable = sum(
                    1.5 * effect[case] * (1.0 if case == leading and all_accompany is None else psi[KINDS[case]])
                    for case in acting
                )
                worst = max(worst, factor * effect["most"] + variable, effect["least"] + variable)
    return float(worst)


@pytest.mark.parametrize("actions", [ONE, TWO])
@given(data=st.data())
def test_the_envelope_is_the_greatest_by_hand(actions: str, data: st.DataObject) -> None:
    """Signs are per member: what helps one presses another; "least" lies between nothing and "most"."""
    effect = {name: data.draw(st.integers(-50, 50)) / 10 for name in KINDS if name != "least"}
    effect["least"] = data.draw(st.integers(0, 10)) / 10 * effect["most"]
    cases = tuple(case for case in CASES if case.kind != "exceptional snow")
    combinations = tuple(one for one in combine(cases, actions) if one.limit_state == "STR")
    effects = np.array([effect[case.name] for case in cases]) @ factor_matrix(combinations, cases)
    assert effects.max() == pytest.approx(_by_hand(effect, actions))


@pytest.mark.parametrize("actions", [name for name in ACTIONS if name.startswith("SANS")])
def test_snow_that_a_standard_does_not_combine_is_refused(actions: str) -> None:
    with pytest.raises(InputError, match='no combination with snow, of which "snow" is a case') as caught:
        combine(CASES, actions)
    assert caught.value.key == "actions"


def test_factors_are_explained() -> None:
    found = {step.symbol: step for step in combination_factors(TWO, site(1200e3))}
    assert found["psi0_snow"].value == 0.7
    assert found["psi0_snow"].mark == "from memory"
    assert found["xi"].clause == "EN 1990 Table A1.2(B)"
    assert combination_factors("SANS 10160:2011") == ()


@pytest.mark.parametrize("actions", ACTIONS)
def test_what_is_from_memory_is_named(actions: str) -> None:
    assert "combinations for SLS" in combination_cautions(CASES, actions)[0]
    assert "snow above 1000 m" in combination_cautions(CASES, ONE, site(1200e3))[0]
    assert "values of Finland known here" in combination_cautions(CASES, ONE, site(0.0, "Finland"))[1]


def test_what_no_case_makes_use_of_is_not_named() -> None:
    calm = tuple(case for case in CASES if "snow" not in case.kind)
    assert "snow" not in "".join(combination_cautions(calm, ONE, site(1200e3)))
    assert "STR" not in "".join(combination_cautions(calm, ONE))
    assert "combinations for STR" in combination_cautions(CASES, ONE)[0]  # 6.11b of exceptional snow


def test_unknown_nations_are_refused() -> None:
    with pytest.raises(UnknownNameError, match="Sweden"):
        combine(CASES, ONE, site(0.0, "Sweeden"))
