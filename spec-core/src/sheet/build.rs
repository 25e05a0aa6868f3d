//! From lines to sheets.

use firstpole_grammar::{
    Heading, Line, LineKind, Look, Name, Particular as WrittenParticular, Span, ValueForm, ValueText,
};

use std::sync::{Arc, OnceLock};

use super::read_value::Reader;
use super::{OwnLine, Reading, Set, Sheet, SheetId, Slot, Statement, link, name_of};
use crate::finding::{Finding, Findings};
use crate::particular::{self, Lookup, SheetKind, breaker};
use crate::rules::reading as rules;
use crate::source::{BlockAt, BlockId, FileId, LoadFault, Loader, Place, Sources};

/// The edition of the language that is read.
const EDITION: u32 = 1;

/// Reads every file of `sources`, and those that they use, into sheets, and resolves their links. What was read of blocks that
/// stand in the set `before` too is taken over.
///
/// `rule_names` are the names that a deviation may speak of.
pub(crate) fn build(
    sources: &mut Sources,
    loader: &dyn Loader,
    rule_names: &[&'static str],
    before: Option<&Set>,
    findings: &mut Findings,
) -> Set {
    let mut set = Set { age: before.map_or(0, |before| before.age + 1), ..Set::default() };
    let mut uses = Vec::new();
    let mut same = before.is_some();
    let mut next = 0;
    // Files that `use` brings in are appended, and so are read in turn.
    while let Some(file) = sources.shared(FileId(next)) {
        let id = FileId(next);
        let mut head = Head::default();
        for at in &file.blocks {
            let slot = before.and_then(|before| before.taken_over(id, at)).unwrap_or_else(|| {
                let slot = read_block(id, &file.text, at, set.age);
                let earlier = before.and_then(|before| before.peek(SheetId(at.id.0)));
                same &= match (&slot.sheet, earlier) {
                    (Some(sheet), Some(earlier)) => sheet.is_headed_like(earlier),
                    (None, None) => true,
                    _ => false,
                };
                Arc::new(slot)
            });
            findings.extend(&slot.read.findings);
            head.note(&slot.read);
            for (path, place) in &slot.read.uses {
                match load(sources, loader, &file.name, path) {
                    Ok(used) => uses.push((id, used, *place)),
                    Err(fault) => {
                        let message = format!("{path} cannot be used: {}", fault.sentence);
                        let finding = findings.add(&rules::USE_UNREADABLE, *place, message);
                        finding.label("cannot be used").stated(path.as_str());
                    }
                }
            }
            set.put(at.id, slot);
        }
        head.check(findings);
        next += 1;
    }
    match before.filter(|before| same && before.order == set.order && before.web.uses == uses) {
        Some(before) => set.hang_together_like(before),
        None => link::resolve(&mut set, uses, next as usize, rule_names),
    }
    set.drop_stale_facts();
    findings.extend(&set.web.findings);
    set
}

impl Set {
    /// What was made of a block, where it still stands in the same file.
    fn taken_over(&self, file: FileId, at: &BlockAt) -> Option<Arc<Slot>> {
        let slot = self.slots.get(at.id.0 as usize)?.as_ref()?;
        (slot.file == file && Arc::ptr_eq(&slot.block, &at.block)).then(|| slot.clone())
    }

    /// Takes the links over from a set with the same headings.
    fn hang_together_like(&mut self, before: &Self) {
        self.web = before.web.clone();
        let changed = |id: &SheetId| self.slot(*id).is_some_and(|slot| slot.changed == self.age);
        let read: Vec<SheetId> = self.order.iter().copied().filter(changed).collect();
        for id in read {
            self.take_targets(id, before.peek(id).map(|sheet| sheet.targets.clone()).unwrap_or_default());
        }
    }

    fn put(&mut self, id: BlockId, slot: Arc<Slot>) {
        let at = id.0 as usize;
        if slot.sheet.is_some() {
            self.order.push(SheetId(id.0));
        }
        if self.slots.len() <= at {
            self.slots.resize_with(at + 1, || None);
        }
        if let Some(place) = self.slots.get_mut(at) {
            *place = Some(slot);
        }
    }
}

fn load(sources: &mut Sources, loader: &dyn Loader, from: &str, path: &str) -> Result<FileId, LoadFault> {
    // A file of the set is found beside the one that uses it, without going to the loader.
    let beside = match from.rsplit_once('/') {
        Some((folder, _)) => format!("{folder}/{path}"),
        None => path.to_owned(),
    };
    if let Some(id) = sources.find(&beside) {
        return Ok(id);
    }
    let (name, text) = loader.load(from, path)?;
    Ok(sources.add(name, text))
}

/// What was read of a block beside its sheet.
#[derive(Debug, Default)]
pub(super) struct BlockReading {
    findings: Vec<Arc<Finding>>,
    /// The files that it uses.
    uses: Vec<(String, Place)>,
    /// The lines that state an edition, with the number where it can be read.
    editions: Vec<Edition>,
    /// Its first line that is neither blank nor a comment.
    first: Option<Place>,
}

#[derive(Clone, Copy, Debug)]
struct Edition {
    number: Option<u32>,
    place: Place,
    /// Whether it is the first line of its block that says something.
    leads: bool,
    /// Whether the line could not be read, of which a finding has told.
    broken: bool,
}

/// The edition is stated once, at the head of a file.
#[derive(Debug, Default)]
struct Head {
    first: Option<Place>,
    editions: Vec<Edition>,
}

impl Head {
    fn note(&mut self, read: &BlockReading) {
        let leads = self.first.is_none();
        self.editions.extend(read.editions.iter().map(|edition| Edition { leads: edition.leads && leads, ..*edition }));
        self.first = self.first.or(read.first);
    }

    fn check(&self, findings: &mut Findings) {
        for edition in self.editions.iter().filter(|edition| !edition.broken) {
            if edition.number != Some(EDITION) {
                let message = "this edition of the language is not known; edition 1 is, and the text is read as that";
                findings
                    .add(&rules::EDITION_UNKNOWN, edition.place, message)
                    .label("unknown edition")
                    .replace_by(EDITION.to_string());
            } else if !edition.leads {
                let message = "the edition belongs on the first line that is neither blank nor a comment";
                findings.add(&rules::EDITION_MISSING, edition.place, message).label("not on the first line");
            }
        }
        if let (Some(first), true) = (self.first, self.editions.is_empty()) {
            findings
                .add(&rules::EDITION_MISSING, first, "the edition of the language is not stated; edition 1 is assumed")
                .label("cbspec 1 is missing before this")
                .edit("state the edition", first.start(), "cbspec 1\n\n");
        }
    }
}

fn read_block(file: FileId, text: &str, at: &BlockAt, age: u64) -> Slot {
    let text = Span::new(at.start, at.start + at.block.len).of(text);
    let mut findings = Findings::new();
    let mut reader = BlockReader { file, id: at.id, text, findings: &mut findings, sheet: None, silent: false };
    let mut read = reader.read(&at.block.lines);
    let sheet = reader.sheet.take().map(|mut sheet| {
        sheet.statements.shrink_to_fit();
        Arc::new(sheet)
    });
    read.findings = findings.shared();
    let block = at.block.clone();
    Slot { file, block, read: Arc::new(read), sheet, changed: age, facts: OnceLock::new() }
}

struct BlockReader<'a> {
    file: FileId,
    id: BlockId,
    text: &'a str,
    findings: &'a mut Findings,
    sheet: Option<Sheet>,
    /// Whether the lines stand under a heading that could not be taken, of which a finding has told.
    silent: bool,
}

impl BlockReader<'_> {
    fn read(&mut self, lines: &[Line]) -> BlockReading {
        let mut read = BlockReading::default();
        for line in lines {
            let leads = read.first.is_none();
            if leads && !matches!(line.kind, LineKind::Blank) {
                read.first = Some(self.place(line, Span::new(0, line.len)));
            }
            match &line.kind {
                LineKind::Blank => {}
                LineKind::Edition { number, span } => {
                    let place = self.place(line, *span);
                    read.editions.push(Edition { number: *number, place, leads, broken: false });
                }
                LineKind::Use { path, span } => read.uses.push((path.clone(), self.place(line, *span))),
                LineKind::Heading(heading) => self.heading(line, heading),
                LineKind::Particular(particular) => self.particular(line, particular),
                LineKind::Broken { fault, at, look } => {
                    let place = self.place(line, *at);
                    self.findings.add(&rules::UNREADABLE_LINE, place, fault.sentence()).label("cannot be read");
                    self.broken(line, look);
                    if matches!(fault, firstpole_grammar::Fault::Edition) {
                        read.editions.push(Edition { number: None, place, leads, broken: true });
                    }
                }
            }
        }
        read
    }

    const fn place(&self, line: &Line, span: Span) -> Place {
        Place::new(self.id, line.place(span))
    }

    /// What can still be done with a line that cannot be read, so that the lines after it land where they belong, and no
    /// rule calls missing what was only misspelt.
    fn broken(&mut self, line: &Line, look: &Look) {
        match look {
            Look::Particular { label, rest } => {
                let text = self.text(line, *label).to_owned();
                let Some(sheet) = self.sheet.as_ref().map(|sheet| sheet.kind) else { return };
                if let Lookup::Found(found) = particular::find(sheet, &text) {
                    let (particular, about, limit) = Statement::of(&found);
                    let statement = Statement {
                        particular,
                        about,
                        limit,
                        label: self.place(line, *label),
                        wording: text,
                        value: self.place(line, *rest),
                        reading: Reading::Unknown,
                        chosen: None,
                    };
                    self.keep(line, statement);
                }
            }
            Look::Heading { kind, name } => {
                if let Some(sheet) = SheetKind::read(self.text(line, *kind)) {
                    let kind = self.place(line, *kind);
                    self.open(line, sheet, kind, name.as_ref(), Vec::new());
                }
            }
            Look::Nothing => {}
        }
    }

    fn text(&self, line: &Line, span: Span) -> &str {
        line.place(span).of(self.text)
    }

    fn heading(&mut self, line: &Line, heading: &Heading) {
        let kind_place = self.place(line, heading.kind_span);
        let kind = match SheetKind::read(&heading.kind) {
            Some(kind) => kind,
            None => match SheetKind::nearest(&heading.kind) {
                Some(near) => {
                    let message = format!(
                        "no sheet is called {}; {} is near, and the lines below are read so",
                        heading.kind,
                        near.word()
                    );
                    self.findings
                        .add(&rules::UNKNOWN_SHEET, kind_place, message)
                        .label("not a kind of sheet")
                        .replace_by(near.word());
                    near
                }
                None => return self.missing_colon(line, heading),
            },
        };
        let links: Vec<_> = heading.links.iter().map(|link| (link.clone(), self.place(line, link.name.span))).collect();
        self.open(line, kind, kind_place, heading.name.as_ref(), links.clone());
        self.check_links(line, kind, heading);
    }

    /// A line of words that is no heading: most likely a particular whose colon is missing.
    fn missing_colon(&mut self, line: &Line, heading: &Heading) {
        let place = self.place(line, Span::new(heading.kind_span.start, line.len));
        let text = self.text(line, Span::new(heading.kind_span.start, line.len)).trim_end().to_owned();
        let start = place.within().start;
        let place = Place::new(self.id, Span::new(start, start + text.len() as u32));
        let label = self.sheet.as_ref().map(|sheet| sheet.kind).and_then(|kind| {
            let words: Vec<&str> = text.split_whitespace().collect();
            (1..=words.len()).rev().find(|count| {
                let label = words.get(..*count).unwrap_or(&[]).join(" ");
                matches!(particular::find(kind, &label), Lookup::Found(_))
            })
        });
        let sheet = self.sheet.as_ref().map(|sheet| sheet.kind);
        let finding =
            self.findings.add(&rules::UNREADABLE_LINE, place, firstpole_grammar::Fault::MissingColon.sentence());
        finding.label("neither a heading nor a particular");
        if let (Some(count), Some(kind)) = (label, sheet) {
            let words: Vec<&str> = text.split_whitespace().collect();
            let (label, value) = words.split_at_checked(count).unwrap_or((&[], &[]));
            let (label, value) = (label.join(" "), value.join(" "));
            finding.edit("put the colon in", place, format!("{label}: {value}"));
            // The label is known to be meant, so no rule shall call it missing.
            if let Lookup::Found(found) = particular::find(kind, &label) {
                let (particular, about, limit) = Statement::of(&found);
                let statement = Statement {
                    particular,
                    about,
                    limit,
                    label: place,
                    wording: label.clone(),
                    value: place,
                    reading: Reading::Unknown,
                    chosen: None,
                };
                self.keep(line, statement);
            }
        }
    }

    fn open(
        &mut self,
        line: &Line,
        kind: SheetKind,
        kind_place: Place,
        name: Option<&Name>,
        links: Vec<(firstpole_grammar::Link, Place)>,
    ) {
        let whole = self.place(line, Span::new(0, line.len));
        let last = links.last().map(|(_, place)| *place);
        let end = last.or(name.map(|name| self.place(line, name.span))).unwrap_or(kind_place);
        let name_place = name.map_or(kind_place, |name| self.place(line, name.span));
        if kind.named() && name.is_none() {
            let message = format!("a {} needs a name", kind.word());
            self.findings.add(&rules::NAME_MISSING, kind_place, message).label("name is missing");
        } else if let Some(name) = name.filter(|_| !kind.named()) {
            let message = format!("a {} has no name of its own: {}", kind.word(), name.text);
            self.findings.add(&rules::UNREADABLE_LINE, name_place, message).label("does not belong here");
        }
        self.sheet = Some(Sheet {
            id: SheetId(self.id.0),
            file: self.file,
            kind,
            name: name_of(name),
            name_place,
            heading: kind_place.to(end),
            links,
            targets: Vec::new(),
            statements: Vec::new(),
            own: Vec::new(),
            end: whole.end(),
        });
        self.silent = false;
    }

    fn check_links(&mut self, line: &Line, kind: SheetKind, heading: &Heading) {
        for (at, link) in heading.links.iter().enumerate() {
            let place = self.place(line, link.span);
            if !kind.links().iter().any(|(word, _)| *word == link.word) {
                let words: Vec<&str> = kind.links().iter().map(|(word, _)| *word).collect();
                let admitted = if words.is_empty() { "none".to_owned() } else { words.join(", ") };
                let message = format!("a {} has no link {}; its links are: {admitted}", kind.word(), link.word);
                self.findings.add(&rules::LINK_MISPLACED, place, message).label("not a link of this sheet");
            } else if heading.links.iter().take(at).any(|earlier| earlier.word == link.word) {
                let message = format!("{} stands twice in this heading", link.word);
                self.findings.add(&rules::LINK_MISPLACED, place, message).label("again");
            }
        }
    }

    fn particular(&mut self, line: &Line, written: &WrittenParticular) {
        let label_place = self.place(line, written.label_span);
        let value_place = self.place(line, written.value.span);
        let Some(kind) = self.sheet.as_ref().map(|sheet| sheet.kind) else {
            if !self.silent {
                let message = "this stands before the first heading and belongs to no sheet";
                self.findings.add(&rules::OUTSIDE_SHEET, label_place, message).label("belongs to no sheet");
                self.silent = true;
            }
            return;
        };
        if written.own {
            let text = value_place.within().of(self.text).trim_matches('"').to_owned();
            let end = self.place(line, Span::new(line.len, line.len));
            if let Some(sheet) = &mut self.sheet {
                sheet.own.push(OwnLine { label: written.label.clone(), text, place: value_place });
                sheet.end = end;
            }
            return;
        }
        match particular::find(kind, &written.label) {
            Lookup::Found(found) => {
                let (particular, about, limit) = Statement::of(&found);
                let reading = self.value(particular, about, value_place, &written.value);
                let statement = Statement {
                    particular,
                    about,
                    limit,
                    label: label_place,
                    wording: written.label.clone(),
                    value: value_place,
                    reading,
                    chosen: None,
                };
                self.keep(line, statement);
            }
            Lookup::Refused { symbol, readings } => {
                let said: Vec<&str> = readings.iter().map(|particular| particular.label).collect();
                let message = format!("{symbol} stands for more than one thing in the trade: {}", said.join(", or "));
                let finding = self.findings.add(&rules::AMBIGUOUS_SYMBOL, label_place, message);
                finding.label("say which").stated(written.label.as_str());
                for reading in readings {
                    finding.edit(format!("write {}", reading.label), label_place, reading.label);
                }
                let end = self.place(line, Span::new(line.len, line.len));
                if let Some(sheet) = &mut self.sheet {
                    sheet.end = end;
                }
            }
            Lookup::Unknown => self.unknown_label(kind, &written.label, label_place),
        }
    }

    fn unknown_label(&mut self, kind: SheetKind, label: &str, place: Place) {
        let elsewhere = particular::others_with_label(kind, label);
        if !elsewhere.is_empty() {
            let sheets: Vec<&str> = elsewhere.iter().map(|sheet| sheet.word()).collect();
            let message = format!("{label} is a particular of {}, not of {}", sheets.join(" and "), kind.word());
            self.findings.add(&rules::MISPLACED_LABEL, place, message).label("belongs to another sheet").stated(label);
            return;
        }
        let near = particular::nearest(kind, label, 3);
        let message = match near.first() {
            Some(first) => format!("{label} is no particular of {}; {first} is near", kind.word()),
            None => format!("{label} is no particular of {}; a label of your own stands in quotes", kind.word()),
        };
        let finding = self.findings.add(&rules::UNKNOWN_LABEL, place, message);
        finding.label("unknown label").stated(label);
        for wording in near {
            finding.edit(format!("write {wording}"), place, wording);
        }
        finding.edit("keep it as a label of your own, in quotes", place, format!("\"{label}\""));
    }

    fn value(
        &mut self,
        particular: &'static particular::Particular,
        about: super::About,
        place: Place,
        written: &ValueText,
    ) -> Reading {
        let text = place.within().of(self.text);
        if about == super::About::Reason {
            return match &written.form {
                ValueForm::Missing => Reading::Open(None),
                _ => Reading::Text(text.trim_matches('"').to_owned()),
            };
        }
        Reader { findings: self.findings, particular, place, text }.read(written)
    }

    /// Puts a statement into the current sheet; `20 kA for 1 s` states two particulars.
    fn keep(&mut self, line: &Line, statement: Statement) {
        let end = self.place(line, Span::new(line.len, line.len));
        let duration = statement.quantity().and_then(|quantity| {
            let measure =
                quantity.lasting.filter(|_| statement.states(&breaker::RATED_SHORT_TIME_WITHSTAND_CURRENT))?;
            let mut own = quantity.clone();
            own.measure = measure;
            own.second = None;
            own.lasting = None;
            own.again = Vec::new();
            own.qualifiers = Vec::new();
            Some(Statement {
                particular: &breaker::RATED_DURATION_OF_SHORT_CIRCUIT,
                reading: Reading::Quantity(own),
                ..statement.clone()
            })
        });
        if let Some(sheet) = &mut self.sheet {
            sheet.statements.push(Arc::new(statement));
            sheet.statements.extend(duration.map(Arc::new));
            sheet.end = end;
        }
    }
}
