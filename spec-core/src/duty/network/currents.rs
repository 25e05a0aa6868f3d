//! The currents that follow from the infeeds, each with its working.

use super::{Infeeds, Off, Seen};
use crate::duty::{Figure, Input};
use crate::physics::first_pole::{EFFECTIVE_R0_OVER_X1, EFFECTIVE_X0_OVER_X1, first_pole_factor_of};
use crate::physics::infeed::{EQUIVALENT_SHARE, Fault, PeakMethod, ZeroSequence};
use crate::quantity::{ElectricCurrent, Physical, Ratio, Time, significant};

const IEC_60909: &str = "IEC 60909-0 (from memory)";

/// What follows from the infeeds. Empty where none is described or one of them lacks what is needed.
#[derive(Clone, Debug, Default)]
pub struct FromInfeeds {
    /// Ik3''.
    pub three_phase: Option<Figure<ElectricCurrent>>,
    /// Ik1''.
    pub single_phase: Option<Figure<ElectricCurrent>>,
    /// The greater phase current of a two-phase fault to earth.
    pub two_phase_earth: Option<Figure<ElectricCurrent>>,
    /// R/X at the connection point.
    pub r_over_x: Option<Figure<Ratio>>,
    /// X0/X1 at the connection point; none where no zero-sequence current passes.
    pub x0_over_x1: Option<Figure<Ratio>>,
    /// R0/X1 at the connection point.
    pub r0_over_x1: Option<f64>,
    /// Whether any infeed lets zero-sequence current pass; none where that is not known.
    pub is_earthed: Option<bool>,
    /// The time constant.
    pub time_constant: Option<Figure<Time>>,
    /// kappa.
    pub peak_factor: Option<Figure<Ratio>>,
    /// Ib of a three-phase fault at contact separation, where machines are among the sources.
    pub breaking: Option<Figure<ElectricCurrent>>,
    /// The DC component of a three-phase fault at contact separation.
    pub direct: Option<Figure<ElectricCurrent>>,
    /// kpp by Z0 and Z1.
    pub first_pole_factor: Option<Figure<Ratio>>,
}

/// A figure with every infeed as one input, after what its formula names.
fn with_parts<Q: Physical>(mut figure: Figure<Q>, infeeds: &Infeeds) -> Figure<Q> {
    figure.working.inputs.extend(infeeds.parts.iter().map(|part| Input {
        symbol: "Z",
        text: format!("{} of {}", part.text, part.name),
        place: None,
    }));
    figure.resting_on(infeeds.places())
}

impl FromInfeeds {
    /// All of them; `separation` is the time from the fault to contact separation, where it is known.
    pub fn of(infeeds: &Infeeds, separation: Option<Time>) -> Self {
        let Some(seen) = &infeeds.seen else { return Self::default() };
        let fault = seen.fault();
        let three = three_phase(infeeds, seen, &fault);
        let mut all = Self { three_phase: Some(three.clone()), ..Self::default() };
        all.earth(infeeds, seen, &fault);
        let Some(positive) = seen.infeed.positive() else { return all };
        let ratio = Ratio::from_si(positive.r_over_x());
        let text = super::shown(positive);
        all.r_over_x = Some(
            Figure::new(ratio, "R/X of Z1, the infeeds in parallel", IEC_60909)
                .given("Z1", text)
                .resting_on(infeeds.places()),
        );
        all.peak_factor = kappa(infeeds, seen, &fault);
        all.breaking = breaking(infeeds, seen, &fault, separation, &three);
        if infeeds.is_off(Off::DirectCurrent) {
            return all;
        }
        all.time_constant = time_constant(infeeds, seen, &fault, separation);
        if let (Some(instant), Some(tau)) = (separation, all.time_constant.as_ref()) {
            all.direct = fault.dc_component(instant).map(|direct| {
                Figure::new(direct, "idc = sqrt2 Ik'' exp(-t/tau)", IEC_60909)
                    .from("Ik''", &three)
                    .given("t", instant.show())
                    .from("tau", tau)
            });
        }
        all
    }

    /// Whether the infeeds make an effectively earthed neutral; none where that is not known.
    pub fn effectively_earthed(&self) -> Option<bool> {
        if self.is_earthed == Some(false) {
            return Some(false);
        }
        let (x0, r0) = (self.x0_over_x1.as_ref()?, self.r0_over_x1?);
        Some(x0.value.value <= EFFECTIVE_X0_OVER_X1 && r0 <= EFFECTIVE_R0_OVER_X1)
    }

    fn earth(&mut self, infeeds: &Infeeds, seen: &Seen, fault: &Fault<'_>) {
        let Some(positive) = seen.infeed.positive() else { return };
        let zero = match seen.infeed.zero() {
            ZeroSequence::Unknown => return,
            ZeroSequence::Open => {
                self.is_earthed = Some(false);
                let none = ElectricCurrent::default();
                let figure = Figure::new(none, "Ik1 = 0, since no infeed has an earthed neutral here", IEC_60909);
                self.single_phase = Some(figure.resting_on(infeeds.places()));
                return;
            }
            ZeroSequence::Path(zero) => zero,
        };
        self.is_earthed = Some(true);
        let (z1, z0) = (super::shown(positive), super::shown(zero));
        self.single_phase = fault.single_phase().map(|current| {
            Figure::new(current, "Ik1 = sqrt3 c Un/|2 Z1 + Z0|", IEC_60909)
                .given("Z1", z1.clone())
                .given("Z0", z0.clone())
                .resting_on(infeeds.places())
        });
        self.two_phase_earth = fault.two_phase_earth_phase().map(|current| {
            Figure::new(current, "Ik2E, the greater phase current of a two-phase fault to earth", IEC_60909)
                .given("Z1", z1.clone())
                .given("Z0", z0.clone())
                .resting_on(infeeds.places())
        });
        let x1 = positive.reactance().si();
        let ratio = Ratio::from_si(zero.reactance().si() / x1);
        self.r0_over_x1 = Some(zero.resistance().si() / x1);
        self.x0_over_x1 = Some(
            Figure::new(ratio, "X0/X1 of the infeeds", IEC_60909)
                .given("Z1", z1.clone())
                .given("Z0", z0.clone())
                .resting_on(infeeds.places()),
        );
        let factor = Ratio::from_si(first_pole_factor_of(positive, zero));
        self.first_pole_factor = Some(
            Figure::new(factor, "kpp = |3 Z0/(Z1 + 2 Z0)|", "IEC/TR 62271-306 (from memory)")
                .given("Z1", z1)
                .given("Z0", z0)
                .resting_on(infeeds.places()),
        );
    }
}

impl Seen {
    /// A fault at the connection point.
    pub fn fault(&self) -> Fault<'_> {
        Fault::new(&self.infeed, self.nominal, self.c, self.frequency)
    }
}

fn three_phase(infeeds: &Infeeds, seen: &Seen, fault: &Fault<'_>) -> Figure<ElectricCurrent> {
    let converter = seen.infeed.converter_current();
    let formula = if converter.si() > 0.0 {
        "Ik3 = c Un/(sqrt3 |Z1|) + the converters' current, Z1 the infeeds in parallel"
    } else {
        "Ik3 = c Un/(sqrt3 |Z1|), Z1 the infeeds in parallel"
    };
    let mut figure = Figure::new(fault.three_phase(), formula, IEC_60909)
        .given("c", significant(seen.c, 3))
        .given("Un", seen.nominal.show());
    if let Some(positive) = seen.infeed.positive() {
        figure = figure.given("Z1", super::shown(positive));
    }
    with_parts(figure, infeeds)
}

/// kappa: of R/X where one chain of elements feeds, else by method C, since branches of different R/X let the DC component decay
/// more slowly than R/X at the point says, and A and B are no closer.
fn kappa(infeeds: &Infeeds, seen: &Seen, fault: &Fault<'_>) -> Option<Figure<Ratio>> {
    let kappa = Ratio::from_si(fault.peak_factor(PeakMethod::EquivalentFrequency)?);
    let peak = seen.infeed.positive_for_peak(1.0)?;
    if seen.infeed.is_one_branch() {
        let figure = Figure::new(kappa, "kappa = 1.02 + 0.98 exp(-3 R/X), one branch feeds", IEC_60909);
        return Some(figure.given("R/X", significant(peak.r_over_x(), 3)).resting_on(infeeds.places()));
    }
    let equivalent = seen.frequency * EQUIVALENT_SHARE;
    let at_equivalent = seen.infeed.positive_for_peak(EQUIVALENT_SHARE)?;
    let ratio = at_equivalent.r_over_x() * EQUIVALENT_SHARE;
    let figure = Figure::new(
        kappa,
        "kappa = 1.02 + 0.98 exp(-3 R/X), R/X = (Rc/Xc)(fc/f) by method C, since several branches feed",
        IEC_60909,
    );
    let figure = figure.given("R/X", significant(ratio, 3)).given("fc", equivalent.show()).resting_on(infeeds.places());
    Some(figure)
}

/// One branch has one time constant. Of several the slower ones last, so that it grows with the instant: by the equivalent frequency
/// for contact separation, and where that is not known by the one that kappa goes by.
fn time_constant(infeeds: &Infeeds, seen: &Seen, fault: &Fault<'_>, instant: Option<Time>) -> Option<Figure<Time>> {
    const ONE: &str = "tau = 1/(2 pi f R/X), R/X of the infeeds, which are one branch";
    const AT_SEPARATION: &str =
        "tau = 1/(2 pi f R/X), R/X of the infeeds by the equivalent frequency of contact separation";
    const BY_C: &str = "tau = 1/(2 pi f R/X), R/X = (Rc/Xc)(fc/f) by method C, since no opening time is stated";
    let omega = std::f64::consts::TAU * seen.frequency.si();
    let (tau, formula) = if seen.infeed.is_one_branch() {
        (fault.time_constant(None)?, ONE)
    } else if instant.is_some() {
        (fault.time_constant(instant)?, AT_SEPARATION)
    } else {
        let ratio = seen.infeed.positive_at(EQUIVALENT_SHARE)?.r_over_x() * EQUIVALENT_SHARE;
        (Time::from_si(1.0 / (omega * Some(ratio).filter(|ratio| *ratio > 0.0)?)), BY_C)
    };
    let mut figure = Figure::new(tau, formula, IEC_60909).given("R/X", significant(1.0 / (omega * tau.si()), 3));
    if let (AT_SEPARATION, Some(instant)) = (formula, instant) {
        figure = figure.given("t", instant.show());
    }
    Some(figure.given("f", seen.frequency.show()).resting_on(infeeds.places()))
}

fn breaking(
    infeeds: &Infeeds,
    seen: &Seen,
    fault: &Fault<'_>,
    instant: Option<Time>,
    three: &Figure<ElectricCurrent>,
) -> Option<Figure<ElectricCurrent>> {
    let instant = instant.filter(|_| seen.infeed.has_machines())?;
    let figure = Figure::new(
        fault.breaking(instant),
        "Ib = Ik'' less what machines have lost at contact separation, (1 - mu) or (1 - mu q) of their part",
        IEC_60909,
    );
    Some(figure.from("Ik''", three).given("tmin", instant.show()).resting_on(infeeds.places()))
}
