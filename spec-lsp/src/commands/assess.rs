//! `firstpole assess PATH...`: checks files and folders, and prints the findings.

use std::collections::BTreeSet;
use std::io::{self, Write};
use std::path::PathBuf;

use firstpole_core::documents::json;
use firstpole_core::particular::SheetKind;
use firstpole_core::rules::Policy;
use firstpole_core::{Assessment, Assessor, Date, Finding, FindingKind};

use crate::files::{self, FolderLoader, Gathered};
use crate::settings::{self, SettingsFault};
use crate::show::{Colour, Look, findings};
use crate::{BLOCKED, NOT_RUN, PASSED, today};

/// What the command is asked.
#[derive(Debug, clap::Args)]
pub struct Arguments {
    /// Files, and folders that are searched for *.cbspec
    #[arg(required = true, value_name = "PATH")]
    paths: Vec<PathBuf>,
    /// The form of the output
    #[arg(long = "as", value_name = "FORM", default_value = "text")]
    form: Form,
    /// A kind of finding that blocks; may be given several times [default: contradiction and shortfall]
    #[arg(long, value_name = "KIND")]
    block_on: Vec<Gate>,
    /// Check as if the tender's status were issued, so that open points block
    #[arg(long)]
    issued: bool,
    /// The day on which deviations are held against their expiry [default: today]
    #[arg(long, value_name = "YYYY-MM-DD", value_parser = day)]
    on: Option<Date>,
    /// The folder below which `use` may read [default: the folder given, or that of the file given]
    #[arg(long, value_name = "FOLDER")]
    below: Option<PathBuf>,
    /// When to colour the text
    #[arg(long, value_name = "WHEN", default_value = "auto")]
    colour: Colour,
    /// Tell the findings in plain sentences, for screen readers
    #[arg(long)]
    narrated: bool,
}

#[derive(Clone, Copy, Debug, clap::ValueEnum)]
enum Form {
    /// For people
    Text,
    /// For machines: schema 1
    Json,
}

#[derive(Clone, Copy, Debug, PartialEq, Eq, clap::ValueEnum)]
enum Gate {
    Contradiction,
    Shortfall,
    Omission,
    Caution,
    Excess,
    Remark,
    /// No finding blocks
    Nothing,
}

impl Gate {
    const fn kind(self) -> Option<FindingKind> {
        match self {
            Self::Contradiction => Some(FindingKind::Contradiction),
            Self::Shortfall => Some(FindingKind::Shortfall),
            Self::Omission => Some(FindingKind::Omission),
            Self::Caution => Some(FindingKind::Caution),
            Self::Excess => Some(FindingKind::Excess),
            Self::Remark => Some(FindingKind::Remark),
            Self::Nothing => None,
        }
    }
}

fn day(text: &str) -> Result<Date, String> {
    Date::read(text).filter(|date| date.day.is_some()).ok_or_else(|| "a day is written 2028-12-31".to_owned())
}

/// Runs the command.
pub fn run(arguments: &Arguments, out: &mut dyn Write, err: &mut dyn Write) -> io::Result<u8> {
    let gathered = files::gather(&arguments.paths, arguments.below.as_deref());
    for path in &gathered.missing {
        writeln!(err, "firstpole: there is no {}", files::shown(path))?;
    }
    if gathered.is_empty() {
        writeln!(err, "firstpole: no specification (*.cbspec) was found")?;
        return Ok(NOT_RUN);
    }
    let missing = gathered.missing.clone();
    let assessments = match assessed(gathered, arguments) {
        Ok(assessments) => assessments,
        Err(faults) => {
            // Thresholds that nobody meant would give verdicts that nobody can rely on.
            for fault in faults {
                writeln!(err, "firstpole: {fault}")?;
            }
            writeln!(err, "firstpole: nothing was checked, since the settings cannot be read")?;
            return Ok(NOT_RUN);
        }
    };
    let gate: Vec<FindingKind> = if arguments.block_on.is_empty() {
        FindingKind::ALL.into_iter().filter(|kind| kind.blocks()).collect()
    } else {
        arguments.block_on.iter().filter_map(|gate| gate.kind()).collect()
    };
    let told = told_once(&assessments);
    match arguments.form {
        Form::Text => {
            findings(told.iter().copied(), Look::new(arguments.colour, arguments.narrated), out)?;
            summary(&assessments, &told, &gate, out)?;
        }
        Form::Json => {
            let documents = assessments.iter().map(json::Document::of);
            if let Some(document) = documents.reduce(json::Document::and) {
                serde_json::to_writer_pretty(&mut *out, &document)?;
            }
            writeln!(out)?;
        }
    }
    Ok(if !missing.is_empty() {
        NOT_RUN
    } else if blocks(&told, &gate) {
        BLOCKED
    } else {
        PASSED
    })
}

/// Assesses what was gathered: together what has the same settings, each specification by its nearest file of settings.
fn assessed(gathered: Gathered, arguments: &Arguments) -> Result<Vec<Assessment>, Vec<SettingsFault>> {
    let mut groups: Vec<(Policy, Vec<PathBuf>)> = Vec::new();
    let mut wrong: Vec<SettingsFault> = Vec::new();
    for (_, file) in gathered.sources.files() {
        let path = PathBuf::from(file.name.as_str());
        match settings::policy_for(&path) {
            Ok(policy) => match groups.iter_mut().find(|(known, _)| *known == policy) {
                Some((_, paths)) => paths.push(path),
                None => groups.push((policy, vec![path])),
            },
            Err(fault) if wrong.contains(&fault) => {}
            Err(fault) => wrong.push(fault),
        }
    }
    if !wrong.is_empty() {
        return Err(wrong);
    }
    let assess = |policy: Policy, gathered: Gathered, loader: FolderLoader| {
        let policy = Policy { issued: arguments.issued, today: arguments.on.or_else(today), ..policy };
        let mut assessment = Assessor::standard().with_policy(policy).with_loader(loader).assess(&gathered.sources);
        for fault in gathered.faults {
            assessment.add(fault);
        }
        assessment
    };
    let loader = gathered.loader.clone();
    match <[_; 1]>::try_from(groups) {
        Ok([(policy, _)]) => Ok(vec![assess(policy, gathered, loader)]),
        Err(groups) => Ok(groups
            .into_iter()
            .map(|(policy, paths)| assess(policy, files::gather(&paths, arguments.below.as_deref()), loader.clone()))
            .collect()),
    }
}

/// Every finding; what several assessments tell of a file that they all use stands once.
fn told_once(assessments: &[Assessment]) -> Vec<(&Assessment, &Finding)> {
    let mut seen = BTreeSet::new();
    let mut told = Vec::new();
    for assessment in assessments {
        let before = seen.clone();
        for finding in assessment.findings() {
            let place = assessment.at(finding.place);
            let file = assessment.sources.file(place.file).map(|file| file.name.clone());
            let key = (file, place.span.start, place.span.end, finding.rule, finding.message.clone());
            if !before.contains(&key) {
                told.push((assessment, finding.as_ref()));
            }
            seen.insert(key);
        }
    }
    told
}

fn blocks(told: &[(&Assessment, &Finding)], gate: &[FindingKind]) -> bool {
    told.iter().any(|(_, finding)| finding.blocks(gate))
}

fn summary(
    assessments: &[Assessment],
    told: &[(&Assessment, &Finding)],
    gate: &[FindingKind],
    out: &mut dyn Write,
) -> io::Result<()> {
    let counted = |count: usize, one: &str, many: &str| format!("{count} {}", if count == 1 { one } else { many });
    let names: BTreeSet<String> =
        assessments.iter().flat_map(|a| a.sources.files()).map(|(_, file)| file.name.clone()).collect();
    // A file that several assessments use counts once, and so do its breakers.
    let breakers: BTreeSet<(String, &str)> = assessments.iter().flat_map(breakers).collect();
    let open = |kind: FindingKind| told.iter().filter(|(_, f)| f.kind == kind && f.accepted.is_none()).count();
    let mut parts: Vec<String> = FindingKind::ALL
        .into_iter()
        .map(|kind| (open(kind), kind))
        .filter(|(count, _)| *count > 0)
        .map(|(count, kind)| kind.counted(count))
        .collect();
    if parts.is_empty() {
        parts.push("nothing found".to_owned());
    }
    let accepted = told.iter().filter(|(_, finding)| finding.accepted.is_some()).count();
    if accepted > 0 {
        parts.push(format!("{accepted} accepted"));
    }
    let verdict = if blocks(told, gate) { "blocked" } else { "passed" };
    writeln!(
        out,
        "{}, {}: {}: {verdict}",
        counted(names.len(), "file", "files"),
        counted(breakers.len(), "breaker", "breakers"),
        parts.join(", ")
    )
}

/// The breakers of an assessment, each with its place in its file.
fn breakers(assessment: &Assessment) -> Vec<(String, &str)> {
    assessment
        .set
        .of_kind(SheetKind::Breaker)
        .map(|sheet| {
            let place = assessment.at(sheet.heading);
            let file = assessment.sources.file(place.file).map_or_else(String::new, |file| file.name.clone());
            (format!("{file}:{}", place.span.start), sheet.name.as_str())
        })
        .collect()
}
