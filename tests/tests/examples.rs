//! The example specifications: what is said of each, as text and as json.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use firstpole_tests::{CLEAN, SEEDED, example, program, root};

fn assessed(name: &str, form: &str) -> String {
    std::env::set_current_dir(root()).expect("the root of the workspace");
    let path = example(name);
    let (code, out, err) =
        program(&["assess", "--as", form, "--on", "2026-12-01", "--block-on", "nothing", "--colour", "never", &path]);
    assert_eq!((code, err.as_str()), (0, ""), "{name}");
    out
}

#[test]
fn text_and_json_of_every_example() {
    let mut settings = insta::Settings::clone_current();
    settings.set_omit_expression(true);
    settings.set_prepend_module_to_snapshot(false);
    settings.bind(|| {
        for name in CLEAN.iter().chain(&SEEDED) {
            insta::assert_snapshot!(format!("{name}.text"), assessed(name, "text"));
            insta::assert_snapshot!(format!("{name}.json"), assessed(name, "json"));
        }
    });
}

#[test]
fn clean_examples_are_clean() {
    for name in CLEAN {
        let json: serde_json::Value = serde_json::from_str(&assessed(name, "json")).expect("json");
        for kind in ["contradiction", "shortfall", "omission", "caution"] {
            assert_eq!(json["summary"][kind], 0, "{name}: {kind}\n{}", assessed(name, "text"));
        }
    }
}

/// Each seeded mistake is found, by the rule that is about it.
#[test]
fn seeded_mistakes_are_found() {
    let seeded: [(&str, &[&str]); 6] = [
        (
            "reclosing-line-24kV",
            &["trv-class", "first-pole-factor", "sequence-without-rapid-reclosing", "decimal-comma"],
        ),
        (
            "substation-36kV",
            &[
                "making-current-factor",
                "short-time-below-breaking",
                "dc-component-disagrees",
                "fault-level-disagrees",
                "insulation-set",
            ],
        ),
        (
            "bank-and-cable-24kV",
            &[
                "inrush-current",
                "bank-current",
                "capacitive-voltage-factor",
                "cable-charging-current",
                "vacuum-surge-protection",
            ],
        ),
        ("line-bay-145kV", &["dc-time-constant", "gas-liquefaction"]),
        (
            "station-110kV-infeeds",
            &[
                "breaking-current-below-duty",
                "making-current-below-duty",
                "dc-time-constant",
                "transformer-limited-fault",
            ],
        ),
        (
            "generation-tie-550kV",
            &[
                "switching-impulse-level",
                "making-current-factor",
                "gas-level-order",
                "dead-time",
                "unreadable-line",
                "unknown-label",
                "cycles-disagree",
                "first-pole-factor-excess",
                "dual-units-disagree",
                "dc-time-constant",
            ],
        ),
    ];
    for (name, rules) in seeded {
        let json: serde_json::Value = serde_json::from_str(&assessed(name, "json")).expect("json");
        let found: Vec<&str> =
            json["findings"].as_array().expect("findings").iter().filter_map(|f| f["rule"].as_str()).collect();
        for rule in rules {
            assert!(found.contains(rule), "{name}: {rule} is not among {found:?}");
        }
    }
}

/// Every file in the folder of examples is listed as clean or as seeded.
#[test]
fn no_example_is_forgotten() {
    let mut files: Vec<String> = std::fs::read_dir(root().join("tests/specifications"))
        .expect("the folder of examples")
        .filter_map(|entry| entry.ok()?.path().file_stem()?.to_str().map(str::to_owned))
        .filter(|name| name != "families")
        .collect();
    files.sort();
    let mut listed: Vec<String> = CLEAN.iter().chain(&SEEDED).map(|name| (*name).to_owned()).collect();
    listed.sort();
    assert_eq!(files, listed);
}

/// A snapshot that no test asks for would say nothing.
#[test]
fn no_snapshot_is_an_orphan() {
    let names: Vec<String> =
        CLEAN.iter().chain(&SEEDED).flat_map(|n| [format!("{n}.text"), format!("{n}.json")]).collect();
    for entry in std::fs::read_dir(root().join("tests/tests/snapshots")).expect("snapshots").flatten() {
        if entry.path().is_dir() {
            continue;
        }
        let file = entry.file_name().to_string_lossy().into_owned();
        let stem = file.strip_suffix(".snap").unwrap_or_else(|| panic!("{file} is no accepted snapshot"));
        assert!(names.iter().any(|name| name == stem), "{file}");
    }
}
