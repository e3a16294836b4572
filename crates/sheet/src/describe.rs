//! A reading as text, one item a line: the form in which `grammar/cases` state what must be read.

use std::fmt::Write;

use partwright_score::{Note, Sound, Time, Voice, ZERO, show_time};

use crate::reading::{Changed, Harmony, Mark, Reading, Stated, Tempo, Words};

impl Reading {
    /// The reading as text, one item a line: headers, voices, changes, bars, the notes of each
    /// voice, footnotes, words, harmony, figures.
    #[must_use]
    pub fn describe(&self) -> String {
        let mut out = String::new();
        // Writing to a string does not fail.
        let _ = self.headers(&mut out);
        let _ = self.music(&mut out);
        let _ = self.rest(&mut out);
        out
    }

    fn headers(&self, out: &mut String) -> std::fmt::Result {
        let head = &self.head;
        let text = [
            ("title", &head.title),
            ("subtitle", &head.subtitle),
            ("by", &head.by),
            ("style", &head.style),
        ];
        for (name, value) in text {
            if let Some(Stated { value, .. }) = value {
                writeln!(out, "{name} {value}")?;
            }
        }
        if let Some(key) = &head.key {
            writeln!(out, "key {}", key.value)?;
        }
        if let Some(metre) = &head.metre {
            writeln!(out, "metre {}", metre.value)?;
        }
        if let Some(tempo) = &head.tempo {
            writeln!(out, "tempo {}", show_tempo(tempo.value))?;
        }
        if let Some(equal) = &head.equal {
            writeln!(out, "equal {}", self.labels(&equal.value))?;
        }
        for licence in &self.licences {
            let rules: Vec<&str> = licence
                .rules
                .iter()
                .map(|(rule, _)| rule.as_str())
                .collect();
            write!(out, "licence {}", rules.join(" "))?;
            if !licence.voices.is_empty() {
                write!(out, " {}", self.labels(&licence.voices))?;
            }
            writeln!(out, ": {}", licence.reason)?;
        }
        for voice in &self.score.voices {
            self.voice(out, voice)?;
        }
        for change in &self.changes {
            write!(out, "from bar {}: ", change.bar)?;
            match &change.what {
                Changed::Key(key) => writeln!(out, "key {key}")?,
                Changed::Metre(metre) => writeln!(out, "metre {metre}")?,
                Changed::Tempo(tempo) => writeln!(out, "tempo {}", show_tempo(*tempo))?,
            }
        }
        Ok(())
    }

    fn labels(&self, voices: &[usize]) -> String {
        let label = |&voice: &usize| self.score.voices.get(voice).map_or("", |v| &v.label);
        voices.iter().map(label).collect::<Vec<_>>().join(" ")
    }

    fn voice(&self, out: &mut String, voice: &Voice) -> std::fmt::Result {
        write!(out, "voice {} {}", voice.label, voice.kind.name)?;
        if voice.cantus {
            write!(out, " cantus")?;
        }
        if let Some(species) = voice.species {
            write!(out, " species {species}")?;
        }
        if let Some(limit) = voice.limit {
            write!(out, " {}..{}", limit.low, limit.high)?;
        }
        if let Some(easy) = voice.easy {
            write!(out, " easy {}..{}", easy.low, easy.high)?;
        }
        if let Some(clef) = &voice.clef {
            write!(out, " clef {clef}")?;
        }
        if let Some(written) = &voice.written {
            write!(out, " written {written}")?;
        }
        if let Some(doubles) = voice.doubles {
            write!(out, " doubles {}", self.labels(&[doubles]))?;
        }
        if voice.sixteen_foot {
            write!(out, " sixteen-foot")?;
        }
        writeln!(out)
    }

    fn music(&self, out: &mut String) -> std::fmt::Result {
        write!(out, "bars")?;
        for bar in &self.score.bars {
            write!(out, " {}:{}", bar.number, show_time(bar.length))?;
            if bar.section_end {
                write!(out, "||")?;
            }
        }
        writeln!(out)?;
        for (index, voice) in self.score.voices.iter().enumerate() {
            write!(out, "{}:", voice.label)?;
            let marks: Vec<&Mark> = self.marks.iter().filter(|m| m.voice == index).collect();
            let mut marks = marks.into_iter().peekable();
            for (i, note) in items(&voice.notes).iter().enumerate() {
                write!(out, "{}", if i == 0 { " " } else { ", " })?;
                item(out, note)?;
                while let Some(mark) = marks.next_if(|mark| mark.at < note.end()) {
                    write!(out, " *{}", mark.name)?;
                }
                if note.copies.is_some() && note.sound.pitch().is_some() {
                    write!(out, " copy")?;
                }
            }
            writeln!(out)?;
        }
        Ok(())
    }

    fn rest(&self, out: &mut String) -> std::fmt::Result {
        for footnote in &self.footnotes {
            let rules: Vec<&str> = footnote
                .rules
                .iter()
                .map(|(rule, _)| rule.as_str())
                .collect();
            let rules = rules.join(" ");
            writeln!(
                out,
                "*{} licence {rules}: {}",
                footnote.mark, footnote.reason
            )?;
        }
        for words in &self.words {
            self.words(out, words)?;
        }
        let chords = self.harmony.iter().map(|at| (show_harmony(at), at.length));
        lane(out, "harmony", chords)?;
        let stacks = self.figures.iter().map(|at| {
            let stack: Vec<String> = at.stack.iter().map(ToString::to_string).collect();
            (stack.join("/"), at.length)
        });
        lane(out, "figures", stacks)
    }

    fn words(&self, out: &mut String, words: &Words) -> std::fmt::Result {
        write!(out, "words {}", self.labels(&words.voices))?;
        if let Some(verse) = words.verse {
            write!(out, " {verse}")?;
        }
        write!(out, ":")?;
        let first = words.voices.first().copied().unwrap_or(0);
        let notes = self.score.voices.get(first).map_or(&[][..], |v| &v.notes);
        let struck = notes.iter().filter(|note| {
            let after = words.over.partition_point(|(from, _)| *from <= note.onset);
            let over = after.checked_sub(1).and_then(|i| words.over.get(i));
            over.is_some_and(|(_, to)| note.onset < *to) && note.sound.pitch().is_some()
        });
        let mut syllables = words.syllables.iter().peekable();
        for (i, note) in struck.enumerate() {
            let here = syllables.next_if(|syllable| syllable.at == note.onset);
            let text = here.map_or_else(|| "-".to_owned(), |syllable| self.syllable(*syllable));
            let text = if text == "_" { "-" } else { text.as_str() };
            write!(out, "{}{text}", if i == 0 { " " } else { ", " })?;
        }
        writeln!(out)
    }
}

/// The notes of a voice, neighbours that are silent, not written or spoilt merged.
fn items(notes: &[Note]) -> Vec<Note> {
    let mut items: Vec<Note> = Vec::new();
    for note in notes {
        match items.last_mut() {
            Some(last) if last.sound == note.sound && last.sound.pitch().is_none() => {
                last.length += note.length;
                last.fermata |= note.fermata;
                last.breath |= note.breath;
            }
            _ => items.push(*note),
        }
    }
    items
}

fn item(out: &mut String, note: &Note) -> std::fmt::Result {
    match note.sound {
        Sound::Pitch(pitch) => write!(out, "{pitch}")?,
        Sound::Rest => write!(out, "_")?,
        Sound::Unwritten => write!(out, "?")?,
        Sound::Spoilt => write!(out, "~")?,
    }
    if note.fermata {
        write!(out, "^")?;
    }
    write!(out, " {}", show_time(note.length))?;
    if note.breath {
        write!(out, " breath")?;
    }
    Ok(())
}

fn lane(
    out: &mut String,
    name: &str,
    items: impl Iterator<Item = (String, Time)>,
) -> std::fmt::Result {
    let mut separator = " ";
    for (text, length) in items {
        if separator == " " {
            write!(out, "{name}:")?;
        }
        let text = if text.is_empty() { "_" } else { &text };
        write!(out, "{separator}{text} {}", show_time(length))?;
        separator = ", ";
    }
    if separator == " " {
        Ok(())
    } else {
        writeln!(out)
    }
}

fn show_harmony(at: &Harmony) -> String {
    let Some(chord) = &at.chord else {
        return String::new();
    };
    match at.key {
        Some((tonic, minor)) => {
            let name = tonic.class_name();
            let (letter, sign) = name.split_at(1);
            let letter = if minor {
                letter.to_lowercase()
            } else {
                letter.to_owned()
            };
            format!("{letter}{sign}: {chord}")
        }
        None => chord.to_string(),
    }
}

fn show_tempo(tempo: Tempo) -> String {
    match tempo.unit {
        Some(unit) if unit > ZERO => format!("{} {}", show_time(unit), tempo.speed),
        _ => tempo.speed.to_string(),
    }
}
