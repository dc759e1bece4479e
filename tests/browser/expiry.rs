//! Minutes pass without an entry: it asks after half an hour, and after a whole one the number is gone.

use crate::harness::{Phone, Setup};
use crate::steps::first_answer;
use anyhow::{Result, ensure};
use serde_json::json;

/// The page's own clock, which a test may set ahead by `window.aheadMs` while the page goes on.
const CLOCK: &str = "{
    const Real = Date;
    window.aheadMs = 0;
    window.Date = class extends Real {
        constructor(...given) { given.length ? super(...given) : super(Real.now() + window.aheadMs); }
        static now() { return Real.now() + window.aheadMs; }
    };
}";

/// Sets the clock so many minutes past the answer and lets the page look at it.
async fn minutes_later(phone: &Phone, minutes: u32) -> Result<()> {
    let set = "window.aheadMs = arguments[0] * 60000; document.dispatchEvent(new Event('visibilitychange'))";
    phone.script(set, vec![json!(minutes)]).await?;
    Ok(())
}

async fn said(phone: &Phone) -> Result<String> {
    let text = phone.script("return document.querySelector('main').innerText", vec![]).await?;
    Ok(text.as_str().unwrap_or_default().to_owned())
}

#[test]
fn it_asks_after_half_an_hour_and_is_silent_after_a_whole_one() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.command("Page.addScriptToEvaluateOnNewDocument", json!({ "source": CLOCK })).await?;
        phone.open("").await?;
        first_answer(phone, "TYPE A GAS", "ANSWER").await?;

        minutes_later(phone, 28).await?;
        phone.wait_until("document.querySelector('main').innerText.includes('PaCO₂ now')").await?;
        ensure!(!said(phone).await?.contains("Still so?"), "28 minutes are fresh: {}", said(phone).await?);

        minutes_later(phone, 31).await?;
        phone.wait_for_text("Still so?").await?;
        let asked = said(phone).await?;
        ensure!(asked.contains("PaCO₂ now") && asked.contains("STILL SO"), "{asked}");
        phone.shot("expiry-still-so").await?;

        minutes_later(phone, 61).await?;
        phone.wait_for_text("Not known since").await?;
        let gone = said(phone).await?;
        ensure!(!gone.contains("PaCO₂ now") && !gone.contains('≈'), "a figure is still shown: {gone}");
        ensure!(gone.contains("PaCO₂ 71 mmHg"), "what was measured stays: {gone}");
        phone.shot("expiry-gone").await?;
        phone.open("#/change").await?;
        phone.wait_for_text("Not known since").await?;
        let gone = said(phone).await?;
        ensure!(!gone.contains('≈'), "nor does Change show one: {gone}");

        // Somebody looked: the number is back.
        phone.open("#/now").await?;
        phone.tap_beginning("Case 1: I looked, nothing has changed").await?;
        phone.wait_for_text("PaCO₂ now").await
    });
}
