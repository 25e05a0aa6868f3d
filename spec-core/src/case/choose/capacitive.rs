//! Capacitive currents: the preferred value of the rated voltage where it is enough, else the next number of the R10 series.

use super::{Choice, Outcome, chosen, known, measure, needs};
use crate::case::Case;
use crate::duty::Figure;
use crate::particular::breaker;
use crate::quantity::{Dimension, Physical};
use crate::standards::{CapacitiveRating, capacitive_rating, preferred_number};

pub(super) static CHOICES: &[Choice] = &[
    Choice::leaf(&breaker::RATED_LINE_CHARGING_BREAKING_CURRENT, |case| {
        let figure = case.duty.switching.line_charging_current.as_ref();
        smallest(case, figure, "the capacitance or charging current of the line", CapacitiveRating::line, AMPERES)
    }),
    Choice::leaf(&breaker::RATED_CABLE_CHARGING_BREAKING_CURRENT, |case| {
        let figure = case.duty.switching.cable_charging_current.as_ref();
        smallest(case, figure, "the capacitance or charging current of the cable", CapacitiveRating::cable, AMPERES)
    }),
    Choice::leaf(&breaker::RATED_CAPACITOR_BANK_BREAKING_CURRENT, |case| {
        bank(case, |rating| Some(rating.single_bank()))
    }),
    Choice::leaf(&breaker::RATED_BACK_TO_BACK_CAPACITOR_BANK_BREAKING_CURRENT, |case| {
        bank(case, |rating| Some(rating.back_to_back()))
    }),
    Choice::leaf(&breaker::RATED_CAPACITOR_BANK_INRUSH_MAKING_CURRENT, |case| {
        let figure = case.duty.switching.inrush.as_ref().map(|inrush| &inrush.peak);
        smallest(case, figure, INRUSH, |rating| Some(rating.inrush_peak()), (Dimension::Current, "kA"))
    }),
    Choice::leaf(&breaker::RATED_INRUSH_FREQUENCY, |case| {
        let figure = case.duty.switching.inrush.as_ref().map(|inrush| &inrush.frequency);
        smallest(case, figure, INRUSH, |rating| Some(rating.inrush_frequency()), (Dimension::Frequency, "Hz"))
    }),
];

const AMPERES: (Dimension, &str) = (Dimension::Current, "A");
const INRUSH: &str = "the power of the banks, and the inductance between them";

fn bank(case: &Case<'_>, preferred: fn(&CapacitiveRating) -> Option<crate::quantity::ElectricCurrent>) -> Outcome {
    let figure = case.duty.switching.bank_current.as_ref();
    smallest(case, figure, "the power of the bank", preferred, AMPERES)
}

/// The preferred value of the rated voltage where it covers the figure, else the next of the R10 series, in this unit.
fn smallest<Q: Physical>(
    case: &Case<'_>,
    figure: Option<&Figure<Q>>,
    missing: &str,
    preferred: impl Fn(&CapacitiveRating) -> Option<Q>,
    (dimension, unit): (Dimension, &str),
) -> Outcome {
    let figure = known(figure, missing)?;
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let enough = capacitive_rating(rated.value).and_then(preferred).filter(|value| value.si() >= figure.value.si());
    if let Some(value) = enough {
        let working = format!("{}; the preferred value at {} covers it", figure.working, rated.measure);
        return chosen(measure(value.si(), dimension, unit), working);
    }
    let Some(next) = preferred_number(figure.value.si()) else { return needs(missing) };
    chosen(measure(next, dimension, unit), format!("{}; the next of the R10 series", figure.working))
}

#[cfg(test)]
mod tests {
    use super::super::testing::{chooses, open};
    use crate::rules::testing::Bay;

    const LINE: &str = "rated line-charging breaking current";
    const BANK: &str = "rated capacitor bank breaking current";

    /// Preferred values: 50 A at 145 kV for lines, 400 A for banks (IEC 62271-100, from memory).
    #[test]
    fn the_preferred_value_or_the_next_of_the_series() {
        let line = |current: &str| Bay::new().set("circuit", "charging current", current);
        chooses(line("20 A"), LINE, "50 A");
        chooses(line("50 A"), LINE, "50 A");
        chooses(line("50.5 A"), LINE, "63 A");
        open(Bay::new().without("circuit", "capacitance per length"), LINE, "charging current of the line");
    }

    #[test]
    fn banks_with_their_inrush() {
        let bank = |power: &str| {
            let sheet = format!("circuit Bank for LineBay\n    kind: capacitor bank\n    bank power: {power}\n");
            Bay::new().and(&sheet).set("system", "nominal voltage", "132 kV")
        };
        chooses(bank("50 Mvar"), BANK, "400 A");
        chooses(bank("120 Mvar"), BANK, "630 A");
        open(Bay::new(), BANK, "power of the bank");
        open(Bay::new(), "rated inrush frequency", "power of the banks");
    }
}
