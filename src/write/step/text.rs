//! Part 21's strings and real numbers.
//!
//! ISO 10303-21:2002: strings hold the characters from space to `~`, an apostrophe and a reverse solidus doubled;
//! everything else stands in `\X2\` (four hexadecimal digits a character) or `\X4\` (eight), closed by `\X0\`. A real
//! number always has a decimal point, and its exponent a capital E.

use std::fmt::Write;

/// Appends `text` as a Part 21 string.
pub(super) fn put_string(text: &str, line: &mut String) {
    line.push('\'');
    let mut open = Directive::None;
    for c in text.chars() {
        let needs = Directive::of(c);
        if needs != open {
            line.push_str(open.end());
            line.push_str(needs.start());
            open = needs;
        }
        // writing into a string can't fail
        let _ = match needs {
            Directive::Two => write!(line, "{:04X}", u32::from(c)),
            Directive::Four => write!(line, "{:08X}", u32::from(c)),
            Directive::None => {
                if matches!(c, '\'' | '\\') {
                    line.push(c);
                }
                line.push(c);
                Ok(())
            }
        };
    }
    line.push_str(open.end());
    line.push('\'');
}

/// Which control directive a character stands in.
#[derive(Clone, Copy, PartialEq, Eq)]
enum Directive {
    None,
    Two,
    Four,
}

impl Directive {
    fn of(c: char) -> Self {
        match c {
            ' '..='~' => Self::None,
            '\u{0}'..='\u{FFFF}' => Self::Two,
            _ => Self::Four,
        }
    }

    const fn start(self) -> &'static str {
        match self {
            Self::None => "",
            Self::Two => "\\X2\\",
            Self::Four => "\\X4\\",
        }
    }

    const fn end(self) -> &'static str {
        match self {
            Self::None => "",
            Self::Two | Self::Four => "\\X0\\",
        }
    }
}

/// Appends `x` with the fewest digits that read back to the same bits (−0 as 0): plain from 1e-4 to 1e15, with an
/// exponent outside. `x` must be finite.
pub(super) fn put_real(x: f64, line: &mut String) {
    let size = x.abs();
    let x = if size > 0.0 { x } else { 0.0 };
    let start = line.len();
    // writing into a string can't fail
    if x == 0.0 || (1e-4..1e15).contains(&size) {
        let _ = write!(line, "{x}");
        if !line[start..].contains('.') {
            line.push('.');
        }
    } else {
        let _ = write!(line, "{x:E}");
        let at = start + line[start..].find('E').expect("the format writes an exponent");
        let exponent = line.split_off(at);
        if !line[start..].contains('.') {
            line.push('.');
        }
        let (sign, digits) = match exponent[1..].strip_prefix('-') {
            Some(digits) => ('-', digits),
            None => ('+', &exponent[1..]),
        };
        let _ = write!(line, "E{sign}{digits:0>2}");
    }
}
