//! The generated list of rule files: `include_str!` and `mod` need literal paths.

use std::fmt::Write as _;
use std::fs;
use std::path::Path;

use crate::root;

/// The rule files, by folder and name.
fn files(rules: &Path) -> Result<Vec<(String, String)>, String> {
    let read = |dir: &Path| -> Result<Vec<String>, String> {
        let entries = fs::read_dir(dir).map_err(|e| format!("{}: {e}", dir.display()))?;
        let names = entries
            .flatten()
            .map(|e| e.file_name().to_string_lossy().into_owned());
        let mut names: Vec<String> = names.collect();
        names.sort();
        Ok(names)
    };
    let mut found = Vec::new();
    for family in read(rules)? {
        for name in read(&rules.join(&family))? {
            if let Some(stem) = name.strip_suffix(".rs") {
                found.push((family.clone(), stem.to_owned()));
            }
        }
    }
    Ok(found)
}

/// A row of the table.
const ROW: &str = r#"
macro_rules! file {
    ($family:literal, $stem:ident) => {
        File {
            family: $family,
            stem: stringify!($stem),
            rule: &$stem::RULE,
            text: include_str!(concat!("rules/", $family, "/", stringify!($stem), ".rs")),
        }
    };
}

"#;

fn text(files: &[(String, String)]) -> String {
    let mut text = String::from(
        "//! The rule files. Written by `cargo xtask list`; do not edit.\n\nuse crate::catalogue::File;\n\n",
    );
    // The modules by name, as the formatter would have them; the table by family.
    let mut by_name: Vec<_> = files.iter().collect();
    by_name.sort_by(|a, b| a.1.cmp(&b.1));
    for (family, stem) in by_name {
        let _ = writeln!(
            text,
            "#[path = \"rules/{family}/{stem}.rs\"]\npub mod {stem};"
        );
    }
    text.push_str(ROW);
    text.push_str("pub(crate) static FILES: &[File] = &[\n");
    for (family, stem) in files {
        let _ = writeln!(text, "    file!(\"{family}\", {stem}),");
    }
    text.push_str("];\n");
    text
}

/// Writes the list where it is stale; tells whether it was.
pub(crate) fn write() -> Result<bool, String> {
    let src = root().join("crates/rules/src");
    let wanted = text(&files(&src.join("rules"))?);
    let path = src.join("list.rs");
    if fs::read_to_string(&path).is_ok_and(|now| now == wanted) {
        return Ok(false);
    }
    fs::write(&path, wanted).map_err(|e| format!("{}: {e}", path.display()))?;
    Ok(true)
}

#[cfg(test)]
mod tests {
    #[test]
    fn the_list_of_rules_is_fresh() {
        assert!(
            !super::write().unwrap(),
            "crates/rules/src/list.rs was stale and has been written anew: run again"
        );
    }
}
