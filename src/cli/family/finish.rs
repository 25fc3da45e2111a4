//! The end of a run: tables in input order.

use std::io::{BufWriter, Write};

use super::folder::{Folder, LINES, TABLE, write};
use super::journal::{JOURNAL, Journal};
use crate::cli::failure::Failure;
use crate::cli::output::Output;
use crate::family::{Line, Plan, Plot, Status, header, row};

/// Most variants whose errors are told one by one.
const MOST_TOLD: usize = 10;

/// How many variants ended which way.
#[derive(Debug, Default)]
pub(super) struct Counts {
    ok: usize,
    out: usize,
    error: usize,
}

impl Counts {
    /// Counts a variant; says on standard error why it was not built.
    pub(super) fn add(&mut self, name: &str, status: Status, error: &str, output: &Output) {
        match status {
            Status::Ok => self.ok += 1,
            Status::Out => self.out += 1,
            Status::Error => self.error += 1,
        }
        if status == Status::Error && self.error <= MOST_TOLD {
            output.warn(&format!("{name}: {error}"));
        }
    }

    /// Says how many ended which way, and where the tables are; true where all are as asked.
    pub(super) fn tell(&self, folder: &Folder, output: &Output) -> Result<bool, Failure> {
        if self.error > MOST_TOLD {
            output.warn(&format!(
                "and {} more: see the column error of {TABLE}",
                self.error - MOST_TOLD
            ));
        }
        let mut text = format!("{} wings: {} ok", self.ok + self.out + self.error, self.ok);
        if self.out > 0 {
            text += &format!(", {} out of tolerance", self.out);
        }
        if self.error > 0 {
            text += &format!(", {} not built", self.error);
        }
        text += &format!(
            "\nWritten: {}, {}\n",
            folder.join(TABLE).display(),
            folder.join(LINES).display()
        );
        if !output.json {
            output.print(&text)?;
        }
        Ok(self.out == 0 && self.error == 0)
    }
}

/// Writes the tables, takes the journal away, and says how the variants ended.
pub(super) fn tables(
    plan: &Plan,
    places: &[usize],
    mut plots: Vec<(String, Plot)>,
    folder: &Folder,
    mut journal: Journal,
    output: &Output,
) -> Result<bool, Failure> {
    let (lines, table) = (folder.begin(LINES)?, folder.begin(TABLE)?);
    let mut all = BufWriter::new(&lines.file);
    let mut rows = csv::Writer::from_writer(BufWriter::new(&table.file));
    let mut counts = Counts::default();
    rows.write_record(header(plan))
        .map_err(|source| table.failure(source.into()))?;
    for place in places {
        let unread = |source| write(&folder.join(JOURNAL), source);
        let text = journal.line(*place).map_err(unread)?.unwrap_or_default();
        let line = Line::read(&text).map_err(|source| unread(source.into()))?;
        all.write_all(text.as_bytes())
            .map_err(|source| lines.failure(source))?;
        let variant = plan.variant(*place);
        for (_, plot) in &mut plots {
            plot.add(&variant, &line);
        }
        rows.write_record(row(&variant, &line))
            .map_err(|source| table.failure(source.into()))?;
        counts.add(
            &line.name,
            line.status,
            line.error.as_deref().unwrap_or_default(),
            output,
        );
    }
    all.flush().map_err(|source| lines.failure(source))?;
    rows.flush().map_err(|source| table.failure(source))?;
    drop((all, rows));
    for (key, plot) in &plots {
        folder.put(&[(format!("family-{key}.svg"), plot.svg().into_bytes())])?;
    }
    table.keep()?;
    lines.keep()?;
    drop(journal);
    folder.remove(JOURNAL)?;
    counts.tell(folder, output)
}
