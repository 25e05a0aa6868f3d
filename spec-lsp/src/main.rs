//! The program `firstpole`.

use std::process::ExitCode;

fn main() -> ExitCode {
    // Not locked: the server writes to the same stream from threads of its own.
    let mut out = std::io::stdout();
    let mut err = std::io::stderr();
    ExitCode::from(firstpole::run(std::env::args_os(), &mut out, &mut err))
}
