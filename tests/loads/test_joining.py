"""Loads at joints: which cases they join or make, what counts where it helps, and what accompanies what."""

from __future__ import annotations

import math

import pytest

from spanwright.loads.case import Case
from spanwright.loads.cases import LoadSet, load_cases
from spanwright.loads.combinations import combine
from spanwright.loads.inputs import JointLoad, LoadsInput, MostLeast, WindInput
from spanwright.truss.errors import InputError
from spanwright.truss.forms import build_form
from spanwright.truss.inputs import FormInput, RestraintInput
from spanwright.truss.purlins import lay_purlins

TRUSS = build_form(FormInput("Howe", 8000.0, math.atan2(3.0, 4.0), panels=4))
LINES = lay_purlins(TRUSS, RestraintInput("at joints", "all", "roof bracing", True))
WIND = (WindInput("gale", -0.8e-3, -0.5e-3),)


def loaded(*at_joint: JointLoad, imposed: float = 0.3e-3, man: float = 0.0) -> LoadSet:
    return load_cases(
        TRUSS, LINES, LoadsInput(MostLeast(0.2e-3, 0.1e-3), imposed, WIND, man_load=man, at_joint=at_joint), 5e3
    )


def added(name: str, joint: str, *at_joint: JointLoad) -> list[float]:
    """Return what loads at joints add to a case at a joint, kN to the right and up."""
    before, after = (
        next(case for case in found.cases if case.name == name).joint_loads[TRUSS.joint(joint)]
        for found in (loaded(), loaded(*at_joint))
    )
    return [round(float(force), 9) for force in (after - before) / 1e3]


def case(name: str, *at_joint: JointLoad) -> Case:
    return next(case for case in loaded(*at_joint).cases if case.name == name)


def refused(*at_joint: JointLoad) -> InputError:
    with pytest.raises(InputError) as caught:
        loaded(*at_joint)
    assert caught.value.key == "loads.at_joint"
    return caught.value


# Permanent


def test_a_permanent_load_at_a_joint_does_not_help_against_uplift_unless_stated() -> None:
    """Reviewed: 8 kN of plant held a roof down under suction. Services count as nothing where they help (practice)."""
    plant = JointLoad("plant", "permanent", "B2", down=8e3)
    assert added("most", "B2", plant) == [0.0, -8.0]
    assert added("least", "B2", plant) == [0.0, 0.0]
    assert case("most", plant).derivation[-1] == "plant: 8.000 kN down at B2"
    assert case("least", plant).derivation[-1] == "plant at B2: nothing in least, as it may be away where it would help"
    assert [one.name for one in loaded(plant).cases] == [one.name for one in loaded().cases]


def test_a_permanent_load_counts_in_least_with_its_least_value() -> None:
    plant = JointLoad("plant", "permanent", "B2", down=8e3, right=1e3, least_down=5e3)
    assert added("most", "B2", plant) == [1.0, -8.0]
    assert added("least", "B2", plant) == [0.0, -5.0]
    sideways = JointLoad("pull", "permanent", "B2", right=1e3, least_right=-0.5e3)
    assert added("least", "B2", sideways) == [-0.5, 0.0]


def test_a_permanent_load_that_lifts_counts_in_least_alone() -> None:
    """In "most" it would help the roof against what presses it down."""
    rope = JointLoad("rope", "permanent", "B2", down=-2e3)
    assert added("most", "B2", rope) == [0.0, 0.0]
    assert added("least", "B2", rope) == [0.0, 2.0]


def test_a_permanent_load_that_names_a_set_joins_that_one_whole() -> None:
    for name, other in (("most", "least"), ("least", "most")):
        plant = JointLoad(name, "permanent", "B2", down=5e3)
        assert added(name, "B2", plant) == [0.0, -5.0]
        assert added(other, "B2", plant) == [0.0, 0.0]
    assert '"most" alone' in refused(JointLoad("most", "permanent", "B2", down=5e3, least_down=1e3)).found


def test_a_least_value_above_the_most_is_refused() -> None:
    assert (
        "is more than the most, 5 kN" in refused(JointLoad("plant", "permanent", "B2", down=5e3, least_down=6e3)).found
    )


# Imposed


def test_an_imposed_load_at_a_joint_joins_the_halves_of_the_roof_that_it_lies_on() -> None:
    """Reviewed: what joined "imposed" was missing from its halves. At mid-span it lies on both."""
    for joint, sides in (("B1", ["left"]), ("B2", ["left", "right"]), ("T2", ["left", "right"]), ("T3", ["right"])):
        pipe = JointLoad("imposed", "imposed", joint, down=4e3)
        assert added("imposed", joint, pipe) == [0.0, -4.0]
        for side in ("left", "right"):
            assert added(f"imposed {side}", joint, pipe) == ([0.0, -4.0] if side in sides else [0.0, 0.0])
    assert added("imposed", "B1", JointLoad("imposed left", "imposed", "B1", down=4e3)) == [0.0, 0.0]


def test_a_load_called_imposed_without_imposed_load_on_the_roof_is_a_case_of_its_own() -> None:
    found = loaded(JointLoad("imposed", "imposed", "B1", down=4e3), imposed=0.0)
    assert [(one.name, one.psi) for one in found.cases if one.kind == "imposed"] == [("imposed", 1.0)]


def test_a_hoist_accompanies_what_else_acts() -> None:
    """Reviewed: it led alone, and never stood beside imposed load, a man or wind. 1.6 x 0.3 = 0.48."""
    hoist = JointLoad("hoist", "imposed", "B2", down=5e3, psi=0.3)
    printed = {one.name for one in combine(loaded(hoist, man=0.9e3).cases, "SANS 10160:2011")}
    assert printed >= {
        "1.2 most + 1.6 hoist",
        "1.2 most + 1.6 imposed",
        "1.2 most + 1.6 imposed + 0.48 hoist",
        "0.9 least + 1.6 imposed left + 0.48 hoist",
        "1.2 most + 1.6 man at T1 + 0.48 hoist",
        "0.9 least + 1.3 gale",
        "0.9 least + 1.3 gale + 0.48 hoist",
        "1.35 most + 1.0 gale mirrored + 0.3 hoist",
        "EQU: 0.9 least + 1.3 gale + 0.48 hoist",
        "1.1 most + 1.0 imposed + 0.3 hoist",
        "1.0 least + 0.6 gale + 0.3 hoist",
        "0.6 gale + 0.3 hoist",
    }
    assert case("hoist", hoist).derivation[0] == "hoist accompanies other variable loads with psi = 0.3 (stated)"


def test_psi_left_out_is_1_and_said() -> None:
    hoist = JointLoad("hoist", "imposed", "B2", down=5e3)
    assert case("hoist", hoist).psi == 1.0
    assert "psi = 1 (not stated: in full)" in case("hoist", hoist).derivation[0]
    assert "1.2 most + 1.6 imposed + 1.6 hoist" in {one.name for one in combine(loaded(hoist).cases, "SANS 10160:2019")}


@pytest.mark.parametrize(
    "unfit",
    [
        JointLoad("plant", "permanent", "B2", down=5e3, psi=0.5),
        JointLoad("gale", "wind", "B2", down=5e3, psi=0.5),
        JointLoad("imposed", "imposed", "B2", down=5e3, psi=0.5),
    ],
)
def test_a_psi_that_fits_no_case_is_refused(unfit: JointLoad) -> None:
    assert "psi is stated" in refused(unfit).found


def test_two_loads_of_a_case_have_one_psi() -> None:
    first, second = (
        JointLoad("hoist", "imposed", "B1", down=1e3, psi=0.5),
        JointLoad("hoist", "imposed", "B2", down=1e3),
    )
    assert "psi 0.5 and 1" in refused(first, second).found
    assert case("hoist", first, JointLoad("hoist", "imposed", "B2", down=1e3, psi=0.5)).psi == 0.5
