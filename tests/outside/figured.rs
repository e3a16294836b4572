//! The inferred chords beside a composer's own figures.
//!
//! Twenty-four chorales have a figured continuo. Figures tell the chord's letters, and with them
//! its root: accidentals are left to the player too often to be compared.

use std::collections::BTreeMap;

use partwright_check::Analysis;
use partwright_check::harmony::in_one_go;
use partwright_score::{Pitch, Texture, Time, ZERO, show_time};
use roxmltree::{Document, Node, ParsingOptions};

use crate::harmony::read_places;
use crate::scores::{folder, set};

/// The figures at one moment over the continuo's note.
struct Figured {
    at: Time,
    /// The continuo's letter: 0 for C.
    bass: i32,
    /// The note they stand over, by its onset: what follows over the same note resolves.
    note: Time,
    figures: Vec<Figure>,
}

/// A number (none where a sign stands alone, at the third) and its sign.
#[derive(Clone, Debug, PartialEq, Eq)]
struct Figure {
    number: Option<u8>,
    sign: Option<String>,
}

impl Figure {
    fn shown(&self) -> String {
        let number = self.number.map_or(String::new(), |n| n.to_string());
        number + self.sign.as_deref().unwrap_or_default()
    }
}

fn child<'a, 'input>(node: Node<'a, 'input>, name: &str) -> Option<Node<'a, 'input>> {
    node.children().find(|child| child.has_tag_name(name))
}

fn text<'a>(node: Node<'a, '_>, name: &str) -> Option<&'a str> {
    child(node, name)?.text().map(str::trim)
}

fn figures(node: Node<'_, '_>) -> Vec<Figure> {
    let figures = node.children().filter(|child| child.has_tag_name("figure"));
    figures
        .map(|figure| Figure {
            number: text(figure, "figure-number").and_then(|n| n.parse().ok()),
            sign: text(figure, "prefix")
                .or_else(|| text(figure, "suffix"))
                .map(str::to_owned),
        })
        .filter(|figure| figure.number.is_some() || figure.sign.is_some())
        .collect()
}

/// The figures of the continuo: the last part of the file.
fn continuo(document: &Document<'_>) -> Vec<Figured> {
    let root = document.root_element();
    let part = root.children().rfind(|node| node.has_tag_name("part"));
    let mut found = Vec::new();
    let (mut now, mut divisions, mut transposed) = (ZERO, 1, 0);
    let measures = part.unwrap().children();
    for measure in measures.filter(|node| node.has_tag_name("measure")) {
        // Figures stand before their note; each further one over it a stated length later.
        let mut waiting: Vec<(Time, Vec<Figure>)> = Vec::new();
        let mut later = ZERO;
        let mut furthest = now;
        for node in measure.children().filter(Node::is_element) {
            let length = || -> Time {
                let length = text(node, "duration").and_then(|d| d.parse::<i64>().ok());
                Time::new(length.unwrap_or(0), 4 * divisions)
            };
            match node.tag_name().name() {
                "attributes" => {
                    if let Some(n) = text(node, "divisions") {
                        divisions = n.parse().unwrap();
                    }
                    if let Some(transpose) = child(node, "transpose") {
                        transposed = text(transpose, "diatonic").map_or(0, |n| n.parse().unwrap());
                    }
                }
                "figured-bass" => {
                    waiting.push((later, figures(node)));
                    later += length();
                }
                "note" if child(node, "chord").is_none() && child(node, "grace").is_none() => {
                    if let Some(pitch) = child(node, "pitch") {
                        let step = text(pitch, "step").unwrap();
                        let letter = i32::try_from("CDEFGAB".find(step).unwrap()).unwrap();
                        let bass = (letter + transposed).rem_euclid(7);
                        found.extend(waiting.drain(..).map(|(after, figures)| Figured {
                            at: now + after,
                            bass,
                            note: now,
                            figures,
                        }));
                    }
                    waiting.clear();
                    later = ZERO;
                    now += length();
                }
                "backup" => now -= length(),
                "forward" => now += length(),
                _ => {}
            }
            furthest = furthest.max(now);
        }
        now = furthest;
    }
    found
}

/// Where the roots that figures allow lie, in steps above the bass; none where they tell no root:
/// a bass note that is itself suspended, a lone fourth, a pedal.
fn roots(here: &[Figure], next: Option<&[Figure]>, sounds: &dyn Fn(i32) -> bool) -> Vec<i32> {
    let has = |figures: &[Figure], number: u8| figures.iter().any(|f| f.number == Some(number));
    let is_third =
        |figures: &[Figure]| has(figures, 3) || figures.iter().any(|f| f.number.is_none());
    let raised = |number: u8| {
        here.iter()
            .any(|f| f.number == Some(number) && f.sign.is_some())
    };
    let is = |numbers: &[u8]| {
        here.iter()
            .all(|f| f.number.is_none_or(|n| numbers.contains(&n)))
            && numbers.iter().all(|n| has(here, *n))
    };
    if here.is_empty() {
        return Vec::new();
    }
    if is(&[6, 4, 3]) {
        return vec![3];
    }
    if is(&[6, 4, 2]) || is(&[4, 2]) || (is(&[4]) && (raised(4) || sounds(6))) {
        return vec![1];
    }
    if has(here, 2) {
        return Vec::new();
    }
    if has(here, 9) {
        return if has(here, 6) { vec![5] } else { vec![0] };
    }
    if has(here, 4) {
        let resolves = next.is_some_and(is_third);
        return match (has(here, 6), resolves) {
            // A cadential six-four is read both ways.
            (true, true) => vec![3, 0],
            (true, false) => vec![3],
            (false, true) => vec![0],
            (false, false) => Vec::new(),
        };
    }
    if has(here, 7) {
        // A seventh that falls to a sixth over the same note is suspended, or passes through it.
        let falls = next.is_some_and(|next| has(next, 6));
        return if falls { vec![5, 0] } else { vec![0] };
    }
    if has(here, 6) {
        return vec![5];
    }
    // A diminished fifth means the sixth as well.
    if is(&[5]) && (raised(5) || sounds(-6)) {
        return vec![0, 5];
    }
    vec![0]
}

/// A pitch's place among the fifths.
fn fifths(pitch: Pitch) -> i32 {
    [0, 2, 4, -1, 1, 3, 5][usize::from(pitch.letter())] + 7 * i32::from(pitch.sign)
}

/// The letter of a place among the fifths.
fn letter(place: i32) -> i32 {
    (place * 4).rem_euclid(7)
}

fn letter_of(pitch: Pitch) -> i32 {
    i32::from(pitch.letter())
}

#[derive(Default)]
struct Count {
    compared: usize,
    agree: usize,
    sure: usize,
    sure_agree: usize,
    no_root: usize,
    other_bass: usize,
}

#[test]
fn the_roots_agree_with_the_figured_bass() {
    let (Some(folder), Some(scores)) = (folder(), set("chorales-nba")) else {
        return;
    };
    let show = std::env::var("PARTWRIGHT_SHOW").is_ok_and(|what| what == "figures");
    let mut count = Count::default();
    let mut bands: BTreeMap<i64, (usize, usize)> = BTreeMap::new();
    let mut files = 0;
    let mut unlike = Vec::new();
    for piece in &scores {
        let name = piece.id.trim_start_matches("bcfb-");
        let path = folder.join(format!("musicxml/chorales/{name}_FB.musicxml"));
        let Ok(source) = std::fs::read_to_string(path) else {
            continue;
        };
        files += 1;
        let options = ParsingOptions {
            allow_dtd: true,
            ..ParsingOptions::default()
        };
        let document = Document::parse_with_options(&source, options).unwrap();
        let figured = continuo(&document);
        let texture = Texture::of(&piece.score);
        let analysis = Analysis::of(&piece.score, &texture);
        let found = in_one_go(&piece.score, &texture, analysis.dissonances());
        for (i, here) in figured.iter().enumerate() {
            let next = figured.get(i + 1).filter(|next| next.note == here.note);
            let k = texture.sounding_at(here.at).unwrap();
            let pitches = || {
                let voices = texture.sounding(k);
                voices.filter_map(|voice| texture.pitch(&piece.score, k, voice))
            };
            let bass = texture.bass(k);
            let bass = bass.and_then(|voice| texture.pitch(&piece.score, k, voice));
            // The continuo may go its own way for a moment, or alone.
            let Some(bass) = bass.filter(|bass| letter_of(*bass) == here.bass) else {
                count.other_bass += 1;
                continue;
            };
            let sounds = |above: i32| pitches().any(|p| fifths(p) - fifths(bass) == above);
            let roots = roots(&here.figures, next.map(|next| &next.figures[..]), &sounds);
            let Some(segment) = found.iter().find(|s| s.first <= k && k < s.end) else {
                continue;
            };
            if roots.is_empty() {
                count.no_root += 1;
                continue;
            }
            let own = letter(segment.chord.root);
            let agrees = roots.iter().any(|root| (here.bass + root) % 7 == own);
            count.compared += 1;
            count.agree += usize::from(agrees);
            if segment.is_sure() {
                count.sure += 1;
                count.sure_agree += usize::from(agrees);
            }
            let band = bands.entry((segment.margin / 40).min(5) * 40).or_default();
            band.0 += usize::from(agrees);
            band.1 += 1;
            if agrees {
                continue;
            }
            let place = piece.score.place(here.at);
            let figures: Vec<String> = here.figures.iter().map(Figure::shown).collect();
            let line = format!(
                "- {name}, bar {}, beat {}, {} over {bass}, ours {}, ",
                place.bar,
                show_time(place.beat),
                figures.join(" "),
                segment.chord.name()
            );
            if show {
                let sounding: Vec<String> = pitches().map(|p| p.to_string()).collect();
                println!("{line}margin {}, {}", segment.margin, sounding.join(" "));
            }
            if segment.is_sure() {
                unlike.push(line);
            }
        }
    }
    for (from, (agree, of)) in &bands {
        println!("figures, margin from {from}: {agree} of {of}");
    }
    println!(
        "outside: {} figured moments in {files} files: {} have our root, of the surer {} of {}; \
         {} tell no root, {} stand under another bass",
        count.compared, count.agree, count.sure_agree, count.sure, count.no_root, count.other_bass
    );
    assert_eq!(files, 24);
    // What was measured may only grow.
    assert!(count.agree >= 755 && count.sure_agree >= 577);
    let verdicts = read_places(unlike.into_iter());
    println!("outside: surer chords that are not the figures', read: {verdicts:?}");
    let wrong = verdicts.get("theirs right").copied().unwrap_or(0);
    assert!(wrong * 50 <= count.sure, "{wrong} of {}", count.sure);
}
