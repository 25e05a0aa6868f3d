//! `firstpole assess PATH...`: checks files and folders, and prints the findings.

use std::io::{self, Write};
use std::path::PathBuf;

use firstpole_core::documents::json;
use firstpole_core::rules::Policy;
use firstpole_core::{Assessment, Assessor, Date, FindingKind};

use crate::files::{self, Gathered};
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
    let Gathered { sources, loader, faults, missing } = gathered;
    let policy = Policy { issued: arguments.issued, today: arguments.on.or_else(today), ..Policy::default() };
    let mut assessment = Assessor::standard().with_policy(policy).with_loader(loader).assess(&sources);
    for fault in faults {
        assessment.add(fault);
    }
    let gate: Vec<FindingKind> = if arguments.block_on.is_empty() {
        FindingKind::ALL.into_iter().filter(|kind| kind.blocks()).collect()
    } else {
        arguments.block_on.iter().filter_map(|gate| gate.kind()).collect()
    };
    match arguments.form {
        Form::Text => {
            findings(&assessment, Look::new(arguments.colour, arguments.narrated), out)?;
            summary(&assessment, &gate, out)?;
        }
        Form::Json => {
            serde_json::to_writer_pretty(&mut *out, &json::Document::of(&assessment))?;
            writeln!(out)?;
        }
    }
    Ok(if !missing.is_empty() {
        NOT_RUN
    } else if assessment.blocks(&gate) {
        BLOCKED
    } else {
        PASSED
    })
}

fn summary(assessment: &Assessment, gate: &[FindingKind], out: &mut dyn Write) -> io::Result<()> {
    let counted = |count: usize, one: &str, many: &str| format!("{count} {}", if count == 1 { one } else { many });
    let files = assessment.sources.files().count();
    let mut parts: Vec<String> = FindingKind::ALL
        .into_iter()
        .map(|kind| (assessment.count(kind), kind))
        .filter(|(count, _)| *count > 0)
        .map(|(count, kind)| kind.counted(count))
        .collect();
    if parts.is_empty() {
        parts.push("nothing found".to_owned());
    }
    if assessment.accepted() > 0 {
        parts.push(format!("{} accepted", assessment.accepted()));
    }
    let verdict = if assessment.blocks(gate) { "blocked" } else { "passed" };
    writeln!(
        out,
        "{}, {}: {}: {verdict}",
        counted(files, "file", "files"),
        counted(assessment.cases().len(), "breaker", "breakers"),
        parts.join(", ")
    )
}
