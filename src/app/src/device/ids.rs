//! Names for cases and entries: 128 bits from the browser's generator.

use leptos::prelude::window;

/// A fresh name, 32 hexadecimal digits; `None` where the browser has no generator.
pub fn fresh() -> Option<String> {
    let mut bytes = [0_u8; 16];
    window().crypto().ok()?.get_random_values_with_u8_array(&mut bytes).ok()?;
    Some(bytes.iter().map(|b| format!("{b:02x}")).collect())
}
