//! What the checker saw of a dissonance, step by step, in words.

use partwright_analysis::Figure;
use partwright_analysis::figures::{Held, tried};

use super::Discord;

impl Discord<'_> {
    /// The interval and where it stands in the bar; then the figure that explains it, or every
    /// figure that was asked for and what it missed.
    #[must_use]
    pub fn account(&self) -> Vec<String> {
        let mut lines = vec![format!("{}, {}", self.words(), self.weight())];
        match self.figure() {
            Some(figure) => lines.push(self.told(figure)),
            None => lines.extend(self.missed()),
        }
        lines
    }

    /// How strong its moment is.
    fn weight(&self) -> &'static str {
        match self.sounding().sonority().map_or(0, |s| s.level) {
            0 => "on the first beat",
            1 => "on a strong beat",
            2 => "on a beat",
            _ => "off the beat",
        }
    }

    fn told(&self, figure: Figure) -> String {
        let name = figure.name();
        let article = if name.starts_with(['a', 'e', 'u']) {
            "an"
        } else {
            "a"
        };
        let voice = self.piece.name(self.dissonant().0);
        let line = format!("{voice} has {article} {name}");
        match figure {
            Figure::Suspension(held) | Figure::Retardation(held) => {
                format!("{line}: {}", self.times(&held))
            }
            _ => line,
        }
    }

    fn times(&self, held: &Held) -> String {
        let place = |at| self.piece.place_text(at);
        let after = if held.ornamented {
            ", after a decorating note"
        } else {
            ""
        };
        format!(
            "struck in {}, resolved in {}{after}",
            place(held.struck),
            place(held.resolved)
        )
    }

    /// A line a note and reason, so that figures which miss the same stand together.
    fn missed(&self) -> Vec<String> {
        let asked = tried(self.piece.score, self.piece.texture, self.dissonance);
        let mut lines = Vec::new();
        for (voice, note) in [self.dissonant(), self.other()] {
            let pitch = self.note((voice, note)).and_then(|n| n.sound.pitch());
            let pitch = pitch.map(|p| p.to_string()).unwrap_or_default();
            let mut reasons: Vec<(&str, Vec<&str>)> = Vec::new();
            for one in asked.iter().filter(|one| one.voice == voice) {
                let Some(missing) = one.missing else { continue };
                match reasons.iter_mut().find(|(reason, _)| *reason == missing) {
                    Some((_, figures)) => figures.push(one.figure),
                    None => reasons.push((missing, vec![one.figure])),
                }
            }
            for (reason, figures) in reasons {
                lines.push(format!("{pitch} is no {}: {reason}", listed(&figures)));
            }
        }
        lines
    }
}

/// `passing note, neighbour or cambiata`.
fn listed(words: &[&str]) -> String {
    match words.split_last() {
        Some((last, [])) => (*last).to_owned(),
        Some((last, rest)) => format!("{} or {last}", rest.join(", ")),
        None => String::new(),
    }
}
