//! What finds no place in a sheet.

use partwright_score::{Score, Time};

/// Places named in one sentence; the others are counted.
const MOST_PLACES: usize = 6;

/// What was left behind so far.
pub(super) struct Left<'s> {
    score: &'s Score,
    told: Vec<Told>,
}

struct Told {
    what: String,
    places: Vec<String>,
    more: usize,
}

impl<'s> Left<'s> {
    /// Nothing yet.
    pub(super) fn of(score: &'s Score) -> Left<'s> {
        Left {
            score,
            told: Vec::new(),
        }
    }

    /// Tells a whole sentence.
    pub(super) fn tell(&mut self, sentence: String) {
        self.told.push(Told {
            what: sentence,
            places: Vec::new(),
            more: 0,
        });
    }

    /// Tells something of a bar, and of a voice where one is meant: one sentence for all places.
    pub(super) fn at(&mut self, what: &str, voice: Option<usize>, at: Time) {
        let index = self.told.iter().position(|told| told.what == what);
        let index = index.unwrap_or_else(|| {
            self.tell(what.to_owned());
            self.told.len() - 1
        });
        let bar = self.score.bar_at(at).and_then(|i| self.score.bars.get(i));
        let bar = bar.map_or_else(String::new, |bar| format!("bar {}", bar.number));
        let voice = voice.and_then(|v| self.score.voices.get(v));
        let place = match voice {
            Some(voice) => format!("{} {bar}", voice.label.trim()),
            None => bar,
        };
        let Some(told) = self.told.get_mut(index) else {
            return;
        };
        if told.places.len() < MOST_PLACES {
            told.places.push(place.trim().to_owned());
        } else {
            told.more += 1;
        }
    }

    /// The sentences, in the order in which their first cause was met.
    pub(super) fn sentences(self) -> Vec<String> {
        let sentence = |told: Told| {
            if told.places.is_empty() {
                return told.what;
            }
            let mut places = told.places;
            places.dedup();
            let more = match told.more {
                0 => String::new(),
                1 => " and one more place".to_owned(),
                n => format!(" and {n} more places"),
            };
            format!("{}: {}{more}.", told.what, places.join(", "))
        };
        self.told.into_iter().map(sentence).collect()
    }
}
