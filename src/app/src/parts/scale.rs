//! The chart's scales and paths: from minutes and mmHg to places on the paper.

/// Width of the drawing, its own units.
pub const WIDTH: f64 = 360.0;
/// Left edge of the plot.
pub const LEFT: f64 = 34.0;
/// Right edge of the plot.
pub const RIGHT: f64 = 322.0;
/// Upper edge of the plot.
pub const TOP: f64 = 26.0;
/// Room under the plot for clock times and the bracket.
pub const UNDER: f64 = 46.0;

/// Both scales of one chart.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Scale {
    /// First minute.
    pub from: f64,
    /// Last minute.
    pub to: f64,
    /// Lowest PaCO2, a multiple of ten.
    pub low: f64,
    /// Highest PaCO2, a multiple of ten.
    pub high: f64,
    /// Height of the drawing.
    pub height: f64,
}

impl Scale {
    /// Scales that hold every one of `values` with some air, in tens, at least thirty of them.
    pub fn around(from: f64, to: f64, height: f64, values: impl Iterator<Item = f64>) -> Self {
        let (low, high) = values
            .filter(|value| value.is_finite())
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(v), high.max(v)));
        let (low, high) = if low.is_finite() { (low, high) } else { (30.0, 60.0) };
        let mut low = ((low - 3.0) / 10.0).floor() * 10.0;
        let mut high = ((high + 3.0) / 10.0).ceil() * 10.0;
        if high - low < 30.0 {
            high += 10.0;
        }
        if high - low < 30.0 {
            low -= 10.0;
        }
        Self { from, to, low: low.max(0.0), high, height }
    }

    /// Lower edge of the plot.
    pub fn bottom(&self) -> f64 {
        self.height - UNDER
    }

    /// Place of a minute.
    pub fn x(&self, minute: f64) -> f64 {
        LEFT + (minute - self.from) / (self.to - self.from) * (RIGHT - LEFT)
    }

    /// Place of a PaCO2.
    pub fn y(&self, mmhg: f64) -> f64 {
        let share = (mmhg - self.low) / (self.high - self.low);
        self.bottom() - share * (self.bottom() - TOP)
    }

    /// The PaCO2 values that are labelled: every ten, every twenty on a tall scale.
    pub fn marks(&self) -> Vec<f64> {
        let every = if self.high - self.low > 60.0 { 20.0 } else { 10.0 };
        let first = (self.low / every).ceil() * every;
        (0..).map(|n: u32| first + f64::from(n) * every).take_while(|mark| *mark <= self.high).collect()
    }

    /// Minutes of the clock times that are labelled: at full half hours (or hours), counted from now, whose
    /// local time is `minute_of_day`.
    pub fn times(&self, minute_of_day: f64) -> Vec<f64> {
        let every = if self.to - self.from > 200.0 { 60.0 } else { 30.0 };
        let first = ((self.from + minute_of_day) / every).ceil() * every - minute_of_day;
        (0..).map(|n: u32| first + f64::from(n) * every).take_while(|minute| *minute <= self.to).collect()
    }

    /// A line through the points inside the plot.
    pub fn line(&self, points: impl Iterator<Item = (f64, f64)>) -> String {
        let mut path = String::new();
        for (minute, mmhg) in points.filter(|(m, v)| *m >= self.from && *m <= self.to && v.is_finite()) {
            let letter = if path.is_empty() { 'M' } else { 'L' };
            path.push_str(&format!("{letter}{:.1} {:.1}", self.x(minute), self.y(mmhg)));
        }
        path
    }

    /// The area between two lines over the same minutes.
    pub fn area(&self, minutes: &[f64], low: &[f64], high: &[f64]) -> String {
        let upper = minutes.iter().copied().zip(high.iter().copied());
        let lower = minutes.iter().copied().zip(low.iter().copied()).rev();
        let path = self.line(upper.chain(lower));
        if path.is_empty() { path } else { path + "Z" }
    }
}

/// pH as a function of PaCO2 at this patient's own metabolic state: a straight line over ln PaCO2 through
/// the forecast's pairs. It only labels the right scale; `None` where the pairs lie too close to tell.
pub fn ph_scale(pairs: &[(f64, f64)]) -> Option<impl Fn(f64) -> f64 + use<>> {
    const LEAST_SPREAD: f64 = 0.03;
    let points: Vec<(f64, f64)> = pairs
        .iter()
        .filter(|(mmhg, ph)| *mmhg > 0.0 && ph.is_finite())
        .map(|(mmhg, ph)| (libm::log(*mmhg), *ph))
        .collect();
    let count = points.len() as f64;
    let (sum_x, sum_y) = points.iter().fold((0.0, 0.0), |(x, y), p| (x + p.0, y + p.1));
    let (mean_x, mean_y) = (sum_x / count, sum_y / count);
    let (sxx, sxy) = points.iter().fold((0.0, 0.0), |(xx, xy), p| {
        (xx + (p.0 - mean_x) * (p.0 - mean_x), xy + (p.0 - mean_x) * (p.1 - mean_y))
    });
    let slope = sxy / sxx;
    let told_apart = sxx / count > LEAST_SPREAD * LEAST_SPREAD && slope < 0.0;
    told_apart.then_some(move |mmhg: f64| mean_y + slope * (libm::log(mmhg) - mean_x))
}

#[cfg(test)]
mod tests {
    use super::*;

    fn scale() -> Scale {
        Scale::around(-10.0, 110.0, 300.0, [71.0, 45.0].into_iter())
    }

    #[test]
    fn the_scale_holds_every_value_in_tens() {
        let scale = scale();
        assert_eq!((scale.low, scale.high), (40.0, 80.0));
        assert_eq!(scale.marks(), [40.0, 50.0, 60.0, 70.0, 80.0]);
        assert_eq!(scale.y(40.0), scale.bottom());
        assert_eq!(scale.y(80.0), TOP);
        assert_eq!((scale.x(-10.0), scale.x(110.0)), (LEFT, RIGHT));
        let one = Scale::around(0.0, 90.0, 300.0, [50.0].into_iter());
        assert!(one.high - one.low >= 30.0 && one.low <= 47.0 && one.high >= 53.0, "{one:?}");
        let none = Scale::around(0.0, 90.0, 300.0, [f64::NAN].into_iter());
        assert!(none.low.is_finite() && none.high > none.low);
    }

    #[test]
    fn clock_times_stand_at_half_hours() {
        // Now is 21:20.
        assert_eq!(scale().times(1280.0), [10.0, 40.0, 70.0, 100.0]);
    }

    #[test]
    fn a_line_leaves_out_what_is_outside_and_what_is_no_number() {
        let scale = scale();
        let path = scale.line([(-30.0, 60.0), (0.0, 60.0), (10.0, f64::NAN), (20.0, 50.0)].into_iter());
        assert_eq!(path.matches(['M', 'L']).count(), 2);
        assert_eq!(scale.area(&[], &[], &[]), "");
    }

    #[test]
    fn the_ph_scale_follows_the_pairs() {
        let pairs = [(71.0, 7.21), (57.0, 7.28), (50.0, 7.33), (45.0, 7.36)];
        let ph = ph_scale(&pairs).expect("is a spread");
        assert!((ph(71.0) - 7.21).abs() < 0.01);
        assert!((ph(50.0) - 7.325).abs() < 0.01);
        assert!(ph_scale(&[(50.0, 7.33), (50.1, 7.33)]).is_none());
        assert!(ph_scale(&[]).is_none());
    }
}
