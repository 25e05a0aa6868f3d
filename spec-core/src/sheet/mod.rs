//! Sheets: what the lines of a set of files say, with the place of every value.

mod build;
mod facts;
mod link;
mod read_quantity;
mod read_value;
mod reading;
mod watch;

pub(crate) use build::build;
pub use facts::{Facts, Stated};
pub use link::{LinkTarget, Scope};
pub use reading::{Class, Date, Item, Mixture, Pause, QuantityReading, Reading, Sequence, SequenceStep, Share};

pub(crate) use watch::{Seen, watch};

use std::collections::BTreeMap;
use std::sync::{Arc, OnceLock};

use firstpole_grammar::{Link, Name};

use crate::finding::Finding;
use crate::particular::{Found, Limit, Particular, SheetKind};
use crate::source::{Block, BlockId, FileId, Place};
use build::BlockReading;
use watch::Question;

/// A sheet of the set, by the number of its block.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash, PartialOrd, Ord)]
pub struct SheetId(pub(crate) u32);

/// A sheet: its heading and what stands under it.
#[derive(Clone, Debug)]
pub struct Sheet {
    /// Which one it is.
    pub id: SheetId,
    /// The file that it stands in.
    file: FileId,
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
    pub statements: Vec<Arc<Statement>>,
    /// The buyer's own labels, with their texts.
    pub own: Vec<OwnLine>,
    /// The end of the sheet's last line that says something: where a new particular is put.
    pub end: Place,
}

impl Sheet {
    /// The file that it stands in.
    pub const fn file(&self) -> FileId {
        self.file
    }

    /// The sheet that the link `word` points at.
    pub fn target(&self, word: &str) -> Option<SheetId> {
        link::sheet_of(&self.targets, word)
    }

    /// Whether the heading is the same, and stands at the same place.
    fn is_headed_like(&self, other: &Self) -> bool {
        (self.kind, self.file, &self.name, self.name_place, self.heading)
            == (other.kind, other.file, &other.name, other.name_place, other.heading)
            && self.links == other.links
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
    /// What was made of each block, by its number.
    slots: Vec<Option<Arc<Slot>>>,
    /// The sheets, file by file, in the order of the text.
    order: Vec<SheetId>,
    web: Arc<Web>,
    /// Counts up from one set to the next that takes over from it.
    age: u64,
}

/// How the files and sheets of a set hang together. It is the same as long as no heading and no `use` changes.
#[derive(Debug, Default)]
struct Web {
    /// Which file uses which, and where.
    uses: Vec<(FileId, FileId, Place)>,
    /// Which files each file can refer to, itself first.
    scope: Scope,
    index: Index,
    /// What is wrong with the links.
    findings: Vec<Arc<Finding>>,
}

/// What was made of a block.
#[derive(Clone, Debug)]
struct Slot {
    file: FileId,
    block: Arc<Block>,
    read: Arc<BlockReading>,
    /// The sheet with its resolved links; a block before the first heading has none.
    sheet: Option<Arc<Sheet>>,
    /// The age of the set in which the sheet or one of its links was last another.
    changed: u64,
    /// What the sheet states, made when it is first asked for.
    facts: OnceLock<Arc<Facts>>,
}

/// Where sheets are found without looking through all of them.
#[derive(Debug, Default)]
struct Index {
    by_kind: BTreeMap<SheetKind, Vec<SheetId>>,
    by_file: BTreeMap<(FileId, SheetKind), Vec<SheetId>>,
    pointing: BTreeMap<(SheetId, &'static str), Vec<SheetId>>,
}

impl Set {
    /// A sheet.
    pub fn sheet(&self, id: SheetId) -> Option<&Sheet> {
        watch::sheet(id);
        self.peek(id)
    }

    /// A sheet, without a note of it.
    fn peek(&self, id: SheetId) -> Option<&Sheet> {
        self.slot(id)?.sheet.as_deref()
    }

    fn slot(&self, id: SheetId) -> Option<&Slot> {
        self.slots.get(id.0 as usize).and_then(Option::as_deref)
    }

    fn slot_mut(&mut self, id: SheetId) -> Option<&mut Slot> {
        self.slots.get_mut(id.0 as usize).and_then(Option::as_mut).map(Arc::make_mut)
    }

    /// The sheet of a block.
    pub fn sheet_of(&self, block: BlockId) -> Option<&Sheet> {
        self.sheet(SheetId(block.0))
    }

    /// All sheets, file by file, in the order of the text.
    pub fn sheets(&self) -> impl DoubleEndedIterator<Item = &Sheet> {
        watch::question(Question::All);
        self.order.iter().filter_map(|id| self.sheet(*id))
    }

    /// What a sheet states, with what it takes over through `like`, as rules ask for it.
    pub fn facts(&self, id: SheetId) -> &Facts {
        static NONE: Facts = Facts::new(Vec::new());
        // Whoever asks depends on the whole chain, also where the answer is there already.
        self.chain(id).for_each(|sheet| watch::sheet(sheet.id));
        let slot = self.slot(id).filter(|slot| slot.sheet.is_some());
        slot.map_or(&NONE, |slot| slot.facts.get_or_init(|| Arc::new(Facts::new(self.resolved(id)))))
    }

    /// The sheets of one kind that `file` can refer to, in the order of the text, its own first.
    pub fn in_reach(&self, file: FileId, kind: SheetKind) -> impl Iterator<Item = &Sheet> {
        watch::question(Question::InReach(file, kind));
        let ids = self.web.scope.of(file).iter().filter_map(move |file| self.web.index.by_file.get(&(*file, kind)));
        ids.flatten().filter_map(|id| self.sheet(*id))
    }

    /// The sheets of one kind.
    pub fn of_kind(&self, kind: SheetKind) -> impl Iterator<Item = &Sheet> {
        watch::question(Question::OfKind(kind));
        self.web.index.by_kind.get(&kind).into_iter().flatten().filter_map(|id| self.sheet(*id))
    }

    /// The sheets whose link `word` points at `target`, in the order of the text.
    pub fn pointing_at(&self, target: SheetId, word: &'static str) -> impl Iterator<Item = &Sheet> {
        watch::question(Question::Pointing(target, word));
        self.web.index.pointing.get(&(target, word)).into_iter().flatten().filter_map(|id| self.sheet(*id))
    }

    /// How many numbers of blocks are in use.
    pub(crate) const fn numbers(&self) -> usize {
        self.slots.len()
    }

    /// The sheets that a question is answered with.
    fn answer(&self, question: &Question) -> Vec<SheetId> {
        match question {
            Question::All => self.order.clone(),
            Question::OfKind(kind) => self.web.index.by_kind.get(kind).cloned().unwrap_or_default(),
            Question::InReach(file, kind) => {
                let ids =
                    self.web.scope.of(*file).iter().filter_map(|file| self.web.index.by_file.get(&(*file, *kind)));
                ids.flatten().copied().collect()
            }
            Question::Pointing(target, word) => {
                self.web.index.pointing.get(&(*target, word)).cloned().unwrap_or_default()
            }
        }
    }

    /// Which sets came before this one, in a row in which each took over from the last.
    pub(crate) const fn age(&self) -> u64 {
        self.age
    }

    /// The sheets by kind and by file.
    fn indexed(&self) -> Index {
        let mut index = Index::default();
        for sheet in self.order.iter().filter_map(|id| self.peek(*id)) {
            index.by_kind.entry(sheet.kind).or_default().push(sheet.id);
            index.by_file.entry((sheet.file, sheet.kind)).or_default().push(sheet.id);
        }
        index
    }

    /// Takes the resolved links of a sheet in.
    fn take_targets(&mut self, id: SheetId, targets: Vec<(&'static str, LinkTarget)>) {
        if self.peek(id).is_none_or(|sheet| sheet.targets == targets) {
            return;
        }
        let age = self.age;
        if let Some(slot) = self.slot_mut(id)
            && let Some(sheet) = &mut slot.sheet
        {
            Arc::make_mut(sheet).targets = targets;
            slot.changed = age;
        }
    }

    /// Facts that were taken over from an earlier set hold as long as no sheet of their chain has changed. The slots of the others
    /// are no longer shared with that set.
    fn drop_stale_facts(&mut self) {
        let changed = |id: SheetId| self.slot(id).is_some_and(|slot| slot.changed == self.age);
        let is_stale = |id: &SheetId| self.chain(*id).any(|sheet| changed(sheet.id));
        let stale: Vec<SheetId> = self.order.iter().copied().filter(is_stale).collect();
        for id in stale {
            if let Some(slot) = self.slot_mut(id) {
                slot.facts.take();
            }
        }
    }

    /// A sheet and those that it takes over from through `like`, the nearest first.
    fn chain(&self, id: SheetId) -> impl Iterator<Item = &Sheet> {
        // Circles are cut when links are resolved.
        std::iter::successors(self.peek(id), |sheet| sheet.target("like").and_then(|id| self.peek(id)))
    }

    /// What a sheet states, with what it takes over through `like`: its own statements first, then those of the sheets that it
    /// is like, nearest first, for particulars that were not stated before.
    pub fn resolved(&self, id: SheetId) -> Vec<Arc<Statement>> {
        let mut all: Vec<Arc<Statement>> = Vec::new();
        for sheet in self.chain(id) {
            watch::sheet(sheet.id);
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
        }
        all
    }
}

/// Whether what somebody made of an earlier set still holds in one that took over from it.
#[derive(Debug)]
pub(crate) struct Comparison<'a> {
    now: &'a Set,
    before: &'a Set,
    /// Whether every question is answered as before.
    all_alike: bool,
    /// Whether questions are still answered as before, as far as somebody wanted to know.
    same: BTreeMap<Question, bool>,
}

impl<'a> Comparison<'a> {
    /// Of a set with the one that it took over from.
    pub fn new(now: &'a Set, before: &'a Set) -> Self {
        Self { now, before, all_alike: Arc::ptr_eq(&now.web, &before.web), same: BTreeMap::new() }
    }

    /// Whether all that was seen, when a set of this age was the newest, is still the same.
    pub fn holds(&mut self, seen: &Seen, age: u64) -> bool {
        let unchanged = |id: &SheetId| self.now.slot(*id).is_some_and(|slot| slot.changed <= age);
        seen.sheets.iter().all(unchanged)
            && (self.all_alike || seen.questions.iter().all(|question| self.is_answered_alike(question)))
    }

    fn is_answered_alike(&mut self, question: &Question) -> bool {
        if let Some(same) = self.same.get(question) {
            return *same;
        }
        let same = self.now.answer(question) == self.before.answer(question);
        self.same.insert(question.clone(), same);
        same
    }
}

/// The name of a heading, if it has one.
fn name_of(name: Option<&Name>) -> String {
    name.map(|n| n.text.clone()).unwrap_or_default()
}
