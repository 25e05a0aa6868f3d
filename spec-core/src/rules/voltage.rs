//! Rules on voltage, frequency and insulation levels.

use super::several_breakers::stands_on_wrong_system;
use super::{Check, Rule};
use crate::case::Case;
use crate::finding::{Datum, FindingKind, Findings};
use crate::particular::{Particular, breaker, site, system};
use crate::quantity::{ElectricPotential, Frequency, Length, Physical};
use crate::sheet::Stated;
use crate::standards::{
    InsulationLevel, insulation_levels, is_rated_voltage, rated_at_or_above, steps_between_voltages, usual_rated,
};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[
    &RATED_VOLTAGE_BELOW_SYSTEM,
    &RATED_VOLTAGE_EXCESS,
    &RATED_VOLTAGE_NOT_PREFERRED,
    &FREQUENCY_MISMATCH,
    &INSULATION_SET,
    &INSULATION_BELOW_TABLE,
    &SWITCHING_IMPULSE_LEVEL,
];

/// The rated voltage is not below the highest voltage of the system.
pub static RATED_VOLTAGE_BELOW_SYSTEM: Rule = Rule {
    name: "rated-voltage-below-system",
    title: "The rated voltage is not below the highest voltage of the system.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-1:2017 5.2, IEEE C37.04 rated maximum voltage (from memory)",
    formula: "Ur >= Um",
    explanation: "A breaker is made for voltages up to its rated voltage. Where the highest voltage of the system is not stated, \
                  the nominal voltage is compared. Insulation levels, TRV and capacitive ratings follow the rated voltage.",
    check: Check::Case(below_system),
};

fn below_system(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    if stands_on_wrong_system(case) {
        return;
    }
    let highest = case.system.quantity::<ElectricPotential>(&system::HIGHEST_VOLTAGE);
    let (name, limit) = match &highest {
        Some(stated) => ("highest voltage of the system", stated),
        None => match &case.system.quantity::<ElectricPotential>(&system::NOMINAL_VOLTAGE) {
            Some(stated) => return compare(case, findings, &rated, "nominal voltage of the system", stated),
            None => return,
        },
    };
    compare(case, findings, &rated, name, limit);
}

fn compare(
    case: &Case<'_>,
    findings: &mut Findings,
    rated: &Stated<'_, ElectricPotential>,
    name: &str,
    limit: &Stated<'_, ElectricPotential>,
) {
    if rated.value.si() >= limit.value.si() * (1.0 - 1e-6) {
        return;
    }
    let families = case.regimes().families();
    let message = format!("the rated voltage {} is below the {name}, {}", rated.measure, limit.measure);
    let finding = findings.add(&RATED_VOLTAGE_BELOW_SYSTEM, rated.place(), message);
    finding.label("below the system").stated(&rated.measure).beside(limit.statement, format!("the {name}"));
    finding.working(format!("Ur >= Um: {} < {}", rated.measure, limit.measure));
    if let Some(needed) = rated_at_or_above(limit.value, &families) {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
        finding.advice("insulation levels, TRV and capacitive ratings follow the rated voltage: bring them along");
    }
}

/// The rated voltage is not two or more steps above the highest voltage of the system.
pub static RATED_VOLTAGE_EXCESS: Rule = Rule {
    name: "rated-voltage-excess",
    title: "The rated voltage is not two or more steps of the list above the highest voltage of the system.",
    kind: FindingKind::Excess,
    basis: "IEC 62271-1:2017 5.2 (from memory); cost",
    formula: "steps of the list between Um and Ur < 2",
    explanation: "Insulation, TRV and capacitive ratings all grow with the rated voltage, and so does the price. One step is left \
                  to the buyer; a reason given for the line silences this.",
    check: Check::Case(excess),
};

fn excess(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(highest)) =
        (case.rated_voltage(), case.system.quantity::<ElectricPotential>(&system::HIGHEST_VOLTAGE))
    else {
        return;
    };
    let families = case.regimes().families();
    let steps = steps_between_voltages(highest.value, rated.value, &families);
    if steps < case.policy.excess_steps as i64 || stands_on_wrong_system(case) {
        return;
    }
    let Some(enough) = rated_at_or_above(highest.value, &families) else { return };
    let text = rated.like(enough);
    let message = format!(
        "{} is asked on a system of at most {}: {steps} steps of the list more than needed, and TRV, insulation and capacitive \
         ratings all grow with it; {text} would do",
        rated.measure, highest.measure
    );
    findings
        .add(&RATED_VOLTAGE_EXCESS, rated.place(), message)
        .label("more than the system asks for")
        .stated(&rated.measure)
        .needed(Datum { text: text.clone(), si: Some(enough.si()) })
        .beside(highest.statement, "the highest voltage of the system")
        .replace_by(text);
}

/// The rated voltage is on the list of the families cited.
pub static RATED_VOLTAGE_NOT_PREFERRED: Rule = Rule {
    name: "rated-voltage-not-preferred",
    title: "The rated voltage is on the list of the standards cited.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 5.2, IEEE C37.04 tables (from memory)",
    formula: "Ur in the list of preferred rated voltages",
    explanation: "Bidders have type tests for the listed voltages. A nominal voltage written for the rated one is the usual slip. \
                  Where the text cites a national standard, a value of that standard is a remark at most.",
    check: Check::Case(not_preferred),
};

fn not_preferred(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    let regimes = case.regimes();
    let families = regimes.families();
    if is_rated_voltage(rated.value, &families) {
        return;
    }
    let meant = usual_rated(rated.value);
    let needed = meant.or_else(|| rated_at_or_above(rated.value, &families));
    let message = match meant {
        Some(meant) => {
            format!(
                "{} is a nominal voltage, not a rated voltage: {} is the one that goes with it",
                rated.measure,
                rated.like(meant)
            )
        }
        None => format!("{} is on no list of rated voltages of the standards cited", rated.measure),
    };
    let finding = findings.add(&RATED_VOLTAGE_NOT_PREFERRED, rated.place(), message);
    finding.label("not on the list").stated(&rated.measure);
    if let Some(needed) = needed {
        let text = rated.like(needed);
        finding.needed(Datum { text: text.clone(), si: Some(needed.si()) }).replace_by(text);
    }
    if regimes.national {
        finding.kind(FindingKind::Remark).advice("a national standard is cited; if the value is of its list, leave it");
    }
}

/// The rated frequency is that of the system.
pub static FREQUENCY_MISMATCH: Rule = Rule {
    name: "frequency-mismatch",
    title: "The rated frequency is the frequency of the system.",
    kind: FindingKind::Contradiction,
    basis: "IEC 62271-1:2017 5.4 (from memory)",
    formula: "fr = f",
    explanation: "Making current, rate of rise, DC component and times in cycles all hang on the frequency. A tolerance about the \
                  frequency is no second frequency and is not compared.",
    check: Check::Case(frequency),
};

fn frequency(case: &Case<'_>, findings: &mut Findings) {
    let (Some(rated), Some(system)) = (
        case.breaker.quantity::<Frequency>(&breaker::RATED_FREQUENCY),
        case.system.quantity::<Frequency>(&system::FREQUENCY),
    ) else {
        return;
    };
    if (rated.value.si() - system.value.si()).abs() < 0.05 {
        return;
    }
    let message = format!("the breaker is rated for {}, the system runs at {}", rated.measure, system.measure);
    findings
        .add(&FREQUENCY_MISMATCH, rated.place(), message)
        .label("not the system's frequency")
        .stated(&rated.measure)
        .needed(&system.measure)
        .beside(system.statement, "the frequency of the system")
        .advice("the making current, the short-line fault's rate of rise and times in cycles change with it")
        .replace_by(system.measure.to_string());
}

/// What is rated of the insulation, as far as it is stated.
struct Levels<'a> {
    ud: Option<Stated<'a, ElectricPotential>>,
    up: Option<Stated<'a, ElectricPotential>>,
    us: Option<Stated<'a, ElectricPotential>>,
}

fn levels<'a>(case: &'a Case<'_>) -> Levels<'a> {
    let get = |particular: &'static Particular| case.breaker.quantity::<ElectricPotential>(particular);
    Levels {
        ud: get(&breaker::RATED_SHORT_DURATION_POWER_FREQUENCY_WITHSTAND_VOLTAGE),
        up: get(&breaker::RATED_LIGHTNING_IMPULSE_WITHSTAND_VOLTAGE),
        us: get(&breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE),
    }
}

/// The rows of the tables for the rated voltage, of the families cited.
pub(super) fn rows(case: &Case<'_>, rated: ElectricPotential) -> Vec<&'static InsulationLevel> {
    let families = case.regimes().families();
    insulation_levels().iter().filter(|row| row.is_for(rated) && families.contains(&row.regime)).collect()
}

/// Up to here the insulation of the standard atmosphere holds without correction, m (IEC 62271-1 4.1, from memory).
const NORMAL_ALTITUDE: f64 = 1000.0;

/// Whether the levels are stated for the air of a high site, so that they need not be a row of the table.
pub(super) fn corrected_for_altitude(case: &Case<'_>) -> bool {
    let high = case.site.quantity::<Length>(&site::ALTITUDE).is_some_and(|h| h.value.si() > NORMAL_ALTITUDE);
    let for_site = case.breaker.word(&breaker::INSULATION_STATED_FOR).is_some_and(|(word, _)| word == "site altitude");
    high || for_site
}

/// The insulation levels are one row of the table.
pub static INSULATION_SET: Rule = Rule {
    name: "insulation-set",
    title: "Power-frequency and lightning impulse level are one row of the table for the rated voltage.",
    kind: FindingKind::Caution,
    basis: "IEC 62271-1:2017 tables 1 to 4, IEEE C37.04 (from memory)",
    formula: "(Ud, Up) is a row for Ur",
    explanation: "The levels of a row belong together and are tested together. A pair taken from two rows, or from two families of \
                  standards, has no test behind it. Silent above 1000 m, where a corrected level need not be a row, and where the \
                  levels are stated for the site.",
    check: Check::Case(set),
};

fn set(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    let Levels { ud: Some(ud), up: Some(up), .. } = levels(case) else { return };
    let rows = rows(case, rated.value);
    let Some(lowest_up) = lowest(&rows, InsulationLevel::lightning) else { return };
    let Some(lowest_ud) = lowest(&rows, InsulationLevel::power_frequency) else { return };
    let is_row = rows.iter().any(|row| row.is_pair(ud.value, up.value));
    // A level below every row is a shortfall, of which another rule speaks.
    let below = up.value.si() < lowest_up.si() * (1.0 - 1e-6) || ud.value.si() < lowest_ud.si() * (1.0 - 1e-6);
    // A whole row of a higher rated voltage is an excess, of which another rule speaks where the altitude is known.
    let above = rows.iter().all(|row| up.value.si() > row.lightning().si() * (1.0 + 1e-6))
        && case.site.mentions(&site::ALTITUDE)
        && is_row_of_any(case, ud.value, up.value);
    if is_row || below || above || corrected_for_altitude(case) {
        return;
    }
    let pairs: Vec<String> = rows
        .iter()
        .map(|row| format!("{:.0}/{:.0}", row.power_frequency().si() / 1e3, row.lightning().si() / 1e3))
        .collect();
    let mut message = format!(
        "{}/{} kV is no row for {}: {} kV are",
        shown(ud.value),
        shown(up.value),
        rated.measure,
        pairs.join(", ")
    );
    if let (Some(of_ud), Some(of_up)) =
        (origin(ud.value, InsulationLevel::power_frequency), origin(up.value, InsulationLevel::lightning))
        && of_ud != of_up
    {
        message += &format!("; the first is a value of {of_ud}, the second of {of_up}");
    }
    let finding = findings.add(&INSULATION_SET, up.place(), message);
    finding.label("not of one row with the power-frequency level").stated(format!(
        "{}/{} kV",
        shown(ud.value),
        shown(up.value)
    ));
    finding.beside(ud.statement, "the power-frequency level");
    // The row that the stated impulse level belongs to, or the next above it.
    let next = rows
        .iter()
        .filter(|row| {
            row.lightning().si() >= up.value.si() * (1.0 - 1e-6)
                && row.power_frequency().si() >= ud.value.si() * (1.0 - 1e-6)
        })
        .min_by(|a, b| a.lightning().si().total_cmp(&b.lightning().si()));
    if let Some(row) = next {
        finding.needed(format!("{}/{} kV", shown(row.power_frequency()), shown(row.lightning())));
        if (row.lightning().si() - up.value.si()).abs() > 1.0 {
            finding.edit(format!("write {}", up.like(row.lightning())), up.place(), up.like(row.lightning()));
        }
        if (row.power_frequency().si() - ud.value.si()).abs() > 1.0 {
            finding.edit(
                format!("write {}", ud.like(row.power_frequency())),
                ud.place(),
                ud.like(row.power_frequency()),
            );
        }
    }
}

fn shown(voltage: ElectricPotential) -> String {
    crate::quantity::significant(voltage.si() / 1e3, 4)
}

/// Whether the pair is a row of some rated voltage, in the families cited.
pub(super) fn is_row_of_any(case: &Case<'_>, ud: ElectricPotential, up: ElectricPotential) -> bool {
    let families = case.regimes().families();
    insulation_levels().iter().any(|row| families.contains(&row.regime) && row.is_pair(ud, up))
}

/// Where in the tables a level is at home, by family and rated voltage.
fn origin(level: ElectricPotential, of: fn(&InsulationLevel) -> ElectricPotential) -> Option<String> {
    let row = insulation_levels().iter().find(|row| (of(row).si() - level.si()).abs() < 1.0)?;
    let family = match row.regime {
        crate::standards::Regime::Iec => "IEC",
        crate::standards::Regime::Ieee => "IEEE",
    };
    Some(format!("{family} at {}", row.rated_voltage().show()))
}

fn lowest(rows: &[&InsulationLevel], of: fn(&InsulationLevel) -> ElectricPotential) -> Option<ElectricPotential> {
    rows.iter().map(|row| of(row)).min_by(|a, b| a.si().total_cmp(&b.si()))
}

/// No insulation level is below the lowest row.
pub static INSULATION_BELOW_TABLE: Rule = Rule {
    name: "insulation-below-table",
    title: "No insulation level is below the lowest row of the table for the rated voltage.",
    kind: FindingKind::Shortfall,
    basis: "IEC 62271-1:2017 tables 1 to 4, IEEE C37.04 (from memory)",
    formula: "Ud, Up, Us >= lowest row for Ur",
    explanation: "No breaker of that rated voltage is tested with less. Compared with the rows of the families of standards cited; \
                  a rated voltage that no table has is not compared.",
    check: Check::Case(below_table),
};

fn below_table(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    let rows = rows(case, rated.value);
    let levels = levels(case);
    let switching = rows.iter().filter_map(|row| row.switching()).min_by(|a, b| a.si().total_cmp(&b.si()));
    for (name, stated, least) in [
        ("power-frequency level", levels.ud, lowest(&rows, InsulationLevel::power_frequency)),
        ("lightning impulse level", levels.up, lowest(&rows, InsulationLevel::lightning)),
        ("switching impulse level", levels.us, switching),
    ] {
        let (Some(stated), Some(least)) = (stated, least) else { continue };
        if stated.value.si() >= least.si() * (1.0 - 1e-6) {
            continue;
        }
        let text = stated.like(least);
        let message =
            format!("the {name} {} is below every row for {}: the lowest is {text}", stated.measure, rated.measure);
        findings
            .add(&INSULATION_BELOW_TABLE, stated.place(), message)
            .label("below every row")
            .stated(&stated.measure)
            .needed(Datum { text: text.clone(), si: Some(least.si()) })
            .beside(rated.statement, "the rated voltage")
            .advice("the levels of one row belong together: bring the other level along")
            .replace_by(text);
    }
}

/// From 300 kV the switching impulse level is stated, below it is no rating.
pub static SWITCHING_IMPULSE_LEVEL: Rule = Rule {
    name: "switching-impulse-level",
    title: "From 300 kV the switching impulse level is stated; below it is no rating.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-1:2017 5.3, tables 3 and 4 (from memory)",
    formula: "Ur >= 300 kV: Us stated",
    explanation: "From 300 kV up the switching impulse governs the insulation, and each row has its level. Below 300 kV a switching \
                  impulse level is no rating, which is remarked.",
    check: Check::Case(switching),
};

/// From here up the switching impulse level is a rating (IEC 62271-1, range II, from memory).
const RANGE_TWO: f64 = 300e3;

fn switching(case: &Case<'_>, findings: &mut Findings) {
    let Some(rated) = case.rated_voltage() else { return };
    let particular = &breaker::RATED_SWITCHING_IMPULSE_WITHSTAND_VOLTAGE;
    if rated.value.si() < RANGE_TWO {
        if let Some(us) = case.breaker.quantity::<ElectricPotential>(particular) {
            let message =
                format!("a switching impulse level is no rating at {}; it becomes one from 300 kV up", rated.measure);
            findings
                .add(&SWITCHING_IMPULSE_LEVEL, us.place(), message)
                .kind(FindingKind::Remark)
                .label("no rating at this voltage")
                .stated(&us.measure)
                .beside(rated.statement, "the rated voltage");
        }
        return;
    }
    if case.breaker.mentions(particular) {
        return;
    }
    let rows = rows(case, rated.value);
    let up = levels(case).up;
    let of_row =
        rows.iter().find(|row| up.as_ref().is_some_and(|up| (row.lightning().si() - up.value.si()).abs() < 1.0));
    let level = of_row.or(rows.first()).and_then(|row| row.switching());
    let message =
        format!("at {} the rated switching impulse withstand voltage is a rating, and it is not stated", rated.measure);
    let finding = findings.add(&SWITCHING_IMPULSE_LEVEL, rated.place(), message);
    finding.label("switching impulse level is missing");
    if let Some(level) = level {
        let text = level.show();
        finding.needed(Datum { text: text.clone(), si: Some(level.si()) });
        finding.edit(
            format!("state {text}, phase to earth"),
            case.sheet.end,
            format!("\n    {}: {text}", particular.label),
        );
    }
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    #[test]
    fn rated_voltage_against_the_system() {
        let finding = Bay::new().set("breaker", "rated voltage", "123 kV").one("rated-voltage-below-system");
        assert_eq!(finding.edits[0].text, "145 kV");
        assert_eq!(finding.related.len(), 1);
        Bay::new().silent("rated-voltage-below-system");
        Bay::new().set("breaker", "rated voltage", "170 kV").silent("rated-voltage-below-system");
    }

    #[test]
    fn without_a_highest_voltage_the_nominal_one_is_compared() {
        let bay = Bay::new().without("system", "highest voltage");
        bay.clone().set("breaker", "rated voltage", "123 kV").one("rated-voltage-below-system");
        bay.set("breaker", "rated voltage", "145 kV").silent("rated-voltage-below-system");
    }

    #[test]
    fn two_steps_are_an_excess_and_one_is_not() {
        let finding = Bay::new().set("breaker", "rated voltage", "245 kV").one("rated-voltage-excess");
        assert_eq!((finding.kind, finding.edits[0].text.as_str()), (FindingKind::Excess, "145 kV"));
        Bay::new().set("breaker", "rated voltage", "170 kV").silent("rated-voltage-excess");
        Bay::new()
            .set("breaker", "rated voltage", "245 kV")
            .set("breaker", "reason for rated voltage", "\"one spare for both\"")
            .silent("rated-voltage-excess");
    }

    #[test]
    fn a_nominal_voltage_is_no_rated_voltage() {
        let finding = Bay::new().set("breaker", "rated voltage", "132 kV").one("rated-voltage-not-preferred");
        assert!(finding.message.contains("nominal"), "{}", finding.message);
        assert_eq!(finding.edits[0].text, "145 kV");
        Bay::new().silent("rated-voltage-not-preferred");
        // A value of the other family of standards only.
        let ieee = Bay::new().set("breaker", "rated voltage", "48.3 kV");
        ieee.one("rated-voltage-not-preferred");
        ieee.set("tender", "standards", "IEEE C37.04:2018").silent("rated-voltage-not-preferred");
    }

    #[test]
    fn a_national_value_is_a_remark() {
        let bay = Bay::new().set("tender", "standards", "IEC 62271-100:2021, IS 13118").set(
            "breaker",
            "rated voltage",
            "150 kV",
        );
        assert_eq!(bay.one("rated-voltage-not-preferred").kind, FindingKind::Remark);
    }

    #[test]
    fn frequency_of_the_system() {
        let finding = Bay::new().set("breaker", "rated frequency", "60 Hz").one("frequency-mismatch");
        assert_eq!(finding.edits[0].text, "50 Hz");
        Bay::new().silent("frequency-mismatch");
        Bay::new().set("system", "frequency", "50 Hz +- 3 %").silent("frequency-mismatch");
    }

    const UD: &str = "rated short-duration power-frequency withstand voltage";
    const UP: &str = "rated lightning impulse withstand voltage";

    #[test]
    fn levels_of_one_row() {
        let finding = Bay::new().set("breaker", UP, "750 kV").one("insulation-set");
        assert!(finding.message.contains("275/650"), "{}", finding.message);
        Bay::new().silent("insulation-set");
        Bay::new().set("breaker", UD, "230 kV").set("breaker", UP, "550 kV").silent("insulation-set");
        // An IEEE pair, where only the IEC is cited, and where the IEEE is.
        let ieee = Bay::new().set("breaker", UD, "310 kV");
        ieee.one("insulation-set");
        ieee.set("tender", "standards", "IEEE C37.04:2018").silent("insulation-set");
    }

    #[test]
    fn a_corrected_level_need_not_be_a_row() {
        let bay = Bay::new().set("breaker", UP, "750 kV");
        bay.clone().set("site", "altitude", "1000 m").one("insulation-set");
        bay.clone().set("site", "altitude", "1001 m").silent("insulation-set");
        bay.set("breaker", "insulation stated for", "site altitude").silent("insulation-set");
    }

    #[test]
    fn a_level_below_every_row() {
        let finding = Bay::new().set("breaker", UP, "450 kV").one("insulation-below-table");
        assert_eq!(finding.edits[0].text, "550 kV");
        Bay::new().set("breaker", UP, "450 kV").silent("insulation-set");
        Bay::new().set("breaker", UP, "550 kV").silent("insulation-below-table");
        assert_eq!(Bay::new().set("breaker", UD, "229 kV").one("insulation-below-table").edits[0].text, "230 kV");
    }

    #[test]
    fn the_switching_impulse_level_is_a_rating_from_300_kv() {
        const US: &str = "rated switching impulse withstand voltage";
        let bay = |ur: &str, ud: &str, up: &str| {
            Bay::new()
                .set("system", "nominal voltage", "400 kV")
                .set("system", "highest voltage", ur)
                .set("breaker", "rated voltage", ur)
                .set("breaker", UD, ud)
                .set("breaker", UP, up)
        };
        let finding = bay("420 kV", "520 kV", "1425 kV").one("switching-impulse-level");
        assert_eq!(finding.kind, FindingKind::Omission);
        assert!(finding.edits[0].text.contains("1050 kV"), "{:?}", finding.edits);
        bay("420 kV", "520 kV", "1425 kV").set("breaker", US, "1050 kV").silent("switching-impulse-level");
        bay("300 kV", "380 kV", "950 kV").one("switching-impulse-level");
        Bay::new().silent("switching-impulse-level");
        assert_eq!(Bay::new().set("breaker", US, "750 kV").one("switching-impulse-level").kind, FindingKind::Remark);
        bay("420 kV", "520 kV", "1425 kV").set("breaker", US, "850 kV").one("insulation-below-table");
    }
}
