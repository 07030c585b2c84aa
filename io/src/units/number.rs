//! Splits a written quantity into its number and its unit.

use super::fault::QuantityFault;

/// The number as written (signs and digits in plain ASCII) and the rest of the text.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Split<'a> {
    /// Digits that `f64::from_str` reads, without an exponent.
    pub digits: String,
    /// Power of ten written behind `e`.
    pub exponent: i32,
    /// What follows, trimmed.
    pub rest: &'a str,
}

impl Split<'_> {
    /// The number times `10^exponent`, rounded once.
    pub fn value_scaled(&self, exponent: i32) -> f64 {
        let power = self.exponent.saturating_add(exponent);
        format!("{}e{power}", self.digits).parse().unwrap_or(f64::NAN)
    }
}

/// Splits `text`; the number must come first.
pub(super) fn split(text: &str) -> Result<Split<'_>, QuantityFault> {
    let trimmed = text.trim();
    let (sign, unsigned) = take_sign(trimmed);
    if is_not_a_number(unsigned) {
        return Err(QuantityFault::NotFinite { text: trimmed.to_owned() });
    }
    let end = digits_end(unsigned);
    let mantissa = &unsigned[..end];
    if !mantissa.bytes().any(|b| b.is_ascii_digit()) {
        return Err(QuantityFault::NoNumber { text: trimmed.to_owned() });
    }
    let (exponent, rest) = take_exponent(&unsigned[end..]);
    if let Some(tail) = rest.strip_prefix(',') {
        return Err(comma(trimmed, sign, mantissa, tail));
    }
    Ok(Split { digits: format!("{sign}{mantissa}"), exponent, rest: rest.trim() })
}

fn take_sign(text: &str) -> (&'static str, &str) {
    for minus in ["-", "\u{2212}"] {
        if let Some(rest) = text.strip_prefix(minus) {
            return ("-", rest.trim_start());
        }
    }
    ("", text.strip_prefix('+').unwrap_or(text))
}

fn is_not_a_number(unsigned: &str) -> bool {
    let word: String = unsigned.chars().take_while(|c| c.is_alphabetic()).collect::<String>().to_lowercase();
    ["nan", "inf", "infinity"].contains(&word.as_str())
}

/// Length of the leading digits with at most one decimal point.
fn digits_end(text: &str) -> usize {
    let mut point = false;
    text.bytes()
        .position(|b| {
            let first_point = b == b'.' && !point;
            point |= first_point;
            !(b.is_ascii_digit() || first_point)
        })
        .unwrap_or(text.len())
}

/// Reads `e-3` where digits follow the `e`; otherwise the text is a unit.
fn take_exponent(text: &str) -> (i32, &str) {
    let Some(after) = text.strip_prefix(['e', 'E']) else { return (0, text) };
    let unsigned = after.strip_prefix(['+', '-']).unwrap_or(after);
    let digits = unsigned.bytes().take_while(u8::is_ascii_digit).count();
    if digits == 0 {
        return (0, text);
    }
    let length = after.len() - unsigned.len() + digits;
    let limit = if after.starts_with('-') { i32::MIN } else { i32::MAX };
    (after[..length].parse().unwrap_or(limit), &after[length..])
}

/// `1,5 mm` becomes `1.5 mm` in the hint; `1,200.5 mm` and `1,200,000` lose their grouping.
fn comma(text: &str, sign: &str, mantissa: &str, tail: &str) -> QuantityFault {
    let grouped = tail.contains(',') || tail.contains('.') || mantissa.contains('.');
    let joint = if grouped { "" } else { "." };
    let suggestion = format!("{sign}{mantissa}{joint}{}", tail.replace(',', ""));
    QuantityFault::DecimalComma { text: text.to_owned(), suggestion }
}
