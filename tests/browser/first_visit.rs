//! The first visit keeps everything, says so only when it is so, and breaks none of the page's own rules.

use crate::harness::Setup;
use anyhow::Result;
use serde_json::json;
use std::time::Duration;
use tokio::time::sleep;

#[test]
fn keeps_every_file_of_the_list_and_then_says_ready() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_until_started().await?;
        phone.wait_for_state("offline", "ready").await?;

        let kept = phone
            .promise(
                "[].concat(...await Promise.all((await caches.keys()).map(async (name) =>
                    (await (await caches.open(name)).keys()).map((request) => name + ' ' + new URL(request.url).pathname))))",
            )
            .await?;
        let version = world.site.version()?;
        let expected: Vec<String> =
            world.site.list()?.iter().map(|path| format!("slackwater:/:{version} {}", &path[1..])).collect();
        let mut kept: Vec<String> = serde_json::from_value(kept)?;
        kept.sort_by_key(|entry| expected.iter().position(|other| other == entry));
        assert_eq!(kept, expected);
        phone.shot("first-visit").await
    });
}

#[test]
fn breaks_no_policy_and_logs_no_error() {
    Setup::default().run(|world| async move {
        world.phone.open("").await?;
        world.phone.wait_until_started().await?;
        world.phone.wait_for_state("offline", "ready").await?;
        let complaints = world.phone.console().await?;
        let grave: Vec<_> =
            complaints.iter().filter(|line| line.contains("Severe") || line.contains("Policy")).collect();
        assert!(grave.is_empty(), "{grave:?}");
        Ok(())
    });
}

#[test]
fn the_page_tells_of_readiness_by_an_event() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        // Listens from before the first script of the page.
        let listen = "window.told = []; document.addEventListener('slackwater:offline', () =>
            window.told.push(document.documentElement.dataset.offline))";
        phone.command("Page.addScriptToEvaluateOnNewDocument", json!({ "source": listen })).await?;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        assert_eq!(phone.script("return window.told", vec![]).await?, json!(["working", "ready"]));
        Ok(())
    });
}

#[test]
fn can_be_installed() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        let manifest = phone.command("Page.getAppManifest", json!({})).await?;
        assert_eq!(manifest["errors"], json!([]));
        assert!(
            manifest["url"].as_str().is_some_and(|url| url.ends_with("/manifest.webmanifest")),
            "{manifest}"
        );
        let errors = phone.command("Page.getInstallabilityErrors", json!({})).await?;
        assert_eq!(errors["installabilityErrors"], json!([]));
        Ok(())
    });
}

#[test]
fn one_lost_file_is_not_called_ready_until_it_came_after_all() {
    Setup::default().prepare(|site| site.lose(&site.asset("buoy", "svg")?)).run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "no").await?;
        world.site.restore(&world.site.asset("buoy", "svg.lost").map(|path| path.with_extension(""))?)?;
        // Without any doing of the user's: the page tries again by itself.
        phone.wait_for_state("offline", "ready").await
    });
}

#[test]
fn a_file_with_other_bytes_is_not_kept() {
    Setup::default()
        .prepare(|site| {
            site.replace(&site.asset("buoy", "svg")?, b"<svg xmlns='http://www.w3.org/2000/svg'/>")
        })
        .run(|world| async move {
            let phone = &world.phone;
            phone.open("").await?;
            phone.wait_for_state("offline", "no").await?;
            sleep(Duration::from_secs(2)).await;
            assert_ne!(phone.state("offline").await?.as_deref(), Some("ready"));
            let page = phone.promise("!!(await caches.match('./'))").await?;
            assert_eq!(
                page,
                json!(false),
                "the page is kept last, so that half a copy is never taken for a whole one"
            );
            Ok::<(), anyhow::Error>(())
        });
}

#[test]
fn an_entry_lost_later_is_noticed_and_fetched_again() -> Result<()> {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_for_state("offline", "ready").await?;
        let drop_one = "(await Promise.all((await caches.keys()).map(async (name) =>
            (await caches.open(name)).delete('./manifest.webmanifest'))))";
        assert_eq!(phone.promise(drop_one).await?, json!([true]));
        world.server.stop().await?;
        phone.reload().await?;
        phone.wait_for_state("offline", "no").await?;
        world.server.start_again().await?;
        phone.wait_for_state("offline", "ready").await
    });
    Ok(())
}
