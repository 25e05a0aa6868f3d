//! The recovery voltage that the network gives to a terminal fault, where its infeeds say enough.

use super::{AtBusbar, BusbarKind, Infeeds, Lacking, Off};
use crate::case::Case;
use crate::duty::{Duty, Figure};
use crate::particular::{breaker, infeed, system};
use crate::physics::network_trv::{
    SurgeImpedances, Withstand, equivalent_surge_impedance, exponential_rise, natural_frequency, one_minus_cosine,
    source_inductance, withstand_at,
};
use crate::physics::short_line_fault::there_and_back;
use crate::physics::trv::crest;
use crate::quantity::{
    Capacitance, ElectricCurrent, ElectricPotential, ElectricalResistance, Frequency, Inductance, Length, Physical,
    Ratio, Time, VoltageRate, significant,
};
use crate::source::Place;
use crate::standards::{GeneratorFault, SystemClass, first_pole_factors, generator_breaker_trv};

const C37_011: &str = "IEEE C37.011 (from memory)";

/// The recovery voltage of the network at the busbar.
#[derive(Clone, Debug, Default)]
pub struct NetworkTrv {
    /// Its peak: what lines let it tend to until reflections come back, or the peak of the oscillation.
    pub peak: Option<Figure<ElectricPotential>>,
    /// The steepest line from the origin that it touches.
    pub rate: Option<Figure<VoltageRate>>,
    /// The lines or apparatus that shape it.
    pub shaped_by: Vec<Place>,
}

/// What a breaker is rated to withstand at a current: peak and rate of the standard envelopes, between the duties.
pub(crate) fn withstand(case: &Case<'_>, current: ElectricCurrent) -> Option<(Withstand, Ratio)> {
    let rated = case.rated_voltage()?.value;
    let isc = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?.value;
    if case.is_generator_breaker() {
        let share = current / isc;
        return generator_breaker(case, rated).filter(|_| share.value <= 1.0).map(|withstand| (withstand, share));
    }
    let kpp = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR)?.value.value;
    let class = case.breaker.class(&breaker::CLASSES, 'S').map(|(class, _)| match class.grade {
        1 => SystemClass::S1,
        _ => SystemClass::S2,
    });
    let share = current / isc;
    withstand_at(rated, kpp, class, share.value).map(|withstand| (withstand, share))
}

/// What a generator circuit-breaker withstands: of the greatest transformer at the busbar, through which the system feeds the fault,
/// else of the greatest generator there.
fn generator_breaker(case: &Case<'_>, rated: ElectricPotential) -> Option<Withstand> {
    let greatest = |machines: bool| {
        let powers = case.infeeds.at_busbar.iter().filter_map(|thing| match thing.kind {
            BusbarKind::Apparatus { machine, power, .. } if machine == machines => power,
            _ => None,
        });
        powers.max_by(|a, b| a.si().total_cmp(&b.si()))
    };
    let row = greatest(false)
        .and_then(|power| generator_breaker_trv(GeneratorFault::SystemSource, power))
        .or_else(|| generator_breaker_trv(GeneratorFault::GeneratorSource, greatest(true)?))?;
    Some(Withstand { peak: row.peak(rated), rate: row.rate() })
}

/// What is almost enough for a recovery voltage: of things of one kind at the busbar some say what they are for a wave, others not.
pub(super) fn almost_enough(at_busbar: &[AtBusbar]) -> Vec<Lacking> {
    if at_busbar.iter().any(|thing| matches!(thing.kind, BusbarKind::Other)) {
        return Vec::new();
    }
    let lines = at_busbar.iter().filter_map(|thing| match thing.kind {
        BusbarKind::Line { positive, zero, .. } => {
            let mut what = Vec::new();
            if positive.is_none() {
                what.push(infeed::SURGE_IMPEDANCE.label.to_owned());
            }
            if zero.is_none() {
                what.push(infeed::ZERO_SEQUENCE_SURGE_IMPEDANCE.label.to_owned());
            }
            Some((thing, what))
        }
        _ => None,
    });
    let lines: Vec<_> = lines.collect();
    // A line that says both, or one of the two.
    let begun = lines.iter().any(|(_, what)| what.len() < 2);
    let apparatus = at_busbar.iter().filter_map(|thing| match thing.kind {
        BusbarKind::Apparatus { natural: None, capacitance: None, .. } => {
            let either = format!("{} or {}", infeed::NATURAL_FREQUENCY.label, infeed::CAPACITANCE_TO_EARTH.label);
            Some((thing, vec![either]))
        }
        BusbarKind::Apparatus { .. } => Some((thing, Vec::new())),
        _ => None,
    });
    let apparatus: Vec<_> = apparatus.collect();
    let swings = lines.is_empty() && apparatus.iter().any(|(_, what)| what.is_empty());
    let incomplete = if begun {
        lines
    } else if swings {
        apparatus
    } else {
        Vec::new()
    };
    incomplete
        .into_iter()
        .filter(|(_, what)| !what.is_empty())
        .map(|(thing, what)| Lacking {
            title: format!("infeed {}", thing.name),
            place: thing.place,
            what,
            off: Off::RecoveryVoltage,
        })
        .collect()
}

/// What all waves need.
struct Fault {
    rated: ElectricPotential,
    kpp: Ratio,
    current: ElectricCurrent,
    frequency: Frequency,
    /// At the busbar.
    capacitance: Capacitance,
}

impl NetworkTrv {
    /// Of a terminal fault at the busbar; empty where infeeds say too little.
    pub(crate) fn of(case: &Case<'_>, infeeds: &Infeeds, duty: &Duty) -> Self {
        let Some(fault) = fault(case, duty) else { return Self::default() };
        let things = &infeeds.at_busbar;
        let known = |kind: &BusbarKind| !matches!(kind, BusbarKind::Other);
        if things.is_empty() || infeeds.is_off(Off::RecoveryVoltage) || !things.iter().all(|t| known(&t.kind)) {
            return Self::default();
        }
        of_lines(infeeds, &fault).or_else(|| of_apparatus(case, infeeds, &fault)).unwrap_or_default()
    }
}

fn fault(case: &Case<'_>, duty: &Duty) -> Option<Fault> {
    let kpp = case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR).map(|stated| stated.value);
    let share = case.breaker.quantity(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER).map(|stated| stated.value);
    Some(Fault {
        rated: case.rated_voltage()?.value,
        kpp: duty.first_pole_factor.as_ref().map(|figure| figure.value).or(kpp)?,
        current: share.or_else(|| duty.short_circuit_current.as_ref().map(|figure| figure.value))?,
        frequency: case.frequency()?,
        capacitance: case
            .system
            .quantity::<Capacitance>(&system::CAPACITANCE_AT_THE_BUSBAR)
            .map(|stated| stated.value)
            .unwrap_or_default(),
    })
}

/// The lines at the busbar as one wave sees them.
#[derive(Default)]
struct Lines {
    /// Equal ones side by side as one.
    impedances: Vec<SurgeImpedances>,
    /// Those whose far end is open, with their length.
    open: Vec<(SurgeImpedances, Length)>,
    number: u32,
    shortest: Option<Length>,
    capacitance: Capacitance,
    places: Vec<Place>,
}

impl Lines {
    fn of(things: &[AtBusbar], capacitance: Capacitance) -> Option<Self> {
        let mut lines = Self { capacitance, ..Self::default() };
        for thing in things {
            let many = f64::from(thing.number);
            match thing.kind {
                BusbarKind::Line { positive: Some(positive), zero: Some(zero), length, open } => {
                    let all = SurgeImpedances { positive: positive / many, zero: zero / many };
                    lines.impedances.push(all);
                    lines.number = lines.number.saturating_add(thing.number);
                    lines.places.push(thing.place);
                    let Some(length) = length else { continue };
                    if lines.shortest.is_none_or(|shortest| length < shortest) {
                        lines.shortest = Some(length);
                    }
                    if open {
                        lines.open.push((all, length));
                    }
                }
                BusbarKind::Apparatus { capacitance: Some(own), .. } => lines.capacitance += own * many,
                BusbarKind::Apparatus { .. } | BusbarKind::Other => {}
                BusbarKind::Line { .. } => return None,
            }
        }
        Some(lines)
    }
}

/// Lines and cables at the busbar: an exponential rise.
fn of_lines(infeeds: &Infeeds, fault: &Fault) -> Option<NetworkTrv> {
    let mut lines = Lines::of(&infeeds.at_busbar, fault.capacitance)?;
    // Only where all sources are described is a line without one known to end open.
    if infeeds.seen.is_none() {
        lines.open.clear();
    }
    let z = equivalent_surge_impedance(&lines.impedances)?;
    let (kpp, c) = (fault.kpp.value, lines.capacitance);
    let rise = exponential_rise(fault.rated, kpp, fault.current, fault.frequency, z, c, lines.shortest);
    let mut rate = Figure::new(
        rise.tangent(),
        "steepest line from the origin to E (1 - exp(-t/tau)) with its delay C Zeq; sqrt2 w I Zeq without delay",
        C37_011,
    )
    .given("I", fault.current.show())
    .given("Zeq", format!("{} of {} lines", z.show(), lines.number))
    .given("C", c.show());
    if let Some(reflection) = rise.first_reflection {
        rate = rate.given("first reflection", micro(reflection));
    }
    // The highest of the reflections from lines that are open at their far end; at a source a wave comes back with another sign.
    let reflected = lines.open.iter().filter_map(|(own, length)| {
        let own = equivalent_surge_impedance(&[*own])?;
        let back = there_and_back(*length);
        Some((rise.crest_with_reflection(back, 2.0 * (z / own).value), back))
    });
    let highest = reflected.max_by(|a, b| a.0.si().total_cmp(&b.0.si()));
    let peak = match highest {
        Some((crest, back)) => Figure::new(
            crest,
            "E (1 + K e^-x), E = kpp Ur sqrt(2/3), K = 2 Zeq/Z of the open line, x = 1 + exp(-t/tau)/K",
            C37_011,
        )
        .given("t", micro(back))
        .given("tau", micro(rise.time_constant)),
        None => Figure::new(rise.crest, "E = kpp Ur sqrt(2/3), of no line is the far end known to be open", C37_011),
    };
    let peak = peak.given("kpp", significant(kpp, 3)).given("Ur", fault.rated.show());
    Some(NetworkTrv {
        peak: Some(peak.resting_on(lines.places.iter().copied())),
        rate: Some(rate.resting_on(lines.places.iter().copied())),
        shaped_by: lines.places,
    })
}

fn micro(time: Time) -> String {
    format!("{} us", significant(time.si() * 1e6, 3))
}

/// Transformers, machines and reactors only: one oscillation of the source's inductance with their capacitance.
fn of_apparatus(case: &Case<'_>, infeeds: &Infeeds, fault: &Fault) -> Option<NetworkTrv> {
    let omega = std::f64::consts::TAU * fault.frequency.si();
    let mut capacitance = fault.capacitance;
    for thing in &infeeds.at_busbar {
        let BusbarKind::Apparatus { reactance, natural, capacitance: own, .. } = thing.kind else { return None };
        capacitance += match (own, natural) {
            (Some(own), _) => own * f64::from(thing.number),
            // Its own inductance, of all that stand side by side, and its own frequency give its capacitance.
            (None, Some(natural)) => {
                let own = std::f64::consts::TAU * natural.si();
                Capacitance::from_si(1.0 / (own * own * reactance?.si() / omega))
            }
            (None, None) => return None,
        };
    }
    let seen = infeeds.seen.as_ref().and_then(|seen| seen.infeed.positive());
    let inductance = seen.map_or_else(
        || source_inductance(fault.rated, fault.current, fault.frequency),
        |z| Inductance::from_si(z.reactance().si() / omega),
    );
    let (withstand, _) = withstand(case, fault.current)?;
    // The standard of generator circuit-breakers counts with 1.5.
    let own = if case.is_generator_breaker() { first_pole_factors().last().map(Ratio::from_si) } else { None };
    let stated = || case.breaker.quantity::<Ratio>(&breaker::FIRST_POLE_TO_CLEAR_FACTOR).map(|stated| stated.value);
    let kpp = own.or_else(stated)?;
    let swing = crest(fault.rated);
    // No study says how it is damped: as the standard's wave.
    let amplitude = (withstand.peak / (swing * kpp)).value;
    let frequency = natural_frequency(inductance, capacitance);
    let wave = one_minus_cosine(swing * fault.kpp, amplitude, frequency);
    let shaped_by: Vec<Place> = infeeds.at_busbar.iter().map(|thing| thing.place).collect();
    let shown = |figure: Figure<VoltageRate>| {
        figure
            .given("f", kilohertz(frequency))
            .given("L", inductance.show())
            .given("C", capacitance.show())
            .given("peak", wave.peak.show())
    };
    let rate = shown(Figure::new(wave.rate, "1.138 peak 2 f, f = 1/(2 pi sqrt(L C))", C37_011));
    let peak = Figure::new(wave.peak, "kaf kpp Ur sqrt(2/3), damped as the standard's wave at that current", C37_011)
        .given("kaf", significant(amplitude, 3))
        .given("kpp", significant(fault.kpp.value, 3))
        .given("Ur", fault.rated.show());
    Some(NetworkTrv {
        peak: Some(peak.resting_on(shaped_by.iter().copied())),
        rate: Some(rate.resting_on(shaped_by.iter().copied())),
        shaped_by,
    })
}

fn kilohertz(frequency: Frequency) -> String {
    format!("{} kHz", significant(frequency.si() / 1e3, 3))
}

/// The tangent rate of the oscillation that a known capacitance or natural frequency gives to a fault limited by `reactance`, held
/// against the envelope at `current`; none where neither is known, or where there is no envelope. `true`: the envelope covers it.
pub(crate) fn limited(
    case: &Case<'_>,
    current: ElectricCurrent,
    reactance: ElectricalResistance,
    natural: Option<Frequency>,
    capacitance: Option<Capacitance>,
) -> Option<(bool, String)> {
    let omega = std::f64::consts::TAU * case.frequency()?.si();
    let frequency = natural
        .or_else(|| capacitance.map(|c| natural_frequency(Inductance::from_si(reactance.si() / omega), c)))
        .filter(|f| f.si().is_finite() && f.si() > 0.0)?;
    let (withstand, share) = withstand(case, current)?;
    // At equal peaks the rates compare as the times do.
    let wave = one_minus_cosine(withstand.peak, 1.0, frequency);
    let covered = wave.rate.si() <= withstand.rate.si();
    let working = format!(
        "1.138 x {} x 2 x {} = {}, {} {} of the envelope at {} of Isc",
        withstand.peak.show(),
        kilohertz(frequency),
        wave.rate.show(),
        if covered { "within the" } else { "above the" },
        withstand.rate.show(),
        crate::duty::percent(share.value)
    );
    Some((covered, working))
}
