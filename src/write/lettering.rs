//! Widths of texts, so that what is written fits where it is put.
//!
//! The widths are those of the common sans-serif of the page description languages (advance widths of Helvetica, which
//! Arial and Liberation Sans share), in thousandths of the font size; from memory, checked against Liberation Sans.

/// Advance widths of the characters from U+0020 to U+007E.
const WIDTHS: [u16; 95] = [
    278, 278, 355, 556, 556, 889, 667, 191, 333, 333, 389, 584, 278, 333, 278, 278, // space to /
    556, 556, 556, 556, 556, 556, 556, 556, 556, 556, 278, 278, 584, 584, 584, 556, // 0 to ?
    1015, 667, 667, 722, 722, 667, 611, 778, 722, 278, 500, 667, 556, 833, 722, 778, // @ to O
    667, 778, 722, 667, 611, 722, 667, 944, 667, 667, 611, 278, 278, 278, 469, 556, // P to _
    333, 556, 556, 500, 556, 556, 278, 556, 556, 222, 222, 500, 222, 833, 556, 556, // ` to o
    556, 556, 333, 500, 278, 556, 500, 722, 500, 500, 500, 334, 260, 334, 584, // p to ~
];

/// Height of capitals over the font size.
pub const CAPITALS: f64 = 0.716;

/// Families of sans-serif fonts that have these widths, best first, as CSS lists them.
pub const FAMILIES: &str = "Arial, Helvetica, 'Liberation Sans', Arimo, sans-serif";

/// Width of a character over the font size; `None` where only the font knows.
fn advance(character: char) -> Option<f64> {
    let thousandths = match character {
        ' '..='~' => WIDTHS[usize::try_from(u32::from(character) - 0x20).ok()?],
        '°' => 400,
        '²' | '³' => 333,
        '±' => 549,
        '×' | '−' => 584,
        '–' => 556,
        '¼' => 834,
        '…' => 1000,
        _ => return None,
    };
    Some(f64::from(thousandths) / 1000.0)
}

/// Width of a text set at `size`, in the unit of `size`. Characters that are not in the table count as a full square,
/// which few are wider than.
pub fn width(text: &str, size: f64) -> f64 {
    text.chars().map(|c| advance(c).unwrap_or(1.0)).sum::<f64>() * size
}

/// Whether [`width`] is exact: every character is in the table.
pub fn is_known(text: &str) -> bool {
    text.chars().all(|c| advance(c).is_some())
}

/// The text, or as much of its beginning as fits `room` with an ellipsis after it.
pub fn fitted(text: &str, size: f64, room: f64) -> String {
    if width(text, size) <= room {
        return text.to_owned();
    }
    let mut left = room - width("…", size);
    let kept = text.chars().take_while(|c| {
        left -= advance(*c).unwrap_or(1.0) * size;
        left >= 0.0
    });
    let kept: String = kept.collect();
    format!("{}…", kept.trim_end())
}

/// The text on at most `lines` lines of width `room`, broken between words where there are any; what does not fit is
/// left out behind an ellipsis.
pub fn folded(text: &str, size: f64, room: f64, lines: usize) -> Vec<String> {
    let mut found: Vec<String> = Vec::new();
    let mut rest = text.trim();
    while !rest.is_empty() && found.len() < lines {
        if found.len() + 1 == lines {
            found.push(fitted(rest, size, room));
            break;
        }
        let (mut total, mut end, mut word_end) = (0.0, rest.len(), None);
        for (at, character) in rest.char_indices() {
            total += advance(character).unwrap_or(1.0) * size;
            if total > room {
                end = at;
                break;
            }
            if character.is_whitespace() {
                word_end = Some(at);
            }
        }
        if end < rest.len() {
            end = word_end.filter(|at| *at > 0).unwrap_or(end);
        }
        if end == 0 {
            found.push(fitted(rest, size, room));
            break;
        }
        found.push(rest[..end].trim_end().to_owned());
        rest = rest[end..].trim_start();
    }
    found
}

#[cfg(test)]
mod tests {
    use super::{fitted, folded, is_known, width};

    #[test]
    fn widths_are_those_of_the_font() {
        // Liberation Sans 2.1.5, advances by its hmtx table over 2048: "Span 262.5 mm" is 7.0596 em
        assert!((width("Span 262.5 mm", 1.0) - 7.0596).abs() < 1e-3);
        assert!(is_known("12° ± 3 −4") && !is_known("مرحبا"));
    }

    #[test]
    fn what_is_too_long_ends_in_an_ellipsis_and_fits() {
        for text in ["a".repeat(10_000), "جناح".repeat(2_500), "two words ".repeat(500)] {
            for room in [3.0, 10.0, 80.0] {
                let short = fitted(&text, 3.5, room);
                assert!(
                    short.ends_with('…') && width(&short, 3.5) <= room.max(3.5),
                    "{short}"
                );
                for line in folded(&text, 3.5, room, 2) {
                    assert!(width(&line, 3.5) <= room.max(3.5), "{line}");
                }
            }
        }
        assert_eq!(folded("one two three", 1.0, 4.0, 3), ["one two", "three"]);
        assert_eq!(fitted("short", 1.0, 9.0), "short");
    }
}
