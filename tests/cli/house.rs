//! House styles: where they are found, what they do, and what is said of broken ones.

use serde_json::{Value, json};

use crate::support::{FLAWED, Folder, Ran};

/// Takes parallel fifths as a remark, with a reason.
fn house(name: &str, severity: &str) -> String {
    format!(
        "name = \"{name}\"\n\n[[rule]]\nrule = \"parallel-fifths\"\nseverity = \"{severity}\"\n\
         reason = \"the horns of the {name}\"\n"
    )
}

/// The severity of the parallel fifths in each sheet.
fn fifths(ran: &Ran) -> Vec<(String, String)> {
    let findings = ran.findings();
    let text = |finding: &Value, key: &str| finding[key].as_str().unwrap().to_owned();
    findings
        .iter()
        .filter(|finding| finding["rule"] == "parallel-fifths")
        .map(|finding| (text(finding, "path"), text(finding, "severity")))
        .collect()
}

fn owned(pairs: &[(&str, &str)]) -> Vec<(String, String)> {
    let owned = |(a, b): &(&str, &str)| ((*a).to_owned(), (*b).to_owned());
    pairs.iter().map(owned).collect()
}

#[test]
fn the_nearest_house_style_upwards_is_in_force() {
    let folder = Folder::with(&[
        ("a.voices", FLAWED),
        ("quay/partwright.toml", &house("quayside", "remark")),
        ("quay/b.voices", FLAWED),
        ("quay/far/er/c.voices", FLAWED),
        ("quay/motet.voices", &format!("style motet\n{FLAWED}")),
        ("quay/weir/partwright.toml", &house("weir", "weakness")),
        ("quay/weir/d.voices", FLAWED),
    ]);
    let ran = folder.check(&["--report", "json", "."]);
    let expected = [
        ("a.voices", "fault"),
        ("quay/b.voices", "remark"),
        ("quay/far/er/c.voices", "remark"),
        ("quay/motet.voices", "fault"),
        ("quay/weir/d.voices", "weakness"),
    ];
    assert_eq!(fifths(&ran), owned(&expected));
    // From inside the folder, and by another way to it, it is the same.
    let inside = folder
        .program(&["check", "--report", "json", "b.voices", "../a.voices"])
        .current_dir(folder.path("quay"))
        .output()
        .unwrap();
    let expected = [("b.voices", "remark"), ("../a.voices", "fault")];
    assert_eq!(fifths(&Ran::of(inside)), owned(&expected));
}

#[test]
fn a_house_style_goes_by_its_name() {
    let folder = Folder::with(&[
        ("quay/partwright.toml", &house("quayside", "remark")),
        ("quay/a.voices", &format!("style quayside\n{FLAWED}")),
        ("quay/b.voices", &format!("style motet\n{FLAWED}")),
        ("c.voices", FLAWED),
    ]);
    let severities = |arguments: &[&str]| {
        let all = [&["--report", "json", "quay"], arguments].concat();
        let found = fifths(&folder.check(&all));
        found.into_iter().map(|(_, severity)| severity).collect()
    };
    let of = |words: &[&str]| words.iter().map(|w| (*w).to_owned()).collect::<Vec<_>>();
    let none: Vec<String> = severities(&[]);
    assert_eq!(none, of(&["remark", "fault"]));
    let by_name: Vec<String> = severities(&["--style", "quayside"]);
    assert_eq!(by_name, of(&["remark", "remark"]));
    let ours: Vec<String> = severities(&["--style", "free"]);
    assert_eq!(ours, of(&["fault", "fault"]));
    // A name that stands above some sheets only.
    let some = folder.check(&["--style", "quayside", "."]);
    let words = ["c.voices: no style is called quayside here", "2 remarks"];
    assert_eq!(some.said(&words), 2);
    let wrong = folder.check(&["--style", "quaysid", "."]);
    assert_eq!(
        wrong.said(&["no style is called quaysid; did you mean quayside?"]),
        2
    );
    assert_eq!(wrong.out, "");
    let nowhere = folder.check(&["--style", "quayside", "c.voices"]);
    assert_eq!(
        nowhere.said(&["no style is called quayside; there is free, chorale"]),
        2
    );
}

#[test]
fn standard_input_has_the_house_style_of_its_name() {
    let folder = Folder::with(&[
        ("partwright.toml", &house("quayside", "weakness")),
        ("weir/partwright.toml", &house("weir", "remark")),
    ]);
    let severity = |arguments: &[&str]| {
        let all = [&["check", "--report", "json", "-"], arguments].concat();
        let found = fifths(&folder.feed(&all, FLAWED.as_bytes()));
        found.into_iter().map(|(_, severity)| severity).next()
    };
    assert_eq!(severity(&[]).as_deref(), Some("weakness"));
    assert_eq!(
        severity(&["--as", "weir/a.voices"]).as_deref(),
        Some("remark")
    );
    // The folder it is named in need not be there.
    assert_eq!(
        severity(&["--as", "weir/new/a.voices"]).as_deref(),
        Some("remark")
    );
    assert_eq!(
        severity(&["--as", "new/a.voices"]).as_deref(),
        Some("weakness")
    );
}

#[test]
fn a_broken_house_style_is_told_once_and_spoils_what_would_take_its_style() {
    let folder = Folder::with(&[
        ("quay/partwright.toml", "# ours\nbase = \"choral\"\n"),
        ("quay/a.voices", FLAWED),
        ("quay/b.voices", FLAWED),
        ("quay/c.voices", &format!("style motet\n{FLAWED}")),
        ("d.voices", FLAWED),
    ]);
    let ran = folder.check(&["--report", "json", "."]);
    let words = [
        "quay/partwright.toml:2:8: No style is called choral. Did you mean chorale?",
        "2 │ base = \"choral\"",
        "not checked, since their style would come from it: quay/a.voices and quay/b.voices",
        "4 faults in 2 sheets.",
    ];
    assert_eq!(ran.said(&words), 2);
    assert_eq!(ran.err.matches("Did you mean").count(), 1, "{}", ran.err);
    let expected = [("d.voices", "fault"), ("quay/c.voices", "fault")];
    assert_eq!(fifths(&ran), owned(&expected));
    // Asked for by name, no style needs the house; and a house's name is not known.
    let ours = folder.check(&["--style", "free", "quay"]);
    assert_eq!(
        ours.said(&["Did you mean chorale?", "6 faults in 3 sheets."]),
        2
    );
    let its_own = folder.check(&["--style", "quayside", "quay"]);
    assert_eq!(its_own.said(&["Did you mean chorale?", "not checked"]), 2);
    assert_eq!(its_own.out, "");
    let mend = folder.run(&["mend", "quay"]);
    assert_eq!(mend.said(&["Did you mean chorale?", "not mended"]), 2);
}

#[test]
fn what_is_wrong_with_a_house_style_is_said_with_its_file_and_what_is_allowed() {
    let rule = "[[rule]]\nrule = \"overlap\"\n";
    #[allow(clippy::type_complexity)]
    let wrong: &[(&[(&str, &str)], &[&str])] = &[
        (
            &[("partwright.toml", "bass = \"chorale\"\n")],
            &["partwright.toml:1:1", "base"],
        ),
        (
            &[(
                "partwright.toml",
                &format!("{rule}severity = \"warn\"\nreason = \"x\"\n"),
            )],
            &[
                "partwright.toml:3:12",
                "weakness",
                "3 │ severity = \"warn\"",
            ],
        ),
        (
            &[("partwright.toml", &format!("{rule}severity = \"off\"\n"))],
            &["reason"],
        ),
        (
            &[(
                "partwright.toml",
                "[[rule]]\nrule = \"paralel-fifths\"\nseverity = \"off\"\nreason = \"x\"\n",
            )],
            &["partwright.toml:2:8", "Did you mean parallel-fifths?"],
        ),
        (
            &[
                ("partwright.toml", "include = [\"b.toml\"]\n"),
                ("b.toml", "include = [\"partwright.toml\"]\n"),
            ],
            &["includes itself, by way of partwright.toml, b.toml."],
        ),
        (
            &[(
                "partwright.toml",
                "include = [\"../common.toml\", \"lost.toml\"]\n",
            )],
            &[
                "common.toml: It cannot be read: there is no such file.",
                "(partwright.toml includes it.)",
            ],
        ),
        (
            &[("partwright.toml/x", "")],
            &["partwright.toml: It cannot be read: it is no file"],
        ),
        (
            &[("partwright.toml", "name = \"\u{0}\"\n")],
            &["partwright.toml:1:"],
        ),
    ];
    for (files, words) in wrong {
        let folder = Folder::with(files);
        folder.write("a.voices", FLAWED.as_bytes());
        let ran = folder.check(&["a.voices"]);
        assert_eq!(ran.said(words), 2, "{files:?}");
        assert_eq!(ran.out, "", "{files:?}");
        assert!(!ran.err.contains('\0'), "{files:?}");
    }
    let folder = Folder::with(&[("a.voices", FLAWED)]);
    folder.write("partwright.toml", b"name = \"caf\xE9\"\n");
    assert_eq!(folder.check(&["a.voices"]).said(&["no text in UTF-8"]), 2);
    folder.write(
        "partwright.toml",
        "# the harbour\n".repeat(100_000).as_bytes(),
    );
    assert_eq!(folder.check(&["a.voices"]).said(&["larger than 1 MiB"]), 2);
    #[cfg(unix)]
    {
        std::fs::remove_file(folder.path("partwright.toml")).unwrap();
        std::os::unix::fs::symlink("nowhere", folder.path("partwright.toml")).unwrap();
        assert_eq!(
            folder.check(&["a.voices"]).said(&["there is no such file"]),
            2
        );
    }
}

#[test]
fn a_house_licenses_files_by_their_paths() {
    let licence = "[[licence]]\npath = \"old/**/*.voices\"\nrule = [\"parallel-fifths\"]\n\
                   bars = \"1\"\nreason = \"as the old books have it\"\n";
    let folder = Folder::with(&[
        ("partwright.toml", licence),
        ("old/a.voices", FLAWED),
        ("new/a.voices", FLAWED),
    ]);
    let ran = folder.check(&["--report", "json", "--licensed", "."]);
    assert_eq!(ran.said(&["3 faults in 2 sheets; 1 licensed."]), 1);
    let licences: Vec<(Value, Value)> = ran
        .findings()
        .iter()
        .filter(|finding| finding["rule"] == "parallel-fifths")
        .map(|finding| (finding["path"].clone(), finding["licence"].clone()))
        .collect();
    let granted = json!({"mark": null, "reason": "as the old books have it"});
    let expected = [
        (json!("new/a.voices"), json!(null)),
        (json!("old/a.voices"), granted),
    ];
    assert_eq!(licences, expected);
    // A call from elsewhere finds the same.
    let inside = folder
        .program(&["check", "a.voices"])
        .current_dir(folder.path("old"))
        .output()
        .unwrap();
    assert!(Ran::of(inside).err.contains("1 licensed"));
}

#[test]
fn the_catalogue_shows_what_the_house_changes_and_why() {
    let file = "name = \"quayside\"\nbase = \"chorale\"\ninclude = [\"common.toml\"]\n\n\
        [[rule]]\nrule = \"crossing\"\nseverity = \"off\"\nreason = \"the choir stands in a ring\"\n\n\
        [[number]]\nrule = \"spacing\"\nname = \"bass\"\nvalue = 24\nreason = \"the organ doubles it\"\n";
    let common = "[[rule]]\nrule = \"crossing\"\nseverity = \"fault\"\nreason = \"as a rule\"\n";
    let folder = Folder::with(&[("partwright.toml", file), ("common.toml", common)]);
    let rules = |arguments: &[&str]| {
        let ran = folder.run(&[&["rules"], arguments].concat());
        assert_eq!((ran.status, ran.err.as_str()), (0, ""));
        assert!(ran.out.lines().all(|line| line.chars().count() <= 80));
        ran.out
    };
    let table = rules(&[]);
    for words in [
        "House style quayside (partwright.toml), from chorale",
        "  crossing: off\n      the choir stands in a ring\n",
        "  spacing: bass 24\n      the organ doubles it\n",
    ] {
        assert!(table.contains(words), "{words}: {table}");
    }
    assert!(!table.contains("as a rule"), "what is overruled: {table}");
    assert!(!rules(&["motion"]).contains("spacing: bass"));
    assert!(rules(&["line"]).contains("Nothing here differs from chorale."));
    // In force: what is off is not listed, and the page says so.
    let in_force = rules(&["--style", "quayside"]);
    assert!(in_force.starts_with("In the house style quayside (partwright.toml), from chorale."));
    assert!(!in_force.contains("\n  crossing  "), "{in_force}");
    assert!(in_force.contains("\n  overlap  "), "{in_force}");
    let page = rules(&["crossing"]);
    assert!(page.contains("fault in chorale") && page.contains("the choir stands in a ring"));
    let page = rules(&["crossing", "--style", "quayside"]);
    assert!(
        page.contains("allowed in quayside") && !page.contains("in chorale:"),
        "{page}"
    );
    // A rule's page tells what is in force, case by case and number by number, and what it was.
    let said = |page: &str| page.split_whitespace().collect::<Vec<_>>().join(" ");
    let page = said(&rules(&["crossing"]));
    for words in [
        "[bass]: - allowed in quayside: chorale says fault - ",
        "- fault in chorale",
    ] {
        assert!(page.contains(words), "{words}: {page}");
    }
    for arguments in [&["spacing"][..], &["spacing", "--style", "quayside"]] {
        let page = said(&rules(arguments));
        for words in [
            "- fault in quayside",
            "Numbers - neighbours 8: the widest interval",
            "- bass 24 in quayside, 15 without it: the widest interval",
        ] {
            assert!(page.contains(words), "{words}: {page}");
        }
        assert!(
            !page.contains("chorale says"),
            "severities as they were: {page}"
        );
    }
    assert!(said(&rules(&["spacing", "--style", "chorale"])).contains("- bass 15: "));
    // One of ours is as it is everywhere.
    assert!(!rules(&["--style", "chorale"]).contains("quayside"));
    let wrong = folder.run(&["rules", "--style", "quaysid"]);
    assert_eq!(wrong.said(&["did you mean quayside?"]), 2);
    folder.write("partwright.toml", b"base = 3\n");
    let broken = folder.run(&["rules", "crossing"]);
    assert_eq!(broken.said(&["partwright.toml:1:8"]), 2);
    assert!(
        broken.out.starts_with("crossing"),
        "the catalogue is shown all the same"
    );
}
