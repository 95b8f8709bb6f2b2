//! Moments of a run and its summary: what happened when, read off the record.
//!
//! Every rule is stated with its [`Kind`]; every threshold stands as a
//! constant beside its rule. Times come from straight lines between output
//! times; a crossing counts when it lasts three seconds, and of several
//! returns between the same two actions the first is listed and the others are
//! counted. Numbers stay SI; [`crate::show`] writes them.

mod actions;
mod air;
mod fire;
mod flashover;
mod history;
mod moment;
mod played;
mod reader;
mod rooms;
mod stations;
mod summary;
mod ways;

pub use fire::BackBy;
pub use flashover::{Answer, Flashover};
pub use moment::{Band, Kind, Moment, Number, Since, Weight, spoken};
pub use summary::{
    Closures, Comeback, Extreme, FirstOpening, LimitSummary, Narrowed, RoomSummary, ShortOfAir,
    StationSummary, Stretch, Summary, Worst,
};
pub use ways::FlowSummary;

use crate::plan::Plan;
use crate::record::Record;

/// Where the bands on times after an opening come from, in words.
pub const BAND_SOURCE: &str = "Bands (5 to 95 %) on times after an opening: -60 to +130 % of the time \
    since the opening, from a study of 300 varied runs of one bedroom fire short of air. \
    They are not reckoned for this scenario. Each is cut at the actions before and after it and \
    at the end of the run.";

/// All moments of a run, by time.
pub fn moments(record: &Record, plan: &Plan) -> Vec<Moment> {
    let reader = reader::Reader::new(record, plan);
    let mut out = fire::moments(&reader);
    out.extend(actions::moments(&reader));
    out.extend(air::moments(&reader));
    out.extend(rooms::moments(&reader));
    out.extend(ways::moments(&reader));
    out.extend(stations::moments(&reader));
    out.extend(actions::stopped(&reader));
    out.retain(|moment| moment.time.is_finite());
    out.sort_by(|a, b| a.time.total_cmp(&b.time).then(rank(a).cmp(&rank(b))));
    out
}

/// Order of moments of the same time: actions first.
fn rank(moment: &Moment) -> (bool, Kind) {
    (moment.kind != Kind::Action, moment.kind)
}

/// The run in a few numbers.
pub fn summary(record: &Record, plan: &Plan) -> Summary {
    summary::read(&reader::Reader::new(record, plan))
}
