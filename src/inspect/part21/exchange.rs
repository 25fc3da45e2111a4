//! A whole exchange structure: its header, and where its instances stand.

use std::collections::HashMap;

use super::cursor::Cursor;
use super::{CLOSING, OPENING, Value};
use crate::inspect::Error;

/// Largest file that is read: offsets are 32 bits.
const LIMIT: usize = 4 << 30;

/// A keyword with its parameters.
#[derive(Clone, Debug, PartialEq)]
pub struct Record<'a> {
    /// The entity's name in capitals.
    pub keyword: &'a str,
    /// Its parameters.
    pub values: Vec<Value<'a>>,
}

/// An instance: simple with one record, complex with several.
#[derive(Clone, Debug, PartialEq)]
pub struct Instance<'a> {
    /// True where it is written in parentheses.
    pub complex: bool,
    /// Its records.
    pub records: Vec<Record<'a>>,
}

impl<'a> Instance<'a> {
    /// The record of an entity.
    pub fn record(self, keyword: &str) -> Option<Record<'a>> {
        self.records.into_iter().find(|record| record.keyword == keyword)
    }
}

/// What an instance is: the keywords of its records, in their order.
#[derive(Clone, Debug, PartialEq, Eq)]
pub struct Kind {
    /// True for a complex instance.
    pub complex: bool,
    /// One keyword, or several of a complex instance.
    pub keywords: Vec<String>,
    /// How many instances are of this kind.
    pub count: usize,
}

impl Kind {
    /// True where one of the keywords is this.
    pub fn has(&self, keyword: &str) -> bool {
        self.keywords.iter().any(|own| own == keyword)
    }
}

/// Where an instance stands.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Entry {
    /// Its number.
    pub id: u64,
    /// Line of its number, counted from 1.
    pub line: u32,
    at: u32,
    kind: u16,
}

impl Entry {
    /// Place of its kind in [`Exchange::kinds`].
    pub fn kind(self) -> usize {
        usize::from(self.kind)
    }
}

/// An exchange structure of which the syntax is right.
#[derive(Clone, Debug)]
pub struct Exchange<'a> {
    bytes: &'a [u8],
    /// Records of the header.
    pub header: Vec<Record<'a>>,
    /// The kinds of instances, in the order of their first.
    pub kinds: Vec<Kind>,
    /// Every instance, by ascending number.
    entries: Vec<Entry>,
    /// Instances whose number is that of an earlier one.
    pub repeated: Vec<Entry>,
}

impl<'a> Exchange<'a> {
    /// Reads an exchange structure.
    ///
    /// # Errors
    ///
    /// [`Error::Syntax`] with the line, [`Error::TooLarge`] above 4 GiB.
    pub fn read(bytes: &'a [u8]) -> Result<Self, Error> {
        if bytes.len() >= LIMIT {
            return Err(Error::TooLarge {
                bytes: bytes.len(),
                limit: LIMIT,
            });
        }
        let mut cursor = Cursor::new(bytes);
        cursor.need(OPENING)?;
        cursor.need("HEADER;")?;
        let mut header = Vec::new();
        while !cursor.take("ENDSEC;")? {
            header.push(cursor.record()?);
            cursor.need(";")?;
        }
        let mut exchange = Self {
            bytes,
            header,
            kinds: Vec::new(),
            entries: Vec::new(),
            repeated: Vec::new(),
        };
        cursor.need("DATA;")?;
        let mut known = HashMap::new();
        while !cursor.take("ENDSEC;")? {
            exchange.instance(&mut cursor, &mut known)?;
        }
        cursor.need(CLOSING)?;
        cursor.skip_space()?;
        if !cursor.rest().is_empty() {
            return cursor.wanted("the end of the file");
        }
        exchange.sort();
        Ok(exchange)
    }

    fn instance(&mut self, cursor: &mut Cursor<'a>, known: &mut HashMap<String, u16>) -> Result<(), Error> {
        cursor.need("#")?;
        let line = cursor.line;
        let id = cursor.number()?;
        cursor.need("=")?;
        let at = u32::try_from(cursor.at).expect("offsets of 32 bits are checked at the start");
        let instance = read_instance(cursor)?;
        cursor.need(";")?;
        let name = instance_name(&instance);
        let kind = match known.get(&name) {
            Some(&kind) => kind,
            None => {
                let Ok(kind) = u16::try_from(self.kinds.len()) else {
                    return Err(cursor.error("more than 65536 kinds of instances".to_owned()));
                };
                self.kinds.push(Kind {
                    complex: instance.complex,
                    keywords: instance
                        .records
                        .iter()
                        .map(|record| record.keyword.to_owned())
                        .collect(),
                    count: 0,
                });
                known.insert(name, kind);
                kind
            }
        };
        self.kinds[usize::from(kind)].count += 1;
        self.entries.push(Entry { id, line, at, kind });
        Ok(())
    }

    /// Sorts instances by number and puts repeated numbers aside.
    fn sort(&mut self) {
        self.entries.sort_by_key(|entry| entry.id);
        let (mut last, repeated) = (None, &mut self.repeated);
        self.entries.retain(|entry| {
            let again = last == Some(entry.id);
            if again {
                repeated.push(*entry);
            }
            last = Some(entry.id);
            !again
        });
    }

    /// Every instance, by ascending number.
    pub fn entries(&self) -> &[Entry] {
        &self.entries
    }

    /// Place of an instance in [`Exchange::entries`].
    pub fn place(&self, id: u64) -> Option<usize> {
        // most files number from 1 without gaps
        let guess = usize::try_from(id).unwrap_or(usize::MAX).wrapping_sub(1);
        if self.entries.get(guess).is_some_and(|entry| entry.id == id) {
            return Some(guess);
        }
        self.entries.binary_search_by_key(&id, |entry| entry.id).ok()
    }

    /// Where an instance stands.
    pub fn entry(&self, id: u64) -> Option<Entry> {
        self.place(id).map(|place| self.entries[place])
    }

    /// An instance, taken apart.
    ///
    /// # Panics
    ///
    /// Where the entry is another file's.
    pub fn instance_at(&self, entry: Entry) -> Instance<'a> {
        let at = entry.at as usize;
        read_instance(&mut Cursor::at(self.bytes, at, entry.line)).expect("the syntax was checked before")
    }

    /// What an instance is.
    pub fn kind_of(&self, entry: Entry) -> &Kind {
        &self.kinds[entry.kind()]
    }

    /// Every instance with a record of this entity, by ascending number.
    pub fn all<'b>(&'b self, keyword: &str) -> impl Iterator<Item = Entry> + use<'a, 'b> {
        let wanted: Vec<bool> = self.kinds.iter().map(|kind| kind.has(keyword)).collect();
        let any = wanted.contains(&true);
        let entries: &[Entry] = if any { &self.entries } else { &[] };
        entries.iter().copied().filter(move |entry| wanted[entry.kind()])
    }
}

fn read_instance<'a>(cursor: &mut Cursor<'a>) -> Result<Instance<'a>, Error> {
    let complex = cursor.take("(")?;
    let mut records = vec![cursor.record()?];
    while complex && !cursor.take(")")? {
        records.push(cursor.record()?);
    }
    Ok(Instance { complex, records })
}

fn instance_name(instance: &Instance<'_>) -> String {
    let mut name = String::with_capacity(40);
    name.push_str(if instance.complex { "(" } else { "" });
    for record in &instance.records {
        name.push_str(record.keyword);
        name.push(' ');
    }
    name
}
