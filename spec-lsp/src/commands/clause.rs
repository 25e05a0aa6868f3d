//! `firstpole clause RULE`: what a rule checks.

use std::io::{self, Write};

use firstpole_core::rules::{self, Rule};

use crate::{NOT_RUN, PASSED};

/// What the command is asked.
#[derive(Debug, clap::Args)]
pub struct Arguments {
    /// The rule, as a finding names it; without one, all rules are listed
    rule: Option<String>,
}

/// Runs the command.
pub fn run(arguments: &Arguments, out: &mut dyn Write, err: &mut dyn Write) -> io::Result<u8> {
    let all = rules::standard();
    let Some(name) = &arguments.rule else {
        for rule in &all {
            writeln!(out, "{:<34} {:<14} {}", rule.name, rule.kind.word(), rule.title)?;
        }
        return Ok(PASSED);
    };
    if let Some(rule) = all.iter().find(|rule| rule.name == name.as_str()) {
        return tell(rule, out).map(|()| PASSED);
    }
    write!(err, "firstpole: there is no rule {name}")?;
    match rules::nearest(name) {
        Some(near) => writeln!(err, "; {near} is near")?,
        None => writeln!(err, "; firstpole clause lists them all")?,
    }
    Ok(NOT_RUN)
}

fn tell(rule: &Rule, out: &mut dyn Write) -> io::Result<()> {
    writeln!(out, "{} ({})", rule.name, rule.kind.word())?;
    writeln!(out, "\n{}", rule.title)?;
    writeln!(out, "\nCompares   {}", rule.formula)?;
    writeln!(out, "Basis      {}", rule.basis)?;
    writeln!(out, "\n{}", rule.explanation)
}
