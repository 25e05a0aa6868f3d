//! Who may know whom inside the language server.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::path::Path;

/// The code of a file, tests and all, without the lines of its comments.
fn code(path: &Path) -> String {
    let text = std::fs::read_to_string(path).expect("a source file");
    text.lines().filter(|line| !line.trim_start().starts_with("//")).collect::<Vec<_>>().join("\n")
}

/// The files of a folder and of those in it.
fn sources(folder: &str) -> Vec<(String, String)> {
    within(&Path::new(env!("CARGO_MANIFEST_DIR")).join("src").join(folder))
}

fn within(folder: &Path) -> Vec<(String, String)> {
    let entries = std::fs::read_dir(folder).expect("a folder").flatten().map(|entry| entry.path());
    entries
        .flat_map(|path| {
            if path.is_dir() {
                return within(&path);
            }
            let name = path.file_name().map(|name| name.to_string_lossy().into_owned());
            vec![(name.unwrap_or_default(), code(&path))]
        })
        .collect()
}

#[test]
fn one_file_knows_the_protocol_library() {
    for (name, code) in sources("server") {
        assert_eq!(code.contains("tower_lsp"), name == "backend.rs", "{name}");
    }
}

#[test]
fn features_know_neither_protocol_nor_server() {
    let features = sources("features");
    assert!(features.len() > 9);
    for (name, code) in features {
        for word in ["tower_lsp", "lsp_types", "tokio", "crate::server"] {
            assert!(!code.contains(word), "{name} has {word}");
        }
    }
}
