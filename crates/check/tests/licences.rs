//! A licence lifts exactly what it names: no finding more, none less, and it changes no other.

#![allow(clippy::unwrap_used, clippy::panic)]

use partwright_check::{Checked, Finding, Wishes};
use partwright_rules::{catalogue, family_of};
use partwright_score::Time;
use proptest::prelude::*;
use proptest::sample::select;

const STYLES: [&str; 5] = ["free", "chorale", "motet", "species-1", "species-3"];
const LABELS: [&str; 4] = ["S", "A", "T", "B"];
const CELLS: [&str; 10] = ["C", "D", "E", "F", "G", "A", "B", "F#", "Bb", "-"];

#[derive(Clone, Debug)]
struct Draft {
    style: &'static str,
    rows: Vec<Vec<&'static str>>,
}

impl Draft {
    /// The sheet, with a mark on one cell and a last line.
    fn text(&self, mark: Option<(usize, usize)>, last: &str) -> String {
        let mut text = format!("style {}\nmetre 4/4\n\n", self.style);
        for (v, row) in self.rows.iter().enumerate() {
            // Octaves in full, so that none is in doubt.
            let octave = ["5", "4", "4", "3"][v];
            let cells = row.iter().enumerate().map(|(i, cell)| {
                let star = if mark == Some((v, i)) { "*a" } else { "" };
                match *cell {
                    "-" if i > 0 => format!("-{star}"),
                    "-" => format!("G{octave}{star}"),
                    cell => format!("{cell}{octave}{star}"),
                }
            });
            let cells: Vec<String> = cells.collect();
            let bars: Vec<String> = cells.chunks(4).map(|bar| bar.join(" ")).collect();
            text += &format!("{} | {} ||\n", LABELS[v], bars.join(" | "));
        }
        text + "\n" + last
    }

    fn findings(&self, mark: Option<(usize, usize)>, last: &str) -> Vec<Finding> {
        Checked::text(&self.text(mark, last), &Wishes::default()).findings
    }
}

fn drafts() -> impl Strategy<Value = Draft> {
    let row = proptest::collection::vec(select(&CELLS[..]), 12);
    (select(&STYLES[..]), proptest::collection::vec(row, 2..5))
        .prop_map(|(style, rows)| Draft { style, rows })
}

/// A rule or a family.
fn names() -> impl Strategy<Value = &'static str> {
    let ids = catalogue().iter().map(|e| e.id.as_str());
    let ids: Vec<&'static str> = ids.filter(|id| *id != "reading").collect();
    prop_oneof![
        select(ids),
        select(vec!["line", "motion", "sonority", "dissonance", "range"])
    ]
}

fn is_named(finding: &Finding, names: &[&str]) -> bool {
    let family = family_of(finding.rule);
    finding.rule != "reading"
        && names
            .iter()
            .any(|n| *n == finding.rule || Some(*n) == family)
}

/// A finding without its span, which a mark may move, and without its licence.
fn bare(finding: &Finding) -> (&'static str, Option<Time>, Vec<usize>, String) {
    let Finding {
        rule,
        at,
        voices,
        message,
        ..
    } = finding;
    (rule, *at, voices.clone(), message.clone())
}

/// Both sheets hold the same findings, and those in `lifted` alone are licensed.
fn lifts(
    plain: &[Finding],
    licensed: &[Finding],
    lifted: impl Fn(&Finding) -> bool,
) -> Result<(), TestCaseError> {
    let licensed: Vec<&Finding> = licensed
        .iter()
        .filter(|f| f.rule != "licence-idle")
        .collect();
    prop_assert_eq!(
        plain.len(),
        licensed.len(),
        "{:#?} {:#?}",
        plain.iter().map(bare).collect::<Vec<_>>(),
        licensed.iter().map(|f| bare(f)).collect::<Vec<_>>()
    );
    for (a, b) in plain.iter().zip(licensed) {
        prop_assert_eq!(bare(a), bare(b));
        prop_assert_eq!(b.licence.is_some(), lifted(a), "{:?}", b);
    }
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(96))]

    #[test]
    fn a_mark_lifts_what_stands_at_its_note(
        draft in drafts(),
        names in proptest::collection::vec(names(), 1..4),
        place in (0_usize..4, 0_usize..12),
    ) {
        let mark = (place.0 % draft.rows.len(), place.1);
        let footnote = format!("*a licence {}: the horns of the harbour\n", names.join(" "));
        let at = Time::new(i64::try_from(mark.1).unwrap(), 4);
        let here = |f: &Finding| {
            let stands = f.at == Some(at);
            let goes_on = matches!((f.at, f.until), (Some(from), Some(to)) if from <= at && at < to);
            f.voices.contains(&mark.0) && (stands || goes_on)
        };
        let plain = draft.findings(None, "");
        let licensed = draft.findings(Some(mark), &footnote);
        lifts(&plain, &licensed, |f| is_named(f, &names) && here(f))?;
    }

    #[test]
    fn a_header_lifts_what_its_voices_do_among_themselves(
        draft in drafts(),
        names in proptest::collection::vec(names(), 1..4),
        voices in proptest::sample::subsequence(vec![0_usize, 1, 2, 3], 0..=4),
    ) {
        let voices: Vec<usize> = voices.into_iter().filter(|v| *v < draft.rows.len()).collect();
        let labels: Vec<&str> = voices.iter().map(|v| LABELS[*v]).collect();
        let header = format!("licence {} {}: the horns of the harbour\n", names.join(" "), labels.join(" "));
        let header = header.replace(" :", ":");
        let plain = draft.findings(None, "");
        let text = draft.text(None, "").replacen("\n\n", &format!("\n{header}\n"), 1);
        let licensed = Checked::text(&text, &Wishes::default()).findings;
        let among = |f: &Finding| {
            voices.is_empty() || (!f.voices.is_empty() && f.voices.iter().all(|v| voices.contains(v)))
        };
        lifts(&plain, &licensed, |f| is_named(f, &names) && among(f))?;
    }
}
