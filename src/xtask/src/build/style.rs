//! Joins the style sheets into one, in an order that doesn't depend on the file system.

use anyhow::{Context, Result, bail, ensure};
use std::fs;
use std::path::{Path, PathBuf};

/// Files at the top of `style/`, in their order; then `parts/` and `rooms/`, by name.
const FIRST: [&str; 4] = ["tokens.css", "fonts.css", "base.css", "first.css"];
const THEN: [&str; 2] = ["parts", "rooms"];

/// All style sheets as one text, without comments. A sheet in no known place is an error: it would silently be left out.
pub fn joined(folder: &Path) -> Result<String> {
    let mut files: Vec<PathBuf> = Vec::new();
    for name in FIRST.map(|name| folder.join(name)) {
        if name.is_file() {
            files.push(name);
        }
    }
    for sub in THEN.map(|name| folder.join(name)) {
        files.extend(listed(&sub)?);
    }
    for found in listed(folder)? {
        let known =
            files.contains(&found) || (found.is_dir() && THEN.iter().any(|name| found.ends_with(name)));
        ensure!(
            known,
            "{} has no place in the order of style sheets (see xtask's style.rs)",
            found.display()
        );
    }

    let mut all = String::new();
    for file in files {
        let text = fs::read_to_string(&file).with_context(|| format!("can't read {}", file.display()))?;
        all.push_str(&without_comments(&text).with_context(|| format!("in {}", file.display()))?);
    }
    Ok(all)
}

fn listed(folder: &Path) -> Result<Vec<PathBuf>> {
    if !folder.is_dir() {
        return Ok(Vec::new());
    }
    let mut names = Vec::new();
    for entry in fs::read_dir(folder).with_context(|| format!("can't list {}", folder.display()))? {
        names.push(entry?.path());
    }
    names.sort();
    Ok(names)
}

/// Drops comments, indentation and empty lines. Compression does the rest; a CSS compiler would add more than it saves.
fn without_comments(text: &str) -> Result<String> {
    let mut kept = String::new();
    let mut rest = text;
    while let Some((before, after)) = rest.split_once("/*") {
        kept.push_str(before);
        let Some((_, behind)) = after.split_once("*/") else { bail!("a comment is not closed") };
        rest = behind;
    }
    kept.push_str(rest);
    Ok(kept.lines().map(str::trim).filter(|line| !line.is_empty()).flat_map(|line| [line, "\n"]).collect())
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn comments_and_indentation_go() {
        let text = "/* why */\n.a {\n  color: red; /* because */\n}\n\n.b { x: y }\n";
        assert_eq!(without_comments(text).expect("is well formed"), ".a {\ncolor: red;\n}\n.b { x: y }\n");
        assert!(without_comments("/* never closed").is_err());
    }

    #[test]
    fn the_order_is_fixed_and_a_stray_sheet_is_an_error() {
        let folder = std::env::temp_dir().join(format!("slackwater-style-{}", std::process::id()));
        fs::create_dir_all(folder.join("rooms")).expect("makes a folder");
        fs::create_dir_all(folder.join("parts")).expect("makes a folder");
        for (name, text) in [
            ("base.css", "b"),
            ("tokens.css", "a"),
            ("rooms/now.css", "e"),
            ("parts/z.css", "d"),
            ("parts/k.css", "c"),
        ] {
            fs::write(folder.join(name), text).expect("writes");
        }
        assert_eq!(joined(&folder).expect("joins"), "a\nb\nc\nd\ne\n");
        fs::write(folder.join("stray.css"), "x").expect("writes");
        assert!(joined(&folder).is_err());
        fs::remove_dir_all(folder).expect("clears up");
    }
}
