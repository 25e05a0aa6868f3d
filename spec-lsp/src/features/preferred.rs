//! The values that the standards prefer for a rating, held against the duty.

use firstpole_core::Assessment;
use firstpole_core::case::Regimes;
use firstpole_core::particular::{Particular, SheetKind, breaker, tender};
use firstpole_core::quantity::{ElectricCurrent, ElectricPotential, Physical, Time, look_up, rounded, significant};
use firstpole_core::sheet::Sheet;
use firstpole_core::standards::{
    PreferredCurrents, RatingSeries, Regime, TimeConstants, durations, first_pole_factors, is_rated_voltage,
    rated_voltages,
};

/// The values that a rating is chosen from, ascending, with what the duty of the breaker asks for.
#[derive(Clone, Debug, Default, PartialEq)]
pub struct Preferred {
    /// The values in SI base units.
    pub values: Vec<f64>,
    /// What the duty asks for, in SI base units; absent where it cannot be known.
    pub needed: Option<f64>,
    /// The working of that.
    pub working: Option<String>,
    /// The unit in which the trade writes it; empty where it has none.
    unit: &'static str,
}

impl Preferred {
    /// A value as an author writes it.
    pub fn written(&self, si: f64) -> String {
        let number = look_up(self.unit, &[]).and_then(|spelt| spelt.unit.from_si(si)).unwrap_or(si);
        format!("{} {}", rounded(number, 3), self.unit).trim_end().to_owned()
    }

    /// What the duty asks for, in three digits.
    pub fn needed_text(&self) -> Option<String> {
        let number = look_up(self.unit, &[]).and_then(|spelt| spelt.unit.from_si(self.needed?)).or(self.needed)?;
        Some(format!("{} {}", significant(number, 3), self.unit).trim_end().to_owned())
    }

    /// Whether a value meets the duty; nothing where that is not known.
    pub fn meets(&self, si: f64) -> Option<bool> {
        self.needed.map(|needed| si >= needed * (1.0 - 1e-6))
    }

    /// The values next below and above one.
    pub fn neighbours(&self, si: f64) -> (Option<f64>, Option<f64>) {
        let below = self.values.iter().rev().find(|value| **value < si * (1.0 - 1e-4)).copied();
        let above = self.values.iter().find(|value| **value > si * (1.0 + 1e-4)).copied();
        (below, above)
    }
}

/// Those of a particular of a breaker; nothing where the standards have no list for it.
pub fn preferred(assessment: &Assessment, sheet: &Sheet, particular: &Particular) -> Option<Preferred> {
    if !matches!(sheet.kind, SheetKind::Breaker | SheetKind::Family) {
        return None;
    }
    let regimes = regimes(assessment, sheet);
    let currents = |series| {
        let series = PreferredCurrents::of(series, &regimes);
        std::iter::successors(series.above(ElectricCurrent::from_si(0.0)), |last| series.above(*last))
            .map(Physical::si)
            .collect::<Vec<f64>>()
    };
    let is = |other: &Particular| particular.is(other);
    let (mut values, key, unit): (Vec<f64>, &str, &'static str) = if is(&breaker::RATED_VOLTAGE) {
        let listed = |voltage: ElectricPotential| is_rated_voltage(voltage, &regimes).then_some(voltage.si());
        (rated_voltages().iter().filter_map(|row| listed(row.voltage())).collect(), "system_voltage", "kV")
    } else if is(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT) || is(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT) {
        (currents(RatingSeries::Breaking), "breaking_duty", "kA")
    } else if is(&breaker::RATED_CONTINUOUS_CURRENT) {
        (currents(RatingSeries::Continuous), "load_current", "A")
    } else if is(&breaker::RATED_DURATION_OF_SHORT_CIRCUIT) {
        (durations().map(Physical::si).collect(), "", "s")
    } else if is(&breaker::DC_TIME_CONSTANT) {
        let facts = assessment.set.facts(sheet.id);
        let rated = facts.quantity::<ElectricPotential>(&breaker::RATED_VOLTAGE)?.value;
        let generator =
            facts.words(&breaker::CONSTRUCTION).is_some_and(|(words, _)| words.contains(&"generator circuit-breaker"));
        (TimeConstants::of(rated, generator).values().map(Time::si).collect(), "dc_time_constant", "ms")
    } else if is(&breaker::FIRST_POLE_TO_CLEAR_FACTOR) {
        (first_pole_factors().collect(), "first_pole_factor", "")
    } else {
        return None;
    };
    let figure = assessment
        .set
        .of_kind(SheetKind::Breaker)
        .position(|breaker| breaker.id == sheet.id)
        .and_then(|at| assessment.cases().get(at))
        .and_then(|case| case.duty.iter().find(|figure| figure.key == key));
    values.sort_by(f64::total_cmp);
    values.dedup();
    Some(Preferred {
        values,
        needed: figure.and_then(|figure| figure.value),
        working: figure.and_then(|figure| figure.working.clone()),
        unit,
    })
}

/// The families of standards that are cited: by the breaker itself, else by its tender.
fn regimes(assessment: &Assessment, sheet: &Sheet) -> Vec<Regime> {
    let own = assessment.set.facts(sheet.id).list(&breaker::STANDARDS);
    let tender = assessment.set.in_reach(sheet.file(), SheetKind::Tender).next();
    let list = own.or_else(|| assessment.set.facts(tender?.id).list(&tender::STANDARDS));
    Regimes::of(list.map_or(&[], |(items, _)| items)).families()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    fn of(text: &str, particular: &Particular) -> Option<Preferred> {
        let assessment = assessed(text);
        let sheet = assessment.set.of_kind(SheetKind::Breaker).next().expect("a breaker");
        preferred(&assessment, sheet, particular)
    }

    /// The R10 series (IEC 60059): 25, 31.5, 40 kA.
    #[test]
    fn breaking_currents_against_the_duty() {
        let found = of(BAY, &breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT).expect("a list");
        assert_eq!(found.needed_text().as_deref(), Some("28.4 kA"));
        assert_eq!(
            (found.meets(25e3), found.meets(28.4e3), found.meets(31.5e3)),
            (Some(false), Some(true), Some(true))
        );
        assert_eq!(found.neighbours(31.5e3), (Some(25e3), Some(40e3)));
        assert_eq!(found.written(31.5e3), "31.5 kA");
        let unknown = BAY.replace("    short-circuit current: 28.4 kA\n", "");
        let found = of(&unknown, &breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT).expect("a list");
        assert_eq!((found.meets(25e3), found.needed_text()), (None, None));
    }

    #[test]
    fn other_ratings_and_none() {
        let voltages = of(BAY, &breaker::RATED_VOLTAGE).expect("a list");
        assert_eq!(voltages.neighbours(145e3), (Some(123e3), Some(170e3)));
        assert_eq!(of(BAY, &breaker::FIRST_POLE_TO_CLEAR_FACTOR).expect("a list").written(1.3), "1.3");
        assert_eq!(of(BAY, &breaker::DC_TIME_CONSTANT).expect("a list").written(0.045), "45 ms");
        assert_eq!(of(BAY, &breaker::OPENING_TIME), None);
    }
}
