//! Findings as an editor shows them.

use firstpole_core::finding::Related;
use firstpole_core::{Assessment, Edit, FileId, Finding, FindingKind, Place};

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

/// A finding as an editor shows it.
#[derive(Clone, Debug)]
pub struct Diagnostic<'a> {
    /// Where.
    pub place: Place,
    /// How grave.
    pub severity: Severity,
    /// The name of its rule.
    pub rule: &'static str,
    /// What is wrong, and what to do about it.
    pub message: String,
    /// What it rests on.
    pub related: &'a [Related],
    /// What mends it.
    pub edits: &'a [Edit],
    /// Whether the text there does nothing.
    pub idle: bool,
}

/// The findings in one file, in the order of the text.
pub fn diagnostics(assessment: &Assessment, file: FileId) -> Vec<Diagnostic<'_>> {
    assessment.findings().iter().filter(|f| assessment.at(f.place).file == file).map(|f| diagnostic(f)).collect()
}

fn diagnostic(finding: &Finding) -> Diagnostic<'_> {
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
    Diagnostic {
        place: finding.place,
        severity: severity(finding),
        rule: finding.rule,
        message,
        related: &finding.related,
        edits: &finding.edits,
        idle: finding.rule == "deviation-idle",
    }
}

fn severity(finding: &Finding) -> Severity {
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
        for diagnostic in diagnostics(&assessment, FileId(0)) {
            let finding = assessment.findings().iter().find(|f| f.rule == diagnostic.rule).expect("its finding");
            assert_eq!(diagnostic.severity == Severity::Error, finding.kind.blocks(), "{}", diagnostic.rule);
            assert!(diagnostic.message.contains("basis: "), "{}", diagnostic.message);
        }
    }

    #[test]
    fn what_was_accepted_is_a_hint() {
        let text = BAY.replace("145 kV", "150 kV")
            + "deviation from rated-voltage-not-preferred in LineBay\n    reason: \"as the old bays\"\n    approved: \"H\"\n    until: 2099-12-31\n";
        let assessment = assessed(&text);
        let all = diagnostics(&assessment, FileId(0));
        let accepted = all.iter().find(|d| d.rule == "rated-voltage-not-preferred").expect("the finding");
        assert_eq!(accepted.severity, Severity::Hint);
        assert!(accepted.message.contains("accepted by H until 2099-12-31: as the old bays"));
    }
}
