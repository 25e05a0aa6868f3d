//! The door: texts in, findings and figures out.

use std::sync::Arc;

use firstpole_grammar::Span;

use crate::case::Case;
use crate::finding::{self, Finding, FindingKind, Findings};
use crate::particular::SheetKind;
use crate::rules::{self, Check, Policy, Rule};
use crate::sheet::{self, Comparison, Seen, Set, Sheet, watch};
use crate::source::{FilePlace, Loader, NoLoader, Place, Sources};

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
        self.run(sources.clone(), None)
    }

    /// Holds these texts, by their names, against the rules, and takes over from an earlier assessment what still holds: the outcome
    /// is the same, and the cost is that of what has changed.
    pub fn assess_again(&self, before: &Assessment, texts: impl IntoIterator<Item = (String, Arc<str>)>) -> Assessment {
        let mut sources = Sources::after(&before.sources);
        for (name, text) in texts {
            sources.add(name, text);
        }
        self.run(sources, Some(before))
    }

    fn run(&self, mut sources: Sources, before: Option<&Assessment>) -> Assessment {
        let mut found = Findings::new();
        let before = before.filter(|before| before.memory.knows(&self.rules));
        let names: Vec<&'static str> = self.rules.iter().map(|rule| rule.name).collect();
        let set =
            sheet::build(&mut sources, self.loader.as_ref(), &names, before.map(|before| &before.set), &mut found);
        sources.settle();
        for rule in &self.rules {
            if let Check::Set(check) | Check::Both(check, _) = rule.check {
                check(&set, &self.policy, &mut found);
            }
        }
        let mut findings = found.shared();
        let before = before.filter(|before| before.memory.policy == self.policy);
        let mut same = before.map(|before| (before, Comparison::new(&set, &before.set)));
        let mut cases = Vec::new();
        let mut judged = vec![None; set.numbers()];
        for sheet in set.sheets() {
            let kept = same.as_mut().and_then(|(before, same)| {
                let kept = before.memory.judged.get(sheet.id.0 as usize)?.as_ref()?;
                same.holds(&kept.seen, kept.age).then(|| kept.clone())
            });
            let kept = kept.unwrap_or_else(|| Arc::new(self.judge(&set, sheet)));
            findings.extend_from_slice(&kept.findings);
            cases.extend(kept.case.clone());
            if let Some(slot) = judged.get_mut(sheet.id.0 as usize) {
                *slot = Some(kept);
            }
        }
        rules::deviations::apply(&set, &self.policy, &mut findings);
        finding::sort(&mut findings, &sources);
        let memory = Memory { rules: self.rules.clone(), policy: self.policy.clone(), judged };
        Assessment { sources, set, findings, cases, memory }
    }

    /// Holds one sheet against the rules, and where it is a breaker, its case.
    fn judge(&self, set: &Set, sheet: &Sheet) -> Judged {
        let ((findings, case), seen) = watch(|| {
            // Whatever is said of it depends on it.
            set.sheet(sheet.id);
            let mut findings = Findings::new();
            for rule in &self.rules {
                if let Check::Sheet(check) | Check::Both(_, check) = rule.check {
                    check(set, sheet, &self.policy, &mut findings);
                }
            }
            let case = (sheet.kind == SheetKind::Breaker).then(|| self.judge_case(set, sheet, &mut findings));
            (findings.shared(), case)
        });
        Judged { findings, case, seen, age: set.age() }
    }

    fn judge_case(&self, set: &Set, sheet: &Sheet, findings: &mut Findings) -> Arc<CaseSummary> {
        let case = Case::new(set, sheet, &self.policy);
        let before = findings.len();
        for rule in &self.rules {
            if let Check::Case(check) = rule.check {
                check(&case, findings);
            }
        }
        for finding in findings.iter_mut().skip(before) {
            finding.breaker.get_or_insert_with(|| sheet.name.clone());
            finding.sheet.get_or_insert(sheet.id);
        }
        findings.retain_from(before, |finding| !case.has_reason(finding));
        Arc::new(CaseSummary { breaker: sheet.name.clone(), duty: case.duty.figures() })
    }
}

/// What came out.
#[derive(Debug)]
pub struct Assessment {
    /// The texts, with those that `use` brought in.
    pub sources: Sources,
    /// The sheets.
    pub set: Set,
    findings: Vec<Arc<Finding>>,
    cases: Vec<Arc<CaseSummary>>,
    memory: Memory,
}

/// What later assessments may take over.
#[derive(Debug)]
struct Memory {
    rules: Vec<&'static Rule>,
    policy: Policy,
    /// By the number of the sheet.
    judged: Vec<Option<Arc<Judged>>>,
}

/// What was found on a sheet, and what that rests on.
#[derive(Debug)]
struct Judged {
    findings: Vec<Arc<Finding>>,
    case: Option<Arc<CaseSummary>>,
    seen: Seen,
    /// The age of the set at that time.
    age: u64,
}

impl Memory {
    fn knows(&self, rules: &[&'static Rule]) -> bool {
        self.rules.len() == rules.len() && self.rules.iter().zip(rules).all(|(a, b)| std::ptr::eq(*a, *b))
    }
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
    pub fn findings(&self) -> &[Arc<Finding>] {
        &self.findings
    }

    /// The breakers with their duty, in the order of the text.
    pub fn cases(&self) -> &[Arc<CaseSummary>] {
        &self.cases
    }

    /// Puts a finding in that arose outside of the text, such as a file that cannot be read.
    pub fn add(&mut self, finding: Finding) {
        self.findings.push(Arc::new(finding));
        finding::sort(&mut self.findings, &self.sources);
    }

    /// Where a place lies.
    pub fn at(&self, place: Place) -> FilePlace {
        self.sources.at(place)
    }

    /// The bytes that a place takes in the text of its file.
    pub fn span(&self, place: Place) -> Span {
        self.sources.span(place)
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

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;
    use crate::source::{LoadFault, NoLoader};

    const FAMILY: &str = "cbspec 1\nfamily Big\n    rated voltage: 145 kV\n    DC time constant: 45 ms\n";
    const BAY: &str = "cbspec 1\n\nuse \"family.cbspec\"\n\ntender \"A\"\n    jurisdiction: EU\n\nsystem Ring\n    highest voltage: 145 kV\n    \
                       frequency: 50 Hz\n    short-circuit current: 28 kA\n    X/R: 21\n\nsite Yard\n    installation: outdoor\n    \
                       altitude: 900 m\n\nbreaker One on Ring at Yard like Big\n    Isc: 31.5 kA\n\nbreaker Two on Ring at Yard like One\n    \
                       opening time: 30 ms\n\ncircuit Other for One\n    kind: cable\n\ncircuit Line for Two\n    kind: overhead line\n    load current: 900 A\n\n\
                       deviation from rated-voltage-not-preferred in Two\n    reason: \"x\"\n";

    struct Families(String);

    impl Loader for Families {
        fn load(&self, _: &str, path: &str) -> Result<(String, Arc<str>), LoadFault> {
            if path == "family.cbspec" {
                Ok((path.to_owned(), self.0.as_str().into()))
            } else {
                NoLoader.load("", path)
            }
        }
    }

    /// All that can be seen of an assessment.
    fn told(assessment: &Assessment) -> String {
        let findings = assessment.findings().iter().map(|f| {
            let related: Vec<_> = f.related.iter().map(|r| (assessment.at(r.place), &r.message)).collect();
            let edits: Vec<_> = f.edits.iter().map(|e| (assessment.at(e.place), &e.text)).collect();
            format!("{:?} {} {:?} {} {related:?} {edits:?}\n", assessment.at(f.place), f.rule, f.breaker, f.message)
        });
        let figures = |case: &CaseSummary| {
            let figures: Vec<_> = case.duty.iter().map(|f| (f.key, f.working.clone())).collect();
            format!("{figures:?}")
        };
        let cases = assessment.cases().iter().map(|case| format!("{} {}\n", case.breaker, figures(case)));
        let sheets = assessment.set.sheets().map(|sheet| {
            let facts = assessment.set.facts(sheet.id);
            let stated = facts.statements().iter().map(|s| (assessment.at(s.value), s.particular.label));
            format!("{} {:?} {:?}\n", sheet.title(), assessment.at(sheet.heading), stated.collect::<Vec<_>>())
        });
        findings.chain(cases).chain(sheets).collect()
    }

    fn assessor(family: &str) -> Assessor {
        Assessor::standard().with_loader(Families(family.to_owned()))
    }

    #[test]
    fn what_did_not_change_is_kept() {
        let before = assessor(FAMILY).assess(&Sources::of("bay", BAY));
        let text = BAY.replace("load current: 900 A", "load current: 1 900 A");
        let after = assessor(FAMILY).assess_again(&before, [("bay".to_owned(), text.as_str().into())]);
        let kept = |name: &str| {
            let of = |a: &Assessment| a.cases().iter().find(|case| case.breaker == name).cloned().expect("a case");
            Arc::ptr_eq(&of(&before), &of(&after))
        };
        assert!(kept("One"));
        assert!(!kept("Two"), "its circuit has changed");
    }

    #[test]
    fn other_rules_or_thresholds_keep_nothing() {
        let before = assessor(FAMILY).assess(&Sources::of("bay", BAY));
        let policy = Policy { issued: true, ..Policy::default() };
        let again = assessor(FAMILY).with_policy(policy.clone());
        let after = again.assess_again(&before, [("bay".to_owned(), BAY.into())]);
        let fresh = assessor(FAMILY).with_policy(policy).assess(&Sources::of("bay", BAY));
        assert_eq!(told(&after), told(&fresh));
    }

    proptest! {
        #![proptest_config(ProptestConfig::with_cases(60))]
        #[test]
        fn edit_upon_edit_is_as_read_afresh(edits in prop::collection::vec(
            (any::<bool>(), 0_usize..1000, 0_usize..40, "(site Yard|\n|breaker Three on Ring|[0-9]|x|:|use |#|\nfamily Big\n|kA| like Two| at|){0,2}"),
            1..12,
        )) {
            let (mut bay, mut family) = (BAY.to_owned(), FAMILY.to_owned());
            let mut assessment = assessor(&family).assess(&Sources::of("bay", bay.as_str()));
            for (own, start, len, put) in edits {
                let text = if own { &mut bay } else { &mut family };
                let start = text.floor_char_boundary(start % (text.len() + 1));
                let end = text.floor_char_boundary((start + len).min(text.len())).max(start);
                text.replace_range(start..end, &put);
                let assessor = assessor(&family);
                assessment = assessor.assess_again(&assessment, [("bay".to_owned(), bay.as_str().into())]);
                let fresh = assessor.assess(&Sources::of("bay", bay.as_str()));
                prop_assert_eq!(told(&assessment), told(&fresh));
            }
        }
    }
}
