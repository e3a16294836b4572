//! The dissonances of the treatise, each read as a figure.

use std::collections::BTreeMap;

use partwright_check::Analysis;
use partwright_score::Texture;

use crate::scores::set;

/// J. J. Fux, Gradus ad Parnassum (1725), Book II: nothing in his figures is left unexplained, and
/// his fourth species is suspensions but for three places of the ornaments below, each read.
#[test]
fn every_dissonance_of_the_treatise_is_a_figure() {
    let Some(figures) = set("fux") else { return };
    let mut counts: BTreeMap<&str, usize> = BTreeMap::new();
    let mut fourth_species = Vec::new();
    for piece in &figures {
        let texture = Texture::of(&piece.score);
        let analysis = Analysis::of(&piece.score, &texture);
        for dissonance in analysis.dissonances() {
            let place = piece.score.place(dissonance.at);
            let Some(reading) = dissonance.reading else {
                panic!("{} bar {}: no figure", piece.id, place.bar);
            };
            let name = reading.figure.name();
            *counts.entry(name).or_default() += 1;
            if piece.about["species"] == "4" && name != "suspension" {
                fourth_species.push((piece.id.clone(), place.bar, name));
            }
        }
    }
    let fourth_species: Vec<_> = fourth_species
        .iter()
        .map(|(id, bar, name)| (id.as_str(), *bar, *name))
        .collect();
    assert_eq!(
        fourth_species,
        [
            // A fourth over a held bass, tied into a suspension.
            ("fux-141", 3, "consonant fourth"),
            // The leading note of the close under a fifth that closes with it.
            ("fux-144", 10, "diminished fifth that closes"),
            ("fux-151", 11, "diminished fifth that closes"),
        ]
    );
    let total: usize = counts.values().sum();
    println!("outside: {total} dissonances of the treatise are figures");
    println!("{counts:?}");
}
