//! The door: texts in, findings and figures out.

use std::sync::Arc;

use crate::case::Case;
use crate::finding::{Finding, FindingKind, Findings};
use crate::particular::SheetKind;
use crate::rules::{self, Check, Policy, Rule};
use crate::sheet::{self, Set};
use crate::source::{Loader, NoLoader, Sources};

/// Holds texts against the rules.
///
/// ```
/// use firstpole_core::{Assessor, Sources};
///
/// let sources = Sources::of("bay.cbspec", "cbspec 1\nbreaker Bay\n    rated voltage: 110 kV\n");
/// let assessment = Assessor::standard().assess(&sources);
/// assert!(assessment.findings().iter().any(|finding| finding.rule == "rated-voltage-not-preferred"));
/// ```
#[derive(Clone)]
pub struct Assessor {
    rules: Vec<&'static Rule>,
    policy: Policy,
    loader: Arc<dyn Loader + Send + Sync>,
}

impl std::fmt::Debug for Assessor {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        f.debug_struct("Assessor")
            .field("rules", &self.rules.len())
            .field("policy", &self.policy)
            .finish_non_exhaustive()
    }
}

impl Default for Assessor {
    fn default() -> Self {
        Self::standard()
    }
}

impl Assessor {
    /// With all built-in rules and the default policy.
    pub fn standard() -> Self {
        Self { rules: rules::standard(), policy: Policy::default(), loader: Arc::new(NoLoader) }
    }

    /// With a rule of the embedder's own.
    #[must_use]
    pub fn with_rule(mut self, rule: &'static Rule) -> Self {
        self.rules.push(rule);
        self
    }

    /// With other thresholds.
    #[must_use]
    pub fn with_policy(mut self, policy: Policy) -> Self {
        self.policy = policy;
        self
    }

    /// With a loader that answers `use`.
    #[must_use]
    pub fn with_loader(mut self, loader: impl Loader + Send + Sync + 'static) -> Self {
        self.loader = Arc::new(loader);
        self
    }

    /// The rules that it holds texts against.
    pub fn rules(&self) -> &[&'static Rule] {
        &self.rules
    }

    /// Holds the texts against the rules. Never stops at the first trouble: what could be read is checked.
    pub fn assess(&self, sources: &Sources) -> Assessment {
        let mut sources = sources.clone();
        let mut findings = Findings::new();
        let names: Vec<&'static str> = self.rules.iter().map(|rule| rule.name).collect();
        let set = sheet::build(&mut sources, self.loader.as_ref(), &names, &mut findings);
        for rule in &self.rules {
            if let Check::Set(check) = rule.check {
                check(&set, &self.policy, &mut findings);
            }
        }
        let mut cases = Vec::new();
        for sheet in set.of_kind(SheetKind::Breaker) {
            let case = Case::new(&set, sheet, &self.policy);
            let before = findings.len();
            for rule in &self.rules {
                if let Check::Case(check) = rule.check {
                    check(&case, &mut findings);
                }
            }
            for finding in findings.iter_mut().skip(before) {
                finding.breaker.get_or_insert_with(|| sheet.name.clone());
                finding.sheet.get_or_insert(sheet.id);
            }
            findings.retain_from(before, |finding| !case.has_reason(finding));
            cases.push(CaseSummary { breaker: sheet.name.clone(), duty: case.duty.figures() });
        }
        rules::deviations::apply(&set, &self.policy, &mut findings);
        Assessment { sources, findings: findings.sorted(), cases, set }
    }
}

/// What came out.
#[derive(Debug)]
pub struct Assessment {
    /// The texts, with those that `use` brought in.
    pub sources: Sources,
    /// The sheets.
    pub set: Set,
    findings: Vec<Finding>,
    cases: Vec<CaseSummary>,
}

/// The duty of one breaker, as figures.
#[derive(Clone, Debug, PartialEq)]
pub struct CaseSummary {
    /// The breaker.
    pub breaker: String,
    /// Its figures by their names.
    pub duty: Vec<crate::duty::NamedFigure>,
}

impl Assessment {
    /// The findings, in the order of the text.
    pub fn findings(&self) -> &[Finding] {
        &self.findings
    }

    /// The breakers with their duty, in the order of the text.
    pub fn cases(&self) -> &[CaseSummary] {
        &self.cases
    }

    /// Puts a finding in that arose outside of the text, such as a file that cannot be read.
    pub fn add(&mut self, finding: Finding) {
        self.findings.push(finding);
        self.findings.sort_by(|a, b| (a.place, a.rule).cmp(&(b.place, b.rule)));
    }

    /// How many findings of a kind are open, that is, not accepted.
    pub fn count(&self, kind: FindingKind) -> usize {
        self.findings.iter().filter(|finding| finding.kind == kind && finding.accepted.is_none()).count()
    }

    /// How many findings are accepted.
    pub fn accepted(&self) -> usize {
        self.findings.iter().filter(|finding| finding.accepted.is_some()).count()
    }

    /// Whether a finding blocks a gate that blocks on these kinds.
    pub fn blocks(&self, gate: &[FindingKind]) -> bool {
        self.findings.iter().any(|finding| finding.blocks(gate))
    }
}
