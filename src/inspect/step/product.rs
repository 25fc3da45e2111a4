//! Products, and which solid is the shape of which.

use std::collections::HashMap;

use super::access::{Args, Read, args, finding};
use super::report::Product;
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange};

/// Where a representation leads: the shape it is of, and the product's name.
#[derive(Clone, Debug)]
pub(super) struct Owner {
    /// Number of the product's shape.
    pub(super) shape: u64,
    /// The product's name.
    pub(super) product: String,
}

/// The products of a file.
pub(super) fn products(file: &Exchange<'_>, faults: &mut Vec<Finding>) -> Vec<Product> {
    let mut products = Vec::new();
    for entry in file.all("PRODUCT") {
        let product = args(file, entry, "PRODUCT").and_then(|product| {
            Ok(Product {
                id: product.text(0)?,
                name: product.text(1)?,
                description: product.text(2)?,
            })
        });
        match product {
            Ok(product) => products.push(product),
            Err(fault) => faults.push(fault),
        }
    }
    products
}

/// The product whose shape each item of a shape representation is.
pub(super) fn owners(file: &Exchange<'_>, faults: &mut Vec<Finding>) -> HashMap<u64, Owner> {
    let mut owners = HashMap::new();
    for entry in file.all("SHAPE_DEFINITION_REPRESENTATION") {
        match owner(file, entry) {
            Ok((items, owner)) => owners.extend(items.into_iter().map(|item| (item, owner.clone()))),
            Err(fault) => faults.push(fault),
        }
    }
    owners
}

fn owner(file: &Exchange<'_>, entry: Entry) -> Read<(Vec<u64>, Owner)> {
    let link = args(file, entry, "SHAPE_DEFINITION_REPRESENTATION")?;
    let shape = link.follow(file, 0, "PRODUCT_DEFINITION_SHAPE")?;
    let product = product_of(file, &shape)?;
    let representation = link.named(file, link.reference(1)?)?;
    // the representation is of any kind of shape: all have a name, items and a context
    let keyword = file.kind_of(representation).keywords[0].clone();
    let representation = args(file, representation, &keyword)?;
    let shape = shape.id;
    Ok((representation.references(1)?, Owner { shape, product }))
}

/// Name of the product of a shape.
fn product_of<'a>(file: &Exchange<'a>, shape: &Args<'a>) -> Read<String> {
    let definition = shape.follow(file, 2, "PRODUCT_DEFINITION")?;
    let formation = definition.follow(file, 2, "PRODUCT_DEFINITION_FORMATION")?;
    formation.follow(file, 2, "PRODUCT")?.text(1)
}

/// What is not as this program writes products: each with a category and a shape, parts where they are drawn.
pub(super) fn check(file: &Exchange<'_>, faults: &mut Vec<Finding>) {
    let mut check = |keyword: &str, of: &str, i: usize, list: bool| {
        let mut known: Vec<u64> = Vec::new();
        for entry in file.all(keyword) {
            let found = args(file, entry, keyword).and_then(|record| {
                if list {
                    record.references(i)
                } else {
                    Ok(vec![record.reference(i)?])
                }
            });
            match found {
                Ok(ids) => known.extend(ids),
                Err(fault) => faults.push(fault),
            }
        }
        known.sort_unstable();
        for entry in file
            .all(of)
            .filter(|entry| known.binary_search(&entry.id).is_err())
        {
            faults.push(finding(
                entry.line,
                format!("#{} {of} has no {keyword}", entry.id),
            ));
        }
    };
    check("PRODUCT_RELATED_PRODUCT_CATEGORY", "PRODUCT", 2, true);
    check("PRODUCT_DEFINITION_SHAPE", "PRODUCT_DEFINITION", 2, false);
    check(
        "PRODUCT_DEFINITION_SHAPE",
        "NEXT_ASSEMBLY_USAGE_OCCURRENCE",
        2,
        false,
    );
    check(
        "CONTEXT_DEPENDENT_SHAPE_REPRESENTATION",
        "REPRESENTATION_RELATIONSHIP_WITH_TRANSFORMATION",
        0,
        false,
    );
    check("GENERAL_PROPERTY_ASSOCIATION", "GENERAL_PROPERTY", 2, false);
    check("APPLICATION_PROTOCOL_DEFINITION", "APPLICATION_CONTEXT", 3, false);
    let shapes = Shapes::read(file);
    for entry in file.all("PRODUCT_DEFINITION_SHAPE") {
        faults.extend(shapes.check(file, entry).err());
    }
    for entry in file.all("CONTEXT_DEPENDENT_SHAPE_REPRESENTATION") {
        faults.extend(shapes.check_placed(file, entry).err());
    }
}

/// How shapes are represented; what can't be read is a fault elsewhere.
struct Shapes {
    /// For each shape, how many representations or places it has.
    uses: HashMap<u64, usize>,
    /// For each product definition, the representation of its shape.
    representations: HashMap<u64, u64>,
}

impl Shapes {
    fn read(file: &Exchange<'_>) -> Self {
        let mut shapes = Self {
            uses: HashMap::new(),
            representations: HashMap::new(),
        };
        for entry in file.all("SHAPE_DEFINITION_REPRESENTATION") {
            let found = args(file, entry, "SHAPE_DEFINITION_REPRESENTATION").and_then(|link| {
                let shape = link.follow(file, 0, "PRODUCT_DEFINITION_SHAPE")?;
                Ok((shape.id, shape.reference(2)?, link.reference(1)?))
            });
            if let Ok((shape, definition, representation)) = found {
                *shapes.uses.entry(shape).or_default() += 1;
                shapes.representations.insert(definition, representation);
            }
        }
        for entry in file.all("CONTEXT_DEPENDENT_SHAPE_REPRESENTATION") {
            let placed = args(file, entry, "CONTEXT_DEPENDENT_SHAPE_REPRESENTATION");
            if let Ok(shape) = placed.and_then(|placed| placed.reference(1)) {
                *shapes.uses.entry(shape).or_default() += 1;
            }
        }
        shapes
    }

    /// A product's shape has a representation, an occurrence's a place.
    fn check(&self, file: &Exchange<'_>, entry: Entry) -> Read<()> {
        let shape = args(file, entry, "PRODUCT_DEFINITION_SHAPE")?;
        match self.uses.get(&shape.id).copied().unwrap_or(0) {
            1 => Ok(()),
            n => {
                let what = format!("#{}: a shape with {n} representations; one is expected", shape.id);
                Err(finding(shape.line, what))
            }
        }
    }

    /// An occurrence places the representation of its part in that of its whole, where it is drawn.
    fn check_placed(&self, file: &Exchange<'_>, entry: Entry) -> Read<()> {
        let placed = args(file, entry, "CONTEXT_DEPENDENT_SHAPE_REPRESENTATION")?;
        let occurrence = placed.follow(file, 1, "PRODUCT_DEFINITION_SHAPE")?;
        let occurrence = occurrence.follow(file, 2, "NEXT_ASSEMBLY_USAGE_OCCURRENCE")?;
        let relation = placed.follow(file, 0, "REPRESENTATION_RELATIONSHIP")?;
        let (whole, part) = (occurrence.reference(3)?, occurrence.reference(4)?);
        let expected = [part, whole].map(|definition| self.representations.get(&definition).copied());
        let found = [relation.reference(2)?, relation.reference(3)?];
        if expected != found.map(Some) {
            let what = format!(
                "#{}: the part that is placed is not the one of its occurrence #{}",
                placed.id, occurrence.id
            );
            return Err(finding(placed.line, what));
        }
        Ok(())
    }
}
