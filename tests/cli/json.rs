//! The report for programs.

use serde_json::json;

use crate::support::{FLAWED, Folder};

#[test]
fn a_finding_is_one_object_with_all_its_keys() {
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    let ran = folder.check(&["--report", "json", "--quiet", "a.voices"]);
    assert_eq!((ran.status, ran.err.as_str()), (1, ""));
    let findings = ran.findings();
    let message = findings[0]["message"].as_str().unwrap();
    assert!(
        message.contains("D5") && message.contains("A3"),
        "{message}"
    );
    let place = |line: u32, column: u32| json!({"line": line, "column": column});
    let expected = json!({
        "path": "a.voices",
        "rule": "parallel-fifths",
        "severity": "fault",
        "bar": "1",
        "beat": "2",
        "onset": "1/4",
        "voices": ["S", "B"],
        "message": message,
        "start": place(4, 8),
        "end": place(4, 9),
        "related": [
            {"role": "from", "voice": "S", "bar": "1", "beat": "1", "start": place(4, 5), "end": place(4, 7)},
            {"role": "from", "voice": "B", "bar": "1", "beat": "1", "start": place(5, 5), "end": place(5, 7)},
            {"role": "with", "voice": "B", "bar": "1", "beat": "2", "start": place(5, 8), "end": place(5, 9)},
        ],
        "licence": null,
    });
    assert_eq!(findings[0], expected);
    // The order of the keys is that of the product's page, and nobody need sort them.
    let keys = [
        "path", "rule", "severity", "bar", "beat", "onset", "voices", "message", "start", "end",
        "related",
    ];
    let line = ran.out.lines().next().unwrap();
    let places: Vec<usize> = keys
        .iter()
        .map(|key| line.find(&format!("\"{key}\":")).unwrap())
        .collect();
    assert!(places.is_sorted(), "{line}");
}

#[test]
fn fractions_are_exact_and_columns_count_characters() {
    let sheet = "metre 6/8\n\nS | F♯5 - -.G♯ - - - |\nB | B3 - -.C♯4 - - - |\n";
    let folder = Folder::with(&[("a.voices", sheet)]);
    let ran = folder.check(&["--report", "json", "a.voices"]);
    let finding = &ran.findings()[0];
    assert_eq!(finding["rule"], "parallel-fifths");
    assert_eq!(
        (&finding["bar"], &finding["beat"], &finding["onset"]),
        (&json!("1"), &json!("7/2"), &json!("5/16"))
    );
    assert_eq!(finding["start"], json!({"line": 3, "column": 13}));
    assert_eq!(finding["end"], json!({"line": 3, "column": 15}));
}

#[test]
fn a_finding_before_the_music_has_no_place_in_it() {
    let folder = Folder::with(&[("a.voices", "metre 4/5\n\nS | C4 |\n")]);
    let ran = folder.check(&["--report", "json", "a.voices"]);
    let findings = ran.findings();
    assert_eq!(findings.len(), 1, "{}", ran.out);
    let finding = &findings[0];
    assert_eq!(finding["rule"], "reading");
    assert_eq!(
        [&finding["bar"], &finding["beat"], &finding["onset"]],
        [&json!(null); 3]
    );
    assert_eq!(finding["start"]["line"], 1);
}

#[test]
fn findings_stand_in_the_order_of_the_score() {
    let sheet = "metre 2/4\n\nS | D5 E | F E |\nA | G4 A | H4 B4 |\nB | G3 A | F E |\n";
    let folder = Folder::with(&[("b.voices", sheet), ("a.voices", FLAWED)]);
    let ran = folder.check(&["--report", "json", "."]);
    let value = |text: &serde_json::Value| -> f64 {
        let text = text.as_str().unwrap();
        let (over, under) = text.split_once('/').unwrap_or((text, "1"));
        over.parse::<f64>().unwrap() / under.parse::<f64>().unwrap()
    };
    let findings = ran.findings();
    let keys: Vec<(String, f64, String)> = findings
        .iter()
        .map(|f| {
            (
                f["path"].to_string(),
                value(&f["onset"]),
                f["rule"].to_string(),
            )
        })
        .collect();
    assert!(keys.len() > 5, "{}", ran.out);
    assert!(keys.is_sorted(), "{keys:?}");
    assert!(keys.iter().any(|(_, _, rule)| rule.contains("reading")));
}
