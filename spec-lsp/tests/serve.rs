//! The built program as a language server, over real pipes: that it speaks, ends by the protocol, and ends when its client does.

#![allow(clippy::expect_used, reason = "a test fails by panicking")]

use std::io::{BufRead, BufReader, Write};
use std::process::{Child, Command, Stdio};

fn start(arguments: &[&str]) -> Child {
    Command::new(env!("CARGO_BIN_EXE_firstpole"))
        .arg("serve")
        .args(arguments)
        .stdin(Stdio::piped())
        .stdout(Stdio::piped())
        .stderr(Stdio::piped())
        .spawn()
        .expect("started")
}

fn frame(body: &str) -> String {
    format!("Content-Length: {}\r\n\r\n{body}", body.len())
}

const INITIALIZE: &str = r#"{"jsonrpc":"2.0","id":1,"method":"initialize","params":{"capabilities":{}}}"#;
const SHUTDOWN: &str = r#"{"jsonrpc":"2.0","id":2,"method":"shutdown"}"#;
const EXIT: &str = r#"{"jsonrpc":"2.0","method":"exit"}"#;

/// The next message of a server.
fn answer(from: &mut impl BufRead) -> String {
    let mut length = 0;
    loop {
        let mut line = String::new();
        from.read_line(&mut line).expect("a header");
        match line.trim_end() {
            "" => break,
            line => length = line.strip_prefix("Content-Length: ").expect("a length").parse().expect("a number"),
        }
    }
    let mut body = vec![0; length];
    from.read_exact(&mut body).expect("a body");
    String::from_utf8(body).expect("text")
}

#[test]
fn it_speaks_over_standard_streams_and_ends_by_the_protocol() {
    for arguments in [&[][..], &["--stdio"]] {
        let mut server = start(arguments);
        let mut to = server.stdin.take().expect("its input");
        let mut from = BufReader::new(server.stdout.take().expect("its output"));
        to.write_all(frame(INITIALIZE).as_bytes()).expect("sent");
        assert!(answer(&mut from).contains("\"capabilities\""));
        to.write_all((frame(SHUTDOWN) + &frame(EXIT)).as_bytes()).expect("sent");
        assert!(answer(&mut from).contains("\"id\":2"));
        // The input stays open: the server must end nevertheless.
        assert_eq!(server.wait().expect("ended").code(), Some(0));
        drop(to);
    }
}

#[test]
fn it_ends_when_its_client_does() {
    let mut server = start(&[]);
    let mut to = server.stdin.take().expect("its input");
    to.write_all(frame(INITIALIZE).as_bytes()).expect("sent");
    drop(to);
    assert_eq!(server.wait().expect("ended").code(), Some(1));
}

#[test]
fn it_speaks_over_a_port_of_the_own_machine() {
    let mut server = start(&["--port", "0"]);
    let mut told = String::new();
    BufReader::new(server.stderr.take().expect("its errors")).read_line(&mut told).expect("a line");
    let port: u16 = told.trim().rsplit(' ').next().expect("a port").parse().expect("a number");
    let mut stream = std::net::TcpStream::connect((std::net::Ipv4Addr::LOCALHOST, port)).expect("connected");
    stream.write_all(frame(INITIALIZE).as_bytes()).expect("sent");
    let mut from = BufReader::new(stream.try_clone().expect("a handle"));
    assert!(answer(&mut from).contains("\"capabilities\""));
    stream.write_all((frame(SHUTDOWN) + &frame(EXIT)).as_bytes()).expect("sent");
    assert_eq!(server.wait().expect("ended").code(), Some(0));
}

#[test]
fn not_both_ways_at_once() {
    let mut server = start(&["--stdio", "--port", "0"]);
    assert_eq!(server.wait().expect("ended").code(), Some(2));
}
