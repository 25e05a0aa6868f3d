//! Names, selections, lenses and the form of the text, over the wire.

#![allow(clippy::expect_used, clippy::indexing_slicing, reason = "a test fails by panicking")]

mod wire;

use serde_json::{Value, json};
use wire::Client;

const URI: &str = "file:///nowhere/bay.cbspec";

const BAY: &str =
    "cbspec 1\n\nsystem Ring\n  frequency: 50 Hz\n\nbreaker Bay on Ring\n    rated voltage: 145 kV # \u{1f600}\n";

async fn opened(text: &str) -> Client {
    let mut client = Client::new().await;
    client.open(URI, text).await;
    client
}

fn at(line: u32, character: u32) -> Value {
    json!({"textDocument": {"uri": URI}, "position": {"line": line, "character": character}})
}

#[tokio::test(flavor = "multi_thread")]
async fn a_name_is_changed_wherever_it_stands() {
    let folder = tempfile::tempdir().expect("a folder");
    let root = folder.path().canonicalize().expect("a path");
    let uri = |name: &str| format!("file://{}/{name}", root.display());
    std::fs::write(root.join("family.cbspec"), "cbspec 1\nfamily Big\n").expect("written");
    std::fs::write(root.join("other.cbspec"), "cbspec 1\nuse \"family.cbspec\"\nbreaker Other like Big\n")
        .expect("written");
    std::fs::write(root.join("stranger.cbspec"), "cbspec 1\nfamily Big\nbreaker Mine like Big\n").expect("written");
    let mut client = Client::start(None);
    client
        .ask(
            "initialize",
            json!({"processId": null, "rootUri": format!("file://{}", root.display()), "capabilities": {}}),
        )
        .await;
    client.tell("initialized", json!({})).await;
    let bay = "cbspec 1\nuse \"family.cbspec\"\nbreaker Bay like Big\n";
    client.open(&uri("bay.cbspec"), bay).await;
    let place = json!({"textDocument": {"uri": uri("bay.cbspec")}, "position": {"line": 2, "character": 17}});
    let prepared = client.ask("textDocument/prepareRename", place.clone()).await;
    assert_eq!(prepared["result"]["placeholder"], "Big");
    let mut asked = place.clone();
    asked["newName"] = json!("Very big");
    let answer = client.ask("textDocument/rename", asked.clone()).await;
    let changes = answer["result"]["changes"].as_object().expect("changes").clone();
    let files: Vec<&String> = changes.keys().collect();
    assert_eq!(files, [&uri("bay.cbspec"), &uri("family.cbspec"), &uri("other.cbspec")]);
    assert!(changes.values().all(|edits| edits[0]["newText"] == "\"Very big\""), "{changes:?}");
    asked["newName"] = json!("a\"b");
    let refused = client.ask("textDocument/rename", asked).await;
    assert!(refused["error"]["message"].as_str().is_some_and(|why| why.contains("no quotes")), "{refused}");
    let mut asked = place;
    asked["context"] = json!({"includeDeclaration": true});
    let found = client.ask("textDocument/references", asked).await;
    assert_eq!(found["result"].as_array().expect("places").len(), 3, "{found}");
    let symbols = client.ask("workspace/symbol", json!({"query": "big"})).await;
    assert_eq!(symbols["result"].as_array().expect("sheets").len(), 2, "{symbols}");
    assert_eq!(client.leave().await, 0);
}

#[tokio::test(flavor = "multi_thread")]
async fn highlights_selections_and_lenses() {
    let mut client = opened(BAY).await;
    let marked = client.ask("textDocument/documentHighlight", at(2, 8)).await;
    assert_eq!(marked["result"].as_array().expect("marks").len(), 2);
    let mut asked = at(0, 0);
    asked["positions"] = json!([{"line": 6, "character": 20}, {"line": 99, "character": 9}]);
    let grown = client.ask("textDocument/selectionRange", asked).await;
    let grown = grown["result"].as_array().expect("one for each").clone();
    assert_eq!(grown.len(), 2);
    assert!(grown[0]["parent"]["parent"].is_object(), "{grown:?}");
    let lenses = client.ask("textDocument/codeLens", json!({"textDocument": {"uri": URI}})).await;
    let lens = &lenses["result"][0];
    assert_eq!(lens["range"]["start"]["line"], 5);
    assert!(lens["command"]["title"].as_str().is_some_and(|title| title.contains("omission")), "{lens}");
    assert_eq!(client.leave().await, 0);
}

/// A text after edits of the protocol, none of which overlap; columns here are bytes of ASCII lines.
fn edited(text: &str, edits: &[Value]) -> String {
    let starts: Vec<usize> = std::iter::once(0).chain(text.match_indices('\n').map(|(at, _)| at + 1)).collect();
    let offset = |position: &Value| {
        let (line, column) =
            (position["line"].as_u64().expect("a line"), position["character"].as_u64().expect("a column"));
        starts.get(line as usize).map_or(text.len(), |start| start + column as usize)
    };
    let mut text = text.to_owned();
    for edit in edits.iter().rev() {
        let (start, end) = (offset(&edit["range"]["start"]), offset(&edit["range"]["end"]));
        text.replace_range(start..end, edit["newText"].as_str().expect("a text"));
    }
    text
}

#[tokio::test(flavor = "multi_thread")]
async fn the_text_is_aligned_whole_and_in_part() {
    let mut client = opened(BAY).await;
    let options = json!({"tabSize": 4, "insertSpaces": true});
    let whole = client.ask("textDocument/formatting", json!({"textDocument": {"uri": URI}, "options": options})).await;
    let edits = whole["result"].as_array().expect("edits").clone();
    assert_eq!(edits.len(), 2, "{edits:?}");
    let aligned = firstpole_core::documents::align::align(BAY);
    assert_eq!(edited(BAY, &edits), aligned);
    let range = json!({"start": {"line": 3, "character": 0}, "end": {"line": 3, "character": 4}});
    let part = client
        .ask("textDocument/rangeFormatting", json!({"textDocument": {"uri": URI}, "range": range, "options": options}))
        .await;
    assert_eq!(part["result"].as_array().expect("edits").len(), 1, "{part}");
    client.change(URI, 2, json!([{"text": aligned}])).await;
    let again = client.ask("textDocument/formatting", json!({"textDocument": {"uri": URI}, "options": options})).await;
    assert_eq!(again["result"], json!([]));
    assert_eq!(client.leave().await, 0);
}
