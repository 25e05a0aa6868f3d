//! What is missing of the site and of the tender.

use super::{Apparatus, Check, Policy, Rule, be, breakers_of, breakers_without, first_and_more, listed, mentions_any};
use crate::finding::{FindingKind, Findings};
use crate::particular::{Particular, SheetKind, breaker, circuit, site, tender};
use crate::quantity::{Physical, Ratio, significant};
use crate::sheet::{Facts, Set, Sheet};

/// The service conditions are stated.
pub static SITE_DATA_MISSING: Rule = Rule {
    name: "site-data-missing",
    title: "Lowest and highest ambient temperature, altitude and, outdoors, the pollution of the site are stated.",
    kind: FindingKind::Omission,
    basis: "IEC 62271-1:2017 4.1, 4.2 (from memory)",
    formula: "lowest ambient, highest ambient, altitude; outdoors pollution",
    explanation: "One finding a site lists what is missing and which checks are off. Pollution is not asked for indoors. Ice, wind and \
                  earthquake that are not stated are one remark that normal service conditions are assumed; write none where there \
                  is none. Silent on a site where no breaker stands, and where the link to a site is what is missing.",
    check: Check::Both(no_site, of_site),
};

/// A datum of the site, by what it may be stated, and the checks that need it.
struct Datum {
    name: &'static str,
    by: &'static [&'static Particular],
    checks: &'static str,
    outdoors_only: bool,
}

static NEEDED: &[Datum] = &[
    Datum {
        name: "lowest ambient",
        by: &[&site::LOWEST_AMBIENT, &site::AMBIENT],
        checks: "temperature class and gas in the cold",
        outdoors_only: false,
    },
    Datum {
        name: "highest ambient",
        by: &[&site::HIGHEST_AMBIENT, &site::AMBIENT],
        checks: "continuous current in the heat",
        outdoors_only: false,
    },
    Datum { name: "altitude", by: &[&site::ALTITUDE], checks: "insulation in thin air", outdoors_only: false },
    Datum { name: "pollution", by: &[&site::POLLUTION], checks: "creepage distance", outdoors_only: true },
];

/// What is assumed to be normal where it is not stated; a class of the breaker states it too.
static ASSUMED: &[Datum] = &[
    Datum { name: "ice", by: &[&site::ICE, &breaker::ICE_CLASS], checks: "", outdoors_only: true },
    Datum { name: "wind", by: &[&site::WIND, &breaker::DESIGN_WIND_SPEED], checks: "", outdoors_only: true },
    Datum {
        name: "seismic acceleration",
        by: &[&site::SEISMIC_ACCELERATION, &breaker::SEISMIC_QUALIFICATION],
        checks: "",
        outdoors_only: false,
    },
];

fn no_site(set: &Set, _: &Policy, findings: &mut Findings) {
    for breakers in breakers_without(set, "at", SheetKind::Site) {
        let Some(first) = breakers.first() else { continue };
        let message = format!(
            "no site is described for {}: the checks of temperature class, gas in the cold, continuous current in the heat, insulation \
             in thin air and creepage distance are off",
            first_and_more(&breakers)
        );
        let finding = findings.add(&SITE_DATA_MISSING, first.heading, message);
        finding.label("at no site").advice(
            "add a sheet site with installation, lowest ambient, highest ambient, altitude and, outdoors, pollution",
        );
        finding.breaker = Some(first.name.clone());
        finding.sheet = Some(first.id);
    }
}

fn of_site(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    if sheet.kind != SheetKind::Site {
        return;
    }
    let (facts, breakers) = (set.facts(sheet.id), &*breakers_of(set, "at", sheet.id));
    if breakers.is_empty() {
        return;
    }
    let indoors = is_indoors(facts, breakers);
    let stated = |datum: &Datum| {
        mentions_any(facts, datum.by) || breakers.iter().all(|apparatus| mentions_any(apparatus.facts, datum.by))
    };
    let missing = |data: &'static [Datum]| -> Vec<&'static Datum> {
        data.iter().filter(|datum| !(stated(datum) || indoors && datum.outdoors_only)).collect()
    };
    let needed = missing(NEEDED);
    if !needed.is_empty() {
        let names: Vec<&str> = needed.iter().map(|datum| datum.name).collect();
        let checks: Vec<&str> = needed.iter().map(|datum| datum.checks).collect();
        let message = format!(
            "{} does not state {}: the checks of {} are off",
            sheet.title(),
            listed(&names, "and"),
            listed(&checks, "and")
        );
        let finding = findings.add(&SITE_DATA_MISSING, sheet.heading, message);
        finding.label(format!("{} missing", listed(&names, "and"))).advice(format!(
            "add {} to {}",
            listed(&names, "and"),
            sheet.title()
        ));
    }
    let assumed = missing(ASSUMED);
    if !assumed.is_empty() {
        let names: Vec<&str> = assumed.iter().map(|datum| datum.name).collect();
        let message = format!(
            "{} of {} {} not stated: normal service conditions are assumed",
            listed(&names, "and"),
            sheet.title(),
            be(names.len())
        );
        findings
            .add(&SITE_DATA_MISSING, sheet.heading, message)
            .kind(FindingKind::Remark)
            .label("taken as normal")
            .advice("state the values, or none where there is none");
    }
}

/// By the site's own line, else by what every breaker there says of its class.
fn is_indoors(facts: &Facts, breakers: &[Apparatus<'_>]) -> bool {
    if facts.mentions(&site::INSTALLATION) {
        return facts.word(&site::INSTALLATION).is_some_and(|(word, _)| word == "indoor");
    }
    breakers.iter().all(|apparatus| {
        apparatus.facts.word(&breaker::TEMPERATURE_CLASS).is_some_and(|(class, _)| class.ends_with("indoor"))
    })
}

/// The tender says which document prevails, and which edition of a standard.
pub static PRECEDENCE_MISSING: Rule = Rule {
    name: "precedence-missing",
    title: "The tender states an order of precedence and the reference date of its standards.",
    kind: FindingKind::Remark,
    basis: "common practice, no source",
    formula: "order of precedence; reference date of standards",
    explanation: "Where schedule, text and drawings differ, somebody has to know which prevails; where a standard is revised between \
                  tender and test, which edition holds. Silent where there is no tender sheet. Write order of precedence: \
                  \"schedule\", \"text\", \"drawings\", and reference date of standards: a date, tender date, or latest edition.",
    check: Check::Sheet(precedence),
};

static PRECEDENCE: &[(&Particular, &str)] = &[
    (&tender::ORDER_OF_PRECEDENCE, "no order of precedence between schedule, text and drawings"),
    (&tender::REFERENCE_DATE_OF_STANDARDS, "no reference date of the standards"),
];

fn precedence(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    if sheet.kind != SheetKind::Tender {
        return;
    }
    let facts = set.facts(sheet.id);
    // Undated standards have a rule of their own, which asks for the date.
    let told = super::super::standards_cited::cites_undated(facts);
    let missing: Vec<_> = PRECEDENCE
        .iter()
        .filter(|(particular, _)| !facts.mentions(particular))
        .filter(|(particular, _)| !(told && particular.is(&tender::REFERENCE_DATE_OF_STANDARDS)))
        .collect();
    if missing.is_empty() {
        return;
    }
    let sentences: Vec<&str> = missing.iter().map(|(_, sentence)| *sentence).collect();
    let labels: Vec<&str> = missing.iter().map(|(particular, _)| particular.label).collect();
    let message = format!("the tender has {}", listed(&sentences, "and"));
    findings
        .add(&PRECEDENCE_MISSING, sheet.heading, message)
        .label(format!("{} missing", listed(&labels, "and")))
        .advice(format!("add {} to the tender", listed(&labels, "and")));
}

/// Numbers of breakers add up.
pub static QUANTITY_SUM: Rule = Rule {
    name: "quantity-sum",
    title: "The bays of a breaker are as many as its quantity, and the quantities add up to the tender's total.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "number of bays = quantity; sum of quantities = total quantity",
    explanation: "A bay that was added late is the usual cause. A breaker that names only its bays counts with their number. Silent \
                  where the tender states no total, or where a breaker states neither quantity nor bays and the sum could still \
                  come right; more breakers than bays are accepted where a spare is among them.",
    check: Check::Sheet(quantities),
};

fn quantities(set: &Set, sheet: &Sheet, _: &Policy, findings: &mut Findings) {
    match sheet.kind {
        SheetKind::Breaker => bays(set, sheet, findings),
        SheetKind::Tender => total(set, sheet, findings),
        _ => {}
    }
}

/// How many of a breaker there are: its quantity, else the number of its bays.
fn number_of(facts: &Facts) -> Option<f64> {
    let quantity = facts.quantity::<Ratio>(&breaker::QUANTITY).map(|stated| stated.value.si());
    if facts.mentions(&breaker::QUANTITY) {
        return quantity;
    }
    facts.list(&breaker::BAYS).map(|(items, _)| items.len() as f64)
}

fn bays(set: &Set, sheet: &Sheet, findings: &mut Findings) {
    let facts = set.facts(sheet.id);
    let (Some(quantity), Some((items, statement))) =
        (facts.quantity::<Ratio>(&breaker::QUANTITY), facts.list(&breaker::BAYS))
    else {
        return;
    };
    let listed = items.len() as f64;
    let mut circuits = set.pointing_at(sheet.id, "for").filter(|circuit| circuit.kind == SheetKind::Circuit);
    let is_spare =
        |circuit: &Sheet| set.facts(circuit.id).word(&circuit::KIND).is_some_and(|(kind, _)| kind == "spare");
    let spare = facts.mentions(&breaker::SPARE_FOR) || circuits.any(is_spare);
    if listed == quantity.value.si() || (spare && quantity.value.si() > listed) {
        return;
    }
    let count = significant(listed, 6);
    let number = significant(quantity.value.si(), 6);
    let verb = if items.len() == 1 { "bay lists" } else { "bays list" };
    let finding = findings.add(
        &QUANTITY_SUM,
        quantity.place(),
        format!("{count} {verb} {}, and its quantity is {number}", sheet.title()),
    );
    finding.label(format!("{count} by its bays")).stated(number.as_str()).needed(count.as_str());
    finding.beside(statement, "the bays").replace_by(count);
    finding.advice("or mend the list of bays; a spare among them is told by spare for, or by a circuit of kind spare");
    finding.breaker = Some(sheet.name.clone());
    finding.sheet = Some(sheet.id);
}

fn total(set: &Set, sheet: &Sheet, findings: &mut Findings) {
    let facts = set.facts(sheet.id);
    let Some(total) = facts.quantity::<Ratio>(&tender::TOTAL_QUANTITY) else { return };
    let mut sum = 0.0;
    let mut unknown = 0_usize;
    let mut working = Vec::new();
    let own =
        |breaker: &&Sheet| set.in_reach(breaker.file(), SheetKind::Tender).next().is_some_and(|t| t.id == sheet.id);
    for breaker in set.of_kind(SheetKind::Breaker).filter(own) {
        match number_of(set.facts(breaker.id)) {
            Some(number) => {
                sum += number;
                working.push(format!("{} {}", breaker.name, significant(number, 6)));
            }
            None => unknown += 1,
        }
    }
    let open = unknown > 0 && sum + (unknown as f64) <= total.value.si();
    if working.is_empty() || open || sum == total.value.si() && unknown == 0 {
        return;
    }
    let stated = significant(total.value.si(), 6);
    let text = significant(sum, 6);
    let mut message = format!("the quantities of the breakers add up to {text}, and the tender's total is {stated}");
    if unknown > 0 {
        let verb = if unknown == 1 { "states" } else { "state" };
        let also = format!(", though {unknown} more {verb} no quantity");
        message.push_str(&also);
    }
    let finding = findings.add(&QUANTITY_SUM, total.place(), message);
    finding.label(format!("{text} by the breakers")).stated(stated.as_str()).needed(text.as_str());
    finding.working(format!("{}: {text}", working.join(" + ")));
    finding.advice(
        "mend the total or the quantity that is wrong; every kind of breaker that is counted needs its own sheet",
    );
    if unknown == 0 {
        finding.replace_by(text);
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::rules::testing::Bay;

    const SECOND: &str = "breaker Other on Ring at Yard like LineBay\n    quantity: 1\n";

    fn bare() -> Bay {
        ["ice", "wind", "seismic acceleration"].into_iter().fold(Bay::new(), |bay, label| bay.without("site", label))
    }

    #[test]
    fn each_datum_of_the_site() {
        for (label, check) in [
            ("lowest ambient", "gas in the cold"),
            ("highest ambient", "continuous current in the heat"),
            ("altitude", "insulation in thin air"),
            ("pollution", "creepage distance"),
        ] {
            let found = Bay::new().without("site", label).and(SECOND).one("site-data-missing");
            assert_eq!(found.kind, FindingKind::Omission);
            assert!(found.message.contains(label) && found.message.contains(check), "{}", found.message);
        }
    }

    #[test]
    fn one_finding_lists_all_and_an_open_line_is_stated() {
        let bay = Bay::new().without("site", "altitude").without("site", "lowest ambient");
        let found = bay.clone().one("site-data-missing");
        assert!(found.message.contains("lowest ambient and altitude"), "{}", found.message);
        bay.set("site", "altitude", "later").set("site", "lowest ambient", "later").silent("site-data-missing");
    }

    #[test]
    fn a_range_states_both_temperatures() {
        let bay = Bay::new().without("site", "lowest ambient").without("site", "highest ambient");
        bay.set("site", "ambient", "-25 to 40 degC").silent("site-data-missing");
    }

    #[test]
    fn indoors_needs_no_pollution_ice_or_wind() {
        let bay = Bay::new().without("site", "pollution").without("site", "ice").without("site", "wind");
        bay.set("site", "installation", "indoor").silent("site-data-missing");
    }

    #[test]
    fn normal_conditions_are_one_remark() {
        let found = bare().and(SECOND).one("site-data-missing");
        assert_eq!(found.kind, FindingKind::Remark);
        assert!(found.message.contains("ice, wind and seismic acceleration"), "{}", found.message);
        bare()
            .set("site", "ice", "none")
            .set("site", "wind", "none")
            .set("site", "seismic acceleration", "none")
            .silent("site-data-missing");
        let by_breaker = bare().set("breaker", "ice class", "10 mm").set("breaker", "design wind speed", "34 m/s");
        by_breaker.set("breaker", "seismic qualification", "moderate").silent("site-data-missing");
    }

    #[test]
    fn no_site_is_told_once() {
        let bay = Bay::new().without_sheet("site").heading("breaker", "breaker LineBay on Ring");
        let found = bay.and("breaker Second on Ring like LineBay\n    quantity: 1\n").one("site-data-missing");
        assert!(found.message.contains("and 1 more"), "{}", found.message);
        Bay::new().and("site Idle\n    altitude: 10 m\n").silent("site-data-missing");
    }

    #[test]
    fn precedence_and_date_are_one_remark() {
        let bay = Bay::new().without("tender", "order of precedence");
        assert!(bay.one("precedence-missing").message.contains("order of precedence"));
        let both = bay.without("tender", "reference date of standards").one("precedence-missing");
        assert_eq!(both.kind, FindingKind::Remark);
        assert!(both.message.contains("and no reference date"), "{}", both.message);
        Bay::new().without_sheet("tender").silent("precedence-missing");
    }

    #[test]
    fn bays_and_quantity() {
        let found = Bay::new().set("breaker", "bays", "E01, E02, E03").one("quantity-sum");
        assert_eq!(found.kind, FindingKind::Caution);
        assert_eq!(found.edits.first().map(|edit| edit.text.as_str()), Some("3"));
        Bay::new().set("breaker", "bays", "E01, E02").silent("quantity-sum");
        let more = Bay::new().set("breaker", "bays", "E01");
        more.one("quantity-sum");
        more.and("circuit Reserve for LineBay\n    kind: spare\n").silent("quantity-sum");
    }

    #[test]
    fn quantities_and_total() {
        let bay = Bay::new().set("tender", "total quantity", "4");
        let found = bay.clone().and(SECOND).one("quantity-sum");
        assert!(found.message.contains("add up to 3"), "{}", found.message);
        bay.clone().set("tender", "total quantity", "3").and(SECOND).silent("quantity-sum");
        let unknown = "breaker Other on Ring at Yard\n    rated voltage: 145 kV\n";
        bay.clone().and(unknown).silent("quantity-sum");
        bay.set("tender", "total quantity", "2").and(unknown).one("quantity-sum");
    }
}
