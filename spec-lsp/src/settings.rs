//! The buyer's settings: `firstpole.toml`, found upwards from a specification.

use std::fmt;
use std::path::{Path, PathBuf};

use firstpole_core::rules::Policy;
use serde::Deserialize;

use crate::files::{read, shown};

/// The name of the file.
pub const FILE_NAME: &str = "firstpole.toml";

/// What the file holds.
#[derive(Debug, Default, Deserialize)]
#[serde(deny_unknown_fields)]
struct Settings {
    #[serde(default)]
    policy: Policy,
}

/// Why settings cannot be had, and where that is.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct SettingsFault {
    /// The file, as messages name it.
    pub file: String,
    /// Line and column, one-based, columns in Unicode characters; absent where the file as a whole cannot be read.
    pub at: Option<(usize, usize)>,
    /// What is wrong.
    pub sentence: String,
}

impl fmt::Display for SettingsFault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        f.write_str(&self.file)?;
        if let Some((line, column)) = self.at {
            write!(f, ":{line}:{column}")?;
        }
        write!(f, ": {}", self.sentence)
    }
}

/// The nearest file of settings: beside the specification `path`, or in the folders above.
pub fn nearest(path: &Path) -> Option<PathBuf> {
    let whole = std::path::absolute(path).ok()?;
    let folder = whole.parent()?;
    folder.ancestors().map(|folder| folder.join(FILE_NAME)).find(|file| file.is_file())
}

/// The policy for the specification `path`: that of the nearest file, else the defaults.
pub fn policy_for(path: &Path) -> Result<Policy, SettingsFault> {
    nearest(path).map_or_else(|| Ok(Policy::default()), |file| read_policy(&file))
}

/// The policy of a file of settings.
pub fn read_policy(file: &Path) -> Result<Policy, SettingsFault> {
    let name = named(file);
    let text = read(file).map_err(|sentence| SettingsFault { file: name.clone(), at: None, sentence })?;
    toml::from_str::<Settings>(&text).map(|settings| settings.policy).map_err(|fault| SettingsFault {
        file: name,
        at: fault.span().map(|span| position(&text, span.start)),
        sentence: fault.message().trim().replace('\n', ", "),
    })
}

/// The file as messages name it: from the working folder where it lies below that.
fn named(file: &Path) -> String {
    let here = std::env::current_dir().ok();
    shown(here.and_then(|here| file.strip_prefix(here).ok()).unwrap_or(file))
}

fn position(text: &str, offset: usize) -> (usize, usize) {
    let before = text.get(..offset).unwrap_or(text);
    let line = before.matches('\n').count() + 1;
    let column = before.rsplit('\n').next().unwrap_or("").chars().count() + 1;
    (line, column)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn folder(text: &str) -> tempfile::TempDir {
        let folder = tempfile::tempdir().expect("a folder");
        std::fs::write(folder.path().join(FILE_NAME), text).expect("a file");
        folder
    }

    fn of(text: &str) -> Result<Policy, SettingsFault> {
        policy_for(&folder(text).path().join("bay.cbspec"))
    }

    fn fault(text: &str) -> ((usize, usize), String) {
        let fault = of(text).expect_err("a fault");
        (fault.at.expect("a place"), fault.sentence)
    }

    #[test]
    fn the_nearest_file_counts_alone() {
        let above = folder("[policy]\nexcess-steps = 3\nservice-life = \"40 years\"\n");
        let below = above.path().join("north");
        std::fs::create_dir_all(below.join("bays")).expect("folders");
        let bay = below.join("bays/bay.cbspec");
        let policy = policy_for(&bay).expect("a policy");
        assert_eq!((policy.excess_steps, policy.service_life), (3, 40.0));
        std::fs::write(below.join(FILE_NAME), "[policy]\nexcess-steps = 4\n").expect("a file");
        let policy = policy_for(&bay).expect("a policy");
        assert_eq!((policy.excess_steps, policy.service_life), (4, 30.0));
    }

    #[test]
    fn an_empty_file_sets_nothing() {
        for text in ["", "# nothing\n", "[policy]\n"] {
            assert_eq!(of(text), Ok(Policy::default()), "{text:?}");
        }
    }

    #[test]
    fn what_is_wrong_is_told_at_its_place() {
        let (at, sentence) = fault("[policy]\nexcess-stepps = 3\n");
        assert_eq!(at, (2, 1));
        assert!(sentence.contains("excess-steps is near"), "{sentence}");
        let (at, sentence) = fault("[policy]\n\nshort-circuit-margin = 10\n");
        assert_eq!(at, (3, 24));
        assert!(sentence.contains("such as \"5 %\""), "{sentence}");
        let (at, sentence) = fault("[policy]\nshort-circuit-margin = \"90 %\"\n");
        assert_eq!(at, (2, 24));
        assert!(sentence.contains("makes no sense"), "{sentence}");
        let (at, sentence) = fault("[polcy]\n");
        assert_eq!(at.0, 1);
        assert!(sentence.contains("polcy") && sentence.contains("policy"), "{sentence}");
        assert_eq!(fault("[policy]\nexcess-steps = \n").0.0, 2);
        assert_eq!(fault("policy = 3\n").0, (1, 10));
        assert_eq!(fault("[policy]\nexcess-steps = true\n").0, (2, 16));
        assert_eq!(fault("[policy]\nexcess-steps = 3\nexcess-steps = 4\n").0.0, 3);
    }

    #[test]
    fn a_file_that_is_no_text() {
        let folder = folder("");
        std::fs::write(folder.path().join(FILE_NAME), [0xff, 0xfe]).expect("a file");
        let fault = policy_for(&folder.path().join("bay.cbspec")).expect_err("a fault");
        assert!(fault.at.is_none() && fault.sentence.contains("UTF-8"), "{fault}");
    }
}
