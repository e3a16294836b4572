//! The schema of `partwright.toml`, for editors that complete and check it: made from the types
//! that read it, and committed.

use std::fs;
use std::path::{Path, PathBuf};

use partwright_check::House;
use partwright_check::house::schema;
use serde_json::Value;

fn file(name: &str) -> PathBuf {
    Path::new(env!("CARGO_MANIFEST_DIR"))
        .join("crates/check")
        .join(name)
}

#[test]
fn the_committed_schema_is_the_one_of_the_code() {
    let path = file("partwright.schema.json");
    let wanted = format!("{:#}\n", schema());
    // The order of keys is no part of a schema, and hangs on what else is built.
    let there = fs::read_to_string(&path)
        .ok()
        .and_then(|text| serde_json::from_str(&text).ok());
    if there != Some(schema()) {
        fs::write(&path, wanted).unwrap();
        panic!("the schema was stale and is rewritten: look at it and commit it");
    }
}

/// What the program and what the schema say to a file.
fn verdicts(text: &str) -> (bool, bool) {
    let judge = jsonschema::validator_for(&schema()).unwrap();
    let house = House::read(Path::new("partwright.toml"), &mut |path| {
        if path == Path::new("partwright.toml") {
            Ok(text.to_owned())
        } else {
            Ok(String::new())
        }
    });
    let value: Result<toml::Table, _> = text.parse();
    let value = value.ok().map(|table| serde_json::to_value(table).unwrap());
    (
        house.is_ok(),
        value.is_some_and(|value| judge.is_valid(&value)),
    )
}

/// The example in the documentation of house styles.
fn example() -> String {
    let source = fs::read_to_string(file("src/house.rs")).unwrap();
    let lines = source.lines().filter_map(|line| line.strip_prefix("//!"));
    let lines = lines.map(|line| line.strip_prefix(' ').unwrap_or(line));
    let inside = lines.skip_while(|line| *line != "```toml").skip(1);
    inside
        .take_while(|line| *line != "```")
        .map(|line| format!("{line}\n"))
        .collect()
}

#[test]
fn the_schema_takes_what_the_program_takes() {
    let example = example();
    assert!(example.contains("base = \"chorale\""), "{example}");
    let whole = format!(
        "across-phrases = true\n{example}\n[[number]]\nrule = \"spacing\"\nname = \"bass\"\nvalue = 24\n\
         reason = \"the organ\"\n\n[[licence]]\npath = \"**/*.xml\"\nrule = [\"crossing\"]\nbars = \"12..20\"\n\
         voices = [\"A\"]\nreason = \"as printed\"\n"
    );
    for text in ["", example.as_str(), &whole] {
        assert_eq!(verdicts(text), (true, true), "{text}");
    }
}

#[test]
fn the_schema_refuses_what_is_badly_formed() {
    let rule = "[[rule]]\nrule = \"overlap\"\n";
    for text in [
        "bass = \"chorale\"\n".to_owned(),
        "base = 3\n".to_owned(),
        "include = \"common.toml\"\n".to_owned(),
        "across-phrases = \"yes\"\n".to_owned(),
        format!("{rule}severity = \"warn\"\nreason = \"x\"\n"),
        format!("{rule}severity = \"off\"\n"),
        format!("{rule}severity = \"off\"\nreason = \"x\"\nstyle = \"motet\"\n"),
        "[[number]]\nrule = \"spacing\"\nname = \"bass\"\nvalue = \"wide\"\nreason = \"x\"\n"
            .to_owned(),
        "[[licence]]\npath = \"*.xml\"\nrule = \"crossing\"\nreason = \"x\"\n".to_owned(),
        "[[rule]\n".to_owned(),
    ] {
        assert_eq!(verdicts(&text), (false, false), "{text}");
    }
}

#[test]
fn every_key_says_what_it_is_for() {
    let schema = schema();
    let tables = ["RuleTable", "NumberTable", "LicenceTable"];
    let tables = tables.map(|name| &schema["$defs"][name]);
    let mut keys = 0;
    for table in std::iter::once(&schema).chain(tables) {
        for (key, value) in table["properties"].as_object().unwrap() {
            assert!(
                value["description"].as_str().is_some_and(|d| !d.is_empty()),
                "{key}: {value}"
            );
            keys += 1;
        }
    }
    assert_eq!(keys, 20, "the keys of house styles");
    assert!(matches!(schema["title"], Value::String(_)));
}
