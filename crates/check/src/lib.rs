//! A sheet or a bare score and a style go in; findings come out, with spans where there is text.

mod doubt;
mod drawn;
mod filter;
mod finding;
pub mod house;
mod kept;
mod licence;
mod place;
mod run;
mod text;

pub use drawn::unlike_drawn;
pub use filter::{BarRange, Filter, FilterError};
pub use finding::{Finding, Lifted, Related};
pub use house::House;
pub use partwright_analysis::mode::fifths;
pub use partwright_analysis::{Analysis, harmony};
pub use partwright_rules::{Role, STYLES, Severity, Style};
pub use run::notes_findings;

use std::path::PathBuf;
use std::sync::Arc;

use house::HouseLicence;
use kept::Kept;
use partwright_rules::{Piece, Strictness};
use partwright_score::{Score, Texture};
use partwright_sheet::{Reading, Sheet};

/// Which style is asked for, whatever the sheet says.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Choice {
    /// One of ours.
    Style(Style),
    /// The house style, by its name.
    House,
}

/// How a check is done.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Wishes {
    /// The style, whatever the sheet says.
    pub style: Option<Choice>,
    /// The nearest house style.
    pub house: Option<Arc<House>>,
    /// The file that is checked, for the licences of the house style.
    pub file: Option<PathBuf>,
    /// Only these rules and families; empty for all.
    pub pick: Vec<String>,
    /// Not these rules and families; dropping comes after picking.
    pub drop: Vec<String>,
}

impl Wishes {
    /// A style, and nothing else.
    #[must_use]
    pub fn of_style(style: Style) -> Wishes {
        Wishes {
            style: Some(Choice::Style(style)),
            ..Wishes::default()
        }
    }

    /// Whether the house style goes by a name.
    #[must_use]
    pub fn house_is_called(&self, name: &str) -> bool {
        self.house
            .as_ref()
            .is_some_and(|house| house.name.as_deref() == Some(name))
    }

    /// The strictness that results: `--style`, else the sheet's own style, else the house's, else
    /// `free`.
    fn strictness(&self, sheet: Option<&str>) -> Strictness {
        let named = sheet.and_then(|name| match Style::named(name) {
            Some(style) => Some(Choice::Style(style)),
            None => self.house_is_called(name).then_some(Choice::House),
        });
        let choice = self.style.or(named).unwrap_or(match self.house {
            Some(_) => Choice::House,
            None => Choice::Style(Style::Free),
        });
        let plain = match (choice, &self.house) {
            (Choice::House, Some(house)) => Strictness {
                overrides: house.overrides.clone(),
                numbers: house.numbers.clone(),
                across_phrases: house.across_phrases,
                ..Strictness::plain(house.base.unwrap_or(Style::Free))
            },
            (Choice::House, None) => Strictness::plain(Style::Free),
            (Choice::Style(style), _) => Strictness::plain(style),
        };
        Strictness {
            pick: self.pick.clone(),
            drop: self.drop.clone(),
            ..plain
        }
    }

    fn house_licences(&self) -> Vec<HouseLicence> {
        match (&self.house, &self.file) {
            (Some(house), Some(file)) => house.licences_for(file),
            _ => Vec::new(),
        }
    }
}

/// A sheet, checked.
#[derive(Clone, Debug)]
pub struct Checked {
    /// The tree.
    pub sheet: Sheet,
    /// What the tree says: the score, and where everything stands.
    pub reading: Reading,
    /// The sonorities and steps.
    pub texture: Texture,
    /// Dissonances and their figures.
    pub analysis: Analysis,
    /// The style in force, and what the house changes in it.
    pub strictness: Strictness,
    /// The findings, by place in the score, then by rule.
    pub findings: Vec<Finding>,
    /// What the next check need not judge again.
    kept: Kept,
}

impl Checked {
    /// Checks the text of a sheet. Never fails: what cannot be read is a finding.
    #[must_use]
    pub fn text(text: &str, wishes: &Wishes) -> Checked {
        Checked::of(Sheet::read(text), text, wishes, None)
    }

    /// Checks a text of which an earlier state was checked before: systems that did not change
    /// are not read again.
    #[must_use]
    pub fn again(&self, text: &str, wishes: &Wishes) -> Checked {
        let sheet = Sheet::read_again(text, &self.sheet);
        Checked::of(sheet, text, wishes, Some(self))
    }

    fn of(sheet: Sheet, text: &str, wishes: &Wishes, earlier: Option<&Checked>) -> Checked {
        let reading = sheet.lower(text);
        let texture = Texture::of(&reading.score);
        let strictness = wishes.strictness(reading.score.style.as_deref());
        let mut findings = text::findings(&reading, wishes, &strictness);
        let analysis = match earlier {
            Some(earlier) => Analysis::again(&reading.score, &texture, &earlier.analysis),
            None => Analysis::of(&reading.score, &texture),
        };
        let piece = Piece {
            score: &reading.score,
            texture: &texture,
            analysis: &analysis,
        };
        let kept = earlier.map(|earlier| &earlier.kept);
        let (notes, kept) = run::findings_again(&piece, &strictness, kept);
        findings.extend(notes.into_iter().map(|f| place::in_text(f, &reading)));
        licence::apply_house(&wishes.house_licences(), &reading.score, &mut findings);
        for (id, problem) in licence::apply(&reading, &mut findings) {
            // A licence is idle only if its rules were looked at.
            if id != "licence-idle" || (strictness.pick.is_empty() && strictness.drop.is_empty()) {
                findings.extend(text::finding(id, problem, &reading, &strictness));
            }
        }
        doubt::gather(&mut findings, &reading, text);
        finding::sort(&mut findings);
        Checked {
            sheet,
            reading,
            texture,
            analysis,
            strictness,
            findings,
            kept,
        }
    }

    /// The score as rules see it.
    #[must_use]
    pub fn piece(&self) -> Piece<'_> {
        Piece {
            score: &self.reading.score,
            texture: &self.texture,
            analysis: &self.analysis,
        }
    }

    /// The findings that no licence lifts.
    pub fn open(&self) -> impl Iterator<Item = &Finding> {
        self.findings
            .iter()
            .filter(|finding| finding.licence.is_none())
    }
}

/// Checks a bare score, which has no text: findings have places in the music only.
#[must_use]
pub fn check_score(score: &Score, wishes: &Wishes) -> Vec<Finding> {
    let texture = Texture::of(score);
    let analysis = Analysis::of(score, &texture);
    let piece = Piece {
        score,
        texture: &texture,
        analysis: &analysis,
    };
    let notes = notes_findings(&piece, &wishes.strictness(score.style.as_deref()));
    let mut findings: Vec<Finding> = notes
        .into_iter()
        .map(|f| place::in_score(f, score))
        .collect();
    licence::apply_house(&wishes.house_licences(), score, &mut findings);
    finding::sort(&mut findings);
    findings
}
