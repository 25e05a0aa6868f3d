//! Lines: what a specification is made of.

use pest::iterators::Pair;

use super::parser::{Rule, parse};
use super::{Fault, LONGEST_LINE, Look, Span, fault};

/// A text as its lines.
#[derive(Clone, Debug, PartialEq, Default)]
pub struct Document {
    /// The lines, in order; each holds its own ending, so that together they cover the text.
    pub lines: Vec<Line>,
}

/// One line. Spans inside are relative to its start, so that an edit elsewhere leaves them right.
#[derive(Clone, Debug, PartialEq)]
pub struct Line {
    /// Byte offset of its first character in the text.
    pub start: u32,
    /// Bytes before its ending.
    pub len: u32,
    /// What it says.
    pub kind: LineKind,
}

/// What a line says.
#[derive(Clone, Debug, PartialEq)]
pub enum LineKind {
    /// Nothing, or a comment only.
    Blank,
    /// The edition of the language.
    Edition {
        /// Its number; absent where it is too large for one.
        number: Option<u32>,
        /// Where the number stands.
        span: Span,
    },
    /// Another specification whose sheets may be referred to.
    Use {
        /// The path, without its quotes.
        path: String,
        /// Where it stands, with its quotes.
        span: Span,
    },
    /// The heading of a sheet.
    Heading(Heading),
    /// A label and its value.
    Particular(Particular),
    /// A line that cannot be read.
    Broken {
        /// Why.
        fault: Fault,
        /// Where.
        at: Span,
        /// What can still be seen in it.
        look: Look,
    },
}

/// The heading of a sheet: `KIND [NAME] [LINK NAME]...`.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Heading {
    /// The word of its kind.
    pub kind: String,
    /// Where that stands.
    pub kind_span: Span,
    /// Its name.
    pub name: Option<Name>,
    /// Its links.
    pub links: Vec<Link>,
}

/// A name, without quotes.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Name {
    /// The name.
    pub text: String,
    /// Where it stands, with its quotes.
    pub span: Span,
}

/// A link of a heading.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Link {
    /// The word: `on`, `at` ...
    pub word: String,
    /// Where the word stands.
    pub span: Span,
    /// What it names.
    pub name: Name,
}

/// A label and its value.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Particular {
    /// The label, without quotes.
    pub label: String,
    /// Where it stands, with its quotes.
    pub label_span: Span,
    /// Whether it stood in quotes, and is the buyer's own.
    pub own: bool,
    /// What follows the colon; the place just after the colon where nothing follows.
    pub value: ValueText,
}

/// The text of a value, comment and blanks around it left out.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct ValueText {
    /// Where it stands.
    pub span: Span,
    /// What can be told of it without knowing its label.
    pub form: ValueForm,
}

/// What can be told of a value without knowing its label.
#[derive(Clone, Debug, PartialEq, Eq)]
pub enum ValueForm {
    /// Nothing stands there.
    Missing,
    /// `from duty`.
    FromDuty,
    /// `open point`, with who has it and until when.
    OpenPoint(Option<String>),
    /// Anything else.
    Plain,
}

impl Line {
    /// A span of this line as a span of the text.
    pub const fn place(&self, span: Span) -> Span {
        span.shifted(self.start)
    }
}

/// Reads a text. A byte-order mark is passed over; LF, CRLF and CR end a line.
pub fn read(text: &str) -> Document {
    let start = if text.starts_with('\u{feff}') { '\u{feff}'.len_utf8() } else { 0 };
    Document { lines: read_lines(text, start) }
}

/// Reads the lines of a text from byte `start` on, which is the start of a line.
pub fn read_lines(text: &str, mut start: usize) -> Vec<Line> {
    let mut lines = Vec::with_capacity(text.len().saturating_sub(start) / 32);
    loop {
        let rest = text.get(start..).unwrap_or("");
        let (len, ending) = match memchr::memchr2(b'\n', b'\r', rest.as_bytes()) {
            Some(at) if rest.as_bytes().get(at..at + 2) == Some(b"\r\n") => (at, 2),
            Some(at) => (at, 1),
            None => (rest.len(), 0),
        };
        let content = rest.get(..len).unwrap_or("");
        if ending == 0 && content.is_empty() {
            return lines;
        }
        lines.push(Line { start: start as u32, len: len as u32, kind: read_line(content) });
        if ending == 0 {
            return lines;
        }
        start += len + ending;
    }
}

/// Reads one line, without its ending.
pub fn read_line(text: &str) -> LineKind {
    if text.len() > LONGEST_LINE && text.chars().count() > LONGEST_LINE {
        let (_, _, look) = fault::look(text.get(..text.floor_char_boundary(LONGEST_LINE)).unwrap_or(""));
        return LineKind::Broken { fault: Fault::TooLong, at: Span::new(0, text.len() as u32), look };
    }
    let content = text.trim_start();
    if content.is_empty() || content.starts_with('#') {
        return LineKind::Blank;
    }
    if let Ok(mut pairs) = parse(Rule::line, text) {
        let mut parts = pairs.next().into_iter().flat_map(Pair::into_inner);
        return parts.find_map(|pair| kind(pair, text)).unwrap_or(LineKind::Blank);
    }
    let (fault, at, look) = fault::look(text);
    LineKind::Broken { fault, at, look }
}

fn kind(pair: Pair<'_, Rule>, text: &str) -> Option<LineKind> {
    match pair.as_rule() {
        Rule::edition => {
            let number = pair.into_inner().find(|p| p.as_rule() == Rule::edition_number)?;
            Some(LineKind::Edition { number: number.as_str().parse().ok(), span: number.as_span().into() })
        }
        Rule::use_file => {
            let path = pair.into_inner().find(|p| p.as_rule() == Rule::quoted)?;
            Some(LineKind::Use { path: unquoted(path.as_str()).to_owned(), span: path.as_span().into() })
        }
        Rule::heading => heading(pair).map(LineKind::Heading),
        Rule::particular => particular(pair, text).map(LineKind::Particular),
        _ => None,
    }
}

fn heading(pair: Pair<'_, Rule>) -> Option<Heading> {
    let mut kind = None;
    let mut own_name = None;
    let mut links = Vec::new();
    for part in pair.into_inner() {
        match part.as_rule() {
            Rule::kind => kind = Some((part.as_str().to_owned(), Span::from(part.as_span()))),
            Rule::name => own_name = Some(name(&part)),
            Rule::link => {
                let mut parts = part.into_inner();
                let (word, target) = (parts.next()?, parts.next()?);
                links.push(Link { word: word.as_str().to_owned(), span: word.as_span().into(), name: name(&target) });
            }
            _ => {}
        }
    }
    let (kind, kind_span) = kind?;
    Some(Heading { kind, kind_span, name: own_name, links })
}

fn name(pair: &Pair<'_, Rule>) -> Name {
    Name { text: unquoted(pair.as_str()).to_owned(), span: pair.as_span().into() }
}

fn particular(pair: Pair<'_, Rule>, text: &str) -> Option<Particular> {
    let mut label = None;
    let mut after_colon = pair.as_span().end() as u32;
    let mut value = None;
    for part in pair.into_inner() {
        match part.as_rule() {
            Rule::label => label = Some(part),
            Rule::colon => after_colon = part.as_span().end() as u32,
            Rule::value => value = part.into_inner().next(),
            _ => {}
        }
    }
    let label = label?;
    let value = match value {
        None => ValueText { span: Span::new(after_colon, after_colon), form: ValueForm::Missing },
        Some(part) => {
            let span = fault::trimmed(text, part.as_span().start(), part.as_span().end());
            let form = match part.as_rule() {
                Rule::from_duty => ValueForm::FromDuty,
                Rule::open_point => {
                    let who = part.into_inner().find(|p| p.as_rule() == Rule::quoted);
                    ValueForm::OpenPoint(who.map(|p| unquoted(p.as_str()).to_owned()))
                }
                _ => ValueForm::Plain,
            };
            ValueText { span, form }
        }
    };
    let own = label.as_str().starts_with('"');
    Some(Particular { label: unquoted(label.as_str()).to_owned(), label_span: label.as_span().into(), own, value })
}

pub(crate) fn unquoted(text: &str) -> &str {
    text.strip_prefix('"').and_then(|t| t.strip_suffix('"')).unwrap_or(text)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn particular_of(text: &str) -> Particular {
        match read_line(text) {
            LineKind::Particular(particular) => particular,
            other => panic!("{text}: {other:?}"),
        }
    }

    fn heading_of(text: &str) -> Heading {
        match read_line(text) {
            LineKind::Heading(heading) => heading,
            other => panic!("{text}: {other:?}"),
        }
    }

    fn fault_of(text: &str) -> (Fault, Look) {
        match read_line(text) {
            LineKind::Broken { fault, look, .. } => (fault, look),
            other => panic!("{text}: {other:?}"),
        }
    }

    #[test]
    fn labels_and_values() {
        let text = "    rated   voltage :  145 kV   # as the ring";
        let particular = particular_of(text);
        assert_eq!(particular.label, "rated   voltage");
        assert_eq!(particular.value.span.of(text), "145 kV");
        let text = "Ik\": 28.4 kA";
        assert_eq!(particular_of(text).label, "Ik\"");
        let text = "\"colour: of the cubicle\": \"light # grey\"# own";
        let particular = particular_of(text);
        assert!(particular.own);
        assert_eq!(particular.label, "colour: of the cubicle");
        assert_eq!(particular.value.span.of(text), "\"light # grey\"");
        assert_eq!(particular_of("standards: IEC 62271-1:2017, IEC 62271-100:2021").label, "standards");
    }

    #[test]
    fn a_hash_inside_a_word_is_no_comment() {
        let text = "drawing: A#12 # the layout";
        assert_eq!(particular_of(text).value.span.of(text), "A#12");
    }

    #[test]
    fn values_that_are_the_same_under_every_label() {
        assert_eq!(particular_of("a: from  duty # x").value.form, ValueForm::FromDuty);
        assert_eq!(particular_of("a:").value.form, ValueForm::Missing);
        assert_eq!(particular_of("a: # later").value.form, ValueForm::Missing);
        assert_eq!(particular_of("a: open point").value.form, ValueForm::OpenPoint(None));
        assert_eq!(
            particular_of("a: open point \"B, until May\"").value.form,
            ValueForm::OpenPoint(Some("B, until May".into()))
        );
        assert_eq!(particular_of("a: from dutyx").value.form, ValueForm::Plain);
    }

    #[test]
    fn headings_and_links() {
        let heading = heading_of("breaker LineBay on Ring132 at \"North Yard\" like Family1 # bay 3");
        assert_eq!(heading.kind, "breaker");
        assert_eq!(heading.name.expect("name").text, "LineBay");
        let links: Vec<_> = heading.links.iter().map(|l| (l.word.as_str(), l.name.text.as_str())).collect();
        assert_eq!(links, [("on", "Ring132"), ("at", "North Yard"), ("like", "Family1")]);
        let heading = heading_of("deviation from gas-liquefaction in LineBay");
        assert_eq!(heading.name, None);
        assert_eq!(heading.links.len(), 2);
        assert_eq!(heading_of("tender \"A: B\"").name.expect("title").text, "A: B");
        assert_eq!(heading_of("site Ñandú").name.expect("letters").text, "Ñandú");
    }

    #[test]
    fn edition_and_use() {
        assert!(matches!(read_line("cbspec 1"), LineKind::Edition { number: Some(1), .. }));
        assert!(matches!(read_line("cbspec 99999999999"), LineKind::Edition { number: None, .. }));
        assert!(
            matches!(read_line("use \"families/lines.cbspec\""), LineKind::Use { path, .. } if path == "families/lines.cbspec")
        );
    }

    #[test]
    fn broken_lines_say_why_and_keep_what_can_be_seen() {
        let text = "reason: \"not closed";
        let (fault, look) = fault_of(text);
        assert_eq!(fault, Fault::UnclosedText);
        assert!(matches!(look, Look::Particular { label, .. } if label.of(text) == "reason"));
        let (fault, look) = fault_of("breaker LineBay on");
        assert_eq!(fault, Fault::Heading);
        assert!(matches!(look, Look::Heading { name: Some(name), .. } if name.text == "LineBay"));
        assert_eq!(fault_of("rated voltage 145 kV").0, Fault::MissingColon);
        assert_eq!(fault_of(": 145 kV").0, Fault::MissingLabel);
        assert_eq!(fault_of("use families").0, Fault::Use);
        assert_eq!(fault_of("cbspec one").0, Fault::Edition);
        assert_eq!(fault_of(&"x".repeat(5000)).0, Fault::TooLong);
    }

    #[test]
    fn endings_and_marks() {
        let text = "\u{feff}cbspec 1\r\n\r\nsystem A\r  frequency: 50 Hz\n\tX/R: 14";
        let document = read(text);
        assert_eq!(document.lines.len(), 5);
        assert!(matches!(document.lines[0].kind, LineKind::Edition { .. }));
        assert_eq!(document.lines[0].start, 3);
        let last = &document.lines[4];
        let LineKind::Particular(p) = &last.kind else { panic!("{last:?}") };
        assert_eq!(last.place(p.value.span).of(text), "14");
        assert_eq!(read("").lines, []);
        assert_eq!(read("\n\n").lines.len(), 2);
    }

    #[test]
    fn the_longest_line_is_read_within_the_call_limit() {
        let value = "a, ".repeat((LONGEST_LINE - 10) / 3);
        assert!(matches!(read_line(&format!("bays: {value}b")), LineKind::Particular(_)));
        let text = format!("bays: {}", "( ".repeat(2000));
        assert!(matches!(read_line(&text), LineKind::Particular(_)));
        let list = "a1 b2, ".repeat(580);
        assert!(crate::value::list(list.trim_end_matches(", ")).is_ok());
        let number = format!("{} kV", "1 234".repeat(1000));
        assert!(crate::value::quantity(&number).is_err());
    }
}
