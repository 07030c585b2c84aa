"""The flux-exact finite-difference scheme on a tensor grid, psi = r A_phi at the nodes, mu = mu0 everywhere.

    -d/dr( (nu/r) d psi/dr ) - d/dz( (nu/r) d psi/dz ) + (sigma/r) d psi/dt = 0 for the wall's reaction

K = D^T N D over the free nodes (psi = 0 on the axis and the outer boundary); node (i, j) has index j * nr + i.
"""

import numpy as np
import scipy.sparse as sp
from scipy.sparse.linalg import splu

MU0 = 4e-7 * np.pi


def stiffness(r, z):
    """K over the inner nodes, symmetric positive definite (A/Wb per rad)."""
    dual_r = (r[2:] - r[:-2]) / 2
    dual_z = (z[2:] - z[:-2]) / 2
    along_r = 2 / (r[1:] ** 2 - r[:-1] ** 2) / MU0
    along_z = 1 / (z[1:] - z[:-1]) / MU0
    k_r = sp.diags_array([along_r[:-1] + along_r[1:], -along_r[1:-1], -along_r[1:-1]], offsets=[0, 1, -1])
    k_z = sp.diags_array([along_z[:-1] + along_z[1:], -along_z[1:-1], -along_z[1:-1]], offsets=[0, 1, -1])
    return (sp.kron(sp.diags_array(dual_z), k_r) + sp.kron(k_z, sp.diags_array(dual_r / r[1:-1]))).tocsc()


def conductance_across(r, inner, outer, conductivity):
    """int sigma dr / r over the part of each inner node's dual cell that lies in the wall."""
    mid = (r[1:] + r[:-1]) / 2
    low = np.clip(mid[:-1], inner, outer)
    high = np.clip(mid[1:], inner, outer)
    return conductivity * np.log(high / low)


def factorise(matrix, ordering="symmetric"):
    """SuperLU of a matrix of symmetric pattern.

    "symmetric" is the fastest setting measured here (minimum degree on the pattern, no pivoting; both K + 2G/dt and
    K - v C have a positive definite symmetric part); "default" is what a bare `splu(matrix)` does.
    """
    if ordering == "default":
        return splu(matrix)
    return splu(matrix, permc_spec="MMD_AT_PLUS_A", diag_pivot_thresh=0.0, options={"SymmetricMode": True})
