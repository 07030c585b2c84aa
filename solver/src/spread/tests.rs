#![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

use super::*;
use approx::assert_relative_eq;

fn input(path: &str, value: f64, half: f64) -> Input {
    Input {
        path: path.to_owned(),
        unit: "m",
        value,
        minus: half,
        plus: half,
        written: String::new(),
        stays: Vec::new(),
        follows: Vec::new(),
    }
}

fn exact(value: f64) -> Reading {
    Reading { value, band: 0.0 }
}

fn response(f: impl Fn(f64) -> f64, input: &Input) -> Response {
    let plan = plan_offsets(input);
    let found: Vec<(f64, Reading)> =
        plan.stencil.iter().chain(&plan.ends).map(|x| (*x, exact(f(input.value + x)))).collect();
    Response::new(input, exact(f(input.value)), plan.step, &found).unwrap()
}

#[test]
fn weights_of_the_usual_stencils() {
    // Five points a quarter apart: (f(-2h) - 8 f(-h) + 8 f(h) - f(2h)) / 12 h (Abramowitz and Stegun, 25.3.6, from memory).
    let w = slope_weights(&[-2.0, -1.0, 1.0, 2.0, 0.0]);
    for (found, twelfths) in w.iter().zip([1.0, -8.0, 8.0, -1.0, 0.0]) {
        assert_relative_eq!(*found, twelfths / 12.0, epsilon = 1e-15);
    }
    // One-sided three points: (-3 f0 + 4 f1 - f2) / 2 h.
    let w = slope_weights(&[0.0, 1.0, 2.0]);
    assert_relative_eq!(w[0], -1.5);
    assert_relative_eq!(w[1], 2.0);
    assert_relative_eq!(w[2], -0.5);
}

#[test]
fn a_steep_power_has_its_exponent_as_sensitivity() {
    // x^-4 varied by 10 %: three points would give 5 % too much, five points stay within 0.04 %.
    let r = response(|x| x.powi(-4), &input("a", 2.0, 0.2));
    assert_relative_eq!(r.per_cent.unwrap(), -4.0, max_relative = 4e-4);
    // 0.9^-4 - 1 = 0.5242 and 1.1^-4 - 1 = -0.3170 against a straight 0.4: departure 0.124 of 0.524.
    assert_relative_eq!(r.low * 16.0, 0.524_158, epsilon = 1e-5);
    assert_relative_eq!(r.high * 16.0, -0.316_987, epsilon = 1e-5);
    assert_relative_eq!(r.nonlinearity, 0.237, epsilon = 1e-2);
    assert!(!r.is_linear() && r.clear);
}

#[test]
fn wide_and_narrow_tolerances_leave_the_slope_alone() {
    for half in [1e-7, 0.01, 0.3, 0.9] {
        let r = response(|x| x * x, &input("b", 1.3, half));
        assert_relative_eq!(r.per_cent.unwrap(), 2.0, max_relative = 1e-9);
        let change = |at: f64| (1.3 + at).powi(2) - 1.69;
        assert_relative_eq!(r.high, change(half), max_relative = 1e-6);
        assert_relative_eq!(r.low, change(-half), max_relative = 1e-6);
    }
}

#[test]
fn a_change_within_the_bands_is_not_clear() {
    let input = input("c", 1.0, 0.1);
    let noisy = |x: f64| Reading { value: 1.0 + 0.001 * x, band: 1e-4 };
    let plan = plan_offsets(&input);
    let found: Vec<(f64, Reading)> = plan.stencil.iter().map(|x| (*x, noisy(*x))).collect();
    let r = Response::new(&input, noisy(0.0), plan.step, &found).unwrap();
    assert!(!r.clear && r.unseen());
    // The band of the slope: (8 + 8 + 1 + 1)/12 over a step of 0.05.
    assert_relative_eq!(r.slope_band, 1e-4 * 1.5 / 0.05, max_relative = 1e-9);
}

#[test]
fn an_input_that_goes_one_way_only() {
    let mut input = input("friction", 0.0, 0.0);
    input.plus = 0.4;
    let plan = plan_offsets(&input);
    let found: Vec<(f64, Reading)> =
        plan.one_sided(1.0).iter().map(|x| (*x, exact(5.0 - 2.0 * x + 0.1 * x * x))).collect();
    let r = Response::new(&input, exact(5.0), plan.step, &found).unwrap();
    assert_relative_eq!(r.slope, -2.0, max_relative = 1e-12);
    assert_eq!((r.low, r.rise()), (0.0, 0.0));
    assert_relative_eq!(r.fall(), 0.784, max_relative = 1e-12);
    assert!(r.per_cent.is_none());
}

#[test]
fn spreads_combine_and_rank() {
    let inputs = [input("x", 1.0, 0.03), input("y", 1.0, 0.04)];
    let f = |x: f64, y: f64| 10.0 * x + 10.0 * y;
    let responses = vec![Some(response(|x| f(x, 1.0), &inputs[0])), Some(response(|y| f(1.0, y), &inputs[1]))];
    let nominal = Nominal { name: "f".to_owned(), unit: "N", reading: exact(20.0) };
    let mut spread = FigureSpread::new(&nominal, &inputs, responses);
    assert_relative_eq!(spread.half_width(), 0.5, max_relative = 1e-9);
    assert_relative_eq!(spread.worst_plus, 0.7, max_relative = 1e-9);
    assert_relative_eq!(spread.shares[1], 0.64, max_relative = 1e-9);
    assert_eq!(rank(std::slice::from_ref(&spread), 2), [1, 0]);
    assert_eq!(spread.corner(&inputs, true), [0.03, 0.04]);
    assert_eq!(spread.corner(&inputs, false), [-0.03, -0.04]);
    spread.solved_worst(19.2, 20.8);
    assert_relative_eq!(spread.worst_plus, 0.8, max_relative = 1e-9);
    assert!(spread.worst_solved && spread.complete());
}

#[test]
fn the_generator_gives_its_known_numbers() {
    // First outputs for seed 1234567, as published with many implementations of this generator (from memory).
    let mut draws = Draws::new(1_234_567);
    assert_eq!(draws.bits(), 6_457_827_717_110_365_317);
    assert_eq!(draws.bits(), 3_203_168_211_198_807_973);
}

#[test]
fn draws_are_normal_and_agree_with_the_root_sum_square() {
    let inputs = [input("x", 1.0, 0.03), input("y", 1.0, 0.04)];
    let f = |x: f64, y: f64| 10.0 * x + 10.0 * y;
    let responses = vec![Some(response(|x| f(x, 1.0), &inputs[0])), Some(response(|y| f(1.0, y), &inputs[1]))];
    let nominal = Nominal { name: "f".to_owned(), unit: "N", reading: exact(20.0) };
    let spread = FigureSpread::new(&nominal, &inputs, responses);
    for (count, seed) in [(60, 1), (4000, 2)] {
        let mut draws = Draws::new(seed);
        let values: Vec<f64> = (0..count)
            .map(|_| {
                let o = draws.offsets(&inputs);
                f(1.0 + o[0], 1.0 + o[1])
            })
            .collect();
        let sampled = Sampled::new(&spread, &values).unwrap();
        assert!(sampled.agrees, "{sampled:?}");
        // 1.96/sqrt(2 n) of the half-width by standard deviation, about 1.9 times that by percentiles.
        assert!(sampled.error < 4.0 * sampled.half_width / f64::from(count).sqrt(), "{sampled:?}");
        // A spread half as wide is seen as wrong.
        let narrow = FigureSpread { minus: 0.25, plus: 0.25, ..spread.clone() };
        assert!(!Sampled::new(&narrow, &values).unwrap().agrees);
    }
}
