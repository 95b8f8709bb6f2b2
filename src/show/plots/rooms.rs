//! Which rooms a picture shows, and in which colours.

use super::largest;
use super::palette::ROOMS;
use crate::plan::Plan;
use crate::reading::spoken;
use crate::record::{Quantity, Record, Subject};
use plotters::style::RGBColor;

/// A room in a picture.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct ShownRoom {
    /// Index in the plan.
    pub index: usize,
    /// Its colour in all pictures.
    pub colour: RGBColor,
}

/// The rooms that matter, at most six: those with a fire, those with a
/// station, then the others that warm by more than 10 K, hottest first.
pub fn shown_rooms(record: &Record, plan: &Plan) -> Vec<ShownRoom> {
    let rank = |index: usize| {
        let has_fire = plan.items.iter().any(|item| item.room.0 == index);
        let has_station = plan.stations.iter().any(|at| at.room.0 == index);
        u8::from(!has_fire) + u8::from(!has_fire && !has_station)
    };
    let rise = |index: usize| {
        let peak = largest(record, Subject::Room(index), Quantity::UpperTemperature);
        peak - plan.rooms[index].temperature
    };
    let mut rooms: Vec<usize> = (0..plan.rooms.len())
        .filter(|index| rank(*index) < 2 || rise(*index) > 10.0)
        .collect();
    rooms.sort_by(|a, b| rank(*a).cmp(&rank(*b)).then(rise(*b).total_cmp(&rise(*a))));
    rooms
        .into_iter()
        .zip(ROOMS)
        .map(|(index, colour)| ShownRoom { index, colour })
        .collect()
}

/// Names of the rooms of the plan that are not among those shown, in words;
/// empty when none is left out.
pub fn left_out(plan: &Plan, shown: &[ShownRoom]) -> String {
    let names: Vec<String> = (0..plan.rooms.len())
        .filter(|index| shown.iter().all(|room| room.index != *index))
        .map(|index| spoken(&plan.rooms[index].name))
        .collect();
    if names.is_empty() {
        String::new()
    } else {
        format!("; not drawn: {}", names.join(", "))
    }
}
