//! First-pole-to-clear factor, TRV, short-line faults, out of phase.

use super::{Choice, Outcome, chosen, known, measure, needs, no_value, printed, yes_no};
use crate::case::Case;
use crate::particular::{breaker, circuit};
use crate::physics::trv::Envelope;
use crate::quantity::{Dimension, ElectricCurrent, Physical, significant};
use crate::sheet::Stated;
use crate::standards::{self, Duty, VoltageRange};

pub(super) static CHOICES: &[Choice] = &[
    Choice::base(&breaker::FIRST_POLE_TO_CLEAR_FACTOR, first_pole),
    Choice::base(&breaker::OUT_OF_PHASE_VOLTAGE_FACTOR, out_of_phase_factor),
    // Below 100 kV the envelopes hang on the class.
    Choice::base(&breaker::CLASSES, super::operation::classes),
    Choice::leaf(&breaker::T100_TRV_PEAK, |case| value(case, Duty::T100, PEAK)),
    Choice::leaf(&breaker::T60_TRV_PEAK, |case| value(case, Duty::T60, PEAK)),
    Choice::leaf(&breaker::T30_TRV_PEAK, |case| value(case, Duty::T30, PEAK)),
    Choice::leaf(&breaker::T10_TRV_PEAK, |case| value(case, Duty::T10, PEAK)),
    Choice::leaf(&breaker::OP_TRV_PEAK, |case| value(case, Duty::OutOfPhase, PEAK)),
    Choice::leaf(&breaker::T100_RATE_OF_RISE, |case| value(case, Duty::T100, RATE)),
    Choice::leaf(&breaker::T60_RATE_OF_RISE, |case| value(case, Duty::T60, RATE)),
    Choice::leaf(&breaker::T30_RATE_OF_RISE, |case| value(case, Duty::T30, RATE)),
    Choice::leaf(&breaker::T10_RATE_OF_RISE, |case| value(case, Duty::T10, RATE)),
    Choice::leaf(&breaker::OP_RATE_OF_RISE, |case| value(case, Duty::OutOfPhase, RATE)),
    Choice::leaf(&breaker::T100_AMPLITUDE_FACTOR, |case| value(case, Duty::T100, AMPLITUDE)),
    Choice::leaf(&breaker::T60_AMPLITUDE_FACTOR, |case| value(case, Duty::T60, AMPLITUDE)),
    Choice::leaf(&breaker::T30_AMPLITUDE_FACTOR, |case| value(case, Duty::T30, AMPLITUDE)),
    Choice::leaf(&breaker::T10_AMPLITUDE_FACTOR, |case| value(case, Duty::T10, AMPLITUDE)),
    Choice::leaf(&breaker::OP_AMPLITUDE_FACTOR, |case| value(case, Duty::OutOfPhase, AMPLITUDE)),
    Choice::leaf(&breaker::T100_TIME_T3, |case| value(case, Duty::T100, T3)),
    Choice::leaf(&breaker::T60_TIME_T3, |case| value(case, Duty::T60, T3)),
    Choice::leaf(&breaker::T30_TIME_T3, |case| value(case, Duty::T30, T3)),
    Choice::leaf(&breaker::T10_TIME_T3, |case| value(case, Duty::T10, T3)),
    Choice::leaf(&breaker::OP_TIME_T3, |case| value(case, Duty::OutOfPhase, T3)),
    Choice::leaf(&breaker::T100_FIRST_REFERENCE_VOLTAGE, |case| value(case, Duty::T100, U1)),
    Choice::leaf(&breaker::T60_FIRST_REFERENCE_VOLTAGE, |case| value(case, Duty::T60, U1)),
    Choice::leaf(&breaker::T100_TIME_T1, |case| value(case, Duty::T100, T1)),
    Choice::leaf(&breaker::T60_TIME_T1, |case| value(case, Duty::T60, T1)),
    Choice::leaf(&breaker::SHORT_LINE_FAULT, short_line),
    Choice::leaf(&breaker::SHORT_LINE_FAULT_SURGE_IMPEDANCE, surge_impedance),
    Choice::leaf(&breaker::SHORT_LINE_FAULT_PEAK_FACTOR, peak_factor),
    Choice::leaf(&breaker::INITIAL_TRV, initial),
    Choice::leaf(&breaker::RATED_OUT_OF_PHASE_BREAKING_CURRENT, out_of_phase),
];

/// What the text has to say of the neutral.
const EARTHING: &str = "the earthing of the neutral (or X0/X1, or the single-phase short-circuit current)";

fn first_pole(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let needed = known(case.duty.first_pole_factor.as_ref(), EARTHING)?;
    // Below 100 kV the standard has one value, and 1.2 is for the highest voltages only.
    let least = match VoltageRange::of(rated.value) {
        VoltageRange::Below100 => 1.5,
        VoltageRange::From100 => 1.3,
        VoltageRange::Uhv => 1.2,
    };
    let factor = standards::first_pole_factors().find(|f| *f >= least - 1e-9 && *f >= needed.value.value - 1e-9);
    let Some(factor) = factor else {
        return no_value(format!("no standard factor reaches {}", significant(needed.value.value, 3)));
    };
    let working = format!("least standard factor not below {}: {}", needed.working, significant(factor, 2));
    chosen(measure(factor, Dimension::PerUnit, ""), working)
}

fn out_of_phase_factor(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let (effective, _) = known(case.duty.effectively_earthed, EARTHING)?;
    // Below 100 kV 2.5 is the standard's own whatever the neutral.
    let low = VoltageRange::of(rated.value) == VoltageRange::Below100;
    let factor = known(standards::out_of_phase_factor(effective && !low), "a row of the table")?;
    let why = match (low, effective) {
        (true, _) => "below 100 kV",
        (false, true) => "the neutral is effectively earthed",
        (false, false) => "the neutral is not effectively earthed",
    };
    chosen(measure(factor, Dimension::PerUnit, ""), format!("{}: {why}", significant(factor, 2)))
}

/// What of an envelope is asked for.
struct Aspect {
    name: &'static str,
    dimension: Dimension,
    unit: &'static str,
    of: fn(&Envelope) -> Option<f64>,
}

static PEAK: &Aspect = &Aspect { name: "uc", dimension: Dimension::Voltage, unit: "kV", of: |e| Some(e.uc.si()) };
static RATE: &Aspect =
    &Aspect { name: "rate of rise", dimension: Dimension::VoltageRate, unit: "kV/us", of: |e| Some(e.rate.si()) };
static AMPLITUDE: &Aspect = &Aspect { name: "kaf", dimension: Dimension::PerUnit, unit: "", of: |e| Some(e.kaf) };
static T3: &Aspect = &Aspect { name: "t3", dimension: Dimension::Time, unit: "us", of: |e| e.t3.map(Physical::si) };
static U1: &Aspect = &Aspect { name: "u1", dimension: Dimension::Voltage, unit: "kV", of: |e| e.u1.map(Physical::si) };
static T1: &Aspect = &Aspect { name: "t1", dimension: Dimension::Time, unit: "us", of: |e| e.t1.map(Physical::si) };

fn value(case: &Case<'_>, duty: Duty, aspect: &Aspect) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let Some((envelope, working)) = case.duty.trv.envelope(duty) else {
        let low = VoltageRange::of(rated.value) == VoltageRange::Below100;
        let factor = case.breaker.mentions(&breaker::FIRST_POLE_TO_CLEAR_FACTOR);
        return if low && case.breaker.class(&breaker::CLASSES, 'S').is_none() {
            needs("the class S1 or S2")
        } else if factor || case.duty.effectively_earthed.is_some() {
            no_value(format!("the tables have no envelope of {} at {}", duty.word(), rated.measure))
        } else {
            needs(format!("the first-pole-to-clear factor, or {EARTHING}"))
        };
    };
    let Some(found) = (aspect.of)(envelope) else {
        let other = if envelope.t3.is_some() { "two" } else { "four" };
        return no_value(format!(
            "{} has {other} parameters at {}, and no {}",
            duty.word(),
            rated.measure,
            aspect.name
        ));
    };
    let measure = printed(found, aspect.dimension, aspect.unit);
    chosen(measure, format!("{} of {}: {working}; {} {measure}", aspect.name, duty.word(), aspect.name))
}

fn breaking<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ElectricCurrent>> {
    case.breaker.quantity(&breaker::RATED_SHORT_CIRCUIT_BREAKING_CURRENT)
}

const BREAKING: &str = "the rated short-circuit breaking current";

fn short_line(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let isc = known(breaking(case), BREAKING)?;
    let kinds: Option<Vec<&str>> =
        case.circuits.iter().map(|part| part.word(&circuit::KIND).map(|(kind, _)| kind)).collect();
    let kinds = known(kinds.filter(|kinds| !kinds.is_empty()), "the kind of every circuit")?;
    if !standards::short_line_faults_apply(rated.value, isc.value) {
        return yes_no(false, format!("no duty of the standard at {} and {}", rated.measure, isc.measure));
    }
    let line = kinds.iter().find(|kind| kind.starts_with("overhead line") || **kind == "traction");
    match line {
        Some(&"overhead line") => yes_no(true, format!("an overhead line at {} and {}", rated.measure, isc.measure)),
        // Whether the cable lies between breaker and line is not told by the kind.
        Some(kind) => needs(format!("whether the line of the circuit ({kind}) is directly at the breaker")),
        None => yes_no(false, format!("no overhead line is switched: {}", kinds.join(", "))),
    }
}

fn surge_impedance(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let Some(row) = standards::line_side(rated.value) else {
        return no_value(format!("the table has no line at {}", rated.measure));
    };
    let z = measure(row.surge_impedance().si(), Dimension::Impedance, "ohm");
    chosen(z, format!("the line of the standard at {}: {z}", rated.measure))
}

fn peak_factor(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let Some(row) = standards::line_side(rated.value) else {
        return no_value(format!("the table has no line at {}", rated.measure));
    };
    let working = format!("the line of the standard at {}: {}", rated.measure, significant(row.k, 2));
    chosen(measure(row.k, Dimension::PerUnit, ""), working)
}

fn initial(case: &Case<'_>) -> Outcome {
    let rated = known(case.rated_voltage(), "the rated voltage")?;
    let isc = known(breaking(case), BREAKING)?;
    let (built, _) = known(case.breaker.words(&breaker::CONSTRUCTION), "the construction")?;
    if built.iter().all(|word| *word == "gas-insulated") {
        return yes_no(false, "a gas-insulated busbar has no initial TRV that counts");
    }
    match standards::initial_trv_row(rated.value, isc.value) {
        Some(_) => yes_no(true, format!("a busbar in air at {} and {}", rated.measure, isc.measure)),
        None => yes_no(false, format!("no row of the table at {} and {}", rated.measure, isc.measure)),
    }
}

/// Share of the breaking current (IEC 62271-100 5.105; public digest of IEC 56:1987).
const OUT_OF_PHASE_SHARE: f64 = 0.25;

fn out_of_phase(case: &Case<'_>) -> Outcome {
    let isc = known(breaking(case), BREAKING)?;
    let said: Vec<bool> = case
        .circuits
        .iter()
        .flat_map(|part| [&circuit::SYNCHRONISING, &circuit::SOURCE_AT_FAR_END].map(|p| part.yes_no(p)))
        .flatten()
        .map(|(yes, _)| yes)
        .collect();
    match said.as_slice() {
        [] => needs("whether a circuit has a source at its far end, or synchronises"),
        said if said.contains(&true) => {
            let current = isc.value * OUT_OF_PHASE_SHARE;
            let working = format!("25 % of Isc = 0.25 x {} = {}", isc.measure, current.show());
            chosen(measure(current.si(), Dimension::Current, "kA"), working)
        }
        _ => no_value("no circuit has a source at its far end or synchronises: leave the line out"),
    }
}

#[cfg(test)]
mod tests {
    use super::super::testing::{chooses, open};
    use crate::rules::testing::Bay;

    fn at(kv: &str) -> Bay {
        Bay::new().set("breaker", "rated voltage", kv)
    }

    fn at_36_kv(classes: &str) -> Bay {
        at("36 kV").set("breaker", "first-pole-to-clear factor", "1.5").set("breaker", "classes", classes)
    }

    /// 3a/(1 + 2a) is 1.3 at a = 3.25.
    #[test]
    fn first_pole_factor_by_the_earthing() {
        let ratio = |text: &str| Bay::new().set("system", "X0/X1", text);
        chooses(ratio("3.25"), "first-pole-to-clear factor", "1.3");
        chooses(ratio("3.24"), "first-pole-to-clear factor", "1.3");
        chooses(ratio("3.26"), "first-pole-to-clear factor", "1.5");
        chooses(ratio("2").set("breaker", "rated voltage", "72.5 kV"), "first-pole-to-clear factor", "1.5");
        let silent = Bay::new()
            .without("system", "X0/X1")
            .without("system", "neutral")
            .without("system", "single-phase short-circuit current");
        open(silent.clone(), "first-pole-to-clear factor", "earthing of the neutral");
        chooses(Bay::new(), "out-of-phase voltage factor", "2");
        chooses(at("72.5 kV"), "out-of-phase voltage factor", "2.5");
        chooses(ratio("3.1").set("system", "neutral", "isolated"), "out-of-phase voltage factor", "2.5");
        open(silent, "out-of-phase voltage factor", "earthing of the neutral");
    }

    /// 215 kV is printed for 145 kV and 1.3 in IEC 56:1987 (public digest); 20.6 kV at 12 kV likewise.
    #[test]
    fn envelopes_of_the_standard() {
        for (label, value) in [
            ("T100 TRV peak", "215 kV"),
            ("T100 rate of rise", "2 kV/us"),
            ("T100 amplitude factor", "1.4"),
            ("T100 first reference voltage", "115 kV"),
            ("T100 time t1", "57.7 us"),
            ("T30 time t3", "47.4 us"),
            ("OP TRV peak", "296 kV"),
        ] {
            chooses(Bay::new(), label, value);
        }
        chooses(Bay::new().set("breaker", "first-pole-to-clear factor", "1.5"), "T100 TRV peak", "249 kV");
        open(Bay::new(), "T100 time t3", "four parameters");
        open(Bay::new().without("breaker", "rated voltage"), "T100 TRV peak", "rated voltage");
        chooses(at_36_kv("S1").set("breaker", "rated voltage", "12 kV"), "T100 TRV peak", "20.6 kV");
        open(at_36_kv("S1"), "T100 time t1", "two parameters");
        open(at_36_kv("M2"), "T100 TRV peak", "class S1 or S2");
        open(at_36_kv("S1").set("breaker", "rated voltage", "38 kV"), "T100 TRV peak", "no envelope");
    }

    /// Ratings that were chosen themselves are enough for the envelopes.
    #[test]
    fn a_chain_of_choices() {
        let bay = Bay::new()
            .set("breaker", "rated voltage", "from duty")
            .set("breaker", "first-pole-to-clear factor", "from duty")
            .set("breaker", "out-of-phase voltage factor", "from duty");
        chooses(bay, "OP TRV peak", "296 kV");
    }

    #[test]
    fn short_line_faults() {
        const SLF: &str = "short-line fault";
        chooses(Bay::new(), SLF, "required");
        chooses(Bay::new().set("circuit", "kind", "cable"), SLF, "not required");
        let isc = |ka: &str| Bay::new().set("breaker", "rated short-circuit breaking current", ka);
        chooses(isc("12.5 kA"), SLF, "not required");
        chooses(isc("16 kA"), SLF, "required");
        open(Bay::new().set("circuit", "kind", "overhead line with cable"), SLF, "directly at the breaker");
        open(Bay::new().without("circuit", "kind"), SLF, "kind of every circuit");
        chooses(at("800 kV"), "short-line fault surge impedance", "450 ohm");
        chooses(at("1100 kV"), "short-line fault surge impedance", "330 ohm");
        chooses(at("145 kV"), "short-line fault peak factor", "1.6");
        open(at("1500 kV"), "short-line fault peak factor", "no line");
    }

    #[test]
    fn initial_trv() {
        let isc = |ka: &str| Bay::new().set("breaker", "rated short-circuit breaking current", ka);
        chooses(isc("25 kA"), "initial TRV", "required");
        chooses(isc("24 kA"), "initial TRV", "not required");
        chooses(Bay::new().set("breaker", "construction", "gas-insulated"), "initial TRV", "not required");
        open(Bay::new().without("breaker", "construction"), "initial TRV", "construction");
    }

    #[test]
    fn out_of_phase_current() {
        const ID: &str = "rated out-of-phase breaking current";
        chooses(Bay::new(), ID, "7.875 kA");
        open(Bay::new().set("circuit", "source at far end", "no"), ID, "leave the line out");
        open(Bay::new().without("circuit", "source at far end"), ID, "source at its far end");
    }
}
