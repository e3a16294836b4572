//! Tests about the repository itself.

#![allow(clippy::unwrap_used, clippy::panic)]

use std::collections::BTreeSet;
use std::fs;
use std::path::{Path, PathBuf};

fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../..")
}

fn read(path: &Path) -> String {
    fs::read_to_string(path).unwrap_or_else(|e| panic!("{}: {e}", path.display()))
}

/// What each crate may import of ours: the arrows of the house. Only normal dependencies count.
const MAY_IMPORT: &[(&str, &[&str])] = &[
    ("space", &[]),
    ("score", &["space"]),
    ("sheet", &["score"]),
    ("analysis", &["score", "space"]),
    ("rules", &["analysis", "score", "space"]),
    ("check", &["analysis", "sheet", "score", "rules"]),
    ("mend", &["check", "rules", "score", "space", "sheet"]),
    (
        "server",
        &["mend", "check", "rules", "score", "sheet", "space"],
    ),
    (
        "partwright",
        &[
            "server", "mend", "check", "rules", "score", "sheet", "space",
        ],
    ),
    ("xtask", &[]),
];

#[test]
fn arrows_point_one_way() {
    let folders: BTreeSet<String> = fs::read_dir(root().join("crates"))
        .unwrap()
        .map(|entry| entry.unwrap().file_name().into_string().unwrap())
        .collect();
    let known: BTreeSet<String> = MAY_IMPORT
        .iter()
        .map(|(name, _)| (*name).to_owned())
        .collect();
    assert_eq!(
        folders, known,
        "a crate without a place in the table, or a place without a crate"
    );
    for (name, allowed) in MAY_IMPORT {
        let manifest = match *name {
            "partwright" => root().join("Cargo.toml"),
            name => root().join("crates").join(name).join("Cargo.toml"),
        };
        let manifest: toml::Table = read(&manifest).parse().unwrap();
        let imports = manifest["dependencies"].as_table().unwrap().keys();
        for import in imports.filter_map(|key| key.strip_prefix("partwright-")) {
            assert!(allowed.contains(&import), "{name} may not import {import}");
        }
    }
}

fn rust_files(folder: &Path, found: &mut Vec<PathBuf>) {
    for entry in fs::read_dir(folder).unwrap().flatten() {
        let path = entry.path();
        if path.is_dir() {
            rust_files(&path, found);
        } else if path.extension().is_some_and(|e| e == "rs") {
            found.push(path);
        }
    }
}

#[test]
fn rules_compute_no_interval_and_no_motion() {
    let mut files = Vec::new();
    rust_files(&root().join("crates/rules/src/rules"), &mut files);
    assert!(files.len() >= 16);
    for path in files {
        let text = read(&path);
        let code = text
            .lines()
            .filter(|line| !line.trim_start().starts_with("//"));
        for line in code {
            for word in [
                ".semitone",
                ".place(",
                ".step -",
                "up_to(",
                "Leg {",
                "Vector {",
                "Place {",
                ".sign",
            ] {
                assert!(
                    !line.contains(word),
                    "{}: pitch arithmetic: {line}",
                    path.display()
                );
            }
        }
    }
}

#[test]
fn no_file_is_one_to_dread() {
    let mut files = Vec::new();
    rust_files(&root().join("crates"), &mut files);
    rust_files(&root().join("tests"), &mut files);
    for path in files {
        let text = read(&path);
        // What a chore writes nobody reads.
        let written = text.lines().next().unwrap_or_default();
        if written.ends_with("do not edit.") {
            continue;
        }
        let lines = text.lines().count();
        assert!(lines <= 600, "{}: {lines} lines", path.display());
    }
}

#[test]
fn only_the_server_knows_the_protocol() {
    for (name, _) in MAY_IMPORT
        .iter()
        .filter(|(name, _)| !matches!(*name, "server" | "partwright"))
    {
        let manifest = read(&root().join("crates").join(name).join("Cargo.toml"));
        for library in ["tower-lsp", "lsp-types", "tokio"] {
            assert!(!manifest.contains(library), "{name} knows {library}");
        }
    }
}
