//! Findings: what is wrong, where, by what measure, and how it is mended.

mod data;
#[cfg(feature = "miette")]
mod diagnostic;

pub use data::{Acceptance, Datum, Edit, Finding, FindingKind, Related};
#[cfg(feature = "miette")]
pub use diagnostic::{FindingDiagnostic, IndexedSource};

use std::sync::Arc;

use crate::rules::Rule;
use crate::source::{Place, Sources};

/// Collects the findings of one run.
#[derive(Debug, Default)]
pub struct Findings {
    all: Vec<Finding>,
    /// Those that were found before and still hold.
    kept: Vec<Arc<Finding>>,
}

impl Findings {
    /// None yet.
    pub fn new() -> Self {
        Self::default()
    }

    /// Adds a finding.
    pub fn push(&mut self, finding: Finding) {
        self.all.push(finding);
    }

    /// Adds findings that were made before.
    pub(crate) fn extend(&mut self, findings: &[Arc<Finding>]) {
        self.kept.extend_from_slice(findings);
    }

    /// Begins a finding of `rule` at `place`; the builder puts it in when it is dropped into [`Findings::push`].
    pub fn add(&mut self, rule: &'static Rule, place: Place, message: impl Into<String>) -> &mut Finding {
        self.all.push(Finding::new(rule, place, message));
        let last = self.all.len() - 1;
        // The vector holds at least the finding that was just put in.
        #[allow(clippy::indexing_slicing)]
        &mut self.all[last]
    }

    /// Those found so far.
    pub fn iter(&self) -> impl Iterator<Item = &Finding> {
        self.all.iter()
    }

    /// Those found so far, to be changed.
    pub fn iter_mut(&mut self) -> impl Iterator<Item = &mut Finding> {
        self.all.iter_mut()
    }

    /// Drops those from the `from`th on that `keep` does not want.
    pub fn retain_from(&mut self, from: usize, keep: impl FnMut(&Finding) -> bool) {
        let mut tail = self.all.split_off(from.min(self.all.len()));
        tail.retain(keep);
        self.all.append(&mut tail);
    }

    /// How many there are.
    pub fn len(&self) -> usize {
        self.all.len()
    }

    /// Whether there is none.
    pub fn is_empty(&self) -> bool {
        self.all.is_empty()
    }

    /// To be kept: each one once, in no order yet.
    pub(crate) fn shared(self) -> Vec<Arc<Finding>> {
        let mut shared = self.kept;
        shared.extend(self.all.into_iter().map(Arc::new));
        shared
    }
}

/// Puts findings in the order of the text: by file, start, rule, breaker, message; each one once.
pub(crate) fn sort(findings: &mut Vec<Arc<Finding>>, sources: &Sources) {
    findings.sort_by(|a, b| {
        let (first, second) = (sources.at(a.place), sources.at(b.place));
        (first, a.rule, &a.breaker, &a.message).cmp(&(second, b.rule, &b.breaker, &b.message))
    });
    findings.dedup();
}
