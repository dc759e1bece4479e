//! Where something the program needs is missing, or the program dies, the page says so in a sentence.

use crate::harness::{Phone, Setup, SiteCopy};
use anyhow::Result;
use serde_json::json;

async fn says(phone: &Phone, sentence: &str) -> Result<()> {
    phone.open("").await?;
    phone.wait_for_text(sentence).await?;
    assert_eq!(phone.overflow().await?, json!([]));
    Ok(())
}

#[test]
fn without_webassembly() {
    // Without just-in-time compilation, as under a lockdown mode, there is no WebAssembly either.
    Setup::default().size(320, 640).argument("--js-flags=--jitless").run(|world| async move {
        says(&world.phone, "WebAssembly is missing or switched off").await?;
        world.phone.shot("blocked-wasm").await
    });
}

#[test]
fn without_storage() {
    // 2 is "block": what a user chooses under site data, and what private windows of some browsers do.
    let setup =
        Setup::default().size(320, 640).preference("profile.default_content_setting_values.cookies", 2);
    setup.run(|world| async move {
        says(&world.phone, "lets the page store nothing").await?;
        world.phone.wait_for_state("offline", "unsupported").await
    });
}

#[test]
fn without_scripts() {
    let setup =
        Setup::default().size(320, 640).preference("profile.default_content_setting_values.javascript", 2);
    setup.run(|world| async move {
        says(&world.phone, "it needs JavaScript").await?;
        assert!(!world.phone.text().await?.contains("Starting."), "nothing claims that it is starting");
        world.phone.shot("blocked-scripts").await
    });
}

#[test]
fn without_script_modules() {
    Setup::default().run(|world| async move {
        let source = "delete HTMLScriptElement.prototype.noModule";
        world.phone.command("Page.addScriptToEvaluateOnNewDocument", json!({ "source": source })).await?;
        says(&world.phone, "This browser is too old for Slackwater").await
    });
}

#[test]
fn before_any_script_has_arrived() {
    Setup::default()
        .prepare(|site| site.lose(&site.asset("boot", "js")?))
        .run(|world| async move { says(&world.phone, "the page did not arrive whole: load it again").await });
}

#[test]
fn when_the_program_did_not_arrive() {
    Setup::default()
        .prepare(|site| site.lose(&site.asset("app", "wasm")?))
        .run(|world| async move { says(&world.phone, "The program did not arrive whole").await });
}

#[test]
fn when_the_glue_did_not_arrive() {
    Setup::default()
        .prepare(|site| site.lose(&site.asset("app", "js")?))
        .run(|world| async move { says(&world.phone, "The program did not arrive whole").await });
}

#[test]
fn when_the_program_is_damaged() {
    let damage = |site: &SiteCopy| site.replace(&site.asset("app", "wasm")?, b"\0asm\x01\0\0\0half");
    Setup::default()
        .prepare(damage)
        .run(|world| async move { says(&world.phone, "The program did not arrive whole").await });
}

/// A module whose start function is one `unreachable`, the instruction a panic ends in.
const DIES: &[u8] = b"\0asm\x01\0\0\0\x01\x04\x01\x60\0\0\x03\x02\x01\0\x08\x01\0\x0a\x05\x01\x03\0\0\x0b";

#[test]
fn when_the_program_dies_at_its_start() {
    let setup =
        Setup::default().size(320, 640).prepare(|site| site.replace(&site.asset("app", "wasm")?, DIES));
    setup.run(|world| async move {
        let phone = &world.phone;
        // A record written in an earlier, better hour.
        phone.open("licences/b612-OFL.txt").await?;
        phone.script("localStorage.setItem('slackwater/test', 'pH 7.21, PaCO2 71')", vec![]).await?;
        says(phone, "Slackwater has stopped").await?;
        let offered = phone.script("return document.getElementById('rescue-text').value", vec![]).await?;
        assert!(offered.as_str().is_some_and(|text| text.contains("pH 7.21, PaCO2 71")), "{offered}");
        phone.tap("Copy the text").await?;
        phone.wait_for_text("Copied").await?;
        let kept = phone.script("return localStorage.getItem('slackwater/test')", vec![]).await?;
        assert_eq!(kept, "pH 7.21, PaCO2 71", "the rescue panel only reads");
        phone.shot("rescue").await?;
        phone.tap("Start again").await?;
        phone.wait_for_text("Slackwater has stopped").await
    });
}

#[test]
fn when_the_program_dies_later() {
    // A script of the site's own (a driver's script is no part of the page) that dies as a handler of the program would.
    let add_script = |site: &SiteCopy| {
        let script = format!(
            "setTimeout(() => new WebAssembly.Instance(new WebAssembly.Module(new Uint8Array({DIES:?}))));"
        );
        site.replace(&site.folder().join("assets/dies.js"), script.as_bytes())
    };
    Setup::default().size(320, 640).prepare(add_script).run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        phone.wait_until_started().await?;
        let before = phone.text().await?;
        let typing = "const field = document.createElement('input'); field.setAttribute('aria-label', 'PaCO2');
            field.value = '71,5'; document.body.append(field);
            localStorage.setItem('slackwater/test', 'an entry');
            document.head.append(Object.assign(document.createElement('script'), { src: './assets/dies.js' }));";
        phone.script(typing, vec![]).await?;
        phone.wait_for_text("Slackwater has stopped").await?;
        assert_eq!(phone.overflow().await?, json!([]));
        let offered = phone.script("return document.getElementById('rescue-text').value", vec![]).await?;
        let offered = offered.as_str().unwrap_or_default();
        assert!(offered.contains("an entry") && offered.contains("71,5"), "{offered}");
        // A figure that nothing works out any more still looks alive.
        let after = phone.text().await?;
        let stale: Vec<_> = before.lines().filter(|line| line.len() > 3 && after.contains(line)).collect();
        assert!(stale.iter().all(|line| "Slackwater".contains(line.trim())), "{stale:?}");
        Ok(())
    });
}

#[test]
fn an_ordinary_error_of_a_script_does_not_stop_the_program() {
    Setup::default().run(|world| async move {
        world.phone.open("").await?;
        world.phone.wait_until_started().await?;
        world
            .phone
            .script("dispatchEvent(new ErrorEvent('error', { error: new Error('an extension') }))", vec![])
            .await?;
        assert!(!world.phone.text().await?.contains("Slackwater has stopped"));
        Ok(())
    });
}
