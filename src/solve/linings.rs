//! The linings of a building: slabs that conduct, the faces that rooms see of
//! them, and the leaves and panes that count as lining while they are shut.

use super::building::{Hull, PlanFault, WALL_STRIPS};
use crate::physics::conduction::{self, Grid, grid};
use crate::plan::{Lining, Opening, Plan, RoomId, Space};

/// What a face of a slab looks at.
#[derive(Debug, Clone, Copy, PartialEq)]
pub enum Face {
    /// The ceiling of a room.
    Ceiling(usize),
    /// The floor of a room.
    Floor(usize),
    /// A strip of a room's wall between two heights above its floor, m.
    Wall {
        /// Room.
        room: usize,
        /// Lower edge, m.
        bottom: f64,
        /// Upper edge, m.
        top: f64,
    },
    /// Air behind the linings at a fixed temperature, K.
    Behind(f64),
}

/// One piece of lining that conducts.
#[derive(Debug, Clone)]
pub struct Slab {
    /// Conduction grid.
    pub grid: Grid,
    /// Area without shut leaves, m2.
    pub area: f64,
    /// Emissivity of both faces.
    pub emissivity: f64,
    /// Front and back.
    pub faces: [Face; 2],
    /// Temperature at ignition, K.
    pub start: f64,
}

/// The part of a shut opening that counts as lining of a wall strip: its leaf
/// or glass warms with the wall and leaves the room when it opens.
#[derive(Debug, Clone, Copy)]
pub struct Leaf {
    /// Strip of wall.
    pub slab: usize,
    /// Opening.
    pub opening: usize,
    /// Area in this strip, m2.
    pub area: f64,
}

/// A face of a slab as a room sees it.
#[derive(Debug, Clone, Copy)]
pub struct RoomFace {
    /// Index of the slab.
    pub slab: usize,
    /// True for its back.
    pub back: bool,
    /// What it is.
    pub face: Face,
}

fn lining_grid(lining: &Lining, two_sided: bool) -> Result<Grid, PlanFault> {
    let courses: Vec<conduction::Course> = lining
        .courses
        .iter()
        .map(|c| conduction::Course {
            thickness: c.thickness,
            conductivity: c.conductivity,
            density: c.density,
            heat_capacity: c.heat_capacity,
        })
        .collect();
    grid(&courses, two_sided).ok_or_else(|| PlanFault::Lining {
        lining: lining.name.clone(),
        fault: "needs at least one course, with positive numbers".into(),
    })
}

pub fn slabs(plan: &Plan, rooms: &mut [Hull]) -> Result<Vec<Slab>, PlanFault> {
    let mut slabs = Vec::new();
    for (r, room) in plan.rooms.iter().enumerate() {
        let strip = room.height / WALL_STRIPS as f64;
        let mut parts = vec![
            (&room.ceiling, Face::Ceiling(r), room.floor_area()),
            (&room.floor, Face::Floor(r), room.floor_area()),
        ];
        for n in 0..WALL_STRIPS {
            let face = Face::Wall {
                room: r,
                bottom: n as f64 * strip,
                top: (n + 1) as f64 * strip,
            };
            let area = strip_area(plan, r, n as f64 * strip, (n + 1) as f64 * strip);
            parts.push((&room.walls, face, area));
        }
        for (lining, face, area) in parts {
            slabs.push(Slab {
                grid: lining_grid(lining, false)?,
                area,
                emissivity: lining.emissivity,
                faces: [face, Face::Behind(room.behind)],
                start: room.temperature,
            });
        }
    }
    for wall in &plan.shared_walls {
        let [a, b] = wall.between.map(|r| r.0);
        let height = plan.rooms[a].height.min(plan.rooms[b].height);
        let strip = height / WALL_STRIPS as f64;
        for n in 0..WALL_STRIPS {
            let face = |room| Face::Wall {
                room,
                bottom: n as f64 * strip,
                top: (n + 1) as f64 * strip,
            };
            slabs.push(Slab {
                grid: lining_grid(&wall.lining, true)?,
                area: wall.length * strip,
                emissivity: wall.lining.emissivity,
                faces: [face(a), face(b)],
                start: 0.5 * (plan.rooms[a].temperature + plan.rooms[b].temperature),
            });
        }
    }
    for (s, slab) in slabs.iter().enumerate() {
        for (back, face) in [(false, slab.faces[0]), (true, slab.faces[1])] {
            let (Face::Ceiling(room) | Face::Floor(room) | Face::Wall { room, .. }) = face else {
                continue;
            };
            rooms[room].faces.push(RoomFace {
                slab: s,
                back,
                face,
            });
        }
    }
    Ok(slabs)
}

/// Smallest share of a strip of wall that stays lined.
const LEAST_LINED: f64 = 0.05;

/// Area of a strip of a room's wall between two heights, without openings and
/// shared walls, m2.
fn strip_area(plan: &Plan, room: usize, bottom: f64, top: f64) -> f64 {
    let gross = plan.rooms[room].perimeter() * (top - bottom);
    let openings: f64 = plan
        .openings
        .iter()
        .filter(|o| leads_to(o, room))
        .map(|o| overlap(plan, o, room, bottom, top))
        .sum();
    let shared: f64 = plan
        .shared_walls
        .iter()
        .filter(|w| w.between.contains(&RoomId(room)))
        .map(|w| w.length * (top - bottom))
        .sum();
    (gross - openings - shared).max(LEAST_LINED * gross)
}

fn leads_to(opening: &Opening, room: usize) -> bool {
    [opening.from, opening.to].contains(&Space::Room(RoomId(room)))
}

/// Area of an opening in a strip of a room's wall, m2.
fn overlap(plan: &Plan, opening: &Opening, room: usize, bottom: f64, top: f64) -> f64 {
    // Heights of an opening are given above the floor of its first room.
    let shift = match (opening.from, opening.to) {
        (Space::Room(first), _) | (Space::OpenAir, Space::Room(first)) => {
            plan.rooms[first.0].floor_level - plan.rooms[room].floor_level
        }
        _ => 0.0,
    };
    let height = (opening.head + shift).min(top) - (opening.sill + shift).max(bottom);
    opening.width * height.max(0.0)
}

pub fn leaves(plan: &Plan, slabs: &[Slab]) -> Vec<Leaf> {
    let mut leaves = Vec::new();
    for (s, slab) in slabs.iter().enumerate() {
        let [Face::Wall { room, bottom, top }, Face::Behind(_)] = slab.faces else {
            continue;
        };
        for (o, opening) in plan.openings.iter().enumerate() {
            let area = if leads_to(opening, room) {
                overlap(plan, opening, room, bottom, top)
            } else {
                0.0
            };
            if area > 0.0 {
                leaves.push(Leaf {
                    slab: s,
                    opening: o,
                    area,
                });
            }
        }
    }
    leaves
}
