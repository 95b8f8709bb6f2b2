//! Crossings, extremes and values of one history, between output times by
//! straight lines. Not-a-number counts as "no value": nothing is crossed
//! there, and nothing panics.

/// A crossing must last this long to count, s \[choice\]: three output times
/// at the usual interval.
const PERSISTENCE: f64 = 3.0;

/// Two spells closer than this are one, s \[choice\]: shorter than the pulses
/// of a starved fire (100-200 s), longer than a flicker about a limit.
const APART: f64 = 20.0;

/// Which side of a threshold is looked for.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub(super) enum Side {
    /// At or above it.
    Above,
    /// At or below it.
    Below,
}

/// A stretch of time on the looked-for side of a threshold.
#[derive(Debug, Clone, Copy, PartialEq)]
pub(super) struct Spell {
    /// First time, s.
    pub start: f64,
    /// Last time, s; `None` when it lasts to the end of the record.
    pub end: Option<f64>,
    /// How many separate spells it stands for.
    pub times: usize,
}

/// One history.
#[derive(Debug, Clone, Copy)]
pub(super) struct History<'a> {
    time: &'a [f64],
    values: &'a [f64],
}

impl<'a> History<'a> {
    /// Pairs times with values; the shorter of the two counts.
    pub fn new(time: &'a [f64], values: &'a [f64]) -> Self {
        let length = time.len().min(values.len());
        Self {
            time: &time[..length],
            values: &values[..length],
        }
    }

    /// Points that have a value.
    fn points(self) -> impl Iterator<Item = (f64, f64)> + 'a {
        self.time
            .iter()
            .copied()
            .zip(self.values.iter().copied())
            .filter(|(time, value)| time.is_finite() && value.is_finite())
    }

    /// Value at a time, not-a-number outside the record. At a time that
    /// stands twice in the record (before and after an event) the first counts.
    pub fn at(self, time: f64) -> f64 {
        let mut before: Option<(f64, f64)> = None;
        for (t, value) in self.points() {
            if t >= time {
                return match before {
                    Some(earlier) if t > time => between(earlier, (t, value), time),
                    None if t > time => f64::NAN,
                    _ => value,
                };
            }
            before = Some((t, value));
        }
        f64::NAN
    }

    /// Time and value of the largest value from `from` to `to`, the first of
    /// equals.
    pub fn largest(self, from: f64, to: f64) -> Option<(f64, f64)> {
        self.points()
            .filter(|&(time, _)| time >= from && time <= to)
            .reduce(|best, point| if point.1 > best.1 { point } else { best })
    }

    /// Time and value of the smallest value from `from` to `to`, the first of
    /// equals.
    pub fn smallest(self, from: f64, to: f64) -> Option<(f64, f64)> {
        self.points()
            .filter(|&(time, _)| time >= from && time <= to)
            .reduce(|best, point| if point.1 < best.1 { point } else { best })
    }

    /// Mean over the points from `from` to `to`, by straight lines.
    pub fn mean(self, from: f64, to: f64) -> f64 {
        let (mut area, mut length) = (0.0, 0.0);
        let mut before: Option<(f64, f64)> = None;
        for (time, value) in self
            .points()
            .filter(|&(time, _)| time >= from && time <= to)
        {
            if let Some((t, v)) = before {
                area += 0.5 * (v + value) * (time - t);
                length += time - t;
            }
            before = Some((time, value));
        }
        if length > 0.0 {
            area / length
        } else {
            before.map_or(f64::NAN, |(_, value)| value)
        }
    }

    /// All spells on one side of a threshold, flicker taken out.
    pub fn spells(self, side: Side, threshold: f64) -> Vec<Spell> {
        let spells = joined(self.raw_spells(side, threshold), PERSISTENCE);
        let last = self.points().last().map_or(0.0, |(time, _)| time);
        let lasting = spells
            .into_iter()
            .filter(|spell| spell.end.unwrap_or(last) - spell.start >= PERSISTENCE)
            .collect();
        joined(lasting, APART)
    }

    /// All spells as they are, times by straight lines.
    fn raw_spells(self, side: Side, threshold: f64) -> Vec<Spell> {
        let inside = |value: f64| match side {
            Side::Above => value >= threshold,
            Side::Below => value <= threshold,
        };
        let mut spells = Vec::new();
        let mut open: Option<f64> = None;
        let mut before: Option<(f64, f64)> = None;
        for (time, value) in self.points() {
            let crossed =
                before.map_or(time, |earlier| crossing(earlier, (time, value), threshold));
            match (open, inside(value)) {
                (None, true) => open = Some(crossed),
                (Some(start), false) => {
                    spells.push(Spell {
                        start,
                        end: Some(crossed),
                        times: 1,
                    });
                    open = None;
                }
                _ => {}
            }
            before = Some((time, value));
        }
        if let Some(start) = open {
            spells.push(Spell {
                start,
                end: None,
                times: 1,
            });
        }
        spells
    }
}

/// Value on the straight line between two points.
fn between(a: (f64, f64), b: (f64, f64), time: f64) -> f64 {
    if b.0 > a.0 {
        a.1 + (b.1 - a.1) * (time - a.0) / (b.0 - a.0)
    } else {
        b.1
    }
}

/// Time at which the straight line between two points meets the threshold.
fn crossing(a: (f64, f64), b: (f64, f64), threshold: f64) -> f64 {
    let rise = b.1 - a.1;
    if rise == 0.0 {
        return b.0;
    }
    a.0 + (b.0 - a.0) * ((threshold - a.1) / rise).clamp(0.0, 1.0)
}

/// Joins spells that are closer together than `apart`.
fn joined(spells: Vec<Spell>, apart: f64) -> Vec<Spell> {
    let mut out: Vec<Spell> = Vec::new();
    for spell in spells {
        match out.last_mut() {
            Some(last) if last.end.is_some_and(|end| spell.start - end < apart) => {
                last.end = spell.end;
            }
            _ => out.push(spell),
        }
    }
    out
}

#[cfg(test)]
mod tests {
    use super::*;

    const TIME: [f64; 8] = [0.0, 10.0, 20.0, 30.0, 40.0, 50.0, 100.0, 110.0];

    fn history(values: &[f64]) -> History<'_> {
        History::new(&TIME, values)
    }

    #[test]
    fn verify_crossing_times_lie_on_straight_lines() {
        let values = [0.0, 10.0, 20.0, 20.0, 0.0, 0.0, 0.0, 0.0];
        let spells = history(&values).spells(Side::Above, 15.0);
        assert_eq!(spells.len(), 1);
        assert!((spells[0].start - 15.0).abs() < 1e-12);
        assert_eq!(spells[0].end, Some(32.5));
    }

    #[test]
    fn verify_flicker_is_one_spell_and_a_later_return_a_new_one() {
        let values = [9.0, 9.0, 0.0, 9.0, 9.0, 0.0, 9.0, 9.0];
        let spells = history(&values).spells(Side::Above, 5.0);
        assert_eq!(spells.len(), 2);
        assert_eq!(spells[1].end, None);
    }

    #[test]
    fn verify_short_spells_do_not_count() {
        let time = [0.0, 1.0, 2.0, 3.0, 4.0];
        let values = [0.0, 9.0, 0.0, 0.0, 0.0];
        assert!(
            History::new(&time, &values)
                .spells(Side::Above, 5.0)
                .is_empty()
        );
    }

    #[test]
    fn verify_not_a_number_is_no_value() {
        let values = [f64::NAN, 0.0, f64::NAN, 9.0, 9.0, 9.0, f64::NAN, f64::NAN];
        let spells = history(&values).spells(Side::Above, 4.5);
        assert_eq!(spells.len(), 1);
        assert!((spells[0].start - 20.0).abs() < 1e-12);
        assert!(history(&[f64::NAN; 8]).at(20.0).is_nan());
        assert!(History::new(&[], &[]).largest(0.0, 1.0).is_none());
    }

    #[test]
    fn verify_values_means_and_extremes() {
        let values = [0.0, 10.0, 20.0, 20.0, 0.0, 0.0, 0.0, 0.0];
        let history = history(&values);
        assert!((history.at(5.0) - 5.0).abs() < 1e-12);
        assert!(history.at(111.0).is_nan());
        assert_eq!(history.largest(0.0, 200.0), Some((20.0, 20.0)));
        assert_eq!(history.smallest(15.0, 200.0), Some((40.0, 0.0)));
        assert!((history.mean(0.0, 20.0) - 10.0).abs() < 1e-12);
    }
}
