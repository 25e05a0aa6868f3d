//! The program `firstpole`: commands, file access and the language server. What a specification is about is known to `firstpole-core` alone.

mod commands;
pub mod features;
mod files;
pub mod server;
mod show;

use std::ffi::OsString;
use std::io::Write;

use clap::{Parser, Subcommand};
use firstpole_core::Date;

/// What a command ends with: nothing blocks.
pub const PASSED: u8 = 0;
/// What a command ends with: a finding blocks.
pub const BLOCKED: u8 = 1;
/// What a command ends with: it could not be run.
pub const NOT_RUN: u8 = 2;

/// Checks circuit-breaker purchase specifications.
///
/// The ratings that it computes and checks do not replace the standards in force, local codes, or the judgement of a licensed
/// engineer.
#[derive(Debug, Parser)]
#[command(name = "firstpole", version, propagate_version = true)]
struct Program {
    #[command(subcommand)]
    command: Command,
}

#[derive(Debug, Subcommand)]
enum Command {
    /// Check files and folders, and print the findings
    Assess(commands::assess::Arguments),
    /// Set columns and spacing, and change no meaning
    Align(commands::align::Arguments),
    /// Say what a rule checks, on what basis, with its formula
    Clause(commands::clause::Arguments),
    /// Serve an editor: findings while one types, over the language server protocol
    Serve(commands::serve::Arguments),
}

/// Today, by the clock of the machine, in UTC.
fn today() -> Option<Date> {
    let date = jiff::Timestamp::now().to_zoned_datetime(jiff::tz::TimeZone::UTC).date();
    Date::new(u16::try_from(date.year()).ok()?, u8::try_from(date.month()).ok()?, u8::try_from(date.day()).ok())
}

/// Runs the program with `arguments` (the first is its own name), and gives the code that it ends with.
pub fn run(arguments: impl IntoIterator<Item = OsString>, out: &mut dyn Write, err: &mut dyn Write) -> u8 {
    let program = match Program::try_parse_from(arguments) {
        Ok(program) => program,
        Err(told) => {
            // Help and version are answers and not faults; clap knows which stream each belongs to.
            let text = told.render();
            let wrong = told.use_stderr();
            let written = if wrong { write!(err, "{text}") } else { write!(out, "{text}") };
            return if written.is_err() || wrong { NOT_RUN } else { PASSED };
        }
    };
    let ended = match program.command {
        Command::Assess(arguments) => commands::assess::run(&arguments, out, err),
        Command::Align(arguments) => commands::align::run(&arguments, out, err),
        Command::Clause(arguments) => commands::clause::run(&arguments, out, err),
        Command::Serve(arguments) => commands::serve::run(&arguments, err),
    };
    ended.unwrap_or_else(|fault| {
        // A reader that closes the pipe early has what it wanted.
        if fault.kind() != std::io::ErrorKind::BrokenPipe {
            // With the error stream gone too, the exit code is all that is left to tell it by.
            let _ = writeln!(err, "firstpole: {fault}");
        }
        NOT_RUN
    })
}
