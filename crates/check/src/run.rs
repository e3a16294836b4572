//! Running the rules over a score.

use std::ops::Range;

use partwright_rules::{Chord, Discord, Finding, Found, Line, Looks, Piece, Strictness, catalogue};

use crate::kept::Kept;

/// The findings of all the rules that take part, in terms of voices and moments, in no order.
#[must_use]
pub fn notes_findings(piece: &Piece<'_>, strictness: &Strictness) -> Vec<Finding> {
    let mut list = Vec::new();
    lines_and_piece(piece, strictness, &mut list);
    let all = 0..piece.texture.sonorities().len();
    Local::of(piece, strictness).judge(all, &mut list);
    list
}

/// The same, and what can be kept of it for the next time; what an earlier check kept is taken
/// over where the music around it is the same.
pub(crate) fn findings_again(
    piece: &Piece<'_>,
    strictness: &Strictness,
    earlier: Option<&Kept>,
) -> (Vec<Finding>, Kept) {
    let local = Local::of(piece, strictness);
    let judge = |range, list: &mut Vec<Finding>| local.judge(range, list);
    let kept = Kept::of(piece, strictness, earlier, &judge);
    let mut list: Vec<Finding> = kept.findings().cloned().collect();
    lines_and_piece(piece, strictness, &mut list);
    (list, kept)
}

/// What rules say of whole lines and of the piece.
fn lines_and_piece(piece: &Piece<'_>, strictness: &Strictness, list: &mut Vec<Finding>) {
    let (piece, score) = (*piece, piece.score);
    let mut lines = Vec::new();
    for entry in catalogue() {
        if !strictness.takes(&entry.id, entry.family) || !strictness.minds(entry, score) {
            continue;
        }
        match entry.rule.looks {
            Looks::Lines(check) => lines.push((entry, check)),
            Looks::Piece(check) => check(&piece, &mut Found::new(entry, strictness, score, list)),
            _ => {}
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
            check(&line, &mut Found::new(entry, strictness, score, list));
        }
    }
}

/// The rules that look at one moment and what is around it.
struct Local<'a> {
    piece: Piece<'a>,
    strictness: &'a Strictness,
    rules: Vec<(&'static partwright_rules::Entry, Looks)>,
}

impl<'a> Local<'a> {
    fn of(piece: &Piece<'a>, strictness: &'a Strictness) -> Local<'a> {
        let takes = |entry: &&partwright_rules::Entry| {
            strictness.takes(&entry.id, entry.family) && strictness.minds(entry, piece.score)
        };
        let rules = catalogue().iter().filter(takes);
        Local {
            piece: *piece,
            strictness,
            rules: rules.map(|entry| (entry, entry.rule.looks)).collect(),
        }
    }

    /// What they say of what begins in a range of sonorities.
    fn judge(&self, range: Range<usize>, list: &mut Vec<Finding>) {
        let (piece, score) = (self.piece, self.piece.score);
        for &(entry, looks) in &self.rules {
            let mut found = Found::new(entry, self.strictness, score, list);
            match looks {
                Looks::Dissonances(check) => {
                    for dissonance in piece.analysis.dissonances_within(range.clone()) {
                        check(&Discord { piece, dissonance }, &mut found);
                    }
                }
                Looks::Chords(check) => {
                    for chord in piece.chords_within(range.clone()).filter(Chord::is_sure) {
                        check(&chord, &mut found);
                    }
                }
                _ => {}
            }
        }
        // One sweep for all the rules that look at single steps, so that a step is fetched once.
        for sounding in range.map(|k| piece.sounding(k)) {
            for &(entry, looks) in &self.rules {
                if let Looks::Sonorities(check) = looks {
                    check(
                        &sounding,
                        &mut Found::new(entry, self.strictness, score, list),
                    );
                }
            }
            for step in sounding.moves(self.strictness.across_phrases) {
                for &(entry, looks) in &self.rules {
                    if let Looks::Pairs(check) = looks {
                        check(&step, &mut Found::new(entry, self.strictness, score, list));
                    }
                }
            }
        }
    }
}
