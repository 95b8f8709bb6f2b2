//! Plans built by hand for tests of the solver.
#![allow(dead_code)]

pub mod checks;
pub mod generated;
pub mod moving_air;

use doorglow::plan::{
    Action, Burning, Choices, Course, Curve, Effect, Fuel, FuelId, Item, Lining, OpenAir, Opening,
    OpeningId, OpeningKind, Plan, Room, RoomId, Space,
};

/// 0 °C in K.
pub const ZERO_CELSIUS: f64 = 273.15;

/// A lining of one course.
pub fn lining(thickness: f64, conductivity: f64, density: f64, heat_capacity: f64) -> Lining {
    Lining {
        name: "test lining".into(),
        emissivity: 0.9,
        courses: vec![Course {
            thickness,
            conductivity,
            density,
            heat_capacity,
        }],
    }
}

/// Natural gas of a burner, taken as methane.
pub fn methane() -> Fuel {
    Fuel {
        name: "methane".into(),
        carbon: 1.0,
        hydrogen: 4.0,
        oxygen: 0.0,
        nitrogen: 0.0,
        heat_of_combustion: 50.0e6,
        co_yield: 0.0,
        soot_yield: 0.0,
        residue_share: 0.0,
        radiative_fraction: 0.25,
        limiting_oxygen: 0.1351,
        vapour_molar_mass: 16.043e-3,
        vapour_heat_capacity: [1165.0, 3.5],
        doubling_flux: 45e3,
        critical_flux: 10e3,
        release_per_area: 1e6,
    }
}

/// Polyurethane with bedding, as the Larch Row scenario has it.
pub fn polyurethane() -> Fuel {
    Fuel {
        name: "polyurethane".into(),
        carbon: 1.0,
        hydrogen: 1.8,
        oxygen: 0.30,
        nitrogen: 0.05,
        heat_of_combustion: 26.2e6,
        co_yield: 0.03,
        soot_yield: 0.10,
        residue_share: 0.22,
        radiative_fraction: 0.35,
        limiting_oxygen: 0.1413,
        vapour_molar_mass: 60e-3,
        vapour_heat_capacity: [600.0, 2.5],
        doubling_flux: 45e3,
        critical_flux: 10e3,
        release_per_area: 500e3,
    }
}

/// A room on the ground.
pub fn room(name: &str, width: f64, length: f64, height: f64, all: &Lining) -> Room {
    Room {
        name: name.into(),
        width,
        length,
        height,
        floor_level: 0.0,
        temperature: 293.15,
        ceiling: all.clone(),
        walls: all.clone(),
        floor: all.clone(),
        behind: 293.15,
    }
}

/// A door.
pub fn door(
    name: &str,
    from: usize,
    to: Option<usize>,
    width: f64,
    head: f64,
    open: bool,
) -> Opening {
    Opening {
        name: name.into(),
        kind: OpeningKind::Door,
        from: Space::Room(RoomId(from)),
        to: to.map_or(Space::OpenAir, |r| Space::Room(RoomId(r))),
        sill: 0.0,
        head,
        width,
        coefficient: 0.70,
        clear_width: if open { width } else { 0.0 },
        gap_area: 0.0,
        gap_coefficient: 0.6,
        at: None,
        wind_pressure: 0.0,
        area: 0.0,
        exchange_factor: 1.0,
        pane: None,
    }
}

/// Leakage of a room over its height; the area carries no coefficient.
pub fn gap(room: usize, height: f64, area: f64) -> Opening {
    Opening {
        name: format!("leak of room {room}"),
        kind: OpeningKind::Gap,
        from: Space::Room(RoomId(room)),
        to: Space::OpenAir,
        sill: 0.0,
        head: height,
        width: 0.0,
        coefficient: 0.6,
        clear_width: 0.0,
        gap_area: area,
        gap_coefficient: 0.6,
        at: None,
        wind_pressure: 0.0,
        area: 0.0,
        exchange_factor: 1.0,
        pane: None,
    }
}

/// A burner.
pub fn burner(room: usize, rate: f64, side: f64, surface: f64, corner: bool) -> Item {
    Item {
        name: "burner".into(),
        room: RoomId(room),
        fuel: FuelId(0),
        mass: f64::INFINITY,
        burning: Burning::Burner {
            rate,
            ramp: if side < 0.45 { 2.0 } else { 20.0 },
            side,
        },
        surface_height: surface,
        gap_to_wall: corner.then_some(0.0),
        in_corner: corner,
        ignition: 0.0,
        at: None,
    }
}

/// A plan without actions and stations.
pub fn plan(
    end: f64,
    rooms: Vec<Room>,
    openings: Vec<Opening>,
    fuels: Vec<Fuel>,
    items: Vec<Item>,
) -> Plan {
    Plan {
        title: "test".into(),
        end,
        open_air: OpenAir {
            temperature: 293.15,
            humidity: 0.5,
            pressure: 101_325.0,
        },
        rooms,
        shared_walls: Vec::new(),
        openings,
        fuels,
        items,
        stations: Vec::new(),
        fans: Vec::new(),
        actions: Vec::new(),
        triggers: Vec::new(),
        choices: Choices::default(),
        tactic: None,
    }
}

/// The one-room door case of the design studies: 3.7 x 3.7 x 2.4 m of gypsum,
/// fast growth to 300 kW, leaks over the height, the door opened at 240 s.
pub fn one_room_door() -> Plan {
    let gypsum = lining(0.0125, 0.17, 790.0, 1090.0);
    let mut plan = plan(
        600.0,
        vec![room("room", 3.7, 3.7, 2.4, &gypsum)],
        vec![door("door", 0, None, 0.9, 2.0, false), gap(0, 2.4, 0.01)],
        vec![polyurethane()],
        vec![Item {
            name: "item".into(),
            room: RoomId(0),
            fuel: FuelId(0),
            mass: 20.0,
            burning: Burning::Growing(Curve::Growth {
                alpha: 46.9,
                peak: 300e3,
            }),
            surface_height: 0.3,
            gap_to_wall: None,
            in_corner: false,
            ignition: 0.0,
            at: None,
        }],
    );
    plan.actions.push(Action {
        name: "entry".into(),
        time: 240.0,
        over: 2.0,
        effect: Effect::ClearWidth {
            opening: OpeningId(0),
            width: 0.9,
        },
        what: "open".into(),
        because: None,
    });
    plan
}

/// Larch Row 3 as the scenario has it.
pub fn larch_row() -> Plan {
    let file = "scenarios/larch-row-3.toml";
    let path = format!("{}/{file}", env!("CARGO_MANIFEST_DIR"));
    let text = std::fs::read_to_string(path).expect("the scenario is there");
    doorglow::scenario::load(file, &text, None)
        .map_err(|report| report.render(false, 100))
        .expect("a scenario without faults")
}
