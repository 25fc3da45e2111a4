//! Rust source as tokens: enough of the language to see paths, without what comments and texts hold.

/// A token: an identifier, `::`, or a single character.
#[derive(Clone, Debug, PartialEq, Eq)]
pub(crate) struct Token {
    /// Its text.
    pub(crate) text: String,
    /// Line, counted from 1.
    pub(crate) line: usize,
}

/// The tokens of a source text; comments, texts and character literals are left out.
pub(crate) fn tokens(source: &str) -> Vec<Token> {
    let characters: Vec<char> = source.chars().collect();
    let mut found = Vec::new();
    let (mut at, mut line) = (0, 1);
    while at < characters.len() {
        let start = at;
        let here = characters[at];
        at = if characters[at..].starts_with(&['/', '/']) {
            position(&characters, at, |c| c == '\n')
        } else if characters[at..].starts_with(&['/', '*']) {
            after_comment(&characters, at)
        } else if here == '"' {
            after_text(&characters, at)
        } else if let Some(end) = after_raw_text(&characters, at) {
            end
        } else if here == '\'' {
            after_quote(&characters, at)
        } else if here.is_alphabetic() || here == '_' {
            let end = position(&characters, at, |c| !(c.is_alphanumeric() || c == '_'));
            found.push(Token {
                text: characters[at..end].iter().collect(),
                line,
            });
            end
        } else if characters[at..].starts_with(&[':', ':']) {
            found.push(Token {
                text: "::".to_owned(),
                line,
            });
            at + 2
        } else {
            if !here.is_whitespace() {
                found.push(Token {
                    text: here.to_string(),
                    line,
                });
            }
            at + 1
        };
        line += characters[start..at].iter().filter(|&&c| c == '\n').count();
    }
    found
}

/// First place from `at` where a character is as wanted, or the end.
fn position(characters: &[char], at: usize, wanted: impl Fn(char) -> bool) -> usize {
    characters[at..]
        .iter()
        .position(|&c| wanted(c))
        .map_or(characters.len(), |offset| at + offset)
}

/// The end of a block comment, which may hold others.
fn after_comment(characters: &[char], start: usize) -> usize {
    let (mut at, mut depth) = (start, 0);
    while at < characters.len() {
        if characters[at..].starts_with(&['/', '*']) {
            depth += 1;
            at += 2;
        } else if characters[at..].starts_with(&['*', '/']) {
            depth -= 1;
            at += 2;
            if depth == 0 {
                break;
            }
        } else {
            at += 1;
        }
    }
    at
}

/// The end of a text in double quotes.
fn after_text(characters: &[char], start: usize) -> usize {
    let mut at = start + 1;
    while at < characters.len() && characters[at] != '"' {
        at += if characters[at] == '\\' { 2 } else { 1 };
    }
    (at + 1).min(characters.len())
}

/// The end of a raw text such as `r#"..."#`, where one begins.
fn after_raw_text(characters: &[char], start: usize) -> Option<usize> {
    let prefix = usize::from(characters[start] == 'b');
    if characters.get(start + prefix) != Some(&'r') {
        return None;
    }
    let hashes = characters[start + prefix + 1..]
        .iter()
        .take_while(|&&c| c == '#')
        .count();
    let open = start + prefix + 1 + hashes;
    if characters.get(open) != Some(&'"') {
        return None;
    }
    let close = |at: usize| {
        characters[at] == '"' && characters[at + 1..].iter().take_while(|&&c| c == '#').count() >= hashes
    };
    let end = (open + 1..characters.len()).find(|&at| close(at));
    Some(end.map_or(characters.len(), |at| at + 1 + hashes))
}

/// The end of a character literal, or of the quote of a lifetime.
fn after_quote(characters: &[char], start: usize) -> usize {
    if characters.get(start + 1) == Some(&'\\') {
        return position(characters, start + 3, |c| c == '\'') + 1;
    }
    if characters.get(start + 2) == Some(&'\'') {
        start + 3
    } else {
        start + 1
    }
}

#[cfg(test)]
fn texts(source: &str) -> Vec<String> {
    tokens(source).into_iter().map(|token| token.text).collect()
}

#[test]
fn comments_texts_and_characters_are_left_out() {
    let source = "a // crate::b\n/* crate::c /* d */ e */ \"crate::\\\"f\" r#\"crate::\"g\"# b\"h\" '\\'' '\"' 'i' g::h<'j>";
    assert_eq!(texts(source), ["a", "b", "g", "::", "h", "<", "j", ">"]);
    assert_eq!(
        tokens("a\n/* \n */ b")[1],
        Token {
            text: "b".to_owned(),
            line: 3
        }
    );
}
