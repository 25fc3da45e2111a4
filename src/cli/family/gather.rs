//! Merging the tables of shards.

use std::fs::File;
use std::io::{BufRead, BufReader, BufWriter, Read, Seek, SeekFrom, Write};
use std::path::{Path, PathBuf};

use serde::Deserialize;

use super::Trouble;
use super::finish::Counts;
use super::folder::{Folder, LINES, TABLE};
use super::journal::JOURNAL;
use crate::cli::failure::Failure;
use crate::cli::output::Output;
use crate::family::Status;

/// The column that a gathered table has more: where the variant's files are.
const FOLDER: &str = "folder";

/// The part of a line that says where it belongs.
#[derive(Debug, Deserialize)]
struct Head {
    index: usize,
    of: usize,
    name: String,
    status: Status,
    error: Option<String>,
}

/// A variant of a shard.
#[derive(Debug)]
struct Found {
    index: usize,
    shard: usize,
    line: (u64, usize),
    row: csv::Position,
}

/// The tables of one directory.
struct Shard {
    path: PathBuf,
    lines: BufReader<File>,
    rows: csv::Reader<File>,
}

/// Merges the tables of some directories, in input order.
pub(super) fn run(directories: &[PathBuf], target: &Path, output: &Output) -> Result<bool, Failure> {
    let mut shards = Vec::new();
    let (mut found, mut header, mut of) = (Vec::new(), None, None);
    for (i, path) in directories.iter().enumerate() {
        if path == target {
            let reason = "the merged tables would take the place of these; give another directory with -o";
            return Err(wrong(path, reason));
        }
        let mut shard = Shard::open(path)?;
        let own = shard.header()?;
        if header.get_or_insert_with(|| own.clone()) != &own {
            return Err(wrong(
                &path.join(TABLE),
                "its columns are not those of the others: gather shards of one family",
            ));
        }
        let count = shard.find(i, &mut found)?;
        if let (Some(own), Some(other)) = (count, of)
            && own != other
        {
            let reason =
                format!("of a family of {own} wings, and the others of {other}: gather shards of one family");
            return Err(wrong(&path.join(LINES), &reason));
        }
        of = count.or(of);
        shards.push(shard);
    }
    found.sort_by_key(|variant| variant.index);
    if let Some(pair) = found.windows(2).find(|pair| pair[0].index == pair[1].index) {
        let paths = [pair[0].shard, pair[1].shard].map(|i| directories[i].display().to_string());
        let reason = format!(
            "variant {} is in {} too: gather each shard once",
            pair[0].index, paths[0]
        );
        return Err(wrong(&directories[pair[1].shard], &reason));
    }
    merge(
        &mut shards,
        &found,
        &header.unwrap_or_default(),
        of.unwrap_or(0),
        target,
        output,
    )
}

fn merge(
    shards: &mut [Shard],
    found: &[Found],
    header: &csv::StringRecord,
    of: usize,
    target: &Path,
    output: &Output,
) -> Result<bool, Failure> {
    let folder = Folder::open(target)?;
    let (lines, table) = (folder.begin(LINES)?, folder.begin(TABLE)?);
    let mut all = BufWriter::new(&lines.file);
    let mut rows = csv::Writer::from_writer(BufWriter::new(&table.file));
    let mut counts = Counts::default();
    let put = |rows: &mut csv::Writer<_>, mut record: csv::StringRecord, folder: &str| {
        record.push_field(folder);
        rows.write_record(&record)
            .map_err(|source| table.failure(source.into()))
    };
    put(&mut rows, header.clone(), FOLDER)?;
    for variant in found {
        let shard = &mut shards[variant.shard];
        let text = shard.line(variant.line)?;
        all.write_all(text.as_bytes())
            .map_err(|source| lines.failure(source))?;
        if output.json {
            output.print(&text)?;
        }
        let head = shard.head(&text)?;
        counts.add(
            &head.name,
            head.status,
            head.error.as_deref().unwrap_or_default(),
            output,
        );
        put(
            &mut rows,
            shard.row(variant.row.clone())?,
            &shard.path.display().to_string(),
        )?;
    }
    all.flush().map_err(|source| lines.failure(source))?;
    rows.flush().map_err(|source| table.failure(source))?;
    drop((all, rows));
    table.keep()?;
    lines.keep()?;
    let complete = found.len() == of;
    if !complete {
        let first = (1..=of)
            .zip(found)
            .find(|(index, variant)| variant.index != *index);
        let first = first.map_or(found.len() + 1, |(index, _)| index);
        output.warn(&format!(
            "{} of {of} wings are missing, the first is number {first}: is a shard missing?",
            of - found.len()
        ));
    }
    Ok(counts.tell(&folder, output)? && complete)
}

impl Shard {
    fn open(path: &Path) -> Result<Self, Failure> {
        let open = |name: &str| {
            let path = path.join(name);
            File::open(&path).map_err(|source| Failure::Read { path, source })
        };
        if path.join(JOURNAL).exists() {
            let reason = "not finished: run its shard again with --resume";
            return Err(wrong(path, reason));
        }
        Ok(Self {
            path: path.to_path_buf(),
            lines: BufReader::new(open(LINES)?),
            rows: csv::Reader::from_reader(open(TABLE)?),
        })
    }

    fn header(&mut self) -> Result<csv::StringRecord, Failure> {
        let header = self.rows.headers().cloned();
        header.map_err(|source| wrong(&self.path.join(TABLE), &source.to_string()))
    }

    /// Finds all variants; gives the number that the family has.
    fn find(&mut self, shard: usize, found: &mut Vec<Found>) -> Result<Option<usize>, Failure> {
        let (mut start, mut text, mut of) = (0, String::new(), None);
        let mut record = csv::StringRecord::new();
        loop {
            text.clear();
            let length = self
                .lines
                .read_line(&mut text)
                .map_err(|source| wrong(&self.path.join(LINES), &source.to_string()))?;
            let row = self.rows.position().clone();
            let more = self
                .rows
                .read_record(&mut record)
                .map_err(|source| wrong(&self.path.join(TABLE), &source.to_string()))?;
            if length == 0 && !more {
                return Ok(of);
            }
            let head = self.head(&text)?;
            if record.get(0) != Some(head.name.as_str()) {
                let reason = format!("{TABLE} and {LINES} do not belong together: make both again");
                return Err(wrong(&self.path, &reason));
            }
            of = Some(head.of);
            found.push(Found {
                index: head.index,
                shard,
                line: (start, length),
                row,
            });
            start += length as u64;
        }
    }

    fn head(&self, text: &str) -> Result<Head, Failure> {
        serde_json::from_str(text).map_err(|source| {
            let reason = format!("a line is not as it was written ({source}): make it again");
            wrong(&self.path.join(LINES), &reason)
        })
    }

    fn line(&mut self, (start, length): (u64, usize)) -> Result<String, Failure> {
        let mut bytes = vec![0; length];
        let read = self
            .lines
            .seek(SeekFrom::Start(start))
            .and_then(|_| self.lines.read_exact(&mut bytes));
        read.map_err(|source| source.to_string())
            .and_then(|()| String::from_utf8(bytes).map_err(|error| error.to_string()))
            .map_err(|reason| wrong(&self.path.join(LINES), &reason))
    }

    fn row(&mut self, at: csv::Position) -> Result<csv::StringRecord, Failure> {
        let mut record = csv::StringRecord::new();
        self.rows
            .seek(at)
            .and_then(|()| self.rows.read_record(&mut record))
            .map_err(|source| wrong(&self.path.join(TABLE), &source.to_string()))?;
        Ok(record)
    }
}

fn wrong(path: &Path, reason: &str) -> Failure {
    Trouble::Gather {
        path: path.to_path_buf(),
        reason: reason.to_owned(),
    }
    .into()
}
