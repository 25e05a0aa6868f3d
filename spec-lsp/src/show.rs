//! Findings for people, through miette.

use std::io::{self, IsTerminal, Write};

use firstpole_core::finding::FindingDiagnostic;
use firstpole_core::{Assessment, Finding};
use miette::{GraphicalReportHandler, GraphicalTheme, NarratableReportHandler};

/// When to colour the text.
#[derive(Clone, Copy, Debug, PartialEq, Eq, clap::ValueEnum)]
pub enum Colour {
    /// On a terminal, unless NO_COLOR is set
    Auto,
    /// Always
    Always,
    /// Never
    Never,
}

/// How findings are shown.
#[derive(Clone, Copy, Debug)]
pub struct Look {
    coloured: bool,
    narrated: bool,
}

/// Columns of the text where no terminal tells.
const WIDTH: usize = 110;

impl Look {
    /// The look that was asked for.
    pub fn new(colour: Colour, narrated: bool) -> Self {
        let asked_not_to = std::env::var_os("NO_COLOR").is_some_and(|value| !value.is_empty());
        let coloured = match colour {
            Colour::Always => true,
            Colour::Never => false,
            Colour::Auto => io::stdout().is_terminal() && !asked_not_to,
        };
        Self { coloured, narrated }
    }
}

/// Shows every finding of an assessment.
pub fn findings(assessment: &Assessment, look: Look, out: &mut dyn Write) -> io::Result<()> {
    let theme = if look.coloured { GraphicalTheme::unicode() } else { GraphicalTheme::unicode_nocolor() };
    let graphical = GraphicalReportHandler::new_themed(theme).with_width(WIDTH).with_links(false).without_cause_chain();
    let narrated = NarratableReportHandler::new();
    for finding in assessment.findings() {
        let diagnostic = FindingDiagnostic::new(finding, assessment);
        let mut text = String::new();
        let rendered = if look.narrated {
            narrated.render_report(&mut text, &diagnostic)
        } else {
            graphical.render_report(&mut text, &diagnostic)
        };
        if rendered.is_err() {
            // What cannot be drawn is still told.
            text = plain(finding, assessment);
        }
        writeln!(out, "{}", text.trim_end())?;
        writeln!(out)?;
    }
    Ok(())
}

fn plain(finding: &Finding, assessment: &Assessment) -> String {
    let place = assessment.at(finding.place);
    let file = assessment.sources.file(place.file);
    let position = file.map_or_else(String::new, |file| {
        let at = file.position(place.span.start);
        format!("{}:{}:{}: ", file.name, at.line, at.column)
    });
    format!("{position}{}: {}: {}", finding.kind.word(), finding.rule, finding.message)
}
