//! A newer version waits until somebody asks for it. The page never reloads itself.

use crate::harness::{Setup, World};
use anyhow::Result;
use serde_json::json;
use std::sync::Arc;
use std::time::Duration;
use tokio::time::sleep;

async fn deploy(world: &Arc<World>, version: &str) -> Result<()> {
    world.site.next_version(version)?;
    // The next load asks for the worker again; loading twice would hide a page that changes by itself.
    let asked = world
        .phone
        .promise("(await (await navigator.serviceWorker.getRegistration()).update(), true)")
        .await?;
    assert_eq!(asked, json!(true));
    world.phone.wait_for_state("update", "ready").await
}

async fn take(world: &Arc<World>, version: &str) -> Result<()> {
    world.phone.tap("Load it").await?;
    world.phone.wait_for_state("version", version).await?;
    world.phone.wait_until_started().await?;
    world.phone.wait_for_state("offline", "ready").await
}

#[test]
fn it_is_offered_and_taken_only_when_asked_for() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        let first = world.site.version()?;
        phone.script("window.mark = 1; localStorage.setItem('slackwater-test', 'kept')", vec![]).await?;

        deploy(&world, "next-version").await?;
        sleep(Duration::from_secs(2)).await;
        assert_eq!(
            phone.script("return window.mark", vec![]).await?,
            json!(1),
            "the page reloaded by itself"
        );
        assert_eq!(phone.state("version").await?, Some(first.clone()));
        phone.reload().await?;
        assert_eq!(phone.state("version").await?, Some(first.clone()), "a reload alone changes no version");
        phone.wait_for_state("update", "ready").await?;

        take(&world, "next-version").await?;
        assert_eq!(phone.script("return localStorage.getItem('slackwater-test')", vec![]).await?, "kept");
        assert_eq!(phone.state("update").await?, None);
        let names = phone.promise("caches.keys()").await?;
        assert_eq!(names, json!([format!("slackwater:/:{first}"), "slackwater:/:next-version"]));
        Ok(())
    });
}

#[test]
fn two_versions_are_kept_and_nothing_of_others_is_touched() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        phone
            .promise("(await caches.open('slackwater:/elsewhere/:1'), await caches.open('another-program'))")
            .await?;
        for version in ["second", "third"] {
            deploy(&world, version).await?;
            take(&world, version).await?;
        }
        let mut names: Vec<String> = serde_json::from_value(phone.promise("caches.keys()").await?)?;
        names.sort();
        assert_eq!(
            names,
            ["another-program", "slackwater:/:second", "slackwater:/:third", "slackwater:/elsewhere/:1"]
        );
        world.server.stop().await?;
        phone.reload().await?;
        phone.wait_until_started().await?;
        assert_eq!(phone.state("version").await?.as_deref(), Some("third"));
        Ok(())
    });
}

#[test]
fn half_an_update_leaves_the_version_before_working() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        let first = world.site.version()?;
        world.site.next_version("broken")?;
        // The new page does not fit its digest: what a half-finished upload looks like.
        let page = world.site.folder().join("index.html");
        world.site.replace(&page, b"<!doctype html><title>half</title>")?;
        phone
            .promise("new Promise((done) => navigator.serviceWorker.getRegistration().then((registration) => {
                registration.addEventListener('updatefound', () => registration.installing.addEventListener('statechange',
                    (event) => event.target.state === 'redundant' && done(true)));
                registration.update();
            }))")
            .await?;
        assert_eq!(phone.state("update").await?, None);
        phone.reload().await?;
        phone.wait_until_started().await?;
        assert_eq!(phone.state("version").await?, Some(first));
        phone.wait_for_state("offline", "ready").await
    });
}
