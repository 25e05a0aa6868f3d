//! Positions of the protocol and byte offsets, both ways.
//!
//! Byte offsets are used everywhere inside; this is the one place where they are converted.

use firstpole_core::Span;

/// What the columns of the protocol count.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq)]
pub enum Encoding {
    /// Bytes.
    Utf8,
    /// Code units of UTF-16: what every client can do.
    #[default]
    Utf16,
}

/// A position of the protocol: line and column from zero.
#[derive(Clone, Copy, Debug, Default, PartialEq, Eq, PartialOrd, Ord)]
pub struct Position {
    /// The line.
    pub line: u32,
    /// The column, in units of the encoding.
    pub column: u32,
}

impl Position {
    /// A position.
    pub const fn new(line: u32, column: u32) -> Self {
        Self { line, column }
    }
}

/// A text with the starts of its lines.
#[derive(Clone, Copy, Debug)]
pub struct View<'a> {
    /// The text.
    pub text: &'a str,
    /// Byte offsets at which lines start; the first is 0.
    pub starts: &'a [u32],
}

impl View<'_> {
    /// The byte offset of a position. One past the end of a line is its end, one inside a character the character's start.
    pub fn offset(&self, position: Position, encoding: Encoding) -> u32 {
        let line = position.line as usize;
        let Some(start) = self.starts.get(line).copied() else { return self.text.len() as u32 };
        let content = self.content(line);
        let wanted = position.column as usize;
        let within = match encoding {
            Encoding::Utf8 => content.floor_char_boundary(wanted),
            Encoding::Utf16 => {
                let mut units = 0;
                content
                    .char_indices()
                    .find(|(_, c)| {
                        units += c.len_utf16();
                        units > wanted
                    })
                    .map_or(content.len(), |(at, _)| at)
            }
        };
        start + within as u32
    }

    /// The position of a byte offset. One past the end of the text is its end, one inside a line's ending the end of the line.
    pub fn position(&self, offset: u32, encoding: Encoding) -> Position {
        let line = self.starts.partition_point(|start| *start <= offset).saturating_sub(1);
        let start = self.starts.get(line).copied().unwrap_or(0);
        let content = self.content(line);
        let before = content.get(..content.floor_char_boundary(offset.saturating_sub(start) as usize)).unwrap_or("");
        let column = match encoding {
            Encoding::Utf8 => before.len(),
            Encoding::Utf16 if before.is_ascii() => before.len(),
            Encoding::Utf16 => before.encode_utf16().count(),
        };
        Position { line: line as u32, column: column as u32 }
    }

    /// Start and end of a span.
    pub fn range(&self, span: Span, encoding: Encoding) -> (Position, Position) {
        (self.position(span.start, encoding), self.position(span.end, encoding))
    }

    /// The text of a line, without its ending.
    fn content(&self, line: usize) -> &str {
        let start = self.starts.get(line).copied().unwrap_or(0) as usize;
        let end = self.starts.get(line + 1).map_or(self.text.len(), |end| *end as usize);
        let whole = self.text.get(start..end).unwrap_or("");
        whole.strip_suffix("\r\n").or_else(|| whole.strip_suffix(['\n', '\r'])).unwrap_or(whole)
    }
}

/// The starts of the lines of a text that is edited.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Lines {
    starts: Vec<u32>,
}

impl Lines {
    /// Those of a text. CR, LF and CRLF end a line.
    pub fn of(text: &str) -> Self {
        let mut starts = vec![0];
        scan(text, 0, text.len(), &mut starts);
        Self { starts }
    }

    /// The starts.
    pub fn starts(&self) -> &[u32] {
        &self.starts
    }

    /// Follows an edit: `text` is the text after it, in which `added` bytes stand where the bytes of `replaced` stood.
    pub fn follow(&mut self, text: &str, replaced: Span, added: usize) {
        let shift = added as i64 - i64::from(replaced.len());
        // One line more on either side is read again, since an edit can join or part a CR and its LF.
        let first = self.starts.partition_point(|start| *start <= replaced.start).saturating_sub(2);
        let last = self.starts.partition_point(|start| *start <= replaced.end) + 1;
        let from = self.starts.get(first).copied().unwrap_or(0) as usize;
        let to = self.starts.get(last).map_or(text.len(), |start| (i64::from(*start) + shift) as usize);
        let mut fresh = Vec::new();
        scan(text, from, to, &mut fresh);
        let kept = self.starts.get(last + 1..).unwrap_or(&[]).iter().map(|start| (i64::from(*start) + shift) as u32);
        fresh.extend(kept);
        self.starts.truncate(first + 1);
        self.starts.extend(fresh);
    }
}

/// Adds the starts of the lines that begin after `from` and not after `to`; `from` begins a line, and so does `to` unless it is
/// the end of the text.
fn scan(text: &str, from: usize, to: usize, starts: &mut Vec<u32>) {
    let bytes = text.as_bytes();
    let mut at = from;
    while let Some(found) = bytes.get(at..to).and_then(|rest| memchr::memchr2(b'\n', b'\r', rest)) {
        at += found + 1;
        if bytes.get(at - 1) == Some(&b'\r') && bytes.get(at) == Some(&b'\n') {
            at += 1;
        }
        starts.push(at as u32);
    }
}

#[cfg(test)]
mod tests {
    use firstpole_core::Sources;
    use proptest::prelude::*;

    use super::*;

    const ENCODINGS: [Encoding; 2] = [Encoding::Utf8, Encoding::Utf16];

    fn view<'a>(text: &'a str, lines: &'a Lines) -> View<'a> {
        View { text, starts: lines.starts() }
    }

    #[test]
    fn columns_in_both_encodings() {
        let text = "a\u{b0}C 😀x\r\nnext\rlast\n";
        let lines = Lines::of(text);
        let view = view(text, &lines);
        let x = text.find('x').expect("x") as u32;
        assert_eq!(view.position(x, Encoding::Utf16), Position::new(0, 6));
        assert_eq!(view.position(x, Encoding::Utf8), Position::new(0, x));
        assert_eq!(view.offset(Position::new(0, 5), Encoding::Utf16), x - 4, "inside the pair");
        assert_eq!(view.offset(Position::new(0, 99), Encoding::Utf16), x + 1, "past the line");
        assert_eq!(view.offset(Position::new(9, 0), Encoding::Utf16), text.len() as u32, "past the text");
        assert_eq!(view.position(x + 2, Encoding::Utf16), Position::new(0, 7), "inside CRLF");
        assert_eq!(view.position(text.len() as u32, Encoding::Utf8), Position::new(3, 0));
    }

    #[test]
    fn a_byte_order_mark_is_one_unit() {
        let text = "\u{feff}ab";
        let lines = Lines::of(text);
        assert_eq!(view(text, &lines).position(3, Encoding::Utf16), Position::new(0, 1));
        assert_eq!(view(text, &lines).position(3, Encoding::Utf8), Position::new(0, 3));
    }

    fn any_text() -> impl Strategy<Value = String> {
        prop::collection::vec(
            prop::sample::select(vec![
                "a", "\u{b0}", "😀", "\r\n", "\n", "\r", "\u{feff}", "e\u{301}", "\u{2028}", " ", "Ω",
            ]),
            0..40,
        )
        .prop_map(|parts| parts.concat())
    }

    proptest! {
        #[test]
        fn there_and_back(text in any_text()) {
            let lines = Lines::of(&text);
            let view = view(&text, &lines);
            for encoding in ENCODINGS {
                for (at, _) in text.char_indices().chain([(text.len(), ' ')]) {
                    let position = view.position(at as u32, encoding);
                    let back = view.offset(position, encoding) as usize;
                    let inside_ending = text.get(..at).is_some_and(|b| b.ends_with('\r'))
                        && text.get(at..).is_some_and(|r| r.starts_with('\n'));
                    prop_assert_eq!(back, if inside_ending { at - 1 } else { at });
                }
            }
        }

        #[test]
        fn any_position_gives_a_border_of_characters(text in any_text(), line in 0u32..20, column in 0u32..40) {
            let lines = Lines::of(&text);
            for encoding in ENCODINGS {
                let offset = view(&text, &lines).offset(Position::new(line, column), encoding);
                prop_assert!(text.is_char_boundary(offset as usize));
            }
        }

        #[test]
        fn the_core_has_the_same_lines(text in any_text()) {
            let sources = Sources::of("a", text.as_str());
            let (_, file) = sources.files().next().expect("a file");
            let lines = Lines::of(&text);
            prop_assert_eq!(file.line_starts(), lines.starts());
        }

        #[test]
        fn lines_follow_edits(text in any_text(), added in any_text(), a in 0usize..80, b in 0usize..80) {
            let (a, b) = (text.floor_char_boundary(a.min(b)), text.floor_char_boundary(a.max(b)));
            let mut lines = Lines::of(&text);
            let mut after = text.clone();
            after.replace_range(a..b, &added);
            lines.follow(&after, Span::new(a as u32, b as u32), added.len());
            prop_assert_eq!(lines, Lines::of(&after));
        }
    }
}
