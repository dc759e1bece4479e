//! The drawing, as SVG text.

use super::{Mark, Picture};
use crate::parts::html::{tag, text};
use crate::parts::scale::{LEFT, PhScale, RIGHT, TOP, WIDTH};
use crate::words::now::{SOON_MIN, chart as words};
use crate::words::spoken::spoken;
use crate::words::values::number;

const RIPPLE: &str = "<defs><pattern id=\"ripple\" width=\"14\" height=\"7\" patternUnits=\"userSpaceOnUse\">\
    <path class=\"ripple\" d=\"M0 4q3.5 -3 7 0t7 0\"/></pattern></defs>";

/// The whole drawing; `at` is where the slider stands, 0 before it was moved.
pub fn svg(picture: &Picture, at: usize) -> String {
    let view_box = format!("0 0 {WIDTH} {}", picture.scale.height);
    let class = if picture.stale { "chart-picture stale" } else { "chart-picture" };
    let inner = [
        RIPPLE.to_owned(),
        scales(picture),
        water(picture),
        compared(picture).unwrap_or_default(),
        bracket(picture).unwrap_or_default(),
        now_line(picture).unwrap_or_default(),
        picture.gases.iter().map(|mark| buoy(picture, mark)).collect(),
        pointer(picture, at).unwrap_or_default(),
    ];
    let attributes = [
        ("class", class),
        ("viewBox", view_box.as_str()),
        ("role", "img"),
        ("aria-label", &spoken(&picture.said)),
    ];
    tag("svg", &attributes, &inner.concat())
}

fn path(class: &str, d: &str) -> String {
    tag("path", &[("class", class), ("d", d)], "")
}

fn line(class: &str, from: (f64, f64), to: (f64, f64)) -> String {
    path(class, &format!("M{:.1} {:.1}L{:.1} {:.1}", from.0, from.1, to.0, to.1))
}

/// Where a word hangs from its place.
#[derive(Clone, Copy)]
enum Anchor {
    Start,
    Middle,
    End,
}

fn word(class: &str, x: f64, y: f64, anchor: Anchor, words: &str) -> String {
    let anchor = match anchor {
        Anchor::Start => "start",
        Anchor::Middle => "middle",
        Anchor::End => "end",
    };
    let (x, y) = (format!("{x:.1}"), format!("{y:.1}"));
    tag("text", &[("class", class), ("x", &x), ("y", &y), ("text-anchor", anchor)], &text(words))
}

fn ring(x: f64, y: f64, radius: &str) -> String {
    let (x, y) = (format!("{x:.1}"), format!("{y:.1}"));
    tag("circle", &[("class", "ring"), ("cx", &x), ("cy", &y), ("r", radius)], "")
}

fn scales(picture: &Picture) -> String {
    let scale = picture.scale;
    let bottom = scale.bottom();
    let ph = PhScale::through(&ph_pairs(picture));
    let mut svg = line("axis", (LEFT, bottom), (RIGHT, bottom));
    for mark in scale.marks() {
        let y = scale.y(mark);
        svg += &line("grid", (LEFT, y), (RIGHT, y));
        svg += &word("tick", LEFT - 6.0, y + 4.0, Anchor::End, &number(mark, 0));
        if let Some(ph) = ph.filter(|_| mark > 0.0) {
            svg += &word("tick", RIGHT + 6.0, y + 4.0, Anchor::Start, &number(ph.at(mark), 2));
        }
    }
    for minute in scale.times(minute_of_day(picture)) {
        let x = scale.x(minute);
        svg += &line("axis", (x, bottom), (x, bottom + 4.0));
        svg += &word("tick", x, bottom + 16.0, Anchor::Middle, &picture.clock(minute));
    }
    svg += &word("tick", LEFT - 6.0, TOP - 14.0, Anchor::End, words::MMHG_AXIS);
    if ph.is_some() {
        svg += &word("tick", WIDTH - 2.0, TOP - 14.0, Anchor::End, words::PH_AXIS);
    }
    svg
}

fn minute_of_day(picture: &Picture) -> f64 {
    let minute = picture.now.wall.0.div_euclid(60_000) + i64::from(picture.now.utc_offset_min);
    minute.rem_euclid(24 * 60) as f64
}

/// PaCO2 with its pH, from the middle and the edges: the highest PaCO2 goes with the lowest pH.
fn ph_pairs(picture: &Picture) -> Vec<(f64, f64)> {
    let (paco2, ph) = (&picture.forecast.paco2_mmhg, &picture.forecast.ph);
    let mut pairs = vec![];
    for (x, y) in [(&paco2.p50, &ph.p50), (&paco2.p10, &ph.p90), (&paco2.p90, &ph.p10)] {
        pairs.extend(x.iter().copied().zip(y.iter().copied()));
    }
    pairs
}

fn water(picture: &Picture) -> String {
    let scale = picture.scale;
    let band = &picture.forecast.paco2_mmhg;
    let minutes = &picture.forecast.minutes;
    let area = scale.area(minutes, &band.p10, &band.p90);
    path("water", &area)
        + &tag("path", &[("class", "ripples"), ("fill", "url(#ripple)"), ("d", &area)], "")
        + &path("edge", &scale.line(minutes, &band.p10))
        + &path("edge", &scale.line(minutes, &band.p90))
        + &path("surface", &scale.line(minutes, &band.p50))
}

/// The other course: its middle dashed from now on, its name at its end.
fn compared(picture: &Picture) -> Option<String> {
    let scale = picture.scale;
    let other = picture.compared.as_ref()?;
    let minutes = &other.forecast.minutes;
    let values = &other.forecast.paco2_mmhg.p50;
    let first = minutes.iter().position(|minute| *minute >= 0.0)?;
    let last = minutes.iter().rposition(|minute| *minute <= scale.to)?;
    let end = scale.y(*values.get(last)?);
    Some(
        path("compared", &scale.line(minutes.get(first..)?, values.get(first..)?))
            + &word("name", RIGHT - 4.0, end - 6.0, Anchor::End, &other.name),
    )
}

/// When it comes within 2 mmHg of settled: a bracket under the clock times.
fn bracket(picture: &Picture) -> Option<String> {
    let scale = picture.scale;
    let within = &picture.forecast.minutes_to_within_2_mmhg;
    if within.p90 < SOON_MIN || !within.p10.is_finite() || within.p10 >= scale.to {
        return None;
    }
    let late = if within.p90.is_finite() { within.p90.min(scale.to) } else { scale.to };
    let (left, right) = (scale.x(within.p10.max(0.0)), scale.x(late));
    let y = scale.bottom() + 23.0;
    // The words stay on the paper at either end.
    let middle = f64::midpoint(left, right).max(LEFT + 40.0).min(RIGHT - 10.0);
    Some(
        path("bracket", &format!("M{left:.1} {y}v6H{right:.1}v-6"))
            + &word("name accent", middle, y + 19.0, Anchor::Middle, words::WITHIN),
    )
}

fn now_line(picture: &Picture) -> Option<String> {
    let scale = picture.scale;
    let (paco2, _) = picture.point(0.0)?;
    let (x, y) = (scale.x(0.0), scale.y(paco2.p50));
    Some(
        line("now-line", (x, TOP - 8.0), (x, scale.bottom()))
            + &word("name", x + 4.0, TOP, Anchor::Start, words::NOW)
            + &ring(x, y, "4.5"),
    )
}

/// A gas: a buoy at what it read, its error the mooring line, its figure beside it.
fn buoy(picture: &Picture, mark: &Mark) -> String {
    let scale = picture.scale;
    let (x, y) = (scale.x(mark.minute), scale.y(mark.mmhg));
    let (high, low) = (scale.y(mark.mmhg + mark.error_mmhg), scale.y(mark.mmhg - mark.error_mmhg));
    path("mooring", &format!("M{x:.1} {high:.1}V{low:.1}"))
        + &path("buoy", &format!("M{:.1} {:.1}h5l2 9h-9z", x - 2.5, y - 4.5))
        + &word("name", x - 7.0, y - 6.0, Anchor::End, &number(mark.mmhg, 0))
}

/// Where the slider stands, once it was moved.
fn pointer(picture: &Picture, at: usize) -> Option<String> {
    let scale = picture.scale;
    let minute = *picture.listed().get(at).filter(|_| at > 0)?;
    let (paco2, _) = picture.point(minute)?;
    let (x, y) = (scale.x(minute), scale.y(paco2.p50));
    Some(line("pointer", (x, TOP), (x, scale.bottom())) + &ring(x, y, "3.5"))
}

#[cfg(test)]
mod tests {
    use super::*;
    use bedside::{Band, Forecast, Quantiles, Settled};
    use case::{Case, Moment, Now};

    fn picture(within: (f64, f64)) -> Picture {
        let minutes = crate::state::outlook::minutes(None, &Now::at(Moment(0)));
        let flat = |value: f64| vec![value; minutes.len()];
        let band = Band { p10: flat(45.0), p50: flat(50.0), p90: flat(55.0) };
        let ph = Band { p10: flat(7.3), p50: flat(7.34), p90: flat(7.38) };
        let q = |p10, p50, p90| Quantiles { p10, p50, p90 };
        let forecast = Forecast {
            paco2_mmhg: band.clone(),
            ph: ph.clone(),
            hco3_mmol_l: band.clone(),
            gas_would_read_paco2_mmhg: band,
            gas_would_read_ph: ph,
            settled: Settled { paco2_mmhg: q(45.0, 50.0, 55.0), ph: q(7.3, 7.34, 7.38) },
            minutes_to_within_2_mmhg: q(within.0, within.0, within.1),
            minutes_to_90_percent: q(1.0, 2.0, 3.0),
            minutes,
        };
        let now = Now::at(Moment(1_772_486_400_000));
        Picture::new(&forecast, None, &Case::new("x"), &now, 300.0, false).expect("has a now")
    }

    #[test]
    fn it_has_a_name_a_band_and_no_place_that_is_no_number() {
        let svg = svg(&picture((30.0, 60.0)), 3);
        assert!(svg.contains("role=\"img\" aria-label=\"At 21:20 PaCO2 about 50, 8 times in 10"));
        assert!(svg.contains("class=\"water\"") && svg.contains("class=\"pointer\""));
        assert!(!svg.contains("NaN") && !svg.contains("inf"));
        assert!(!svg.contains("style="), "the policy forbids style attributes");
    }

    #[test]
    fn the_bracket_is_there_only_while_there_is_a_way_to_go() {
        assert!(svg(&picture((30.0, 60.0)), 0).contains("bracket"));
        assert!(!svg(&picture((0.0, 0.0)), 0).contains("bracket"));
        assert!(!svg(&picture((f64::NAN, f64::NAN)), 0).contains("bracket"));
        assert!(svg(&picture((30.0, f64::INFINITY)), 0).contains("bracket"));
    }
}
