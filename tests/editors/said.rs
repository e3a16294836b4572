//! What a script in an editor wrote, taken line by line.

pub(crate) struct Said(std::vec::IntoIter<String>);

impl Said {
    pub(crate) fn new(text: &str) -> Self {
        let lines: Vec<String> = text.lines().map(ToOwned::to_owned).collect();
        Self(lines.into_iter())
    }

    fn next(&mut self) -> String {
        self.0.next().unwrap_or_else(|| "(nothing more)".to_owned())
    }

    #[track_caller]
    pub(crate) fn exactly(&mut self, wanted: &str) {
        let line = self.next();
        assert_eq!(line, wanted, "\nand then\n{}", self.rest());
    }

    #[track_caller]
    pub(crate) fn after(&mut self, start: &str) -> String {
        let line = self.next();
        let Some(rest) = line.strip_prefix(start) else {
            panic!(
                "{line}\nwhere \"{start}\" was expected, and then\n{}",
                self.rest()
            );
        };
        rest.to_owned()
    }

    /// All the next lines with this start.
    pub(crate) fn all(&mut self, start: &str) -> Vec<String> {
        let mut taken = Vec::new();
        while let Some(rest) = self
            .0
            .as_slice()
            .first()
            .and_then(|line| line.strip_prefix(start))
        {
            taken.push(rest.to_owned());
            self.0.next();
        }
        taken
    }

    #[track_caller]
    pub(crate) fn end(&mut self) {
        assert_eq!(self.rest(), "");
    }

    fn rest(&self) -> String {
        self.0.as_slice().join("\n")
    }
}
