"""Graded node lines whose levels keep even powers of the cell size.

Between two breakpoints the nodes are the images of equidistant x under ONE smooth map ds/dx = h(s); a level f
takes x = 0, 1/f, 2/f, ... of that same map. `h` is the wanted size at f = 1.
"""

import json

import numpy as np

MU0 = 4e-7 * np.pi
GAUSS_X, GAUSS_W = np.polynomial.legendre.leggauss(12)


def soft_min(*sizes, p=4):
    """Smooth minimum (sum s^-p)^(-1/p)."""
    return sum(np.asarray(s, float) ** -p for s in sizes) ** (-1.0 / p)


def _count(size, start, stop, panels=400):
    """Cumulated int ds/h over [start, stop] on a fine set of panels."""
    edges = start + (stop - start) * _spread(start, stop, size, panels)
    half = np.diff(edges) / 2
    mid = (edges[1:] + edges[:-1]) / 2
    per_panel = (half[:, None] * GAUSS_W / size(mid[:, None] + half[:, None] * GAUSS_X)).sum(1)
    return edges, np.concatenate(([0.0], np.cumsum(per_panel)))


def _spread(start, stop, size, panels):
    """Panel edges in 0..1, denser where h is small (a rough inverse of the count is enough)."""
    t = np.linspace(0, 1, 20001)
    density = 1 / size(start + (stop - start) * t)
    total = np.concatenate(([0.0], np.cumsum((density[1:] + density[:-1]) / 2)))
    return np.interp(np.linspace(0, total[-1], panels + 1), total, t)


def segment(size, start, stop, level):
    """Nodes of one segment at level f, both ends included; an even number of cells at f = 1."""
    edges, cumulated = _count(size, start, stop)
    cells = 2 * max(1, int(np.ceil(cumulated[-1] / 2 - 1e-9)))
    steps = round(cells * level)
    target = np.arange(steps + 1) / steps * cumulated[-1]
    panel = np.clip(np.searchsorted(cumulated, target, side="right") - 1, 0, len(edges) - 2)
    left, s = edges[panel], edges[panel] + 0.0
    s = left + (target - cumulated[panel]) * size(left)
    for _ in range(30):
        half = (s - left) / 2
        count = (half[:, None] * GAUSS_W / size(left[:, None] + half[:, None] * (1 + GAUSS_X))).sum(1)
        change = (target - cumulated[panel] - count) * size(s)
        s = s + change
        if np.all(np.abs(change) <= 1e-15 * abs(stop - start)):
            break
    s[0], s[-1] = start, stop
    return s


def skin_depth(length, conductivity, speed):
    """sqrt(2 lam / (mu0 sigma v))."""
    return np.sqrt(2 * length / (MU0 * conductivity * speed)) if speed > 0 else np.inf


def load(path):
    """Levels [(r, z), ...] of a JSON file {"levels": [{"r": [...], "z": [...]}, ...]}."""
    with open(path, encoding="utf-8") as handle:
        data = json.load(handle)
    return [(np.array(item["r"], float), np.array(item["z"], float)) for item in data["levels"]]


GROWTH = 0.26


def across(inner, outer, face_size, extent, level):
    """Node line in r: axis, wall faces, boundary at outer + extent."""
    width = outer - inner
    bore = lambda s: soft_min(face_size + GROWTH * (inner - s), inner / 6)
    wall = lambda s: soft_min(face_size + GROWTH * (s - inner), face_size + GROWTH * (outer - s), width / 4)
    outside = lambda s: face_size + GROWTH * (s - outer)
    parts = [segment(bore, 0.0, inner, level), segment(wall, inner, outer, level)[1:],
             segment(outside, outer, outer + extent, level)[1:]]
    return np.concatenate(parts)


def moving_frame(source, inner, outer, conductivity, speed, level):
    """Node lines (r, z) about a source at z = 0 that travels towards +z through an endless wall."""
    width, gap = outer - inner, inner - source.radius
    lam = min(inner, 2 * gap)
    reynolds = MU0 * speed * conductivity * width
    face = min(width / 4, skin_depth(lam, conductivity, speed) / 4, lam / 8)
    end, cap = gap / 2, inner / 8
    low, high = source.ends[0], source.ends[-1]

    def beyond(d):
        # The cap holds for one bore radius past the source and is let go beyond it.
        ceiling = (cap**4 + (GROWTH * np.maximum(d - inner, 0)) ** 4) ** 0.25
        return soft_min(end + GROWTH * d, ceiling)

    within = lambda s: soft_min(end + GROWTH * (s - low), end + GROWTH * (high - s), cap)
    parts = [segment(lambda s: beyond(low - s), low - 40 * outer - 4 * inner * reynolds, low, level)]
    if high > low:
        parts.append(segment(within, low, high, level)[1:])
    parts.append(segment(lambda s: beyond(s - high), high, high + 40 * outer, level)[1:])
    return across(inner, outer, face, 40 * outer, level), np.concatenate(parts)


def wall_frame(length, inner, outer, face, along, extent, level):
    """Node lines (r, z) about a wall from z = 0 to `length`: even cells along it, growth from its ends."""
    inside = lambda s: np.full_like(s, along)
    below = lambda s: along + GROWTH * -s
    above = lambda s: along + GROWTH * (s - length)
    parts = [segment(below, -extent, 0.0, level), segment(inside, 0.0, length, level)[1:],
             segment(above, length, length + extent, level)[1:]]
    return across(inner, outer, face, extent, level), np.concatenate(parts)
