"""Drag against speed of a magnet in an endless conducting wall, solved speed by speed with SciPy.

Per speed and grid level one sparse LU factorisation (SuperLU) of K - v C in the magnet's frame; the drag is
extrapolated over the levels' h^2 and h^4. Prints one JSON object.
"""

import argparse
import json
import time

import numpy as np
import scipy
import scipy.sparse as sp

import closed_forms
import fd_scheme
import grids

CONDUCTIVITY = 58e6
CASES = {
    "dipole": (closed_forms.Dipole(1.0), 10.5e-3, 12.5e-3),
    "cylinder": (closed_forms.Cylinder(1.2, 5e-3, 10e-3), 7.5e-3, 9.5e-3),
}


class Level:
    """All that one grid needs and no speed changes."""

    def __init__(self, source, r, z, inner, outer, slope, ordering):
        self.ordering = ordering
        across = fd_scheme.conductance_across(r, inner, outer, CONDUCTIVITY)
        self.wall = np.flatnonzero(across > 0)
        self.shape = (len(z) - 2, len(r) - 2)
        self.stiffness = fd_scheme.stiffness(r, z)
        half = np.full(self.shape[0] - 1, 0.5)
        self.convection = sp.kron(sp.diags_array([half, -half], offsets=[1, -1]), sp.diags_array(across)).tocsc()
        rim = r[1:-1][self.wall][None, :]
        dual_z = ((z[2:] - z[:-2]) / 2)[:, None]
        if slope == "closed-form":
            self.slope = source.psi_z(rim, z[1:-1, None])
        else:
            psi = source.psi(rim, z[:, None])
            self.slope = (psi[2:] - psi[:-2]) / 2 / dual_z
        driven = np.zeros(self.shape)
        driven[:, self.wall] = across[self.wall] * self.slope * dual_z
        self.driven = driven.ravel()

    def drag(self, speed):
        """Axial force of the wall's currents on the magnet's field, J x B summed over the rings."""
        matrix = (self.stiffness - speed * self.convection).tocsc()
        reaction = fd_scheme.factorise(matrix, self.ordering).solve(speed * self.driven)
        current = speed * (self.driven + self.convection @ reaction).reshape(self.shape)[:, self.wall]
        return 2 * np.pi * float(np.sum(current * self.slope))


def extrapolate(factors, values):
    """Limit h -> 0 of values whose error runs in h^2, h^4, ..."""
    powers = np.array([[f ** (-2.0 * k) for k in range(len(factors))] for f in factors])
    return float(np.linalg.solve(powers, np.array(values))[0])


def build(case, factors, top_speed, grid_file, slope, ordering):
    """The levels, on given node lines or on lines made for the greatest speed."""
    source, inner, outer = CASES[case]
    if grid_file:
        lines = grids.load(grid_file)
    else:
        lines = [grids.moving_frame(source, inner, outer, CONDUCTIVITY, top_speed, f) for f in factors]
    return [Level(source, r, z, inner, outer, slope, ordering) for r, z in lines]


def main():
    parser = argparse.ArgumentParser(description=__doc__)
    parser.add_argument("--case", choices=sorted(CASES), default="dipole")
    parser.add_argument("--speeds", type=float, nargs=3, default=[0.01, 100.0, 60], metavar=("FROM", "TO", "POINTS"))
    parser.add_argument("--at", type=float, nargs="+", help="these speeds (m/s) in place of the range")
    parser.add_argument("--factors", type=float, nargs="+", default=[1.0, 1.5, 2.0], help="refinement of each level")
    parser.add_argument("--grids", help='JSON file of node lines {"levels": [{"r": [...], "z": [...]}]}, metres')
    parser.add_argument("--slope", choices=["closed-form", "differences"], default="closed-form",
                        help="d psi_s/dz at the nodes: exact, or differences of psi_s between neighbours")
    parser.add_argument("--ordering", choices=["symmetric", "default"], default="symmetric", help="setting of SuperLU")
    parser.add_argument("--exact", action="store_true", help="also print the error against the exact integral (untimed)")
    options = parser.parse_args()
    start, stop, points = options.speeds
    speeds = options.at or np.geomspace(start, stop, int(points)).tolist()

    began, worked = time.perf_counter(), time.process_time()
    levels = build(options.case, options.factors, max(speeds), options.grids, options.slope, options.ordering)
    if len(levels) != len(options.factors):
        parser.error("--factors must name one refinement for each level of --grids")
    prepared = time.perf_counter()
    per_level = [[level.drag(speed) for level in levels] for speed in speeds]
    drags = [extrapolate(options.factors, values) for values in per_level]
    ended, worked = time.perf_counter(), time.process_time() - worked

    result = {
        "case": options.case,
        "scipy": scipy.__version__,
        "unknowns": [level.stiffness.shape[0] for level in levels],
        "points": len(speeds),
        "seconds": ended - began,
        "processor_seconds": worked,
        "seconds_preparing": prepared - began,
        "seconds_solving": ended - prepared,
        "speed_m_per_s": speeds,
        "drag_N": drags,
        "drag_levels_N": per_level,
    }
    if options.exact:
        source, inner, outer = CASES[options.case]
        exact = [closed_forms.exact_drag(source, v, inner, outer, CONDUCTIVITY) for v in speeds]
        result["exact_N"] = exact
        result["relative_error"] = [f / e - 1 for f, e in zip(drags, exact)]
        result["relative_error_levels"] = [[x / e - 1 for x in row] for row, e in zip(per_level, exact)]
    print(json.dumps(result))


if __name__ == "__main__":
    main()
