//! What is wrong with a line, and what a lenient second look still sees in it.

use super::{Name, Span};

/// Why a line could not be read.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Fault {
    /// A text in quotes is not closed.
    UnclosedText,
    /// Neither a heading nor a particular: the colon after the label is missing.
    MissingColon,
    /// A colon with no label before it.
    MissingLabel,
    /// A heading whose link names nothing, or that goes on after its links.
    Heading,
    /// `use` without a path in quotes.
    Use,
    /// `cbspec` without a whole number.
    Edition,
    /// Longer than the longest line.
    TooLong,
}

impl Fault {
    /// A sentence that says what is wrong and what would be right.
    pub const fn sentence(self) -> &'static str {
        match self {
            Self::UnclosedText => "a text in quotes is not closed on this line",
            Self::MissingColon => "this is neither a heading nor a particular: a particular is written LABEL: VALUE",
            Self::MissingLabel => "a label is missing before the colon",
            Self::Heading => {
                "this heading cannot be read: it is written KIND NAME, then pairs such as on SYSTEM or at SITE"
            }
            Self::Use => "use wants the path of a specification in quotes: use \"families/lines.cbspec\"",
            Self::Edition => "the edition is a whole number: cbspec 1",
            Self::TooLong => "this line is longer than 4096 characters and was not read",
        }
    }
}

/// What a lenient look still sees in a line that cannot be read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum Look {
    /// A label, and something after a colon.
    Particular {
        /// The label.
        label: Span,
        /// What follows the colon.
        rest: Span,
    },
    /// The first word of the line, and a name after it.
    Heading {
        /// The first word.
        kind: Span,
        /// The second word, if there is one.
        name: Option<Name>,
    },
    /// Nothing.
    Nothing,
}

/// A lenient look at `text`, a line that the grammar refused.
pub(crate) fn look(text: &str) -> (Fault, Span, Look) {
    let whole = trimmed(text, 0, text.len());
    let first_word = whole.of(text).split_whitespace().next().unwrap_or("");
    let colon = colon(text);
    let look = match colon {
        Some(at) => Look::Particular { label: trimmed(text, 0, at), rest: trimmed(text, at + 1, text.len()) },
        None => heading(text, whole),
    };
    if let Some(quote) = unclosed_quote(text) {
        return (Fault::UnclosedText, Span::new(quote, whole.end.max(quote + 1)), look);
    }
    let fault = match colon {
        Some(at) if trimmed(text, 0, at).is_empty() => Fault::MissingLabel,
        _ if first_word.eq_ignore_ascii_case("use") => Fault::Use,
        _ if first_word.eq_ignore_ascii_case("cbspec") => Fault::Edition,
        Some(_) => Fault::MissingColon,
        None => {
            let linked = whole.of(text).split_whitespace().skip(1);
            let has_link = linked
                .into_iter()
                .any(|w| matches!(w, "on" | "at" | "into" | "for" | "like" | "from" | "in" | "through"));
            if has_link { Fault::Heading } else { Fault::MissingColon }
        }
    };
    (fault, whole, look)
}

fn heading(text: &str, whole: Span) -> Look {
    let mut words = whole.of(text).split_whitespace();
    let Some(kind) = words.next() else { return Look::Nothing };
    let kind_span = Span::new(whole.start, whole.start + kind.len() as u32);
    let name = words.next().map(|name| {
        let start = (name.as_ptr() as usize - text.as_ptr() as usize) as u32;
        let span = Span::new(start, start + name.len() as u32);
        Name { span, text: name.trim_matches('"').to_owned() }
    });
    Look::Heading { kind: kind_span, name }
}

/// The first colon outside quotes, where a quote opens only at the start or after a blank.
fn colon(text: &str) -> Option<usize> {
    let mut quoted = false;
    let mut after_blank = true;
    for (at, c) in text.char_indices() {
        match c {
            '"' if quoted => quoted = false,
            '"' if after_blank => quoted = true,
            ':' if !quoted => return Some(at),
            '#' if !quoted && after_blank => return None,
            _ => {}
        }
        after_blank = c.is_whitespace();
    }
    None
}

fn unclosed_quote(text: &str) -> Option<u32> {
    let mut open = None;
    let mut after_blank = true;
    for (at, c) in text.char_indices() {
        match c {
            '"' if open.is_some() => open = None,
            '"' if after_blank => open = Some(at as u32),
            '#' if open.is_none() && after_blank => return None,
            _ => {}
        }
        after_blank = c.is_whitespace() || matches!(c, ':' | ',');
    }
    open
}

pub(crate) fn trimmed(text: &str, start: usize, end: usize) -> Span {
    let part = text.get(start..end).unwrap_or("");
    let left = part.len() - part.trim_start().len();
    let right = part.trim_end().len();
    if right < left {
        Span::new(start as u32, start as u32)
    } else {
        Span::new((start + left) as u32, (start + right) as u32)
    }
}
