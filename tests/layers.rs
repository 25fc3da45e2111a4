//! Each module imports only from those before it, takes no whole module in, and only the last two touch the world.

use crate::source::{Token, tokens};
use crate::workdir::package;
use std::fs;
use std::path::{Path, PathBuf};

/// The modules, each of which may import from those before it.
const ORDER: [&str; 14] = [
    "spec", "spline", "airfoil", "planform", "loft", "solid", "mesh", "measure", "write", "inspect", "wing",
    "family", "cli", "main",
];

/// Names of terminal, disk, clock and environment, which only `cli` and `main` may use.
const WORLD: [&str; 14] = [
    "fs",
    "env",
    "process",
    "net",
    "thread_rng",
    "println",
    "print",
    "eprintln",
    "eprint",
    "stdin",
    "stdout",
    "stderr",
    "SystemTime",
    "Instant",
];

/// Place of a module in the order.
fn rank(module: &str) -> Option<usize> {
    ORDER.iter().position(|name| *name == module)
}

/// What is wrong with one source file; `path` is relative to `src`.
fn faults(path: &str, source: &str) -> Vec<String> {
    let parts: Vec<&str> = path.trim_end_matches(".rs").split('/').collect();
    let module = parts[0];
    // lib.rs declares the modules and belongs to none
    if module == "lib" {
        return Vec::new();
    }
    let Some(own) = rank(module) else {
        return vec![format!("{path}: {module} is not in the order of the modules")];
    };
    let depth = if *parts.last().expect("a path has parts") == "mod" {
        parts.len() - 1
    } else {
        parts.len()
    };
    let tokens = tokens(source);
    let mut found = Vec::new();
    for (line, target) in imports(&tokens, if module == "main" { 0 } else { depth }) {
        match target.as_str() {
            "*" => found.push(format!("{path}:{line}: takes everything in with *")),
            name => {
                if rank(name).is_some_and(|rank| rank > own) {
                    found.push(format!(
                        "{path}:{line}: {module} uses {name}, which comes after it"
                    ));
                }
            }
        }
    }
    if rank("cli").is_some_and(|first| own < first) && !parts.contains(&"tests") {
        found.extend(
            world(&tokens)
                .into_iter()
                .map(|(line, name)| format!("{path}:{line}: uses {name}")),
        );
    }
    found
}

/// Top-level modules that are named by a path from the crate's root, with the line; `*` for a glob.
fn imports(tokens: &[Token], file_depth: usize) -> Vec<(usize, String)> {
    let text = |at: usize| tokens.get(at).map_or("", |token| token.text.as_str());
    let mut found = Vec::new();
    // braces that are open, true for those of an inline module
    let mut open: Vec<bool> = Vec::new();
    let mut in_use = false;
    for (at, token) in tokens.iter().enumerate() {
        let starts_path = at == 0 || text(at - 1) != "::";
        match token.text.as_str() {
            "use" => in_use = true,
            ";" => in_use = false,
            "*" if in_use => found.push((token.line, "*".to_owned())),
            "{" => open.push(at >= 2 && text(at - 2) == "mod"),
            "}" => {
                open.pop();
            }
            "crate" | "spanwise" if text(at + 1) == "::" => found.extend(heads(tokens, at + 2)),
            "super" if starts_path && text(at + 1) == "::" => {
                let mut above = 0;
                let mut next = at;
                while text(next) == "super" && text(next + 1) == "::" {
                    above += 1;
                    next += 2;
                }
                let inline = open.iter().filter(|module| **module).count();
                if file_depth + inline == above {
                    found.extend(heads(tokens, next));
                }
            }
            _ => {}
        }
    }
    found
}

/// First names of the path or the group of paths that begins at `at`; globs are not names.
fn heads(tokens: &[Token], at: usize) -> Vec<(usize, String)> {
    let Some(first) = tokens.get(at) else {
        return Vec::new();
    };
    if first.text != "{" {
        return if first.text == "*" {
            Vec::new()
        } else {
            vec![(first.line, first.text.clone())]
        };
    }
    let mut found = Vec::new();
    let mut depth = 0;
    let mut expected = false;
    for token in &tokens[at..] {
        match token.text.as_str() {
            "{" => {
                depth += 1;
                expected = depth == 1;
            }
            "}" => {
                depth -= 1;
                if depth == 0 {
                    break;
                }
            }
            "," => expected = depth == 1,
            name if expected => {
                if name != "*" {
                    found.push((token.line, name.to_owned()));
                }
                expected = false;
            }
            _ => {}
        }
    }
    found
}

/// Uses of terminal, disk, clock and environment outside inline test modules.
fn world(tokens: &[Token]) -> Vec<(usize, String)> {
    let text = |at: usize| tokens.get(at).map_or("", |token| token.text.as_str());
    let mut found = Vec::new();
    let mut at = 0;
    while at < tokens.len() {
        let opens_tests = ["#", "[", "cfg", "(", "test", ")", "]", "mod"]
            .iter()
            .enumerate()
            .all(|(i, t)| text(at + i) == *t);
        if opens_tests {
            at = after_block(tokens, at);
            continue;
        }
        let name = text(at);
        let called = text(at + 1) == "!" || text(at + 1) == "(" || text(at + 1) == "::";
        let from_std = at >= 2 && text(at - 1) == "::" && ["std", "time", "io"].contains(&text(at - 2));
        let grouped = at >= 1 && ["{", ","].contains(&text(at - 1)) && in_std_group(tokens, at);
        if WORLD.contains(&name) && (from_std || grouped || (called && name.contains("print"))) {
            found.push((tokens[at].line, name.to_owned()));
        }
        at += 1;
    }
    found
}

/// True within the braces of `use std::{...}`, at any depth.
fn in_std_group(tokens: &[Token], at: usize) -> bool {
    let start = tokens[..at]
        .iter()
        .rposition(|token| token.text == "use" || token.text == ";");
    start.is_some_and(|start| {
        tokens[start].text == "use" && tokens.get(start + 1).is_some_and(|t| t.text == "std")
    })
}

/// The place after the next block in braces, or after the next semicolon where that comes first.
fn after_block(tokens: &[Token], start: usize) -> usize {
    let mut depth = 0;
    for (at, token) in tokens.iter().enumerate().skip(start) {
        match token.text.as_str() {
            ";" if depth == 0 => return at + 1,
            "{" => depth += 1,
            "}" => {
                depth -= 1;
                if depth == 0 {
                    return at + 1;
                }
            }
            _ => {}
        }
    }
    tokens.len()
}

/// Every Rust file below `folder`.
fn rust_files(folder: &Path) -> Vec<PathBuf> {
    let mut found = Vec::new();
    for entry in fs::read_dir(folder).expect("the source") {
        let path = entry.expect("an entry").path();
        if path.is_dir() {
            found.extend(rust_files(&path));
        } else if path.extension().is_some_and(|end| end == "rs") {
            found.push(path);
        }
    }
    found.sort();
    found
}

#[test]
fn each_module_uses_only_those_before_it() {
    let root = package().join("src");
    let files = rust_files(&root);
    assert!(files.len() >= 2);
    let found: Vec<String> = files
        .iter()
        .flat_map(|path| {
            let name = path
                .strip_prefix(&root)
                .expect("below src")
                .to_str()
                .expect("a plain name")
                .replace('\\', "/");
            faults(&name, &fs::read_to_string(path).expect("a source file"))
        })
        .collect();
    assert!(found.is_empty(), "\n{}", found.join("\n"));
}

#[test]
fn an_import_of_a_later_module_is_seen_however_it_is_written() {
    for (path, source) in [
        ("spec/mod.rs", "use crate::wing::Wing;"),
        ("spec/mod.rs", "use crate::{spec::Spec, wing};"),
        (
            "mesh.rs",
            "use crate::{\n    spec::{Spec, Unit},\n    write::step,\n};",
        ),
        ("loft/face.rs", "fn f() -> crate::solid::Solid { todo!() }"),
        ("planform.rs", "use super::loft::Loft;"),
        ("planform/mac.rs", "use super::super::loft::Loft;"),
        ("planform.rs", "mod tests { use super::super::loft::Loft; }"),
        ("measure.rs", "fn f() { spanwise::write::stl(); }"),
        ("wing.rs", "use crate::spec::*;"),
        ("wing.rs", "use super::*;"),
        ("wing.rs", "use crate::{spec, *};"),
        ("oddments.rs", ""),
        ("spec/mod.rs", "fn f() { println!(\"\"); }"),
        ("mesh.rs", "use std::fs::File;"),
        ("mesh.rs", "use std::{fmt, fs};"),
        ("wing.rs", "let t = std::time::Instant::now();"),
    ] {
        assert_eq!(
            faults(path, source).len(),
            1,
            "{path}: {source}: {:?}",
            faults(path, source)
        );
    }
}

#[test]
fn what_is_allowed_is_not_called_a_fault() {
    for (path, source) in [
        (
            "wing.rs",
            "use crate::spec::Spec;\nuse crate::{loft, write::{step, stl}};",
        ),
        (
            "wing.rs",
            "//! [`crate::cli`] and `use crate::cli::*`\nconst A: &str = \"crate::cli\";",
        ),
        ("spec/fault.rs", "use super::unit::Unit; use super::Place;"),
        (
            "spec/mod.rs",
            "mod tests { use super::Unit; fn f() -> f64 { 2.0 * 3.0 } }",
        ),
        ("planform.rs", "mod tests { use super::loft; }"),
        (
            "main.rs",
            "use spanwise::cli; fn main() { std::process::exit(cli::run()) }",
        ),
        (
            "cli.rs",
            "use std::fs; use std::time::SystemTime; use crate::family::Family;",
        ),
        ("mesh.rs", "#[cfg(test)]\nmod tests { use std::fs; }"),
        ("lib.rs", "pub mod wing; pub mod spec;"),
    ] {
        let found = faults(path, source);
        assert!(found.is_empty(), "{path}: {source}: {found:?}");
    }
}
