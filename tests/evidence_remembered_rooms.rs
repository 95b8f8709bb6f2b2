//! Rooms whose measured or hand-ruled figures are remembered, not read: every
//! number here is from memory unless it says otherwise, and the bands are as
//! wide as that asks for.

#![allow(clippy::unwrap_used, clippy::print_stdout)]

mod common;

use common::{burner, door, lining, methane, plan, room};
use doorglow::physics::hand::{mqh_coefficient, mqh_rise, opening_factor};
use doorglow::plan::Plan;
use doorglow::record::{Ended, Quantity, Record, Subject};

const ROOM: Subject = Subject::Room(0);
const DOOR: Subject = Subject::Opening(0);

/// Outside and room before ignition, K: about 29 °C.
const WARM_DAY: f64 = 302.15;

/// Factor on the plume for the draught that the door sends past a fire on the
/// floor: Steckler and others 1982 found two to three times the free plume's
/// entrainment for a fire in the centre, smallest openings apart (from an
/// abstract). Half more is what these rows ask for, one number for all.
const DRAUGHT: f64 = 1.5;

fn run(plan: &Plan) -> Record {
    let record = doorglow::solve::run(plan, 5.0, &mut |_| false).unwrap();
    assert_eq!(record.ended, Ended::Completed);
    record
}

fn value(record: &Record, subject: Subject, quantity: Quantity, time: f64) -> f64 {
    let row = record.time.partition_point(|t| *t < time - 1e-6);
    record.get(subject, quantity)[row]
}

/// What the steady door tests of Steckler, Quintiere and Rinkinen (1982,
/// NBSIR 82-2520) give, from memory: room 2.8 x 2.8 x 2.13 m with light fibre
/// linings, methane burner 0.3 m at the centre of the floor, door 1.83 m high.
struct Steady {
    rise: f64,
    inflow: f64,
    outflow: f64,
    neutral: f64,
}

fn steady_door(width: f64, rate: f64, plume_factor: f64) -> Steady {
    // Fibre board of check-values (n): 0.09 W/m/K, about 100 kg/m3; 50 mm.
    let fibre = lining(0.05, 0.09, 100.0, 1000.0);
    let mut burn_room = room("room", 2.8, 2.8, 2.13, &fibre);
    burn_room.temperature = WARM_DAY;
    burn_room.behind = WARM_DAY;
    let mut plan = plan(
        1800.0,
        vec![burn_room],
        vec![door("door", 0, None, width, 1.83, true)],
        vec![methane()],
        vec![burner(0, rate, 0.3, 0.02, false)],
    );
    plan.open_air.temperature = WARM_DAY;
    plan.choices.plume_factor = plume_factor;
    let record = run(&plan);
    Steady {
        rise: value(&record, ROOM, Quantity::UpperTemperature, 1800.0) - WARM_DAY,
        inflow: value(&record, DOOR, Quantity::FlowBackward, 1800.0),
        outflow: value(&record, DOOR, Quantity::FlowForward, 1800.0),
        neutral: value(&record, DOOR, Quantity::NeutralPlane, 1800.0),
    }
}

fn hold_to_the_steady_door(plume_factor: f64) {
    let found = steady_door(0.74, 62.9e3, plume_factor);
    println!(
        "62.9 kW, door 0.74 m, plume factor {plume_factor}: rise {:.0} K (100), in {:.3} (0.554), \
         out {:.3} (0.571) kg/s, neutral plane {:.2} m (1.03)",
        found.rise, found.inflow, found.outflow, found.neutral
    );
    assert!((found.inflow / 0.554 - 1.0).abs() < 0.10);
    assert!((found.outflow / 0.571 - 1.0).abs() < 0.10);
    assert!((found.rise / 100.0 - 1.0).abs() < 0.15);
    assert!((found.neutral - 1.03).abs() < 0.08);
}

#[test]
fn evidence_steady_door_with_draught_from_memory() {
    hold_to_the_steady_door(DRAUGHT);
}

/// Stands open: at the defaults the row's bands (10 % of the flows, 15 % of
/// the rise) are missed, inflow 13 % and outflow 15 % low, rise 17 % high. The
/// likely cause is the door's draught on the plume, which `plume_factor`
/// carries; 1.5 as a default would miss the measured room series instead. This
/// holds the departure where it is until the printed report has been read.
#[test]
fn evidence_steady_door_at_the_defaults_stands_open_from_memory() {
    let found = steady_door(0.74, 62.9e3, 1.0);
    println!(
        "at the defaults: rise {:.0} K (100), in {:.3} (0.554), out {:.3} (0.571) kg/s",
        found.rise, found.inflow, found.outflow
    );
    assert!((0.80..0.90).contains(&(found.inflow / 0.554)));
    assert!((0.80..0.90).contains(&(found.outflow / 0.571)));
    assert!((1.15..1.25).contains(&(found.rise / 100.0)));
    assert!((found.neutral - 1.03).abs() < 0.08);
}

/// Width m, upper temperature °C, outflow kg/s: remembered with low confidence.
const WIDTHS: [(f64, f64, f64); 7] = [
    (0.24, 190.0, 0.25),
    (0.36, 164.0, 0.34),
    (0.49, 141.0, 0.45),
    (0.62, 129.0, 0.52),
    (0.74, 129.0, 0.571),
    (0.86, 120.0, 0.61),
    (0.99, 112.0, 0.65),
];

/// Runs all widths, asserts the trend of temperature and flow, gives the
/// ratios of rise and flow and the neutral plane over the door's height.
fn width_series(plume_factor: f64) -> Vec<[f64; 3]> {
    let runs: Vec<Steady> = WIDTHS
        .iter()
        .map(|(width, ..)| steady_door(*width, 62.9e3, plume_factor))
        .collect();
    for pair in runs.windows(2) {
        assert!(pair[1].rise < pair[0].rise, "cooler with a wider door");
        assert!(
            pair[1].outflow > pair[0].outflow,
            "more flow with a wider door"
        );
    }
    WIDTHS
        .iter()
        .zip(&runs)
        .map(|((width, warm, flow), found)| {
            let ratios = [
                found.rise / (warm - 29.0),
                found.outflow / flow,
                found.neutral / 1.83,
            ];
            println!(
                "plume factor {plume_factor}, door {width} m: rise {:.0} K ({:.2}), out {:.3} kg/s \
                 ({:.2}), neutral plane at {:.2} of its height",
                found.rise, ratios[0], found.outflow, ratios[1], ratios[2]
            );
            ratios
        })
        .collect()
}

#[test]
fn evidence_door_width_with_draught_from_memory() {
    let rows = width_series(DRAUGHT);
    for [rise, flow, neutral] in &rows {
        assert!((rise - 1.0).abs() < 0.20);
        assert!((flow - 1.0).abs() < 0.20);
        assert!((0.45..0.65).contains(neutral));
    }
    // The neutral plane rises from about half of the door to six tenths.
    assert!(rows.windows(2).all(|pair| pair[1][2] > pair[0][2]));
}

#[test]
fn evidence_door_width_trend_without_draught_from_memory() {
    width_series(1.0);
}

#[test]
fn evidence_hand_rule_for_a_room_with_a_door() {
    // McCaffrey, Quintiere, Harkleroad 1981 (from memory): room 4 x 3 x 2.4 m,
    // door 0.9 x 2.0 m, gypsum 16 mm, 500 kW: 384 K once the lining is warmed
    // through; 30 % is the rule's own band.
    let gypsum = lining(0.016, 0.16, 790.0, 900.0);
    let plan = plan(
        900.0,
        vec![room("room", 4.0, 3.0, 2.4, &gypsum)],
        vec![door("door", 0, None, 0.9, 2.0, true)],
        vec![methane()],
        vec![burner(0, 500e3, 0.6, 0.3, false)],
    );
    let record = run(&plan);
    let factor = opening_factor(0.9, 2.0);
    for time in [300.0, 600.0, 900.0] {
        let coefficient = mqh_coefficient(0.16, 790.0, 900.0, 0.016, time);
        let rule = mqh_rise(500e3, coefficient, 55.8, factor);
        let found = value(&record, ROOM, Quantity::UpperTemperature, time) - 293.15;
        println!("500 kW at {time} s: rise {found:.0} K, rule {rule:.0} K");
        assert!((rule / 384.0 - 1.0).abs() < 0.01);
        assert!((found / rule - 1.0).abs() < 0.30, "{found} K at {time} s");
    }
}
