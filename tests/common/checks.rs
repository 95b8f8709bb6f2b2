//! What every record must hold, whatever the plan.
#![allow(dead_code)]

use doorglow::physics::gas::O2;
use doorglow::plan::{OpeningKind, Plan, Space};
use doorglow::record::{Ended, Quantity, Record, Subject};

/// Layer guard of the solver, as a share of the room.
pub const LAYER_GUARD: f64 = 2e-3;

/// Columns that are empty (not a number) by definition where nothing flows or
/// there is no glass.
const MAY_BE_EMPTY: [Quantity; 3] = [
    Quantity::NeutralPlane,
    Quantity::TemperatureForward,
    Quantity::PaneTemperature,
];

/// All faults of a record, in words; none when it holds.
pub fn faults(plan: &Plan, record: &Record) -> Vec<String> {
    faults_within(plan, record, 1e-9)
}

/// As [`faults`], with traces of gases and fuel below nothing by at most
/// `slack` let go: a thin layer's share of the tolerance of the whole room.
pub fn faults_within(plan: &Plan, record: &Record, slack: f64) -> Vec<String> {
    let mut faults = Vec::new();
    if record.ended != Ended::Completed {
        faults.push(format!("{:?}", record.ended));
    }
    ledger(record, &mut faults);
    columns(plan, record, slack, &mut faults);
    guarded_layers(plan, record, &mut faults);
    faults
}

fn ledger(record: &Record, faults: &mut Vec<String>) {
    let ledger = &record.ledger;
    for (what, closure, limit) in [
        ("mass", ledger.mass, 1e-6),
        ("oxygen", ledger.oxygen, 1e-6),
        ("carbon", ledger.carbon, 1e-6),
        ("energy", ledger.energy, 1e-3),
    ] {
        if closure.relative.is_nan() || closure.relative > limit {
            faults.push(format!("{what} closes to {:.1e}", closure.relative));
        }
    }
}

fn columns(plan: &Plan, record: &Record, slack: f64, faults: &mut Vec<String>) {
    use Quantity as Q;
    let air = outside_oxygen(plan);
    for column in &record.columns {
        let values = &column.values;
        if values.len() != record.time.len() {
            faults.push(format!("{:?} is of another length", column.quantity));
        }
        let bounds = match column.quantity {
            Q::UpperTemperature
            | Q::LowerTemperature
            | Q::MeanTemperature
            | Q::CeilingTemperature
            | Q::UpperWallTemperature
            | Q::LowerWallTemperature
            | Q::FloorTemperature
            | Q::TemperatureForward => (200.0, 2500.0),
            Q::UpperOxygen | Q::LowerOxygen | Q::BaseOxygen => (-1e-9, air + 1e-3),
            Q::UpperFuel
            | Q::LowerFuel
            | Q::UpperCarbonMonoxide
            | Q::LowerCarbonMonoxide
            | Q::UpperSoot
            | Q::LowerSoot
            | Q::UpperCarbonDioxide
            | Q::LowerCarbonDioxide
            | Q::UpperWater
            | Q::LowerWater
            | Q::GasMass
            | Q::FlowForward
            | Q::FlowBackward
            | Q::FuelLeft
            | Q::BurnedInSmoke
            | Q::BurnedInJets
            | Q::BurnedOutside
            | Q::Burned
            | Q::GivenOff
            | Q::FreeRate => (-slack, f64::INFINITY),
            _ => (f64::NEG_INFINITY, f64::INFINITY),
        };
        let empty = MAY_BE_EMPTY.contains(&column.quantity);
        let bad = values.iter().position(|v| {
            (v.is_nan() && !empty) || v.is_infinite() || *v < bounds.0 || *v > bounds.1
        });
        if let Some(at) = bad {
            faults.push(format!(
                "{:?} {:?} is {:.4e} at {:.0} s",
                column.subject, column.quantity, values[at], record.time[at]
            ));
        }
    }
}

/// Oxygen volume fraction of the outside air, wet.
fn outside_oxygen(plan: &Plan) -> f64 {
    let open = &plan.open_air;
    let vapour = doorglow::physics::humidity::vapour_fraction(
        open.temperature,
        open.humidity,
        open.pressure,
    );
    let air = doorglow::physics::gas::moist_air(vapour, 6);
    let moles: f64 = air
        .iter()
        .zip(doorglow::physics::gas::MOLAR_MASS)
        .map(|(y, m)| y / m)
        .sum();
    air[O2] / doorglow::physics::gas::MOLAR_MASS[O2] / moles
}

/// Time within which a layer at the guard must be back, s.
const BACK_WITHIN: f64 = 60.0;

/// A layer at the guard with gas going into it and nothing that takes gas out
/// must be back (thicker than twice the guard) within a minute.
///
/// Into the lower layer: air from outside through a door or window, colder
/// than the upper layer by 25 K, a twentieth of the room's volume in all; and
/// no item burns low enough for its plume to draw from it. Into the upper
/// layer: a fire below the interface.
///
/// Not in rooms with a way in floor or ceiling or a fan, which take from one
/// layer alone, nor in wind, which mixes them.
fn guarded_layers(plan: &Plan, record: &Record, faults: &mut Vec<String>) {
    for room in 0..plan.rooms.len() {
        if driven(plan, room) {
            continue;
        }
        for upper in [false, true] {
            let mut since = None;
            let mut volume = 0.0;
            for n in 1..record.time.len() {
                let (time, step) = (record.time[n], record.time[n] - record.time[n - 1]);
                let inflow = inflow(plan, record, room, upper, n);
                let share = upper_share(plan, record, room, n);
                let share = if upper { share } else { 1.0 - share };
                if share > 2.0 * LAYER_GUARD || inflow <= 0.0 {
                    (since, volume) = (None, 0.0);
                    continue;
                }
                volume += inflow * step;
                let from = *since.get_or_insert(time - step);
                if time - from > BACK_WITHIN && volume > 0.05 * plan.rooms[room].volume() {
                    let which = if upper { "upper" } else { "lower" };
                    faults.push(format!(
                        "room {room}: {which} layer at the guard from {from:.0} to {time:.0} s with {volume:.1} m3 going in"
                    ));
                    break;
                }
            }
        }
    }
}

/// True where more than the fire moves the air of a room.
fn driven(plan: &Plan, room: usize) -> bool {
    let here = |space| space == Space::Room(doorglow::plan::RoomId(room));
    let lying =
        |o: &doorglow::plan::Opening| o.kind.is_horizontal() && (here(o.from) || here(o.to));
    !plan.fans.is_empty()
        || plan
            .openings
            .iter()
            .any(|o| o.wind_pressure != 0.0 || lying(o))
}

fn upper_share(plan: &Plan, record: &Record, room: usize, n: usize) -> f64 {
    1.0 - record.get(Subject::Room(room), Quantity::Interface)[n] / plan.rooms[room].height
}

/// Gas that goes into a layer for certain, m3/s at the outside density.
fn inflow(plan: &Plan, record: &Record, room: usize, upper: bool, n: usize) -> f64 {
    let of_room = |quantity| record.get(Subject::Room(room), quantity)[n];
    let interface = of_room(Quantity::Interface);
    let own = |i: &usize| plan.items[*i].room.0 == room;
    let burning = |i: &usize| record.get(Subject::Item(*i), Quantity::Burned)[n];
    let items = || (0..plan.items.len()).filter(own);
    if upper {
        // A plume carries at least its own heat's volume: 0.28 m3/s per 100 kW.
        return items()
            .filter(|i| plan.items[*i].surface_height < interface - 0.2 && burning(i) > 5e3)
            .map(|i| 2.8e-6 * burning(&i))
            .sum();
    }
    let drawn = items().any(|i| {
        plan.items[i].surface_height < interface + 0.1
            && record.get(Subject::Item(i), Quantity::GivenOff)[n] > 0.0
    });
    if drawn || of_room(Quantity::UpperTemperature) < plan.open_air.temperature + 25.0 {
        return 0.0;
    }
    let doors = plan.openings.iter().enumerate().filter(|(o, opening)| {
        opening.kind != OpeningKind::Gap
            && record.get(Subject::Opening(*o), Quantity::ClearWidth)[n] > 0.5 * opening.width
    });
    doors
        .map(|(o, opening)| match (opening.from, opening.to) {
            (Space::Room(r), Space::OpenAir) if r.0 == room => {
                record.get(Subject::Opening(o), Quantity::FlowBackward)[n]
            }
            (Space::OpenAir, Space::Room(r)) if r.0 == room => {
                record.get(Subject::Opening(o), Quantity::FlowForward)[n]
            }
            _ => 0.0,
        })
        .sum::<f64>()
        / 1.2
}
