//! Escaped texts.

/// A text as it is meant: doubled apostrophes and reverse solidi single, `\X2\`, `\X4\` and `\X\` as characters.
///
/// # Errors
///
/// What is wrong with an escape.
pub(in crate::inspect) fn decode(text: &str) -> Result<String, String> {
    let mut out = String::with_capacity(text.len());
    let mut rest = text;
    while let Some(at) = rest.find(['\'', '\\']) {
        out.push_str(&rest[..at]);
        rest = &rest[at..];
        if let Some(after) = rest.strip_prefix("''").or_else(|| rest.strip_prefix("\\\\")) {
            out.push_str(&rest[..1]);
            rest = after;
        } else if let Some(after) = rest.strip_prefix("\\X2\\") {
            rest = characters(after, 4, &mut out)?;
        } else if let Some(after) = rest.strip_prefix("\\X4\\") {
            rest = characters(after, 8, &mut out)?;
        } else if let Some(after) = rest.strip_prefix("\\X\\") {
            // one character of ISO 8859-1, whose codes are Unicode's
            let digits = after.get(..2).ok_or("an escape \\X\\ is cut off")?;
            out.push(character(digits)?);
            rest = &after[2..];
        } else if let Some(after) = rest.strip_prefix("\\S\\") {
            let c = after
                .chars()
                .next()
                .filter(char::is_ascii)
                .ok_or("an escape \\S\\ is cut off")?;
            out.push(char::from_u32(u32::from(c) + 128).ok_or("an escape \\S\\ is no character")?);
            rest = &after[1..];
        } else {
            let shown: String = rest.chars().take(6).collect();
            return Err(format!("{shown:?} is no escape"));
        }
    }
    out.push_str(rest);
    Ok(out)
}

/// Characters of `size` hexadecimal digits each up to `\X0\`; gives what follows.
fn characters<'a>(text: &'a str, size: usize, out: &mut String) -> Result<&'a str, String> {
    let (digits, after) = text.split_once("\\X0\\").ok_or("an escape has no end \\X0\\")?;
    if digits.is_empty() || digits.len() % size != 0 || !digits.is_ascii() {
        return Err(format!("{digits:?} are no characters of {size} digits"));
    }
    for start in (0..digits.len()).step_by(size) {
        out.push(character(&digits[start..start + size])?);
    }
    Ok(after)
}

fn character(digits: &str) -> Result<char, String> {
    u32::from_str_radix(digits, 16)
        .ok()
        .and_then(char::from_u32)
        .ok_or_else(|| format!("{digits:?} is no character's code"))
}

#[cfg(test)]
mod tests {
    use super::decode;

    #[test]
    fn escapes_are_undone() {
        for (text, meant) in [
            ("plain", "plain"),
            ("it''s a\\\\b", "it's a\\b"),
            ("\\X2\\03B103B2\\X0\\ = 5\\X\\B0", "αβ = 5°"),
            ("\\X4\\0001F426\\X0\\", "\u{1F426}"),
            ("\\S\\d", "ä"),
        ] {
            assert_eq!(decode(text).as_deref(), Ok(meant));
        }
        for text in [
            "\\X2\\03B",
            "\\X2\\03B\\X0\\",
            "\\X2\\D800\\X0\\",
            "\\Q\\",
            "\\X\\G0",
            "\\",
        ] {
            assert!(decode(text).is_err(), "{text}");
        }
    }
}
