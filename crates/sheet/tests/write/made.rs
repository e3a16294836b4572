//! Scores made at random: as a score should be, and as none should.

use partwright_score::{
    Bar, Change, Compass, KINDS, Key, Metre, Mode, Note, Pitch, Score, Sound, Time, Voice, ZERO,
};
use partwright_sheet::{Heading, Sung, Tempo};
use proptest::collection::vec;
use proptest::prelude::*;
use proptest::sample::select;

/// A score with what stands around it.
#[derive(Clone, Debug)]
pub(crate) struct Made {
    pub(crate) score: Score,
    pub(crate) heading: Heading,
}

fn metre(count: u16, unit: u16) -> Metre {
    Metre::new(count, unit, None, &[]).unwrap()
}

fn metres() -> impl Strategy<Value = Metre> {
    let by = |count, unit, n, d| Metre::new(count, unit, Some(Time::new(n, d)), &[]).unwrap();
    select(vec![
        metre(4, 4),
        metre(3, 4),
        metre(2, 4),
        metre(5, 4),
        metre(7, 8),
        metre(6, 8),
        metre(9, 8),
        metre(12, 8),
        metre(2, 2),
        metre(3, 2),
        metre(2, 1),
        metre(1, 1),
        metre(1, 4),
        metre(7, 16),
        by(6, 8, 3, 8),
        by(12, 8, 3, 8),
        by(4, 4, 1, 8),
        by(2, 1, 1, 2),
        Metre::new(5, 8, None, &[3, 2]).unwrap(),
        Metre::new(7, 8, None, &[2, 2, 3]).unwrap(),
        Metre::free(),
    ])
}

/// A bar to be made.
#[derive(Clone, Copy, Debug)]
enum Kind {
    Full,
    /// So many semiquavers long, whatever the metre says.
    Odd(i64),
    /// Split after so many semiquavers, at the end of a section or not.
    Split(i64, bool),
}

#[derive(Clone, Debug)]
struct Section {
    metre: Metre,
    /// A pickup of so many semiquavers.
    pickup: Option<i64>,
    bars: Vec<Kind>,
    /// It begins with a key, a tempo.
    key: Option<Key>,
    tempo: Option<Tempo>,
    closes: bool,
}

fn kind() -> impl Strategy<Value = Kind> {
    prop_oneof![
        6 => Just(Kind::Full),
        2 => (1_i64..40).prop_map(Kind::Odd),
        1 => (1_i64..16, any::<bool>()).prop_map(|(at, closes)| Kind::Split(at, closes)),
    ]
}

fn key() -> impl Strategy<Value = Key> {
    let signature = proptest::option::of((1_i8..=7, any::<bool>()));
    let of = (0_u8..7, -1_i8..=1, select(Mode::ALL.to_vec()), signature).prop_map(
        |(letter, sign, mode, signature)| Key::Of {
            tonic: Pitch::new(letter, sign, 4),
            mode,
            signature: signature.map(|(n, flat)| if flat { -n } else { n }),
        },
    );
    prop_oneof![5 => of, 1 => Just(Key::None)]
}

fn tempo() -> impl Strategy<Value = Tempo> {
    let unit = select(vec![(1, 4), (3, 8), (1, 2), (1, 1)]);
    (unit, 1_u16..=999).prop_map(|((n, d), speed)| Tempo {
        unit: Some(Time::new(n, d)),
        speed,
    })
}

fn section() -> impl Strategy<Value = Section> {
    (
        metres(),
        proptest::option::weighted(0.3, 1_i64..16),
        vec(kind(), 1..5),
        proptest::option::weighted(0.3, key()),
        proptest::option::weighted(0.2, tempo()),
        any::<bool>(),
    )
        .prop_map(|(metre, pickup, bars, key, tempo, closes)| Section {
            metre,
            pickup,
            bars,
            key,
            tempo,
            closes,
        })
}

fn semiquavers(n: i64) -> Time {
    Time::new(n, 16)
}

/// The bars of the sections; what is said of keys and tempos goes along.
fn bars(score: &mut Score, heading: &mut Heading, sections: &[Section]) {
    let mut at = ZERO;
    let mut number = 0;
    let mut begins = true;
    for section in sections {
        let from = at;
        let metre = u32::try_from(score.metres.len()).unwrap();
        score.metres.push(section.metre.clone());
        let full = section.metre.bar_length();
        let mut add = |number: u32, length: Time, lead: Time, section_end: bool| {
            score.bars.push(Bar {
                number,
                onset: at,
                length,
                lead,
                metre,
                section_end,
            });
            at += length;
        };
        if let (Some(full), Some(pickup)) = (full, section.pickup.map(semiquavers))
            && pickup < full
            && begins
        {
            number += u32::from(from > ZERO);
            add(number, pickup, full - pickup, false);
        }
        for kind in &section.bars {
            number += 1;
            match (*kind, full) {
                (Kind::Split(first, closes), Some(full)) if semiquavers(first) < full => {
                    let first = semiquavers(first);
                    add(number, first, ZERO, closes);
                    add(number, full - first, first, false);
                }
                (Kind::Odd(n), _) => add(number, semiquavers(n), ZERO, false),
                (_, full) => add(number, full.unwrap_or(semiquavers(12)), ZERO, false),
            }
        }
        begins = section.closes;
        if let Some(last) = score.bars.last_mut() {
            last.section_end = section.closes;
        }
        if let Some(value) = section.key {
            score.keys.push(Change { from, value });
        }
        if let Some(value) = section.tempo {
            heading.tempos.push(Change { from, value });
        }
    }
    if let Some(last) = score.bars.last_mut() {
        last.section_end = true;
    }
}

/// A stretch of a voice: a length in semiquavers shared by so many notes.
#[derive(Clone, Debug)]
struct Figure {
    length: i64,
    notes: Vec<(Sound, bool, bool)>,
}

fn pitch() -> impl Strategy<Value = Pitch> {
    let near = (21_i16..36, select(vec![0_i8, 0, 0, 1, -1]));
    let far = (0_i16..70, -2_i8..=2);
    prop_oneof![4 => near, 1 => far].prop_map(|(step, sign)| Pitch { step, sign })
}

fn sound() -> impl Strategy<Value = Sound> {
    prop_oneof![
        12 => pitch().prop_map(Sound::Pitch),
        3 => Just(Sound::Rest),
        1 => Just(Sound::Unwritten),
    ]
}

fn figure() -> impl Strategy<Value = Figure> {
    let length = select(vec![1, 2, 2, 3, 4, 4, 4, 4, 6, 8, 12, 16, 24, 48, 80]);
    let notes = select(vec![1_usize, 1, 1, 1, 1, 1, 2, 3, 5, 7]);
    (length, notes).prop_flat_map(|(length, notes)| {
        let marks = || proptest::bool::weighted(0.1);
        let note = (sound(), marks(), marks());
        vec(note, notes).prop_map(move |notes| Figure { length, notes })
    })
}

/// A voice that goes through its figures until the score ends.
fn sung(figures: &[Figure], end: Time) -> Vec<Note> {
    let mut notes: Vec<Note> = Vec::new();
    let mut at = ZERO;
    for figure in figures.iter().cycle() {
        let count = i64::try_from(figure.notes.len()).unwrap();
        for (sound, fermata, breath) in &figure.notes {
            let length = (semiquavers(figure.length) / count).min(end - at);
            if length <= ZERO {
                return notes;
            }
            let known = !sound.is_unknown();
            let note = Note {
                fermata: *fermata && known,
                breath: *breath && known,
                ..Note::new(at, length, *sound)
            };
            at += length;
            match notes.last_mut() {
                // Silence after silence is one.
                Some(last) if last.sound == *sound && sound.pitch().is_none() => {
                    last.length += note.length;
                    last.fermata |= note.fermata;
                    last.breath |= note.breath;
                }
                _ => notes.push(note),
            }
        }
    }
    notes
}

#[derive(Clone, Debug)]
struct Declared {
    kind: usize,
    figures: Vec<Figure>,
    options: u16,
    range: (Pitch, Pitch),
}

fn declared() -> impl Strategy<Value = Declared> {
    let silent = Just(Vec::new());
    let figures = prop_oneof![9 => vec(figure(), 1..12), 1 => silent];
    (0..KINDS.len(), figures, any::<u16>(), (pitch(), pitch())).prop_map(
        |(kind, figures, options, range)| Declared {
            kind,
            figures,
            options,
            range,
        },
    )
}

fn voice(index: usize, declared: &Declared, end: Time) -> Voice {
    let mut voice = Voice::new(&format!("V{index}"), &KINDS[declared.kind]);
    voice.notes = sung(&declared.figures, end);
    let chosen = |bit: u32| declared.options & (3 << bit) == 3 << bit;
    let (mut low, mut high) = declared.range;
    if low.place().semitone > high.place().semitone {
        (low, high) = (high, low);
    }
    let range = Some(Compass { low, high });
    voice.limit = range.filter(|_| chosen(0));
    voice.easy = range.filter(|_| chosen(1));
    voice.cantus = chosen(2);
    voice.species = chosen(3).then_some(u8::try_from(index % 5 + 1).unwrap());
    voice.clef = chosen(4).then(|| "alto".to_owned());
    voice.written = chosen(5).then(|| "Bb".to_owned());
    voice.sixteen_foot = chosen(6);
    voice.doubles = index.checked_sub(1).filter(|_| chosen(7));
    voice
}

const SYLLABLES: [&str; 8] = ["lamp", "har-", "bour", "the eve-", "a|b", "x~y", "\\", "//"];

/// A syllable for some of the notes of a voice.
fn words(voice: usize, verse: Option<u8>, notes: &[Note]) -> Sung {
    let struck = notes
        .iter()
        .filter(|note| note.sound.pitch().is_some())
        .enumerate();
    let some = struck.filter(|(i, _)| i % 5 != 3 && i / 9 % 2 == 0);
    Sung {
        voice,
        verse,
        syllables: some
            .map(|(i, note)| (note.onset, SYLLABLES[i % SYLLABLES.len()].to_owned()))
            .collect(),
    }
}

/// A score as it should be.
pub(crate) fn made() -> impl Strategy<Value = Made> {
    let title = select(vec![
        None,
        Some("Lamplighters' evensong"),
        Some("| a \\ b  // c"),
    ]);
    (
        vec(section(), 1..4),
        vec(declared(), 1..=12),
        title,
        proptest::option::of(0_u8..3),
    )
        .prop_map(|(sections, voices, title, verses)| {
            let mut score = Score::default();
            let mut heading = Heading {
                title: title.map(str::to_owned),
                ..Heading::default()
            };
            bars(&mut score, &mut heading, &sections);
            let end = score.end();
            for (index, declared) in voices.iter().enumerate() {
                let voice = voice(index, declared, end);
                let known = voice.notes.iter().all(|note| !note.sound.is_unknown());
                for verse in verses.into_iter().filter(|_| known) {
                    let verse = (verse > 0).then_some(verse);
                    heading.words.push(words(index, verse, &voice.notes));
                }
                score.voices.push(voice);
            }
            if score.voices.len() > 3 {
                score.equal.push(vec![1, 2]);
                score.style = Some("species-1".to_owned());
            }
            Made { score, heading }
        })
}

fn any_time() -> impl Strategy<Value = Time> {
    prop_oneof![
        200 => (-4_i64..80, select(vec![1_i64, 2, 3, 4, 5, 7, 16, 31, 64, 100, 960]))
            .prop_map(|(n, d)| Time::new(n, d)),
        1 => (any::<i64>(), 1..=i64::MAX).prop_map(|(n, d)| Time::new_raw(n, d)),
        2 => (-9_i64..9, -2_i64..3).prop_map(|(n, d)| Time::new_raw(n, d)),
    ]
}

/// A score as none should be.
pub(crate) fn wild() -> impl Strategy<Value = Made> {
    let pitch = (any::<i16>(), any::<i8>()).prop_map(|(step, sign)| Pitch { step, sign });
    let pitch = prop_oneof![3 => self::pitch(), 1 => pitch];
    let sound = prop_oneof![
        5 => pitch.prop_map(Sound::Pitch),
        1 => Just(Sound::Rest),
        1 => Just(Sound::Unwritten),
        1 => Just(Sound::Spoilt),
    ];
    let note = (
        any_time(),
        any_time(),
        sound,
        any::<(bool, bool, Option<u8>)>(),
    )
        .prop_map(|(onset, length, sound, (fermata, breath, copies))| Note {
            onset,
            length,
            sound,
            fermata,
            breath,
            copies: copies.filter(|n| *n < 20),
        });
    let name = select(vec![
        "",
        "S",
        "S",
        "Soprano",
        "words",
        "Ж",
        "two\nlines",
        "// x",
        "1",
        "Violin II",
        "a|b",
    ]);
    let voice = (name, vec(note, 0..8), 0_usize..6).prop_map(|(name, notes, doubles)| {
        let mut voice = Voice::new(name, &KINDS[doubles]);
        voice.notes = notes;
        voice.doubles = Some(doubles).filter(|d| *d > 1);
        voice.species = u8::try_from(doubles * 2).ok();
        voice.clef = Some(name.to_owned());
        voice
    });
    let bar = (
        any::<u32>(),
        any_time(),
        any_time(),
        any_time(),
        0_u32..4,
        any::<bool>(),
    );
    let bar = bar.prop_map(|(number, onset, length, lead, metre, section_end)| Bar {
        number: number % 9,
        onset,
        length,
        lead,
        metre,
        section_end,
    });
    let change = (any_time(), key()).prop_map(|(from, value)| Change { from, value });
    let text = select(vec!["", "-", "a b\n", "\\", ":", "/", "//"]);
    let syllables = vec((any_time(), text.prop_map(str::to_owned)), 0..4);
    (
        vec(voice, 0..6),
        vec(bar, 0..8),
        vec(metres(), 0..3),
        vec(change, 0..3),
        vec((0_usize..6, any::<Option<u8>>(), syllables), 0..3),
        any_time(),
    )
        .prop_map(|(voices, mut bars, metres, keys, words, at)| {
            bars.sort_by_key(|bar| i128::from(*bar.onset.numer()));
            let tempo = Tempo {
                unit: Some(at),
                speed: 0,
            };
            let words = words.into_iter().map(|(voice, verse, syllables)| Sung {
                voice,
                verse,
                syllables,
            });
            Made {
                score: Score {
                    voices,
                    bars,
                    metres,
                    keys,
                    equal: vec![vec![0, 0], vec![9, 1, 2], vec![0, 1]],
                    style: Some("a b".to_owned()),
                    ..Score::default()
                },
                heading: Heading {
                    title: Some("\r\n|x // \\".to_owned()),
                    tempos: vec![Change {
                        from: at,
                        value: tempo,
                    }],
                    words: words.collect(),
                    ..Heading::default()
                },
            }
        })
}
