//! Whether instances are as the published schema has their entities: number, types and kinds of parameters.

use std::collections::{BTreeMap, HashMap, HashSet};

use super::access::finding;
use crate::inspect::Finding;
use crate::inspect::part21::{Entry, Exchange, Kind, Value, decode};
use crate::write::step::SCHEMA;

/// An attribute's type.
#[derive(Debug)]
enum Type {
    /// STRING, REAL, INTEGER, NUMBER, BOOLEAN or LOGICAL.
    Simple(&'static str),
    Enumeration(Vec<String>),
    Aggregate(usize, Option<usize>, Box<Self>),
    Entity(String),
    /// Entities by reference, and other types by name.
    Select(Vec<String>, BTreeMap<String, Self>),
}

#[derive(Debug)]
struct Attribute {
    name: &'static str,
    optional: bool,
    of: Type,
}

#[derive(Debug, Default)]
struct Entity {
    supertypes: Vec<String>,
    own: Vec<Attribute>,
    redeclared: Vec<Attribute>,
    derived: Vec<&'static str>,
}

/// Entities by their names in capitals.
type Entities = HashMap<String, Entity>;

/// What every instance of one kind has to be.
struct Shape<'a> {
    /// For each record: its attributes, and for each whether it is derived.
    records: Vec<Vec<(&'a Attribute, bool)>>,
    /// The kind and all its supertypes.
    lineage: HashSet<&'a str>,
}

/// Checks every instance; gives the names of entities that the schema's excerpt lacks.
pub(super) fn check(file: &Exchange<'_>, faults: &mut Vec<Finding>) -> Vec<String> {
    let entities: Entities = SCHEMA
        .lines()
        .filter(|line| !line.starts_with('#'))
        .map(entity)
        .collect();
    let mut unknown = Vec::new();
    let shapes: Vec<Option<Shape<'_>>> = (file.kinds.iter())
        .map(|kind| {
            let missing = kind
                .keywords
                .iter()
                .filter(|keyword| !entities.contains_key(*keyword));
            let before = unknown.len();
            unknown.extend(missing.cloned());
            (unknown.len() == before).then(|| shape(&entities, kind))
        })
        .collect();
    let check = Check { file, shapes };
    for &entry in file.entries() {
        check.instance(entry, faults);
    }
    unknown
}

fn lineage<'a>(entities: &'a Entities, keyword: &str) -> Vec<&'a str> {
    let mut found: Vec<&str> = Vec::new();
    if let Some((name, entity)) = entities.get_key_value(keyword) {
        for name in entity
            .supertypes
            .iter()
            .flat_map(|supertype| lineage(entities, supertype))
        {
            if !found.contains(&name) {
                found.push(name);
            }
        }
        found.push(name);
    }
    found
}

fn shape<'a>(entities: &'a Entities, kind: &Kind) -> Shape<'a> {
    let all: Vec<&str> = kind
        .keywords
        .iter()
        .flat_map(|keyword| lineage(entities, keyword))
        .collect();
    let derived = |name: &str| all.iter().any(|entity| entities[*entity].derived.contains(&name));
    let redeclared = |name: &str| {
        (all.iter()).find_map(|entity| {
            entities[*entity]
                .redeclared
                .iter()
                .find(|attribute| attribute.name == name)
        })
    };
    let record = |keyword: &String| {
        let (own, name) = entities
            .get_key_value(keyword)
            .map_or(("", ""), |(name, _)| (&name[..], &name[..]));
        let owners = if kind.complex {
            vec![own]
        } else {
            lineage(entities, name)
        };
        (owners.iter().flat_map(|owner| &entities[*owner].own))
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
        lineage: all.iter().copied().collect(),
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

/// One line of the excerpt.
fn entity(line: &'static str) -> (String, Entity) {
    let mut parts = line.split(';').map(str::trim);
    let (name, supertypes) = (parts.next().and_then(|head| head.split_once('<')))
        .expect("each line of the excerpt names an entity and its supertypes");
    let name = name.split_whitespace().next().unwrap_or(name).to_uppercase();
    let mut entity = Entity {
        supertypes: supertypes.split_whitespace().map(str::to_uppercase).collect(),
        ..Entity::default()
    };
    for part in parts {
        if let Some(name) = part.strip_prefix("DERIVE ") {
            entity.derived.push(name);
            continue;
        }
        let (name, of) = part
            .split_once(": ")
            .expect("each attribute of the excerpt has a type");
        let (optional, of) = of.strip_prefix("OPTIONAL ").map_or((false, of), |of| (true, of));
        let attribute = |name| Attribute {
            name,
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

fn type_of(text: &'static str) -> Type {
    let inside = |start| text.strip_prefix(start).and_then(|text| text.strip_suffix(')'));
    if let Some(bounds) = text.strip_prefix('[') {
        let (bounds, of) = bounds
            .split_once("] ")
            .expect("an aggregate of the excerpt has bounds");
        let (least, most) = bounds
            .split_once(':')
            .expect("an aggregate of the excerpt has two bounds");
        Type::Aggregate(
            least.parse().unwrap_or(0),
            most.parse().ok(),
            Box::new(type_of(of)),
        )
    } else if let Some(values) = inside("ENUMERATION(") {
        Type::Enumeration(values.split(' ').map(str::to_uppercase).collect())
    } else if let Some(members) = inside("SELECT(") {
        let (mut entities, mut types) = (Vec::new(), BTreeMap::new());
        for member in members.split(" | ") {
            match member.split_once('=') {
                Some((name, of)) => {
                    types.insert(name.to_uppercase(), type_of(of));
                }
                None => entities.push(member.to_uppercase()),
            }
        }
        Type::Select(entities, types)
    } else if text.chars().all(|c| c.is_ascii_uppercase()) {
        Type::Simple(text)
    } else {
        Type::Entity(text.to_uppercase())
    }
}
