//! The data of a finding.

use serde::Serialize;

use crate::quantity::{Measure, Physical};
use crate::rules::Rule;
use crate::sheet::{SheetId, Statement};
use crate::source::Place;

/// The kinds of findings, in the words of the trade, the gravest first.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord, Serialize)]
#[serde(rename_all = "lowercase")]
pub enum FindingKind {
    /// Two statements that cannot both hold, or a text that cannot be read.
    Contradiction,
    /// A rating below the duty, or below a limit of the law or a standard.
    Shortfall,
    /// Something that a bidder or a check needs is not stated.
    Omission,
    /// Allowed, but a reviewer should look.
    Caution,
    /// More than the duty asks for, at a cost.
    Excess,
    /// Worth a thought; nothing is wrong.
    Remark,
}

impl FindingKind {
    /// All of them, the gravest first.
    pub const ALL: [Self; 6] =
        [Self::Contradiction, Self::Shortfall, Self::Omission, Self::Caution, Self::Excess, Self::Remark];

    /// Its word.
    pub const fn word(self) -> &'static str {
        match self {
            Self::Contradiction => "contradiction",
            Self::Shortfall => "shortfall",
            Self::Omission => "omission",
            Self::Caution => "caution",
            Self::Excess => "excess",
            Self::Remark => "remark",
        }
    }

    /// So many of it, in words: `2 cautions`.
    pub fn counted(self, count: usize) -> String {
        let ending = match (count, self) {
            (1, _) => "",
            (_, Self::Excess) => "es",
            _ => "s",
        };
        format!("{count} {}{ending}", self.word())
    }

    /// Whether it blocks the gate where nothing else is said.
    pub const fn blocks(self) -> bool {
        matches!(self, Self::Contradiction | Self::Shortfall)
    }
}

/// A value in a finding: as it is shown, and as a number.
#[derive(Clone, Debug, PartialEq, Serialize)]
pub struct Datum {
    /// As it is shown, with its unit.
    pub text: String,
    /// The number in SI base units, where it is one.
    #[serde(skip_serializing_if = "Option::is_none")]
    pub si: Option<f64>,
}

impl From<&Measure> for Datum {
    fn from(measure: &Measure) -> Self {
        Self { text: measure.to_string(), si: measure.si }
    }
}

impl From<String> for Datum {
    fn from(text: String) -> Self {
        Self { text, si: None }
    }
}

impl From<&str> for Datum {
    fn from(text: &str) -> Self {
        Self { text: text.to_owned(), si: None }
    }
}

impl Datum {
    /// A typed quantity in the usual unit of the trade.
    pub fn of(quantity: impl Physical) -> Self {
        Self { text: quantity.show(), si: Some(quantity.si()) }
    }
}

/// Another statement that a finding rests on.
#[derive(Clone, Debug, PartialEq)]
pub struct Related {
    /// Where it stands.
    pub place: Place,
    /// What it has to do with it.
    pub message: String,
}

/// A change of the text that mends a finding.
#[derive(Clone, Debug, PartialEq)]
pub struct Edit {
    /// What it does.
    pub title: String,
    /// What it replaces; a place without width inserts.
    pub place: Place,
    /// The new text.
    pub text: String,
}

/// By whom, why and until when a finding was accepted.
#[derive(Clone, Debug, PartialEq, Eq, Serialize)]
pub struct Acceptance {
    /// Why.
    pub reason: String,
    /// By whom.
    pub approved: String,
    /// The last day on which it holds.
    pub until: String,
}

/// What is wrong, where, by what measure, and how it is mended.
#[derive(Clone, Debug, PartialEq)]
pub struct Finding {
    /// The name of the rule.
    pub rule: &'static str,
    /// Its kind; the rule's own unless the matter grades it.
    pub kind: FindingKind,
    /// The breaker that it concerns.
    pub breaker: Option<String>,
    /// The sheet of that breaker.
    pub sheet: Option<SheetId>,
    /// The very value that it is about.
    pub place: Place,
    /// Claim, value that it should have, arithmetic.
    pub message: String,
    /// A few words to stand under the value itself.
    pub label: String,
    /// The standard, clause, or practice.
    pub basis: String,
    /// What is stated.
    pub stated: Option<Datum>,
    /// What would be needed.
    pub needed: Option<Datum>,
    /// The arithmetic behind it, one line each.
    pub working: Vec<String>,
    /// The smallest edit in words, and what follows from it.
    pub advice: Option<String>,
    /// Other statements that it rests on.
    pub related: Vec<Related>,
    /// Changes that mend it.
    pub edits: Vec<Edit>,
    /// Set where a deviation accepts it.
    pub accepted: Option<Acceptance>,
}

impl Finding {
    /// A finding of `rule` at `place`.
    pub fn new(rule: &'static Rule, place: Place, message: impl Into<String>) -> Self {
        Self {
            rule: rule.name,
            kind: rule.kind,
            breaker: None,
            sheet: None,
            place,
            message: message.into(),
            label: String::new(),
            basis: rule.basis.to_owned(),
            stated: None,
            needed: None,
            working: Vec::new(),
            advice: None,
            related: Vec::new(),
            edits: Vec::new(),
            accepted: None,
        }
    }

    /// Another kind than the rule's own.
    pub fn kind(&mut self, kind: FindingKind) -> &mut Self {
        self.kind = kind;
        self
    }

    /// A few words to stand under the value itself.
    pub fn label(&mut self, label: impl Into<String>) -> &mut Self {
        self.label = label.into();
        self
    }

    /// What is stated.
    pub fn stated(&mut self, datum: impl Into<Datum>) -> &mut Self {
        self.stated = Some(datum.into());
        self
    }

    /// What would be needed.
    pub fn needed(&mut self, datum: impl Into<Datum>) -> &mut Self {
        self.needed = Some(datum.into());
        self
    }

    /// One line of arithmetic.
    pub fn working(&mut self, line: impl Into<String>) -> &mut Self {
        let line = line.into();
        if !line.is_empty() {
            self.working.push(line);
        }
        self
    }

    /// The smallest edit in words, and what follows from it.
    pub fn advice(&mut self, advice: impl Into<String>) -> &mut Self {
        self.advice = Some(advice.into());
        self
    }

    /// Another statement that it rests on.
    pub fn related(&mut self, place: Place, message: impl Into<String>) -> &mut Self {
        self.related.push(Related { place, message: message.into() });
        self
    }

    /// The value of another statement that it rests on.
    pub fn beside(&mut self, statement: &Statement, message: impl Into<String>) -> &mut Self {
        self.related(statement.value, message)
    }

    /// A change that mends it.
    pub fn edit(&mut self, title: impl Into<String>, place: Place, text: impl Into<String>) -> &mut Self {
        self.edits.push(Edit { title: title.into(), place, text: text.into() });
        self
    }

    /// The change that puts `text` in place of the value itself.
    pub fn replace_by(&mut self, text: impl Into<String>) -> &mut Self {
        let text = text.into();
        let place = self.place;
        self.edit(format!("write {text}"), place, text)
    }

    /// Whether it blocks the gate: its kind does, and nobody accepted it.
    pub fn blocks(&self, gate: &[FindingKind]) -> bool {
        self.accepted.is_none() && gate.contains(&self.kind)
    }
}
