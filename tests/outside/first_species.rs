//! The first-species figures of the treatise in two parts, under the style `species-1`.

use partwright_check::{Wishes, check_score};
use partwright_rules::Style;

use crate::scores::set;

/// What remains, by figure, bar, voices and rule, with the reason found in the bar.
const REMAIN: &[(&str, u32, &str, &str)] = &[];

#[test]
fn first_species_in_two_parts_is_clean() {
    let Some(pieces) = set("fux") else { return };
    let figures: Vec<_> =
        pieces.iter().filter(|p| p.about["species"] == "1" && p.score.voices.len() == 2).collect();
    assert!(figures.len() >= 6);
    let wishes = Wishes { style: Some(Style::Species1), ..Wishes::default() };
    let mut remain = Vec::new();
    for piece in &figures {
        for finding in check_score(&piece.score, &wishes) {
            let bar = finding.place.unwrap().bar;
            remain.push((piece.id.clone(), bar, finding.rule, finding.severity, finding.message));
        }
    }
    let unlisted: Vec<_> =
        remain.iter().filter(|r| !REMAIN.iter().any(|k| (k.0, k.1, k.2) == (r.0.as_str(), r.1, r.2))).collect();
    assert!(unlisted.is_empty(), "{unlisted:#?}");
    for known in REMAIN {
        assert!(
            remain.iter().any(|r| (known.0, known.1, known.2) == (r.0.as_str(), r.1, r.2)),
            "{known:?} no longer occurs"
        );
    }
    println!("outside: {} first-species figures in two parts", figures.len());
}
