//! The answer: a big number, its unit, and its band in words right under it.

use leptos::prelude::*;

use crate::words::spoken::spoken;

/// A big number with its label and band.
#[component]
pub fn Figure(
    /// What it is.
    label: &'static str,
    /// The number, "≈57".
    #[prop(into)]
    value: Signal<String>,
    /// Its unit; empty for pH.
    unit: &'static str,
    /// Its band in words.
    #[prop(into)]
    band: Signal<String>,
) -> impl IntoView {
    view! {
        <div class="figure" role="group" aria-label=move || {
            spoken(&format!("{label}: {} {unit}, {}", value.get(), band.get()))
        }>
            <p class="figure-label" aria-hidden="true">{label}</p>
            <p class="figure-value" aria-hidden="true">
                <b>{value}</b>
                " "
                <span class="unit">{unit}</span>
            </p>
            <p class="figure-band" aria-hidden="true">{band}</p>
        </div>
    }
}
