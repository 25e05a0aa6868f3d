//! What a client asks for instead of being told, tokens as far as they have changed, and settings at run time, over the wire.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

mod wire;

use serde_json::{Value, json};
use wire::Client;

const URI: &str = "file:///nowhere/bay.cbspec";
const FAMILY: &str = "file:///nowhere/family.cbspec";

const BAY: &str = "cbspec 1\nuse \"family.cbspec\"\nbreaker Bay like Big\n    rated frequency: 50 Hz\n";
const BIG: &str = "cbspec 1\nfamily Big\n    rated voltage: 150 kV\n";

async fn asking() -> Client {
    let mut client = Client::start(None);
    client
        .begin(json!({"textDocument": {"diagnostic": {}}, "workspace": {"diagnostic": {"refreshSupport": true}}}))
        .await;
    client.open(FAMILY, BIG).await;
    client.open(URI, BAY).await;
    client
}

fn rules(report: &Value) -> Vec<&str> {
    report["items"].as_array().expect("a list").iter().filter_map(|item| item["code"].as_str()).collect()
}

#[tokio::test(flavor = "multi_thread")]
async fn findings_are_given_when_asked_for_and_not_told_besides() {
    let mut client = asking().await;
    let report = client.ask("textDocument/diagnostic", json!({"textDocument": {"uri": FAMILY}})).await;
    assert_eq!(report["result"]["kind"], "full");
    let state = report["result"]["resultId"].clone();
    let again = json!({"textDocument": {"uri": FAMILY}, "previousResultId": state});
    assert_eq!(client.ask("textDocument/diagnostic", again).await["result"]["kind"], "unchanged");
    let all = client.ask("workspace/diagnostic", json!({"previousResultIds": [{"uri": FAMILY, "value": state}]})).await;
    let items = all["result"]["items"].as_array().expect("documents").clone();
    let kinds: Vec<(&str, &str)> =
        items.iter().filter_map(|item| Some((item["uri"].as_str()?, item["kind"].as_str()?))).collect();
    assert_eq!(kinds, [(URI, "full"), (FAMILY, "unchanged")]);
    assert!(
        client.kept.iter().all(|notice| notice["method"] != "textDocument/publishDiagnostics"),
        "{:?}",
        client.kept
    );
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn a_change_of_what_is_used_makes_the_client_ask_again() {
    let mut client = asking().await;
    let before = client.ask("textDocument/diagnostic", json!({"textDocument": {"uri": URI}})).await;
    client.change(FAMILY, 2, json!([{"text": BIG.replace("Big", "Large")}])).await;
    loop {
        let notice = client.notice().await;
        if notice["method"] == "workspace/diagnostic/refresh" {
            break;
        }
    }
    let after = client.ask("textDocument/diagnostic", json!({"textDocument": {"uri": URI}})).await;
    assert!(!rules(&before["result"]).contains(&"link-unknown"));
    assert!(rules(&after["result"]).contains(&"link-unknown"), "{after}");
}

#[tokio::test(flavor = "multi_thread")]
async fn tokens_of_a_part_and_of_what_has_changed() {
    let mut client = Client::new().await;
    client.open(FAMILY, BIG).await;
    let document = json!({"textDocument": {"uri": FAMILY}});
    let full = client.ask("textDocument/semanticTokens/full", document.clone()).await;
    let mut data = full["result"]["data"].as_array().expect("numbers").clone();
    let range = json!({"start": {"line": 1, "character": 0}, "end": {"line": 1, "character": 3}});
    let part =
        client.ask("textDocument/semanticTokens/range", json!({"textDocument": {"uri": FAMILY}, "range": range})).await;
    assert_eq!(part["result"]["data"].as_array().expect("numbers").len(), 10, "two words: {part}");
    client.change(FAMILY, 2, json!([{"text": BIG.to_owned() + "    rated frequency: 60 Hz\n"}])).await;
    let mut asked = document.clone();
    asked["previousResultId"] = full["result"]["resultId"].clone();
    let delta = client.ask("textDocument/semanticTokens/full/delta", asked.clone()).await;
    for edit in delta["result"]["edits"].as_array().expect("edits") {
        let number = |name: &str| edit[name].as_u64().expect("a number") as usize;
        let start = number("start");
        data.splice(start..start + number("deleteCount"), edit["data"].as_array().cloned().unwrap_or_default());
    }
    let now = client.ask("textDocument/semanticTokens/full", document).await;
    assert_eq!(now["result"]["data"], Value::Array(data));
    let unknown = client.ask("textDocument/semanticTokens/full/delta", asked).await;
    assert!(unknown["result"]["data"].is_array(), "what the server does not remember is given in full: {unknown}");
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn hints_are_switched_at_run_time() {
    let mut client = Client::new().await;
    let text =
        "cbspec 1\nsystem S\n    frequency: 50 Hz\n    short-circuit current: 20 kA\n    X/R: 14\nbreaker B on S\n";
    client.open(URI, text).await;
    let range = json!({"start": {"line": 0, "character": 0}, "end": {"line": 9, "character": 0}});
    let asked = json!({"textDocument": {"uri": URI}, "range": range});
    let hints = client.ask("textDocument/inlayHint", asked.clone()).await;
    let count = hints["result"].as_array().expect("hints").len();
    assert!(count > 0, "{hints}");
    let off = json!({"settings": {"firstpole": {"hints": {"time-constant": false, "peak": false}}}});
    client.tell("workspace/didChangeConfiguration", off).await;
    let hints = client.ask("textDocument/inlayHint", asked).await;
    assert!(hints["result"].as_array().expect("hints").len() < count, "{hints}");
    assert_eq!(client.leave().await, 0);
}
