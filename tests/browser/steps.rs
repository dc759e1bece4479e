//! Steps that several tests take, by what can be read on the screen.

use crate::harness::{Effort, Phone};
use anyhow::{Context, Result};

/// From the first screen to the first answer; from the second case on the button that writes names the case.
pub async fn first_answer(phone: &Phone, way_in: &str, answer: &str) -> Result<Effort> {
    phone.effort();
    phone.tap(way_in).await?;
    phone.tap("arterial").await?;
    phone.tap("now").await?;
    phone.type_digits("721").await?;
    phone.tap("Next").await?;
    phone.type_digits("71").await?;
    phone.tap("SETTINGS").await?;
    settings(phone, answer).await?;
    Ok(phone.effort())
}

/// From the empty settings to the answer.
pub async fn settings(phone: &Phone, answer: &str) -> Result<()> {
    phone.tap("machine, volume set").await?;
    phone.type_digits("340").await?;
    phone.tap("Next").await?;
    phone.type_digits("18").await?;
    phone.tap(answer).await?;
    phone.wait_for_text("PaCO₂ now").await
}

/// The figure behind the first ≈ that follows a text.
pub fn about(text: &str, after: &str) -> Result<f64> {
    let (_, rest) = text.split_once(after).with_context(|| format!("{after:?} is not in {text:?}"))?;
    let (_, figure) = rest.split_once('≈').with_context(|| format!("no ≈ behind {after:?} in {text:?}"))?;
    let digits: String = figure.chars().take_while(|sign| sign.is_ascii_digit() || *sign == '.').collect();
    digits.trim_end_matches('.').parse().with_context(|| format!("no figure behind ≈ in {figure:?}"))
}
