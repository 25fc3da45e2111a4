//! A line of text to a row of numbers, in whatever notation.

/// A number with the decimals it was printed with.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Number {
    /// Its value; not finite where the file says so.
    pub(super) value: f64,
    /// Decimals: 3 for `0.125`, 5 for `1.25e-3`, negative for `2e3`.
    pub(super) decimals: i32,
    /// Whether it was typed as a whole number, without point, comma or exponent.
    pub(super) whole: bool,
    /// Whether it begins with a zero that a number does not need: `0012`.
    pub(super) padded: bool,
}

/// Whether the file's numbers have decimal commas: then more of its lines read as two, three or four numbers with
/// commas as decimal signs than as two or three with commas as separators. The first thousand with commas tell.
pub(super) fn decimal_comma<'a>(lines: impl Iterator<Item = &'a str>) -> bool {
    let mut found = [[0_usize; 5]; 2];
    for line in lines.filter(|line| line.contains(',')).take(1000) {
        for (comma, counts) in [false, true].into_iter().zip(&mut found) {
            if let Some(count) = row(line, comma).and_then(|numbers| counts.get_mut(numbers.len())) {
                *count += 1;
            }
        }
    }
    let [point, comma] = found;
    // `0,5; ,06` reads as three whole numbers too
    let pairs = comma[2] > point[2] && comma[2] >= point[3];
    pairs || point[2].max(point[3]) < comma[3].max(comma[4])
}

/// The numbers of a line, or nothing where anything else is on it.
pub(super) fn row(line: &str, comma: bool) -> Option<Vec<Number>> {
    let between = |c: char| {
        c.is_whitespace()
            || matches!(c, ';' | '(' | ')' | '[' | ']' | '{' | '}' | '"')
            || (c == ',' && !comma)
    };
    let mut numbers = Vec::with_capacity(2);
    let mut known = false;
    for token in line.split(between) {
        let token = if comma { token.trim_end_matches(',') } else { token };
        if token.is_empty() {
            continue;
        }
        let number = number(token, comma)?;
        known |= number.value.is_finite();
        numbers.push(number);
    }
    known.then_some(numbers)
}

/// One number: sign, digits with a decimal sign anywhere, exponent with E or D.
fn number(token: &str, comma: bool) -> Option<Number> {
    let sign = if comma { b',' } else { b'.' };
    let mut plain = [0_u8; 48];
    let mut length = 0;
    let (mut digits, mut fraction, mut power_digits) = (0_i32, None, 0_i32);
    let mut power: Option<i32> = None;
    let mut negative = false;
    let mut before = b' ';
    let simplified = if token.is_ascii() {
        None
    } else {
        Some(token.replace(['\u{2212}', '\u{2013}'], "-"))
    };
    let text = simplified.as_deref().unwrap_or(token);
    for &b in text.as_bytes() {
        let put = match b {
            b'0'..=b'9' => {
                if let Some(power) = &mut power {
                    *power = (*power * 10 + i32::from(b - b'0')).min(9999);
                    power_digits += 1;
                } else {
                    digits += 1;
                    if let Some(fraction) = &mut fraction {
                        *fraction += 1;
                    }
                }
                b
            }
            b'+' | b'-' if before == b' ' => b,
            b'+' | b'-' if before == b'e' => {
                negative = b == b'-';
                b
            }
            b'e' | b'E' | b'd' | b'D' if power.is_none() && digits > 0 => {
                power = Some(0);
                b'e'
            }
            _ if b == sign && fraction.is_none() && power.is_none() => {
                fraction = Some(0);
                b'.'
            }
            _ => return not_finite(text),
        };
        before = put;
        // more characters than any exact number needs
        *plain.get_mut(length)? = put;
        length += 1;
    }
    if digits == 0 || (power.is_some() && power_digits == 0) {
        return None;
    }
    let value = std::str::from_utf8(&plain[..length]).ok()?.parse().ok()?;
    let power = power.map(|p| if negative { -p } else { p });
    Some(Number {
        value,
        decimals: fraction.unwrap_or(0) - power.unwrap_or(0),
        whole: fraction.is_none() && power.is_none(),
        padded: text.len() > 1 && text.starts_with('0') && text.as_bytes()[1].is_ascii_digit(),
    })
}

/// What programs print for a number that is none.
fn not_finite(token: &str) -> Option<Number> {
    let bare = token.trim_start_matches(['+', '-']).to_ascii_lowercase();
    let known = matches!(
        bare.as_str(),
        "nan" | "inf" | "infinity" | "1.#inf" | "1.#ind" | "1.#qnan" | "nanq"
    ) || (bare.len() > 2 && bare.bytes().all(|b| b == b'*'));
    known.then_some(Number {
        value: f64::NAN,
        decimals: 0,
        whole: false,
        padded: false,
    })
}
