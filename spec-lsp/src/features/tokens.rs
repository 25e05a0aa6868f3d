//! Semantic tokens: what every word of a line is.

use firstpole_core::particular::SheetKind;
use firstpole_core::source::LineAt;
use firstpole_core::{Assessment, FileId, Span};
use firstpole_grammar::{LineKind, Look, ValueForm};

use super::spot::{particular_of, sheet_at, text_of};

/// What a word is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum TokenKind {
    /// The word of a heading, of a link, of the edition, of `use`; `from duty`, `open point`.
    Keyword,
    /// The name of a sheet.
    Name,
    /// A label that is known in its sheet.
    Label,
    /// A label that is not, or the buyer's own.
    OtherLabel,
    /// A number.
    Number,
    /// A unit, and the words that belong to it.
    Unit,
    /// A quoted text.
    Text,
    /// A comment.
    Comment,
}

impl TokenKind {
    /// All of them, in the order of their numbers.
    pub const ALL: [Self; 8] =
        [Self::Keyword, Self::Name, Self::Label, Self::OtherLabel, Self::Number, Self::Unit, Self::Text, Self::Comment];
}

/// A word and what it is.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Token {
    /// Where it stands; never over a line's end.
    pub span: Span,
    /// What it is.
    pub kind: TokenKind,
}

/// The tokens of a file, in the order of the text; they do not overlap.
pub fn tokens(assessment: &Assessment, file: FileId) -> Vec<Token> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let mut tokens = Vec::new();
    let mut kind = None;
    for line in source.lines() {
        let text = text_of(source, line);
        let mut row = Row { line, text, tokens: &mut tokens, at: 0 };
        match line.kind {
            LineKind::Blank => {}
            LineKind::Edition { span, .. } => {
                row.word("cbspec");
                row.add(*span, TokenKind::Number);
            }
            LineKind::Use { span, .. } => {
                row.word("use");
                row.add(*span, TokenKind::Text);
            }
            LineKind::Heading(heading) => {
                kind = SheetKind::read(&heading.kind);
                if kind.is_none() {
                    // Read as the nearest kind, if there is one.
                    kind = sheet_at(assessment, file, line.start).map(|sheet| sheet.kind);
                }
                row.add(heading.kind_span, TokenKind::Keyword);
                if let Some(name) = &heading.name {
                    row.add(name.span, TokenKind::Name);
                }
                for link in &heading.links {
                    row.add(link.span, TokenKind::Keyword);
                    row.add(link.name.span, TokenKind::Name);
                }
            }
            LineKind::Particular(particular) => {
                let known = kind.is_some_and(|kind| particular_of(kind, &particular.label).is_some());
                let label = if known && !particular.own { TokenKind::Label } else { TokenKind::OtherLabel };
                row.add(particular.label_span, label);
                match particular.value.form {
                    ValueForm::FromDuty | ValueForm::OpenPoint(_) => row.add(particular.value.span, TokenKind::Keyword),
                    ValueForm::Missing => {}
                    ValueForm::Plain => row.value(particular.value.span),
                }
            }
            LineKind::Broken { look, .. } => match look {
                Look::Heading { kind: word, .. } => {
                    kind = SheetKind::read(word.of(text));
                    row.add(*word, TokenKind::Keyword);
                }
                Look::Particular { label, .. } => row.add(*label, TokenKind::OtherLabel),
                Look::Nothing => {}
            },
        }
        row.comment();
    }
    tokens
}

struct Row<'a> {
    line: LineAt<'a>,
    text: &'a str,
    tokens: &'a mut Vec<Token>,
    /// The end of the last token, within the line.
    at: u32,
}

impl Row<'_> {
    fn add(&mut self, span: Span, kind: TokenKind) {
        if span.start >= self.at && span.end > span.start && span.end <= self.line.len {
            self.tokens.push(Token { span: self.line.place(span), kind });
            self.at = span.end;
        }
    }

    fn word(&mut self, word: &str) {
        let start = self.text.len() - self.text.trim_start().len();
        self.add(Span::new(start as u32, (start + word.len()) as u32), TokenKind::Keyword);
    }

    /// Numbers, units after them and quoted texts of a value. What the words mean is the business of the hover.
    fn value(&mut self, span: Span) {
        let value = span.of(self.text);
        let mut at = 0;
        let mut after_number = false;
        while let Some(rest) = value.get(at..).filter(|rest| !rest.is_empty()) {
            let blank = rest.len() - rest.trim_start().len();
            if blank > 0 {
                at += blank;
                continue;
            }
            let start = at;
            let kind = if let Some(inner) = rest.strip_prefix('"') {
                at += inner.find('"').map_or(rest.len(), |end| end + 2);
                Some(TokenKind::Text)
            } else {
                let word = rest.split_whitespace().next().unwrap_or(rest);
                let digits = word.trim_start_matches(['-', '+', '(', '\u{2212}', '\u{2013}', '<', '>', '=']);
                if digits.starts_with(|c: char| c.is_ascii_digit()) {
                    let lead = word.len() - digits.len();
                    let signed = usize::from(word.get(..lead).is_some_and(|lead| lead.ends_with(['-', '+'])));
                    let end = digits
                        .find(|c: char| !(c.is_ascii_digit() || matches!(c, '.' | ',' | ':' | '-')))
                        .unwrap_or(digits.len());
                    let number = Span::new((start + lead - signed) as u32, (start + lead + end) as u32);
                    self.add(number.shifted(span.start), TokenKind::Number);
                    at += lead + end;
                    after_number = true;
                    continue;
                }
                at += word.len();
                let connective = matches!(word, "to" | "at" | "for" | "or" | "and" | "-" | "+" | "\u{2013}");
                let unit =
                    after_number && !connective && !word.starts_with(|c: char| c.is_ascii_uppercase() && word == "CO");
                after_number = unit;
                unit.then_some(TokenKind::Unit)
            };
            if let Some(kind) = kind {
                let end = start + value.get(start..at).unwrap_or("").trim_end_matches([',', ')']).len();
                self.add(Span::new((start as u32) + span.start, end as u32 + span.start), kind);
            }
        }
    }

    fn comment(&mut self) {
        let rest = self.text.get(self.at as usize..).unwrap_or("");
        let found = rest.match_indices('#').map(|(at, _)| at).find(|at| {
            // A quoted text and a word may hold the sign; a comment begins the line or follows a blank.
            let before = rest.get(..*at).unwrap_or("");
            let blank = before.is_empty() || before.ends_with(|c: char| c.is_whitespace()) || before.ends_with('"');
            blank && before.matches('"').count().is_multiple_of(2)
        });
        if let Some(at) = found {
            let start = self.at + at as u32;
            self.add(Span::new(start, self.line.len), TokenKind::Comment);
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{assessed, text_of};

    fn told(text: &str) -> Vec<(String, TokenKind)> {
        let assessment = assessed(text);
        tokens(&assessment, FileId(0))
            .iter()
            .map(|token| (text_of(&assessment, token.span).to_owned(), token.kind))
            .collect()
    }

    fn line(sheet: &str, text: &str) -> Vec<(String, TokenKind)> {
        told(&format!("{sheet}\n{text}\n")).split_off(2)
    }

    #[test]
    fn headings_edition_and_use() {
        use TokenKind::{Comment, Keyword, Name, Number, Text};
        let told = told("cbspec 1\nuse \"a b\" # why\nbreaker \"A B\" on R at Y\n");
        let expected = [
            ("cbspec", Keyword),
            ("1", Number),
            ("use", Keyword),
            ("\"a b\"", Text),
            ("# why", Comment),
            ("breaker", Keyword),
            ("\"A B\"", Name),
            ("on", Keyword),
            ("R", Name),
            ("at", Keyword),
            ("Y", Name),
        ];
        assert_eq!(told, expected.map(|(text, kind)| (text.to_owned(), kind)));
    }

    #[test]
    fn labels_and_values() {
        use TokenKind::{Comment, Keyword, Label, Number, OtherLabel, Text, Unit};
        let check = |text: &str, expected: &[(&str, TokenKind)]| {
            let expected: Vec<_> = expected.iter().map(|(text, kind)| ((*text).to_owned(), *kind)).collect();
            assert_eq!(line("breaker B", text), expected, "{text}");
        };
        check(
            "rated voltage: 1 425 kV # x",
            &[("rated voltage", Label), ("1", Number), ("425", Number), ("kV", Unit), ("# x", Comment)],
        );
        check("making current: from duty", &[("making current", Label), ("from duty", Keyword)]);
        check("\"own # a\": \"b # c\"", &[("\"own # a\"", OtherLabel), ("\"b # c\"", Text)]);
        check("nothing such: 45ms", &[("nothing such", OtherLabel), ("45", Number), ("ms", Unit)]);
        check(
            "operating sequence: O - 0.3 s - CO - 3 min - CO",
            &[("operating sequence", Label), ("0.3", Number), ("s", Unit), ("3", Number), ("min", Unit)],
        );
        check("ambient: -25 to 40 degC", &[("ambient", OtherLabel), ("-25", Number), ("40", Number), ("degC", Unit)]);
    }

    #[test]
    fn never_over_each_other_and_in_order() {
        let text = crate::features::testing::BAY.replace(':', " : ° \"");
        let assessment = assessed(&text);
        let tokens = tokens(&assessment, FileId(0));
        assert!(tokens.windows(2).all(|pair| pair[0].span.end <= pair[1].span.start));
        assert!(tokens.iter().all(|token| text.get(token.span.start as usize..token.span.end as usize).is_some()));
    }
}
