//! An excerpt of the published schema, and whether a file conforms to it.

use std::collections::{BTreeMap, BTreeSet};

use super::reader::{File, Instance, Read};
use crate::write::step::SCHEMA;

/// An attribute's type.
#[derive(Debug)]
enum Type {
    /// STRING, REAL, INTEGER, NUMBER, BOOLEAN or LOGICAL.
    Simple(String),
    Enumeration(Vec<String>),
    Aggregate(usize, Option<usize>, Box<Self>),
    Entity(String),
    /// Entities by reference, and other types by name.
    Select(Vec<String>, BTreeMap<String, Self>),
}

#[derive(Debug)]
struct Attribute {
    name: String,
    optional: bool,
    of: Type,
}

#[derive(Debug)]
struct Entity {
    is_abstract: bool,
    supertypes: Vec<String>,
    own: Vec<Attribute>,
    redeclared: Vec<Attribute>,
    derived: Vec<String>,
}

/// Entities by their names in capitals.
#[derive(Debug)]
pub(crate) struct Schema(BTreeMap<String, Entity>);

impl Schema {
    /// The excerpt.
    pub(crate) fn excerpt() -> Self {
        let lines = SCHEMA.lines().filter(|line| !line.starts_with('#'));
        Self(lines.map(entity).collect())
    }

    /// True where the excerpt has the entity.
    pub(crate) fn has(&self, keyword: &str) -> bool {
        self.0.contains_key(keyword)
    }

    /// An entity's supertypes, then the entity, each once: the order of the attributes of a simple instance.
    fn lineage(&self, keyword: &str) -> Vec<&str> {
        let mut found: Vec<&str> = Vec::new();
        if let Some((name, entity)) = self.0.get_key_value(keyword) {
            for supertype in &entity.supertypes {
                for name in self.lineage(supertype) {
                    if !found.contains(&name) {
                        found.push(name);
                    }
                }
            }
            found.push(name);
        }
        found
    }

    /// Every fault of a file, one a line.
    pub(crate) fn faults(&self, file: &File) -> Vec<String> {
        let mut check = Check {
            schema: self,
            kinds: BTreeMap::new(),
            faults: Vec::new(),
        };
        for instance in &file.instances {
            let kinds = instance
                .records
                .iter()
                .flat_map(|record| self.lineage(&record.0))
                .collect();
            if check.kinds.insert(instance.id, kinds).is_some() {
                check.faults.push(format!("#{}: used twice", instance.id));
            }
        }
        for instance in &file.instances {
            check.instance(instance);
        }
        check.faults
    }
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
        let lineage: BTreeSet<&str> = names.iter().flat_map(|name| self.schema.lineage(name)).collect();
        if let Some(name) = names.iter().find(|name| !self.schema.has(name)) {
            return self.faults.push(format!("#{id}: {name} is not in the excerpt"));
        }
        if instance.complex {
            if !names.is_sorted() {
                self.faults
                    .push(format!("#{id}: records are not in the order of their names"));
            }
            if lineage.len() != names.len() {
                self.faults
                    .push(format!("#{id}: {names:?} should be {lineage:?}"));
            }
        } else if self.schema.0[names[0]].is_abstract {
            self.faults.push(format!("#{id}: {} is abstract", names[0]));
        }
        for (name, values) in &instance.records {
            let owners = if instance.complex {
                vec![name.as_str()]
            } else {
                self.schema.lineage(name)
            };
            let attributes: Vec<_> = owners
                .iter()
                .flat_map(|owner| &self.schema.0[*owner].own)
                .collect();
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
    fn fits_attribute(&self, value: &Read, attribute: &Attribute, lineage: &BTreeSet<&str>) -> bool {
        let entities = || lineage.iter().map(|name| &self.schema.0[*name]);
        if entities().any(|entity| entity.derived.contains(&attribute.name)) {
            return *value == Read::Derived;
        }
        let redeclared = entities()
            .flat_map(|entity| &entity.redeclared)
            .find(|a| a.name == attribute.name);
        let attribute = redeclared.unwrap_or(attribute);
        attribute.optional && *value == Read::Omitted || self.fits(value, &attribute.of)
    }

    fn fits(&self, value: &Read, of: &Type) -> bool {
        match (value, of) {
            (Read::Text(_), Type::Simple(name)) => name == "STRING",
            (Read::Real(_), Type::Simple(name)) => matches!(&name[..], "REAL" | "NUMBER"),
            (Read::Integer(_), Type::Simple(name)) => matches!(&name[..], "INTEGER" | "NUMBER"),
            (Read::Enumeration(value), Type::Simple(name)) => match &name[..] {
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

fn entity(line: &str) -> (String, Entity) {
    let mut parts = line.split(';').map(str::trim);
    let (name, supertypes) = parts
        .next()
        .and_then(|head| head.split_once('<'))
        .expect("an entity's line");
    let is_abstract = name.contains(" abstract");
    let name = name
        .split_whitespace()
        .next()
        .expect("an entity's name")
        .to_uppercase();
    let supertypes = supertypes.split_whitespace().map(str::to_uppercase).collect();
    let mut entity = Entity {
        is_abstract,
        supertypes,
        own: vec![],
        redeclared: vec![],
        derived: vec![],
    };
    for part in parts {
        if let Some(name) = part.strip_prefix("DERIVE ") {
            entity.derived.push(name.to_owned());
            continue;
        }
        let (name, of) = part.split_once(": ").expect("an attribute");
        let (optional, of) = match of.strip_prefix("OPTIONAL ") {
            Some(of) => (true, of),
            None => (false, of),
        };
        let attribute = |name: &str| Attribute {
            name: name.to_owned(),
            optional,
            of: type_of(of),
        };
        match name.strip_prefix("SELF.") {
            Some(name) => entity.redeclared.push(attribute(name)),
            None => entity.own.push(attribute(name)),
        }
    }
    (name, entity)
}

fn type_of(text: &str) -> Type {
    let inside = |start| {
        text.strip_prefix(start)
            .and_then(|text: &str| text.strip_suffix(')'))
    };
    if let Some(bounds) = text.strip_prefix('[') {
        let (bounds, of) = bounds.split_once("] ").expect("an aggregate's bounds");
        let (least, most) = bounds.split_once(':').expect("two bounds");
        let least = least.parse().expect("the lower bound");
        Type::Aggregate(least, most.parse().ok(), Box::new(type_of(of)))
    } else if let Some(values) = inside("ENUMERATION(") {
        Type::Enumeration(values.split(' ').map(str::to_uppercase).collect())
    } else if let Some(members) = inside("SELECT(") {
        let (mut entities, mut types) = (Vec::new(), BTreeMap::new());
        for member in members.split(" | ") {
            match member.split_once('=') {
                Some((name, of)) => drop(types.insert(name.to_uppercase(), type_of(of))),
                None => entities.push(member.to_uppercase()),
            }
        }
        Type::Select(entities, types)
    } else if text.chars().all(|c| c.is_ascii_uppercase()) {
        Type::Simple(text.to_owned())
    } else {
        Type::Entity(text.to_uppercase())
    }
}
