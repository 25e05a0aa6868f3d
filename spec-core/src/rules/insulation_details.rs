//! Rules on what surrounds the insulation levels: reasons, open gap, creepage, radio interference, old ratings.

use firstpole_grammar::value::Joint;

use super::{Check, EQUAL, Rule, add_line, number, outdoors, voltage};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, system, tender};
use crate::quantity::{ElectricPotential, Length, Physical, Ratio, significant};
use crate::sheet::{Item, Stated, Statement};
use crate::standards::{Citation, Regime, rating_structure};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &REDUCED_INSULATION_REASON,
    &ISOLATING_DISTANCE_VALUES,
    &CREEPAGE_DIAMETER,
    &RADIO_INTERFERENCE_MISSING,
    &OBSOLETE_RATING_STRUCTURE,
];

fn level<'a>(case: &'a Case<'_>, particular: &Particular) -> Option<Stated<'a, ElectricPotential>> {
    case.breaker.quantity(particular)
}

/// The lowest row is chosen for a reason.
pub static REDUCED_INSULATION_REASON: Rule = Rule {
    name: "reduced-insulation-reason",
    title: "The lowest insulation level of several is chosen for a reason: arresters that protect it.",
    kind: FindingKind::Caution,
    basis: "IEC 60071-1, -2, IEEE C62.22 (from memory)",
    formula: "Up above the lowest row, or Up >= 1.2 times the lightning protective level of the arresters",
    explanation: "Where the table has several rows for Ur, the lowest is for networks that are protected against lightning. The \
                  protective level of the arresters, or a reason for the line, silences it, as long as the margin is kept. Silent \
                  above 1000 m, where the altitude decides.",
    check: Check::Case(reduced),
};

fn reduced(case: &Case<'_>, findings: &mut Findings) {
    let (Some(ur), Some(up)) = (case.rated_voltage(), level(case, &breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE))
    else {
        return;
    };
    let rows = voltage::rows(case, ur.value);
    let lowest = rows.iter().map(|row| row.lightning().si()).fold(f64::INFINITY, f64::min);
    let several = rows.iter().any(|row| row.lightning().si() > lowest * (1.0 + EQUAL));
    let chosen = (up.value.si() - lowest).abs() <= lowest * EQUAL;
    if !several || !chosen || voltage::corrected_for_altitude(case) {
        return;
    }
    let arrester = case.system.quantity::<ElectricPotential>(&system::ARRESTER_LIGHTNING_PROTECTIVE_LEVEL);
    let margin = case.policy.lightning_margin;
    match arrester {
        Some(arrester) => {
            let least = ElectricPotential::from_si(arrester.value.si() * margin);
            if up.value.si() >= least.si() * (1.0 - EQUAL) {
                return;
            }
            let factor = significant(margin, 3);
            let message = format!(
                "the lowest row is chosen, and {} is less than {factor} times the protective level {} of the arresters",
                up.measure, arrester.measure
            );
            findings
                .add(&REDUCED_INSULATION_REASON, up.place(), message)
                .label("little margin to the arresters")
                .stated(&up.measure)
                .needed(Datum { text: up.like(least), si: Some(least.si()) })
                .working(format!("{factor} x {} = {}", arrester.measure, up.like(least)))
                .beside(arrester.statement, "the protective level")
                .advice("take the next row, or arresters with a lower protective level");
        }
        None if case.system.mentions(&system::ARRESTER_LIGHTNING_PROTECTIVE_LEVEL) => {}
        None => {
            let others: Vec<String> = rows
                .iter()
                .filter(|row| row.lightning().si() > lowest * (1.0 + EQUAL))
                .map(|row| significant(row.lightning().si() / 1e3, 4))
                .collect();
            let message = format!(
                "{} is the lowest row for {} ({} kV are others), and nothing says what protects it",
                up.measure,
                ur.measure,
                others.join(", ")
            );
            findings
                .add(&REDUCED_INSULATION_REASON, up.place(), message)
                .label("protected by what?")
                .stated(&up.measure)
                .beside(ur.statement, "the rated voltage")
                .advice("state the arrester lightning protective level of the system, or the reason for the line");
        }
    }
}

/// Values of an isolating distance are for breakers that isolate.
pub static ISOLATING_DISTANCE_VALUES: Rule = Rule {
    name: "isolating-distance-values",
    title: "Withstand values of an isolating distance are asked only of breakers that isolate.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017 tables 1 to 4, IEC 62271-108 (from memory)",
    formula: "across the open breaker = to earth, unless disconnecting or withdrawable; below 300 kV for the impulse",
    explanation: "The open gap of a plain breaker is tested with the values to earth; more is asked of a disconnector. From 300 kV up \
                  the impulse across the gap has a bias by the standard. Silent where a disconnecting or withdrawable breaker is \
                  admitted, or IEC 62271-108 is cited.",
    check: Check::Case(isolating),
};

/// Constructions whose open gap isolates.
const ISOLATES: [&str; 4] = ["disconnecting", "withdrawable", "metal-clad", "metal-enclosed"];

/// From here up the impulse across the open gap is a sum by the standard (IEC 62271-1 tables 3 and 4, from memory).
const BIASED_FROM: f64 = 300e3;

fn isolating(case: &Case<'_>, findings: &mut Findings) {
    let list = case.breaker.list(&breaker::STANDARDS).or_else(|| case.tender.list(&tender::STANDARDS));
    let cited = list.is_some_and(|(items, _)| items.iter().any(|item: &Item| item.text.contains("62271-108")));
    let built = case.breaker.words(&breaker::CONSTRUCTION);
    if cited || built.is_some_and(|(words, _)| words.iter().any(|word| ISOLATES.contains(word))) {
        return;
    }
    let impulse = case.rated_voltage().is_none_or(|ur| ur.value.si() < BIASED_FROM * (1.0 - EQUAL));
    for (across, to_earth, looked_at) in [
        (
            &breaker::POWER_FREQUENCY_WITHSTAND_VOLTAGE_ACROSS_THE_OPEN_BREAKER,
            &breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE,
            true,
        ),
        (
            &breaker::LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE_ACROSS_THE_OPEN_BREAKER,
            &breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE,
            impulse,
        ),
    ] {
        let (Some((reading, statement)), Some(earth)) = (case.breaker.quantity_reading(across), level(case, to_earth))
        else {
            continue;
        };
        let bias = match &reading.second {
            Some((Joint::Range, _)) | None => 0.0,
            Some((_, bias)) => bias.si.unwrap_or(0.0),
        };
        let Some(total) = reading.measure.si.map(|value| value + bias) else { continue };
        if !looked_at || total <= earth.value.si() * (1.0 + EQUAL) {
            continue;
        }
        let total = earth.like(ElectricPotential::from_si(total));
        let message =
            format!("{total} across the open breaker, against {} to earth, is a disconnector's value", earth.measure);
        let finding = findings.add(&ISOLATING_DISTANCE_VALUES, statement.value, message);
        finding.label("a value of an isolating distance").stated(total.as_str()).needed(&earth.measure);
        finding.beside(earth.statement, "the level to earth");
        finding.advice("or ask for a disconnecting breaker by IEC 62271-108").replace_by(earth.measure.to_string());
    }
}

/// Wide insulators creep more.
pub static CREEPAGE_DIAMETER: Rule = Rule {
    name: "creepage-diameter",
    title: "Hollow insulators wider than 300 mm have a diameter factor on their creepage distance.",
    kind: FindingKind::Remark,
    basis: "IEC 60815-2, -3 (from memory)",
    formula: "mean diameter > 300 mm: Kad stated",
    explanation: "On wide insulators the layer of dirt is wetter for the same length. Either the buyer states the factor, or says that \
                  the maker applies it. Silent where no diameter is stated, and where the factor is.",
    check: Check::Case(diameter),
};

/// Up to this mean diameter no factor is needed, m (IEC 60815-2, from memory).
const NARROW: f64 = 0.300;

fn diameter(case: &Case<'_>, findings: &mut Findings) {
    let Some(diameter) = case.breaker.quantity::<Length>(&breaker::INSULATOR_DIAMETER) else { return };
    if diameter.value.si() <= NARROW * (1.0 + EQUAL) || case.breaker.mentions(&breaker::DIAMETER_CORRECTION_FACTOR) {
        return;
    }
    let part = match case.breaker.word(&breaker::INSULATOR_MATERIAL) {
        Some(("composite", _)) => "IEC 60815-3",
        Some(("porcelain", _)) => "IEC 60815-2",
        _ => "IEC 60815-2 for porcelain, IEC 60815-3 for composite",
    };
    let message =
        format!("a mean diameter of {} asks for a diameter factor on the creepage: who applies it?", diameter.measure);
    findings
        .add(&CREEPAGE_DIAMETER, diameter.place(), message)
        .label("wider than 300 mm")
        .stated(&diameter.measure)
        .advice(format!("add diameter correction factor by {part}"));
}

/// Outdoor breakers have a limit of radio interference.
pub static RADIO_INTERFERENCE_MISSING: Rule = Rule {
    name: "radio-interference-missing",
    title: "Air-insulated breakers from 123 kV up have a limit of radio interference or corona.",
    kind: FindingKind::Remark,
    basis: "IEC 62271-1:2017 7.3 (from memory)",
    formula: "at most 2500 uV at 1.1 Ur/sqrt3",
    explanation: "The standard has the test from 123 kV up, and its limit holds where nothing is said. Silent below, indoors, and for \
                  constructions without open terminals.",
    check: Check::Case(interference),
};

/// The test is of rated voltages from here (IEC 62271-1 7.3, from memory).
const INTERFERENCE_FROM: f64 = 123e3;
/// Voltage of the test, as multiple of Ur/sqrt3, and its limit (IEC 62271-1 7.3, from memory).
const INTERFERENCE_TEST: f64 = 1.1;
const INTERFERENCE_LIMIT: &str = "at most 2500 uV";

/// Constructions with live parts in open air.
const OPEN_AIR: [&str; 3] = ["live tank", "dead tank", "disconnecting"];

fn interference(case: &Case<'_>, findings: &mut Findings) {
    let (Some(_), Some(ur), Some((words, _))) =
        (outdoors(case), case.rated_voltage(), case.breaker.words(&breaker::CONSTRUCTION))
    else {
        return;
    };
    let stated = [&breaker::RADIO_INTERFERENCE_VOLTAGE, &breaker::CORONA_EXTINCTION_VOLTAGE]
        .into_iter()
        .any(|particular| case.breaker.mentions(particular));
    let open = words.iter().any(|word| OPEN_AIR.contains(word));
    if stated || !open || ur.value.si() < INTERFERENCE_FROM * (1.0 - EQUAL) {
        return;
    }
    let test = ur.like(ElectricPotential::from_si(ur.value.si() * INTERFERENCE_TEST / 3f64.sqrt()));
    let message = format!("no limit of radio interference or corona is stated for {}", ur.measure);
    let finding = findings.add(&RADIO_INTERFERENCE_MISSING, ur.place(), message);
    finding.label("no limit of radio interference").needed(INTERFERENCE_LIMIT);
    finding.working(format!("1.1 x {} / sqrt3 = {test}", ur.measure));
    add_line(finding, case.sheet, &breaker::RADIO_INTERFERENCE_VOLTAGE, INTERFERENCE_LIMIT);
}

/// Ratings of the old structure go with the edition that has them.
pub static OBSOLETE_RATING_STRUCTURE: Rule = Rule {
    name: "obsolete-rating-structure",
    title: "Chopped wave, K factor, interrupting class and tripping delay are stated only with the edition that has them.",
    kind: FindingKind::Caution,
    basis: "ANSI C37.06-1987 against the revisions of 1997 and later (from memory)",
    formula: "K = 1.0 from the 1997 and 1999 revisions on; no MVA class, no Y, no chopped wave",
    explanation: "Breakers are no longer rated so, and a value of the old structure beside new ones is read wrongly. Silent where the \
                  text cites an edition before 1997, and on a K factor of 1.0. One finding for all such lines.",
    check: Check::Case(obsolete),
};

/// The structure was changed by the revisions of this year and later (from memory).
const NEW_STRUCTURE: u16 = 1997;

fn obsolete(case: &Case<'_>, findings: &mut Findings) {
    let list = case.breaker.list(&breaker::STANDARDS).or_else(|| case.tender.list(&tender::STANDARDS));
    let old_edition = list.is_some_and(|(items, _)| {
        items.iter().filter_map(|item| Citation::read(&item.text)).any(|cited| {
            rating_structure(&cited.number) == Some(Regime::Ieee) && cited.year.is_some_and(|year| year < NEW_STRUCTURE)
        })
    });
    if old_edition {
        return;
    }
    let k = case.breaker.quantity::<Ratio>(&breaker::K_FACTOR).filter(|k| (k.value.si() - 1.0).abs() > EQUAL);
    let old: Vec<(&str, &Statement)> = [
        ("a K factor", k.as_ref().map(|k| k.statement)),
        ("an interrupting class in MVA", case.breaker.statement(&breaker::INTERRUPTING_CLASS)),
        ("a permissible tripping delay", case.breaker.statement(&breaker::PERMISSIBLE_TRIPPING_DELAY)),
        ("a chopped-wave level", case.breaker.statement(&breaker::CHOPPED_WAVE_WITHSTAND_VOLTAGE)),
    ]
    .into_iter()
    .filter_map(|(what, statement)| statement.map(|statement| (what, statement)))
    .collect();
    let Some(((_, first), others)) = old.split_first() else { return };
    let said: Vec<&str> = old.iter().map(|(what, _)| *what).collect();
    let message = format!(
        "{} belong{} to the rating structure before 1997",
        said.join(", "),
        if others.is_empty() { "s" } else { "" }
    );
    let finding = findings.add(&OBSOLETE_RATING_STRUCTURE, first.value, message);
    finding.label("of the old rating structure");
    if let Some(k) = k {
        finding.stated(number(&k)).needed("1.0");
    }
    for (what, statement) in others {
        finding.beside(statement, *what);
    }
    finding.advice("delete it, and look whether breaking, making and short-time current are of the new structure");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn lowest() -> Bay {
        Bay::new().set("breaker", "rated lightning impulse withstand voltage", "550 kV").set(
            "breaker",
            "rated short-duration power-frequency withstand voltage",
            "230 kV",
        )
    }

    #[test]
    fn the_lowest_row_wants_its_reason() {
        assert_eq!(lowest().one("reduced-insulation-reason").kind, FindingKind::Caution);
        let protected = |level: &str| lowest().set("system", "arrester lightning protective level", level);
        protected("350 kV").silent("reduced-insulation-reason");
        // 550 / 1.2 = 458 kV.
        protected("458 kV").silent("reduced-insulation-reason");
        assert!(protected("460 kV").one("reduced-insulation-reason").message.contains("1.2 times"));
        lowest()
            .set("breaker", "reason for rated lightning impulse withstand voltage", "\"by study\"")
            .silent("reduced-insulation-reason");
        lowest().set("site", "altitude", "1500 m").silent("reduced-insulation-reason");
        Bay::new().silent("reduced-insulation-reason");
    }

    #[test]
    fn the_open_gap_of_a_plain_breaker() {
        let bay = |kv: &str| Bay::new().set("breaker", "power-frequency withstand voltage across the open breaker", kv);
        assert_eq!(bay("315 kV").one("isolating-distance-values").edits[0].text, "275 kV");
        bay("275 kV").silent("isolating-distance-values");
        bay("315 kV").set("breaker", "construction", "disconnecting").silent("isolating-distance-values");
        let impulse =
            Bay::new().set("breaker", "lightning impulse withstand voltage across the open breaker", "650 + 100 kV");
        assert!(impulse.one("isolating-distance-values").message.contains("750 kV"));
        impulse.set("breaker", "rated voltage", "420 kV").silent("isolating-distance-values");
    }

    #[test]
    fn wide_insulators() {
        let bay = |mm: &str| Bay::new().set("breaker", "insulator diameter", mm);
        bay("420 mm").one("creepage-diameter");
        bay("300 mm").silent("creepage-diameter");
        bay("420 mm").set("breaker", "diameter correction factor", "1.1").silent("creepage-diameter");
    }

    #[test]
    fn radio_interference_has_a_limit() {
        let bay = Bay::new().without("breaker", "radio interference voltage");
        let finding = bay.one("radio-interference-missing");
        assert_eq!(finding.kind, FindingKind::Remark);
        assert!(finding.working[0].ends_with("92.1 kV"), "{:?}", finding.working);
        bay.clone().set("breaker", "rated voltage", "123 kV").one("radio-interference-missing");
        bay.clone().set("breaker", "rated voltage", "100 kV").silent("radio-interference-missing");
        bay.set("breaker", "construction", "gas-insulated").silent("radio-interference-missing");
        Bay::new().silent("radio-interference-missing");
    }

    #[test]
    fn ratings_of_the_old_structure() {
        let bay = Bay::new().set("breaker", "K factor", "1.3").set("breaker", "interrupting class", "5000 MVA");
        let finding = bay.one("obsolete-rating-structure");
        assert_eq!((finding.kind, finding.related.len()), (FindingKind::Caution, 1));
        bay.set("tender", "standards", "ANSI C37.06-1987").silent("obsolete-rating-structure");
        Bay::new().set("breaker", "K factor", "1.0").silent("obsolete-rating-structure");
    }
}
