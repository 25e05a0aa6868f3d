//! A clean specification to be bent by tests: every rule is silent on it, so that what a test finds is what the test did.

use crate::assess::Assessor;
use crate::finding::Finding;
use crate::rules::Policy;
use crate::source::Sources;

const CLEAN: &str = r#"cbspec 1
tender "Bay renewal"
    reference: T-1
    status: draft
    standards: IEC 62271-1:2017, IEC 62271-100:2021
    order of precedence: "schedule", "text", "drawings"
    reference date of standards: 2026-01-01
system Ring
    nominal voltage: 132 kV
    highest voltage: 145 kV
    frequency: 50 Hz
    neutral: effectively earthed
    X0/X1: 2.6
    short-circuit current: 28.4 kA
    single-phase short-circuit current: 24.0 kA
    DC time constant: 42 ms
    connection: overhead lines
    study year: 2040
    level valid with: all sources in service
    backup clearing time: 0.5 s
site Yard
    installation: outdoor
    lowest ambient: -25 degC
    highest ambient: 40 degC
    altitude: 400 m
    pollution: c medium
    ice: 10 mm
    wind: 34 m/s
    seismic acceleration: 0.1 g
breaker LineBay on Ring at Yard
    quantity: 2
    construction: live tank
    interrupter: self-blast
    rated voltage: 145 kV
    rated frequency: 50 Hz
    rated short-duration power-frequency withstand voltage: 275 kV
    rated lightning impulse withstand voltage: 650 kV
    radio interference voltage: 2500 uV
    rated continuous current: 2500 A
    rated short-circuit breaking current: 31.5 kA
    DC time constant: 45 ms
    rated short-circuit making current: 78.75 kA
    rated short-time withstand current: 31.5 kA for 1 s
    rated peak withstand current: 78.75 kA
    first-pole-to-clear factor: 1.3
    short-line fault: required
    rated out-of-phase breaking current: 7.9 kA
    out-of-phase voltage factor: 2.0
    rated line-charging breaking current: 50 A
    rated operating sequence: O - 0.3 s - CO - 3 min - CO
    classes: C2, M2
    opening time: 25 to 30 ms
    break time: 50 ms
    open-close time: at most 0.3 s
    insulating gas: SF6
    rated filling pressure: 0.60 MPa abs
    alarm pressure: 0.54 MPa abs
    minimum functional pressure: 0.51 MPa abs
    temperature class: minus 25 outdoor
    rated supply voltage: 110 V DC
    supply voltage at the terminals: 93 to 121 V
    trip coils: 2
    low-gas action: block
circuit Line1 for LineBay
    kind: overhead line
    length: 84 km
    capacitance per length: 9 nF/km
    load current: 1150 A
    source at far end: yes
    auto-reclosing: three-phase
    auto-reclosing dead time: 0.3 s
    protection systems: 2
"#;

/// The clean specification, with what a test changes in it.
#[derive(Clone, Debug)]
pub struct Bay {
    text: String,
}

impl Default for Bay {
    fn default() -> Self {
        Self::new()
    }
}

impl Bay {
    /// The clean specification.
    pub fn new() -> Self {
        Self { text: CLEAN.to_owned() }
    }

    /// A value in the first sheet of a kind: the line of the label is replaced, or a new one added at the sheet's end.
    pub fn set(self, sheet: &str, label: &str, value: &str) -> Self {
        let line = format!("    {label}: {value}");
        let mut out: Vec<String> = Vec::new();
        let (mut inside, mut done) = (false, false);
        for old in self.text.lines() {
            if !old.starts_with(' ') {
                if inside && !done {
                    out.push(line.clone());
                    done = true;
                }
                inside = !done && old.split_whitespace().next() == Some(sheet);
            }
            if inside && !done && old.trim_start().strip_prefix(label).is_some_and(|rest| rest.starts_with(':')) {
                out.push(line.clone());
                done = true;
            } else {
                out.push(old.to_owned());
            }
        }
        if inside && !done {
            out.push(line);
            done = true;
        }
        assert!(done, "no sheet {sheet}");
        Self { text: out.join("\n") + "\n" }
    }

    /// The same without a label in the first sheet of a kind.
    pub fn without(self, sheet: &str, label: &str) -> Self {
        let lines = self.text.lines().count();
        let bay = self
            .dropping(sheet, |line| line.trim_start().strip_prefix(label).is_some_and(|rest| rest.starts_with(':')));
        assert!(bay.text.lines().count() < lines, "no {label} in {sheet}");
        bay
    }

    /// The same without a whole sheet: the first of its kind.
    pub fn without_sheet(self, sheet: &str) -> Self {
        self.dropping(sheet, |_| true)
    }

    /// The same without those lines of the first sheet of a kind, its heading among them, that `drop` picks.
    fn dropping(self, sheet: &str, drop: impl Fn(&str) -> bool) -> Self {
        let (mut inside, mut seen) = (false, false);
        let kept: Vec<&str> = self
            .text
            .lines()
            .filter(|line| {
                if !line.starts_with(' ') {
                    let this = line.split_whitespace().next() == Some(sheet);
                    inside = this && !seen;
                    seen |= this;
                }
                !(inside && drop(line))
            })
            .collect();
        Self { text: kept.join("\n") + "\n" }
    }

    /// The same with another heading for the first sheet of a kind.
    pub fn heading(self, sheet: &str, heading: &str) -> Self {
        let mut done = false;
        let lines: Vec<&str> = self
            .text
            .lines()
            .map(|line| {
                if !done && !line.starts_with(' ') && line.split_whitespace().next() == Some(sheet) {
                    done = true;
                    heading
                } else {
                    line
                }
            })
            .collect();
        Self { text: lines.join("\n") + "\n" }
    }

    /// The same with more text at its end.
    pub fn and(self, more: &str) -> Self {
        Self { text: self.text + more }
    }

    /// The text.
    pub fn text(&self) -> &str {
        &self.text
    }

    /// What is found in it.
    pub fn findings(&self) -> Vec<Finding> {
        self.findings_with(Policy::default())
    }

    /// What is found in it by another policy.
    pub fn findings_with(&self, policy: Policy) -> Vec<Finding> {
        Assessor::standard()
            .with_policy(policy)
            .assess(&Sources::of("bay.cbspec", self.text.as_str()))
            .findings()
            .iter()
            .map(|finding| Finding::clone(finding))
            .collect()
    }

    /// The findings of one rule.
    pub fn of(&self, rule: &str) -> Vec<Finding> {
        self.findings().into_iter().filter(|finding| finding.rule == rule).collect()
    }

    /// The one finding of a rule.
    #[track_caller]
    pub fn one(&self, rule: &str) -> Finding {
        let mut found = self.of(rule);
        assert!(found.len() == 1, "{rule}: {} findings, of {:#?}", found.len(), self.messages());
        found.remove(0)
    }

    /// That a rule is silent.
    #[track_caller]
    pub fn silent(&self, rule: &str) {
        let found = self.of(rule);
        assert!(found.is_empty(), "{rule} is not silent: {found:#?}");
    }

    fn messages(&self) -> Vec<String> {
        self.findings().iter().map(|f| format!("{} {}: {}", f.kind.word(), f.rule, f.message)).collect()
    }
}

/// The clean specification gives no contradiction, shortfall, omission or caution.
#[test]
fn the_clean_bay_is_clean() {
    let grave: Vec<_> =
        Bay::new().findings().into_iter().filter(|f| f.kind < crate::finding::FindingKind::Excess).collect();
    assert!(grave.is_empty(), "{grave:#?}");
}
