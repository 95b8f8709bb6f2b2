//! Readings of flow, mixing, flame outside and what gives way by itself, of an
//! invented run whose moments can be worked out by hand.

#![allow(clippy::unwrap_used)]

mod support;

use doorglow::plan::{Effect, Fan, FanId, FanKind, OpeningId, Plan, RoomId, Trigger, Watched};
use doorglow::reading::{Kind, Moment, Weight, moments, summary};
use doorglow::record::{Fired, Quantity, Record, Subject};
use doorglow::show::text::{Style, report};

/// The front door opens at 480 s; a pane of it falls out at 300 s before; flow
/// turns one-way at 600 s, the hall is mixed from 650 s, flame from 700 s.
fn run() -> (Plan, Record) {
    let mut plan = support::plan();
    plan.triggers.push(Trigger {
        name: "front_door falls out".into(),
        watched: Watched::UpperTemperature(RoomId(1)),
        rising: true,
        level: 773.15,
        not_before: 0.0,
        delay: 0.0,
        over: 3.0,
        effect: Effect::ClearWidth {
            opening: OpeningId(1),
            width: 0.4,
        },
        only_widens: true,
        what: "falls out".into(),
        because: None,
    });
    plan.fans.push(Fan {
        name: "door_fan".into(),
        kind: FanKind::PositivePressure {
            opening: OpeningId(1),
            covers: 1.0,
        },
        free_flow: 3.0,
        dead_end_pressure: 40.0,
        running: false,
    });
    let mut start = plan.actions[0].clone();
    start.name = "fan".into();
    start.time = 800.0;
    start.effect = Effect::Fan {
        fan: FanId(0),
        running: true,
    };
    start.what = "start".into();
    start.because = None;
    plan.actions.push(start);
    let door = Subject::Opening(1);
    let hall = Subject::Room(1);
    let flat = |value: f64| vec![(0.0, value), (900.0, value)];
    let lines = vec![
        (
            door,
            Quantity::ClearWidth,
            vec![(299.0, 0.0), (303.0, 0.4), (480.0, 0.4), (482.0, 0.9)],
        ),
        (door, Quantity::FlowForward, flat(1.0)),
        // The excess is 0.96 at 1/49 of it coming back.
        (
            door,
            Quantity::FlowBackward,
            vec![(0.0, 1.0), (500.0, 1.0), (600.0, 1.0 / 49.0), (620.0, 0.0)],
        ),
        (
            hall,
            Quantity::MixedShare,
            vec![(0.0, 0.9), (10.0, 0.0), (600.0, 0.0), (700.0, 1.0)],
        ),
        (
            hall,
            Quantity::MeanTemperature,
            vec![(0.0, 293.15), (400.0, 293.15), (500.0, 573.15)],
        ),
        (
            door,
            Quantity::OutsideFlame,
            vec![(699.0, 0.0), (701.0, 0.2), (710.0, 1.5)],
        ),
        (door, Quantity::BurnedOutside, flat(0.5e6)),
    ];
    let mut record = support::drawn(&plan, 900, &lines);
    record.fired.push(Fired {
        trigger: 0,
        time: 300.0,
    });
    (plan, record)
}

fn of(moments: &[Moment], kind: Kind) -> Vec<&Moment> {
    moments.iter().filter(|m| m.kind == kind).collect()
}

#[test]
fn verify_what_gives_way_stands_among_the_actions() {
    let (plan, record) = run();
    let read = moments(&record, &plan);
    let actions: Vec<(f64, &str)> = of(&read, Kind::Action)
        .iter()
        .map(|moment| (moment.time, moment.text.as_str()))
        .collect();
    assert_eq!(actions[0], (300.0, "front door falls out"));
    assert_eq!(actions[1].0, 480.0);
    assert!(actions[1].1.starts_with("entry: front door opened"));
    assert_eq!(actions[2], (800.0, "fan: door fan started"));
    let first = summary(&record, &plan).first_opening.unwrap();
    assert_eq!(
        (first.action.as_str(), first.time),
        ("front_door falls out", 300.0)
    );
}

/// A pane that falls out of a door that stands open as wide changes nothing.
#[test]
fn verify_glass_of_an_open_window_is_no_moment() {
    let (plan, mut record) = run();
    record.fired[0].time = 600.0;
    let read = moments(&record, &plan);
    assert_eq!(of(&read, Kind::Action).len(), 2);
}

#[test]
fn verify_one_way_flow_mixing_and_flame_have_their_times() {
    let (plan, record) = run();
    let read = moments(&record, &plan);
    let one_way = of(&read, Kind::OneWay);
    assert_eq!(one_way.len(), 1);
    assert!((one_way[0].time - 600.0).abs() < 0.1, "{}", one_way[0].time);
    assert_eq!(
        one_way[0].text,
        "front door: flow turns one-way, all of it out"
    );
    // Cold and mixed at the start is nothing to tell.
    let mixed = of(&read, Kind::Mixed);
    assert_eq!(mixed.len(), 1);
    assert!((mixed[0].time - 650.0).abs() < 1e-6);
    let flame = of(&read, Kind::FlameOutside);
    assert_eq!(flame.len(), 1);
    assert!((flame[0].time - 700.0).abs() < 1e-6);
    assert_eq!(flame[0].weight, Weight::Headline);
    assert_eq!(flame[0].numbers[0].value, 1.5);
}

#[test]
fn verify_the_summary_says_which_way_it_goes() {
    let (plan, record) = run();
    let summary = summary(&record, &plan);
    assert_eq!(summary.flow.len(), 1);
    let flow = &summary.flow[0];
    assert_eq!(
        (flow.forward.as_str(), flow.backward.as_str()),
        ("out", "in")
    );
    assert_eq!(flow.only_forward.len(), 1);
    assert!(flow.only_backward.is_empty());
    assert_eq!(flow.longest_flame.unwrap().value, 1.5);
    assert_eq!(summary.rooms[1].mixed.len(), 1);
    let style = Style {
        colour: false,
        width: 200,
        details: false,
    };
    let text = report(&record, &plan, &moments(&record, &plan), &summary, &style);
    for words in [
        "all of it out 10:00 to the end",
        "flame up to 1.5 m",
        "mixed by momentum 10:50",
    ] {
        assert!(text.contains(words), "{words}\n{text}");
    }
}
