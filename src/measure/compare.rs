//! What was asked for beside what was found.

use serde::Serialize;

/// A figure that was asked for.
#[derive(Clone, Debug, PartialEq)]
pub struct Ask {
    /// What it is called, such as `chord at the tip`.
    pub name: String,
    /// What kind of quantity it is.
    pub quantity: Quantity,
    /// Value asked for: mm, mm², rad, or a ratio.
    pub asked: f64,
    /// Value found on the solid.
    pub built: f64,
    /// Largest deviation that counts as as asked.
    pub allowed: f64,
}

/// Kinds of quantities, for the unit in reports.
#[derive(Clone, Copy, Debug, PartialEq, Eq, Serialize)]
pub enum Quantity {
    /// A length.
    Length,
    /// An area.
    Area,
    /// An angle.
    Angle,
    /// A number without unit.
    Ratio,
}

/// A figure asked for, the figure found, and whether they agree.
#[derive(Clone, Debug, PartialEq)]
pub struct Check {
    /// The figures.
    pub ask: Ask,
    /// `built - asked`.
    pub deviation: f64,
    /// Whether the deviation is allowed.
    pub ok: bool,
}

/// Compares figures asked for with figures found.
pub fn compare(asks: Vec<Ask>) -> Vec<Check> {
    asks.into_iter()
        .map(|ask| {
            let deviation = ask.built - ask.asked;
            // a figure that is no number is never as asked
            let ok = deviation.abs() <= ask.allowed;
            Check { ask, deviation, ok }
        })
        .collect()
}
