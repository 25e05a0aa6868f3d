//! Every package that the program is built from has a permissive licence.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::process::Command;

use firstpole_tests::root;

const PERMISSIVE: [&str; 10] =
    ["MIT", "Apache-2.0", "Unlicense", "BSD-2-Clause", "BSD-3-Clause", "ISC", "Zlib", "0BSD", "CC0-1.0", "Unicode-3.0"];

/// Whether a licence expression can be met with permissive licences alone: one side of each OR, both sides of each AND.
fn permissive(expression: &str) -> bool {
    let plain = expression.replace(" WITH LLVM-exception", "").replace(['(', ')'], " ").replace('/', " OR ");
    plain.split(" AND ").all(|part| part.split(" OR ").any(|licence| PERMISSIVE.contains(&licence.trim())))
}

#[test]
fn every_dependency_is_permissive() {
    let cargo = std::env::var("CARGO").unwrap_or_else(|_| "cargo".to_owned());
    // Packages of other platforms are not on this machine, and cannot be asked about without a network.
    let rustc = Command::new("rustc").arg("-vV").output().expect("rustc");
    let about = String::from_utf8_lossy(&rustc.stdout).into_owned();
    let host = about.lines().find_map(|line| line.strip_prefix("host: ")).expect("the host's platform");
    let output = Command::new(cargo)
        .args(["metadata", "--format-version", "1", "--locked", "--offline", "--filter-platform", host])
        .current_dir(root())
        .output()
        .expect("cargo metadata");
    assert!(output.status.success(), "{}", String::from_utf8_lossy(&output.stderr));
    let metadata: serde_json::Value = serde_json::from_slice(&output.stdout).expect("json");
    let packages = metadata["packages"].as_array().expect("packages");
    assert!(packages.len() > 20);
    for package in packages {
        let licence = package["license"].as_str().unwrap_or("none stated");
        assert!(permissive(licence), "{}: {licence}", package["name"]);
    }
}

#[test]
fn expressions_are_read_as_they_are_meant() {
    assert!(permissive("MIT OR GPL-3.0"));
    assert!(permissive("(MIT OR Apache-2.0) AND Unicode-3.0"));
    assert!(!permissive("MIT AND GPL-3.0"));
    assert!(!permissive("LGPL-2.1"));
}
