//! Nothing is cut off on the narrowest screens, nor with text at twice its size: empty, and with a case in every room.

use crate::harness::{Phone, Setup};
use crate::steps::first_answer;
use anyhow::{Context, Result, ensure};
use serde_json::json;

const ROOMS: [&str; 7] = ["#/start", "#/gas", "#/settings", "#/now", "#/change", "#/record", "#/person"];

/// Text at twice its size, as a style of the page's root would make it.
const TWICE: &str = "document.documentElement.style.fontSize = '200%'";

/// Labels that take more lines than they have words: they stand letter by letter.
const BROKEN: &str =
    "return [...document.querySelectorAll('h1, .field-label, .main-label, .plain, .chip, .bar-room, dt')]
    .filter((label) => label.getClientRects().length && label.offsetWidth > 1)
    .filter((label) => {
        const style = getComputedStyle(label);
        const inside = label.clientHeight - parseFloat(style.paddingTop) - parseFloat(style.paddingBottom);
        const text = document.createRange();
        text.selectNodeContents(label);
        const height = Math.min(inside || Infinity, text.getBoundingClientRect().height);
        const words = label.innerText.split(/[\\s,]+/).filter(Boolean).length;
        return Math.round(height / parseFloat(style.lineHeight)) > Math.max(words, 1);
    })
    .map((label) => label.innerText)";

/// Pairs of words in the header that lie over each other.
const OVERLAID: &str = "const parts = [...document.querySelectorAll('.header h1:not(.unseen), .header a, .header-time')]
        .filter((part) => part.getClientRects().length);
    const boxes = parts.map((part) => {
        const text = document.createRange();
        text.selectNodeContents(part);
        return text.getBoundingClientRect();
    });
    const over = (a, b) => a.left < b.right - 1 && b.left < a.right - 1 && a.top < b.bottom - 1 && b.top < a.bottom - 1;
    return boxes.flatMap((box, at) => boxes.slice(at + 1)
        .map((other, next) => over(box, other) && parts[at].innerText + ' / ' + parts[at + 1 + next].innerText)
        .filter(Boolean));";

/// Whether what a selector finds can be brought into sight and lies under nothing else.
const REACHED: &str = "const found = document.querySelector(arguments[0]);
    if (!found) return false;
    found.scrollIntoView({ block: 'nearest' });
    const box = found.getBoundingClientRect();
    const hit = document.elementFromPoint(box.x + box.width / 2, box.y + box.height / 2);
    return !!hit && (found.contains(hit) || hit.contains(found));";

async fn fits(phone: &Phone, room: &str) -> Result<()> {
    assert_eq!(phone.overflow().await?, json!([]), "in {room:?}");
    assert_eq!(phone.script(BROKEN, vec![]).await?, json!([]), "words stand letter by letter in {room:?}");
    assert_eq!(phone.script(OVERLAID, vec![]).await?, json!([]), "words lie over each other in {room:?}");
    Ok(())
}

/// Every room of a site without a case, then of one with a case; `grow` runs in each.
async fn rooms_fit(phone: &Phone, name: &str, grow: &str) -> Result<()> {
    phone.open("").await?;
    each_room_fits(phone, &format!("{name}-empty"), grow).await?;
    phone.open("?#/start").await?;
    phone.wait_until_started().await?;
    first_answer(phone, "TYPE A GAS", "ANSWER").await?;
    each_room_fits(phone, name, grow).await
}

async fn each_room_fits(phone: &Phone, name: &str, grow: &str) -> Result<()> {
    for room in ROOMS {
        phone.open(&format!("?{name}{room}")).await?;
        phone.wait_until_started().await?;
        phone.script(grow, vec![]).await?;
        fits(phone, room).await?;
        phone.shot(&format!("{name}{}", room.replace(['#', '/'], "-"))).await?;
    }
    Ok(())
}

/// On Change the answer and the button that writes stay in reach, and so do both with a rate tried.
async fn change_is_reached(phone: &Phone, name: &str, grow: &str) -> Result<()> {
    phone.open(&format!("?{name}-again#/change")).await?;
    phone.wait_until_started().await?;
    phone.script(grow, vec![]).await?;
    for tried in [false, true] {
        if tried {
            phone.tap("Rate up").await?;
            phone.wait_for_text("would settle at").await?;
        }
        for part in [".answer .figure-value b", "#main-button", ".step", ".stepper-input"] {
            let reached = phone.script(REACHED, vec![json!(part)]).await?;
            phone.shot(&format!("{name}-change-reached")).await?;
            ensure!(reached.as_bool().context("yes or no")?, "{part} is out of reach (tried: {tried})");
        }
        fits(phone, "#/change").await?;
    }
    Ok(())
}

#[test]
fn nothing_overflows_at_320_pixels() {
    Setup::default().size(320, 640).run(|world| async move {
        rooms_fit(&world.phone, "narrow", "").await?;
        change_is_reached(&world.phone, "narrow", "").await
    });
}

#[test]
fn nothing_overflows_with_text_twice_as_large() {
    Setup::default().run(|world| async move {
        rooms_fit(&world.phone, "large", TWICE).await?;
        change_is_reached(&world.phone, "large", TWICE).await
    });
}

#[test]
fn nothing_overflows_where_the_browser_is_set_to_text_twice_as_large() {
    Setup::default().preference("webkit.webprefs.default_font_size", 32).run(|world| async move {
        let phone = &world.phone;
        phone.open("").await?;
        let size = phone.script("return getComputedStyle(document.documentElement).fontSize", vec![]).await?;
        assert_eq!(size, "32px");
        rooms_fit(phone, "set-large", "").await?;
        change_is_reached(phone, "set-large", "").await
    });
}
