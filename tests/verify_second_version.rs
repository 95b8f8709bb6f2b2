//! The single-room model against a second version of it, written in Python
//! from docs/method.md alone (`tests/reference/second_version/`).
// Tables for `--nocapture`; helpers outside the test functions may unwrap.
#![allow(clippy::print_stdout, clippy::unwrap_used)]

mod common;

use common::{ZERO_CELSIUS, door, gap, lining, plan, polyurethane, room};
use doorglow::plan::{Action, Burning, Curve, FuelId, Item, OpenAir, OpeningId, Plan, RoomId};
use doorglow::record::{Ended, Quantity, Record, Subject};
use doorglow::solve;
use std::fmt::Write as _;
use std::io::Write as _;

/// Columns of the second version in its file's order, time first.
const COLUMNS: usize = 12;

/// What differs between the cases.
struct Case {
    /// s.
    end: f64,
    /// When the door begins to open, s.
    entry: f64,
    /// kg.
    mass: f64,
    /// W/s2.
    alpha: f64,
    /// W.
    peak: f64,
    /// The second version's result.
    result: &'static str,
}

/// `case.json`: a room short of air whose door is opened.
const SHORT_OF_AIR: Case = Case {
    end: 600.0,
    entry: 240.0,
    mass: 12.0,
    alpha: 46.9,
    peak: 500e3,
    result: include_str!("reference/second_version/result.csv"),
};

/// `hot.json`: a fire that fills the room, through the ignition of its gases.
const HOT: Case = Case {
    end: 300.0,
    entry: 60.0,
    mass: 40.0,
    alpha: 187.6,
    peak: 2500e3,
    result: include_str!("reference/second_version/hot.csv"),
};

/// The room of the cases.
fn room_of(case: &Case) -> Plan {
    let gypsum = lining(0.013, 0.20, 790.0, 1000.0);
    let mut room = room("room", 3.6, 3.0, 2.4, &gypsum);
    room.floor = lining(0.022, 0.13, 550.0, 1600.0);
    let item = Item {
        name: "chair".into(),
        room: RoomId(0),
        fuel: FuelId(0),
        mass: case.mass,
        burning: Burning::Growing(Curve::Growth {
            alpha: case.alpha,
            peak: case.peak,
        }),
        surface_height: 0.4,
        gap_to_wall: None,
        in_corner: false,
        ignition: 0.0,
        at: None,
    };
    let openings = vec![door("door", 0, None, 0.9, 2.0, false), gap(0, 2.4, 0.02)];
    let mut plan = plan(
        case.end,
        vec![room],
        openings,
        vec![polyurethane()],
        vec![item],
    );
    plan.open_air = OpenAir {
        temperature: ZERO_CELSIUS + 10.0,
        humidity: 0.70,
        pressure: 101_325.0,
    };
    plan.actions = vec![Action {
        name: "entry".into(),
        time: case.entry,
        over: 2.0,
        opening: OpeningId(0),
        clear_width: 0.9,
        what: "open".into(),
        because: None,
    }];
    plan.choices.tolerance = 1e-8;
    plan
}

/// Rows of the second version's result, SI.
fn second_version(result: &str) -> Vec<[f64; COLUMNS]> {
    result
        .lines()
        .skip(1)
        .map(|line| {
            let mut row = [0.0; COLUMNS];
            let mut cells = line.split(',');
            for value in &mut row {
                *value = cells.next().unwrap().parse().unwrap();
            }
            assert_eq!(cells.next(), None, "a row has {COLUMNS} cells: {line}");
            row
        })
        .collect()
}

/// Index in the record of a time of the second version; both state exactly
/// this instant, the beginning and the end of the action included.
fn index_of(record: &Record, time: f64) -> usize {
    record
        .time
        .iter()
        .position(|t| (t - time).abs() < 1e-9)
        .unwrap_or_else(|| panic!("no output at {time} s"))
}

/// Largest difference of one history from the second version's column, and
/// when it is.
fn difference(
    record: &Record,
    rows: &[[f64; COLUMNS]],
    (subject, quantity): (Subject, Quantity),
    column: usize,
) -> (f64, f64) {
    let values = record.get(subject, quantity);
    assert!(!values.is_empty(), "{quantity:?} is recorded");
    rows.iter()
        .map(|row| {
            let found = values[index_of(record, row[0])];
            // not-a-number must not slip through a comparison
            assert!(found.is_finite(), "{quantity:?} at {} s", row[0]);
            ((found - row[column]).abs(), row[0])
        })
        .fold((0.0, 0.0), |a, b| if b.0 > a.0 { b } else { a })
}

/// Limits of the agreement: name, whose, what, column, largest difference.
type Limit = (&'static str, Subject, Quantity, usize, f64);

/// A share of the peaks (temperatures: of the upper layer's rise), interface in
/// m, oxygen in volume fraction.
fn limits(rows: &[[f64; COLUMNS]]) -> Vec<Limit> {
    use Quantity as Q;
    let peak = |column: usize| rows.iter().map(|row| row[column]).fold(0.0, f64::max);
    let (room, item, door) = (Subject::Room(0), Subject::Item(0), Subject::Opening(0));
    let rise = 1e-3 * (peak(1) - rows[0][1]);
    let release = 1e-3 * peak(6);
    let flow = 1e-3 * peak(9).max(peak(10));
    vec![
        ("upper temperature, K", room, Q::UpperTemperature, 1, rise),
        ("lower temperature, K", room, Q::LowerTemperature, 2, rise),
        ("interface, m", room, Q::Interface, 3, 2e-3),
        ("upper oxygen", room, Q::UpperOxygen, 4, 2e-4),
        ("lower oxygen", room, Q::LowerOxygen, 5, 2e-4),
        ("burned, W", Subject::House, Q::Burned, 6, release),
        ("given off, W", Subject::House, Q::GivenOff, 7, release),
        ("flamed share", item, Q::FlamedShare, 8, 1e-3),
        ("door inflow, kg/s", door, Q::FlowBackward, 9, flow),
        ("door outflow, kg/s", door, Q::FlowForward, 10, flow),
        ("pressure, Pa", room, Q::Pressure, 11, 1e-3 * peak(11)),
    ]
}

/// Every difference as text, and whether all are within their limits.
fn compare(case: &Case) -> (String, bool) {
    let record = solve::run(&room_of(case), 5.0, &mut |_| false).unwrap();
    assert_eq!(record.ended, Ended::Completed);
    let rows = second_version(case.result);
    assert_eq!(rows.len() as f64, case.end / 5.0 + 1.0, "every 5 s");
    let mut text = String::new();
    let mut within = true;
    for (name, subject, quantity, column, limit) in limits(&rows) {
        let (worst, time) = difference(&record, &rows, (subject, quantity), column);
        within &= worst < limit;
        writeln!(text, "{name}: {worst:.2e} at {time} s (limit {limit:.2e})").unwrap();
    }
    if std::env::var_os("SHOW_DIFFERENCES").is_some() {
        std::io::stderr().write_all(text.as_bytes()).unwrap();
    }
    (text, within)
}

/// Largest value of a column of the second version.
fn highest(case: &Case, column: usize) -> f64 {
    second_version(case.result)
        .iter()
        .map(|row| row[column])
        .fold(0.0, f64::max)
}

#[test]
fn verify_second_version_of_a_room_short_of_air() {
    // The case is what it says: flames go out nearly, and come back.
    let share_at_240 = second_version(SHORT_OF_AIR.result)[48][8];
    assert!(share_at_240 < 0.02 && highest(&SHORT_OF_AIR, 6) > 500e3);
    let (text, within) = compare(&SHORT_OF_AIR);
    assert!(within, "apart from the second version:\n{text}");
}

#[test]
fn verify_second_version_of_a_room_full_of_fire() {
    // Past 600 °C, where layers light, and past the 1000 K of the gas tables.
    assert!(highest(&HOT, 1) > 1200.0 && highest(&HOT, 6) > 3e6);
    let (text, within) = compare(&HOT);
    assert!(within, "apart from the second version:\n{text}");
}
