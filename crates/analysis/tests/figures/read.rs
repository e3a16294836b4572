//! Small sheets, read, and what is told of them.

pub(crate) use partwright_analysis::Figure;
use partwright_analysis::figures::tried;
use partwright_analysis::{Analysis, Dissonance};
use partwright_score::{Score, Texture};
use partwright_sheet::Sheet;

pub(crate) struct Read {
    pub(crate) score: Score,
    pub(crate) texture: Texture,
    pub(crate) analysis: Analysis,
}

pub(crate) fn read(text: &str) -> Read {
    let score = Sheet::read(text).lower(text).score;
    let texture = Texture::of(&score);
    let analysis = Analysis::of(&score, &texture);
    Read {
        score,
        texture,
        analysis,
    }
}

/// A sheet of bars of four, a row a line, voices named from the top.
pub(crate) fn sheet(rows: &[&str]) -> Read {
    let labels = ["S", "A", "T", "B"];
    let mut text = String::from("metre 4/4\n\n");
    let skip = labels.len() - rows.len();
    for (i, row) in rows.iter().enumerate() {
        // The last row is the bass, the first the soprano.
        let label = match i {
            0 => "S",
            i if i + 1 == rows.len() => "B",
            i => labels[i.min(skip + i)],
        };
        text += &format!("{label} | {row} |\n");
    }
    read(&text)
}

impl Read {
    pub(crate) fn all(&self) -> &[Dissonance] {
        self.analysis.dissonances()
    }

    /// `bar 1 beat 2 S passing note`, or `none`.
    pub(crate) fn told(&self) -> Vec<String> {
        let told = |d: &Dissonance| {
            let place = self.score.place(d.at);
            let (bar, beat) = (place.bar, place.beat);
            match d.reading {
                Some(r) => format!(
                    "{bar}:{beat} {} {}",
                    self.score.voices[r.voice].label,
                    r.figure.name()
                ),
                None => format!("{bar}:{beat} none"),
            }
        };
        self.all().iter().map(told).collect()
    }

    /// What a figure missed, asked of the voice that was struck or held.
    pub(crate) fn missed(&self, figure: &str, voice: &str) -> Option<&'static str> {
        let dissonance = self.all().first()?;
        tried(&self.score, &self.texture, dissonance)
            .into_iter()
            .find(|t| t.figure == figure && self.score.voices[t.voice].label == voice)?
            .missing
    }

    pub(crate) fn only(&self) -> Figure {
        let [one] = self.all() else {
            panic!("{:?}", self.told())
        };
        one.reading.unwrap().figure
    }
}

/// Rows, the one dissonance told.
pub(crate) fn fits(rows: &[&str], told: &str) {
    assert_eq!(sheet(rows).told(), [told], "{rows:?}");
}

/// Rows, the one dissonance told, and what the figure asked for misses in the soprano.
pub(crate) fn misses(figure: &str, rows: &[&str], told: &str, why: &str) {
    let read = sheet(rows);
    assert_eq!(read.told(), [told], "{rows:?}");
    assert_eq!(read.missed(figure, "S"), Some(why), "{rows:?}");
}
