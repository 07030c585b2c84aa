//! Every message, with the place it points to.

use super::{CASE, bad, with};

/// (what is replaced, by what, where the one fault must point, what the message must say).
type Row = (&'static str, &'static str, &'static str, &'static [&'static str]);

fn check(rows: &[Row]) {
    for (old, new, place, words) in rows {
        let text = with(old, new);
        let faults = bad(&text, &[]);
        let shown = faults.to_string();
        assert_eq!(faults.faults().len(), 1, "{new}\n{shown}");
        assert!(shown.starts_with(&format!("t.toml:{place}: ")), "{new} should be at {place}\n{shown}");
        for word in *words {
            assert!(shown.contains(word), "{new}: '{word}' is not in\n{shown}");
        }
    }
}

#[test]
fn unknown_words_get_the_nearest_legal_one() {
    check(&[
        ("mass =", "mas =", "11:1", &["'mas' is no word of [mover]", "did you mean 'mass'?"]),
        ("title =", "titel =", "1:1", &["'titel' is no word of a case file", "did you mean 'title'?"]),
        (
            "[travel]\n",
            "[travel]\nrelase = 1\n",
            "19:1",
            &["'relase' is no word of [travel]", "did you mean 'release'?"],
        ),
        (
            "name = \"M\"",
            "name = \"M\"\nthickness = \"1 mm\"",
            "14:1",
            &["'thickness' is no word of [[mover.magnet]]", "is a word of [[wall.layer]]"],
        ),
        ("", "[records]\nx = 1\n", "21:2", &["'records' is no word of a case file", "did you mean 'record'?"]),
        (
            "",
            "[zebra]\nx = 1\n",
            "21:2",
            &["'zebra' is no word", "words of this table: title, like, materials, record, wall"],
        ),
        ("", "[record]\nauthor = \"x\"\n", "22:1", &["'author' is no word of [record]", "document, revision, purpose"]),
        ("", "[accuracy]\ntargt = 1\n", "22:1", &["did you mean 'target'?"]),
        ("", "[output]\nfeilds = \"none\"\n", "22:1", &["did you mean 'fields'?"]),
        ("", "[curve]\nspeeds = [1, 2]\nspaceing = \"log\"\n", "23:1", &["did you mean 'spacing'?"]),
        ("[mover]\n", "[mover]\nmagnets = 1\n", "11:1", &["did you mean 'magnet'?"]),
    ]);
}

#[test]
fn missing_words_say_what_they_are_for() {
    check(&[
        ("length = \"600 mm\"\n", "", "2:2", &["[wall] lacks 'length'", "length = \"endless\""]),
        ("outer_diameter = \"28 mm\"\n", "", "4:1", &["lacks 'outer_diameter'", "two of inner_diameter"]),
        ("thickness = \"1.5 mm\"\n", "", "4:1", &["lacks 'thickness'", "two of inner_diameter"]),
        ("conductivity = \"50 MS/m\"\n", "", "4:1", &["lacks 'conductivity'", "copper Cu-DHP"]),
        ("remanence = \"1.3 T\"\n", "", "12:1", &["lacks 'remanence'", "NdFeB N42SH"]),
        ("outer_diameter = \"22 mm\"\n", "", "12:1", &["lacks 'outer_diameter'"]),
        ("length = \"12 mm\"\n", "", "12:1", &["lacks 'length'"]),
        ("release = \"640 mm\"\n", "", "18:2", &["[travel] lacks 'release'", "let go"]),
        ("law = \"free\"\n", "", "18:2", &["[travel] lacks 'law'", "steady, traverse, free, sine or table"]),
        (
            "mass = \"0.42 kg\"\n",
            "",
            "10:2",
            &["needs the mass", "mass = \"0.42 kg\"", "the law that needs it: t.toml:18:7"],
        ),
        ("[travel]\nlaw = \"free\"\nrelease = \"640 mm\"\n", "", "1:1", &["a case file lacks 'travel'", "[curve]"]),
        ("", "spring_rate = \"5 N/m\"\n", "18:2", &["lacks 'spring_free_at'"]),
    ]);
}

#[test]
fn whole_tables_that_are_missing_are_named() {
    let shown = bad("title = \"x\"", &[]).to_string();
    for words in ["lacks 'wall'", "lacks 'mover'", "lacks 'travel'", "t.toml:1:1", "3 faults"] {
        assert!(shown.contains(words), "{words}\n{shown}");
    }
    assert!(bad("", &[]).to_string().contains("lacks 'wall'"));
    let shown = bad("[wall]\nlength = \"1 m\"\n[mover]\n[curve]\nspeeds = [1, 2]", &[]).to_string();
    assert!(shown.contains("[wall] lacks 'layer'") && shown.contains("[mover] lacks 'magnet'"), "{shown}");
}

#[test]
fn quantities_are_refused_with_the_units_that_fit() {
    check(&[
        (
            "\"12 mm\"",
            "\"12 mT\"",
            "17:10",
            &["length: 'mT' does not measure a length but a flux density", "mm, um, cm, m, in, mil", "^^^^^^^"],
        ),
        ("\"12 mm\"", "\"12 mn\"", "17:10", &["'mn' is no known unit", "did you mean 'mm'?"]),
        ("\"12 mm\"", "\"12\"", "17:10", &["'12' has no unit", "did you mean \"12 mm\"?"]),
        ("\"12 mm\"", "\"1,2 mm\"", "17:10", &["comma", "did you mean '1.2 mm'?"]),
        ("\"12 mm\"", "\"long\"", "17:10", &["'long' does not start with a number"]),
        ("\"12 mm\"", "\"NaN mm\"", "17:10", &["not a finite number"]),
        ("\"12 mm\"", "nan", "17:10", &["not a finite number"]),
        ("\"12 mm\"", "-inf", "17:10", &["not a finite number"]),
        ("\"12 mm\"", "true", "17:10", &["'length' is true or false here, and a quantity belongs here", "\"12 mm\""]),
        ("\"12 mm\"", "[1, 2]", "17:10", &["'length' is a list here"]),
        ("\"12 mm\"", "1979-05-27", "17:10", &["'length' is a date here"]),
        ("\"12 mm\"", "99999999999999999999", "17:10", &["impossible"]),
        ("\"50 MS/m\"", "\"50 mS\"", "6:16", &["does not measure a conductivity", "%IACS"]),
        ("\"50 MS/m\"", "\"0 nohm m\"", "6:16", &["a resistivity of zero has no conductivity"]),
        ("\"0.42 kg\"", "\"0.42 N\"", "11:8", &["does not measure a mass but a force", "kg, g"]),
    ]);
}

#[test]
fn impossible_numbers_say_what_is_sensible() {
    check(&[
        ("\"12 mm\"", "\"-12 mm\"", "17:10", &["length = -12 mm is impossible", "greater than 0"]),
        ("\"12 mm\"", "\"0 mm\"", "17:10", &["length = 0 mm is impossible", "greater than 0"]),
        ("\"12 mm\"", "\"12e9 mm\"", "17:10", &["sensible"]),
        ("\"1.5 mm\"", "\"-1.5 mm\"", "9:13", &["thickness = -1.5 mm is impossible"]),
        ("\"1.5 mm\"", "\"15 mm\"", "9:13", &["thickness = 15 mm is impossible", "at most 14 mm thick (a rod)"]),
        ("\"50 MS/m\"", "\"-50 MS/m\"", "6:16", &["0 or greater"]),
        ("\"50 MS/m\"", "5e11", "6:16", &["sensible", "a bare number is in S/m"]),
        ("\"1.3 T\"", "\"13 T\"", "14:13", &["remanence = 13 T is impossible", "-10 T to 10 T"]),
        ("\"0.42 kg\"", "\"0 kg\"", "11:8", &["greater than 0"]),
        ("\"600 mm\"", "\"-600 mm\"", "3:10", &["greater than 0"]),
        ("name = \"sleeve\"", "name = \"sleeve\"\npermeability = 0", "6:16", &["greater than 0"]),
        ("name = \"sleeve\"", "name = \"sleeve\"\npermeability = -1", "6:16", &["greater than 0"]),
        (
            "length = \"600 mm\"",
            "length = \"600 mm\"\ntemperature = 20",
            "4:15",
            &["a bare number is in K", "did you mean \"20 degC\"?"],
        ),
        ("length = \"600 mm\"", "length = \"600 mm\"\ntemperature = \"-300 degC\"", "4:15", &["impossible"]),
        ("", "tilt_from_vertical = \"120 deg\"\n", "21:22", &["impossible"]),
        ("", "friction = \"-1 N\"\n", "21:12", &["0 or greater"]),
        ("", "time_limit = \"0 s\"\n", "21:14", &["greater than 0"]),
    ]);
}

#[test]
fn choices_are_listed() {
    check(&[
        (
            "law = \"free\"\nrelease = \"640 mm\"",
            "law = \"fre\"\n",
            "19:7",
            &[
                "law = 'fre' is none of its values",
                "legal values: \"steady\", \"traverse\", \"free\", \"sine\", \"table\", \"alternating\"\n",
                "did you mean \"free\"?",
            ],
        ),
        (
            "name = \"M\"",
            "name = \"M\"\nnorth = \"left\"",
            "14:9",
            &["north = 'left' is none of its values", "\"up\", \"down\""],
        ),
        ("length = \"600 mm\"", "length = \"endles\"", "3:10", &["length = 'endles'", "did you mean \"endless\"?"]),
        ("", "[output]\nwrite = [\"summry\"]\n", "22:10", &["write = 'summry'", "did you mean \"summary\"?"]),
        ("", "[output]\nfields = \"often\"\n", "22:10", &["fields = 'often'", "every 20 mm"]),
        ("", "[curve]\nspeeds = [1, 2]\nspacing = \"cubic\"\n", "23:11", &["spacing = 'cubic'", "\"log\", \"linear\""]),
        (
            "remanence = \"1.3 T\"",
            "material = \"N42\"\ngrade_value = \"max\"",
            "15:15",
            &["grade_value = 'max'", "\"minimum\", \"typical\", \"maximum\""],
        ),
    ]);
}

#[test]
fn shapes_are_checked() {
    check(&[
        ("title = \"Test sleeve\"", "title = 3", "1:9", &["'title' is a number here, and a text belongs here"]),
        (
            "[[mover.magnet]]",
            "[mover.magnet]",
            "12:8",
            &["'magnet' is a table here, and a list of tables belongs here"],
        ),
        ("", "[accuracy]\nlevels = 2.5\n", "22:10", &["levels = 2.5 is impossible", "a whole number from 3 to 5"]),
        ("", "[accuracy]\nlevels = \"three\"\n", "22:10", &["'levels' is a text here"]),
        ("", "[accuracy]\ncells_across_wall = 5\n", "22:21", &["5 cells across the wall", "even number"]),
        ("", "[accuracy]\ntarget = \"0 %\"\n", "22:10", &["greater than 0"]),
        ("", "gates = \"600 mm\"\n", "21:9", &["'gates' is a text here, and a list belongs here"]),
        ("", "gates = [\"600 mm\"]\n", "21:9", &["there are two gates"]),
        ("", "gates = [\"600 mm\", \"600 mm\"]\n", "21:9", &["both gates stand at 600 mm"]),
        ("", "[output]\nfields = [\"2 s\", \"1 s\"]\n", "22:10", &["instants increase"]),
        ("", "[output]\nfields = 3\n", "22:10", &["'fields' is a number here"]),
        ("", "[output]\nfields = \"every 3 kg\"\n", "22:10", &["does not measure a length but a mass"]),
        ("", "[output]\nwrite = [3]\n", "22:10", &["it lists names of results"]),
        ("", "[[output.station]]\nat = \"1 mm\"\nwhat = \"flux density\"\n", "21:1", &["diameter"]),
        (
            "",
            "[[output.station]]\nat = 0.1\ndiameter = 0.04\nwhat = \"flux\"\n",
            "24:8",
            &["flux density", "search coil"],
        ),
        ("", "[[output.station]]\nat = 0.1\ndiameter = 0.04\nwhat = \"search coil\"\n", "21:1", &["turns"]),
        (
            "",
            "[[output.station]]\nat = 0.1\ndiameter = 0.04\nwhat = \"current density\"\n",
            "23:12",
            &["no layer conducts"],
        ),
        (
            "",
            "[[output.station]]\nat = 0.1\nradius = 0.002\nwhat = \"flux density\"\n",
            "23:10",
            &["in the way of part 'M'"],
        ),
        ("", "[[output.station]]\nat = 9\nradius = 0.02\nwhat = \"flux density\"\n", "23:10", &["farther"]),
        ("", "[curve]\nspeeds = [2, 1]\n", "22:10", &["speeds increase"]),
        ("", "[curve]\ntemperatures = [\"20 degC\"]\n", "21:2", &["speeds"]),
        ("", "[curve]\nspeeds = [1, 2]\ntemperatures = [20, \"70 degC\"]\n", "23:17", &["20 degC"]),
        (
            "",
            "[curve]\nspeeds = [1, 2]\ntemperatures = [\"70 degC\", \"20 degC\"]\n",
            "23:16",
            &["temperatures increase"],
        ),
        ("", "[curve]\npositions = [0.1, 0]\n", "22:13", &["positions increase"]),
        ("", "[curve]\nfrequencies = [10, 20]\n", "22:15", &["law 'sine'"]),
        ("", "[curve]\npositions = [0, 0.1, 0.2]\npoints = 5\n", "23:10", &["'points' beside"]),
        ("", "[curve]\nspeeds = [0, 1]\n", "22:11", &["greater than 0"]),
        ("", "[curve]\npoints = 3\n", "21:2", &["[curve] lacks 'speeds'"]),
        ("", "[curve]\nspeeds = [1, 2, 3]\npoints = 3\n", "23:10", &["beside a list of more than two speeds"]),
        ("", "[curve]\nspeeds = [1, 2]\npoints = 1\n", "23:10", &["a whole number from 2"]),
    ]);
}

#[test]
fn given_motions_need_their_words() {
    let free = "law = \"free\"\nrelease = \"640 mm\"";
    check(&[
        (free, "law = \"sine\"\namplitude = \"5 mm\"", "18:2", &["lacks 'frequency'"]),
        (free, "law = \"sine\"\nfrequency = \"5 Hz\"", "18:2", &["lacks 'amplitude'", "half the stroke"]),
        (
            free,
            "law = \"sine\"\namplitude = \"0 mm\"\nfrequency = \"5 Hz\"",
            "20:13",
            &["amplitude = 0 mm is impossible"],
        ),
        (
            free,
            "law = \"sine\"\namplitude = \"5 mm\"\nfrequency = \"5 Hz\"\ncycles = 0",
            "22:10",
            &["a whole number from 1 to 400"],
        ),
        (free, "law = \"table\"", "18:2", &["lacks 'file'"]),
        (free, "law = \"table\"\nfile = \"nowhere.csv\"", "20:8", &["cannot read", "there is no such file"]),
    ]);
}

#[test]
fn words_of_later_work_are_refused_as_not_modelled_yet() {
    check(&[("", "[[mover.iron]]\nlength = \"1 mm\"\n", "21:9", &["[[mover.iron]]", "not modelled yet"])]);
}

#[test]
fn materials_are_refused_with_grades_to_choose_from() {
    check(&[
        (
            "conductivity = \"50 MS/m\"\n",
            "material = \"copper\"\n",
            "6:12",
            &["'copper' names no grade", "\"copper Cu-ETP\", ", "\"copper Cu-DHP\"", "or give 'conductivity' itself"],
        ),
        (
            "conductivity = \"50 MS/m\"\n",
            "material = \"copper Cu-DPH\"\n",
            "6:12",
            &["no conductor 'copper Cu-DPH'", "did you mean \"copper Cu-DHP\"?"],
        ),
        (
            "conductivity = \"50 MS/m\"\n",
            "material = \"unobtainium\"\n",
            "6:12",
            &["no conductor 'unobtainium'", "grades to choose from"],
        ),
        ("conductivity = \"50 MS/m\"\n", "material = \"N42\"\n", "6:12", &["no conductor 'N42'"]),
        (
            "remanence = \"1.3 T\"\n",
            "material = \"NdFeB\"\n",
            "14:12",
            &["'NdFeB' names no grade", "\"NdFeB N42SH\"", "or give 'remanence' itself"],
        ),
        ("remanence = \"1.3 T\"\n", "material = \"N43\"\n", "14:12", &["no magnet 'N43'", "did you mean"]),
        (
            "remanence = \"1.3 T\"\n",
            "remanence = \"1.3 T\"\ngrade_value = \"typical\"\n",
            "15:15",
            &["'grade_value' without 'material'"],
        ),
    ]);
}

#[test]
fn contradictions_say_what_to_take_out() {
    check(&[
        (
            "thickness = \"1.5 mm\"",
            "thickness = \"1.5 mm\"\ninner_diameter = \"25 mm\"",
            "9:13",
            &["any two of the three sizes give the third", "give two"],
        ),
        ("thickness = \"1.5 mm\"", "size = \"28 x 1.5 mm\"", "8:18", &["'size' and 'outer_diameter'"]),
        (
            "outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"",
            "size = \"28 mm\"",
            "8:8",
            &["a trade size is outer diameter x wall"],
        ),
        (
            "outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"",
            "size = \"28 x 1.5 mT\"",
            "8:8",
            &["'mT' does not measure a length"],
        ),
        (
            "outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"",
            "size = \"28 x 15 mm\"",
            "8:8",
            &["at most 14 mm thick"],
        ),
        (
            "outer_diameter = \"28 mm\"\nthickness = \"1.5 mm\"",
            "outer_diameter = \"25 mm\"\ninner_diameter = \"28 mm\"",
            "9:18",
            &["no thickness", "inner diameter 28 mm and outer diameter 25 mm"],
        ),
        (
            "conductivity = \"50 MS/m\"\n",
            "material = \"Cu-ETP\"\nconductivity_at = \"20 degC\"\n",
            "7:19",
            &["'conductivity_at' without 'conductivity'"],
        ),
        (
            "outer_diameter = \"22 mm\"",
            "outer_diameter = \"22 mm\"\ninner_diameter = \"23 mm\"",
            "17:18",
            &["a hole of 23 mm does not fit into 22 mm"],
        ),
        (
            "length = \"12 mm\"",
            "length = \"12 mm\"\ncoating = \"6 mm\"",
            "18:11",
            &["coating = 6 mm is impossible", "less than half the length"],
        ),
        (
            "release = \"640 mm\"",
            "release = \"640 mm\"\nspeed = \"2 m/s\"",
            "21:1",
            &["'speed' in a travel of law 'free'", "it is a word of law 'steady'", "words of law 'free': release"],
        ),
        ("mass = \"0.42 kg\"", "mass = \"0.42 kg\"\nstack_gap = \"0.1 mm\"", "12:13", &["'stack_gap' without 'stack'"]),
        ("mass = \"0.42 kg\"", "mass = \"0.42 kg\"\nreference = \"middle\"", "12:13", &["'reference' without 'stack'"]),
        (
            "temperature_coefficient = \"0.004 /K\"",
            "temperature_coefficient = \"-0.01 /K\"\nconductivity_at = \"-100 degC\"",
            "7:27",
            &["resistivity would fall to zero"],
        ),
    ]);
}

#[test]
fn speeds_are_magnitudes() {
    let law = |law: &str| with("law = \"free\"\nrelease = \"640 mm\"", law);
    let shown = bad(&law("law = \"traverse\"\nspeed = \"-2 m/s\""), &[]).to_string();
    assert!(shown.starts_with("t.toml:20:9: speed = -2 m/s is impossible"), "{shown}");
    assert!(shown.contains("a speed is a magnitude") && shown.contains("swap 'from' and 'to'"), "{shown}");
    let shown = bad(&law("law = \"traverse\"\nspeed = \"0 m/s\""), &[]).to_string();
    assert!(shown.contains("its speed is greater than 0"), "{shown}");
    let steady = law("law = \"steady\"\nspeed = \"-2 m/s\"").replace("600 mm", "endless");
    let shown = bad(&steady, &[]).to_string();
    assert!(shown.contains("the drag is the same both ways"), "{shown}");
}

#[test]
fn names_must_be_distinct_and_addressable() {
    check(&[
        ("name = \"sleeve\"", "name = \"length\"", "5:8", &["the name 'length' is a word of the same table"]),
        ("name = \"sleeve\"", "name = \"\"", "5:8", &["the name '' is empty"]),
        ("name = \"sleeve\"", "name = \"a.b\"", "5:8", &["no quotes, points"]),
        ("name = \"M\"", "name = \"M+\"", "13:8", &["ends in a sign"]),
        (
            "",
            "[[mover.spacer]]\nname = \"M\"\nlength = \"1 mm\"\n",
            "22:8",
            &["the name 'M' is taken", "first: t.toml:13:8"],
        ),
    ]);
}

#[test]
fn a_misspelt_word_is_not_missing_too() {
    check(&[
        ("thickness =", "thicknes =", "9:1", &["'thicknes' is no word of [[wall.layer]]", "did you mean 'thickness'?"]),
        ("release =", "relase =", "20:1", &["'relase' is no word of [travel]", "did you mean 'release'?"]),
    ]);
}

#[test]
fn a_part_that_stands_twice_in_a_stack_has_its_fault_once() {
    let text = with("[mover]\n", "[mover]\nstack = [\"M+\", \"M-\"]\n").replace("\"22 mm\"", "\"26 mm\"");
    assert_eq!(bad(&text, &[]).faults().len(), 1);
}

#[test]
fn all_faults_are_reported_at_once_in_order() {
    let text = with("\"600 mm\"", "\"600 mT\"")
        .replace("temperature_coefficient =", "temprature_coefficient =")
        .replace("\"12 mm\"", "\"-12 mm\"")
        .replace("law = \"free\"", "law = \"fall\"");
    let faults = bad(&text, &[]);
    let lines: Vec<usize> = faults.faults().iter().filter_map(|f| faults.location(f)).map(|(_, at)| at.line).collect();
    assert_eq!(lines, [3, 7, 17, 19], "{faults}");
    assert!(faults.to_string().ends_with("\n4 faults\n"));
}

#[test]
fn text_that_is_no_toml_points_at_the_slip() {
    check(&[(
        "length = \"600 mm\"",
        "length = 600 mm",
        "3:10",
        &["not readable as TOML", "stands in quotes: length = \"600 mm\""],
    )]);
    for text in ["length = \"600 mm", "= 3", "[wall", "a = 1\na = 2", "\u{0}", "a = [1, 2", "[a]\n[a]"] {
        assert!(bad(text, &[]).to_string().contains("not readable as TOML"), "{text}");
    }
}

#[test]
fn files_that_cannot_be_read_are_named() {
    let missing = super::read_case(&super::CaseSource::Path(std::path::Path::new("no/such.toml")), &[]).unwrap_err();
    assert_eq!(missing.to_string(), "cannot read no/such.toml: there is no such file\n");
    let folder = tempfile::tempdir().unwrap();
    let shown = super::read_case(&super::CaseSource::Path(folder.path()), &[]).unwrap_err().to_string();
    assert!(shown.contains("it is a folder"), "{shown}");
    let file = folder.path().join("latin.toml");
    std::fs::write(&file, b"title = \"H\xfclse\"").unwrap();
    let shown = super::read_case(&super::CaseSource::Path(&file), &[]).unwrap_err().to_string();
    assert!(shown.contains("it is not UTF-8 text"), "{shown}");
}

#[test]
fn a_byte_order_mark_and_windows_line_ends_do_no_harm() {
    let text = format!("\u{feff}{}", CASE.replace('\n', "\r\n"));
    super::good(&text, &[]);
    let shown = bad(&text.replace("\"12 mm\"", "\"12 mT\""), &[]).to_string();
    assert!(shown.starts_with("t.toml:17:10: "), "{shown}");
}
