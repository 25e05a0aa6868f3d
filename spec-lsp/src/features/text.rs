//! Short texts for a hover or the documentation of a proposal, for clients that show Markdown and for those that do not.

use base64::Engine;
use base64::prelude::BASE64_STANDARD;

/// A short text.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Text {
    parts: Vec<Part>,
}

#[derive(Clone, Debug, PartialEq, Eq)]
enum Part {
    Title(String),
    Sentence(String),
    Table(Vec<(String, String)>),
    Formula(String),
    Picture {
        /// What it shows, in words.
        words: String,
        svg: String,
    },
}

impl Text {
    /// An empty one.
    pub fn new() -> Self {
        Self::default()
    }

    /// Adds a title.
    #[must_use]
    pub fn title(mut self, text: impl Into<String>) -> Self {
        self.parts.push(Part::Title(text.into()));
        self
    }

    /// Adds a sentence.
    #[must_use]
    pub fn sentence(mut self, text: impl Into<String>) -> Self {
        self.parts.push(Part::Sentence(text.into()));
        self
    }

    /// Adds a table of two columns, unless it is empty.
    #[must_use]
    pub fn table(mut self, rows: Vec<(String, String)>) -> Self {
        if !rows.is_empty() {
            self.parts.push(Part::Table(rows));
        }
        self
    }

    /// Adds a line of arithmetic.
    #[must_use]
    pub fn formula(mut self, text: impl Into<String>) -> Self {
        self.parts.push(Part::Formula(text.into()));
        self
    }

    /// Adds a picture, which only Markdown shows.
    #[must_use]
    pub fn picture(mut self, words: impl Into<String>, svg: Option<String>) -> Self {
        self.parts.extend(svg.map(|svg| Part::Picture { words: words.into(), svg }));
        self
    }

    /// Adds all of another.
    #[must_use]
    pub fn and(mut self, other: Self) -> Self {
        self.parts.extend(other.parts);
        self
    }

    /// In Markdown.
    pub fn markdown(&self) -> String {
        let parts: Vec<String> = self
            .parts
            .iter()
            .map(|part| match part {
                Part::Title(text) => format!("**{}**", escaped(text)),
                Part::Sentence(text) => escaped(text),
                Part::Formula(text) => format!("`{}`", text.replace('`', "'")),
                Part::Picture { words, svg } => {
                    format!("![{}](data:image/svg+xml;base64,{})", escaped(words), BASE64_STANDARD.encode(svg))
                }
                Part::Table(rows) => {
                    let rows: Vec<String> = rows
                        .iter()
                        .map(|(left, right)| format!("| {} | {} |", escaped(left), escaped(right)))
                        .collect();
                    // A table of Markdown has to have a head.
                    format!("| | |\n| :-- | :-- |\n{}", rows.join("\n"))
                }
            })
            .collect();
        parts.join("\n\n")
    }

    /// Without any marks.
    pub fn plain(&self) -> String {
        let parts: Vec<String> = self
            .parts
            .iter()
            .filter(|part| !matches!(part, Part::Picture { .. }))
            .map(|part| match part {
                Part::Title(text) | Part::Sentence(text) | Part::Formula(text) => text.clone(),
                Part::Picture { words, .. } => words.clone(),
                Part::Table(rows) => {
                    rows.iter().map(|(left, right)| format!("{left}: {right}")).collect::<Vec<_>>().join("\n")
                }
            })
            .collect();
        parts.join("\n")
    }
}

/// Text of authors and declarations, so that nothing in it is taken for a mark.
fn escaped(text: &str) -> String {
    let mut out = String::with_capacity(text.len());
    for c in text.chars() {
        match c {
            '*' | '_' | '`' | '[' | ']' | '<' | '>' | '|' | '\\' | '#' => {
                out.push('\\');
                out.push(c);
            }
            '\n' | '\r' => out.push(' '),
            _ => out.push(c),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn marks_in_a_text_stay_text() {
        let text =
            Text::new().title("u_c").sentence("a < b | c").table(vec![("x".into(), "1 * 2".into())]).formula("a*b");
        assert_eq!(text.markdown(), "**u\\_c**\n\na \\< b \\| c\n\n| | |\n| :-- | :-- |\n| x | 1 \\* 2 |\n\n`a*b`");
        assert_eq!(text.plain(), "u_c\na < b | c\nx: 1 * 2\na*b");
    }
}
