//! The scenario reader: shipped scenarios, round trip, reference page, and
//! that no text makes it panic.

#![allow(clippy::unwrap_used)]

use doorglow::plan::{Action, Burning, Curve, Effect, OpeningKind, Plan, Space};
use doorglow::scenario;
use proptest::prelude::*;

const LARCH_ROW: &str = include_str!("../scenarios/larch-row-3.toml");
const TACTICS: [&str; 6] = [
    "hold_the_door",
    "hand_width_from_entry",
    "bedroom_door_shut",
    "never_opened",
    "window_too",
    "window_falls_out",
];

fn load(text: &str, tactic: Option<&str>) -> Plan {
    match scenario::load("test.toml", text, tactic) {
        Ok(plan) => plan,
        Err(report) => panic!("{}", report.render(false, 100)),
    }
}

fn clear_width(plan: &Plan, name: &str) -> f64 {
    let opening = plan.openings.iter().find(|opening| opening.name == name);
    opening.unwrap().clear_width
}

fn width_of(action: &Action) -> f64 {
    match action.effect {
        Effect::ClearWidth { width, .. } => width,
        Effect::Fan { .. } => panic!("moves a fan"),
    }
}

#[test]
fn verify_larch_row_3_as_written_down() {
    let loaded = scenario::load_with_cautions("larch-row-3.toml", LARCH_ROW, None).unwrap();
    assert_eq!(loaded.cautions.render(false, 100), "");
    let plan = loaded.plan;
    let floor: f64 = plan
        .rooms
        .iter()
        .map(doorglow::plan::Room::floor_area)
        .sum();
    assert!((floor - 96.0).abs() < 0.5, "{floor}");
    assert_eq!(plan.rooms[0].name, "bedroom");
    let leak: f64 = plan
        .openings
        .iter()
        .filter(|opening| opening.kind == OpeningKind::Gap)
        .map(|opening| opening.gap_area)
        .sum();
    assert!((leak - 0.06).abs() < 1e-12);
    assert_eq!(plan.actions.len(), 1);
    assert_eq!(plan.actions[0].time, 480.0);
    assert_eq!(width_of(&plan.actions[0]), 0.9);
    let item = &plan.items[0];
    assert_eq!(item.mass, 21.0);
    let Burning::Growing(Curve::Growth { alpha, peak }) = item.burning else {
        panic!("not growing");
    };
    assert!((alpha - 46.9).abs() < 1e-9);
    assert_eq!(peak, 1.4e6);
    let fuel = &plan.fuels[0];
    let heat = fuel.heat_of_combustion - 32.8e6 * fuel.soot_yield - 10.1e6 * fuel.co_yield;
    let released = item.mass * (1.0 - fuel.residue_share) * heat;
    assert!((released / 370e6 - 1.0).abs() < 0.01, "{released}");
    assert_eq!(plan.stations[0].height, 1.0);
    assert_eq!(plan.openings[0].to, Space::OpenAir);
}

#[test]
fn verify_tactics_add_replace_drop_and_start() {
    let hold = load(LARCH_ROW, Some("hold_the_door"));
    let times: Vec<f64> = hold.actions.iter().map(|action| action.time).collect();
    assert_eq!(times, [480.0, 540.0]);
    assert_eq!(width_of(&hold.actions[1]), 0.13);
    assert_eq!(hold.tactic.as_deref(), Some("hold_the_door"));

    let hand = load(LARCH_ROW, Some("hand_width_from_entry"));
    assert_eq!(hand.actions.len(), 1);
    assert_eq!(width_of(&hand.actions[0]), 0.13);
    assert_eq!(hand.actions[0].what, "hand's width");

    let shut = load(LARCH_ROW, Some("bedroom_door_shut"));
    assert_eq!(clear_width(&shut, "bedroom_door"), 0.0);
    assert_eq!(clear_width(&load(LARCH_ROW, None), "bedroom_door"), 0.8);
    assert!(load(LARCH_ROW, Some("never_opened")).actions.is_empty());
    assert_eq!(load(LARCH_ROW, Some("window_too")).actions.len(), 2);
    assert_eq!(
        load(LARCH_ROW, Some("window_falls_out")).actions[0].time,
        240.0
    );
}

#[test]
fn verify_unknown_tactic_names_the_near_one() {
    let report = scenario::load("larch-row-3.toml", LARCH_ROW, Some("hold_door")).unwrap_err();
    insta::assert_snapshot!(report.render(false, 80));
}

/// A scenario that uses what Larch Row 3 does not.
const EVERYTHING: &str = r#"
title = "Everything \"else\" at once"
duration = "1 h 30 min"

[room."Room 1"]
width = "12 ft"
length = "16 ft"
height = "8 ft"
walls = "own wall"
behind = "open air"
temperature = "66 °F"

[room.two]
width = "3 m"
length = "3.3 m"
height = "2.37 m"
behind = "12.3 °C"

[lining."own wall"]
emissivity = "85 %"
courses = [
  { thickness = "0.5 in", conductivity = "0.17 W/m/K", density = "49 lb/ft3", heat_capacity = "1090 J/kg/K" },
  { thickness = "10 cm", conductivity = "0.04 W/m/K", density = "60 kg/m3", heat_capacity = "840 J/kg/K" },
]

[shared_wall.between]
between = ["Room 1", "two"]
length = "3 m"

[opening.door]
between = ["Room 1", "two"]
width = "32 in"
head = "6 ft 8 in"
position = "one third"

[opening.slot]
kind = "gap"
between = ["two", "open air"]
sill = "0.1 m"
head = "0.3 m"
gap = "12 in2"

[leakage.house]
rooms = ["two", "Room 1"]
area = "0.03 m2"

[item.sofa]
room = "Room 1"
fuel = "sofa"
mass = "40 lb"
burns = "as given"
growth = [["0 s", "0 kW"], ["61.7 s", "200 kW"], ["4 min", "300 Btu/s"], ["10 min", "0 kW"]]
surface_height = "1 ft"
gap_to_wall = "10 cm"
corner = true
soot_yield = 0.07
at = ["1 m", "1 m"]

[item.burner]
room = "two"
kind = "burner"
fuel = "methane"
rate = "123.4 kW"
side = "30 cm"
surface_height = "0.3 m"
starts = "90 s"

[item.chair]
room = "two"
fuel = "sofa"
mass = "12 kg"
growth = "0.02 kW/s2"
peak = "0.7 MW"
surface_height = "0.4 m"

[fuel.sofa]
like = "upholstered furniture"
radiative_fraction = "30 %"

[station.crew]
room = "two"
height = "0.9 m"
out = "320 °F"

[station.instructor]
room = "Room 1"
posture = "standing"
height = "1.75 m"

[limits]
oxygen = "14 %"

[[action]]
name = "later"
at = "10 min"
set = "door"
to = "hose under the door"

[tactic.calm]
wind = { speed = "0 m/s" }
holds = ["pane", "step"]
start = { roof = "open" }

[[action]]
name = "first"
at = "5 min"
set = "door"
to = "20 cm"

[wind]
speed = "20 mph"
direction = "from the north-west"
roof_coefficient = -0.5

[facade.street]
faces = "west"

[facade.yard]
faces = "90 °"
pressure_coefficient = -0.35

[room.attic]
width = "3 m"
length = "3.3 m"
height = "2.1 m"
floor_level = "2.6 m"

[room.passage]
width = "1.2 m"
length = "7 m"
height = "2.4 m"
floor_level = "-20 cm"

[room.passage_end]
width = "7 m"
length = "1.2 m"
height = "2.3 m"

[opening.stairs]
kind = "stair"
between = ["two", "attic"]
area = "2.2 m2"

[opening.trap]
kind = "hatch"
between = ["two", "attic"]
width = "2 ft"
length = "70 cm"
position = "one third"
gap = "0.001 m2"

[opening.roof]
kind = "hatch"
between = ["attic", "open air"]
area = "1.0 m2"

[opening.border]
kind = "division"
between = ["passage", "passage_end"]

[opening.step]
between = ["two", "passage"]
width = "0.8 m"
sill = "0.1 m"
head = "2.1 m"
leaf = "hollow"
gap = "smoke door"

[opening.pane]
kind = "window"
between = ["Room 1", "open air"]
width = "1.3 m"
sill = "0.9 m"
head = "2.0 m"
glass = "double"
facade = "street"
falls_out = { layer = "500 °C", glass = "111.1 K", at = "25 min", fraction = "37 %", delay = "10 s" }

[opening.own_pane]
kind = "window"
between = ["two", "open air"]
width = "1.1 m"
sill = "0.9 m"
head = "2.0 m"
glass = "leaded"
wind_pressure = "12 Pa"

[opening.skylight]
kind = "window"
between = ["attic", "open air"]
width = "0.7 m"
head = "1.0 m"
glass = "single thin"
falls_out = "by glass temperature"
facade = "yard"

[opening.back]
between = ["passage_end", "open air"]
width = "0.9 m"
head = "2.0 m"
facade = "yard"
fails = "at 12 min"

[glass.leaded]
thickness = "2 mm"
layer = "300 °C"

[leakage.upstairs]
rooms = ["attic", "passage"]
air_changes = "5 per hour at 50 Pa"
facade = "yard"

[fan.blower]
kind = "positive pressure"
at = "back"
free_flow = "7000 cfm"
dead_end_pressure = "60 Pa"

[fan.hood]
kind = "extract"
from = "two"
free_flow = "300 m3/h"
dead_end_pressure = "200 Pa"
running = true

[fan.freshener]
kind = "supply"
to = "two"
outlet = "2 m"
free_flow = "30 L/s"
dead_end_pressure = "80 Pa"

[fan.pipe]
kind = "duct"
from = "attic"
to = "two"
free_flow = "0.05 m3/s"
dead_end_pressure = "0.2 in H2O"
running = true

[[action]]
name = "fan on"
at = "6 min"
start = "blower"

[[action]]
name = "fan off"
when = "Room 1 layer temperature > 300 °F"
not_before = "7 min"
delay = "20 s"
stop = "blower"

[[action]]
name = "hatch"
when = "attic smoke level < 4 ft"
set = "roof"
to = "half"
because = "crew on the roof"

[[action]]
name = "shut up"
when = "two oxygen < 15 %"
shut = "door"

[[action]]
name = "fresh"
when = "heat release > 1.5 MW"
start = "freshener"

[physics]
mixing_factor = 0.5
plume = "Heskestad"
placement = "image"
critical_flame_temperature = "1650 K"
tolerance = 1e-6
"#;

#[test]
fn verify_everything_loads_and_is_sorted() {
    let plan = load(EVERYTHING, None);
    assert_eq!(plan.rooms[0].name, "Room 1");
    assert!((plan.rooms[0].height - 2.4384).abs() < 1e-12);
    assert_eq!(plan.actions[0].name, "first");
    assert_eq!(plan.fuels.len(), 3);
    assert_eq!(plan.fuels[0].soot_yield, 0.07);
    assert_eq!(plan.fuels[2].radiative_fraction, 0.3);
    assert_eq!(plan.stations[0].limits.oxygen, 0.14);
    assert!((plan.openings[0].clear_width - 0.8128 / 3.0).abs() < 1e-12);
}

#[test]
fn verify_resolved_text_reads_back_as_the_same_plan() {
    let mut plans = vec![
        load(EVERYTHING, None),
        load(EVERYTHING, Some("calm")),
        load(LARCH_ROW, None),
    ];
    plans.extend(TACTICS.iter().map(|tactic| load(LARCH_ROW, Some(tactic))));
    for mut plan in plans {
        let text = scenario::resolved_text(&plan);
        let again = load(&text, None);
        plan.tactic = None;
        assert_eq!(format!("{plan:#?}"), format!("{again:#?}"), "{text}");
        let mut twice = scenario::resolved_text(&again);
        if let Some((_, rest)) = text.split_once("# Tactic played") {
            let rest = rest.split_once('\n').map_or("", |(_, rest)| rest);
            twice = twice.replacen(
                "# The scenario as it was run, with every default written out.\n",
                "",
                1,
            );
            assert_eq!(rest, twice);
        } else {
            assert_eq!(text, twice);
        }
    }
}

#[test]
fn verify_physics_defaults_are_those_of_the_plan() {
    let plan = load(LARCH_ROW, None);
    assert_eq!(plan.choices, doorglow::plan::Choices::default());
}

#[test]
fn verify_reference_page_is_in_step() {
    let page = scenario::reference_page();
    let path = concat!(env!("CARGO_MANIFEST_DIR"), "/docs/scenario.md");
    if std::env::var_os("UPDATE_REFERENCE").is_some() {
        std::fs::write(path, &page).unwrap();
    }
    let file = std::fs::read_to_string(path).unwrap_or_default();
    assert!(
        file.replace("\r\n", "\n") == page,
        "docs/scenario.md is behind: UPDATE_REFERENCE=1 cargo test --test scenario reference"
    );
}

#[test]
fn verify_building_in_words() {
    insta::assert_snapshot!(scenario::building_text(&load(LARCH_ROW, None)));
}

#[test]
fn verify_hash_is_sha_256() {
    assert_eq!(
        scenario::hash("abc"),
        "ba7816bf8f01cfea414140de5dae2223b00361a396177a9cb410ff61f20015ad"
    );
}

/// An item that overrides a yield of a fuel whose formula is odd.
#[test]
fn regress_item_over_an_odd_fuel() {
    let odd = EVERYTHING.replace("[fuel.sofa]", "[fuel.sofa]\noxygen = 0.14");
    let loaded = scenario::load_with_cautions("odd.toml", &odd, None).unwrap();
    assert!(!loaded.cautions.faults.is_empty());
}

/// Reads and renders; neither may panic, and what is read can be written and
/// read again.
fn read(text: &str) {
    match scenario::load("fuzz.toml", text, None) {
        Ok(plan) => {
            let again = load(&scenario::resolved_text(&plan), None);
            assert_eq!(format!("{plan:#?}"), format!("{again:#?}"));
            assert!(!scenario::building_text(&plan).is_empty());
        }
        Err(report) => {
            assert!(report.errors().next().is_some());
            assert!(!report.render(false, 60).is_empty());
        }
    }
}

/// A valid scenario with some bytes cut out, put in or exchanged.
fn mutated() -> impl Strategy<Value = Vec<u8>> {
    let change = (0..EVERYTHING.len(), 0..12usize, "[\\PC\n]{0,6}");
    (any::<bool>(), proptest::collection::vec(change, 1..6)).prop_map(|(which, changes)| {
        let mut bytes = if which { EVERYTHING } else { LARCH_ROW }
            .as_bytes()
            .to_vec();
        for (at, cut, put) in changes {
            let at = at.min(bytes.len());
            let end = (at + cut).min(bytes.len());
            bytes.splice(at..end, put.into_bytes());
        }
        bytes
    })
}

/// A valid scenario with some lines exchanged, doubled or left out.
fn shuffled() -> impl Strategy<Value = String> {
    proptest::collection::vec((0..200usize, 0..200usize, 0..3u8), 1..8).prop_map(|changes| {
        let mut lines: Vec<&str> = EVERYTHING.lines().collect();
        for (from, to, what) in changes {
            let (from, to) = (from % lines.len(), to % lines.len());
            match what {
                0 => lines.swap(from, to),
                1 => lines.insert(to, lines[from]),
                _ => {
                    lines.remove(from);
                }
            }
        }
        lines.join("\n")
    })
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(400))]

    #[test]
    fn verify_no_bytes_make_the_reader_panic(bytes in proptest::collection::vec(any::<u8>(), 0..400)) {
        if let Ok(text) = scenario::text_from_bytes("fuzz.toml", bytes) {
            read(&text);
        }
    }

    #[test]
    fn verify_no_text_makes_the_reader_panic(text in "[\\[\\]a-z_.=\"0-9 {},\n#'\\\\\\PC]{0,200}") {
        read(&text);
    }

    #[test]
    fn verify_no_mutation_makes_the_reader_panic(bytes in mutated()) {
        if let Ok(text) = scenario::text_from_bytes("fuzz.toml", bytes) {
            read(&text);
        }
    }

    #[test]
    fn verify_no_shuffle_makes_the_reader_panic(text in shuffled()) {
        read(&text);
    }
}

#[test]
fn verify_the_example_at_the_top_of_the_reference_is_complete() {
    let page = scenario::reference_page();
    let example = page.split("```").nth(1).unwrap();
    let text = example.strip_prefix("toml\n").unwrap();
    let loaded = scenario::load_with_cautions("example.toml", text, None).unwrap();
    assert!(loaded.cautions.faults.is_empty(), "{:?}", loaded.cautions);
}
