//! Finds keys and tables that a spec does not have.

use super::document::{Node, Value};
use super::fault::{Fault, excerpt};
use super::keys::{self, Kind, Table};
use super::quantity::all_of;
use super::written::{CHANGED, TABLES};

/// A fault for every key and table of the document that is not known, naming the nearest that is.
pub(super) fn unknown_keys(root: &Node) -> Vec<Fault> {
    let mut faults = Vec::new();
    let top = TABLES
        .iter()
        .find(|table| table.name.is_empty())
        .expect("the top level is in the list");
    let Value::Table(members) = &root.value else {
        return faults;
    };
    for (name, node) in members {
        match keys::table(name).filter(|table| !table.name.is_empty()) {
            Some(table) => check_table(node, table, &mut faults),
            None if keys::key(top, name).is_some() => {}
            None => faults.push(fault(node, top, name)),
        }
    }
    faults
}

/// True where keys of a table may be hidden by a misspelling: the table is no table or has an unknown key, or an unknown
/// key or table of the top level is nearest to it.
pub(super) fn hides_something(root: &Node, table: &str) -> bool {
    let known = keys::table(table).expect("the caller names a table of the list");
    let inside = root.member(table).is_some_and(|node| match &node.value {
        Value::Table(members) => members.keys().any(|name| keys::key(known, name).is_none()),
        _ => true,
    });
    let Value::Table(members) = &root.value else {
        return inside;
    };
    let mut unknown = members.keys().filter(|name| keys::table(name).is_none());
    let near = |near: String| {
        near == format!("[{table}]") || near.strip_prefix(table).is_some_and(|rest| rest.starts_with('.'))
    };
    inside || unknown.any(|name| keys::nearest("", name).is_some_and(near))
}

fn check_table(node: &Node, table: &Table, faults: &mut Vec<Fault>) {
    match &node.value {
        Value::Table(members) => {
            let unknown = members
                .iter()
                .filter(|(name, _)| keys::key(table, name).is_none());
            faults.extend(unknown.map(|(name, node)| fault(node, table, name)));
            for (name, node) in members {
                if keys::key(table, name).is_some_and(|key| matches!(key.kind, Kind::Airfoil)) {
                    faults.extend(unknown_changes(node));
                }
            }
        }
        // the reader reports a list in the place of a table
        Value::List(items) if table.many => {
            for item in items.iter().filter(|item| matches!(item.value, Value::Table(_))) {
                check_table(item, table, faults);
            }
        }
        _ => {}
    }
}

/// Faults of unknown keys of a table in the place of an airfoil's text.
fn unknown_changes(node: &Node) -> Vec<Fault> {
    let Value::Table(members) = &node.value else {
        return Vec::new();
    };
    let unknown = members
        .iter()
        .filter(|(name, _)| keys::key(&CHANGED, name).is_none());
    unknown
        .map(|(name, node)| {
            let remedy = keys::nearest_change(name).map_or_else(
                || {
                    let names: Vec<_> = CHANGED.keys.iter().map(|key| key.name).collect();
                    format!("The keys of an airfoil are {}.", all_of(&names))
                },
                |near| format!("The nearest known is {near}."),
            );
            unknown_key(node, remedy)
        })
        .collect()
}

fn fault(node: &Node, table: &Table, name: &str) -> Fault {
    let remedy = match keys::nearest(table.name, name) {
        Some(near) => format!("The nearest known is {near}."),
        None if table.name.is_empty() => {
            let names: Vec<_> = TABLES
                .iter()
                .map(|t| t.name)
                .filter(|name| !name.is_empty())
                .collect();
            format!(
                "The tables are {}; above them stand name and unit.",
                all_of(&names)
            )
        }
        None => {
            let names: Vec<_> = table.keys.iter().map(|key| key.name).collect();
            format!("The keys of {} are {}.", table.name, all_of(&names))
        }
    };
    unknown_key(node, remedy)
}

fn unknown_key(node: &Node, remedy: String) -> Fault {
    let what = if matches!(node.value, Value::Table(_)) {
        "table"
    } else {
        "key"
    };
    // a table's text is its header, which says no more than its key
    let text = if what == "table" {
        String::new()
    } else {
        node.text.clone()
    };
    let mut place = node.place.clone();
    place.key = excerpt(&place.key);
    Fault {
        place,
        text,
        problem: format!("unknown {what}"),
        remedy,
    }
}
