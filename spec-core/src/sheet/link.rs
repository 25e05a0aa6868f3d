//! What the links of headings point at, over a set of files.

use std::collections::{BTreeMap, HashMap};
use std::sync::Arc;

use super::{Set, Sheet, SheetId, Web};
use crate::finding::Findings;
use crate::particular::{SheetKind, Target};
use crate::rules::reading as rules;
use crate::source::{FileId, Place};

/// What a link points at.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum LinkTarget {
    /// A sheet.
    Sheet(SheetId),
    /// A rule, by its name.
    Rule(&'static str),
}

/// Which files each file can refer to, itself first.
#[derive(Clone, Debug, Default)]
pub struct Scope {
    reach: Vec<Vec<FileId>>,
}

impl Scope {
    /// The files that `file` can refer to, itself first.
    pub fn of(&self, file: FileId) -> &[FileId] {
        self.reach.get(file.0 as usize).map_or(&[], Vec::as_slice)
    }
}

/// The scope of every file, from what uses what; circles are found and cut.
fn scope(files: usize, uses: &[(FileId, FileId, Place)], findings: &mut Findings) -> Scope {
    let mut reach = Vec::with_capacity(files);
    for file in 0..files as u32 {
        let mut seen = vec![FileId(file)];
        let mut at = 0;
        while let Some(from) = seen.get(at).copied() {
            for (_, used, place) in uses.iter().filter(|(user, _, _)| *user == from) {
                if *used == FileId(file) {
                    let message = "these files use each other in a circle; the sheets are read once, but nobody can tell which file comes first";
                    findings.add(&rules::CIRCLE, *place, message).label("closes the circle");
                } else if !seen.contains(used) {
                    seen.push(*used);
                }
            }
            at += 1;
        }
        reach.push(seen);
    }
    Scope { reach }
}

/// What the links of each sheet point at while they are resolved, by the number of the sheet.
#[derive(Debug)]
struct Links(Vec<Targets>);

type Targets = Vec<(&'static str, LinkTarget)>;

impl Links {
    fn of(&self, id: SheetId) -> &[(&'static str, LinkTarget)] {
        self.0.get(id.0 as usize).map_or(&[], Vec::as_slice)
    }

    fn of_mut(&mut self, id: SheetId) -> Option<&mut Targets> {
        self.0.get_mut(id.0 as usize)
    }

    /// The sheet that the link `word` of a sheet points at.
    fn target(&self, id: SheetId, word: &str) -> Option<SheetId> {
        sheet_of(self.of(id), word)
    }

    /// What the links of a sheet point at, to be kept elsewhere.
    fn take(&mut self, id: SheetId) -> Targets {
        self.of_mut(id).map(std::mem::take).unwrap_or_default()
    }
}

/// The sheet that the link `word` points at.
pub(super) fn sheet_of(targets: &[(&'static str, LinkTarget)], word: &str) -> Option<SheetId> {
    targets.iter().find(|(w, _)| *w == word).and_then(|(_, target)| match target {
        LinkTarget::Sheet(id) => Some(*id),
        LinkTarget::Rule(_) => None,
    })
}

/// Resolves the links of every sheet, in a set of so many files of which these use each other.
pub(super) fn resolve(set: &mut Set, uses: Vec<(FileId, FileId, Place)>, files: usize, rule_names: &[&'static str]) {
    let mut findings = Findings::new();
    let scope = scope(files, &uses, &mut findings);
    set.web = Arc::new(Web { uses, scope, index: set.indexed(), findings: Vec::new() });
    names_once(set, &mut findings);
    let by_name = index(set);
    let mut links = Links(vec![Targets::new(); set.slots.len()]);
    for sheet in set.sheets() {
        let found = targets(set, &by_name, sheet, rule_names, &mut findings);
        if let Some(slot) = links.of_mut(sheet.id) {
            *slot = found;
        }
    }
    for word in ["like", "through"] {
        cut_chains(set, &mut links, word, &mut findings);
    }
    defaults(set, &mut links, &mut findings);
    let mut pointing: BTreeMap<(SheetId, &'static str), Vec<SheetId>> = BTreeMap::new();
    for id in set.order.clone() {
        let targets = links.take(id);
        for (word, target) in &targets {
            if let LinkTarget::Sheet(target) = target {
                pointing.entry((*target, word)).or_default().push(id);
            }
        }
        set.take_targets(id, targets);
    }
    // Nobody else has it yet.
    if let Some(web) = Arc::get_mut(&mut set.web) {
        web.index.pointing = pointing;
        web.findings = findings.shared();
    }
}

/// The sheets of each name, file by file.
type Index<'a> = HashMap<(FileId, &'a str), Vec<SheetId>>;

fn index(set: &Set) -> Index<'_> {
    let mut index = Index::new();
    for sheet in set.sheets().filter(|sheet| !sheet.name.is_empty()) {
        index.entry((sheet.file, sheet.name.as_str())).or_default().push(sheet.id);
    }
    index
}

fn lookup<'a>(set: &'a Set, index: &Index<'_>, file: FileId, name: &str, kinds: &[SheetKind]) -> Option<&'a Sheet> {
    // Kinds in the order of preference, then files, so that a breaker is found before a system of its name.
    kinds.iter().find_map(|kind| {
        set.web.scope.of(file).iter().find_map(|id| {
            let sheets = index.get(&(*id, name))?;
            sheets.iter().filter_map(|id| set.sheet(*id)).find(|sheet| sheet.kind == *kind)
        })
    })
}

fn targets(
    set: &Set,
    index: &Index<'_>,
    sheet: &Sheet,
    rule_names: &[&'static str],
    findings: &mut Findings,
) -> Vec<(&'static str, LinkTarget)> {
    let mut found: Vec<(&'static str, LinkTarget)> = Vec::new();
    for (link, place) in &sheet.links {
        let Some((word, target)) = sheet.kind.links().iter().find(|(word, _)| *word == link.word) else { continue };
        if found.iter().any(|(earlier, _)| earlier == word) {
            continue;
        }
        let name = link.name.text.as_str();
        match target {
            Target::Rule => match rule_names.iter().find(|rule| **rule == name) {
                Some(rule) => found.push((word, LinkTarget::Rule(rule))),
                None => {
                    let near = nearest(rule_names.iter().copied(), name);
                    unknown(findings, *place, "rule", name, near);
                }
            },
            Target::Sheet(kinds) => match lookup(set, index, sheet.file(), name, kinds) {
                Some(target) if target.id == sheet.id => {
                    let message = format!("{} refers to itself", sheet.title());
                    findings.add(&rules::CIRCLE, *place, message).label("itself");
                }
                Some(target) => found.push((word, LinkTarget::Sheet(target.id))),
                None => {
                    let reach = set.web.scope.of(sheet.file());
                    let names = set
                        .sheets()
                        .filter(|s| kinds.contains(&s.kind) && s.id != sheet.id && reach.contains(&s.file()))
                        .map(|s| s.name.as_str());
                    // A text in which every link is wrong gets proposals for the first ones.
                    let near = (findings.len() < UNKNOWN_COMPARED).then(|| nearest(names, name)).flatten();
                    let kinds: Vec<&str> = kinds.iter().map(|kind| kind.word()).collect();
                    unknown(findings, *place, &kinds.join(" or "), name, near);
                }
            },
        }
    }
    found
}

fn unknown(findings: &mut Findings, place: Place, what: &str, name: &str, near: Option<&str>) {
    let message = match near {
        Some(near) => format!("there is no {what} {name}; {near} is near"),
        None => format!("there is no {what} {name} in this file or in those that it uses"),
    };
    let finding = findings.add(&rules::LINK_UNKNOWN, place, message);
    finding.label("not found").stated(name);
    if let Some(near) = near {
        let quoted = near.chars().all(|c| c.is_alphanumeric() || c == '_' || c == '-');
        finding.replace_by(if quoted { near.to_owned() } else { format!("\"{near}\"") });
    }
}

/// Findings on links up to which names are compared with an unknown one.
const UNKNOWN_COMPARED: usize = 50;

/// How many names an unknown one is compared with.
const NAMES_COMPARED: usize = 1000;

fn nearest<'a>(names: impl Iterator<Item = &'a str>, wanted: &str) -> Option<&'a str> {
    let wanted = wanted.to_lowercase();
    // Enough for any text that a person reads; a text of a million names gets no proposal from its far end.
    names
        .take(NAMES_COMPARED)
        .map(|name| (strsim::normalized_damerau_levenshtein(&name.to_lowercase(), &wanted), name))
        .filter(|(near, _)| *near >= 0.6)
        .max_by(|a, b| a.0.total_cmp(&b.0))
        .map(|(_, name)| name)
}

/// Two sheets of one kind and name in one file, or a second tender.
fn names_once(set: &Set, findings: &mut Findings) {
    let mut first: HashMap<(FileId, &'static str, &str), &Sheet> = HashMap::new();
    for sheet in set.sheets() {
        // `like` finds families and breakers alike, so they share their names.
        let room = match sheet.kind {
            SheetKind::Family | SheetKind::Breaker => "breaker or family",
            kind => kind.word(),
        };
        let name = if sheet.kind == SheetKind::Tender { "" } else { sheet.name.as_str() };
        if name.is_empty() && sheet.kind != SheetKind::Tender {
            continue;
        }
        if let Some(earlier) = first.get(&(sheet.file(), room, name)) {
            let message = if name.is_empty() {
                "a file holds one tender; this is the second".to_owned()
            } else {
                format!("a {room} of the name {name} is there already")
            };
            findings
                .add(&rules::NAME_TWICE, sheet.name_place, message)
                .label("second of its name")
                .related(earlier.name_place, "the first");
        } else {
            first.insert((sheet.file(), room, name), sheet);
        }
    }
}

/// The longest chain of sheets that take over from each other.
const LONGEST_CHAIN: usize = 100;

/// A chain of `like` (or `through`) that comes back to itself is cut at the last of its links in the text, and one that is longer
/// than anybody can follow is cut where it becomes so. Every sheet is visited once.
fn cut_chains(set: &Set, links: &mut Links, word: &'static str, findings: &mut Findings) {
    // Where each sheet stands in the text, by its number.
    let mut positions = vec![0; links.0.len()];
    for (position, id) in set.order.iter().enumerate() {
        if let Some(slot) = positions.get_mut(id.0 as usize) {
            *slot = position;
        }
    }
    // How many sheets stand above each; nothing yet where that is not known.
    let mut above: Vec<Option<usize>> = vec![None; links.0.len()];
    let mut on_path = vec![false; links.0.len()];
    for start in &set.order {
        let mut path: Vec<SheetId> = Vec::new();
        let mut next = Some(*start);
        while let Some(id) = next {
            let at = id.0 as usize;
            if above.get(at).copied().flatten().is_some() {
                break;
            }
            if on_path.get(at).copied().unwrap_or(true) {
                let mut circle = path.split_off(path.iter().position(|on| *on == id).unwrap_or(0));
                if let Some(last) = circle.iter().max_by_key(|id| positions.get(id.0 as usize)).copied() {
                    cut(set, links, last, word, findings, "comes back to itself");
                    // Turned so that the one that was cut is now the end of the chain.
                    let after = circle.iter().position(|on| *on == last).map_or(0, |end| (end + 1) % circle.len());
                    circle.rotate_left(after);
                }
                path.extend(circle);
                break;
            }
            if let Some(mark) = on_path.get_mut(at) {
                *mark = true;
            }
            path.push(id);
            next = links.target(id, word);
        }
        // From the far end back, so that what stands above is known first.
        for id in path.into_iter().rev() {
            let target = links.target(id, word);
            let depth = target.map_or(0, |t| above.get(t.0 as usize).copied().flatten().unwrap_or(0) + 1);
            let too_long = depth > LONGEST_CHAIN;
            if too_long {
                cut(set, links, id, word, findings, "stands at the end of more than 100 sheets");
            }
            if let Some(slot) = above.get_mut(id.0 as usize) {
                *slot = Some(if too_long { 0 } else { depth });
            }
        }
    }
}

/// Takes a link out of a sheet, and says why.
fn cut(set: &Set, links: &mut Links, id: SheetId, word: &str, findings: &mut Findings, why: &str) {
    let (Some(sheet), Some(targets)) = (set.sheet(id), links.of_mut(id)) else { return };
    targets.retain(|(w, _)| *w != word);
    let place = sheet.links.iter().find(|(link, _)| link.word == word).map_or(sheet.heading, |(_, place)| *place);
    let message = format!("{} {why} through {word}; this link is left out", sheet.title());
    findings.add(&rules::CIRCLE, place, message).label("left out");
}

/// Links that were left out: taken over through `like`, or the only sheet in reach.
fn defaults(set: &Set, links: &mut Links, findings: &mut Findings) {
    let mut added = Vec::new();
    for sheet in set.sheets() {
        for (word, kind) in wanted(sheet.kind) {
            if links.target(sheet.id, word).is_some() || sheet.links.iter().any(|(link, _)| link.word == *word) {
                continue;
            }
            let inherited = inherited(links, sheet.id, word);
            let mut in_reach = set.in_reach(sheet.file(), *kind);
            match (inherited, in_reach.next(), in_reach.next()) {
                (Some(id), _, _) => added.push((sheet.id, *word, id)),
                (None, Some(only), None) => added.push((sheet.id, *word, only.id)),
                (None, Some(first), Some(second)) => {
                    let message = format!(
                        "{} does not say {word} which {}; {} and {} are both in reach",
                        sheet.title(),
                        kind.word(),
                        first.name,
                        second.name
                    );
                    let finding = findings.add(&rules::LINK_NEEDED, sheet.heading, message);
                    finding.label(format!("{word} ... is missing"));
                    for other in [first, second] {
                        finding.edit(
                            format!("write {word} {}", other.name),
                            sheet.heading.end(),
                            format!(" {word} {}", other.name),
                        );
                    }
                }
                (None, None, _) => {}
            }
        }
    }
    for (id, word, target) in added {
        if let Some(targets) = links.of_mut(id) {
            targets.push((word, LinkTarget::Sheet(target)));
        }
    }
}

const fn wanted(kind: SheetKind) -> &'static [(&'static str, SheetKind)] {
    match kind {
        SheetKind::Breaker => &[("on", SheetKind::System), ("at", SheetKind::Site)],
        SheetKind::Circuit | SheetKind::Offer => &[("for", SheetKind::Breaker)],
        SheetKind::Infeed => &[("into", SheetKind::System)],
        SheetKind::Deviation => &[("in", SheetKind::Breaker)],
        _ => &[],
    }
}

fn inherited(links: &Links, id: SheetId, word: &str) -> Option<SheetId> {
    // Circles of `like` are cut before this.
    let mut above = std::iter::successors(links.target(id, "like"), |id| links.target(*id, "like"));
    above.find_map(|id| links.target(id, word))
}
