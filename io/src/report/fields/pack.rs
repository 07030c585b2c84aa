//! An array as the page holds it: single precision, each row less the row above it (as whole numbers of their bits, so that nothing is
//! lost), the four bytes of all numbers apart from one another, deflated (zlib), base64. Smooth fields shrink to a third of their size.

use std::io::Write as _;

use base64::Engine as _;
use base64::engine::general_purpose::STANDARD;
use flate2::Compression;
use flate2::write::ZlibEncoder;

/// A packed array.
#[derive(Debug, Clone, PartialEq, Eq)]
pub(in crate::report) struct Packed {
    /// Its name.
    pub name: String,
    /// The data.
    pub base64: String,
}

impl Packed {
    /// Packs `values`: instants one after the other, each of its number of `rows` times `columns`.
    pub(super) fn of(name: &str, values: &[f64], rows: &[usize], columns: usize) -> Self {
        let words = differences(values, rows, columns);
        let mut bytes = Vec::with_capacity(4 * words.len());
        for plane in 0..4 {
            bytes.extend(words.iter().map(|word| word.to_le_bytes()[plane]));
        }
        let mut encoder = ZlibEncoder::new(Vec::new(), Compression::new(7));
        // Writing into memory cannot fail.
        let _ = encoder.write_all(&bytes);
        let base64 = STANDARD.encode(encoder.finish().unwrap_or_default());
        Self { name: name.to_owned(), base64 }
    }
}

/// The bits of each number less those of the number above it.
fn differences(values: &[f64], rows: &[usize], columns: usize) -> Vec<u32> {
    let bits: Vec<u32> = values.iter().map(|v| single(*v).to_bits()).collect();
    let mut out = Vec::with_capacity(bits.len());
    let mut start = 0;
    for rows in rows {
        let instant = bits.get(start..start + rows * columns).unwrap_or(&[]);
        for (i, word) in instant.iter().enumerate() {
            let above = i.checked_sub(columns).and_then(|k| instant.get(k)).copied().unwrap_or(0);
            out.push(word.wrapping_sub(above));
        }
        start += rows * columns;
    }
    out
}

/// Numbers with twelve bits of their mantissa: enough for level lines, and a third of the room.
pub(super) fn coarse(values: &[f64]) -> Vec<f64> {
    let one = |v: &f64| f64::from(f32::from_bits(single(*v).to_bits().wrapping_add(0x400) & !0x7ff));
    values.iter().map(one).collect()
}

#[expect(clippy::cast_possible_truncation, reason = "rounding to single precision is what is wanted")]
fn single(value: f64) -> f32 {
    value as f32
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, clippy::float_cmp, reason = "tests may stop at the first fault")]

    use std::io::Read as _;

    use super::*;

    /// As the page's script does it.
    fn unpacked(packed: &Packed, rows: &[usize], columns: usize) -> Vec<f32> {
        let deflated = STANDARD.decode(&packed.base64).unwrap();
        let mut bytes = Vec::new();
        flate2::read::ZlibDecoder::new(deflated.as_slice()).read_to_end(&mut bytes).unwrap();
        let n = bytes.len() / 4;
        let mut words: Vec<u32> =
            (0..n).map(|i| u32::from_le_bytes([bytes[i], bytes[n + i], bytes[2 * n + i], bytes[3 * n + i]])).collect();
        let mut start = 0;
        for rows in rows {
            for i in start + columns..start + rows * columns {
                words[i] = words[i].wrapping_add(words[i - columns]);
            }
            start += rows * columns;
        }
        words.into_iter().map(f32::from_bits).collect()
    }

    #[test]
    fn numbers_come_back_to_single_precision() {
        let values: Vec<f64> = (0..5 * 4).map(|i| f64::from(i * i - 50) * 1.234_567_89e5).collect();
        let rows = [2, 3];
        let back = unpacked(&Packed::of("x", &values, &rows, 4), &rows, 4);
        assert_eq!(back, values.iter().map(|v| single(*v)).collect::<Vec<f32>>());
    }

    #[test]
    fn coarse_numbers_are_near_enough_for_lines() {
        for value in [1.234_567e-5, -9.87e-7, 0.0, 3.3] {
            assert!((coarse(&[value])[0] - value).abs() <= 2.5e-4 * value.abs());
        }
    }
}
