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

/// The start of a typed text, on one line and short enough for a message.
pub(super) fn excerpt(text: &str) -> String {
    const LONGEST: usize = 60;
    let mut short: String = text.lines().next().unwrap_or("").chars().take(LONGEST).collect();
    if short.len() < text.len() {
        short.push('…');
    }
    short
        .chars()
        .flat_map(|c| {
            if c.is_control() {
                c.escape_default().collect()
            } else {
                vec![c]
            }
        })
        .collect()
}

/// Puts faults in the order of the file: by line, then those without a line, then those of `--set`.
pub fn sort_faults(faults: &mut [Fault]) {
    faults.sort_by_key(|fault| fault.place.rank());
}

impl Place {
    /// What `file` says for a value that was typed on the command line.
    pub const SET: &'static str = "--set";

    /// Later places have higher ranks: by line, then those without a line, then `--set`.
    pub(super) fn rank(&self) -> (bool, usize) {
        (
            self.file == Self::SET,
            if self.line == 0 { usize::MAX } else { self.line },
        )
    }

    /// How another message refers to this place: `line 3` or `--set`.
    pub(super) fn short(&self) -> String {
        if self.line > 0 {
            format!("line {}", self.line)
        } else {
            self.file.clone()
        }
    }
}
