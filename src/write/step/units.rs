//! Units and the one context of every representation.

use std::io::Write;

use crate::spec::Unit;

use super::error::Error;
use super::part21::{Enumeration, Exchange, Id};

/// Uncertainty that the file states: distances below it don't count \[mm\].
const UNCERTAINTY: f64 = 1e-5;

/// The context, the units in it, and the way from millimetres to the file's unit.
#[derive(Clone, Copy, Debug)]
pub(super) struct Units {
    /// The context of every representation.
    pub(super) context: Id,
    /// The length unit.
    pub(super) length: Id,
    /// The area unit.
    pub(super) area: Id,
    /// The volume unit.
    pub(super) volume: Id,
    radian: Id,
    millimetres: f64,
}

impl Units {
    /// Writes the units and the context.
    pub(super) fn write<W: Write>(out: &mut Exchange<W>, unit: Unit) -> Result<Self, Error> {
        let length = match unit {
            Unit::Millimetre => out.metre(Some(Enumeration("MILLI")))?,
            Unit::Centimetre => out.metre(Some(Enumeration("CENTI")))?,
            Unit::Metre => out.metre(None)?,
            Unit::Inch => conversion(out, "INCH", unit)?,
            Unit::Foot => conversion(out, "FOOT", unit)?,
        };
        let radian = out.radian()?;
        let steradian = out.steradian()?;
        let millimetres = unit.millimetres();
        let uncertainty = out.uncertainty(UNCERTAINTY / millimetres, length)?;
        let context = out.geometric_context(uncertainty, [length, radian, steradian])?;
        let square = out.unit_power(length, 2.0)?;
        let area = out.derived_unit(square)?;
        let cube = out.unit_power(length, 3.0)?;
        let volume = out.derived_unit(cube)?;
        Ok(Self {
            context,
            length,
            area,
            volume,
            radian,
            millimetres,
        })
    }

    /// Writes the degree.
    pub(super) fn degree<W: Write>(&self, out: &mut Exchange<W>) -> Result<Id, Error> {
        let exponents = out.exponents(0.0)?;
        let factor = out.angle_with_unit(1.0_f64.to_radians(), self.radian)?;
        out.angle_unit("DEGREE", factor, exponents)
    }

    /// A length in the file's unit, from mm.
    pub(super) fn to_length(self, mm: f64) -> f64 {
        mm / self.millimetres
    }

    /// An area in the file's unit, from mm².
    pub(super) fn to_area(self, mm2: f64) -> f64 {
        mm2 / (self.millimetres * self.millimetres)
    }

    /// A volume in the file's unit, from mm³.
    pub(super) fn to_volume(self, mm3: f64) -> f64 {
        mm3 / (self.millimetres * self.millimetres * self.millimetres)
    }

    /// Coordinates in the file's unit, from mm.
    pub(super) fn to_point(self, mm: impl Into<[f64; 3]>) -> [f64; 3] {
        mm.into().map(|x| self.to_length(x))
    }
}

fn conversion<W: Write>(out: &mut Exchange<W>, name: &str, unit: Unit) -> Result<Id, Error> {
    let millimetre = out.metre(Some(Enumeration("MILLI")))?;
    let exponents = out.exponents(1.0)?;
    let factor = out.length_with_unit(unit.millimetres(), millimetre)?;
    out.length_unit(name, factor, exponents)
}
