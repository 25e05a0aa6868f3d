//! The short-circuit duty: current, time constant, DC component, peak, heat.

use super::{Duty, Figure, FromInfeeds, percent};
use crate::case::Case;
use crate::particular::{Particular, breaker, system, tender};
use crate::physics::{dc_component, short_circuit};
use crate::quantity::{ElectricCurrent, ElectricPotential, Frequency, Physical, Power, Ratio, Time, significant};
use crate::sheet::Stated;
use crate::standards::{MakingCase, TimeConstantCase, TimeConstants, making_factor};

const IEC_60909: &str = "IEC 60909-0 (from memory)";
const DC: &str = "IEC 62271-100 5.101, IEC/TR 62271-306 (from memory)";

/// Computes what the text says enough for.
pub(super) fn fill(case: &Case<'_>, duty: &mut Duty) {
    duty.infeeds = FromInfeeds::of(&case.infeeds, instant(case).map(|figure| figure.value));
    currents(case, duty);
    duty.time_constant = time_constant(case, duty);
    peak(case, duty);
    rated(case, duty);
    separation(case, duty);
    heat(case, duty);
}

fn currents(case: &Case<'_>, duty: &mut Duty) {
    let system = &case.system;
    let own = system.quantity::<ElectricCurrent>(&system::SHORT_CIRCUIT_CURRENT).map(|s| Figure::stated("Ik3", &s));
    let stated = own.or_else(|| of_fault_level(case));
    // What the system states counts; growth is of stated levels only.
    let is_stated = stated.is_some();
    duty.short_circuit_current = stated.map(|figure| grown(case, figure)).or_else(|| duty.infeeds.three_phase.clone());
    duty.single_phase_current = system
        .quantity(&system::SINGLE_PHASE_SHORT_CIRCUIT_CURRENT)
        .map(|s| Figure::stated("Ik1", &s))
        .or_else(|| duty.infeeds.single_phase.clone());
    let two_phase = system
        .quantity(&system::TWO_PHASE_TO_EARTH_SHORT_CIRCUIT_CURRENT)
        .map(|s| Figure::stated("Ik2E", &s))
        .or_else(|| duty.infeeds.two_phase_earth.clone());
    duty.breaking_duty = largest(&[
        ("Ik3", duty.short_circuit_current.as_ref()),
        ("Ik1", duty.single_phase_current.as_ref()),
        ("Ik2E", two_phase.as_ref()),
    ]);
    // Where the breaker's own share is documented, that is what it has to break.
    let share = case.breaker.quantity::<ElectricCurrent>(&breaker::SHORT_CIRCUIT_CURRENT_THROUGH_THE_BREAKER);
    if let Some(share) = &share {
        duty.breaking_duty = Some(Figure::stated("share of the breaker", share));
    }
    let decayed =
        system.quantity(&system::SYMMETRICAL_SHORT_CIRCUIT_BREAKING_CURRENT).map(|s| Figure::stated("Ib", &s));
    duty.symmetrical_breaking_current = decayed.or_else(|| {
        // Machines among the infeeds let the current of three phases decay; that of one phase or two is taken as it begins.
        if let Some(breaking) = duty.infeeds.breaking.as_ref().filter(|_| !is_stated && share.is_none()) {
            return largest(&[
                ("Ib", Some(breaking)),
                ("Ik1", duty.single_phase_current.as_ref()),
                ("Ik2E", two_phase.as_ref()),
            ]);
        }
        let initial = duty.breaking_duty.as_ref()?;
        Some(Figure::new(initial.value, "Ib = Ik'' far from generators", IEC_60909).from("Ik''", initial))
    });
}

/// The current of a fault level whose voltage is stated.
fn of_fault_level(case: &Case<'_>) -> Option<Figure<ElectricCurrent>> {
    let level: Stated<'_, Power> = case.system.quantity(&system::FAULT_LEVEL)?;
    let at = level.statement.quantity()?.at?;
    let voltage: ElectricPotential = at.to()?;
    let current = short_circuit::current_of_fault_level(level.value, voltage);
    Some(Figure::new(current, "Ik3 = S/(sqrt3 U)", IEC_60909).with("S", &level).given("U", at.to_string()))
}

/// The level at the end of the service life, where growth is stated: the stated percentage of each year upon the last.
fn grown(case: &Case<'_>, initial: Figure<ElectricCurrent>) -> Figure<ElectricCurrent> {
    let Some((growth, _)) = case.system.quantity_reading(&system::GROWTH_OF_SHORT_CIRCUIT_CURRENT) else {
        return initial;
    };
    let Some(a_second) = growth.measure.si else { return initial };
    let life: Option<Stated<'_, Time>> = case.tender.quantity(&tender::SERVICE_LIFE);
    let year =
        crate::quantity::canonical(crate::quantity::Dimension::SharePerYear).to_si(100.0).map_or(1.0, f64::recip);
    let years = life.map_or(SERVICE_LIFE_YEARS, |l| l.value.si() / year);
    let factor = (1.0 + a_second * year).powf(years);
    let figure =
        Figure::new(initial.value * factor, "Ik3 (1 + growth)^years", "buyer's growth, common practice, no source");
    figure.from("Ik3", &initial).given("growth", growth.measure.to_string()).given("years", significant(years, 3))
}

/// Years over which operations and growth are counted, unless the tender says otherwise (common practice, no source).
const SERVICE_LIFE_YEARS: f64 = 30.0;

fn largest(figures: &[(&'static str, Option<&Figure<ElectricCurrent>>)]) -> Option<Figure<ElectricCurrent>> {
    let known: Vec<_> = figures.iter().filter_map(|(symbol, figure)| figure.map(|f| (*symbol, f))).collect();
    let (_, first) = known.iter().max_by(|a, b| a.1.value.si().total_cmp(&b.1.value.si()))?;
    if known.len() == 1 {
        return Some((*first).clone());
    }
    let mut figure = Figure::new(first.value, "largest of the fault currents", IEC_60909);
    for (symbol, known) in &known {
        figure = figure.from(symbol, known);
    }
    Some(figure)
}

/// The time constant of the network: as stated, else of X/R, else of R/X, else of the peak and the initial current.
fn time_constant(case: &Case<'_>, duty: &Duty) -> Option<Figure<Time>> {
    let system = &case.system;
    if let Some(stated) = system.quantity::<Time>(&system::DC_TIME_CONSTANT) {
        return Some(Figure::stated("tau", &stated));
    }
    let frequency = case.frequency()?;
    if let Some(stated) = system.quantity::<Ratio>(&system::X_OVER_R) {
        let tau = short_circuit::time_constant(stated.value.value, frequency);
        return Some(
            Figure::new(tau, "tau = (X/R)/(2 pi f)", "IEC 60909-0, IEEE C37.010 (from memory)")
                .with("X/R", &stated)
                .given("f", frequency.show()),
        );
    }
    if let Some(stated) = system.quantity::<Ratio>(&system::R_OVER_X).filter(|s| s.value.value > 0.0) {
        let tau = short_circuit::time_constant(stated.value.value.recip(), frequency);
        return Some(
            Figure::new(tau, "tau = 1/(2 pi f R/X)", "IEC 60909-0 (from memory)")
                .with("R/X", &stated)
                .given("f", frequency.show()),
        );
    }
    let Some(peak) = system.quantity::<ElectricCurrent>(&system::PEAK_SHORT_CIRCUIT_CURRENT) else {
        return duty.infeeds.time_constant.clone();
    };
    let initial = duty.short_circuit_current.as_ref()?;
    let r_over_x = short_circuit::r_over_x_of_peak(peak.value, initial.value).filter(|r| *r > 0.0)?;
    let tau = short_circuit::time_constant(r_over_x.recip(), frequency);
    Some(
        Figure::new(tau, "tau = 1/(2 pi f R/X), R/X = -ln((ip/(sqrt2 Ik'') - 1.02)/0.98)/3", IEC_60909)
            .with("ip", &peak)
            .from("Ik''", initial)
            .given("f", frequency.show()),
    )
}

/// Whether the system itself states how its DC component decays.
fn states_decay(case: &Case<'_>) -> bool {
    let by: [&Particular; 4] =
        [&system::DC_TIME_CONSTANT, &system::X_OVER_R, &system::R_OVER_X, &system::PEAK_SHORT_CIRCUIT_CURRENT];
    by.into_iter().any(|particular| case.system.mentions(particular))
}

fn peak(case: &Case<'_>, duty: &mut Duty) {
    let of_tau = duty.time_constant.as_ref().zip(case.frequency()).map(|(tau, frequency)| {
        let kappa = short_circuit::peak_factor(short_circuit::x_over_r(tau.value, frequency).recip());
        Figure::new(Ratio::from_si(kappa), "kappa = 1.02 + 0.98 exp(-3 R/X), R/X = 1/(2 pi f tau)", IEC_60909)
            .from("tau", tau)
            .given("f", frequency.show())
    });
    duty.peak_factor = duty.infeeds.peak_factor.clone().filter(|_| !states_decay(case)).or(of_tau);
    let stated =
        case.system.quantity::<ElectricCurrent>(&system::PEAK_SHORT_CIRCUIT_CURRENT).map(|s| Figure::stated("ip", &s));
    duty.peak_current = stated.or_else(|| {
        let (kappa, initial) = duty.peak_factor.as_ref().zip(duty.breaking_duty.as_ref())?;
        let peak = short_circuit::peak_current(initial.value, kappa.value.value);
        Some(Figure::new(peak, "ip = kappa sqrt2 Ik''", IEC_60909).from("kappa", kappa).from("Ik''", initial))
    });
}

/// What the rating itself stands for: time constant and making current, where they are not stated.
fn rated(case: &Case<'_>, duty: &mut Duty) {
    let stated = case.breaker.quantity::<Time>(&breaker::DC_TIME_CONSTANT).map(|s| Figure::stated("tau", &s));
    let assumed = || {
        let standard = TimeConstants::standard()?;
        Some(Figure::new(standard, "standard time constant, since none is stated", "IEC 62271-100 5.101 (from memory)"))
    };
    // A rating that is left to the duty has no time constant until it is chosen.
    let open = case.breaker.mentions(&breaker::DC_TIME_CONSTANT);
    duty.rated_time_constant = if open { stated } else { stated.or_else(assumed) };
    duty.making_current_rated = making(case, duty);
}

fn making(case: &Case<'_>, duty: &Duty) -> Option<Figure<ElectricCurrent>> {
    if let Some(stated) = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_MAKING_CURRENT) {
        let is_rms = stated.statement.quantity().is_some_and(|q| q.is(crate::quantity::Qualifier::Rms));
        return (!is_rms).then(|| Figure::stated("Ima", &stated));
    }
    let breaking: Stated<'_, ElectricCurrent> =
        case.breaker.quantity(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)?;
    let (factor, named) = making_factor_of(case, duty)?;
    Some(
        Figure::new(breaking.value * factor, "Ima = F Isc", "IEC 62271-100 5.103 (from memory)")
            .given("F", format!("{} ({named})", significant(factor, 3)))
            .with("Isc", &breaking),
    )
}

/// The factor between breaking and making current that the rating asks for, and why.
pub(crate) fn making_factor_of(case: &Case<'_>, duty: &Duty) -> Option<(f64, String)> {
    let frequency = case.frequency()?;
    let tau = duty.rated_time_constant.as_ref()?.value;
    let listed = case.rated_voltage().and_then(|ur| TimeConstants::of(ur.value, true).case(tau));
    let standard = TimeConstants::standard()?;
    let making = if case.is_generator_breaker() || listed == Some(TimeConstantCase::Generator) {
        MakingCase::Generator
    } else if tau.si() > standard.si() * (1.0 + 1e-6) {
        MakingCase::Special
    } else {
        MakingCase::Standard
    };
    making_factor(making, frequency).map(|factor| (factor, format!("{} and {}", frequency.show(), tau.show())))
}

/// Time from the fault to contact separation.
fn instant(case: &Case<'_>) -> Option<Figure<Time>> {
    let opening = case.breaker.least::<Time>(&breaker::OPENING_TIME)?;
    let frequency = case.frequency()?;
    let time = dc_component::contact_separation(opening.value, frequency);
    Some(Figure::new(time, "t = Top + half a cycle", DC).with("Top", &opening).given("f", frequency.show()))
}

fn separation(case: &Case<'_>, duty: &mut Duty) {
    let Some(separation) = instant(case) else { return };
    let time = separation.value;
    let share = |tau: &Figure<Time>| {
        let share = dc_component::share(time, tau.value);
        Figure::new(share, "p = exp(-t/tau)", DC).from("t", &separation).from("tau", tau).shown(percent(share.value))
    };
    duty.dc_share = duty.time_constant.as_ref().map(&share);
    duty.dc_share_rated = duty.rated_time_constant.as_ref().map(&share);
    let total = |current: &Figure<ElectricCurrent>, share: &Figure<Ratio>, symbol: &'static str| {
        let total = dc_component::total_current(current.value, share.value);
        let figure = Figure::new(total, "Itot = I sqrt(1 + 2 p^2)", "IEEE C37.04, IEC/TR 62271-306 (from memory)");
        figure.from(symbol, current).given("p", percent(share.value.value))
    };
    duty.asymmetrical_current = asymmetrical(duty)
        .or_else(|| duty.breaking_duty.as_ref().zip(duty.dc_share.as_ref()).map(|(i, share)| total(i, share, "Ik''")));
    let rating = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT);
    let rating = rating.map(|s| Figure::stated("Isc", &s));
    duty.asymmetrical_current_rated =
        rating.as_ref().zip(duty.dc_share_rated.as_ref()).map(|(current, share)| total(current, share, "Isc"));
    duty.separation = Some(separation);
}

/// The total where the alternating current has decayed: the direct current is still that of the initial one.
fn asymmetrical(duty: &Duty) -> Option<Figure<ElectricCurrent>> {
    let (decayed, initial) = (duty.symmetrical_breaking_current.as_ref()?, duty.breaking_duty.as_ref()?);
    let share = duty.dc_share.as_ref()?;
    if decayed.value.si() >= initial.value.si() {
        return None;
    }
    let direct = initial.value.si() * share.value.value;
    let total = ElectricCurrent::from_si((decayed.value.si().powi(2) + 2.0 * direct * direct).sqrt());
    let basis = "IEEE C37.04, IEC/TR 62271-306 (from memory)";
    let figure = Figure::new(total, "Itot = sqrt(Ib^2 + 2 (p Ik'')^2)", basis);
    Some(figure.from("Ib", decayed).given("p", percent(share.value.value)).from("Ik''", initial))
}

fn heat(case: &Case<'_>, duty: &mut Duty) {
    let clearing: Option<Stated<'_, Time>> = case.system.quantity(&system::BACKUP_CLEARING_TIME);
    let stated = case.system.quantity::<ElectricCurrent>(&system::THERMAL_EQUIVALENT_SHORT_CIRCUIT_CURRENT);
    let frequency: Option<Frequency> = case.frequency();
    duty.thermal_current = stated.map(|s| Figure::stated("Ith", &s)).or_else(|| {
        let (clearing, frequency) = clearing.as_ref().zip(frequency)?;
        let (kappa, initial) = duty.peak_factor.as_ref().zip(duty.breaking_duty.as_ref())?;
        let m = short_circuit::dc_heat(kappa.value.value, frequency, clearing.value);
        let thermal = short_circuit::thermal_current(initial.value, m);
        let figure = Figure::new(thermal, "Ith = Ik'' sqrt(m + n), n = 1 far from generators", IEC_60909);
        Some(figure.from("Ik''", initial).given("m", significant(m, 3)).from("kappa", kappa).with("Tk", clearing))
    });
    duty.thermal_duty = duty.thermal_current.as_ref().zip(clearing.as_ref()).map(|(thermal, clearing)| {
        let heat = short_circuit::joule_integral(thermal.value, clearing.value);
        Figure::new(heat, "Ith^2 Tk", IEC_60909).from("Ith", thermal).with("Tk", clearing)
    });
    let current = case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT);
    let time = case.breaker.quantity::<Time>(&breaker::RATED_DURATION_OF_SHORT_CIRCUIT);
    duty.thermal_rated = current.zip(time).map(|(current, time)| {
        let heat = short_circuit::joule_integral(current.value, time.value);
        Figure::new(heat, "Ik^2 tk", "IEC 62271-1 5.6 and 5.8 (from memory)").with("Ik", &current).with("tk", &time)
    });
}
