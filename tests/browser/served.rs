//! What the server sends: types, compression, the policy, and nothing from outside its folder.

use crate::harness::{Server, SiteCopy};
use anyhow::{Context, Result};
use std::fs;

fn asked(body: impl AsyncFnOnce(&SiteCopy, &Server) -> Result<()>) {
    let runtime = tokio::runtime::Runtime::new().expect("a runtime can be made");
    let outcome = runtime.block_on(async {
        let site = SiteCopy::of_dist()?;
        let server = Server::start(site.folder()).await?;
        let outcome = body(&site, &server).await;
        server.stop().await?;
        outcome
    });
    if let Err(error) = outcome {
        panic!("{error:#}");
    }
}

fn path_of(site: &SiteCopy, stem: &str, extension: &str) -> Result<String> {
    let file = site.asset(stem, extension)?;
    let name = file.file_name().context("an asset has a name")?.to_string_lossy().into_owned();
    Ok(format!("/assets/{name}"))
}

#[test]
fn every_kind_of_file_has_its_type() {
    asked(async |site, server| {
        let expected = [
            ("/".to_owned(), "text/html"),
            ("/?from=link".to_owned(), "text/html"),
            ("/sw.js".to_owned(), "text/javascript"),
            ("/manifest.webmanifest".to_owned(), "application/manifest+json"),
            (path_of(site, "app", "wasm")?, "application/wasm"),
            (path_of(site, "app", "js")?, "text/javascript"),
            (path_of(site, "slackwater", "css")?, "text/css"),
            (path_of(site, "b612-regular", "woff2")?, "font/woff2"),
            (path_of(site, "buoy", "svg")?, "image/svg+xml"),
            (path_of(site, "buoy-192", "png")?, "image/png"),
        ];
        for (path, kind) in expected {
            let (head, _) = server.ask(&path, "").await?;
            assert!(head.starts_with("http/1.1 200"), "{path}: {head}");
            assert!(head.contains(&format!("content-type: {kind}")), "{path}: {head}");
        }
        Ok(())
    });
}

#[test]
fn compressed_copies_are_sent_to_whoever_takes_them() {
    asked(async |site, server| {
        let wasm = path_of(site, "app", "wasm")?;
        let file = site.asset("app", "wasm")?;
        for (accepted, suffix) in [("gzip, deflate, br", ".br"), ("gzip", ".gz")] {
            let (head, body) = server.ask(&wasm, &format!("Accept-Encoding: {accepted}\r\n")).await?;
            let encoding = if suffix == ".br" { "br" } else { "gzip" };
            assert!(head.contains(&format!("content-encoding: {encoding}")), "{head}");
            assert!(head.contains("content-type: application/wasm"), "{head}");
            assert_eq!(body.len() as u64, fs::metadata(format!("{}{suffix}", file.display()))?.len());
        }
        let (head, body) = server.ask(&wasm, "").await?;
        assert!(!head.contains("content-encoding"), "{head}");
        assert_eq!(body, fs::read(file)?);
        Ok(())
    });
}

#[test]
fn the_policy_is_sent_and_the_page_carries_the_same() {
    asked(async |site, server| {
        let (head, body) = server.ask("/", "").await?;
        let page = String::from_utf8(body)?;
        let (_, rest) =
            page.split_once("Content-Security-Policy\" content=\"").context("the page has a policy")?;
        let (own, _) = rest.split_once('"').context("the policy ends")?;
        let sent = head
            .lines()
            .find_map(|line| line.strip_prefix("content-security-policy: "))
            .context("is sent")?;
        assert_eq!(sent, format!("{own}; frame-ancestors 'none'"));
        assert!(own.starts_with("default-src 'none'"), "{own}");
        assert!(
            !own.contains("unsafe-inline") && !own.contains("'unsafe-eval'") && !own.contains("http"),
            "{own}"
        );
        assert!(
            !page.contains("<style") && !page.contains(" style=") && !page.contains("<script>"),
            "no inline code"
        );
        assert!(head.contains("x-content-type-options: nosniff"), "{head}");
        assert!(head.contains("cache-control: no-cache"), "{head}");
        let (head, _) = server.ask(&path_of(site, "app", "js")?, "").await?;
        assert!(head.contains("immutable"), "{head}");
        Ok(())
    });
}

#[test]
fn nothing_outside_the_folder_and_no_page_for_a_wrong_address() {
    asked(async |_, server| {
        for path in
            ["/nowhere", "/../Cargo.toml", "/%2e%2e/Cargo.toml", "/assets/../../etc/passwd", "/assets/"]
        {
            let (head, body) = server.ask(path, "").await?;
            assert!(head.starts_with("http/1.1 4"), "{path}: {head}");
            assert!(!String::from_utf8_lossy(&body).contains("[workspace"), "{path}");
        }
        let (head, _) = server.ask("/assets/app-000000000000.js", "").await?;
        assert!(
            head.starts_with("http/1.1 404") && head.contains("no-cache"),
            "a wrong answer must not last: {head}"
        );
        Ok(())
    });
}
