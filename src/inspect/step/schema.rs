//! Whether instances are as the published schema has their entities: number, types and kinds of parameters.

use std::collections::HashSet;

use super::access::finding;
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Kind, Value, decode};
use crate::write::step::schema::{Attribute, Entity, Schema, Type};

/// What every instance of one kind has to be.
struct Shape<'a> {
    /// For each record: its attributes, and for each whether it is derived.
    records: Vec<Vec<(&'a Attribute, bool)>>,
    /// The kind and all its supertypes.
    lineage: HashSet<&'a str>,
}

/// Checks every instance; gives the names of entities that the schema's excerpt lacks.
pub(super) fn check(file: &Exchange<'_>, faults: &mut Vec<Finding>) -> Vec<String> {
    let schema = Schema::excerpt();
    let mut unknown = Vec::new();
    let shapes: Vec<Option<Shape<'_>>> = (file.kinds.iter())
        .map(|kind| {
            let missing = kind.keywords.iter().filter(|keyword| !schema.has(keyword));
            let before = unknown.len();
            unknown.extend(missing.cloned());
            (unknown.len() == before).then(|| shape(&schema, kind))
        })
        .collect();
    let check = Check { file, shapes };
    for &entry in file.entries() {
        check.instance(entry, faults);
    }
    unknown
}

fn shape<'a>(schema: &'a Schema, kind: &Kind) -> Shape<'a> {
    let all: Vec<(&str, &Entity)> = kind
        .keywords
        .iter()
        .flat_map(|keyword| schema.lineage(keyword))
        .collect();
    let derived = |name: &str| all.iter().any(|(_, entity)| entity.derived.contains(&name));
    let redeclared = |name: &str| {
        let mut all = all.iter().flat_map(|(_, entity)| &entity.redeclared);
        all.find(|attribute| attribute.name == name)
    };
    let record = |keyword: &String| {
        let owners: Vec<(&str, &Entity)> = if kind.complex {
            schema.entity(keyword).into_iter().collect()
        } else {
            schema.lineage(keyword)
        };
        (owners.into_iter().flat_map(|(_, owner)| &owner.own))
            .map(|attribute| {
                (
                    redeclared(attribute.name).unwrap_or(attribute),
                    derived(attribute.name),
                )
            })
            .collect()
    };
    Shape {
        records: kind.keywords.iter().map(record).collect(),
        lineage: all.iter().map(|(name, _)| *name).collect(),
    }
}

struct Check<'a, 'b> {
    file: &'b Exchange<'a>,
    shapes: Vec<Option<Shape<'b>>>,
}

impl Check<'_, '_> {
    fn instance(&self, entry: Entry, faults: &mut Vec<Finding>) {
        let Some(shape) = &self.shapes[entry.kind()] else {
            return;
        };
        let id = entry.id;
        for (record, attributes) in self.file.instance_at(entry).records.iter().zip(&shape.records) {
            if attributes.len() != record.values.len() {
                let (wanted, found) = (attributes.len(), record.values.len());
                let what = format!(
                    "#{id} {} takes {wanted} parameters and has {found}",
                    record.keyword
                );
                faults.push(finding(entry.line, what));
                continue;
            }
            for ((attribute, derived), value) in attributes.iter().zip(&record.values) {
                let fits = if *derived {
                    *value == Value::Derived
                } else {
                    (attribute.optional && *value == Value::Omitted) || self.fits(value, &attribute.of)
                };
                if !fits {
                    let what = format!(
                        "#{id} {}: {} is not what the schema demands",
                        record.keyword, attribute.name
                    );
                    faults.push(finding(entry.line, what));
                }
            }
        }
    }

    fn fits(&self, value: &Value<'_>, of: &Type) -> bool {
        match (value, of) {
            (Value::Text(text), Type::Simple("STRING")) => decode(text).is_ok(),
            (Value::Real(_), Type::Simple("REAL" | "NUMBER")) => true,
            (Value::Integer(_), Type::Simple("INTEGER" | "NUMBER")) => true,
            (Value::Enumeration("T" | "F"), Type::Simple("BOOLEAN" | "LOGICAL")) => true,
            (Value::Enumeration("U"), Type::Simple("LOGICAL")) => true,
            (Value::Enumeration(value), Type::Enumeration(values)) => {
                values.iter().any(|known| known == value)
            }
            (Value::List(list), Type::Aggregate(least, most, of)) => {
                (*least..=most.unwrap_or(usize::MAX)).contains(&list.len())
                    && list.iter().all(|value| self.fits(value, of))
            }
            (Value::Reference(id), Type::Entity(name)) => self.is(*id, name),
            (Value::Reference(id), Type::Select(entities, _)) => {
                entities.iter().any(|name| self.is(*id, name))
            }
            (Value::Typed(name, values), Type::Select(_, types)) => match (types.get(*name), &values[..]) {
                (Some(of), [value]) => self.fits(value, of),
                _ => false,
            },
            _ => false,
        }
    }

    /// True where the instance is of that entity, or is missing or not known, which is found elsewhere.
    fn is(&self, id: u64, name: &str) -> bool {
        let shape = self
            .file
            .entry(id)
            .and_then(|entry| self.shapes[entry.kind()].as_ref());
        shape.is_none_or(|shape| shape.lineage.contains(name))
    }
}
