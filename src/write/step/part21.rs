//! ISO 10303-21's exchange structure: instances, references and typed parameters, written as they come.

use std::fmt::Write as _;
use std::io::Write;

use truck_stepio::out::{BooleanDisplay, IndexSliceDisplay, SliceDisplay};

use super::error::Error;
use super::text::{put_real, put_string};

/// The number of an instance that has been written.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub(super) struct Id(usize);

/// What an instance's parameter may be.
pub(super) trait Parameter {
    /// Appends the parameter's text; `Err` holds a number that is not finite.
    fn put(&self, line: &mut String) -> Result<(), f64>;

    /// Appends an aggregate of such parameters.
    fn put_all(list: &[Self], line: &mut String) -> Result<(), f64>
    where
        Self: Sized,
    {
        line.push('(');
        for (i, parameter) in list.iter().enumerate() {
            if i > 0 {
                line.push(',');
            }
            parameter.put(line)?;
        }
        line.push(')');
        Ok(())
    }
}

/// An enumeration's value, written `.VALUE.`.
#[derive(Clone, Copy, Debug)]
pub(super) struct Enumeration(pub(super) &'static str);

/// A value with the name of its type, written `NAME(value)`: how a SELECT tells which type it holds.
#[derive(Clone, Copy, Debug)]
pub(super) struct Typed<T>(pub(super) &'static str, pub(super) T);

/// An attribute that a subtype derives, written `*`.
#[derive(Clone, Copy, Debug)]
pub(super) struct Derived;

impl Parameter for Derived {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        line.push('*');
        Ok(())
    }
}

impl Parameter for Enumeration {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        line.push('.');
        line.push_str(self.0);
        line.push('.');
        Ok(())
    }
}

impl<T: Parameter> Parameter for Typed<T> {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        line.push_str(self.0);
        line.push('(');
        self.1.put(line)?;
        line.push(')');
        Ok(())
    }
}

impl Parameter for f64 {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        if !self.is_finite() {
            return Err(*self);
        }
        put_real(*self, line);
        Ok(())
    }
}

impl Parameter for str {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        put_string(self, line);
        Ok(())
    }
}

impl Parameter for bool {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        put_display(BooleanDisplay(*self), line)
    }
}

impl Parameter for usize {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        put_display(self, line)
    }

    fn put_all(list: &[Self], line: &mut String) -> Result<(), f64> {
        put_display(SliceDisplay(list), line)
    }
}

impl Parameter for Id {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        put_display(format_args!("#{}", self.0), line)
    }

    fn put_all(list: &[Self], line: &mut String) -> Result<(), f64> {
        put_display(IndexSliceDisplay(list.iter().map(|id| id.0)), line)
    }
}

impl<T: Parameter> Parameter for Option<T> {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        match self {
            Some(parameter) => parameter.put(line),
            None => {
                line.push('$');
                Ok(())
            }
        }
    }
}

impl<T: Parameter + ?Sized> Parameter for &T {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        (**self).put(line)
    }
}

impl<T: Parameter> Parameter for [T] {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        T::put_all(self, line)
    }
}

impl<T: Parameter, const N: usize> Parameter for [T; N] {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        T::put_all(self, line)
    }
}

impl<T: Parameter> Parameter for Vec<T> {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        T::put_all(self, line)
    }
}

/// An aggregate of two parameters of different types.
impl<A: Parameter, B: Parameter> Parameter for (A, B) {
    fn put(&self, line: &mut String) -> Result<(), f64> {
        line.push('(');
        self.0.put(line)?;
        line.push(',');
        self.1.put(line)?;
        line.push(')');
        Ok(())
    }
}

fn put_display(value: impl std::fmt::Display, line: &mut String) -> Result<(), f64> {
    // writing into a string can't fail
    let _ = write!(line, "{value}");
    Ok(())
}

/// A keyword and its parameters.
pub(super) type Record<'a> = (&'static str, &'a [&'a dyn Parameter]);

/// An exchange structure that is being written: instances are numbered from 1 as they come, and each leaves as soon
/// as its line is complete.
pub(super) struct Exchange<W> {
    out: W,
    line: String,
    last: usize,
}

impl<W: Write> Exchange<W> {
    /// Writes the header section and opens the data section.
    pub(super) fn begin(out: W, header: &[Record<'_>]) -> Result<Self, Error> {
        let mut exchange = Self {
            out,
            line: String::new(),
            last: 0,
        };
        exchange.out.write_all(b"ISO-10303-21;\nHEADER;\n")?;
        for record in header {
            exchange.line.clear();
            exchange.put_record(record)?;
            exchange.end_line()?;
        }
        exchange.out.write_all(b"ENDSEC;\nDATA;\n")?;
        Ok(exchange)
    }

    /// Writes an instance: simple with one record, complex with several, which are put in their order (by ASCII code,
    /// where `_` follows the letters).
    pub(super) fn instance(&mut self, records: &mut [Record<'_>]) -> Result<Id, Error> {
        let id = Id(self.last + 1);
        self.line.clear();
        // writing into a string can't fail
        let _ = write!(self.line, "#{}=", id.0);
        if let [record] = records {
            self.put_record(record)?;
        } else {
            records.sort_unstable_by_key(|record| record.0);
            self.line.push('(');
            for record in &*records {
                self.put_record(record)?;
            }
            self.line.push(')');
        }
        self.end_line()?;
        self.last = id.0;
        Ok(id)
    }

    /// Closes the structure and hands everything on.
    pub(super) fn end(mut self) -> Result<(), Error> {
        self.out.write_all(b"ENDSEC;\nEND-ISO-10303-21;\n")?;
        Ok(self.out.flush()?)
    }

    fn put_record(&mut self, (keyword, parameters): &Record<'_>) -> Result<(), Error> {
        self.line.push_str(keyword);
        self.line.push('(');
        for (i, parameter) in parameters.iter().enumerate() {
            if i > 0 {
                self.line.push(',');
            }
            let put = parameter.put(&mut self.line);
            put.map_err(|value| Error::NotFinite {
                entity: keyword,
                value,
            })?;
        }
        self.line.push(')');
        Ok(())
    }

    fn end_line(&mut self) -> Result<(), Error> {
        self.line.push_str(";\n");
        Ok(self.out.write_all(self.line.as_bytes())?)
    }
}
