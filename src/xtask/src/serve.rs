//! A static server on this machine, as strict as the page's own policy.

use crate::workspace::{dist, nothing_else};
use crate::{build, policy};
use anyhow::{Context, Result, bail};
use axum::Router;
use axum::extract::Request;
use axum::http::StatusCode;
use axum::http::header::{
    CACHE_CONTROL, CONTENT_SECURITY_POLICY, HeaderName, HeaderValue, REFERRER_POLICY, X_CONTENT_TYPE_OPTIONS,
};
use axum::middleware::{self, Next};
use axum::response::Response;
use axum::routing::any;
use pico_args::Arguments;
use std::io::ErrorKind;
use std::net::{Ipv4Addr, SocketAddr};
use std::path::Path;
use tokio::net::TcpListener;
use tower_http::services::ServeDir;

const PORT: u16 = 8080;

/// `cargo xtask serve`.
pub fn command(mut arguments: Arguments) -> Result<()> {
    let port = arguments
        .opt_value_from_str("--port")
        .context("--port takes a number from 0 (any free one) to 65535")?
        .unwrap_or(PORT);
    let built = arguments.contains("--no-build");
    let folder = dist(&mut arguments)?;
    nothing_else(arguments)?;
    if !built {
        build::into(&folder)?;
    }
    if !folder.join("sw.js").is_file() {
        bail!("{} holds no built site: run `cargo xtask build` first", folder.display());
    }
    tokio::runtime::Runtime::new()?.block_on(serve(&folder, port))
}

async fn serve(folder: &Path, port: u16) -> Result<()> {
    let listener = listen(port).await?;
    println!("Slackwater is at http://{}/  (Ctrl-C stops it)", listener.local_addr()?);
    let stopped = async {
        if tokio::signal::ctrl_c().await.is_err() {
            std::future::pending::<()>().await;
        }
    };
    tokio::select! {
        ended = axum::serve(listener, router(folder)) => Ok(ended?),
        () = stopped => Ok(()),
    }
}

async fn listen(port: u16) -> Result<TcpListener> {
    let address = SocketAddr::from((Ipv4Addr::LOCALHOST, port));
    match TcpListener::bind(address).await {
        Err(error) if error.kind() == ErrorKind::AddrInUse => {
            bail!(
                "port {port} is taken by another program: choose another with --port, or 0 for any free one"
            )
        }
        other => other.with_context(|| format!("can't listen on {address}")),
    }
}

fn router(folder: &Path) -> Router {
    let missing =
        any(|| async { (StatusCode::NOT_FOUND, "There is nothing at this address. Slackwater is at /\n") });
    let files = ServeDir::new(folder).precompressed_br().precompressed_gzip().not_found_service(missing);
    Router::new().fallback_service(files).layer(middleware::from_fn(with_headers))
}

/// Assets carry their content's digest in the name and may be kept; all else is asked for again.
async fn with_headers(request: Request, next: Next) -> Response {
    let lasting = request.uri().path().starts_with("/assets/");
    let mut response = next.run(request).await;
    let caching = match (lasting, response.status().is_success()) {
        (true, true) => "public, max-age=31536000, immutable",
        _ => "no-cache",
    };
    let mut set = |name: HeaderName, value: &str| {
        if let Ok(value) = HeaderValue::from_str(value) {
            response.headers_mut().insert(name, value);
        }
    };
    set(CACHE_CONTROL, caching);
    set(CONTENT_SECURITY_POLICY, &policy::header());
    set(X_CONTENT_TYPE_OPTIONS, "nosniff");
    set(REFERRER_POLICY, "no-referrer");
    response
}
