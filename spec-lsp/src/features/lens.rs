//! Above each breaker: how many findings of which kind it has.

use firstpole_core::particular::SheetKind;
use firstpole_core::{Assessment, FileId, FindingKind, Span};

use super::spot::sheets_of;

/// A line above a heading.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lens {
    /// The heading.
    pub span: Span,
    /// What it says.
    pub text: String,
}

/// The lines above the breakers of a file.
pub fn lenses(assessment: &Assessment, file: FileId) -> Vec<Lens> {
    let breakers = sheets_of(assessment, file).filter(|sheet| sheet.kind == SheetKind::Breaker);
    breakers
        .map(|sheet| {
            let own = assessment.findings().iter().filter(|finding| {
                finding.sheet.map_or_else(|| finding.place.block() == sheet.heading.block(), |id| id == sheet.id)
            });
            let mut counts = [0_usize; FindingKind::ALL.len()];
            let mut accepted = 0_usize;
            for finding in own {
                if finding.accepted.is_some() {
                    accepted += 1;
                } else if let Some(count) =
                    FindingKind::ALL.iter().position(|kind| *kind == finding.kind).and_then(|at| counts.get_mut(at))
                {
                    *count += 1;
                }
            }
            let mut parts: Vec<String> = FindingKind::ALL
                .iter()
                .zip(counts)
                .filter(|(_, count)| *count > 0)
                .map(|(kind, count)| kind.counted(count))
                .collect();
            if accepted > 0 {
                parts.push(format!("{accepted} accepted"));
            }
            let text = if parts.is_empty() { "nothing found".to_owned() } else { parts.join(", ") };
            Lens { span: assessment.span(sheet.heading), text }
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed};

    fn said(text: &str) -> Vec<String> {
        lenses(&assessed(text), FileId(0)).into_iter().map(|lens| lens.text).collect()
    }

    #[test]
    fn findings_are_counted_by_kind() {
        let [clean] = said(BAY).try_into().expect("one breaker");
        let [spoilt] = said(&BAY.replace("45 ms", "45 kV")).try_into().expect("one breaker");
        assert_ne!(clean, spoilt);
        assert!(spoilt.starts_with("1 contradiction, "), "{spoilt}");
        assert_eq!(said("cbspec 1\nsite Yard\n"), Vec::<String>::new());
    }
}
