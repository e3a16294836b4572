//! `initialize`: what the client can show, and what the server offers.

use tower_lsp::lsp_types::{
    ClientCapabilities, CodeActionOptions, CodeActionProviderCapability, CompletionOptions,
    DiagnosticOptions, DiagnosticServerCapabilities, DocumentOnTypeFormattingOptions,
    ExecuteCommandOptions, FoldingRangeProviderCapability, HoverProviderCapability,
    InitializeResult, MarkupKind, OneOf, RenameOptions, SelectionRangeProviderCapability,
    ServerCapabilities, ServerInfo, TextDocumentSyncCapability, TextDocumentSyncKind,
    TextDocumentSyncOptions, TextDocumentSyncSaveOptions, WorkDoneProgressOptions,
    WorkspaceFoldersServerCapabilities, WorkspaceServerCapabilities,
};

use crate::convert;
use crate::features::{code_action, completion, execute_command, semantic_tokens};
use crate::session::Agreed;

/// What follows from the client's capabilities.
pub(crate) fn agree(client: &ClientCapabilities) -> Agreed {
    let encodings = client
        .general
        .as_ref()
        .and_then(|g| g.position_encodings.as_deref());
    let document = client.text_document.as_ref();
    let formats = document.and_then(|d| d.hover.as_ref()?.content_format.as_ref());
    let publish = document.and_then(|d| d.publish_diagnostics.as_ref());
    let workspace = client.workspace.as_ref();
    let actions = document.and_then(|d| d.code_action.as_ref());
    let resolves = actions.and_then(|a| a.resolve_support.as_ref());
    let resolves = resolves.is_some_and(|r| r.properties.iter().any(|p| p == "edit"));
    let yes = |flag: Option<bool>| flag.unwrap_or(false);
    Agreed {
        columns: convert::columns(encodings),
        // The client lists what it prefers first.
        markdown: formats.and_then(|f| f.first()) == Some(&MarkupKind::Markdown),
        related: yes(publish.and_then(|p| p.related_information)),
        pull: document.is_some_and(|d| d.diagnostic.is_some()),
        refresh_hints: yes(workspace.and_then(|w| w.inlay_hint.as_ref()?.refresh_support)),
        symbol_trees: yes(document.and_then(|d| {
            d.document_symbol
                .as_ref()?
                .hierarchical_document_symbol_support
        })),
        actions: actions.is_some_and(|a| a.code_action_literal_support.is_some()),
        resolves_edits: resolves && yes(actions.and_then(|a| a.data_support)),
        versioned_edits: yes(workspace.and_then(|w| w.workspace_edit.as_ref()?.document_changes)),
        watches: yes(
            workspace.and_then(|w| w.did_change_watched_files.as_ref()?.dynamic_registration)
        ),
        configuration: yes(workspace.and_then(|w| w.configuration)),
        registers_configuration: yes(
            workspace.and_then(|w| w.did_change_configuration.as_ref()?.dynamic_registration)
        ),
        shows_documents: client
            .window
            .as_ref()
            .and_then(|w| w.show_document.as_ref())
            .is_some_and(|s| s.support),
    }
}

/// What the server offers.
pub(crate) fn answer(agreed: Agreed) -> InitializeResult {
    InitializeResult {
        capabilities: ServerCapabilities {
            position_encoding: Some(convert::encoding(agreed.columns)),
            text_document_sync: Some(TextDocumentSyncCapability::Options(
                TextDocumentSyncOptions {
                    open_close: Some(true),
                    change: Some(TextDocumentSyncKind::INCREMENTAL),
                    save: Some(TextDocumentSyncSaveOptions::Supported(true)),
                    ..TextDocumentSyncOptions::default()
                },
            )),
            code_action_provider: Some(CodeActionProviderCapability::Options(CodeActionOptions {
                code_action_kinds: Some(code_action::KINDS.to_vec()),
                resolve_provider: Some(agreed.resolves_edits),
                ..CodeActionOptions::default()
            })),
            completion_provider: Some(CompletionOptions {
                trigger_characters: Some(completion::TRIGGERS.map(str::to_owned).to_vec()),
                ..CompletionOptions::default()
            }),
            definition_provider: Some(OneOf::Left(true)),
            // Never both ways: see `checker`.
            diagnostic_provider: agreed.pull.then(|| {
                DiagnosticServerCapabilities::Options(DiagnosticOptions {
                    identifier: Some("partwright".to_owned()),
                    inter_file_dependencies: true,
                    workspace_diagnostics: false,
                    ..DiagnosticOptions::default()
                })
            }),
            document_formatting_provider: Some(OneOf::Left(true)),
            document_highlight_provider: Some(OneOf::Left(true)),
            document_on_type_formatting_provider: Some(DocumentOnTypeFormattingOptions {
                first_trigger_character: "|".to_owned(),
                more_trigger_character: None,
            }),
            document_range_formatting_provider: Some(OneOf::Left(true)),
            document_symbol_provider: Some(OneOf::Left(true)),
            execute_command_provider: Some(ExecuteCommandOptions {
                commands: vec![execute_command::SELECT.to_owned()],
                ..ExecuteCommandOptions::default()
            }),
            folding_range_provider: Some(FoldingRangeProviderCapability::Simple(true)),
            inlay_hint_provider: Some(OneOf::Left(true)),
            references_provider: Some(OneOf::Left(true)),
            rename_provider: Some(OneOf::Right(RenameOptions {
                prepare_provider: Some(true),
                work_done_progress_options: WorkDoneProgressOptions::default(),
            })),
            selection_range_provider: Some(SelectionRangeProviderCapability::Simple(true)),
            semantic_tokens_provider: Some(semantic_tokens::offer()),
            hover_provider: Some(HoverProviderCapability::Simple(true)),
            workspace: Some(WorkspaceServerCapabilities {
                workspace_folders: Some(WorkspaceFoldersServerCapabilities {
                    supported: Some(true),
                    change_notifications: Some(OneOf::Left(false)),
                }),
                file_operations: None,
            }),
            ..ServerCapabilities::default()
        },
        server_info: Some(ServerInfo {
            name: "partwright".to_owned(),
            version: Some(env!("CARGO_PKG_VERSION").to_owned()),
        }),
    }
}
