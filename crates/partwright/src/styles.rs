//! The style a call asks for: one of ours, or a house style by its name.

use partwright_check::{Choice, House, Style};
use partwright_rules::STYLES;

use crate::names::near;
use crate::prose::list;

/// What `--style` asks for.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) enum Asked {
    /// Nothing: each sheet has its own.
    Nothing,
    /// One of ours.
    Style(Style),
    /// A house style of this name.
    House(String),
}

impl Asked {
    /// Reads the option.
    pub(crate) fn of(name: Option<&str>) -> Asked {
        match name.map(|name| (name, Style::named(name))) {
            None => Asked::Nothing,
            Some((_, Some(style))) => Asked::Style(style),
            Some((name, None)) => Asked::House(name.to_owned()),
        }
    }

    /// What it means where that house style is the nearest one.
    ///
    /// # Errors
    /// The name asked for, where the nearest house style goes by another or there is none.
    pub(crate) fn choice(&self, house: Option<&House>) -> Result<Option<Choice>, &str> {
        match self {
            Asked::Nothing => Ok(None),
            Asked::Style(style) => Ok(Some(Choice::Style(*style))),
            Asked::House(name) => {
                let here = house.is_some_and(|house| house.name.as_ref() == Some(name));
                if here {
                    Ok(Some(Choice::House))
                } else {
                    Err(name)
                }
            }
        }
    }
}

/// Says that no style has a name, and which have: `houses` are the house styles that were met.
pub(crate) fn unknown(name: &str, houses: &[String]) -> String {
    let ours = STYLES.iter().map(|style| style.name());
    let known: Vec<&str> = ours.chain(houses.iter().map(String::as_str)).collect();
    match near(name, known.iter().copied()).first() {
        Some(near) => format!("--style: no style is called {name}; did you mean {near}?"),
        None => format!(
            "--style: no style is called {name}; there is {}",
            list(&known)
        ),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn a_name_is_one_of_ours_or_the_nearest_houses() {
        let house = House {
            name: Some("quayside".to_owned()),
            ..House::default()
        };
        let choice =
            |name, house: Option<&House>| Asked::of(name).choice(house).map_err(str::to_owned);
        assert_eq!(choice(None, Some(&house)), Ok(None));
        let motet = Ok(Some(Choice::Style(Style::Motet)));
        assert_eq!(choice(Some("motet"), Some(&house)), motet);
        assert_eq!(choice(Some("motet"), None), motet);
        let quayside = Some("quayside");
        assert_eq!(choice(quayside, Some(&house)), Ok(Some(Choice::House)));
        assert_eq!(choice(quayside, None), Err("quayside".to_owned()));
    }

    #[test]
    fn a_wrong_name_is_answered_with_the_nearest() {
        let houses = ["quayside".to_owned()];
        assert!(unknown("chorle", &[]).contains("did you mean chorale?"));
        assert!(unknown("quaysid", &houses).contains("did you mean quayside?"));
        assert!(unknown("zigzag", &houses).ends_with("species-5 and quayside"));
    }
}
