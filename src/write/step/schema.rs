//! The excerpt of the published schema that says what instances have to be (ISO 10303-242:2014).

use std::collections::{BTreeMap, HashMap};

/// The excerpt as text: an entity a line.
const EXCERPT: &str = include_str!("schema.txt");

/// Entities that nothing has to refer to.
pub(crate) const ROOTS: [&str; 10] = [
    "APPLICATION_PROTOCOL_DEFINITION",
    "CONSTRUCTIVE_GEOMETRY_REPRESENTATION_RELATIONSHIP",
    "CONTEXT_DEPENDENT_SHAPE_REPRESENTATION",
    "GENERAL_PROPERTY_ASSOCIATION",
    "MECHANICAL_DESIGN_GEOMETRIC_PRESENTATION_REPRESENTATION",
    "PRESENTATION_LAYER_ASSIGNMENT",
    "PRODUCT_RELATED_PRODUCT_CATEGORY",
    "PROPERTY_DEFINITION_REPRESENTATION",
    "SHAPE_DEFINITION_REPRESENTATION",
    "SHAPE_REPRESENTATION_RELATIONSHIP",
];

/// An attribute's type.
#[derive(Debug)]
pub(crate) enum Type {
    /// STRING, REAL, INTEGER, NUMBER, BOOLEAN or LOGICAL.
    Simple(&'static str),
    Enumeration(Vec<String>),
    Aggregate(usize, Option<usize>, Box<Self>),
    Entity(String),
    /// Entities by reference, and other types by name.
    Select(Vec<String>, BTreeMap<String, Self>),
}

/// An attribute of an entity.
#[derive(Debug)]
pub(crate) struct Attribute {
    pub(crate) name: &'static str,
    pub(crate) optional: bool,
    pub(crate) of: Type,
}

/// An entity.
#[derive(Debug, Default)]
pub(crate) struct Entity {
    /// Whether it has no instances of its own.
    #[cfg_attr(not(test), expect(dead_code, reason = "asked by the writer's tests"))]
    pub(crate) is_abstract: bool,
    supertypes: Vec<String>,
    pub(crate) own: Vec<Attribute>,
    pub(crate) redeclared: Vec<Attribute>,
    pub(crate) derived: Vec<&'static str>,
}

/// Entities by their names in capitals.
#[derive(Debug)]
pub(crate) struct Schema(HashMap<String, Entity>);

impl Schema {
    /// The excerpt.
    pub(crate) fn excerpt() -> Self {
        let lines = EXCERPT.lines().filter(|line| !line.starts_with('#'));
        Self(lines.map(entity).collect())
    }

    /// True where the excerpt has the entity.
    pub(crate) fn has(&self, keyword: &str) -> bool {
        self.0.contains_key(keyword)
    }

    /// An entity of the excerpt with its name, if it is there.
    pub(crate) fn entity(&self, keyword: &str) -> Option<(&str, &Entity)> {
        self.0
            .get_key_value(keyword)
            .map(|(name, entity)| (&name[..], entity))
    }

    /// An entity's supertypes, then the entity, each once: the order of the attributes of a simple instance.
    pub(crate) fn lineage(&self, keyword: &str) -> Vec<(&str, &Entity)> {
        let mut found: Vec<(&str, &Entity)> = Vec::new();
        if let Some((name, entity)) = self.entity(keyword) {
            for ancestor in entity
                .supertypes
                .iter()
                .flat_map(|supertype| self.lineage(supertype))
            {
                if !found.iter().any(|(known, _)| *known == ancestor.0) {
                    found.push(ancestor);
                }
            }
            found.push((name, entity));
        }
        found
    }
}

/// One line of the excerpt.
fn entity(line: &'static str) -> (String, Entity) {
    let mut parts = line.split(';').map(str::trim);
    let (name, supertypes) = (parts.next().and_then(|head| head.split_once('<')))
        .expect("each line of the excerpt names an entity and its supertypes");
    let is_abstract = name.contains(" abstract");
    let name = name.split_whitespace().next().unwrap_or(name).to_uppercase();
    let mut entity = Entity {
        is_abstract,
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
