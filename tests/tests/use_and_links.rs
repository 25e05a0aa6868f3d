//! Several files and the links between sheets; what the program's loader lets in and what it refuses.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::path::Path;

use firstpole_core::{Assessment, Assessor, Finding, Sources};
use firstpole_tests::program;

fn assess(files: &[(&str, &str)]) -> Assessment {
    let mut sources = Sources::new();
    for (name, text) in files {
        sources.add(*name, *text);
    }
    Assessor::standard().assess(&sources)
}

fn of<'a>(assessment: &'a Assessment, rule: &str) -> Vec<&'a Finding> {
    assessment.findings().iter().map(AsRef::as_ref).filter(|finding: &&Finding| finding.rule == rule).collect()
}

const SYSTEM: &str = "cbspec 1\nsystem N\n    highest voltage: 145 kV\n    frequency: 50 Hz\n";

#[test]
fn what_another_file_holds_is_found_and_pointed_at() {
    let bay = "cbspec 1\nuse \"net.cbspec\"\nbreaker B on N\n    rated voltage: 123 kV\n";
    let assessment = assess(&[("bay.cbspec", bay), ("net.cbspec", SYSTEM)]);
    let found = of(&assessment, "rated-voltage-below-system");
    assert_eq!(found.len(), 1);
    let related = &found[0].related[0];
    assert_ne!(
        assessment.at(related.place).file,
        assessment.at(found[0].place).file,
        "the other statement stands in the other file"
    );
    assert_eq!(assessment.sources.text(related.place), "145 kV");
    // Without `use` it is not in reach.
    let alone = bay.replace("use \"net.cbspec\"\n", "");
    assert_eq!(of(&assess(&[("bay.cbspec", &alone), ("net.cbspec", SYSTEM)]), "link-unknown").len(), 1);
}

#[test]
fn use_reaches_through_other_files() {
    let assessment = assess(&[
        ("a.cbspec", "cbspec 1\nuse \"b.cbspec\"\nbreaker B on N\n    rated voltage: 123 kV\n"),
        ("b.cbspec", "cbspec 1\nuse \"net.cbspec\"\n"),
        ("net.cbspec", SYSTEM),
    ]);
    assert_eq!(of(&assessment, "rated-voltage-below-system").len(), 1);
}

#[test]
fn families_are_taken_over_and_replaced() {
    let text = format!(
        "{SYSTEM}family Base\n    rated voltage: 110 kV\n    rated frequency: 60 Hz\nfamily Middle like Base\n    rated frequency: 50 Hz\n\
         breaker One on N like Middle\nbreaker Two on N like Middle\n    rated voltage: 145 kV\n"
    );
    let assessment = assess(&[("a.cbspec", &text)]);
    let below = of(&assessment, "rated-voltage-below-system");
    assert_eq!(below.iter().filter_map(|f| f.breaker.as_deref()).collect::<Vec<_>>(), ["One"]);
    assert_eq!(assessment.sources.text(below[0].place), "110 kV", "the value is pointed at where it stands");
    assert!(of(&assessment, "frequency-mismatch").is_empty(), "the nearer family replaces the farther one");
}

#[test]
fn circles_are_told_once_and_cut() {
    let families =
        "cbspec 1\nfamily A like B\nfamily B like C\nfamily C like A\nbreaker X like A\n    rated voltage: 145 kV\n";
    let assessment = assess(&[("a.cbspec", families)]);
    assert_eq!(of(&assessment, "circle").len(), 1, "{:#?}", assessment.findings());
    assert_eq!(of(&assess(&[("a.cbspec", "cbspec 1\nfamily A like A\n")]), "circle").len(), 1);
    let files =
        [("a.cbspec", "cbspec 1\nuse \"b.cbspec\"\nsystem N\n"), ("b.cbspec", "cbspec 1\nuse \"a.cbspec\"\nsite S\n")];
    assert_eq!(of(&assess(&files), "circle").len(), 2, "each file closes the circle of the other");
}

fn chain_of(links: usize) -> String {
    (0..links).fold(String::new(), |text, n| text + &format!("family F{n} like F{}\n", n + 1))
}

#[test]
fn a_chain_that_nobody_can_follow_is_cut() {
    let chain = chain_of(150);
    let assessment = assess(&[("a.cbspec", &format!("cbspec 1\n{chain}family F150\n"))]);
    assert_eq!(of(&assessment, "circle").len(), 1);
    let short = chain_of(99);
    assert!(of(&assess(&[("a.cbspec", &format!("cbspec 1\n{short}family F99\n"))]), "circle").is_empty());
}

#[test]
fn names_that_are_missing_unknown_or_there_twice() {
    let unknown = assess(&[("a.cbspec", &format!("{SYSTEM}breaker B on M\nsystem Ring\nbreaker C on Rinf\n"))]);
    let found = of(&unknown, "link-unknown");
    assert_eq!(found.len(), 2);
    assert!(found.iter().any(|f| f.edits.iter().any(|edit| edit.text == "Ring")), "{found:#?}");
    assert_eq!(of(&assess(&[("a.cbspec", "cbspec 1\nsite S\nsite S\n")]), "name-twice").len(), 1);
    assert_eq!(of(&assess(&[("a.cbspec", "cbspec 1\ntender \"A\"\ntender \"B\"\n")]), "name-twice").len(), 1);
    assert_eq!(of(&assess(&[("a.cbspec", "cbspec 1\nbreaker\n")]), "name-missing").len(), 1);
    assert_eq!(of(&assess(&[("a.cbspec", "cbspec 1\nsite S on N\n")]), "link-misplaced").len(), 1);
}

#[test]
fn a_link_may_be_left_out_where_there_is_no_choice() {
    let one = assess(&[("a.cbspec", &format!("{SYSTEM}breaker B\n    rated voltage: 123 kV\n"))]);
    assert_eq!(of(&one, "rated-voltage-below-system").len(), 1);
    let two = assess(&[(
        "a.cbspec",
        &format!("{SYSTEM}system M\n    highest voltage: 24 kV\nbreaker B\n    rated voltage: 123 kV\n"),
    )]);
    assert!(of(&two, "rated-voltage-below-system").is_empty());
    let needed = of(&two, "link-needed");
    assert_eq!(needed[0].edits.iter().map(|e| e.text.as_str()).collect::<Vec<_>>(), [" on N", " on M"]);
}

fn write(folder: &Path, name: &str, text: &[u8]) {
    let path = folder.join(name);
    std::fs::create_dir_all(path.parent().expect("a folder")).expect("a folder");
    std::fs::write(path, text).expect("a file");
}

/// What the program says of a folder, as json, and what it ends with.
fn assessed(folder: &Path, more: &[&str]) -> (u8, serde_json::Value) {
    let path = folder.to_string_lossy().into_owned();
    let mut arguments = vec!["assess", "--as", "json"];
    arguments.extend(more);
    arguments.push(&path);
    let (code, out, _) = program(&arguments);
    (code, serde_json::from_str(&out).expect("json"))
}

fn messages(json: &serde_json::Value, rule: &str) -> Vec<String> {
    let findings = json["findings"].as_array().expect("findings");
    findings.iter().filter(|f| f["rule"] == rule).filter_map(|f| f["message"].as_str().map(str::to_owned)).collect()
}

#[test]
fn the_program_reads_below_its_folder_and_nowhere_else() {
    let root = tempfile::tempdir().expect("a folder");
    let inside = root.path().join("specs");
    write(root.path(), "secret.cbspec", b"cbspec 1\nsystem N\n");
    write(&inside, "families/line.cbspec", b"cbspec 1\nfamily F\n    rated voltage: 145 kV\n");
    write(&inside, "sub/good.cbspec", b"cbspec 1\nuse \"../families/line.cbspec\"\nbreaker B like F\n");
    write(&inside, "out.cbspec", b"cbspec 1\nuse \"../secret.cbspec\"\n");
    write(&inside, "absolute.cbspec", b"cbspec 1\nuse \"/etc/hostname\"\n");
    write(&inside, "missing.cbspec", b"cbspec 1\nuse \"nothing.cbspec\"\n");
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink(root.path().join("secret.cbspec"), inside.join("link.txt")).expect("a link");
        write(&inside, "linked.cbspec", b"cbspec 1\nuse \"link.txt\"\n");
    }
    let (_, json) = assessed(&inside, &["--block-on", "nothing"]);
    let refused = messages(&json, "use-unreadable");
    assert_eq!(refused.len(), if cfg!(unix) { 4 } else { 3 }, "{refused:#?}");
    assert_eq!(
        refused.iter().filter(|m| m.contains("leads out of the folder")).count(),
        if cfg!(unix) { 2 } else { 1 }
    );
    assert!(
        refused.iter().any(|m| m.contains("relative")) && refused.iter().any(|m| m.contains("no such file")),
        "{refused:#?}"
    );
    assert!(messages(&json, "link-unknown").is_empty(), "the good file found its family");
}

#[test]
fn a_file_that_cannot_be_read_is_told_and_the_others_are_checked() {
    let root = tempfile::tempdir().expect("a folder");
    write(root.path(), "a.cbspec", b"cbspec 1\nbreaker B\n    rated voltage: 110 kV\n");
    write(root.path(), "b.cbspec", b"cbspec 1\nsite \xff\xfe\n");
    write(root.path(), "c.cbspec", &vec![b' '; 8 * 1024 * 1024 + 1]);
    write(root.path(), "notes.txt", b"not a specification");
    let (code, json) = assessed(root.path(), &[]);
    assert_eq!(code, 1, "a file that cannot be read blocks");
    let told = messages(&json, "file-unreadable");
    assert!(
        told.len() == 2 && told[0].contains("not UTF-8 (first at line 2)") && told[1].contains("8 MiB"),
        "{told:#?}"
    );
    assert_eq!(messages(&json, "rated-voltage-not-preferred").len(), 1);
}

#[test]
fn what_the_program_ends_with() {
    let root = tempfile::tempdir().expect("a folder");
    let path = |name: &str| root.path().join(name).to_string_lossy().into_owned();
    write(root.path(), "caution.cbspec", b"cbspec 1\nbreaker B\n    rated voltage: 110 kV\n");
    write(root.path(), "wrong.cbspec", b"cbspec 1\nbreaker B\n    rated voltage: 145\n");
    let ends = |arguments: &[&str]| program(arguments).0;
    assert_eq!(ends(&["assess", &path("caution.cbspec")]), 0);
    assert_eq!(ends(&["assess", "--block-on", "caution", &path("caution.cbspec")]), 1);
    assert_eq!(ends(&["assess", &path("wrong.cbspec")]), 1);
    assert_eq!(ends(&["assess", "--block-on", "nothing", &path("wrong.cbspec")]), 0);
    assert_eq!(ends(&["assess", &path("nowhere.cbspec")]), 2);
    assert_eq!(ends(&["assess", &path("caution.cbspec"), &path("nowhere.cbspec")]), 2);
    assert_eq!(ends(&["assess"]), 2);
    assert_eq!(ends(&["assess", "--block-on", "everything", "x"]), 2);
    assert_eq!(ends(&["clause", "gas-liquefaction"]), 0);
    assert_eq!(ends(&["clause", "gas-liquefactoin"]), 2);
    assert_eq!(ends(&["--help"]), 0);
}

#[test]
fn text_without_colour_has_no_escapes_and_narration_no_drawing() {
    let root = tempfile::tempdir().expect("a folder");
    write(root.path(), "a.cbspec", b"cbspec 1\nbreaker B\n    rated voltage: 110 kV\n");
    let path = root.path().join("a.cbspec").to_string_lossy().into_owned();
    let (_, plain, _) = program(&["assess", "--colour", "never", &path]);
    assert!(!plain.contains('\u{1b}') && plain.contains("rated-voltage-not-preferred"));
    let (_, coloured, _) = program(&["assess", "--colour", "always", &path]);
    assert!(coloured.contains('\u{1b}'));
    let (_, narrated, _) = program(&["assess", "--narrated", &path]);
    assert!(!narrated.contains('│') && narrated.contains("Diagnostic severity: warning"), "{narrated}");
}

#[test]
fn deviations_expire_on_the_day_that_is_given() {
    let root = tempfile::tempdir().expect("a folder");
    let text = "cbspec 1\nbreaker B\n    rated voltage: 145\ndeviation from unit-missing in B\n    reason: \"r\"\n    approved: \"a\"\n    until: 2028-12-31\n";
    write(
        root.path(),
        "a.cbspec",
        text.replace("145\n", "110 kV\n").replace("unit-missing", "rated-voltage-not-preferred").as_bytes(),
    );
    let (code, json) = assessed(root.path(), &["--block-on", "caution", "--on", "2028-12-31"]);
    assert_eq!((code, &json["summary"]["accepted"]), (0, &serde_json::json!(1)));
    let (code, json) = assessed(root.path(), &["--block-on", "caution", "--on", "2029-01-01"]);
    assert_eq!((code, &json["summary"]["accepted"]), (1, &serde_json::json!(0)));
}
