//! Links to the files that a specification uses.

use firstpole_core::{Assessment, FileId, Span};
use firstpole_grammar::LineKind;

use crate::files::{shown, target};

/// A link in the text.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct FileLink {
    /// The path, without its quotes.
    pub span: Span,
    /// The name of the file that it leads to.
    pub name: String,
}

/// The links of a file.
pub fn links(assessment: &Assessment, file: FileId) -> Vec<FileLink> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    source
        .lines()
        .filter_map(|line| {
            let LineKind::Use { path, span } = line.kind else { return None };
            let name = shown(&target(&source.name, path).ok()?);
            let quoted = line.place(*span);
            Some(FileLink {
                span: Span::new(quoted.start + 1, quoted.end.saturating_sub(1).max(quoted.start + 1)),
                name,
            })
        })
        .collect()
}

#[cfg(test)]
mod tests {
    use firstpole_core::{Assessor, Sources};

    use super::*;
    use crate::features::testing::text_of;

    #[test]
    fn relative_to_the_file_that_uses() {
        let sources = Sources::of("/a/b/bay.cbspec", "cbspec 1\nuse \"../families/big.cbspec\"\nuse \"../../../x\"\n");
        let assessment = Assessor::standard().assess(&sources);
        let links = links(&assessment, FileId(0));
        assert_eq!(links.len(), 1);
        let link = links.first().expect("a link");
        assert_eq!(
            (link.name.as_str(), text_of(&assessment, link.span)),
            ("/a/families/big.cbspec", "../families/big.cbspec")
        );
    }
}
