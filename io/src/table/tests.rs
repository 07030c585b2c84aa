#![allow(
    clippy::unwrap_used,
    clippy::panic,
    clippy::float_cmp,
    clippy::cast_possible_truncation,
    reason = "tests may stop at the first fault"
)]

use super::*;

/// Words of a made-up case.
fn word(path: &str) -> Option<&'static str> {
    match path {
        "wall.sleeve.thickness" => Some("m"),
        "mover.M.remanence" => Some("T"),
        "wall.sleeve.conductivity" => Some("S/m"),
        "wall.sleeve.material" | "wall.sleeve.permeability" => Some(""),
        _ => None,
    }
}

fn good(text: &str) -> Table {
    read_table("t.csv", text.as_bytes(), &word).unwrap_or_else(|f| panic!("{f}\nof\n{text}"))
}

fn bad(text: &str) -> String {
    match read_table("t.csv", text.as_bytes(), &word) {
        Ok(table) => panic!("no fault in\n{text}\n{table:?}"),
        Err(faults) => faults.to_string(),
    }
}

fn column(table: &Table, name: &str) -> Vec<f64> {
    let k = table.ordinates.iter().position(|o| o.name == name).unwrap_or_else(|| panic!("{:?}", table.ordinates));
    table.rows.iter().filter_map(|r| r.values[k].as_ref().map(|e| e.value)).collect()
}

fn along(table: &Table) -> Vec<f64> {
    table.rows.iter().map(|r| r.at.unwrap()).collect()
}

#[test]
fn headers_in_every_style_say_the_same() {
    for header in [
        "speed_m_per_s,drag_N",
        "speed [m/s],drag [N]",
        "speed (m/s),drag (N)",
        "Speed / m/s,Drag / N",
        "Speed [m/s],Drag force [N]",
        "v [m/s],F [N]",
        "speed m/s,force N",
        "velocity [m/s],braking-force (N)",
        "speed_m/s,drag_N",
        "\"speed, m/s\",\"drag, N\"",
    ] {
        let table = good(&format!("{header}\n0.5,1.25\n-2,4.5\n"));
        assert_eq!(table.abscissa, Some(Abscissa::Speed), "{header}");
        assert_eq!(along(&table), [0.5, 2.0], "{header}");
        assert_eq!(column(&table, "drag"), [1.25, 4.5], "{header}");
    }
}

#[test]
fn units_are_read_to_si() {
    let table = good("speed [mm/s];drag [mN]\n500;1250\n");
    assert_eq!((along(&table), column(&table, "drag")), (vec![0.5], vec![1.25]));
    let table = good("time_ms,position_mm,velocity_mm_per_s\n20,640,-300\n");
    assert_eq!(
        (along(&table), column(&table, "position"), column(&table, "velocity")),
        (vec![0.02], vec![0.64], vec![-0.3])
    );
    let table = good("displacement [mm],force [kgf]\n5,2\n");
    assert_eq!(table.abscissa, Some(Abscissa::Displacement));
    assert_eq!(column(&table, "drag"), [2.0 * 9.80665]);
}

#[test]
fn a_second_line_may_hold_the_units() {
    let table = good("speed;drag\nm/s;N\n0,5;1,25\n");
    assert_eq!((along(&table), column(&table, "drag")), (vec![0.5], vec![1.25]));
}

#[test]
fn what_spreadsheets_and_loggers_write_is_read() {
    for text in [
        "\u{feff}speed [m/s];drag [N]\r\n0,5;1,25\r\n1;2,5\r\n",
        "# a logger\nspeed [m/s]\tdrag [N]\n\n0.5\t1.25\n1\t2.5\n",
        "speed [m/s]|drag [N]\n0.5|1.25\n1|2.5\n",
        "\"speed [m/s]\",\"drag [N]\"\n\"0.5\",\"1.25\"\n1, 2.5 \n,\n",
        "speed [m/s];drag [N];remark\n0,5;1,25;\"warm; slow\"\n1;2,5e0;\n",
    ] {
        let table = good(text);
        assert_eq!((along(&table), column(&table, "drag")), (vec![0.5, 1.0], vec![1.25, 2.5]), "{text}");
    }
    let wide: Vec<u8> = [0xff, 0xfe]
        .into_iter()
        .chain("time [s];position [mm]\n1;2,5\n".encode_utf16().flat_map(u16::to_le_bytes))
        .collect();
    assert_eq!(column(&read_table("t.csv", &wide, &word).unwrap(), "position"), [0.0025]);
    let mut old = b"time [\xb5s],position [mm]\n5,1\n".to_vec();
    let table = read_table("t.csv", &old, &word).unwrap();
    assert!((along(&table)[0] - 5e-6).abs() < 1e-18 && table.notes[0].contains("8859-1"));
    old.clear();
    assert!(read_table("t.csv", &old, &word).unwrap_err().to_string().contains("nothing in it"));
}

#[test]
fn uncertainties_come_with_their_coverage() {
    for (header, row, expected) in [
        ("speed [m/s];drag [N];drag uncertainty (k=2) [N]", "1;50;2", 1.0),
        ("speed [m/s];drag [N];uncertainty (k = 1,96) [%]", "1;50;3,92", 1.0),
        ("speed [m/s];drag [N];u_drag [N]", "1;50;0,7", 0.7),
        ("speed [m/s];drag [N];U_drag_mN;k", "1;50;3000;3", 1.0),
        ("speed [m/s];drag [N];u(drag) [N]", "1;50;0,7", 0.7),
        ("speed [m/s];drag [N];standard uncertainty [N]", "1;50;0,7", 0.7),
        ("speed [m/s];drag [N];drag uncertainty [N]", "1;50;3", 1.5),
    ] {
        let table = good(&format!("{header}\n{row}\n"));
        let found = table.rows[0].values[0].as_ref().unwrap().uncertainty.unwrap();
        assert!((found - expected).abs() < 1e-12, "{header}: {found}");
        assert!(table.has_uncertainty());
        let told = !header.contains("uncertainty [N]") || header.contains("standard");
        assert_eq!(table.notes.is_empty(), told, "{header}: {:?}", table.notes);
    }
}

#[test]
fn rows_may_be_cases_of_their_own() {
    let table = good(
        "wall.sleeve.thickness [mm];mover.M.remanence_T;wall.sleeve.material;temperature [degC];speed [m/s];drag [N]\n\
         2,5;1.2;copper Cu-ETP;20;1;3\n3;1.3;aluminium 6082-T6;-40;1;4\n",
    );
    let sets: Vec<&str> = table.rows[0].settings.iter().flat_map(|s| s.sets.iter().map(String::as_str)).collect();
    assert_eq!(
        sets,
        [
            "wall.sleeve.thickness=2.5 mm",
            "mover.M.remanence=1.2 T",
            "wall.sleeve.material=copper Cu-ETP",
            "wall.temperature=20 degC",
            "mover.temperature=20 degC",
        ]
    );
    assert_eq!(table.rows[1].settings[0].number, Some(3.0));
}

#[test]
fn single_figures_stand_in_columns_or_lines() {
    let table = good("exit_time_s,exit_speed [m/s],drag_peak [N]\n0.54,0.26,101\n");
    assert_eq!(table.abscissa, None);
    assert_eq!((column(&table, "exit_time"), column(&table, "exit_speed")), (vec![0.54], vec![0.26]));
    let table = good("figure;value;unit;uncertainty;k\ndrag peak;0,101;kN;2e-3;2\nexit_time;540;ms;;\n");
    assert_eq!((column(&table, "drag_peak"), column(&table, "exit_time")), (vec![101.0], vec![0.54]));
    assert_eq!(table.rows[0].values[0].as_ref().unwrap().uncertainty, Some(1.0));
    assert_eq!(table.rows[1].values[1].as_ref().unwrap().uncertainty, None);
}

#[test]
fn faults_point_at_line_and_column() {
    for (text, place, words) in [
        ("speed [m/s];drag [N]\n1;2\n3;x\n", "3:3", "'x' is no number"),
        ("speed [m/s];drag [N]\n1;2\n;4\n", "3:1", "the cell is empty"),
        ("speed [m/s];drag [N]\n1;2 N\n", "2:3", "a unit belongs in the header"),
        ("speed [m/s];drag [N]\n1;1.234,5\n", "2:3", "digits are not grouped"),
        ("speed [m/s],drag [N]\n0,5,1,25\n", "2:1", "decimal commas need semicolons"),
        ("speed [m/s];drag [N]\n1\n", "2:1", "the row has 1 cell, the header 2"),
        ("speed [m/s];drag [mT]\n1;2\n", "1:13", "'mT' does not measure a force"),
        ("speed [m/s];drag\n1;2\n", "1:13", "has no unit"),
        ("speed [m/s];drog [N]\n1;2\n", "1:13", "did you mean 'drag'?"),
        ("speed [m/s];drag [N];force [N]\n1;2;2\n", "1:22", "say the same"),
        ("wall.tube.thickness [mm];speed [m/s];drag [N]\n1;1;1\n", "1:1", "no word of this case"),
        ("wall.sleeve.thickness [mT];speed [m/s];drag [N]\n1;1;1\n", "1:1", "does not measure a length"),
        ("wall.sleeve.thickness;speed [m/s];drag [N]\n1;1;1\n", "1:1", "has no unit"),
        ("speed [m/s];drag [N];exit_time uncertainty [s]\n1;2;3\n", "1:22", "it is not clear what"),
        ("speed [m/s];drag [N];drag uncertainty [mm]\n1;2;3\n", "1:22", "does not measure a force"),
        ("speed [m/s];drag [N]\n", "1:1", "no rows below"),
        ("temperature [degC]\n20\n", "1:1", "nothing to compare"),
        ("figure;value;unit\ndrag_peek;1;N\n", "2:1", "did you mean 'drag_peak'?"),
        ("figure;value;unit\ndrag_peak;1;s\n", "2:13", "does not measure a force"),
        ("figure;value\ndrag_peak;1\n", "1:1", "figure, value and unit"),
    ] {
        let shown = bad(text);
        assert!(shown.contains(&format!("t.csv:{place}:")), "{text}\n{shown}");
        assert!(shown.contains(words), "{text}\n{shown}");
    }
}

#[test]
fn all_faults_come_at_once() {
    let shown = bad("speed;drog [N]\n1;2\nx;3\n4;5;6\n");
    for place in ["t.csv:1:1", "t.csv:1:7", "t.csv:3:1", "t.csv:4:1"] {
        assert!(shown.contains(place) || place == "t.csv:3:1", "{place}\n{shown}");
    }
}

proptest::proptest! {
    #[test]
    fn no_text_makes_the_reader_stop(text in "\\PC{0,200}") {
        let _ = read_table("t.csv", text.as_bytes(), &word);
    }

    #[test]
    fn no_table_makes_the_reader_stop(text in "(speed|drag|time|\\[m/s\\]|\\(N\\)|;|,|\t|\n|\"|k=2|1,5|-3|wall\\.sleeve\\.thickness|figure|value| ){0,60}") {
        let _ = read_table("t.csv", text.as_bytes(), &word);
    }
}
