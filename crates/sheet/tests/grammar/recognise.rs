//! A recogniser for any grammar: J. Earley, "An efficient context-free parsing algorithm"
//! (Communications of the ACM 13, 1970), over characters; empty rules as J. Aycock and
//! R. N. Horspool treat them ("Practical Earley parsing", The Computer Journal 45, 2002).

#[path = "compile.rs"]
mod compile;

use std::collections::HashMap;

use crate::ebnf::{BLANKS, Grammar, Id, special_character};

/// What stands at a place of a production.
#[derive(Clone, Copy, Debug)]
enum Symbol {
    /// One character of a class.
    One(usize),
    /// Something made of productions.
    Made(usize),
    /// The production is complete.
    End(usize),
}

/// A set of single characters.
#[derive(Clone, Debug)]
enum Class {
    Just(char),
    Special(String),
    Any(Vec<usize>),
    But(usize, usize),
}

/// Characters beyond ASCII are one column of a table.
const COLUMNS: usize = 129;

fn column(c: char) -> usize {
    (c as usize).min(COLUMNS - 1)
}

/// Something made of productions.
#[derive(Clone, Debug)]
struct Made {
    /// The first symbols of its productions.
    productions: Vec<usize>,
    nullable: bool,
    /// What it may begin with, by columns.
    first: [bool; COLUMNS],
    /// What it may not be as a whole.
    except: Option<Excluded>,
}

#[derive(Clone, Copy, Debug)]
enum Excluded {
    One(usize),
    Made(usize),
}

/// A grammar made ready for recognition.
#[derive(Debug)]
pub(crate) struct Recogniser {
    classes: Vec<Class>,
    /// Which classes hold which characters of ASCII.
    tables: Vec<[bool; COLUMNS]>,
    symbols: Vec<Symbol>,
    made: Vec<Made>,
    rules: HashMap<String, usize>,
    exceptions: HashMap<Id, Excluded>,
}

impl Recogniser {
    /// Makes a grammar ready.
    ///
    /// # Panics
    /// If the grammar is not well formed, or something that can be empty has exceptions.
    pub(crate) fn new(grammar: &Grammar) -> Recogniser {
        let mut out = compile::compile(grammar);
        out.firsts();
        out
    }

    /// Whether a text is a sentence of a rule; if not, the place of the character (by count) that
    /// could not stand.
    ///
    /// # Errors
    /// That place.
    ///
    /// # Panics
    /// If there is no such rule.
    pub(crate) fn recognise(&self, rule: &str, text: &str) -> Result<(), usize> {
        let text: Vec<char> = text.chars().collect();
        self.run(self.rules[rule], &text)
    }

    /// Whether a text is what the exception `id` leaves out.
    pub(crate) fn excluded(&self, id: Id, text: &str) -> bool {
        let text: Vec<char> = text.chars().collect();
        self.is_excluded(self.exceptions[&id], &text)
    }

    fn is_excluded(&self, excluded: Excluded, text: &[char]) -> bool {
        match (excluded, text) {
            (Excluded::One(class), [c]) => self.holds(class, *c),
            (Excluded::One(_), _) => false,
            (Excluded::Made(made), _) => self.run(made, text).is_ok(),
        }
    }

    fn holds(&self, class: usize, c: char) -> bool {
        if c.is_ascii() {
            self.tables[class][column(c)]
        } else {
            self.looked_up(class, c)
        }
    }

    fn looked_up(&self, class: usize, c: char) -> bool {
        match &self.classes[class] {
            Class::Just(just) => *just == c,
            Class::Special(name) => special_character(name, c) == Some(true),
            Class::Any(all) => all.iter().any(|class| self.looked_up(*class, c)),
            Class::But(a, b) => self.looked_up(*a, c) && !self.looked_up(*b, c),
        }
    }

    /// Whether any character beyond ASCII may be in a class.
    fn reaches_far(&self, class: usize) -> bool {
        match &self.classes[class] {
            Class::Just(just) => !just.is_ascii(),
            Class::Special(name) => ['\u{feff}', BLANKS[2], 'é']
                .iter()
                .any(|c| special_character(name, *c) == Some(true)),
            Class::Any(all) => all.iter().any(|class| self.reaches_far(*class)),
            Class::But(a, _) => self.reaches_far(*a),
        }
    }

    /// Which can be empty, and what each may begin with.
    fn firsts(&mut self) {
        for class in 0..self.classes.len() {
            let mut table = [false; COLUMNS];
            for c in '\0'..='\x7f' {
                table[column(c)] = self.looked_up(class, c);
            }
            table[COLUMNS - 1] = self.reaches_far(class);
            self.tables.push(table);
        }
        let mut changed = true;
        while changed {
            changed = false;
            for made in 0..self.made.len() {
                let (nullable, first) = self.first_of(made);
                let known = &mut self.made[made];
                changed |= known.nullable != nullable || known.first != first;
                known.nullable = nullable;
                known.first = first;
            }
        }
        for made in &self.made {
            assert!(
                made.except.is_none() || !made.nullable,
                "an exception from nothing"
            );
        }
    }

    fn first_of(&self, made: usize) -> (bool, [bool; COLUMNS]) {
        let mut nullable = false;
        let mut first = [false; COLUMNS];
        for start in &self.made[made].productions {
            let mut at = *start;
            loop {
                let more = match self.symbols[at] {
                    Symbol::End(_) => {
                        nullable = true;
                        break;
                    }
                    Symbol::One(class) => &self.tables[class],
                    Symbol::Made(inner) => &self.made[inner].first,
                };
                for (column, more) in first.iter_mut().zip(more) {
                    *column |= more;
                }
                match self.symbols[at] {
                    Symbol::Made(inner) if self.made[inner].nullable => at += 1,
                    _ => break,
                }
            }
        }
        (nullable, first)
    }

    fn run(&self, top: usize, text: &[char]) -> Result<(), usize> {
        let mut chart = Chart {
            items: Vec::new(),
            seen: vec![(usize::MAX, NONE); self.symbols.len()],
            waiting: Vec::new(),
        };
        for start in &self.made[top].productions {
            chart.add(0, *start, 0);
        }
        let mut at = 0;
        for here in 0..=text.len() {
            let next = text.get(here).copied();
            let column = next.map(column);
            chart.waiting.resize((here + 1) * self.made.len(), NONE);
            let mut scanned = Vec::new();
            let mut accepted = false;
            if at == chart.items.len() {
                return Err(here.saturating_sub(1));
            }
            while let Some(&Item { symbol, start, .. }) = chart.items.get(at) {
                match self.symbols[symbol] {
                    Symbol::One(class) => {
                        if next.is_some_and(|c| self.holds(class, c)) {
                            scanned.push((symbol + 1, start));
                        }
                    }
                    Symbol::Made(made) => {
                        let known = &self.made[made];
                        if known.nullable {
                            chart.add(here, symbol + 1, start);
                        }
                        if column.is_some_and(|column| known.first[column]) {
                            let first = &mut chart.waiting[here * self.made.len() + made];
                            chart.items[at].next = std::mem::replace(first, at);
                            if chart.items[at].next == NONE {
                                for start in &known.productions {
                                    chart.add(here, *start, here);
                                }
                            }
                        }
                    }
                    // What is empty was gone over already.
                    Symbol::End(_) if start == here && here > 0 => {}
                    Symbol::End(made) => {
                        let known = &self.made[made];
                        let out = known
                            .except
                            .is_some_and(|b| self.is_excluded(b, &text[start..here]));
                        if !out {
                            accepted |= made == top && start == 0;
                            if start < here {
                                let mut waits = chart.waiting[start * self.made.len() + made];
                                while waits != NONE {
                                    let waiting = chart.items[waits];
                                    chart.add(here, waiting.symbol + 1, waiting.start);
                                    waits = waiting.next;
                                }
                            }
                        }
                    }
                }
                at += 1;
            }
            if next.is_none() {
                return if accepted { Ok(()) } else { Err(here) };
            }
            for (symbol, start) in scanned {
                chart.add(here + 1, symbol, start);
            }
        }
        Err(text.len())
    }
}

const NONE: usize = usize::MAX;

#[derive(Clone, Copy)]
struct Item {
    /// The symbol that comes next.
    symbol: usize,
    /// Where its production began.
    start: usize,
    /// The next item that waits for the same.
    next: usize,
    /// The item before with the same symbol in the same set.
    same: usize,
}

struct Chart {
    items: Vec<Item>,
    /// For every symbol the last set it was in, and its last item there.
    seen: Vec<(usize, usize)>,
    /// For every place and everything made of productions, the last item that waits for it.
    waiting: Vec<usize>,
}

impl Chart {
    fn add(&mut self, set: usize, symbol: usize, start: usize) {
        let (in_set, last) = self.seen[symbol];
        let same = if in_set == set { last } else { NONE };
        let mut other = same;
        while other != NONE {
            let item = self.items[other];
            if item.start == start {
                return;
            }
            other = item.same;
        }
        self.seen[symbol] = (set, self.items.len());
        self.items.push(Item {
            symbol,
            start,
            next: NONE,
            same,
        });
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn held(grammar: &str, good: &[&str], bad: &[&str]) {
        let grammar = Grammar::read(grammar).unwrap();
        let recogniser = Recogniser::new(&grammar);
        let top = &grammar.rules[0].name;
        for text in good {
            assert_eq!(recogniser.recognise(top, text), Ok(()), "{text:?}");
        }
        for text in bad {
            assert!(recogniser.recognise(top, text).is_err(), "{text:?}");
        }
    }

    #[test]
    fn repetition_and_choice() {
        held(
            "a = { \"x\" | \"yz\" }, [ \"w\" ] ;",
            &["", "w", "xyzxw"],
            &["y", "ww", "xz"],
        );
        held(
            "a = \"x\", 3 * [ \".\", \"x\" ] ;",
            &["x", "x.x.x.x"],
            &["", "x.x.x.x.x", "x."],
        );
        held(
            "a = b, b, [ a ] ; b = [ \"x\" ], c ; c = { \"y\" } ;",
            &["", "x", "yxyxx"],
            &["z"],
        );
    }

    #[test]
    fn what_no_repetition_can_say() {
        held("a = [ \"(\", a, \")\" ] ;", &["", "((()))"], &["(()", ")("]);
        held(
            "a = a, \"+\", a | \"1\" ;",
            &["1", "1+1+1"],
            &["", "1+", "+1"],
        );
    }

    #[test]
    fn exceptions_are_taken_as_a_whole() {
        held(
            "a = ( b, { b } ) - ( \"no\" | \"n\", \"n\" ) ; b = \"n\" | \"o\" | \"s\" ;",
            &["n", "nos", "on", "nnn"],
            &["no", "nn", "x"],
        );
        held(
            "a = { ? any character but an end of line ? - ( ? blank ? | \"é\" ) }, ? end of line ? ;",
            &["\n", "xè\r\n"],
            &["x \n", "é\n", "x", "x\u{3000}\n", "\r\r\n"],
        );
    }

    #[test]
    fn the_place_of_a_mistake_is_told() {
        let grammar = Grammar::read("a = \"x\", { \"x\" }, \"y\" ;").unwrap();
        let recogniser = Recogniser::new(&grammar);
        assert_eq!(recogniser.recognise("a", "xxz"), Err(2));
        assert_eq!(recogniser.recognise("a", "xx"), Err(2));
        assert_eq!(recogniser.recognise("a", ""), Err(0));
    }
}
