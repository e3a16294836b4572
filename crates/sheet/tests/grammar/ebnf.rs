//! A reader of grammars in the form of ISO/IEC 14977, as far as ours uses it: `n * A` only as
//! `n * [ A ]`, and none of the alternative signs of the standard.

use std::collections::HashMap;

/// The place of a node in [`Grammar::nodes`].
pub(crate) type Id = usize;

/// A piece of a definition.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Node {
    /// Characters as they stand; none is the empty sequence.
    Terminal(String),
    /// `? … ?`
    Special(String),
    /// A rule, by its place in [`Grammar::rules`].
    Rule(usize),
    /// `a, b`
    Sequence(Vec<Id>),
    /// `a | b`
    Choice(Vec<Id>),
    /// `[ a ]`
    Optional(Id),
    /// `{ a }`
    Repeated(Id),
    /// `n * [ a ]`
    UpTo(usize, Id),
    /// `a - b`
    Except(Id, Id),
}

/// A rule; one that is used but not defined has no bodies.
#[derive(Clone, Debug)]
pub(crate) struct Rule {
    /// Its name, its blanks single.
    pub(crate) name: String,
    /// What it is defined as; more than one is a mistake.
    pub(crate) bodies: Vec<Id>,
}

/// A grammar as it was written. The first rule is the start.
#[derive(Clone, Debug, Default)]
pub(crate) struct Grammar {
    /// All pieces of all definitions.
    pub(crate) nodes: Vec<Node>,
    /// All rules, in the order in which their names are first met.
    pub(crate) rules: Vec<Rule>,
}

/// The sign that stands for a special sequence as one character, if it is one character.
pub(crate) fn special_character(name: &str, c: char) -> Option<bool> {
    match name {
        "byte order mark" => Some(c == '\u{feff}'),
        "blank" => Some(BLANKS.contains(&c)),
        "any character but an end of line" => Some(c != '\r' && c != '\n'),
        _ => None,
    }
}

/// The special sequence that may be two characters.
pub(crate) const LINE_END: &str = "end of line";

/// A tab, and the characters of category Zs (Unicode 16, UnicodeData.txt).
pub(crate) const BLANKS: [char; 18] = [
    ' ', '\t', '\u{a0}', '\u{1680}', '\u{2000}', '\u{2001}', '\u{2002}', '\u{2003}', '\u{2004}',
    '\u{2005}', '\u{2006}', '\u{2007}', '\u{2008}', '\u{2009}', '\u{200a}', '\u{202f}', '\u{205f}',
    '\u{3000}',
];

impl Grammar {
    /// Reads a grammar.
    ///
    /// # Errors
    /// What was expected, with the number of its line.
    pub(crate) fn read(text: &str) -> Result<Grammar, String> {
        let mut reader = Reader {
            tokens: tokens(text)?,
            at: 0,
            grammar: Grammar::default(),
            names: HashMap::new(),
        };
        while reader.peek() != &Token::End {
            reader.rule()?;
        }
        Ok(reader.grammar)
    }

    /// A rule's place by its name.
    pub(crate) fn rule(&self, name: &str) -> Option<usize> {
        self.rules.iter().position(|rule| rule.name == name)
    }

    /// What a rule is first defined as.
    pub(crate) fn body(&self, rule: usize) -> Option<Id> {
        self.rules[rule].bodies.first().copied()
    }

    /// The pieces a piece is made of; for a rule, its bodies.
    pub(crate) fn children(&self, id: Id) -> Vec<Id> {
        match &self.nodes[id] {
            Node::Terminal(_) | Node::Special(_) => Vec::new(),
            Node::Rule(rule) => self.rules[*rule].bodies.clone(),
            Node::Sequence(all) | Node::Choice(all) => all.clone(),
            Node::Optional(a) | Node::Repeated(a) | Node::UpTo(_, a) => vec![*a],
            Node::Except(a, b) => vec![*a, *b],
        }
    }

    /// For every piece whether it can be empty.
    pub(crate) fn nullable(&self) -> Vec<bool> {
        self.fixpoint(|grammar, id, known| match &grammar.nodes[id] {
            Node::Terminal(text) => text.is_empty(),
            Node::Special(_) => false,
            Node::Rule(_) | Node::Choice(_) => grammar.children(id).iter().any(|a| known[*a]),
            Node::Sequence(all) => all.iter().all(|a| known[*a]),
            Node::Optional(_) | Node::Repeated(_) | Node::UpTo(..) => true,
            // On the safe side: nothing is taken away.
            Node::Except(a, _) => known[*a],
        })
    }

    /// For every piece whether it has a sentence of finite length.
    pub(crate) fn productive(&self) -> Vec<bool> {
        self.fixpoint(|grammar, id, known| match &grammar.nodes[id] {
            Node::Rule(_) | Node::Choice(_) => grammar.children(id).iter().any(|a| known[*a]),
            Node::Sequence(all) => all.iter().all(|a| known[*a]),
            Node::Except(a, _) => known[*a],
            _ => true,
        })
    }

    fn fixpoint(&self, of: impl Fn(&Grammar, Id, &[bool]) -> bool) -> Vec<bool> {
        let mut known = vec![false; self.nodes.len()];
        loop {
            let before = known.clone();
            for id in 0..known.len() {
                known[id] = known[id] || of(self, id, &known);
            }
            if known == before {
                return known;
            }
        }
    }

    /// What is wrong with the grammar as a whole; empty if it is well formed.
    pub(crate) fn faults(&self) -> Vec<String> {
        let mut faults = Vec::new();
        if self.rules.is_empty() {
            faults.push("there are no rules".to_owned());
            return faults;
        }
        let mut reached = vec![false; self.rules.len()];
        let mut pieces = vec![false; self.nodes.len()];
        let mut todo = self.rules[0].bodies.clone();
        reached[0] = true;
        while let Some(id) = todo.pop() {
            if std::mem::replace(&mut pieces[id], true) {
                continue;
            }
            if let Node::Rule(rule) = self.nodes[id] {
                reached[rule] = true;
            }
            todo.extend(self.children(id));
        }
        let productive = self.productive();
        for (rule, reached) in self.rules.iter().zip(reached) {
            let name = &rule.name;
            match rule.bodies.as_slice() {
                [] => faults.push(format!("“{name}” is used but not defined")),
                [body] if !productive[*body] => {
                    faults.push(format!("“{name}” has no sentence of finite length"));
                }
                [_] => {}
                _ => faults.push(format!("“{name}” is defined more than once")),
            }
            if !reached && !rule.bodies.is_empty() {
                faults.push(format!("“{name}” cannot be reached from the start"));
            }
        }
        let nullable = self.nullable();
        for node in &self.nodes {
            match node {
                Node::Repeated(a) if nullable[*a] => {
                    let what = self.show(*a);
                    faults.push(format!(
                        "{{ {what} }} repeats the empty sequence without end"
                    ));
                }
                Node::Special(name)
                    if name != LINE_END && special_character(name, ' ').is_none() =>
                {
                    faults.push(format!("? {name} ? is no special sequence we know"));
                }
                _ => {}
            }
        }
        faults.sort();
        faults
    }

    /// A piece as it might be written.
    pub(crate) fn show(&self, id: Id) -> String {
        let joined = |all: &[Id], by: &str| {
            let shown: Vec<String> = all.iter().map(|a| self.show(*a)).collect();
            shown.join(by)
        };
        match &self.nodes[id] {
            Node::Terminal(text) if text.contains('"') => format!("'{text}'"),
            Node::Terminal(text) => format!("\"{text}\""),
            Node::Special(name) => format!("? {name} ?"),
            Node::Rule(rule) => self.rules[*rule].name.clone(),
            Node::Sequence(all) => joined(all, ", "),
            Node::Choice(all) => format!("( {} )", joined(all, " | ")),
            Node::Optional(a) => format!("[ {} ]", self.show(*a)),
            Node::Repeated(a) => format!("{{ {} }}", self.show(*a)),
            Node::UpTo(n, a) => format!("{n} * [ {} ]", self.show(*a)),
            Node::Except(a, b) => format!("( {} - {} )", self.show(*a), self.show(*b)),
        }
    }
}

#[derive(Clone, Debug, PartialEq, Eq)]
enum Token {
    Name(String),
    Number(usize),
    Terminal(String),
    Special(String),
    Sign(char),
    End,
}

/// The tokens with the numbers of their lines, the end last.
fn tokens(text: &str) -> Result<Vec<(Token, usize)>, String> {
    let mut found: Vec<(Token, usize)> = Vec::new();
    let mut line = 1;
    let mut rest = text;
    while let Some(c) = rest.chars().next() {
        let begins = line;
        let length = match c {
            '\n' => {
                line += 1;
                1
            }
            _ if c.is_whitespace() => c.len_utf8(),
            '(' if rest.starts_with("(*") => {
                comment(rest).ok_or_else(|| format!("line {begins}: a comment without its end"))?
            }
            '"' | '\'' | '?' => {
                let inside = &rest[1..];
                let end = inside
                    .find(c)
                    .filter(|end| c == '?' || *end > 0)
                    .ok_or_else(|| format!("line {begins}: nothing between {c} and {c}"))?;
                let inside = inside[..end].to_owned();
                found.push(match c {
                    '?' => (Token::Special(inside.trim().to_owned()), begins),
                    _ => (Token::Terminal(inside), begins),
                });
                end + 2
            }
            '0'..='9' => {
                let end = rest
                    .find(|c: char| !c.is_ascii_digit())
                    .unwrap_or(rest.len());
                let number = rest[..end]
                    .parse()
                    .map_err(|e| format!("line {begins}: {e}"))?;
                found.push((Token::Number(number), begins));
                end
            }
            _ if c.is_ascii_alphabetic() => {
                let end = rest
                    .find(|c: char| !c.is_ascii_alphanumeric())
                    .unwrap_or(rest.len());
                // The words of a name are one name.
                if let Some((Token::Name(name), _)) = found.last_mut() {
                    *name = format!("{name} {}", &rest[..end]);
                } else {
                    found.push((Token::Name(rest[..end].to_owned()), begins));
                }
                end
            }
            '=' | ',' | '|' | ';' | '-' | '*' | '(' | ')' | '[' | ']' | '{' | '}' => {
                found.push((Token::Sign(c), begins));
                1
            }
            _ => return Err(format!("line {begins}: {c} means nothing here")),
        };
        line += rest[..length].matches('\n').count() - usize::from(c == '\n');
        rest = &rest[length..];
    }
    found.push((Token::End, line));
    Ok(found)
}

/// The length of a comment; comments stand in one another.
fn comment(text: &str) -> Option<usize> {
    let mut depth = 0;
    let mut at = 0;
    loop {
        let rest = text.get(at..)?;
        if rest.starts_with("(*") {
            depth += 1;
            at += 2;
        } else if rest.starts_with("*)") {
            depth -= 1;
            at += 2;
            if depth == 0 {
                return Some(at);
            }
        } else {
            at += rest.chars().next()?.len_utf8();
        }
    }
}

struct Reader {
    tokens: Vec<(Token, usize)>,
    at: usize,
    grammar: Grammar,
    names: HashMap<String, usize>,
}

impl Reader {
    fn peek(&self) -> &Token {
        &self.tokens[self.at].0
    }

    fn take(&mut self) -> Token {
        let token = self.peek().clone();
        self.at += usize::from(token != Token::End);
        token
    }

    fn sign(&mut self, sign: char) -> bool {
        let found = self.peek() == &Token::Sign(sign);
        self.at += usize::from(found);
        found
    }

    fn expect(&mut self, sign: char) -> Result<(), String> {
        if self.sign(sign) {
            Ok(())
        } else {
            self.wrong(&sign.to_string())
        }
    }

    fn wrong<T>(&self, expected: &str) -> Result<T, String> {
        let (token, line) = &self.tokens[self.at];
        Err(format!("line {line}: expected {expected}, found {token:?}"))
    }

    fn push(&mut self, node: Node) -> Id {
        self.grammar.nodes.push(node);
        self.grammar.nodes.len() - 1
    }

    fn named(&mut self, name: String) -> usize {
        let rules = &mut self.grammar.rules;
        *self.names.entry(name).or_insert_with_key(|name| {
            rules.push(Rule {
                name: name.clone(),
                bodies: Vec::new(),
            });
            rules.len() - 1
        })
    }

    fn rule(&mut self) -> Result<(), String> {
        let Token::Name(name) = self.peek().clone() else {
            return self.wrong("the name of a rule");
        };
        self.at += 1;
        let rule = self.named(name);
        self.expect('=')?;
        let body = self.choice()?;
        self.expect(';')?;
        self.grammar.rules[rule].bodies.push(body);
        Ok(())
    }

    fn choice(&mut self) -> Result<Id, String> {
        let mut all = vec![self.sequence()?];
        while self.sign('|') {
            all.push(self.sequence()?);
        }
        Ok(if all.len() == 1 {
            all[0]
        } else {
            self.push(Node::Choice(all))
        })
    }

    fn sequence(&mut self) -> Result<Id, String> {
        let mut all = vec![self.term()?];
        while self.sign(',') {
            all.push(self.term()?);
        }
        Ok(if all.len() == 1 {
            all[0]
        } else {
            self.push(Node::Sequence(all))
        })
    }

    fn term(&mut self) -> Result<Id, String> {
        let a = self.factor()?;
        if !self.sign('-') {
            return Ok(a);
        }
        let b = self.factor()?;
        Ok(self.push(Node::Except(a, b)))
    }

    fn factor(&mut self) -> Result<Id, String> {
        let Token::Number(n) = *self.peek() else {
            return self.primary();
        };
        self.at += 1;
        self.expect('*')?;
        self.expect('[')?;
        let a = self.choice()?;
        self.expect(']')?;
        Ok(self.push(Node::UpTo(n, a)))
    }

    fn primary(&mut self) -> Result<Id, String> {
        let node = match self.take() {
            Token::Name(name) => Node::Rule(self.named(name)),
            Token::Terminal(text) => Node::Terminal(text),
            Token::Special(name) => Node::Special(name),
            Token::Sign('(') => {
                let a = self.choice()?;
                self.expect(')')?;
                return Ok(a);
            }
            Token::Sign('[') => {
                let a = self.choice()?;
                self.expect(']')?;
                Node::Optional(a)
            }
            Token::Sign('{') => {
                let a = self.choice()?;
                self.expect('}')?;
                Node::Repeated(a)
            }
            // The empty sequence of the standard.
            token => {
                self.at -= usize::from(token != Token::End);
                Node::Terminal(String::new())
            }
        };
        Ok(self.push(node))
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn faults(text: &str) -> Vec<String> {
        Grammar::read(text).unwrap().faults()
    }

    #[test]
    fn a_definition_is_read_as_it_is_written() {
        let text = "top  rule = 'a\"', \"\\\" - (b | ? blank ?), (* (* x *) *) [ { b }, 3 * [ b ] ] ; b = | \"x\";";
        let grammar = Grammar::read(text).unwrap();
        assert_eq!(grammar.rules[0].name, "top rule");
        assert_eq!(
            grammar.show(grammar.body(0).unwrap()),
            "'a\"', ( \"\\\" - ( b | ? blank ? ) ), [ { b }, 3 * [ b ] ]"
        );
        assert_eq!(grammar.show(grammar.body(1).unwrap()), "( \"\" | \"x\" )");
        for bad in [
            "a = \"x\"",
            "a \"x\";",
            "a = (\"x\";",
            "a = \"\";",
            "a = 2 * \"x\";",
            "(* a",
        ] {
            assert!(Grammar::read(bad).is_err(), "{bad}");
        }
    }

    #[test]
    fn faults_are_found() {
        assert_eq!(
            faults("a = \"x\", { b } ; b = \"y\" ;"),
            Vec::<String>::new()
        );
        for (text, fault) in [
            ("", "no rules"),
            ("a = b ;", "“b” is used but not defined"),
            ("a = \"x\" ; b = \"y\" ;", "“b” cannot be reached"),
            (
                "a = \"x\" ; b = c ; c = b | \"y\" ;",
                "“c” cannot be reached",
            ),
            ("a = \"x\" ; a = \"y\" ;", "more than once"),
            ("a = { [ \"x\" ] } ;", "without end"),
            (
                "a = { b } ; b = { \"x\" }, c ; c = 3 * [ \"y\" ] ;",
                "without end",
            ),
            (
                "a = \"x\" | \"y\", a, b ; b = \"z\", b ;",
                "“b” has no sentence",
            ),
            ("a = ? word ? ;", "no special sequence"),
        ] {
            let found = faults(text);
            assert!(
                found.iter().any(|found| found.contains(fault)),
                "{text}: {found:?}"
            );
        }
    }
}
