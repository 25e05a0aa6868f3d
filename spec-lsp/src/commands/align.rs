//! `firstpole align PATH...`: sets columns and spacing, and changes no meaning.

use std::fs;
use std::io::{self, Write};
use std::path::{Path, PathBuf};

use firstpole_core::documents::align;

use crate::files;
use crate::{BLOCKED, NOT_RUN, PASSED};

/// What the command is asked.
#[derive(Debug, clap::Args)]
pub struct Arguments {
    /// Files, and folders that are searched for *.cbspec
    #[arg(required = true, value_name = "PATH")]
    paths: Vec<PathBuf>,
    /// Write nothing; tell which files would change, and end with 1 if there are any
    #[arg(long)]
    verify: bool,
}

/// Runs the command.
pub fn run(arguments: &Arguments, out: &mut dyn Write, err: &mut dyn Write) -> io::Result<u8> {
    let (paths, missing) = files::specifications(&arguments.paths);
    for path in &missing {
        writeln!(err, "firstpole: there is no {}", files::shown(path))?;
    }
    if paths.is_empty() {
        writeln!(err, "firstpole: no specification (*.cbspec) was found")?;
        return Ok(NOT_RUN);
    }
    let mut failed = !missing.is_empty();
    let mut changed = 0_usize;
    for path in &paths {
        let name = files::shown(path);
        let text = match files::read(path) {
            Ok(text) => text,
            Err(sentence) => {
                writeln!(err, "firstpole: {name} was left as it is: {sentence}")?;
                failed = true;
                continue;
            }
        };
        let aligned = align::align(&text);
        if *aligned == *text {
            continue;
        }
        changed += 1;
        if arguments.verify {
            writeln!(out, "{name} is not aligned")?;
        } else if let Err(fault) = replace(path, &aligned) {
            writeln!(err, "firstpole: {name} was left as it is: {fault}")?;
            failed = true;
        } else {
            writeln!(out, "{name} aligned")?;
        }
    }
    Ok(match (failed, changed) {
        (true, _) => NOT_RUN,
        (false, 1..) if arguments.verify => BLOCKED,
        _ => PASSED,
    })
}

/// Puts a text in the place of a file: written beside it first, so that on any failure the old one is whole. A symbolic link stays
/// one, and who may read the file stays the same.
fn replace(path: &Path, text: &str) -> io::Result<()> {
    let path = path.canonicalize()?;
    let rights = fs::metadata(&path)?.permissions();
    if rights.readonly() {
        return Err(io::Error::new(io::ErrorKind::PermissionDenied, "it is read-only"));
    }
    let folder = path.parent().unwrap_or(Path::new("."));
    let mut beside = tempfile::Builder::new().prefix(".firstpole-").tempfile_in(folder)?;
    beside.write_all(text.as_bytes())?;
    beside.as_file().set_permissions(rights)?;
    beside.as_file().sync_all()?;
    beside.persist(&path).map_err(|fault| fault.error)?;
    Ok(())
}

#[cfg(test)]
mod tests {
    use super::*;

    fn run_on(arguments: &[&str]) -> (u8, String, String) {
        let (mut out, mut err) = (Vec::new(), Vec::new());
        let all = ["firstpole", "align"].iter().chain(arguments).map(Into::into);
        let code = crate::run(all, &mut out, &mut err);
        (code, String::from_utf8_lossy(&out).into_owned(), String::from_utf8_lossy(&err).into_owned())
    }

    const CROOKED: &str = "cbspec 1\nsite A\naltitude: 3 m\n";
    const STRAIGHT: &str = "cbspec 1\n\nsite A\n    altitude:                                3 m\n";

    #[test]
    fn told_then_written_then_quiet() {
        let folder = tempfile::tempdir().expect("a folder");
        let file = folder.path().join("a.cbspec");
        fs::write(&file, CROOKED).expect("written");
        let given = folder.path().to_string_lossy().into_owned();
        let (code, out, _) = run_on(&["--verify", &given]);
        assert_eq!((code, out.contains("a.cbspec is not aligned")), (BLOCKED, true));
        assert_eq!(fs::read_to_string(&file).expect("read"), CROOKED);
        assert_eq!(run_on(&[&given]).0, PASSED);
        assert_eq!(fs::read_to_string(&file).expect("read"), STRAIGHT);
        assert_eq!(run_on(&["--verify", &given]), (PASSED, String::new(), String::new()));
        assert_eq!(fs::read_dir(folder.path()).expect("a folder").count(), 1, "nothing is left beside it");
    }

    #[test]
    fn what_cannot_be_written_is_told_and_whole() {
        let folder = tempfile::tempdir().expect("a folder");
        let (locked, fine) = (folder.path().join("a.cbspec"), folder.path().join("b.cbspec"));
        for file in [&locked, &fine] {
            fs::write(file, CROOKED).expect("written");
        }
        let mut rights = fs::metadata(&locked).expect("rights").permissions();
        rights.set_readonly(true);
        fs::set_permissions(&locked, rights).expect("set");
        let given = folder.path().to_string_lossy().into_owned();
        let (code, _, err) = run_on(&[&given, "nowhere.cbspec"]);
        assert_eq!(code, NOT_RUN);
        assert!(err.contains("a.cbspec was left as it is: it is read-only"), "{err}");
        assert!(err.contains("there is no nowhere.cbspec"), "{err}");
        assert_eq!(fs::read_to_string(&locked).expect("read"), CROOKED);
        assert_eq!(fs::read_to_string(&fine).expect("read"), STRAIGHT);
    }

    #[cfg(unix)]
    #[test]
    fn a_link_stays_a_link() {
        let folder = tempfile::tempdir().expect("a folder");
        let (file, link) = (folder.path().join("real.text"), folder.path().join("a.cbspec"));
        fs::write(&file, CROOKED).expect("written");
        std::os::unix::fs::symlink(&file, &link).expect("linked");
        assert_eq!(run_on(&[&link.to_string_lossy()]).0, PASSED);
        assert!(fs::symlink_metadata(&link).expect("there").is_symlink());
        assert_eq!(fs::read_to_string(&file).expect("read"), STRAIGHT);
    }
}
