//! The README shows the program's real output.
//!
//! Two kinds of fenced blocks are live. One whose language is followed by a file name, such as `toml wing.toml`, is that
//! file's content. In one of the language `console`, each line that begins with `$ ` is a command and the lines up to the
//! next are all that it prints, to the letter, both streams in the order written. The commands run one after the other
//! in one directory, which holds the files shown so far and copies of `examples/` and `airfoils/`, all with exit code 0.
//! They are `spanwise` with its arguments (divided at spaces; `"` keeps spaces together), or `cat` or `ls` of one path.

use crate::workdir::{WorkDir, copy_from_package, package, program};
use std::fs;
use std::io::Read;
use std::path::Path;

/// A fenced block of a page.
#[derive(Debug, PartialEq, Eq)]
struct Block {
    /// The words after the opening fence.
    info: Vec<String>,
    /// Line of the opening fence, counted from 1.
    line: usize,
    /// What it holds.
    lines: Vec<String>,
}

/// The fenced blocks of a page.
fn blocks(page: &str) -> Vec<Block> {
    let mut found: Vec<Block> = Vec::new();
    let mut inside = false;
    for (number, line) in page.lines().enumerate() {
        if let Some(info) = line.strip_prefix("```") {
            inside = !inside;
            if inside {
                let info = info.split_whitespace().map(str::to_owned).collect();
                found.push(Block {
                    info,
                    line: number + 1,
                    lines: Vec::new(),
                });
            }
        } else if inside {
            found
                .last_mut()
                .expect("inside a block")
                .lines
                .push(line.to_owned());
        }
    }
    assert!(!inside, "a fence is left open");
    found
}

/// The commands of a console block, each with its line in the page and the output shown.
fn commands(block: &Block) -> Vec<(usize, &str, String)> {
    let mut found: Vec<(usize, &str, String)> = Vec::new();
    for (offset, line) in block.lines.iter().enumerate() {
        let number = block.line + 1 + offset;
        if let Some(command) = line.strip_prefix("$ ") {
            found.push((number, command, String::new()));
        } else {
            let last = found
                .last_mut()
                .unwrap_or_else(|| panic!("README.md:{number}: output before a command"));
            last.2 += line;
            last.2 += "\n";
        }
    }
    found
}

/// Words of a command, divided at spaces outside of double quotes.
fn words(command: &str) -> Vec<String> {
    let mut found = Vec::new();
    for (index, part) in command.split('"').enumerate() {
        if index % 2 == 1 {
            found.push(part.to_owned());
        } else {
            found.extend(part.split_whitespace().map(str::to_owned));
        }
    }
    found
}

/// What a command prints, in the directory.
fn printed(directory: &Path, command: &str) -> String {
    let words = words(command);
    match words.iter().map(String::as_str).collect::<Vec<_>>().as_slice() {
        ["spanwise", arguments @ ..] => spanwise(directory, arguments),
        ["cat", path] => {
            fs::read_to_string(directory.join(path)).unwrap_or_else(|fault| panic!("{path}: {fault}"))
        }
        ["ls", path] => {
            let entries =
                fs::read_dir(directory.join(path)).unwrap_or_else(|fault| panic!("{path}: {fault}"));
            let names = entries.map(|entry| {
                entry
                    .expect("an entry")
                    .file_name()
                    .into_string()
                    .expect("a plain name")
            });
            let mut names: Vec<String> = names.collect();
            names.sort();
            names.iter().map(|name| format!("{name}\n")).collect()
        }
        _ => panic!("`{command}` is none of the commands that the README may show"),
    }
}

/// What the program prints to both streams, in the order written.
fn spanwise(directory: &Path, arguments: &[&str]) -> String {
    let (mut reader, writer) = std::io::pipe().expect("a pipe");
    let mut command = program(directory);
    command
        .args(arguments)
        .stdout(writer.try_clone().expect("a second end"))
        .stderr(writer);
    let mut child = command.spawn().expect("the program starts");
    // the ends that this process holds go, so that the reader sees the end of the text
    drop(command);
    let mut text = String::new();
    reader.read_to_string(&mut text).expect("UTF-8");
    let status = child.wait().expect("the program ends");
    assert!(status.success(), "{arguments:?}: {status}\n{text}");
    text
}

#[test]
fn the_readme_shows_what_the_program_prints() {
    let page = fs::read_to_string(package().join("README.md")).expect("README.md");
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    let mut shown = 0;
    for block in blocks(&page) {
        match block
            .info
            .iter()
            .map(String::as_str)
            .collect::<Vec<_>>()
            .as_slice()
        {
            ["console"] => {
                for (line, command, output) in commands(&block) {
                    let real = printed(directory.path(), command);
                    assert!(
                        real == output,
                        "README.md:{line}: `{command}` really prints\n{real}\nand not\n{output}"
                    );
                    shown += 1;
                }
            }
            [_, file] => {
                directory.write(file, block.lines.join("\n") + "\n");
            }
            _ => {}
        }
    }
    assert!(
        shown > 0,
        "the README shows a command in a block of the language `console`"
    );
}

#[test]
fn blocks_commands_and_words_are_told_apart() {
    let page = "text\n```toml wing.toml\nname = 1\n```\n```console\n$ spanwise loft \"a b.toml\" -o out\nfirst\n\nthird\n$ ls out\n```\n";
    let found = blocks(page);
    assert_eq!(found[0].info, ["toml", "wing.toml"]);
    assert_eq!(found[0].lines, ["name = 1"]);
    let commands = commands(&found[1]);
    assert_eq!(
        commands[0],
        (
            6,
            "spanwise loft \"a b.toml\" -o out",
            "first\n\nthird\n".to_owned()
        )
    );
    assert_eq!(commands[1], (10, "ls out", String::new()));
    assert_eq!(
        words(commands[0].1),
        ["spanwise", "loft", "a b.toml", "-o", "out"]
    );
}
