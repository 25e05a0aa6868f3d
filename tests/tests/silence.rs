//! What is correct and must raise no alarm: clean specifications, bent in ways that a buyer may choose, stay free of
//! contradiction, shortfall, omission and caution.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

use firstpole_tests::{example, program, root};

const CABLES: &str = "cable-feeders-12kV";
const IEEE: &str = "transmission-72.5kV-60Hz";

/// What is said, the example that is bent, and the values put in place of those it has.
type Variant = (&'static str, &'static str, &'static [(&'static str, &'static str)]);

/// Puts the value after every line of that label; `system: LABEL` means the lines of that kind of sheet only. A label
/// that the example lacks would bend nothing.
fn bent(text: &str, label: &str, value: &str) -> String {
    let (sheet, label) = label.split_once(": ").map_or((None, label), |(sheet, label)| (Some(sheet), label));
    let (mut met, mut kind) = (false, "");
    let mut lines = Vec::new();
    for line in text.lines() {
        match line.split_once(':') {
            Some((before, _)) if before.trim() == label && sheet.is_none_or(|sheet| sheet == kind) => {
                met = true;
                lines.push(format!("{before}: {value}"));
                continue;
            }
            None if !line.starts_with('#') => kind = line.split_whitespace().next().unwrap_or(kind),
            _ => {}
        }
        lines.push(line.to_owned());
    }
    assert!(met, "no line is labelled {label}");
    lines.join("\n") + "\n"
}

/// The alarms that each variant raises, if any.
fn alarms(variants: &[Variant]) -> Vec<String> {
    let folder = tempfile::tempdir().expect("a folder");
    let mut alarms = Vec::new();
    for (said, base, changes) in variants {
        let text = std::fs::read_to_string(root().join(example(base))).expect("the example");
        let text = changes.iter().fold(text, |text, (label, value)| bent(&text, label, value));
        let path = folder.path().join("variant.cbspec");
        std::fs::write(&path, text).expect("the variant is written");
        let path = path.to_str().expect("a path in Unicode");
        let (_, out, err) = program(&["assess", "--as", "json", "--on", "2026-12-01", "--block-on", "nothing", path]);
        assert_eq!(err, "", "{said}");
        let json: serde_json::Value = serde_json::from_str(&out).expect("json");
        for finding in json["findings"].as_array().expect("findings") {
            let kind = finding["kind"].as_str().expect("a kind");
            if ["contradiction", "shortfall", "omission", "caution"].contains(&kind) {
                alarms.push(format!("{said}: {kind} {}: {}", finding["rule"], finding["message"]));
            }
        }
    }
    alarms
}

fn silent(variants: &[Variant]) {
    let alarms = alarms(variants);
    assert!(alarms.is_empty(), "{}", alarms.join("\n"));
}

/// The check can fail: a making current far below 2.5 times the breaking current is told.
#[test]
fn a_mistake_is_not_passed_over() {
    let alarms = alarms(&[("making current too low", CABLES, &[("rated short-circuit making current", "40 kA")])]);
    assert!(alarms.iter().any(|alarm| alarm.contains("making-current-factor")), "{alarms:?}");
}

#[test]
fn rounding_of_the_making_current() {
    silent(&[
        (
            "108 kA with 40 kA and 60 ms",
            IEEE,
            &[
                ("breaker: DC time constant", "60 ms"),
                ("closing and latching current", "108 kA crest"),
                ("rated peak withstand current", "108 kA crest"),
            ],
        ),
        (
            "65 kA with 25 kA at 60 Hz",
            IEEE,
            &[
                ("fault level", "2400 MVA at 69 kV"),
                ("short-circuit current", "20 kA"),
                ("single-phase short-circuit current", "19 kA"),
                ("rated interrupting current", "25 kA sym"),
                ("closing and latching current", "65 kA crest"),
                ("rated peak withstand current", "65 kA crest"),
                ("rated short-time current", "25 kA for 2 s"),
                ("rated out-of-phase breaking current", "6.25 kA"),
            ],
        ),
        (
            "82 kA with 31.5 kA at 60 Hz",
            IEEE,
            &[
                ("fault level", "2400 MVA at 69 kV"),
                ("short-circuit current", "20 kA"),
                ("single-phase short-circuit current", "19 kA"),
                ("rated interrupting current", "31.5 kA sym"),
                ("closing and latching current", "82 kA crest"),
                ("rated peak withstand current", "82 kA crest"),
                ("rated short-time current", "31.5 kA for 2 s"),
                ("rated out-of-phase breaking current", "7.9 kA"),
            ],
        ),
    ]);
    for making in ["78.75 kA", "79 kA", "80 kA"] {
        let changes: &'static [(&str, &str)] = Box::leak(Box::new([
            ("rated short-circuit breaking current", "31.5 kA"),
            ("rated short-circuit making current", making),
            ("rated peak withstand current", making),
            ("rated short-time withstand current", "31.5 kA for 3 s"),
        ]));
        silent(&[(making, CABLES, changes)]);
    }
}

#[test]
fn standard_factor_within_the_rated_time_constant() {
    silent(&[("44 ms in the network", CABLES, &[("system: DC time constant", "44 ms")])]);
}

#[test]
fn first_pole_factor_of_an_earthed_network() {
    silent(&[("1.5", IEEE, &[("first-pole-to-clear factor", "1.5")])]);
}

#[test]
fn practice_of_ieee() {
    silent(&[
        ("1200 A", IEEE, &[("rated continuous current", "1200 A")]),
        ("3000 A", IEEE, &[("rated continuous current", "3000 A")]),
        ("18 cycles", IEEE, &[("dead time", "18 cycles"), ("trip-to-remake time", "18 cycles")]),
        ("22 cycles", IEEE, &[("dead time", "22 cycles"), ("trip-to-remake time", "22 cycles")]),
    ]);
}

#[test]
fn pairings_of_nominal_and_rated_voltage() {
    silent(&[
        ("60 kV in 72.5 kV", IEEE, &[("nominal voltage", "60 kV"), ("fault level", "3480 MVA at 60 kV")]),
        ("66 kV in 72.5 kV", IEEE, &[("nominal voltage", "66 kV"), ("fault level", "3830 MVA at 66 kV")]),
        ("11 kV in 12 kV", CABLES, &[("nominal voltage", "11 kV")]),
    ]);
}

#[test]
fn round_fault_level() {
    silent(&[(
        "4000 MVA with 31.5 kA",
        IEEE,
        &[
            ("fault level", "4000 MVA at 72.5 kV"),
            ("short-circuit current", "31.5 kA"),
            ("single-phase short-circuit current", "30 kA"),
        ],
    )]);
}

#[test]
fn more_than_the_duty_asks() {
    silent(&[("3 s, M2 and C2", IEEE, &[("rated short-time current", "40 kA for 3 s"), ("classes", "C2, M2, S2")])]);
}

#[test]
fn levels_that_fall_in_order() {
    silent(&[("75, 69 and 62 psig at -30 degC", IEEE, &[("lowest ambient", "-30 degC")])]);
}

#[test]
fn no_reclosing_on_a_cable_bay() {
    silent(&[(
        "O - 3 min",
        CABLES,
        &[("operating sequence", "O - 3 min - CO - 3 min - CO"), ("auto-reclosing", "none")],
    )]);
}

#[test]
fn spellings_of_units() {
    silent(&[
        ("kAp", IEEE, &[("closing and latching current", "104 kAp")]),
        ("kA peak", IEEE, &[("closing and latching current", "104 kA peak")]),
        ("kA rms", IEEE, &[("rated interrupting current", "40 kA rms")]),
        ("kVp", IEEE, &[("BIL", "350 kVp")]),
        ("kV peak", IEEE, &[("BIL", "350 kV peak")]),
        ("sec", CABLES, &[("spring charging time", "15 sec")]),
        ("mins", CABLES, &[("operating sequence", "O - 3 mins - CO - 3 mins - CO")]),
    ]);
}

#[test]
fn tolerance_of_the_frequency() {
    silent(&[("50 Hz +- 3 %", CABLES, &[("frequency", "50 Hz +- 3 %")])]);
}

#[test]
fn cable_system_with_resonant_earthing() {
    silent(&[(
        "S1, 1.5 and E2",
        CABLES,
        &[("neutral", "resonant earthed"), ("first-pole-to-clear factor", "1.5"), ("classes", "C2, E2, M2, S1")],
    )]);
}
