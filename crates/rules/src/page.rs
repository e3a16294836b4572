//! A rule's page: the comment at the head of its file, which is its documentation, its hover
//! and its test.

/// An example of a page.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Example {
    /// The heading it stands under: `Fails`, `Passes` or `Does not apply`.
    pub heading: String,
    /// The sheet, with marks drawn under the notes.
    pub sheet: String,
    /// The line of the file on which the sheet starts, from 1.
    pub line: usize,
}

/// A rule's page, taken apart.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Page {
    /// The first line.
    pub title: String,
    /// The whole page, as Markdown.
    pub text: String,
    /// Its examples.
    pub examples: Vec<Example>,
}

impl Page {
    /// Reads the `//!` lines at the head of a rule file.
    #[must_use]
    pub fn of(file: &str) -> Page {
        let lines: Vec<&str> = file
            .lines()
            .map_while(|line| line.strip_prefix("//!"))
            .map(|line| line.strip_prefix(' ').unwrap_or(line))
            .collect();
        let mut examples = Vec::new();
        let mut heading = String::new();
        let mut open: Option<Example> = None;
        for (i, &line) in lines.iter().enumerate() {
            match &mut open {
                Some(example) if line.starts_with("```") => {
                    examples.push(example.clone());
                    open = None;
                }
                Some(example) => {
                    example.sheet.push_str(line);
                    example.sheet.push('\n');
                }
                None if line.starts_with("```voices") => {
                    open = Some(Example {
                        heading: heading.clone(),
                        sheet: String::new(),
                        line: i + 2,
                    });
                }
                None => {
                    if let Some(words) = line.strip_prefix("# ") {
                        words.trim().clone_into(&mut heading);
                    }
                }
            }
        }
        Page {
            title: lines
                .first()
                .map(|line| line.trim().to_owned())
                .unwrap_or_default(),
            text: lines.join("\n").trim().to_owned(),
            examples,
        }
    }

    /// The text under a heading, or `None` without that heading. The text before the first
    /// heading, title left out, goes by the empty name.
    #[must_use]
    pub fn section(&self, heading: &str) -> Option<String> {
        let mut here = heading.is_empty();
        let mut found = here;
        let mut text = String::new();
        for line in self.text.lines().skip(1) {
            if let Some(words) = line.strip_prefix("# ") {
                here = words.trim() == heading;
                found |= here;
            } else if here {
                text.push_str(line);
                text.push('\n');
            }
        }
        found.then(|| text.trim().to_owned())
    }
}
