//! Points to a coordinate file in either public layout.

use std::fmt::Write;

/// One loop: the title, then a row of x and y for each point in the order given.
///
/// `points` are in any unit; `decimals` are printed.
pub fn write_loop(title: &str, points: &[[f64; 2]], decimals: usize) -> String {
    let mut out = heading(title);
    rows(&mut out, points.iter(), decimals);
    out
}

/// Two blocks: the title, the numbers of points of the sides, then the upper and the lower side, each from the nose to
/// the trailing edge and after a blank line. The nose stands in both.
///
/// `points` run from the upper trailing edge over the top to the nose, at index `nose`, and back under the bottom.
pub fn write_blocks(title: &str, points: &[[f64; 2]], nose: usize, decimals: usize) -> String {
    let mut out = heading(title);
    let nose = nose.min(points.len().saturating_sub(1));
    let upper = points.get(..=nose).unwrap_or(&[]);
    let lower = points.get(nose..).unwrap_or(&[]);
    push(
        &mut out,
        format_args!(
            "{:>width$}. {:>width$}.\n\n",
            upper.len(),
            lower.len(),
            width = decimals + 3
        ),
    );
    rows(&mut out, upper.iter().rev(), decimals);
    out.push('\n');
    rows(&mut out, lower.iter(), decimals);
    out
}

fn push(out: &mut String, text: std::fmt::Arguments<'_>) {
    out.write_fmt(text).expect("writing to a string cannot fail");
}

/// The title on one line.
fn heading(title: &str) -> String {
    let title: String = title
        .chars()
        .map(|c| if c.is_control() { ' ' } else { c })
        .collect();
    let title = title.trim();
    format!("{}\n", if title.is_empty() { "section" } else { title })
}

fn rows<'a>(out: &mut String, points: impl Iterator<Item = &'a [f64; 2]>, decimals: usize) {
    let width = decimals + 4;
    for [x, y] in points {
        let [x, y] = [x, y].map(|v| {
            let text = format!("{v:.decimals$}");
            // no negative zero
            if text.bytes().all(|b| matches!(b, b'-' | b'0' | b'.')) {
                format!("{:.decimals$}", 0.0)
            } else {
                text
            }
        });
        push(out, format_args!("{x:>width$} {y:>width$}\n"));
    }
}
