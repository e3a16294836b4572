//! Which files are read, and what is said of those that cannot be.

use crate::support::{CLEAN, FLAWED, Folder, Ran};

/// The sheets in which something was found, in order.
fn paths(ran: &Ran) -> Vec<String> {
    let mut paths: Vec<String> = ran
        .findings()
        .iter()
        .map(|finding| finding["path"].as_str().unwrap().to_owned())
        .collect();
    paths.dedup();
    paths
}

#[test]
fn a_clean_sheet_is_0_and_a_fault_is_1() {
    let folder = Folder::with(&[("clean.voices", CLEAN), ("flawed.voices", FLAWED)]);
    let clean = folder.check(&["clean.voices"]);
    assert_eq!(clean.said(&["Nothing found in 1 sheet."]), 0);
    assert_eq!(clean.out, "");
    let flawed = folder.check(&["flawed.voices"]);
    assert_eq!(flawed.said(&["2 faults in 1 sheet."]), 1);
    assert!(flawed.out.contains("flawed.voices:4:8"), "{}", flawed.out);
}

#[test]
fn a_folder_is_searched_in_order_without_hidden_ignored_and_linked_files() {
    let folder = Folder::with(&[
        ("hymns/z.voices", FLAWED),
        ("hymns/a.voices", FLAWED),
        ("hymns/a/z.VOICES", FLAWED),
        ("hymns/.hidden.voices", FLAWED),
        ("hymns/.hidden/b.voices", FLAWED),
        ("hymns/drafts/c.voices", FLAWED),
        ("hymns/notes.txt", FLAWED),
        (".gitignore", "drafts/\n"),
        ("outside.voices", FLAWED),
    ]);
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink("../outside.voices", folder.path("hymns/link.voices")).unwrap();
        std::os::unix::fs::symlink(".", folder.path("hymns/ring")).unwrap();
    }
    let expected = ["hymns/a/z.VOICES", "hymns/a.voices", "hymns/z.voices"];
    assert_eq!(
        paths(&folder.check(&["--report", "json", "hymns"])),
        expected
    );
}

#[test]
fn a_sheet_is_checked_once_and_here_needs_no_dot() {
    let folder = Folder::with(&[("a.voices", FLAWED), ("b/c.voices", FLAWED)]);
    let ran = folder.check(&["--report", "json", "b", ".", "a.voices", "./a.voices"]);
    assert_eq!(paths(&ran), ["b/c.voices", "a.voices"]);
    assert_eq!(ran.said(&["4 faults in 2 sheets."]), 1);
}

#[test]
fn a_path_named_outright_is_read_though_hidden_or_ignored_or_linked() {
    let folder = Folder::with(&[
        (".a.voices", FLAWED),
        ("b.voices", FLAWED),
        (".gitignore", "*.voices\n"),
    ]);
    assert_eq!(folder.check(&[".a.voices"]).status, 1);
    assert_eq!(folder.check(&["b.voices"]).status, 1);
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink("b.voices", folder.path("c.voices")).unwrap();
        assert_eq!(folder.check(&["c.voices"]).status, 1);
    }
}

#[test]
fn a_folder_without_a_score_is_2() {
    let folder = Folder::with(&[
        ("empty/readme.txt", ""),
        ("other/a.musicxml", "<score-partwise/>"),
    ]);
    assert_eq!(
        folder
            .check(&["empty"])
            .said(&["empty: no score in this folder"]),
        2
    );
    let other = folder.check(&["other"]);
    assert_eq!(
        other.said(&["no score in this folder", "1 MusicXML file is left out"]),
        2
    );
    assert_eq!(
        folder
            .check(&["--quiet", "empty"])
            .said(&["no score in this folder"]),
        2
    );
}

#[test]
fn an_empty_sheet_is_0_with_a_word() {
    let folder = Folder::with(&[
        ("empty.voices", ""),
        ("headers.voices", "title Lamplighters' evensong\n"),
    ]);
    for name in ["empty.voices", "headers.voices"] {
        let ran = folder.check(&[name]);
        assert_eq!(ran.said(&[name, "an empty sheet"]), 0);
        assert_eq!(ran.out, "");
        let quiet = folder.check(&["--quiet", name]);
        assert_eq!((quiet.status, quiet.err.as_str()), (0, ""));
    }
}

#[test]
fn trouble_wins_and_the_rest_is_still_reported() {
    let folder = Folder::with(&[("flawed.voices", FLAWED)]);
    let ran = folder.check(&["lost.voices", "flawed.voices"]);
    assert_eq!(
        ran.said(&[
            "lost.voices: there is no such file",
            "2 faults",
            "1 path could not be read"
        ]),
        2
    );
    assert!(ran.out.contains("parallel-fifths"), "{}", ran.out);
}

#[test]
fn a_lost_path_is_told_with_the_nearest_name() {
    let folder = Folder::with(&[("evensong.voices", CLEAN)]);
    assert_eq!(
        folder
            .check(&["evensnog.voices"])
            .said(&["did you mean evensong.voices?"]),
        2
    );
    assert_eq!(
        folder
            .check(&["evensong.voices/bar"])
            .said(&["is a file, not a folder"]),
        2
    );
    #[cfg(unix)]
    {
        std::os::unix::fs::symlink("nowhere", folder.path("loose.voices")).unwrap();
        assert_eq!(
            folder
                .check(&["loose.voices"])
                .said(&["a link to something that is not there"]),
            2
        );
    }
}

#[test]
fn other_kinds_of_files_are_refused_in_plain_words() {
    let folder = Folder::with(&[
        ("a.musicxml", ""),
        ("a.mxl", ""),
        ("a.xml", ""),
        ("a.mid", ""),
        ("a.pdf", ""),
    ]);
    for name in ["a.musicxml", "a.mxl", "a.xml"] {
        assert_eq!(
            folder
                .check(&[name])
                .said(&[name, "MusicXML is not read yet"]),
            2
        );
    }
    assert_eq!(
        folder.check(&["a.mid"]).said(&["a.mid", "has no spelling"]),
        2
    );
    assert_eq!(
        folder
            .check(&["a.pdf"])
            .said(&["a.pdf", "expected a voice sheet (.voices)"]),
        2
    );
}

#[test]
fn a_text_file_named_outright_is_read_with_a_word() {
    let folder = Folder::with(&[("draft.txt", FLAWED), ("draft", FLAWED)]);
    let ran = folder.check(&["draft.txt"]);
    assert_eq!(ran.said(&["draft.txt: read as a voice sheet"]), 1);
    assert_eq!(folder.check(&["draft"]).said(&["2 faults"]), 1);
}

#[test]
fn what_is_no_text_is_refused_with_its_place() {
    let folder = Folder::new();
    folder.write("picture.voices", b"\x89PNG\r\n\x1a\n\0\0\0\rIHDR");
    folder.write("old.voices", b"S | C4 |\n// caf\xE9\n");
    folder.write("wide.voices", b"\xFF\xFES\0 \0|\0");
    assert_eq!(
        folder
            .check(&["picture.voices"])
            .said(&["picture.voices", "binary file"]),
        2
    );
    assert_eq!(
        folder
            .check(&["old.voices"])
            .said(&["old.voices", "line 2", "byte 7", "UTF-8"]),
        2
    );
    assert_eq!(
        folder
            .check(&["wide.voices"])
            .said(&["wide.voices", "UTF-16"]),
        2
    );
}

#[test]
fn a_sheet_above_8_mib_is_refused_and_one_of_8_mib_is_not() {
    let folder = Folder::new();
    let line = b"// the tide table of the inner harbour, kept by the harbour master's clerk\n";
    let mut text: Vec<u8> = line.iter().copied().cycle().take(8 << 20).collect();
    folder.write("most.voices", &text);
    text.push(b'\n');
    folder.write("more.voices", &text);
    assert_eq!(
        folder
            .check(&["most.voices"])
            .said(&["most.voices: an empty sheet"]),
        0
    );
    assert_eq!(
        folder
            .check(&["more.voices"])
            .said(&["more.voices", "larger than 8 MiB"]),
        2
    );
    let piped = folder.feed(&["check", "-"], &text);
    assert_eq!(piped.said(&["larger than 8 MiB"]), 2);
}

#[test]
fn standard_input_goes_by_the_name_it_is_given() {
    let folder = Folder::new();
    let bare = folder.feed(&["check", "--report", "json", "-"], FLAWED.as_bytes());
    assert_eq!((bare.status, paths(&bare)), (1, vec!["-".to_owned()]));
    let named = folder.feed(
        &["check", "--report", "json", "--as", "hymns/a.voices", "-"],
        FLAWED.as_bytes(),
    );
    assert_eq!(
        (named.status, paths(&named)),
        (1, vec!["hymns/a.voices".to_owned()])
    );
    let other = folder.feed(&["check", "--as", "a.mid", "-"], FLAWED.as_bytes());
    assert_eq!(other.said(&["a.mid", "has no spelling"]), 2);
    assert_eq!(
        folder
            .feed(&["check", "--as", "a.voices", "."], b"")
            .said(&["--as", "standard input"]),
        2
    );
}

#[cfg(unix)]
#[test]
fn what_may_not_be_read_is_trouble_and_the_rest_is_reported() {
    use std::os::unix::fs::PermissionsExt;
    let folder = Folder::with(&[
        ("a/locked/b.voices", FLAWED),
        ("a/c.voices", FLAWED),
        ("d.voices", CLEAN),
    ]);
    let mode = |name: &str, mode| {
        std::fs::set_permissions(folder.path(name), std::fs::Permissions::from_mode(mode)).unwrap();
    };
    mode("a/locked", 0o000);
    mode("d.voices", 0o000);
    if std::fs::read(folder.path("d.voices")).is_ok() {
        println!("left out: this user may read everything");
    } else {
        let ran = folder.check(&["--report", "json", "a", "d.voices"]);
        assert_eq!(
            ran.said(&[
                "a/locked: you are not permitted",
                "d.voices: you are not permitted"
            ]),
            2
        );
        assert_eq!(paths(&ran), ["a/c.voices"]);
    }
    mode("a/locked", 0o700);
}
