//! With the server stopped, not only the browser's offline switch: what was kept is enough.

use crate::harness::{Setup, World};
use anyhow::Result;
use std::sync::Arc;

async fn visited(world: &Arc<World>) -> Result<()> {
    world.phone.open("").await?;
    world.phone.wait_for_state("offline", "ready").await
}

#[test]
fn the_page_loads_by_every_address_it_has() {
    Setup::default().run(|world| async move {
        visited(&world).await?;
        world.server.stop().await?;
        world.phone.reload().await?;
        world.phone.wait_until_started().await?;
        for address in
            ["", "?from=home-screen", "#/now", "#/change", "#/record", "index.html", "?a=1#/change"]
        {
            world.phone.open("licences/away").await.ok();
            world.phone.open(address).await?;
            world.phone.wait_until_started().await?;
            world.phone.wait_for_state("offline", "ready").await?;
        }
        Ok(())
    });
}

#[test]
fn an_address_that_is_no_page_leads_to_the_page() {
    Setup::default().run(|world| async move {
        visited(&world).await?;
        world.server.stop().await?;
        world.phone.open("old/bookmark?x=1").await?;
        world.phone.wait_until_started().await?;
        assert_eq!(world.phone.script("return location.pathname", vec![]).await?, "/");
        Ok(())
    });
}

#[test]
fn a_restart_of_the_phone_changes_nothing() {
    Setup::default().run(|world| async move {
        visited(&world).await?;
        world.server.stop().await?;
        world.phone.restart().await?;
        world.phone.open("").await?;
        world.phone.wait_until_started().await?;
        world.phone.wait_for_state("offline", "ready").await
    });
}

#[test]
fn a_captive_portal_is_not_let_in() {
    Setup::default().run(|world| async move {
        visited(&world).await?;
        let portal = world.server.replaced_by_portal().await?;
        for _ in 0..2 {
            world.phone.open("?x=1").await?;
            world.phone.wait_until_started().await?;
            world.phone.wait_for_state("offline", "ready").await?;
            assert!(!world.phone.text().await?.contains("Buy an hour"));
        }
        portal.stop().await;
        world.phone.reload().await?;
        world.phone.wait_until_started().await
    });
}
