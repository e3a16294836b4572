//! Passages: the best ways through a row of layers, such as the voicings of successive chords.
//!
//! Each layer holds candidates; a weight stands on each candidate and on each step between
//! neighbouring layers, and the total is their sum. Sizes in L1 add up as they are. In L2 it is
//! for the caller to say whether the squares or the roots (scaled to whole numbers) are added;
//! the two ask different questions.

use std::cmp::Reverse;
use std::collections::BinaryHeap;

/// A row of layers with its weights, ready to be walked.
///
/// ```
/// use partwright_space::Passage;
///
/// // One voice over three chords, moving as little as it can.
/// let layers = [vec![60, 64, 67], vec![60, 65, 69], vec![62, 67, 71]];
/// let far = |_: usize, from: &i64, to: &i64| Some((to - from).abs());
/// let passage = Passage::new(&layers, |_, _| Some(0), far);
/// assert_eq!(passage.least(), Some((2, vec![vec![0, 0, 0]])));
/// assert_eq!(passage.in_order().nth(1), Some((3, vec![1, 1, 1])));
/// ```
#[derive(Clone, Debug)]
pub struct Passage {
    /// Number of candidates in each layer.
    counts: Vec<usize>,
    /// For each layer but the last, the steps from each candidate: where to, and the weight of
    /// the step and of that candidate.
    steps: Vec<Vec<Vec<(usize, i64)>>>,
    /// For each candidate of each layer, the total of the best way on; `None` at a dead end.
    rest: Vec<Vec<Option<i64>>>,
    /// Weights of the first candidates.
    first: Vec<Option<i64>>,
}

impl Passage {
    /// A passage through these layers. `node(layer, candidate)` and
    /// `step(layer, candidate, next candidate)` give the weights, `None` what is not allowed; a
    /// step is asked only between candidates that are allowed. Weights may be negative; sums stop
    /// at the ends of `i64`.
    pub fn new<T>(
        layers: &[Vec<T>],
        node: impl Fn(usize, &T) -> Option<i64>,
        step: impl Fn(usize, &T, &T) -> Option<i64>,
    ) -> Passage {
        let nodes: Vec<Vec<Option<i64>>> = (0..)
            .zip(layers)
            .map(|(at, layer)| layer.iter().map(|candidate| node(at, candidate)).collect())
            .collect();
        let pairs = layers.windows(2).zip(nodes.windows(2));
        let steps = pairs.enumerate().map(|(at, (layer, weight))| {
            let onwards = |(from, allowed): (&T, &Option<i64>)| {
                if allowed.is_none() {
                    return Vec::new();
                }
                let targets = layer[1].iter().zip(&weight[1]).enumerate();
                targets
                    .filter_map(|(i, (to, own))| {
                        Some((i, step(at, from, to)?.saturating_add((*own)?)))
                    })
                    .collect()
            };
            layer[0].iter().zip(&weight[0]).map(onwards).collect()
        });
        let mut passage = Passage {
            counts: layers.iter().map(Vec::len).collect(),
            steps: steps.collect(),
            rest: Vec::new(),
            first: nodes.into_iter().next().unwrap_or_default(),
        };
        passage.fill();
        passage
    }

    fn fill(&mut self) {
        let last = self.counts.last().copied().unwrap_or(0);
        let mut rest = vec![vec![Some(0); last]];
        for layer in self.steps.iter().rev() {
            let after = rest.last().cloned().unwrap_or_default();
            let best = |steps: &Vec<(usize, i64)>| {
                let on = steps
                    .iter()
                    .filter_map(|&(to, weight)| Some(weight.saturating_add((*after.get(to)?)?)));
                on.min()
            };
            rest.push(layer.iter().map(best).collect());
        }
        rest.reverse();
        self.rest = rest;
    }

    /// The best ways, all of them, with their total; each way is the place of its candidate in
    /// every layer. `None` where there is no way through. No layers at all: one empty way.
    #[must_use]
    pub fn least(&self) -> Option<(i64, Vec<Vec<usize>>)> {
        let mut order = self.in_order().peekable();
        let total = order.peek()?.0;
        let ties = order.take_while(|way| way.0 == total).map(|way| way.1);
        Some((total, ties.collect()))
    }

    /// All ways with their totals, in ascending order of the total, then of the places;
    /// computed as they are asked for.
    #[must_use]
    pub fn in_order(&self) -> Ways<'_> {
        let mut ways = Ways {
            passage: self,
            heap: BinaryHeap::new(),
        };
        if self.counts.is_empty() {
            ways.heap.push(Reverse((0, Vec::new(), 0)));
        }
        for (i, weight) in self.first.iter().enumerate() {
            if let Some(weight) = *weight {
                ways.push(Vec::new(), 0, i, weight);
            }
        }
        ways
    }
}

/// The ways through a [`Passage`] in ascending order.
#[derive(Clone, Debug)]
pub struct Ways<'a> {
    passage: &'a Passage,
    /// The total of the best way on, the places so far, their own total. In this order ties come
    /// out sorted.
    heap: BinaryHeap<Reverse<(i64, Vec<usize>, i64)>>,
}

impl Ways<'_> {
    fn push(&mut self, mut way: Vec<usize>, total: i64, to: usize, weight: i64) {
        let layer = self.passage.rest.get(way.len());
        let Some(Some(rest)) = layer.and_then(|layer| layer.get(to)) else {
            return;
        };
        let total = total.saturating_add(weight);
        way.push(to);
        self.heap
            .push(Reverse((total.saturating_add(*rest), way, total)));
    }
}

impl Iterator for Ways<'_> {
    type Item = (i64, Vec<usize>);

    fn next(&mut self) -> Option<(i64, Vec<usize>)> {
        loop {
            let Reverse((_, way, total)) = self.heap.pop()?;
            if way.len() == self.passage.counts.len() {
                return Some((total, way));
            }
            let from = way.last().copied()?;
            let layer = self.passage.steps.get(way.len().checked_sub(1)?)?;
            for &(to, weight) in layer.get(from)? {
                self.push(way.clone(), total, to, weight);
            }
        }
    }
}
