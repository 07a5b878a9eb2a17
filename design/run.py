"""The whole pipeline on one page: whoever reads `design` knows the program.

Project > Truss > load cases > bar forces by case > by combination -.
             '---> buckling lengths (restraint graph) --------------+-> sizing > Design
  catalogue > candidate sections, turned into the truss's axes -----'
"""

from __future__ import annotations

from dataclasses import replace

import numpy as np

from spanwright.design.analysis import Analysis, largest_difference
from spanwright.design.certificate import next_lighter
from spanwright.design.demand import of_bars
from spanwright.design.groups import form_groups, sections_for
from spanwright.design.lightening import lightened
from spanwright.design.missing import if_missing
from spanwright.design.pieces import pieces_of
from spanwright.design.project import Project
from spanwright.design.reactions import bearing_forces
from spanwright.design.registry import standard_named
from spanwright.design.result import Design
from spanwright.design.serviceability import serviceability
from spanwright.design.setting import Setting, demand_of
from spanwright.design.sizing import Choice, choose, fitting
from spanwright.design.standard import Demand
from spanwright.design.stiffening import stiffened
from spanwright.design.warnings import warnings_of
from spanwright.loads.cases import loads_on
from spanwright.loads.combinations import combine
from spanwright.truss.errors import InputError
from spanwright.truss.forms import build_form, settle_panels
from spanwright.truss.given import build_given
from spanwright.truss.inputs import GivenInput
from spanwright.truss.lengths import buckling_lengths
from spanwright.truss.model import Truss
from spanwright.truss.restraint import held_points, restrain
from spanwright.truss.restraint_forces import anchor_force, restraint_forces


def design(project: Project) -> Design:
    """Design a truss: choose a section for every group that names a family, check those that name a section.

    Raises SpanwrightError where the project cannot be built, is a mechanism or leaves a chord end unheld.
    A truss for which no section passes is no error: see `Design.passes`.
    """
    setting = prepare(project)
    floors = [0] * len(setting.groups)
    while True:  # upwards: a group never returns to a lighter section, so the loop ends
        analysis, wanted, choices = size(setting, floors)
        chosen = [choice.index for choice in choices]
        heavier = stiffened(setting, analysis, choices) if chosen == floors else chosen
        if heavier is None:
            break
        floors = heavier
    return finish(setting, *lightened(setting, (analysis, wanted, choices)))


def check(project: Project) -> Design:
    """Check a truss whose groups all name a section; InputError where one names a family."""
    for group in prepare(project).groups:
        if group.sized:
            raise InputError(
                f'"{group.wanted}" is a family, and check takes given sections',
                f'name a section, such as "{group.wanted} ...", or let `design` choose',
                group.key,
            )
    return design(project)


def prepare(project: Project) -> Setting:
    """Build the truss, what holds it and what acts on it, and gather the candidate sections."""
    truss = build_truss(project)
    restraint = restrain(truss, project.restraint)
    load_set = loads_on(
        truss,
        restraint.lines,
        project.loads,
        project.site,
        project.actions,
        spacing=project.spacing,
        tributary=project.tributary,
    )
    if load_set.site is not None:
        project = replace(project, loads=load_set.site.loads, tributary=load_set.site.tributary)
    groups = form_groups(truss, project)
    return Setting(
        project=project,
        standard=standard_named(project.standard),
        truss=truss,
        restraint=restraint,
        lengths=buckling_lengths(truss, restraint, project.restraint),
        load_set=load_set,
        combinations=combine(load_set.cases, project.actions, project.site),
        groups=groups,
        options=tuple(sections_for(group, project.members) for group in groups),
    )


def build_truss(project: Project) -> Truss:
    """Build the truss that a project states: a form, or joints and bars."""
    if isinstance(project.truss, GivenInput):
        return build_given(project.truss)
    return build_form(settle_panels(project.truss, project.restraint.purlins), project.supports)


def size(setting: Setting, floors: list[int]) -> tuple[Analysis, Demand, tuple[Choice, ...]]:
    """Analyse with the sections at `floors` and choose from there on; webs must fit the chords they meet."""
    analysis, wanted = demand_of(setting, floors)
    chords = [
        options.take([floor])
        for group, options, floor in zip(setting.groups, setting.options, floors, strict=True)
        if "chord" in group.role
    ]
    choices = tuple(
        choose(
            group,
            options,
            setting.standard,
            of_bars(wanted, group.bars),
            floor=floor,
            joinable=None if "chord" in group.role else fitting(options, chords),
        )
        for group, options, floor in zip(setting.groups, setting.options, floors, strict=True)
    )
    return analysis, wanted, choices


def finish(setting: Setting, analysis: Analysis, wanted: Demand, choices: tuple[Choice, ...]) -> Design:
    """Add to a sized truss what its users ask next: certificates, deflection, restraint, bearings, pieces."""
    truss, project = setting.truss, setting.project
    compression = np.maximum(-wanted.axial, 0.0)
    share, beta = setting.standard.restraint_share, setting.standard.restraint_beta
    found = Design(
        setting=setting,
        analysis=analysis,
        demand=wanted,
        choices=choices,
        next_lighter=next_lighter(setting, choices),
        serviceability=serviceability(truss, project.deflection, analysis),
        missing=if_missing(setting, wanted, choices),
        held=held_points(truss, setting.restraint),
        restraint_forces=restraint_forces(truss, setting.restraint, compression, share, beta),
        anchor=anchor_force(truss, setting.restraint, compression, share, project.quantity),
        bearing_forces=bearing_forces(truss, analysis),
        second_difference=largest_difference(truss, analysis),
        pieces=pieces_of(setting, wanted, choices),
        warnings=(),
    )
    return replace(found, warnings=warnings_of(found))
