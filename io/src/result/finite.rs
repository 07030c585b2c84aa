//! Numbers on their way out: never NaN, never infinite.

use serde_json::{Number, Value};

use super::fault::IoFault;

/// `value` as it is, with -0 turned to 0.
///
/// # Errors
/// [`IoFault::NotFinite`] naming `what`.
pub(super) fn finite(what: &str, value: f64) -> Result<f64, IoFault> {
    if value.is_finite() { Ok(value + 0.0) } else { Err(IoFault::NotFinite { what: what.to_owned(), found: value }) }
}

/// `value` as a JSON number.
///
/// # Errors
/// [`IoFault::NotFinite`] naming `what`.
pub(super) fn number(what: &str, value: f64) -> Result<Value, IoFault> {
    let value = finite(what, value)?;
    Number::from_f64(value).map(Value::Number).ok_or_else(|| IoFault::NotFinite { what: what.to_owned(), found: value })
}

/// A whole series as it is.
///
/// # Errors
/// [`IoFault::NotFinite`] naming `what` and the place in it.
pub(super) fn all_finite(what: &str, values: &[f64]) -> Result<(), IoFault> {
    match values.iter().position(|v| !v.is_finite()) {
        None => Ok(()),
        Some(index) => Err(IoFault::NotFinite { what: format!("{what} [{index}]"), found: values[index] }),
    }
}
