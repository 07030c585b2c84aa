//! Numbers as people read them: in a handy unit, to the digits that the band leaves.

/// Below this a number in K is no temperature of a working wall.
const COLDEST: f64 = 150.0;

/// A unit as shown, and what a value in SI is multiplied by.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Unit {
    /// As shown, with raised digits; empty for a pure number.
    pub text: String,
    /// Shown value over SI value.
    pub factor: f64,
    /// Shown value at 0 in SI: only temperatures have one.
    pub offset: f64,
}

impl Unit {
    /// The handy unit for values up to `largest` in the SI unit `si`.
    pub(super) fn for_values(si: &str, largest: f64) -> Self {
        let largest = largest.abs();
        match si {
            "1" | "" => Self::plain("", 1.0),
            "m" if largest >= 20.0 => Self::plain("m", 1.0),
            "m" if largest < 2e-4 && largest > 0.0 => Self::plain("µm", 1e6),
            "m" => Self::plain("mm", 1e3),
            "m/s" if largest > 0.0 && largest < 0.05 => Self::plain("mm/s", 1e3),
            "m/s" => Self::plain("m/s", 1.0),
            "A/m2" if largest >= 1e5 => Self::plain("A/mm²", 1e-6),
            "A/m2" if largest >= 1e2 => Self::plain("kA/m²", 1e-3),
            "W/m3" if largest >= 1e6 => Self::plain("W/cm³", 1e-6),
            "J/m3" if largest >= 1e6 => Self::plain("J/cm³", 1e-6),
            // No wall works so cold: this is a difference of temperatures.
            "K" if largest < COLDEST => Self::plain("K", 1.0),
            "K" => Self { text: "°C".to_owned(), factor: 1.0, offset: -273.15 },
            "deg" => Self::plain("°", 1.0),
            "s" if largest >= 0.1 => Self::plain("s", 1.0),
            "S/m" => Self::plain("MS/m", 1e-6),
            "N" | "J" | "W" | "s" | "T" | "V" | "A" | "Hz" | "H" | "Wb" | "ohm" | "Pa" | "N s/m" | "N/m" | "A/m" => {
                Self::prefixed(si, largest)
            }
            other => Self::plain(&raised(other), 1.0),
        }
    }

    /// The handy unit of what `name` calls: temperatures are shown in degC, their rises in K.
    pub(super) fn of_named(name: &str, si: &str, largest: f64) -> Self {
        if si == "K" && name.contains("rise") { Self::plain("K", 1.0) } else { Self::for_values(si, largest) }
    }

    fn plain(text: &str, factor: f64) -> Self {
        Self { text: text.to_owned(), factor, offset: 0.0 }
    }

    /// The prefix that leaves one to three digits before the point.
    fn prefixed(si: &str, largest: f64) -> Self {
        let (prefix, factor) = match largest {
            m if m >= 2e9 => ("G", 1e-9),
            m if m >= 2e6 => ("M", 1e-6),
            m if m >= 1e4 => ("k", 1e-3),
            m if m >= 0.05 || m <= 0.0 => ("", 1.0),
            m if m >= 5e-5 => ("m", 1e3),
            m if m >= 5e-8 => ("µ", 1e6),
            _ => ("n", 1e9),
        };
        Self::plain(&format!("{prefix}{}", raised(si).replace("ohm", "Ω")), factor)
    }

    /// A value in SI as shown.
    pub(super) fn of(&self, si: f64) -> f64 {
        si * self.factor + self.offset
    }

    /// A difference in SI as shown.
    pub(super) fn width(&self, si: f64) -> f64 {
        si * self.factor
    }

    /// The unit behind a number, with the blank before it; a degree sign of an angle stands close.
    pub(super) fn behind(&self) -> String {
        match self.text.as_str() {
            "" => String::new(),
            "°" => "°".to_owned(),
            text => format!("\u{a0}{text}"),
        }
    }
}

/// `m/s2` as m/s², `N s/m` as N·s/m.
pub(super) fn raised(si: &str) -> String {
    let mut out = String::new();
    let mut after_letter = false;
    for c in si.chars() {
        let shown = match c {
            '2' if after_letter => '²',
            '3' if after_letter => '³',
            ' ' => '·',
            c => c,
        };
        after_letter = c.is_alphabetic();
        out.push(shown);
    }
    out
}

/// A number to so many significant digits, idle zeros dropped.
pub(super) fn significant(value: f64, digits: i32) -> String {
    if !value.is_finite() {
        return "\u{2013}".to_owned();
    }
    let size = value.abs();
    if size <= 0.0 {
        return "0".to_owned();
    }
    let power = whole(size.log10().floor());
    if !(-4..7).contains(&power) {
        return scientific(value, digits);
    }
    let text = fixed(value, digits - 1 - power);
    if text.contains('.') { text.trim_end_matches('0').trim_end_matches('.').to_owned() } else { text }
}

/// `value` to the second digit of `band`, but no more than nine digits; and the band to two digits.
pub(super) fn with_band(value: f64, band: f64) -> (String, String) {
    let band = band.abs();
    if band <= 0.0 || !band.is_finite() {
        return (significant(value, 7), "0".to_owned());
    }
    let place = whole(band.log10().floor());
    let size = if value.abs() > 0.0 { whole(value.abs().log10().floor()) } else { place };
    let decimals = (1 - place).min(8 - size);
    let band_text = if (-6..7).contains(&place) { fixed(band, 1 - place) } else { scientific(band, 2) };
    if value.abs() > 0.0 && !(-4..7).contains(&size) {
        return (scientific(value, (size - place + 2).clamp(2, 9)), band_text);
    }
    (fixed(value, decimals), band_text)
}

/// With so many decimals; negative ones round before the point.
fn fixed(value: f64, decimals: i32) -> String {
    let text = if decimals >= 0 {
        format!("{value:.*}", usize::try_from(decimals).unwrap_or(0).min(17))
    } else {
        let step = 10.0_f64.powi(-decimals);
        format!("{:.0}", (value / step).round() * step)
    };
    signed(&text)
}

fn scientific(value: f64, digits: i32) -> String {
    let text = format!("{value:.*e}", usize::try_from(digits - 1).unwrap_or(0).min(17));
    let (mantissa, power) = text.split_once('e').unwrap_or((&text, "0"));
    let mantissa = if mantissa.contains('.') { mantissa.trim_end_matches('0').trim_end_matches('.') } else { mantissa };
    let power: String = power.chars().map(superscript).collect();
    format!("{}\u{d7}10{power}", signed(mantissa))
}

fn superscript(c: char) -> char {
    const RAISED: [char; 10] = ['⁰', '¹', '²', '³', '⁴', '⁵', '⁶', '⁷', '⁸', '⁹'];
    c.to_digit(10).and_then(|d| RAISED.get(usize::try_from(d).ok()?).copied()).unwrap_or('⁻')
}

/// A true minus sign, and none before a zero.
fn signed(text: &str) -> String {
    match text.strip_prefix('-') {
        Some(rest) if rest.chars().all(|c| c == '0' || c == '.') => rest.to_owned(),
        Some(rest) => format!("\u{2212}{rest}"),
        None => text.to_owned(),
    }
}

/// Per cent to two digits.
pub(super) fn percent(part: f64) -> String {
    format!("{}\u{a0}%", significant(100.0 * part, 2))
}

#[expect(clippy::cast_possible_truncation, reason = "an exponent of ten of a finite number")]
fn whole(exact: f64) -> i32 {
    exact as i32
}

#[cfg(test)]
mod tests {
    #![allow(clippy::float_cmp, reason = "round numbers")]

    use super::*;

    #[test]
    fn figures_show_the_digits_their_band_leaves() {
        assert_eq!(with_band(100.352_680_6, 0.003_781_7), ("100.3527".to_owned(), "0.0038".to_owned()));
        assert_eq!(with_band(0.022_713_520_2, 1.8e-9), ("0.0227135202".to_owned(), "1.8×10⁻⁹".to_owned()));
        assert_eq!(with_band(17.36, 0.4), ("17.36".to_owned(), "0.40".to_owned()));
        assert_eq!(with_band(-1234.0, 260.0), ("\u{2212}1230".to_owned(), "260".to_owned()));
        assert_eq!(with_band(0.0, 2e-5), ("0.000000".to_owned(), "0.000020".to_owned()));
        assert_eq!(with_band(2.5, 0.0), ("2.5".to_owned(), "0".to_owned()));
    }

    #[test]
    fn units_are_handy() {
        let of = |si: &str, largest: f64| Unit::for_values(si, largest).text;
        assert_eq!(of("A/m2", 6.6e7), "A/mm²");
        assert_eq!(of("s", 0.0227), "ms");
        assert_eq!(of("H", 1.9e-4), "mH");
        assert_eq!(of("ohm", 3.0), "Ω");
        assert_eq!(of("N s/m", 44.0), "N·s/m");
        assert_eq!(of("m/s2", 81.0), "m/s²");
        assert_eq!(of("1", 9.3), "");
        assert_eq!(Unit::for_values("K", 300.0).of(293.15), 20.0);
        assert_eq!(Unit::for_values("K", 0.2).of(0.2), 0.2);
        assert_eq!(Unit::of_named("temperature_rise_peak", "K", 310.0).of(310.0), 310.0);
    }

    #[test]
    fn small_and_large_numbers_keep_their_size() {
        assert_eq!(significant(2.4588e-14, 3), "2.46×10⁻¹⁴");
        assert_eq!(significant(-0.000_12, 2), "\u{2212}0.00012");
        assert_eq!(significant(123_456.0, 3), "123000");
        assert_eq!(significant(f64::NAN, 3), "–");
    }
}
