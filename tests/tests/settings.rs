//! `firstpole.toml`: each specification by its nearest file, and settings that cannot be read.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::ffi::OsString;
use std::path::Path;

/// A rating two steps of the list above its system: an excess by the default settings.
const BAY: &str =
    "cbspec 1\nsystem Ring\n    highest voltage: 145 kV\nbreaker Bay on Ring\n    rated voltage: 245 kV\n";

fn write(path: &Path, text: &str) {
    std::fs::create_dir_all(path.parent().expect("a folder")).expect("a folder");
    std::fs::write(path, text).expect("a file");
}

/// What `assess` ends with on a folder, and what it writes.
fn assess(folder: &Path, more: &[&str]) -> (u8, String, String) {
    let mut arguments: Vec<OsString> = ["firstpole", "assess", "--block-on", "nothing"].map(Into::into).to_vec();
    arguments.extend(more.iter().map(Into::into));
    arguments.push(folder.into());
    let (mut out, mut err) = (Vec::new(), Vec::new());
    let code = firstpole::run(arguments, &mut out, &mut err);
    (code, String::from_utf8(out).expect("UTF-8"), String::from_utf8(err).expect("UTF-8"))
}

#[test]
fn each_specification_by_its_nearest_file() {
    let folder = tempfile::tempdir().expect("a folder");
    let at = |name: &str| folder.path().join(name);
    write(&at("a/bay.cbspec"), BAY);
    write(&at("b/bay.cbspec"), BAY);
    let excesses = || {
        let (code, out, err) = assess(folder.path(), &["--as", "json"]);
        assert_eq!((code, err.as_str()), (0, ""));
        let json: serde_json::Value = serde_json::from_str(&out).expect("json");
        assert_eq!(json["cases"].as_array().map(Vec::len), Some(2));
        let all = json["findings"].as_array().expect("findings").clone();
        let files = all.into_iter().filter(|f| f["rule"] == "rated-voltage-excess");
        files.map(|f| f["file"].as_str().expect("a file").to_owned()).collect::<Vec<_>>()
    };
    assert_eq!(excesses().len(), 2);
    write(&at("b/firstpole.toml"), "[policy]\nexcess-steps = 3\n");
    let [only] = excesses().try_into().expect("one");
    let only: String = only;
    assert!(only.ends_with("a/bay.cbspec"), "{only}");
    let (_, out, _) = assess(folder.path(), &[]);
    assert!(out.contains("2 files, 2 breakers:") && out.contains("1 excess"), "{out}");
    write(&at("firstpole.toml"), "[policy]\nexcess-steps = 3\n");
    assert!(excesses().is_empty());
}

#[test]
fn a_file_that_several_use_is_told_once() {
    let folder = tempfile::tempdir().expect("a folder");
    let at = |name: &str| folder.path().join(name);
    let uses = "cbspec 1\nuse \"../family.cbspec\"\nbreaker Bay like Big\n    rated voltage: 145 kV\n";
    write(&at("family.cbspec"), "cbspec 1\nfamily Big\n    no such label: 3\n");
    write(&at("a/bay.cbspec"), uses);
    write(&at("b/bay.cbspec"), uses);
    write(&at("b/firstpole.toml"), "[policy]\nexcess-steps = 3\n");
    let (_, out, _) = assess(folder.path(), &[]);
    assert!(out.contains("3 files, 2 breakers:"), "{out}");
    assert_eq!(out.matches("no such label: 3").count(), 1, "{out}");
}

#[test]
fn settings_that_cannot_be_read_end_with_2() {
    let folder = tempfile::tempdir().expect("a folder");
    let at = |name: &str| folder.path().join(name);
    write(&at("bay.cbspec"), BAY);
    for (text, place, told) in [
        ("[policy]\nexcess-stepps = 3\n", "firstpole.toml:2:1:", "excess-steps is near"),
        ("[policy]\nexcess-steps = 30\n", "firstpole.toml:2:16:", "makes no sense"),
        ("[policy]\nexcess-steps = \"3\"\n", "firstpole.toml:2:16:", "a whole number"),
        ("[policy\n", "firstpole.toml:1:", ""),
        ("colour = 3\n", "firstpole.toml:1:1:", "colour"),
    ] {
        write(&at("firstpole.toml"), text);
        let (code, out, err) = assess(folder.path(), &[]);
        assert_eq!((code, out.as_str()), (2, ""), "{text}");
        assert!(err.contains(place) && err.contains(told) && err.contains("nothing was checked"), "{err}");
    }
}
