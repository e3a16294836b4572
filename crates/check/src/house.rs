//! House styles: a user's own style, in the same form as ours: a base, and overrides with reasons.
//!
//! `partwright.toml`:
//!
//! ```toml
//! name = "quayside"          # a sheet may say `style quayside`
//! base = "chorale"
//! include = ["../common.toml"]
//!
//! [[rule]]
//! rule = "direct-octaves"    # a rule or a family
//! case = "outer"             # one case of it; all without this line
//! severity = "weakness"      # fault, weakness, remark or off
//! reason = "our singers have a strong first soprano"
//! ```
//!
//! This module knows no files: whoever calls it reads them.

mod parse;

use std::path::{Path, PathBuf};

use partwright_rules::{Number, Override, Style};

use crate::filter::BarRange;

pub use parse::schema;

/// The name of the file, looked for from the sheet upwards.
pub const FILE: &str = "partwright.toml";

/// A house style, with what it includes worked in.
#[derive(Clone, Debug, PartialEq, Eq, Default)]
pub struct House {
    /// The name a sheet may use for it.
    pub name: Option<String>,
    /// The style it starts from; `free` where it names none.
    pub base: Option<Style>,
    /// Changes of severity; a later one goes before an earlier one.
    pub overrides: Vec<Override>,
    /// Numbers set anew.
    pub numbers: Vec<Number>,
    /// Pair rules look across the ends of phrases.
    pub across_phrases: bool,
    /// Why it changes what it changes, by rule or family, in order.
    pub reasons: Vec<(String, String)>,
    /// Licences for files that cannot carry their own.
    pub licences: Vec<HouseLicence>,
    /// The files it was read from, the first one its own.
    pub files: Vec<PathBuf>,
}

/// A licence of a house style.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct HouseLicence {
    /// The file it is for, from the folder of the house style; `*` stands for any run of letters
    /// but `/`, `**` for any folders.
    pub path: String,
    /// The folder of the file that grants it.
    pub folder: PathBuf,
    /// The rules or families it lifts.
    pub rules: Vec<String>,
    /// The bars; all without them.
    pub bars: Option<BarRange>,
    /// The voices by label; all without them.
    pub voices: Vec<String>,
    /// Why.
    pub reason: String,
}

/// Why a house style could not be used: which key is wrong, and what is allowed.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct HouseError {
    /// The file.
    pub file: PathBuf,
    /// Line and column, from 1, where they can be told.
    pub at: Option<(usize, usize)>,
    /// What is wrong and what is allowed.
    pub message: String,
}

impl std::fmt::Display for HouseError {
    fn fmt(&self, f: &mut std::fmt::Formatter<'_>) -> std::fmt::Result {
        write!(f, "{}", self.file.display())?;
        if let Some((line, column)) = self.at {
            write!(f, ":{line}:{column}")?;
        }
        write!(f, ": {}", self.message)
    }
}

impl std::error::Error for HouseError {}

/// Includes may nest as deep as this.
const DEEPEST: usize = 16;

impl House {
    /// Reads a house style and what it includes. `load` reads a file's text.
    ///
    /// # Errors
    /// The first file that cannot be read, is no house style, or includes itself.
    pub fn read(
        file: &Path,
        load: &mut dyn FnMut(&Path) -> Result<String, String>,
    ) -> Result<House, HouseError> {
        let mut house = House::default();
        house.add(file, load, &mut Vec::new())?;
        Ok(house)
    }

    /// Adds a file after what it includes, so that its own word is the later one. The depth is
    /// bounded, and no file is inside itself.
    fn add(
        &mut self,
        file: &Path,
        load: &mut dyn FnMut(&Path) -> Result<String, String>,
        open: &mut Vec<PathBuf>,
    ) -> Result<(), HouseError> {
        let error = |message: String| HouseError {
            file: file.to_owned(),
            at: None,
            message,
        };
        if let Some(first) = open.iter().position(|other| other == file) {
            let ring: Vec<String> = open
                .iter()
                .skip(first)
                .map(|f| f.display().to_string())
                .collect();
            return Err(error(format!(
                "It includes itself, by way of {}.",
                ring.join(", ")
            )));
        }
        if open.len() == DEEPEST {
            return Err(error(format!("Includes nest more than {DEEPEST} deep.")));
        }
        let text = load(file).map_err(|why| error(format!("It cannot be read: {why}.")))?;
        let parsed = parse::file(file, &text)?;
        let folder = file.parent().unwrap_or(Path::new("")).to_owned();
        self.files
            .insert(self.files.len().min(open.len()), file.to_owned());
        open.push(file.to_owned());
        for include in &parsed.include {
            self.add(&tidy(&folder.join(include)), load, open)?;
        }
        open.pop();
        self.name = parsed.name.or(self.name.take());
        self.base = parsed.base.or(self.base);
        self.across_phrases = parsed.across_phrases.unwrap_or(self.across_phrases);
        self.overrides.extend(parsed.overrides);
        self.numbers.extend(parsed.numbers);
        self.reasons.extend(parsed.reasons);
        self.licences
            .extend(parsed.licences.into_iter().map(|l| HouseLicence {
                folder: folder.clone(),
                ..l
            }));
        Ok(())
    }

    /// The licences for a file.
    #[must_use]
    pub fn licences_for(&self, file: &Path) -> Vec<HouseLicence> {
        let matches = |licence: &&HouseLicence| {
            let inside = file.strip_prefix(&licence.folder).unwrap_or(file);
            let pieces: Vec<&str> = inside.iter().filter_map(|piece| piece.to_str()).collect();
            let pattern: Vec<&str> = licence
                .path
                .split('/')
                .filter(|piece| !piece.is_empty())
                .collect();
            path_matches(&pattern, &pieces)
        };
        self.licences.iter().filter(matches).cloned().collect()
    }
}

/// A path without `.` and, where that can be said without asking the disk, without `..`.
fn tidy(path: &Path) -> PathBuf {
    let mut tidy = PathBuf::new();
    for piece in path.components() {
        match piece {
            std::path::Component::CurDir => {}
            std::path::Component::ParentDir if tidy.file_name().is_some() => {
                tidy.pop();
            }
            other => tidy.push(other),
        }
    }
    tidy
}

/// Whether a path fits a pattern, piece by piece; `**` takes any number of pieces. A table of
/// pieces against pieces, so that no pattern takes long.
fn path_matches(pattern: &[&str], pieces: &[&str]) -> bool {
    let mut fits = vec![false; pieces.len() + 1];
    if let Some(first) = fits.first_mut() {
        *first = true;
    }
    for part in pattern {
        let mut next = vec![false; pieces.len() + 1];
        for i in 0..=pieces.len() {
            let before = i.checked_sub(1);
            let from_left = before.is_some_and(|j| next.get(j) == Some(&true));
            let taken = before.is_some_and(|j| {
                fits.get(j) == Some(&true)
                    && pieces.get(j).is_some_and(|piece| word_matches(part, piece))
            });
            let holds = if *part == "**" {
                fits.get(i) == Some(&true) || from_left
            } else {
                taken
            };
            if let Some(slot) = next.get_mut(i) {
                *slot = holds;
            }
        }
        fits = next;
    }
    fits.last() == Some(&true)
}

fn word_matches(pattern: &str, word: &str) -> bool {
    let mut rest = word;
    let mut parts = pattern.split('*').peekable();
    let Some(start) = parts.next() else {
        return word.is_empty();
    };
    let Some(after) = rest.strip_prefix(start) else {
        return false;
    };
    rest = after;
    if parts.peek().is_none() {
        return rest.is_empty();
    }
    while let Some(part) = parts.next() {
        if parts.peek().is_none() {
            return rest.ends_with(part);
        }
        match rest.find(part) {
            Some(at) => rest = rest.get(at + part.len()..).unwrap_or(""),
            None => return false,
        }
    }
    true
}

#[cfg(test)]
mod tests {
    use super::*;

    fn read(files: &[(&str, &str)]) -> Result<House, HouseError> {
        House::read(Path::new(files[0].0), &mut |path| {
            let found = files.iter().find(|(name, _)| Path::new(name) == path);
            found
                .map(|(_, text)| (*text).to_owned())
                .ok_or_else(|| "no such file".to_owned())
        })
    }

    #[test]
    fn includes_come_before_the_file_itself() {
        let rule = |severity: &str| {
            format!(
                "[[rule]]\nrule = \"overlap\"\nseverity = \"{severity}\"\nreason = \"a reason\"\n"
            )
        };
        let own = format!(
            "name = \"quayside\"\nbase = \"chorale\"\ninclude = [\"../common.toml\"]\n{}",
            rule("off")
        );
        let house = read(&[("a/partwright.toml", &own), ("common.toml", &rule("fault"))]).unwrap();
        assert_eq!(house.name.as_deref(), Some("quayside"));
        assert_eq!(house.base, Some(Style::Chorale));
        assert_eq!(house.overrides.last().unwrap().severity, None);
        assert_eq!(house.overrides.len(), 2);
        assert_eq!(
            house.files,
            [
                PathBuf::from("a/partwright.toml"),
                PathBuf::from("common.toml")
            ]
        );
    }

    #[test]
    fn a_file_that_includes_itself_is_refused() {
        let error = read(&[
            ("a.toml", "include = [\"b.toml\"]"),
            ("b.toml", "include = [\"./a.toml\"]"),
        ])
        .unwrap_err();
        assert!(error.message.contains("includes itself"), "{error}");
    }

    #[test]
    fn broken_keys_are_named_with_what_is_allowed() {
        for (text, words) in [
            ("bass = \"chorale\"", "base"),
            ("base = \"choral\"", "chorale"),
            (
                "[[rule]]\nrule = \"parallel-fifth\"\nseverity = \"off\"\nreason = \"x\"",
                "parallel-fifths",
            ),
            (
                "[[rule]]\nrule = \"overlap\"\nseverity = \"warn\"\nreason = \"x\"",
                "weakness",
            ),
            ("[[rule]]\nrule = \"overlap\"\nseverity = \"off\"", "reason"),
            (
                "[[number]]\nrule = \"spacing\"\nname = \"bas\"\nvalue = 12\nreason = \"x\"",
                "bass",
            ),
            (
                "[[number]]\nrule = \"spacing\"\nname = \"bass\"\nvalue = 99\nreason = \"x\"",
                "8 to 36",
            ),
            (
                "[[licence]]\npath = \"*.xml\"\nrule = [\"crossing\"]\nbars = \"x\"\nreason = \"x\"",
                "12..20",
            ),
            ("name = \"free\"", "free"),
            ("[[rule]\n", "expected"),
        ] {
            let error = read(&[("partwright.toml", text)]).unwrap_err();
            assert!(error.message.contains(words), "{text}: {error}");
            assert!(error.at.is_some(), "{text}: {error}");
        }
    }

    #[test]
    fn licence_paths() {
        let fits = |pattern: &str, path: &str| {
            let split = |text: &'static str| text.split('/').collect::<Vec<_>>();
            let (pattern, path) = (pattern.to_owned().leak(), path.to_owned().leak());
            path_matches(&split(pattern), &split(path))
        };
        assert!(fits("a.xml", "a.xml"));
        assert!(fits("*.xml", "a.xml"));
        assert!(!fits("*.xml", "old/a.xml"));
        assert!(fits("**/*.xml", "old/older/a.xml"));
        assert!(fits("**/*.xml", "a.xml"));
        assert!(fits("o*d/*", "old/a"));
        assert!(!fits("o*d/*", "odd/a/b"));
        assert!(!fits("*a*b", "ab.a"));
    }
}
