//! The measured room series: one room 3.66 x 3.66 x 2.44 m with a door
//! 0.90 x 2.0 m, open or shut throughout, natural-gas burners in the centre and
//! in a corner. Source: DOI 10.5281/zenodo.5703474 (MIT licence). The figures
//! below were drawn from its tables by `tests/reference/room_series.py`, which
//! says how the mean over the height was taken.
//!
//! The walls of that room are not described. They are one unknown, fixed once
//! on 250 kW centre with the door open (density 790 kg/m3, 1090 J/kg/K,
//! 12.5 mm; the conductivity fitted); every other case is a prediction, and no
//! case has a number of its own. The fitted value takes up whatever else is
//! off (radiative fraction, convection, plume) and is no property of a wall.
// Tables for `--nocapture`; helpers outside the test functions may unwrap.
#![allow(clippy::print_stdout, clippy::unwrap_used)]

mod common;

use common::{ZERO_CELSIUS, burner, door, gap, lining, methane, plan, room};
use doorglow::plan::Plan;
use doorglow::record::{Ended, Quantity, Record, Subject};

/// Conductivity of the walls, W/m/K, found by
/// `evidence_wall_is_fixed_on_250_kw_centre_open`.
const WALL_CONDUCTIVITY: f64 = 0.060;

/// A setting with the door open: means of the last 60 s of burning.
struct OpenDoor {
    name: &'static str,
    rate: f64,
    side: f64,
    corner: bool,
    /// Room before ignition and outside, °C.
    start: f64,
    outside: f64,
    /// When the burner stops, s.
    end: f64,
    /// Rise of the mean temperature over the height, K, and scatter of the
    /// repeated tests (upper bound; none where there was one test).
    rise: (f64, f64),
    /// Gas in the room, kg, and its scatter.
    gas: (f64, f64),
    /// Inflow through the door, kg/s (+-10 %), where it is a required figure.
    inflow: Option<f64>,
    /// Held to the required bands.
    required: bool,
}

const OPEN: [OpenDoor; 8] = [
    OpenDoor {
        name: "100 kW centre",
        rate: 100e3,
        side: 0.6,
        corner: false,
        start: 14.5,
        outside: 13.3,
        end: 700.0,
        rise: (61.1, 1.0),
        gas: (33.90, 0.06),
        inflow: Some(0.64),
        required: true,
    },
    OpenDoor {
        name: "100 kW corner",
        rate: 100e3,
        side: 0.6,
        corner: true,
        start: 14.4,
        outside: 11.7,
        end: 605.0,
        rise: (62.6, 1.2),
        gas: (33.90, 0.06),
        inflow: None,
        required: true,
    },
    OpenDoor {
        name: "250 kW centre",
        rate: 250e3,
        side: 0.6,
        corner: false,
        start: 11.5,
        outside: 9.5,
        end: 603.0,
        rise: (125.0, 2.2),
        gas: (29.98, 0.04),
        inflow: Some(0.84),
        required: false,
    },
    OpenDoor {
        name: "250 kW corner",
        rate: 250e3,
        side: 0.6,
        corner: true,
        start: 10.8,
        outside: 7.5,
        end: 600.0,
        rise: (122.7, 2.7),
        gas: (30.28, 0.14),
        inflow: None,
        required: false,
    },
    OpenDoor {
        name: "500 kW centre",
        rate: 500e3,
        side: 0.6,
        corner: false,
        start: 11.9,
        outside: 10.0,
        end: 740.0,
        rise: (218.2, 11.3),
        gas: (25.18, 0.60),
        inflow: Some(1.02),
        required: true,
    },
    OpenDoor {
        name: "500 kW corner",
        rate: 500e3,
        side: 0.6,
        corner: true,
        start: 13.0,
        outside: 9.9,
        end: 600.0,
        rise: (235.5, f64::NAN),
        gas: (24.21, f64::NAN),
        inflow: None,
        required: true,
    },
    OpenDoor {
        name: "100 kW centre, 0.3 m",
        rate: 100e3,
        side: 0.3,
        corner: false,
        start: 14.6,
        outside: 11.2,
        end: 903.0,
        rise: (62.1, 4.2),
        gas: (33.95, 0.37),
        inflow: None,
        required: false,
    },
    OpenDoor {
        name: "100 kW corner, 0.3 m",
        rate: 100e3,
        side: 0.3,
        corner: true,
        start: 13.9,
        outside: 11.0,
        end: 612.0,
        rise: (61.8, 1.0),
        gas: (34.03, 0.06),
        inflow: None,
        required: false,
    },
];

/// A setting with the door shut.
struct ShutDoor {
    name: &'static str,
    rate: f64,
    side: f64,
    corner: bool,
    /// Room before ignition, °C.
    start: f64,
    /// Largest rise of the mean temperature over the height, K, and scatter of
    /// the upper temperature's peak.
    rise: (f64, f64),
    /// When that is, s, and scatter.
    peak_at: (f64, f64),
    /// Flame-out, s, and scatter, where the flames went out by themselves.
    out: Option<(f64, f64)>,
    /// Oxygen at flame-out 0.6 and 1.8 m below the ceiling, vol-% dry.
    oxygen: Option<(f64, f64)>,
    /// Held to the required bands.
    required: bool,
}

const SHUT: [ShutDoor; 8] = [
    ShutDoor {
        name: "100 kW centre",
        rate: 100e3,
        side: 0.6,
        corner: false,
        start: 21.3,
        rise: (176.1, 2.8),
        peak_at: (255.0, 13.0),
        out: Some((452.0, 9.0)),
        oxygen: Some((8.7, 11.2)),
        required: true,
    },
    ShutDoor {
        name: "100 kW corner",
        rate: 100e3,
        side: 0.6,
        corner: true,
        start: 18.4,
        rise: (162.9, 1.8),
        peak_at: (310.0, 5.0),
        out: Some((395.0, 32.0)),
        oxygen: Some((9.6, 11.8)),
        required: false,
    },
    ShutDoor {
        name: "250 kW centre",
        rate: 250e3,
        side: 0.6,
        corner: false,
        start: 18.5,
        rise: (244.3, 4.2),
        peak_at: (115.0, 2.0),
        out: Some((286.0, 56.0)),
        oxygen: Some((7.0, 10.8)),
        required: true,
    },
    ShutDoor {
        name: "250 kW corner",
        rate: 250e3,
        side: 0.6,
        corner: true,
        start: 18.9,
        rise: (228.0, 0.3),
        peak_at: (135.0, 4.0),
        out: Some((168.0, 10.0)),
        oxygen: Some((6.9, 12.4)),
        required: false,
    },
    ShutDoor {
        name: "500 kW centre",
        rate: 500e3,
        side: 0.6,
        corner: false,
        start: 17.0,
        rise: (302.3, 3.4),
        peak_at: (60.0, 2.0),
        out: None,
        oxygen: None,
        required: false,
    },
    ShutDoor {
        name: "500 kW corner",
        rate: 500e3,
        side: 0.6,
        corner: true,
        start: 22.2,
        rise: (277.4, f64::NAN),
        peak_at: (65.0, f64::NAN),
        out: None,
        oxygen: None,
        required: false,
    },
    ShutDoor {
        name: "100 kW centre, 0.3 m",
        rate: 100e3,
        side: 0.3,
        corner: false,
        start: 17.8,
        rise: (164.6, 1.8),
        peak_at: (265.0, 8.0),
        out: None,
        oxygen: None,
        required: false,
    },
    ShutDoor {
        name: "100 kW corner, 0.3 m",
        rate: 100e3,
        side: 0.3,
        corner: true,
        start: 17.0,
        rise: (156.7, 2.7),
        peak_at: (270.0, 6.0),
        out: None,
        oxygen: None,
        required: false,
    },
];

/// Effective leak of the shut room, coefficient times area, m2; within the
/// measured 0.026-0.039 and the same for all cases.
const LEAK: f64 = 0.03;

/// The room; the burner's surface at 0.5 m after the photographs of the
/// series.
fn room_plan(
    (rate, side, corner): (f64, f64, bool),
    conductivity: f64,
    (start, outside): (f64, f64),
    end: f64,
    open: bool,
) -> Plan {
    let board = lining(0.0125, conductivity, 790.0, 1090.0);
    let mut burn_room = room("room", 3.66, 3.66, 2.44, &board);
    burn_room.temperature = start + ZERO_CELSIUS;
    burn_room.behind = start + ZERO_CELSIUS;
    let mut openings = vec![door("door", 0, None, 0.90, 2.0, open)];
    if !open {
        openings.push(gap(0, 2.0, LEAK / 0.6));
    }
    let mut plan = plan(
        end,
        vec![burn_room],
        openings,
        vec![methane()],
        vec![burner(0, rate, side, 0.5, corner)],
    );
    plan.open_air.temperature = outside + ZERO_CELSIUS;
    plan
}

/// A number, or a dash where there is none.
fn number(value: f64, digits: usize) -> String {
    if value.is_nan() {
        "-".into()
    } else {
        format!("{value:.digits$}")
    }
}

/// A measured figure with its scatter.
fn pair((value, scatter): (f64, f64), digits: usize) -> String {
    format!("{}+-{}", number(value, digits), number(scatter, digits))
}

fn run(plan: &Plan) -> Record {
    let record = doorglow::solve::run(plan, 1.0, &mut |_| false).unwrap();
    assert_eq!(record.ended, Ended::Completed);
    record
}

fn mean_from(record: &Record, subject: Subject, quantity: Quantity, from: f64) -> f64 {
    let values: Vec<f64> = record
        .time
        .iter()
        .zip(record.get(subject, quantity))
        .filter(|(time, _)| **time >= from)
        .map(|(_, value)| *value)
        .collect();
    values.iter().sum::<f64>() / values.len() as f64
}

/// Rise (K), gas (kg) and inflow (kg/s) of the last 60 s.
fn open_door(case: &OpenDoor, conductivity: f64) -> [f64; 3] {
    let source = (case.rate, case.side, case.corner);
    let around = (case.start, case.outside);
    let record = run(&room_plan(source, conductivity, around, case.end, true));
    let from = case.end - 60.0;
    let of = |subject, quantity| mean_from(&record, subject, quantity, from);
    [
        of(Subject::Room(0), Quantity::MeanTemperature) - ZERO_CELSIUS - case.start,
        of(Subject::Room(0), Quantity::GasMass),
        of(Subject::Opening(0), Quantity::FlowBackward),
    ]
}

/// Conductivity with which 250 kW centre open rises as measured, W/m/K.
fn fitted_wall() -> f64 {
    let case = &OPEN[2];
    let (mut low, mut high) = (0.03, 0.30);
    for _ in 0..12 {
        let middle = 0.5 * (low + high);
        // A better conductor keeps the room cooler.
        if open_door(case, middle)[0] > case.rise.0 {
            low = middle;
        } else {
            high = middle;
        }
    }
    0.5 * (low + high)
}

#[test]
fn evidence_wall_is_fixed_on_250_kw_centre_open() {
    let fitted = fitted_wall();
    let case = &OPEN[2];
    let [rise, gas, inflow] = open_door(case, WALL_CONDUCTIVITY);
    println!(
        "fitted {fitted:.4} W/m/K (k rho c {:.3e}); with {WALL_CONDUCTIVITY}: rise {rise:.1} K, \
         gas {gas:.2} kg, in {inflow:.3} kg/s",
        fitted * 790.0 * 1090.0
    );
    assert!((rise / case.rise.0 - 1.0).abs() < 0.01, "rise {rise} K");
}

#[test]
fn evidence_open_door_rise_gas_and_inflow() {
    let mut faults = Vec::new();
    println!(
        "open door, last 60 s     rise K (measured) ratio | gas kg (measured) ratio | in kg/s ratio"
    );
    for case in &OPEN {
        let [rise, gas, inflow] = open_door(case, WALL_CONDUCTIVITY);
        let ratios = [rise / case.rise.0, gas / case.gas.0];
        let flow = inflow / case.inflow.unwrap_or(f64::NAN);
        println!(
            "{:22} {rise:5.1} ({}) {:.3} | {gas:5.2} ({}) {:.3} | {inflow:.3} {}",
            case.name,
            pair(case.rise, 1),
            ratios[0],
            pair(case.gas, 2),
            ratios[1],
            number(flow, 3),
        );
        if !case.required {
            continue;
        }
        for (what, ratio, band) in [
            ("rise", ratios[0], 0.08),
            ("gas", ratios[1], 0.06),
            ("inflow", flow, 0.12),
        ] {
            if (ratio - 1.0).abs() > band {
                faults.push(format!("{}: {what} {ratio:.3}", case.name));
            }
        }
    }
    assert!(faults.is_empty(), "{faults:?}");
}

/// What the shut room did.
struct Shut {
    rise: f64,
    peak_at: f64,
    /// When the burned share falls below a half for the last time, s.
    out: Option<f64>,
    /// Earliest such fall, s.
    first_out: Option<f64>,
    /// Largest burned share after the first fall and a minute.
    back: f64,
    /// Oxygen of the upper and lower layer at flame-out, vol-% dry.
    oxygen: [f64; 2],
}

fn shut_door(case: &ShutDoor, end: f64) -> Shut {
    let source = (case.rate, case.side, case.corner);
    let around = (case.start, case.start);
    let record = run(&room_plan(source, WALL_CONDUCTIVITY, around, end, false));
    let means = record.get(Subject::Room(0), Quantity::MeanTemperature);
    let top = (0..means.len())
        .max_by(|a, b| means[*a].total_cmp(&means[*b]))
        .unwrap();
    let burned = record.get(Subject::House, Quantity::Burned);
    let given = record.get(Subject::House, Quantity::GivenOff);
    let share: Vec<f64> = burned
        .iter()
        .zip(given)
        .map(|(b, g)| if *g > 0.0 { b / g } else { 1.0 })
        .collect();
    let first = (0..share.len()).find(|n| record.time[*n] > 30.0 && share[*n] < 0.5);
    let ends_out = share.last().is_some_and(|share| *share < 0.5);
    let last = (1..share.len())
        .rev()
        .find(|n| share[*n - 1] >= 0.5)
        .filter(|_| ends_out);
    let oxygen = [Quantity::UpperOxygenDry, Quantity::LowerOxygenDry].map(|quantity| {
        first.map_or(f64::NAN, |n| {
            100.0 * record.get(Subject::Room(0), quantity)[n]
        })
    });
    Shut {
        rise: means[top] - ZERO_CELSIUS - case.start,
        peak_at: record.time[top],
        out: last.map(|n| record.time[n]),
        first_out: first.map(|n| record.time[n]),
        back: first.map_or(f64::NAN, |first| {
            (first..share.len())
                .filter(|n| record.time[*n] > record.time[first] + 60.0)
                .map(|n| share[n])
                .fold(0.0, f64::max)
        }),
        oxygen,
    }
}

#[test]
fn evidence_shut_door_peak_and_flame_out() {
    let mut faults = Vec::new();
    println!(
        "shut door    peak rise K (measured) ratio | at s (measured) ratio | out s (measured) ratio \
         | O2 upper, lower (0.6, 1.8 m below ceiling) vol-% dry | burned share later, last fall"
    );
    for case in &SHUT {
        let found = shut_door(case, 900.0);
        let ratio = found.rise / case.rise.0;
        let unknown = (f64::NAN, f64::NAN);
        let (out, oxygen) = (case.out.unwrap_or(unknown), case.oxygen.unwrap_or(unknown));
        let first = found.first_out.unwrap_or(f64::NAN);
        println!(
            "{:21} {:5.1} ({}) {ratio:.3} | {:3.0} ({}) {:.2} | {} ({}) {} | {:.1} {:.1} ({} {}) | {:.2} {}",
            case.name,
            found.rise,
            pair(case.rise, 1),
            found.peak_at,
            pair(case.peak_at, 0),
            found.peak_at / case.peak_at.0,
            number(first, 0),
            pair(out, 0),
            number(first / out.0, 2),
            found.oxygen[0],
            found.oxygen[1],
            number(oxygen.0, 1),
            number(oxygen.1, 1),
            found.back,
            number(found.out.unwrap_or(f64::NAN), 0),
        );
        if !case.required {
            continue;
        }
        if (ratio - 1.0).abs() > 0.15 {
            faults.push(format!("{}: peak rise {ratio:.3}", case.name));
        }
        if found.out.is_none() || found.out != found.first_out {
            faults.push(format!(
                "{}: out {:?}, for good {:?}",
                case.name, found.first_out, found.out
            ));
        }
    }
    assert!(faults.is_empty(), "{faults:?}");
}
