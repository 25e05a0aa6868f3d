//! A client of the language server: raw frames through an in-process pipe, as an editor sends them.

#![allow(dead_code, reason = "no test uses all of it")]

use std::time::Duration;

use firstpole::server::{serve, serve_with};
use firstpole_core::Assessor;
use serde_json::{Value, json};
use tokio::io::{AsyncBufReadExt, AsyncReadExt, AsyncWriteExt, BufReader, DuplexStream};
use tokio::task::JoinHandle;

/// How long a test waits before it calls something missing.
pub const PATIENCE: Duration = Duration::from_secs(30);

pub struct Client {
    pub to: Option<DuplexStream>,
    pub from: BufReader<DuplexStream>,
    pub served: JoinHandle<u8>,
    pub next: i64,
    /// Notifications that came while an answer was awaited.
    pub kept: Vec<Value>,
}

impl Client {
    pub fn start(assessor: Option<Assessor>) -> Self {
        let (to, input) = tokio::io::duplex(1 << 16);
        let (output, from) = tokio::io::duplex(1 << 16);
        let served = tokio::spawn(async move {
            match assessor {
                Some(assessor) => serve_with(assessor, input, output).await,
                None => serve(input, output).await,
            }
        });
        Self { to: Some(to), from: BufReader::new(from), served, next: 0, kept: Vec::new() }
    }

    /// A client that is initialised.
    pub async fn new() -> Self {
        let mut client = Self::start(None);
        client.begin(json!({})).await;
        client
    }

    pub async fn begin(&mut self, capabilities: Value) -> Value {
        let answer =
            self.ask("initialize", json!({"processId": null, "rootUri": null, "capabilities": capabilities})).await;
        self.tell("initialized", json!({})).await;
        answer["result"]["capabilities"].clone()
    }

    pub async fn raw(&mut self, bytes: &[u8]) {
        self.to.as_mut().expect("open").write_all(bytes).await.expect("written");
    }

    pub async fn send(&mut self, message: &Value) {
        let body = message.to_string();
        self.raw(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes()).await;
    }

    pub async fn tell(&mut self, method: &str, params: Value) {
        self.send(&json!({"jsonrpc": "2.0", "method": method, "params": params})).await;
    }

    pub async fn request(&mut self, method: &str, params: Value) -> i64 {
        self.next += 1;
        let id = self.next;
        self.send(&json!({"jsonrpc": "2.0", "id": id, "method": method, "params": params})).await;
        id
    }

    /// The next message of the server; nothing at the end.
    pub async fn read(&mut self) -> Option<Value> {
        let read = async {
            let mut length = 0;
            loop {
                let mut line = String::new();
                if self.from.read_line(&mut line).await.ok()? == 0 {
                    return None;
                }
                match line.trim_end() {
                    "" => break,
                    line => {
                        length = line.strip_prefix("Content-Length: ").expect("a length").parse().expect("a number");
                    }
                }
            }
            let mut body = vec![0; length];
            self.from.read_exact(&mut body).await.ok()?;
            Some(serde_json::from_slice(&body).expect("json"))
        };
        tokio::time::timeout(PATIENCE, read).await.expect("the server is silent")
    }

    pub async fn answer(&mut self, id: i64) -> Value {
        loop {
            let message = self.read().await.expect("an answer");
            if message["id"] == id {
                return message;
            }
            self.kept.push(message);
        }
    }

    pub async fn ask(&mut self, method: &str, params: Value) -> Value {
        let id = self.request(method, params).await;
        self.answer(id).await
    }

    pub async fn open(&mut self, uri: &str, text: &str) {
        let document = json!({"uri": uri, "languageId": "cbspec", "version": 1, "text": text});
        self.tell("textDocument/didOpen", json!({"textDocument": document})).await;
    }

    pub async fn change(&mut self, uri: &str, version: i32, changes: Value) {
        let document = json!({"uri": uri, "version": version});
        self.tell("textDocument/didChange", json!({"textDocument": document, "contentChanges": changes})).await;
    }

    pub async fn notice(&mut self) -> Value {
        if self.kept.is_empty() { self.read().await.expect("a notice") } else { self.kept.remove(0) }
    }

    /// The findings of a version of a file.
    pub async fn diagnostics(&mut self, uri: &str, version: Option<i32>) -> Vec<Value> {
        loop {
            let notice = self.notice().await;
            let params = &notice["params"];
            if notice["method"] == "textDocument/publishDiagnostics"
                && params["uri"] == uri
                && params["version"].as_i64() == version.map(i64::from)
            {
                return params["diagnostics"].as_array().expect("a list").clone();
            }
        }
    }

    pub async fn leave(mut self) -> u8 {
        self.ask("shutdown", Value::Null).await;
        self.tell("exit", Value::Null).await;
        self.code().await
    }

    pub async fn code(self) -> u8 {
        tokio::time::timeout(PATIENCE, self.served).await.expect("the server stays").expect("no panic")
    }
}
