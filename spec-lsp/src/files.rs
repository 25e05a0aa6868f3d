//! Files: finding specifications, reading them, and answering `use` without leaving the folder that was given.

use std::fs::File;
use std::io::{self, Read};
use std::path::{Component, Path, PathBuf};
use std::sync::Arc;

use firstpole_core::rules::reading::FILE_UNREADABLE;
use firstpole_core::{Finding, LoadFault, Loader, Sources, Span};
use ignore::WalkBuilder;

/// The largest file that is read.
const LARGEST_FILE: u64 = 8 * 1024 * 1024;

/// What was found under the paths that were given.
pub struct Gathered {
    /// The texts.
    pub sources: Sources,
    /// Answers `use`.
    pub loader: FolderLoader,
    /// A finding for each file that could not be read.
    pub faults: Vec<Finding>,
    /// Paths where there is nothing.
    pub missing: Vec<PathBuf>,
}

impl Gathered {
    /// Whether there is nothing to check.
    pub fn is_empty(&self) -> bool {
        self.sources.files().next().is_none()
    }
}

/// Finds and reads the specifications under `paths`; `use` may read below `below`, else below each path that is a folder and
/// beside each that is a file.
pub fn gather(paths: &[PathBuf], below: Option<&Path>) -> Gathered {
    let mut gathered = Gathered {
        sources: Sources::new(),
        loader: FolderLoader { roots: below.map(Path::to_owned).into_iter().collect() },
        faults: Vec::new(),
        missing: Vec::new(),
    };
    for path in paths {
        if path.is_dir() {
            if below.is_none() {
                gathered.loader.roots.push(path.clone());
            }
            below_folder(path).for_each(|path| add(&mut gathered, &path));
        } else if path.exists() {
            if below.is_none() {
                let folder = path.parent().filter(|p| !p.as_os_str().is_empty()).unwrap_or(Path::new("."));
                gathered.loader.roots.push(folder.to_owned());
            }
            add(&mut gathered, path);
        } else {
            gathered.missing.push(path.clone());
        }
    }
    gathered
}

/// The specifications below a folder. The walk is sorted, so that the same folder gives the same output everywhere.
pub fn below_folder(folder: &Path) -> impl Iterator<Item = PathBuf> + use<> {
    let walk = WalkBuilder::new(folder).require_git(false).sort_by_file_name(Ord::cmp).build();
    walk.flatten()
        .filter(|entry| entry.file_type().is_some_and(|kind| kind.is_file()))
        .map(ignore::DirEntry::into_path)
        .filter(|path| path.extension().is_some_and(|end| end == "cbspec"))
}

/// The specifications under `paths`, and the paths where there is nothing.
pub fn specifications(paths: &[PathBuf]) -> (Vec<PathBuf>, Vec<PathBuf>) {
    let (there, missing): (Vec<&PathBuf>, Vec<&PathBuf>) = paths.iter().partition(|path| path.exists());
    let found = there
        .into_iter()
        .flat_map(|path| if path.is_dir() { below_folder(path).collect() } else { vec![path.clone()] });
    (found.collect(), missing.into_iter().cloned().collect())
}

fn add(gathered: &mut Gathered, path: &Path) {
    let name = shown(path);
    match read(path) {
        Ok(text) => {
            gathered.sources.add(name, text);
        }
        Err(sentence) => {
            let file = gathered.sources.add(name.clone(), "");
            let message = format!("{name} was not checked: {sentence}");
            let Some(place) = gathered.sources.place(file, Span::new(0, 0)) else { return };
            let mut finding = Finding::new(&FILE_UNREADABLE, place, message);
            finding.advice("the other files were checked");
            gathered.faults.push(finding);
        }
    }
}

/// The text of a file, or a sentence that says why it cannot be had.
pub fn read(path: &Path) -> Result<Arc<str>, String> {
    let file = File::open(path).map_err(|fault| sentence(&fault))?;
    let mut bytes = Vec::new();
    file.take(LARGEST_FILE + 1).read_to_end(&mut bytes).map_err(|fault| sentence(&fault))?;
    if bytes.len() as u64 > LARGEST_FILE {
        return Err("it is larger than 8 MiB".to_owned());
    }
    match String::from_utf8(bytes) {
        Ok(text) => Ok(text.into()),
        Err(fault) => {
            let at = fault.utf8_error().valid_up_to();
            let line = String::from_utf8_lossy(fault.as_bytes().get(..at).unwrap_or(&[])).matches('\n').count() + 1;
            Err(format!("it is not UTF-8 (first at line {line})"))
        }
    }
}

fn sentence(fault: &io::Error) -> String {
    match fault.kind() {
        io::ErrorKind::NotFound => "there is no such file".to_owned(),
        io::ErrorKind::PermissionDenied => "there is no right to read it".to_owned(),
        io::ErrorKind::IsADirectory => "it is a folder".to_owned(),
        _ => format!("it cannot be read ({fault})"),
    }
}

/// A path as findings name it: with /, without a leading ./, control characters made visible.
pub fn shown(path: &Path) -> String {
    let plain = path.to_string_lossy().replace(std::path::MAIN_SEPARATOR, "/");
    let plain = plain.strip_prefix("./").unwrap_or(&plain);
    plain.chars().flat_map(|c| if c.is_control() { c.escape_default().collect::<Vec<_>>() } else { vec![c] }).collect()
}

/// Reads what `use` names, below the folders that were given and nowhere else.
#[derive(Clone, Debug, Default)]
pub struct FolderLoader {
    roots: Vec<PathBuf>,
}

impl FolderLoader {
    /// Reads below these folders.
    pub fn below(roots: Vec<PathBuf>) -> Self {
        Self { roots }
    }
}

fn refuse(sentence: &str) -> LoadFault {
    LoadFault { sentence: sentence.to_owned() }
}

/// The file that `path` means where the file `from` uses it.
pub fn target(from: &str, path: &str) -> Result<PathBuf, LoadFault> {
    if path.contains('\\') || path.contains(':') {
        return Err(refuse("write the path with / and without a drive"));
    }
    let folder = Path::new(from).parent().unwrap_or(Path::new(""));
    let mut target = folder.to_owned();
    for part in Path::new(path).components() {
        match part {
            Component::Normal(name) => target.push(name),
            Component::CurDir => {}
            Component::ParentDir
                if target.components().next_back().is_some_and(|c| matches!(c, Component::Normal(_))) =>
            {
                target.pop();
            }
            Component::ParentDir => return Err(refuse("it leads out of the folder that was given")),
            Component::RootDir | Component::Prefix(_) => {
                return Err(refuse("a path is relative to the file that uses it"));
            }
        }
    }
    Ok(target)
}

impl Loader for FolderLoader {
    fn load(&self, from: &str, path: &str) -> Result<(String, Arc<str>), LoadFault> {
        let target = target(from, path)?;
        // Symbolic links are followed before the folder is compared, so that none leads out.
        let real = target.canonicalize().map_err(|fault| refuse(&sentence(&fault)))?;
        let inside = self.roots.iter().filter_map(|root| root.canonicalize().ok()).any(|root| real.starts_with(root));
        if !inside {
            return Err(refuse("it leads out of the folder that was given"));
        }
        let text = read(&real).map_err(|sentence| LoadFault { sentence })?;
        Ok((shown(&target), text))
    }
}
