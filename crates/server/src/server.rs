//! The requests: each hands over to its feature.

use std::sync::Arc;

use serde_json::Value;
use tokio::runtime::Handle;
use tower_lsp::jsonrpc::{Error, ErrorCode, Result};
use tower_lsp::lsp_types::{
    CodeAction, CodeActionParams, CodeActionResponse, CompletionParams, CompletionResponse,
    DidChangeConfigurationParams, DidChangeWatchedFilesParams, DidSaveTextDocumentParams,
    DocumentDiagnosticParams, DocumentDiagnosticReportResult, DocumentFormattingParams,
    DocumentHighlight, DocumentHighlightParams, DocumentOnTypeFormattingParams,
    DocumentRangeFormattingParams, DocumentSymbolParams, DocumentSymbolResponse,
    ExecuteCommandParams, FoldingRange, FoldingRangeParams, GotoDefinitionParams,
    GotoDefinitionResponse, Hover, HoverParams, InitializeParams, InitializeResult,
    InitializedParams, InlayHint, InlayHintParams, Location, PrepareRenameResponse,
    ReferenceParams, RenameParams, SelectionRange, SelectionRangeParams, SemanticTokensParams,
    SemanticTokensResult, TextDocumentPositionParams, TextEdit, Url, WorkspaceEdit,
};
use tower_lsp::{Client, LanguageServer, LspService, async_trait};

use crate::documents::{Outcome, Verdict};
use crate::features::{
    code_action, completion, definition, diagnostic, did_change_configuration,
    did_change_watched_files, document_highlight, document_symbol, execute_command, folding_range,
    formatting, hover, initialize, inlay_hint, references, rename, selection_range,
    semantic_tokens,
};
use crate::houses;
use crate::session::Session;
use crate::{hooks, parent};

/// The server as the library routes requests to it.
pub(crate) struct Server {
    pub(crate) session: Arc<Session>,
    pub(crate) client: Client,
}

impl Server {
    /// The service with its line to the client; with the requests tests need, if they are wanted.
    pub(crate) fn service(
        session: &Arc<Session>,
        test_hooks: bool,
    ) -> (LspService<Server>, tower_lsp::ClientSocket) {
        let session = Arc::clone(session);
        let mut builder = LspService::build(|client| Server { session, client });
        if test_hooks {
            builder = hooks::add(builder);
        }
        builder.finish()
    }
}

/// The outcome where the check was done.
///
/// # Errors
/// Where the checker broke off.
fn done(outcome: &Outcome) -> Result<()> {
    match outcome.verdict {
        Verdict::Done(_) | Verdict::House(_) => Ok(()),
        Verdict::BrokeOff => Err(Error {
            message: "the check of this sheet broke off".into(),
            ..Error::internal_error()
        }),
    }
}

#[async_trait]
impl LanguageServer for Server {
    async fn initialize(&self, params: InitializeParams) -> Result<InitializeResult> {
        let agreed = initialize::agree(&params.capabilities);
        self.session.agree(agreed);
        self.session.connect(&self.client, Handle::current());
        if let Some(options) = params.initialization_options {
            did_change_configuration::begin(&self.session, options);
        }
        if let Some(id) = params.process_id {
            parent::watch(id, &self.session);
        }
        Ok(initialize::answer(agreed))
    }

    async fn shutdown(&self) -> Result<()> {
        Ok(())
    }

    async fn initialized(&self, _: InitializedParams) {
        did_change_watched_files::register(&self.session);
        if self.session.agreed().configuration {
            did_change_configuration::fetch(&self.session);
        }
    }

    async fn did_change_configuration(&self, params: DidChangeConfigurationParams) {
        if self.session.agreed().configuration {
            did_change_configuration::fetch(&self.session);
        } else {
            did_change_configuration::take(&self.session, &params.settings);
        }
    }

    async fn did_change_watched_files(&self, _: DidChangeWatchedFilesParams) {
        did_change_watched_files::look(&self.session);
    }

    async fn did_save(&self, _: DidSaveTextDocumentParams) {
        did_change_watched_files::look(&self.session);
    }

    async fn execute_command(&self, params: ExecuteCommandParams) -> Result<Option<Value>> {
        execute_command::run(&self.session, &params.command, &params.arguments)?;
        Ok(None)
    }

    async fn diagnostic(
        &self,
        params: DocumentDiagnosticParams,
    ) -> Result<DocumentDiagnosticReportResult> {
        let uri = &params.text_document.uri;
        let known = params.previous_result_id;
        match self.session.documents.outcome(uri).await {
            Some(outcome) => {
                let agreed = self.session.agreed();
                Ok(diagnostic::report(&outcome, known.as_deref(), agreed))
            }
            None if self.session.documents.snapshot(uri).is_none() => Ok(diagnostic::nothing()),
            None => Err(diagnostic::overtaken()),
        }
    }

    async fn hover(&self, params: HoverParams) -> Result<Option<Hover>> {
        let at = params.text_document_position_params;
        let Some(outcome) = self.session.documents.outcome(&at.text_document.uri).await else {
            return Ok(None);
        };
        done(&outcome)?;
        Ok(hover::hover(&outcome, at.position, self.session.agreed()))
    }

    async fn code_action(&self, params: CodeActionParams) -> Result<Option<CodeActionResponse>> {
        let uri = params.text_document.uri;
        let Some(outcome) = self.outcome(&uri).await? else {
            return Ok(None);
        };
        let agreed = self.session.agreed();
        let question = code_action::Question {
            range: code_action::bytes(&outcome.snapshot.text, params.range, agreed),
            context: params.context,
        };
        if code_action::is_known(&outcome, &question) {
            let made = code_action::actions(&outcome, &question, agreed, || true);
            return Ok(Some(made));
        }
        let session = Arc::clone(&self.session);
        let looking = tokio::task::spawn_blocking(move || {
            let generation = outcome.snapshot.generation;
            let goes_on = || session.documents.is_current(&uri, generation);
            code_action::actions(&outcome, &question, agreed, goes_on)
        });
        looking.await.map(Some).map_err(|_| Error {
            message: "the search for mends broke off".into(),
            ..Error::internal_error()
        })
    }

    async fn code_action_resolve(&self, mut action: CodeAction) -> Result<CodeAction> {
        let Some(data) = action.data.clone() else {
            return Ok(action);
        };
        let kept: code_action::Unresolved = serde_json::from_value(data)
            .map_err(|_| Error::invalid_params("this action is none of ours"))?;
        let outcome = self.session.documents.settled(&kept.uri, kept.generation);
        let outcome = outcome.ok_or_else(moved_on)?;
        let edit = code_action::resolve(&outcome, &kept, self.session.agreed());
        action.edit = Some(edit.ok_or_else(moved_on)?);
        Ok(action)
    }

    async fn completion(&self, params: CompletionParams) -> Result<Option<CompletionResponse>> {
        let at = params.text_document_position;
        let uri = &at.text_document.uri;
        let Some(snapshot) = self.session.documents.snapshot(uri) else {
            return Ok(None);
        };
        let agreed = self.session.agreed();
        let house = || {
            let documents = &self.session.documents;
            let found = self.session.houses.nearest(&houses::path(uri)?, documents);
            match found.nearest {
                houses::Nearest::House(house) => house.name.clone(),
                houses::Nearest::None | houses::Nearest::Broken(_) => None,
            }
        };
        let found = completion::complete(&snapshot, at.position, house, agreed);
        Ok(Some(CompletionResponse::Array(found)))
    }

    async fn goto_definition(
        &self,
        params: GotoDefinitionParams,
    ) -> Result<Option<GotoDefinitionResponse>> {
        let at = params.text_document_position_params;
        let outcome = self.outcome(&at.text_document.uri).await?;
        let agreed = self.session.agreed();
        let found = outcome.and_then(|o| definition::definition(&o, at.position, agreed));
        Ok(found.map(GotoDefinitionResponse::Array))
    }

    async fn references(&self, params: ReferenceParams) -> Result<Option<Vec<Location>>> {
        let at = params.text_document_position;
        let declaration = params.context.include_declaration;
        let outcome = self.outcome(&at.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| references::references(&o, at.position, declaration, agreed)))
    }

    async fn prepare_rename(
        &self,
        at: TextDocumentPositionParams,
    ) -> Result<Option<PrepareRenameResponse>> {
        let outcome = self.outcome(&at.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| rename::prepare(&o, at.position, agreed)))
    }

    async fn rename(&self, params: RenameParams) -> Result<Option<WorkspaceEdit>> {
        let at = params.text_document_position;
        let Some(outcome) = self.outcome(&at.text_document.uri).await? else {
            return Ok(None);
        };
        let (agreed, new) = (self.session.agreed(), params.new_name);
        // The sheet is read with the new name.
        let trying = tokio::task::spawn_blocking(move || {
            rename::rename(&outcome, at.position, &new, agreed)
        });
        trying.await.map_err(|_| Error::internal_error())?
    }

    async fn document_highlight(
        &self,
        params: DocumentHighlightParams,
    ) -> Result<Option<Vec<DocumentHighlight>>> {
        let at = params.text_document_position_params;
        let outcome = self.outcome(&at.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| document_highlight::highlight(&o, at.position, agreed)))
    }

    async fn document_symbol(
        &self,
        params: DocumentSymbolParams,
    ) -> Result<Option<DocumentSymbolResponse>> {
        let outcome = self.outcome(&params.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| document_symbol::symbols(&o, agreed)))
    }

    async fn formatting(&self, params: DocumentFormattingParams) -> Result<Option<Vec<TextEdit>>> {
        let outcome = self.outcome(&params.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| formatting::whole(&o, agreed)))
    }

    async fn range_formatting(
        &self,
        params: DocumentRangeFormattingParams,
    ) -> Result<Option<Vec<TextEdit>>> {
        let outcome = self.outcome(&params.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| formatting::range(&o, params.range, agreed)))
    }

    async fn on_type_formatting(
        &self,
        params: DocumentOnTypeFormattingParams,
    ) -> Result<Option<Vec<TextEdit>>> {
        let at = params.text_document_position;
        let outcome = self.outcome(&at.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.and_then(|o| formatting::on_type(&o, at.position, agreed)))
    }

    async fn folding_range(&self, params: FoldingRangeParams) -> Result<Option<Vec<FoldingRange>>> {
        let snapshot = self.session.documents.snapshot(&params.text_document.uri);
        let sheet = snapshot.filter(|s| !houses::is_house(&s.uri));
        Ok(sheet.map(|sheet| folding_range::folds(sheet.text.as_str())))
    }

    async fn selection_range(
        &self,
        params: SelectionRangeParams,
    ) -> Result<Option<Vec<SelectionRange>>> {
        let outcome = self.outcome(&params.text_document.uri).await?;
        let agreed = self.session.agreed();
        Ok(outcome.map(|o| selection_range::ranges(&o, &params.positions, agreed)))
    }

    async fn inlay_hint(&self, params: InlayHintParams) -> Result<Option<Vec<InlayHint>>> {
        let outcome = self.outcome(&params.text_document.uri).await?;
        let (agreed, settings) = (self.session.agreed(), self.session.settings());
        Ok(outcome.and_then(|o| inlay_hint::hints(&o, params.range, &settings, agreed)))
    }

    async fn semantic_tokens_full(
        &self,
        params: SemanticTokensParams,
    ) -> Result<Option<SemanticTokensResult>> {
        let snapshot = self.session.documents.snapshot(&params.text_document.uri);
        let sheet = snapshot.filter(|s| !houses::is_house(&s.uri));
        let columns = self.session.agreed().columns;
        Ok(sheet.map(|sheet| semantic_tokens::tokens(sheet.text.as_str(), columns).into()))
    }
}

/// The document changed before it was checked (LSP 3.17, `ContentModified`).
fn moved_on() -> Error {
    Error {
        code: ErrorCode::ServerError(-32801),
        message: "the document changed meanwhile".into(),
        data: None,
    }
}

impl Server {
    /// What was made of a document as it is now; `None` where it is not open, or is no sheet.
    ///
    /// # Errors
    /// Where it changed before it was checked, or the checker broke off.
    async fn outcome(&self, uri: &Url) -> Result<Option<Arc<Outcome>>> {
        let documents = &self.session.documents;
        match documents.outcome(uri).await {
            Some(outcome) => {
                done(&outcome)?;
                Ok(outcome.checked().is_some().then_some(outcome))
            }
            None if documents.snapshot(uri).is_none() => Ok(None),
            None => Err(moved_on()),
        }
    }
}
