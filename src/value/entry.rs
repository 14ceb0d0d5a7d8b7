//! What is registered of a construction, step or function.

/// A parameter of a construction, step or function.
#[derive(Clone, Copy, Debug)]
pub struct Parameter {
    /// Its name.
    pub name: &'static str,
    /// What it takes, in a few words: `an integer`, `a matrix`.
    pub takes: &'static str,
    /// Whether it may be left out.
    pub optional: bool,
    /// Words that are values here by themselves, whatever else they mean elsewhere.
    pub words: &'static [&'static str],
    /// What it means.
    pub says: &'static str,
}

/// A parameter that must be given.
pub const fn needed(name: &'static str, takes: &'static str, says: &'static str) -> Parameter {
    Parameter {
        name,
        takes,
        optional: false,
        words: &[],
        says,
    }
}

/// A parameter that may be left out.
pub const fn optional(name: &'static str, takes: &'static str, says: &'static str) -> Parameter {
    Parameter {
        name,
        takes,
        optional: true,
        words: &[],
        says,
    }
}

impl Parameter {
    /// A parameter that also takes some words of its own.
    pub const fn or_words(self, words: &'static [&'static str]) -> Parameter {
        Parameter { words, ..self }
    }
}

/// What is registered of a construction, step or function: the single source for argument
/// checks, `explain`, completion and the language reference.
#[derive(Clone, Copy)]
pub struct Entry<Run> {
    /// Its name in the language.
    pub name: &'static str,
    /// Its parameters, in order.
    pub parameters: &'static [Parameter],
    /// What it is, in one sentence.
    pub says: &'static str,
    /// What is known of the result, by which theorem, with author and year.
    pub theory: &'static str,
    /// A complete spec that uses it; the tests run it, and its claims must hold.
    pub example: &'static str,
    /// What it does.
    pub run: Run,
}

impl<Run> Entry<Run> {
    /// How it is called: `identity(size)`.
    pub fn signature(&self) -> String {
        let parameters: Vec<String> = self
            .parameters
            .iter()
            .map(|parameter| match parameter.optional {
                true => format!("[{}]", parameter.name),
                false => parameter.name.to_string(),
            })
            .collect();
        if parameters.is_empty() {
            self.name.to_string()
        } else {
            format!("{}({})", self.name, parameters.join(", "))
        }
    }
}
