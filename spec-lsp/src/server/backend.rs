//! The one file that knows the protocol library: every handler takes the state as it is at once, before it waits for anything, since
//! handlers interleave wherever they wait.

use std::path::PathBuf;
use std::sync::{Arc, OnceLock};

use firstpole_core::Assessor;
use lsp_types as lsp;
use tokio::io::{AsyncRead, AsyncWrite};
use tokio::sync::mpsc;
use tower_lsp::jsonrpc::{Error, Request, Response, Result};
use tower_lsp::{Client, LanguageServer, LspService, Server};

use super::documents::Documents;
use super::mouth;
use super::names::name_of;
use super::protocol::{self, Abilities, Edge};
use super::publish::{self, Tell};
use super::pump::Heard;

/// Requests that are answered at one time.
const AT_ONCE: usize = 32;

/// Bytes of an answer that may wait between the library and the mouth.
const PIPE: usize = 64 * 1024;

/// Decodes a body the way the library does.
pub fn hear(body: &str) -> Option<Heard> {
    if let Ok(request) = serde_json::from_str::<Request>(body) {
        return Some(Heard { method: request.method().to_owned() });
    }
    serde_json::from_str::<Response>(body).is_ok().then(|| Heard { method: String::new() })
}

/// Serves until the input ends. `logged` are lines for the client's log.
pub async fn run<I, O>(assessor: Assessor, input: I, output: O, mut logged: mpsc::UnboundedReceiver<String>)
where
    I: AsyncRead + Unpin,
    O: AsyncWrite + Send + 'static,
{
    let documents = Arc::new(Documents::new(assessor));
    let (tell, mut told) = mpsc::channel(1);
    let (mouth, bodies) = mpsc::channel(mouth::WAITING);
    let (library, far) = tokio::io::duplex(PIPE);
    let speaker = tokio::spawn(mouth::speak(Box::pin(output), bodies));
    let handed_on = tokio::spawn(mouth::hand_on(far, mouth.clone()));
    let checker = tokio::spawn(publish::run(documents.clone(), tell));
    let (service, socket) = LspService::new(|client| {
        let teller = client.clone();
        tokio::spawn(async move {
            while let Some(tell) = told.recv().await {
                match tell {
                    Tell::Findings(body) => {
                        if mouth.send(body).await.is_err() {
                            return;
                        }
                    }
                    Tell::Fault(line) => teller.log_message(lsp::MessageType::ERROR, line).await,
                }
            }
        });
        let logger = client.clone();
        tokio::spawn(async move {
            while let Some(line) = logged.recv().await {
                logger.log_message(lsp::MessageType::WARNING, line).await;
            }
        });
        Backend { client, documents, abilities: OnceLock::new() }
    });
    Server::new(input, library, socket).concurrency_level(AT_ONCE).serve(service).await;
    checker.abort();
    // What the library has written is spoken to its end; a panic in between is none of the client's business.
    let _ = handed_on.await;
    let _ = speaker.await;
}

struct Backend {
    client: Client,
    documents: Arc<Documents>,
    abilities: OnceLock<Abilities>,
}

impl Backend {
    /// Answers about a document as its text stands now. The work is done beside, so that neither its length nor a panic in it
    /// touches anything else.
    fn ask<T, F>(&self, uri: &lsp::Url, answer: F) -> impl Future<Output = Result<Option<T>>> + use<T, F>
    where
        T: Send + 'static,
        F: FnOnce(Edge<'_>) -> T + Send + 'static,
    {
        let documents = self.documents.clone();
        let abilities = self.abilities.get().copied().unwrap_or_default();
        let now = documents.now(&name_of(uri.as_str()));
        async move {
            let Some(now) = now else { return Ok(None) };
            let work = tokio::task::spawn_blocking(move || {
                documents.settle(now).map(|checked| answer(Edge { checked: &checked, abilities }))
            });
            work.await.map_err(|_| Error::internal_error())
        }
    }
}

#[tower_lsp::async_trait]
impl LanguageServer for Backend {
    async fn initialize(&self, params: lsp::InitializeParams) -> Result<lsp::InitializeResult> {
        let abilities = *self.abilities.get_or_init(|| Abilities::of(&params.capabilities));
        self.documents.begin(roots(&params), abilities.encoding, abilities.takes);
        Ok(lsp::InitializeResult {
            capabilities: protocol::capabilities(abilities),
            server_info: Some(lsp::ServerInfo {
                name: "firstpole".to_owned(),
                version: Some(env!("CARGO_PKG_VERSION").to_owned()),
            }),
        })
    }

    async fn initialized(&self, _: lsp::InitializedParams) {
        if self.abilities.get().is_some_and(|abilities| abilities.watches) {
            let client = self.client.clone();
            // A client that refuses tells of saved documents all the same.
            tokio::spawn(async move { drop(client.register_capability(protocol::watch()).await) });
        }
    }

    async fn shutdown(&self) -> Result<()> {
        Ok(())
    }

    async fn did_open(&self, params: lsp::DidOpenTextDocumentParams) {
        let document = params.text_document;
        self.documents.open(document.uri.as_str(), document.version, document.text);
    }

    async fn did_change(&self, params: lsp::DidChangeTextDocumentParams) {
        let document = params.text_document;
        let changes = params.content_changes.into_iter().map(protocol::change).collect();
        if let Err(refused) = self.documents.change(document.uri.as_str(), document.version, changes) {
            // Beside, since a handler that waits for the client can wait for ever when many messages queue.
            let client = self.client.clone();
            tokio::spawn(async move { client.log_message(lsp::MessageType::WARNING, refused).await });
        }
    }

    async fn did_close(&self, params: lsp::DidCloseTextDocumentParams) {
        self.documents.close(params.text_document.uri.as_str());
    }

    async fn did_save(&self, _: lsp::DidSaveTextDocumentParams) {
        self.documents.disk_changed();
    }

    async fn did_change_watched_files(&self, _: lsp::DidChangeWatchedFilesParams) {
        self.documents.disk_changed();
    }

    async fn hover(&self, params: lsp::HoverParams) -> Result<Option<lsp::Hover>> {
        let at = params.text_document_position_params;
        self.ask(&at.text_document.uri, move |edge| edge.hover(at.position)).await.map(Option::flatten)
    }

    async fn completion(&self, params: lsp::CompletionParams) -> Result<Option<lsp::CompletionResponse>> {
        let at = params.text_document_position;
        let items = self.ask(&at.text_document.uri, move |edge| edge.completion(at.position)).await?;
        Ok(items.flatten().map(lsp::CompletionResponse::Array))
    }

    async fn completion_resolve(&self, item: lsp::CompletionItem) -> Result<lsp::CompletionItem> {
        Ok(protocol::resolved(item, self.abilities.get().copied().unwrap_or_default()))
    }

    async fn code_action(&self, params: lsp::CodeActionParams) -> Result<Option<lsp::CodeActionResponse>> {
        let (range, only) = (params.range, params.context.only);
        let actions = self.ask(&params.text_document.uri, move |edge| edge.actions(range, only.as_deref()));
        actions.await.map(Option::flatten)
    }

    async fn document_symbol(&self, params: lsp::DocumentSymbolParams) -> Result<Option<lsp::DocumentSymbolResponse>> {
        self.ask(&params.text_document.uri, |edge| edge.symbols()).await
    }

    async fn folding_range(&self, params: lsp::FoldingRangeParams) -> Result<Option<Vec<lsp::FoldingRange>>> {
        self.ask(&params.text_document.uri, |edge| edge.folds()).await
    }

    async fn goto_definition(&self, params: lsp::GotoDefinitionParams) -> Result<Option<lsp::GotoDefinitionResponse>> {
        let at = params.text_document_position_params;
        self.ask(&at.text_document.uri, move |edge| edge.definition(at.position)).await.map(Option::flatten)
    }

    async fn references(&self, params: lsp::ReferenceParams) -> Result<Option<Vec<lsp::Location>>> {
        let (at, with_own) = (params.text_document_position, params.context.include_declaration);
        let places = self.ask(&at.text_document.uri, move |edge| edge.references(at.position, with_own));
        places.await.map(Option::flatten)
    }

    async fn document_link(&self, params: lsp::DocumentLinkParams) -> Result<Option<Vec<lsp::DocumentLink>>> {
        self.ask(&params.text_document.uri, |edge| edge.links()).await
    }

    async fn inlay_hint(&self, params: lsp::InlayHintParams) -> Result<Option<Vec<lsp::InlayHint>>> {
        let range = params.range;
        self.ask(&params.text_document.uri, move |edge| edge.hints(range)).await.map(Option::flatten)
    }

    async fn semantic_tokens_full(
        &self,
        params: lsp::SemanticTokensParams,
    ) -> Result<Option<lsp::SemanticTokensResult>> {
        self.ask(&params.text_document.uri, |edge| lsp::SemanticTokensResult::Tokens(edge.tokens())).await
    }
}

/// The folders of the workspace that the client names.
fn roots(params: &lsp::InitializeParams) -> Vec<PathBuf> {
    let folders = params.workspace_folders.iter().flatten().map(|folder| &folder.uri);
    let mut roots: Vec<PathBuf> = folders.map(|uri| PathBuf::from(name_of(uri.as_str()))).collect();
    if roots.is_empty() {
        roots.extend(params.root_uri.as_ref().map(|uri| PathBuf::from(name_of(uri.as_str()))));
    }
    roots
}
