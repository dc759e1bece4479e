//! The built site in memory: files by name, their digests, their compressed copies.

use anyhow::{Context, Result, anyhow, bail};
use base64::Engine;
use base64::engine::general_purpose::STANDARD;
use flate2::Compression;
use flate2::write::GzEncoder;
use sha2::{Digest, Sha256};
use std::collections::BTreeMap;
use std::fs;
use std::io::Write;
use std::path::Path;
use std::thread;

/// What a file is for, and so whether it is kept for when there is no signal.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub enum Part {
    /// Needed before the first answer can be shown, and kept.
    FirstAnswer,
    /// Kept as well, but nothing waits for it.
    Offline,
    /// Not kept: the worker itself, what an installing system fetches, licences.
    Aside,
}

/// One file of the site.
#[derive(Clone, Debug)]
pub struct File {
    /// Path inside the site, with forward slashes.
    pub name: String,
    /// Its content.
    pub bytes: Vec<u8>,
    /// Whether it is kept.
    pub part: Part,
    /// Compressed copies, where they are smaller.
    pub brotli: Option<Vec<u8>>,
    /// See `brotli`.
    pub gzip: Option<Vec<u8>>,
}

impl File {
    /// Bytes on the line to a browser that takes brotli.
    pub fn on_the_line(&self) -> usize {
        self.brotli.as_ref().map_or(self.bytes.len(), Vec::len)
    }
}

/// All files, and under which name each asset ended up.
#[derive(Default)]
pub struct Site {
    files: Vec<File>,
    hashed: BTreeMap<String, String>,
}

impl Site {
    /// The files in the order they were added.
    pub fn files(&self) -> &[File] {
        &self.files
    }

    /// Adds a file whose name stays.
    pub fn add(&mut self, name: &str, bytes: Vec<u8>, part: Part) {
        self.files.push(File { name: name.into(), bytes, part, brotli: None, gzip: None });
    }

    /// Adds a file under a name that carries its content's digest, so that a cache may keep it for ever.
    pub fn add_asset(&mut self, plain: &str, bytes: Vec<u8>, part: Part) {
        let (stem, extension) = plain.split_once('.').unwrap_or((plain, "bin"));
        let name = format!("{stem}-{}.{extension}", &hex(&bytes)[..12]);
        self.add(&format!("assets/{name}"), bytes, part);
        self.hashed.insert(plain.into(), name);
    }

    /// Fills the `{{…}}` of a text that will lie among the assets.
    pub fn fill_asset(&self, what: &str, text: &str) -> Result<String> {
        fill(what, text, |name| self.hashed.get(name).cloned())
    }

    /// Fills the `{{…}}` of a text at the top of the site: assets, and further values by name.
    pub fn fill(&self, what: &str, text: &str, values: &[(&str, &str)]) -> Result<String> {
        fill(what, text, |name| {
            let value = values.iter().find(|(key, _)| *key == name).map(|(_, value)| (*value).to_owned());
            value.or_else(|| self.hashed.get(name).map(|hashed| format!("assets/{hashed}")))
        })
    }

    /// The version of all that is kept, page included (which can't contain its own digest, so its template stands in).
    pub fn version(&self, page_template: &str) -> String {
        let mut all = page_template.to_owned();
        for file in self.files.iter().filter(|file| file.part != Part::Aside) {
            all.push_str(&format!("\n{} {}", file.name, hex(&file.bytes)));
        }
        hex(all.as_bytes())[..12].to_owned()
    }

    /// The worker's list as JSON: path and digest of everything kept, the page last.
    pub fn list(&self) -> Result<String> {
        let mut entries: Vec<(String, String)> = self
            .files
            .iter()
            .filter(|file| file.part != Part::Aside)
            .map(|file| {
                let path = if file.name == "index.html" { "" } else { &file.name };
                (format!("./{path}"), integrity(&file.bytes))
            })
            .collect();
        entries.sort_by_key(|(path, _)| (path == "./", path.clone()));
        if entries.last().is_none_or(|(path, _)| path != "./") {
            bail!("the page must be added before the list is made");
        }
        Ok(serde_json::to_string(&entries)?)
    }

    /// Makes the compressed copies, where a format gains from it.
    pub fn compress(&mut self) -> Result<()> {
        thread::scope(|scope| {
            let work: Vec<_> =
                self.files.iter_mut().map(|file| scope.spawn(move || compress_one(file))).collect();
            work.into_iter().try_for_each(|job| job.join().map_err(|_| anyhow!("compressing panicked"))?)
        })
    }

    /// Writes the site into a folder, in place of what was there. Refuses a folder that holds something else.
    pub fn write(&self, folder: &Path) -> Result<()> {
        clear(folder)?;
        for file in &self.files {
            let path = folder.join(&file.name);
            if let Some(parent) = path.parent() {
                fs::create_dir_all(parent).with_context(|| format!("can't make {}", parent.display()))?;
            }
            for (suffix, bytes) in
                [("", Some(&file.bytes)), (".br", file.brotli.as_ref()), (".gz", file.gzip.as_ref())]
            {
                let Some(bytes) = bytes else { continue };
                let path = folder.join(format!("{}{suffix}", file.name));
                fs::write(&path, bytes).with_context(|| format!("can't write {}", path.display()))?;
            }
        }
        Ok(())
    }
}

/// Refuses a folder that holds something other than an earlier site.
pub fn may_be_replaced(folder: &Path) -> Result<()> {
    let has_files = folder.exists()
        && fs::read_dir(folder).with_context(|| format!("can't list {}", folder.display()))?.next().is_some();
    if has_files && !folder.join("sw.js").is_file() {
        bail!(
            "{} holds something other than a built site; choose another folder or empty it",
            folder.display()
        );
    }
    Ok(())
}

fn clear(folder: &Path) -> Result<()> {
    may_be_replaced(folder)?;
    if folder.exists() {
        fs::remove_dir_all(folder).with_context(|| format!("can't clear {}", folder.display()))?;
    }
    Ok(())
}

fn compress_one(file: &mut File) -> Result<()> {
    let compressed_already = [".woff2", ".png"].iter().any(|end| file.name.ends_with(end));
    if compressed_already {
        return Ok(());
    }
    let settings = brotli::enc::BrotliEncoderParams { quality: 11, lgwin: 22, ..Default::default() };
    let mut smaller = Vec::new();
    brotli::BrotliCompress(&mut file.bytes.as_slice(), &mut smaller, &settings)?;
    file.brotli = Some(smaller).filter(|copy| copy.len() < file.bytes.len());
    let mut encoder = GzEncoder::new(Vec::new(), Compression::best());
    encoder.write_all(&file.bytes)?;
    file.gzip = Some(encoder.finish()?).filter(|copy| copy.len() < file.bytes.len());
    Ok(())
}

fn fill(what: &str, text: &str, value: impl Fn(&str) -> Option<String>) -> Result<String> {
    let mut filled = String::new();
    let mut rest = text;
    while let Some((before, after)) = rest.split_once("{{") {
        let (name, behind) =
            after.split_once("}}").with_context(|| format!("{what}: a {{{{ is not closed"))?;
        filled.push_str(before);
        filled.push_str(&value(name).with_context(|| format!("{what}: nothing is called {name}"))?);
        rest = behind;
    }
    filled.push_str(rest);
    Ok(filled)
}

fn hex(bytes: &[u8]) -> String {
    Sha256::digest(bytes).iter().map(|byte| format!("{byte:02x}")).collect()
}

/// A digest as the `integrity` of a request.
fn integrity(bytes: &[u8]) -> String {
    format!("sha256-{}", STANDARD.encode(Sha256::digest(bytes)))
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn digests_are_those_of_the_standard() {
        // FIPS 180-4, the digest of "abc"; base64 of the same bytes by `openssl dgst -sha256 -binary | base64`.
        assert_eq!(hex(b"abc"), "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad");
        assert_eq!(integrity(b"abc"), "sha256-ungWv48Bz+pBQUDeXa4iI7ADYaOWF3qctBD/YfIAFa0=");
    }

    #[test]
    fn names_are_filled_in_and_unknown_ones_refused() {
        let mut site = Site::default();
        site.add_asset("a.css", b"x".to_vec(), Part::FirstAnswer);
        let name = site.hashed["a.css"].clone();
        assert_eq!(site.fill("t", "<{{a.css}}>", &[]).expect("is known"), format!("<assets/{name}>"));
        assert_eq!(site.fill_asset("t", "<{{a.css}}>").expect("is known"), format!("<{name}>"));
        assert_eq!(site.fill("t", "{{v}}", &[("v", "1")]).expect("is given"), "1");
        assert!(site.fill("t", "{{b.css}}", &[]).is_err());
        assert!(site.fill("t", "{{a.css", &[]).is_err());
    }

    #[test]
    fn a_folder_with_other_things_is_not_cleared() {
        let folder = std::env::temp_dir().join(format!("slackwater-site-{}", std::process::id()));
        fs::create_dir_all(&folder).expect("makes a folder");
        fs::write(folder.join("letter.txt"), "dear").expect("writes");
        assert!(Site::default().write(&folder).is_err());
        assert!(folder.join("letter.txt").is_file());
        fs::remove_dir_all(folder).expect("clears up");
    }

    #[test]
    fn copies_are_whole() {
        let mut file = File {
            name: "a.js".into(),
            bytes: b"abc ".repeat(500),
            part: Part::Offline,
            brotli: None,
            gzip: None,
        };
        compress_one(&mut file).expect("compresses");
        let mut back = Vec::new();
        brotli::BrotliDecompress(&mut file.brotli.clone().expect("is smaller").as_slice(), &mut back)
            .expect("is brotli");
        assert_eq!(back, file.bytes);
        assert!(file.gzip.expect("is smaller").len() < file.bytes.len());
    }
}
