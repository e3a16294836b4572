//! A new rule with an example that fails, so that it cannot be forgotten.

use std::fs;

use crate::{list, root, say};

const TEMPLATE: &str = r#"//! TITLE
//!
//! Why: say what the ear or the singer loses.
//!
//! # Fails
//!
//! ```voices
//! S | D5 E |
//! B | G3 A |
//! //     ^ SHORT: S and B
//! ```
//!
//! # Passes
//!
//! ```voices
//! S | D5 C |
//! B | G3 A |
//! ```
//!
//! # Does not apply
//!
//! ```voices
//! S | D5^ E |
//! B | G3  A |
//! ```
//!
//! # What to do
//!
//! Say what to write instead.

use crate::prelude::*;

/// The rule.
pub const RULE: Rule = Rule {
    looks: Looks::Pairs(check),
    cases: &[&ORDINARY],
    numbers: &[],
    sources: &[source::COMMON_PRACTICE],
};

static ORDINARY: Case = Case {
    name: "",
    when: "say when",
    settings: &[weakness(Style::Free, "say why, and who says so")],
};

/// Finds nothing yet: the example under `Fails` fails until it does.
fn check(_step: &PairMove<'_>, _found: &mut Found<'_>) {}
"#;

/// Writes `crates/rules/src/rules/FAMILY/ID.rs` and the list.
pub(crate) fn rule(name: &str) -> Result<(), String> {
    let lawful = |word: &str| {
        !word.is_empty()
            && word
                .chars()
                .all(|c| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-')
    };
    let Some((family, id)) = name.split_once('/').filter(|(f, i)| lawful(f) && lawful(i)) else {
        return Err(format!(
            "{name}: expected FAMILY/ID in kebab case, as in motion/parallel-fifths"
        ));
    };
    let stem = id.replace('-', "_");
    let path = root().join(format!("crates/rules/src/rules/{family}/{stem}.rs"));
    if path.exists() {
        return Err(format!("{} is there already", path.display()));
    }
    let short = id.replace('-', " ");
    let mut letters = short.chars();
    let title = letters
        .next()
        .map(|c| c.to_uppercase().chain(letters).collect::<String>() + ".")
        .unwrap_or_default();
    let folder = path.parent().map(ToOwned::to_owned).unwrap_or_default();
    fs::create_dir_all(&folder).map_err(|e| format!("{}: {e}", folder.display()))?;
    let text = TEMPLATE.replace("TITLE", &title).replace("SHORT", &short);
    fs::write(&path, text).map_err(|e| format!("{}: {e}", path.display()))?;
    list::write()?;
    say(&format!(
        "{}\nNow `cargo test -p partwright-rules` fails until the rule finds its example.",
        path.display()
    ));
    Ok(())
}
