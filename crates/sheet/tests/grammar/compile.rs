//! From the pieces of a grammar to productions of single characters and further productions.

use std::collections::HashMap;

use super::{COLUMNS, Class, Excluded, Made, Recogniser, Symbol};
use crate::ebnf::{Grammar, Id, LINE_END, Node};

/// The productions of a grammar; what each may begin with is not filled in.
pub(super) fn compile(grammar: &Grammar) -> Recogniser {
    let mut builder = Builder {
        grammar,
        out: Recogniser {
            classes: Vec::new(),
            tables: Vec::new(),
            symbols: Vec::new(),
            made: Vec::new(),
            rules: HashMap::new(),
            exceptions: HashMap::new(),
        },
        classes: HashMap::new(),
        made: HashMap::new(),
        todo: Vec::new(),
    };
    for (place, rule) in grammar.rules.iter().enumerate() {
        let made = builder.made(Key::Rule(place));
        builder.out.rules.insert(rule.name.clone(), made);
    }
    for (id, node) in grammar.nodes.iter().enumerate() {
        if let Node::Except(_, b) = node {
            let excluded = match builder.class(*b) {
                Some(class) => Excluded::One(class),
                None => Excluded::Made(builder.made(Key::Node(*b))),
            };
            builder.out.exceptions.insert(id, excluded);
        }
    }
    while let Some((key, made)) = builder.todo.pop() {
        builder.productions(key, made);
    }
    builder.out
}

/// What has productions of its own.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Hash)]
enum Key {
    Rule(usize),
    Node(Id),
    /// The rest of `n * [ a ]`.
    UpTo(usize, Id),
    LineEnd,
}

struct Builder<'a> {
    grammar: &'a Grammar,
    out: Recogniser,
    classes: HashMap<Id, Option<usize>>,
    made: HashMap<Key, usize>,
    todo: Vec<(Key, usize)>,
}

impl Builder<'_> {
    fn made(&mut self, key: Key) -> usize {
        if let Some(made) = self.made.get(&key) {
            return *made;
        }
        let made = self.out.made.len();
        self.out.made.push(Made {
            productions: Vec::new(),
            nullable: false,
            first: [false; COLUMNS],
            except: None,
        });
        self.made.insert(key, made);
        self.todo.push((key, made));
        made
    }

    fn class(&mut self, id: Id) -> Option<usize> {
        if let Some(known) = self.classes.get(&id) {
            return *known;
        }
        // A rule that is made of itself is no class.
        self.classes.insert(id, None);
        let class = match &self.grammar.nodes[id] {
            Node::Terminal(text) => {
                let mut all = text.chars();
                all.next().filter(|_| all.next().is_none()).map(Class::Just)
            }
            Node::Special(name) => (name != LINE_END).then(|| Class::Special(name.clone())),
            Node::Rule(rule) => {
                let body = self.grammar.body(*rule);
                let class = body.and_then(|body| self.class(body));
                self.classes.insert(id, class);
                return class;
            }
            Node::Choice(all) => {
                let all: Option<Vec<usize>> = all.iter().map(|a| self.class(*a)).collect();
                all.map(Class::Any)
            }
            Node::Except(a, b) => self
                .class(*a)
                .zip(self.class(*b))
                .map(|(a, b)| Class::But(a, b)),
            _ => None,
        };
        let class = class.map(|class| {
            self.out.classes.push(class);
            self.out.classes.len() - 1
        });
        self.classes.insert(id, class);
        class
    }

    fn production(&mut self, made: usize, pieces: &[Id]) {
        let mut symbols = Vec::new();
        for id in pieces {
            self.piece(*id, &mut symbols);
        }
        self.finish(made, symbols);
    }

    fn finish(&mut self, made: usize, mut symbols: Vec<Symbol>) {
        symbols.push(Symbol::End(made));
        let start = self.out.symbols.len();
        self.out.symbols.append(&mut symbols);
        self.out.made[made].productions.push(start);
    }

    fn piece(&mut self, id: Id, symbols: &mut Vec<Symbol>) {
        if let Some(class) = self.class(id) {
            return symbols.push(Symbol::One(class));
        }
        let key = match &self.grammar.nodes[id] {
            Node::Terminal(text) => {
                for c in text.chars() {
                    self.out.classes.push(Class::Just(c));
                    symbols.push(Symbol::One(self.out.classes.len() - 1));
                }
                return;
            }
            Node::Sequence(all) => {
                for id in all {
                    self.piece(*id, symbols);
                }
                return;
            }
            Node::Special(_) => Key::LineEnd,
            Node::Rule(rule) => Key::Rule(*rule),
            Node::UpTo(n, _) => Key::UpTo(*n, id),
            _ => Key::Node(id),
        };
        let made = self.made(key);
        symbols.push(Symbol::Made(made));
    }

    fn productions(&mut self, key: Key, made: usize) {
        let grammar = self.grammar;
        match key {
            Key::Rule(rule) => {
                for body in &grammar.rules[rule].bodies {
                    self.production(made, &[*body]);
                }
            }
            Key::LineEnd => {
                for text in ["\n", "\r\n"] {
                    let mut symbols = Vec::new();
                    for c in text.chars() {
                        self.out.classes.push(Class::Just(c));
                        symbols.push(Symbol::One(self.out.classes.len() - 1));
                    }
                    self.finish(made, symbols);
                }
            }
            Key::UpTo(n, id) => {
                let Node::UpTo(_, a) = grammar.nodes[id] else {
                    return;
                };
                self.finish(made, Vec::new());
                if n > 0 {
                    let mut symbols = Vec::new();
                    self.piece(a, &mut symbols);
                    let rest = self.made(Key::UpTo(n - 1, id));
                    symbols.push(Symbol::Made(rest));
                    self.finish(made, symbols);
                }
            }
            Key::Node(id) => match &grammar.nodes[id] {
                Node::Choice(all) => {
                    for a in all {
                        self.production(made, &[*a]);
                    }
                }
                Node::Optional(a) => {
                    self.finish(made, Vec::new());
                    self.production(made, &[*a]);
                }
                Node::Repeated(a) => {
                    self.finish(made, Vec::new());
                    let mut symbols = vec![Symbol::Made(made)];
                    self.piece(*a, &mut symbols);
                    self.finish(made, symbols);
                }
                Node::Except(a, _) => {
                    self.out.made[made].except = self.out.exceptions.get(&id).copied();
                    self.production(made, &[*a]);
                }
                _ => self.production(made, &[id]),
            },
        }
    }
}
