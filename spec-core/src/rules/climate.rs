//! Rules on the climate of the site, and on what gas and heaters promise for it.

use super::{Check, Rule};
use crate::case::Case;
use crate::duty::lowest_ambient;
use crate::finding::{FindingKind, Findings};
use crate::particular::{Kind, Particular, Tail, breaker, site};
use crate::physics::atmosphere;
use crate::quantity::{Length, Physical, Qualifier, ThermodynamicTemperature, Velocity, rounded, significant};
use crate::sheet::Statement;

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &AMBIENT_CLASS,
    &AMBIENT_EXCESS,
    &HEATER_DEPENDENCE,
    &MONITOR_TEMPERATURE,
    &WIND_WITH_COLD,
    &ICE_WIND_CLASS,
    &LEAKAGE_RATE,
    &MIXTURE_DERATING,
    &MIXTURE_COLD_PROOF,
    &GAUGE_AT_ALTITUDE,
];

const ZERO_CELSIUS: f64 = 273.15;

/// Temperatures of one site and one class are compared to this, K: printed degrees.
const DEGREE_SLACK: f64 = 1e-6;

/// The temperature of a class such as `minus 25 outdoor`, K.
pub(crate) fn class_temperature(class: &str) -> Option<f64> {
    class.split_whitespace().nth(1)?.parse::<f64>().ok().map(|n| ZERO_CELSIUS - n)
}

fn class<'a>(case: &'a Case<'_>) -> Option<(&'static str, f64, &'a Statement)> {
    let (class, statement) = case.breaker.word(&breaker::TEMPERATURE_CLASS)?;
    Some((class, class_temperature(class)?, statement))
}

/// A test at the lowest ambient temperature or below is asked for.
fn proven_in_the_cold(case: &Case<'_>) -> bool {
    let test = case.breaker.quantity::<ThermodynamicTemperature>(&breaker::LOW_TEMPERATURE_TEST);
    match (test, lowest_ambient(case)) {
        (Some(test), Some(lowest)) => test.value.si() <= lowest.value.si() + DEGREE_SLACK,
        (Some(_), None) => true,
        (None, _) => false,
    }
}

/// The temperature class covers the site.
pub static AMBIENT_CLASS: Rule = Rule {
    name: "ambient-class",
    title: "The temperature class and the lowest service temperature cover the site's lowest ambient temperature.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 4.1.3; IEEE C37.100.1: usual down to -30 degC (from memory)",
    formula: "class temperature <= lowest ambient; outdoor classes -10, -15, -25, -30, -40 degC, -50 by agreement",
    explanation: "Colder than the class, or colder than -40 degC in any case, is a special service condition whose test has to be \
                  agreed. Silent where a low-temperature test at or below the site's temperature is asked for.",
    check: Check::Case(ambient_class),
};

/// The coldest class of normal service, K (IEC 62271-1 4.1, from memory).
const COLDEST_NORMAL: f64 = ZERO_CELSIUS - 40.0;

fn ambient_class(case: &Case<'_>, findings: &mut Findings) {
    let Some(lowest) = lowest_ambient(case) else { return };
    if let Some(service) = case.breaker.quantity::<ThermodynamicTemperature>(&breaker::LOWEST_SERVICE_TEMPERATURE)
        && service.value.si() > lowest.value.si() + DEGREE_SLACK
    {
        let message = format!("ratings down to {} do not cover the site's {}", service.measure, lowest.measure);
        findings
            .add(&AMBIENT_CLASS, service.place(), message)
            .label("warmer than the site")
            .stated(&service.measure)
            .needed(&lowest.measure)
            .beside(lowest.statement, "the lowest ambient temperature")
            .replace_by(lowest.measure.to_string());
    }
    let Some((class, temperature, statement)) = class(case) else { return };
    let covered = temperature <= lowest.value.si() + DEGREE_SLACK;
    let special = temperature < COLDEST_NORMAL - DEGREE_SLACK;
    if covered && !special || proven_in_the_cold(case) {
        return;
    }
    let message = if covered {
        format!("the class {class} is a special service condition: its test has to be agreed")
    } else {
        format!("the class {class} does not cover the site's {}", lowest.measure)
    };
    let finding = findings.add(&AMBIENT_CLASS, statement.value, message);
    finding.label(if covered { "special service condition" } else { "warmer than the site" }).stated(class);
    finding.beside(lowest.statement, "the lowest ambient temperature");
    let test = breaker::LOW_TEMPERATURE_TEST.label;
    if let Some(better) = covering_class(statement, class, lowest.value.si()).filter(|_| !covered) {
        finding.needed(better).replace_by(better);
    } else {
        finding.edit(
            format!("ask for a test at {}", lowest.measure),
            case.sheet.end,
            format!("\n    {test}: {}", lowest.measure),
        );
    }
}

/// The warmest class of the same place (indoor, outdoor) that covers a temperature.
fn covering_class(statement: &Statement, class: &str, lowest: f64) -> Option<&'static str> {
    let Kind::Words { list, .. } = &statement.particular.kind else { return None };
    let place = class.split_whitespace().next_back()?;
    list.all()
        .find(|other| other.ends_with(place) && class_temperature(other).is_some_and(|t| t <= lowest + DEGREE_SLACK))
}

/// The class is not far below the record.
pub static AMBIENT_EXCESS: Rule = Rule {
    name: "ambient-excess",
    title: "The temperature class is not far below what was ever recorded.",
    kind: FindingKind::Excess,
    basis: "common practice, no source: a needless cold class restricts the bidders",
    formula: "class temperature >= lowest recorded temperature - 15 K",
    explanation: "Few breakers are proven at -50 degC, and most of them need heaters or another gas. Only where the lowest recorded \
                  temperature is stated.",
    check: Check::Case(ambient_excess),
};

/// How far below the record a class may be without a question, K (common practice, no source).
const RECORD_MARGIN: f64 = 15.0;

fn ambient_excess(case: &Case<'_>, findings: &mut Findings) {
    let (Some((class, temperature, statement)), Some(record)) =
        (class(case), case.site.quantity::<ThermodynamicTemperature>(&site::LOWEST_RECORDED_TEMPERATURE))
    else {
        return;
    };
    if temperature >= record.value.si() - RECORD_MARGIN - DEGREE_SLACK {
        return;
    }
    let message =
        format!("the class {class} is asked for, and the lowest temperature ever recorded is {}", record.measure);
    let finding = findings.add(&AMBIENT_EXCESS, statement.value, message);
    finding.label("far below the record").stated(class).beside(record.statement, "the record");
    if let Some(enough) = covering_class(statement, class, record.value.si()) {
        finding.needed(enough).replace_by(enough);
    }
}

/// A breaker that needs heaters says how long it does without.
pub static HEATER_DEPENDENCE: Rule = Rule {
    name: "heater-dependence",
    title: "A breaker whose gas is heated states its hold time without heating, and signals the loss of heating.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "tank heaters: yes, with heater hold time and heater alarm: yes",
    explanation: "When the supply of the heaters fails at the lowest ambient temperature, the breaker goes to lockout after some \
                  hours. Who operates it has to know after how many, and that the heating has failed.",
    check: Check::Case(heaters),
};

fn heaters(case: &Case<'_>, findings: &mut Findings) {
    let Some((true, statement)) = case.breaker.yes_no(&breaker::TANK_HEATERS) else { return };
    let alarm = case.breaker.statement(&breaker::HEATER_ALARM);
    let no_alarm = alarm.is_none() || case.breaker.yes_no(&breaker::HEATER_ALARM).is_some_and(|(yes, _)| !yes);
    let missing: Vec<&str> = [
        (!case.breaker.mentions(&breaker::HEATER_HOLD_TIME)).then_some(breaker::HEATER_HOLD_TIME.label),
        no_alarm.then_some(breaker::HEATER_ALARM.label),
    ]
    .into_iter()
    .flatten()
    .collect();
    if missing.is_empty() {
        return;
    }
    let message = format!(
        "the gas is heated, and {} is not stated: how long from loss of heating to lockout, and who is told?",
        missing.join(" and ")
    );
    let finding = findings.add(&HEATER_DEPENDENCE, statement.value, message);
    finding.label("depends on heating");
    if let Some(lowest) = lowest_ambient(case) {
        finding.beside(lowest.statement, "the lowest ambient temperature");
        // What happens without heating: the level that is reached first in the cold of the air itself.
        let levels = case.duty.gas.levels.iter().rev();
        let reached = levels.filter_map(|state| state.dew_point.as_ref().map(|dew| (state, dew)));
        for (state, dew) in reached.filter(|(_, dew)| dew.figure.value.si() > lowest.value.si()).take(1) {
            let (level, result) = (state.level.word(), &dew.figure.working.result);
            finding.working(format!(
                "without heating the {level} is reached at {result}, and the air goes down to {}",
                lowest.measure
            ));
        }
    }
    finding.advice(format!("add {}", missing.join(" and ")));
}

/// A monitor has the temperature of the gas.
pub static MONITOR_TEMPERATURE: Rule = Rule {
    name: "monitor-temperature",
    title: "Where the gas is heated, its density monitor has the temperature of the gas.",
    kind: FindingKind::Caution,
    basis: "common practice (from memory)",
    formula: "tank heaters: yes, and the monitor apart and unheated",
    explanation: "A monitor turns pressure into density by the temperature that it feels itself. In the cold air beside a heated tank \
                  it takes the gas for denser than it is, and a leak stays unseen. Silent where the place of the monitor is not \
                  stated.",
    check: Check::Case(monitor),
};

fn monitor(case: &Case<'_>, findings: &mut Findings) {
    let Some((true, heated)) = case.breaker.yes_no(&breaker::TANK_HEATERS) else { return };
    let Some(("apart, unheated", statement)) = case.breaker.word(&breaker::DENSITY_MONITOR) else { return };
    findings
        .add(
            &MONITOR_TEMPERATURE,
            statement.value,
            "the monitor feels the cold air while the gas is heated: it reads too dense",
        )
        .label("colder than the gas")
        .stated("apart, unheated")
        .needed("in the gas")
        .beside(heated, "the gas is heated")
        .replace_by("in the gas");
}

/// Wind takes the heat away.
pub static WIND_WITH_COLD: Rule = Rule {
    name: "wind-with-cold",
    title: "Where heaters keep the gas warm, the wind that comes with the cold is stated.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "tank heaters: yes, with wind at lowest ambient",
    explanation: "The rise that heaters hold falls with the wind. Only with heated gas on an outdoor site.",
    check: Check::Case(wind),
};

fn wind(case: &Case<'_>, findings: &mut Findings) {
    let Some((true, statement)) = case.breaker.yes_no(&breaker::TANK_HEATERS) else { return };
    let outdoors = case.site.word(&site::INSTALLATION).is_none_or(|(word, _)| word == "outdoor");
    if !outdoors || case.site.mentions(&site::WIND_AT_LOWEST_AMBIENT) || case.site.sheet.is_none() {
        return;
    }
    findings
        .add(
            &WIND_WITH_COLD,
            statement.value,
            "the wind that comes with the greatest cold is not stated; it takes the heat away",
        )
        .label("heated in what wind?")
        .advice(format!("add {} to the site", site::WIND_AT_LOWEST_AMBIENT.label));
}

/// Ice and wind classes cover the site.
pub static ICE_WIND_CLASS: Rule = Rule {
    name: "ice-wind-class",
    title: "Ice class and design wind speed cover the site.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 4.1.3: ice 1, 10, 20 mm; wind 34 m/s (from memory)",
    formula: "ice class >= ice of the site; design wind speed >= wind of the site",
    explanation: "A breaker that is made for less ice or wind than the site has may not operate, or may not stand. Compared only \
                  where both sides are stated; the site's none is no ice and no wind.",
    check: Check::Case(ice_wind),
};

fn ice_wind(case: &Case<'_>, findings: &mut Findings) {
    covers::<Length>(case, findings, &breaker::ICE_CLASS, &site::ICE);
    covers::<Velocity>(case, findings, &breaker::DESIGN_WIND_SPEED, &site::WIND);
}

fn covers<Q: Physical>(
    case: &Case<'_>,
    findings: &mut Findings,
    asked: &'static Particular,
    found: &'static Particular,
) {
    let (Some(class), Some(there)) = (case.breaker.quantity::<Q>(asked), case.site.quantity::<Q>(found)) else {
        return;
    };
    if class.value.si() >= there.value.si() * (1.0 - 1e-6) {
        return;
    }
    let message = format!("the {} {} does not cover the site's {}", asked.label, class.measure, there.measure);
    findings
        .add(&ICE_WIND_CLASS, class.place(), message)
        .label("less than the site has")
        .stated(&class.measure)
        .needed(&there.measure)
        .beside(there.statement, "what the site has");
}

/// The leakage rate is the usual one or less.
pub static LEAKAGE_RATE: Rule = Rule {
    name: "leakage-rate",
    title: "The leakage rate that is admitted is 0.5 % a year or less.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017 6.16: classes 0.1 and 0.5 % a year (from memory)",
    formula: "leakage rate <= 0.5 %/year",
    explanation: "Closed pressure systems are offered with 0.5 or 0.1 % a year; local law may ask for less still.",
    check: Check::Case(leakage),
};

/// The usual limit, as a share a year (IEC 62271-1:2017, from memory).
const USUAL_LEAKAGE: f64 = 0.5;

fn leakage(case: &Case<'_>, findings: &mut Findings) {
    let Some((reading, statement)) = case.breaker.quantity_reading(&breaker::LEAKAGE_RATE) else { return };
    let usual = reading.measure.unit.to_si(USUAL_LEAKAGE);
    let (Some(rate), Some(usual)) = (reading.upper().si, usual) else { return };
    if rate <= usual * (1.0 + 1e-6) {
        return;
    }
    let message = format!("{} is admitted; the usual limit is 0.5 %/year, or a stricter local law", reading.measure);
    findings
        .add(&LEAKAGE_RATE, statement.value, message)
        .label("more than usual")
        .stated(&reading.measure)
        .needed("0.5 %/year")
        .replace_by("0.5 %/year");
}

/// The mixtures that are admitted, if only mixtures or gases other than SF6 and air are.
fn mixture<'a>(case: &'a Case<'_>) -> Option<(&'a crate::sheet::Mixture, &'a Statement)> {
    let (gases, statement) = case.breaker.gases(&breaker::INSULATING_GAS)?;
    let plain =
        |m: &crate::sheet::Mixture| matches!(m.pure(), Some("SF6" | "N2" | "air" | "dry air" | "none" | "free"));
    gases.first().filter(|_| !gases.iter().any(plain)).map(|first| (first, statement))
}

fn has_sf6(mixture: &crate::sheet::Mixture) -> bool {
    mixture.portions.iter().any(|portion| portion.gas == "SF6")
}

/// Ratings are those with the mixture.
pub static MIXTURE_DERATING: Rule = Rule {
    name: "mixture-derating",
    title: "With a mixture of SF6, the ratings are those that are proven with the mixture.",
    kind: FindingKind::Caution,
    basis: "guidance of the trade on SF6 mixtures (from memory)",
    formula: "mixture with SF6, and no low-temperature test with the gas offered",
    explanation: "A buffer gas lowers the breaking capability and the insulation that the pure gas had. Silent where a test with the \
                  gas offered is asked for at or below the site's lowest temperature.",
    check: Check::Case(derating),
};

fn derating(case: &Case<'_>, findings: &mut Findings) {
    let Some((mixture, statement)) = mixture(case) else { return };
    if !has_sf6(mixture) || proven_in_the_cold(case) {
        return;
    }
    let rating = super::breaking_current(case).map_or_else(String::new, |isc| format!("{} ", isc.measure));
    let message = format!(
        "{rating}with a mixture of SF6: the bidder has to prove the ratings with the mixture, not with the pure gas"
    );
    let finding = findings.add(&MIXTURE_DERATING, statement.value, message);
    finding.label("proven with the mixture?");
    ask_for_test(case, finding);
}

/// A mixture or a replacement gas is proven in the cold.
pub static MIXTURE_COLD_PROOF: Rule = Rule {
    name: "mixture-cold-proof",
    title: "A mixture or a replacement gas is proven at the lowest ambient temperature.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 (from memory); common practice",
    formula: "a gas other than pure SF6, nitrogen or air, and a low-temperature test <= lowest ambient",
    explanation: "What of a mixture is left as gas in the cold cannot be told from its pressure, so the ratings are to be proven there. \
                  Silent where a low-temperature test at or below the site's temperature is asked for; mixtures with SF6 are told by \
                  mixture-derating.",
    check: Check::Case(cold_proof),
};

fn cold_proof(case: &Case<'_>, findings: &mut Findings) {
    let (Some((mixture, statement)), Some(lowest)) = (mixture(case), lowest_ambient(case)) else { return };
    if has_sf6(mixture) || proven_in_the_cold(case) {
        return;
    }
    let message = format!("no proof of the ratings with this gas at {} is asked for", lowest.measure);
    let finding = findings.add(&MIXTURE_COLD_PROOF, statement.value, message);
    finding.label("proven in the cold?").beside(lowest.statement, "the lowest ambient temperature");
    ask_for_test(case, finding);
}

fn ask_for_test(case: &Case<'_>, finding: &mut crate::finding::Finding) {
    let label = breaker::LOW_TEMPERATURE_TEST.label;
    let lowest = lowest_ambient(case).map(|lowest| lowest.measure.to_string());
    match (case.breaker.statement(&breaker::LOW_TEMPERATURE_TEST), lowest) {
        (Some(statement), Some(lowest)) => finding.edit(format!("write {lowest}"), statement.value, lowest),
        (None, Some(lowest)) => {
            finding.edit(format!("ask for a test at {lowest}"), case.sheet.end, format!("\n    {label}: {lowest}"))
        }
        _ => finding.advice(format!("add {label} to the breaker")),
    };
}

/// What a gauge reads on a high site.
pub static GAUGE_AT_ALTITUDE: Rule = Rule {
    name: "gauge-at-altitude",
    title: "On a high site a gauge reads more than the rated level.",
    kind: FindingKind::Remark,
    basis: "International Standard Atmosphere, ISO 2533 (from memory)",
    formula: "reading = absolute pressure - p0 (1 - 0.0065 H/288.15)^5.2559",
    explanation: "Rated gauge levels are referred to 101.3 kPa whatever the altitude. In thinner air a gauge reads more for the same \
                  density. Only from 1000 m, and only where levels are stated as gauge.",
    check: Check::Case(gauge),
};

/// From here up the difference is worth a word, m (IEC 62271-1 4.1, from memory).
const HIGH_SITE: f64 = 1000.0;

fn gauge(case: &Case<'_>, findings: &mut Findings) {
    let Some(altitude) = case.site.quantity::<Length>(&site::ALTITUDE).filter(|h| h.value.si() > HIGH_SITE) else {
        return;
    };
    let level = case.breaker.statements().iter().find_map(|statement| {
        let Kind::Quantity(kind) = &statement.particular.kind else { return None };
        let reading =
            statement.quantity().filter(|q| kind.tail == Tail::PressureReference && q.is(Qualifier::Gauge))?;
        Some((reading, statement))
    });
    let Some((reading, statement)) = level else { return };
    let air = atmosphere::pressure(altitude.value);
    let Some(absolute) = reading.absolute() else { return };
    let shown = reading.measure.show_like((absolute.pressure - air).si());
    let message = format!(
        "at {} the air has {} kPa: a gauge reads {shown} where {} is rated",
        altitude.measure,
        significant(air.si() / 1e3, 3),
        reading.shown()
    );
    findings
        .add(&GAUGE_AT_ALTITUDE, statement.value, message)
        .label("the gauge reads more here")
        .working(format!("{} kPa abs - {} kPa", rounded(absolute.pressure.si() / 1e3, 1), rounded(air.si() / 1e3, 1)))
        .beside(altitude.statement, "the altitude")
        .advice("nothing to change: say it in the instructions for the site, or use density monitors referred to absolute pressure");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn cold(lowest: &str) -> Bay {
        Bay::new().set("site", "lowest ambient", lowest)
    }

    #[test]
    fn the_class_covers_the_site() {
        let finding = cold("-28 degC").one("ambient-class");
        assert_eq!(finding.edits[0].text, "minus 30 outdoor");
        Bay::new().silent("ambient-class");
        cold("-25.5 degC").one("ambient-class");
        cold("-28 degC").set("breaker", "low-temperature test", "-30 degC").silent("ambient-class");
        let special = cold("-44 degC").set("breaker", "temperature class", "minus 50 outdoor");
        assert!(special.one("ambient-class").message.contains("special"));
        special.set("breaker", "low-temperature test", "-44 degC").silent("ambient-class");
    }

    #[test]
    fn the_lowest_service_temperature_too() {
        cold("-25 degC").set("breaker", "lowest service temperature", "-20 degC").one("ambient-class");
        cold("-25 degC").set("breaker", "lowest service temperature", "-25 degC").silent("ambient-class");
    }

    #[test]
    fn a_class_far_below_the_record() {
        let bay = |record: &str| {
            Bay::new().set("breaker", "temperature class", "minus 50 outdoor").set(
                "site",
                "lowest recorded temperature",
                record,
            )
        };
        let finding = bay("-27 degC").one("ambient-excess");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Excess, "minus 30 outdoor"));
        bay("-35 degC").silent("ambient-excess");
        bay("-34 degC").one("ambient-excess");
        Bay::new().silent("ambient-excess");
    }

    #[test]
    fn heaters_that_fail() {
        let heated = Bay::new().set("breaker", "tank heaters", "yes");
        assert!(heated.one("heater-dependence").message.contains("heater hold time and heater alarm"));
        let told = heated.clone().set("breaker", "heater hold time", "6 h").set("breaker", "heater alarm", "yes");
        told.silent("heater-dependence");
        told.set("breaker", "heater alarm", "no").one("heater-dependence");
        Bay::new().set("breaker", "tank heaters", "no").silent("heater-dependence");
        heated.one("wind-with-cold");
        heated.clone().set("site", "wind at lowest ambient", "12 m/s").silent("wind-with-cold");
        heated.set("site", "installation", "indoor").silent("wind-with-cold");
        Bay::new().silent("wind-with-cold");
    }

    #[test]
    fn a_monitor_beside_a_heated_tank() {
        let bay =
            |place: &str| Bay::new().set("breaker", "tank heaters", "yes").set("breaker", "density monitor", place);
        assert_eq!(bay("remote").one("monitor-temperature").edits[0].text, "in the gas");
        bay("on the tank").silent("monitor-temperature");
        bay("apart, heated").silent("monitor-temperature");
        bay("remote").set("breaker", "tank heaters", "no").silent("monitor-temperature");
    }

    #[test]
    fn ice_and_wind() {
        let ice = |class: &str| Bay::new().set("breaker", "ice class", class);
        ice("1 mm").one("ice-wind-class");
        ice("10 mm").silent("ice-wind-class");
        ice("20 mm").silent("ice-wind-class");
        Bay::new().set("breaker", "design wind speed", "30 m/s").one("ice-wind-class");
        Bay::new().set("breaker", "design wind speed", "123 km/h").silent("ice-wind-class");
        Bay::new().silent("ice-wind-class");
    }

    #[test]
    fn leakage() {
        let bay = |rate: &str| Bay::new().set("breaker", "leakage rate", rate);
        assert_eq!(bay("1 %/year").one("leakage-rate").edits[0].text, "0.5 %/year");
        bay("0.5 %/year").silent("leakage-rate");
        bay("0.6 % a year").one("leakage-rate");
        Bay::new().silent("leakage-rate");
    }

    #[test]
    fn mixtures_are_proven() {
        let gas = |gas: &str| Bay::new().set("breaker", "insulating gas", gas);
        gas("SF6 60 % + N2 40 %").one("mixture-derating");
        gas("SF6 60 % + N2 40 %").silent("mixture-cold-proof");
        gas("CO2 70 % + O2 30 %").one("mixture-cold-proof");
        gas("CO2 70 % + O2 30 %").silent("mixture-derating");
        for proven in ["SF6 60 % + N2 40 %", "CO2 70 % + O2 30 %"] {
            let bay = gas(proven).set("breaker", "low-temperature test", "-25 degC");
            bay.silent("mixture-derating");
            bay.silent("mixture-cold-proof");
            let warm = gas(proven).set("breaker", "low-temperature test", "-20 degC");
            assert_eq!(warm.of("mixture-derating").len() + warm.of("mixture-cold-proof").len(), 1);
        }
        for plain in ["SF6", "none", "free", "dry air", "SF6 or CO2 70 % + O2 30 %"] {
            gas(plain).silent("mixture-derating");
            gas(plain).silent("mixture-cold-proof");
        }
    }

    /// The standard atmosphere has 79.5 kPa at 2000 m (ISA, gas basis).
    #[test]
    fn a_gauge_on_a_high_site() {
        let bay = |altitude: &str, filling: &str| {
            Bay::new().set("site", "altitude", altitude).set("breaker", "rated filling pressure", filling)
        };
        let finding = bay("2000 m", "0.50 MPa gauge").one("gauge-at-altitude");
        assert!(finding.message.contains("79.5 kPa") && finding.message.contains("0.522 MPa"), "{}", finding.message);
        bay("2000 m", "0.60 MPa abs").silent("gauge-at-altitude");
        bay("1000 m", "0.50 MPa gauge").silent("gauge-at-altitude");
        bay("1001 m", "0.50 MPa gauge").one("gauge-at-altitude");
    }
}
