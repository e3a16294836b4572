//! A sheet or a bare score and a style go in; findings come out, with spans where there is text.

mod drawn;
mod filter;
mod finding;
mod place;
mod run;
mod text;

pub use drawn::unlike_drawn;
pub use filter::{BarRange, Filter, FilterError};
pub use finding::{Finding, Related};
pub use partwright_rules::{Role, STYLES, Severity, Style};
pub use run::notes_findings;

use partwright_rules::Strictness;
use partwright_score::{Score, Texture};
use partwright_sheet::{Reading, Sheet};

/// How a check is done.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Wishes {
    /// The style, whatever the sheet says.
    pub style: Option<Style>,
    /// Only these rules and families; empty for all.
    pub pick: Vec<String>,
    /// Not these rules and families; dropping comes after picking.
    pub drop: Vec<String>,
}

impl Wishes {
    fn strictness(&self, named: Option<Style>) -> Strictness {
        Strictness {
            style: self.style.or(named).unwrap_or(Style::Free),
            pick: self.pick.clone(),
            drop: self.drop.clone(),
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
    /// The style in force.
    pub style: Style,
    /// The findings, by place in the score, then by rule.
    pub findings: Vec<Finding>,
}

impl Checked {
    /// Checks the text of a sheet. Never fails: what cannot be read is a finding.
    #[must_use]
    pub fn text(text: &str, wishes: &Wishes) -> Checked {
        Checked::of(Sheet::read(text), text, wishes)
    }

    /// Checks a text of which an earlier state was checked before: systems that did not change
    /// are not read again.
    #[must_use]
    pub fn again(&self, text: &str, wishes: &Wishes) -> Checked {
        Checked::of(Sheet::read_again(text, &self.sheet), text, wishes)
    }

    fn of(sheet: Sheet, text: &str, wishes: &Wishes) -> Checked {
        let reading = sheet.lower(text);
        let texture = Texture::of(&reading.score);
        let named = reading.score.style.as_deref().and_then(Style::named);
        let strictness = wishes.strictness(named);
        let mut findings = text::findings(&reading, &strictness);
        let notes = notes_findings(&reading.score, &texture, &strictness);
        findings.extend(notes.into_iter().map(|f| place::in_text(f, &reading)));
        finding::sort(&mut findings);
        Checked {
            sheet,
            reading,
            texture,
            style: strictness.style,
            findings,
        }
    }
}

/// Checks a bare score, which has no text: findings have places in the music only.
#[must_use]
pub fn check_score(score: &Score, wishes: &Wishes) -> Vec<Finding> {
    let named = score.style.as_deref().and_then(Style::named);
    let texture = Texture::of(score);
    let notes = notes_findings(score, &texture, &wishes.strictness(named));
    let mut findings: Vec<Finding> = notes
        .into_iter()
        .map(|f| place::in_score(f, score))
        .collect();
    finding::sort(&mut findings);
    findings
}
