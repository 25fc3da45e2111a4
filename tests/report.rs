//! The report page: whole, self-contained, with the figures of the JSON; names are text. The README's pictures are fresh.

use crate::workdir::{WorkDir, copy_from_package, package};
use spanwise::spec::Source;
use spanwise::wing::{Wing, prepare};
use std::fs;

fn wing(text: &str) -> Wing {
    let source = Source {
        text,
        file: "test.toml",
        set: &[],
    };
    let open = |name: &str| fs::read(package().join("examples").join(name));
    let prepared = prepare(&source, &open).expect("a sound spec");
    Wing::build(&prepared).expect("a wing")
}

/// Names of the elements of a page in order; fails where one is not closed in its turn.
fn elements(page: &str) -> Vec<String> {
    const VOID: [&str; 1] = ["meta"];
    let (mut open, mut seen): (Vec<String>, Vec<String>) = (Vec::new(), Vec::new());
    let mut rest = page;
    while let Some(at) = rest.find('<') {
        rest = &rest[at + 1..];
        let end = rest.find('>').expect("a tag ends");
        let tag = &rest[..end];
        rest = &rest[end + 1..];
        if tag.starts_with('!') || tag.starts_with('?') {
            continue;
        }
        if let Some(name) = tag.strip_prefix('/') {
            assert_eq!(open.pop().as_deref(), Some(name), "closed out of turn");
            continue;
        }
        let name: String = tag.chars().take_while(|c| c.is_ascii_alphanumeric()).collect();
        assert!(!name.is_empty(), "no tag: <{tag}>");
        seen.push(name.clone());
        if !tag.ends_with('/') && !VOID.contains(&name.as_str()) {
            open.push(name);
        }
    }
    assert!(open.is_empty(), "left open: {open:?}");
    seen
}

#[test]
fn the_report_of_every_example_is_whole_and_needs_nothing_else() {
    let directory = WorkDir::new();
    copy_from_package("examples", directory.path());
    copy_from_package("airfoils", directory.path());
    for entry in fs::read_dir(package().join("examples")).expect("the examples") {
        let path = entry.expect("an entry").path();
        if path.extension().is_none_or(|ending| ending != "toml") {
            continue;
        }
        let stem = path.file_stem().expect("a name").to_string_lossy().into_owned();
        let ran = directory.run(&["loft", &format!("examples/{stem}.toml"), "--only", "report,json"]);
        assert_eq!(ran.code, Some(0), "{stem}: {}", ran.stderr);
        let page = fs::read_to_string(directory.join(format!("{stem}.html"))).expect("the report");
        let seen = elements(&page);
        for never in ["script", "link", "img", "iframe", "object", "base"] {
            assert!(!seen.iter().any(|name| name == never), "{stem}: <{never}>");
        }
        let addresses = page.matches("://").count();
        assert_eq!(
            addresses,
            page.matches("xmlns=\"http://www.w3.org/2000/svg\"").count(),
            "{stem}: names another place"
        );
        assert!(
            !page.contains("url(") && !page.contains("@import"),
            "{stem}: loads something"
        );
        // a picture, a drawing and the sections, each with a name for those who cannot see it
        let pictures = page.matches("<svg ").count();
        assert!(pictures >= 4, "{stem}: {pictures} pictures");
        assert_eq!(
            page.matches("role=\"img\" aria-labelledby=").count(),
            pictures,
            "{stem}"
        );
        let json = fs::read_to_string(directory.join(format!("{stem}.json"))).expect("the figures");
        let figures: serde_json::Value = serde_json::from_str(&json).expect("JSON");
        for check in figures["checks"].as_array().expect("checks") {
            let quantity = check["quantity"].as_str().expect("a name");
            let header = format!("<th scope=\"row\">{quantity}</th>");
            assert!(page.contains(&header), "{stem}: {quantity} is missing");
        }
        assert_eq!(figures["files"]["report"], format!("{stem}.html"));
        // identifiers are used once
        let mut identifiers: Vec<&str> = (page.split(" id=\"").skip(1))
            .map(|rest| rest.split('"').next().expect("a value"))
            .collect();
        let count = identifiers.len();
        identifiers.sort_unstable();
        identifiers.dedup();
        assert_eq!(identifiers.len(), count, "{stem}: an identifier twice");
    }
}

#[test]
fn hostile_names_stay_text_in_the_report() {
    let names = [
        r#"</title></style><script>alert("1")</script><img src=x onerror='1'>&lt;"#.to_owned(),
        "x".repeat(10_000),
        "جناح الطائر \u{202e}gnirts".to_owned(),
    ];
    for name in names {
        let mut spec = toml::Table::new();
        spec.insert("name".into(), name.clone().into());
        spec.insert(
            "planform".into(),
            toml::Table::from_iter([
                ("span".to_owned(), toml::Value::from(1000)),
                ("root_chord".to_owned(), 200.into()),
                ("tip_chord".to_owned(), 120.into()),
            ])
            .into(),
        );
        spec.insert(
            "airfoil".into(),
            toml::Table::from_iter([("root".to_owned(), toml::Value::from("NACA 2412"))]).into(),
        );
        let page = String::from_utf8(wing(&spec.to_string()).report(None)).expect("UTF-8");
        let seen = elements(&page);
        assert!(!seen.iter().any(|element| element == "script" || element == "img"));
        let escaped = name
            .replace('&', "&amp;")
            .replace('<', "&lt;")
            .replace('>', "&gt;");
        let heading = format!("<h1><bdi>{}</bdi></h1>", escaped.replace('"', "&quot;"));
        assert!(page.contains(&heading), "the heading is not the name");
    }
}

#[test]
fn the_pictures_of_the_readme_are_fresh() {
    let text = fs::read_to_string(package().join("examples/corrie.toml")).expect("the spec");
    let wing = wing(&text);
    for (file, bytes) in [
        ("examples/corrie.svg", wing.picture()),
        ("examples/corrie-drawing.svg", wing.drawing(None)),
    ] {
        let kept = fs::read(package().join(file)).expect("the picture");
        assert!(
            kept == bytes,
            "{file} is stale: cargo run --release --example picture -- examples/corrie.toml examples/corrie.svg examples/corrie-drawing.svg"
        );
    }
}
