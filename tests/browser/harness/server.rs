//! The project's own server as a process of its own, so that "no signal" is a server that isn't there.

use super::root;
use anyhow::{Context, Result, ensure};
use std::env;
use std::path::{Path, PathBuf};
use std::process::Stdio;
use tokio::io::{AsyncBufReadExt, AsyncReadExt, AsyncWriteExt, BufReader};
use tokio::net::{TcpListener, TcpStream};
use tokio::process::{Child, Command};
use tokio::sync::Mutex;
use tokio::task::JoinHandle;

/// Serves a folder on a port that stays the same over stops and starts.
pub struct Server {
    folder: PathBuf,
    port: u16,
    child: Mutex<Option<Child>>,
}

impl Server {
    /// Starts on any free port.
    pub async fn start(folder: &Path) -> Result<Self> {
        let (child, port) = spawn(folder, 0).await?;
        Ok(Self { folder: folder.into(), port, child: Mutex::new(Some(child)) })
    }

    /// Where the site is, with the slash at the end.
    pub fn address(&self) -> String {
        format!("http://127.0.0.1:{}/", self.port)
    }

    /// Ends the process: from now on every connection is refused.
    pub async fn stop(&self) -> Result<()> {
        if let Some(mut child) = self.child.lock().await.take() {
            child.kill().await.context("the server could not be stopped")?;
        }
        ensure!(TcpStream::connect(("127.0.0.1", self.port)).await.is_err(), "something still answers");
        Ok(())
    }

    /// Starts it again on the same port.
    pub async fn start_again(&self) -> Result<()> {
        let mut child = self.child.lock().await;
        ensure!(child.is_none(), "the server is running");
        *child = Some(spawn(&self.folder, self.port).await?.0);
        Ok(())
    }

    /// In place of the stopped server, a captive portal on the same port.
    pub async fn replaced_by_portal(&self) -> Result<Portal> {
        self.stop().await?;
        Portal::start(self.port).await
    }

    /// One request, its answer whole: head and body as they came over the line.
    pub async fn ask(&self, path: &str, headers: &str) -> Result<(String, Vec<u8>)> {
        let mut stream = TcpStream::connect(("127.0.0.1", self.port)).await?;
        let request = format!("GET {path} HTTP/1.1\r\nHost: 127.0.0.1\r\nConnection: close\r\n{headers}\r\n");
        stream.write_all(request.as_bytes()).await?;
        let mut answer = Vec::new();
        stream.read_to_end(&mut answer).await?;
        let end = answer.windows(4).position(|four| four == b"\r\n\r\n").context("the answer has no head")?;
        let head = String::from_utf8(answer[..end].to_vec())?.to_lowercase();
        Ok((head, answer[end + 4..].to_vec()))
    }
}

/// `cargo xtask test` names the program it is; by hand, cargo runs it (and becomes it, so that ending it ends the server).
async fn spawn(folder: &Path, port: u16) -> Result<(Child, u16)> {
    let mut command = match env::var_os("SLACKWATER_XTASK") {
        Some(xtask) => Command::new(xtask),
        None => {
            let mut cargo = Command::new(env::var_os("CARGO").unwrap_or_else(|| "cargo".into()));
            cargo.arg("xtask");
            cargo
        }
    };
    let mut child = command
        .current_dir(root())
        .args(["serve", "--no-build", "--port", &port.to_string(), "--dist"])
        .arg(folder)
        .stdout(Stdio::piped())
        .kill_on_drop(true)
        .spawn()
        .context("the server could not be started")?;
    let output = child.stdout.take().context("the server has no output")?;
    let mut lines = BufReader::new(output).lines();
    while let Some(line) = lines.next_line().await? {
        if let Some((_, rest)) = line.split_once("http://127.0.0.1:") {
            let digits: String = rest.chars().take_while(char::is_ascii_digit).collect();
            return Ok((child, digits.parse()?));
        }
    }
    anyhow::bail!("the server ended without saying where it is (is dist/ built?)")
}

/// What hotels put between a phone and the net: every request is answered, with a way to their own page.
pub struct Portal(JoinHandle<()>);

impl Portal {
    async fn start(port: u16) -> Result<Self> {
        let listener = TcpListener::bind(("127.0.0.1", port)).await?;
        Ok(Self(tokio::spawn(async move {
            while let Ok((mut stream, _)) = listener.accept().await {
                tokio::spawn(async move {
                    let mut head = [0; 2048];
                    let length = stream.read(&mut head).await.unwrap_or(0);
                    let login = head[..length].starts_with(b"GET /login");
                    let answer: &[u8] = if login {
                        b"HTTP/1.1 200 OK\r\ncontent-type: text/html\r\ncontent-length: 15\r\n\r\nBuy an hour now"
                    } else {
                        b"HTTP/1.1 302 Found\r\nlocation: /login\r\ncontent-length: 0\r\n\r\n"
                    };
                    // A browser that hangs up early is no fault of the portal's.
                    let _ = stream.write_all(answer).await;
                });
            }
        })))
    }

    /// Ends it and frees the port.
    pub async fn stop(self) {
        self.0.abort();
        let _ = self.0.await;
    }
}
