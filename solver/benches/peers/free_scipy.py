"""A magnet falls through a finite conducting wall: plain SciPy, implicit midpoint, three nested levels.

State: y = total flux psi at the wall's nodes, magnet height z and velocity v. One step solves

    (2G/dt + K) psi_mid = (2G/dt) (y_n - mean psi_s),    I = (2G/dt) (y_n - psi_mid - mean psi_s)
    M (v_new - v) / dt = -M g + F,    F dz = 2 pi sum I (psi_s(z + dz) - psi_s(z)),    dz = dt (v + v_new) / 2

by one Newton pass with the exact tangent. Step sizes are chosen once on the coarsest level, in pairs, and replayed
divided by f on level f. Prints one JSON object.
"""

import argparse
import json
import time
from dataclasses import dataclass, field

import numpy as np
import scipy
import scipy.sparse as sp
from scipy.interpolate import BarycentricInterpolator, make_interp_spline
from scipy.optimize import brentq

import closed_forms
import fd_scheme
import grids
from curve_scipy import extrapolate

MAGNET = closed_forms.Cylinder(1.25, 9e-3, 12e-3)
MASS, GRAVITY = 0.060, 9.80665
INNER, OUTER, LENGTH, CONDUCTIVITY = 11e-3, 13e-3, 0.300, 58e6
RELEASE, UNTIL = 0.330, -0.060
LONGEST_STEP = 16e-3
RUNGS = 10


class Space:
    """Operators on one grid, the magnet's flux at the wall and the factorisations of the ladder."""

    def __init__(self, r, z, flux, ordering):
        self.ordering = ordering
        self.stiffness = fd_scheme.stiffness(r, z)
        across = fd_scheme.conductance_across(r, INNER, OUTER, CONDUCTIVITY)
        mid = (z[1:] + z[:-1]) / 2
        along = np.clip(mid[1:], 0, LENGTH) - np.clip(mid[:-1], 0, LENGTH)
        conductance = np.outer(along, across).ravel()
        self.wall = np.flatnonzero(conductance > 0)
        self.conductance = conductance[self.wall]
        self.size = conductance.size
        self.height = z[1:-1][along > 0]
        radii = r[1:-1][across > 0]
        if flux == "closed-form":
            self.flux = lambda height: MAGNET.psi(radii[None, :], height[:, None])
            self.flux_slope = lambda height: MAGNET.psi_z(radii[None, :], height[:, None])
        else:
            self.flux = self._flux_spline(radii)
            self.flux_slope = self.flux.derivative()
        self.factors = {}

    def _flux_spline(self, radii):
        """psi_s against height for all wall radii at once: order 7, so the closed form is called only here."""
        reach = max(RELEASE, LENGTH - UNTIL) + 0.02
        knots = np.arange(-reach, reach, 0.5e-3)
        return make_interp_spline(knots, MAGNET.psi(radii[None, :], knots[:, None]), k=7)

    def source(self, position):
        """psi_s at the wall's nodes with the magnet at `position`."""
        return self.flux(self.height - position).ravel()

    def source_slope(self, position):
        """d psi_s / d position."""
        return -self.flux_slope(self.height - position).ravel()

    def solve(self, step, at_wall):
        """(2G/dt + K)^-1 (2G/dt) x at the wall's nodes, for the columns of x."""
        if step not in self.factors:
            diagonal = np.zeros(self.size)
            diagonal[self.wall] = 2 / step * self.conductance
            matrix = (self.stiffness + sp.diags_array(diagonal)).tocsc()
            self.factors[step] = fd_scheme.factorise(matrix, self.ordering)
        load = np.zeros((self.size, at_wall.shape[1]))
        load[self.wall] = 2 / step * self.conductance[:, None] * at_wall
        return self.factors[step].solve(load)[self.wall]

    def field_energy(self, reaction):
        """Energy (J) of the currents' own field, from psi_r at the wall's nodes."""
        air = np.setdiff1d(np.arange(self.size), self.wall)
        psi = np.zeros(self.size)
        psi[self.wall] = reaction
        factor = fd_scheme.factorise(self.stiffness[air][:, air].tocsc(), self.ordering)
        psi[air] = factor.solve(-(self.stiffness @ psi)[air])
        return np.pi * float(psi @ (self.stiffness @ psi))


@dataclass(frozen=True)
class State:
    """Everything a step needs and changes."""

    time: float
    position: float
    velocity: float
    flux: np.ndarray
    source: np.ndarray
    # Acceleration of the last two steps and the time between their middles, for the first guess.
    acceleration: float = -GRAVITY
    acceleration_slope: float = 0.0
    last_step: float = 0.0
    heat: float = 0.0


def advance(space, state, step):
    """One implicit midpoint step; the state passed in is left as it was."""
    ahead = (state.last_step + step) / 2 if state.last_step else 0.0
    guess = state.acceleration + state.acceleration_slope * ahead
    travel = step * (state.velocity + guess * step / 2)
    source = space.source(state.position + travel)
    slope = space.source_slope(state.position + travel)
    mean = (state.source + source) / 2
    solved = space.solve(step, np.column_stack([state.flux - mean, -slope / 2]))
    scale = 2 / step * space.conductance
    current = scale * (state.flux - solved[:, 0] - mean)
    current_slope = scale * (-solved[:, 1] - slope / 2)

    change = source - state.source
    force = 2 * np.pi * (current @ change) / travel
    force_slope = (2 * np.pi * (current_slope @ change + current @ slope) - force) / travel
    residual = MASS * 2 * (travel / step - state.velocity) / step + MASS * GRAVITY - force
    shift = -residual / (2 * MASS / step**2 - force_slope)

    travel += shift
    source = space.source(state.position + travel)
    mean = (state.source + source) / 2
    middle = solved[:, 0] + shift * solved[:, 1]
    current = scale * (state.flux - middle - mean)
    velocity = 2 * travel / step - state.velocity
    acceleration = (velocity - state.velocity) / step
    return State(
        time=state.time + step,
        position=state.position + travel,
        velocity=velocity,
        flux=2 * (middle + mean) - state.flux,
        source=source,
        acceleration=acceleration,
        acceleration_slope=(acceleration - state.acceleration) / ahead if ahead else 0.0,
        last_step=step,
        heat=state.heat + 2 * np.pi * step * float(current @ (current / space.conductance)),
    )


def at_rest(space):
    """Magnet held at the release height, no current in the wall."""
    source = space.source(RELEASE)
    return State(0.0, RELEASE, 0.0, source.copy(), source)


@dataclass
class Trace:
    """What a run leaves behind."""

    time: list = field(default_factory=list)
    position: list = field(default_factory=list)
    velocity: list = field(default_factory=list)
    final: State | None = None

    def note(self, state):
        self.time.append(state.time)
        self.position.append(state.position)
        self.velocity.append(state.velocity)


def acceptable(start, end, step, cell, share):
    """Steps of at most `share` cells, and at most 15 % change of speed a pair."""
    fastest = max(abs(start.velocity), abs(end.velocity))
    floor = np.sqrt(GRAVITY * cell)
    return fastest * step <= share * cell and abs(end.velocity - start.velocity) <= 0.15 * max(fastest, floor)


def choose_ladder(space, cell, share):
    """Runs the coarsest level, choosing the step of each pair from the ladder; returns trace and pairs."""
    state, rung, pairs, trace = at_rest(space), RUNGS - 1, [], Trace()
    trace.note(state)
    while state.position > UNTIL:
        rung = max(rung - 1, 0)
        while True:
            step = LONGEST_STEP / 2**rung
            first = advance(space, state, step)
            second = advance(space, first, step)
            if rung == RUNGS - 1 or acceptable(state, second, step, cell, share):
                break
            rung += 1
        pairs.append(step)
        trace.note(first)
        trace.note(second)
        state = second
    trace.final = state
    return trace, pairs


def replay(space, pairs, level):
    """The same pairs of steps, each pair divided into 2f steps."""
    state, trace = at_rest(space), Trace()
    trace.note(state)
    steps = round(2 * level)
    for pair in pairs:
        for _ in range(steps):
            state = advance(space, state, pair * 2 / steps)
            trace.note(state)
    trace.final = state
    return trace


def gate(trace, height):
    """Time and speed at which the magnet's centre passes `height`, by a polynomial through six steps."""
    position = np.array(trace.position)
    after = int(np.argmax(position < height))
    low = max(after - 3, 0)
    chosen = slice(low, low + 6)
    times = np.array(trace.time[chosen])
    centre = trace.time[after]
    curve = BarycentricInterpolator(times - centre, position[chosen] - height)
    instant = brentq(lambda t: float(curve(t)), trace.time[after - 1] - centre, 0.0, xtol=1e-15)
    return centre + instant, abs(float(curve.derivative(instant)))


def figures(trace, space):
    """Headline figures and the energy ledger of one level."""
    entry_time, entry_speed = gate(trace, LENGTH)
    exit_time, exit_speed = gate(trace, 0.0)
    end = trace.final
    work = MASS * GRAVITY * (RELEASE - end.position)
    kinetic = MASS * end.velocity**2 / 2
    stored = space.field_energy(end.flux - end.source)
    return {
        "transit_time_s": exit_time - entry_time,
        "entry_time_s": entry_time,
        "entry_speed_m_per_s": entry_speed,
        "exit_speed_m_per_s": exit_speed,
        "heat_J": end.heat,
        "stored_J": stored,
        "ledger_imbalance": (work - kinetic - end.heat - stored) / work,
        "steps": len(trace.time) - 1,
        "unknowns": space.size,
        "factorisations": len(space.factors),
    }


def node_lines(options):
    """Node lines of every level and, where the file gives them, the steps of the pairs at f = 1."""
    if options.grids:
        with open(options.grids, encoding="utf-8") as handle:
            pairs = json.load(handle).get("pairs_s")
        return grids.load(options.grids), pairs
    gap, width = INNER - MAGNET.radius, OUTER - INNER
    face = min(width / 4, min(INNER, 2 * gap) / 8)
    lines = [grids.wall_frame(LENGTH, INNER, OUTER, face, options.cell, 40 * OUTER, f) for f in options.factors]
    return lines, None


def main():
    parser = argparse.ArgumentParser(description=__doc__, formatter_class=argparse.RawDescriptionHelpFormatter)
    parser.add_argument("--factors", type=float, nargs="+", default=[1.0, 1.5, 2.0],
                        help="refinement of each level, 1 first")
    parser.add_argument("--cell", type=float, default=1.5e-3, help="cell along the wall at f = 1, metres")
    parser.add_argument("--share", type=float, default=1.0, help="greatest travel a step, in cells along the wall")
    parser.add_argument("--flux", choices=["spline", "closed-form"], default="spline",
                        help="the magnet's flux at the wall: order-7 spline made once, or elliptic integrals every step")
    parser.add_argument("--ordering", choices=["symmetric", "default"], default="symmetric", help="setting of SuperLU")
    parser.add_argument("--grids", help='JSON file {"levels": [{"r": [...], "z": [...]}]}, metres; with "pairs_s": [...] '
                        "also the step of every pair at f = 1")
    options = parser.parse_args()

    began, worked = time.perf_counter(), time.process_time()
    lines, pairs = node_lines(options)
    if len(lines) != len(options.factors):
        parser.error("--factors must name one refinement for each level of --grids")
    per_level = []
    for factor, (r, z) in zip(options.factors, lines):
        clock = time.perf_counter()
        space = Space(r, z, options.flux, options.ordering)
        if pairs is None:
            trace, pairs = choose_ladder(space, float(np.min(np.diff(z))), options.share)
        else:
            trace = replay(space, pairs, factor)
        found = figures(trace, space)
        found["seconds"] = time.perf_counter() - clock
        per_level.append(found)
    names = ["transit_time_s", "entry_time_s", "entry_speed_m_per_s", "exit_speed_m_per_s", "heat_J"]
    result = {name: extrapolate(options.factors, [level[name] for level in per_level]) for name in names}
    result["seconds"] = time.perf_counter() - began
    result["processor_seconds"] = time.process_time() - worked
    result["flux"] = options.flux
    result["scipy"] = scipy.__version__
    result["ladder_s"] = sorted(set(pairs))
    result["levels"] = per_level
    print(json.dumps(result, indent=1))


if __name__ == "__main__":
    main()
