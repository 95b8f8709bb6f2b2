//! Direction and size in the example buildings, as the trade knows them and as
//! published tests found them (wind-driven tests: above 400 °C in the path, NIST
//! TN 1629, from memory).
// Tables for `--nocapture`; helpers outside the test functions may unwrap.
#![allow(clippy::print_stdout, clippy::unwrap_used)]

use doorglow::plan::Plan;
use doorglow::record::{Quantity as Q, Record, Subject};

struct Played {
    plan: Plan,
    record: Record,
}

fn play(file: &str, tactic: Option<&str>) -> Played {
    let path = format!("{}/scenarios/{file}", env!("CARGO_MANIFEST_DIR"));
    let text = std::fs::read_to_string(path).unwrap();
    let plan = doorglow::scenario::load(file, &text, tactic)
        .map_err(|report| report.render(false, 100))
        .unwrap();
    let mut record = doorglow::solve::run(&plan, 1.0, &mut |_| false).unwrap();
    doorglow::exposure::observe(&mut record, &plan);
    Played { plan, record }
}

impl Played {
    fn opening(&self, name: &str) -> Subject {
        Subject::Opening(
            self.plan
                .openings
                .iter()
                .position(|o| o.name == name)
                .unwrap(),
        )
    }

    fn room(&self, name: &str) -> Subject {
        Subject::Room(self.plan.rooms.iter().position(|r| r.name == name).unwrap())
    }

    fn station(&self, name: &str) -> Subject {
        Subject::Station(
            self.plan
                .stations
                .iter()
                .position(|s| s.name == name)
                .unwrap(),
        )
    }

    /// Values from one time to another.
    fn span(&self, subject: Subject, quantity: Q, from: f64, to: f64) -> Vec<f64> {
        let values = self.record.get(subject, quantity);
        let rows = self.record.time.iter().zip(values);
        rows.filter(|(t, _)| (from..=to).contains(*t))
            .map(|(_, v)| *v)
            .collect()
    }

    fn mean(&self, subject: Subject, quantity: Q, from: f64, to: f64) -> f64 {
        let values = self.span(subject, quantity, from, to);
        values.iter().sum::<f64>() / values.len() as f64
    }

    fn most(&self, subject: Subject, quantity: Q, from: f64, to: f64) -> f64 {
        self.span(subject, quantity, from, to)
            .into_iter()
            .fold(f64::MIN, f64::max)
    }

    /// Flow out of and into the building through an opening to the open air whose
    /// first side is a room.
    fn out_in(&self, name: &str, from: f64, to: f64) -> [f64; 2] {
        let opening = self.opening(name);
        [Q::FlowForward, Q::FlowBackward].map(|q| self.mean(opening, q, from, to))
    }
}

const ZERO: f64 = 273.15;

#[test]
fn practice_window_upstairs_turns_the_front_door_to_inflow() {
    let base = play("weir-cottage.toml", None);
    let high = play("weir-cottage.toml", Some("landing_window_too"));
    let [out, into] = base.out_in("front_door", 360.0, 480.0);
    let [high_out, high_in] = high.out_in("front_door", 360.0, 480.0);
    let [window_out, window_in] = high.out_in("landing_window", 360.0, 480.0);
    println!("front door alone: out {out:.2}, in {into:.2} kg/s");
    println!(
        "with the landing window: out {high_out:.2}, in {high_in:.2}; window out {window_out:.2}, in {window_in:.2}"
    );
    assert!(out > 0.2 * into, "two-way without the window");
    assert!(high_out < 0.05 * high_in, "in only with it");
    assert!(window_out > 0.5 && window_in < 0.05 * window_out);
}

#[test]
fn practice_wind_makes_a_hot_one_way_mixed_path() {
    let wind = play("cormorant-house.toml", None);
    let calm = play("cormorant-house.toml", Some("calm"));
    let span = (330.0, 420.0);
    let corridor = |p: &Played, q| p.mean(p.room("corridor"), q, span.0, span.1);
    let flat = wind.opening("flat_door");
    let [with, against] =
        [Q::FlowForward, Q::FlowBackward].map(|q| wind.mean(flat, q, span.0, span.1));
    let crew = wind.most(
        wind.station("corridor_crew"),
        Q::StationTemperature,
        300.0,
        600.0,
    ) - ZERO;
    println!(
        "9 m/s: flat door {with:.2} / {against:.2} kg/s, mixed {:.2}, crew at most {crew:.0} °C; calm: mixed {:.2}",
        corridor(&wind, Q::MixedShare),
        corridor(&calm, Q::MixedShare)
    );
    assert!(against < 0.01 * with, "one way");
    assert!(corridor(&wind, Q::MixedShare) > 0.9);
    assert!(crew > 400.0);
    assert!(
        corridor(&calm, Q::MixedShare) < 0.1,
        "calm keeps two layers"
    );
    let layers = [Q::UpperTemperature, Q::LowerTemperature].map(|q| corridor(&calm, q));
    assert!(layers[0] - layers[1] > 50.0);

    let shut = play("cormorant-house.toml", Some("flat_door_shut"));
    let left = shut.mean(shut.opening("flat_door"), Q::FlowForward, span.0, span.1);
    println!("flat door shut: {left:.3} kg/s");
    assert!(left < 0.1 * with, "the door is the switch");
}

#[test]
fn practice_a_fan_needs_an_outlet() {
    let natural = play("gannet-lane.toml", None);
    let outlet = play("gannet-lane.toml", Some("outlet_then_fan"));
    let none = play("gannet-lane.toml", Some("fan_without_outlet"));
    let against = play("gannet-lane.toml", Some("wind_on_the_outlet"));
    let span = (415.0, 455.0);
    let pressure = |p: &Played| p.mean(p.room("corridor_front"), Q::Pressure, span.0, span.1);
    let side = |p: &Played| {
        let gap = p.opening("surgery_door");
        [Q::FlowForward, Q::FlowBackward].map(|q| p.mean(gap, q, span.0, span.1))
    };
    let crew = |p: &Played| p.mean(p.station("crew"), Q::StationTemperature, span.0, span.1) - ZERO;
    let window = |p: &Played| p.out_in("fire_room_window", span.0, span.1)[0];
    for (name, p) in [
        ("natural", &natural),
        ("outlet", &outlet),
        ("none", &none),
        ("wind", &against),
    ] {
        println!(
            "{name}: corridor {:.1} Pa, surgery gap {:.3?} kg/s, crew {:.0} °C, window out {:.2} kg/s",
            pressure(p),
            side(p),
            crew(p),
            window(p)
        );
    }
    assert!(
        pressure(&none) > pressure(&outlet) + 5.0,
        "a dead end is pressed"
    );
    let into_side = |p: &Played| side(p)[0].max(side(p)[1]);
    assert!(
        into_side(&none) > 1.5 * into_side(&outlet),
        "smoke into the side room"
    );
    assert!(crew(&outlet) < crew(&natural), "clearer with an outlet");
    assert!(
        window(&against) < window(&outlet),
        "wind on the outlet takes from the fan"
    );
}
