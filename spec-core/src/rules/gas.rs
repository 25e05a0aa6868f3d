//! Rules on gas and climate.

use super::{Check, Rule};
use crate::case::Case;
use crate::duty::{Certainty, GasDuty, Level, LevelState, Medium, absolute, celsius, percent};
use crate::finding::{Finding, FindingKind, Findings};
use crate::particular::{Kind, Limit, Particular, Tail, breaker, site};
use crate::physics::gas::{GasFault, GasMixture, Phase, sf6};
use crate::quantity::{Physical, Pressure, ThermodynamicTemperature, rounded, significant};
use crate::sheet::{QuantityReading, Stated, Statement};
use crate::standards::{GAUGE_REFERENCE, REFERENCE_TEMPERATURE};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &GAS_LIQUEFACTION,
    &GAS_DENSITY_AT_COLD,
    &CONDENSATION_UNSEEN,
    &GAS_LEVEL_ORDER,
    &PRESSURE_REFERENCE,
    &GAS_PRESSURE_HOT,
    &INDOOR_CLASS_OUTDOORS,
];

const STATES: &str = "IEC 62271-1:2017 6.2 (from memory); equation of state of SF6 fitted to CoolProp 8.0.0, vapour pressure by \
                      Guder and Wagner 2009 (from memory)";

/// In the cold the gas keeps its minimum functional density.
pub static GAS_LIQUEFACTION: Rule = Rule {
    name: "gas-liquefaction",
    title: "At the lowest ambient temperature the gas keeps its minimum functional density.",
    kind: FindingKind::Shortfall,
    basis: STATES,
    formula: "lowest ambient >= dew point of the minimum functional level; of the filling where no level is stated",
    explanation: "Below its dew point a pure gas condenses, and the density of what is left follows the saturation line, so that \
                  lockout comes exactly at the dew point of the minimum functional level. Colder than that is a shortfall; colder \
                  than the alarm level's dew point is gas-density-at-cold; colder than the filling's alone is a remark, since the \
                  breaker works down to its minimum level. Of a mixture only the filling counts: a shortfall where it condenses \
                  by every reckoning, a caution within the accuracy of the model or the band of an estimate. Heaters count by the \
                  rise that they declare. Silent without a lowest ambient temperature, and where the bidder chooses the gas.",
    check: Check::Case(liquefaction),
};

/// At the lowest ambient temperature the alarm does not stand in the cold alone.
pub static GAS_DENSITY_AT_COLD: Rule = Rule {
    name: "gas-density-at-cold",
    title: "At the lowest ambient temperature the remaining vapour is not below the alarm level though nothing leaks.",
    kind: FindingKind::Caution,
    basis: STATES,
    formula: "lowest ambient >= dew point of the alarm level",
    explanation: "Between the dew points of the alarm and of the minimum functional level the breaker works, and its alarm stands \
                  all through the cold: a leak would then not be noticed. One finding for one cause: below the minimum functional \
                  level gas-liquefaction speaks alone.",
    check: Check::Elsewhere,
};

fn liquefaction(case: &Case<'_>, findings: &mut Findings) {
    for gas in [&case.duty.gas, &case.duty.other_gas] {
        let (Some(medium), Some(filling)) = (&gas.medium, gas.level(Level::Filling)) else { continue };
        if let Err(fault) = &filling.density {
            refused(findings, filling, *fault);
            continue;
        }
        let Some(lowest) = gas.lowest.as_ref() else { continue };
        match medium {
            Medium::Pure(_) => pure(case, gas, lowest.value, findings),
            Medium::Mixture(_) => mixture(case, gas, lowest.value, findings),
        }
    }
}

/// A pure gas keeps its minimum functional density down to the dew point of that level.
fn pure(case: &Case<'_>, gas: &GasDuty, lowest: ThermodynamicTemperature, findings: &mut Findings) {
    let condenses = |level: Level| {
        let state = gas.level(level)?;
        let dew = state.dew_point.as_ref()?;
        (lowest.si() < dew.figure.value.si()).then_some((state, dew))
    };
    let found = if let Some(found) = condenses(Level::Minimum) {
        Some((&GAS_LIQUEFACTION, found, FindingKind::Shortfall, "below it in the cold: lockout"))
    } else if let Some(found) = condenses(Level::Alarm) {
        Some((&GAS_DENSITY_AT_COLD, found, FindingKind::Caution, "the alarm stands in the cold"))
    } else {
        let only_filling = gas.levels.len() == 1;
        let kind = if only_filling { FindingKind::Shortfall } else { FindingKind::Remark };
        condenses(Level::Filling).map(|found| (&GAS_LIQUEFACTION, found, kind, "condenses in the cold"))
    };
    let Some((rule, (state, dew), kind, label)) = found else { return };
    let filling = gas.level(Level::Filling).map_or("", |filling| filling.written.as_str());
    let (from, phase) = gas
        .level(Level::Filling)
        .and_then(|filling| filling.dew_point.as_ref())
        .map_or((String::new(), Phase::Liquid), |dew| (dew.figure.working.result.clone(), dew.phase));
    let becomes = if phase == Phase::Frost { "come down as frost" } else { "liquefy" };
    let cold = celsius(lowest);
    let message = match state.level {
        Level::Filling => {
            format!("{} filled to {filling} begins to {becomes} at {from}, and the site goes down to {cold}", gas.name)
        }
        level => format!(
            "{} filled to {filling} begins to {becomes} at {from}; at {cold} the vapour that is left stands below the {} {}, which is \
             reached at {}",
            gas.name,
            level.word(),
            state.written,
            dew.figure.working.result
        ),
    };
    let finding = findings.add(rule, state.place, message);
    finding.kind(kind).label(label).stated(state.written.as_str());
    tell(case, gas, finding);
}

/// Mixtures condense a little of their heaviest gas at a time, so only the filling counts, as surely as its dew point is known.
fn mixture(case: &Case<'_>, gas: &GasDuty, lowest: ThermodynamicTemperature, findings: &mut Findings) {
    let Some((state, dew)) = gas.level(Level::Filling).and_then(|s| s.dew_point.as_ref().map(|dew| (s, dew))) else {
        return;
    };
    let (cold, warm) = match dew.certainty {
        Certainty::Estimate { cold, warm } => (cold.si(), warm.si()),
        _ => (dew.figure.value.si() - MODEL_ACCURACY, dew.figure.value.si() + MODEL_ACCURACY),
    };
    if lowest.si() >= warm {
        return;
    }
    let short = lowest.si() < cold;
    let shown = &dew.figure.working.result;
    let verdict = if short { "and the site goes down to" } else { "too close to tell from the site's" };
    let message =
        format!("{} filled to {} begins to liquefy at {shown}, {verdict} {}", gas.name, state.written, celsius(lowest));
    let finding = findings.add(&GAS_LIQUEFACTION, state.place, message);
    finding.kind(if short { FindingKind::Shortfall } else { FindingKind::Caution });
    finding
        .label(if short { "condenses in the cold" } else { "may condense in the cold" })
        .stated(state.written.as_str());
    if matches!(dew.certainty, Certainty::Estimate { .. }) {
        finding.working(format!(
            "{shown}: from the rule of partial pressures to the model without interaction of the gases"
        ));
    }
    if dew.phase == Phase::Frost {
        finding.working(
            "below the triple point of the gas that condenses it comes down as frost, a little warmer than this",
        );
    }
    tell(case, gas, finding);
    if matches!(dew.certainty, Certainty::Estimate { .. }) {
        finding.working("the lowest temperature that the bidder declares and proves decides");
    }
    unseen(gas, state, lowest, findings);
}

/// A mixture that condenses is not seen by its monitor.
pub static CONDENSATION_UNSEEN: Rule = Rule {
    name: "condensation-unseen",
    title: "Where a mixture condenses in the cold, something other than its pressure tells of it.",
    kind: FindingKind::Caution,
    basis: "Peng-Robinson equation at constant volume; common practice",
    formula: "share of the heaviest gas that is liquid, and the pressure beside that of the gas alone",
    explanation: "What condenses of a mixture is mostly its insulating gas, while the pressure and the density follow the buffer gas: \
                  with a third of it liquid the pressure may be only a few percent low, and no alarm comes. Said beside \
                  gas-liquefaction wherever a mixture condenses at the lowest temperature.",
    check: Check::Elsewhere,
};

fn unseen(gas: &GasDuty, state: &LevelState, lowest: ThermodynamicTemperature, findings: &mut Findings) {
    let (Some(liquid), Some(Medium::Mixture(mixture))) = (&gas.mixture_state, &gas.medium) else { return };
    let Some(alone) = state.density.as_ref().ok().and_then(|d| mixture.pressure(d.value, lowest).ok()) else { return };
    let low = 1.0 - liquid.pressure.si() / alone.si();
    let message = format!(
        "at {} {} of the heaviest gas of {} is liquid, while the pressure is only {} % below that of the gas: no monitor sees it",
        celsius(lowest),
        percent(liquid.condensed_share),
        gas.name,
        rounded(low.max(0.0) * 100.0, 1)
    );
    findings
        .add(&CONDENSATION_UNSEEN, state.place, message)
        .label("condenses unseen")
        .working(format!("{} with liquid, {} as gas", absolute(liquid.pressure), absolute(alone)))
        .advice("ask for the proof of the ratings at the lowest temperature, and for supervision by temperature");
}

/// How close the model of mixtures comes, K (gas basis: within 0.6 K of the reference mixtures, rounded up).
const MODEL_ACCURACY: f64 = 1.0;

/// The numbers behind it, and what would do.
fn tell(case: &Case<'_>, gas: &GasDuty, finding: &mut Finding) {
    for state in &gas.levels {
        if let Some(dew) = &state.dew_point {
            let (level, result) = (state.level.word(), &dew.figure.working.result);
            finding.working(format!("dew point of the {level}, {}: {result}", state.written));
        }
    }
    if let (Some(condensed), Some(lowest)) = (&gas.condensed, &gas.lowest) {
        let left = gas
            .remaining
            .as_ref()
            .map_or_else(String::new, |left| format!(", and the vapour left stands for {}", left.working.result));
        let share = percent(condensed.value.value);
        finding.working(format!("at {} {share} of the gas is condensed{left}", celsius(lowest.value)));
        if lowest.working.formula != "as stated" {
            finding.working(lowest.working.to_string());
        }
    }
    if let Some(ambient) = crate::duty::lowest_ambient(case) {
        finding.beside(ambient.statement, "the lowest ambient temperature");
    }
    let mut advice = Vec::new();
    if let Some(highest) = &gas.highest_filling {
        finding.needed(format!("at most {}", highest.working.result));
        advice.push(format!(
            "the highest filling of {} that does not condense there is {}",
            gas.name, highest.working.result
        ));
    }
    let decisive = gas
        .level(Level::Minimum)
        .filter(|_| matches!(gas.medium, Some(Medium::Pure(_))))
        .or_else(|| gas.level(Level::Filling))
        .and_then(|state| state.dew_point.as_ref());
    if let (Some(dew), Some(lowest)) = (decisive, &gas.lowest) {
        let rise = dew.figure.value.si() - lowest.value.si();
        if rise > 0.0 {
            let rise = significant(rise.ceil(), 3);
            advice.push(format!("heaters would have to keep the gas {rise} K warmer than that"));
        }
    }
    if finding.kind < FindingKind::Excess {
        let thinner = thinner_mixture(gas).map_or_else(String::new, |mixture| {
            format!(
                " ({mixture} to the same filling does not condense there; the ratings are then those with the mixture)"
            )
        });
        advice.push(format!("another mixture or medium is the third way{thinner}"));
    }
    finding.advice(advice.join("; "));
}

/// The richest mixture of SF6 with nitrogen that takes the place of pure SF6 at the same filling without condensing, in steps of 5 %.
fn thinner_mixture(gas: &GasDuty) -> Option<String> {
    let (lowest, filling) = (gas.lowest.as_ref()?.value.si(), gas.level(Level::Filling)?);
    if gas.name != "SF6" {
        return None;
    }
    let reference = REFERENCE_TEMPERATURE.value();
    (1..20).rev().map(|twentieths| 5 * twentieths).find_map(|percent| {
        let share = f64::from(percent) / 100.0;
        let mixture = GasMixture::of(&[("SF6", share), ("N2", 1.0 - share)])?;
        let volume = mixture.molar_volume(filling.pressure, reference).ok()?;
        let dry = mixture.dew_point(volume).is_none_or(|dew| dew.si() + MODEL_ACCURACY <= lowest);
        dry.then(|| format!("SF6 {percent} % + N2 {} %", 100 - percent))
    })
}

/// A filling of which nothing can be told: the bound that was left is named.
fn refused(findings: &mut Findings, filling: &LevelState, fault: GasFault) {
    let message = format!("of a filling of {} nothing can be told: {fault}", filling.written);
    let finding = findings.add(&GAS_LIQUEFACTION, filling.place, message);
    finding.label("outside of what can be computed").stated(filling.written.as_str());
    if !matches!(fault, GasFault::Saturated { .. }) {
        finding.kind(FindingKind::Caution);
    }
}

/// The levels of a gas, in the order in which they have to fall.
const LEVELS: [&Particular; 4] = [
    &breaker::RATED_FILLING_PRESSURE,
    &breaker::ALARM_PRESSURE,
    &breaker::LOCKOUT_PRESSURE,
    &breaker::MINIMUM_FUNCTIONAL_PRESSURE,
];

const OTHER_LEVELS: [&Particular; 4] = [
    &breaker::OTHER_COMPARTMENTS_FILLING_PRESSURE,
    &breaker::OTHER_COMPARTMENTS_ALARM_PRESSURE,
    &breaker::OTHER_COMPARTMENTS_LOCKOUT_PRESSURE,
    &breaker::OTHER_COMPARTMENTS_MINIMUM_FUNCTIONAL_PRESSURE,
];

/// The gas levels fall in order.
pub static GAS_LEVEL_ORDER: Rule = Rule {
    name: "gas-level-order",
    title: "The gas levels fall in order: filling, alarm, lockout, minimum functional.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-1:2017 definitions 3.6.5 (from memory)",
    formula: "filling > alarm > lockout >= minimum functional, as absolute pressures",
    explanation: "An alarm above the filling would never go out, and a lockout above the alarm would come without a warning. Gauge \
                  levels are referred to 101.3 kPa; two levels of which only one says whether it is gauge are not compared. Also \
                  for a second filling of other compartments.",
    check: Check::Case(order),
};

fn order(case: &Case<'_>, findings: &mut Findings) {
    for levels in [LEVELS, OTHER_LEVELS] {
        let known: Vec<_> = levels
            .iter()
            .enumerate()
            .filter_map(|(rank, particular)| {
                let (reading, statement) = case.breaker.quantity_reading(particular)?;
                Some((rank, reading, reading.absolute()?, statement))
            })
            .collect();
        for pair in known.windows(2) {
            let [(_, above_reading, above, above_statement), (rank, reading, below, statement)] = pair else {
                continue;
            };
            // Reference temperatures apart, or one reference unsaid: not one scale.
            if above.stated != below.stated || above_reading.at.map(|m| m.si) != reading.at.map(|m| m.si) {
                continue;
            }
            let (high, low) = (above.pressure.si(), below.pressure.si());
            let touching = (high - low).abs() <= 1e-6 * high;
            let may_touch = *rank == levels.len() - 1
                && above_statement.particular.is(levels.get(2).copied().unwrap_or(above_statement.particular));
            if high > low && !touching || touching && may_touch {
                continue;
            }
            let relation = if touching { "is the same as" } else { "is above" };
            let message = format!(
                "the {} {} {relation} the {} {}",
                statement.particular.label,
                reading.shown(),
                above_statement.particular.label,
                above_reading.shown()
            );
            findings
                .add(&GAS_LEVEL_ORDER, statement.value, message)
                .label("out of order")
                .stated(reading.shown())
                .needed(format!("below {}", above_reading.shown()))
                .working("filling > alarm > lockout >= minimum functional")
                .beside(above_statement, "the level that has to be above it")
                .advice("two lines may have been swapped");
        }
    }
}

/// A pressure says whether it is absolute or gauge.
pub static PRESSURE_REFERENCE: Rule = Rule {
    name: "pressure-reference",
    title: "A gas pressure says whether it is absolute or gauge.",
    kind: FindingKind::Omission,
    basis: "guidance of the trade on gas units (from memory); common practice",
    formula: "abs or gauge; at 20 degC where no other temperature is stated",
    explanation: "The same number as gauge is about 0.1 MPa more, which moves the dew point of SF6 by 4 to 5 K. A bare pressure is \
                  read as absolute and never refused. A second statement in brackets that carries its reference resolves the first.",
    check: Check::Case(reference),
};

fn reference(case: &Case<'_>, findings: &mut Findings) {
    for statement in case.breaker.statements() {
        let Kind::Quantity(kind) = &statement.particular.kind else { continue };
        let Some(reading) = statement.quantity().filter(|_| kind.tail == Tail::PressureReference) else { continue };
        let Some(absolute) = reading.absolute().filter(|a| !a.stated) else { continue };
        let as_gauge = absolute.pressure + GAUGE_REFERENCE.value();
        let mut message = format!("{}: gauge or absolute?", reading.measure);
        if let (Some(read), Some(other)) = (dew_of(case, absolute.pressure), dew_of(case, as_gauge)) {
            message += &format!(" As absolute it condenses from {read}, as gauge from {other}");
        }
        let place = reading.place;
        let finding = findings.add(&PRESSURE_REFERENCE, place, message);
        finding.label("abs or gauge?").stated(&reading.measure).advice("it is read as absolute until the text says so");
        for word in ["abs", "gauge"] {
            finding.edit(format!("write {} {word}", reading.measure), place, with_reference(reading, word));
        }
    }
}

fn with_reference(reading: &QuantityReading, word: &str) -> String {
    let at = reading.at.map(|at| format!(" at {at}")).unwrap_or_default();
    format!("{} {word}{at}", reading.measure)
}

/// The dew point of SF6 filled to a pressure at 20 degC, where that is the gas.
fn dew_of(case: &Case<'_>, pressure: Pressure) -> Option<String> {
    let Some(Medium::Pure(_)) = &case.duty.gas.medium.as_ref().filter(|_| case.duty.gas.name == "SF6") else {
        return None;
    };
    let density = sf6().density(pressure, REFERENCE_TEMPERATURE.value()).ok()?;
    sf6().dew_point(density).ok().map(|dew| celsius(dew.temperature))
}

/// In the heat the pressure is known.
pub static GAS_PRESSURE_HOT: Rule = Rule {
    name: "gas-pressure-hot",
    title: "Where it gets hotter than 40 degC, the gas pressure at the highest temperature is stated.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 4.2.4 (from memory)",
    formula: "highest ambient > 40 degC: pressure at the highest ambient temperature stated",
    explanation: "The enclosure and its relief have to stand the pressure that the gas has in the heat. Only where a filling \
                  pressure is stated; the air around the breaker is no filling.",
    check: Check::Case(hot),
};

/// The highest ambient temperature of normal service, K (IEC 62271-1 4.1, from memory).
const NORMAL_HIGHEST: f64 = 313.15;

fn highest_ambient<'a>(case: &'a Case<'_>) -> Option<Stated<'a, ThermodynamicTemperature>> {
    let own = case.site.quantity::<ThermodynamicTemperature>(&site::HIGHEST_AMBIENT);
    own.or_else(|| case.site.side(&site::AMBIENT, Limit::Greatest))
}

fn hot(case: &Case<'_>, findings: &mut Findings) {
    let (Some(highest), Some(filling)) =
        (highest_ambient(case), case.breaker.statement(&breaker::RATED_FILLING_PRESSURE))
    else {
        return;
    };
    if highest.value.si() <= NORMAL_HIGHEST + 1e-6 || case.breaker.mentions(&breaker::GAS_PRESSURE_AT_HIGHEST_AMBIENT) {
        return;
    }
    let message = format!("the site goes up to {}, and the gas pressure there is not stated", highest.measure);
    let finding = findings.add(&GAS_PRESSURE_HOT, filling.value, message);
    finding.label("pressure in the heat is missing").beside(highest.statement, "the highest ambient temperature");
    let pressure = case.duty.gas.curve(Level::Filling, &[highest.value]).first().map(|(_, pressure)| *pressure);
    if let Some(pressure) = pressure {
        let text = absolute(pressure);
        finding.needed(text.as_str()).working(format!("pressure of the filling at {}: {text}", highest.measure));
        let label = breaker::GAS_PRESSURE_AT_HIGHEST_AMBIENT.label;
        finding.edit(format!("state {text}"), case.sheet.end, format!("\n    {label}: {text}"));
    } else {
        finding.advice(format!("add the line {}", breaker::GAS_PRESSURE_AT_HIGHEST_AMBIENT.label));
    }
}

/// An indoor class does not stand outdoors.
pub static INDOOR_CLASS_OUTDOORS: Rule = Rule {
    name: "indoor-class-outdoors",
    title: "A temperature class of indoor apparatus does not stand on an outdoor site.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-1:2017 4.1 (from memory)",
    formula: "class minus N indoor, installation outdoor",
    explanation: "Indoor classes mean apparatus without rain, ice and sun. The outdoor class that covers the site's lowest \
                  temperature is proposed.",
    check: Check::Case(indoor),
};

fn indoor(case: &Case<'_>, findings: &mut Findings) {
    let (Some((class, statement)), Some((place, installation))) =
        (case.breaker.word(&breaker::TEMPERATURE_CLASS), case.site.word(&site::INSTALLATION))
    else {
        return;
    };
    if !class.ends_with("indoor") || place != "outdoor" {
        return;
    }
    let message = format!("the class {class} is for indoor apparatus, and the site is outdoors");
    let finding = findings.add(&INDOOR_CLASS_OUTDOORS, statement.value, message);
    finding.label("an indoor class").stated(class).beside(installation, "the site is outdoors");
    if let Some(needed) = outdoor_class(case, statement) {
        finding.needed(needed).replace_by(needed);
    }
}

/// The warmest outdoor class that covers the site.
fn outdoor_class(case: &Case<'_>, statement: &Statement) -> Option<&'static str> {
    let Kind::Words { list, .. } = &statement.particular.kind else { return None };
    let lowest = crate::duty::lowest_ambient(case)?.value.si() - 273.15;
    list.all().find(|class| {
        let degrees = class.split_whitespace().nth(1).and_then(|n| n.parse::<f64>().ok());
        class.ends_with("outdoor") && degrees.is_some_and(|n| -n <= lowest + 1e-6)
    })
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const FILLING: &str = "rated filling pressure";
    const ALARM: &str = "alarm pressure";
    const MINIMUM: &str = "minimum functional pressure";

    fn cold(lowest: &str) -> Bay {
        Bay::new().set("site", "lowest ambient", lowest)
    }

    /// 0.60/0.54/0.51 MPa abs: dew points -31.1, -34.4 and -36.1 degC (own calculation with the library's model).
    #[test]
    fn three_grades_of_cold() {
        Bay::new().silent("gas-liquefaction");
        cold("-31 degC").silent("gas-liquefaction");
        let remark = cold("-32 degC").one("gas-liquefaction");
        assert_eq!(remark.kind, FindingKind::Remark);
        let caution = cold("-35 degC").one("gas-density-at-cold");
        assert_eq!(caution.kind, FindingKind::Caution);
        cold("-35 degC").silent("gas-liquefaction");
        let shortfall = cold("-37 degC").one("gas-liquefaction");
        assert_eq!(shortfall.kind, FindingKind::Shortfall);
        cold("-37 degC").silent("gas-density-at-cold");
    }

    /// 75/69/62 psig: -30.2, -32.3 and -35.0 degC, as in the table of rules.
    #[test]
    fn gauge_levels_in_the_units_of_the_author() {
        let at = |lowest: &str| {
            cold(lowest)
                .set("breaker", FILLING, "75 psig")
                .set("breaker", ALARM, "69 psig")
                .set("breaker", MINIMUM, "62 psig")
        };
        assert_eq!(at("-31 degC").one("gas-liquefaction").kind, FindingKind::Remark);
        at("-33 degC").one("gas-density-at-cold");
        assert_eq!(at("-36 degC").one("gas-liquefaction").kind, FindingKind::Shortfall);
        at("-30 degC").silent("gas-liquefaction");
        let working = at("-36 degC").one("gas-liquefaction").working.join("; ");
        for dew in ["-30.2", "-32.3", "-35"] {
            assert!(working.contains(dew), "{working}");
        }
    }

    /// 0.65 MPa abs condenses from -28.6 degC; with no other level stated that is a shortfall.
    #[test]
    fn without_other_levels_the_filling_counts() {
        let bay = |lowest: &str| {
            cold(lowest).set("breaker", FILLING, "0.65 MPa abs").without("breaker", ALARM).without("breaker", MINIMUM)
        };
        let finding = bay("-35 degC").one("gas-liquefaction");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(finding.message.contains("-28.6 degC"), "{}", finding.message);
        bay("-28.5 degC").silent("gas-liquefaction");
        bay("-28.7 degC").one("gas-liquefaction");
    }

    #[test]
    fn the_message_has_the_numbers() {
        let finding = Bay::new()
            .set("site", "lowest ambient", "-42 degC")
            .set("breaker", FILLING, "0.70 MPa abs")
            .set("breaker", ALARM, "0.64 MPa abs")
            .set("breaker", MINIMUM, "0.61 MPa abs")
            .one("gas-liquefaction");
        assert!(finding.message.contains("-26.2 degC") && finding.message.contains("-42 degC"), "{}", finding.message);
        let advice = finding.advice.expect("advice");
        assert!(advice.contains("0.416 MPa abs") && advice.contains("12 K"), "{advice}");
        // SF6/N2 60/40 filled to 0.7 MPa abs condenses from -43.2 degC (gas basis), a degree colder than the site, so 60 % will do.
        assert!(advice.contains("SF6 60 % + N2 40 %"), "{advice}");
    }

    #[test]
    fn heaters_count_by_what_they_declare() {
        let heated = cold("-40 degC").set("breaker", "tank heaters", "yes");
        heated.one("gas-liquefaction");
        heated.set("breaker", "heater temperature rise", "15 K").silent("gas-liquefaction");
    }

    #[test]
    fn other_media_are_not_judged_by_sf6() {
        for gas in ["N2", "dry air", "none", "free", "SF6 or N2", "SF6 + N2"] {
            cold("-40 degC").set("breaker", "insulating gas", gas).silent("gas-liquefaction");
        }
    }

    fn filled(gas: &str, filling: &str, lowest: &str) -> Bay {
        cold(lowest).set("breaker", "insulating gas", gas).set("breaker", FILLING, filling)
    }

    /// SF6/N2 60/40 filled to 0.7 MPa abs condenses from -43.2 degC (gas basis, section 2.2); the model is good to 1 K.
    #[test]
    fn of_a_mixture_only_the_filling_counts() {
        let bay = |lowest: &str| filled("SF6 60 % + N2 40 %", "0.70 MPa abs", lowest);
        let finding = bay("-45 degC").one("gas-liquefaction");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(finding.message.contains("-43 degC"), "{}", finding.message);
        assert_eq!(bay("-43.5 degC").one("gas-liquefaction").kind, FindingKind::Caution);
        bay("-42 degC").silent("gas-liquefaction");
        bay("-42 degC").silent("condensation-unseen");
        // CO2 with 30 % O2 is far from its dew point.
        filled("CO2 70 % + O2 30 %", "0.8 MPa abs", "-40 degC").silent("gas-liquefaction");
    }

    /// 6 % C4F7N in CO2 at 0.7 MPa abs: -28.5 degC by the trade's rule, -25.3 without interaction (gas basis, section 2.3).
    #[test]
    fn an_estimate_is_told_as_a_band() {
        let bay = |lowest: &str| filled("C4F7N 6 % + CO2 94 %", "0.70 MPa abs", lowest);
        bay("-25 degC").silent("gas-liquefaction");
        let caution = bay("-27 degC").one("gas-liquefaction");
        assert_eq!(caution.kind, FindingKind::Caution);
        assert!(caution.message.contains("-28 to -25 degC (estimate)"), "{}", caution.message);
        assert_eq!(bay("-29 degC").one("gas-liquefaction").kind, FindingKind::Shortfall);
    }

    /// At -35 degC a third of the C4F7N is liquid while the pressure is 2.5 % low (gas basis, fact 4).
    #[test]
    fn a_monitor_does_not_see_a_mixture_condensing() {
        let finding = filled("C4F7N 6 % + CO2 94 %", "0.70 MPa abs", "-35 degC").one("condensation-unseen");
        // The pressure is held against the virial gas here, so that it is 2.2 % low.
        assert!(finding.message.contains("34.9 %") && finding.message.contains("2.2 %"), "{}", finding.message);
        cold("-45 degC").silent("condensation-unseen");
    }

    #[test]
    fn carbon_dioxide_and_a_second_compartment() {
        // CO2 filled to 1.0 MPa abs condenses from about -48 degC.
        filled("CO2", "1.0 MPa abs", "-47 degC").silent("gas-liquefaction");
        assert_eq!(
            filled("CO2", "1.0 MPa abs", "-50 degC")
                .without("breaker", ALARM)
                .without("breaker", MINIMUM)
                .one("gas-liquefaction")
                .kind,
            FindingKind::Shortfall
        );
        let tank = cold("-35 degC")
            .set("breaker", "insulating gas", "none")
            .without("breaker", FILLING)
            .without("breaker", ALARM)
            .without("breaker", MINIMUM)
            .set("breaker", "other compartments gas", "SF6")
            .set("breaker", "other compartments filling pressure", "0.65 MPa abs");
        assert_eq!(tank.one("gas-liquefaction").kind, FindingKind::Shortfall);
        tank.set("site", "lowest ambient", "-28 degC").silent("gas-liquefaction");
    }

    #[test]
    fn frost_is_called_frost() {
        let finding = filled("SF6", "0.30 MPa abs", "-60 degC").without("breaker", ALARM).without("breaker", MINIMUM);
        assert!(finding.one("gas-liquefaction").message.contains("frost"));
    }

    #[test]
    fn out_of_range_is_refused_with_the_bound() {
        let finding = Bay::new().set("breaker", FILLING, "1.7 MPa abs").one("gas-liquefaction");
        assert!(finding.message.contains("1.6 MPa"), "{}", finding.message);
        assert_eq!(finding.kind, FindingKind::Caution);
        Bay::new()
            .set("breaker", FILLING, "1.6 MPa abs")
            .set("site", "lowest ambient", "10 degC")
            .silent("gas-liquefaction");
    }

    #[test]
    fn levels_fall_in_order() {
        Bay::new().silent("gas-level-order");
        Bay::new().set("breaker", ALARM, "0.61 MPa abs").one("gas-level-order");
        Bay::new().set("breaker", ALARM, "0.60 MPa abs").one("gas-level-order");
        Bay::new().set("breaker", "lockout pressure", "0.51 MPa abs").silent("gas-level-order");
        Bay::new().set("breaker", "lockout pressure", "0.50 MPa abs").one("gas-level-order");
        // A gauge alarm above an absolute filling: 0.54 MPa gauge is 0.641 MPa abs.
        Bay::new().set("breaker", ALARM, "0.54 MPa gauge").one("gas-level-order");
        Bay::new().set("breaker", ALARM, "0.61 MPa").silent("gas-level-order");
    }

    #[test]
    fn a_bare_pressure_is_asked_about() {
        let finding = Bay::new().set("breaker", FILLING, "6.0 bar").one("pressure-reference");
        assert!(finding.message.contains("-31.1") && finding.message.contains("-26.1"), "{}", finding.message);
        assert_eq!(finding.edits[1].text, "6.0 bar gauge");
        Bay::new().silent("pressure-reference");
        // The bracket resolves it.
        Bay::new().set("breaker", FILLING, "5.0 bar (0.6 MPa abs)").silent("pressure-reference");
        Bay::new().set("breaker", FILLING, "6.0 bar (87 psi)").one("pressure-reference");
    }

    #[test]
    fn a_bare_pressure_takes_the_reference_of_its_bracket() {
        let bay = |text: &str| {
            cold("-27 degC").set("breaker", FILLING, text).without("breaker", ALARM).without("breaker", MINIMUM)
        };
        // 0.7 MPa abs condenses from -26.2 degC, 0.6 from -31.1.
        bay("5.987 bar (0.7 MPa abs)").one("gas-liquefaction");
        bay("6.0 bar (0.6 MPa abs)").silent("gas-liquefaction");
    }

    #[test]
    fn pressure_in_the_heat() {
        let hot = |t: &str| Bay::new().set("site", "highest ambient", t);
        let finding = hot("50 degC").one("gas-pressure-hot");
        assert!(finding.edits[0].text.contains("MPa abs"), "{:?}", finding.edits);
        hot("40 degC").silent("gas-pressure-hot");
        hot("41 degC").one("gas-pressure-hot");
        hot("50 degC").set("breaker", "gas pressure at highest ambient", "0.68 MPa abs").silent("gas-pressure-hot");
    }

    #[test]
    fn an_indoor_class_outdoors() {
        let finding = Bay::new().set("breaker", "temperature class", "minus 5 indoor").one("indoor-class-outdoors");
        assert_eq!(finding.edits[0].text, "minus 25 outdoor");
        Bay::new().silent("indoor-class-outdoors");
        Bay::new()
            .set("breaker", "temperature class", "minus 5 indoor")
            .set("site", "installation", "indoor")
            .silent("indoor-class-outdoors");
    }
}
