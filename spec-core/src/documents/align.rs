//! The aligner: columns and spacing of a specification, and nothing else.
//!
//! Sheets begin at the margin with one blank line before them, particulars are indented by four, values stand in one column, and
//! comments behind them in one column a sheet. A line that cannot be read stays as it is, and so does one that would be read as
//! anything else.

use firstpole_grammar::{Heading, Line, LineKind, Span, read, read_line};

/// Blanks before a particular.
const INDENT: usize = 4;

/// The column in which values stand, counted from zero.
const COLUMN: usize = 45;

/// Blanks between a label or a value and what follows, where the column is passed.
const GAP: usize = 2;

/// A change of the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Change {
    /// What is replaced: a line with its ending.
    pub span: Span,
    /// What stands there then.
    pub text: String,
}

/// The text as the aligner sets it.
pub fn align(text: &str) -> String {
    let mut aligned = String::with_capacity(text.len());
    let mut done = 0;
    for change in changes(text) {
        aligned.push_str(text.get(done..change.span.start as usize).unwrap_or(""));
        aligned.push_str(&change.text);
        done = change.span.end as usize;
    }
    aligned.push_str(text.get(done..).unwrap_or(""));
    aligned
}

/// What the aligner changes, line by line, in the order of the text.
pub fn changes(text: &str) -> Vec<Change> {
    let document = read(text);
    let lines: Vec<Row<'_>> = document.lines.iter().map(|line| Row::of(text, line)).collect();
    let mut changes = Vec::new();
    let mut before = Before::Start;
    for sheet in lines.chunk_by(|_, next| !matches!(next.line.kind, LineKind::Heading(_))) {
        let comments = sheet.iter().filter_map(|row| row.comment.map(|_| width(&row.content) + GAP)).max().unwrap_or(0);
        let inside = sheet.first().is_some_and(|row| matches!(row.line.kind, LineKind::Heading(_)));
        for row in sheet {
            let mut new = row.set(comments, inside);
            if row.is_blank() {
                // One blank line parts what was parted by several.
                if before == Before::Blank {
                    new.clear();
                }
                before = Before::Blank;
            } else {
                let opens = matches!(row.line.kind, LineKind::Heading(_));
                if opens && before == Before::Text {
                    new.insert_str(0, if row.ending.is_empty() { "\n" } else { row.ending });
                }
                let is_comment = matches!(row.line.kind, LineKind::Blank);
                before = if is_comment { Before::Comment } else { Before::Text };
            }
            if new != row.whole.of(text) {
                changes.push(Change { span: row.whole, text: new });
            }
        }
    }
    changes
}

/// What stands above a line.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Before {
    Start,
    Blank,
    /// A comment: it belongs to the sheet that it stands above.
    Comment,
    Text,
}

/// A line cut into what the aligner moves.
struct Row<'a> {
    line: &'a Line,
    /// The line without its ending.
    text: &'a str,
    ending: &'a str,
    /// The line with its ending.
    whole: Span,
    /// The line as it is set, without its comment.
    content: String,
    comment: Option<&'a str>,
}

impl<'a> Row<'a> {
    fn of(text: &'a str, line: &'a Line) -> Self {
        let content = Span::new(line.start, line.start + line.len);
        let rest = text.get(content.end as usize..).unwrap_or("");
        let ending = ["\r\n", "\n", "\r"].into_iter().find(|ending| rest.starts_with(ending)).unwrap_or("");
        let whole = Span::new(content.start, content.end + ending.len() as u32);
        let text = content.of(text);
        let (set, end) = set(&line.kind, text);
        let comment = end.and_then(|end| text.get(end as usize..)).map(str::trim).filter(|rest| rest.starts_with('#'));
        Self { line, text, ending, whole, content: set, comment }
    }

    fn is_blank(&self) -> bool {
        matches!(self.line.kind, LineKind::Blank) && self.text.trim().is_empty()
    }

    /// The line with its ending, comments in this column.
    fn set(&self, comments: usize, inside: bool) -> String {
        let mut new = match (&self.line.kind, self.comment) {
            (LineKind::Broken { .. }, _) => self.text.to_owned(),
            (LineKind::Blank, _) => {
                let indented = inside && self.text.starts_with([' ', '\t']) && !self.is_blank();
                format!("{}{}", " ".repeat(if indented { INDENT } else { 0 }), self.text.trim())
            }
            (_, None) => self.content.clone(),
            (_, Some(comment)) => {
                let gap = comments.saturating_sub(width(&self.content)).max(GAP);
                format!("{}{}{comment}", self.content, " ".repeat(gap))
            }
        };
        if !is_alike(&self.line.kind, self.text, &read_line(&new), &new) {
            self.text.clone_into(&mut new);
        }
        new.push_str(self.ending);
        new
    }
}

/// A line as it is set, without its comment, and where what is set ends in it.
fn set(kind: &LineKind, text: &str) -> (String, Option<u32>) {
    match kind {
        LineKind::Blank | LineKind::Broken { .. } => (String::new(), None),
        LineKind::Edition { span, .. } => (format!("cbspec {}", span.of(text)), Some(span.end)),
        LineKind::Use { span, .. } => (format!("use {}", span.of(text)), Some(span.end)),
        LineKind::Heading(heading) => {
            let spans = spans_of(heading);
            let words: Vec<&str> = spans.iter().map(|span| span.of(text)).collect();
            (words.join(" "), spans.last().map(|span| span.end))
        }
        LineKind::Particular(particular) => {
            let label = particular.label_span.of(text).trim_end();
            let value = particular.value.span.of(text).trim();
            let mut line = format!("{}{label}:", " ".repeat(INDENT));
            if !value.is_empty() {
                let gap = COLUMN.saturating_sub(width(&line)).max(GAP);
                line.push_str(&" ".repeat(gap));
                line.push_str(value);
            }
            (line, Some(particular.value.span.end))
        }
    }
}

fn spans_of(heading: &Heading) -> Vec<Span> {
    let name = heading.name.iter().map(|name| name.span);
    let links = heading.links.iter().flat_map(|link| [link.span, link.name.span]);
    [heading.kind_span].into_iter().chain(name).chain(links).collect()
}

/// Whether two lines say the same, wherever in the line they say it.
fn is_alike(old: &LineKind, old_text: &str, new: &LineKind, new_text: &str) -> bool {
    match (old, new) {
        (LineKind::Blank, LineKind::Blank) => old_text.trim() == new_text.trim(),
        (LineKind::Broken { .. }, LineKind::Broken { .. }) => old_text == new_text,
        (LineKind::Edition { number: old, .. }, LineKind::Edition { number: new, .. }) => old == new,
        (LineKind::Use { path: old, .. }, LineKind::Use { path: new, .. }) => old == new,
        (LineKind::Heading(old), LineKind::Heading(new)) => {
            let links = |heading: &Heading| -> Vec<(String, String)> {
                heading.links.iter().map(|link| (link.word.clone(), link.name.text.clone())).collect()
            };
            let name = |heading: &Heading| heading.name.as_ref().map(|name| name.text.clone());
            old.kind == new.kind && name(old) == name(new) && links(old) == links(new)
        }
        (LineKind::Particular(old), LineKind::Particular(new)) => {
            let value = |span: Span, text: &str| span.of(text).to_owned();
            (&old.label, old.own, &old.value.form, value(old.value.span, old_text))
                == (&new.label, new.own, &new.value.form, value(new.value.span, new_text))
        }
        _ => false,
    }
}

/// Columns that a text takes; good enough for letters, and for the signs of units.
fn width(text: &str) -> usize {
    text.chars().count()
}

#[cfg(test)]
mod tests {
    use proptest::prelude::*;

    use super::*;

    #[test]
    fn columns_and_spacing() {
        let text = "cbspec   1   # first\n\n\n\nsystem   Ring\n  nominal voltage :132 kV # n\n\thighest voltage: 145 kV\n\
                    breaker \"Bay 1\" on  Ring # b\n# above\nsite Yard\n  rated short-duration power-frequency withstand voltage: 1 kV\n    \"own\":\"a  b\"\n # c\nx:\n";
        let aligned = "cbspec 1  # first\n\nsystem Ring\n    nominal voltage:                         132 kV  # n\n    \
                       highest voltage:                         145 kV\n\nbreaker \"Bay 1\" on Ring  # b\n# above\nsite Yard\n    \
                       rated short-duration power-frequency withstand voltage:  1 kV\n    \"own\":                                   \"a  b\"\n    # c\n    x:\n";
        assert_eq!(align(text), aligned);
        assert!(changes(aligned).is_empty());
    }

    #[test]
    fn endings_and_what_cannot_be_read_stay() {
        for text in [
            "\u{feff}cbspec 1\r\n\r\nsystem Ring\r\n    frequency:                               50 Hz",
            "  what is this??? \n",
            "system Ring on\n",
            "",
            "\n",
        ] {
            assert_eq!(align(text), text);
        }
        assert_eq!(
            align("site A\r\naltitude: 3 m\r\nsite B\r\n"),
            "site A\r\n    altitude:                                3 m\r\n\r\nsite B\r\n"
        );
        assert_eq!(align("site A"), "site A");
    }

    #[test]
    fn comments_of_a_sheet_stand_in_one_column() {
        let aligned = align("site A\naltitude: 3 m # a\npollution: d very heavy # b\n");
        let columns: Vec<_> = aligned.lines().filter_map(|line| line.find('#')).collect();
        assert_eq!(columns.len(), 2);
        assert_eq!(columns.first(), columns.last());
    }

    proptest! {
        #[test]
        fn twice_is_once(text in "(site A|breaker B on C| Ur: 1 kV|\tx :y|#c| # d|\"a\": \"b # c\"|use \"f\"|cbspec 1|\r\n|\n|\n\n|µ|:| ){0,20}") {
            let once = align(&text);
            prop_assert_eq!(align(&once), once.clone());
            let said = |text: &str| -> Vec<String> {
                read(text).lines.iter().map(|line| Row::of(text, line)).filter(|row| !row.is_blank()).map(|row| {
                    match &row.line.kind {
                        LineKind::Broken { .. } | LineKind::Blank => row.text.trim().to_owned(),
                        LineKind::Particular(p) => format!("{} {:?} {}", p.label, p.value.form, p.value.span.of(row.text)),
                        _ => row.content.clone(),
                    }
                }).collect()
            };
            prop_assert_eq!(said(&text), said(&once));
        }
    }
}
