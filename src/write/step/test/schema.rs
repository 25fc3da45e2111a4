//! Whether a file conforms to the excerpt of the published schema.

use std::collections::{BTreeMap, BTreeSet};

use super::reader::{File, Instance, Read};
use crate::write::step::schema::{Attribute, Entity, Schema, Type};

/// Every fault of a file, one a line.
pub(crate) fn faults(schema: &Schema, file: &File) -> Vec<String> {
    let mut check = Check {
        schema,
        kinds: BTreeMap::new(),
        faults: Vec::new(),
    };
    for instance in &file.instances {
        let lineages = instance
            .records
            .iter()
            .flat_map(|record| schema.lineage(&record.0));
        let kinds = lineages.map(|(name, _)| name).collect();
        if check.kinds.insert(instance.id, kinds).is_some() {
            check.faults.push(format!("#{}: used twice", instance.id));
        }
    }
    for instance in &file.instances {
        check.instance(instance);
    }
    check.faults
}

struct Check<'a> {
    schema: &'a Schema,
    kinds: BTreeMap<usize, BTreeSet<&'a str>>,
    faults: Vec<String>,
}

impl Check<'_> {
    fn instance(&mut self, instance: &Instance) {
        let id = instance.id;
        let names: Vec<&str> = instance.records.iter().map(|record| &record.0[..]).collect();
        if let Some(name) = names.iter().find(|name| !self.schema.has(name)) {
            return self.faults.push(format!("#{id}: {name} is not in the excerpt"));
        }
        let lineage: BTreeMap<&str, &Entity> =
            names.iter().flat_map(|name| self.schema.lineage(name)).collect();
        if instance.complex {
            if !names.is_sorted() {
                self.faults
                    .push(format!("#{id}: records are not in the order of their names"));
            }
            if lineage.len() != names.len() {
                let wanted: Vec<&&str> = lineage.keys().collect();
                self.faults.push(format!("#{id}: {names:?} should be {wanted:?}"));
            }
        } else if lineage[names[0]].is_abstract {
            self.faults.push(format!("#{id}: {} is abstract", names[0]));
        }
        for (name, values) in &instance.records {
            let owners: Vec<(&str, &Entity)> = if instance.complex {
                self.schema.entity(name).into_iter().collect()
            } else {
                self.schema.lineage(name)
            };
            let attributes: Vec<&Attribute> = owners.into_iter().flat_map(|(_, owner)| &owner.own).collect();
            if attributes.len() != values.len() {
                let (wanted, found) = (attributes.len(), values.len());
                self.faults
                    .push(format!("#{id}: {name} takes {wanted} values, has {found}"));
            }
            for (attribute, value) in attributes.into_iter().zip(values) {
                if !self.fits_attribute(value, attribute, &lineage) {
                    self.faults
                        .push(format!("#{id}: {name}.{} can't be {value:?}", attribute.name));
                }
            }
        }
    }

    /// True where a value fits an attribute as it is in the instance's own entity.
    fn fits_attribute(&self, value: &Read, attribute: &Attribute, lineage: &BTreeMap<&str, &Entity>) -> bool {
        if lineage
            .values()
            .any(|entity| entity.derived.contains(&attribute.name))
        {
            return *value == Read::Derived;
        }
        let mut redeclared = lineage.values().flat_map(|entity| &entity.redeclared);
        let attribute = redeclared.find(|a| a.name == attribute.name).unwrap_or(attribute);
        attribute.optional && *value == Read::Omitted || self.fits(value, &attribute.of)
    }

    fn fits(&self, value: &Read, of: &Type) -> bool {
        match (value, of) {
            (Read::Text(_), Type::Simple(name)) => *name == "STRING",
            (Read::Real(_), Type::Simple(name)) => matches!(*name, "REAL" | "NUMBER"),
            (Read::Integer(_), Type::Simple(name)) => matches!(*name, "INTEGER" | "NUMBER"),
            (Read::Enumeration(value), Type::Simple(name)) => match *name {
                "BOOLEAN" => matches!(&value[..], "T" | "F"),
                "LOGICAL" => matches!(&value[..], "T" | "F" | "U"),
                _ => false,
            },
            (Read::Enumeration(value), Type::Enumeration(values)) => values.contains(value),
            (Read::List(list), Type::Aggregate(least, most, of)) => {
                let number = *least..=most.unwrap_or(usize::MAX);
                number.contains(&list.len()) && list.iter().all(|value| self.fits(value, of))
            }
            (Read::Reference(id), Type::Entity(name)) => self.is(*id, name),
            (Read::Reference(id), Type::Select(entities, _)) => {
                entities.iter().any(|name| self.is(*id, name))
            }
            (Read::Typed(name, values), Type::Select(_, types)) => match (types.get(name), &values[..]) {
                (Some(of), [value]) => self.fits(value, of),
                _ => false,
            },
            _ => false,
        }
    }

    /// True where the instance exists and is of that entity.
    fn is(&self, id: usize, name: &str) -> bool {
        self.kinds.get(&id).is_some_and(|kinds| kinds.contains(name))
    }
}
