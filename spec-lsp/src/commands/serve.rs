//! `firstpole serve`: the language server.

use std::io::{self, Write};

use crate::server;

/// What the command is asked.
#[derive(Debug, clap::Args)]
pub struct Arguments {
    /// Speak over standard input and output, which is the default
    #[arg(long, conflicts_with = "port")]
    stdio: bool,
    /// Wait for one client on this port of the own machine instead (0 takes any that is free), for debugging
    #[arg(long, value_name = "N")]
    port: Option<u16>,
}

/// Runs the command.
pub fn run(arguments: &Arguments, err: &mut dyn Write) -> io::Result<u8> {
    let runtime = tokio::runtime::Builder::new_multi_thread().worker_threads(2).enable_all().build()?;
    let code = runtime.block_on(async {
        let Some(port) = arguments.port else {
            return Ok(server::serve(tokio::io::stdin(), tokio::io::stdout()).await);
        };
        let listener = tokio::net::TcpListener::bind((std::net::Ipv4Addr::LOCALHOST, port)).await?;
        writeln!(err, "firstpole: waiting on port {}", listener.local_addr()?.port())?;
        let (stream, _) = listener.accept().await?;
        stream.set_nodelay(true)?;
        let (input, output) = stream.into_split();
        Ok(server::serve(input, output).await)
    });
    // A read of standard input cannot be called off, and must not keep the process.
    runtime.shutdown_background();
    code
}
