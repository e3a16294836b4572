//! Running the rules over a score.

use partwright_rules::{Chord, Discord, Finding, Found, Line, Looks, Piece, Strictness, catalogue};

/// The findings of all the rules that take part, in terms of voices and moments, in no order.
#[must_use]
pub fn notes_findings(piece: &Piece<'_>, strictness: &Strictness) -> Vec<Finding> {
    let piece = *piece;
    let score = piece.score;
    let mut list = Vec::new();
    let (mut pairs, mut sonorities, mut lines) = (Vec::new(), Vec::new(), Vec::new());
    for entry in catalogue() {
        if !strictness.takes(&entry.id, entry.family) || !strictness.minds(entry, score) {
            continue;
        }
        match entry.rule.looks {
            Looks::Pairs(check) => pairs.push((entry, check)),
            Looks::Sonorities(check) => sonorities.push((entry, check)),
            Looks::Lines(check) => lines.push((entry, check)),
            Looks::Piece(check) => {
                check(&piece, &mut Found::new(entry, strictness, score, &mut list))
            }
            Looks::Dissonances(check) => {
                let mut found = Found::new(entry, strictness, score, &mut list);
                for dissonance in piece.analysis.dissonances() {
                    check(&Discord { piece, dissonance }, &mut found);
                }
            }
            Looks::Chords(check) => {
                let mut found = Found::new(entry, strictness, score, &mut list);
                for chord in piece.chords().filter(Chord::is_sure) {
                    check(&chord, &mut found);
                }
            }
            Looks::Text => {}
        }
    }
    for voice in 0..score.voices.len() {
        let moves = piece.line_moves(voice);
        let line = Line {
            piece,
            voice,
            moves: &moves,
        };
        for &(entry, check) in &lines {
            check(&line, &mut Found::new(entry, strictness, score, &mut list));
        }
    }
    // One sweep for all the rules that look at single steps, so that a step is fetched once.
    for sounding in piece.soundings() {
        for &(entry, check) in &sonorities {
            check(
                &sounding,
                &mut Found::new(entry, strictness, score, &mut list),
            );
        }
        for step in sounding.moves(strictness.across_phrases) {
            for &(entry, check) in &pairs {
                check(&step, &mut Found::new(entry, strictness, score, &mut list));
            }
        }
    }
    list
}
