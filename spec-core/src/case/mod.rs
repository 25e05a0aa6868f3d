//! A case: one breaker with its system, its site, its circuits and its tender, and the duty that follows from them. It is what
//! the rules look at.

mod choose;
mod regime;

pub(crate) use choose::needed_for;

pub use regime::Regimes;

use std::ops::Deref;

use crate::duty::{Duty, Infeeds};
use crate::finding::{Finding, FindingKind};
use crate::particular::{SheetKind, breaker, site, system, tender};
use crate::quantity::{ElectricPotential, Frequency};
use crate::rules::Policy;
use crate::sheet::{About, Date, Facts, Set, Sheet, Stated, Statement};

/// One breaker with all that belongs to it.
#[derive(Debug)]
pub struct Case<'a> {
    /// The sheets of the set.
    pub set: &'a Set,
    /// The thresholds of the buyer.
    pub policy: &'a Policy,
    /// The sheet of the breaker.
    pub sheet: &'a Sheet,
    /// The breaker, with what it takes over through `like`.
    pub breaker: Part<'a>,
    /// The system that it stands on; empty where there is none.
    pub system: Part<'a>,
    /// The site that it stands at; empty where there is none.
    pub site: Part<'a>,
    /// The tender that it belongs to; empty where there is none.
    pub tender: Part<'a>,
    /// What it switches.
    pub circuits: Vec<Part<'a>>,
    /// What feeds the system.
    pub infeeds: Infeeds,
    /// What it must meet.
    pub duty: Duty,
}

/// A sheet of a case with its facts; without a sheet it states nothing.
#[derive(Debug, Default)]
pub struct Part<'a> {
    /// The sheet.
    pub sheet: Option<&'a Sheet>,
    /// What it states.
    pub facts: Facts,
}

impl Deref for Part<'_> {
    type Target = Facts;

    fn deref(&self) -> &Facts {
        &self.facts
    }
}

impl<'a> Part<'a> {
    fn of(set: &'a Set, sheet: Option<&'a Sheet>) -> Self {
        Self { sheet, facts: sheet.map(|sheet| set.facts(sheet.id).clone()).unwrap_or_default() }
    }
}

impl<'a> Case<'a> {
    /// The case of a breaker. Times in cycles become seconds by its rated frequency, else the system's; what it leaves to the
    /// duty is chosen.
    pub fn new(set: &'a Set, sheet: &'a Sheet, policy: &'a Policy) -> Self {
        let linked = |word| Part::of(set, sheet.target(word).and_then(|id| set.sheet(id)));
        let circuits = set
            .pointing_at(sheet.id, "for")
            .filter(|other| other.kind == SheetKind::Circuit)
            .map(|circuit| Part::of(set, Some(circuit)))
            .collect();
        let tender = set.in_reach(sheet.file(), SheetKind::Tender).next();
        let mut case = Self {
            set,
            policy,
            sheet,
            breaker: Part::of(set, Some(sheet)),
            system: linked("on"),
            site: linked("at"),
            tender: Part::of(set, tender),
            circuits,
            infeeds: Infeeds::default(),
            duty: Duty::default(),
        };
        if let Some(frequency) = case.frequency() {
            case.breaker.facts.set_frequency(frequency);
            case.system.facts.set_frequency(frequency);
            for circuit in &mut case.circuits {
                circuit.facts.set_frequency(frequency);
            }
        }
        if let Some(system) = case.system.sheet {
            case.infeeds = Infeeds::of(set, system.id, case.frequency());
        }
        // What the system asks for is needed to choose ratings, and ratings are needed for the rest of the duty.
        case.duty = Duty::of(&case);
        if choose::fill(&mut case) {
            case.duty = Duty::of(&case);
        }
        case
    }

    /// The frequency: rated, else the system's.
    pub fn frequency(&self) -> Option<Frequency> {
        let rated = self.breaker.quantity::<Frequency>(&breaker::RATED_FREQUENCY);
        let rated = rated.or_else(|| self.system.quantity(&system::FREQUENCY));
        rated.map(|stated| stated.value)
    }

    /// The rated voltage.
    pub fn rated_voltage(&self) -> Option<Stated<'_, ElectricPotential>> {
        self.breaker.quantity(&breaker::RATED_VOLTAGE)
    }

    /// Which families of standards the text cites: the breaker's own line, else the tender's.
    pub fn regimes(&self) -> Regimes {
        let own = self.breaker.list(&breaker::STANDARDS);
        let list = own.or_else(|| self.tender.list(&tender::STANDARDS));
        Regimes::of(list.map_or(&[], |(items, _)| items))
    }

    /// When it is put into operation: the breaker's line, else the site's, else the tender's.
    pub fn commissioning(&self) -> Option<(Date, &Statement)> {
        self.breaker
            .date(&breaker::COMMISSIONING)
            .or_else(|| self.site.date(&site::COMMISSIONING))
            .or_else(|| self.tender.date(&tender::COMMISSIONING))
    }

    /// Whether one of the constructions admitted is `word`.
    pub fn is_built(&self, word: &str) -> bool {
        self.breaker.words(&breaker::CONSTRUCTION).is_some_and(|(words, _)| words.contains(&word))
    }

    /// Whether it is a generator circuit-breaker, which has a standard of its own.
    pub fn is_generator_breaker(&self) -> bool {
        self.is_built("generator circuit-breaker") || self.regimes().generator
    }

    /// Whether the author gave a reason for the value that an excess or a caution is about.
    pub fn has_reason(&self, finding: &Finding) -> bool {
        matches!(finding.kind, FindingKind::Excess | FindingKind::Caution)
            && self
                .breaker
                .statements()
                .iter()
                .any(|s| s.about == About::Value && s.value == finding.place && self.breaker.has_reason(s.particular))
    }

    /// The circuits of one of these kinds.
    pub fn circuits_of<'s>(&'s self, kinds: &'s [&str]) -> impl Iterator<Item = &'s Part<'a>> {
        self.circuits.iter().filter(|circuit| {
            circuit.word(&crate::particular::circuit::KIND).is_some_and(|(kind, _)| kinds.contains(&kind))
        })
    }
}
