//! Tight groups: rooms joined by openings with so little way to anywhere else
//! that the quasi-steady pressure would be wrong or not exist. They carry one
//! dynamic mean pressure; when they are opened, joined or shut off, the
//! pressures even out isentropically and the gas that flows is booked.

use super::building::Building;
use super::layers::Layers;
use super::layout::{Account, LOWER, Layout, UPPER};
use super::pressure::TightGroup;
use super::schedule::Stand;
use crate::plan::{Opening, Plan, Space};

/// Flow coefficient times area per volume of a room (or group) below which a
/// way out of it is tight, 1/m (the quasi-steady error passes 1 K near here).
const TIGHT: f64 = 2e-5;

/// Ratio of heat capacities for evening out, air.
const GAMMA: f64 = 1.4;

/// Quasi-steady pressure difference across an opening at which it is taken for
/// tight whatever its area, Pa.
pub const OVERPRESSURE: f64 = 2000.0;

/// Pressure difference at which that ends, Pa.
pub const RELEASE: f64 = 500.0;

fn area(opening: &Opening, stand: &Stand) -> f64 {
    stand.coefficient_width * (opening.head - opening.sill)
}

/// Rooms joined by openings wide enough for a quasi-steady difference, each
/// list rising, in the order of first rooms.
fn joined(plan: &Plan, building: &Building, stands: &[Stand], cut: &[bool]) -> Vec<Vec<usize>> {
    let n = plan.rooms.len();
    let mut label: Vec<usize> = (0..n).collect();
    for ((opening, stand), cut) in plan.openings.iter().zip(stands).zip(cut) {
        let (Space::Room(a), Space::Room(b)) = (opening.from, opening.to) else {
            continue;
        };
        let volume = building.rooms[a.0].volume.min(building.rooms[b.0].volume);
        if !cut && area(opening, stand) >= TIGHT * volume {
            let (keep, drop) = (label[a.0].min(label[b.0]), label[a.0].max(label[b.0]));
            label
                .iter_mut()
                .filter(|l| **l == drop)
                .for_each(|l| *l = keep);
        }
    }
    (0..n)
        .filter(|r| label[*r] == *r)
        .map(|first| (0..n).filter(|r| label[*r] == first).collect())
        .collect()
}

/// Tight groups of a stretch; openings that are `cut` count as tight.
pub fn tight(plan: &Plan, building: &Building, stands: &[Stand], cut: &[bool]) -> Vec<TightGroup> {
    joined(plan, building, stands, cut)
        .into_iter()
        .filter(|rooms| {
            let volume: f64 = rooms.iter().map(|r| building.rooms[*r].volume).sum();
            let way_out: f64 = plan
                .openings
                .iter()
                .zip(stands)
                .zip(cut)
                .filter(|((o, _), cut)| !**cut && leads_out(o, rooms))
                .map(|((o, s), _)| area(o, s))
                .sum();
            way_out < TIGHT * volume
        })
        .map(|rooms| TightGroup { rooms })
        .collect()
}

fn leads_out(opening: &Opening, rooms: &[usize]) -> bool {
    match (opening.from, opening.to) {
        (Space::Room(r), Space::OpenAir) | (Space::OpenAir, Space::Room(r)) => rooms.contains(&r.0),
        _ => false,
    }
}

/// Energy of gas (above 298.15 K, less pressure times volume) and linings
/// (above their start), J.
fn energy(building: &Building, layers: &Layers, areas: &[f64], y: &[f64]) -> f64 {
    let mut total = 0.0;
    for (k, layer) in layers.layers[..layers.outside()].iter().enumerate() {
        total += layer.mass * layer.enthalpy - layers.pressure[k / 2] * layer.volume;
    }
    for (s, area) in areas.iter().enumerate() {
        total += area * building.stored(s, y);
    }
    total
}

/// Makes the state fit new tight groups: rooms whose mean pressure changes
/// give off or take up gas isentropically; what crosses the boundary is booked
/// in the ledger accounts of the state.
pub fn settle(
    building: &Building,
    layers: &mut Layers,
    areas: &[f64],
    y: &mut [f64],
    old: &[TightGroup],
    new: &[TightGroup],
) {
    let layout = &building.layout;
    let n = building.rooms.len();
    let mut before = vec![0.0; n];
    for group in old {
        let pressure = y[layout.pressure(group.rooms[0])];
        group.rooms.iter().for_each(|r| before[*r] = pressure);
    }
    let mut after = vec![0.0; n];
    for group in new {
        let (mut sum, mut volume) = (0.0, 0.0);
        for &r in &group.rooms {
            sum += before[r] * building.rooms[r].volume;
            volume += building.rooms[r].volume;
        }
        group.rooms.iter().for_each(|r| after[*r] = sum / volume);
    }
    if before.iter().zip(&after).any(|(b, a)| (b - a).abs() > 1e-9) {
        let start = content(building, layers, areas, y, &before);
        even_out(building, y, &before, &after, new);
        let end = content(building, layers, areas, y, &after);
        book(layout, y, &start, &end);
    }
    for r in 0..n {
        y[layout.pressure(r)] = 0.0;
    }
    for group in new {
        y[layout.pressure(group.rooms[0])] = after[group.rooms[0]];
    }
}

/// Mass, oxygen, carbon (kg) and energy (J) in the building.
pub fn content(
    building: &Building,
    layers: &mut Layers,
    areas: &[f64],
    y: &[f64],
    mean_pressure: &[f64],
) -> [f64; 4] {
    let mut sums = [0.0; 4];
    for room in 0..building.rooms.len() {
        for layer in [LOWER, UPPER] {
            let masses = &y[building.layout.layer(room, layer)];
            sums[0] += masses.iter().sum::<f64>();
            sums[1] += super::layers::dot(masses, &building.oxygen_share);
            sums[2] += super::layers::dot(masses, &building.carbon_share);
        }
    }
    layers.read(building, y, mean_pressure);
    sums[3] = energy(building, layers, areas, y);
    sums
}

fn book(layout: &Layout, y: &mut [f64], start: &[f64; 4], end: &[f64; 4]) {
    for (i, account) in [
        Account::MassLost,
        Account::OxygenLost,
        Account::CarbonLost,
        Account::EnergyLost,
    ]
    .into_iter()
    .enumerate()
    {
        y[layout.account(account)] += start[i] - end[i];
    }
}

/// Rooms above their new pressure give off gas (kept in a pool per tight
/// group, or lost outside), rooms below take it up (from the pool, or outside
/// air), spread over their layers by volume.
fn even_out(
    building: &Building,
    y: &mut [f64],
    before: &[f64],
    after: &[f64],
    groups: &[TightGroup],
) {
    let species = building.gas.len();
    let group_of = |room: usize| groups.iter().position(|g| g.rooms.contains(&room));
    let mut pools = vec![vec![0.0; species]; groups.len()];
    for room in 0..building.rooms.len() {
        if before[room] <= after[room] {
            continue;
        }
        let ratio = (building.pressure + after[room]) / (building.pressure + before[room]);
        let keep = ratio.powf(1.0 / GAMMA);
        for layer in [LOWER, UPPER] {
            for (s, at) in building.layout.layer(room, layer).enumerate() {
                if let Some(group) = group_of(room) {
                    pools[group][s] += y[at] * (1.0 - keep);
                }
                y[at] *= keep;
            }
        }
    }
    for room in 0..building.rooms.len() {
        if before[room] >= after[room] {
            continue;
        }
        let gain: Vec<f64> = if let Some(group) = group_of(room) {
            let want = |r: usize| building.rooms[r].volume * (after[r] - before[r]).max(0.0);
            let whole: f64 = groups[group].rooms.iter().map(|r| want(*r)).sum();
            pools[group]
                .iter()
                .map(|m| m * want(room) / whole)
                .collect()
        } else {
            let ratio = (building.pressure + before[room]) / (building.pressure + after[room]);
            let mass = building.air_density
                * building.rooms[room].volume
                * (1.0 - ratio.powf(1.0 / GAMMA));
            building.air.iter().map(|f| f * mass).collect()
        };
        let upper = y[building.layout.upper_volume(room)] / building.rooms[room].volume;
        for (layer, share) in [(LOWER, 1.0 - upper), (UPPER, upper)] {
            for (at, mass) in building.layout.layer(room, layer).zip(&gain) {
                y[at] += share * mass;
            }
        }
    }
}
