//! Replacing a file: whole or not at all, and never what somebody else wrote meanwhile.

use std::fs::{self, File};
use std::io::{self, ErrorKind, Read, Write};
use std::path::Path;

use tempfile::Builder;

use crate::files::{CHANGED, reason};

/// Replaces a file's text by another: in a temporary file of the same folder, moved to its place
/// once it is on the disk, with the permissions of the old one. A link stays, and what it leads to
/// is replaced.
///
/// # Errors
/// Why nothing was written: the file does not hold what was read from it any more, it is
/// read-only, or the system would not write.
pub(crate) fn replace(file: &Path, read: &str, by: &str) -> Result<(), String> {
    let plain = |error: io::Error| unwritten(&error);
    let target = fs::canonicalize(file).map_err(plain)?;
    let data = fs::metadata(&target).map_err(plain)?;
    if !data.is_file() {
        return Err("no file that could be replaced; nothing was written".to_owned());
    }
    if data.permissions().readonly() {
        return Err("it is read-only; nothing was written".to_owned());
    }
    let folder = target.parent().unwrap_or(Path::new("."));
    let mut temporary = Builder::new()
        .prefix(".partwright-")
        .tempfile_in(folder)
        .map_err(plain)?;
    temporary.write_all(by.as_bytes()).map_err(plain)?;
    keep_owner(temporary.as_file(), &data);
    temporary
        .as_file()
        .set_permissions(data.permissions())
        .and_then(|()| temporary.as_file().sync_all())
        .map_err(plain)?;
    // As late as can be: what another program saved since is not overwritten.
    if !holds(&target, read).map_err(plain)? {
        return Err(CHANGED.to_owned());
    }
    temporary
        .persist(&target)
        .map(|_| ())
        .map_err(|error| plain(error.error))
}

/// Writes a new file, or one that `ours` says may be replaced.
///
/// # Errors
/// Why nothing was written.
pub(crate) fn write(
    file: &Path,
    text: &str,
    ours: impl Fn(&str) -> Result<(), String>,
) -> Result<(), String> {
    match fs::read(file) {
        Ok(bytes) => {
            let old = String::from_utf8_lossy(&bytes);
            ours(&old)?;
            replace(file, &old, text)
        }
        Err(error) if error.kind() == ErrorKind::NotFound => File::create_new(file)
            .and_then(|mut new| new.write_all(text.as_bytes()))
            .map_err(|error| match error.kind() {
                ErrorKind::NotFound => "there is no such folder".to_owned(),
                _ => unwritten(&error),
            }),
        Err(error) => Err(reason(&error)),
    }
}

/// Why the system would not write, in plain words.
fn unwritten(error: &io::Error) -> String {
    match error.kind() {
        ErrorKind::PermissionDenied => "you are not permitted to write here".to_owned(),
        _ => reason(error),
    }
}

/// Whether a file holds a text and nothing else.
fn holds(file: &Path, text: &str) -> io::Result<bool> {
    let mut bytes = Vec::with_capacity(text.len() + 1);
    File::open(file)?
        .take(text.len() as u64 + 1)
        .read_to_end(&mut bytes)?;
    Ok(bytes == text.as_bytes())
}

/// The owner and group stay where the system lets them.
#[cfg(unix)]
fn keep_owner(file: &File, data: &fs::Metadata) {
    use std::os::unix::fs::{MetadataExt, fchown};
    let _ = fchown(file, Some(data.uid()), Some(data.gid()));
}

#[cfg(not(unix))]
fn keep_owner(_: &File, _: &fs::Metadata) {}

#[cfg(test)]
mod tests {
    use super::*;

    /// The names in a folder.
    fn names(folder: &Path) -> Vec<String> {
        let entries = fs::read_dir(folder).unwrap();
        let mut names: Vec<String> = entries
            .map(|entry| entry.unwrap().file_name().into_string().unwrap())
            .collect();
        names.sort();
        names
    }

    #[test]
    fn what_another_program_saved_stays() {
        let folder = tempfile::tempdir().unwrap();
        let file = folder.path().join("a.voices");
        for theirs in ["S | C4 |\n// theirs\n", "S | D4 |\n", ""] {
            fs::write(&file, theirs).unwrap();
            let said = replace(&file, "S | C4 |\n", "S | E4 |\n").unwrap_err();
            assert!(said.contains("another program"), "{said}");
            assert_eq!(fs::read_to_string(&file).unwrap(), theirs);
            assert_eq!(names(folder.path()), ["a.voices"], "nothing is left behind");
        }
        assert_eq!(replace(&file, "", "S | E4 |\n"), Ok(()));
        assert_eq!(fs::read_to_string(&file).unwrap(), "S | E4 |\n");
        assert_eq!(names(folder.path()), ["a.voices"]);
    }

    #[cfg(unix)]
    #[test]
    fn permissions_and_links_stay() {
        use std::os::unix::fs::{PermissionsExt, symlink};
        let folder = tempfile::tempdir().unwrap();
        let (file, link) = (folder.path().join("a"), folder.path().join("b"));
        fs::write(&file, "one").unwrap();
        fs::set_permissions(&file, fs::Permissions::from_mode(0o640)).unwrap();
        symlink("a", &link).unwrap();
        assert_eq!(replace(&link, "one", "two"), Ok(()));
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
        assert_eq!(fs::read_to_string(&file).unwrap(), "two");
        let mode = fs::metadata(&file).unwrap().permissions().mode();
        assert_eq!(mode & 0o777, 0o640);
    }

    #[test]
    fn what_is_not_ours_is_not_replaced() {
        let folder = tempfile::tempdir().unwrap();
        let file = folder.path().join("list");
        let ours = |text: &str| match text {
            "ours" => Ok(()),
            _ => Err("not ours".to_owned()),
        };
        assert_eq!(write(&file, "ours", ours), Ok(()));
        assert_eq!(write(&file, "new", ours), Ok(()));
        assert_eq!(write(&file, "newer", ours), Err("not ours".to_owned()));
        assert_eq!(fs::read_to_string(&file).unwrap(), "new");
        fs::write(&file, b"\xff").unwrap();
        assert_eq!(write(&file, "newer", ours), Err("not ours".to_owned()));
        let lost = folder.path().join("no/list");
        let said = write(&lost, "new", ours).unwrap_err();
        assert_eq!(said, "there is no such folder");
    }
}
