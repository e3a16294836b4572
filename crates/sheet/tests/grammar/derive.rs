//! Random sentences of a grammar, with what was chosen on the way. A guide may steer the choices
//! by what the grammar cannot say.

use std::collections::HashMap;

use crate::ebnf::{BLANKS, Grammar, Id, LINE_END, Node};
use crate::recognise::Recogniser;

/// Random numbers: G. Marsaglia, "Xorshift RNGs" (Journal of Statistical Software 8, 2003).
#[derive(Clone, Debug)]
pub(crate) struct Random(u64);

impl Random {
    /// The numbers of a seed.
    pub(crate) fn new(seed: u64) -> Random {
        let mut random = Random(seed.wrapping_mul(0x9e37_79b9_7f4a_7c15) | 1);
        for _ in 0..8 {
            random.next();
        }
        random
    }

    fn next(&mut self) -> u64 {
        self.0 ^= self.0 << 13;
        self.0 ^= self.0 >> 7;
        self.0 ^= self.0 << 17;
        self.0
    }

    /// A number from 0 to `n` - 1.
    pub(crate) fn below(&mut self, n: usize) -> usize {
        (self.next() >> 11) as usize % n.max(1)
    }

    /// One of several.
    pub(crate) fn one<'a, T>(&mut self, of: &'a [T]) -> Option<&'a T> {
        of.get(self.below(of.len()))
    }
}

/// One way through a piece of the grammar: the piece, and which of its ways.
pub(crate) type Way = (Id, usize);

/// How gladly a way is taken.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(crate) enum Wish {
    Never,
    Weigh(u32),
    Must,
}

/// The weight of leaving out and of stopping.
const STOP: u32 = 6;

/// Where a choice stands.
#[derive(Clone, Copy, Debug)]
pub(crate) enum At<'a> {
    /// Between alternatives: the one that begins with this.
    Choice(&'a str),
    /// Whether to take `[ … ]`, which begins with this; not to take it weighs [`STOP`].
    Optional(&'a str),
    /// Whether to go on with `{ … }` or `n * [ … ]`, which begins with this and was taken so often;
    /// to stop weighs [`STOP`].
    Again(&'a str, usize),
}

/// What stands for a rule.
pub(crate) enum Supply {
    /// What the grammar says.
    Derive,
    /// This sentence of it.
    Text(Sentence),
    /// Nothing can.
    Nothing,
}

/// What steers the choices. What stands under an exception may be tried again without its being
/// told.
pub(crate) trait Guide: Clone {
    /// How gladly a way is taken inside a rule.
    fn wish(&mut self, rule: &str, at: At<'_>) -> Wish;
    /// Before a rule.
    fn enter(&mut self, rule: &str, random: &mut Random) -> Supply;
    /// Whether a rule is tried again until [`Guide::leave`] is content.
    fn may_refuse(&self, rule: &str) -> bool;
    /// After a rule: whether the sentence can stay.
    fn leave(&mut self, rule: &str, text: &str) -> bool;
}

/// No steering.
#[derive(Clone)]
pub(crate) struct Free;

impl Guide for Free {
    fn wish(&mut self, _: &str, _: At<'_>) -> Wish {
        Wish::Weigh(2)
    }
    fn enter(&mut self, _: &str, _: &mut Random) -> Supply {
        Supply::Derive
    }
    fn may_refuse(&self, _: &str) -> bool {
        false
    }
    fn leave(&mut self, _: &str, _: &str) -> bool {
        true
    }
}

/// A sentence and the ways it took.
#[derive(Clone, Debug, Default)]
pub(crate) struct Sentence {
    pub(crate) text: String,
    pub(crate) ways: Vec<Way>,
}

/// Any characters, the awkward ones among them.
const CHARACTERS: &str = "aeiorstnlmBGSx0145 .,;:-_=+*/|\\~^?#'\"()[]{}<>%&@!\t\u{a0}\u{3000}\
                          éßœ港灯♯♭𝄪𝄫–—…\u{301}\u{85}\u{200b}\u{2028}\u{feff}\0\u{b}\u{7f}";

/// How often a piece with exceptions, or one the guide refuses, is tried.
const TRIES: usize = 2000;
/// Deeper than this, the shallowest way is taken.
const DEEPEST: usize = 200;

/// Derives sentences of a grammar.
pub(crate) struct Deriver<'a> {
    grammar: &'a Grammar,
    recogniser: &'a Recogniser,
    heads: Vec<String>,
    /// How deep the shallowest sentence of each piece is.
    depths: Vec<usize>,
    characters: Vec<char>,
    /// How often each way has been taken in a sentence that counts.
    used: HashMap<Way, usize>,
    /// From so many characters on, nothing is repeated that need not be.
    size: usize,
    pub(crate) random: Random,
    /// This `n * [ a ]` is taken once too often.
    pub(crate) beyond: Option<Id>,
}

impl<'a> Deriver<'a> {
    pub(crate) fn new(grammar: &'a Grammar, recogniser: &'a Recogniser, size: usize) -> Self {
        Deriver {
            grammar,
            recogniser,
            heads: (0..grammar.nodes.len())
                .map(|id| head(grammar, id))
                .collect(),
            depths: depths(grammar),
            characters: CHARACTERS.chars().collect(),
            used: HashMap::new(),
            size,
            random: Random::new(1),
            beyond: None,
        }
    }

    /// A sentence of a rule; none if the guide leaves no way.
    pub(crate) fn sentence<G: Guide>(&mut self, rule: &str, guide: &mut G) -> Option<Sentence> {
        let rule = self.grammar.rule(rule)?;
        let mut out = Sentence::default();
        self.rule(rule, guide, &mut out, 0)?;
        Some(out)
    }

    /// Counts the ways of a sentence.
    pub(crate) fn count(&mut self, sentence: &Sentence) {
        for way in &sentence.ways {
            *self.used.entry(*way).or_default() += 1;
        }
    }

    /// What no sentence that counted has taken, as it is written.
    pub(crate) fn unused(&self) -> Vec<String> {
        let unused = all_ways(self.grammar)
            .into_iter()
            .filter(|way| !self.used.contains_key(&way.1));
        unused
            .map(|(rule, (id, way))| {
                let what = self.grammar.show(id);
                let which = match &self.grammar.nodes[id] {
                    _ if way == RULE => "used at all".to_owned(),
                    Node::Choice(all) => self.grammar.show(all[way]),
                    Node::Special(_) => format!("number {way}"),
                    Node::Optional(_) => ["left out", "taken"][way].to_owned(),
                    Node::Repeated(_) => ["none", "once", "more than once"][way].to_owned(),
                    Node::UpTo(..) => ["none", "some", "all"][way].to_owned(),
                    _ => format!("way {way}"),
                };
                format!("{}: {which} of {what}", self.grammar.rules[rule].name)
            })
            .collect()
    }

    fn rule<G: Guide>(
        &mut self,
        rule: usize,
        guide: &mut G,
        out: &mut Sentence,
        depth: usize,
    ) -> Option<()> {
        let grammar = self.grammar;
        let name = grammar.rules[rule].name.as_str();
        let body = grammar.body(rule)?;
        let refuses = guide.may_refuse(name);
        let before = refuses.then(|| guide.clone());
        let (text, ways) = (out.text.len(), out.ways.len());
        for _ in 0..if refuses { TRIES } else { 1 } {
            let done = match guide.enter(name, &mut self.random) {
                Supply::Derive => {
                    out.ways.push((body, RULE));
                    self.piece(body, rule, guide, out, depth + 1)
                }
                Supply::Text(sentence) => {
                    out.text.push_str(&sentence.text);
                    out.ways.extend(sentence.ways);
                    Some(())
                }
                Supply::Nothing => None,
            };
            if done.is_some() && guide.leave(name, &out.text[text..]) {
                return Some(());
            }
            if let Some(before) = &before {
                guide.clone_from(before);
            }
            out.text.truncate(text);
            out.ways.truncate(ways);
        }
        None
    }

    /// The weight of a way, greater if it was never taken.
    fn weigh(&self, way: Way, wish: Wish) -> u32 {
        match wish {
            Wish::Weigh(weight) if !self.used.contains_key(&way) => weight * 8,
            Wish::Weigh(weight) => weight,
            _ => 0,
        }
    }

    /// One of several ways: the first that must be, or one by weight; none if all weigh nothing.
    fn choose(&mut self, ways: &[(Way, Wish)]) -> Option<usize> {
        if let Some(must) = ways.iter().position(|(_, wish)| *wish == Wish::Must) {
            return Some(must);
        }
        let weights: Vec<u32> = ways
            .iter()
            .map(|(way, wish)| self.weigh(*way, *wish))
            .collect();
        let all: u32 = weights.iter().sum();
        let mut at = u32::try_from(self.random.below(all as usize)).ok()?;
        weights.iter().position(|weight| {
            let here = at < *weight;
            at = at.saturating_sub(*weight);
            here
        })
    }

    fn piece<G: Guide>(
        &mut self,
        id: Id,
        rule: usize,
        guide: &mut G,
        out: &mut Sentence,
        depth: usize,
    ) -> Option<()> {
        let grammar = self.grammar;
        let name = grammar.rules[rule].name.as_str();
        match &grammar.nodes[id] {
            Node::Terminal(text) => out.text.push_str(text),
            Node::Special(special) => self.special(id, special, out)?,
            Node::Rule(rule) => self.rule(*rule, guide, out, depth)?,
            Node::Sequence(all) => {
                for a in all {
                    self.piece(*a, rule, guide, out, depth + 1)?;
                }
            }
            Node::Choice(all) => {
                let shallow = all.iter().map(|a| self.depths[*a]).min();
                let mut wishes = Vec::with_capacity(all.len());
                for (way, a) in all.iter().enumerate() {
                    let open = depth < DEEPEST || Some(self.depths[*a]) == shallow;
                    let wish = guide.wish(name, At::Choice(&self.heads[*a]));
                    wishes.push(((id, way), if open { wish } else { Wish::Never }));
                }
                let way = self.choose(&wishes)?;
                out.ways.push((id, way));
                self.piece(all[way], rule, guide, out, depth + 1)?;
            }
            Node::Optional(a) => {
                let wish = guide.wish(name, At::Optional(&self.heads[*a]));
                let way = self.whether((id, 0), (id, 1), wish, depth, out.text.len());
                out.ways.push((id, usize::from(way)));
                if way {
                    self.piece(*a, rule, guide, out, depth + 1)?;
                }
            }
            Node::Repeated(a) | Node::UpTo(_, a) => {
                let beyond = self.beyond == Some(id);
                let most = match grammar.nodes[id] {
                    Node::UpTo(most, _) => most + usize::from(beyond),
                    _ => usize::MAX,
                };
                let mut taken = 0;
                // All of `n * [ a ]` is a way that chance would hardly find.
                let fill = most < usize::MAX && (beyond || self.random.below(12) == 0);
                while taken < most {
                    let wish = match guide.wish(name, At::Again(&self.heads[*a], taken)) {
                        Wish::Weigh(1..) if fill => Wish::Must,
                        wish => wish,
                    };
                    let stop = (id, how_often(taken, most));
                    let go = (id, how_often(taken + 1, most));
                    if !self.whether(stop, go, wish, depth, out.text.len()) {
                        break;
                    }
                    self.piece(*a, rule, guide, out, depth + 1)?;
                    taken += 1;
                }
                out.ways.push((id, how_often(taken, most)));
            }
            Node::Except(a, _) => {
                let (text, ways) = (out.text.len(), out.ways.len());
                for _ in 0..TRIES {
                    self.piece(*a, rule, guide, out, depth + 1)?;
                    if !self.recogniser.excluded(id, &out.text[text..]) {
                        return Some(());
                    }
                    out.text.truncate(text);
                    out.ways.truncate(ways);
                }
                return None;
            }
        }
        Some(())
    }

    fn special(&mut self, id: Id, special: &str, out: &mut Sentence) -> Option<()> {
        let samples = samples(special);
        if samples == 0 {
            let c = *self.random.one(&self.characters)?;
            out.text.push(c);
            return Some(());
        }
        // Mostly the plain blank and the plain line end.
        let weight = |way| Wish::Weigh(if way == 0 { 60 } else { 1 });
        let wishes: Vec<_> = (0..samples).map(|way| ((id, way), weight(way))).collect();
        let way = self.choose(&wishes)?;
        out.ways.push((id, way));
        match special {
            LINE_END => out.text.push_str(["\n", "\r\n"][way]),
            "blank" => out.text.push(BLANKS[way]),
            _ => out.text.push('\u{feff}'),
        }
        Some(())
    }

    fn whether(&mut self, stop: Way, go: Way, wish: Wish, depth: usize, length: usize) -> bool {
        match wish {
            Wish::Must => true,
            Wish::Never => false,
            Wish::Weigh(_) if depth >= DEEPEST || length >= self.size => false,
            wish => self.choose(&[(stop, Wish::Weigh(STOP)), (go, wish)]) == Some(1),
        }
    }
}

/// The way that says a rule was used.
const RULE: usize = usize::MAX;

/// How many samples a special sequence has; 0 if it stands for any character.
fn samples(special: &str) -> usize {
    match special {
        LINE_END => 2,
        "blank" => BLANKS.len(),
        "byte order mark" => 1,
        _ => 0,
    }
}

fn how_often(taken: usize, most: usize) -> usize {
    if most == usize::MAX {
        taken.min(2)
    } else {
        usize::from(taken > 0) + usize::from(taken == most)
    }
}

/// Every way there is, with the rule in which it stands. What only exceptions use is not derived.
fn all_ways(grammar: &Grammar) -> Vec<(usize, Way)> {
    let mut found = Vec::new();
    let mut rules = vec![0];
    let mut at = 0;
    while let Some(rule) = rules.get(at).copied() {
        at += 1;
        let Some(body) = grammar.body(rule) else {
            continue;
        };
        found.push((rule, (body, RULE)));
        let mut todo = vec![body];
        while let Some(id) = todo.pop() {
            let ways = match &grammar.nodes[id] {
                Node::Rule(next) => {
                    if !rules.contains(next) {
                        rules.push(*next);
                    }
                    continue;
                }
                Node::Except(a, _) => {
                    todo.push(*a);
                    continue;
                }
                Node::Special(special) => samples(special),
                Node::Choice(all) => all.len(),
                Node::Optional(_) => 2,
                Node::Repeated(_) | Node::UpTo(..) => 3,
                Node::Terminal(_) | Node::Sequence(_) => 0,
            };
            found.extend((0..ways).map(|way| (rule, (id, way))));
            todo.extend(grammar.children(id));
        }
    }
    found
}

/// What a piece begins with, by name or as it stands.
fn head(grammar: &Grammar, id: Id) -> String {
    match &grammar.nodes[id] {
        Node::Terminal(text) => text.clone(),
        Node::Special(name) => name.clone(),
        Node::Rule(rule) => grammar.rules[*rule].name.clone(),
        Node::Optional(a) => format!("[{}]", head(grammar, *a)),
        _ => head(grammar, grammar.children(id)[0]),
    }
}

/// The depths of the shallowest sentences.
fn depths(grammar: &Grammar) -> Vec<usize> {
    let mut depths = vec![usize::MAX; grammar.nodes.len()];
    loop {
        let before = depths.clone();
        for id in 0..depths.len() {
            let of = |a: Option<&Id>| a.map_or(0, |a| depths[*a]);
            let children = grammar.children(id);
            let inner = match &grammar.nodes[id] {
                Node::Choice(_) | Node::Rule(_) => children.iter().map(|a| depths[*a]).min(),
                Node::Sequence(_) => children.iter().map(|a| depths[*a]).max(),
                Node::Except(a, _) => Some(of(Some(a))),
                _ => Some(0),
            };
            depths[id] = inner.unwrap_or(usize::MAX).saturating_add(1);
        }
        if depths == before {
            return depths;
        }
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn what_is_derived_is_recognised_and_bounded() {
        let text = "a = \"x\", [ b ], { c }, 5 * [ \".\" ], ? end of line ? ; \
                    b = \"(\", ( a | b ), [ b ], \")\" | \"b\" ; \
                    c = ( ? any character but an end of line ? - ? blank ? ) - \"(\" ;";
        let grammar = Grammar::read(text).unwrap();
        let recogniser = Recogniser::new(&grammar);
        let mut deriver = Deriver::new(&grammar, &recogniser, 60);
        for seed in 0..200 {
            deriver.random = Random::new(seed);
            let sentence = deriver.sentence("a", &mut Free).unwrap();
            assert!(sentence.text.len() < 2000, "{}", sentence.text.len());
            assert_eq!(
                recogniser.recognise("a", &sentence.text),
                Ok(()),
                "{:?}",
                sentence.text
            );
            deriver.count(&sentence);
        }
        assert_eq!(deriver.unused(), Vec::<String>::new());
    }

    #[test]
    fn what_was_never_taken_is_told() {
        let grammar = Grammar::read("a = \"x\" | \"y\", [ b ] ; b = { \"z\" } ;").unwrap();
        let recogniser = Recogniser::new(&grammar);
        let mut deriver = Deriver::new(&grammar, &recogniser, 60);
        assert_eq!(deriver.unused().len(), 9);
        let id = grammar.body(0).unwrap();
        deriver.count(&Sentence {
            text: "x".to_owned(),
            ways: vec![(id, RULE), (id, 0)],
        });
        assert!(
            deriver
                .unused()
                .contains(&"a: \"y\", [ b ] of ( \"x\" | \"y\", [ b ] )".to_owned())
        );
        assert_eq!(deriver.unused().len(), 7);
    }
}
