//! One rule whole: what it is, why, when, examples, what to do, and who says so.

use partwright_rules::source::{Known, Stand};
use partwright_rules::{Case, Entry, STYLES, Severity, Source, Style};

use super::{View, severity};
use crate::prose::{block, list, wrap};
use crate::report::{Plain, heading, severity_style};

/// A rule's page, in every style or in one.
pub(super) fn page(entry: &Entry, view: View<'_>, look: Plain) -> String {
    let mut text = format!("{} · {}\n", look.paint(heading(), &entry.id), entry.family);
    text.push_str(&block(&entry.page.title, look.width, 0));
    for paragraph in paragraphs(&entry.page.section("").unwrap_or_default()) {
        text.push('\n');
        text.push_str(&block(&paragraph, look.width, 0));
    }
    text.push_str(&title("When, and how strictly", look));
    for (i, case) in entry.rule.cases.iter().enumerate() {
        if i > 0 {
            text.push('\n');
        }
        text.push_str(&case_text(entry, case, view, look));
    }
    text.push_str(&numbers(entry, view, look));
    if let Some(house) = view.house() {
        text.push('\n');
        text.push_str(&house.changes(&[entry], false, look));
    }
    text.push_str(&sections(&entry.page.text, look));
    text.push_str(&title("Sources", look));
    for source in entry.rule.sources {
        text.push_str(&source_text(source, look.width));
    }
    text
}

fn title(words: &str, look: Plain) -> String {
    format!("\n{}\n", look.paint(heading(), words))
}

/// A case: when it applies, and what each style says to it. Styles that say the same share a line.
fn case_text(entry: &Entry, case: &Case, view: View<'_>, look: Plain) -> String {
    // A house style calls a case by its name.
    let name = match case.name {
        "" => String::new(),
        name => format!(" [{name}]"),
    };
    let when = format!("{}{name}", case.when.trim_end_matches('.'));
    let mut text = block(&sentence(&when), look.width, 2);
    if let Some(house) = view.house() {
        let (in_force, before) = (house.severity(entry, case), severity(case, house.base()));
        let because = if in_force == before {
            String::new()
        } else {
            format!("{} says {}", house.base().name(), word(before))
        };
        text.push_str(&said(in_force, &because, house.name(), look));
    }
    let mut all: Vec<(Option<_>, &str, Vec<Style>)> = Vec::new();
    for style in STYLES.into_iter().filter(|style| view.shows(*style)) {
        let because = case.setting(style).map_or("", |setting| setting.because);
        let severity = severity(case, style);
        match all
            .iter_mut()
            .find(|(s, b, _)| (*s, *b) == (severity, because))
        {
            Some((.., styles)) => styles.push(style),
            None => all.push((severity, because, vec![style])),
        }
    }
    for (severity, because, styles) in all {
        text.push_str(&said(severity, because, &styles_text(&styles), look));
    }
    text
}

/// The numbers in its conditions, and what the house style puts in their place.
fn numbers(entry: &Entry, view: View<'_>, look: Plain) -> String {
    if entry.rule.numbers.is_empty() {
        return String::new();
    }
    let mut text = title("Numbers", look);
    for number in entry.rule.numbers {
        let own = number.value;
        let value = match view
            .house()
            .map(|house| (house, house.number(entry, number)))
        {
            Some((house, set)) if set != own => {
                format!("{set} in {}, {own} without it", house.name())
            }
            _ => own.to_string(),
        };
        let words = format!("- {} {value}: {}", number.name, number.means);
        let lines = wrap(&words, look.width, 4).join("\n    ");
        text.push_str(&format!("  {lines}\n"));
    }
    text
}

fn word(severity: Option<Severity>) -> &'static str {
    severity.map_or("allowed", Severity::word)
}

/// `weakness in motet: lighter in many voices`.
fn said(severity: Option<Severity>, because: &str, styles: &str, look: Plain) -> String {
    let word = word(severity);
    let painted = severity.map_or(word.to_owned(), |severity| {
        look.paint(severity_style(severity), word)
    });
    let reason = if because.is_empty() {
        String::new()
    } else {
        format!(": {because}")
    };
    let lines = wrap(&format!("{word} in {styles}{reason}"), look.width, 6);
    let lines = lines.join("\n      ");
    format!(
        "    - {painted}{}\n",
        lines.strip_prefix(word).unwrap_or(&lines)
    )
}

/// The styles by name; all of them, and all the species, in a word.
fn styles_text(styles: &[Style]) -> String {
    if styles.len() == STYLES.len() {
        return "every style".to_owned();
    }
    let every = STYLES
        .into_iter()
        .filter(|style| style.is_species())
        .all(|style| styles.contains(&style));
    let mut names: Vec<&str> = styles
        .iter()
        .filter(|style| !(every && style.is_species()))
        .map(|style| style.name())
        .collect();
    if every {
        names.push("every species");
    }
    list(&names)
}

/// The page from its first heading on.
fn sections(page: &str, look: Plain) -> String {
    let mut text = String::new();
    let mut prose = String::new();
    let (mut inside, mut sheet) = (false, false);
    let end = std::iter::once("# ");
    for line in page.lines().chain(end) {
        if sheet {
            sheet = !line.starts_with("```");
            if sheet {
                text.push_str(format!("    {line}").trim_end());
                text.push('\n');
            }
            continue;
        }
        if inside && (line.starts_with("# ") || line.starts_with("```")) {
            for paragraph in paragraphs(&std::mem::take(&mut prose)) {
                text.push_str(&gap(&text));
                text.push_str(&block(&paragraph, look.width, 2));
            }
        }
        if let Some(words) = line.strip_prefix("# ") {
            inside = true;
            if !words.is_empty() {
                text.push_str(&title(words.trim(), look));
            }
        } else if let Some(kind) = line.strip_prefix("```") {
            sheet = true;
            text.push_str(&gap(&text));
            if kind.contains("mended") {
                text.push_str("    // mended:\n");
            }
        } else if inside {
            prose.push_str(line);
            prose.push('\n');
        }
    }
    text
}

/// An empty line between two blocks below one heading.
fn gap(text: &str) -> String {
    let after_block = text
        .lines()
        .next_back()
        .is_some_and(|line| line.starts_with("  "));
    if after_block {
        "\n".to_owned()
    } else {
        String::new()
    }
}

/// The paragraphs of a text, each on one line.
fn paragraphs(text: &str) -> Vec<String> {
    text.split("\n\n")
        .map(|p| p.split_whitespace().collect::<Vec<_>>().join(" "))
        .filter(|p| !p.is_empty())
        .collect()
}

/// The first letter large, a colon at the end.
fn sentence(words: &str) -> String {
    let mut letters = words.chars();
    let first: String = letters
        .next()
        .map(|c| c.to_uppercase().collect())
        .unwrap_or_default();
    format!("{first}{}:", letters.as_str())
}

/// A source, how it is known, and how it stands to the rule.
fn source_text(source: &Source, width: usize) -> String {
    let plain = Source {
        known: Known::Read,
        stand: Stand::Same,
        ..*source
    };
    let known = match source.known {
        Known::Read => "read".to_owned(),
        Known::AsGivenIn(text) => format!("as given in {text}"),
        Known::FromMemory => "from memory".to_owned(),
        Known::Counted => "counted in the music".to_owned(),
    };
    let stand = match (source.known, source.stand) {
        // A count is evidence, and says nothing.
        (Known::Counted, Stand::Same) => String::new(),
        (_, Stand::Same) => "; says the same".to_owned(),
        (_, Stand::Stricter(how)) => format!("; stricter: {how}"),
        (_, Stand::Looser(how)) => format!("; looser: {how}"),
    };
    let lines = wrap(&format!("{plain} [{known}{stand}]"), width, 4);
    format!("  - {}\n", lines.join("\n    "))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn styles_that_say_the_same_share_a_line() {
        assert_eq!(styles_text(&STYLES), "every style");
        assert_eq!(
            styles_text(&[Style::Free, Style::Chorale]),
            "free and chorale"
        );
        assert_eq!(styles_text(&STYLES[2..]), "motet and every species");
        assert_eq!(
            styles_text(&[Style::Species1, Style::Species2]),
            "species-1 and species-2"
        );
    }
}
