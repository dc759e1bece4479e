//! A copy of the built site that a test may damage, or make into a next version.

use super::root;
use anyhow::{Context, Result, ensure};
use base64::Engine;
use base64::engine::general_purpose::STANDARD;
use sha2::{Digest, Sha256};
use std::env;
use std::fs;
use std::path::{Path, PathBuf};
use tempfile::TempDir;

/// The copy; gone when dropped.
pub struct SiteCopy(TempDir);

impl SiteCopy {
    /// Copies `dist/`, or the folder that `SLACKWATER_DIST` names.
    pub fn of_dist() -> Result<Self> {
        let dist = env::var_os("SLACKWATER_DIST").map_or_else(|| root().join("dist"), PathBuf::from);
        ensure!(
            dist.join("sw.js").is_file(),
            "{} holds no built site: run `cargo xtask build`",
            dist.display()
        );
        let copy = tempfile::tempdir()?;
        copy_folder(&dist, copy.path())?;
        Ok(Self(copy))
    }

    /// Where the copy is.
    pub fn folder(&self) -> &Path {
        self.0.path()
    }

    /// The asset whose name begins with `stem-` and ends as given.
    pub fn asset(&self, stem: &str, extension: &str) -> Result<PathBuf> {
        let folder = self.folder().join("assets");
        for entry in fs::read_dir(&folder)? {
            let path = entry?.path();
            let name = path.file_name().unwrap_or_default().to_string_lossy().into_owned();
            if name.starts_with(&format!("{stem}-")) && name.ends_with(&format!(".{extension}")) {
                return Ok(path);
            }
        }
        anyhow::bail!("no asset {stem}-….{extension}")
    }

    /// Takes a file away; the way back is `restore`.
    pub fn lose(&self, file: &Path) -> Result<()> {
        for suffix in ["", ".br", ".gz"] {
            let (from, to) = (with_suffix(file, suffix), with_suffix(file, &format!("{suffix}.lost")));
            if from.exists() {
                fs::rename(from, to)?;
            }
        }
        Ok(())
    }

    /// Puts a lost file back.
    pub fn restore(&self, file: &Path) -> Result<()> {
        for suffix in ["", ".br", ".gz"] {
            let (to, from) = (with_suffix(file, suffix), with_suffix(file, &format!("{suffix}.lost")));
            if from.exists() {
                fs::rename(from, to)?;
            }
        }
        Ok(())
    }

    /// Other bytes under the same name, as a damaged copy or a portal would send them.
    pub fn replace(&self, file: &Path, bytes: &[u8]) -> Result<()> {
        for suffix in [".br", ".gz"] {
            let copy = with_suffix(file, suffix);
            if copy.exists() {
                fs::remove_file(copy)?;
            }
        }
        fs::write(file, bytes).with_context(|| format!("can't write {}", file.display()))
    }

    /// The version the page names.
    pub fn version(&self) -> Result<String> {
        let page = fs::read_to_string(self.folder().join("index.html"))?;
        let (_, rest) = page.split_once("data-version=\"").context("the page names no version")?;
        Ok(rest.chars().take_while(|&letter| letter != '"').collect())
    }

    /// Every path on the worker's list, in its order.
    pub fn list(&self) -> Result<Vec<String>> {
        let worker = fs::read_to_string(self.folder().join("sw.js"))?;
        let (_, rest) = worker.split_once("const LIST = ").context("the worker has no list")?;
        let (list, _) = rest.split_once(";\n").context("the worker's list does not end")?;
        let entries: Vec<(String, String)> = serde_json::from_str(list)?;
        Ok(entries.into_iter().map(|(path, _)| path).collect())
    }

    /// Makes it a next version, as a deployment would: another page, its digest and the version in the worker.
    pub fn next_version(&self, version: &str) -> Result<()> {
        let (page_path, worker_path) = (self.folder().join("index.html"), self.folder().join("sw.js"));
        let page = fs::read_to_string(&page_path)?;
        let before = self.version()?;
        let next = page.replace(&before, version);
        let worker = fs::read_to_string(&worker_path)?;
        ensure!(
            worker.contains(&integrity(&page)),
            "the worker's digest of the page is not that of the page"
        );
        let next_worker = worker.replace(&integrity(&page), &integrity(&next)).replace(&before, version);
        self.replace(&page_path, next.as_bytes())?;
        self.replace(&worker_path, next_worker.as_bytes())
    }
}

fn integrity(text: &str) -> String {
    format!("sha256-{}", STANDARD.encode(Sha256::digest(text)))
}

fn with_suffix(file: &Path, suffix: &str) -> PathBuf {
    let mut name = file.as_os_str().to_owned();
    name.push(suffix);
    PathBuf::from(name)
}

fn copy_folder(from: &Path, to: &Path) -> Result<()> {
    fs::create_dir_all(to)?;
    for entry in fs::read_dir(from)? {
        let path = entry?.path();
        let target = to.join(path.file_name().unwrap_or_default());
        if path.is_dir() {
            copy_folder(&path, &target)?;
        } else {
            fs::copy(&path, &target)?;
        }
    }
    Ok(())
}
