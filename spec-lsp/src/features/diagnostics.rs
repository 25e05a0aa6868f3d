//! Findings as an editor shows them.

use firstpole_core::{Finding, FindingKind};

/// How grave it is to an editor.
#[derive(Clone, Copy, Debug, PartialEq, Eq, PartialOrd, Ord)]
pub enum Severity {
    /// It blocks.
    Error,
    /// It should be looked at.
    Warning,
    /// It may be looked at.
    Information,
    /// Somebody has accepted it.
    Hint,
}

/// What is wrong, what to do about it, and on what basis.
pub fn message(finding: &Finding) -> String {
    let mut message = finding.message.clone();
    if let Some(acceptance) = &finding.accepted {
        let told = format!("\naccepted by {} until {}: {}", acceptance.approved, acceptance.until, acceptance.reason);
        message.push_str(&told);
    } else if let Some(advice) = &finding.advice {
        message.push('\n');
        message.push_str(advice);
    }
    if !finding.basis.is_empty() {
        message.push_str("\nbasis: ");
        message.push_str(&finding.basis);
    }
    message
}

/// Whether it is about text that does nothing.
pub fn is_idle(finding: &Finding) -> bool {
    matches!(finding.rule, "deviation-idle" | "override-idle")
}

/// How grave it is to an editor.
pub fn severity(finding: &Finding) -> Severity {
    if finding.accepted.is_some() {
        return Severity::Hint;
    }
    match finding.kind {
        FindingKind::Contradiction | FindingKind::Shortfall => Severity::Error,
        FindingKind::Omission | FindingKind::Caution => Severity::Warning,
        FindingKind::Excess | FindingKind::Remark => Severity::Information,
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    #[test]
    fn the_kind_gives_the_severity() {
        let assessment = assessed(&BAY.replace("145 kV", "150 kV"));
        assert!(!assessment.findings().is_empty());
        for finding in assessment.findings() {
            assert_eq!(severity(finding) == Severity::Error, finding.kind.blocks(), "{}", finding.rule);
            assert!(message(finding).contains("basis: "), "{}", finding.rule);
        }
    }

    #[test]
    fn what_was_accepted_is_a_hint() {
        let text = BAY.replace("145 kV", "150 kV")
            + "deviation from rated-voltage-not-preferred in LineBay\n    reason: \"as the old bays\"\n    approved: \"H\"\n    until: 2099-12-31\n";
        let assessment = assessed(&text);
        let accepted = assessment.findings().iter().find(|f| f.rule == "rated-voltage-not-preferred").expect("one");
        assert_eq!(severity(accepted), Severity::Hint);
        assert!(message(accepted).contains("accepted by H until 2099-12-31: as the old bays"));
    }
}
