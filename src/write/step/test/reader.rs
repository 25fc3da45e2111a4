//! A strict reader of exchange structures, written after ISO 10303-21:2002 and not after the writer.

/// A parameter as read.
#[derive(Clone, Debug, PartialEq)]
pub(crate) enum Read {
    /// Decoded text.
    Text(String),
    Real(f64),
    Integer(i64),
    Enumeration(String),
    Reference(usize),
    List(Vec<Self>),
    Typed(String, Vec<Self>),
    Omitted,
    Derived,
}

/// A keyword and its parameters.
pub(crate) type ReadRecord = (String, Vec<Read>);

/// An instance: complex where it is written in parentheses.
#[derive(Clone, Debug)]
pub(crate) struct Instance {
    pub(crate) id: usize,
    pub(crate) complex: bool,
    pub(crate) records: Vec<ReadRecord>,
}

/// A whole exchange structure.
#[derive(Debug)]
pub(crate) struct File {
    pub(crate) header: Vec<ReadRecord>,
    pub(crate) instances: Vec<Instance>,
}

impl File {
    /// Reads a file; `Err` says what is wrong and where.
    pub(crate) fn read(text: &str) -> Result<Self, String> {
        let mut at = Reader {
            text: text.as_bytes(),
            at: 0,
        };
        at.word("ISO-10303-21;")?;
        at.word("HEADER;")?;
        let mut header = Vec::new();
        while !at.skip("ENDSEC;") {
            header.push(at.record()?);
            at.word(";")?;
        }
        at.word("DATA;")?;
        let mut instances = Vec::new();
        while !at.skip("ENDSEC;") {
            instances.push(at.instance()?);
        }
        at.word("END-ISO-10303-21;")?;
        at.space();
        if at.at == text.len() {
            Ok(Self { header, instances })
        } else {
            at.fail("nothing more")
        }
    }

    /// The records of one keyword, in simple and complex instances.
    pub(crate) fn all(&self, keyword: &str) -> Vec<&[Read]> {
        let records = self.instances.iter().flat_map(|instance| &instance.records);
        records
            .filter(|record| record.0 == keyword)
            .map(|record| &record.1[..])
            .collect()
    }
}

/// Reads one parameter.
pub(crate) fn read_parameter(text: &str) -> Result<Read, String> {
    let mut at = Reader {
        text: text.as_bytes(),
        at: 0,
    };
    let read = at.parameter()?;
    if at.at == text.len() {
        Ok(read)
    } else {
        at.fail("nothing more")
    }
}

struct Reader<'a> {
    text: &'a [u8],
    at: usize,
}

impl Reader<'_> {
    fn fail<T>(&self, wanted: &str) -> Result<T, String> {
        let end = self.text.len().min(self.at + 30);
        let found = String::from_utf8_lossy(&self.text[self.at.min(end)..end]);
        Err(format!("byte {}: wanted {wanted}, found {found:?}", self.at))
    }

    fn space(&mut self) {
        while matches!(self.text.get(self.at), Some(b' ' | b'\n')) {
            self.at += 1;
        }
    }

    fn skip(&mut self, word: &str) -> bool {
        self.space();
        let found = self.text[self.at..].starts_with(word.as_bytes());
        if found {
            self.at += word.len();
        }
        found
    }

    fn word(&mut self, word: &str) -> Result<(), String> {
        if self.skip(word) { Ok(()) } else { self.fail(word) }
    }

    fn run(&mut self, what: impl Fn(u8) -> bool) -> String {
        let start = self.at;
        while self.text.get(self.at).is_some_and(|&b| what(b)) {
            self.at += 1;
        }
        self.text[start..self.at].iter().map(|&b| char::from(b)).collect()
    }

    fn number(&mut self) -> Result<usize, String> {
        let digits = self.run(|b| b.is_ascii_digit());
        digits.parse().or_else(|_| self.fail("a number"))
    }

    fn instance(&mut self) -> Result<Instance, String> {
        self.word("#")?;
        let id = self.number()?;
        self.word("=")?;
        let complex = self.skip("(");
        let mut records = vec![self.record()?];
        while complex && !self.skip(")") {
            records.push(self.record()?);
        }
        self.word(";")?;
        Ok(Instance { id, complex, records })
    }

    fn record(&mut self) -> Result<ReadRecord, String> {
        self.space();
        let keyword = self.run(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || b == b'_');
        if keyword.is_empty() {
            return self.fail("a keyword");
        }
        Ok((keyword, self.list()?))
    }

    fn list(&mut self) -> Result<Vec<Read>, String> {
        self.word("(")?;
        let mut list = Vec::new();
        if self.skip(")") {
            return Ok(list);
        }
        loop {
            list.push(self.parameter()?);
            if self.skip(")") {
                return Ok(list);
            }
            self.word(",")?;
        }
    }

    fn parameter(&mut self) -> Result<Read, String> {
        self.space();
        match self.text.get(self.at) {
            Some(b'$') => {
                self.at += 1;
                Ok(Read::Omitted)
            }
            Some(b'*') => {
                self.at += 1;
                Ok(Read::Derived)
            }
            Some(b'#') => {
                self.at += 1;
                self.number().map(Read::Reference)
            }
            Some(b'.') => {
                self.at += 1;
                let value = self.run(|b| b.is_ascii_uppercase() || b.is_ascii_digit() || b == b'_');
                self.word(".").map(|()| Read::Enumeration(value))
            }
            Some(b'(') => self.list().map(Read::List),
            Some(b'\'') => self.text(),
            Some(b'A'..=b'Z') => self
                .record()
                .map(|(keyword, values)| Read::Typed(keyword, values)),
            _ => self.numeral(),
        }
    }

    /// An integer, or a real: sign, digits, point, digits, and an exponent with `E`.
    fn numeral(&mut self) -> Result<Read, String> {
        let start = self.at;
        self.run(|b| matches!(b, b'+' | b'-'));
        if self.run(|b| b.is_ascii_digit()).is_empty() || self.at - start > 400 {
            return self.fail("a parameter");
        }
        let real = self.skip(".");
        if real {
            self.run(|b| b.is_ascii_digit());
            if self.skip("E") {
                self.run(|b| matches!(b, b'+' | b'-'));
                self.number()?;
            }
        }
        let text = String::from_utf8_lossy(&self.text[start..self.at]).into_owned();
        match real {
            true => text
                .parse()
                .map(Read::Real)
                .map_err(|_| format!("{text} is no real number")),
            false => text
                .parse()
                .map(Read::Integer)
                .map_err(|_| format!("{text} is no integer")),
        }
    }

    fn text(&mut self) -> Result<Read, String> {
        self.word("'")?;
        let mut text = String::new();
        loop {
            match &self.text[self.at..] {
                [b'\'', b'\'', ..] | [b'\\', b'\\', ..] => {
                    text.push(char::from(self.text[self.at]));
                    self.at += 2;
                }
                [b'\'', ..] => {
                    self.at += 1;
                    return Ok(Read::Text(text));
                }
                [b'\\', b'X', size @ (b'2' | b'4'), b'\\', ..] => {
                    let digits = if *size == b'2' { 4 } else { 8 };
                    self.at += 4;
                    self.characters(digits, &mut text)?;
                }
                [b @ b' '..=b'~', ..] if *b != b'\\' => {
                    text.push(char::from(*b));
                    self.at += 1;
                }
                _ => return self.fail("a string's character"),
            }
        }
    }

    /// The characters of a control directive, `digits` hexadecimal digits each, and its end.
    fn characters(&mut self, digits: usize, text: &mut String) -> Result<(), String> {
        let mut any = false;
        while !self.text[self.at..].starts_with(b"\\X0\\") {
            let Some(part) = self.text.get(self.at..self.at + digits) else {
                return self.fail("digits");
            };
            if !part.iter().all(|b| matches!(b, b'0'..=b'9' | b'A'..=b'F')) {
                return self.fail("hexadecimal digits");
            }
            let code = part
                .iter()
                .fold(0, |code, &b| code * 16 + char::from(b).to_digit(16).unwrap_or(0));
            let Some(c) = char::from_u32(code) else {
                return self.fail("a character's code");
            };
            text.push(c);
            any = true;
            self.at += digits;
        }
        self.at += 4;
        if any {
            Ok(())
        } else {
            self.fail("at least one character in a directive")
        }
    }
}
