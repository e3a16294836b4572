//! The report in the Static Analysis Results Interchange Format.

use std::path::PathBuf;

use serde_json::{Value, json};

use crate::support::{CLEAN, FLAWED, Folder, Ran};

fn log(ran: &Ran) -> Value {
    serde_json::from_str(&ran.out).unwrap_or_else(|error| panic!("{error}: {}", ran.out))
}

fn results(log: &Value) -> &Vec<Value> {
    log["runs"][0]["results"].as_array().unwrap()
}

/// A folder with something of everything a log can hold.
fn mixed() -> Folder {
    let careless = "metre 2/4\nlicence parallel-octaves: the organ\n\nS | B4 C | D5 E*a | F E |\n\
                    B | G3 A | G3 A   | F E |\n*a licence crossing: weir\n";
    Folder::with(&[
        ("a.voices", FLAWED),
        ("b & é/c.voices", careless),
        ("d.voices", "stlye free\n\nS | H4 |\n"),
        ("e.voices", CLEAN),
    ])
}

#[test]
fn a_log_holds_to_the_published_schema() {
    let shared = std::env::var_os("PARTWRIGHT_SHARED").map_or_else(
        || PathBuf::from(env!("CARGO_MANIFEST_DIR")).join("../shared"),
        Into::into,
    );
    let file = shared.join("data/schemas/sarif-2.1.0/sarif-schema-2.1.0.json");
    let Ok(schema) = std::fs::read_to_string(&file) else {
        println!("left out: no SARIF schema where the outside data should be");
        return;
    };
    let schema: Value = serde_json::from_str(&schema).unwrap();
    // Formats such as URIs are checked too.
    let judge = jsonschema::options()
        .should_validate_formats(true)
        .build(&schema)
        .unwrap();
    let folder = mixed();
    let mut logs = 0;
    for arguments in [
        ["--licensed", "."].as_slice(),
        &["."],
        &["--pick", "crossing", "e.voices"],
        &["lost.voices"],
        &["--licensed", "--as", "x:y z.voices", "-"],
    ] {
        let ran = folder.feed(
            &[&["check", "--report", "sarif"], arguments].concat(),
            FLAWED.as_bytes(),
        );
        let log = log(&ran);
        let wrong: Vec<String> = judge
            .iter_errors(&log)
            .map(|error| format!("{}: {error}", error.instance_path()))
            .collect();
        assert!(wrong.is_empty(), "{arguments:?}: {wrong:#?}");
        logs += 1;
    }
    // The judge refuses what is wrong.
    let mut wrong = log(&folder.run(&["check", "--report", "sarif", "a.voices"]));
    wrong["runs"][0]["results"][0]["level"] = json!("fault");
    assert!(!judge.is_valid(&wrong));
    println!("outside: {logs} SARIF logs against the published schema");
}

#[test]
fn a_finding_is_a_result_with_its_places() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let ran = folder.check(&["--report", "sarif", "a.voices"]);
    assert_eq!(ran.said(&["2 faults in 1 sheet."]), 1);
    let log = log(&ran);
    let run = &log["runs"][0];
    assert_eq!(
        (&log["version"], &run["columnKind"]),
        (&json!("2.1.0"), &json!("unicodeCodePoints"))
    );
    let found = results(&log);
    assert_eq!(found.len(), 2);
    let fifths = &found[0];
    assert_eq!(
        (&fifths["ruleId"], &fifths["level"]),
        (&json!("parallel-fifths"), &json!("error"))
    );
    assert!(
        fifths["message"]["text"]
            .as_str()
            .unwrap()
            .starts_with("Parallel fifths")
    );
    let place = &fifths["locations"][0];
    assert_eq!(
        place["physicalLocation"]["artifactLocation"]["uri"],
        "a.voices"
    );
    let region = json!({"startLine": 4, "startColumn": 8, "endLine": 4, "endColumn": 9});
    assert_eq!(place["physicalLocation"]["region"], region);
    let names: Vec<&str> = place["logicalLocations"]
        .as_array()
        .unwrap()
        .iter()
        .map(|place| place["name"].as_str().unwrap())
        .collect();
    assert_eq!(names, ["bar 1", "beat 2", "S", "B"]);
    let related: Vec<(&str, &Value)> = fifths["relatedLocations"]
        .as_array()
        .unwrap()
        .iter()
        .map(|place| {
            let words = place["message"]["text"].as_str().unwrap();
            (words, &place["physicalLocation"]["region"]["startColumn"])
        })
        .collect();
    assert_eq!(related[0], ("from D5", &json!(5)));
    assert_eq!(related.len(), 3);
    // Nothing is said of suppression where nothing licensed is shown.
    assert!(
        found
            .iter()
            .all(|result| result.get("suppressions").is_none())
    );
    assert!(
        run["tool"]["driver"].get("informationUri").is_none(),
        "the project has no home yet"
    );
    assert_eq!(run["tool"]["driver"]["version"], env!("CARGO_PKG_VERSION"));
    assert_eq!(run["invocations"][0]["executionSuccessful"], true);
}

#[test]
fn every_rule_that_took_part_is_told_whole() {
    let folder = Folder::with(&[("a.voices", CLEAN)]);
    let rules = |arguments: &[&str]| {
        let all = [&["check", "--report", "sarif", "a.voices"], arguments].concat();
        let log = log(&folder.run(&all));
        assert_eq!(results(&log).len(), 0);
        log["runs"][0]["tool"]["driver"]["rules"]
            .as_array()
            .unwrap()
            .clone()
    };
    let all = rules(&[]);
    assert_eq!(all.len(), partwright_rules::catalogue().len());
    for (rule, entry) in all.iter().zip(partwright_rules::catalogue()) {
        assert_eq!(rule["id"], entry.id);
        assert_eq!(rule["shortDescription"]["text"], entry.page.title);
        assert!(
            rule["help"]["markdown"]
                .as_str()
                .unwrap()
                .contains("# What to do"),
            "{}",
            entry.id
        );
    }
    assert_eq!(
        rules(&["--pick", "parallel-fifths,crossing", "--drop", "crossing"]).len(),
        1
    );
}

#[test]
fn licensed_findings_are_suppressed_results() {
    let sheet = "metre 2/4\nlicence parallel-octaves: the organ\n\nS | D5 E*a | F E | D5 E |\n\
                 B | G3 A   | F E | G3 A |\n*a licence parallel-fifths: the horns\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    folder.write(
        "partwright.toml",
        b"[[licence]]\npath = \"a.voices\"\nrule = [\"parallel-fifths\"]\nbars = \"3\"\nreason = \"as printed\"\n",
    );
    let open = log(&folder.check(&["--report", "sarif", "a.voices"]));
    assert_eq!(results(&open).len(), 0);
    folder.write("b.voices", FLAWED.as_bytes());
    let all = log(&folder.check(&["--report", "sarif", "--licensed", "."]));
    let suppressions: Vec<&Value> = results(&all).iter().map(|r| &r["suppressions"]).collect();
    let one =
        |kind: &str, why: &str| json!([{"kind": kind, "status": "accepted", "justification": why}]);
    let expected = [
        &one("inSource", "the horns"),
        &one("inSource", "the organ"),
        &one("external", "as printed"),
        &json!([]),
        &json!([]),
    ];
    assert_eq!(suppressions, expected);
}

#[test]
fn mends_of_the_writing_are_fixes() {
    let folder = mixed();
    let log = log(&folder.run(&["check", "--report", "sarif", "."]));
    let fixes: Vec<(&str, &Value)> = results(&log)
        .iter()
        .filter(|result| result.get("fixes").is_some())
        .map(|result| (result["ruleId"].as_str().unwrap(), &result["fixes"][0]))
        .collect();
    let names: Vec<&str> = fixes.iter().map(|(rule, _)| *rule).collect();
    assert_eq!(
        names,
        ["licence-idle", "octave-doubt", "reading"],
        "notes are never fixed so"
    );
    let (_, doubt) = fixes[1];
    let change = &doubt["artifactChanges"][0];
    // The folder's name as a URI has it.
    assert_eq!(change["artifactLocation"]["uri"], "b%20&%20%C3%A9/c.voices");
    let expected = json!([{
        "deletedRegion": {"startLine": 4, "startColumn": 9, "endLine": 4, "endColumn": 9},
        "insertedContent": {"text": "4"},
    }]);
    assert_eq!(change["replacements"], expected);
    // A mark, and the whole line of its footnote.
    let (_, idle) = fixes[0];
    let gone = &idle["artifactChanges"][0]["replacements"];
    assert_eq!(gone.as_array().unwrap().len(), 2);
    assert_eq!(gone[1]["deletedRegion"]["endLine"], 7);
}

#[test]
fn a_fingerprint_is_of_the_notes_and_troubles_are_told() {
    let folder = Folder::with(&[
        ("a.voices", FLAWED),
        ("b.voices", &format!("// later\n{FLAWED}")),
    ]);
    let ran = folder.check(&["--report", "sarif", ".", "lost.voices"]);
    assert_eq!(ran.status, 2);
    let log = log(&ran);
    let prints: Vec<&Value> = results(&log)
        .iter()
        .map(|r| &r["partialFingerprints"])
        .collect();
    assert_eq!((prints[0], prints[1]), (prints[2], prints[3]));
    assert_ne!(prints[0], prints[1]);
    let how = &log["runs"][0]["invocations"][0];
    assert_eq!(how["executionSuccessful"], false);
    let words = how["toolExecutionNotifications"][0]["message"]["text"]
        .as_str()
        .unwrap();
    assert!(
        words.starts_with("lost.voices: there is no such file"),
        "{words}"
    );
}

#[test]
fn paths_are_told_from_the_current_folder() {
    let folder = Folder::with(&[("in/a.voices", FLAWED), ("x:y.voices", FLAWED)]);
    let uri = |ran: &Ran| {
        let log = log(ran);
        let place = &results(&log)[0]["locations"][0]["physicalLocation"];
        place["artifactLocation"]["uri"]
            .as_str()
            .unwrap()
            .to_owned()
    };
    let absolute = folder.path("in/../in/a.voices");
    let ran = folder.check(&["--report", "sarif", absolute.to_str().unwrap()]);
    assert_eq!(uri(&ran), "in/a.voices");
    assert_eq!(
        uri(&folder.check(&["--report", "sarif", "x:y.voices"])),
        "./x:y.voices"
    );
    let outside = folder
        .program(&["check", "--report", "sarif", "../x:y.voices"])
        .current_dir(folder.path("in"))
        .output()
        .unwrap();
    let uri = uri(&Ran::of(outside));
    assert!(
        uri.starts_with("file:///") && uri.ends_with("/x:y.voices"),
        "{uri}"
    );
}
