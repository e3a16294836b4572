//! Finding the mends of a finding.

use std::collections::BTreeSet;

use partwright_check::{Analysis, Checked, Finding, Severity, notes_findings};
use partwright_rules::{Finding as Bare, Piece, Strictness};
use partwright_score::{Pitch, Score, Sound, Texture, Time};
use partwright_sheet::Edit;
use partwright_space::Motion;

use crate::candidates::candidates;
use crate::window::Window;

/// The most mends offered for one finding.
pub const MOST: usize = 5;

/// A repair: one note takes another pitch.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Mend {
    /// The voice, by index.
    pub voice: usize,
    /// Its note, by index.
    pub note: usize,
    /// When the note begins.
    pub at: Time,
    /// What stands there.
    pub from: Pitch,
    /// What it becomes.
    pub to: Pitch,
    /// What it does and what motion results: `Move alto to E4: contrary to the bass`.
    pub title: String,
}

/// A note that may be changed, with how dear it is to change it.
struct Movable {
    voice: usize,
    note: usize,
    at: Time,
    pitch: Pitch,
    /// Inner voices first, then the bass, then the top voice; the arrival before the departure.
    rank: (usize, usize),
}

/// The mends of a finding, the best first: the least movement in scale steps (notes outside the
/// scale count as further off), then inner voices before outer ones. Empty where no change of one note helps, for licensed findings, and for
/// findings about the text.
#[must_use]
pub fn mends(checked: &Checked, finding: &Finding) -> Vec<Mend> {
    let (Some(at), Some(bare)) = (finding.at, Target::of(finding)) else {
        return Vec::new();
    };
    if finding.licence.is_some() {
        return Vec::new();
    }
    let licensed = licensed_notes(checked);
    let score = &checked.reading.score;
    let window = Window::around(score, &checked.texture, at, finding.until.unwrap_or(at));
    let strictness = checked.strictness.with_all_rules();
    let texture = Texture::of(&window.score);
    let before = findings(&window.score, &texture, &strictness, &window);
    if !before.iter().any(|f| bare.is(f)) {
        return Vec::new();
    }
    let mut trials: Vec<(i16, usize, Movable, Pitch)> = Vec::new();
    for movable in movables(checked, finding)
        .into_iter()
        .filter(|m| !licensed.contains(&(m.voice, m.note)))
    {
        let Some(voice) = score.voices.get(movable.voice) else {
            continue;
        };
        for (order, (pitch, distance)) in candidates(score, voice, movable.at, movable.pitch)
            .into_iter()
            .enumerate()
        {
            let Movable {
                voice,
                note,
                at,
                pitch: from,
                rank,
            } = movable;
            trials.push((
                distance,
                order,
                Movable {
                    voice,
                    note,
                    at,
                    pitch: from,
                    rank,
                },
                pitch,
            ));
        }
    }
    trials.sort_by_key(|(distance, order, movable, _)| (*distance, movable.rank, *order));
    let mut found = Vec::new();
    for (_, _, movable, pitch) in trials {
        if found.len() == MOST {
            break;
        }
        let Some(changed) = with_note(&window.score, &movable, pitch) else {
            continue;
        };
        let texture = Texture::of(&changed);
        let after = findings(&changed, &texture, &strictness, &window);
        let gone = !after.iter().any(|f| bare.is(f));
        let brings = after
            .iter()
            .any(|f| f.severity >= Severity::Weakness && !before.iter().any(|b| same(b, f)));
        if gone && !brings {
            let title = title(checked, finding, &texture, &movable, pitch);
            let Movable {
                voice,
                note,
                at,
                pitch: from,
                ..
            } = movable;
            found.push(Mend {
                voice,
                note,
                at,
                from,
                to: pitch,
                title,
            });
        }
    }
    found
}

impl Mend {
    /// The text edits that write it.
    #[must_use]
    pub fn edits(&self, checked: &Checked, text: &str) -> Vec<Edit> {
        partwright_sheet::note_edits(&checked.reading, text, self.voice, self.note, self.to)
    }
}

/// The notes (voice and index) that a licence speaks of: they carry its mark, or a licensed
/// finding names them.
fn licensed_notes(checked: &Checked) -> BTreeSet<(usize, usize)> {
    let score = &checked.reading.score;
    let marked = checked
        .reading
        .marks
        .iter()
        .map(|mark| (mark.voice, mark.at));
    let lifted = checked
        .findings
        .iter()
        .filter(|f| f.licence.is_some())
        .flat_map(|f| {
            let here =
                f.at.into_iter()
                    .flat_map(|at| f.voices.iter().map(move |&v| (v, at)));
            here.chain(f.related.iter().map(|r| (r.voice, r.at)))
        });
    marked
        .chain(lifted)
        .filter_map(|(voice, at)| Some((voice, score.note_at(voice, at)?)))
        .collect()
}

/// What makes a finding the same finding in another run.
struct Target<'a> {
    rule: &'a str,
    voices: &'a [usize],
    at: Time,
}

impl<'a> Target<'a> {
    fn of(finding: &'a Finding) -> Option<Target<'a>> {
        Some(Target {
            rule: finding.rule,
            voices: &finding.voices,
            at: finding.at?,
        })
    }

    fn is(&self, other: &Bare) -> bool {
        self.rule == other.rule && self.voices == other.voices && self.at == other.spot.at
    }
}

fn same(a: &Bare, b: &Bare) -> bool {
    a.rule == b.rule && a.voices == b.voices && a.spot == b.spot && a.severity >= b.severity
}

/// The findings inside the window's inner stretch.
fn findings(
    score: &Score,
    texture: &Texture,
    strictness: &Strictness,
    window: &Window,
) -> Vec<Bare> {
    let (first, last) = window.inner;
    let analysis = Analysis::of(score, texture);
    let piece = Piece {
        score,
        texture,
        analysis: &analysis,
    };
    let mut list = notes_findings(&piece, strictness);
    list.retain(|f| (first..=last).contains(&f.spot.at));
    list
}

fn with_note(score: &Score, movable: &Movable, pitch: Pitch) -> Option<Score> {
    let mut changed = score.clone();
    let index = changed.note_at(movable.voice, movable.at)?;
    let note = changed
        .voices
        .get_mut(movable.voice)?
        .notes
        .get_mut(index)?;
    note.sound = Sound::Pitch(pitch);
    Some(changed)
}

/// The notes a finding is about that may be changed: never a cantus, a copied bar, or a voice
/// that goes with another.
fn movables(checked: &Checked, finding: &Finding) -> Vec<Movable> {
    let score = &checked.reading.score;
    let mut moments: Vec<(usize, Time)> = Vec::new();
    if let (Some(at), Some(until)) = (finding.at, finding.until) {
        let within = |v: &usize| {
            let notes = score.voices.get(*v).map_or(&[][..], |voice| &voice.notes);
            let inside = notes.iter().filter(|n| n.end() > at && n.onset < until);
            inside.map(|n| (*v, n.onset)).collect::<Vec<_>>()
        };
        moments.extend(finding.voices.iter().flat_map(within));
    } else if let Some(at) = finding.at {
        moments.extend(finding.voices.iter().map(|&v| (v, at)));
        moments.extend(finding.related.iter().map(|r| (r.voice, r.at)));
    }
    let mut found: Vec<Movable> = Vec::new();
    for (order, (voice, at)) in moments.into_iter().enumerate() {
        let Some(note) = score.note_at(voice, at) else {
            continue;
        };
        let Some(declared) = score.voices.get(voice) else {
            continue;
        };
        let goes_with_another =
            declared.doubles.is_some() || score.voices.iter().any(|v| v.doubles == Some(voice));
        let Some(this) = declared.notes.get(note) else {
            continue;
        };
        let Some(pitch) = this.sound.pitch() else {
            continue;
        };
        let copied = is_copied(score, voice, this.onset, this.end());
        let known = found.iter().any(|m| (m.voice, m.note) == (voice, note));
        if declared.cantus || goes_with_another || copied || known {
            continue;
        }
        let rank = match voice {
            0 => 2,
            v if v + 1 == score.voices.len() => 1,
            _ => 0,
        };
        found.push(Movable {
            voice,
            note,
            at: this.onset,
            pitch,
            rank: (usize::from(order >= finding.voices.len()), rank),
        });
    }
    found
}

/// The note is a copy, or a copy of it sounds in another voice.
fn is_copied(score: &Score, voice: usize, from: Time, until: Time) -> bool {
    let in_stretch = |v: usize| {
        let notes = score.voices.get(v).map_or(&[][..], |voice| &voice.notes);
        let first = notes.partition_point(|n| n.end() <= from);
        notes
            .iter()
            .skip(first)
            .take_while(move |n| n.onset < until)
    };
    in_stretch(voice).any(|n| n.copies.is_some())
        || (0..score.voices.len())
            .filter(|&v| v != voice)
            .any(|v| in_stretch(v).any(|n| n.copies.map(usize::from) == Some(voice)))
}

/// `Move alto to E4: contrary to the bass`.
fn title(
    checked: &Checked,
    finding: &Finding,
    texture: &Texture,
    movable: &Movable,
    pitch: Pitch,
) -> String {
    let score = &checked.reading.score;
    let name = score.spoken_name(movable.voice);
    let earlier = finding
        .at
        .is_some_and(|at| movable.at < at && finding.until.is_none());
    let place = score.place(movable.at);
    // What is found of a passage or a whole line stands at its beginning: the note may be far on.
    let what = if finding.at.is_some_and(|at| movable.at != at) {
        format!(
            "Move {name} to {pitch} in bar {}, beat {}",
            place.bar,
            place.beat_text()
        )
    } else {
        format!("Move {name} to {pitch}")
    };
    let at = if earlier {
        finding.at.unwrap_or(movable.at)
    } else {
        movable.at
    };
    let other = finding.voices.iter().copied().find(|&v| v != movable.voice);
    let other = other.or_else(|| {
        texture
            .at(at)
            .and_then(|k| texture.bass(k))
            .filter(|&v| v != movable.voice)
    });
    let motion = other.and_then(|other| {
        let step = texture.step(texture.at(at)?, movable.voice, other)?;
        let word = match step.motion()? {
            Motion::Contrary => "contrary to",
            Motion::Oblique => "oblique to",
            Motion::Parallel => "parallel with",
            Motion::Similar => "similar to",
            Motion::Still => return None,
        };
        Some(format!("{word} {}", score.spoken_name(other)))
    });
    match motion {
        Some(motion) => format!("{what}: {motion}"),
        None => what,
    }
}
