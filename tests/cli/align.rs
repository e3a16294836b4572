//! `align`: what is written, what is left alone, and what is said of it.

use std::fs;

use crate::support::Folder;

/// Not in columns.
const DRAFT: &str = "title Quay lanterns\n\nS|g4 F♯4 - |\n// the bass waits\nB | G3 A b |\n";

/// The same in columns.
const SET: &str = "\
title   Quay lanterns

S | G4 F#4 - |
// the bass waits
B | G3 A   B |
";

impl Folder {
    fn text(&self, name: &str) -> String {
        fs::read_to_string(self.path(name)).unwrap()
    }
}

#[test]
fn sheets_are_set_in_place_and_counted() {
    let folder = Folder::with(&[
        ("a.voices", DRAFT),
        ("b/c.voices", SET),
        ("b/d.voices", DRAFT),
        ("b/notes.txt", DRAFT),
    ]);
    let ran = folder.run(&["align", "."]);
    assert_eq!(ran.said(&["Aligned 2 of 3 sheets."]), 0);
    assert_eq!(ran.out, "");
    for name in ["a.voices", "b/c.voices", "b/d.voices"] {
        assert_eq!(folder.text(name), SET, "{name}");
    }
    assert_eq!(folder.text("b/notes.txt"), DRAFT);
    let again = folder.run(&["align", "."]);
    assert_eq!(again.said(&["Nothing to align in 3 sheets."]), 0);
    let quiet = folder.run(&["align", "--quiet", "."]);
    assert_eq!(
        (quiet.status, quiet.out.as_str(), quiet.err.as_str()),
        (0, "", "")
    );
}

#[test]
fn verify_names_what_it_would_change_and_changes_nothing() {
    let folder = Folder::with(&[("a.voices", DRAFT), ("b.voices", SET), ("c.voices", DRAFT)]);
    let ran = folder.run(&["align", "--verify", "."]);
    assert_eq!(ran.said(&["Not in columns: 2 of 3 sheets."]), 1);
    assert_eq!(ran.out, "a.voices\nc.voices\n");
    assert_eq!(folder.text("a.voices"), DRAFT);
    let set = folder.run(&["align", "--verify", "b.voices"]);
    assert_eq!(set.said(&["Nothing to align in 1 sheet."]), 0);
    assert_eq!(set.out, "");
    let quiet = folder.run(&["align", "--verify", "--quiet", "c.voices"]);
    assert_eq!((quiet.status, quiet.out.as_str()), (1, "c.voices\n"));
    assert_eq!(quiet.err, "");
}

#[test]
fn standard_input_goes_to_standard_output() {
    let folder = Folder::new();
    let draft = DRAFT.as_bytes();
    for arguments in [
        &["align", "-"][..],
        &["align", "--as", "hymns/a.voices", "-"],
        &["align", "-", "--quiet"],
    ] {
        let ran = folder.feed(arguments, draft);
        assert_eq!(
            (ran.status, ran.out.as_str(), ran.err.as_str()),
            (0, SET, "")
        );
    }
    let windows = format!("\u{feff}{}", DRAFT.trim_end().replace('\n', "\r\n"));
    let expected = format!("\u{feff}{}", SET.trim_end().replace('\n', "\r\n"));
    assert_eq!(
        folder.feed(&["align", "-"], windows.as_bytes()).out,
        expected
    );
    let verified = folder.feed(&["align", "--verify", "--as", "a.voices", "-"], draft);
    assert_eq!((verified.status, verified.out.as_str()), (1, "a.voices\n"));
    let set = folder.feed(&["align", "--verify", "-"], SET.as_bytes());
    assert_eq!((set.status, set.out.as_str()), (0, ""));
    let empty = folder.feed(&["align", "-"], b"");
    assert_eq!((empty.status, empty.out.as_str()), (0, ""));
}

#[test]
fn a_sheet_that_would_grow_too_large_stays_and_says_why() {
    let rows: String = (0..200).map(|i| format!("V{i} | _ |\n")).collect();
    let wide = format!("S | {}|\n{rows}", "c5 ".repeat(60_000));
    let folder = Folder::with(&[("draft.voices", &wide)]);
    let ran = folder.run(&["align", "draft.voices"]);
    assert_eq!(
        ran.said(&["draft.voices", "stays as it is", "larger than 8 MiB"]),
        0
    );
    assert_eq!(
        fs::read_to_string(folder.path("draft.voices")).unwrap(),
        wide
    );
}

#[test]
fn what_is_no_sheet_is_refused_and_left_untouched() {
    let folder = Folder::with(&[
        ("draft.voices", DRAFT),
        ("a.mid", DRAFT),
        ("b.musicxml", ""),
    ]);
    let noise = b"S|c4|\n\xFF\xFE\n";
    folder.write("noise.voices", noise);
    let zeros = b"S\0|\0c\x004\0|\0";
    folder.write("zeros.voices", zeros);
    let mut large = b"S|c4|\n".repeat((8 << 20) / 6 + 1);
    large.push(b'\n');
    folder.write("large.voices", &large);
    for (name, words) in [
        ("noise.voices", "line 2"),
        ("zeros.voices", "binary file"),
        ("large.voices", "larger than 8 MiB"),
        ("a.mid", "MIDI"),
        ("b.musicxml", "MusicXML"),
        ("lost.voices", "no such file"),
    ] {
        for verify in [&[][..], &["--verify"]] {
            let ran = folder.run(&[&["align"], verify, &[name]].concat());
            assert_eq!(ran.said(&[name, words]), 2);
            assert_eq!(ran.out, "");
        }
    }
    assert_eq!(fs::read(folder.path("noise.voices")).unwrap(), noise);
    assert_eq!(fs::read(folder.path("zeros.voices")).unwrap(), zeros);
    assert_eq!(fs::read(folder.path("large.voices")).unwrap(), large);
    let fed = folder.feed(&["align", "-"], noise);
    assert_eq!((fed.said(&["UTF-8"]), fed.out.as_str()), (2, ""));
    assert_eq!(folder.feed(&["align", "--as", "a.mid", "-"], b"").status, 2);
    assert_eq!(
        folder
            .run(&["align", "--as", "a.voices", "noise.voices"])
            .status,
        2
    );
    assert_eq!(folder.run(&["align"]).status, 2);
    // Trouble wins, and the rest is done.
    let rest = folder.run(&["align", "lost.voices", "draft.voices"]);
    assert_eq!(rest.said(&["lost.voices", "Aligned 1 sheet."]), 2);
    assert_eq!(folder.text("draft.voices"), SET);
}

#[test]
fn a_folder_without_a_sheet_is_2_and_mistakes_are_no_hindrance() {
    let folder = Folder::with(&[("empty/readme.txt", ""), ("a.voices", "S|H4 g|\nx  y\n")]);
    assert_eq!(
        folder
            .run(&["align", "empty"])
            .said(&["no score in this folder"]),
        2
    );
    assert_eq!(
        folder
            .run(&["align", "a.voices"])
            .said(&["Aligned 1 sheet."]),
        0
    );
    assert_eq!(folder.text("a.voices"), "S | H4 g |\nx  y\n");
}

#[cfg(unix)]
mod unix {
    use std::fs::{self, Permissions};
    use std::os::unix::fs::{MetadataExt, PermissionsExt, symlink};

    use super::{DRAFT, Folder, SET};

    #[test]
    fn permissions_and_links_stay_and_nothing_is_left_behind() {
        let folder = Folder::with(&[("real/a.voices", DRAFT)]);
        let (file, link) = (folder.path("real/a.voices"), folder.path("b.voices"));
        fs::set_permissions(&file, Permissions::from_mode(0o640)).unwrap();
        symlink("real/a.voices", &link).unwrap();
        assert_eq!(folder.run(&["align", "b.voices"]).status, 0);
        assert!(fs::symlink_metadata(&link).unwrap().is_symlink());
        assert_eq!(folder.text("real/a.voices"), SET);
        let data = fs::metadata(&file).unwrap();
        assert_eq!(data.permissions().mode() & 0o777, 0o640);
        let names = |name: &str| fs::read_dir(folder.path(name)).unwrap().count();
        assert_eq!((names("real"), names(".")), (1, 2));
    }

    #[test]
    fn a_sheet_that_stands_in_columns_is_not_touched() {
        let folder = Folder::with(&[("a.voices", SET)]);
        let file = folder.path("a.voices");
        // It could not even be written.
        fs::set_permissions(&file, Permissions::from_mode(0o444)).unwrap();
        let before = fs::metadata(&file).unwrap();
        assert_eq!(folder.run(&["align", "a.voices"]).status, 0);
        let after = fs::metadata(&file).unwrap();
        assert_eq!(before.ino(), after.ino());
        assert_eq!(before.modified().unwrap(), after.modified().unwrap());
    }

    #[test]
    fn a_read_only_sheet_and_a_pipe_are_left_alone() {
        let folder = Folder::with(&[("a.voices", DRAFT)]);
        let file = folder.path("a.voices");
        fs::set_permissions(&file, Permissions::from_mode(0o444)).unwrap();
        let ran = folder.run(&["align", "a.voices"]);
        assert_eq!(ran.said(&["a.voices", "read-only"]), 2);
        assert_eq!(folder.text("a.voices"), DRAFT);
        let piped = folder.feed(&["align", "/dev/stdin"], DRAFT.as_bytes());
        assert_eq!(piped.said(&["/dev/stdin", "standard input, as -"]), 2);
    }
}
