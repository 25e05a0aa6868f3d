//! The earthing of the neutral, and the standard TRV that follows from the rating.

use super::{Duty, Figure, NamedFigure};
use crate::case::Case;
use crate::particular::{breaker, system};
use crate::physics::first_pole::{
    EFFECTIVE_EARTH_FAULT_FACTOR, EFFECTIVE_R0_OVER_X1, EFFECTIVE_X0_OVER_X1, first_pole_factor, z0_over_z1,
};
use crate::physics::trv::{Envelope, envelope};
use crate::quantity::{ElectricCurrent, Physical, Ratio, significant};
use crate::source::Place;
use crate::standards::{self, SystemClass};

/// The standard envelopes of a rating.
#[derive(Clone, Debug, Default)]
pub struct TrvDuty {
    /// One for each duty that the tables have.
    pub envelopes: Vec<(Envelope, String)>,
}

impl TrvDuty {
    /// The envelope of a duty, with its working.
    pub fn envelope(&self, duty: standards::Duty) -> Option<&(Envelope, String)> {
        self.envelopes.iter().find(|(envelope, _)| envelope.duty == duty)
    }

    pub(super) fn figures(&self) -> Vec<NamedFigure> {
        const KEYS: [(standards::Duty, &str, &str); 5] = [
            (standards::Duty::T100, "trv_t100_uc", "trv_t100_rrrv"),
            (standards::Duty::T60, "trv_t60_uc", "trv_t60_rrrv"),
            (standards::Duty::T30, "trv_t30_uc", "trv_t30_rrrv"),
            (standards::Duty::T10, "trv_t10_uc", "trv_t10_rrrv"),
            (standards::Duty::OutOfPhase, "trv_op_uc", "trv_op_rrrv"),
        ];
        KEYS.into_iter()
            .flat_map(|(duty, peak, rate)| {
                let found = self.envelope(duty);
                let figure = |key, unit, value: Option<f64>| NamedFigure {
                    key,
                    value,
                    unit,
                    working: found.map(|(_, working)| working.clone()),
                    places: Vec::new(),
                };
                [figure(peak, "V", found.map(|(e, _)| e.uc.si())), figure(rate, "V/s", found.map(|(e, _)| e.rate.si()))]
            })
            .collect()
    }
}

pub(super) fn fill(case: &Case<'_>, duty: &mut Duty) {
    duty.effectively_earthed = effectively_earthed(case, duty);
    duty.first_pole_factor = needed_factor(case, duty);
    envelopes(case, duty);
}

/// Whether the neutral is effectively earthed, and where that is said: by the ratios where they are stated, else by the earth-fault
/// factor, else by the two currents, else by the words, else by the
/// infeeds.
fn effectively_earthed(case: &Case<'_>, duty: &Duty) -> Option<(bool, Place)> {
    let system = &case.system;
    let x0 = system.quantity::<Ratio>(&system::X0_OVER_X1).or_else(|| system.quantity(&system::Z0_OVER_Z1));
    let r0 = system.quantity::<Ratio>(&system::R0_OVER_X1);
    if let Some(x0) = x0 {
        let resistive = r0.filter(|r0| r0.value.value > EFFECTIVE_R0_OVER_X1);
        if let Some(r0) = resistive {
            return Some((false, r0.place()));
        }
        return Some((x0.value.value <= EFFECTIVE_X0_OVER_X1, x0.place()));
    }
    if let Some(k) = system.quantity::<Ratio>(&system::EARTH_FAULT_FACTOR) {
        return Some((k.value.value <= EFFECTIVE_EARTH_FAULT_FACTOR, k.place()));
    }
    let three = duty_current(case, &system::SHORT_CIRCUIT_CURRENT);
    let one = duty_current(case, &system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT);
    let words = system.word(&system::NEUTRAL);
    if words.is_none()
        && let Some(place) = case.infeeds.places().next()
        && let Some(effective) = duty.infeeds.effectively_earthed()
    {
        return Some((effective, place));
    }
    if let (Some((three, _)), Some((one, place))) = (three, one) {
        // Currents speak of every earthed neutral; a neutral that the words call isolated or resonant is not argued with.
        if words.is_none_or(|(word, _)| matches!(word, "solidly earthed" | "effectively earthed")) {
            return Some((z0_over_z1(three, one) <= EFFECTIVE_X0_OVER_X1, place));
        }
    }
    words.map(|(word, statement)| (matches!(word, "solidly earthed" | "effectively earthed"), statement.value))
}

fn duty_current(case: &Case<'_>, particular: &crate::particular::Particular) -> Option<(ElectricCurrent, Place)> {
    case.system.quantity::<ElectricCurrent>(particular).map(|stated| (stated.value, stated.place()))
}

/// The first-pole-to-clear factor that the earthing asks for: of X0/X1, else of the two currents, else of the infeeds, else by the
/// words. A neutral that the words call not effectively earthed comes first.
fn needed_factor(case: &Case<'_>, duty: &Duty) -> Option<Figure<Ratio>> {
    const BASIS: &str = "IEC 62271-100 5.102, IEC/TR 62271-306 (from memory)";
    let system = &case.system;
    let word = system.word(&system::NEUTRAL);
    let not_earthed = word.is_some_and(|(word, _)| !matches!(word, "solidly earthed" | "effectively earthed"));
    if not_earthed {
        let (word, _) = word?;
        let factor = standards::first_pole_factors().last()?;
        return Some(
            Figure::new(Ratio::from_si(factor), "1.5 where the neutral is not effectively earthed", BASIS)
                .given("neutral", word),
        );
    }
    if let Some(ratio) = system.quantity::<Ratio>(&system::X0_OVER_X1).or_else(|| system.quantity(&system::Z0_OVER_Z1))
    {
        let factor = Ratio::from_si(first_pole_factor(ratio.value.value));
        return Some(Figure::new(factor, "kpp = 3a/(1 + 2a)", BASIS).with("a = X0/X1", &ratio));
    }
    if let (Some(three), Some(one)) = (
        system.quantity::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT),
        system.quantity::<ElectricCurrent>(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT),
    ) {
        let a = z0_over_z1(three.value, one.value);
        // More than three times the three-phase current means a ratio below zero: the currents are not of one place.
        if a > 0.0 {
            let factor = Ratio::from_si(first_pole_factor(a));
            return Some(
                Figure::new(factor, "kpp = 3a/(1 + 2a), a = Z0/Z1 = 3 Ik3/Ik1 - 2", BASIS)
                    .with("Ik3", &three)
                    .with("Ik1", &one)
                    .given("a", significant(a, 3)),
            );
        }
    }
    if let Some(factor) = duty.infeeds.first_pole_factor.clone() {
        return Some(factor);
    }
    if duty.infeeds.is_earthed == Some(false) && word.is_none() {
        let factor = Ratio::from_si(standards::first_pole_factors().last()?);
        let figure = Figure::new(factor, "1.5 where no infeed has an earthed neutral", BASIS);
        return Some(figure.resting_on(case.infeeds.places()));
    }
    let (effective, _) = duty.effectively_earthed?;
    let (word, _) = word?;
    let factor = effective.then_some(EFFECTIVE_FACTOR)?;
    let figure = Figure::new(Ratio::from_si(factor), "1.3 at most where the neutral is effectively earthed", BASIS);
    Some(figure.given("neutral", word))
}

/// The standard factor of effectively earthed neutrals up to 800 kV (IEC 62271-100 5.102, from memory).
const EFFECTIVE_FACTOR: f64 = 1.3;

/// The envelopes of the rated voltage with the rated factor; without a stated factor, with that of the earthing.
fn envelopes(case: &Case<'_>, duty: &mut Duty) {
    let Some(rated) = case.rated_voltage() else { return };
    let stated = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR).map(|s| s.value.value);
    let effective = duty.effectively_earthed.map(|(effective, _)| effective);
    let by_earthing = effective.map(|effective| {
        let below_100 = rated.value.si() < 100e3;
        if effective && !below_100 { EFFECTIVE_FACTOR } else { standards::first_pole_factors().last().unwrap_or(1.5) }
    });
    let Some(kpp) = stated.or(by_earthing) else { return };
    let out_of_phase = case
        .breaker
        .quantity::<Ratio>(&breaker::OUT_OF_PHASE_VOLTAGE_FACTOR)
        .map(|s| s.value.value)
        .or_else(|| effective.and_then(standards::out_of_phase_factor));
    let class = case.breaker.class(&breaker::CLASSES, 'S').map(|(class, _)| match class.grade {
        1 => SystemClass::S1,
        _ => SystemClass::S2,
    });
    for duty_kind in standards::Duty::ALL {
        // Out of phase has a factor of its own, which may be unknown where T100 is not.
        let Some(op) = out_of_phase.or((duty_kind != standards::Duty::OutOfPhase).then_some(kpp)) else { continue };
        let Some(found) = envelope(rated.value, kpp, op, duty_kind, class) else { continue };
        let class = class.filter(|_| rated.value.si() < 100e3).map(|c| format!(", class {c:?}")).unwrap_or_default();
        let working = format!(
            "uc = kaf kpp Ur sqrt(2/3) with kaf = {}, kpp = {}, Ur = {}{class}: {}; rate of rise {}",
            significant(found.kaf, 3),
            significant(found.kpp, 3),
            rated.measure,
            found.uc.show(),
            found.rate.show()
        );
        duty.trv.envelopes.push((found, working));
    }
}
