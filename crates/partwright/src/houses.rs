//! House styles: found upwards from each sheet, and read once however many sheets they are for.

use std::collections::HashMap;
use std::fs::{self, File};
use std::io::Read;
use std::path::{Component, Path, PathBuf};
use std::sync::Arc;

use partwright_check::House;
use partwright_check::house::{FILE, HouseError};

use crate::files::reason;
use crate::prose::shortened;

/// A house style longer than this is something else.
const LONGEST: u64 = 1 << 20;

/// What stands above a sheet.
#[derive(Clone, Debug)]
pub(crate) enum Nearest {
    /// No house style.
    None,
    /// A house style.
    House(Arc<House>),
    /// One that cannot be used; its file, as messages call it.
    Broken(Arc<str>),
}

impl Nearest {
    /// The house style, where it can be used.
    pub(crate) fn house(&self) -> Option<&Arc<House>> {
        match self {
            Nearest::House(house) => Some(house),
            Nearest::None | Nearest::Broken(_) => None,
        }
    }
}

/// The house styles met so far.
pub(crate) struct Houses {
    /// The current folder, by its real path.
    here: PathBuf,
    folders: HashMap<PathBuf, Nearest>,
    /// Why some cannot be used, each once, in the order they were met.
    troubles: Vec<String>,
}

impl Houses {
    /// None so far.
    pub(crate) fn new() -> Houses {
        Houses {
            here: real(Path::new(".")),
            folders: HashMap::new(),
            troubles: Vec::new(),
        }
    }

    /// The house style for what stands in a folder.
    pub(crate) fn nearest(&mut self, folder: &Path) -> Nearest {
        let folder = real(folder);
        let mut passed = Vec::new();
        let mut found = Nearest::None;
        for folder in folder.ancestors() {
            if let Some(known) = self.folders.get(folder) {
                found = known.clone();
                break;
            }
            passed.push(folder.to_owned());
            let file = folder.join(FILE);
            // A link to nothing is there too, and is told.
            if fs::symlink_metadata(&file).is_ok() {
                found = self.read(&file);
                break;
            }
        }
        for folder in passed {
            self.folders.insert(folder, found.clone());
        }
        found
    }

    /// The troubles since the last call.
    pub(crate) fn troubles(&mut self) -> Vec<String> {
        std::mem::take(&mut self.troubles)
    }

    /// The names of the house styles met, in order of their alphabet.
    pub(crate) fn names(&self) -> Vec<String> {
        let mut names: Vec<String> = self
            .folders
            .values()
            .filter_map(|nearest| nearest.house()?.name.clone())
            .collect();
        names.sort();
        names.dedup();
        names
    }

    /// A file as messages call it: from the current folder where it is below it.
    pub(crate) fn shown(&self, file: &Path) -> String {
        file.strip_prefix(&self.here)
            .unwrap_or(file)
            .display()
            .to_string()
    }

    fn read(&mut self, file: &Path) -> Nearest {
        let mut texts: HashMap<PathBuf, String> = HashMap::new();
        let read = House::read(file, &mut |path| {
            let text = text_of(path)?;
            texts.insert(path.to_owned(), text.clone());
            Ok(text)
        });
        match read {
            Ok(house) => Nearest::House(Arc::new(house)),
            Err(error) => {
                let words = self.trouble(&error, file, texts.get(&error.file));
                self.troubles.push(words);
                Nearest::Broken(self.shown(file).into())
            }
        }
    }

    /// What is wrong, with the line where it stands.
    fn trouble(&self, error: &HouseError, file: &Path, text: Option<&String>) -> String {
        let mut words = self.shown(&error.file);
        if let Some((line, column)) = error.at {
            words.push_str(&format!(":{line}:{column}"));
        }
        // A ring of includes names its files.
        let here = format!("{}{}", self.here.display(), std::path::MAIN_SEPARATOR);
        words.push_str(&format!(": {}", error.message.replace(&here, "")));
        if error.file != file {
            words.push_str(&format!(" ({} includes it.)", self.shown(file)));
        }
        let line = error.at.and_then(|(line, _)| {
            let text = text?.lines().nth(line.checked_sub(1)?)?;
            Some((line, text.trim_end()))
        });
        if let Some((line, text)) = line {
            words.push_str(&format!("\n  {line} │ {}", shortened(text, 70)));
        }
        words
    }
}

/// The text of a file of a house style, or why there is none.
fn text_of(path: &Path) -> Result<String, String> {
    let plain = |error: &std::io::Error| match error.kind() {
        std::io::ErrorKind::NotFound => "there is no such file".to_owned(),
        _ => reason(error),
    };
    let data = fs::metadata(path).map_err(|error| plain(&error))?;
    if !data.is_file() {
        return Err("it is no file".to_owned());
    }
    let mut bytes = Vec::new();
    File::open(path)
        .and_then(|file| file.take(LONGEST + 1).read_to_end(&mut bytes))
        .map_err(|error| plain(&error))?;
    if bytes.len() as u64 > LONGEST {
        return Err("it is larger than 1 MiB".to_owned());
    }
    String::from_utf8(bytes).map_err(|_| "it is no text in UTF-8".to_owned())
}

/// A folder by its real path; one that is not there, by its name without `.` and `..`.
pub(crate) fn real(folder: &Path) -> PathBuf {
    let folder = if folder.as_os_str().is_empty() {
        Path::new(".")
    } else {
        folder
    };
    fs::canonicalize(folder).unwrap_or_else(|_| {
        let mut tidy = PathBuf::new();
        let whole = std::path::absolute(folder).unwrap_or_else(|_| folder.to_owned());
        for piece in whole.components() {
            match piece {
                Component::ParentDir => drop(tidy.pop()),
                Component::CurDir => {}
                piece => tidy.push(piece),
            }
        }
        tidy
    })
}

/// A file by the real path of its folder and its own name.
pub(crate) fn real_file(file: &Path) -> PathBuf {
    let folder = real(file.parent().unwrap_or(Path::new("")));
    match file.file_name() {
        Some(name) => folder.join(name),
        None => real(file),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_house_style_is_read_once_for_all_below_it() {
        let folder = tempfile::tempdir().unwrap();
        let below = folder.path().join("hymns/evening");
        fs::create_dir_all(&below).unwrap();
        fs::write(folder.path().join(FILE), "name = \"quayside\"\n").unwrap();
        let mut houses = Houses::new();
        let of = |nearest: &Nearest| nearest.house().cloned().unwrap();
        let (first, second) = (houses.nearest(&below), houses.nearest(folder.path()));
        assert!(Arc::ptr_eq(&of(&first), &of(&second)));
        assert_eq!(houses.names(), ["quayside"]);
        // A nearer one goes before it.
        fs::write(below.join(FILE), "name = \"vespers\"\n").unwrap();
        let mut houses = Houses::new();
        assert_eq!(of(&houses.nearest(&below)).name.as_deref(), Some("vespers"));
        let above = houses.nearest(&folder.path().join("hymns"));
        assert_eq!(of(&above).name.as_deref(), Some("quayside"));
    }

    #[test]
    fn folders_that_are_not_there_have_names_all_the_same() {
        let here = real(Path::new("."));
        assert_eq!(real(Path::new("no/such/./folder/..")), here.join("no/such"));
        assert_eq!(real(Path::new("")), here);
        assert_eq!(real_file(Path::new("a.voices")), here.join("a.voices"));
    }
}
