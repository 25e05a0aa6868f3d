//! What the acceptance tests share: the example specifications, and how they are assessed.

mod large;

use std::path::{Path, PathBuf};

pub use large::large;

/// The root of the workspace.
pub fn root() -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR")).parent().map(Path::to_owned).unwrap_or_default()
}

/// The example specifications that are clean: no contradiction, shortfall, omission or caution.
pub const CLEAN: [&str; 4] = ["cable-feeders-12kV", "transmission-72.5kV-60Hz", "cold-climate-245kV", "station-420kV"];

/// The example specifications with seeded mistakes.
pub const SEEDED: [&str; 6] = [
    "reclosing-line-24kV",
    "substation-36kV",
    "line-bay-145kV",
    "generation-tie-550kV",
    "station-110kV-infeeds",
    "bank-and-cable-24kV",
];

/// The path of an example, from the root of the workspace.
pub fn example(name: &str) -> String {
    format!("tests/specifications/{name}.cbspec")
}

/// What the program prints and ends with, run from the root of the workspace on a day that does not change.
pub fn program(arguments: &[&str]) -> (u8, String, String) {
    let mut out = Vec::new();
    let mut err = Vec::new();
    let all = std::iter::once("firstpole").chain(arguments.iter().copied()).map(Into::into);
    let code = firstpole::run(all, &mut out, &mut err);
    (code, String::from_utf8_lossy(&out).into_owned(), String::from_utf8_lossy(&err).into_owned())
}
