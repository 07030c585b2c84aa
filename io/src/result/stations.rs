//! What gauges read: the text of `stations.csv`, its place in `summary.json`.

use lenzbore_solver::outcome::{StationSeries, StationTrace};
use serde_json::{Map, Value, json};

use super::fault::IoFault;
use super::finite::{all_finite, number};
use super::series::decimal;

/// A column of a station: name with the unit, SI unit, what it is, the values.
pub(super) type StationColumn<'a> = (String, &'static str, &'static str, &'a [f64]);

/// The columns of one reading: the values and the half-widths of their bands.
pub(super) fn columns(series: &StationSeries) -> [StationColumn<'_>; 2] {
    let (stem, ending) = split(series.name);
    [
        (series.name.to_owned(), series.unit, series.description, &series.values),
        (format!("{stem}_band{ending}"), series.unit, "half-width of its numerical band", &series.bands),
    ]
}

/// A name and its unit's ending.
fn split(name: &'static str) -> (&'static str, &'static str) {
    let endings = ["_A_per_m2", "_T", "_V"];
    endings.into_iter().find_map(|e| Some((name.strip_suffix(e)?, e))).unwrap_or((name, ""))
}

/// All stations beside each other, a row an instant; a column is named `station:reading`.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub fn stations_csv(stations: &[StationTrace]) -> Result<String, IoFault> {
    let Some(first) = stations.first() else { return Ok(String::new()) };
    let mut names = vec!["time_s".to_owned(), "position_m".to_owned()];
    let mut values: Vec<&[f64]> = vec![&first.time_s, &first.position_m];
    for station in stations {
        for (name, _, _, column) in station.series.iter().flat_map(columns) {
            all_finite(&format!("{name} of station {}", station.name), column)?;
            names.push(format!("{}:{name}", plain(&station.name)));
            values.push(column);
        }
    }
    let mut text = names.join(",");
    text.push('\n');
    for row in 0..first.time_s.len() {
        let cells: Vec<String> = values.iter().map(|c| c.get(row).map_or_else(String::new, |v| decimal(*v))).collect();
        text.push_str(&cells.join(","));
        text.push('\n');
    }
    Ok(text)
}

/// A name that parts no columns.
fn plain(name: &str) -> String {
    name.replace([',', ';', '"'], " ")
}

/// The entry of `summary.json`: where each station is and the peaks of its readings.
///
/// # Errors
/// [`IoFault::NotFinite`].
pub(super) fn stations_object(stations: &[StationTrace]) -> Result<Value, IoFault> {
    let mut all = Map::new();
    for station in stations {
        let mut readings = Map::new();
        for series in &station.series {
            let entry = json!({
                "unit": series.unit,
                "peak": number("a station's peak", series.peak)?,
                "band": number("the band of a station's peak", series.peak_band)?,
                "time_s": number("the time of a station's peak", series.peak_at.t_s.unwrap_or(0.0))?,
            });
            readings.insert(series.name.to_owned(), entry);
        }
        let entry = json!({
            "what": station.what,
            "height_m": number("a station's height", station.at_m)?,
            "radius_m": number("a station's radius", station.radius_m)?,
            "readings": readings,
        });
        all.insert(station.name.clone(), entry);
    }
    Ok(Value::Object(all))
}
