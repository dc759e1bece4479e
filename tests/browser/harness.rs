//! What the browser tests stand on: a phone, a server, and a copy of the built site that a test may damage.

mod phone;
mod server;
mod site;

pub use phone::{Effort, Phone};
pub use server::Server;
pub use site::SiteCopy;

use anyhow::Result;
use serde_json::{Map, Value};
use std::future::Future;
use std::panic;
use std::path::{Path, PathBuf};
use std::sync::Arc;

/// The top of the repository.
pub fn root() -> PathBuf {
    let here = Path::new(env!("CARGO_MANIFEST_DIR"));
    here.parent().unwrap_or(here).to_path_buf()
}

/// One phone in front of one server.
pub struct World {
    /// The browser.
    pub phone: Phone,
    /// Serves `site`; can be stopped and started.
    pub server: Server,
    /// This test's own copy of the built site.
    pub site: SiteCopy,
}

/// How the phone is set up before the page is opened.
pub struct Setup {
    /// Width and height in CSS pixels.
    size: (u32, u32),
    /// Further arguments for the browser.
    arguments: Vec<String>,
    /// Browser preferences, as a user or an administrator would set them.
    preferences: Map<String, Value>,
    /// What is done to the site's copy first.
    prepare: fn(&SiteCopy) -> Result<()>,
}

impl Default for Setup {
    fn default() -> Self {
        Self { size: (360, 740), arguments: Vec::new(), preferences: Map::new(), prepare: |_| Ok(()) }
    }
}

impl Setup {
    /// A screen of another size.
    pub fn size(mut self, width: u32, height: u32) -> Self {
        self.size = (width, height);
        self
    }

    /// A further argument for the browser.
    pub fn argument(mut self, argument: &str) -> Self {
        self.arguments.push(argument.into());
        self
    }

    /// A browser preference.
    pub fn preference(mut self, name: &str, value: impl Into<Value>) -> Self {
        self.preferences.insert(name.into(), value.into());
        self
    }

    /// Changes the site's copy before it is served.
    pub fn prepare(mut self, change: fn(&SiteCopy) -> Result<()>) -> Self {
        self.prepare = change;
        self
    }

    /// Runs a test. Browser, driver and server are ended whatever becomes of it.
    pub fn run<Body, Done>(self, body: Body)
    where
        Body: FnOnce(Arc<World>) -> Done,
        Done: Future<Output = Result<()>> + Send + 'static,
    {
        let runtime = tokio::runtime::Runtime::new().expect("a runtime can be made");
        let outcome = runtime.block_on(async {
            let site = SiteCopy::of_dist()?;
            (self.prepare)(&site)?;
            let server = Server::start(site.folder()).await?;
            let phone = Phone::start(&self, server.address()).await?;
            let world = Arc::new(World { phone, server, site });
            let outcome = tokio::spawn(body(world.clone())).await;
            world.phone.end().await;
            world.server.stop().await?;
            match outcome {
                Err(failed) if failed.is_panic() => panic::resume_unwind(failed.into_panic()),
                Err(failed) => Err(failed.into()),
                Ok(outcome) => outcome,
            }
        });
        if let Err(error) = outcome {
            panic!("{error:#}");
        }
    }
}
