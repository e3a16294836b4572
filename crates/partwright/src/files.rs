//! Finding and reading sheets. Whatever cannot be read is told in a sentence, and the rest goes on.

use std::collections::HashSet;
use std::fmt;
use std::fs::{self, File};
use std::io::{self, ErrorKind, Read};
use std::path::{Path, PathBuf};

use ignore::WalkBuilder;
use partwright_sheet::LARGEST;

use crate::names::near;
use crate::prose::count;

/// A sheet to read.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Sheet {
    /// What reports call it.
    pub(crate) name: String,
    /// Its file; `None` for standard input.
    pub(crate) file: Option<PathBuf>,
    /// The file it is taken for: its own, or the one standard input is named after.
    pub(crate) place: Option<PathBuf>,
}

impl Sheet {
    /// The folder from which its house style is looked for.
    pub(crate) fn folder(&self) -> &Path {
        let folder = self.place.as_deref().and_then(Path::parent);
        folder.unwrap_or(Path::new(""))
    }
}

/// What is said of a file that does not hold any more what was read from it.
pub(crate) const CHANGED: &str =
    "another program saved it meanwhile; nothing was written, run this again";

/// A path that gives no score, and why not.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Trouble {
    path: String,
    reason: String,
}

impl Trouble {
    /// What a sheet is in trouble for.
    pub(crate) fn of(sheet: &Sheet, reason: impl Into<String>) -> Trouble {
        Trouble {
            path: sheet.name.clone(),
            reason: reason.into(),
        }
    }
}

impl fmt::Display for Trouble {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}: {}", self.path, self.reason)
    }
}

/// What the paths of a call lead to.
#[derive(Debug, Default)]
pub(crate) struct Findings {
    /// The sheets, in the order of the paths, each once.
    pub(crate) sheets: Vec<Sheet>,
    /// What leads to none.
    pub(crate) troubles: Vec<Trouble>,
    /// What else is worth a word.
    pub(crate) words: Vec<String>,
}

/// What a file holds, by the ending of its name.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Kind {
    Sheet,
    Text,
    MusicXml,
    Midi,
    Other,
}

impl Kind {
    fn of(path: &Path) -> Kind {
        let ending = path
            .extension()
            .map(|ending| ending.to_string_lossy().to_lowercase());
        match ending.as_deref() {
            Some("voices") => Kind::Sheet,
            None | Some("txt" | "text") => Kind::Text,
            Some("musicxml" | "mxl" | "xml") => Kind::MusicXml,
            Some("mid" | "midi" | "kar" | "smf") => Kind::Midi,
            Some(_) => Kind::Other,
        }
    }

    /// Why such a file is not read, or `None` where it is.
    fn refusal(self) -> Option<&'static str> {
        match self {
            Kind::Sheet | Kind::Text => None,
            Kind::MusicXml => Some("MusicXML is not read yet, only voice sheets (.voices)"),
            Kind::Midi => Some(
                "a MIDI file has no spelling (C sharp and D flat are one key in it), so it cannot be checked; \
                 write it as a voice sheet (.voices)",
            ),
            Kind::Other => Some(
                "no score by its name: expected a voice sheet (.voices); \
                 one of another name is read from standard input, as -",
            ),
        }
    }
}

/// Follows the paths of a call. `named` is what standard input is called; `tell` is called with
/// the number of sheets found so far.
pub(crate) fn find(
    paths: &[PathBuf],
    named: Option<&Path>,
    mut tell: impl FnMut(usize),
) -> Findings {
    let mut found = Findings::default();
    if let (Some(name), false) = (named, paths.iter().any(|path| is_input(path))) {
        found.trouble(
            name,
            "--as names standard input, which is not among the paths; give - too",
        );
    }
    for path in paths {
        if is_input(path) {
            found.input(named.unwrap_or(path));
        } else {
            found.follow(path, &mut tell);
        }
    }
    found.keep_each_once();
    found
}

fn is_input(path: &Path) -> bool {
    path.as_os_str() == "-"
}

impl Findings {
    fn trouble(&mut self, path: &Path, reason: &str) {
        self.troubles.push(Trouble {
            path: path.display().to_string(),
            reason: reason.to_owned(),
        });
    }

    fn sheet(&mut self, path: &Path) {
        self.sheets.push(Sheet {
            name: path.display().to_string(),
            file: Some(path.to_owned()),
            place: Some(path.to_owned()),
        });
    }

    fn input(&mut self, name: &Path) {
        // The bare dash has no ending, and is taken for a sheet.
        match Kind::of(name).refusal() {
            Some(reason) => self.trouble(name, reason),
            None => self.sheets.push(Sheet {
                name: name.display().to_string(),
                file: None,
                place: (!is_input(name)).then(|| name.to_owned()),
            }),
        }
    }

    fn follow(&mut self, path: &Path, tell: &mut impl FnMut(usize)) {
        match fs::metadata(path) {
            Err(error) => {
                let reason = absence(path, &error);
                self.trouble(path, &reason);
            }
            Ok(data) if data.is_dir() => self.walk(path, tell),
            Ok(_) => {
                let kind = Kind::of(path);
                match kind.refusal() {
                    Some(reason) => return self.trouble(path, reason),
                    None if kind == Kind::Text && path.extension().is_some() => self.words.push(format!(
                        "{}: read as a voice sheet, since you name it; folders are searched for .voices",
                        path.display()
                    )),
                    None => {}
                }
                self.sheet(path);
            }
        }
    }

    fn walk(&mut self, folder: &Path, tell: &mut impl FnMut(usize)) {
        let (sheets, troubles) = (self.sheets.len(), self.troubles.len());
        let mut unread = 0;
        // A .gitignore counts outside a repository too: in an unpacked archive, say.
        let walk = WalkBuilder::new(folder)
            .follow_links(false)
            .ignore(false)
            .require_git(false)
            .sort_by_file_name(std::ffi::OsStr::cmp)
            .build();
        for entry in walk {
            match entry {
                Err(error) => self.troubles.push(walk_trouble(folder, &error)),
                Ok(entry) if entry.file_type().is_some_and(|kind| kind.is_file()) => {
                    let path = entry.path();
                    match Kind::of(path) {
                        Kind::Sheet => self.sheet(path.strip_prefix("./").unwrap_or(path)),
                        Kind::MusicXml if path.extension().is_some_and(|e| e != "xml") => {
                            unread += 1
                        }
                        _ => {}
                    }
                    tell(self.sheets.len());
                }
                Ok(_) => {}
            }
        }
        let unread = (unread > 0).then(|| {
            let files = count(unread, "MusicXML file is", "MusicXML files are");
            format!("{files} left out: MusicXML is not read yet")
        });
        if self.sheets.len() > sheets || self.troubles.len() > troubles {
            self.words
                .extend(unread.map(|words| format!("{}: {words}", folder.display())));
        } else {
            let unread = unread.map_or(String::new(), |words| format!("; {words}"));
            self.trouble(
                folder,
                &format!("no score in this folder: no file below it ends in .voices{unread}"),
            );
        }
    }

    /// A sheet that two paths lead to is read once, where it is found first.
    fn keep_each_once(&mut self) {
        let mut seen = HashSet::new();
        self.sheets.retain(|sheet| {
            let file = sheet
                .file
                .as_ref()
                .map(|file| fs::canonicalize(file).unwrap_or_else(|_| file.clone()));
            seen.insert(file)
        });
    }
}

fn walk_trouble(folder: &Path, error: &ignore::Error) -> Trouble {
    let mut path = folder;
    let mut inner = error;
    // Each layer says more; a layer that is no place ends it.
    loop {
        inner = match inner {
            ignore::Error::WithPath { path: place, err } => {
                path = place;
                err
            }
            ignore::Error::WithDepth { err, .. } | ignore::Error::WithLineNumber { err, .. } => err,
            _ => break,
        };
    }
    let reason = error.io_error().map_or_else(|| inner.to_string(), reason);
    Trouble {
        path: path.display().to_string(),
        reason,
    }
}

/// Why there is nothing at a path, with the nearest name that is there.
fn absence(path: &Path, error: &io::Error) -> String {
    if error.kind() != ErrorKind::NotFound {
        return reason(error);
    }
    if fs::symlink_metadata(path).is_ok() {
        return "a link to something that is not there".to_owned();
    }
    let folder = path
        .parent()
        .filter(|folder| !folder.as_os_str().is_empty())
        .unwrap_or(Path::new("."));
    let names = fs::read_dir(folder).into_iter().flatten().flatten();
    let mut names: Vec<String> = names
        .map(|entry| entry.file_name().to_string_lossy().into_owned())
        .collect();
    names.sort();
    let wrong = path
        .file_name()
        .map(|name| name.to_string_lossy().into_owned())
        .unwrap_or_default();
    let near = near(
        &wrong,
        names
            .iter()
            .map(String::as_str)
            .filter(|name| name.ends_with(".voices")),
    );
    match near.first() {
        Some(near) => format!("there is no such file or folder; did you mean {near}?"),
        None => "there is no such file or folder".to_owned(),
    }
}

/// A failure of the system in plain words, without its number.
pub(crate) fn reason(error: &io::Error) -> String {
    match error.kind() {
        ErrorKind::NotFound => "it is not there any more".to_owned(),
        ErrorKind::PermissionDenied => "you are not permitted to read it".to_owned(),
        ErrorKind::NotADirectory => "part of this path is a file, not a folder".to_owned(),
        ErrorKind::IsADirectory => "a folder, where a file was expected".to_owned(),
        ErrorKind::StorageFull => "no space is left".to_owned(),
        _ => {
            let text = error.to_string();
            text.split(" (os error")
                .next()
                .map(str::to_lowercase)
                .unwrap_or(text)
        }
    }
}

/// Reads a sheet's text.
///
/// # Errors
/// Where it cannot be opened, is larger than 8 MiB, or is no text in UTF-8.
pub(crate) fn read(sheet: &Sheet, input: &mut dyn Read) -> Result<String, Trouble> {
    let trouble = |reason| Trouble {
        path: sheet.name.clone(),
        reason,
    };
    let most = LARGEST as u64 + 1;
    let mut bytes = Vec::new();
    let read = match &sheet.file {
        Some(file) => File::open(file).and_then(|file| file.take(most).read_to_end(&mut bytes)),
        None => input.take(most).read_to_end(&mut bytes),
    };
    read.map_err(|error| trouble(reason(&error)))?;
    if bytes.len() > LARGEST {
        return Err(trouble(
            "larger than 8 MiB, the most that is read; part it into several sheets".to_owned(),
        ));
    }
    String::from_utf8(bytes)
        .map_err(|error| trouble(no_text(error.as_bytes(), error.utf8_error().valid_up_to())))
}

/// Why bytes are no text: `at` is the first that is none.
fn no_text(bytes: &[u8], at: usize) -> String {
    if bytes.starts_with(&[0xFE, 0xFF]) || bytes.starts_with(&[0xFF, 0xFE]) {
        return "text in UTF-16; save it as UTF-8".to_owned();
    }
    if bytes.contains(&0) {
        return "no text but a binary file; expected a voice sheet".to_owned();
    }
    let before = bytes.get(..at).unwrap_or_default();
    let line = before.iter().filter(|byte| **byte == b'\n').count() + 1;
    let start = before
        .iter()
        .rposition(|byte| *byte == b'\n')
        .map_or(0, |end| end + 1);
    format!(
        "not in UTF-8: line {line} goes wrong at its byte {}; save the file as UTF-8",
        at - start + 1
    )
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_sheet_that_vanishes_between_finding_and_reading() {
        let folder = tempfile::tempdir().unwrap();
        let path = folder.path().join("evensong.voices");
        fs::write(&path, "S | C4 |\n").unwrap();
        let found = find(std::slice::from_ref(&path), None, |_| {});
        fs::remove_file(&path).unwrap();
        let trouble = read(&found.sheets[0], &mut io::empty()).unwrap_err();
        assert_eq!(
            trouble.to_string(),
            format!("{}: it is not there any more", path.display())
        );
    }

    #[test]
    fn the_place_of_the_first_byte_that_is_no_text() {
        let words = no_text(b"S | C4 |\nA | \xE9 |\n", 13);
        assert!(
            words.contains("line 2") && words.contains("byte 5"),
            "{words}"
        );
        assert!(no_text(b"\xFF\xFEa\0", 0).contains("UTF-16"));
        assert!(no_text(b"\x89PNG\0", 0).contains("binary"));
    }

    #[test]
    fn what_a_name_promises() {
        let kind = |name| Kind::of(Path::new(name));
        assert_eq!(kind("a.VOICES"), Kind::Sheet);
        assert_eq!(kind("a.mxl"), Kind::MusicXml);
        assert_eq!(kind("a.mid"), Kind::Midi);
        assert_eq!(kind("a"), Kind::Text);
        assert_eq!(kind("a.png"), Kind::Other);
    }
}
