//! Plans drawn by lot from a seed: the same seed is the same plan everywhere.
#![allow(dead_code)]

use doorglow::plan::{
    Action, Burning, Choices, Course, Curve, Effect, Fuel, FuelId, Item, Lining, OpenAir, Opening,
    OpeningId, OpeningKind, PlacementRule, Plan, PlumeModel, Room, RoomId, SharedWall, Space,
};

/// A small generator of its own (SplitMix64, Steele, Lea and Flood 2014), so
/// that no change of a library changes the plans.
pub struct Dice(u64);

impl Dice {
    /// Dice of a seed.
    pub fn new(seed: u64) -> Self {
        Self(seed.wrapping_mul(0x9E37_79B9_7F4A_7C15) ^ 0x5DEE_CE66)
    }

    fn next(&mut self) -> u64 {
        self.0 = self.0.wrapping_add(0x9E37_79B9_7F4A_7C15);
        let mut z = self.0;
        z = (z ^ (z >> 30)).wrapping_mul(0xBF58_476D_1CE4_E5B9);
        z = (z ^ (z >> 27)).wrapping_mul(0x94D0_49BB_1331_11EB);
        z ^ (z >> 31)
    }

    fn unit(&mut self) -> f64 {
        (self.next() >> 11) as f64 / (1_u64 << 53) as f64
    }

    /// Evenly between two numbers.
    pub fn between(&mut self, low: f64, high: f64) -> f64 {
        low + (high - low) * self.unit()
    }

    /// Evenly in the logarithm between two positive numbers.
    pub fn decades(&mut self, low: f64, high: f64) -> f64 {
        (self.between(low.ln(), high.ln())).exp()
    }

    /// A whole number below `count`.
    #[allow(clippy::cast_possible_truncation, clippy::cast_sign_loss)]
    pub fn below(&mut self, count: usize) -> usize {
        ((self.unit() * count as f64) as usize).min(count - 1)
    }

    /// True with a probability.
    pub fn chance(&mut self, probability: f64) -> bool {
        self.unit() < probability
    }

    fn pick<'a, T>(&mut self, list: &'a [T]) -> &'a T {
        &list[self.below(list.len())]
    }

    /// The numbers below `count` in a drawn order.
    pub fn order(&mut self, count: usize) -> Vec<usize> {
        let mut order: Vec<usize> = (0..count).collect();
        for last in (1..count).rev() {
            order.swap(last, self.below(last + 1));
        }
        order
    }
}

fn course(thickness: f64, conductivity: f64, density: f64, heat_capacity: f64) -> Course {
    Course {
        thickness,
        conductivity,
        density,
        heat_capacity,
    }
}

/// Linings from thin steel to concrete; values from memory, only the spread matters.
fn linings() -> Vec<Lining> {
    let gypsum = course(0.0125, 0.25, 800.0, 1000.0);
    let wool = course(0.10, 0.040, 50.0, 840.0);
    let steel = course(0.002, 45.0, 7850.0, 490.0);
    [
        ("steel 2 mm", 0.85, vec![steel.clone()]),
        ("gypsum", 0.9, vec![gypsum.clone()]),
        ("concrete", 0.92, vec![course(0.15, 1.6, 2300.0, 900.0)]),
        ("brick", 0.93, vec![course(0.11, 0.7, 1700.0, 840.0)]),
        ("timber", 0.9, vec![course(0.02, 0.13, 500.0, 1600.0)]),
        ("gypsum on wool", 0.9, vec![gypsum.clone(), wool.clone()]),
        (
            "steel sandwich",
            0.5,
            vec![course(0.0006, 45.0, 7850.0, 490.0), wool, steel],
        ),
        ("foil on gypsum", 0.1, vec![gypsum]),
    ]
    .into_iter()
    .map(|(name, emissivity, courses)| Lining {
        name: name.into(),
        emissivity,
        courses,
    })
    .collect()
}

fn fuels() -> Vec<Fuel> {
    let wood = Fuel {
        name: "wood".into(),
        carbon: 1.0,
        hydrogen: 1.7,
        oxygen: 0.74,
        nitrogen: 0.0,
        heat_of_combustion: 16.4e6,
        co_yield: 0.005,
        soot_yield: 0.015,
        residue_share: 0.25,
        radiative_fraction: 0.3,
        limiting_oxygen: 0.1347,
        vapour_molar_mass: 30e-3,
        vapour_heat_capacity: [900.0, 1.5],
        doubling_flux: 40e3,
        critical_flux: 12e3,
        release_per_area: 250e3,
    };
    let heptane = Fuel {
        name: "heptane".into(),
        carbon: 7.0,
        hydrogen: 16.0,
        oxygen: 0.0,
        nitrogen: 0.0,
        heat_of_combustion: 44.6e6,
        co_yield: 0.010,
        soot_yield: 0.037,
        residue_share: 0.0,
        radiative_fraction: 0.33,
        limiting_oxygen: 0.135,
        vapour_molar_mass: 100.2e-3,
        vapour_heat_capacity: [450.0, 3.8],
        doubling_flux: 30e3,
        critical_flux: 5e3,
        release_per_area: 1.5e6,
    };
    vec![super::methane(), super::polyurethane(), wood, heptane]
}

fn rooms(dice: &mut Dice, outside: f64) -> Vec<Room> {
    let all = linings();
    let count = 1 + dice.below(6);
    let indoors = dice.between(278.15, 303.15);
    let common = dice.pick(&all).clone();
    (0..count)
        .map(|n| {
            let corridor = dice.chance(0.15);
            let mut lining = || {
                if dice.chance(0.5) {
                    common.clone()
                } else {
                    dice.pick(&all).clone()
                }
            };
            let (ceiling, walls, floor) = (lining(), lining(), lining());
            let (width, length) = if corridor {
                (dice.between(1.0, 1.6), dice.between(5.0, 12.0))
            } else {
                (dice.between(1.5, 7.0), dice.between(1.5, 8.0))
            };
            let own = if dice.chance(0.3) {
                dice.between(263.15, 303.15)
            } else {
                indoors
            };
            Room {
                name: format!("room {n}"),
                width,
                length,
                height: if dice.chance(0.7) {
                    2.4
                } else {
                    dice.between(2.0, 5.0)
                },
                floor_level: 0.0,
                temperature: own,
                ceiling,
                walls,
                floor,
                behind: if dice.chance(0.5) { own } else { outside },
            }
        })
        .collect()
}

fn opening(dice: &mut Dice, rooms: &[Room], number: usize, from: usize, to: Space) -> Opening {
    let mut lowest = rooms[from].height;
    if let Space::Room(room) = to {
        lowest = lowest.min(rooms[room.0].height);
    }
    let window = dice.chance(if to == Space::OpenAir { 0.5 } else { 0.1 });
    let (sill, head) = if window {
        let sill = dice.between(0.1, 0.6) * lowest;
        (sill, (sill + dice.between(0.2, 1.4)).min(lowest))
    } else if dice.chance(0.1) {
        (0.0, lowest)
    } else {
        (0.0, lowest.min(2.0))
    };
    let width = dice.between(0.4, 1.8);
    let clear_width = match dice.below(4) {
        0 | 1 => 0.0,
        2 => width,
        _ => width * dice.unit(),
    };
    let tight = dice.chance(0.5);
    Opening {
        name: format!("opening {number}"),
        kind: if window {
            OpeningKind::Window
        } else {
            OpeningKind::Door
        },
        from: Space::Room(RoomId(from)),
        to,
        sill,
        head,
        width,
        coefficient: 0.70,
        clear_width,
        gap_area: if tight { 0.0 } else { dice.decades(1e-4, 3e-2) },
        gap_coefficient: 0.6,
        at: None,
        wind_pressure: 0.0,
        area: 0.0,
        exchange_factor: 1.0,
        pane: None,
    }
}

fn openings(dice: &mut Dice, rooms: &[Room]) -> Vec<Opening> {
    let mut all = Vec::new();
    for room in 1..rooms.len() {
        if dice.chance(0.85) {
            let other = dice.below(room);
            let number = all.len();
            let turned = dice.chance(0.5);
            let (from, to) = if turned { (room, other) } else { (other, room) };
            all.push(opening(dice, rooms, number, from, Space::Room(RoomId(to))));
        }
    }
    for _ in 0..dice.below(3) {
        let (a, b) = (dice.below(rooms.len()), dice.below(rooms.len()));
        if a != b {
            let number = all.len();
            all.push(opening(dice, rooms, number, a, Space::Room(RoomId(b))));
        }
    }
    for _ in 0..dice.below(4) {
        let (room, number) = (dice.below(rooms.len()), all.len());
        all.push(opening(dice, rooms, number, room, Space::OpenAir));
    }
    let leaky = dice.chance(0.6);
    let area = dice.decades(1e-5, 5e-2);
    for (room, hull) in rooms.iter().enumerate() {
        if leaky && dice.chance(0.8) {
            let mut gap = super::gap(room, hull.height, area * dice.between(0.2, 1.0));
            if dice.chance(0.2) {
                gap.from = Space::OpenAir;
                gap.to = Space::Room(RoomId(room));
            }
            all.push(gap);
        }
    }
    all
}

fn shared_walls(dice: &mut Dice, rooms: &[Room]) -> Vec<SharedWall> {
    let all = linings();
    let mut walls = Vec::new();
    if rooms.len() < 2 || dice.chance(0.5) {
        return walls;
    }
    for number in 0..=dice.below(2) {
        let (a, b) = (dice.below(rooms.len()), dice.below(rooms.len()));
        if a == b {
            continue;
        }
        let side = |room: &Room| room.width.min(room.length);
        walls.push(SharedWall {
            name: format!("wall {number}"),
            between: [RoomId(a), RoomId(b)],
            length: 0.9 * side(&rooms[a]).min(side(&rooms[b])),
            lining: dice.pick(&all).clone(),
        });
    }
    walls
}

fn actions(dice: &mut Dice, openings: &[Opening], end: f64) -> Vec<Action> {
    let movable: Vec<usize> = (0..openings.len())
        .filter(|o| openings[*o].kind != OpeningKind::Gap)
        .collect();
    let mut actions = Vec::new();
    if movable.is_empty() {
        return actions;
    }
    for number in 0..dice.below(7) {
        let index = *dice.pick(&movable);
        let width = openings[index].width;
        let share = match dice.below(4) {
            0 => 0.0,
            1 | 2 => 1.0,
            _ => dice.unit(),
        };
        actions.push(Action {
            name: format!("action {number}"),
            time: dice.between(0.0, 0.9 * end),
            over: if dice.chance(0.3) {
                0.0
            } else {
                dice.between(0.0, 10.0)
            },
            effect: Effect::ClearWidth {
                opening: OpeningId(index),
                width: share * width,
            },
            what: "set".into(),
            because: None,
        });
    }
    actions.sort_by(|a, b| a.time.total_cmp(&b.time));
    actions
}

fn table(dice: &mut Dice, peak: f64) -> Vec<(f64, f64)> {
    let mut points = vec![(0.0, 0.0)];
    let mut time = 0.0;
    for _ in 0..3 + dice.below(6) {
        time += dice.between(5.0, 120.0);
        points.push((time, peak * dice.unit()));
    }
    points.push((time + 30.0, 0.0));
    points
}

fn burning(dice: &mut Dice) -> Burning {
    let alpha = *dice.pick(&[2.93, 11.7, 46.9, 188.0]);
    let peak = dice.decades(30e3, 3e6);
    let curve = if dice.chance(0.6) {
        Curve::Growth { alpha, peak }
    } else {
        Curve::Table(table(dice, peak))
    };
    match dice.below(4) {
        0 => Burning::AsGiven(curve),
        1 => Burning::Burner {
            rate: dice.decades(10e3, 700e3),
            ramp: dice.between(1.0, 30.0),
            side: dice.between(0.2, 1.0),
        },
        _ => Burning::Growing(curve),
    }
}

fn items(dice: &mut Dice, rooms: &[Room], fuels: usize, end: f64) -> Vec<Item> {
    (0..=dice.below(3))
        .map(|number| {
            let room = dice.below(rooms.len());
            let burning = burning(dice);
            let height = rooms[room].height;
            let wall = dice.chance(0.3);
            Item {
                name: format!("item {number}"),
                room: RoomId(room),
                fuel: FuelId(if number < fuels {
                    number
                } else {
                    dice.below(fuels)
                }),
                mass: match burning {
                    Burning::Burner { .. } => f64::INFINITY,
                    _ => dice.decades(1.0, 60.0),
                },
                burning,
                surface_height: match dice.below(4) {
                    0 => 0.0,
                    1 => height - dice.between(0.02, 0.3),
                    _ => dice.between(0.0, 1.2),
                },
                gap_to_wall: wall.then(|| dice.between(0.0, 0.5)),
                in_corner: wall && dice.chance(0.4),
                ignition: if number == 0 || dice.chance(0.5) {
                    0.0
                } else {
                    dice.between(0.0, 0.8 * end)
                },
                at: None,
            }
        })
        .collect()
}

/// The plan of a seed.
pub fn plan(seed: u64) -> Plan {
    let mut dice = Dice::new(seed);
    let dice = &mut dice;
    let end = dice.between(240.0, 900.0);
    let open_air = OpenAir {
        temperature: dice.between(253.15, 313.15),
        humidity: dice.unit(),
        pressure: if dice.chance(0.8) {
            101_325.0
        } else {
            dice.between(80e3, 104e3)
        },
    };
    let rooms = rooms(dice, open_air.temperature);
    let openings = openings(dice, &rooms);
    let shared_walls = shared_walls(dice, &rooms);
    let actions = actions(dice, &openings, end);
    let order = dice.order(4);
    let count = 1 + dice.below(3);
    let items = items(dice, &rooms, count, end);
    let all = fuels();
    let fuels = order[..count].iter().map(|f| all[*f].clone()).collect();
    let choices = Choices {
        plume: *dice.pick(&[
            PlumeModel::McCaffrey,
            PlumeModel::McCaffrey,
            PlumeModel::Heskestad,
            PlumeModel::Zukoski,
        ]),
        placement: *dice.pick(&[
            PlacementRule::Weak,
            PlacementRule::Image,
            PlacementRule::None,
        ]),
        ..Choices::default()
    };
    Plan {
        title: format!("generated {seed}"),
        end,
        open_air,
        rooms,
        shared_walls,
        openings,
        fuels,
        items,
        stations: Vec::new(),
        fans: Vec::new(),
        triggers: Vec::new(),
        actions,
        choices,
        tactic: None,
    }
}

/// A plan in another order, and where each room, opening and item went.
pub struct Reordered {
    /// The plan.
    pub plan: Plan,
    /// New index of each room.
    pub rooms: Vec<usize>,
    /// New index of each opening.
    pub openings: Vec<usize>,
    /// New index of each item.
    pub items: Vec<usize>,
}

fn placed<T: Clone>(list: &[T], order: &[usize]) -> Vec<T> {
    order.iter().map(|old| list[*old].clone()).collect()
}

fn inverse(order: &[usize]) -> Vec<usize> {
    let mut inverse = vec![0; order.len()];
    for (new, old) in order.iter().enumerate() {
        inverse[*old] = new;
    }
    inverse
}

/// The same building with rooms, openings, fuels and items in a drawn order.
pub fn reordered(plan: &Plan, seed: u64) -> Reordered {
    let mut dice = Dice::new(seed);
    let rooms = dice.order(plan.rooms.len());
    let openings = dice.order(plan.openings.len());
    let items = dice.order(plan.items.len());
    let fuels = dice.order(plan.fuels.len());
    let mut out = plan.clone();
    out.rooms = placed(&plan.rooms, &rooms);
    out.openings = placed(&plan.openings, &openings);
    out.items = placed(&plan.items, &items);
    out.fuels = placed(&plan.fuels, &fuels);
    let (rooms, openings) = (inverse(&rooms), inverse(&openings));
    let (items, fuels) = (inverse(&items), inverse(&fuels));
    let room = |space: Space| match space {
        Space::Room(old) => Space::Room(RoomId(rooms[old.0])),
        Space::OpenAir => Space::OpenAir,
    };
    for opening in &mut out.openings {
        (opening.from, opening.to) = (room(opening.from), room(opening.to));
    }
    for wall in &mut out.shared_walls {
        wall.between = wall.between.map(|old| RoomId(rooms[old.0]));
    }
    for item in &mut out.items {
        item.room = RoomId(rooms[item.room.0]);
        item.fuel = FuelId(fuels[item.fuel.0]);
    }
    for action in &mut out.actions {
        if let Effect::ClearWidth { opening, .. } = &mut action.effect {
            *opening = OpeningId(openings[opening.0]);
        }
    }
    Reordered {
        plan: out,
        rooms,
        openings,
        items,
    }
}
