//! What people meet at stations: gas at head height on a reconstructed
//! profile of finite thickness, and the radiation of the smoke layer above.
//!
//! Two-layer values are means over a layer. Nobody stands in a mean, so the
//! station columns are reconstructed from them and labelled so.

pub mod flux;
pub mod profile;

use crate::physics::visibility::{REFLECTING, visibility};
use crate::plan::{Plan, Station};
use crate::record::{Column, Quantity, Record, Subject};

/// Largest visibility that is reported, m. Jin's tests did not go further.
pub const FARTHEST_VISIBILITY: f64 = 30.0;

/// Appends the columns of every station of the plan to the record. Columns of
/// stations that are already there are replaced, so that it may be called
/// again after a change of heights.
pub fn observe(record: &mut Record, plan: &Plan) {
    record
        .columns
        .retain(|column| !matches!(column.subject, Subject::Station(_)));
    let mut found = Vec::new();
    for (index, station) in plan.stations.iter().enumerate() {
        let subject = Subject::Station(index);
        for (quantity, values) in station_columns(record, plan, station) {
            found.push(Column {
                subject,
                quantity,
                values,
            });
        }
    }
    record.columns.append(&mut found);
    record.names.stations = plan.stations.iter().map(|s| s.name.clone()).collect();
}

/// Histories of one station, in the order of columns.
fn station_columns(record: &Record, plan: &Plan, station: &Station) -> Vec<(Quantity, Vec<f64>)> {
    let room = Subject::Room(station.room.0);
    let share = upper_shares(record, plan, station);
    let mixed = |lower: Quantity, upper: Quantity| -> Vec<f64> {
        let lower = record.get(room, lower);
        let upper = record.get(room, upper);
        share
            .iter()
            .enumerate()
            .map(|(row, &share)| profile::between(at(lower, row), at(upper, row), share))
            .collect()
    };
    let soot = mixed(Quantity::LowerSoot, Quantity::UpperSoot);
    vec![
        (
            Quantity::StationTemperature,
            mixed(Quantity::LowerTemperature, Quantity::UpperTemperature),
        ),
        (
            Quantity::StationOxygen,
            mixed(Quantity::LowerOxygenDry, Quantity::UpperOxygenDry),
        ),
        (
            Quantity::StationCarbonMonoxide,
            mixed(Quantity::LowerCarbonMonoxide, Quantity::UpperCarbonMonoxide),
        ),
        (
            Quantity::StationCarbonDioxide,
            mixed(Quantity::LowerCarbonDioxide, Quantity::UpperCarbonDioxide),
        ),
        (
            Quantity::StationVisibility,
            soot.into_iter().map(seen).collect(),
        ),
        (Quantity::StationFlux, fluxes(record, plan, station)),
    ]
}

/// Distance at which a reflecting object is lost, m, for soot in kg/m3.
fn seen(soot: f64) -> f64 {
    if soot.is_nan() {
        f64::NAN
    } else {
        visibility(REFLECTING, soot, FARTHEST_VISIBILITY)
    }
}

/// Share of upper-layer gas at the station's head at every output time.
fn upper_shares(record: &Record, plan: &Plan, station: &Station) -> Vec<f64> {
    let interface = record.get(Subject::Room(station.room.0), Quantity::Interface);
    let height = room_height(plan, station);
    (0..record.time.len())
        .map(|row| {
            let interface = at(interface, row);
            let thickness =
                profile::fitting_thickness(plan.choices.profile_thickness, interface, height);
            profile::upper_share(station.height, interface, thickness)
        })
        .collect()
}

/// Radiation of layer and ceiling at the station's head at every output time,
/// less what surfaces at the temperature of the start would send.
fn fluxes(record: &Record, plan: &Plan, station: &Station) -> Vec<f64> {
    let room = Subject::Room(station.room.0);
    let interface = record.get(room, Quantity::Interface);
    let upper = record.get(room, Quantity::UpperTemperature);
    let ceiling = record.get(room, Quantity::CeilingTemperature);
    let emissivity = record.get(room, Quantity::LayerEmissivity);
    let Some(plan_room) = plan.rooms.get(station.room.0) else {
        return vec![f64::NAN; record.time.len()];
    };
    (0..record.time.len())
        .map(|row| {
            let drop = at(interface, row) - station.height;
            let share = flux::view_factor_below(plan_room.width, plan_room.length, drop);
            let layer = flux::from_layer(at(emissivity, row), at(upper, row), at(ceiling, row));
            let net = share * (layer - flux::from_layer(1.0, plan_room.temperature, 0.0));
            if net.is_nan() { net } else { net.max(0.0) }
        })
        .collect()
}

/// Height of the station's room, m; not-a-number when there is no such room.
fn room_height(plan: &Plan, station: &Station) -> f64 {
    plan.rooms
        .get(station.room.0)
        .map_or(f64::NAN, |room| room.height)
}

/// Value of a history at a row, not-a-number beyond its end.
fn at(values: &[f64], row: usize) -> f64 {
    values.get(row).copied().unwrap_or(f64::NAN)
}
