//! The rules, found by their files.

use std::sync::LazyLock;

use crate::list::FILES;
use crate::page::Page;
use crate::rule::{FAMILIES, Rule};

/// A rule with what its file says of it.
pub struct Entry {
    /// The id: its file's name, in kebab case.
    pub id: String,
    /// The family: its folder.
    pub family: &'static str,
    /// The rule.
    pub rule: &'static Rule,
    /// Its page.
    pub page: Page,
}

/// A rule file as the generated list names it.
pub(crate) struct File {
    pub(crate) family: &'static str,
    pub(crate) stem: &'static str,
    pub(crate) rule: &'static Rule,
    pub(crate) text: &'static str,
}

static CATALOGUE: LazyLock<Vec<Entry>> = LazyLock::new(|| {
    let mut entries: Vec<Entry> = FILES
        .iter()
        .map(|file| Entry {
            id: file.stem.replace('_', "-"),
            family: file.family,
            rule: file.rule,
            page: Page::of(file.text),
        })
        .collect();
    let order = |family| FAMILIES.iter().position(|f| *f == family);
    entries.sort_by(|a, b| (order(a.family), &a.id).cmp(&(order(b.family), &b.id)));
    entries
});

/// Every rule, by family and name.
#[must_use]
pub fn catalogue() -> &'static [Entry] {
    &CATALOGUE
}

/// The rule of that id.
#[must_use]
pub fn entry(id: &str) -> Option<&'static Entry> {
    catalogue().iter().find(|entry| entry.id == id)
}

/// The family a rule belongs to.
#[must_use]
pub fn family_of(id: &str) -> Option<&'static str> {
    entry(id).map(|entry| entry.family)
}

/// Whether the name is a family's.
#[must_use]
pub fn is_family(name: &str) -> bool {
    FAMILIES.contains(&name)
}
