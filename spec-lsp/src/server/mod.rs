//! The language server: the checker inside an editor.
//!
//! ```text
//! input - pump (whole frames, exit, bad bodies) - backend (the protocol library) - output
//!                                                    |
//!                                documents (texts under one lock, last assessments)
//!                                                    |
//!                          checker (assesses what changed, newest text first) - publish (findings to the client)
//! ```
//!
//! `backend` alone knows the protocol library, `protocol` alone turns spans into the protocol's types, and `features` know neither.

mod backend;
mod checker;
mod documents;
mod findings;
mod mouth;
mod names;
mod positions;
mod protocol;
mod publish;
mod pump;

use std::time::Duration;

use firstpole_core::Assessor;
use tokio::io::{AsyncRead, AsyncWrite};

/// How long the last answers may take to be written after the client has left.
const GRACE: Duration = Duration::from_secs(2);

/// Serves one client until it leaves, and gives the code that the process ends with: 0 after an orderly leave, else 1.
pub async fn serve<I, O>(input: I, output: O) -> u8
where
    I: AsyncRead + Unpin,
    O: AsyncWrite + Send + 'static,
{
    serve_with(Assessor::standard(), input, output).await
}

/// The same with an assessor of the embedder's own.
pub async fn serve_with<I, O>(assessor: Assessor, input: I, output: O) -> u8
where
    I: AsyncRead + Unpin,
    O: AsyncWrite + Send + 'static,
{
    let (near, far) = tokio::io::duplex(64 * 1024);
    let (log, logged) = tokio::sync::mpsc::unbounded_channel();
    let server = tokio::spawn(backend::run(assessor, far, output, logged));
    // Without a server nobody is left who could read the log.
    let orderly = pump::pump(input, near, backend::hear, |line| drop(log.send(line))).await;
    drop(log);
    // Past the grace the client does not read any more, and nothing is lost.
    let _ = tokio::time::timeout(GRACE, server).await;
    u8::from(!orderly)
}
