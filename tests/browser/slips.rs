//! Slips of a hurried hand: asked about or refused in words, and nothing typed is lost.

use crate::harness::{Phone, Setup};
use crate::steps::{about, first_answer, settings};
use anyhow::{Result, ensure};
use serde_json::json;

/// Types a gas up to its PaCO2, which is given key by key.
async fn gas(phone: &Phone, paco2: &str) -> Result<()> {
    phone.tap("TYPE A GAS").await?;
    phone.tap("arterial").await?;
    phone.tap("now").await?;
    phone.type_digits("732").await?;
    phone.tap("Next").await?;
    for key in paco2.chars() {
        match key {
            '.' => phone.tap(". ,").await?,
            digit => phone.type_digits(&digit.to_string()).await?,
        }
    }
    phone.tap("SETTINGS").await
}

#[test]
fn a_paco2_that_fits_both_units_is_asked_with_both_readings() {
    for (typed, mmhg, kpa, chosen, now) in [
        ("5.3", "5.3 mmHg", "5.3 kPa (40 mmHg)", "5.3 kPa (40 mmHg)", 36.0..=44.0),
        ("14", "14 mmHg", "14 kPa (105 mmHg)", "14 mmHg", 11.0..=18.0),
    ] {
        Setup::default().run(move |world| async move {
            let phone = &world.phone;
            phone.open("").await?;
            gas(phone, typed).await?;
            phone.wait_for_text("did you read mmHg, or kPa").await?;
            let text = phone.text().await?;
            ensure!(text.contains(mmhg) && text.contains(kpa), "both readings are offered: {text}");
            phone.shot(&format!("slips-{typed}")).await?;
            phone.tap(chosen).await?;
            settings(phone, "ANSWER").await?;
            let shown = about(&phone.text().await?, "PaCO₂ now")?;
            ensure!(now.contains(&shown), "{chosen} was chosen, and ≈{shown} is shown");
            Ok(())
        });
    }
}

#[test]
fn ph_71_by_the_phones_keys_is_refused_in_words() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.tap("TYPE A GAS").await?;
        phone.tap("arterial").await?;
        phone.tap("now").await?;
        phone.tap("Phone keys").await?;
        phone.wait_until("document.activeElement?.id === 'f-ph'").await?;
        phone.command("Input.insertText", json!({ "text": "71" })).await?;
        phone.tap("Next").await?;
        phone
            .wait_until("document.querySelector('.fault:not([hidden])')?.innerText.includes('pH 71')")
            .await?;
        let fault =
            phone.script("return document.querySelector('.fault:not([hidden])').innerText", vec![]).await?;
        ensure!(fault.as_str().is_some_and(|words| words.contains("outside")), "{fault}");
        let typed = phone.script("return document.getElementById('f-ph').value", vec![]).await?;
        assert_eq!(typed, "71", "what was typed stays as it was typed");
        phone.tap("SETTINGS").await?;
        ensure!(phone.text().await?.contains("pH 71"), "the form does not go on with it");
        phone.shot("slips-ph-71").await
    });
}

#[test]
fn a_reload_in_the_middle_of_a_gas_loses_nothing() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.tap("TYPE A GAS").await?;
        phone.tap("arterial").await?;
        phone.tap("now").await?;
        phone.type_digits("721").await?;
        phone.tap("Next").await?;
        phone.type_digits("7").await?;
        phone.reload().await?;
        phone.wait_until_started().await?;
        phone.wait_until("document.getElementById('f-ph')?.value === '7.21'").await?;
        let half = phone.script("return document.getElementById('f-pco2').value", vec![]).await?;
        assert_eq!(half, "7");
        let pressed =
            "return [...document.querySelectorAll('.chip[aria-pressed=true]')].map((chip) => chip.innerText)";
        assert_eq!(phone.script(pressed, vec![]).await?, json!(["arterial", "now"]));
        // Goes on where it was left.
        phone.script("document.getElementById('f-pco2').focus()", vec![]).await?;
        phone.type_digits("1").await?;
        phone.tap("SETTINGS").await?;
        settings(phone, "ANSWER").await?;
        let shown = about(&phone.text().await?, "PaCO₂ now")?;
        ensure!((66.0..=76.0).contains(&shown), "≈{shown}");
        Ok(())
    });
}

#[test]
fn without_a_person_there_is_an_answer_that_says_what_it_assumes() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        first_answer(phone, "TYPE A GAS", "ANSWER").await?;
        let text = phone.text().await?;
        for words in ["Narrow it", "assumed", "height"] {
            ensure!(text.contains(words), "{words:?} is missing: {text}");
        }
        phone.open("#/change").await?;
        phone.wait_for_text("height not known").await?;
        ensure!(!phone.text().await?.contains("mL/kg"), "mL/kg of nobody");
        phone.open("#/person").await?;
        phone.wait_until("document.getElementById('f-height')").await?;
        let typed = "return ['f-age', 'f-height', 'f-weight'].map((id) => document.getElementById(id).value)";
        assert_eq!(phone.script(typed, vec![]).await?, json!(["", "", ""]));
        Ok(())
    });
}

#[test]
fn a_file_far_too_large_is_refused_unread() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_until_started().await?;
        let choose = "const files = new DataTransfer();
            files.items.add(new File([new Uint8Array(50_000_000).fill(32)], 'case.json', { type: 'application/json' }));
            const input = document.querySelector('input[type=file]');
            input.files = files.files;
            input.dispatchEvent(new Event('change', { bubbles: true }));";
        phone.script(choose, vec![]).await?;
        phone.wait_for_text("The file has 50.0 MB; a case file has at most 4 MB.").await?;
        let kept = "return Object.keys(localStorage).filter((key) => !key.includes('draft'))";
        let kept = phone.script(kept, vec![]).await?;
        ensure!(kept.as_array().is_some_and(Vec::is_empty), "something of it was kept: {kept}");
        // The page goes on.
        first_answer(phone, "TYPE A GAS", "ANSWER").await?;
        Ok(())
    });
}

#[test]
fn an_empty_gas_is_not_taken_and_each_missing_field_is_named() {
    Setup::default().run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.tap("TYPE A GAS").await?;
        phone.wait_until("location.hash === '#/gas'").await?;
        phone.tap("SETTINGS").await?;
        phone.wait_until("document.body.innerText.includes('Needed: pH.')").await?;
        let text = phone.text().await?;
        ensure!(text.contains("Needed: PaCO₂."), "the second field is named too: {text}");
        phone.wait_until("location.hash === '#/gas'").await?;
        let kept = "return Object.keys(localStorage).filter((key) => key.startsWith('slackwater.journal.'))";
        let kept = phone.script(kept, vec![]).await?;
        ensure!(kept.as_array().is_some_and(Vec::is_empty), "something of it was kept: {kept}");
        Ok(())
    });
}
