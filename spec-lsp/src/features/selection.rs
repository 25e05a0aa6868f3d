//! What a selection grows to: from a value or a label to its line, its sheet, the file.

use firstpole_core::{Assessment, FileId, Span};

use super::spot::{label_and_value, line_at, sheet_at};

/// The spans around an offset, the smallest first; each holds the one before.
pub fn around(assessment: &Assessment, file: FileId, offset: u32) -> Vec<Span> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let mut spans = vec![word(&source.text, offset)];
    if let Some(line) = line_at(source, offset) {
        if let Some((label, value)) = label_and_value(line) {
            spans.extend([label, value]);
        }
        let text = line.span().of(&source.text);
        let start = line.start + (text.len() - text.trim_start().len()) as u32;
        spans.push(Span::new(start, line.start + text.trim_end().len() as u32));
    }
    if let Some(sheet) = sheet_at(assessment, file, offset) {
        spans.push(Span::new(assessment.span(sheet.heading).start, assessment.span(sheet.end).end));
    }
    spans.push(Span::new(0, source.text.len() as u32));
    let mut around: Vec<Span> = Vec::new();
    for span in spans {
        let holds = around.last().is_none_or(|last| span.start <= last.start && last.end <= span.end && span != *last);
        if span.touches(offset) && holds {
            around.push(span);
        }
    }
    around
}

/// The word at an offset: what stands between blanks and signs that part values.
fn word(text: &str, offset: u32) -> Span {
    let at = text.floor_char_boundary((offset as usize).min(text.len()));
    let parts = |c: char| c.is_whitespace() || matches!(c, ':' | ',' | '"' | '(' | ')' | '#');
    let start = text
        .get(..at)
        .and_then(|before| before.rfind(parts))
        .map_or(0, |found| found + text.get(found..).and_then(|rest| rest.chars().next()).map_or(1, char::len_utf8));
    let end = text.get(at..).and_then(|rest| rest.find(parts)).map_or(text.len(), |found| at + found);
    Span::new(start as u32, end as u32)
}

#[cfg(test)]
mod tests {
    use super::*;
    use crate::features::testing::{BAY, assessed, bay_after};

    #[test]
    fn from_the_word_to_the_file() {
        let (assessment, at) = bay_after("insulating gas:     S");
        let texts: Vec<_> = around(&assessment, FileId(0), at).iter().map(|span| span.of(BAY)).collect();
        assert_eq!(texts.first(), Some(&"SF6"));
        assert_eq!(texts.get(1), Some(&"insulating gas:     SF6"));
        assert!(texts.get(2).is_some_and(|sheet| sheet.starts_with("breaker LineBay") && sheet.ends_with("MPa abs")));
        assert_eq!(texts.last(), Some(&BAY));
    }

    #[test]
    fn each_holds_the_one_before_wherever_the_cursor_is() {
        let text = "cbspec 1\n\u{b5} site\n  x: \u{1f600} \"a b\n\n";
        let assessment = assessed(text);
        for offset in 0..=text.len() as u32 + 3 {
            let spans = around(&assessment, FileId(0), offset);
            assert!(spans.windows(2).all(|pair| pair[1].start <= pair[0].start && pair[0].end <= pair[1].end));
            assert!(spans.iter().all(|span| text.get(span.start as usize..span.end as usize).is_some()), "{offset}");
        }
    }
}
