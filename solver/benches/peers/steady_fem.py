"""Drag at one speed in an endless wall with a general finite-element library (scikit-fem, quadratic elements).

    int (nu/r) grad psi . grad q - v int (sigma/r) d psi/dz q = v int (sigma/r) d psi_s/dz q,    psi = 0 on axis and boundary

The mesh is refined until the true error, against the exact Fourier-Bessel integral, is within the target. Prints one
JSON object; `seconds` is the last mesh alone (mesh, assembly, solve, force), as if its fineness had been known.
"""

import argparse
import json
import time

import numpy as np
import scipy
import skfem
from skfem import Basis, BilinearForm, Functional, LinearForm

import closed_forms
import fd_scheme
import grids
from curve_scipy import CASES, CONDUCTIVITY

NU = 1 / closed_forms.MU0
ELEMENTS = {
    "triangle": (skfem.MeshTri, skfem.ElementTriP2),
    "quadrilateral": (skfem.MeshQuad, skfem.ElementQuad2),
}


@BilinearForm
def magnetic(u, q, w):
    """(nu/r) grad psi . grad q"""
    return NU / w.x[0] * (u.grad[0] * q.grad[0] + u.grad[1] * q.grad[1])


@BilinearForm
def convection(u, q, w):
    """v (sigma/r) d psi/dz q"""
    return w.speed * CONDUCTIVITY / w.x[0] * u.grad[1] * q


def source_load(source):
    """v (sigma/r) d psi_s/dz q"""
    return LinearForm(lambda q, w: w.speed * CONDUCTIVITY / w.x[0] * source.psi_z(w.x[0], w.x[1]) * q)


def drag_density(source):
    """2 pi v (sigma/r) (d psi_r/dz + d psi_s/dz) d psi_s/dz"""
    def density(w):
        slope = source.psi_z(w.x[0], w.x[1])
        return 2 * np.pi * w.speed * CONDUCTIVITY / w.x[0] * (w["reaction"].grad[1] + slope) * slope
    return Functional(density)


def solve(case, speed, fineness, element, order):
    """Drag (N) and number of unknowns on a tensor mesh of the given fineness."""
    source, inner, outer = CASES[case]
    r, z = grids.moving_frame(source, inner, outer, CONDUCTIVITY, speed, fineness)
    mesh_type, element_type = ELEMENTS[element]
    mesh = mesh_type.init_tensor(r, z).with_subdomains({"wall": lambda x: (x[0] > inner) & (x[0] < outer)})
    space = Basis(mesh, element_type(), intorder=order)
    wall = Basis(mesh, element_type(), intorder=order, elements="wall")
    matrix = magnetic.assemble(space) - convection.assemble(wall, speed=speed)
    load = source_load(source).assemble(wall, speed=speed)
    reduced, right, whole, free = skfem.condense(matrix, load, D=space.get_dofs())
    whole[free] = fd_scheme.factorise(reduced.tocsc()).solve(right)
    force = drag_density(source).assemble(wall, reaction=wall.interpolate(whole), speed=speed)
    return float(force), len(free)


def main():
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("target", type=float, nargs="?", default=1e-6, help="relative error to reach (default 1e-6)")
    parser.add_argument("--case", choices=sorted(CASES), default="dipole")
    parser.add_argument("--speed", type=float, default=5.0, help="m/s")
    parser.add_argument("--element", choices=sorted(ELEMENTS), default="triangle")
    parser.add_argument("--order", type=int, default=5, help="polynomial order the quadrature is exact to")
    parser.add_argument("--growth", type=float, default=0.4, help="growth of the cells per distance")
    parser.add_argument("--repeats", type=int, default=3, help="the last mesh is timed so often, the best time counts")
    options = parser.parse_args()
    grids.GROWTH = options.growth
    source, inner, outer = CASES[options.case]
    exact = closed_forms.exact_drag(source, options.speed, inner, outer, CONDUCTIVITY)

    solve(options.case, options.speed, 0.5, options.element, options.order)  # warms imports and caches, untimed
    history, fineness, error = [], 0.5, np.inf
    while abs(error) > options.target and fineness < 8:
        began = time.perf_counter()
        drag, unknowns = solve(options.case, options.speed, fineness, options.element, options.order)
        seconds = time.perf_counter() - began
        error = drag / exact - 1
        history.append({"fineness": fineness, "unknowns": unknowns, "relative_error": error, "seconds": seconds})
        fineness *= 2**0.125
    for _ in range(options.repeats - 1):
        began = time.perf_counter()
        solve(options.case, options.speed, history[-1]["fineness"], options.element, options.order)
        seconds = min(seconds, time.perf_counter() - began)
    result = {
        "case": options.case,
        "element": options.element,
        "speed_m_per_s": options.speed,
        "drag_N": drag,
        "exact_N": exact,
        "relative_error": error,
        "target": options.target,
        "reached": bool(abs(error) <= options.target),
        "unknowns": unknowns,
        "seconds": seconds,
        "seconds_with_coarser_meshes": sum(item["seconds"] for item in history),
        "scikit_fem": skfem.__version__,
        "scipy": scipy.__version__,
        "history": history,
    }
    print(json.dumps(result, indent=1))


if __name__ == "__main__":
    main()
