//! Builds the site: compiles the app, hashes every file, fills in the names, and writes the list the service worker keeps.

mod compile;
mod site;
mod style;

pub use compile::rustflags;
pub use site::{Part, Site};

use crate::workspace::{dist, nothing_else, root};
use crate::{policy, sizes};
use anyhow::{Context, Result};
use pico_args::Arguments;
use std::fs;
use std::path::Path;
use std::time::Instant;

/// `cargo xtask build`.
pub fn command(mut arguments: Arguments) -> Result<()> {
    let folder = dist(&mut arguments)?;
    nothing_else(arguments)?;
    into(&folder)?;
    Ok(())
}

/// Builds the site and writes it into a folder.
pub fn into(folder: &Path) -> Result<Site> {
    let began = Instant::now();
    // Before the long part, not after it.
    site::may_be_replaced(folder)?;
    let site = site()?;
    site.write(folder)?;
    eprintln!(
        "built in {:.0} s into {}\n{}",
        began.elapsed().as_secs_f64(),
        folder.display(),
        sizes::summary(&site)
    );
    Ok(site)
}

/// The whole site, in memory.
pub fn site() -> Result<Site> {
    let program = compile::compile()?;
    assemble(&root(), program)
}

/// The order matters: a file is named by its content, so whoever names it comes after it.
fn assemble(root: &Path, program: compile::Program) -> Result<Site> {
    let public = root.join("public");
    let read = |name: &str| {
        let path = public.join(name);
        fs::read(&path).with_context(|| format!("can't read {}", path.display()))
    };
    let read_text = |name: &str| -> Result<String> {
        String::from_utf8(read(name)?).with_context(|| format!("public/{name} is not UTF-8"))
    };

    let mut site = Site::default();
    for font in ["b612-regular.woff2", "b612-bold.woff2"] {
        site.add_asset(font, read(&format!("fonts/{font}"))?, Part::FirstAnswer);
    }
    // The large icons are fetched by whoever installs the app, at that time: keeping them would only lengthen the list.
    for (icon, part) in
        [("buoy.svg", Part::Offline), ("buoy-192.png", Part::Aside), ("buoy-512.png", Part::Aside)]
    {
        site.add_asset(icon, read(&format!("icons/{icon}"))?, part);
    }
    let style = site.fill_asset("style", &style::joined(&root.join("style"))?)?;
    site.add_asset("slackwater.css", style.into_bytes(), Part::FirstAnswer);
    site.add_asset("app.wasm", program.wasm, Part::FirstAnswer);
    site.add_asset("app.js", program.glue.into_bytes(), Part::FirstAnswer);
    for (script, part) in
        [("start.js", Part::FirstAnswer), ("boot.js", Part::FirstAnswer), ("offline.js", Part::Offline)]
    {
        let text = site.fill_asset(script, &read_text(script)?)?;
        site.add_asset(script, text.into_bytes(), part);
    }
    site.add("licences/b612-OFL.txt", read("fonts/OFL.txt")?, Part::Aside);

    let manifest = site.fill("manifest.webmanifest", &read_text("manifest.webmanifest")?, &[])?;
    site.add("manifest.webmanifest", manifest.into_bytes(), Part::Offline);

    let page = read_text("index.html")?;
    let version = site.version(&page);
    let page = site.fill("index.html", &page, &[("version", &version), ("policy", policy::meta())])?;
    site.add("index.html", page.into_bytes(), Part::FirstAnswer);

    let list = site.list()?;
    let worker = site.fill("sw.js", &read_text("sw.js")?, &[("version", &version), ("list", &list)])?;
    site.add("sw.js", worker.into_bytes(), Part::Aside);
    site.compress()?;
    Ok(site)
}

#[cfg(test)]
mod tests {
    use super::*;

    fn program() -> compile::Program {
        compile::Program { glue: "export default () => {};".into(), wasm: b"\0asm".to_vec() }
    }

    #[test]
    fn every_name_is_filled_in_and_the_list_holds_what_the_page_needs() {
        let site = assemble(&root(), program()).expect("the repository's own files fit together");
        let text = |name: &str| {
            let file = site.files().iter().find(|file| file.name == name).expect("is built");
            String::from_utf8(file.bytes.clone()).expect("is text")
        };
        let worker = text("sw.js");
        for named in text("index.html").split(['"', '\'']).filter_map(|part| part.strip_prefix("./assets/")) {
            let kept = worker.contains(&format!("./assets/{named}"));
            assert!(kept || named.ends_with(".png"), "the worker keeps {named}");
        }
        assert!(worker.contains("[\"./\",\"sha256-"), "the worker keeps the page as \"./\"");
        assert!(!worker.contains("index.html\",\"sha256"), "and not under a second name");
    }

    #[test]
    fn the_version_follows_the_content() {
        let version = |glue: &str| {
            let program = compile::Program { glue: glue.into(), wasm: b"\0asm".to_vec() };
            let site = assemble(&root(), program).expect("fits together");
            let page = site.files().iter().find(|file| file.name == "index.html").expect("is built").clone();
            String::from_utf8(page.bytes).expect("is text")
        };
        assert_eq!(version("a"), version("a"));
        assert_ne!(version("a"), version("b"));
    }
}
