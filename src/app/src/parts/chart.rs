//! The chart: the band as water, the middle as its surface, gases as moored buoys, now as a dashed line.

mod picture;
mod reading;

use bedside::{Forecast, PACO2_READ_WITHIN, Quantiles};
use case::{Case, Now};
use leptos::prelude::*;

use super::scale::Scale;
use crate::state::app::App;
use crate::state::outlook;
use crate::words::now as words;
use crate::words::values;

/// What a chart shows.
#[derive(Debug, Clone, PartialEq)]
pub struct Picture {
    scale: Scale,
    now: Now,
    forecast: Forecast,
    compared: Option<Compared>,
    gases: Vec<Mark>,
    stale: bool,
    said: String,
}

/// Another course to compare with.
#[derive(Debug, Clone, PartialEq)]
pub struct Compared {
    /// The other course.
    pub forecast: Forecast,
    /// Its name on the chart.
    pub name: String,
}

/// A gas on the chart.
#[derive(Debug, Clone, Copy, PartialEq)]
struct Mark {
    minute: f64,
    mmhg: f64,
    error_mmhg: f64,
}

/// The chart begins at least so many minutes before now.
const LEAST_BACK_MIN: f64 = 10.0;

impl Picture {
    /// The picture of a forecast, with the case's gases. `stale` draws it dashed: nobody has confirmed it.
    pub fn new(
        forecast: &Forecast,
        compared: Option<Compared>,
        case: &Case,
        now: &Now,
        height: f64,
        stale: bool,
    ) -> Option<Self> {
        let (paco2, _) = outlook::at(forecast, 0.0)?;
        let from = forecast.minutes.first().copied()?.min(-LEAST_BACK_MIN);
        let to = outlook::horizon(forecast);
        let mut values = vec![];
        shown(forecast, to, &mut values);
        if let Some(compared) = &compared {
            shown(&compared.forecast, to, &mut values);
        }
        let mut gases = vec![];
        for (_, at, gas) in case.gases() {
            let minute = at.minutes_since(now.wall);
            if minute >= from && minute <= to {
                let error_mmhg = gas.pco2_mmhg * PACO2_READ_WITHIN;
                values.extend([gas.pco2_mmhg - error_mmhg, gas.pco2_mmhg + error_mmhg]);
                gases.push(Mark { minute, mmhg: gas.pco2_mmhg, error_mmhg });
            }
        }
        Some(Self {
            scale: Scale::around(from, to, height, &values),
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
        values::clock(self.now.wall.plus_minutes(minute), &self.now)
    }

    /// The minutes that the table lists and the slider stops at.
    fn listed(&self) -> Vec<f64> {
        outlook::LISTED.into_iter().filter(|minute| *minute <= self.scale.to).collect()
    }
}

/// The edges of a band up to the horizon.
fn shown(forecast: &Forecast, to: f64, values: &mut Vec<f64>) {
    let band = &forecast.paco2_mmhg;
    for (index, minute) in forecast.minutes.iter().enumerate() {
        if *minute <= to
            && let Some(at) = band.at(index)
        {
            values.extend([at.p10, at.p90]);
        }
    }
}

/// Where a chart comes from; nothing where there is no forecast.
pub type Source = fn(App) -> Option<Picture>;

/// The drawing. `at` is where the slider stands.
pub fn drawing(app: App, picture: Source, at: RwSignal<usize>) -> AnyView {
    let drawn = move || picture(app).map(|picture| picture::svg(&picture, at.get())).unwrap_or_default();
    view! { <div class="chart" inner_html=move || drawn()></div> }.into_any()
}

/// Its slider and its table.
pub fn reading(app: App, picture: Source, at: RwSignal<usize>) -> AnyView {
    view! {
        <div class="chart-reading" hidden=move || picture(app).is_none()>
            {reading::slider(app, picture, at)}
            {reading::table(app, picture)}
        </div>
    }
    .into_any()
}
