"""Fields of the magnets in free space, and the exact drag in an endless wall.

psi = r A_phi in Wb/rad, lengths in metres, velocities in m/s. Sources sit at z = 0 and point up.
"""

import numpy as np
from scipy.integrate import quad_vec
from scipy.special import ellipe, ellipk, elliprf, elliprj, iv, ive, kv, kve

MU0 = 4e-7 * np.pi


class Dipole:
    """Point dipole of `moment` (A m2) on the axis."""

    def __init__(self, moment):
        self.moment = moment
        self.ends = [0.0]
        self.radius = 0.0

    def psi(self, r, z):
        """psi = mu0 m r^2 / (4 pi (r^2 + z^2)^(3/2))."""
        return MU0 * self.moment / (4 * np.pi) * r**2 / (r**2 + z**2) ** 1.5

    def psi_z(self, r, z):
        """d psi / dz."""
        return -3 * MU0 * self.moment / (4 * np.pi) * r**2 * z / (r**2 + z**2) ** 2.5

    def spectrum(self, k):
        """S(k) of A_phi = int_0^inf S K1(kr) cos(kz) dk."""
        return MU0 * self.moment / (2 * np.pi**2) * k

    def force_weight(self, k):
        """W(k) of drag = int_0^inf -W Im Gamma dk."""
        return MU0 * self.moment**2 / (2 * np.pi**2) * k**3


class Cylinder:
    """Uniformly magnetised cylinder: remanence (T), radius and length (m), recoil permeability 1."""

    def __init__(self, remanence, radius, length):
        self.sheet = remanence / MU0
        self.radius = radius
        self.length = length
        self.ends = [-length / 2, length / 2]

    def psi(self, r, z):
        """Difference of two half-endless current sheets (complete elliptic integrals), r > radius."""
        half = self.length / 2
        return self._end(r, z + half) - self._end(r, z - half)

    def _end(self, r, zeta):
        """One end of the sheet: r A of the closed form at height zeta above it."""
        a = self.radius
        h2 = 4 * a * r / (a + r) ** 2
        k2 = 4 * a * r / ((a + r) ** 2 + zeta**2)
        first = ellipk(k2)
        third = elliprf(0.0, 1 - k2, 1.0) + h2 / 3 * elliprj(0.0, 1 - k2, 1.0, 1 - h2)
        bracket = (k2 + h2 - h2 * k2) / (h2 * k2) * first - ellipe(k2) / k2 + (h2 - 1) / h2 * third
        return MU0 * self.sheet / (2 * np.pi) * np.sqrt(a * r) * zeta * np.sqrt(k2) * bracket

    def psi_z(self, r, z):
        """d psi / dz: the difference of the rA of two loops of unit sheet current at the ends."""
        half = self.length / 2
        return self._loop(r, z + half) - self._loop(r, z - half)

    def _loop(self, r, zeta):
        a = self.radius
        k2 = 4 * a * r / ((a + r) ** 2 + zeta**2)
        scale = MU0 * self.sheet / np.pi * np.sqrt(a * r / k2)
        return scale * ((1 - k2 / 2) * ellipk(k2) - ellipe(k2))

    def force_weight(self, k):
        """W(k) of drag = int_0^inf -W Im Gamma dk; I1^2 included."""
        return 8 * MU0 * (self.sheet * self.radius) ** 2 / k * np.sin(k * self.length / 2) ** 2 * iv(1, k * self.radius) ** 2


def _gamma(k, speed, inner, outer, conductivity):
    """Reflection of a non-magnetic wall on the field K1(kr) of a source in its bore, per wavenumber."""
    # Moving +z past the wall: q^2 = k^2 - j mu0 sigma k v.
    q = np.sqrt(k**2 - 1j * MU0 * conductivity * k * speed)
    a, b = inner, outer
    scale = np.exp(-q * (b - a))

    def bessel(x):
        return ive(1, x), kve(1, x), ive(0, x), kve(0, x)

    # Wall: A = C I1(qr) + D K1(qr), I scaled to its value at b and K to its value at a, so nothing overflows.
    ia, ka, i0a, k0a = bessel(q * a)
    ib, kb, i0b, k0b = bessel(q * b)
    phase_a = np.exp(1j * (q * a).imag)
    phase_b = np.exp(1j * (q * b).imag)
    # ive(x) = I e^{-|Re x|}; bring I to I e^{-x} and K to K e^{x} (kve is that already).
    ia, i0a = ia / phase_a, i0a / phase_a
    ib, i0b = ib / phase_b, i0b / phase_b
    # At b: A = C Ib + D s Kb, B_z = q (C I0b - D s K0b), outside T K1(kb) with B_z = -T k K0(kb).
    ratio_b = -k * kve(0, k * b) / kve(1, k * b)
    # C (q I0b - ratio Ib) = D s (q K0b + ratio Kb)
    c_over_d = scale * (q * k0b + ratio_b * kb) / (q * i0b - ratio_b * ib)
    value = c_over_d * scale * ia + ka
    slope = q * (c_over_d * scale * i0a - k0a)
    ratio_a = slope / value
    # Bore: K1 + Gamma I1, slope k(-K0 + Gamma I0) = ratio_a (K1 + Gamma I1).
    return (ratio_a * kv(1, k * a) + k * kv(0, k * a)) / (k * iv(0, k * a) - ratio_a * iv(1, k * a))


def exact_drag(source, speed, inner, outer, conductivity):
    """Drag (N) in an endless wall by the Fourier-Bessel integral over the axial wavenumber.

    Form of M. H. Partovi, E. J. Morris, Can. J. Phys. 84, 253-271 (2006), derived anew for this source.
    """
    def integrand(u):
        k = np.exp(u) / inner
        value = -source.force_weight(k) * _gamma(k, speed, inner, outer, conductivity).imag
        return value * k

    total, _ = quad_vec(integrand, np.log(1e-9), np.log(60.0), epsrel=1e-12, epsabs=0, limit=4000)
    return abs(total)
