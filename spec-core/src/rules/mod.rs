//! The rules, one file a subject.
//!
//! A rule is a static with its name, title, basis, formula, kind and explanation, and a function from a case (or the whole set)
//! to findings. The same texts answer `firstpole clause`, the reference page and the hover.

use crate::case::Case;
use crate::duty::Figure;
use crate::finding::{Finding, FindingKind, Findings};
use crate::particular::{Particular, breaker, site};
use crate::quantity::{ElectricCurrent, Physical, Ratio, significant};
use crate::sheet::{Set, Sheet, Stated, Statement};
use crate::source::Place;

pub mod auxiliary;
pub mod bay_current;
pub mod capacitive;
pub mod climate;
pub mod completeness;
pub mod continuous_current;
pub mod dc_component;
pub mod deviations;
pub mod earthing;
pub mod excess;
pub mod fault_duties;
pub mod gas;
pub mod gas_law;
pub mod infeeds;
pub mod inrush;
pub mod insulation_details;
pub mod insulation_site;
pub mod making;
pub mod mechanical;
pub mod network_trv;
pub mod reading;
pub mod sequence;
pub mod several_breakers;
pub mod short_circuit;
#[cfg(test)]
mod silence;
pub mod special_faults;
pub mod standards_cited;
pub mod statements;
pub mod surges;
pub mod switching_special;
#[cfg(test)]
pub mod testing;
pub mod thermal;
pub mod times;
pub mod timing;
pub mod trv;
pub mod voltage;

/// What one rule is.
#[derive(Debug)]
pub struct Rule {
    /// Its plain hyphenated name.
    pub name: &'static str,
    /// What must hold, in one sentence.
    pub title: &'static str,
    /// The kind of its findings, unless the matter grades them.
    pub kind: FindingKind,
    /// The standard and clause, or the practice, that it rests on.
    pub basis: &'static str,
    /// The formula or the data that it compares.
    pub formula: &'static str,
    /// What it checks, when it is silent, and what to do about a finding.
    pub explanation: &'static str,
    /// How it is checked.
    pub check: Check,
}

/// How a rule is checked.
#[derive(Debug)]
pub enum Check {
    /// While the text is read, or by another rule of its subject.
    Elsewhere,
    /// On the whole set. It is done anew with every change of the text, so that nothing belongs here that can be said sheet by sheet.
    Set(fn(&Set, &Policy, &mut Findings)),
    /// On each sheet, with those that it is linked to.
    Sheet(fn(&Set, &Sheet, &Policy, &mut Findings)),
    /// On the whole set, and on each sheet.
    Both(fn(&Set, &Policy, &mut Findings), fn(&Set, &Sheet, &Policy, &mut Findings)),
    /// On each breaker with its duty.
    Case(fn(&Case<'_>, &mut Findings)),
}

/// Thresholds of policy. They belong to the buyer, so none of them is a literal in a rule.
#[derive(Clone, Debug, PartialEq)]
pub struct Policy {
    /// Relative difference up to which two units of one statement agree.
    pub dual_tolerance: f64,
    /// Difference up to which two statements of one temperature agree, K.
    pub dual_temperature_tolerance: f64,
    /// Relative difference up to which time constant, X/R and peak current of one network agree.
    pub time_constant_tolerance: f64,
    /// Relative difference up to which a fault level in MVA and one in kA agree.
    pub fault_level_tolerance: f64,
    /// Relative difference up to which a time constant or X0/X1 may be more favourable than that of the infeeds.
    pub infeed_constant_tolerance: f64,
    /// How far a making or peak current may lie below its factor times the breaking current.
    pub making_below: f64,
    /// How far it may lie above before it is an excess.
    pub making_above: f64,
    /// How far a stated TRV value may lie off the standard's.
    pub trv_tolerance: f64,
    /// Steps of the preferred series above the duty from which a rating is an excess.
    pub excess_steps: usize,
    /// Share of the current at which a coil moves up to which it may carry a supervision current.
    pub supervision_share: f64,
    /// Reserve between relay plus break time and the critical clearing time, s.
    pub clearing_margin: f64,
    /// Years over which operations are counted where the tender states no service life.
    pub service_life: f64,
    /// Extreme demands upon one breaker from which they are told together.
    pub extremes: usize,
    /// Least ratio of a reduced lightning impulse level to the protective level of the arresters.
    pub lightning_margin: f64,
    /// Length from which a line of 300 kV and above asks for a study of its switching overvoltage, m.
    pub long_line: f64,
    /// Whether the tender counts as issued whatever its status says.
    pub issued: bool,
    /// The day on which deviations are held against their expiry; without one, none expires.
    pub today: Option<crate::sheet::Date>,
}

impl Default for Policy {
    fn default() -> Self {
        Self {
            dual_tolerance: 0.01,
            dual_temperature_tolerance: 0.5,
            time_constant_tolerance: 0.05,
            fault_level_tolerance: 0.05,
            infeed_constant_tolerance: 0.10,
            making_below: 0.02,
            making_above: 0.05,
            trv_tolerance: 0.02,
            excess_steps: 2,
            supervision_share: 0.1,
            clearing_margin: 0.020,
            service_life: 30.0,
            extremes: 5,
            lightning_margin: 1.2,
            long_line: 200e3,
            issued: false,
            today: None,
        }
    }
}

/// Relative slack below which two values count as equal: printed digits, not physics.
const EQUAL: f64 = 1e-4;

/// The rated short-circuit breaking current, on which many ratings hang.
fn breaking_current<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ElectricCurrent>> {
    case.breaker.quantity(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)
}

/// The infeeds that a figure rests on, told by the first of them; the working has them all.
fn rests_on_infeeds<Q>(finding: &mut Finding, figure: &Figure<Q>) {
    if let [first, others @ ..] = figure.working.infeeds.as_slice() {
        finding.related(*first, format!("the first of {} infeeds that it follows from", others.len() + 1));
    }
}

/// A count as it is shown: without the blank that stands where a unit would be.
fn number(stated: &Stated<'_, Ratio>) -> String {
    significant(stated.value.si(), 6)
}

/// The edit that adds a line to a sheet.
fn add_line(finding: &mut Finding, sheet: &Sheet, particular: &Particular, value: &str) {
    finding.edit(
        format!("add {}: {value}", particular.label),
        sheet.end,
        format!("\n    {}: {value}", particular.label),
    );
}

/// The place just behind, to insert at.
const fn after(place: Place) -> Place {
    place.end()
}

/// Whether the site lies in the open, with the line that says so.
fn outdoors<'a>(case: &'a Case<'_>) -> Option<&'a Statement> {
    case.site.word(&site::INSTALLATION).and_then(|(word, statement)| (word == "outdoor").then_some(statement))
}

/// Every rule, subject by subject, in the order in which they are checked.
pub fn standard() -> Vec<&'static Rule> {
    [
        reading::ALL,
        statements::ALL,
        completeness::ALL,
        voltage::ALL,
        insulation_site::ALL,
        insulation_details::ALL,
        continuous_current::ALL,
        bay_current::ALL,
        infeeds::ALL,
        short_circuit::ALL,
        dc_component::ALL,
        fault_duties::ALL,
        making::ALL,
        thermal::ALL,
        earthing::ALL,
        trv::ALL,
        network_trv::ALL,
        special_faults::ALL,
        capacitive::ALL,
        inrush::ALL,
        switching_special::ALL,
        surges::ALL,
        sequence::ALL,
        times::ALL,
        timing::ALL,
        gas::ALL,
        climate::ALL,
        gas_law::ALL,
        auxiliary::ALL,
        mechanical::ALL,
        standards_cited::ALL,
        several_breakers::ALL,
        excess::ALL,
        deviations::ALL,
    ]
    .concat()
}

/// The rule whose name is nearest to `name`, if one is near.
pub fn nearest(name: &str) -> Option<&'static str> {
    standard()
        .iter()
        .map(|rule| (strsim::normalized_damerau_levenshtein(rule.name, &name.to_lowercase()), rule.name))
        .filter(|(near, _)| *near >= 0.5)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, name)| name)
}

#[cfg(test)]
mod tests {
    use std::collections::BTreeSet;

    use super::*;

    #[test]
    fn every_rule_is_told_in_full_and_once() {
        let mut names = BTreeSet::new();
        for rule in standard() {
            assert!(names.insert(rule.name), "{} twice", rule.name);
            assert!(rule.name.chars().all(|c| c.is_ascii_lowercase() || c == '-'), "{}", rule.name);
            for (what, text) in [("title", rule.title), ("basis", rule.basis), ("formula", rule.formula)] {
                assert!(!text.trim().is_empty(), "{}: no {what}", rule.name);
            }
            assert!(rule.explanation.len() > 40, "{}: explain it", rule.name);
        }
    }
}
