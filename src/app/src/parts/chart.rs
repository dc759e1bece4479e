//! The chart: the band as water, the middle as its surface, gases as moored buoys, now as a dashed line.

mod picture;
mod reading;

use bedside::{Forecast, Quantiles};
use case::{Case, Gas, Moment, Now};
use leptos::prelude::*;

use super::scale::Scale;
use crate::state::outlook;
use crate::words::now as words;

/// What a chart shows.
#[derive(Debug, Clone, PartialEq)]
pub struct Picture {
    scale: Scale,
    now: Now,
    forecast: Forecast,
    /// Another course to compare with, and its name on the chart.
    compared: Option<(Forecast, String)>,
    /// Gases: minute, PaCO2, and its error, mmHg.
    gases: Vec<(f64, f64, f64)>,
    /// Drawn dashed: nobody has confirmed it for half an hour.
    stale: bool,
    said: String,
}

/// Eight times in ten an analyser reads PaCO2 within this share of the truth: 1.28 standard deviations of
/// 3 %, assumed as long as the analyser's own is not known.
const GAS_ERROR: f64 = 1.28 * 0.03;

impl Picture {
    /// The picture of a forecast, with the case's gases.
    pub fn new(
        forecast: &Forecast,
        compared: Option<(Forecast, String)>,
        case: &Case,
        now: &Now,
        height: f64,
        stale: bool,
    ) -> Option<Self> {
        let (paco2, _) = outlook::at(forecast, 0.0)?;
        let from = forecast.minutes.first().copied()?.min(-10.0);
        let to = outlook::horizon(forecast);
        let gases: Vec<(f64, f64, f64)> = case
            .gases()
            .iter()
            .map(|(_, at, gas)| (at.minutes_since(now.wall), gas.pco2_mmhg, gas.pco2_mmhg * GAS_ERROR))
            .filter(|(minute, ..)| (from..=to).contains(minute))
            .collect();
        let shown = |forecast: &Forecast| -> Vec<f64> {
            let band = &forecast.paco2_mmhg;
            let all = forecast.minutes.iter().zip(band.p10.iter().zip(&band.p90));
            all.filter(|(minute, _)| **minute <= to).flat_map(|(_, (low, high))| [*low, *high]).collect()
        };
        let mut values = shown(forecast);
        if let Some((other, _)) = &compared {
            values.extend(shown(other));
        }
        values.extend(gases.iter().flat_map(|(_, mmhg, error)| [mmhg - error, mmhg + error]));
        Some(Self {
            scale: Scale::around(from, to, height, values.into_iter()),
            now: *now,
            said: words::picture(&paco2, forecast, now),
            forecast: forecast.clone(),
            compared,
            gases,
            stale,
        })
    }

    fn point(&self, minute: f64) -> Option<(Quantiles, Quantiles)> {
        outlook::at(&self.forecast, minute)
    }

    fn clock(&self, minute: f64) -> String {
        crate::words::values::clock(self.now.wall.plus_minutes(minute), &self.now)
    }

    /// The minutes that the table lists and the slider stops at.
    fn listed(&self) -> Vec<f64> {
        outlook::LISTED.into_iter().filter(|minute| *minute <= self.scale.to).collect()
    }
}

/// The chart with its slider and its table.
#[component]
pub fn Chart(
    /// What it shows; nothing where there is no forecast.
    #[prop(into)]
    picture: Signal<Option<Picture>>,
) -> impl IntoView {
    let at = RwSignal::new(0_usize);
    view! {
        <div class="chart" hidden=move || picture.with(Option::is_none)>
            {move || picture.get().map(|picture| picture::draw(&picture, at))}
            <reading::Slider picture at />
            <reading::Table picture />
        </div>
    }
}

/// The last gas of a case.
pub fn last_gas(case: &Case) -> Option<(Gas, Moment)> {
    case.gases().last().map(|(_, at, gas)| (*gas, *at))
}
