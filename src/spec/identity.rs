//! What a spec says as one text that does not depend on how it is laid out, to tell specs apart by.

use super::document::{Node, Value};

/// Every key with its value, one a line, in the order of the keys: the same for documents that say the same, whatever
/// their comments, order and spacing, and whether a value was typed in the file or put in by `--set`.
///
/// Numbers stand in the fewest digits that read back to the same bits, texts in quotes with everything but printable
/// ASCII escaped, so that no two different documents have the same lines.
pub(super) fn identity(root: &Node) -> String {
    let mut lines = String::new();
    put(root, "", &mut lines);
    lines
}

fn put(node: &Node, path: &str, lines: &mut String) {
    let below = |name: &str| {
        if path.is_empty() {
            name.to_owned()
        } else {
            format!("{path}.{name}")
        }
    };
    // the text that `--set` gave changes to
    if let Some(plain) = &node.plain {
        put(plain, path, lines);
    }
    match &node.value {
        Value::Table(members) => members
            .iter()
            .for_each(|(name, member)| put(member, &below(name), lines)),
        Value::List(items) => items
            .iter()
            .enumerate()
            .for_each(|(i, item)| put(item, &below(&i.to_string()), lines)),
        // adding 0 turns -0 into 0
        Value::Number(number) => *lines += &format!("{path} = {:?}\n", number + 0.0),
        Value::Text(text) => *lines += &format!("{path} = \"{}\"\n", text.escape_default()),
        Value::Truth(truth) => *lines += &format!("{path} = {truth}\n"),
        Value::Other => *lines += &format!("{path} = {}\n", node.text.escape_default()),
    }
}
