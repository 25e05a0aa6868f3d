//! Prints the reference page of the language: `cargo run -p firstpole-tests --bin reference > grammar/REFERENCE.md`.

use std::io::Write;

fn main() -> std::io::Result<()> {
    std::io::stdout().lock().write_all(firstpole_core::documents::reference::page().as_bytes())
}
