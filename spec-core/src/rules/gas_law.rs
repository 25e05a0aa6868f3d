//! Rules on the law of fluorinated gases. No legal advice: the table has a date, and derogations need a lawyer.

use super::{Check, Rule, breaking_current};
use crate::case::Case;
use crate::finding::{FindingKind, Findings};
use crate::particular::{breaker, site, tender};
use crate::quantity::{ElectricCurrent, Physical};
use crate::sheet::{Date, Mixture, Reading, Statement};
use crate::standards::{CountsFrom, GasLaw, gas_law, is_fluorinated};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&FLUORINATED_GAS_DATE, &MEDIUM_AGAINST_LAW, &SERVICE_GAS];

/// Whose law holds: the site's line, else the tender's.
pub(crate) fn jurisdiction<'a>(case: &'a Case<'_>) -> Option<(&'static str, &'a Statement)> {
    case.site.word(&site::JURISDICTION).or_else(|| case.tender.word(&tender::JURISDICTION))
}

/// The gases that are admitted, each an alternative.
fn admitted<'a>(case: &'a Case<'_>) -> Option<(&'a [Mixture], &'a Statement)> {
    case.breaker.gases(&breaker::INSULATING_GAS)
}

/// The law that speaks of this breaker. Without a breaking current the smallest class is looked up.
fn law(case: &Case<'_>, jurisdiction: &str) -> Option<&'static GasLaw> {
    let current = breaking_current(case).map_or_else(|| ElectricCurrent::from_si(0.0), |isc| isc.value);
    gas_law(jurisdiction, case.rated_voltage()?.value, current)
}

/// The day that counts, and where it stands.
fn day<'a>(case: &'a Case<'_>, law: &GasLaw) -> Option<(Date, &'a Statement)> {
    match law.counts_from {
        CountsFrom::Commissioning => case.commissioning(),
        CountsFrom::Acquisition => case.tender.date(&tender::DATE_OF_ACQUISITION),
    }
}

/// A forbidden gas is not put into operation.
pub static FLUORINATED_GAS_DATE: Rule = Rule {
    name: "fluorinated-gas-date",
    title: "No gas is asked for that the law forbids on the day that counts.",
    kind: FindingKind::Shortfall,
    basis: "Regulation (EU) 2024/573 Art. 13(9) as a network operator quotes it; 17 CCR 95352 (public extraction)",
    formula: "day of putting into operation (EU) or of acquisition (California) < date of the class by kV and kA",
    explanation: "Fires where every gas admitted is forbidden on that day. A stated derogation makes it a caution that names the \
                  evidence; a missing day is an omission. A month counts as forbidden where its last day is. Silent for vacuum \
                  without gas, for gases that are left free, and for other jurisdictions. No legal advice; the finding gives the \
                  date of the table.",
    check: Check::Case(date),
};

fn date(case: &Case<'_>, findings: &mut Findings) {
    let (Some((jurisdiction, said)), Some((gases, statement))) = (jurisdiction(case), admitted(case)) else { return };
    let Some(law) = law(case, jurisdiction) else { return };
    let forbidden = |mixture: &Mixture| mixture.portions.iter().find(|portion| law.forbids(portion.gas)).map(|p| p.gas);
    let Some(gas) = gases.first().and_then(forbidden).filter(|_| gases.iter().all(|g| forbidden(g).is_some())) else {
        return;
    };
    let Some(from) = law.date() else { return };
    let what = match law.counts_from {
        CountsFrom::Commissioning => "put into operation",
        CountsFrom::Acquisition => "acquired",
    };
    let table = format!("{}; table of {}, no legal advice", law.clause, law.as_of);
    let Some((day, when)) = day(case, law) else {
        let message =
            format!("{gas} may not be {what} from {from} on at this voltage and current, and the day is not stated");
        let label = match law.counts_from {
            CountsFrom::Commissioning => tender::COMMISSIONING.label,
            CountsFrom::Acquisition => tender::DATE_OF_ACQUISITION.label,
        };
        findings
            .add(&FLUORINATED_GAS_DATE, statement.value, message)
            .kind(FindingKind::Omission)
            .label("forbidden from a day on")
            .working(table)
            .beside(said, "whose law holds")
            .advice(format!("state {label} in the tender"));
        return;
    };
    if day.is_before(from) {
        return;
    }
    let derogation = case.breaker.text(&breaker::GAS_DEROGATION);
    let message = format!("{gas} may not be {what} from {from} on at this voltage and current, and {day} is stated");
    let finding = findings.add(&FLUORINATED_GAS_DATE, statement.value, message);
    finding.label("forbidden on that day").stated(gas).working(table);
    finding.beside(when, "the day that counts").beside(said, "whose law holds");
    match derogation {
        Some((_, derogation)) => {
            finding.kind(FindingKind::Caution).beside(derogation, "the derogation");
            finding.advice(
                "keep the evidence with the tender: that too few bids without the gas came in, or the order's date, and the \
                 notification that the law asks for",
            );
        }
        None => {
            finding.advice("admit a medium without fluorinated gas, or state the gas derogation and its file");
        }
    }
}

/// The gases admitted are not all excluded.
pub static MEDIUM_AGAINST_LAW: Rule = Rule {
    name: "medium-against-law",
    title: "The gases that are admitted are not all excluded.",
    kind: FindingKind::Contradiction,
    basis: "Regulation (EU) 2024/573 (from memory); arithmetic of the text itself",
    formula: "insulating gas minus excluded gases is not empty",
    explanation: "A text that admits SF6 alone and excludes fluorinated gases leaves nothing to offer. Whether the law forbids the \
                  gas on the day is fluorinated-gas-date.",
    check: Check::Case(against),
};

fn against(case: &Case<'_>, findings: &mut Findings) {
    let (Some((gases, statement)), Some(excluded)) = (admitted(case), case.breaker.statement(&breaker::EXCLUDED_GASES))
    else {
        return;
    };
    let is_excluded = |gas: &str| match &excluded.reading {
        Reading::Words(words) => words.contains(&"fluorinated gases") && is_fluorinated(gas),
        Reading::Gas(list) => list.iter().any(|mixture| mixture.pure() == Some(gas)),
        _ => false,
    };
    let all = gases.iter().all(|mixture| mixture.portions.iter().any(|portion| is_excluded(portion.gas)));
    if gases.is_empty() || !all {
        return;
    }
    findings
        .add(&MEDIUM_AGAINST_LAW, statement.value, "every gas that is admitted here is excluded by another line")
        .label("excluded")
        .beside(excluded, "the excluded gases")
        .advice("open the medium, or drop the exclusion");
}

/// SF6 for service is restricted.
pub static SERVICE_GAS: Rule = Rule {
    name: "service-gas",
    title: "In the EU new SF6 for service is restricted from 2035.",
    kind: FindingKind::Remark,
    basis: "Regulation (EU) 2024/573 (from memory, paragraph not checked)",
    formula: "jurisdiction EU, SF6 admitted",
    explanation: "A breaker bought with SF6 lives beyond 2035, when virgin gas for refilling is restricted. A note for the costs of \
                  its life; silent where another gas is admitted beside SF6.",
    check: Check::Case(service),
};

fn service(case: &Case<'_>, findings: &mut Findings) {
    let (Some(("EU", _)), Some((gases, statement))) = (jurisdiction(case), admitted(case)) else { return };
    let only_sf6 = !gases.is_empty() && gases.iter().all(|mixture| mixture.portions.iter().any(|p| p.gas == "SF6"));
    // Where it may not even be put into operation, that says more.
    let forbidden = law(case, "EU")
        .and_then(|law| Some((law.date()?, day(case, law)?.0)))
        .is_some_and(|(from, day)| !day.is_before(from));
    if !only_sf6 || forbidden {
        return;
    }
    findings
        .add(
            &SERVICE_GAS,
            statement.value,
            "virgin SF6 for service is restricted in the EU from 2035 on, within the life of this breaker",
        )
        .label("gas for service")
        .advice("ask for the supply of reclaimed gas over the service life");
}

#[cfg(test)]
mod tests {
    use crate::finding::FindingKind;
    use crate::rules::testing::Bay;

    fn eu(commissioning: &str) -> Bay {
        Bay::new().set("tender", "jurisdiction", "EU").set("tender", "commissioning", commissioning)
    }

    #[test]
    fn a_gas_that_is_forbidden_on_the_day() {
        let finding = eu("2029-09").one("fluorinated-gas-date");
        assert_eq!(finding.kind, FindingKind::Shortfall);
        assert!(
            finding.message.contains("2028-01-01") && finding.working[0].contains("no legal advice"),
            "{finding:#?}"
        );
        eu("2027-12-31").silent("fluorinated-gas-date");
        eu("2028-01-01").one("fluorinated-gas-date");
        Bay::new().silent("fluorinated-gas-date");
        // Above 50 kA the later date holds.
        eu("2029-09").set("breaker", "rated short-circuit breaking current", "63 kA").silent("fluorinated-gas-date");
    }

    #[test]
    fn an_alternative_without_fluorine_is_enough() {
        eu("2029-09").set("breaker", "insulating gas", "SF6 or dry air").silent("fluorinated-gas-date");
        eu("2029-09").set("breaker", "insulating gas", "C4F7N 6 % + CO2 94 %").one("fluorinated-gas-date");
        eu("2029-09").set("breaker", "insulating gas", "CF3I 30 % + CO2 70 %").silent("fluorinated-gas-date");
        for none in ["none", "free", "CO2 70 % + O2 30 %"] {
            eu("2029-09").set("breaker", "insulating gas", none).silent("fluorinated-gas-date");
        }
    }

    #[test]
    fn a_missing_day_and_a_derogation() {
        let undated = Bay::new().set("tender", "jurisdiction", "EU").one("fluorinated-gas-date");
        assert_eq!(undated.kind, FindingKind::Omission);
        let derogation =
            eu("2029-09").set("breaker", "gas derogation", "\"file 7: one bid only\"").one("fluorinated-gas-date");
        assert_eq!(derogation.kind, FindingKind::Caution);
        let site = eu("2029-09").set("site", "jurisdiction", "other");
        site.silent("fluorinated-gas-date");
    }

    #[test]
    fn california_counts_from_the_acquisition() {
        let bay = Bay::new().set("tender", "jurisdiction", "California").set("tender", "commissioning", "2024-06");
        assert_eq!(bay.one("fluorinated-gas-date").kind, FindingKind::Omission);
        bay.clone().set("tender", "date of acquisition", "2024-12-31").silent("fluorinated-gas-date");
        bay.clone().set("tender", "date of acquisition", "2025-01-01").one("fluorinated-gas-date");
        bay.set("tender", "date of acquisition", "2026-01")
            .set("breaker", "insulating gas", "C4F7N 6 % + CO2 94 %")
            .silent("fluorinated-gas-date");
    }

    #[test]
    fn what_is_admitted_is_not_all_excluded() {
        let bay = |excluded: &str| Bay::new().set("breaker", "excluded gases", excluded);
        bay("fluorinated gases").one("medium-against-law");
        bay("SF6, CF4").one("medium-against-law");
        bay("CF4").silent("medium-against-law");
        bay("SF6").set("breaker", "insulating gas", "SF6 or dry air").silent("medium-against-law");
        Bay::new().silent("medium-against-law");
    }

    #[test]
    fn gas_for_service() {
        eu("2027-06").one("service-gas");
        eu("2027-06").set("breaker", "insulating gas", "SF6 or dry air").silent("service-gas");
        eu("2029-09").silent("service-gas");
        Bay::new().silent("service-gas");
    }
}
