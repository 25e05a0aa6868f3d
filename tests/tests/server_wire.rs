//! The language server over the wire: raw frames through an in-process pipe, as a client sends them.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

use std::time::Duration;

use firstpole::server::{serve, serve_with};
use firstpole_core::finding::Findings;
use firstpole_core::rules::{Check, Policy, Rule};
use firstpole_core::sheet::Set;
use firstpole_core::{Assessor, FindingKind};
use serde_json::{Value, json};
use tokio::io::{AsyncBufReadExt, AsyncReadExt, AsyncWriteExt, BufReader, DuplexStream};
use tokio::task::JoinHandle;

const URI: &str = "file:///nowhere/bay.cbspec";

const BAY: &str = "cbspec 1\n\nsystem Ring132\n    highest voltage: 145 kV\n    frequency: 50 Hz\n\nbreaker LineBay on Ring132\n    rated voltage: 150 kV\n";

/// How long a test waits before it calls something missing.
const PATIENCE: Duration = Duration::from_secs(30);

struct Client {
    to: Option<DuplexStream>,
    from: BufReader<DuplexStream>,
    served: JoinHandle<u8>,
    next: i64,
    /// Notifications that came while an answer was awaited.
    kept: Vec<Value>,
}

impl Client {
    fn start(assessor: Option<Assessor>) -> Self {
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
    async fn new() -> Self {
        let mut client = Self::start(None);
        client.begin(json!({})).await;
        client
    }

    async fn begin(&mut self, capabilities: Value) -> Value {
        let answer =
            self.ask("initialize", json!({"processId": null, "rootUri": null, "capabilities": capabilities})).await;
        self.tell("initialized", json!({})).await;
        answer["result"]["capabilities"].clone()
    }

    async fn raw(&mut self, bytes: &[u8]) {
        self.to.as_mut().expect("open").write_all(bytes).await.expect("written");
    }

    async fn send(&mut self, message: &Value) {
        let body = message.to_string();
        self.raw(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes()).await;
    }

    async fn tell(&mut self, method: &str, params: Value) {
        self.send(&json!({"jsonrpc": "2.0", "method": method, "params": params})).await;
    }

    async fn request(&mut self, method: &str, params: Value) -> i64 {
        self.next += 1;
        let id = self.next;
        self.send(&json!({"jsonrpc": "2.0", "id": id, "method": method, "params": params})).await;
        id
    }

    /// The next message of the server; nothing at the end.
    async fn read(&mut self) -> Option<Value> {
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

    async fn answer(&mut self, id: i64) -> Value {
        loop {
            let message = self.read().await.expect("an answer");
            if message["id"] == id {
                return message;
            }
            self.kept.push(message);
        }
    }

    async fn ask(&mut self, method: &str, params: Value) -> Value {
        let id = self.request(method, params).await;
        self.answer(id).await
    }

    async fn open(&mut self, uri: &str, text: &str) {
        let document = json!({"uri": uri, "languageId": "cbspec", "version": 1, "text": text});
        self.tell("textDocument/didOpen", json!({"textDocument": document})).await;
    }

    async fn change(&mut self, uri: &str, version: i32, changes: Value) {
        let document = json!({"uri": uri, "version": version});
        self.tell("textDocument/didChange", json!({"textDocument": document, "contentChanges": changes})).await;
    }

    async fn notice(&mut self) -> Value {
        if self.kept.is_empty() { self.read().await.expect("a notice") } else { self.kept.remove(0) }
    }

    /// The findings of a version of a file.
    async fn diagnostics(&mut self, uri: &str, version: Option<i32>) -> Vec<Value> {
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

    async fn leave(mut self) -> u8 {
        self.ask("shutdown", Value::Null).await;
        self.tell("exit", Value::Null).await;
        self.code().await
    }

    async fn code(self) -> u8 {
        tokio::time::timeout(PATIENCE, self.served).await.expect("the server stays").expect("no panic")
    }
}

fn rules(diagnostics: &[Value]) -> Vec<&str> {
    diagnostics.iter().filter_map(|diagnostic| diagnostic["code"].as_str()).collect()
}

fn edit(line: u32, from: u32, to: u32, text: &str) -> Value {
    json!({"range": {"start": {"line": line, "character": from}, "end": {"line": line, "character": to}}, "text": text})
}

#[tokio::test(flavor = "multi_thread")]
async fn findings_come_with_severity_rule_place_and_repair() {
    let mut client = Client::start(None);
    client.begin(json!({"textDocument": {"publishDiagnostics": {"dataSupport": true}}})).await;
    client.open(URI, BAY).await;
    let found = client.diagnostics(URI, Some(1)).await;
    let voltage = found.iter().find(|d| d["code"] == "rated-voltage-not-preferred").expect("the finding");
    assert_eq!(voltage["source"], "firstpole");
    assert_eq!(voltage["range"]["start"], json!({"line": 7, "character": 19}));
    assert_eq!(voltage["range"]["end"], json!({"line": 7, "character": 25}));
    assert!(voltage["severity"].as_i64().is_some_and(|severity| (1..=3).contains(&severity)));
    let edits = voltage["data"]["edits"].as_array().expect("repairs");
    assert!(edits.iter().all(|edit| edit["uri"] == URI && edit["newText"].is_string()), "{edits:?}");
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn changes_in_part_and_in_full() {
    let mut client = Client::new().await;
    client.open(URI, BAY).await;
    client.change(URI, 2, json!([edit(7, 19, 22, "145"), edit(0, 0, 0, "# °😀\n")])).await;
    let found = client.diagnostics(URI, Some(2)).await;
    assert!(!rules(&found).contains(&"rated-voltage-not-preferred"), "{found:?}");
    client.change(URI, 3, json!([{"text": BAY}])).await;
    let found = client.diagnostics(URI, Some(3)).await;
    assert!(rules(&found).contains(&"rated-voltage-not-preferred"));
    // A version that is not newer is refused and told, and the text stays.
    client.change(URI, 3, json!([{"text": ""}])).await;
    let refused = client.notice().await;
    assert_eq!(refused["method"], "window/logMessage");
    client.change(URI, 4, json!([edit(0, 0, 0, "")])).await;
    assert_eq!(client.diagnostics(URI, Some(4)).await, found);
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn columns_count_what_was_agreed() {
    let text = "cbspec 1\nsystem S\n    # 😀\n    \"😀\": \"x\"\n    highest voltage: 145 😀\n";
    for (capabilities, encoding, column) in [
        (json!({}), "utf-16", 27),
        (json!({"general": {"positionEncodings": ["utf-32", "utf-8", "utf-16"]}}), "utf-8", 29),
        (json!({"general": {"positionEncodings": ["utf-16"]}}), "utf-16", 27),
    ] {
        let mut client = Client::start(None);
        let able = client.begin(capabilities).await;
        assert_eq!(able["positionEncoding"], encoding);
        client.open(URI, text).await;
        let found = client.diagnostics(URI, Some(1)).await;
        let ends: Vec<_> = found
            .iter()
            .filter(|d| d["range"]["start"]["line"] == 4)
            .map(|d| &d["range"]["end"]["character"])
            .collect();
        assert!(ends.contains(&&json!(column)), "{encoding}: {found:?}");
        // The edit cuts nothing: it replaces the face and the blank before it.
        client.change(URI, 2, json!([edit(4, 24, column, " kV")])).await;
        let found = client.diagnostics(URI, Some(2)).await;
        assert!(found.iter().all(|d| d["range"]["start"]["line"] != 4), "{encoding}: {found:?}");
        assert_eq!(client.leave().await, 0);
    }
}

/// Handlers of the protocol library interleave where they wait; the order of edits must not depend on it.
#[tokio::test(flavor = "multi_thread")]
async fn ten_thousand_changes_end_with_the_newest_version() {
    const VERSIONS: i32 = 10_000;
    let mut client = Client::new().await;
    client.open(URI, "cbspec 1\n").await;
    let mut to = client.to.take().expect("open");
    let writer = tokio::spawn(async move {
        let mut text = String::from("cbspec 1\n");
        for version in 2..=VERSIONS {
            // Each edit appends behind the last one, so that any other order gives another text.
            let word = format!("{version} ");
            let column = text.lines().nth(1).map_or(0, str::len) as u32;
            let change = if column + word.len() as u32 > 3000 {
                text = format!("cbspec 1\n{word}");
                json!({"text": text})
            } else {
                text.push_str(&word);
                edit(1, column, column, &word)
            };
            let params = json!({"textDocument": {"uri": URI, "version": version}, "contentChanges": [change]});
            let body = json!({"jsonrpc": "2.0", "method": "textDocument/didChange", "params": params}).to_string();
            to.write_all(format!("Content-Length: {}\r\n\r\n{body}", body.len()).as_bytes()).await.expect("written");
        }
        (to, text)
    });
    let mut last = 0;
    let burst = loop {
        let notice = client.notice().await;
        assert_ne!(notice["method"], "window/logMessage", "{notice}");
        if notice["method"] == "textDocument/publishDiagnostics" {
            let version = notice["params"]["version"].as_i64().expect("a version");
            assert!(version > last, "{version} after {last}");
            last = version;
            if version == i64::from(VERSIONS) {
                break notice["params"]["diagnostics"].as_array().expect("a list").clone();
            }
        }
    };
    let (to, text) = writer.await.expect("written");
    client.to = Some(to);
    let mut fresh = Client::new().await;
    fresh.open(URI, &text).await;
    assert_eq!(fresh.diagnostics(URI, Some(1)).await, burst);
    assert!(!burst.is_empty());
    assert_eq!(client.leave().await, 0);
    assert_eq!(fresh.leave().await, 0);
}

/// A fixed sequence of numbers that looks like chance.
struct Chance(u64);

impl Chance {
    fn below(&mut self, bound: usize) -> usize {
        self.0 = self.0.wrapping_mul(6_364_136_223_846_793_005).wrapping_add(1_442_695_040_888_963_407);
        (self.0 >> 33) as usize % bound.max(1)
    }
}

#[tokio::test(flavor = "multi_thread")]
async fn a_burst_of_edits_equals_a_fresh_open() {
    let parts = [
        "145 kV",
        "\n",
        "\r\n",
        ":",
        "breaker B on Ring132\n",
        "°",
        "😀",
        "# ",
        "\"",
        "    DC time constant: 45 ms\n",
        "",
    ];
    for seed in 0..8 {
        let mut chance = Chance(seed);
        let mut client = Client::new().await;
        let mut text = BAY.to_owned();
        client.open(URI, &text).await;
        for version in 2..102 {
            let position = |chance: &mut Chance, text: &str| {
                let at = text.floor_char_boundary(chance.below(text.len() + 1));
                // Not between CR and LF, which is no position of the protocol.
                let inside = text[..at].ends_with('\r') && text[at..].starts_with('\n');
                at - usize::from(inside)
            };
            let (a, b) = (position(&mut chance, &text), position(&mut chance, &text));
            let (a, b) = (a.min(b), b.max(a).min(a.min(b) + 12));
            let b = text.floor_char_boundary(b).max(a);
            let b = if text[..b].ends_with('\r') && text[b..].starts_with('\n') { a } else { b };
            let of = |at: usize| {
                let before = &text[..at];
                let lines = before.replace("\r\n", "\n").replace('\r', "\n");
                let line = lines.matches('\n').count();
                let column = lines.rsplit('\n').next().unwrap_or("").encode_utf16().count();
                json!({"line": line, "character": column})
            };
            let new = parts[chance.below(parts.len())];
            let change = json!([{"range": {"start": of(a), "end": of(b)}, "text": new}]);
            text.replace_range(a..b, new);
            client.change(URI, version, change).await;
        }
        let burst = client.diagnostics(URI, Some(101)).await;
        let mut fresh = Client::new().await;
        fresh.open(URI, &text).await;
        assert_eq!(fresh.diagnostics(URI, Some(1)).await, burst, "seed {seed}: {text:?}");
        assert_eq!(client.leave().await, 0);
    }
}

#[tokio::test(flavor = "multi_thread")]
async fn malformed_messages_are_survived() {
    let mut client = Client::new().await;
    client.open(URI, BAY).await;
    client.diagnostics(URI, Some(1)).await;
    let frame = |body: &[u8]| [format!("Content-Length: {}\r\n\r\n", body.len()).as_bytes(), body].concat();
    for bad in [
        frame(b"{\"jsonrpc\":"),
        frame(b"[]"),
        frame(b"\xff"),
        frame(br#"{"jsonrpc":"1.0","method":"x"}"#),
        frame(br#"{"jsonrpc":"2.0","id":1e999,"method":"x"}"#),
        frame(br#"{"jsonrpc":"2.0","method":"textDocument/didOpen","params":7}"#),
        frame(format!("{}{}", "[".repeat(5000), "]".repeat(5000)).as_bytes()),
        b"Content-Length: minus one\r\n\r\n".to_vec(),
        b"hello\r\n\r\n".to_vec(),
        frame(br#"{"jsonrpc":"2.0","method":"textDocument/didChange","params":{"textDocument":{"uri":"file:///nowhere/bay.cbspec","version":2},"contentChanges":[{"text":"cbspec 1\n# \ud83d"}]}}"#),
    ] {
        client.raw(&bad).await;
    }
    // The last of them had half a surrogate pair, which is mended.
    assert!(client.diagnostics(URI, Some(2)).await.is_empty());
    let answer = client.ask("textDocument/documentSymbol", json!({"textDocument": {"uri": URI}})).await;
    assert!(answer["error"].is_null(), "{answer}");
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn leaving() {
    let mut client = Client::new().await;
    client.tell("exit", Value::Null).await;
    assert_eq!(client.code().await, 1, "exit without shutdown");
    let mut client = Client::new().await;
    client.to = None;
    assert_eq!(client.code().await, 1, "the client is gone");
    let mut client = Client::new().await;
    client.ask("shutdown", Value::Null).await;
    let refused = client
        .ask("textDocument/hover", json!({"textDocument": {"uri": URI}, "position": {"line": 0, "character": 0}}))
        .await;
    assert_eq!(refused["error"]["code"], -32600, "{refused}");
    client.tell("exit", Value::Null).await;
    assert_eq!(client.code().await, 0);
    let mut client = Client::start(None);
    let early = client
        .ask("textDocument/hover", json!({"textDocument": {"uri": URI}, "position": {"line": 0, "character": 0}}))
        .await;
    assert_eq!(early["error"]["code"], -32002, "{early}");
    client.tell("exit", Value::Null).await;
    assert_eq!(client.code().await, 1);
}

#[tokio::test(flavor = "multi_thread")]
async fn what_is_not_known_is_said() {
    let mut client = Client::new().await;
    for method in ["textDocument/unheardOf", "workspace/executeAll"] {
        assert_eq!(client.ask(method, json!({})).await["error"]["code"], -32601, "{method}");
    }
    client.tell("$/unheardOf", json!({})).await;
    client.tell("unheardOf", json!({})).await;
    let answer = client
        .ask(
            "textDocument/hover",
            json!({"textDocument": {"uri": "file:///not/open"}, "position": {"line": 0, "character": 0}}),
        )
        .await;
    assert_eq!((answer["result"].is_null(), answer["error"].is_null()), (true, true));
    let answer = client.ask("textDocument/hover", json!({"position": 1})).await;
    assert_eq!(answer["error"]["code"], -32602);
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn over_files() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().canonicalize().expect("a path");
    std::fs::write(path.join("family.cbspec"), "cbspec 1\nfamily Big\n    rated voltage: 150 kV\n").expect("written");
    let uri = |name: &str| format!("file://{}/{name}", path.display());
    let bay = "cbspec 1\nuse \"family.cbspec\"\nbreaker Bay like Big\n    rated frequency: 50 Hz\n";
    let mut client = Client::new().await;
    client.open(&uri("bay.cbspec"), bay).await;
    // A finding in the file that is used is told there, though nobody has it open.
    let found = client.diagnostics(&uri("family.cbspec"), None).await;
    assert!(rules(&found).contains(&"rated-voltage-not-preferred"), "{found:?}");
    // With the file open, its text in the editor counts, and a change of it reassesses what uses it.
    client.open(&uri("family.cbspec"), "cbspec 1\nfamily Big\n    rated voltage: 150 kV\n").await;
    client.diagnostics(&uri("family.cbspec"), Some(1)).await;
    client.change(&uri("family.cbspec"), 2, json!([{"text": "cbspec 1\nfamily Small\n"}])).await;
    loop {
        let found = client.diagnostics(&uri("bay.cbspec"), Some(1)).await;
        if rules(&found).contains(&"unknown-name")
            || found.iter().any(|d| d["message"].as_str().is_some_and(|m| m.contains("Big")))
        {
            break;
        }
    }
    let at = json!({"textDocument": {"uri": uri("bay.cbspec")}, "position": {"line": 1, "character": 8}});
    let links = client.ask("textDocument/documentLink", at).await;
    assert_eq!(links["result"][0]["target"], uri("family.cbspec"));
    // Closed, its text is that of the file again, and what was told of it while it was open is cleared.
    client.tell("textDocument/didClose", json!({"textDocument": {"uri": uri("family.cbspec")}})).await;
    let found = client.diagnostics(&uri("family.cbspec"), None).await;
    let mut found = found;
    while !rules(&found).contains(&"rated-voltage-not-preferred") {
        found = client.diagnostics(&uri("family.cbspec"), None).await;
    }
    client.tell("textDocument/didClose", json!({"textDocument": {"uri": uri("bay.cbspec")}})).await;
    while !client.diagnostics(&uri("family.cbspec"), None).await.is_empty() {}
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn files_that_change_outside_of_the_editor() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().canonicalize().expect("a path");
    let uri = format!("file://{}/bay.cbspec", path.display());
    let mut client = Client::start(None);
    client.begin(json!({"workspace": {"didChangeWatchedFiles": {"dynamicRegistration": true}}})).await;
    let asked = client.notice().await;
    assert_eq!(asked["method"], "client/registerCapability");
    client.send(&json!({"jsonrpc": "2.0", "id": asked["id"], "result": null})).await;
    client.open(&uri, "cbspec 1\nuse \"family.cbspec\"\n").await;
    assert_eq!(rules(&client.diagnostics(&uri, Some(1)).await), ["use-unreadable"]);
    std::fs::write(path.join("family.cbspec"), "cbspec 1\nfamily Big\n").expect("written");
    client.tell("workspace/didChangeWatchedFiles", json!({"changes": []})).await;
    assert!(client.diagnostics(&uri, Some(1)).await.is_empty());
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn nothing_is_read_outside_of_the_workspace() {
    let folder = tempfile::tempdir().expect("a folder");
    let path = folder.path().canonicalize().expect("a path");
    std::fs::create_dir(path.join("inside")).expect("a folder");
    std::fs::write(path.join("secret.cbspec"), "cbspec 1\nfamily Secret\n").expect("written");
    let root = format!("file://{}/inside", path.display());
    let mut client = Client::start(None);
    client.ask("initialize", json!({"processId": null, "rootUri": root, "capabilities": {}})).await;
    client.tell("initialized", json!({})).await;
    let uri = format!("{root}/bay.cbspec");
    client.open(&uri, "cbspec 1\nuse \"../secret.cbspec\"\n").await;
    let found = client.diagnostics(&uri, Some(1)).await;
    assert_eq!(rules(&found), ["use-unreadable"]);
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn every_feature_answers() {
    let mut client = Client::start(None);
    let able = client
        .begin(json!({"textDocument": {
            "codeAction": {"codeActionLiteralSupport": {"codeActionKind": {"valueSet": ["quickfix"]}}},
            "documentSymbol": {"hierarchicalDocumentSymbolSupport": true},
            "completion": {"completionItem": {"snippetSupport": true, "documentationFormat": ["markdown"]}},
            "hover": {"contentFormat": ["markdown", "plaintext"]},
        }}))
        .await;
    assert_eq!(able["positionEncoding"], "utf-16");
    let text = format!("{BAY}    Isc: 31.5 kA\n    making current: from duty\n    DC time constant: 45 ms\n    \n");
    client.open(URI, &text).await;
    let at = |line: u32, character: u32| json!({"textDocument": {"uri": URI}, "position": {"line": line, "character": character}});
    let hover = client.ask("textDocument/hover", at(7, 6)).await;
    assert_eq!(hover["result"]["contents"]["kind"], "markdown");
    assert!(hover["result"]["contents"]["value"].as_str().is_some_and(|text| text.starts_with("**rated voltage**")));
    let completion = client.ask("textDocument/completion", at(11, 4)).await;
    let items = completion["result"].as_array().expect("a list").clone();
    let item = items.iter().find(|item| item["label"] == "opening time").expect("a label that is missing").clone();
    assert!(item["documentation"].is_null());
    let item = client.ask("completionItem/resolve", item).await;
    assert_eq!(item["result"]["documentation"]["kind"], "markdown", "{item}");
    let definition = client.ask("textDocument/definition", at(6, 22)).await;
    assert_eq!(definition["result"]["range"]["start"], json!({"line": 2, "character": 7}));
    let mut params = at(2, 8);
    params["context"] = json!({"includeDeclaration": true});
    assert_eq!(client.ask("textDocument/references", params).await["result"].as_array().map(Vec::len), Some(2));
    let symbols = client.ask("textDocument/documentSymbol", at(0, 0)).await;
    assert_eq!(symbols["result"][1]["name"], "breaker LineBay");
    assert_eq!(symbols["result"][1]["children"][0]["name"], "rated voltage");
    let folds = client.ask("textDocument/foldingRange", at(0, 0)).await;
    assert_eq!(folds["result"][0]["startLine"], 2);
    let tokens = client.ask("textDocument/semanticTokens/full", at(0, 0)).await;
    let data = tokens["result"]["data"].as_array().expect("numbers").clone();
    assert_eq!((data.len() % 5, &data[..5]), (0, &[json!(0), json!(0), json!(6), json!(0), json!(0)][..]));
    let range = json!({"start": {"line": 0, "character": 0}, "end": {"line": 99, "character": 0}});
    let hints = client.ask("textDocument/inlayHint", json!({"textDocument": {"uri": URI}, "range": range})).await;
    assert_eq!(hints["result"][0]["position"]["line"], 9, "{hints}");
    let params = json!({"textDocument": {"uri": URI}, "range": range, "context": {"diagnostics": []}});
    let actions = client.ask("textDocument/codeAction", params).await;
    let actions = actions["result"].as_array().expect("a list");
    assert!(
        actions.iter().any(|action| action["title"].as_str().is_some_and(|t| t.starts_with("add a deviation from ")))
    );
    assert!(actions.iter().all(|action| action["edit"]["changes"][URI].is_array()), "{actions:?}");
    assert_eq!(client.leave().await, 0);
}

fn fall_over(set: &Set, _: &Policy, _: &mut Findings) {
    assert!(!set.sheets().any(|sheet| sheet.name == "Panic"), "a seeded fault");
}

static FAULTY: Rule = Rule {
    name: "faulty",
    title: "A rule that panics.",
    kind: FindingKind::Remark,
    basis: "none",
    formula: "none",
    explanation: "It is there to see what a panic in a rule does to the server.",
    check: Check::Set(fall_over),
};

#[tokio::test(flavor = "multi_thread")]
async fn a_panic_in_a_rule_is_told_and_survived() {
    let mut client = Client::start(Some(Assessor::standard().with_rule(&FAULTY)));
    client.begin(json!({})).await;
    client.open(URI, BAY).await;
    let found = client.diagnostics(URI, Some(1)).await;
    client.change(URI, 2, json!([edit(6, 8, 15, "Panic")])).await;
    let faulty = client.diagnostics(URI, Some(2)).await;
    assert!(faulty[0]["message"].as_str().is_some_and(|message| message.starts_with("internal fault")), "{faulty:?}");
    assert_eq!(faulty.len(), found.len() + 1, "what was found last stays");
    let hover = client
        .ask("textDocument/hover", json!({"textDocument": {"uri": URI}, "position": {"line": 7, "character": 6}}))
        .await;
    assert!(hover["error"].is_null(), "{hover}");
    client.change(URI, 3, json!([edit(6, 8, 13, "LineBay")])).await;
    assert_eq!(client.diagnostics(URI, Some(3)).await, found);
    assert_eq!(client.leave().await, 0);
}
