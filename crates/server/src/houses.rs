//! House styles: the nearest `partwright.toml` upwards from a sheet, with what it includes, read
//! again when one of the files changes.
//!
//! A file that is open in the editor counts as it stands there. Some clients watch no files:
//! what was read is compared with the disk again after a second, and whenever a document is
//! opened or saved.

use std::collections::HashMap;
use std::fs;
use std::io::{ErrorKind, Read};
use std::path::{Path, PathBuf};
use std::sync::{Arc, Mutex, MutexGuard, PoisonError};
use std::time::{Duration, Instant, SystemTime};

use partwright_check::House;
use partwright_check::house::{FILE, HouseError};
use tower_lsp::lsp_types::Url;

use crate::documents::Documents;

/// How long what was read is believed without another look.
const TRUST: Duration = Duration::from_secs(1);

/// A house style longer than this is something else.
const LONGEST: u64 = 1 << 20;

/// The state of a file.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
enum Stamp {
    /// It is open, in that state.
    Open(u64),
    /// It is on the disk: when it was written, and how long it is.
    Disk(Option<SystemTime>, u64),
    /// It cannot be seen.
    Missing,
}

/// What stands above a folder.
#[derive(Clone, Debug)]
pub(crate) enum Nearest {
    /// No house style.
    None,
    /// A house style.
    House(Arc<House>),
    /// One that cannot be used.
    Broken(HouseError),
}

struct Known {
    nearest: Nearest,
    /// The files it depends on, those that are not there among them.
    stamps: Vec<(PathBuf, Stamp)>,
    looked: Instant,
}

impl Known {
    fn still_holds(&self, documents: &Documents) -> bool {
        let same = |(path, seen): &(PathBuf, Stamp)| stamp(path, documents) == *seen;
        self.stamps.iter().all(same)
    }
}

/// What was found for a sheet.
pub(crate) struct Found {
    /// What stands above it.
    pub(crate) nearest: Nearest,
    /// It was read just now, in the place of something else that was known.
    pub(crate) anew: bool,
    /// It cannot be used, and the user has not been told.
    pub(crate) news: bool,
}

#[derive(Default)]
struct State {
    /// By folder.
    known: HashMap<PathBuf, Known>,
    /// Troubles that the user was told, until their house style changes.
    told: HashMap<PathBuf, HouseError>,
}

/// The house styles met so far.
#[derive(Default)]
pub(crate) struct Houses {
    state: Mutex<State>,
}

/// Whether a document is a house style rather than a sheet, by its name.
pub(crate) fn is_house(uri: &Url) -> bool {
    uri.path().ends_with(".toml")
}

/// The file of a document.
pub(crate) fn path(uri: &Url) -> Option<PathBuf> {
    uri.to_file_path().ok()
}

impl Houses {
    fn lock(&self) -> MutexGuard<'_, State> {
        self.state.lock().unwrap_or_else(PoisonError::into_inner)
    }

    /// The house style for a file.
    pub(crate) fn nearest(&self, file: &Path, documents: &Documents) -> Found {
        let folder = file.parent().unwrap_or(Path::new(""));
        let mut state = self.lock();
        let before = state.known.get_mut(folder).map(|known| {
            let holds = known.looked.elapsed() < TRUST || known.still_holds(documents);
            if holds && known.looked.elapsed() >= TRUST {
                known.looked = Instant::now();
            }
            (holds, known.nearest.clone())
        });
        if let Some((true, nearest)) = before {
            return Found {
                nearest,
                anew: false,
                news: false,
            };
        }
        let known = read(folder, documents);
        let nearest = known.nearest.clone();
        state.known.insert(folder.to_owned(), known);
        let news = match &nearest {
            Nearest::Broken(error) => {
                let told = state.told.insert(error.file.clone(), error.clone());
                told.as_ref() != Some(error)
            }
            _ => {
                state.told.clear();
                false
            }
        };
        Found {
            nearest,
            anew: before.is_some(),
            news,
        }
    }

    /// Whether a file of a house style is another than when it was read; what was read of it is
    /// forgotten then.
    pub(crate) fn changed(&self, documents: &Documents) -> bool {
        let mut state = self.lock();
        let before = state.known.len();
        state.known.retain(|_, known| known.still_holds(documents));
        state.known.len() < before
    }

    /// What is wrong with a file that is open, if it is a house style or included by one: `None`
    /// for a file that has nothing to do with us.
    pub(crate) fn trouble(&self, file: &Path, documents: &Documents) -> Option<HouseError> {
        let ours = file.file_name().is_some_and(|name| name == FILE);
        let included = || {
            let state = self.lock();
            let mut stamps = state.known.values().flat_map(|known| &known.stamps);
            stamps.any(|(path, _)| path == file)
        };
        if !ours && !included() {
            return None;
        }
        House::read(file, &mut |path| load(path, documents)).err()
    }
}

/// Looks upwards from a folder.
fn read(folder: &Path, documents: &Documents) -> Known {
    let mut stamps = Vec::new();
    let mut nearest = Nearest::None;
    for folder in folder.ancestors() {
        let file = folder.join(FILE);
        let seen = stamp(&file, documents);
        if seen == Stamp::Missing {
            stamps.push((file, seen));
            continue;
        }
        let read = House::read(&file, &mut |path| {
            stamps.push((path.to_owned(), stamp(path, documents)));
            load(path, documents)
        });
        nearest = match read {
            Ok(house) => Nearest::House(Arc::new(house)),
            Err(error) => Nearest::Broken(error),
        };
        break;
    }
    Known {
        nearest,
        stamps,
        looked: Instant::now(),
    }
}

fn stamp(path: &Path, documents: &Documents) -> Stamp {
    let open = Url::from_file_path(path)
        .ok()
        .and_then(|uri| documents.snapshot(&uri));
    if let Some(snapshot) = open {
        return Stamp::Open(snapshot.edited);
    }
    match fs::metadata(path) {
        Ok(data) => Stamp::Disk(data.modified().ok(), data.len()),
        Err(_) => Stamp::Missing,
    }
}

/// The text of a file of a house style, as the editor has it or from the disk.
fn load(path: &Path, documents: &Documents) -> Result<String, String> {
    let open = Url::from_file_path(path)
        .ok()
        .and_then(|uri| documents.snapshot(&uri));
    if let Some(snapshot) = open {
        return Ok(snapshot.text.as_str().to_owned());
    }
    let why = |error: std::io::Error| match error.kind() {
        ErrorKind::NotFound => "there is no such file".to_owned(),
        ErrorKind::PermissionDenied => "it may not be read".to_owned(),
        _ => error.to_string(),
    };
    let mut bytes = Vec::new();
    let file = fs::File::open(path).map_err(why)?;
    if !file.metadata().map_err(why)?.is_file() {
        return Err("it is no file".to_owned());
    }
    file.take(LONGEST + 1)
        .read_to_end(&mut bytes)
        .map_err(why)?;
    if bytes.len() as u64 > LONGEST {
        return Err("it is larger than 1 MiB".to_owned());
    }
    String::from_utf8(bytes).map_err(|_| "it is no text in UTF-8".to_owned())
}
