//! What the language server costs, against the built binary over real pipes: `cargo bench -p firstpole-tests --bench server`.
//!
//! All rules are on. A keystroke is a character that is typed into a value somewhere in the text, and lasts until the diagnostics of
//! that version are there. What this client itself needs to read an answer counts along.

#![allow(
    clippy::expect_used,
    clippy::print_stdout,
    clippy::indexing_slicing,
    reason = "a bench prints, and fails by panicking"
)]

use std::io::{BufRead, BufReader, Read, Write};
use std::path::{Path, PathBuf};
use std::process::{Child, ChildStdin, ChildStdout, Command, Stdio};
use std::sync::OnceLock;
use std::time::{Duration, Instant};

use firstpole_tests::{large, root};
use serde_json::{Value, json};

const URI: &str = "file:///nowhere/large.cbspec";
const EDITS: usize = 200;

struct Client {
    server: Child,
    to: ChildStdin,
    from: BufReader<ChildStdout>,
    next: i64,
}

impl Client {
    fn start() -> (Self, Duration) {
        let binary = binary();
        let started = Instant::now();
        let mut server = Command::new(binary)
            .arg("serve")
            .stdin(Stdio::piped())
            .stdout(Stdio::piped())
            .spawn()
            .expect("the server starts");
        let (to, from) = (server.stdin.take().expect("input"), server.stdout.take().expect("output"));
        let mut client = Self { server, to, from: BufReader::with_capacity(1 << 20, from), next: 0 };
        // What editors of today can do, so that all is told that they would be told.
        let findings = json!({"relatedInformation": true, "dataSupport": true, "tagSupport": {"valueSet": [1, 2]}});
        let markdown = json!(["markdown", "plaintext"]);
        let capabilities = json!({"textDocument": {
            "publishDiagnostics": findings,
            "hover": {"contentFormat": markdown},
            "completion": {"completionItem": {"snippetSupport": true, "documentationFormat": markdown}}
        }});
        client.ask("initialize", &json!({"processId": null, "rootUri": null, "capabilities": capabilities}));
        let ready = started.elapsed();
        client.tell("initialized", &json!({}));
        (client, ready)
    }

    fn send(&mut self, message: &Value) {
        let body = message.to_string();
        write!(self.to, "Content-Length: {}\r\n\r\n{body}", body.len()).expect("written");
        self.to.flush().expect("written");
    }

    fn tell(&mut self, method: &str, params: &Value) {
        self.send(&json!({"jsonrpc": "2.0", "method": method, "params": params}));
    }

    fn ask(&mut self, method: &str, params: &Value) -> Value {
        self.next += 1;
        let id = self.next;
        self.send(&json!({"jsonrpc": "2.0", "id": id, "method": method, "params": params}));
        loop {
            let message: Value = serde_json::from_slice(&self.read()).expect("json");
            if message["id"] == id {
                return message["result"].clone();
            }
        }
    }

    fn read(&mut self) -> Vec<u8> {
        let mut length = 0;
        loop {
            let mut line = String::new();
            self.from.read_line(&mut line).expect("a header");
            match line.trim().split_once(": ") {
                Some(("Content-Length", value)) => length = value.parse().expect("a length"),
                _ if line.trim().is_empty() => break,
                _ => {}
            }
        }
        let mut body = vec![0; length];
        self.from.read_exact(&mut body).expect("a body");
        body
    }

    /// Waits for the diagnostics of a version.
    fn diagnostics(&mut self, version: usize) -> usize {
        let wanted = format!("\"version\":{version}");
        loop {
            let body = String::from_utf8(self.read()).expect("UTF-8");
            let ends = body.find("\"diagnostics\"").unwrap_or(0);
            let head = body.get(..ends.min(400)).unwrap_or("");
            if body.contains("publishDiagnostics") && (body.contains(&wanted) || head.contains(&wanted)) {
                return body.matches("\"severity\"").count();
            }
        }
    }

    fn memory(&self) -> f64 {
        let status = std::fs::read_to_string(format!("/proc/{}/status", self.server.id())).unwrap_or_default();
        let line = status.lines().find(|line| line.starts_with("VmRSS:")).unwrap_or("");
        line.split_whitespace().nth(1).and_then(|kb| kb.parse::<f64>().ok()).map_or(f64::NAN, |kb| kb / 1024.0)
    }
}

impl Drop for Client {
    fn drop(&mut self) {
        self.tell("exit", &Value::Null);
        // Whether it ends by itself is the matter of a test.
        let _ = self.server.kill();
        let _ = self.server.wait();
    }
}

/// The program of the profile that this bench was built with; it is built anew where it is out of date.
fn binary() -> &'static Path {
    static BUILT: OnceLock<PathBuf> = OnceLock::new();
    BUILT.get_or_init(|| {
        let own = std::env::current_exe().expect("this bench");
        let folder = own.parent().and_then(Path::parent).expect("the folder of the profile");
        let status = Command::new(env!("CARGO"))
            .args(["build", "--quiet", "--release", "--package", "firstpole"])
            .current_dir(root())
            .status()
            .expect("cargo");
        assert!(status.success(), "the program is built");
        folder.join("firstpole")
    })
}

/// Where the values of particulars end: (line, column).
fn places(text: &str) -> Vec<(usize, usize)> {
    text.lines()
        .enumerate()
        .filter(|(_, line)| line.starts_with("    ") && line.contains(':') && line.is_ascii())
        .map(|(at, line)| (at, line.len()))
        .collect()
}

fn shown(mut times: Vec<Duration>) -> String {
    times.sort_unstable();
    let at = |share: f64| times[((times.len() - 1) as f64 * share).round() as usize].as_secs_f64() * 1e3;
    format!("{:.2} / {:.2}", at(0.5), at(0.99))
}

fn edit(line: usize, column: usize, remove: usize, text: &str) -> Value {
    json!({
        "range": {"start": {"line": line, "character": column}, "end": {"line": line, "character": column + remove}},
        "text": text
    })
}

fn measure(lines: usize) {
    let text = large(lines);
    let places = places(&text);
    let (mut client, ready) = Client::start();
    let opened = Instant::now();
    client.tell(
        "textDocument/didOpen",
        &json!({"textDocument": {"uri": URI, "languageId": "cbspec", "version": 1, "text": text}}),
    );
    let findings = client.diagnostics(1);
    let open = opened.elapsed();
    let mut version = 1;
    let mut change = |client: &mut Client, changes: Value| {
        version += 1;
        client.tell(
            "textDocument/didChange",
            &json!({"textDocument": {"uri": URI, "version": version}, "contentChanges": changes}),
        );
        version
    };
    let place = |edit: usize| places[edit.wrapping_mul(7919) % places.len()];
    let mut keystrokes = Vec::new();
    for at in 0..EDITS {
        // Typed, and taken back.
        let (line, column) = place(at / 2);
        let typed = if at % 2 == 0 { edit(line, column, 0, "0") } else { edit(line, column, 1, "") };
        let started = Instant::now();
        let version = change(&mut client, json!([typed]));
        client.diagnostics(version);
        keystrokes.push(started.elapsed());
    }
    let mut bursts = Vec::new();
    for burst in 0..20 {
        let (line, column) = place(burst + 1000);
        let started = Instant::now();
        let mut last = 0;
        for at in 0..50 {
            let typed = if at % 2 == 0 { edit(line, column, 0, "0") } else { edit(line, column, 1, "") };
            last = change(&mut client, json!([typed]));
        }
        client.diagnostics(last);
        bursts.push(started.elapsed());
    }
    let mut answers = |method: &str, shift: usize| {
        let times = (0..EDITS).map(|at| {
            let (line, column) = place(at);
            let position = json!({"line": line, "character": column.saturating_sub(shift)});
            let started = Instant::now();
            client.ask(method, &json!({"textDocument": {"uri": URI}, "position": position}));
            started.elapsed()
        });
        shown(times.collect())
    };
    let (hover, completion) = (answers("textDocument/hover", 1), answers("textDocument/completion", 0));
    println!(
        "| {lines} | {findings} | {} | {} | {:.1} | {hover} | {completion} | {:.1} | {:.1} |",
        shown(keystrokes),
        shown(bursts),
        open.as_secs_f64() * 1e3,
        ready.as_secs_f64() * 1e3,
        client.memory()
    );
}

fn main() {
    // What `cargo bench` hands on is for benches of another kind; a number is a size.
    let asked: Vec<usize> = std::env::args().skip(1).filter_map(|argument| argument.parse().ok()).collect();
    let sizes = if asked.is_empty() { vec![200, 2_000, 20_000] } else { asked };
    println!("times in ms, p50 / p99 of {EDITS}; memory resident at the end, MiB\n");
    println!("| lines | findings told | keystroke | 50 edits at once | open | hover | completion | start | memory |");
    println!("| --- | --- | --- | --- | --- | --- | --- | --- | --- |");
    for lines in sizes {
        measure(lines);
    }
}
