//! Handing a file to the user and taking one.

use leptos::prelude::*;
use leptos::task::spawn_local;
use wasm_bindgen::{JsCast, JsValue};
use wasm_bindgen_futures::JsFuture;
use web_sys::{Blob, BlobPropertyBag, HtmlAnchorElement, HtmlInputElement, Url, js_sys::Array};

use super::clock;

/// Some browsers fetch the file only after they have asked where to: so long its address stays good.
const SAVED_WITHIN_MS: u64 = 60_000;

/// Offers `text` for saving as `name`.
///
/// # Errors
/// When the browser can't make a file.
pub fn download(name: &str, text: &str) -> Result<(), JsValue> {
    let options = BlobPropertyBag::new();
    options.set_type("application/json");
    let parts = Array::of1(&JsValue::from_str(text));
    let blob = Blob::new_with_str_sequence_and_options(&parts, &options)?;
    let address = Url::create_object_url_with_blob(&blob)?;
    let anchor: HtmlAnchorElement = document().create_element("a")?.unchecked_into();
    anchor.set_href(&address);
    anchor.set_download(name);
    anchor.click();
    let _ = clock::after(SAVED_WITHIN_MS, move || {
        // Refused only for an address that is gone already.
        let _ = Url::revoke_object_url(&address);
    });
    Ok(())
}

/// Reads the file chosen in `input` and hands on its text, or `Err(bytes)` when it is larger than `most`
/// bytes, or `Err(0)` when it can't be read. The input is emptied, so that the same file can be chosen again.
pub fn chosen(input: &HtmlInputElement, most: usize, then: impl FnOnce(Result<String, u64>) + 'static) {
    let Some(file) = input.files().and_then(|files| files.get(0)) else { return };
    // Sizes are whole numbers below 2^53.
    let bytes = file.size() as u64;
    if bytes > most as u64 {
        input.set_value("");
        return then(Err(bytes));
    }
    let text = file.text();
    input.set_value("");
    spawn_local(async move {
        let read = JsFuture::from(text).await.ok().and_then(|text| text.as_string());
        then(read.ok_or(0));
    });
}

/// Reads the clipboard and hands on its text; `None` where the browser or the user says no.
pub fn pasted(then: impl FnOnce(Option<String>) + 'static) {
    let clipboard = web_sys::js_sys::Reflect::get(&window().navigator(), &"clipboard".into())
        .ok()
        .filter(JsValue::is_object)
        .map(|c| c.unchecked_into::<web_sys::Clipboard>());
    let Some(clipboard) = clipboard else { return then(None) };
    spawn_local(async move {
        let text = JsFuture::from(clipboard.read_text()).await;
        then(text.ok().and_then(|text| text.as_string()));
    });
}
