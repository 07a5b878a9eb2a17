"""The torsion constant of an angle against Poisson's equation on its outline, solved by finite elements (scikit-fem).

The formula of El Darwish and Johnston (1965) leaves the toe radii out. With them it lies 2.0 to 2.4 % above the
solution, without them 1.1 to 1.6 %, without any radius 0.9 to 1.3 %; the mesh accounts for less than 0.1 % of that.
"""

from __future__ import annotations

import numpy as np
import pytest
import shapely
from outlines import Angle, angle_outline
from scipy.spatial import Delaunay
from skfem import Basis, ElementTriP2, MeshTri, condense, solve
from skfem.models.poisson import laplace, unit_load

from spanwright.design.shapes import angle_torsion

SIZES: list[Angle] = [
    (80, 80, 8, 10, 5),
    (50, 50, 5, 7, 3.5),
    (100, 75, 8, 10, 5),
    (60, 60, 5, 8, 4),
    (150, 150, 15, 16, 8),
]


def mesh_of(outline: shapely.Polygon, spacing: float) -> MeshTri:
    """Triangles over a hexagonal grid of points, and points along the outline."""
    edge = np.array(shapely.segmentize(outline, spacing).exterior.coords)[:-1]
    left, below, right, above = outline.bounds
    x, y = np.meshgrid(np.arange(left, right, spacing), np.arange(below, above, spacing * np.sqrt(3) / 2))
    x[1::2] += spacing / 2
    inside = shapely.contains_xy(outline.buffer(-0.55 * spacing), x, y)
    points = np.vstack([edge, np.column_stack([x[inside], y[inside]])])
    triangles = Delaunay(points).simplices
    middles = points[triangles].mean(axis=1)
    triangles = triangles[shapely.contains_xy(outline, middles[:, 0], middles[:, 1])]
    return MeshTri(np.ascontiguousarray(points.T), np.ascontiguousarray(triangles.T))


def torsion_by_elements(outline: shapely.Polygon, spacing: float) -> float:
    """Prandtl's stress function: -laplace(phi) = 2, phi = 0 on the outline, J = 2 x its volume."""
    basis = Basis(mesh_of(outline, spacing), ElementTriP2())
    load = unit_load.assemble(basis)
    phi = solve(*condense(laplace.assemble(basis), 2 * load, D=basis.get_dofs()))
    return float(2 * load @ phi)


def formula(size: Angle) -> float:
    return float(angle_torsion(*(np.array([float(length)]) for length in size[:4]))[0])


def test_the_elements_know_the_rectangle() -> None:
    """Saint-Venant: J = 0.2287 b t^3 for sides 2 to 1 (Timoshenko and Goodier, Theory of Elasticity, 0.229)."""
    found = torsion_by_elements(shapely.box(0, 0, 20, 10), 1.0)
    assert found == pytest.approx(0.2287 * 20 * 10**3, rel=0.001)


@pytest.mark.parametrize("size", SIZES)
def test_formula_against_elements(size: Angle) -> None:
    h, b, t, root, _ = size
    spacing = t / 8
    rolled = torsion_by_elements(angle_outline(size, arc=24), spacing)
    square_toes = torsion_by_elements(angle_outline((h, b, t, root, 0), arc=24), spacing)
    sharp = torsion_by_elements(angle_outline((h, b, t, 0, 0), arc=24), spacing)
    assert 1.018 < formula(size) / rolled < 1.026
    assert 1.009 < formula(size) / square_toes < 1.017
    assert 1.005 < formula((h, b, t, 0, 0)) / sharp < 1.014
