"""Every tolerance of the program, with its meaning, unit and origin. No other module holds one."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Tolerances:
    """Tolerances, all positive.

    Lengths in mm, angles in rad; `relative` values are dimensionless.
    """

    pivot: float = 1e-10
    """Relative: a pivot of the factorised stiffness below this share of its diagonal is a mechanism.
    Rounding leaves about 1e-13 where few bars take part; the least stable simply supported truss tried (20 000 bars,
    one span) keeps 8e-5."""

    strainless: float = 1e-9
    """Relative: a motion that elongates no bar by more than this share of its largest displacement is a mechanism.
    Rounding leaves at most 2e-10 (20 000 bars); the most flexible sound truss tried (1 000 panels, a cantilever)
    keeps 4e-6."""

    residual: float = 1e-6
    """Relative: largest joint residual over largest joint load that a solution may leave. Doubles give 1e-10."""

    second_solution: float = 1e-6
    """Relative: largest difference of the two independent bar-force solutions over the largest bar force."""

    straight: float = 1e-3
    """rad: two bars that meet within this angle are collinear (1 mm in 1 m: a drawing's accuracy)."""

    on_joint: float = 10.0
    """mm: a purlin line this near to a joint stands on it (the project's convention)."""

    same_length: float = 1.0
    """mm: pieces whose lengths round to the same multiple of this are identical (saw accuracy, EN 1090-2)."""

    same_point: float = 0.5
    """mm: joints given one by one that are nearer than this are one joint, which is refused."""

    knee_reach: float = 300.0
    """mm in plan: a knee brace counts where a counted purlin stands within this of its joint (project rule)."""

    long_knee: float = 1500.0
    """mm: a knee brace to a line further above its joint than this is soft; warned (practice: 1.0 to 1.5 m)."""

    least_length_factor: float = 0.5
    """Dimensionless: no effective length factor of a member held at both ends is less (both ends fixed, theory)."""

    long_ceiling_panel: float = 3000.0
    """mm on plan: in a longer bottom panel a ceiling's hangers stand between the joints; warned (project rule)."""

    tiny_force: float = 1e-6
    """Relative to the largest bar force of a solution: smaller bar forces count as zero."""


TOLERANCES = Tolerances()
