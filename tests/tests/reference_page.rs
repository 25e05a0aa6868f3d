//! The reference page is what the declarations say.

#[test]
fn the_reference_page_is_fresh() {
    let path = firstpole_tests::root().join("grammar/REFERENCE.md");
    let page = std::fs::read_to_string(&path).unwrap_or_default();
    assert!(
        page.replace("\r\n", "\n") == firstpole_core::documents::reference::page(),
        "grammar/REFERENCE.md is stale: cargo run -p firstpole-tests --bin reference > grammar/REFERENCE.md"
    );
}
