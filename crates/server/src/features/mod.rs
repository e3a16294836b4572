//! One file a feature, under the protocol's own word for it.

pub(crate) mod hover;
pub(crate) mod initialize;
pub(crate) mod publish_diagnostics;
