//! Rules on insulation in the air of the site: altitude and pollution; and on current in its heat.

use super::{Check, EQUAL, Rule};
use crate::case::Case;
use crate::duty::{Figure, LevelOnSite, SiteDuty};
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, site, system};
use crate::physics::insulation_site::{creepage, needed_level, unified_of_between_phases};
use crate::quantity::{ElectricCurrent, ElectricPotential, Length, LengthPerVoltage, Physical, Qualifier};
use crate::standards::{InsulationLevel, insulation_levels};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&INSULATION_ALTITUDE, &CREEPAGE_DISTANCE, &CREEPAGE_BASIS, &CONTINUOUS_CURRENT_AMBIENT];

/// What is rated for the standard atmosphere holds in the air of the site.
pub static INSULATION_ALTITUDE: Rule = Rule {
    name: "insulation-altitude",
    title: "External insulation that is rated for up to 1000 m holds in the thinner air of a higher site.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-1:2017 4.2.2 (formula as a public article quotes IEC 62271-1:2011)",
    formula: "rated level >= level needed on site x exp(m (H - 1000 m)/8150 m); m 1 AC and lightning, 0.75 switching to earth",
    explanation: "Where the level needed on site is stated, the rated level is held against it with the altitude factor. Where it is \
                  not, an omission shows what the rated level is worth on site, and a shortfall where that worth is below the lowest \
                  row of the table. Gas, vacuum and solid insulation do not feel the altitude: silent for gas-insulated, metal-clad \
                  and indoor metal-enclosed apparatus, for external insulation: none, and where the levels are stated for the site.",
    check: Check::Case(altitude),
};

type Levels = (
    &'static Particular,
    &'static Particular,
    &'static Particular,
    fn(&SiteDuty) -> Option<&LevelOnSite>,
    fn(&InsulationLevel) -> Option<ElectricPotential>,
);

static LEVELS: &[Levels] = &[
    (
        &breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE,
        &breaker::LIGHTNING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        &system::LIGHTNING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        |duty| duty.lightning_level.as_ref(),
        |row| Some(row.lightning()),
    ),
    (
        &breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE,
        &breaker::POWER_FREQUENCY_LEVEL_NEEDED_ON_SITE,
        &system::POWER_FREQUENCY_LEVEL_NEEDED_ON_SITE,
        |duty| duty.power_frequency_level.as_ref(),
        |row| Some(row.power_frequency()),
    ),
    (
        &breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE,
        &breaker::SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        &system::SWITCHING_IMPULSE_LEVEL_NEEDED_ON_SITE,
        |duty| duty.switching_level.as_ref(),
        InsulationLevel::switching,
    ),
];

fn altitude(case: &Case<'_>, findings: &mut Findings) {
    let Some(height) = case.site.quantity::<Length>(&site::ALTITUDE) else { return };
    let mut asked = false;
    for (rated, needed, of_system, on_site, of_row) in LEVELS {
        let Some(stated) = case.breaker.quantity::<ElectricPotential>(rated) else { continue };
        let Some(level) = on_site(&case.duty.site).filter(|level| level.factor > 1.0 + EQUAL) else { continue };
        let (factor, worth) = (level.factor, level.worth.value);
        let working = level.worth.working.to_string();
        let site_level = case
            .breaker
            .quantity::<ElectricPotential>(needed)
            .or_else(|| case.system.quantity::<ElectricPotential>(of_system));
        match site_level {
            Some(level) => {
                let wanted = needed_level(level.value, factor);
                if stated.value.si() >= wanted.si() * (1.0 - EQUAL) {
                    continue;
                }
                let message = format!(
                    "{} at {} is worth {} on site, and {} is needed there: {} would have to be rated",
                    stated.measure,
                    height.measure,
                    stated.like(worth),
                    level.measure,
                    stated.like(wanted)
                );
                let finding = findings.add(&INSULATION_ALTITUDE, stated.place(), message);
                finding.label("too low for this altitude").stated(&stated.measure);
                finding.needed(Datum { text: stated.like(wanted), si: Some(wanted.si()) }).working(working);
                finding.beside(level.statement, "what is needed on site").beside(height.statement, "the altitude");
                if let Some(next) = next_level(case, wanted, *of_row) {
                    finding.replace_by(stated.like(next));
                    finding.advice("a corrected level need not be a row of the table for this voltage");
                }
            }
            None => {
                let below = lowest_row(case, *of_row).filter(|lowest| worth.si() < lowest.si() * (1.0 - EQUAL));
                // One question is enough where no level is short.
                if below.is_none() && asked {
                    continue;
                }
                asked |= below.is_none();
                let mut message =
                    format!("{} at {} is worth {} on site", stated.measure, height.measure, stated.like(worth));
                match below {
                    Some(lowest) => {
                        message += &format!(", below {}, the lowest row for this voltage", stated.like(lowest));
                    }
                    None => message += "; the level that is needed on site is not stated",
                }
                let finding = findings.add(&INSULATION_ALTITUDE, stated.place(), message);
                finding.kind(if below.is_some() { FindingKind::Shortfall } else { FindingKind::Omission });
                finding.label("worth less in thin air").stated(&stated.measure).working(working);
                finding.beside(height.statement, "the altitude");
                finding.advice(format!("state {}, or insulation stated for: site altitude", needed.label));
            }
        }
    }
}

fn lowest_row(case: &Case<'_>, of_row: fn(&InsulationLevel) -> Option<ElectricPotential>) -> Option<ElectricPotential> {
    let rated = case.rated_voltage()?.value;
    let families = case.regimes().families();
    insulation_levels()
        .iter()
        .filter(|row| row.is_for(rated) && families.contains(&row.regime))
        .filter_map(of_row)
        .min_by(|a, b| a.si().total_cmp(&b.si()))
}

/// The next level of any row that is not below `wanted`.
fn next_level(
    case: &Case<'_>,
    wanted: ElectricPotential,
    of_row: fn(&InsulationLevel) -> Option<ElectricPotential>,
) -> Option<ElectricPotential> {
    let families = case.regimes().families();
    insulation_levels()
        .iter()
        .filter(|row| families.contains(&row.regime))
        .filter_map(of_row)
        .filter(|level| level.si() >= wanted.si() * (1.0 - EQUAL))
        .min_by(|a, b| a.si().total_cmp(&b.si()))
}

/// The creepage distance suits the pollution of the site.
pub static CREEPAGE_DISTANCE: Rule = Rule {
    name: "creepage-distance",
    title: "The creepage distance suits the pollution of the site.",
    kind: FindingKind::Shortfall,
    basis: "IEC 60815-1:2008: 22.0, 27.8, 34.7, 43.3, 53.7 mm/kV for classes a to e (public script that cites the standard)",
    formula: "L >= USCD Ur/sqrt3 (Kad)",
    explanation: "The total length along the surface against the unified specific creepage of the site's class over the rated voltage to \
                  earth, times the diameter factor where one is stated. Outdoors only; within 1 %, since lengths are rounded.",
    check: Check::Case(distance),
};

/// Lengths are rounded to whole ten millimetres by the trade (common practice, no source).
const LENGTH_SLACK: f64 = 0.01;

fn distance(case: &Case<'_>, findings: &mut Findings) {
    let (Some(stated), Some((class, said)), Some(rated), Some(figure)) = (
        case.breaker.quantity::<Length>(&breaker::CREEPAGE_DISTANCE),
        case.site.word(&site::POLLUTION),
        case.rated_voltage(),
        case.duty.site.creepage.as_ref(),
    ) else {
        return;
    };
    let needed = figure.value;
    if stated.value.si() >= needed.si() * (1.0 - LENGTH_SLACK) {
        return;
    }
    // Rounded up to whole ten millimetres, as lengths are asked for.
    let text = stated.like(Length::from_si((needed.si() * 100.0).ceil() / 100.0));
    let message = format!(
        "{} is too little for class {class} at {}: {} is needed",
        stated.measure,
        rated.measure,
        stated.like(needed)
    );
    findings
        .add(&CREEPAGE_DISTANCE, stated.place(), message)
        .label("too little for the pollution of the site")
        .stated(&stated.measure)
        .needed(Datum { text: text.clone(), si: Some(needed.si()) })
        .working(figure.working.to_string())
        .beside(said, "the pollution of the site")
        .beside(rated.statement, "the rated voltage")
        .replace_by(text);
}

/// A specific creepage and the length agree.
pub static CREEPAGE_BASIS: Rule = Rule {
    name: "creepage-basis",
    title: "A specific creepage distance and the creepage distance agree.",
    kind: FindingKind::Contradiction,
    basis: "IEC 60815:1986 (over Ur) and :2008 (over Ur/sqrt3) (from memory)",
    formula: "L = SCD Ur = USCD Ur/sqrt3",
    explanation: "31 mm/kV over the phase-to-phase voltage and 53.7 mm/kV over the phase-to-earth voltage are the same length. Compared \
                  within 2 %; a specific creepage without its words is asked about by basis-missing.",
    check: Check::Case(specific),
};

/// How far a length and a specific creepage may be apart: both are rounded (common practice, no source).
const SPECIFIC_SLACK: f64 = 0.02;

fn specific(case: &Case<'_>, findings: &mut Findings) {
    let (Some(length), Some(rated)) =
        (case.breaker.quantity::<Length>(&breaker::CREEPAGE_DISTANCE), case.rated_voltage())
    else {
        return;
    };
    for particular in [&breaker::SPECIFIC_CREEPAGE_DISTANCE, &breaker::UNIFIED_SPECIFIC_CREEPAGE_DISTANCE] {
        let Some(stated) = case.breaker.quantity::<LengthPerVoltage>(particular) else { continue };
        let unified = particular.is(&breaker::UNIFIED_SPECIFIC_CREEPAGE_DISTANCE);
        let between = stated.statement.quantity().is_some_and(|q| q.is(Qualifier::PhaseToPhase));
        let to_earth = stated.statement.quantity().is_some_and(|q| q.is(Qualifier::PhaseToEarth));
        let per_volt = match (unified || to_earth, between) {
            (true, _) => stated.value,
            (false, true) => unified_of_between_phases(stated.value),
            (false, false) => continue,
        };
        let implied = creepage(per_volt, rated.value);
        if (implied.si() - length.value.si()).abs() <= SPECIFIC_SLACK * length.value.si() {
            continue;
        }
        let message = format!(
            "{} at {} is {}, and {} is stated",
            stated.measure,
            rated.measure,
            length.like(implied),
            length.measure
        );
        findings
            .add(&CREEPAGE_BASIS, stated.place(), message)
            .label("does not agree with the length")
            .stated(&stated.measure)
            .needed(Datum { text: length.like(implied), si: Some(implied.si()) })
            .beside(length.statement, "the length")
            .advice("31 mm/kV phase-to-phase is 53.7 mm/kV phase-to-earth: was it divided by the other voltage?");
    }
}

/// In the heat of the site the load is still carried.
pub static CONTINUOUS_CURRENT_AMBIENT: Rule = Rule {
    name: "continuous-current-ambient",
    title: "Where it gets hotter than 40 degC, the load is still carried.",
    kind: FindingKind::Shortfall,
    basis: "IEEE C37.010, IEC/TR 62271-306 (from memory)",
    formula: "Ia = Ir ((Tmax - Ta)/(Tmax - 40 degC))^(1/1.8) >= load",
    explanation: "The temperature limit of the part that governs is 105 degC unless it is stated. Silent up to 40 degC, and where a \
                  temperature-rise test at the site's temperature is asked for. A rated current below the load is \
                  continuous-current-below-load.",
    check: Check::Case(ambient),
};

fn ambient(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(load)) =
        (case.breaker.quantity::<ElectricCurrent>(&breaker::RATED_CONTINUOUS_CURRENT), case.duty.load_current.as_ref())
    else {
        return;
    };
    let proven = case
        .breaker
        .quantity::<ElectricCurrent>(&breaker::TEMPERATURE_RISE_TEST_CURRENT)
        .is_some_and(|test| test.value.si() >= load.value.si());
    let Some(heat) = case.duty.site.current_in_heat.as_ref() else { return };
    let covers = |left: &Figure<ElectricCurrent>| left.value.si() >= load.value.si() * (1.0 - EQUAL);
    // Thin air that is too little by itself is told by cooling-altitude.
    let air = case.duty.site.current_in_thin_air.as_ref().filter(|air| covers(air));
    let both = air.and(case.duty.site.continuous_current.as_ref());
    let allowed = both.unwrap_or(heat);
    if proven || rated.value.si() < load.value.si() || covers(allowed) {
        return;
    }
    let hottest = heat.working.inputs.iter().find(|input| input.symbol == "Ta").map_or("", |input| &input.text);
    let message = format!(
        "at {hottest} {} carries {}, and the largest load is {}",
        rated.measure,
        rated.like(allowed.value),
        rated.like(load.value)
    );
    let finding = findings.add(&CONTINUOUS_CURRENT_AMBIENT, rated.place(), message);
    finding
        .label("too little in the heat")
        .stated(&rated.measure)
        .needed(Datum { text: rated.like(load.value), si: Some(load.value.si()) });
    finding.working(heat.working.to_string());
    if let (Some(air), Some(both)) = (air, both) {
        finding.working(air.working.to_string()).working(both.working.to_string());
    }
    for place in heat.places().filter(|place| *place != rated.place()) {
        finding.related(place, "the heat of the site");
    }
    for place in load.places() {
        finding.related(place, "the largest load");
    }
    finding.advice("take the next preferred current, or ask for a temperature-rise test at the site's temperature");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    const UP: &str = "rated lightning impulse withstand voltage";

    fn high(altitude: &str) -> Bay {
        Bay::new().set("site", "altitude", altitude)
    }

    /// 650 kV at 1420 m is worth 617 kV (own calculation, as in the description of the language).
    #[test]
    fn what_a_level_is_worth_on_site() {
        let findings = high("1 420 m").of("insulation-altitude");
        assert_eq!(findings.len(), 1, "{findings:#?}");
        assert_eq!(findings[0].kind, FindingKind::Omission);
        let lightning =
            high("1 420 m").set("breaker", "power-frequency level needed on site", "230 kV").one("insulation-altitude");
        assert!(lightning.message.contains("617 kV"), "{}", lightning.message);
        high("1000 m").silent("insulation-altitude");
        high("1010 m").one("insulation-altitude");
    }

    /// 125 kV at 1800 m is worth 113 kV on site; 125 needs 138.
    #[test]
    fn a_level_that_is_needed_on_site() {
        let bay = |rated: &str| {
            high("1800 m")
                .set("breaker", "rated voltage", "24 kV")
                .set("breaker", UP, rated)
                .without("breaker", "rated short-duration power-frequency withstand voltage")
                .set("breaker", "lightning impulse level needed on site", "125 kV")
        };
        let finding = bay("125 kV").one("insulation-altitude");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(finding.message.contains("113 kV") && finding.message.contains("138 kV"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "145 kV");
        bay("145 kV").silent("insulation-altitude");
        bay("137 kV").one("insulation-altitude");
        bay("138 kV").silent("insulation-altitude");
    }

    #[test]
    fn insulation_inside_does_not_feel_the_altitude() {
        high("2500 m").set("breaker", "construction", "gas-insulated").silent("insulation-altitude");
        high("2500 m").set("breaker", "external insulation", "none").silent("insulation-altitude");
        high("2500 m").set("breaker", "insulation stated for", "site altitude").silent("insulation-altitude");
        let short = high("3500 m").set("breaker", UP, "550 kV").of("insulation-altitude");
        assert!(short.iter().any(|f| f.kind == FindingKind::Shortfall), "{short:#?}");
    }

    /// 1450 mm is class c at 72.5 kV; class d needs 1812 mm.
    #[test]
    fn creepage_for_the_class_of_the_site() {
        let bay = |length: &str, class: &str| {
            Bay::new().set("breaker", "rated voltage", "72.5 kV").set("breaker", "creepage distance", length).set(
                "site",
                "pollution",
                class,
            )
        };
        let finding = bay("1450 mm", "d").one("creepage-distance");
        assert!(finding.message.contains("1812 mm"), "{}", finding.message);
        bay("1450 mm", "c").silent("creepage-distance");
        bay("1800 mm", "d").silent("creepage-distance");
        bay("1790 mm", "d").one("creepage-distance");
        bay("1450 mm", "d").set("site", "installation", "indoor").silent("creepage-distance");
    }

    /// 31 mm/kV on the phase-to-earth voltage is 644 mm at 36 kV, on the phase-to-phase voltage 1116 mm.
    #[test]
    fn specific_creepage_and_length() {
        let bay = |specific: &str, length: &str| {
            Bay::new().set("breaker", "rated voltage", "36 kV").set("breaker", "creepage distance", length).set(
                "breaker",
                "specific creepage distance",
                specific,
            )
        };
        bay("31 mm/kV phase-to-phase", "1116 mm").silent("creepage-basis");
        let finding = bay("31 mm/kV phase-to-earth", "1116 mm").one("creepage-basis");
        assert!(finding.message.contains("644 mm"), "{}", finding.message);
        bay("31 mm/kV phase-to-phase", "1095 mm").silent("creepage-basis");
        bay("31 mm/kV phase-to-phase", "1090 mm").one("creepage-basis");
        bay("31 mm/kV", "644 mm").silent("creepage-basis");
    }

    /// 1250 A with a limit of 105 degC carries 1196 A at 45 degC.
    #[test]
    fn current_in_the_heat() {
        let bay = |highest: &str, load: &str| {
            Bay::new().set("breaker", "rated continuous current", "1250 A").set("site", "highest ambient", highest).set(
                "circuit",
                "load current",
                load,
            )
        };
        let finding = bay("45 degC", "1230 A").one("continuous-current-ambient");
        assert!(
            finding.message.contains("1196 A")
                || finding.message.contains("1190 A")
                || finding.message.contains("1195 A"),
            "{}",
            finding.message
        );
        bay("45 degC", "1190 A").silent("continuous-current-ambient");
        bay("45 degC", "1200 A").one("continuous-current-ambient");
        bay("40 degC", "1250 A").silent("continuous-current-ambient");
        bay("45 degC", "1230 A")
            .set("breaker", "temperature-rise test current", "1250 A at 45 degC")
            .silent("continuous-current-ambient");
    }
}
