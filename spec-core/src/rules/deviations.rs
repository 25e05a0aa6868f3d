//! Deviations: findings that were accepted, by whom, why and until when.

use std::sync::Arc;

use super::{Check, Policy, Rule};
use crate::finding::{Acceptance, Finding, FindingKind, Findings};
use crate::particular::{SheetKind, deviation};
use crate::sheet::{Facts, LinkTarget, Reading, Set, Sheet};

/// The rules of this subject.
pub static ALL: &[&Rule] = &[&DEVIATION_INCOMPLETE, &DEVIATION_IDLE];

/// A deviation says why, by whom and until when.
pub static DEVIATION_INCOMPLETE: Rule = Rule {
    name: "deviation-incomplete",
    title: "A deviation says why the finding is accepted, by whom, and until when.",
    kind: FindingKind::Contradiction,
    basis: "common practice, no source",
    formula: "reason, approved and until, all three",
    explanation: "A deviation without reason, approval or date accepts nothing: nobody could later tell who took the risk, or for \
                  how long. The finding that it speaks of stays open and blocks as before.",
    check: Check::Elsewhere,
};

/// A deviation still matches a finding and has not expired.
pub static DEVIATION_IDLE: Rule = Rule {
    name: "deviation-idle",
    title: "A deviation still matches a finding, and its last day has not passed.",
    kind: FindingKind::Caution,
    basis: "common practice, no source",
    formula: "a finding of that rule in that sheet; until >= today",
    explanation: "A deviation that matches nothing is left over from an older text and would silently accept the next mistake of \
                  its kind: delete it. One that has expired no longer accepts: renew it or mend the finding.",
    check: Check::Elsewhere,
};

/// Marks the findings that deviations accept, and says which deviations accept nothing.
pub(crate) fn apply(set: &Set, policy: &Policy, findings: &mut Vec<Arc<Finding>>) {
    let mut own = Findings::new();
    accept(set, policy, findings, &mut own);
    findings.append(&mut own.shared());
}

fn accept(set: &Set, policy: &Policy, all: &mut [Arc<Finding>], findings: &mut Findings) {
    for sheet in set.of_kind(SheetKind::Deviation) {
        let facts = Facts::new(sheet.statements.clone());
        let missing = missing(&facts);
        if !missing.is_empty() {
            let message = format!("this deviation accepts nothing: {} is missing", missing.join(" and "));
            let finding = findings.add(&DEVIATION_INCOMPLETE, sheet.heading, message);
            finding.label("incomplete");
            let added = missing.join(":\n    ");
            finding.edit(format!("add {}", missing.join(" and ")), sheet.end, format!("\n    {added}:"));
            continue;
        }
        let Some(acceptance) = acceptance(&facts) else { continue };
        let Some(rule) = rule_of(sheet) else { continue };
        if let Some((until, statement)) = facts.date(&deviation::UNTIL)
            && policy.today.is_some_and(|today| until.is_before(today))
        {
            let message = format!("this deviation from {rule} expired on {until}; the finding counts again");
            findings
                .add(&DEVIATION_IDLE, statement.value, message)
                .label("expired")
                .stated(until.to_string().as_str())
                .advice("renew it with a new date and approval, or mend the finding");
            continue;
        }
        let mut matched = false;
        for finding in all.iter_mut().filter(|finding| finding.rule == rule && belongs(finding, sheet, set)) {
            Arc::make_mut(finding).accepted = Some(acceptance.clone());
            matched = true;
        }
        if !matched && known(sheet) {
            let message = format!("there is no finding of {rule} any more that this deviation could accept");
            findings
                .add(&DEVIATION_IDLE, sheet.heading, message)
                .label("accepts nothing")
                .advice("delete the deviation, so that it does not accept the next mistake of its kind");
        }
    }
}

fn missing(facts: &Facts) -> Vec<&'static str> {
    [&deviation::REASON, &deviation::APPROVED, &deviation::UNTIL]
        .into_iter()
        .filter(|particular| {
            facts.statement(particular).is_none_or(|statement| match &statement.reading {
                Reading::Open(_) => true,
                Reading::Text(text) => text.trim().is_empty(),
                _ => false,
            })
        })
        .map(|particular| particular.label)
        .collect()
}

fn acceptance(facts: &Facts) -> Option<Acceptance> {
    let (reason, _) = facts.text(&deviation::REASON)?;
    let (approved, _) = facts.text(&deviation::APPROVED)?;
    let (until, _) = facts.date(&deviation::UNTIL)?;
    Some(Acceptance { reason: reason.to_owned(), approved: approved.to_owned(), until: until.to_string() })
}

fn rule_of(sheet: &Sheet) -> Option<&'static str> {
    sheet.targets.iter().find_map(|(_, target)| match target {
        LinkTarget::Rule(rule) => Some(*rule),
        LinkTarget::Sheet(_) => None,
    })
}

/// Whether its links could be resolved; where not, a finding has told already.
fn known(sheet: &Sheet) -> bool {
    sheet.target("in").is_some()
}

fn belongs(finding: &Finding, deviation: &Sheet, set: &Set) -> bool {
    let Some(target) = deviation.target("in").and_then(|id| set.sheet(id)) else { return false };
    if target.kind == SheetKind::Breaker {
        return finding.sheet == Some(target.id);
    }
    finding.place.block() == target.heading.block()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::rules::testing::Bay;
    use crate::sheet::Date;

    const DEVIATION: &str = "deviation from rated-voltage-not-preferred in LineBay\n    reason: \"as the old bays\"\n    \
                             approved: \"Head of substations\"\n    until: 2028-12-31\n";

    fn bay() -> Bay {
        Bay::new().set("breaker", "rated voltage", "150 kV")
    }

    #[test]
    fn a_complete_deviation_accepts_its_finding() {
        let findings = bay().and(DEVIATION).findings();
        let accepted = findings.iter().find(|f| f.rule == "rated-voltage-not-preferred").expect("the finding");
        assert_eq!(accepted.accepted.as_ref().expect("accepted").until, "2028-12-31");
        assert!(!findings.iter().any(|f| f.rule == DEVIATION_IDLE.name));
    }

    #[test]
    fn each_of_the_three_is_needed() {
        for label in ["reason", "approved", "until"] {
            let lines: Vec<&str> = DEVIATION.lines().filter(|line| !line.contains(&format!("{label}:"))).collect();
            let text = lines.join("\n") + "\n";
            let findings = bay().and(&text).findings();
            let found = findings.iter().find(|f| f.rule == DEVIATION_INCOMPLETE.name).expect(label);
            assert!(found.message.contains(label), "{}", found.message);
            assert!(findings.iter().any(|f| f.rule == "rated-voltage-not-preferred" && f.accepted.is_none()));
        }
    }

    #[test]
    fn the_last_day_still_counts_and_the_next_does_not() {
        let on = |day: &str| {
            let policy = Policy { today: Date::read(day), ..Policy::default() };
            bay().and(DEVIATION).findings_with(policy)
        };
        assert!(!on("2028-12-31").iter().any(|f| f.rule == DEVIATION_IDLE.name));
        let expired = on("2029-01-01");
        assert!(expired.iter().any(|f| f.rule == DEVIATION_IDLE.name && f.message.contains("expired")));
        assert!(expired.iter().any(|f| f.rule == "rated-voltage-not-preferred" && f.accepted.is_none()));
    }

    #[test]
    fn one_that_matches_nothing_is_idle() {
        let findings = Bay::new().and(DEVIATION).findings();
        assert!(findings.iter().any(|f| f.rule == DEVIATION_IDLE.name), "{findings:?}");
    }
}
