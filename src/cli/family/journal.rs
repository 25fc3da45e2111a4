//! The lines of variants that have ended, in the order in which they ended: what a killed run leaves.

use std::collections::HashMap;
use std::fs::{self, File};
use std::io::{self, BufRead, BufReader, Read, Seek, SeekFrom, Write};

use super::folder::{Folder, LINES, TABLE, write};
use crate::cli::failure::Failure;
use crate::family::Line;

/// The journal's file.
pub(super) const JOURNAL: &str = "family.partial.jsonl";

/// Where a line stands in the journal.
#[derive(Clone, Copy, Debug)]
struct Span {
    start: u64,
    length: usize,
}

/// The journal of a run.
#[derive(Debug)]
pub(super) struct Journal {
    file: File,
    length: u64,
    /// Lines of earlier runs, by the variants' names.
    earlier: HashMap<String, Span>,
    /// Lines of this run, by the variants' places.
    ended: HashMap<usize, Span>,
}

impl Journal {
    /// Begins a journal, or goes on with that of an earlier run; tables of earlier runs go, so that none is there that
    /// does not belong to the files.
    pub(super) fn open(folder: &Folder, resume: bool) -> Result<Self, Failure> {
        let path = folder.join(JOURNAL);
        let failure = |source| write(&path, source);
        if resume && !path.exists() && folder.join(LINES).exists() {
            // the lines of a run that came to its end are a journal too
            fs::rename(folder.join(LINES), &path).map_err(failure)?;
        }
        folder.remove(TABLE)?;
        folder.remove(LINES)?;
        if !resume {
            folder.remove(JOURNAL)?;
        }
        let mut file = File::options()
            .create(true)
            .append(true)
            .read(true)
            .open(&path)
            .map_err(failure)?;
        let (earlier, length) = earlier(&file).map_err(failure)?;
        // what was cut off in the middle of a line is no line
        file.set_len(length).map_err(failure)?;
        file.seek(SeekFrom::End(0)).map_err(failure)?;
        Ok(Self {
            file,
            length,
            earlier,
            ended: HashMap::new(),
        })
    }

    /// The line of an earlier run.
    pub(super) fn earlier(&mut self, name: &str) -> io::Result<Option<Line>> {
        match self.earlier.get(name).copied() {
            Some(span) => Ok(Line::read(&self.text(span)?).ok()),
            None => Ok(None),
        }
    }

    /// Notes that a variant has ended.
    pub(super) fn add(&mut self, place: usize, line: &Line) -> io::Result<()> {
        let text = line.text();
        let known = self.earlier.get(&line.name).copied();
        if let Some(span) = known
            && span.length == text.len()
            && self.text(span)? == text
        {
            self.ended.insert(place, span);
            return Ok(());
        }
        self.file.write_all(text.as_bytes())?;
        self.ended.insert(
            place,
            Span {
                start: self.length,
                length: text.len(),
            },
        );
        self.length += text.len() as u64;
        Ok(())
    }

    /// Number of variants that have ended.
    pub(super) fn count(&self) -> usize {
        self.ended.len()
    }

    /// The text of the line of a variant that has ended.
    pub(super) fn line(&mut self, place: usize) -> io::Result<Option<String>> {
        match self.ended.get(&place).copied() {
            Some(span) => self.text(span).map(Some),
            None => Ok(None),
        }
    }

    fn text(&mut self, span: Span) -> io::Result<String> {
        let mut bytes = vec![0; span.length];
        self.file.seek(SeekFrom::Start(span.start))?;
        self.file.read_exact(&mut bytes)?;
        String::from_utf8(bytes).map_err(io::Error::other)
    }
}

/// The whole lines of a journal, and its length up to the end of the last one.
fn earlier(file: &File) -> io::Result<(HashMap<String, Span>, u64)> {
    let mut reader = BufReader::new(file);
    reader.seek(SeekFrom::Start(0))?;
    let (mut lines, mut start, mut bytes) = (HashMap::new(), 0, Vec::new());
    loop {
        bytes.clear();
        let length = reader.read_until(b'\n', &mut bytes)?;
        if length == 0 || !bytes.ends_with(b"\n") {
            return Ok((lines, start));
        }
        let line = std::str::from_utf8(&bytes)
            .ok()
            .and_then(|text| Line::read(text).ok());
        if let Some(line) = line {
            lines.insert(line.name, Span { start, length });
        }
        start += length as u64;
    }
}
