//! The sheets of the cases in `grammar/cases`, and the problems that they say are in them.

use std::fs;
use std::path::Path;

/// A case, as far as the grammar may judge it.
#[derive(Clone, Debug, Default)]
pub(crate) struct Case {
    /// Its name, unlike any other's.
    pub(crate) name: String,
    /// The sheet, byte for byte.
    pub(crate) sheet: String,
    /// What could not be read in it, in the words of the case.
    pub(crate) reading_problems: Vec<String>,
}

/// All cases of all files.
pub(crate) fn cases() -> Vec<Case> {
    let folder = Path::new(env!("CARGO_MANIFEST_DIR")).join("../../grammar/cases");
    let mut paths: Vec<_> = fs::read_dir(folder)
        .unwrap()
        .map(|entry| entry.unwrap().path())
        .filter(|path| path.extension().is_some_and(|end| end == "cases"))
        .collect();
    paths.sort();
    let texts = paths.iter().map(|path| fs::read_to_string(path).unwrap());
    texts.flat_map(|text| cases_of(&text)).collect()
}

fn cases_of(text: &str) -> Vec<Case> {
    let text = format!("\n{text}");
    text.split("\n=== ").skip(1).map(case).collect()
}

fn case(text: &str) -> Case {
    let (name, rest) = text.split_once('\n').unwrap();
    // Every line of the sheet keeps its end.
    let at = if rest.starts_with("--- ") {
        0
    } else {
        rest.find("\n--- ").unwrap() + 1
    };
    let (sheet, answer) = rest.split_at(at);
    let mut case = Case {
        sheet: sheet.to_owned(),
        ..Case::default()
    };
    let mut name = name.trim_end();
    while let Some((before, note)) = name
        .strip_suffix(']')
        .and_then(|name| name.rsplit_once(" ["))
    {
        match note {
            "crlf" => case.sheet = case.sheet.replace('\n', "\r\n"),
            "bom" => case.sheet.insert(0, '\u{feff}'),
            "tabs" => case.sheet = case.sheet.replace('→', "\t"),
            "no newline" => {
                let end = if case.sheet.ends_with("\r\n") { 2 } else { 1 };
                case.sheet.truncate(case.sheet.len().saturating_sub(end));
            }
            _ => panic!("{name}: unknown note {note}"),
        }
        name = before.trim_end();
    }
    name.clone_into(&mut case.name);
    if answer.starts_with("--- problems") {
        let problems = answer
            .lines()
            .skip(1)
            .take_while(|line| !line.starts_with("--- "));
        case.reading_problems = problems
            .filter_map(|line| Some(line.split_once(" reading ")?.1.to_owned()))
            .collect();
    }
    case
}
