//! The file's form. The JSON schema is made from these same types.

use std::path::{Path, PathBuf};

use partwright_rules::{
    FAMILIES, Number, Override, STYLES, Severity, Style, catalogue, entry, is_family,
};
use schemars::JsonSchema;
use serde::Deserialize;
use toml::Spanned;

use super::{HouseError, HouseLicence};
use crate::filter::BarRange;

/// One file, taken apart.
pub(super) struct Parsed {
    pub(super) name: Option<String>,
    pub(super) base: Option<Style>,
    pub(super) include: Vec<String>,
    pub(super) across_phrases: Option<bool>,
    pub(super) overrides: Vec<Override>,
    pub(super) numbers: Vec<Number>,
    pub(super) reasons: Vec<(String, String)>,
    pub(super) licences: Vec<HouseLicence>,
}

/// A house style of partwright: a base, and what the house changes in it, each change with its
/// reason.
#[derive(Deserialize, JsonSchema)]
#[serde(deny_unknown_fields, rename_all = "kebab-case")]
#[schemars(title = "partwright.toml")]
struct File {
    /// The name by which a sheet may ask for this style.
    #[schemars(with = "Option<String>")]
    name: Option<Spanned<String>>,
    /// The style it starts from: free, chorale, motet, species-1 to species-5.
    #[schemars(with = "Option<String>")]
    base: Option<Spanned<String>>,
    /// Other files of the same form, read first; paths from this file's folder.
    #[serde(default)]
    include: Vec<String>,
    /// Look for consecutives and the like across the ends of phrases too.
    across_phrases: Option<bool>,
    /// Changes of severity.
    #[serde(default)]
    rule: Vec<RuleTable>,
    /// Numbers in the rules' conditions.
    #[serde(default)]
    number: Vec<NumberTable>,
    /// Licences for files that cannot carry their own.
    #[serde(default)]
    licence: Vec<LicenceTable>,
}

/// A change of severity.
#[derive(Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
struct RuleTable {
    /// A rule or a family of rules.
    #[schemars(with = "String")]
    rule: Spanned<String>,
    /// One case of the rule, by its name; all cases without this key.
    #[schemars(with = "Option<String>")]
    case: Option<Spanned<String>>,
    /// How strictly to take it.
    severity: SeverityWord,
    /// Why.
    #[schemars(with = "String")]
    reason: Spanned<String>,
}

#[derive(Deserialize, JsonSchema, Clone, Copy)]
#[serde(rename_all = "lowercase")]
enum SeverityWord {
    Fault,
    Weakness,
    Remark,
    Off,
}

/// A number in a rule's conditions.
#[derive(Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
struct NumberTable {
    /// The rule.
    #[schemars(with = "String")]
    rule: Spanned<String>,
    /// The number's name.
    #[schemars(with = "String")]
    name: Spanned<String>,
    /// Its value.
    #[schemars(with = "i32")]
    value: Spanned<i32>,
    /// Why.
    #[schemars(with = "String")]
    reason: Spanned<String>,
}

/// A licence for a file that cannot carry its own.
#[derive(Deserialize, JsonSchema)]
#[serde(deny_unknown_fields)]
struct LicenceTable {
    /// The file, from this file's folder; `*` and `**` as usual.
    path: String,
    /// The rules or families it lifts.
    #[schemars(with = "Vec<String>")]
    rule: Vec<Spanned<String>>,
    /// The bars, as in 12..20.
    #[schemars(with = "Option<String>")]
    bars: Option<Spanned<String>>,
    /// The voices.
    #[serde(default)]
    voices: Vec<String>,
    /// Why.
    #[schemars(with = "String")]
    reason: Spanned<String>,
}

/// The JSON schema of the file, for editors that complete and check it.
#[must_use]
pub fn schema() -> serde_json::Value {
    schemars::schema_for!(File).to_value()
}

/// Where and why.
struct Wrong<'a> {
    file: &'a Path,
    text: &'a str,
}

impl Wrong<'_> {
    fn at(&self, offset: usize, message: String) -> HouseError {
        HouseError {
            file: self.file.to_owned(),
            at: Some(partwright_sheet::line_column(self.text, offset)),
            message,
        }
    }

    fn word<T>(&self, word: &Spanned<T>, message: String) -> HouseError {
        self.at(word.span().start, message)
    }

    fn reason(&self, reason: &Spanned<String>) -> Result<String, HouseError> {
        let words = reason.get_ref().trim();
        if words.is_empty() {
            return Err(self.word(
                reason,
                "A reason is needed: say why the house wants it so.".to_owned(),
            ));
        }
        Ok(words.to_owned())
    }

    fn rule_or_family(&self, name: &Spanned<String>) -> Result<String, HouseError> {
        let word = name.get_ref();
        if entry(word).is_some() || is_family(word) {
            return Ok(word.clone());
        }
        let names: Vec<&str> = catalogue()
            .iter()
            .map(|e| e.id.as_str())
            .chain(FAMILIES)
            .collect();
        Err(self.word(
            name,
            format!(
                "No rule or family is called {word}. {}",
                nearest(word, &names)
            ),
        ))
    }
}

fn nearest(word: &str, names: &[&str]) -> String {
    let near = names
        .iter()
        .min_by_key(|name| strsim::damerau_levenshtein(name, word));
    match near.filter(|name| strsim::damerau_levenshtein(name, word) <= 1 + word.len() / 4) {
        Some(name) => format!("Did you mean {name}?"),
        None => format!("Allowed: {}.", names.join(", ")),
    }
}

pub(super) fn file(path: &Path, text: &str) -> Result<Parsed, HouseError> {
    let wrong = Wrong { file: path, text };
    let file: File = toml::from_str(text).map_err(|error| {
        let start = error.span().map_or(0, |span| span.start);
        // The library's words name the key and what is allowed; only their form is ours.
        let message = error.message().trim_end_matches('.').replace('`', "");
        let mut letters = message.chars();
        let capital = letters
            .next()
            .map(|c| c.to_uppercase().to_string())
            .unwrap_or_default();
        wrong.at(
            start,
            format!("{capital}{}.", letters.as_str().replace('\n', "; ")),
        )
    })?;
    Ok(Parsed {
        name: file
            .name
            .map(|name| house_name(&name, &wrong))
            .transpose()?,
        base: file
            .base
            .map(|base| base_style(&base, &wrong))
            .transpose()?,
        include: file.include,
        across_phrases: file.across_phrases,
        reasons: reasons(&file.rule, &file.number),
        overrides: file
            .rule
            .iter()
            .map(|table| change(table, &wrong))
            .collect::<Result<_, _>>()?,
        numbers: file
            .number
            .iter()
            .map(|table| number(table, &wrong))
            .collect::<Result<_, _>>()?,
        licences: file
            .licence
            .iter()
            .map(|table| licence(table, &wrong))
            .collect::<Result<_, _>>()?,
    })
}

fn reasons(rules: &[RuleTable], numbers: &[NumberTable]) -> Vec<(String, String)> {
    let rules = rules
        .iter()
        .map(|t| (t.rule.get_ref().clone(), t.reason.get_ref().clone()));
    let numbers = numbers
        .iter()
        .map(|t| (t.rule.get_ref().clone(), t.reason.get_ref().clone()));
    rules.chain(numbers).collect()
}

fn house_name(name: &Spanned<String>, wrong: &Wrong<'_>) -> Result<String, HouseError> {
    let word = name.get_ref();
    let lawful = |c: char| c.is_ascii_lowercase() || c.is_ascii_digit() || c == '-';
    if Style::named(word).is_some() {
        return Err(wrong.word(
            name,
            format!("{word} is a style already: choose another name."),
        ));
    }
    if word.is_empty() || !word.chars().all(lawful) {
        return Err(wrong.word(
            name,
            "A name is made of small letters, digits and hyphens.".to_owned(),
        ));
    }
    Ok(word.clone())
}

fn base_style(base: &Spanned<String>, wrong: &Wrong<'_>) -> Result<Style, HouseError> {
    let names: Vec<&str> = STYLES.iter().map(|s| s.name()).collect();
    Style::named(base.get_ref()).ok_or_else(|| {
        wrong.word(
            base,
            format!(
                "No style is called {}. {}",
                base.get_ref(),
                nearest(base.get_ref(), &names)
            ),
        )
    })
}

fn change(table: &RuleTable, wrong: &Wrong<'_>) -> Result<Override, HouseError> {
    let rule = wrong.rule_or_family(&table.rule)?;
    if rule == "reading" && !matches!(table.severity, SeverityWord::Fault) {
        return Err(wrong.word(&table.rule, "What cannot be read stays a fault.".to_owned()));
    }
    if let Some(case) = &table.case {
        let cases: Vec<&str> =
            entry(&rule).map_or_else(Vec::new, |e| e.rule.cases.iter().map(|c| c.name).collect());
        if !cases.contains(&case.get_ref().as_str()) {
            let named: Vec<&str> = cases.into_iter().filter(|name| !name.is_empty()).collect();
            let allowed = if named.is_empty() {
                "It has none.".to_owned()
            } else {
                nearest(case.get_ref(), &named)
            };
            return Err(wrong.word(
                case,
                format!("{rule} has no case called {}. {allowed}", case.get_ref()),
            ));
        }
    }
    wrong.reason(&table.reason)?;
    let severity = match table.severity {
        SeverityWord::Fault => Some(Severity::Fault),
        SeverityWord::Weakness => Some(Severity::Weakness),
        SeverityWord::Remark => Some(Severity::Remark),
        SeverityWord::Off => None,
    };
    Ok(Override {
        rule,
        case: table.case.as_ref().map(|c| c.get_ref().clone()),
        severity,
    })
}

fn number(table: &NumberTable, wrong: &Wrong<'_>) -> Result<Number, HouseError> {
    let rule = wrong.rule_or_family(&table.rule)?;
    let numbers = entry(&rule).map_or(&[][..], |e| e.rule.numbers);
    let names: Vec<&str> = numbers.iter().map(|n| n.name).collect();
    let Some(known) = numbers.iter().find(|n| n.name == table.name.get_ref()) else {
        let allowed = if names.is_empty() {
            "It has none.".to_owned()
        } else {
            nearest(table.name.get_ref(), &names)
        };
        return Err(wrong.word(
            &table.name,
            format!(
                "{rule} has no number called {}. {allowed}",
                table.name.get_ref()
            ),
        ));
    };
    let (least, most) = known.bounds;
    let value = *table.value.get_ref();
    if !(least..=most).contains(&value) {
        return Err(wrong.word(
            &table.value,
            format!("{} must be {least} to {most}: {}.", known.name, known.means),
        ));
    }
    wrong.reason(&table.reason)?;
    Ok(Number {
        rule,
        name: known.name.to_owned(),
        value,
    })
}

fn licence(table: &LicenceTable, wrong: &Wrong<'_>) -> Result<HouseLicence, HouseError> {
    let rules = table
        .rule
        .iter()
        .map(|name| wrong.rule_or_family(name))
        .collect::<Result<Vec<_>, _>>()?;
    if rules.is_empty() || rules.iter().any(|rule| rule == "reading") {
        return Err(wrong.word(
            &table.reason,
            "A licence names at least one rule, and never reading.".to_owned(),
        ));
    }
    let bars = match &table.bars {
        Some(bars) => Some(
            bars.get_ref()
                .parse::<BarRange>()
                .map_err(|e| wrong.word(bars, format!("{e}.")))?,
        ),
        None => None,
    };
    Ok(HouseLicence {
        path: table.path.clone(),
        folder: PathBuf::new(),
        rules,
        bars,
        voices: table.voices.clone(),
        reason: wrong.reason(&table.reason)?,
    })
}
