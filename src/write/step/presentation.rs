//! Colours, line fonts and layers: gathered while the geometry is written, closed at the end.

use std::io::Write;

use crate::planform::LineKind;

use super::error::Error;
use super::part21::{Exchange, Id};
use super::style::{Layer, POINT_COLOUR, POINT_SIZE, line_style};
use super::units::Units;

/// What is styled and what is on which layer, each in the order of first use.
#[derive(Debug, Default)]
pub(super) struct Presentation {
    items: Vec<Id>,
    layers: Vec<(Layer, Vec<Id>)>,
    surfaces: Vec<([u64; 3], Id)>,
    curves: Vec<(LineKind, Id)>,
    points: Option<Id>,
}

impl Presentation {
    /// Colours a solid or face.
    pub(super) fn surface<W: Write>(
        &mut self,
        out: &mut Exchange<W>,
        name: &str,
        rgb: [f64; 3],
        item: Id,
    ) -> Result<(), Error> {
        let key = rgb.map(f64::to_bits);
        let style = match self.surfaces.iter().find(|(known, _)| *known == key) {
            Some(&(_, style)) => style,
            None => {
                let colour = out.colour(rgb)?;
                let colour = out.fill_colour(colour)?;
                let fill = out.fill_style(colour)?;
                let area = out.fill_area(fill)?;
                let side = out.side_style(area)?;
                let surface = out.surface_style(side)?;
                let style = out.style_assignment(surface)?;
                self.surfaces.push((key, style));
                style
            }
        };
        self.items.push(out.styled_item(name, style, item)?);
        Ok(())
    }

    /// Gives a line the style and the layer of its kind.
    pub(super) fn curve<W: Write>(
        &mut self,
        out: &mut Exchange<W>,
        units: Units,
        name: &str,
        kind: LineKind,
        item: Id,
    ) -> Result<(), Error> {
        let look = line_style(kind);
        let style = match self.curves.iter().find(|(known, _)| *known == kind) {
            Some(&(_, style)) => style,
            None => {
                let font = out.curve_font(look.font)?;
                let colour = out.colour(look.colour)?;
                let curve = out.curve_style(font, units.to_length(look.width), colour)?;
                let style = out.style_assignment(curve)?;
                self.curves.push((kind, style));
                style
            }
        };
        self.items.push(out.styled_item(name, style, item)?);
        self.put_on(look.layer, item);
        Ok(())
    }

    /// Marks a point.
    pub(super) fn point<W: Write>(
        &mut self,
        out: &mut Exchange<W>,
        units: Units,
        name: &str,
        item: Id,
    ) -> Result<(), Error> {
        let style = match self.points {
            Some(style) => style,
            None => {
                let colour = out.colour(POINT_COLOUR)?;
                let point = out.point_style(units.to_length(POINT_SIZE), colour)?;
                *self.points.insert(out.style_assignment(point)?)
            }
        };
        self.items.push(out.styled_item(name, style, item)?);
        Ok(())
    }

    /// Puts an item on a layer.
    pub(super) fn put_on(&mut self, layer: Layer, item: Id) {
        match self.layers.iter_mut().find(|(known, _)| *known == layer) {
            Some((_, items)) => items.push(item),
            None => self.layers.push((layer, vec![item])),
        }
    }

    /// Writes the gathered styles' representation and the layers.
    pub(super) fn write<W: Write>(self, out: &mut Exchange<W>, units: Units) -> Result<(), Error> {
        out.presentation(&self.items, units.context)?;
        for (layer, items) in &self.layers {
            out.layer(layer.name, layer.description, items)?;
        }
        Ok(())
    }
}
