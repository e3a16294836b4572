//! One file a feature, under the protocol's own word for it.

pub(crate) mod code_action;
pub(crate) mod completion;
pub(crate) mod definition;
pub(crate) mod diagnostic;
pub(crate) mod did_change_configuration;
pub(crate) mod did_change_watched_files;
pub(crate) mod document_highlight;
pub(crate) mod document_symbol;
pub(crate) mod execute_command;
pub(crate) mod folding_range;
pub(crate) mod formatting;
pub(crate) mod hover;
pub(crate) mod initialize;
pub(crate) mod inlay_hint;
pub(crate) mod publish_diagnostics;
pub(crate) mod references;
pub(crate) mod rename;
pub(crate) mod selection_range;
pub(crate) mod semantic_tokens;
