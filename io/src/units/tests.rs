#![allow(
    clippy::unwrap_used,
    clippy::expect_used,
    clippy::float_cmp,
    clippy::panic,
    reason = "tests may stop at the first fault"
)]

use proptest::prelude::*;

use super::*;

fn si(text: &str, kind: Kind) -> f64 {
    read_quantity(text, kind).unwrap_or_else(|fault| panic!("{text}: {fault}")).si
}

fn fault(text: &str, kind: Kind) -> QuantityFault {
    read_quantity(text, kind).expect_err(text)
}

#[test]
fn lengths_come_out_as_the_nearest_float() {
    for (text, metres) in [
        ("12 mm", 0.012),
        ("12mm", 0.012),
        ("9.3 mm", 0.0093),
        (" +1.5e1 um ", 15e-6),
        ("15 µm", 15e-6),
        ("15 μm", 15e-6),
        ("-60 mm", -0.06),
        ("\u{2212}60 mm", -0.06),
        (".5 m", 0.5),
        ("5. m", 5.0),
        ("1E-3 km", 1.0),
        ("1 in", 0.0254),
        ("250 mil", 0.00635),
        ("1 dam", 10.0),
    ] {
        assert_eq!(si(text, Kind::Length), metres, "{text}");
    }
}

#[test]
fn whole_names_win_over_prefixes() {
    assert_eq!(si("2 min", Kind::Time), 120.0);
    assert_eq!(si("1 h", Kind::Time), 3600.0);
    assert_eq!(si("3 ms", Kind::Time), 0.003);
    assert_eq!(si("1 mT", Kind::FluxDensity), 1e-3);
    assert_eq!(si("13 kG", Kind::FluxDensity), 1.3);
    assert_eq!(si("12500 G", Kind::FluxDensity), 1.25);
}

#[test]
fn products_and_quotients_are_read() {
    for (text, kind, value) in [
        ("1 N s/m", Kind::DampingCoefficient, 1.0),
        ("7850 kg/m^3", Kind::Density, 7850.0),
        ("7.85 g/cm3", Kind::Density, 7850.0),
        ("9.80665 m/s2", Kind::Acceleration, 9.80665),
        ("9.80665 m s^-2", Kind::Acceleration, 9.80665),
        ("9.80665 m·s⁻²", Kind::Acceleration, 9.80665),
        ("0.02 N s2/m2", Kind::AirDrag, 0.02),
        ("0.02 N*s^2/m²", Kind::AirDrag, 0.02),
        ("1.2 A m2", Kind::Moment, 1.2),
        ("1.2 J/T", Kind::Moment, 1.2),
        ("58 MS/m", Kind::Conductivity, 58e6),
        ("-0.12 %/K", Kind::TemperatureCoefficient, -0.0012),
        ("-0.12 %/degC", Kind::TemperatureCoefficient, -0.0012),
        ("0.0033 /K", Kind::TemperatureCoefficient, 0.0033),
        ("0.0033/K", Kind::TemperatureCoefficient, 0.0033),
        ("0.0033 1/K", Kind::TemperatureCoefficient, 0.0033),
        ("2 N/mm", Kind::SpringRate, 2000.0),
        ("0.01 %", Kind::Ratio, 1e-4),
        ("1.05", Kind::Ratio, 1.05),
        ("1 m/(s s)", Kind::Acceleration, 1.0),
    ] {
        assert_eq!(si(text, kind), value, "{text}");
    }
}

#[test]
fn trade_units_agree_with_their_definitions() {
    // 1 lbf s/in = 4.4482216152605 N s / 0.0254 m, by the definitions of pound-force and inch.
    approx::assert_relative_eq!(
        si("1 lbf s/in", Kind::DampingCoefficient),
        4.448_221_615_260_5 / 0.0254,
        max_relative = 1e-15
    );
    approx::assert_relative_eq!(si("1 kgf", Kind::Force), 9.80665, max_relative = 1e-15);
    // 1 Oe = 1000/(4 pi) A/m.
    approx::assert_relative_eq!(si("1 kOe", Kind::FieldStrength), 79_577.471_545_947_67, max_relative = 1e-15);
    approx::assert_relative_eq!(si("180 deg", Kind::Angle), std::f64::consts::PI, max_relative = 1e-15);
    approx::assert_relative_eq!(si("90°", Kind::Angle), std::f64::consts::FRAC_PI_2, max_relative = 1e-15);
    approx::assert_relative_eq!(si("3000 rpm", Kind::Frequency), 50.0, max_relative = 1e-15);
}

#[test]
fn temperatures_are_points_on_their_scales() {
    assert_eq!(si("20 degC", Kind::Temperature), 293.15);
    assert_eq!(si("-30 °C", Kind::Temperature), 243.14999999999998);
    assert_eq!(si("77 K", Kind::Temperature), 77.0);
    approx::assert_relative_eq!(si("68 degF", Kind::Temperature), 293.15, max_relative = 1e-15);
}

#[test]
fn resistivities_are_inverted_where_a_conductivity_is_wanted() {
    // 100 %IACS is 58.0 MS/m at 20 degC: IEC 60028:1925.
    assert_eq!(si("100 %IACS", Kind::Conductivity), 58e6);
    assert_eq!(si("43 % IACS", Kind::Conductivity), 43.0 * 0.58e6);
    for text in ["17.2 nohm m", "1.72 uohm cm", "0.0172 ohm mm2/m", "17.2 nΩ m", "1.72 µΩ·cm"] {
        approx::assert_relative_eq!(si(text, Kind::Conductivity), 1.0 / 17.2e-9, max_relative = 1e-14);
    }
    assert_eq!(fault("0 nohm m", Kind::Conductivity), QuantityFault::ZeroResistivity);
}

#[test]
fn faults_say_what_is_wrong_what_fits_and_the_mend() {
    for (text, kind, message, legal, mend) in [
        ("12 mT", Kind::Length, "'mT' does not measure a length but a flux density", "mm, um, cm, m, in, mil", ""),
        ("12 mmm", Kind::Length, "'mmm' is no known unit", "mm, um", "did you mean 'mm'?"),
        ("12 millimeters", Kind::Length, "'millimeters' is no known unit", "mm", "did you mean 'mm'?"),
        ("1,5 mm", Kind::Length, "'1,5 mm' has a comma in its number", "", "did you mean '1.5 mm'?"),
        ("1,200.5 mm", Kind::Length, "has a comma", "", "did you mean '1200.5 mm'?"),
        ("12", Kind::Length, "'12' has no unit", "mm", "did you mean \"12 mm\"? A number without quotes is in m"),
        ("mm", Kind::Length, "'mm' does not start with a number", "a number followed by its unit", ""),
        ("", Kind::Length, "'' does not start with a number", "", ""),
        ("nan mm", Kind::Length, "'nan mm' is not a finite number", "", ""),
        ("-inf mm", Kind::Length, "is not a finite number", "", ""),
        ("1e999 mm", Kind::Length, "is not a finite number", "", ""),
        ("20 C", Kind::Temperature, "'C' does not measure a temperature", "degC, K, degF", "did you mean 'degC'?"),
        ("10 %", Kind::Angle, "'%' does not measure an angle but a ratio", "deg, rad", ""),
        ("10 deg", Kind::Ratio, "'deg' does not measure a ratio but an angle", "%", ""),
        ("1 W/m K", Kind::Ratio, "can be read in two ways", "", ""),
        ("1 m/s/s", Kind::Acceleration, "two slashes", "m/s2", ""),
        ("1 m/", Kind::Speed, "nothing stands below the slash", "", ""),
        ("1 m^99", Kind::Length, "a power is a whole number to 9", "", ""),
        ("1 (m", Kind::Length, "brackets do not match", "", ""),
        ("2 ms/m", Kind::Conductivity, "'ms/m' does not measure a conductivity", "MS/m", ""),
    ] {
        let fault = fault(text, kind);
        assert!(fault.to_string().contains(message), "{text}: {fault}");
        assert!(fault.legal().unwrap_or_default().contains(legal), "{text}: {:?}", fault.legal());
        assert!(fault.mend().unwrap_or_default().contains(mend), "{text}: {:?}", fault.mend());
    }
}

#[test]
fn every_unit_that_a_message_offers_is_read() {
    for kind in [
        Kind::Length,
        Kind::Speed,
        Kind::Temperature,
        Kind::Conductivity,
        Kind::TemperatureCoefficient,
        Kind::Ratio,
        Kind::FluxDensity,
        Kind::FieldStrength,
        Kind::Moment,
        Kind::Current,
        Kind::Mass,
        Kind::Density,
        Kind::Time,
        Kind::Frequency,
        Kind::Acceleration,
        Kind::Angle,
        Kind::Force,
        Kind::AirDrag,
        Kind::SpringRate,
        Kind::DampingCoefficient,
    ] {
        assert!(!kind.fitting_units().is_empty() && Kind::of_dimension(kind.dimension()) == Some(kind));
        for unit in kind.fitting_units().iter().chain([&kind.si_unit()]) {
            assert!(read_quantity(&format!("3 {unit}"), kind).is_ok(), "{kind}: {unit}");
        }
    }
}

#[test]
fn bare_numbers_are_si_and_must_be_finite() {
    assert_eq!(read_bare_number(0.5, Kind::Length).unwrap().si, 0.5);
    assert!(read_bare_number(f64::NAN, Kind::Length).is_err());
    assert!(read_bare_number(f64::INFINITY, Kind::Length).is_err());
}

proptest! {
    #[test]
    fn values_survive_being_written_and_read(value in -1e9f64..1e9, unit in prop::sample::select(vec!["mm", "um", "m", "in", "mil", "km"])) {
        let factor = read_unit(unit, Kind::Length).unwrap().factor();
        let text = format!("{value:e} {unit}");
        approx::assert_relative_eq!(si(&text, Kind::Length), value * factor, max_relative = 4e-16);
    }

    #[test]
    fn metres_written_as_metres_come_back_to_the_bit(value in proptest::num::f64::NORMAL) {
        prop_assert_eq!(si(&format!("{value:e} m"), Kind::Length), value);
    }

    #[test]
    fn a_unit_times_its_reciprocal_is_one(name in prop::sample::select(unit_names().collect::<Vec<_>>())) {
        let unit = read_unit(&format!("{name} {name}/({name} {name})"), Kind::Ratio).unwrap();
        prop_assert_eq!(unit.dimension, Dimension::NONE);
        approx::assert_relative_eq!(unit.factor(), 1.0, max_relative = 1e-15);
    }

    #[test]
    fn no_text_panics(text in "\\PC{0,40}", number in "[-+]?[0-9.,e]{0,8}") {
        for kind in [Kind::Length, Kind::Temperature, Kind::Conductivity, Kind::Ratio] {
            let _ = read_quantity(&text, kind);
            let _ = read_quantity(&format!("{number}{text}"), kind);
        }
    }
}
