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
    pub fn around(from: f64, to: f64, height: f64, values: &[f64]) -> Self {
        let (low, high) = values
            .iter()
            .filter(|value| value.is_finite())
            .fold((f64::INFINITY, f64::NEG_INFINITY), |(low, high), v| (low.min(*v), high.max(*v)));
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
        stepped(first, every, self.high)
    }

    /// Minutes of the clock times that are labelled: at full half hours (or hours), counted from now, whose
    /// local time is `minute_of_day`.
    pub fn times(&self, minute_of_day: f64) -> Vec<f64> {
        let every = if self.to - self.from > 200.0 { 60.0 } else { 30.0 };
        let first = ((self.from + minute_of_day) / every).ceil() * every - minute_of_day;
        stepped(first, every, self.to)
    }

    /// A line through the points inside the plot.
    pub fn line(&self, minutes: &[f64], values: &[f64]) -> String {
        let mut path = String::new();
        for (minute, mmhg) in minutes.iter().zip(values) {
            self.add_point(&mut path, *minute, *mmhg);
        }
        path
    }

    /// The area between two lines over the same minutes.
    pub fn area(&self, minutes: &[f64], low: &[f64], high: &[f64]) -> String {
        let mut path = self.line(minutes, high);
        for (minute, mmhg) in minutes.iter().zip(low).rev() {
            self.add_point(&mut path, *minute, *mmhg);
        }
        if !path.is_empty() {
            path.push('Z');
        }
        path
    }

    fn add_point(&self, path: &mut String, minute: f64, mmhg: f64) {
        if minute >= self.from && minute <= self.to && mmhg.is_finite() {
            let letter = if path.is_empty() { 'M' } else { 'L' };
            path.push_str(&format!("{letter}{:.1} {:.1}", self.x(minute), self.y(mmhg)));
        }
    }
}

fn stepped(first: f64, every: f64, last: f64) -> Vec<f64> {
    let mut all = vec![];
    let mut next = first;
    while next <= last {
        all.push(next);
        next += every;
    }
    all
}

/// pH over PaCO2 at this patient's own metabolic state: a straight line over ln PaCO2 through the forecast's
/// pairs. It only labels the right scale.
#[derive(Debug, Clone, Copy)]
pub struct PhScale {
    mean_ln: f64,
    mean_ph: f64,
    slope: f64,
}

impl PhScale {
    /// The line through `pairs` of PaCO2 and pH; `None` where they lie too close to tell.
    pub fn through(pairs: &[(f64, f64)]) -> Option<Self> {
        const LEAST_SPREAD: f64 = 0.03;
        let points: Vec<(f64, f64)> = pairs
            .iter()
            .filter(|(mmhg, ph)| *mmhg > 0.0 && ph.is_finite())
            .map(|(mmhg, ph)| (libm::log(*mmhg), *ph))
            .collect();
        let count = points.len() as f64;
        let (sum_ln, sum_ph) = points.iter().fold((0.0, 0.0), |(x, y), p| (x + p.0, y + p.1));
        let (mean_ln, mean_ph) = (sum_ln / count, sum_ph / count);
        let (xx, xy) = points.iter().fold((0.0, 0.0), |(xx, xy), p| {
            (xx + (p.0 - mean_ln) * (p.0 - mean_ln), xy + (p.0 - mean_ln) * (p.1 - mean_ph))
        });
        let slope = xy / xx;
        let told_apart = xx / count > LEAST_SPREAD * LEAST_SPREAD && slope < 0.0;
        told_apart.then_some(Self { mean_ln, mean_ph, slope })
    }

    /// pH at a PaCO2.
    pub fn at(&self, mmhg: f64) -> f64 {
        self.mean_ph + self.slope * (libm::log(mmhg) - self.mean_ln)
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    fn scale() -> Scale {
        Scale::around(-10.0, 110.0, 300.0, &[71.0, 45.0])
    }

    #[test]
    fn the_scale_holds_every_value_in_tens() {
        let scale = scale();
        assert_eq!((scale.low, scale.high), (40.0, 80.0));
        assert_eq!(scale.marks(), [40.0, 50.0, 60.0, 70.0, 80.0]);
        assert_eq!(scale.y(40.0), scale.bottom());
        assert_eq!(scale.y(80.0), TOP);
        assert_eq!((scale.x(-10.0), scale.x(110.0)), (LEFT, RIGHT));
        let one = Scale::around(0.0, 90.0, 300.0, &[50.0]);
        assert!(one.high - one.low >= 30.0 && one.low <= 47.0 && one.high >= 53.0, "{one:?}");
        let none = Scale::around(0.0, 90.0, 300.0, &[f64::NAN]);
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
        let path = scale.line(&[-30.0, 0.0, 10.0, 20.0], &[60.0, 60.0, f64::NAN, 50.0]);
        assert_eq!(path.matches(['M', 'L']).count(), 2);
        assert_eq!(scale.area(&[], &[], &[]), "");
    }

    #[test]
    fn the_ph_scale_follows_the_pairs() {
        let pairs = [(71.0, 7.21), (57.0, 7.28), (50.0, 7.33), (45.0, 7.36)];
        let ph = PhScale::through(&pairs).expect("is a spread");
        assert!((ph.at(71.0) - 7.21).abs() < 0.01);
        assert!((ph.at(50.0) - 7.325).abs() < 0.01);
        assert!(PhScale::through(&[(50.0, 7.33), (50.1, 7.33)]).is_none());
        assert!(PhScale::through(&[]).is_none());
    }
}
