//! The browser: Chromium with the screen and the touch of a phone, and a fresh profile.

use super::{Setup, root};
use anyhow::{Context, Result, bail, ensure};
use serde_json::{Value, json};
use std::env;
use std::fs;
use std::process::Stdio;
use std::sync::atomic::{AtomicU32, Ordering};
use std::time::{Duration, Instant};
use tempfile::TempDir;
use thirtyfour::LoggingPrefsLogLevel;
use thirtyfour::prelude::*;
use tokio::io::{AsyncBufReadExt, BufReader};
use tokio::process::{Child, Command};
use tokio::sync::Mutex;
use tokio::time::sleep;

/// How long anything on the page may take. Generous: the machine may be busy.
const PATIENCE: Duration = Duration::from_secs(30);

/// What was done to the phone, to be held against what a hurried hand can do.
#[derive(Clone, Copy, Debug, PartialEq, Eq)]
pub struct Effort {
    /// Touches of anything but a digit key.
    pub taps: u32,
    /// Digit keys.
    pub digits: u32,
}

/// A phone. Everything on it is done by what can be read on its screen.
pub struct Phone {
    address: String,
    capabilities: Capabilities,
    session: Mutex<Option<Session>>,
    profile: TempDir,
    taps: AtomicU32,
    digits: AtomicU32,
}

struct Session {
    driver: WebDriver,
    process: Child,
}

impl Phone {
    /// Starts driver and browser; no page is open yet.
    pub async fn start(setup: &Setup, address: String) -> Result<Self> {
        let profile = tempfile::tempdir()?;
        let capabilities = capabilities(setup, &profile)?;
        let session = Session::start(capabilities.clone()).await?;
        Ok(Self {
            address,
            capabilities,
            session: Mutex::new(Some(session)),
            profile,
            taps: AtomicU32::new(0),
            digits: AtomicU32::new(0),
        })
    }

    /// Ends browser and driver. Whatever fails here has failed before, so it is not reported.
    pub async fn end(&self) {
        if let Some(session) = self.session.lock().await.take() {
            session.end().await;
        }
    }

    /// Closes the browser and opens it again with the same profile, as after a restart of the phone.
    pub async fn restart(&self) -> Result<()> {
        let mut session = self.session.lock().await;
        if let Some(old) = session.take() {
            old.end().await;
        }
        // A profile that an ended browser had no time to unlock would be refused.
        let _ = fs::remove_file(self.profile.path().join("SingletonLock"));
        *session = Some(Session::start(self.capabilities.clone()).await?);
        Ok(())
    }

    /// Waits until the browser has written `text`, as it stands in local storage, to its disk; says after how long.
    /// It does so in batches, seconds apart at first and up to a minute each when much was written: nothing the
    /// page can do makes it sooner.
    pub async fn wait_until_on_disk(&self, text: &str) -> Result<Duration> {
        const MOST: Duration = Duration::from_secs(240);
        let folder = self.profile.path().join("Default/Local Storage/leveldb");
        let began = Instant::now();
        while began.elapsed() < MOST {
            let files = fs::read_dir(&folder)?.filter_map(|entry| fs::read(entry.ok()?.path()).ok());
            if files.into_iter().any(|bytes| bytes.windows(text.len()).any(|part| part == text.as_bytes())) {
                return Ok(began.elapsed());
            }
            sleep(Duration::from_millis(500)).await;
        }
        bail!("{text} was not on disk after {MOST:?}")
    }

    /// Ends the browser as a flat battery would, in the middle of a word, and starts it again with the same profile.
    pub async fn crash(&self) -> Result<()> {
        let mut session = self.session.lock().await;
        if let Some(mut old) = session.take() {
            let driver = old.process.id().context("the driver has ended")?;
            let browser = descendants(driver)?;
            ensure!(!browser.is_empty(), "there is no browser to crash");
            Command::new("kill").arg("-9").args(browser.iter().map(u32::to_string)).status().await?;
            old.process.kill().await?;
            // Its session is gone with it; saying goodbye to the driver would only wait for an answer.
            std::mem::forget(old.driver);
        }
        let _ = fs::remove_file(self.profile.path().join("SingletonLock"));
        *session = Some(Session::start(self.capabilities.clone()).await?);
        Ok(())
    }

    async fn driver(&self) -> Result<WebDriver> {
        let session = self.session.lock().await;
        Ok(session.as_ref().context("the phone is off")?.driver.clone())
    }

    /// Opens an address of the site: what comes after the first slash.
    pub async fn open(&self, path: &str) -> Result<()> {
        let address = format!("{}{path}", self.address);
        self.driver().await?.goto(&address).await.with_context(|| format!("can't open {address}"))
    }

    /// Loads the page again.
    pub async fn reload(&self) -> Result<()> {
        Ok(self.driver().await?.refresh().await?)
    }

    /// Runs a script in the page.
    pub async fn script(&self, script: &str, arguments: Vec<Value>) -> Result<Value> {
        let result = self.driver().await?.execute(script, arguments).await;
        Ok(result.with_context(|| format!("script failed: {script}"))?.json().clone())
    }

    /// Runs a script that returns a promise, and waits for it.
    pub async fn promise(&self, expression: &str) -> Result<Value> {
        let script = format!(
            "const done = arguments[arguments.length - 1];
             Promise.resolve().then(async () => ({expression})).then(done, (error) => done('failed: ' + error));"
        );
        let result = self.driver().await?.execute_async(script, Vec::new()).await;
        Ok(result.with_context(|| format!("promise failed: {expression}"))?.json().clone())
    }

    /// One of the browser's own commands.
    pub async fn command(&self, method: &str, parameters: Value) -> Result<Value> {
        Ok(self.driver().await?.cdp().send_raw(method, parameters).await?)
    }

    /// Everything that can be read on the page.
    pub async fn text(&self) -> Result<String> {
        let text = self.script("return document.body.innerText", Vec::new()).await?;
        Ok(text.as_str().unwrap_or_default().to_owned())
    }

    /// An attribute `data-…` of the page's root.
    pub async fn state(&self, name: &str) -> Result<Option<String>> {
        let script = "return document.documentElement.dataset[arguments[0]] ?? null";
        Ok(self.script(script, vec![json!(name)]).await?.as_str().map(str::to_owned))
    }

    /// Waits until `data-NAME` of the page's root has this value.
    pub async fn wait_for_state(&self, name: &str, value: &str) -> Result<()> {
        let began = Instant::now();
        loop {
            let state = self.state(name).await?;
            if state.as_deref() == Some(value) {
                return Ok(());
            }
            if began.elapsed() > PATIENCE {
                bail!("data-{name} is {state:?}, not {value}; console: {:?}", self.console().await?);
            }
            sleep(Duration::from_millis(100)).await;
        }
    }

    /// Waits until a text can be read.
    pub async fn wait_for_text(&self, wanted: &str) -> Result<()> {
        let began = Instant::now();
        loop {
            let text = self.text().await?;
            if text.contains(wanted) {
                return Ok(());
            }
            if began.elapsed() > PATIENCE {
                bail!("{wanted:?} did not come; there is: {text:?}; console: {:?}", self.console().await?);
            }
            sleep(Duration::from_millis(100)).await;
        }
    }

    /// Waits until a script's value is true.
    pub async fn wait_until(&self, condition: &str) -> Result<()> {
        let began = Instant::now();
        while self.script(&format!("return !!({condition})"), Vec::new()).await? != json!(true) {
            if began.elapsed() > PATIENCE {
                bail!("never true: {condition}; there is: {:?}", self.text().await?);
            }
            sleep(Duration::from_millis(100)).await;
        }
        Ok(())
    }

    /// Waits until the program has started.
    pub async fn wait_until_started(&self) -> Result<()> {
        self.wait_until("performance.getEntriesByName('app-started').length").await
    }

    /// Touches the control of this name, which must be there (at once or soon), enabled and under nothing else.
    pub async fn tap(&self, label: &str) -> Result<()> {
        self.touch("control", label).await?;
        self.taps.fetch_add(1, Ordering::Relaxed);
        Ok(())
    }

    /// As `tap`, for a control whose name goes on with what isn't known beforehand: a time, a figure.
    pub async fn tap_beginning(&self, label: &str) -> Result<()> {
        self.touch("beginning", label).await?;
        self.taps.fetch_add(1, Ordering::Relaxed);
        Ok(())
    }

    /// Types digits on the page's own keypad, key by key.
    pub async fn type_digits(&self, digits: &str) -> Result<()> {
        let mut before = None;
        for digit in digits.chars() {
            // A hand needs longer for the same key twice; the keypad takes a faster second touch for a bounce.
            if before == Some(digit) {
                sleep(Duration::from_millis(150)).await;
            }
            before = Some(digit);
            self.touch("control", &digit.to_string()).await?;
            self.digits.fetch_add(1, Ordering::Relaxed);
        }
        Ok(())
    }

    /// What has been touched since the last asking.
    pub fn effort(&self) -> Effort {
        Effort { taps: self.taps.swap(0, Ordering::Relaxed), digits: self.digits.swap(0, Ordering::Relaxed) }
    }

    async fn touch(&self, how: &str, label: &str) -> Result<()> {
        let began = Instant::now();
        loop {
            let found = self.driver().await?.execute(PAGE, vec![json!(how), json!(label)]).await?;
            if let Ok(control) = found.element() {
                self.driver()
                    .await?
                    .execute("arguments[0].scrollIntoView({ block: 'center' })", vec![control.to_json()?])
                    .await?;
                return control.click().await.with_context(|| format!("can't touch {label:?}"));
            }
            if began.elapsed() > PATIENCE {
                let all = self.script(PAGE, vec![json!("controls")]).await?;
                bail!(
                    "no control is called {label:?}; there are {all}; the page says {:?}",
                    self.text().await?
                );
            }
            sleep(Duration::from_millis(50)).await;
        }
    }

    /// What reaches beyond the right edge of the screen.
    pub async fn overflow(&self) -> Result<Value> {
        self.script(PAGE, vec![json!("overflow")]).await
    }

    /// What the browser complained of since the last asking: errors and breaches of the policy among it.
    pub async fn console(&self) -> Result<Vec<String>> {
        let entries = self.driver().await?.browser_log().await?;
        Ok(entries.into_iter().map(|entry| format!("{:?}: {}", entry.level, entry.message)).collect())
    }

    /// Keeps a picture of the screen in `target/shots`.
    pub async fn shot(&self, name: &str) -> Result<()> {
        let folder = root().join("target/shots");
        fs::create_dir_all(&folder)?;
        Ok(self.driver().await?.screenshot(&folder.join(format!("{name}.png"))).await?)
    }
}

const PAGE: &str = include_str!("page.js");

impl Session {
    async fn start(capabilities: Capabilities) -> Result<Self> {
        let mut process = Command::new("chromedriver")
            .arg("--port=0")
            .stdout(Stdio::piped())
            .stderr(Stdio::null())
            .kill_on_drop(true)
            .spawn()
            .context("can't start chromedriver: `cargo xtask test` installs it on Debian")?;
        let output = process.stdout.take().context("chromedriver has no output")?;
        let mut lines = BufReader::new(output).lines();
        let port = loop {
            let line = lines.next_line().await?.context("chromedriver ended at once")?;
            if let Some((_, port)) = line.split_once("started successfully on port ") {
                break port.trim_end_matches('.').to_owned();
            }
        };
        // Reads on, so that the driver never stands before a full pipe.
        tokio::spawn(async move { while let Ok(Some(_)) = lines.next_line().await {} });
        let driver = WebDriver::new(format!("http://127.0.0.1:{port}"), capabilities).await?;
        Ok(Self { driver, process })
    }

    async fn end(mut self) {
        let _ = self.driver.quit().await;
        let _ = self.process.kill().await;
    }
}

fn capabilities(setup: &Setup, profile: &TempDir) -> Result<Capabilities> {
    let mut capabilities = DesiredCapabilities::chrome();
    capabilities.set_binary(&browser()?)?;
    let fixed = [
        "--headless=new",
        "--no-sandbox",
        "--disable-gpu",
        "--disable-dev-shm-usage",
        "--disable-quic",
        "--no-first-run",
        "--disable-background-networking",
        "--disable-component-update",
        "--disable-sync",
    ];
    for argument in fixed.iter().copied().chain(setup.arguments.iter().map(String::as_str)) {
        capabilities.add_arg(argument)?;
    }
    capabilities.add_arg(&format!("--user-data-dir={}", profile.path().display()))?;
    let (width, height) = setup.size;
    let screen = json!({ "width": width, "height": height, "pixelRatio": 2, "touch": true, "mobile": true });
    capabilities.add_experimental_option("mobileEmulation", json!({ "deviceMetrics": screen }))?;
    capabilities.add_experimental_option("prefs", &setup.preferences)?;
    capabilities.set_browser_log_level(LoggingPrefsLogLevel::All)?;
    Ok(capabilities.into())
}

/// The processes below a process, as the system lists them.
fn descendants(ancestor: u32) -> Result<Vec<u32>> {
    let mut parents = Vec::new();
    for entry in fs::read_dir("/proc")? {
        let path = entry?.path();
        // "pid (name) state parent …", where the name may hold anything but ends with the last bracket.
        let Ok(stat) = fs::read_to_string(path.join("stat")) else { continue };
        let process = stat.split(' ').next().and_then(|pid| pid.parse::<u32>().ok());
        let parent = stat.rsplit_once(") ").and_then(|(_, rest)| rest.split(' ').nth(1)?.parse::<u32>().ok());
        parents.extend(process.zip(parent));
    }
    let mut family = vec![ancestor];
    let mut at = 0;
    while at < family.len() {
        let parent = family[at];
        family.extend(parents.iter().filter(|(_, its)| *its == parent).map(|(process, _)| process));
        at += 1;
    }
    Ok(family.split_off(1))
}

fn browser() -> Result<String> {
    let path = env::var_os("PATH").unwrap_or_default();
    let names = ["chromium", "google-chrome", "chromium-browser"];
    let found = env::split_paths(&path)
        .flat_map(|folder| names.map(|name| folder.join(name)))
        .find(|program| program.is_file())
        .context("there is no Chromium: `cargo xtask test` installs it on Debian")?;
    Ok(found.to_string_lossy().into_owned())
}
