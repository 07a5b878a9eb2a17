"""Loads at joints: which load case each joins or makes.

Permanent loads at joints are what is fixed to the truss and may be taken away again, such as plant or a service pipe.
They join both permanent sets, "least" only with what is stated for it: services count as nothing where they help
(common practice). Imposed loads at joints, such as a hoist, make cases of their own that also accompany other variable
loads (see `combinations`), unless they name a case that is there.
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from spanwright.loads.bending import Part
from spanwright.loads.case import PERMANENT, Case, case_of
from spanwright.loads.inputs import JointLoad
from spanwright.loads.joint_loads import at_joint
from spanwright.loads.mirror import SUFFIX, mirrored_load
from spanwright.loads.roof import Roof
from spanwright.loads.strips import SIDES
from spanwright.truss.errors import InputError
from spanwright.truss.tolerances import TOLERANCES

KEY = "loads.at_joint"
IMPOSED = "imposed"
"""The case of the roof's whole imposed load; those of its halves add the side."""


def join(roof: Roof, cases: dict[str, Case], load: JointLoad) -> tuple[str, ...]:
    """Add a load at a joint to the cases it belongs to, or make its case; return warnings.

    Raises InputError for a kind that contradicts the named case's, for a psi that fits no case, and for a least value
    above the most; UnknownNameError for an unknown joint.
    """
    _refuse_unfit_psi(cases, load)
    if load.kind == "permanent":
        _join_permanent(roof, cases, load)
        return ()
    known = load.case in cases
    has_twin = load.kind == "wind" and roof.has_both_slopes and (not known or load.case + SUFFIX in cases)
    for name in (load.case, *_halves(roof, cases, load)):
        _join_one(cases, name, load, _part(roof, load))
    return _join_twin(roof, cases, load) if has_twin else ()


def _join_permanent(roof: Roof, cases: dict[str, Case], load: JointLoad) -> None:
    if load.case in cases:
        if (load.least_down, load.least_right) != (None, None):
            raise InputError(
                f'a load with a most and a least value joins "{load.case}" alone',
                "state one value, or give the load a case name of its own: it then joins both sets",
                KEY,
            )
        _join_one(cases, load.case, load, _part(roof, load))
        return
    if load.least_down is not None and load.least_down > load.down:
        raise InputError(
            f'the least value of "{load.case}", {load.least_down / 1e3:g} kN down, is more than the most, '
            f"{load.down / 1e3:g} kN",
            "state most and least the other way round",
            KEY,
        )
    for name, shown in zip(PERMANENT, _most_and_least(load), strict=True):
        part = _part(roof, shown)
        if not (shown.down or shown.right):
            text = f"{load.case} at {load.joint}: nothing in {name}, as it may be away where it would help"
            part = replace(part, derivation=(text,))
        _join_one(cases, name, load, part)


def _most_and_least(load: JointLoad) -> tuple[JointLoad, JointLoad]:
    """Return a permanent load as it counts in "most" and in "least"."""
    least = replace(load, down=load.least_down or 0.0, right=load.least_right or 0.0)
    if load.least_down is None and load.down < 0.0:  # it lifts: it would help in "most"
        return replace(load, down=0.0), replace(least, down=load.down)
    return load, least


def _halves(roof: Roof, cases: dict[str, Case], load: JointLoad) -> tuple[str, ...]:
    """Return the cases of the roof's halves that a load joins with the whole: by its joint, both where they meet."""
    if load.case != IMPOSED or load.kind != "imposed":
        return ()
    x, middle = float(roof.truss.xy[roof.truss.joint(load.joint, key=KEY), 0]), roof.strips.halves_meet
    within = (x <= middle + TOLERANCES.same_point, x >= middle - TOLERANCES.same_point)
    names = [f"{IMPOSED} {side}" for side, on_it in zip(SIDES, within, strict=True) if on_it]
    return tuple(name for name in names if name in cases)


def _join_twin(roof: Roof, cases: dict[str, Case], load: JointLoad) -> tuple[str, ...]:
    """Add the mirror image of a wind load to the mirrored case, or make that case; return warnings."""
    twin = mirrored_load(roof.truss, load)
    if twin is None:
        nothing = roof.beams.at_joints(np.zeros_like(roof.truss.xy), ())
        _join_one(cases, load.case + SUFFIX, load, nothing)
        return (f'the load at {load.joint} in wind case "{load.case}" has no mirror image: it acts in that case only',)
    _join_one(cases, twin.case, load, _part(roof, twin))
    return ()


def _join_one(cases: dict[str, Case], name: str, load: JointLoad, part: Part) -> None:
    known = cases.get(name)
    if known is None:
        cases[name] = _own_case(name, load, part)
        return
    if known.kind != load.kind:
        raise InputError(
            f'a load at a joint is stated as {load.kind} but joins case "{name}", which is {known.kind}',
            f'state kind = "{known.kind}", or give the load a case name of its own',
            KEY,
        )
    cases[name] = known.joined_by(part)


def _own_case(name: str, load: JointLoad, part: Part) -> Case:
    if load.kind != "imposed":
        return case_of(name, load.kind, part)
    stated = "stated" if load.psi is not None else "not stated: in full"
    text = f"{name} accompanies other variable loads with psi = {_psi(load):g} ({stated})"
    return case_of(name, load.kind, replace(part, derivation=(text, *part.derivation)), _psi(load))


def _psi(load: JointLoad) -> float:
    return 1.0 if load.psi is None else load.psi


def _refuse_unfit_psi(cases: dict[str, Case], load: JointLoad) -> None:
    known = cases.get(load.case)
    if known is not None and known.psi is not None and load.kind == "imposed" and known.psi != _psi(load):
        raise InputError(
            f'two loads of case "{load.case}" have psi {known.psi:g} and {_psi(load):g}; left out, it is 1',
            "state the same psi for both, or give them cases of their own",
            KEY,
        )
    if load.psi is not None and (load.kind != "imposed" or (known is not None and known.psi is None)):
        raise InputError(
            f'psi is stated for a {load.kind} load of case "{load.case}", where it has no meaning',
            "leave it out: it is for imposed loads with a case of their own, which may accompany other cases",
            KEY,
        )


def _part(roof: Roof, load: JointLoad) -> Part:
    return roof.beams.at_joints(*at_joint(roof.truss, load))
