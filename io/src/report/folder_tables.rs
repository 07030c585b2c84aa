//! The tables (CSV) of a result folder, column by column, with the unit that stands in each column's name.

use std::path::Path;

use crate::result::IoFault;

/// Largest table that is read, bytes: a hundred times what a long run writes.
const LARGEST: u64 = 256 << 20;

/// One table.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Table {
    /// Its file's name.
    pub file: String,
    /// Its columns, equally long.
    pub columns: Vec<Column>,
}

/// One column.
#[derive(Debug, Clone, PartialEq)]
pub(super) struct Column {
    /// As in the header line: `drag_band_N`.
    pub header: String,
    /// Without the unit: `drag_band`.
    pub stem: String,
    /// SI unit: `N`; `1` for a pure number.
    pub unit: String,
    /// Its cells.
    pub cells: Cells,
}

/// The cells of a column.
#[derive(Debug, Clone, PartialEq)]
pub(super) enum Cells {
    /// Every cell is a number, or empty (NaN).
    Numbers(Vec<f64>),
    /// Some are not.
    Texts(Vec<String>),
}

/// Endings of column names and the units they mean, longer ones before those they end in.
const ENDINGS: [(&str, &str); 31] = [
    ("_N_s_per_m", "N s/m"),
    ("_Wb_per_rad", "Wb/rad"),
    ("_m_per_s2", "m/s2"),
    ("_A_per_m2", "A/m2"),
    ("_W_per_m3", "W/m3"),
    ("_W_per_m2", "W/m2"),
    ("_S_per_m", "S/m"),
    ("_m_per_s", "m/s"),
    ("_N_per_m", "N/m"),
    ("_A_per_m", "A/m"),
    ("_W_per_K", "W/K"),
    ("_per_K", "1/K"),
    ("_percent", "%"),
    ("_degC", "degC"),
    ("_deg", "deg"),
    ("_rad", "rad"),
    ("_ohm", "ohm"),
    ("_Hz", "Hz"),
    ("_Wb", "Wb"),
    ("_Pa", "Pa"),
    ("_kg", "kg"),
    ("_T", "T"),
    ("_H", "H"),
    ("_V", "V"),
    ("_A", "A"),
    ("_J", "J"),
    ("_K", "K"),
    ("_N", "N"),
    ("_W", "W"),
    ("_s", "s"),
    ("_m", "m"),
];

/// A name without its unit, and the unit.
fn parted(header: &str) -> (&str, &'static str) {
    let found = ENDINGS.iter().find_map(|(ending, unit)| Some((header.strip_suffix(ending)?, *unit)));
    found.unwrap_or((header, "1"))
}

impl Column {
    /// A name without its unit: `drag_band` of `drag_band_N`.
    pub(super) fn stem_of(header: &str) -> String {
        parted(header).0.to_owned()
    }

    fn new(header: &str, cells: Vec<&str>) -> Self {
        let (stem, unit) = parted(header);
        let number = |cell: &&str| if cell.is_empty() { Some(f64::NAN) } else { cell.parse::<f64>().ok() };
        let numbers: Option<Vec<f64>> = cells.iter().map(number).collect();
        let cells = match numbers.filter(|n| n.is_empty() || n.iter().any(|x| x.is_finite())) {
            Some(numbers) => Cells::Numbers(numbers),
            None => Cells::Texts(cells.into_iter().map(str::to_owned).collect()),
        };
        Self { header: header.to_owned(), stem: stem.to_owned(), unit: unit.to_owned(), cells }
    }

    /// The numbers, if it holds numbers.
    pub(super) fn numbers(&self) -> Option<&[f64]> {
        match &self.cells {
            Cells::Numbers(numbers) => Some(numbers),
            Cells::Texts(_) => None,
        }
    }

    /// Whether it holds half-widths of another column's band.
    pub(super) fn is_band(&self) -> bool {
        self.stem.ends_with("_band")
    }
}

impl Table {
    /// Reads a table as the program writes it.
    pub(super) fn read(path: &Path) -> Result<Self, IoFault> {
        let misread = |why: String| IoFault::Misread { path: path.to_path_buf(), why };
        let unread = |source| IoFault::Unread { path: path.to_path_buf(), source };
        let size = std::fs::metadata(path).map_err(unread)?.len();
        if size > LARGEST {
            return Err(misread(format!("{size} bytes are more than a table of a result has")));
        }
        let text = std::fs::read_to_string(path).map_err(unread)?;
        let file = path.file_name().map_or_else(String::new, |name| name.to_string_lossy().into_owned());
        Self::parse(&file, &text).map_err(|e| misread(e.to_string()))
    }

    /// The table in a text.
    pub(super) fn parse(file: &str, text: &str) -> Result<Self, csv::Error> {
        let mut reader = csv::ReaderBuilder::new().from_reader(text.as_bytes());
        let headers = reader.headers()?.clone();
        let rows = reader.records().collect::<Result<Vec<_>, _>>()?;
        let column =
            |(i, header): (usize, &str)| Column::new(header, rows.iter().map(|r| r.get(i).unwrap_or("")).collect());
        Ok(Self { file: file.to_owned(), columns: headers.iter().enumerate().map(column).collect() })
    }

    /// A column by its name without unit.
    pub(super) fn column(&self, stem: &str) -> Option<&Column> {
        self.columns.iter().find(|c| c.stem == stem)
    }

    /// A column's numbers by its name without unit.
    pub(super) fn numbers(&self, stem: &str) -> Option<&[f64]> {
        self.column(stem)?.numbers()
    }

    /// The half-widths that belong to a column.
    pub(super) fn band_of(&self, stem: &str) -> Option<&[f64]> {
        self.numbers(&format!("{stem}_band"))
    }

    /// Its number of rows.
    pub(super) fn rows(&self) -> usize {
        self.columns.first().map_or(0, |c| match &c.cells {
            Cells::Numbers(cells) => cells.len(),
            Cells::Texts(cells) => cells.len(),
        })
    }
}

#[cfg(test)]
mod tests {
    #![allow(clippy::unwrap_used, reason = "tests may stop at the first fault")]

    use super::*;

    #[test]
    fn names_tell_their_units() {
        let of = |header: &str| {
            let c = Column::new(header, vec!["1"]);
            (c.stem, c.unit)
        };
        assert_eq!(of("drag_band_N"), ("drag_band".into(), "N".into()));
        assert_eq!(of("damping_coefficient_N_s_per_m"), ("damping_coefficient".into(), "N s/m".into()));
        assert_eq!(of("inductance_H"), ("inductance".into(), "H".into()));
        assert_eq!(of("shielding_factor"), ("shielding_factor".into(), "1".into()));
        assert_eq!(of("bore_temperature_K"), ("bore_temperature".into(), "K".into()));
    }

    #[test]
    fn cells_are_numbers_or_texts() {
        let table = Table::parse("t.csv", "figure,value_N\n\"a, b\",1.5\nc,\n").unwrap();
        assert_eq!(table.rows(), 2);
        assert_eq!(table.columns[0].cells, Cells::Texts(vec!["a, b".into(), "c".into()]));
        let values = table.numbers("value").unwrap();
        assert!((values[0] - 1.5).abs() < 1e-15 && values[1].is_nan());
    }
}
