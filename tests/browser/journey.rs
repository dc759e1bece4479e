//! The invented case "Night ferry" by its visible labels: from opening the page to a written change, with taps and digits
//! counted; once more with the server stopped; and after a crash.

use crate::harness::{Phone, Setup};
use crate::steps::{about, first_answer};
use anyhow::{Context, Result, ensure};
use serde_json::json;

/// What a hurried hand may need at most; the aim is 8 taps and 10 digits.
const MOST_TAPS: u32 = 15;

/// Every room and the title it gives the page.
const ROOMS: [(&str, &str); 7] = [
    ("#/start", "Slackwater"),
    ("#/gas", "Type a gas"),
    ("#/settings", "Settings"),
    ("#/now", "Now"),
    ("#/change", "Change a setting"),
    ("#/record", "Record"),
    ("#/person", "Case"),
];

/// What the first answer must say: where PaCO2 is and how sure that is, where it settles, and when.
async fn reads_the_answer(phone: &Phone) -> Result<()> {
    let text = phone.text().await?;
    let now = about(&text, "PaCO₂ now")?;
    ensure!((66.0..=76.0).contains(&now), "a gas drawn just now read 71, and ≈{now} is shown: {text}");
    for words in ["calculated, not measured", "8 times in 10", "Settles at ≈", "pH ≈", "held 30 min"] {
        ensure!(text.contains(words), "{words:?} is missing: {text}");
    }
    Ok(())
}

/// From the answer to a written change: the settings were steady, rate 26 is tried and made.
async fn change_the_rate(phone: &Phone) -> Result<()> {
    phone.tap("held 30 min").await?;
    phone.tap_beginning("rate 26").await?;
    phone.wait_for_text("PaCO₂ would settle at").await?;
    let settles = about(&phone.text().await?, "PaCO₂ would settle at")?;
    ensure!((40.0..66.0).contains(&settles), "rate 26 for 18 settles at ≈{settles}");
    let case = phone.script("return document.querySelector('#main-button').innerText", vec![]).await?;
    let case = case
        .as_str()
        .and_then(|text| text.split_once(": I MADE THIS CHANGE"))
        .context("the button names the case")?
        .0
        .to_owned();
    phone.tap_beginning(&format!("{case}: I MADE THIS CHANGE")).await?;
    phone.wait_for_text("Within 2 mmHg of settled").await?;
    let text = phone.text().await?;
    ensure!(text.contains("Falling."), "a higher rate lets it fall: {text}");
    Ok(())
}

/// What stands in the record, without what is only said for a moment beside it.
async fn open_record(phone: &Phone) -> Result<String> {
    phone.open("#/record").await?;
    phone.wait_until("document.querySelector('main')?.innerText.includes('rate 26')").await?;
    let text = phone.script("return document.querySelector('main').innerText", vec![]).await?;
    text.as_str().map(str::to_owned).context("the record has text")
}

#[test]
fn night_ferry_with_signal_and_without() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_until_started().await?;
        phone.shot("journey-1-start").await?;
        let effort = first_answer(phone, "TYPE A GAS", "ANSWER").await?;
        println!("Night ferry to the first answer: {} taps and {} digits", effort.taps, effort.digits);
        assert!(effort.taps <= MOST_TAPS, "{effort:?}");
        reads_the_answer(phone).await?;
        phone.shot("journey-2-now").await?;
        change_the_rate(phone).await?;
        phone.shot("journey-3-changed").await?;

        let record = open_record(phone).await?;
        assert!(record.contains("pH 7.21") && record.contains("71") && record.contains("340"), "{record}");
        phone.shot("journey-4-record").await?;
        phone.reload().await?;
        assert_eq!(open_record(phone).await?, record, "a reload changes nothing that was written");

        phone.wait_for_state("offline", "ready").await?;
        world.server.stop().await?;
        phone.reload().await?;
        assert_eq!(open_record(phone).await?, record, "nor does a reload without the server");
        for (address, title) in ROOMS {
            phone.open(&format!("?link{address}")).await?;
            phone.wait_until(&format!("document.title.startsWith('{title}')")).await?;
            assert!(!phone.text().await?.trim().is_empty(), "{address} shows something");
        }

        phone.open("#/start").await?;
        phone.wait_until_started().await?;
        let again = first_answer(phone, "New case: type a gas", "Case 2: ANSWER").await?;
        println!("and without the server: {} taps and {} digits", again.taps, again.digits);
        assert!(again.taps <= MOST_TAPS, "{again:?}");
        reads_the_answer(phone).await?;
        change_the_rate(phone).await?;
        phone.shot("journey-5-without-server").await
    });
}

#[test]
fn night_ferry_in_the_dark() {
    Setup::default().argument("--force-dark-mode").run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_until("matchMedia('(prefers-color-scheme: dark)').matches").await?;
        first_answer(phone, "TYPE A GAS", "ANSWER").await?;
        let night = "const page = getComputedStyle(document.documentElement); return [page.backgroundColor, page.color]";
        let colours = phone.script(night, vec![]).await?;
        assert_eq!(colours, json!(["rgb(13, 23, 34)", "rgb(235, 228, 211)"]), "paper and ink by night");
        phone.shot("night-now").await?;
        phone.open("#/change").await?;
        phone.wait_for_text("settles at").await?;
        phone.shot("night-change").await
    });
}

#[test]
fn what_was_written_survives_a_crash() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        first_answer(phone, "TYPE A GAS", "ANSWER").await?;
        change_the_rate(phone).await?;
        let record = open_record(phone).await?;
        phone.wait_for_state("offline", "ready").await?;
        world.server.stop().await?;
        let after = phone.wait_until_on_disk(r#""rate_per_min":26"#).await?;
        println!("the change was on the browser's disk {:.0} s after it was written", after.as_secs_f64());
        phone.crash().await?;
        assert_eq!(open_record(phone).await?, record);
        Ok(())
    });
}
