//! Products and assemblies of them.

use std::io::Write;

use super::Schema;
use super::error::Error;
use super::part21::{Exchange, Id};
use super::units::Units;

/// What every product refers to.
#[derive(Clone, Copy, Debug)]
pub(super) struct Contexts {
    product: Id,
    definition: Id,
}

impl Contexts {
    /// Writes the application context and protocol of a schema and the contexts of products and their definitions.
    pub(super) fn write<W: Write>(out: &mut Exchange<W>, schema: Schema) -> Result<Self, Error> {
        let (application, protocol, year) = match schema {
            Schema::Ap242 => (
                "managed model based 3d engineering",
                "ap242_managed_model_based_3d_engineering",
                2014,
            ),
            Schema::Ap214 => (
                "core data for automotive mechanical design processes",
                "automotive_design",
                2000,
            ),
        };
        let context = out.application_context(application)?;
        out.application_protocol(protocol, year, context)?;
        let product = out.product_context(context)?;
        let definition = out.definition_context(context)?;
        Ok(Self { product, definition })
    }
}

/// A product: its definition, and its shape as a property of that.
#[derive(Clone, Copy, Debug)]
pub(super) struct Product {
    pub(super) definition: Id,
    pub(super) shape: Id,
}

impl Product {
    /// Writes a product.
    pub(super) fn write<W: Write>(
        out: &mut Exchange<W>,
        contexts: Contexts,
        id: &str,
        name: &str,
        description: &str,
    ) -> Result<Self, Error> {
        let product = out.product(id, name, description, contexts.product)?;
        out.category(product)?;
        let formation = out.formation(product)?;
        let definition = out.definition(formation, contexts.definition)?;
        let shape = out.definition_shape(definition)?;
        Ok(Self { definition, shape })
    }
}

/// Writes a placement at the origin with the axes of the whole.
pub(super) fn write_origin<W: Write>(out: &mut Exchange<W>) -> Result<Id, Error> {
    let origin = out.cartesian_point("", [0.0; 3])?;
    let z = out.direction([0.0, 0.0, 1.0])?;
    let x = out.direction([1.0, 0.0, 0.0])?;
    out.placement(origin, z, x)
}

/// A part with its representation and the placement in that, waiting to be placed in an assembly.
#[derive(Debug)]
pub(super) struct Component {
    pub(super) name: String,
    pub(super) product: Product,
    pub(super) representation: Id,
    pub(super) origin: Id,
}

/// Writes an assembly of `components`, each where it is, and gives the assembly's shape representation.
pub(super) fn write_assembly<W: Write>(
    out: &mut Exchange<W>,
    units: Units,
    whole: Product,
    name: &str,
    components: &[Component],
) -> Result<Id, Error> {
    let mut origins = vec![write_origin(out)?];
    for _ in components {
        origins.push(write_origin(out)?);
    }
    let representation = out.shape_representation(name, &origins, units.context)?;
    out.shape_of(whole.shape, representation)?;
    for (i, (component, &origin)) in components.iter().zip(&origins[1..]).enumerate() {
        let number = (i + 1).to_string();
        let part = component.product.definition;
        let occurrence = out.occurrence(&number, &component.name, whole.definition, part)?;
        let shape = out.definition_shape(occurrence)?;
        let by = out.transformation(component.origin, origin)?;
        let relation = out.placed(component.representation, representation, by)?;
        out.placed_shape(relation, shape)?;
    }
    Ok(representation)
}
