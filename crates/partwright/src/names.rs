//! Names a user types: rules, families, and what is near a wrong one.

use partwright_rules::{FAMILIES, catalogue, entry, is_family};

/// Reads the name of a rule or of a family.
///
/// # Errors
/// A sentence that says what is near, for the parser of arguments to pass on.
pub(crate) fn rule_or_family(name: &str) -> Result<String, String> {
    if entry(name).is_some() || is_family(name) {
        return Ok(name.to_owned());
    }
    let known = catalogue()
        .iter()
        .map(|entry| entry.id.as_str())
        .chain(FAMILIES);
    let near = near(name, known);
    Err(match near.as_slice() {
        [] => "no rule or family has that name; `partwright rules` lists them".to_owned(),
        near => format!(
            "no rule or family has that name; did you mean {}?",
            near.join(" or ")
        ),
    })
}

/// The names nearest to a wrong one, nearest first, at most three: those a slip of the fingers
/// away, else those that hold one of its words.
pub(crate) fn near<'a>(wrong: &str, known: impl IntoIterator<Item = &'a str>) -> Vec<&'a str> {
    let wrong = wrong.to_lowercase().replace([' ', '_'], "-");
    let known: Vec<&str> = known.into_iter().collect();
    let slips = (wrong.chars().count() / 4).clamp(1, 3);
    let mut close: Vec<(usize, &str)> = known
        .iter()
        .map(|name| {
            (
                strsim::damerau_levenshtein(&wrong, &name.to_lowercase()),
                *name,
            )
        })
        .filter(|(distance, _)| *distance <= slips)
        .collect();
    close.sort_unstable();
    let mut names: Vec<&str> = close.first().map(|(_, name)| *name).into_iter().collect();
    if names.is_empty() {
        let words: Vec<&str> = wrong.split('-').filter(|word| word.len() > 3).collect();
        let holds = |name: &str| words.iter().filter(|word| name.contains(*word)).count();
        names = known.into_iter().filter(|name| holds(name) > 0).collect();
        names.sort_by_key(|name| std::cmp::Reverse(holds(name)));
    }
    names.truncate(3);
    names
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn the_nearest_name_is_offered() {
        let known = [
            "parallel-fifths",
            "parallel-octaves",
            "direct-fifths",
            "motion",
            "S1",
        ];
        assert_eq!(near("paralell-fifths", known), ["parallel-fifths"]);
        assert_eq!(near("Parallel Fifths", known), ["parallel-fifths"]);
        assert_eq!(near("motions", known), ["motion"]);
        assert_eq!(near("fifths", known), ["parallel-fifths", "direct-fifths"]);
        assert_eq!(near("s1", known), ["S1"]);
        assert!(near("zigzag", known).is_empty());
    }

    #[test]
    fn families_and_rules_are_names() {
        assert_eq!(rule_or_family("motion").as_deref(), Ok("motion"));
        assert_eq!(rule_or_family("crossing").as_deref(), Ok("crossing"));
        assert!(rule_or_family("crosing").is_err_and(|words| words.contains("crossing")));
    }
}
