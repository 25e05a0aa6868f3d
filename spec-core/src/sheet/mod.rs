//! Sheets: what the lines of a set of files say, with the place of every value.

mod build;
mod facts;
mod link;
mod read_quantity;
mod read_value;
mod reading;

pub use build::build;
pub use facts::{Facts, Stated};
pub use link::{LinkTarget, Scope};
pub use reading::{Class, Date, Item, Mixture, Pause, QuantityReading, Reading, Sequence, SequenceStep, Share};

use std::collections::BTreeMap;
use std::sync::OnceLock;

use firstpole_grammar::{Link, Name};

use crate::particular::{Found, Limit, Particular, SheetKind};
use crate::source::{FileId, Place};

/// A sheet of the set.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct SheetId(pub u32);

/// A sheet: its heading and what stands under it.
#[derive(Clone, Debug)]
pub struct Sheet {
    /// Which one it is.
    pub id: SheetId,
    /// What it describes.
    pub kind: SheetKind,
    /// Its name; for a tender its title, empty where it is missing.
    pub name: String,
    /// Where the name stands; the word of the kind where it is missing.
    pub name_place: Place,
    /// The heading, from the word of its kind to its last link.
    pub heading: Place,
    /// The links as they were written.
    pub links: Vec<(Link, Place)>,
    /// What the links point at, as far as they could be resolved, with the word of each.
    pub targets: Vec<(&'static str, LinkTarget)>,
    /// The particulars, in the order of the text.
    pub statements: Vec<Statement>,
    /// The buyer's own labels, with their texts.
    pub own: Vec<OwnLine>,
    /// The end of the sheet's last line that says something: where a new particular is put.
    pub end: Place,
}

impl Sheet {
    /// The file that it stands in.
    pub const fn file(&self) -> FileId {
        self.heading.file
    }

    /// The sheet that the link `word` points at.
    pub fn target(&self, word: &str) -> Option<SheetId> {
        self.targets.iter().find(|(w, _)| *w == word).and_then(|(_, target)| match target {
            LinkTarget::Sheet(id) => Some(*id),
            LinkTarget::Rule(_) => None,
        })
    }

    /// `breaker LineBay`: how messages call it.
    pub fn title(&self) -> String {
        if self.name.is_empty() { self.kind.word().to_owned() } else { format!("{} {}", self.kind.word(), self.name) }
    }
}

/// A label of the buyer's own.
#[derive(Clone, Debug)]
pub struct OwnLine {
    /// The label, without quotes.
    pub label: String,
    /// The value, as written.
    pub text: String,
    /// Where the value stands.
    pub place: Place,
}

/// One particular as it is stated.
#[derive(Clone, Debug)]
pub struct Statement {
    /// What is stated.
    pub particular: &'static Particular,
    /// Whether it is the reason for the particular, or its tested value.
    pub about: About,
    /// The bound that the label set.
    pub limit: Option<Limit>,
    /// Where the label stands.
    pub label: Place,
    /// The label as it was written.
    pub wording: String,
    /// Where the value stands.
    pub value: Place,
    /// What was read there.
    pub reading: Reading,
    /// The working of the value, where the checker chose it.
    pub chosen: Option<String>,
}

/// What a statement says about its particular.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum About {
    /// Its value.
    Value,
    /// Why it is wanted.
    Reason,
    /// What a report proves of it.
    Tested,
}

impl Statement {
    /// The quantity, if one was read.
    pub fn quantity(&self) -> Option<&QuantityReading> {
        match &self.reading {
            Reading::Quantity(quantity) => Some(quantity),
            _ => None,
        }
    }

    /// Whether it states the value of `particular`.
    pub fn states(&self, particular: &Particular) -> bool {
        self.about == About::Value && self.particular.is(particular)
    }

    const fn of(found: &Found) -> (&'static Particular, About, Option<Limit>) {
        match found {
            Found::Particular { particular, limit } => (particular, About::Value, *limit),
            Found::ReasonFor(particular) => (particular, About::Reason, None),
            Found::TypeTested(particular) => (particular, About::Tested, None),
        }
    }
}

/// The sheets of a set of files, resolved.
#[derive(Debug, Default)]
pub struct Set {
    /// The sheets, file by file, in the order of the text.
    pub sheets: Vec<Sheet>,
    /// Which files each file can refer to, itself first.
    pub scope: Scope,
    index: Index,
}

/// Where sheets are found without looking through all of them.
#[derive(Debug, Default)]
struct Index {
    by_kind: BTreeMap<SheetKind, Vec<SheetId>>,
    by_file: BTreeMap<(FileId, SheetKind), Vec<SheetId>>,
    pointing: BTreeMap<(SheetId, &'static str), Vec<SheetId>>,
    /// What each sheet states, made when it is first asked for.
    facts: Vec<OnceLock<Facts>>,
}

impl Set {
    /// A sheet.
    pub fn sheet(&self, id: SheetId) -> Option<&Sheet> {
        self.sheets.get(id.0 as usize)
    }

    /// What a sheet states, with what it takes over through `like`, as rules ask for it.
    pub fn facts(&self, id: SheetId) -> &Facts {
        static NONE: Facts = Facts::new(Vec::new());
        let slot = self.index.facts.get(id.0 as usize);
        slot.map_or(&NONE, |slot| slot.get_or_init(|| Facts::new(self.resolved(id))))
    }

    /// The sheets of one kind that `file` can refer to, in the order of the text, its own first.
    pub fn in_reach(&self, file: FileId, kind: SheetKind) -> impl Iterator<Item = &Sheet> {
        let ids = self.scope.of(file).iter().filter_map(move |file| self.index.by_file.get(&(*file, kind)));
        ids.flatten().filter_map(|id| self.sheet(*id))
    }

    /// The sheets of one kind.
    pub fn of_kind(&self, kind: SheetKind) -> impl Iterator<Item = &Sheet> {
        self.index.by_kind.get(&kind).into_iter().flatten().filter_map(|id| self.sheet(*id))
    }

    /// The sheets whose link `word` points at `target`, in the order of the text.
    pub fn pointing_at(&self, target: SheetId, word: &'static str) -> impl Iterator<Item = &Sheet> {
        self.index.pointing.get(&(target, word)).into_iter().flatten().filter_map(|id| self.sheet(*id))
    }

    /// Takes the sheets into the index, as far as their kinds and files go.
    fn index_sheets(&mut self) {
        for sheet in &self.sheets {
            self.index.by_kind.entry(sheet.kind).or_default().push(sheet.id);
            self.index.by_file.entry((sheet.file(), sheet.kind)).or_default().push(sheet.id);
        }
    }

    /// Takes the links into the index, once they are resolved.
    fn index_links(&mut self) {
        self.index.facts.resize_with(self.sheets.len(), OnceLock::new);
        for sheet in &self.sheets {
            for (word, target) in &sheet.targets {
                if let LinkTarget::Sheet(target) = target {
                    self.index.pointing.entry((*target, word)).or_default().push(sheet.id);
                }
            }
        }
    }

    /// What a sheet states, with what it takes over through `like`: its own statements first, then those of the sheets that it
    /// is like, nearest first, for particulars that were not stated before.
    pub fn resolved(&self, id: SheetId) -> Vec<Statement> {
        let mut all: Vec<Statement> = Vec::new();
        let mut next = Some(id);
        let mut seen = Vec::new();
        while let Some(sheet) = next.filter(|id| !seen.contains(id)).and_then(|id| self.sheet(id)) {
            seen.push(sheet.id);
            let above = all.len();
            for statement in &sheet.statements {
                let nearer = all.get(..above).unwrap_or(&[]);
                let replaced = nearer.iter().any(|s| {
                    s.particular.is(statement.particular) && s.about == statement.about && s.limit == statement.limit
                });
                if !replaced {
                    all.push(statement.clone());
                }
            }
            next = sheet.target("like");
        }
        all
    }
}

/// The name of a heading, if it has one.
fn name_of(name: Option<&Name>) -> String {
    name.map(|n| n.text.clone()).unwrap_or_default()
}
