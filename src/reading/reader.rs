//! What every reading needs: the record with its plan, the fire as one, and
//! the actions that cut the run into stages.

use std::borrow::Cow;

use super::history::{History, Side, Spell};
use super::moment::{Band, Kind, Moment, Number, Since, Weight, spoken};
pub(super) use super::played::Played;
use super::played::played;
use crate::plan::{OpeningKind, Plan, Space};
use crate::record::{Dimension, Quantity, Record, Subject};

/// Earliest and latest share of the time since an opening: -60 % and +130 %,
/// the 5-95 % band of 300 sampled runs of one starved bedroom fire (flame
/// re-spread, embers, limits of burning, growth, house and plume varied).
const BAND: [f64; 2] = [0.4, 2.3];

/// Free rates below this say nothing about shortage of air, W \[choice\].
const SMALLEST_FREE_RATE: f64 = 5e3;

/// A band that is cut to less than this says nothing, s \[choice\].
const SHORTEST_BAND: f64 = 1.0;

/// The record with its plan, prepared for reading.
pub(super) struct Reader<'a> {
    pub record: &'a Record,
    pub plan: &'a Plan,
    /// Changes that began within the record, by time.
    pub played: Vec<Played<'a>>,
    /// Last time of the record, s.
    pub end: f64,
    /// Heat burned everywhere, W, at the output times.
    burned: Vec<f64>,
    /// Free rate of all items together, W, at the output times.
    free: Vec<f64>,
    /// Heat burned over free rate; not-a-number where nothing would burn.
    ratio: Vec<f64>,
    /// The ratio, or half of what the incoming air could burn over the free
    /// rate where that is more: a fire that has air enough again is no longer
    /// short of it, however small it still is.
    air_ratio: Vec<f64>,
}

impl<'a> Reader<'a> {
    /// Prepares a record.
    pub fn new(record: &'a Record, plan: &'a Plan) -> Self {
        let end = record
            .time
            .iter()
            .copied()
            .filter(|time| time.is_finite())
            .fold(0.0, f64::max);
        let free = total(record, plan, Quantity::FreeRate);
        let house = record.get(Subject::House, Quantity::Burned);
        let burned = if house.is_empty() {
            total(record, plan, Quantity::Burned)
        } else {
            house.to_vec()
        };
        let ratio = burned
            .iter()
            .zip(&free)
            .map(|(burned, free)| {
                if *free >= SMALLEST_FREE_RATE {
                    burned / free
                } else {
                    f64::NAN
                }
            })
            .collect::<Vec<f64>>();
        let air = record.get(Subject::House, Quantity::AirCouldBurn);
        let air_ratio = with_air(&ratio, &free, air);
        Self {
            record,
            plan,
            played: played(record, plan, end),
            end,
            burned,
            free,
            ratio,
            air_ratio,
        }
    }

    /// Below one half while the fire is short of air: it burns less than half
    /// of its free rate, and the incoming air could not burn all of that.
    pub fn air_ratio(&self) -> History<'_> {
        History::new(&self.record.time, &self.air_ratio)
    }

    /// When a fire that has air enough again at `time` is back at `share` of
    /// its free rate: `None` when it is so at once, not-a-number when it is
    /// not within the run or short of air again before.
    pub fn back_at(&self, time: f64, share: f64) -> Option<f64> {
        /// Later than this it is not at once, s \[choice\].
        const AT_ONCE: f64 = 3.0;
        self.burned_over_free()
            .spells(Side::Below, share)
            .into_iter()
            .find(|spell| spell.start < time && spell.end.is_none_or(|end| end > time + AT_ONCE))
            .map(|spell| spell.end.unwrap_or(f64::NAN))
            .map(|back| {
                let short = self.air_ratio().spells(Side::Below, share);
                let again = |start: f64| start > time && start < back;
                if short.iter().any(|spell| again(spell.start)) {
                    f64::NAN
                } else {
                    back
                }
            })
    }

    /// One history of the record.
    pub fn history(&self, subject: Subject, quantity: Quantity) -> History<'_> {
        History::new(&self.record.time, self.record.get(subject, quantity))
    }

    /// Heat burned everywhere.
    pub fn burned(&self) -> History<'_> {
        History::new(&self.record.time, &self.burned)
    }

    /// Free rate of all items together.
    pub fn free(&self) -> History<'_> {
        History::new(&self.record.time, &self.free)
    }

    /// Heat burned over free rate.
    pub fn burned_over_free(&self) -> History<'_> {
        History::new(&self.record.time, &self.ratio)
    }

    /// Times at which a new stage begins: the actions.
    pub fn stage_starts(&self) -> Vec<f64> {
        let mut starts: Vec<f64> = self.played.iter().map(|p| p.time).collect();
        starts.dedup();
        starts
    }

    /// Spells of a history, at most one for each stage: further ones between
    /// the same two actions are counted, not listed.
    pub fn by_stage(&self, history: History<'_>, side: Side, threshold: f64) -> Vec<Spell> {
        let starts = self.stage_starts();
        let stage = |time: f64| starts.iter().filter(|&&start| start <= time).count();
        let mut out: Vec<Spell> = Vec::new();
        for spell in history.spells(side, threshold) {
            match out.last_mut() {
                Some(last) if stage(last.start) == stage(spell.start) => {
                    last.end = spell.end;
                    last.times += 1;
                }
                _ => out.push(spell),
            }
        }
        out
    }

    /// Time since the last action at or before a time.
    pub fn since_action(&self, time: f64) -> Option<Since> {
        self.played
            .iter()
            .rev()
            .find(|played| played.time <= time)
            .map(|played| Since {
                action: played.name.to_owned(),
                seconds: time - played.time,
            })
    }

    /// Last action at or before a time that made an opening wider.
    pub fn last_opening(&self, time: f64) -> Option<&Played<'a>> {
        self.played
            .iter()
            .rev()
            .find(|played| played.opens() && played.time <= time)
    }

    /// Earliest and latest time to expect for something that follows from an
    /// opening on a burning building; `None` before one.
    pub fn band(&self, time: f64) -> Option<Band> {
        let opening = self.last_opening(time)?.time;
        let lit = self.plan.items.iter().any(|item| item.ignition < opening);
        if !lit || time <= opening {
            return None;
        }
        // What is done before or after changes what would have followed.
        let starts = self.stage_starts();
        let last = starts.iter().rev().find(|&&start| start <= time);
        let next = starts.iter().find(|&&start| start > time);
        let band = Band {
            earliest: (opening + BAND[0] * (time - opening)).max(last.map_or(0.0, |last| *last)),
            latest: (opening + BAND[1] * (time - opening)).min(next.map_or(self.end, |next| *next)),
        };
        (band.latest - band.earliest >= SHORTEST_BAND).then_some(band)
    }

    /// Index of the item with the largest free rate: what "the fire" is.
    pub fn main_item(&self) -> Option<usize> {
        let peak = |index: usize| {
            self.history(Subject::Item(index), Quantity::FreeRate)
                .largest(0.0, self.end)
                .map_or(0.0, |(_, value)| value)
        };
        (0..self.plan.items.len()).max_by(|&a, &b| peak(a).total_cmp(&peak(b)).then(b.cmp(&a)))
    }

    /// Name of a room as people say it.
    pub fn room_name(&self, room: usize) -> String {
        self.plan
            .rooms
            .get(room)
            .map_or_else(String::new, |room| spoken(&room.name))
    }

    /// Height of the highest head of the doors and windows of a room, m above
    /// its floor, with the name of that opening.
    pub fn highest_head(&self, room: usize) -> Option<(f64, String)> {
        let floor = |index: usize| self.plan.rooms.get(index).map_or(0.0, |r| r.floor_level);
        self.plan
            .openings
            .iter()
            .filter(|opening| matches!(opening.kind, OpeningKind::Door | OpeningKind::Window))
            .filter_map(|opening| match (opening.from, opening.to) {
                (Space::Room(from), _) if from.0 == room => Some((opening.head, &opening.name)),
                (from, Space::Room(to)) if to.0 == room => {
                    let other = match from {
                        Space::Room(id) => floor(id.0),
                        Space::OpenAir => 0.0,
                    };
                    Some((opening.head + other - floor(room), &opening.name))
                }
                _ => None,
            })
            .reduce(|best, next| if next.0 > best.0 { next } else { best })
            .map(|(head, name)| (head, spoken(name)))
    }

    /// A moment without numbers and band.
    pub fn moment(&self, time: f64, kind: Kind, subject: Subject, text: String) -> Moment {
        Moment {
            time,
            since_action: self.since_action(time),
            kind,
            subject,
            name: self.subject_name(subject),
            text,
            numbers: Vec::new(),
            band: None,
            weight: Weight::Plain,
        }
    }

    /// Name of a subject, empty when there is none.
    fn subject_name(&self, subject: Subject) -> String {
        let plan = self.plan;
        match subject {
            Subject::House => Some("house"),
            Subject::Room(i) => plan.rooms.get(i).map(|x| x.name.as_str()),
            Subject::Opening(i) => plan.openings.get(i).map(|x| x.name.as_str()),
            Subject::Item(i) => plan.items.get(i).map(|x| x.name.as_str()),
            Subject::Station(i) => plan.stations.get(i).map(|x| x.name.as_str()),
        }
        .unwrap_or_default()
        .to_owned()
    }
}

impl Moment {
    /// Adds a number, unless it is none.
    pub(super) fn with(
        mut self,
        label: impl Into<Cow<'static, str>>,
        value: f64,
        dimension: Dimension,
    ) -> Self {
        if value.is_finite() {
            self.numbers.push(Number {
                label: label.into(),
                value,
                dimension,
            });
        }
        self
    }

    /// Adds until when a spell lasts, and how often it comes back.
    pub(super) fn with_spell(mut self, spell: Spell) -> Self {
        if spell.times > 1 {
            self.text = format!("{}, back and forth {} times", self.text, spell.times);
        }
        match spell.end {
            Some(end) => self.with("until", end, Dimension::Time),
            None => self,
        }
    }

    /// Sets the band.
    pub(super) fn within(mut self, band: Option<Band>) -> Self {
        self.band = band;
        self
    }

    /// Sets the weight.
    pub(super) fn weighing(mut self, weight: Weight) -> Self {
        self.weight = weight;
        self
    }
}

/// The larger of the ratio and of half of what the incoming air could burn over
/// the free rate; the ratio alone where nothing is known of the air.
fn with_air(ratio: &[f64], free: &[f64], air: &[f64]) -> Vec<f64> {
    let enough = |row: usize| 0.5 * air.get(row).copied().unwrap_or(f64::NAN) / free[row];
    ratio
        .iter()
        .enumerate()
        .map(|(row, ratio)| {
            if ratio.is_nan() {
                f64::NAN
            } else {
                // The larger of a number and not-a-number is the number.
                ratio.max(enough(row))
            }
        })
        .collect()
}

/// Sum of a quantity over the items; missing values count as nothing.
fn total(record: &Record, plan: &Plan, quantity: Quantity) -> Vec<f64> {
    let mut sum = vec![f64::NAN; record.time.len()];
    for index in 0..plan.items.len() {
        let values = record.get(Subject::Item(index), quantity);
        for (sum, value) in sum.iter_mut().zip(values) {
            if value.is_finite() {
                *sum = if sum.is_finite() {
                    *sum + value
                } else {
                    *value
                };
            }
        }
    }
    sum
}
