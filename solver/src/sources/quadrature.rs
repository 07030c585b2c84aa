//! Independent references for the tests: adaptive Gauss-Kronrod quadrature of the Biot-Savart integrals of a loop,
//! stacked along z and over radius. No elliptic integral appears here.
//!
//! The loop integrals (mu0 I = 1, D^2 = a^2 + r^2 + z^2 - 2 a r cos phi, over 0..2 pi), integrated by parts where the
//! raw cosine would cancel:
//!
//! - psi = (a^2 r^2/4 pi) int sin^2/D^3,
//! - B_r = (3 a^2 r z/4 pi) int sin^2/D^5,
//! - B_z = (a/4 pi) int (a - r cos)/D^3.

use std::f64::consts::PI;

/// Abscissae (0..1), Kronrod weights and, on odd places, Gauss weights of the 7-15 pair
/// (R. Piessens et al., QUADPACK, 1983, routine qk15; digits from memory, checked below on polynomials).
const NODES: [f64; 8] = [
    0.991_455_371_120_812_6,
    0.949_107_912_342_758_5,
    0.864_864_423_359_769_1,
    0.741_531_185_599_394_4,
    0.586_087_235_467_691_1,
    0.405_845_151_377_397_2,
    0.207_784_955_007_898_47,
    0.0,
];
const KRONROD: [f64; 8] = [
    0.022_935_322_010_529_224,
    0.063_092_092_629_978_55,
    0.104_790_010_322_250_18,
    0.140_653_259_715_525_92,
    0.169_004_726_639_267_9,
    0.190_350_578_064_785_4,
    0.204_432_940_075_298_9,
    0.209_482_141_084_727_82,
];
const GAUSS: [f64; 4] =
    [0.129_484_966_168_869_7, 0.279_705_391_489_276_64, 0.381_830_050_505_118_9, 0.417_959_183_673_469_4];

/// Integral over [a, b] and QUADPACK's estimate of its error, s min(1, (200 |fine - coarse|/s)^1.5), s the spread of `f`.
fn kronrod(a: f64, b: f64, f: &mut dyn FnMut(f64) -> f64) -> (f64, f64) {
    let (c, h) = (0.5 * (a + b), 0.5 * (b - a));
    let middle = f(c);
    let (mut fine, mut coarse) = (KRONROD[7] * middle, GAUSS[3] * middle);
    let mut values = [(middle, middle); 7];
    for i in 0..7 {
        values[i] = (f(c - h * NODES[i]), f(c + h * NODES[i]));
        let pair = values[i].0 + values[i].1;
        fine += KRONROD[i] * pair;
        if i % 2 == 1 {
            coarse += GAUSS[i / 2] * pair;
        }
    }
    let mean = 0.5 * fine;
    let spread: f64 = (0..7).map(|i| KRONROD[i] * ((values[i].0 - mean).abs() + (values[i].1 - mean).abs())).sum();
    let spread = h * (spread + KRONROD[7] * (middle - mean).abs());
    let raw = ((fine - coarse) * h).abs();
    let error = if spread > 0.0 { spread * (200.0 * raw / spread).powf(1.5).min(1.0) } else { raw };
    (fine * h, error)
}

/// Adaptive integral of `f` over [a, b] to `tolerance` relative to the integral of |estimates|.
pub(crate) fn integrate(a: f64, b: f64, tolerance: f64, f: &mut dyn FnMut(f64) -> f64) -> f64 {
    let (value, error) = kronrod(a, b, f);
    let mut panels = vec![(error, a, b, value)];
    for _ in 0..400 {
        let scale: f64 = panels.iter().map(|p| p.3.abs()).sum();
        let total: f64 = panels.iter().map(|p| p.0).sum();
        if total <= tolerance * scale {
            break;
        }
        let worst = (0..panels.len()).fold(0, |w, i| if panels[i].0 > panels[w].0 { i } else { w });
        let (_, lo, hi, _) = panels.swap_remove(worst);
        let mid = 0.5 * (lo + hi);
        for (lo, hi) in [(lo, mid), (mid, hi)] {
            let (value, error) = kronrod(lo, hi, f);
            panels.push((error, lo, hi, value));
        }
    }
    panels.iter().map(|p| p.3).sum()
}

/// psi/r^2, B_r/r and B_z.
pub(crate) type Fields = [f64; 3];

fn loop_component(which: usize, a: f64, r: f64, z: f64, tolerance: f64) -> f64 {
    let near2 = (a - r) * (a - r) + z * z;
    let distance2 = |half: f64| near2 + 4.0 * a * r * half * half;
    let inner = integrate(0.0, PI, tolerance, &mut |phi| {
        let (half, sine) = ((0.5 * phi).sin(), phi.sin());
        let d2 = distance2(half);
        let d = d2.sqrt();
        match which {
            0 => sine * sine / (d2 * d),
            1 => sine * sine / (d2 * d2 * d),
            // a - r cos phi = (a - r) + 2 r sin^2(phi/2).
            _ => ((a - r) + 2.0 * r * half * half) / (d2 * d),
        }
    });
    let factor = [a * a, 3.0 * a * a * z, a][which];
    factor * inner / (2.0 * PI)
}

/// One component of the field of the sheet r = a, |z| < b with mu0 K = 1.
pub(crate) fn sheet_component(which: usize, (a, b): (f64, f64), r: f64, z: f64, tolerance: f64) -> f64 {
    // Intervals as centre and half width, whose length is exact. B_r of a loop is odd in height: what cancels below is
    // left out. The others are split where the integrand peaks.
    let intervals = match which {
        1 => vec![(z.abs().max(b), z.abs().min(b))],
        _ if z.abs() < b => vec![(0.5 * (z - b), 0.5 * (b - z)), (0.5 * (z + b), 0.5 * (b + z))],
        _ => vec![(z, b)],
    };
    let over = |(centre, half): (f64, f64)| {
        let component = &mut |u: f64| loop_component(which, a, r, centre + u, 0.03 * tolerance);
        integrate(-half, half, tolerance, component)
    };
    let sum: f64 = intervals.into_iter().map(over).sum();
    if which == 1 && z < 0.0 { -sum } else { sum }
}

/// psi/r^2, B_r/r and B_z of the sheet with mu0 K = 1, to about 1e-12.
pub(crate) fn sheet_fields(sheet: (f64, f64), r: f64, z: f64) -> Fields {
    [0, 1, 2].map(|which| sheet_component(which, sheet, r, z, 1e-12))
}

/// One component of the loop's field, mu0 I = 1.
pub(crate) fn loop_fields(a: f64, r: f64, z: f64) -> Fields {
    [0, 1, 2].map(|which| loop_component(which, a, r, z, 1e-13))
}

/// The same with the integral along z done by hand where its ends do not cancel: int dz/(q + z^2)^(3/2) = z/(q sqrt(q +
/// z^2)), and B_r as the difference of two loops' psi.
fn sheet_component_near(which: usize, (a, b): (f64, f64), r: f64, z: f64, tolerance: f64) -> f64 {
    let (up, down) = (z + b, z - b);
    if which == 1 {
        let psi = |z: f64| loop_component(0, a, r, z, tolerance);
        return psi(down) - psi(up);
    }
    let inner = integrate(0.0, PI, tolerance, &mut |phi| {
        let (half, sine) = ((0.5 * phi).sin(), phi.sin());
        let q = (a - r) * (a - r) + 4.0 * a * r * half * half;
        let column = up / (q + up * up).sqrt() - down / (q + down * down).sqrt();
        column / q * if which == 0 { sine * sine } else { (a - r) + 2.0 * r * half * half }
    });
    [a * a, 0.0, a][which] * inner / (2.0 * PI)
}

/// psi/r^2, B_r/r and B_z of a coil r1 < r < r2, |z| < b with mu0 J = 1.
pub(crate) fn coil_fields((r1, r2, b): (f64, f64, f64), r: f64, z: f64, tolerance: f64) -> Fields {
    let cuts = if r1 < r && r < r2 { vec![r1, r, r2] } else { vec![r1, r2] };
    [0, 1, 2].map(|which| {
        // What cancels: both ends far off, or B_r close to the middle plane.
        let cancels = z.abs() > 2.0 * b || r > 10.0 * r2 || (which == 1 && z.abs() < 0.1 * b);
        let sheet = if cancels { sheet_component } else { sheet_component_near };
        let over_radius =
            |from, to| integrate(from, to, tolerance, &mut |a| sheet(which, (a, b), r, z, 0.1 * tolerance));
        cuts.windows(2).map(|pair| over_radius(pair[0], pair[1])).sum()
    })
}

#[cfg(test)]
mod tests {
    use super::*;
    use approx::assert_relative_eq;

    #[test]
    fn pair_is_exact_on_polynomials() {
        for degree in 0..=22 {
            let exact = 1.0 / f64::from(degree + 1);
            assert_relative_eq!(kronrod(0.0, 1.0, &mut |x| x.powi(degree)).0, exact, max_relative = 1e-14);
            if degree <= 13 {
                assert!(kronrod(0.0, 1.0, &mut |x| x.powi(degree)).1 < 1e-15, "degree {degree}");
            }
        }
    }

    #[test]
    fn loop_on_its_axis_is_textbook() {
        // B_z = a^2/(2 (a^2 + z^2)^(3/2)).
        let [psi, _, bz] = loop_fields(2.0, 0.0, 1.5);
        assert_relative_eq!(bz, 2.0 / 2.5_f64.powi(3), max_relative = 1e-13);
        assert_relative_eq!(psi, 0.5 * bz, max_relative = 1e-13);
    }

    #[test]
    fn peaks_are_resolved() {
        let peak = |w: f64| integrate(-1.0, 1.0, 1e-13, &mut |x| w / (w * w + x * x));
        for w in [1e-1_f64, 1e-3, 1e-6] {
            assert_relative_eq!(peak(w), 2.0 * (1.0 / w).atan(), max_relative = 1e-12);
        }
    }
}
