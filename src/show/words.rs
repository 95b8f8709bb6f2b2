//! Names and labels that need the plan.

use crate::plan::{Plan, Space};
use crate::record::{Column, Subject};

/// The name of a side of an opening.
pub fn space_name(plan: &Plan, space: Space) -> &str {
    match space {
        Space::Room(room) => plan.rooms.get(room.0).map_or("?", |room| &room.name),
        Space::OpenAir => "open air",
    }
}

/// The label of a history, with the sides of an opening by their names.
pub fn label(plan: &Plan, column: &Column) -> String {
    let label = column.quantity.label();
    let Subject::Opening(index) = column.subject else {
        return label.to_owned();
    };
    let Some(opening) = plan.openings.get(index) else {
        return label.to_owned();
    };
    let first = space_name(plan, opening.from);
    let second = space_name(plan, opening.to);
    label
        .replace("first to second side", &format!("{first} to {second}"))
        .replace("second to first side", &format!("{second} to {first}"))
}
