//! Text inside XML and HTML.

use std::fmt::{self, Display, Formatter};

/// A text as character data or as the value of an attribute in double quotes: markup characters are escaped, and
/// characters that XML forbids (most controls, U+FFFE, U+FFFF) become U+FFFD.
#[derive(Clone, Copy, Debug)]
pub struct Escaped<'a>(pub &'a str);

impl Display for Escaped<'_> {
    fn fmt(&self, out: &mut Formatter<'_>) -> fmt::Result {
        use fmt::Write;
        for character in self.0.chars() {
            match character {
                '&' => out.write_str("&amp;")?,
                '<' => out.write_str("&lt;")?,
                '>' => out.write_str("&gt;")?,
                '"' => out.write_str("&quot;")?,
                '\'' => out.write_str("&#39;")?,
                other => out.write_char(allowed(other))?,
            }
        }
        Ok(())
    }
}

/// The character, or U+FFFD where XML 1.0 (fifth edition, production 2) does not allow it. Line breaks and tabs become
/// spaces.
pub const fn allowed(character: char) -> char {
    match character {
        '\t' | '\n' | '\r' => ' ',
        '\0'..='\x1f' | '\x7f'..='\u{9f}' | '\u{fffe}' | '\u{ffff}' => '\u{fffd}',
        other => other,
    }
}

/// The text with every character [`allowed`] in XML.
pub fn clean(text: &str) -> String {
    text.chars().map(allowed).collect()
}

#[cfg(test)]
mod tests {
    use super::{Escaped, clean};

    #[test]
    fn markup_becomes_text() {
        assert_eq!(
            Escaped("<a href=\"x\">'&\u{1}").to_string(),
            "&lt;a href=&quot;x&quot;&gt;&#39;&amp;\u{fffd}"
        );
        assert_eq!(clean("a\u{0}b\nc\u{ffff}"), "a\u{fffd}b c\u{fffd}");
    }
}
