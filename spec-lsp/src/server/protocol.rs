//! From what the features say to the types of the protocol, and from its positions to byte offsets.

use std::collections::HashMap;

use firstpole_core::particular::SheetKind;
use firstpole_core::{FileId, FilePlace, Place, Span};
use lsp_types as lsp;
use serde_json::{Value, json};

use super::checker::{Checked, OWN};
use super::documents::Change;
use super::findings::{self, Takes};
use super::positions::{Encoding, Position, View};
use crate::features::actions::Action;
use crate::features::completion::{Proposal, ProposalKind, Subject};
use crate::features::hover::Hover;
use crate::features::symbols::Symbol;
use crate::features::text::Text;
use crate::features::tokens::{Token, TokenKind};
use crate::features::{actions, completion, definition, folding, hints, hover, links, symbols, tokens};

/// What the client told that it can do.
#[derive(Clone, Copy, Debug, Default)]
pub struct Abilities {
    /// What columns count.
    pub encoding: Encoding,
    /// Whether it fills in snippets.
    pub snippets: bool,
    /// What it takes of a finding.
    pub takes: Takes,
    /// Whether a hover may be Markdown.
    pub hover_markdown: bool,
    /// Whether the documentation of a proposal may be Markdown.
    pub completion_markdown: bool,
    /// Whether the outline may have levels.
    pub nested_symbols: bool,
    /// Whether it takes code actions that are more than commands.
    pub literal_actions: bool,
    /// Whether it watches files for the server.
    pub watches: bool,
}

impl Abilities {
    /// Those that a client declares.
    pub fn of(client: &lsp::ClientCapabilities) -> Self {
        let encodings = client.general.as_ref().and_then(|general| general.position_encodings.as_ref());
        let utf8 = encodings.is_some_and(|all| all.contains(&lsp::PositionEncodingKind::UTF8));
        let text = client.text_document.as_ref();
        let markdown = |formats: Option<&Vec<lsp::MarkupKind>>| {
            formats.is_some_and(|formats| formats.contains(&lsp::MarkupKind::Markdown))
        };
        let item =
            text.and_then(|text| text.completion.as_ref()).and_then(|completion| completion.completion_item.as_ref());
        Self {
            encoding: if utf8 { Encoding::Utf8 } else { Encoding::Utf16 },
            takes: takes(text),
            snippets: item.and_then(|item| item.snippet_support).unwrap_or(false),
            completion_markdown: markdown(item.and_then(|item| item.documentation_format.as_ref())),
            hover_markdown: markdown(
                text.and_then(|text| text.hover.as_ref()).and_then(|hover| hover.content_format.as_ref()),
            ),
            nested_symbols: text
                .and_then(|text| text.document_symbol.as_ref())
                .and_then(|symbols| symbols.hierarchical_document_symbol_support)
                .unwrap_or(false),
            literal_actions: text
                .and_then(|text| text.code_action.as_ref())
                .is_some_and(|actions| actions.code_action_literal_support.is_some()),
            watches: client
                .workspace
                .as_ref()
                .and_then(|workspace| workspace.did_change_watched_files.as_ref())
                .and_then(|watched| watched.dynamic_registration)
                .unwrap_or(false),
        }
    }
}

fn takes(text: Option<&lsp::TextDocumentClientCapabilities>) -> Takes {
    let Some(findings) = text.and_then(|text| text.publish_diagnostics.as_ref()) else { return Takes::default() };
    Takes {
        related: findings.related_information.unwrap_or(false),
        marks: findings.tag_support.is_some(),
        data: findings.data_support.unwrap_or(false),
    }
}

/// What the server can do.
pub fn capabilities(abilities: Abilities) -> lsp::ServerCapabilities {
    lsp::ServerCapabilities {
        position_encoding: Some(match abilities.encoding {
            Encoding::Utf8 => lsp::PositionEncodingKind::UTF8,
            Encoding::Utf16 => lsp::PositionEncodingKind::UTF16,
        }),
        text_document_sync: Some(lsp::TextDocumentSyncCapability::Options(lsp::TextDocumentSyncOptions {
            open_close: Some(true),
            change: Some(lsp::TextDocumentSyncKind::INCREMENTAL),
            save: Some(lsp::TextDocumentSyncSaveOptions::Supported(true)),
            ..lsp::TextDocumentSyncOptions::default()
        })),
        hover_provider: Some(lsp::HoverProviderCapability::Simple(true)),
        completion_provider: Some(lsp::CompletionOptions {
            trigger_characters: Some(vec![":".to_owned(), " ".to_owned()]),
            resolve_provider: Some(true),
            ..lsp::CompletionOptions::default()
        }),
        definition_provider: Some(lsp::OneOf::Left(true)),
        references_provider: Some(lsp::OneOf::Left(true)),
        document_symbol_provider: Some(lsp::OneOf::Left(true)),
        code_action_provider: abilities.literal_actions.then(|| {
            lsp::CodeActionProviderCapability::Options(lsp::CodeActionOptions {
                code_action_kinds: Some(vec![lsp::CodeActionKind::QUICKFIX, lsp::CodeActionKind::REFACTOR_REWRITE]),
                ..lsp::CodeActionOptions::default()
            })
        }),
        document_link_provider: Some(lsp::DocumentLinkOptions {
            resolve_provider: Some(false),
            work_done_progress_options: lsp::WorkDoneProgressOptions::default(),
        }),
        folding_range_provider: Some(lsp::FoldingRangeProviderCapability::Simple(true)),
        semantic_tokens_provider: Some(lsp::SemanticTokensServerCapabilities::SemanticTokensOptions(
            lsp::SemanticTokensOptions {
                legend: lsp::SemanticTokensLegend {
                    token_types: TokenKind::ALL.into_iter().map(token_type).collect(),
                    token_modifiers: Vec::new(),
                },
                full: Some(lsp::SemanticTokensFullOptions::Bool(true)),
                ..lsp::SemanticTokensOptions::default()
            },
        )),
        inlay_hint_provider: Some(lsp::OneOf::Left(true)),
        ..lsp::ServerCapabilities::default()
    }
}

/// What the client is asked to do once it is ready: to watch the specifications, which also change outside of it.
pub fn watch() -> Vec<lsp::Registration> {
    vec![lsp::Registration {
        id: "watch-specifications".to_owned(),
        method: "workspace/didChangeWatchedFiles".to_owned(),
        register_options: Some(json!({ "watchers": [{ "globPattern": "**/*.cbspec" }] })),
    }]
}

const fn token_type(kind: TokenKind) -> lsp::SemanticTokenType {
    match kind {
        TokenKind::Keyword => lsp::SemanticTokenType::KEYWORD,
        TokenKind::Name => lsp::SemanticTokenType::CLASS,
        TokenKind::Label => lsp::SemanticTokenType::PROPERTY,
        TokenKind::OtherLabel => lsp::SemanticTokenType::VARIABLE,
        TokenKind::Number => lsp::SemanticTokenType::NUMBER,
        TokenKind::Unit => lsp::SemanticTokenType::TYPE,
        TokenKind::Text => lsp::SemanticTokenType::STRING,
        TokenKind::Comment => lsp::SemanticTokenType::COMMENT,
    }
}

/// A proposal with its documentation, as far as there is one.
pub fn resolved(mut item: lsp::CompletionItem, abilities: Abilities) -> lsp::CompletionItem {
    let text = item.data.as_ref().and_then(|data| {
        let sheet = data.get("sheet").and_then(Value::as_str).and_then(SheetKind::read);
        completion::documentation(sheet, data.get("label").and_then(Value::as_str)?)
    });
    item.documentation =
        text.map(|text| lsp::Documentation::MarkupContent(markup(&text, abilities.completion_markdown)));
    item
}

/// The text in the form that the client shows.
fn markup(text: &Text, markdown: bool) -> lsp::MarkupContent {
    if markdown {
        lsp::MarkupContent { kind: lsp::MarkupKind::Markdown, value: text.markdown() }
    } else {
        lsp::MarkupContent { kind: lsp::MarkupKind::PlainText, value: text.plain() }
    }
}

/// A change as the client tells it.
pub fn change(event: lsp::TextDocumentContentChangeEvent) -> Change {
    let range = event.range.map(|range| (from(range.start), from(range.end)));
    Change { range, text: event.text }
}

const fn from(position: lsp::Position) -> Position {
    Position::new(position.line, position.character)
}

fn to(position: Position) -> lsp::Position {
    lsp::Position::new(position.line, position.column)
}

/// An assessment with the client that asks about it.
pub struct Edge<'a> {
    /// The assessment; its first file is the document that is asked about.
    pub checked: &'a Checked,
    /// What the client can do.
    pub abilities: Abilities,
}

impl Edge<'_> {
    fn view(&self, file: FileId) -> Option<View<'_>> {
        let source = self.checked.assessment.sources.file(file)?;
        Some(View { text: &source.text, starts: source.line_starts() })
    }

    fn range(&self, place: Place) -> Option<lsp::Range> {
        self.range_at(self.checked.assessment.at(place))
    }

    fn range_at(&self, place: FilePlace) -> Option<lsp::Range> {
        let (start, end) = self.view(place.file)?.range(place.span, self.checked.snapshot.encoding);
        Some(lsp::Range::new(to(start), to(end)))
    }

    fn own(&self, span: Span) -> Option<lsp::Range> {
        self.range_at(FilePlace { file: OWN, span })
    }

    fn url_of(&self, place: Place) -> Option<lsp::Url> {
        self.url(self.checked.assessment.at(place).file)
    }

    fn offset(&self, position: lsp::Position) -> Option<u32> {
        Some(self.view(OWN)?.offset(from(position), self.checked.snapshot.encoding))
    }

    fn span(&self, range: lsp::Range) -> Option<Span> {
        let (start, end) = (self.offset(range.start)?, self.offset(range.end)?);
        Some(Span::new(start, end.max(start)))
    }

    fn url(&self, file: FileId) -> Option<lsp::Url> {
        let name = &self.checked.assessment.sources.file(file)?.name;
        lsp::Url::parse(&self.checked.snapshot.uri(name)).ok()
    }

    fn location(&self, place: Place) -> Option<lsp::Location> {
        Some(lsp::Location::new(self.url_of(place)?, self.range(place)?))
    }

    /// Answers a hover.
    pub fn hover(&self, position: lsp::Position) -> Option<lsp::Hover> {
        let Hover { span, text } = hover::hover(&self.checked.assessment, OWN, self.offset(position)?)?;
        let markup = markup(&text, self.abilities.hover_markdown);
        Some(lsp::Hover { contents: lsp::HoverContents::Markup(markup), range: self.own(span) })
    }

    /// Answers a completion.
    pub fn completion(&self, position: lsp::Position) -> Option<Vec<lsp::CompletionItem>> {
        let proposals = completion::complete(&self.checked.assessment, OWN, self.offset(position)?);
        Some(proposals.into_iter().enumerate().filter_map(|(at, proposal)| self.proposal(at, proposal)).collect())
    }

    fn proposal(&self, at: usize, proposal: Proposal) -> Option<lsp::CompletionItem> {
        let range = self.own(proposal.replaces)?;
        let snippet = proposal.snippet.filter(|_| self.abilities.snippets);
        let format = if snippet.is_some() { lsp::InsertTextFormat::SNIPPET } else { lsp::InsertTextFormat::PLAIN_TEXT };
        let data = proposal.subject.map(|subject| match subject {
            Subject::Particular(sheet, label) => json!({ "sheet": sheet.word(), "label": label }),
            Subject::Rule(name) => json!({ "label": name }),
        });
        let new_text = snippet.unwrap_or(proposal.insert);
        Some(lsp::CompletionItem {
            label: proposal.label,
            kind: Some(match proposal.kind {
                ProposalKind::Heading => lsp::CompletionItemKind::MODULE,
                ProposalKind::Label => lsp::CompletionItemKind::PROPERTY,
                ProposalKind::Value => lsp::CompletionItemKind::VALUE,
                ProposalKind::Unit => lsp::CompletionItemKind::UNIT,
                ProposalKind::Keyword => lsp::CompletionItemKind::KEYWORD,
                ProposalKind::Name => lsp::CompletionItemKind::REFERENCE,
                ProposalKind::Rule => lsp::CompletionItemKind::CONSTANT,
            }),
            detail: (!proposal.detail.is_empty()).then_some(proposal.detail),
            data,
            // Clients sort by the label where nothing else is said.
            sort_text: Some(format!("{at:04}")),
            insert_text_format: Some(format),
            text_edit: Some(lsp::CompletionTextEdit::Edit(lsp::TextEdit { range, new_text })),
            ..lsp::CompletionItem::default()
        })
    }

    /// Answers a request for code actions, of the kinds that it asks for.
    pub fn actions(&self, range: lsp::Range, only: Option<&[lsp::CodeActionKind]>) -> Option<lsp::CodeActionResponse> {
        let actions = actions::actions(&self.checked.assessment, OWN, self.span(range)?);
        let wanted = |kind: &lsp::CodeActionKind| {
            only.is_none_or(|only| {
                only.iter().any(|only| {
                    let rest = kind.as_str().strip_prefix(only.as_str());
                    rest.is_some_and(|rest| only.as_str().is_empty() || rest.is_empty() || rest.starts_with('.'))
                })
            })
        };
        let actions = actions.into_iter().filter_map(|action| self.action(action));
        Some(
            actions
                .filter(|action| action.kind.as_ref().is_none_or(wanted))
                .map(lsp::CodeActionOrCommand::CodeAction)
                .collect(),
        )
    }

    fn action(&self, action: Action<'_>) -> Option<lsp::CodeAction> {
        let edit = lsp::TextEdit { range: self.range(action.edit.place)?, new_text: action.edit.text };
        let finding = action.finding.and_then(|finding| findings::told_of(self.checked, finding)?.typed());
        let kind =
            if finding.is_some() { lsp::CodeActionKind::QUICKFIX } else { lsp::CodeActionKind::REFACTOR_REWRITE };
        Some(lsp::CodeAction {
            title: action.title,
            kind: Some(kind),
            diagnostics: finding.map(|finding| vec![finding]),
            edit: Some(lsp::WorkspaceEdit {
                changes: Some(HashMap::from([(self.url_of(action.edit.place)?, vec![edit])])),
                ..lsp::WorkspaceEdit::default()
            }),
            is_preferred: action.preferred.then_some(true),
            ..lsp::CodeAction::default()
        })
    }

    /// Answers a request for the outline.
    pub fn symbols(&self) -> lsp::DocumentSymbolResponse {
        let symbols = symbols::symbols(&self.checked.assessment, OWN);
        if self.abilities.nested_symbols {
            return lsp::DocumentSymbolResponse::Nested(
                symbols.into_iter().filter_map(|symbol| self.symbol(symbol, lsp::SymbolKind::CLASS)).collect(),
            );
        }
        let mut flat = Vec::new();
        for symbol in symbols {
            let children = symbol.children.iter().map(|child| (child, lsp::SymbolKind::PROPERTY, Some(&symbol.name)));
            for (symbol, kind, container) in [(&symbol, lsp::SymbolKind::CLASS, None)].into_iter().chain(children) {
                let (Some(uri), Some(range)) = (self.url(OWN), self.own(symbol.span)) else { continue };
                let location = lsp::Location::new(uri, range);
                #[allow(deprecated, reason = "the type has no other way to be made")]
                flat.push(lsp::SymbolInformation {
                    name: symbol.name.clone(),
                    kind,
                    tags: None,
                    deprecated: None,
                    location,
                    container_name: container.cloned(),
                });
            }
        }
        lsp::DocumentSymbolResponse::Flat(flat)
    }

    fn symbol(&self, symbol: Symbol, kind: lsp::SymbolKind) -> Option<lsp::DocumentSymbol> {
        let children: Vec<_> =
            symbol.children.into_iter().filter_map(|child| self.symbol(child, lsp::SymbolKind::PROPERTY)).collect();
        #[allow(deprecated, reason = "the type has no other way to be made")]
        Some(lsp::DocumentSymbol {
            name: symbol.name,
            detail: (!symbol.detail.is_empty()).then_some(symbol.detail),
            kind,
            tags: None,
            deprecated: None,
            range: self.own(symbol.span)?,
            selection_range: self.own(symbol.selection)?,
            children: (!children.is_empty()).then_some(children),
        })
    }

    /// Answers a request for what can be folded.
    pub fn folds(&self) -> Vec<lsp::FoldingRange> {
        folding::folds(&self.checked.assessment, OWN)
            .into_iter()
            .filter_map(|fold| {
                let range = self.own(fold.span)?;
                Some(lsp::FoldingRange {
                    start_line: range.start.line,
                    end_line: range.end.line,
                    kind: fold.comment.then_some(lsp::FoldingRangeKind::Comment),
                    ..lsp::FoldingRange::default()
                })
            })
            .collect()
    }

    /// Answers a request for a definition.
    pub fn definition(&self, position: lsp::Position) -> Option<lsp::GotoDefinitionResponse> {
        let offset = self.offset(position)?;
        let place = definition::definition(&self.checked.assessment, OWN, offset)?;
        self.location(place).map(lsp::GotoDefinitionResponse::Scalar)
    }

    /// Answers a request for references.
    pub fn references(&self, position: lsp::Position, with_own: bool) -> Option<Vec<lsp::Location>> {
        let offset = self.offset(position)?;
        let places = definition::references(&self.checked.assessment, OWN, offset, with_own);
        Some(places.into_iter().filter_map(|place| self.location(place)).collect())
    }

    /// Answers a request for links.
    pub fn links(&self) -> Vec<lsp::DocumentLink> {
        links::links(&self.checked.assessment, OWN)
            .into_iter()
            .filter_map(|link| {
                Some(lsp::DocumentLink {
                    range: self.own(link.span)?,
                    target: lsp::Url::parse(&self.checked.snapshot.uri(&link.name)).ok(),
                    tooltip: None,
                    data: None,
                })
            })
            .collect()
    }

    /// Answers a request for hints.
    pub fn hints(&self, range: lsp::Range) -> Option<Vec<lsp::InlayHint>> {
        let hints = hints::hints(&self.checked.assessment, OWN, self.span(range)?);
        let hint = |hint: hints::Hint| {
            Some(lsp::InlayHint {
                position: self.own(Span::new(hint.at, hint.at))?.start,
                label: lsp::InlayHintLabel::String(hint.text),
                kind: None,
                text_edits: None,
                tooltip: Some(lsp::InlayHintTooltip::String(hint.working)),
                padding_left: Some(true),
                padding_right: None,
                data: None,
            })
        };
        Some(hints.into_iter().filter_map(hint).collect())
    }

    /// Answers a request for semantic tokens.
    pub fn tokens(&self) -> lsp::SemanticTokens {
        let mut data = Vec::new();
        let mut last = lsp::Position::default();
        for Token { span, kind } in tokens::tokens(&self.checked.assessment, OWN) {
            let Some(lsp::Range { start, end }) = self.own(span) else { continue };
            let same_line = start.line == last.line;
            data.push(lsp::SemanticToken {
                delta_line: start.line - last.line,
                delta_start: if same_line { start.character - last.character } else { start.character },
                length: end.character.saturating_sub(start.character),
                token_type: TokenKind::ALL.iter().position(|known| *known == kind).unwrap_or(0) as u32,
                token_modifiers_bitset: 0,
            });
            last = start;
        }
        lsp::SemanticTokens { result_id: None, data }
    }
}
