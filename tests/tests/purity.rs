//! The core and the grammar read no file, no clock and no environment, and print nothing: what they need is handed to them.
//! The lints of those crates say the same for known methods; this looks at the words.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::path::Path;

use firstpole_tests::root;

const FORBIDDEN: [&str; 10] = [
    "std::fs",
    "std::env",
    "SystemTime",
    "Instant::now",
    "std::net",
    "std::process",
    "println!",
    "print!(",
    "stdin()",
    "std::thread",
];

fn sources(folder: &Path, found: &mut Vec<(String, String)>) {
    for entry in std::fs::read_dir(folder).expect("a folder").flatten() {
        let path = entry.path();
        if path.is_dir() {
            sources(&path, found);
        } else if path.extension().is_some_and(|end| end == "rs") {
            let text = std::fs::read_to_string(&path).expect("a source file");
            found.push((path.display().to_string(), text));
        }
    }
}

#[test]
fn the_core_and_the_grammar_touch_nothing_outside() {
    for folder in ["grammar/src", "spec-core/src"] {
        let mut all = Vec::new();
        sources(&root().join(folder), &mut all);
        assert!(all.len() > 3, "{folder}");
        for (path, text) in all {
            // Tests may stand below; what is compiled into the library stands above them.
            let code = text.split("#[cfg(test)]").next().unwrap_or("");
            for word in FORBIDDEN {
                assert!(!code.contains(word), "{path} has {word}");
            }
        }
    }
}

/// The core knows no protocol and no command line.
#[test]
fn the_core_rests_on_nothing_that_talks_to_the_outside() {
    let manifest = std::fs::read_to_string(root().join("spec-core/Cargo.toml")).expect("a manifest");
    for package in ["tokio", "tower-lsp", "clap", "ignore"] {
        assert!(!manifest.contains(package), "{package}");
    }
}
