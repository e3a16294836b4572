//! Rows whose labels cannot be taken as they are.

use partwright_score::MOST_VOICES;

use super::bars::SystemPlan;
use super::{Lowering, insertion};
use crate::chars::Word;
use crate::near::near;
use crate::system::problem;
use crate::tree::Row;
use crate::voices::label_fault;

impl Lowering<'_> {
    /// A second row of one name: read as that of the one voice without a row, if there is just one.
    /// Told once in a system.
    pub(super) fn again(
        &mut self,
        plan: &mut SystemPlan,
        present: &mut [bool; MOST_VOICES],
        index: usize,
        row: &Row,
        told: bool,
    ) {
        let span = row.label.moved(plan.placed.span.start);
        let voices = self.reading.score.voices.iter().enumerate();
        let absent: Vec<(usize, String)> = voices
            .filter(|(i, _)| present.get(*i) == Some(&false))
            .map(|(i, voice)| (i, voice.label.clone()))
            .collect();
        if told {
            let message = match absent.first() {
                Some((_, label)) => {
                    format!("A second row of this name in one system. Is {label} meant?")
                }
                None => "A second row of this name in one system: it needs a label of its own, or \
                         a blank line before it."
                    .to_owned(),
            };
            let labels: Vec<&str> = absent.iter().take(3).map(|(_, l)| l.as_str()).collect();
            let mut found = problem(span, message, &labels);
            let start = row.line.moved(plan.placed.span.start).start;
            let blank = insertion(start, self.line_end, "Put a blank line before it");
            found.offers.push(blank);
            self.reading.problems.push(found);
        }
        match absent.as_slice() {
            [(voice, _)] => {
                if let Some(here) = present.get_mut(*voice) {
                    *here = true;
                }
                plan.rows.push((index as u32, *voice as u8));
            }
            _ => {
                self.stray_marks(&plan.placed, index as u32);
                plan.doubtful = true;
            }
        }
    }

    /// A row whose label no voice has: read as the nearest voice that has no row here, if one is
    /// near.
    pub(super) fn nobodys(
        &mut self,
        plan: &mut SystemPlan,
        present: &mut [bool; MOST_VOICES],
        index: usize,
        row: &Row,
        label: &str,
    ) {
        let span = row.label.moved(plan.placed.span.start);
        self.stray_marks(&plan.placed, index as u32);
        if self.refused.contains(label) {
            return;
        }
        if let Some(message) = label_fault(label) {
            plan.doubtful = true;
            return self.wrong(span, &message, &[]);
        }
        let guess = self.guess();
        let voices = &self.reading.score.voices;
        let absent = voices
            .iter()
            .enumerate()
            .filter(|(i, _)| guess && present.get(*i) == Some(&false));
        let labels = absent.clone().map(|(_, voice)| voice.label.as_str());
        let meant = near(label, labels).and_then(|label| self.labels.get(label).copied());
        self.unknown_voice(Word { text: label, span });
        match meant {
            Some(voice) => {
                if let Some(here) = present.get_mut(voice) {
                    *here = true;
                }
                plan.rows.push((index as u32, voice as u8));
            }
            None => plan.doubtful = true,
        }
    }
}
