//! The demo scores: each states its expected findings in place, and is held to them; and every line
//! of a house style among them changes something.

#![allow(clippy::unwrap_used, clippy::panic, clippy::print_stdout)]

use std::fs;
use std::path::{Path, PathBuf};
use std::sync::Arc;

use partwright_check::house::FILE;
use partwright_check::{Checked, House, Wishes, unlike_drawn};

fn root() -> PathBuf {
    PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("demo-scores")
}

/// The files below a folder, in order.
fn below(folder: &Path) -> Vec<PathBuf> {
    let mut files = Vec::new();
    let mut folders = vec![folder.to_owned()];
    while let Some(folder) = folders.pop() {
        for entry in fs::read_dir(folder).unwrap() {
            let path = entry.unwrap().path();
            if path.is_dir() {
                folders.push(path);
            } else {
                files.push(path);
            }
        }
    }
    files.sort();
    files
}

fn sheets(folder: &Path) -> Vec<PathBuf> {
    let mut files = below(folder);
    files.retain(|path| path.extension().is_some_and(|end| end == "voices"));
    files
}

fn house_styles() -> Vec<PathBuf> {
    let mut files = below(&root());
    files.retain(|path| path.file_name().is_some_and(|name| name == FILE));
    files
}

/// A house style of this text, as if it stood in that file.
fn house(file: &Path, text: &str) -> House {
    House::read(file, &mut |path| {
        if path == file {
            Ok(text.to_owned())
        } else {
            fs::read_to_string(path).map_err(|error| error.to_string())
        }
    })
    .unwrap()
}

/// A sheet under the nearest house style, looked for upwards from it.
fn wishes(sheet: &Path) -> Wishes {
    let root = root();
    let mut folders = sheet.ancestors().skip(1);
    let above = folders
        .by_ref()
        .take_while(|folder| folder.starts_with(&root));
    let nearest = above
        .map(|folder| folder.join(FILE))
        .find(|file| file.exists());
    Wishes {
        house: nearest.map(|file| Arc::new(house(&file, &fs::read_to_string(&file).unwrap()))),
        file: Some(sheet.to_owned()),
        ..Wishes::default()
    }
}

#[test]
fn demo_scores_give_what_they_state() {
    let paths = sheets(&root());
    assert!(paths.len() >= 9);
    let mut wrong = Vec::new();
    for path in paths {
        let text = fs::read_to_string(&path).unwrap();
        let checked = Checked::text(&text, &wishes(&path));
        let name = path.strip_prefix(root()).unwrap().display().to_string();
        assert!(checked.reading.score.voices.len() >= 2, "{name} has voices");
        for difference in unlike_drawn(&text, &checked, None) {
            wrong.push(format!("{name}: {difference}"));
        }
    }
    assert!(wrong.is_empty(), "{}", wrong.join("\n"));
}

/// What no licence lifts in the sheets beside a house style, under a text of it.
fn judged(file: &Path, text: &str) -> Vec<String> {
    let house = Arc::new(house(file, text));
    let mut all = Vec::new();
    for sheet in sheets(file.parent().unwrap()) {
        let wishes = Wishes {
            house: Some(Arc::clone(&house)),
            file: Some(sheet.clone()),
            ..Wishes::default()
        };
        let checked = Checked::text(&fs::read_to_string(&sheet).unwrap(), &wishes);
        for finding in checked.open() {
            all.push(format!(
                "{} {:?} {} {} {:?}",
                sheet.display(),
                finding.span,
                finding.rule,
                finding.severity,
                finding.voices
            ));
        }
    }
    all
}

/// The text of a house style in pieces: what stands before the first table, then the tables.
fn pieces(text: &str) -> Vec<String> {
    let mut pieces = vec![String::new()];
    for line in text.split_inclusive('\n') {
        if line.starts_with("[[") {
            pieces.push(String::new());
        }
        if let Some(last) = pieces.last_mut() {
            last.push_str(line);
        }
    }
    pieces
}

#[test]
fn every_line_of_a_house_style_matters() {
    let files = house_styles();
    assert_eq!(files.len(), 2);
    for file in files {
        let text = fs::read_to_string(&file).unwrap();
        let whole = house(&file, &text);
        let pieces = pieces(&text);
        let tables = whole.overrides.len() + whole.numbers.len() + whole.licences.len();
        assert_eq!(pieces.len(), tables + 1, "{}", file.display());
        assert!(!whole.numbers.is_empty() && !whole.licences.is_empty());
        let findings = judged(&file, &text);
        for left_out in 1..pieces.len() {
            let mut rest = pieces.clone();
            let dropped = rest.remove(left_out);
            assert_ne!(
                judged(&file, &rest.concat()),
                findings,
                "{}: nothing is judged otherwise without\n{dropped}",
                file.display()
            );
        }
    }
}

#[test]
fn the_sheets_beside_a_house_style_ask_for_it() {
    for file in house_styles() {
        let whole = house(&file, &fs::read_to_string(&file).unwrap());
        let sheets = sheets(file.parent().unwrap());
        assert_eq!(sheets.len(), 2);
        for sheet in sheets {
            let checked = Checked::text(&fs::read_to_string(&sheet).unwrap(), &wishes(&sheet));
            assert_eq!(checked.reading.score.style, whole.name);
            assert_eq!(checked.strictness.overrides, whole.overrides);
        }
    }
}
