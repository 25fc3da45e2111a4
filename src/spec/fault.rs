//! What is wrong with a spec: place, text, reason and remedy.

use std::fmt;

/// Where something was typed.
#[derive(Clone, Debug, Default, PartialEq, Eq)]
pub struct Place {
    /// The file as the user named it, or `--set`.
    pub file: String,
    /// Line, counted from 1; 0 where there is none.
    pub line: usize,
    /// Dotted path of the key, such as `planform.taper_ratio`; empty where there is none.
    pub key: String,
}

/// One fault of the input.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Fault {
    /// Where it is.
    pub place: Place,
    /// The text as typed; empty where nothing was typed.
    pub text: String,
    /// What is wrong, with the allowed range.
    pub problem: String,
    /// What to change.
    pub remedy: String,
}

impl fmt::Display for Fault {
    fn fmt(&self, f: &mut fmt::Formatter<'_>) -> fmt::Result {
        write!(f, "{}", self.place.file)?;
        if self.place.line > 0 {
            write!(f, ":{}", self.place.line)?;
        }
        write!(f, ": ")?;
        if !self.place.key.is_empty() {
            write!(f, "{}", self.place.key)?;
            if !self.text.is_empty() {
                write!(f, " = {}", self.text)?;
            }
            write!(f, ": ")?;
        }
        write!(f, "{}", self.problem)?;
        if !self.remedy.is_empty() {
            write!(f, "\n  {}", self.remedy)?;
        }
        Ok(())
    }
}
