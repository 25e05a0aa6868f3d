//! Completion within the quotes of `use`: the specifications of the workspace, as paths from the file that uses them.

use std::path::{Component, Path};

use firstpole_core::{Assessment, FileId, Span};

use super::completion::{Proposal, ProposalKind};
use super::spot::{line_at, text_of};

/// Where the path of a `use` begins whose quotes an offset stands in; nothing elsewhere.
pub fn path_at(assessment: &Assessment, file: FileId, offset: u32) -> Option<Span> {
    let source = assessment.sources.file(file)?;
    let line = line_at(source, offset)?;
    let before = text_of(source, line).get(..offset.checked_sub(line.start)? as usize)?;
    let said = before.trim_start().strip_prefix("use")?;
    let path = said.trim_start().strip_prefix('"')?;
    let opened = said.len() > said.trim_start().len() && !path.contains('"');
    opened.then(|| Span::new(offset - path.len() as u32, offset))
}

/// The proposals there, out of these files.
pub fn proposals(assessment: &Assessment, file: FileId, replaces: Span, files: &[String]) -> Vec<Proposal> {
    let Some(source) = assessment.sources.file(file) else { return Vec::new() };
    let closed = source.text.get(replaces.end as usize..).is_some_and(|rest| rest.starts_with('"'));
    let others = files.iter().filter(|other| **other != source.name);
    let proposal = |other: &String| {
        let label = path_from(&source.name, other)?;
        let insert = if closed { label.clone() } else { format!("{label}\"") };
        Some(Proposal {
            label,
            kind: ProposalKind::Value,
            detail: "a specification".to_owned(),
            subject: None,
            insert,
            snippet: None,
            replaces,
        })
    };
    others.filter_map(proposal).collect()
}

/// The path of a file, from the folder of another.
fn path_from(user: &str, other: &str) -> Option<String> {
    let parts = |path: &Path| -> Option<Vec<String>> {
        path.components()
            .map(|part| match part {
                Component::Normal(name) => name.to_str().map(ToOwned::to_owned),
                _ => Some(String::new()),
            })
            .collect()
    };
    let (from, to) = (parts(Path::new(user).parent()?)?, parts(Path::new(other))?);
    let common = from.iter().zip(&to).take_while(|(a, b)| a == b).count();
    let up = from.len() - common;
    let steps = std::iter::repeat_n("..", up).chain(to.iter().skip(common).map(String::as_str));
    Some(steps.collect::<Vec<_>>().join("/"))
}

#[cfg(test)]
mod tests {
    use firstpole_core::{Assessor, Sources};

    use super::*;

    #[test]
    fn paths_are_those_that_use_reads() {
        assert_eq!(path_from("/a/b/bay.cbspec", "/a/b/c/x.cbspec").as_deref(), Some("c/x.cbspec"));
        assert_eq!(path_from("/a/b/bay.cbspec", "/a/f/x.cbspec").as_deref(), Some("../f/x.cbspec"));
        assert_eq!(path_from("bay.cbspec", "f/x.cbspec").as_deref(), Some("f/x.cbspec"));
        let target = crate::files::target("/a/b/bay.cbspec", "../f/x.cbspec").expect("a path");
        assert_eq!(crate::files::shown(&target), "/a/f/x.cbspec");
    }

    #[test]
    fn only_within_the_quotes() {
        let text = "cbspec 1\nuse \"fam\nuse \"a\" \nuser \"x\n";
        let assessment = Assessor::standard().assess(&Sources::of("/a/bay.cbspec", text));
        let path = |before: &str| {
            let at = (text.find(before).expect("there") + before.len()) as u32;
            path_at(&assessment, FileId(0), at).map(|span| span.of(text))
        };
        assert_eq!(path("use \"fam"), Some("fam"));
        assert_eq!(path("use \"a"), Some("a"));
        assert_eq!(path("use \"a\""), None);
        assert_eq!(path("user \"x"), None);
        let files = ["/a/bay.cbspec".to_owned(), "/a/f/big.cbspec".to_owned()];
        let span = path_at(&assessment, FileId(0), 17).expect("within");
        let all = proposals(&assessment, FileId(0), span, &files);
        assert_eq!(all.iter().map(|p| p.insert.as_str()).collect::<Vec<_>>(), ["f/big.cbspec\""]);
    }
}
