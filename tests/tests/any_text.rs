//! Any text gives an assessment: no panic, lines that cover it, places that lie inside it on character borders.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

use firstpole_core::{Assessor, Place, Sources};
use firstpole_grammar::{LineKind, read};
use firstpole_tests::{CLEAN, SEEDED, example, root};
use proptest::prelude::*;

/// Pieces that the language gives a meaning to, so that random texts come near to real ones.
const PIECES: [&str; 40] = [
    "cbspec 1",
    "breaker",
    "system",
    " on ",
    " like ",
    "A",
    "B",
    "deviation",
    " from ",
    " in ",
    "use ",
    "\"",
    ":",
    "#",
    "rated voltage",
    "Isc",
    "opening time",
    "classes",
    "insulating gas",
    "rated filling pressure",
    " 145 kV",
    " 1 425 kV",
    " 31,5 kA",
    " 30 ms (2 cycles)",
    " 0.6 MPa abs at 20 degC",
    " O - 0.3 s - CO",
    " SF6 60 % + N2 40 %",
    " from duty",
    " at least ",
    " +- ",
    "\u{202f}",
    "°",
    "µ",
    "–",
    "\u{feff}",
    "🙂",
    "e\u{301}",
    "\r",
    "\n",
    "\r\n    ",
];

fn check(text: &str) -> Result<(), TestCaseError> {
    let document = read(text);
    let mut end = 0;
    for line in &document.lines {
        prop_assert!(line.start as usize >= end, "lines overlap");
        end = (line.start + line.len) as usize;
        prop_assert!(text.get(line.start as usize..end).is_some(), "a line cuts a character");
        if let LineKind::Particular(particular) = &line.kind {
            for span in [particular.label_span, particular.value.span] {
                prop_assert!(text.get(line.place(span).start as usize..line.place(span).end as usize).is_some());
            }
        }
    }
    let assessment = Assessor::standard().assess(&Sources::of("x.cbspec", text));
    let inside = |place: Place| {
        let place = assessment.at(place);
        let file = assessment.sources.file(place.file).expect("a file");
        file.text.get(place.span.start as usize..place.span.end as usize).is_some()
    };
    for finding in assessment.findings() {
        prop_assert!(inside(finding.place), "{}: {:?}", finding.rule, finding.place);
        prop_assert!(finding.related.iter().all(|related| inside(related.place)), "{}", finding.rule);
        for edit in &finding.edits {
            prop_assert!(inside(edit.place), "{}", finding.rule);
            let mut mended = text.to_owned();
            let span = assessment.span(edit.place);
            mended.replace_range(span.start as usize..span.end as usize, &edit.text);
            let _ = read(&mended);
        }
    }
    // The same text, the same findings.
    let again = Assessor::standard().assess(&Sources::of("x.cbspec", text));
    prop_assert_eq!(assessment.findings(), again.findings());
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig { cases: 300, ..ProptestConfig::default() })]

    #[test]
    fn any_characters(text in "\\PC{0,400}") {
        check(&text)?;
    }

    #[test]
    fn pieces_of_the_language(pieces in prop::collection::vec(0..PIECES.len(), 0..80)) {
        let text: String = pieces.iter().map(|at| PIECES[*at]).collect();
        check(&text)?;
    }

    /// An example with a stretch cut out of it, or with something put in.
    #[test]
    fn examples_cut_anywhere(example_index in 0usize..8, start in any::<prop::sample::Index>(), len in 0usize..60, piece in 0..PIECES.len()) {
        let names: Vec<&str> = CLEAN.iter().chain(&SEEDED).copied().collect();
        let text = std::fs::read_to_string(root().join(example(names[example_index]))).expect("an example");
        let borders: Vec<usize> = text.char_indices().map(|(at, _)| at).collect();
        let from = start.index(borders.len());
        let to = (from + len).min(borders.len() - 1);
        let mut spoilt = text.clone();
        spoilt.replace_range(borders[from]..borders[to], PIECES[piece]);
        check(&spoilt)?;
    }
}

/// Texts that are made to be slow: each ends, and says something or nothing.
#[test]
fn texts_that_are_made_to_be_slow() {
    let long_line = format!("cbspec 1\nbreaker A\n bays: {}\n", "x, ".repeat(100_000));
    let headings = (0..20_000).fold(String::new(), |text, n| text + &format!("site S{n}\n"));
    let circle = (0..5_000).fold(String::new(), |text, n| text + &format!("family F{n} like F{}\n", (n + 1) % 5_000));
    let brackets = format!("breaker A\n rated voltage: {}\n{}\n", "(".repeat(4_000), "\"".repeat(4_000));
    for text in [long_line, headings, circle, brackets] {
        let assessment = Assessor::standard().assess(&Sources::of("x.cbspec", text.as_str()));
        assert!(!assessment.findings().is_empty());
    }
}
