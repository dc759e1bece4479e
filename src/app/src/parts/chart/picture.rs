//! The drawing.

use leptos::prelude::*;

use super::Picture;
use crate::parts::scale::{LEFT, RIGHT, TOP, WIDTH, ph_scale};
use crate::words::now::chart as words;
use crate::words::spoken::spoken;
use crate::words::values::number;

/// The whole drawing.
pub fn draw(picture: &Picture, at: RwSignal<usize>) -> impl IntoView + use<> {
    let scale = picture.scale;
    let view_box = format!("0 0 {WIDTH} {}", scale.height);
    let kind = if picture.stale { "chart-picture stale" } else { "chart-picture" };
    view! {
        <svg class=kind viewBox=view_box role="img" aria-label=spoken(&picture.said)>
            <defs>
                <pattern id="ripple" width="14" height="7" patternUnits="userSpaceOnUse">
                    <path class="ripple" d="M0 4q3.5 -3 7 0t7 0" />
                </pattern>
            </defs>
            {scales(picture)}
            {water(picture)}
            {compared(picture)}
            {bracket(picture)}
            {now_line(picture)}
            {gases(picture)}
            {pointer(picture, at)}
        </svg>
    }
}

fn scales(picture: &Picture) -> impl IntoView + use<> {
    let scale = picture.scale;
    let bottom = scale.bottom();
    let ph = ph_scale(&ph_pairs(picture));
    let has_ph = ph.is_some();
    let marks = scale.marks().into_iter().map(move |mark| {
        let y = scale.y(mark);
        let ph = ph.as_ref().filter(|_| mark > 0.0).map(|ph| number(ph(mark), 2));
        view! {
            <line class="grid" x1=LEFT x2=RIGHT y1=y y2=y />
            <text class="tick" x=LEFT - 6.0 y=y + 4.0 text-anchor="end">{number(mark, 0)}</text>
            <text class="tick" x=RIGHT + 6.0 y=y + 4.0>{ph}</text>
        }
    });
    let minute_of_day = (picture.now.wall.0.div_euclid(60_000) + i64::from(picture.now.utc_offset_min))
        .rem_euclid(24 * 60) as f64;
    let times = scale.times(minute_of_day).into_iter().map(|minute| {
        let x = scale.x(minute);
        view! {
            <line class="axis" x1=x x2=x y1=bottom y2=bottom + 4.0 />
            <text class="tick" x=x y=bottom + 16.0 text-anchor="middle">{picture.clock(minute)}</text>
        }
    });
    view! {
        {marks.collect_view()}
        <line class="axis" x1=LEFT x2=RIGHT y1=bottom y2=bottom />
        {times.collect_view()}
        <text class="tick" x=LEFT - 6.0 y=TOP - 14.0 text-anchor="end">{words::MMHG_AXIS}</text>
        {has_ph.then(|| view! {
            <text class="tick" x=WIDTH - 2.0 y=TOP - 14.0 text-anchor="end">{words::PH_AXIS}</text>
        })}
    }
}

/// PaCO2 with its pH, from the middle and the edges: the highest PaCO2 goes with the lowest pH.
fn ph_pairs(picture: &Picture) -> Vec<(f64, f64)> {
    let (paco2, ph) = (&picture.forecast.paco2_mmhg, &picture.forecast.ph);
    let pairs = |x: &[f64], y: &[f64]| x.iter().copied().zip(y.iter().copied()).collect::<Vec<_>>();
    [pairs(&paco2.p50, &ph.p50), pairs(&paco2.p10, &ph.p90), pairs(&paco2.p90, &ph.p10)].concat()
}

fn water(picture: &Picture) -> impl IntoView + use<> {
    let scale = picture.scale;
    let band = &picture.forecast.paco2_mmhg;
    let minutes = &picture.forecast.minutes;
    let line = |values: &[f64]| scale.line(minutes.iter().copied().zip(values.iter().copied()));
    let area = scale.area(minutes, &band.p10, &band.p90);
    view! {
        <path class="water" d=area.clone() />
        <path class="ripples" d=area fill="url(#ripple)" />
        <path class="edge" d=line(&band.p10) />
        <path class="edge" d=line(&band.p90) />
        <path class="surface" d=line(&band.p50) />
    }
}

/// The other course: its middle dashed, its name at its end.
fn compared(picture: &Picture) -> Option<impl IntoView + use<>> {
    let scale = picture.scale;
    let (other, name) = picture.compared.clone()?;
    let points = other.minutes.iter().copied().zip(other.paco2_mmhg.p50.iter().copied());
    let future = points.filter(|(minute, _)| *minute >= 0.0 && *minute <= scale.to);
    let end = future.clone().last()?;
    Some(view! {
        <path class="compared" d=scale.line(future) />
        <text class="name" x=RIGHT - 4.0 y=scale.y(end.1) - 6.0 text-anchor="end">{name}</text>
    })
}

/// When it comes within 2 mmHg of settled: a bracket under the clock times.
fn bracket(picture: &Picture) -> Option<impl IntoView + use<>> {
    let scale = picture.scale;
    let within = &picture.forecast.minutes_to_within_2_mmhg;
    let late = if within.p90.is_finite() { within.p90.min(scale.to) } else { scale.to };
    if within.p90 < 1.0 || !within.p10.is_finite() || within.p10 >= scale.to {
        return None;
    }
    let (left, right) = (scale.x(within.p10.max(0.0)), scale.x(late));
    let y = scale.bottom() + 24.0;
    // The words stay on the paper at either end.
    let middle = ((left + right) / 2.0).clamp(LEFT + 40.0, RIGHT - 10.0);
    let path = format!("M{left:.1} {y}v6H{right:.1}v-6");
    Some(view! {
        <path class="bracket" d=path />
        <text class="name accent" x=middle y=y + 19.0 text-anchor="middle">{words::WITHIN}</text>
    })
}

fn now_line(picture: &Picture) -> Option<impl IntoView + use<>> {
    let scale = picture.scale;
    let (paco2, _) = picture.point(0.0)?;
    let (x, y) = (scale.x(0.0), scale.y(paco2.p50));
    Some(view! {
        <line class="now-line" x1=x x2=x y1=TOP - 8.0 y2=scale.bottom() />
        <text class="name" x=x + 4.0 y=TOP>{words::NOW}</text>
        <circle class="ring" cx=x cy=y r="4.5" />
    })
}

/// A gas: a buoy at what it read, its error the mooring line.
fn gases(picture: &Picture) -> impl IntoView + use<> {
    let scale = picture.scale;
    let buoys = picture.gases.iter().map(|(minute, mmhg, error)| {
        let (x, y) = (scale.x(*minute), scale.y(*mmhg));
        let mooring = format!("M{x:.1} {:.1}V{:.1}", scale.y(mmhg + error), scale.y(mmhg - error));
        let buoy = format!("M{:.1} {:.1}h5l2 9h-9z", x - 2.5, y - 4.5);
        view! {
            <path class="mooring" d=mooring />
            <path class="buoy" d=buoy />
            <text class="name" x=x + 8.0 y=y - 6.0>{number(*mmhg, 0)}</text>
        }
    });
    buoys.collect_view()
}

/// Where the slider stands, once it was moved.
fn pointer(picture: &Picture, at: RwSignal<usize>) -> impl IntoView + use<> {
    let scale = picture.scale;
    let listed = picture.listed();
    let points: Vec<Option<(f64, f64)>> =
        listed.iter().map(|m| picture.point(*m).map(|(q, _)| (scale.x(*m), scale.y(q.p50)))).collect();
    move || {
        let (x, y) = points.get(at.get()).copied().flatten().filter(|_| at.get() > 0)?;
        Some(view! {
            <line class="pointer" x1=x x2=x y1=TOP y2=scale.bottom() />
            <circle class="ring" cx=x cy=y r="3.5" />
        })
    }
}
