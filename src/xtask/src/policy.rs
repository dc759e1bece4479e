//! The content security policy, written once: as a header by our own server, as a `<meta>` for any other static host.

/// Everything from this origin only, no inline script or style, wasm allowed to compile.
const SOURCES: &str = "default-src 'none'; script-src 'self' 'wasm-unsafe-eval'; style-src 'self'; img-src 'self'; \
     font-src 'self'; connect-src 'self'; manifest-src 'self'; worker-src 'self'; base-uri 'none'; form-action 'none'";

/// The policy as the page itself carries it.
pub fn meta() -> &'static str {
    SOURCES
}

/// The policy as a header, which alone can forbid that other pages frame this one.
pub fn header() -> String {
    format!("{SOURCES}; frame-ancestors 'none'")
}
