//! A table of variants: CSV text with spec keys as headers.

use csv::StringRecord;

use super::names::{clash, unsafe_name};
use super::table_error::TableError;
use crate::spec::{known, shortened};

/// Most rows of a table.
pub const MOST_ROWS: usize = 1_000_000;

/// A table of variants.
#[derive(Clone, Debug)]
pub struct Table {
    pub(super) keys: Vec<String>,
    pub(super) named: bool,
    rows: Vec<StringRecord>,
    /// Line of each row in the file, counted from 1.
    lines: Vec<u64>,
}

impl Table {
    /// Reads a table from CSV (RFC 4180): commas, double quotes, any line ends, with or without a byte-order mark. Rows of
    /// empty fields are left out. The spaces around a field don't count.
    ///
    /// # Errors
    ///
    /// [`TableError`], with row and column.
    pub fn read(bytes: &[u8]) -> Result<Self, TableError> {
        let bytes = bytes.strip_prefix(b"\xef\xbb\xbf").unwrap_or(bytes);
        let mut reader = csv::ReaderBuilder::new()
            .has_headers(false)
            .flexible(true)
            .from_reader(bytes);
        let mut record = csv::ByteRecord::new();
        let mut ends = LineEnds::of(bytes);
        let mut next = |record: &mut csv::ByteRecord| {
            // a slice in memory always reads, and flexible rows are never of a wrong length
            let more = reader.read_byte_record(record).unwrap_or(false);
            let start = record.position().map_or(0, csv::Position::byte);
            more.then(|| ends.row(usize::try_from(start).unwrap_or(usize::MAX)))
        };
        let Some(row) = next(&mut record) else {
            return Err(TableError::Empty);
        };
        let header = texts(&record, row)?;
        let named = header.get(0) == Some("name");
        let keys = keys(&header, named)?;
        let (mut rows, mut lines) = (Vec::new(), Vec::new());
        while let Some(row) = next(&mut record) {
            if record.iter().all(|field| field.trim_ascii().is_empty()) {
                continue;
            }
            if record.len() != header.len() {
                // an open quote swallows what follows: that is the better thing to say
                texts(&record, row)?;
                return Err(TableError::Ragged {
                    row,
                    found: record.len(),
                    expected: header.len(),
                });
            }
            if rows.len() == MOST_ROWS {
                return Err(TableError::TooLong);
            }
            rows.push(texts(&record, row)?);
            lines.push(row);
        }
        if rows.is_empty() {
            return Err(TableError::NoRows);
        }
        let table = Self {
            keys,
            named,
            rows,
            lines,
        };
        if named {
            table.check_names()?;
        }
        Ok(table)
    }

    /// Number of variants.
    pub(super) fn len(&self) -> usize {
        self.rows.len()
    }

    /// The name of a variant, where the table has names.
    pub(super) fn name(&self, i: usize) -> Option<&str> {
        self.named.then(|| self.rows[i].get(0).unwrap_or_default())
    }

    /// The values of a variant, in the order of the keys; an empty one is the spec's own.
    pub(super) fn values(&self, i: usize) -> impl Iterator<Item = &str> {
        self.rows[i].iter().skip(usize::from(self.named))
    }

    /// The row of a variant, as a spreadsheet counts.
    pub(super) fn row(&self, i: usize) -> u64 {
        self.lines[i]
    }

    fn check_names(&self) -> Result<(), TableError> {
        let names = || (0..self.len()).map(|i| self.name(i).unwrap_or_default());
        for (i, name) in names().enumerate() {
            if let Some(reason) = unsafe_name(name) {
                return Err(TableError::Name {
                    row: self.lines[i],
                    name: shortened(name),
                    reason,
                });
            }
        }
        match clash(names()) {
            None => Ok(()),
            Some((first, second)) => {
                let name = |i: usize| self.name(i).unwrap_or_default().to_owned();
                let (first, second) = (first.min(second), first.max(second));
                Err(TableError::Clash {
                    row: self.lines[second],
                    name: name(second),
                    first: self.lines[first],
                    other: name(first),
                })
            }
        }
    }
}

/// Counts the rows of a text: a record's place, as the reader has it, comes before the line ends in front of it.
struct LineEnds<'a> {
    bytes: &'a [u8],
    at: usize,
    row: u64,
}

impl<'a> LineEnds<'a> {
    const fn of(bytes: &'a [u8]) -> Self {
        Self { bytes, at: 0, row: 1 }
    }

    /// The row of the record that begins at a place or after the line ends there; places come in their order.
    fn row(&mut self, place: usize) -> u64 {
        while let Some(byte) = self.bytes.get(self.at) {
            let ends = matches!(byte, b'\n' | b'\r');
            if self.at >= place && !ends {
                break;
            }
            self.at += 1;
            // a carriage return before a line feed is part of the same end
            if *byte == b'\n' || (*byte == b'\r' && self.bytes.get(self.at) != Some(&b'\n')) {
                self.row += 1;
            }
        }
        self.row
    }
}

/// A row as text, without the spaces around its fields.
fn texts(record: &csv::ByteRecord, row: u64) -> Result<StringRecord, TableError> {
    let mut texts = StringRecord::with_capacity(record.as_slice().len(), record.len());
    for (i, field) in record.iter().enumerate() {
        let column = i + 1;
        let text = std::str::from_utf8(field).map_err(|_| TableError::NoText { row, column })?;
        let text = text.trim();
        if text.contains(['\n', '\r']) {
            return Err(TableError::LineBreak { row, column });
        }
        texts.push_field(text);
    }
    Ok(texts)
}

fn keys(header: &StringRecord, named: bool) -> Result<Vec<String>, TableError> {
    if header.iter().all(str::is_empty) {
        return Err(TableError::NoKey { column: 1 });
    }
    if let (1, Some(only)) = (header.len(), header.get(0)) {
        for (divider, name) in [(';', "semicolons"), ('\t', "tabs"), ('|', "bars")] {
            if only.contains(divider) {
                return Err(TableError::Divider(name));
            }
        }
    }
    let columns = || header.iter().enumerate().skip(usize::from(named));
    let is_key = |text: &str| known(text).is_ok();
    let mut keys: Vec<String> = Vec::new();
    for (i, key) in columns() {
        let column = i + 1;
        if key.is_empty() {
            return Err(TableError::NoKey { column });
        }
        let value = key.starts_with(|c: char| c.is_ascii_digit() || "+-.".contains(c));
        if value && !columns().any(|(_, key)| is_key(key)) {
            return Err(TableError::NoHeader {
                column,
                text: shortened(key),
            });
        }
        if key == "name" {
            return Err(TableError::Names);
        }
        known(key).map_err(|advice| TableError::Key {
            column,
            key: shortened(key),
            advice,
        })?;
        if let Some(first) = keys.iter().position(|other| other == key) {
            return Err(TableError::Twice {
                first: first + 1 + usize::from(named),
                column,
                key: key.to_owned(),
            });
        }
        keys.push(key.to_owned());
    }
    if keys.is_empty() {
        return Err(TableError::Names);
    }
    Ok(keys)
}

#[cfg(test)]
mod tests {
    use super::{Table, TableError};

    fn wrong(text: &[u8]) -> TableError {
        Table::read(text).unwrap_err()
    }

    #[test]
    fn tables_of_any_making_read_alike() {
        let plain = "name,planform.span,airfoil.root\na,2.4 m,NACA 2412\nb,,\"x, y.dat\"\n";
        let made = [
            plain.to_owned(),
            plain.replace('\n', "\r\n"),
            format!("\u{feff}{plain}"),
            plain.trim_end().to_owned(),
            plain
                .replace("2.4 m", " \"2.4 m\" ")
                .replace(" \"", "\"")
                .replace("\" ", "\""),
            plain.replace("a,2", "\n\na , 2"),
            format!("{plain},,\n\n,,\n"),
        ];
        for text in &made {
            let table = Table::read(text.as_bytes()).unwrap();
            assert_eq!(table.len(), 2, "{text:?}");
            assert_eq!(table.keys, ["planform.span", "airfoil.root"]);
            assert_eq!((table.name(0), table.name(1)), (Some("a"), Some("b")));
            assert_eq!(table.values(0).collect::<Vec<_>>(), ["2.4 m", "NACA 2412"]);
            assert_eq!(table.values(1).collect::<Vec<_>>(), ["", "x, y.dat"]);
        }
        assert_eq!(Table::read(made[1].as_bytes()).unwrap().row(1), 3);
    }

    #[test]
    fn bad_tables_are_refused_with_row_and_column() {
        let says = |text: &str, words: &str| {
            let said = wrong(text.as_bytes()).to_string();
            assert!(said.contains(words), "{text:?}: {said}");
        };
        says("", "the table is empty");
        says("\n\n", "the table is empty");
        says("planform.span\n", "no rows");
        says("planform.span\n\n", "no rows");
        says("2400,0.4\n2500,0.5\n", "row 1, column 1: \"2400\" is a value");
        says(
            "planform.taper\n1\n",
            "row 1, column 1: \"planform.taper\" is no key of a spec; the nearest known is planform.taper_ratio",
        );
        says(
            "name,planform.span,\na,1,2\n",
            "row 1, column 3: the header is empty",
        );
        says("planform.span,planform.span\n1,2\n", "columns 1 and 2");
        says("planform.span,name\n1,a\n", "in the first column");
        says("name\na\n", "at least one more column");
        says("planform.span;airfoil.root\n1;2\n", "not by semicolons");
        says(
            "name,planform.span\na,1\nb\n",
            "row 3: 1 fields, and the header has 2",
        );
        says("planform.span,airfoil.root\n1,a,b\n", "stands in double quotes");
        says(
            "name,planform.span\na,1\n\"b,1\nc,1\n",
            "row 3, column 1: a line break",
        );
        says("name,planform.span\na b,1\n", "row 2, column 1 (name): \"a b\"");
        says(
            "name,planform.span\n,1\n",
            "row 2, column 1 (name): \"\": the name is empty",
        );
        says(
            "name,planform.span\na,1\nb,2\nA,3\n",
            "row 4, column 1 (name): the files of \"A\" would have the same names as those of \"a\" in row 2",
        );
        assert_eq!(
            wrong(b"planform.span,airfoil.root\n1,\xe9\n"),
            TableError::NoText { row: 2, column: 2 }
        );
    }

    #[test]
    fn long_tables_are_read() {
        let mut text = "name,planform.aspect_ratio\n".to_owned();
        for i in 0..200_000 {
            text += &format!("v{i},{}\n", 6 + i % 7);
        }
        let table = Table::read(text.as_bytes()).unwrap();
        assert_eq!(
            (table.len(), table.name(199_999), table.row(199_999)),
            (200_000, Some("v199999"), 200_001)
        );
    }
}
