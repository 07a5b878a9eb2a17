"""Turns rules into checks: ratios over (sections, bars), with the combination that governs."""

from __future__ import annotations

import numpy as np

from spanwright.design.sans.effects import Worst
from spanwright.design.standard import Check
from spanwright.design.steps import Rule
from spanwright.truss.arrays import BoolArray, FloatArray, IntArray


def strength_check(
    name: str,
    clause: str,
    worst: Worst,
    resistance: FloatArray,
    rules: tuple[Rule, ...],
    shape: tuple[int, int],
    applies: BoolArray | None = None,
) -> Check:
    """Return the check of a force against a resistance, both in N; `applies` (s, b) masks where it arises."""
    resistance = np.broadcast_to(resistance, shape) * worst.share
    force = np.broadcast_to(worst.force, shape)
    combination = np.broadcast_to(worst.combination, shape)
    if applies is not None:
        force = np.where(applies, force, 0.0)
        combination = np.where(applies, combination, -1)
    return Check(name, clause, "strength", force / resistance, combination, force, resistance, "N", rules)


def sum_check(
    name: str, clause: str, ratio: FloatArray, combination: IntArray, rules: tuple[Rule, ...], shape: tuple[int, int]
) -> Check:
    """Return the check of an interaction sum against 1."""
    ratio = np.broadcast_to(ratio, shape)
    combination = np.broadcast_to(combination, shape)
    return Check(name, clause, "strength", ratio, combination, ratio, np.broadcast_to(1.0, shape), "-", rules)


def limit_check(
    name: str,
    clause: str,
    value: FloatArray,
    limit: FloatArray | float,
    rules: tuple[Rule, ...],
    shape: tuple[int, int],
    applies: BoolArray | None = None,
    unit: str = "-",
) -> Check:
    """Return the check of a value, such as a slenderness, against its limit, both in `unit`.

    applies : (s, b) or (b,), masks where it arises.
    """
    value = np.broadcast_to(value, shape)
    if applies is not None:
        value = np.where(applies, value, 0.0)
    limit = np.broadcast_to(limit, shape)
    return Check(name, clause, "limit", value / limit, np.full(shape, -1), value, limit, unit, rules)
