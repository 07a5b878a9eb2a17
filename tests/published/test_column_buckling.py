"""Elastic buckling stresses against independent eigenvalue problems."""

from __future__ import annotations

import numpy as np
import pytest
from hypothesis import given
from hypothesis import strategies as st
from members import sections
from scipy.linalg import eigh
from scipy.sparse.linalg import eigsh
from skfem import Basis, BilinearForm, ElementLineHermite, MeshLine, condense
from skfem.helpers import dd, ddot, dot, grad

from spanwright.design.candidates import Family
from spanwright.design.sans.compression import Flexural, SinglySymmetric, Unsymmetric, least_root
from spanwright.truss.arrays import FloatArray

E, G = 200e3, 77e3


def column(value: FloatArray) -> FloatArray:
    return value[:, None]


def pinned_column(length: float, inertia: float) -> float:
    """Return the buckling load of a pinned column by 12 Hermite beam elements (scikit-fem), N."""
    mesh = MeshLine(np.linspace(0.0, length, 13))
    basis = Basis(mesh, ElementLineHermite())
    bending = BilinearForm(lambda u, v, _: E * inertia * ddot(dd(u), dd(v))).assemble(basis)
    geometric = BilinearForm(lambda u, v, _: dot(grad(u), grad(v))).assemble(basis)
    ends = basis.get_dofs(lambda x: (x[0] == 0.0) | (x[0] == length)).all(["u"])
    stiff, geometry = condense(bending, geometric, D=ends, expand=False)[:2]
    return float(eigsh(stiff, k=1, M=geometry, sigma=0.0, which="LM")[0][0])


@pytest.mark.parametrize("family", ["L", "2L", "CHS", "RHS"])
def test_euler_load_against_finite_elements(family: Family) -> None:
    """scikit-fem, cubic beam elements, twelve to the half-wave: the exact load within 1e-5."""
    some = sections(family).take([3, 40, 90])
    lengths = np.array([900.0, 2500.0])
    rule = Flexural(lengths, column(some.radius_in), E)
    for s, inertia in enumerate(some.inertia_in):
        for b, length in enumerate(lengths):
            force = rule.elastic_stress[s, b] * some.area[s]
            assert force == pytest.approx(pinned_column(float(length), float(inertia)), rel=1e-5)


def coupled_load(flexure: FloatArray, torsion: float, offset: FloatArray, polar: float) -> float:
    """Return the least load, N, of a pinned strut whose shear centre lies off its centroid.

    Half-waves of both deflections and the twist: the loads of flexure (about the first and second axis) and torsion
    on the diagonal, and the work of the axial stress, which couples them through the offset (x0, y0) of the shear
    centre: displacements of the centroid are v + x0 twist and u - y0 twist (Timoshenko and Gere, Theory of Elastic
    Stability, 2nd ed., 5.6).
    """
    x0, y0 = offset
    stiffness = np.diag([flexure[0], flexure[1], torsion * polar])
    work = np.array([[1.0, 0.0, x0], [0.0, 1.0, -y0], [x0, -y0, polar]])
    return float(eigh(stiffness, work, eigvals_only=True)[0])


def test_unsymmetric_angles_against_the_eigenproblem() -> None:
    every = sections("L")
    lengths = np.geomspace(200.0, 5000.0, 7)
    rule = Unsymmetric(
        lengths,
        lengths,
        column(every.radius_minor),
        column(every.radius_major),
        column(every.shear_major),
        column(every.shear_minor),
        column(every.area),
        column(every.torsion),
        column(every.warping),
        E,
        G,
    )
    for s in range(0, len(every), 9):
        for b in range(lengths.size):
            stresses = np.array([rule.stress_major[s, b], rule.stress_minor[s, b]])
            offset = np.array([every.shear_major[s], every.shear_minor[s]])
            expected = coupled_load(stresses, rule.stress_torsion[s, b], offset, rule.polar_squared[s, 0])
            assert rule.elastic_stress[s, b] == pytest.approx(expected, rel=1e-8)
    assert np.abs(rule.residual).max() < 1e-9


def test_pairs_against_the_eigenproblem() -> None:
    every = sections("2L")
    lengths = np.geomspace(300.0, 6000.0, 5)
    rule = SinglySymmetric(
        lengths,
        lengths,
        column(every.radius_out),
        column(every.radius_in),
        column(every.shear_sym),
        column(every.area),
        column(every.torsion),
        column(every.warping),
        np.zeros(5),
        column(every.piece_radius_minor),
        1.0,
        E,
        G,
    )
    for s in range(0, len(every), 13):
        for b in range(lengths.size):
            stresses = np.array([1e9, rule.stress_out[s, b]])
            offset = np.array([0.0, every.shear_sym[s]])
            expected = coupled_load(stresses, rule.stress_torsion[s, b], offset, rule.polar_squared[s, 0])
            assert rule.elastic_stress[s, b] == pytest.approx(expected, rel=1e-7)


stress = st.floats(1.0, 5e4)
share = st.floats(0.0, 0.45)


@given(stress, stress, stress, share, share)
def test_least_root_against_numpy(u: float, v: float, z: float, U: float, V: float) -> None:
    """The cubic (f - u)(f - v)(f - z) - f^2 (f - v) U - f^2 (f - u) V: numpy.roots and the eigenproblem.

    Near triple roots rounding of the coefficients alone moves the roots by its cube root, about 1e-5.
    """
    whole = [1.0 - U - V, v * U + u * V - u - v - z, u * v + u * z + v * z, -u * v * z]
    root = float(least_root(*(np.array([value]) for value in whole))[0])
    assert root == pytest.approx(float(np.min(np.roots(whole).real)), rel=2e-5)
    assert root == pytest.approx(coupled_load(np.array([u, v]), z, np.sqrt([U, V]), 1.0), rel=2e-5)
    assert 0.0 < root <= min(u, v, z) * (1.0 + 2e-5)
