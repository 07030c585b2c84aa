//! Gauss-Legendre quadrature on one panel.

/// Abscissas (positive half) and weights of the 8-point rule on [-1, 1]
/// (Abramowitz and Stegun, Handbook of Mathematical Functions, 1964, table 25.4; from memory,
/// confirmed by the exactness test below).
const ABSCISSAS: [f64; 4] =
    [0.183_434_642_495_649_8, 0.525_532_409_916_329, 0.796_666_477_413_626_7, 0.960_289_856_497_536_3];
const WEIGHTS: [f64; 4] =
    [0.362_683_783_378_362, 0.313_706_645_877_887_3, 0.222_381_034_453_374_47, 0.101_228_536_290_376_26];

/// Integral of `f` over `[a, b]` by the 8-point rule, exact for polynomials of degree 15.
pub(crate) fn gauss8(a: f64, b: f64, f: impl Fn(f64) -> f64) -> f64 {
    let (centre, half) = (0.5 * (a + b), 0.5 * (b - a));
    let mut sum = 0.0;
    for (x, w) in ABSCISSAS.iter().zip(WEIGHTS) {
        sum += w * (f(centre - half * x) + f(centre + half * x));
    }
    sum * half
}

#[cfg(test)]
mod tests {
    use super::gauss8;

    #[test]
    fn exact_for_degree_15() {
        for degree in 0..16 {
            let exact = (2f64.powi(degree + 1) - 1.0) / f64::from(degree + 1);
            approx::assert_relative_eq!(gauss8(1.0, 2.0, |x| x.powi(degree)), exact, max_relative = 1e-14);
        }
    }
}
