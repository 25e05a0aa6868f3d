//! What the tests of the features share.

use firstpole_core::{Assessment, Assessor, FileId, Sources, Span};

/// A small specification.
pub const BAY: &str = "cbspec 1

system Ring132
    highest voltage:    145 kV
    frequency:          50 Hz
    neutral:            effectively earthed
    short-circuit current: 28.4 kA
    X/R:                21

site Yard
    installation:       outdoor
    lowest ambient:     -25 degC

breaker LineBay on Ring132 at Yard
    rated voltage:      145 kV
    Isc:                31.5 kA
    DC time constant:   45 ms
    making current:     from duty
    insulating gas:     SF6
    rated filling pressure: 0.70 MPa abs

circuit Line1 for LineBay
    kind:               overhead line
    load current:       1150 A
";

/// The assessment of one text.
pub fn assessed(text: &str) -> Assessment {
    Assessor::standard().assess(&Sources::of("bay.cbspec", text))
}

/// A text with `|` at the cursor: the assessment of the text without it, and its offset.
pub fn at_cursor(text: &str) -> (Assessment, u32) {
    let at = text.find('|').expect("a cursor");
    (assessed(&text.replacen('|', "", 1)), at as u32)
}

/// Puts a cursor behind the first place of `before` in [`BAY`].
pub fn bay_after(before: &str) -> (Assessment, u32) {
    let at = BAY.find(before).unwrap_or_else(|| panic!("{before} is not in the bay")) + before.len();
    (assessed(BAY), at as u32)
}

/// The text of a span of the first file.
pub fn text_of(assessment: &Assessment, span: Span) -> &str {
    span.of(&assessment.sources.file(FileId(0)).expect("a file").text)
}
