//! `initialize`: what the client can show, and what the server offers.

use tower_lsp::lsp_types::{
    ClientCapabilities, HoverProviderCapability, InitializeResult, MarkupKind, OneOf,
    ServerCapabilities, ServerInfo, TextDocumentSyncCapability, TextDocumentSyncKind,
    TextDocumentSyncOptions, WorkspaceFoldersServerCapabilities, WorkspaceServerCapabilities,
};

use crate::convert;
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
    Agreed {
        columns: convert::columns(encodings),
        // The client lists what it prefers first.
        markdown: formats.and_then(|f| f.first()) == Some(&MarkupKind::Markdown),
        related: publish.and_then(|p| p.related_information).unwrap_or(false),
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
                    ..TextDocumentSyncOptions::default()
                },
            )),
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
