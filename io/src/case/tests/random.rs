//! No text and no override, however wild, makes the reader panic; and what it accepts can be solved.

use proptest::prelude::*;

use super::*;

/// Lines of the vocabulary with wild values, in any order.
fn wild_line() -> impl Strategy<Value = String> {
    let words: Vec<&'static str> = TABLES.iter().flat_map(|t| t.words.iter().copied()).collect();
    let tables: Vec<String> = TABLES.iter().filter(|t| !t.path.is_empty()).map(|t| t.label.to_owned()).collect();
    let value = prop_oneof![
        Just("\"12 mm\"".to_owned()),
        Just("\"1 m/s\"".to_owned()),
        Just("\"free\"".to_owned()),
        Just("[\"M+\", \"M-\"]".to_owned()),
        Just("\"M\"".to_owned()),
        Just("nan".to_owned()),
        Just("\"28 x 1.5 mm\"".to_owned()),
        Just("[[1], {a = 2}]".to_owned()),
        Just("{ name = \"M\" }".to_owned()),
        any::<f64>().prop_map(|x| format!("{x:e}")),
        any::<i64>().prop_map(|x| x.to_string()),
        "\"[a-zA-Z0-9 ,.x/%-]{0,12}\"",
    ];
    prop_oneof![
        3 => (prop::sample::select(words), value).prop_map(|(w, v)| format!("{w} = {v}")),
        1 => prop::sample::select(tables),
    ]
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]

    #[test]
    fn any_text_is_read_or_refused(text in "\\PC{0,200}") {
        if let Err(faults) = read(&text, &[]) {
            prop_assert!(!faults.to_string().is_empty());
        }
    }

    #[test]
    fn any_words_are_read_or_refused(lines in prop::collection::vec(wild_line(), 0..25)) {
        // A word twice in a table is no TOML: keep the first of each table.
        let mut seen = std::collections::BTreeSet::new();
        let mut table = 0;
        let kept: Vec<String> = lines.into_iter().filter(|line| {
            match line.split_once(" = ") {
                Some((word, _)) => seen.insert((table, word.to_owned())),
                None => { table += 1; line.starts_with("[[") || seen.insert((usize::MAX, line.clone())) }
            }
        }).collect();
        if let Err(faults) = read(&kept.join("\n"), &[]) {
            prop_assert!(!faults.to_string().is_empty());
        }
    }

    #[test]
    fn a_sound_case_with_one_wild_line_is_solvable_or_refused(line in wild_line(), at in 0usize..20) {
        let mut lines: Vec<&str> = CASE.lines().collect();
        lines.insert(at.min(lines.len()), &line);
        match read(&lines.join("\n"), &[]) {
            Ok(case) => prop_assert_eq!(case.problem.faults(), Vec::new()),
            Err(faults) => prop_assert!(!faults.to_string().is_empty()),
        }
    }

    #[test]
    fn any_override_is_read_or_refused(set in "\\PC{0,40}", path in "(wall|mover|travel|output)\\.[a-zA-Z.\"']{0,20}", value in "\\PC{0,20}") {
        for set in [set, format!("{path}={value}"), format!("wall.sleeve.thickness={value}"), format!("mover.stack={value}")] {
            match read(CASE, &[&set]) {
                Ok(case) => prop_assert_eq!(case.problem.faults(), Vec::new()),
                Err(faults) => prop_assert!(!faults.to_string().is_empty()),
            }
        }
    }
}
