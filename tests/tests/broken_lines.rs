//! N independent broken lines give N findings on exactly those lines, and everything else is read as before.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::collections::BTreeSet;

use firstpole_core::{Assessor, Sources};
use firstpole_grammar::{LineKind, read};
use firstpole_tests::{CLEAN, example, root};
use proptest::prelude::*;

fn text(name: &str) -> String {
    std::fs::read_to_string(root().join(example(name))).expect("an example")
}

/// Ways to break a particular, so that its line cannot be read.
fn broken(line: &str, way: usize) -> String {
    match way % 4 {
        0 => format!("{} \"never closed", line.trim_end()),
        1 => line.replacen(':', " ; ", 1).replace(':', " ; ") + " = (",
        2 => format!("    : {}", line.trim()),
        _ => format!("\"{}", line.replace('"', "")),
    }
}

/// The lines of `text` that hold a particular without quotes, a comma and a second colon, by their numbers from 0.
fn particulars(text: &str) -> Vec<usize> {
    text.lines()
        .enumerate()
        .filter(|(_, line)| {
            line.starts_with(' ') && line.matches(':').count() == 1 && !line.contains('"') && !line.contains('#')
        })
        .map(|(at, _)| at)
        .collect()
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 64, ..ProptestConfig::default() })]

    #[test]
    fn only_the_broken_lines_are_reported(
        example in 0..CLEAN.len(),
        picks in prop::collection::vec((any::<prop::sample::Index>(), 0usize..4), 1..12),
    ) {
        let whole = text(CLEAN[example]);
        let candidates = particulars(&whole);
        let mut lines: Vec<String> = whole.lines().map(str::to_owned).collect();
        let mut chosen = BTreeSet::new();
        for (index, way) in picks {
            let at = candidates[index.index(candidates.len())];
            if chosen.insert(at) {
                lines[at] = broken(&lines[at], way);
            }
        }
        let spoilt = lines.join("\n") + "\n";

        // The grammar: exactly those lines are broken, and every other line is what it was.
        let (before, after) = (read(&whole), read(&spoilt));
        prop_assert_eq!(before.lines.len(), after.lines.len());
        for (at, (old, new)) in before.lines.iter().zip(&after.lines).enumerate() {
            let is_broken = matches!(new.kind, LineKind::Broken { .. });
            prop_assert_eq!(is_broken, chosen.contains(&at), "line {}: {}", at + 1, &lines[at]);
            if !is_broken {
                prop_assert_eq!(&old.kind, &new.kind);
            }
        }

        // The core: one finding for each of those lines and no other line that cannot be read; every other value as before.
        let assess = |text: &str| Assessor::standard().assess(&Sources::of("a.cbspec", text));
        let (before, after) = (assess(&whole), assess(&spoilt));
        let line_of = |a: &firstpole_core::Assessment, place: firstpole_core::Place| {
            a.sources.file_of(place).expect("a file").position(a.span(place).start).line as usize - 1
        };
        let reading: Vec<usize> = after
            .findings()
            .iter()
            .filter(|f| f.rule == "unreadable-line")
            .map(|f| line_of(&after, f.place))
            .collect();
        prop_assert_eq!(reading, chosen.iter().copied().collect::<Vec<_>>());
        let values = |a: &firstpole_core::Assessment, skip: &BTreeSet<usize>| -> Vec<String> {
            a.set
                .sheets()
                .flat_map(|sheet| sheet.statements.iter().map(move |s| (sheet, s)))
                .filter(|(_, s)| !skip.contains(&line_of(a, s.label)))
                .map(|(sheet, s)| format!("{} {} {}", sheet.title(), s.particular.label, a.sources.text(s.value)))
                .collect()
        };
        prop_assert_eq!(values(&before, &chosen), values(&after, &chosen));
    }
}
