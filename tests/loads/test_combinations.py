import numpy as np
import pytest

from spanwright.loads.cases import Case, CaseKind
from spanwright.loads.combinations import ACTIONS, Combination, combine, factor_matrix
from spanwright.truss.errors import InputError, UnknownNameError

NOTHING = np.zeros((2, 2))
KINDS: dict[str, CaseKind] = {
    "most": "permanent",
    "least": "permanent",
    "imposed": "imposed",
    "imposed left": "imposed",
    "hoist": "imposed",
    "man at T1": "man",
    "gale": "wind",
    "gale mirrored": "wind",
}
CASES = tuple(Case(name, kind, NOTHING, np.zeros(0)) for name, kind in KINDS.items())


def names(combinations: tuple[Combination, ...], *limit_states: str) -> set[str]:
    return {combination.name for combination in combinations if combination.limit_state in limit_states}


def test_every_row_of_the_2011_table_with_every_case() -> None:
    """SANS 10160-1:2011 by our rule sheet, section 1; from memory."""
    combinations = combine(CASES, "SANS 10160:2011")
    variable = ["imposed", "imposed left", "hoist", "man at T1"]
    wind = ["gale", "gale mirrored"]
    strength = {f"{g} + 1.6 {q}" for g in ("1.2 most", "0.9 least") for q in variable}
    strength |= {f"{g} + 1.3 {w}" for g in ("1.2 most", "0.9 least") for w in wind}
    assert names(combinations, "STR") == strength
    assert names(combinations, "STR-P") == {"1.35 most"} | {f"1.35 most + 1.0 {q}" for q in variable + wind}
    assert names(combinations, "EQU") == {f"EQU: 0.9 least + 1.3 {w}" for w in wind}
    serviceability = {f"1.1 most + 1.0 {q}" for q in variable[:3]}
    serviceability |= {f"{g} + 0.6 {w}" for g in ("1.1 most", "1.0 least") for w in wind}
    assert names(combinations, "SLS") == serviceability
    assert names(combinations, "SLS variable") == {"1.0 imposed", "1.0 imposed left", "1.0 hoist"} | {
        f"0.6 {w}" for w in wind
    }


def test_the_2019_edition_has_the_greater_wind_factor() -> None:
    """Wind factor 1.6: recommended by Botha, Retief and Viljoen (J. SAICE 60(3), 2018); its adoption is from memory."""
    combinations = combine(CASES, "SANS 10160:2019")
    assert "0.9 least + 1.6 gale" in names(combinations, "STR")
    assert "EQU: 0.9 least + 1.6 gale" in names(combinations, "EQU")
    assert not any("1.3 " in combination.name for combination in combinations)


@pytest.mark.parametrize("actions", ACTIONS)
def test_names_are_unique_and_say_the_factors(actions: str) -> None:
    combinations = combine(CASES, actions)
    printed = [combination.name for combination in combinations]
    assert len(set(printed)) == len(printed)
    for combination in combinations:
        terms = combination.name.removeprefix("EQU: ").split(" + ")
        assert [(term.split(" ", 1)[1], float(term.split(" ", 1)[0])) for term in terms] == list(combination.factors)


@pytest.mark.parametrize("actions", ACTIONS)
def test_wind_and_imposed_never_meet(actions: str) -> None:
    for combination in combine(CASES, actions):
        kinds = [KINDS[name] for name, _ in combination.factors]
        assert len([kind for kind in kinds if kind != "permanent"]) <= 1
        assert kinds.count("permanent") <= 1


def test_without_variable_cases_only_the_permanent_one_is_left() -> None:
    assert [combination.name for combination in combine(CASES[:2], "SANS 10160:2011")] == ["1.35 most"]


def with_hoists(*psi: float) -> tuple[Case, ...]:
    return (*CASES, *(Case(f"lift {k}", "imposed", NOTHING, np.zeros(0), psi=value) for k, value in enumerate(psi)))


def test_every_subset_of_loads_at_joints_accompanies_what_leads() -> None:
    """Factor 1.6 (1.0 beside 1.35 of permanent load, and for service) times the psi of each; one leads with its own."""
    combinations = combine(with_hoists(0.5, 0.25), "SANS 10160:2019")
    strength, service = names(combinations, "STR"), names(combinations, "SLS")
    for permanent in ("1.2 most", "0.9 least"):
        for leading in ("1.6 imposed", "1.6 man at T1", "1.6 gale"):
            for some in ("", " + 0.8 lift 0", " + 0.4 lift 1", " + 0.8 lift 0 + 0.4 lift 1"):
                assert f"{permanent} + {leading}{some}" in strength
        assert f"{permanent} + 1.6 lift 0" in strength
        assert f"{permanent} + 1.6 lift 1 + 0.8 lift 0" in strength
    assert "1.35 most + 1.0 gale + 0.5 lift 0 + 0.25 lift 1" in names(combinations, "STR-P")
    assert {
        "1.1 most + 1.0 imposed + 0.25 lift 1",
        "1.1 most + 1.0 lift 0",
        "1.0 least + 0.6 gale + 0.5 lift 0",
    } <= service
    assert "1.0 imposed + 0.5 lift 0" in names(combinations, "SLS variable")
    bare = combine(CASES, "SANS 10160:2019")
    assert {combination.name for combination in bare} < {combination.name for combination in combinations}


def test_a_load_at_a_joint_with_psi_0_leads_alone() -> None:
    named = [one.name for one in combine(with_hoists(0.0), "SANS 10160:2011") if "lift" in one.name]
    assert "1.2 most + 1.6 lift 0" in named
    assert all(name.count("+") <= 1 for name in named)


def test_two_that_act_in_full_make_one_sum() -> None:
    strength = names(combine(with_hoists(1.0, 1.0), "SANS 10160:2011"), "STR")
    assert "1.2 most + 1.6 lift 0 + 1.6 lift 1" in strength
    assert "1.2 most + 1.6 lift 1 + 1.6 lift 0" not in strength


@pytest.mark.parametrize("actions", ACTIONS)
def test_more_loads_at_joints_than_can_be_told_are_refused(actions: str) -> None:
    combine(with_hoists(1.0, 1.0, 1.0, 1.0, 0.0), actions)
    with pytest.raises(InputError, match="5 imposed loads at joints") as caught:
        combine(with_hoists(1.0, 1.0, 1.0, 1.0, 0.5), actions)
    assert caught.value.key == "loads.at_joint"


def test_a_case_named_like_a_kind_is_taken_by_its_kind() -> None:
    cases = (*CASES[:2], Case("wind", "imposed", NOTHING, np.zeros(0)))
    assert "1.2 most + 1.6 wind" in names(combine(cases, "SANS 10160:2011"), "STR")
    assert "1.2 most + 1.3 wind" not in names(combine(cases, "SANS 10160:2011"), "STR")


def test_factor_matrix() -> None:
    combinations = combine(CASES, "SANS 10160:2011")
    matrix = factor_matrix(combinations, CASES)
    assert matrix.shape == (len(CASES), len(combinations))
    column = [combination.name for combination in combinations].index("0.9 least + 1.3 gale")
    assert matrix[:, column].tolist() == [0, 0.9, 0, 0, 0, 0, 1.3, 0]


def test_unknown_standard_names_the_nearest() -> None:
    with pytest.raises(UnknownNameError) as caught:
        combine(CASES, "SANS 10160:2018")
    assert caught.value.key == "actions"
    assert caught.value.nearest in ACTIONS
