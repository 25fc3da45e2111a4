//! Lines to points: title, counts and columns.

use crate::airfoil::coordinates::error::Error;
use crate::airfoil::coordinates::number::Number;
use crate::airfoil::coordinates::text::{Kind, Line, place};
use crate::airfoil::coordinates::{MAX_POINTS, MIN_SIDE};

/// A point as given, with its line.
#[derive(Clone, Copy, Debug, PartialEq)]
pub(super) struct Point {
    /// Coordinates in the file's units.
    pub(super) at: [f64; 2],
    /// Line, from 1.
    pub(super) line: usize,
}

/// What the file lists.
#[derive(Clone, Debug)]
pub(super) struct Listing {
    /// Title, where there is one.
    pub(super) title: Option<String>,
    /// The points in the file's order.
    pub(super) points: Vec<Point>,
    /// Where the second side begins according to the file's counts, with their line.
    pub(super) counted: Option<(usize, usize)>,
    /// Where lines of words stand: index of the point that follows, and line.
    pub(super) headings: Vec<(usize, usize)>,
    /// Decimals of x and y.
    pub(super) decimals: [i32; 2],
}

/// A row of numbers with its line.
struct Row<'a> {
    numbers: &'a [Number],
    line: usize,
}

impl Row<'_> {
    fn pair(&self) -> Option<[f64; 2]> {
        match self.numbers {
            [a, b] => Some([a.value, b.value]),
            _ => None,
        }
    }
}

/// Tells title, counts and coordinates apart.
pub(super) fn recognise(lines: &[Line<'_>], notes: &mut Vec<String>) -> Result<Listing, Error> {
    let mut rows = Vec::new();
    let mut words = Vec::new();
    let mut remark = None;
    for (i, line) in lines.iter().enumerate() {
        match &line.kind {
            Kind::Blank => (),
            Kind::Remark(text) => {
                if remark.is_none() && !text.is_empty() {
                    remark = Some(text.clone());
                }
            }
            Kind::Words => words.push((rows.len(), i + 1)),
            Kind::Numbers(numbers) => rows.push(Row { numbers, line: i + 1 }),
        }
    }
    let columns = usual_columns(&rows);
    if rows.is_empty() || columns < 2 {
        return Err(Error::NoPoints { at: place(lines, 1) });
    }
    let titled = words.first().is_some_and(|&(at, _)| at == 0);
    let lead = lead(&rows, columns, titled, lines)?;
    check_words(&mut words, &rows, lead.start, lines, notes)?;
    let first_words = words
        .iter()
        .find(|&&(at, _)| at <= lead.start)
        .map(|&(_, line)| line);
    let title_line = match (first_words, lead.titles.first()) {
        (Some(a), Some(&b)) => Some(a.min(b)),
        (a, b) => a.or(b.copied()),
    };
    let title = title_line.map(|line| place(lines, line).text).or(remark);
    let headers = words.iter().filter(|&&(at, _)| at <= lead.start).count() + lead.titles.len();
    if headers > 1 {
        notes.push(format!("{headers} header lines; the first is the title."));
    }
    if let Some(&line) = lead.titles.first().filter(|&&line| title_line == Some(line)) {
        notes.push(format!("The numbers of line {line} are the title."));
    }
    let rows = &rows[lead.start..];
    if let Some(row) = rows.get(MAX_POINTS) {
        return Err(Error::TooManyPoints {
            at: place(lines, row.line),
        });
    }
    for row in rows {
        let (at, found) = (place(lines, row.line), row.numbers.len());
        if found != columns {
            return Err(Error::Columns {
                at,
                found,
                usual: columns,
            });
        }
        if row
            .numbers
            .iter()
            .any(|n| !n.value.is_finite() || n.value.abs() > 1e12)
        {
            return Err(Error::NotFinite { at });
        }
    }
    let (points, table, decimals) = pick(rows, columns, lines, notes)?;
    let headings = words
        .iter()
        .filter(|&&(at, _)| at > lead.start)
        .map(|&(at, line)| (at - lead.start, line));
    Ok(Listing {
        title,
        points,
        counted: table.or(lead.counted),
        headings: headings.collect(),
        decimals,
    })
}

/// The number of columns that most rows have.
fn usual_columns(rows: &[Row<'_>]) -> usize {
    let mut found = [0_usize; 5];
    for row in rows {
        if let Some(count) = found.get_mut(row.numbers.len()) {
            *count += 1;
        }
    }
    (1..5).rev().max_by_key(|&k| found[k]).unwrap_or(0)
}

/// Rows of numbers before the first point.
struct Lead {
    start: usize,
    titles: Vec<usize>,
    counted: Option<(usize, usize)>,
}

/// Skips titles made of numbers and reads counts.
fn lead(rows: &[Row<'_>], columns: usize, titled: bool, lines: &[Line<'_>]) -> Result<Lead, Error> {
    let mut lead = Lead {
        start: 0,
        titles: Vec::new(),
        counted: None,
    };
    for (i, row) in rows.iter().enumerate().take(4) {
        let rest = rows.len() - i - 1;
        let whole = |v: f64| v.fract().abs() <= 0.0 && (1.0..1e6).contains(&v);
        if let Some([a, b]) = row.pair().filter(|&[a, b]| whole(a) && whole(b)) {
            let sum = a + b;
            let padded = row.numbers.iter().any(|n| n.padded);
            if (sum - rest as f64).abs() < 0.5 && a.min(b) >= 3.0 && !padded {
                let split = rows[i + 1..]
                    .iter()
                    .zip(1_usize..)
                    .take_while(|&(_, k)| k as f64 <= a)
                    .count();
                return Ok(Lead {
                    start: i + 1,
                    counted: Some((split, row.line)),
                    ..lead
                });
            }
            if columns == 2 && begins(&rows[i..]) && !(typed_apart(&rows[i..]) && b > 0.0) {
                return Ok(lead);
            }
            // not the title when a title stands before it, or when it is near what the file holds
            let near = sum > 0.5 * rest as f64 && sum < 2.0 * rest as f64 && a.min(b) > 0.3 * a.max(b);
            let after_title = titled || !lead.titles.is_empty();
            if !padded && (near || after_title && a.min(b) >= MIN_SIDE as f64 && a.max(b) < 1000.0) {
                let found = format!("{rest} points follow");
                return Err(Error::Counts {
                    at: place(lines, row.line),
                    found,
                });
            }
        } else if row.numbers.len() == columns && (columns != 2 || begins(&rows[i..])) {
            return Ok(lead);
        } else if row.numbers.len() > 1 && row.numbers.iter().all(|n| !n.whole) {
            // printed as coordinates are: let the later checks say what is wrong with it
            return Ok(lead);
        }
        lead.titles.push(row.line);
        lead.start = i + 1;
    }
    Ok(lead)
}

/// Whether the first row is typed in whole numbers, and nearly all that follow the header are not.
fn typed_apart(rows: &[Row<'_>]) -> bool {
    let whole = |row: &Row<'_>| row.numbers.iter().all(|n| n.whole);
    let rest = rows.get(4..).unwrap_or(&[]);
    whole(&rows[0]) && 10 * rest.iter().filter(|&row| whole(row)).count() < rest.len()
}

/// Whether the first row can be the first point of a section that the rest describes: it lies near an end of the
/// rest's extent. The next few rows may be headers too.
fn begins(rows: &[Row<'_>]) -> bool {
    let Some([x, y]) = rows[0].pair() else {
        return false;
    };
    let rest = rows.get(4..).unwrap_or(&[]).iter().filter_map(Row::pair);
    let (mut low, mut high) = ([f64::INFINITY; 2], [f64::NEG_INFINITY; 2]);
    for point in rest {
        for k in 0..2 {
            low[k] = low[k].min(point[k]);
            high[k] = high[k].max(point[k]);
        }
    }
    let size = (high[0] - low[0]).max(high[1] - low[1]);
    if !size.is_finite() {
        return true;
    }
    let margin = 0.06 * size;
    let inside = |v: f64, k: usize| v > low[k] - margin && v < high[k] + margin;
    let long = if high[0] - low[0] >= high[1] - low[1] {
        (x, 0)
    } else {
        (y, 1)
    };
    let at_end = (long.0 - low[long.1]).min(high[long.1] - long.0) < margin;
    inside(x, 0) && inside(y, 1) && at_end
}

/// Words may stand before the points, between two sides (whether they do, the order of the points tells) and behind
/// the points; not where they look like a spoiled row.
fn check_words(
    words: &mut Vec<(usize, usize)>,
    rows: &[Row<'_>],
    start: usize,
    lines: &[Line<'_>],
    notes: &mut Vec<String>,
) -> Result<(), Error> {
    let count = rows.len();
    for &(at, line) in words.iter() {
        let text = lines.get(line - 1).map_or("", |l| l.text);
        let spoiled = if at < start || (at == start && start > 0) {
            false
        } else if at == 0 {
            let first = text
                .split([' ', '\t', ',', ';'])
                .find(|t| !t.is_empty())
                .unwrap_or("");
            let next = words.iter().all(|&(_, other)| other <= line);
            next && first.contains('.') && first.parse::<f64>().is_ok_and(|v| near_ends(v, rows))
        } else {
            text.contains(|c: char| c.is_ascii_digit())
        };
        if spoiled {
            return Err(Error::Words {
                at: place(lines, line),
            });
        }
    }
    let behind = words.iter().filter(|&&(at, _)| at == count).count();
    if behind > 0 {
        notes.push("Words behind the last point left out.".to_owned());
        words.retain(|&(at, _)| at < count);
    }
    Ok(())
}

/// Whether `x` is near either end of the range of the first column.
fn near_ends(x: f64, rows: &[Row<'_>]) -> bool {
    let firsts = rows.iter().filter_map(|row| row.numbers.first()).map(|n| n.value);
    let (low, high) = firsts.fold((f64::INFINITY, f64::NEG_INFINITY), |(l, h), v| {
        (l.min(v), h.max(v))
    });
    let margin = 0.1 * (high - low);
    x > low - margin && x < high + margin
}

/// The points, where the second side begins in a table of stations, and the decimals of x and y.
type Picked = (Vec<Point>, Option<(usize, usize)>, [i32; 2]);

/// Takes x and y from the columns.
fn pick(
    rows: &[Row<'_>],
    columns: usize,
    lines: &[Line<'_>],
    notes: &mut Vec<String>,
) -> Result<Picked, Error> {
    let column = |k: usize| rows.iter().map(move |row| row.numbers[k].value);
    let constant = |k: usize| {
        let first = rows.first().map_or(0.0, |row| row.numbers[k].value);
        column(k).all(|v| (v - first).abs() <= 0.0)
    };
    let counts_up = |k: usize| {
        column(k)
            .zip(column(k).skip(1))
            .all(|(a, b)| (b - a - 1.0).abs() <= 0.0)
    };
    let rises = |k: usize| {
        let steps = || column(k).zip(column(k).skip(1));
        steps().all(|(a, b)| b >= a) || steps().all(|(a, b)| b <= a)
    };
    let pairs: Vec<[usize; 2]> = match columns {
        2 => vec![[0, 1]],
        3 => {
            if let Some(k) = [2, 0, 1].into_iter().find(|&k| constant(k) || counts_up(k)) {
                let what = if constant(k) {
                    "constant"
                } else {
                    "a running number"
                };
                notes.push(format!("Column {} left out: {what}.", k + 1));
                vec![[[1, 2], [0, 2], [0, 1]][k]]
            } else if rises(0) {
                vec![[0, 1], [0, 2]]
            } else {
                vec![]
            }
        }
        4 if rises(0) && rises(2) => vec![[0, 1], [2, 3]],
        _ => vec![],
    };
    let Some(&[x, y]) = pairs.first() else {
        let line = rows.first().map_or(1, |row| row.line);
        return Err(Error::Columns {
            at: place(lines, line),
            found: columns,
            usual: columns,
        });
    };
    let mut points = Vec::with_capacity(rows.len() * pairs.len());
    for [x, y] in &pairs {
        points.extend(rows.iter().map(|row| Point {
            at: [row.numbers[*x].value, row.numbers[*y].value],
            line: row.line,
        }));
    }
    let mut counted = None;
    if pairs.len() > 1 {
        notes.push(format!(
            "Layout: a table of {columns} columns, a side beside the other."
        ));
        counted = rows.first().map(|row| (rows.len(), row.line));
    }
    Ok((points, counted, [decimals(rows, x), decimals(rows, y)]))
}

/// Decimals of a column: the most among its numbers of at least a tenth of the largest (smaller numbers have more
/// where the file counts significant digits).
fn decimals(rows: &[Row<'_>], k: usize) -> i32 {
    let numbers = || rows.iter().map(|row| row.numbers[k]);
    let largest = numbers().fold(0.0, |m: f64, n| m.max(n.value.abs()));
    numbers()
        .filter(|n| n.value.abs() >= 0.1 * largest)
        .map(|n| n.decimals)
        .max()
        .unwrap_or(0)
}
