//! Rules on the continuous current.

use super::{Check, Rule};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::breaker;
use crate::quantity::{ElectricCurrent, Physical};
use crate::standards::{PreferredCurrents, RatingSeries};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&CONTINUOUS_CURRENT_BELOW_LOAD, &CONTINUOUS_CURRENT_NOT_PREFERRED];

/// The rated continuous current covers the largest load.
pub static CONTINUOUS_CURRENT_BELOW_LOAD: Rule = Rule {
    name: "continuous-current-below-load",
    title: "The rated continuous current covers the largest load, emergency included.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-1:2017 5.5, IEEE C37.010 (from memory)",
    formula: "Ir >= largest of the load and emergency load currents of the circuits",
    explanation: "Compared with the largest steady current of any circuit of the breaker, at normal ambient temperature. Without a \
                  load current there is nothing to compare with, and the rule is silent.",
    check: Check::Case(below_load),
};

fn below_load(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(load)) =
        (case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT), case.duty.load_current.as_ref())
    else {
        return;
    };
    if rated.value.si() >= load.value.si() * (1.0 - 1e-6) {
        return;
    }
    let stated = load.working.inputs.first();
    let shown = stated.map_or_else(|| load.value.show(), |input| input.text.clone());
    let message = format!("the rated continuous current {} is below the largest load, {shown}", rated.measure);
    let finding = findings.add(&CONTINUOUS_CURRENT_BELOW_LOAD, rated.place(), message);
    finding.label("below the load").stated(&rated.measure).working(load.working.to_string());
    for place in load.places() {
        finding.related(place, "the largest load");
    }
    if let Some(needed) =
        PreferredCurrents::of(RatingSeries::Continuous, &case.regimes().families()).at_or_above(load.value)
    {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
    }
}

/// The rated continuous current is a preferred value.
pub static CONTINUOUS_CURRENT_NOT_PREFERRED: Rule = Rule {
    name: "continuous-current-not-preferred",
    title: "The rated continuous current is a preferred value of the standards cited.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 5.5 with the R10 series, IEEE C37.04 (from memory)",
    formula: "Ir in the preferred series",
    explanation: "Bidders have temperature-rise tests for the values of the series. The values of the IEEE are accepted where its \
                  standards are cited. Generator circuit-breakers are exempt.",
    check: Check::Case(not_preferred),
};

fn not_preferred(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT) else { return };
    let series = PreferredCurrents::of(RatingSeries::Continuous, &case.regimes().families());
    if series.has(rated.value) || case.is_generator_breaker() {
        return;
    }
    let message = format!("{} is in no series of continuous currents of the standards cited", rated.measure);
    let finding = findings.add(&CONTINUOUS_CURRENT_NOT_PREFERRED, rated.place(), message);
    finding.label("not a preferred value").stated(&rated.measure);
    if let Some(needed) = series.at_or_above(rated.value) {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
    }
}

#[cfg(test)]
mod tests {
    use crate::rules::testing::Bay;

    const IR: &str = "rated continuous current";

    #[test]
    fn the_largest_load_counts() {
        let finding = Bay::new().set("breaker", IR, "800 A").one("continuous-current-below-load");
        assert_eq!(finding.edits[0].text, "1250 A");
        let emergency = Bay::new().set("circuit", "emergency load current", "2600 A");
        assert_eq!(emergency.one("continuous-current-below-load").needed.expect("needed").text, "3150 A");
        Bay::new().silent("continuous-current-below-load");
        Bay::new().set("circuit", "load current", "2500 A").silent("continuous-current-below-load");
        Bay::new().set("circuit", "load current", "2501 A").one("continuous-current-below-load");
    }

    #[test]
    fn values_of_the_series_cited() {
        assert_eq!(
            Bay::new().set("breaker", IR, "1500 A").one("continuous-current-not-preferred").edits[0].text,
            "1600 A"
        );
        Bay::new().silent("continuous-current-not-preferred");
        let ieee = Bay::new().set("breaker", IR, "1200 A");
        ieee.one("continuous-current-not-preferred");
        ieee.set("tender", "standards", "IEEE C37.04:2018").silent("continuous-current-not-preferred");
    }

    #[test]
    fn generator_breakers_are_exempt() {
        Bay::new()
            .set("breaker", IR, "1500 A")
            .set("tender", "standards", "IEC/IEEE 62271-37-013:2021")
            .silent("continuous-current-not-preferred");
    }
}
