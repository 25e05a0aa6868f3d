//! What is said of gas in the cold, case by case.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use firstpole_core::{Assessor, Sources};

const RULES: [&str; 5] =
    ["gas-liquefaction", "gas-density-at-cold", "condensation-unseen", "mixture-cold-proof", "pressure-reference"];

/// The findings on the gas of a breaker at a site of this lowest ambient temperature, and the figures of its duty.
fn said(lowest: &str, gas: &str) -> String {
    let text = format!(
        "cbspec 1\nsystem N\n    highest voltage: 145 kV\n    frequency: 50 Hz\nsite S\n    installation: outdoor\n    \
         lowest ambient: {lowest}\n    highest ambient: 40 degC\n    altitude: 100 m\nbreaker B on N at S\n    rated voltage: 145 kV\n{gas}"
    );
    let assessment = Assessor::standard().assess(&Sources::of("gas.cbspec", text.as_str()));
    let mut out = String::new();
    for finding in assessment.findings().iter().filter(|finding| RULES.contains(&finding.rule)) {
        out += &format!("{}: {}\n  {}\n", finding.kind.word(), finding.rule, finding.message);
        for line in finding.working.iter().chain(&finding.advice) {
            out += &format!("  {line}\n");
        }
    }
    let figures =
        assessment.cases().first().expect("a case").duty.iter().filter(|figure| figure.key.starts_with("gas_"));
    for figure in figures.filter(|figure| figure.value.is_some()) {
        out += &format!("{} = {:.5e} {}\n", figure.key, figure.value.unwrap_or(f64::NAN), figure.unit);
    }
    if out.is_empty() { "nothing\n".to_owned() } else { out }
}

fn levels(gas: &str, filling: &str, alarm: &str, minimum: &str) -> String {
    format!(
        "    insulating gas: {gas}\n    rated filling pressure: {filling}\n    alarm pressure: {alarm}\n    \
         minimum functional pressure: {minimum}\n"
    )
}

#[test]
fn cases() {
    let us = levels("SF6", "75 psig", "69 psig", "62 psig");
    let cases = [
        ("sf6-0.70-at-42-below", said("-42 degC", &levels("SF6", "0.70 MPa abs", "0.64 MPa abs", "0.61 MPa abs"))),
        ("75-psig-at-30-below", said("-30 degC", &us)),
        ("75-psig-at-33-below", said("-33 degC", &us)),
        ("75-psig-at-36-below", said("-36 degC", &us)),
        ("sf6-n2", said("-45 degC", &levels("SF6 60 % + N2 40 %", "0.70 MPa abs", "0.64 MPa abs", "0.61 MPa abs"))),
        (
            "c4f7n-co2",
            said("-25 degC", &levels("C4F7N 6 % + CO2 94 %", "0.80 MPa abs", "0.74 MPa abs", "0.71 MPa abs")),
        ),
        ("co2-o2", said("-40 degC", &levels("CO2 70 % + O2 30 %", "0.80 MPa abs", "0.74 MPa abs", "0.71 MPa abs"))),
        ("vacuum", said("-40 degC", "    interrupter: vacuum\n    insulating gas: none\n")),
        ("gauge-taken-for-absolute", said("-30 degC", &levels("SF6", "6.0 bar", "5.4 bar", "5.1 bar"))),
    ];
    let all: Vec<String> = cases.iter().map(|(name, said)| format!("## {name}\n{said}")).collect();
    let mut settings = insta::Settings::clone_current();
    settings.set_omit_expression(true);
    settings.set_prepend_module_to_snapshot(false);
    settings.set_snapshot_path("snapshots/gas");
    settings.bind(|| insta::assert_snapshot!("gas-cases", all.join("\n")));
}
