"""Every tolerance of the program, with its meaning, unit and origin. No other module holds one."""

from __future__ import annotations

from dataclasses import dataclass


@dataclass(frozen=True)
class Tolerances:
    """Tolerances, all positive.

    Lengths in mm, angles in rad; `relative` values are dimensionless.
    """

    pivot: float = 1e-10
    """Relative: a pivot of the factorised stiffness below this share of its joint's larger diagonal is a mechanism.
    Rounding leaves about 1e-13 where few bars take part; the least stable simply supported truss tried (20 000 bars,
    one span) keeps 8e-5."""

    strainless: float = 1e-9
    """Relative: a motion that elongates no bar by more than this share of its largest displacement is a mechanism.
    Rounding leaves at most 2e-10 (20 000 bars); the most flexible sound truss tried (1 000 panels, a cantilever)
    keeps 4e-6."""

    motionless: float = 1e-6
    """Relative: parts of a mechanism's motion smaller than this share of its largest are rounding."""

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

    length_dust: float = 1e-3
    """mm: a length this little short of a full step counts as the full step before it is rounded down, so that what
    doubles leave does not give two marks to the two halves of a symmetrical truss."""

    same_point: float = 0.5
    """mm: joints given one by one that are nearer than this are one joint, which is refused."""

    sheeting_cantilever: float = 300.0
    """mm along the slope: sheeting cantilevers no further beyond its last purlin (common practice)."""

    knee_reach: float = 300.0
    """mm in plan: a knee brace counts where a counted purlin stands within this of its joint (project rule)."""

    long_knee: float = 1500.0
    """mm: a knee brace to a line further above its joint than this is soft; warned (practice: 1.0 to 1.5 m)."""

    longest_knee: float = 2500.0
    """mm: a knee brace that rises more than this holds nothing: too soft to count on unproven (project rule)."""

    idle_web: float = 0.05
    """Of the greatest web compression of a combination: a web pressed less does not stand for the first compression web
    from a bearing; the search goes on to the next (project rule)."""

    idle_group: float = 0.5
    """Of the resistance: a group used less than this for strength is sized by something else (project rule)."""

    worth_a_group: float = 0.02
    """Of a truss's mass: a group that saves less is not worth another section in the workshop (project rule)."""

    least_length_factor: float = 0.5
    """Dimensionless: no effective length factor of a member held at both ends is less (both ends fixed, theory)."""

    long_ceiling_panel: float = 3000.0
    """mm on plan: in a longer bottom panel a ceiling's hangers stand between the joints; warned (project rule)."""

    long_chord_panel: float = 3000.0
    """mm: a longer chord bar is bent noticeably by its own mass, which goes to the joints; warned (project rule)."""

    by_hand: float = 1e-3
    """Relative: what a hand calculation may differ by from what was found (three figures of a pocket calculator)."""

    tiny_force: float = 1e-6
    """Relative to the largest bar force of a solution: smaller bar forces count as zero."""

    ends_meet: float = 5.0
    """mm: line ends of a drawing within this are one joint; never more than `ends_meet_share` (practice)."""

    ends_meet_share: float = 1e-3
    """Of the span: as `ends_meet`, for small trusses (practice: the lesser of 5 mm and 0.1 % of the span)."""

    near_miss: float = 5.0
    """Multiples of the tolerance that joins line ends: ends up to this apart are reported, not joined (practice)."""

    off_upright: float = 0.02
    """rad: a bar this near to vertical is a post, a chord turning less runs straight (5 mm at each end of 0.5 m)."""

    spread: float = 0.05
    """rad: drawn lines from one joint that spread by more are two bars, not one drawn twice (a roof of 3 degrees)."""

    steep_end: float = 0.52
    """rad (30 degrees): an outline's end bar this steep, beside a longer run, is an end diagonal (project rule)."""

    mark_reach: float = 300.0
    """mm: a purlin, brace or bearing drawn this near to its chord or joint belongs to it (purlin depth and cleat)."""

    drawing_noise: float = 1e-5
    """mm: what turning, scaling and shifting coordinates of doubles may leave; smaller differences are none."""

    near_origin: float = 1e6
    """mm: within this of the origin doubles hold 1e-10 mm, and coordinates are taken as drawn."""

    farthest: float = 1e12
    """Drawing units: beyond this doubles hold no tenth of a millimetre in metres; refused."""


TOLERANCES = Tolerances()
