//! The reference page of the language, made from the declarations, so that it cannot say anything else than the program does.

use std::fmt::Write;

use crate::particular::{self, Kind, Particular, SheetKind};
use crate::quantity::{Dimension, units_of};
use crate::rules::{self, policy::SETTINGS};

/// The page, as Markdown.
pub fn page() -> String {
    let mut out = String::new();
    // Writing to a String cannot fail.
    let _ = write_page(&mut out);
    out
}

fn write_page(out: &mut String) -> std::fmt::Result {
    writeln!(out, "# The cbspec language, edition 1: reference\n")?;
    writeln!(
        out,
        "Made from the declarations in `spec-core`; a test fails when it is stale. Everything under basis and meaning is from \
         memory of the standards named unless it says otherwise, and must be held against the standards in force before use.\n"
    )?;
    for kind in SheetKind::ALL {
        sheet(out, kind)?;
    }
    units(out)?;
    settings(out)?;
    writeln!(out, "## Rules\n")?;
    writeln!(out, "| rule | kind | what must hold | compares | basis |")?;
    writeln!(out, "| --- | --- | --- | --- | --- |")?;
    for rule in rules::standard() {
        writeln!(
            out,
            "| `{}` | {} | {} | {} | {} |",
            rule.name,
            rule.kind.word(),
            cell(rule.title),
            cell(rule.formula),
            cell(rule.basis)
        )?;
    }
    Ok(())
}

fn sheet(out: &mut String, kind: SheetKind) -> std::fmt::Result {
    writeln!(out, "## Sheet `{}`\n", kind.word())?;
    let links: Vec<String> = kind.links().iter().map(|(word, _)| format!("`{word}`")).collect();
    if !links.is_empty() {
        writeln!(out, "Links of its heading: {}.\n", links.join(", "))?;
    }
    if kind == SheetKind::Family {
        writeln!(out, "Holds the particulars of a breaker.\n")?;
        return Ok(());
    }
    let mut group = "";
    for declared in particular::declared(kind).iter().filter(|p| p.sheet == kind) {
        if declared.group != group {
            group = declared.group;
            if kind == SheetKind::Breaker {
                writeln!(out, "\n### {group}\n")?;
            }
            writeln!(out, "| label | also | symbol | value | sense | from duty | basis | meaning |")?;
            writeln!(out, "| --- | --- | --- | --- | --- | --- | --- | --- |")?;
        }
        row(out, declared)?;
    }
    writeln!(out)
}

fn row(out: &mut String, declared: &Particular) -> std::fmt::Result {
    let carried = if declared.carried { " (carried, not checked)" } else { "" };
    writeln!(
        out,
        "| {}{carried} | {} | {} | {} | {} | {} | {} | {} |",
        cell(declared.label),
        cell(&declared.wordings.join("; ")),
        cell(&declared.symbols.join(", ")),
        cell(&value(&declared.kind)),
        declared.sense.word(),
        if declared.from_duty { "yes" } else { "" },
        cell(declared.basis),
        cell(declared.meaning)
    )
}

fn value(kind: &Kind) -> String {
    let words = |list: &particular::WordList| list.all().collect::<Vec<_>>().join(" / ");
    match kind {
        Kind::Quantity(quantity) => {
            let kind = quantity.qualifier.map(|q| format!(" ({})", q.word())).unwrap_or_default();
            let none = if quantity.none { ", or none" } else { "" };
            let dimensions: Vec<&str> = quantity.dimensions.iter().map(|d| d.word()).collect();
            format!("{}{kind}: {}{none}", dimensions.join(" or "), quantity.units.join(", "))
        }
        Kind::Ratio => "number".to_owned(),
        Kind::Count => "whole number".to_owned(),
        Kind::Year => "year".to_owned(),
        Kind::Words { list, alternatives } => {
            format!("{}{}", words(list), if *alternatives { "; several joined by or" } else { "" })
        }
        Kind::WordsOrQuantity(list, quantity) => {
            format!("{}, or a value in {}", words(list), quantity.units.join(", "))
        }
        Kind::WordsOrText(list) => format!("{}, or a text in quotes", words(list)),
        Kind::DateOrWords(list) => format!("date, or {}", words(list)),
        Kind::YesNo => "yes / no".to_owned(),
        Kind::Date => "date".to_owned(),
        Kind::Text => "text".to_owned(),
        Kind::Texts => "texts".to_owned(),
        Kind::Names => "names".to_owned(),
        Kind::WordSet(list) => format!("several of: {}", words(list)),
        Kind::Standards => "standards with their years".to_owned(),
        Kind::Labels => "labels".to_owned(),
        Kind::Classes => "classes: C0 C1 C2, E1 E2, M1 M2, S1 S2".to_owned(),
        Kind::Sequence => "operating sequence".to_owned(),
        Kind::Gas => "gas or mixture; several joined by or".to_owned(),
        Kind::Gases => "gases".to_owned(),
        Kind::Expression => "condition".to_owned(),
        Kind::Outcome => "kind of finding and text".to_owned(),
        Kind::AsLabel => "as the label".to_owned(),
    }
}

fn units(out: &mut String) -> std::fmt::Result {
    writeln!(out, "## Units\n\n| of | units |\n| --- | --- |")?;
    for dimension in Dimension::ALL {
        let units: Vec<&str> = units_of(dimension).map(|unit| unit.name).collect();
        writeln!(out, "| {} | {} |", dimension.word(), cell(&units.join(", ")))?;
    }
    writeln!(out)
}

fn settings(out: &mut String) -> std::fmt::Result {
    writeln!(out, "## Settings\n")?;
    writeln!(
        out,
        "Thresholds of the buyer, in the table `[policy]` of a file `firstpole.toml` beside the specification or in a folder above; \
         the nearest file counts, alone. What it does not set keeps its default.\n"
    )?;
    writeln!(out, "| key | default | within | meaning |\n| --- | --- | --- | --- |")?;
    for setting in SETTINGS {
        writeln!(
            out,
            "| `{}` | `{}` | `{}` | {} |",
            setting.key,
            setting.default_written(),
            setting.range_written().replace(" to ", "` to `"),
            cell(setting.meaning)
        )?;
    }
    writeln!(out)
}

/// A cell of a Markdown table.
fn cell(text: &str) -> String {
    text.replace('|', "\\|")
}
