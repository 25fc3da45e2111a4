//! Units and accuracy of a file.

use super::access::{Args, Read, args, finding};
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Value};

/// Distance that counts as none in files of this program \[mm\]: the bound of its own check of edges on faces.
const OWN_TOLERANCE: f64 = 1e-6;

/// The length unit and accuracy.
#[derive(Clone, Debug)]
pub(super) struct Context {
    /// Symbol of the length unit.
    pub(super) symbol: String,
    /// Millimetres in it.
    pub(super) millimetres: f64,
    /// Distances below this don't count, as stated, in the unit.
    pub(super) uncertainty: Option<f64>,
    /// Distances below this count as none here, in the unit.
    pub(super) tolerance: f64,
    /// True where this program wrote the file.
    pub(super) own: bool,
}

impl Context {
    /// Reads the units of a file's representations, which all have to be the same.
    pub(super) fn read(file: &Exchange<'_>, own: bool, faults: &mut Vec<Finding>) -> Self {
        let mut context = Self {
            symbol: String::new(),
            millimetres: 1.0,
            uncertainty: None,
            tolerance: OWN_TOLERANCE,
            own,
        };
        let mut contexts = file.all("GLOBAL_UNIT_ASSIGNED_CONTEXT").peekable();
        if contexts.peek().is_none() {
            faults.push(Finding {
                line: None,
                what: "no representation states its units".to_owned(),
            });
        }
        for entry in contexts {
            match context.add(file, entry) {
                Ok(()) => {}
                Err(fault) => faults.push(fault),
            }
        }
        if !own {
            context.tolerance = context
                .uncertainty
                .unwrap_or(0.0)
                .max(OWN_TOLERANCE / context.millimetres);
        } else {
            context.tolerance = OWN_TOLERANCE / context.millimetres;
        }
        context
    }

    fn add(&mut self, file: &Exchange<'_>, entry: Entry) -> Read<()> {
        let units = args(file, entry, "GLOBAL_UNIT_ASSIGNED_CONTEXT")?;
        let mut found = [0; 3];
        for id in units.references(0)? {
            let unit = units.named(file, id)?;
            let kind = file.kind_of(unit);
            if kind.has("LENGTH_UNIT") {
                found[0] += 1;
                let (symbol, millimetres) = length(file, unit)?;
                if !self.symbol.is_empty() && self.symbol != symbol {
                    let what = format!("lengths are in {} and in {symbol}", self.symbol);
                    return Err(finding(entry.line, what));
                }
                (self.symbol, self.millimetres) = (symbol, millimetres);
            } else if kind.has("PLANE_ANGLE_UNIT") {
                found[1] += 1;
            } else if kind.has("SOLID_ANGLE_UNIT") {
                found[2] += 1;
            }
        }
        if found[0] != 1 || (self.own && found != [1, 1, 1]) {
            return Err(finding(
                entry.line,
                format!(
                    "#{}: one unit each of length, angle and solid angle is expected",
                    entry.id
                ),
            ));
        }
        if file.kind_of(entry).has("GEOMETRIC_REPRESENTATION_CONTEXT") {
            let space = args(file, entry, "GEOMETRIC_REPRESENTATION_CONTEXT")?;
            if self.own && space.count(0)? != 3 {
                return Err(finding(
                    entry.line,
                    format!("#{}: the space has not three dimensions", entry.id),
                ));
            }
        }
        if file.kind_of(entry).has("GLOBAL_UNCERTAINTY_ASSIGNED_CONTEXT") {
            let list = args(file, entry, "GLOBAL_UNCERTAINTY_ASSIGNED_CONTEXT")?;
            for id in list.references(0)? {
                let measure = list.record_of(file, id, "UNCERTAINTY_MEASURE_WITH_UNIT")?;
                let value = typed(&measure, 0)?.1;
                let unit = length(file, measure.named(file, measure.reference(1)?)?)?;
                if value <= 0.0 || (self.own && (value * unit.1 - 1e-5).abs() > 1e-9) {
                    let what = format!("#{id}: {value:?} {} is no accuracy for this file", unit.0);
                    return Err(finding(measure.line, what));
                }
                self.uncertainty = Some(value * unit.1 / self.millimetres);
            }
        }
        Ok(())
    }
}

/// The name of a typed parameter's type and its number.
pub(super) fn typed<'a>(record: &Args<'a>, i: usize) -> Read<(&'a str, f64)> {
    if let Some(Value::Typed(name, values)) = record.value(i)
        && let [value] = &values[..]
        && let Some(number) = super::access::number(value)
    {
        return Ok((name, number));
    }
    let what = format!(
        "#{} {}: parameter {} is no measure",
        record.id,
        record.keyword,
        i + 1
    );
    Err(finding(record.line, what))
}

/// Symbol of a length unit and the millimetres in it.
pub(super) fn length(file: &Exchange<'_>, entry: Entry) -> Read<(String, f64)> {
    let kind = file.kind_of(entry);
    if !kind.has("LENGTH_UNIT") {
        return Err(finding(entry.line, format!("#{} is no unit of length", entry.id)));
    }
    if kind.has("SI_UNIT") {
        let unit = args(file, entry, "SI_UNIT")?;
        let metre = unit.value(1) == Some(&Value::Enumeration("METRE"));
        let prefix = match unit.value(0) {
            Some(Value::Omitted) => Some(("m", 1e3)),
            Some(Value::Enumeration("CENTI")) => Some(("cm", 10.0)),
            Some(Value::Enumeration("MILLI")) => Some(("mm", 1.0)),
            Some(Value::Enumeration("MICRO")) => Some(("um", 1e-3)),
            Some(Value::Enumeration("KILO")) => Some(("km", 1e6)),
            _ => None,
        };
        return match prefix {
            Some((symbol, millimetres)) if metre => Ok((symbol.to_owned(), millimetres)),
            _ => Err(finding(
                entry.line,
                format!("#{}: not a multiple of the metre that is read here", entry.id),
            )),
        };
    }
    let unit = args(file, entry, "CONVERSION_BASED_UNIT")?;
    let name = unit.text(0)?;
    let factor = unit.follow(file, 1, "LENGTH_MEASURE_WITH_UNIT")?;
    let base = factor.named(file, factor.reference(1)?)?;
    let millimetres = typed(&factor, 0)?.1 * length(file, base)?.1;
    let (symbol, real) = match name.to_uppercase().as_str() {
        "INCH" | "IN" => ("in", 25.4),
        "FOOT" | "FT" => ("ft", 304.8),
        _ => return Ok((name, millimetres)),
    };
    if (millimetres / real - 1.0).abs() > 1e-9 {
        let what = format!(
            "#{}: {name} stands for {millimetres:?} mm and is {real} mm",
            entry.id
        );
        return Err(finding(factor.line, what));
    }
    Ok((symbol.to_owned(), real))
}
