//! Licensed findings: lawful, counted apart, shown when asked for.

use serde_json::json;

use crate::support::Folder;

const LICENSED: &str = "\
metre 2/4
licence parallel-octaves: the organ doubles the basses

S | D5 E*a | F E |
B | G3 A   | F E |
*a licence parallel-fifths: the drovers' horns, bar 12 in the brass too
";

#[test]
fn licensed_findings_are_no_findings() {
    let folder = Folder::with(&[("a.voices", LICENSED)]);
    for level in ["fault", "weakness", "remark"] {
        let ran = folder.check(&["--fail-on", level, "a.voices"]);
        assert_eq!(ran.said(&["Nothing found in 1 sheet; 2 licensed."]), 0);
        assert_eq!(ran.out, "");
    }
    let json = folder.check(&["--report", "json", "a.voices"]);
    assert_eq!((json.status, json.out.as_str()), (0, ""));
    // Filters choose among them as among all.
    let first = folder.check(&["--bars", "1", "a.voices"]);
    assert_eq!(first.said(&["; 1 licensed."]), 0);
}

#[test]
fn they_are_shown_with_their_licence_and_still_do_not_count() {
    let folder = Folder::with(&[("a.voices", LICENSED)]);
    let plain = folder.check(&["--licensed", "--fail-on", "remark", "a.voices"]);
    assert_eq!(plain.said(&["Nothing found in 1 sheet; 2 licensed."]), 0);
    for words in [
        "licensed fault: parallel-fifths · bar 1, beat 2 · S and B\n",
        "  Licence *a: the drovers' horns, bar 12 in the brass too\n",
        "licensed fault: parallel-octaves · bar 2, beat 2 · S and B\n",
        "  Licence: the organ doubles the basses\n",
    ] {
        assert!(plain.out.contains(words), "{words}: {}", plain.out);
    }
    let json = folder.check(&["--licensed", "--report", "json", "a.voices"]);
    let licences: Vec<_> = json
        .findings()
        .iter()
        .map(|f| f["licence"].clone())
        .collect();
    let expected = [
        json!({"mark": "a", "reason": "the drovers' horns, bar 12 in the brass too"}),
        json!({"mark": null, "reason": "the organ doubles the basses"}),
    ];
    assert_eq!(licences, expected);
}

#[test]
fn open_findings_count_beside_licensed_ones() {
    let without_mark = LICENSED.replace("E*a", "E").replace("*a licence", "// ");
    let folder = Folder::with(&[("a.voices", &without_mark)]);
    let ran = folder.check(&["a.voices"]);
    assert_eq!(ran.said(&["1 fault in 1 sheet; 1 licensed."]), 1);
    assert!(!ran.out.contains("parallel-octaves"), "{}", ran.out);
    let shown = folder.check(&["--licensed", "--report", "json", "a.voices"]);
    let open: Vec<bool> = shown
        .findings()
        .iter()
        .map(|f| f["licence"].is_null())
        .collect();
    assert_eq!(open, [true, false]);
}
