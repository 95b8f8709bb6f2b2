//! What moves air in a scenario: wind, levels, glass, fans, conditions, own
//! models; against hand figures.

#![allow(clippy::unwrap_used)]

use doorglow::plan::{Effect, FanKind, Opening, OpeningKind, Plan, Watched};
use doorglow::scenario;

const WEIR: &str = include_str!("../scenarios/weir-cottage.toml");
const CORMORANT: &str = include_str!("../scenarios/cormorant-house.toml");
const GANNET: &str = include_str!("../scenarios/gannet-lane.toml");

fn load(text: &str, tactic: Option<&str>) -> Plan {
    match scenario::load("test.toml", text, tactic) {
        Ok(plan) => plan,
        Err(report) => panic!("{}", report.render(false, 100)),
    }
}

fn opening<'a>(plan: &'a Plan, name: &str) -> &'a Opening {
    plan.openings.iter().find(|o| o.name == name).unwrap()
}

fn tactics(text: &str) -> Vec<String> {
    let names = text
        .lines()
        .filter_map(|line| line.strip_prefix("[tactic."));
    names
        .map(|name| name.trim_end_matches(']').to_owned())
        .collect()
}

#[test]
fn verify_shipped_scenarios_and_all_their_tactics_round_trip() {
    for text in [WEIR, CORMORANT, GANNET] {
        let tactics = tactics(text);
        assert!(tactics.len() >= 5, "{tactics:?}");
        for tactic in tactics.iter().map(|name| Some(name.as_str())).chain([None]) {
            let mut plan = load(text, tactic);
            let resolved = scenario::resolved_text(&plan);
            let again = load(&resolved, None);
            plan.tactic = None;
            assert_eq!(format!("{plan:#?}"), format!("{again:#?}"), "{resolved}");
            assert!(!scenario::building_text(&plan).is_empty());
        }
    }
}

#[test]
fn verify_weir_cottage_as_written_down() {
    let plan = load(WEIR, None);
    let volume: f64 = plan.rooms.iter().map(doorglow::plan::Room::volume).sum();
    assert!((volume - 196.0).abs() < 1.0, "{volume}");
    let stair = opening(&plan, "stair");
    assert_eq!(stair.kind, OpeningKind::Stair);
    assert_eq!((stair.area, stair.exchange_factor), (2.0, 3.0));
    assert_eq!((stair.sill, stair.head), (2.4, 2.4));
    assert_eq!(stair.clear_width, stair.width);
    assert!(plan.rooms[3].floor_level > 2.4);
    let fails = load(WEIR, Some("living_window_fails"));
    assert_eq!(fails.triggers.len(), 1);
    assert_eq!(fails.triggers[0].level, 873.15);
    assert!(!fails.triggers[0].only_widens);
}

/// Check values (s): 0.5 rho v2 Cp, +0.7 to windward and -0.3 on the roof, at
/// 1.2 kg/m3; here the air of 10 °C is denser by 3 to 4 %.
#[test]
fn formula_wind_on_cormorant_house() {
    for (tactic, windward) in [(None, 34.0), (Some("breeze"), 10.5), (Some("calm"), 0.0)] {
        let plan = load(CORMORANT, tactic);
        let window = opening(&plan, "window").wind_pressure;
        assert!((window - windward).abs() <= 0.05 * windward, "{window}");
        let roof = opening(&plan, "roof_hatch").wind_pressure;
        assert!(
            (roof + windward * 0.3 / 0.7).abs() <= 0.05 * windward,
            "{roof}"
        );
        let leak = opening(&plan, "flat in living").wind_pressure;
        assert_eq!(leak, window);
        assert_eq!(opening(&plan, "flat_door").wind_pressure, 0.0);
    }
}

#[test]
fn verify_the_window_of_cormorant_house_falls_out() {
    let plan = load(CORMORANT, None);
    let window = opening(&plan, "window");
    assert_eq!(window.pane.as_ref().unwrap().name, "double");
    assert_eq!(plan.triggers.len(), 1);
    let trigger = &plan.triggers[0];
    assert!(trigger.only_widens && trigger.rising);
    assert!(matches!(trigger.watched, Watched::UpperTemperature(room) if room.0 == 0));
    assert_eq!((trigger.level, trigger.delay), (773.15, 0.0));
    let timed: Vec<_> = plan
        .actions
        .iter()
        .filter(|a| a.what == "falls out")
        .collect();
    assert_eq!(timed.len(), 1);
    assert_eq!(timed[0].time, 240.0);
    assert!(matches!(timed[0].effect, Effect::ClearWidth { width, .. } if width == 2.0));
    let holds = load(CORMORANT, Some("window_holds"));
    assert!(holds.triggers.is_empty());
    assert_eq!(holds.actions.len(), 2);
}

#[test]
fn verify_divisions_take_the_smaller_section() {
    let plan = load(CORMORANT, None);
    let middle = opening(&plan, "corridor_middle");
    assert_eq!((middle.sill, middle.head, middle.width), (0.0, 2.5, 1.5));
    assert_eq!(middle.clear_width, 1.5);
    let door = opening(&plan, "stair_door");
    assert_eq!(door.head, 2.0);
}

#[test]
fn verify_fan_of_gannet_lane() {
    let plan = load(GANNET, Some("outlet_then_fan"));
    let fan = &plan.fans[0];
    assert_eq!((fan.free_flow, fan.dead_end_pressure), (5.0, 40.0));
    let FanKind::PositivePressure {
        opening: at,
        covers,
    } = fan.kind
    else {
        panic!("not at a door");
    };
    assert_eq!(plan.openings[at.0].name, "front_door");
    assert_eq!(covers, 1.0);
    assert!(!fan.running);
    let starts = plan.actions.last().unwrap();
    assert_eq!(starts.time, 400.0);
    assert!(matches!(starts.effect, Effect::Fan { running: true, .. }));
    // 4 m/s on the window: 6.7 Pa at 1.2 kg/m3.
    let windy = load(GANNET, Some("wind_on_the_outlet"));
    let pressure = opening(&windy, "fire_room_window").wind_pressure;
    assert!((pressure - 6.7).abs() < 0.05 * 6.7, "{pressure}");
}

const SHED: &str = r#"
title = "Boat shed in Kestrova"
duration = "5 min"
models = "own.toml"

[room.shed]
width = "10 m"
length = "10 m"
height = "2.5 m"
walls = "own boards"

[opening.door]
between = ["shed", "open air"]
width = "1.0 m"
head = "2.0 m"
position = "elbow"
leaf = "paper"

[opening.window]
kind = "window"
between = ["shed", "open air"]
width = "1.0 m"
sill = "1.0 m"
head = "2.0 m"
glass = "double"

[leakage.shed]
rooms = ["shed"]
air_changes = "5 per hour at 50 Pa"

[item.boat]
room = "shed"
fuel = "own resin"
mass = "50 kg"
growth = "boat"
peak = "1 MW"
surface_height = "0.5 m"

[[action]]
name = "narrower"
at = "1 min"
set = "door"
to = "boot"
"#;

const OWN: &str = r#"
[[fuel]]
name = "own resin"
like = "polyurethane foam"
soot_yield = 0.12
source = "invented"

[[lining]]
name = "own boards"
courses = [{ thickness = "20 mm", conductivity = "0.13 W/m/K", density = "500 kg/m3", heat_capacity = "1600 J/kg/K" }]
source = "invented"

[[glass]]
name = "double"
thickness = "6 mm"
layer = "500 °C"
source = "goes before the catalogue's"

[[leaf]]
name = "paper"
layer = "200 °C"
delay = "10 s"
source = "invented"

[[growth]]
name = "boat"
factor = "0.02 kW/s2"
source = "invented"

[[position]]
name = "elbow"
clear_width = "40 cm"
source = "invented"

[[position]]
name = "boot"
share = 0.1
source = "invented"
"#;

#[test]
fn verify_own_models_go_before_the_catalogue() {
    let beside = |name: &str| {
        assert_eq!(name, "own.toml");
        Ok(OWN.to_owned())
    };
    let loaded = scenario::load_beside("shed.toml", SHED, None, &beside)
        .unwrap_or_else(|report| panic!("{}", report.render(false, 100)));
    assert_eq!(loaded.cautions.render(false, 80), "");
    assert_eq!(loaded.models.unwrap().name, "own.toml");
    let plan = loaded.plan;
    assert_eq!(plan.fuels[0].soot_yield, 0.12);
    assert_eq!(plan.rooms[0].walls.courses[0].thickness, 0.02);
    assert_eq!(opening(&plan, "door").clear_width, 0.4);
    assert_eq!(
        opening(&plan, "window").pane.as_ref().unwrap().thickness,
        0.006
    );
    let levels: Vec<f64> = plan.triggers.iter().map(|trigger| trigger.level).collect();
    assert_eq!(levels, [473.15, 773.15]);
    // Readable without the models file.
    let again = load(&scenario::resolved_text(&plan), None);
    assert_eq!(again.fuels, plan.fuels);
    assert_eq!(again.openings[1].pane, plan.openings[1].pane);
    assert_eq!(again.triggers, plan.triggers);
    assert_eq!(again.actions[0].effect, plan.actions[0].effect);
}

/// Check values (o): 5 air changes at 50 Pa of 250 m3 are 0.063 m2 of orifice.
#[test]
fn formula_leakage_of_an_air_tightness_figure() {
    let beside = |_: &str| Ok(OWN.to_owned());
    let plan = scenario::load_beside("shed.toml", SHED, None, &beside)
        .unwrap()
        .plan;
    let leak = opening(&plan, "shed in shed");
    assert!((leak.gap_area - 0.063).abs() < 0.001, "{}", leak.gap_area);
    assert_eq!(leak.gap_coefficient, 0.6);
}

/// The catalogue and the formulas of glass and doors say the same.
#[test]
fn formula_glass_and_doors_as_in_physics() {
    use doorglow::catalogue::catalogue;
    use doorglow::physics::glass;
    for (name, of) in [
        ("single thin", glass::SINGLE_THIN),
        ("single thick", glass::SINGLE_THICK),
        ("double", glass::DOUBLE),
    ] {
        let row = catalogue().glass(name).unwrap();
        assert_eq!(row.layer, of.gas_temperature, "{name}");
        assert_eq!(row.pane.thickness, of.thickness);
        assert_eq!(row.pane.density, glass::DENSITY);
        assert_eq!(row.pane.heat_capacity, glass::HEAT_CAPACITY);
        assert_eq!(row.pane.emissivity, glass::EMISSIVITY);
        assert!(row.rise > of.crack_rise);
    }
    let hollow = catalogue().leaf("hollow").unwrap();
    assert_eq!(hollow.layer, glass::HOLLOW_DOOR_TEMPERATURE);
    assert_eq!(hollow.delay, glass::HOLLOW_DOOR_DELAY);
}
