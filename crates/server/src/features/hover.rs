//! `textDocument/hover`: what sounds under the cursor, and how it got there.

use std::fmt::Write;

use partwright_check::harmony::SURE;
use partwright_check::{Checked, Finding};
use partwright_rules::{Discord, PairMove, Sounding, Style, entry};
use partwright_score::{Interval, Score, Sound, Time, Voice, show_time};
use partwright_sheet::Span;
use partwright_space::Motion;
use tower_lsp::lsp_types::{Hover, HoverContents, MarkupContent, MarkupKind, Position};

use crate::convert;
use crate::documents::Outcome;
use crate::session::Agreed;
use crate::text::Text;

/// Pairs without the voice under the cursor that are listed; in a score of six voices all are.
const MOST_OTHER_PAIRS: usize = 10;

/// How far behind its label a row's first part is looked for, in bytes.
const FURTHEST_PART: usize = 200;

/// The hover at a position.
pub(crate) fn hover(outcome: &Outcome, position: Position, agreed: Agreed) -> Option<Hover> {
    let checked = outcome.checked()?;
    let text = &outcome.snapshot.text;
    let offset = text.offset_near(convert::place(position), agreed.columns);
    let page = Page {
        marks: agreed.markdown,
        text: String::new(),
    };
    let (span, value) = on_rule(checked, offset)
        .or_else(|| on_bar_line(checked, offset, &page))
        .or_else(|| on_label(checked, text, offset, &page))
        .or_else(|| on_part(checked, offset, &page))
        .or_else(|| on_finding(checked, offset, &page))?;
    let kind = if agreed.markdown {
        MarkupKind::Markdown
    } else {
        MarkupKind::PlainText
    };
    Some(Hover {
        contents: HoverContents::Markup(MarkupContent { kind, value }),
        range: Some(convert::range(text, span, agreed.columns)),
    })
}

/// A text in paragraphs, in Markdown or plain.
#[derive(Clone)]
struct Page {
    marks: bool,
    text: String,
}

impl Page {
    fn strong(&self, words: &str) -> String {
        if self.marks {
            format!("**{words}**")
        } else {
            words.to_owned()
        }
    }

    fn code(&self, words: &str) -> String {
        if self.marks {
            format!("`{words}`")
        } else {
            words.to_owned()
        }
    }

    fn paragraph(&mut self, words: &str) {
        if !self.text.is_empty() {
            self.text.push_str("\n\n");
        }
        self.text.push_str(words);
    }

    fn list(&mut self, items: &[String]) {
        for (i, item) in items.iter().enumerate() {
            let gap = if i == 0 { "\n\n" } else { "\n" };
            let _ = write!(self.text, "{gap}- {item}");
        }
    }
}

fn covers(span: Span, offset: usize) -> bool {
    span.range().contains(&offset) || span.range().end == offset
}

/// On a rule's name in a licence: the rule's page.
fn on_rule(checked: &Checked, offset: usize) -> Option<(Span, String)> {
    let reading = &checked.reading;
    let footnotes = reading.footnotes.iter().flat_map(|f| &f.rules);
    let headers = reading.licences.iter().flat_map(|l| &l.rules);
    let (name, span) = footnotes
        .chain(headers)
        .find(|(_, span)| covers(*span, offset))?;
    Some((*span, entry(name)?.page.text.clone()))
}

/// On a label: the voice with its compass.
fn on_label(checked: &Checked, text: &Text, offset: usize, page: &Page) -> Option<(Span, String)> {
    let (voice, span) = label(checked, text, offset)?;
    let mut page = page.clone();
    let score = &checked.reading.score;
    let this = score.voices.get(voice)?;
    page.paragraph(&format!(
        "{} · {}",
        page.strong(&this.label),
        this.kind.name
    ));
    let about = about_voice(score, this);
    if !about.is_empty() {
        page.paragraph(&about);
    }
    Some((span, page.text))
}

/// The voice whose label stands at an offset: where it is declared, or in front of a row's parts.
fn label(checked: &Checked, text: &Text, offset: usize) -> Option<(usize, Span)> {
    let reading = &checked.reading;
    let declared = (0..reading.score.voices.len())
        .filter_map(|voice| Some((voice, reading.declaration(voice)?)))
        .find(|(_, span)| covers(*span, offset));
    let in_row = || {
        let rest = text.line_from(offset);
        let ahead = rest.start..rest.end.min(rest.start + FURTHEST_PART);
        let (voice, at) = ahead.filter_map(|ahead| reading.at_offset(ahead)).next()?;
        let span = reading.label_span(voice, at)?;
        covers(span, offset).then_some((voice, span))
    };
    declared.or_else(in_row)
}

fn about_voice(score: &Score, voice: &Voice) -> String {
    let mut lines = Vec::new();
    if let Some(limit) = voice.limit {
        lines.push(format!(
            "Limit {} to {}, as the sheet gives it.",
            limit.low, limit.high
        ));
    } else if let (Some(usual), Some(most)) = (voice.kind.ordinary, voice.kind.extreme) {
        let ask = if voice.kind.is_sung() {
            "singers"
        } else {
            "players"
        };
        lines.push(format!(
            "Compass {} to {}, at most {} to {}: handbook values for trained adults; ask the {ask}.",
            usual.low, usual.high, most.low, most.high
        ));
    }
    if let Some(easy) = voice.easy {
        lines.push(format!("At ease from {} to {}.", easy.low, easy.high));
    }
    if voice.cantus {
        lines.push("The cantus: no mend moves it.".to_owned());
    }
    if let Some(species) = voice.species {
        lines.push(format!("In species {species}."));
    }
    if let Some(other) = voice.doubles {
        let other = score.spoken_name(other);
        lines.push(format!(
            "Doubles {other}: for rules about pairs the two are one voice."
        ));
    }
    if let Some(written) = &voice.written {
        lines.push(format!(
            "Its player reads a part in {written}; the sheet shows what sounds."
        ));
    }
    if voice.sixteen_foot {
        lines.push("May sound an octave lower.".to_owned());
    }
    lines.join("\n")
}

/// On a part: the note, what it makes with the others, and how they got here.
fn on_part(checked: &Checked, offset: usize, page: &Page) -> Option<(Span, String)> {
    let (voice, at) = checked.reading.at_offset(offset)?;
    let span = checked.reading.span_at(voice, at)?;
    let mut page = page.clone();
    let score = &checked.reading.score;
    let piece = checked.piece();
    let note = score
        .note_at(voice, at)
        .and_then(|n| score.voices.get(voice)?.notes.get(n))?;
    let here = |f: &&Finding| concerns(f, voice, at) || f.span.is_some_and(|s| covers(s, offset));
    findings(&mut page, checked.findings.iter().filter(here));
    let sound = page.strong(&match note.sound {
        Sound::Pitch(pitch) => pitch.to_string(),
        Sound::Rest => "silence".to_owned(),
        Sound::Unwritten => "not written yet".to_owned(),
        Sound::Spoilt => "not readable".to_owned(),
    });
    let mut line = format!("{sound} · {} · {}", piece.name(voice), piece.place_text(at));
    if note.onset < at && !note.sound.is_unknown() {
        let _ = write!(line, ", since {}", piece.place_text(note.onset));
    }
    page.paragraph(&line);
    if !note.sound.is_unknown()
        && let Some(index) = checked.texture.sounding_at(at)
    {
        around(&mut page, Sounding { piece, index }, voice);
        dissonances(&mut page, Sounding { piece, index }, voice);
        // The older styles know no chords.
        if matches!(checked.strictness.style, Style::Free | Style::Chorale) {
            chord(&mut page, Sounding { piece, index });
        }
    }
    Some((span, page.text))
}

/// The other voices, and the motion of every pair into the sonority.
fn around(page: &mut Page, sounding: Sounding<'_>, voice: usize) {
    let Sounding { piece, index } = sounding;
    let texture = piece.texture;
    let others: Vec<String> = texture
        .sounding(index)
        .filter(|&other| other != voice)
        .filter_map(|other| {
            let pitch = sounding.pitch(other)?;
            let mut line = format!("{} {pitch}", piece.name(other));
            if let Some(step) = pair(sounding, voice, other) {
                let own = sounding.pitch(voice)?;
                let side = pitch.place().semitone - own.place().semitone;
                let side = ["below", "", "above"].get(usize::try_from(1 + side.signum()).ok()?)?;
                let interval = step.after().map(Interval::name).unwrap_or_default();
                let _ = write!(line, ": {}", format!("{interval} {side}").trim_end());
                if let Some(motion) = motion(&step) {
                    let _ = write!(line, "; {motion}");
                }
            }
            Some(line)
        })
        .collect();
    page.list(&others);
    let pairs = texture.steps(index).map(|(pair, step)| PairMove {
        sounding,
        pair,
        step,
    });
    let rest = pairs.filter(|step| step.pair.upper != voice && step.pair.lower != voice);
    let mut rest: Vec<String> = rest
        .filter_map(|step| Some(format!("{} {}", step.names(), motion_word(&step)?)))
        .collect();
    if rest.is_empty() {
        return;
    }
    let more = rest.len().saturating_sub(MOST_OTHER_PAIRS);
    rest.truncate(MOST_OTHER_PAIRS);
    if more > 0 {
        rest.push(format!("and {more} more"));
    }
    page.paragraph(&format!("Other pairs: {}.", rest.join(", ")));
}

/// What disagrees with the note from here on, and the figure it is, or what each figure misses.
fn dissonances(page: &mut Page, sounding: Sounding<'_>, voice: usize) {
    let piece = sounding.piece;
    let here = piece.analysis.dissonances_at(sounding.index).iter();
    for dissonance in here.filter(|d| d.upper.0 == voice || d.lower.0 == voice) {
        let mut lines = Discord { piece, dissonance }.account();
        page.paragraph(&format!("{}.", lines.remove(0)));
        page.list(&lines);
    }
}

/// The chord as it is inferred, and what does not belong to it; nothing where that is a guess.
fn chord(page: &mut Page, sounding: Sounding<'_>) {
    let Sounding { piece, index } = sounding;
    let harmony = piece.analysis.harmony(piece.score, piece.texture);
    let Some(segment) = harmony.at(index).filter(|s| s.margin * 2 >= SURE) else {
        return;
    };
    let mut line = format!("Chord: {}", page.strong(&segment.chord.name()));
    if let Some(key) = segment.key {
        let _ = write!(line, ", in {}", key.name());
    }
    if segment.margin < SURE {
        line.push_str(" (not sure)");
    }
    if let Some(cadence) = sounding.chord().and_then(|chord| chord.cadence()) {
        let _ = write!(line, "; {}", cadence.name());
    }
    let beside = piece.texture.sounding(index).filter_map(|voice| {
        let pitch = sounding.pitch(voice)?;
        let belongs = segment.chord.tone(pitch).is_some();
        (!belongs).then(|| format!("{pitch} in {}", piece.name(voice)))
    });
    let beside: Vec<String> = beside.collect();
    if !beside.is_empty() {
        let _ = write!(line, "; set aside: {}", beside.join(", "));
    }
    page.paragraph(&format!("{line}."));
}

fn pair<'a>(sounding: Sounding<'a>, a: usize, b: usize) -> Option<PairMove<'a>> {
    let pair = partwright_score::Pair {
        upper: a.min(b),
        lower: a.max(b),
    };
    let step = sounding.piece.texture.step(sounding.index, a, b)?;
    step.after().map(|_| PairMove {
        sounding,
        pair,
        step,
    })
}

/// How a pair got here, in a word.
fn motion_word(step: &PairMove<'_>) -> Option<&'static str> {
    Some(match step.motion()? {
        Motion::Still => "at rest",
        Motion::Oblique => "oblique",
        Motion::Parallel => "parallel",
        Motion::Similar => "similar",
        Motion::Contrary => "contrary",
    })
}

/// The same with its ends: `parallel, D5 over G3 to E5 over A3`.
fn motion(step: &PairMove<'_>) -> Option<String> {
    let word = motion_word(step)?;
    let (from, to) = step.ends();
    let mut line = if from == to {
        word.to_owned()
    } else {
        format!("{word}, {from} to {to}")
    };
    if step.step.across_phrase() {
        line.push_str(", a new phrase");
    }
    if step.step.is_one_voice() {
        line.push_str(", as one voice");
    }
    Some(line)
}

/// A finding that stands at this moment in this voice, or whose passage goes on here.
fn concerns(finding: &Finding, voice: usize, at: Time) -> bool {
    let goes_on = |from| finding.until.is_some_and(|until| from <= at && at < until);
    finding.voices.contains(&voice) && finding.at.is_some_and(|from| from == at || goes_on(from))
}

/// On a bar line: which bar, how long it is, and its metre.
fn on_bar_line(checked: &Checked, offset: usize, page: &Page) -> Option<(Span, String)> {
    let line = checked.reading.bar_line_at(offset)?;
    let mut page = page.clone();
    let here = |f: &&Finding| f.span == Some(line.span);
    findings(&mut page, checked.findings.iter().filter(here));
    let score = &checked.reading.score;
    let bar = score.bars.get(line.bar)?;
    let metre = score.metres.get(bar.metre as usize)?;
    let beats = bar.length / metre.unit();
    let unit = if beats == 1.into() { "beat" } else { "beats" };
    let metre = if metre.is_free() {
        "free metre".to_owned()
    } else {
        metre.to_string()
    };
    let side = if line.opens { "begins" } else { "ends" };
    let number = page.strong(&format!("bar {}", bar.number));
    let beats = show_time(beats);
    page.paragraph(&format!("{number} {side} here · {beats} {unit} · {metre}"));
    Some((line.span, page.text))
}

/// Where nothing sounds, a finding.
fn on_finding(checked: &Checked, offset: usize, page: &Page) -> Option<(Span, String)> {
    let here = |f: &&Finding| f.span.is_some_and(|span| covers(span, offset));
    let span = checked.findings.iter().find(here)?.span?;
    let mut page = page.clone();
    findings(&mut page, checked.findings.iter().filter(here));
    Some((span, page.text))
}

/// What was found, the worst first: the message, and under it the rule and why it stands.
fn findings<'a>(page: &mut Page, found: impl Iterator<Item = &'a Finding>) {
    let mut found: Vec<&Finding> = found.collect();
    found.sort_by_key(|finding| std::cmp::Reverse(finding.severity));
    for finding in found {
        page.paragraph(&finding.message);
        let rule = page.code(finding.rule);
        let line = match &finding.licence {
            Some(licence) => format!("{rule}, licensed: {}", licence.reason),
            None => format!("{rule}, {}{}", finding.severity, why(finding.rule)),
        };
        page.paragraph(&line);
        if let Some(source) = entry(finding.rule).and_then(|e| e.rule.sources.first()) {
            page.paragraph(&format!("Source: {source}."));
        }
    }
}

/// Why a rule stands, in one sentence of its page.
fn why(rule: &str) -> String {
    let page = entry(rule).map_or("", |entry| entry.page.text.as_str());
    let lines = page.lines().skip_while(|line| !line.starts_with("Why: "));
    let lines: Vec<&str> = lines.take_while(|line| !line.trim().is_empty()).collect();
    let text = lines.join(" ");
    let Some(text) = text.strip_prefix("Why: ") else {
        return String::new();
    };
    let sentence = text.split_inclusive(". ").next().unwrap_or(text).trim_end();
    format!(": {sentence}")
}
