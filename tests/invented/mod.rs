//! An invented history of a starved fire with a door opened at 480 s, so that
//! what `show` makes can be looked at without running the model. Two rooms of
//! a house in Kestrova; no number in it is a result.

use doorglow::plan::{
    Action, Burning, Choices, Course, Curve, Fuel, FuelId, Item, Limits, Lining, OpenAir, Opening,
    OpeningId, OpeningKind, Plan, Room, RoomId, Space, Station,
};
use doorglow::record::{Column, Ended, Flag, Ledger, Names, Quantity, Record, Subject, Work};

/// A plan of bedroom, hall, a door between them, a front door and a gap.
pub fn plan() -> Plan {
    let door = |name: &str, from: Space, to: Space, clear_width: f64| Opening {
        name: name.to_owned(),
        kind: OpeningKind::Door,
        from,
        to,
        sill: 0.0,
        head: 2.0,
        width: 0.9,
        coefficient: 0.68,
        clear_width,
        gap_area: 0.01,
        gap_coefficient: 0.6,
        at: None,
    };
    let (bedroom, hall) = (Space::Room(RoomId(0)), Space::Room(RoomId(1)));
    Plan {
        title: "Invented Row 1: front door opened on a fire short of air".to_owned(),
        end: 900.0,
        open_air: OpenAir {
            temperature: 283.15,
            humidity: 0.7,
            pressure: 101_325.0,
        },
        rooms: vec![room("bedroom", 4.0, 3.2), room("hall", 6.0, 1.2)],
        shared_walls: Vec::new(),
        openings: vec![
            door("bedroom_door", bedroom, hall, 0.8),
            door("front_door", hall, Space::OpenAir, 0.0),
            Opening {
                kind: OpeningKind::Gap,
                width: 0.0,
                ..door("house in bedroom", bedroom, Space::OpenAir, 0.0)
            },
        ],
        fuels: vec![fuel()],
        items: vec![item()],
        stations: vec![Station {
            name: "crew".to_owned(),
            room: RoomId(1),
            height: 1.0,
            posture: "kneeling".to_owned(),
            limits: Limits {
                attention_temperature: 433.15,
                out_temperature: 533.15,
                oxygen: 0.17,
                visibility: 3.0,
            },
        }],
        actions: vec![
            action("entry", 480.0, 0.9, "open"),
            action("hold the door", 540.0, 0.13, "hand's width"),
        ],
        choices: Choices::default(),
        tactic: Some("hold_the_door".to_owned()),
    }
}

fn room(name: &str, width: f64, length: f64) -> Room {
    let lining = Lining {
        name: "gypsum plasterboard 13 mm".to_owned(),
        emissivity: 0.9,
        courses: vec![Course {
            thickness: 0.013,
            conductivity: 0.25,
            density: 800.0,
            heat_capacity: 1000.0,
        }],
    };
    Room {
        name: name.to_owned(),
        width,
        length,
        height: 2.4,
        floor_level: 0.0,
        temperature: 293.15,
        ceiling: lining.clone(),
        walls: lining.clone(),
        floor: lining,
        behind: 293.15,
    }
}

fn fuel() -> Fuel {
    Fuel {
        name: "invented foam".to_owned(),
        carbon: 1.0,
        hydrogen: 1.7,
        oxygen: 0.3,
        nitrogen: 0.07,
        heat_of_combustion: 24.0e6,
        co_yield: 0.03,
        soot_yield: 0.1,
        residue_share: 0.1,
        radiative_fraction: 0.35,
        limiting_oxygen: 0.15,
        vapour_molar_mass: 0.1,
        vapour_heat_capacity: [1000.0, 1.0],
        doubling_flux: 20e3,
        critical_flux: 10e3,
        release_per_area: 500e3,
    }
}

fn item() -> Item {
    Item {
        name: "bed".to_owned(),
        room: RoomId(0),
        fuel: FuelId(0),
        mass: 21.0,
        burning: Burning::Growing(Curve::Growth {
            alpha: 46.9,
            peak: 1.4e6,
        }),
        surface_height: 0.5,
        gap_to_wall: None,
        in_corner: false,
        ignition: 0.0,
        at: None,
    }
}

fn action(name: &str, time: f64, clear_width: f64, what: &str) -> Action {
    Action {
        name: name.to_owned(),
        time,
        over: 2.0,
        opening: OpeningId(1),
        clear_width,
        what: what.to_owned(),
        because: None,
    }
}

/// A bump between two times, 0..1.
fn bump(t: f64, rise: f64, top: f64, fall: f64) -> f64 {
    let up = 1.0 / (1.0 + (-(t - rise) / 15.0).exp());
    let down = 1.0 / (1.0 + ((t - top) / fall).exp());
    up * down
}

/// The invented history, one value a second.
pub fn record() -> Record {
    let time: Vec<f64> = (0..=900).map(f64::from).collect();
    let mut columns = Vec::new();
    let mut add = |subject, quantity, value: &dyn Fn(f64) -> f64| {
        columns.push(Column {
            subject,
            quantity,
            values: time.iter().map(|t| value(*t)).collect(),
        });
    };
    let fire = |t: f64| bump(t, 160.0, 260.0, 12.0) + 0.9 * bump(t, 570.0, 760.0, 40.0);
    rooms(&mut add, &fire);
    openings(&mut add, &fire);
    let open = |t: f64| f64::from(u8::from(t >= 480.0));
    for (subject, scale) in [(Subject::Item(0), 0.95), (Subject::House, 1.0)] {
        add(subject, Quantity::FreeRate, &|t| {
            1.4e6 * (t / 173.0).powi(2).min(1.0)
        });
        add(subject, Quantity::GivenOff, &|t| {
            1.4e6 * (fire(t) + 0.12 * bump(t, 250.0, 800.0, 60.0))
        });
        add(subject, Quantity::Burned, &move |t| {
            scale * 1.35e6 * fire(t)
        });
    }
    add(Subject::House, Quantity::AirCouldBurn, &|t| {
        6e4 + open(t) * 3.2e6 * (1.0 - (-(t - 480.0) / 20.0).exp())
    });
    add(Subject::Item(0), Quantity::BaseOxygen, &|t| {
        0.207 - 0.1 * bump(t, 200.0, 540.0, 25.0) - 0.04 * fire(t)
    });
    stations(&mut add, &fire);
    Record {
        names: Names {
            rooms: vec!["bedroom".to_owned(), "hall".to_owned()],
            openings: vec![
                "bedroom_door".to_owned(),
                "front_door".to_owned(),
                "house in bedroom".to_owned(),
            ],
            items: vec!["bed".to_owned()],
            stations: vec!["crew".to_owned()],
        },
        time: time.clone(),
        columns,
        ledger: Ledger::default(),
        work: Work::default(),
        flags: vec![Flag {
            since: 600.0,
            duration: 30.0,
            what: "an invented flag".to_owned(),
        }],
        ended: Ended::Completed,
    }
}

type Add<'a> = dyn FnMut(Subject, Quantity, &dyn Fn(f64) -> f64) + 'a;

fn rooms(add: &mut Add<'_>, fire: &dyn Fn(f64) -> f64) {
    for (index, share, depth) in [(0, 1.0, 1.9), (1, 0.62, 1.5)] {
        let room = Subject::Room(index);
        let smoke = |t: f64| 1.0 / (1.0 + (-(t - 70.0) / 15.0).exp());
        add(room, Quantity::UpperTemperature, &move |t| {
            293.0 + share * (640.0 * fire(t) + 90.0 * smoke(t))
        });
        add(room, Quantity::LowerTemperature, &move |t| {
            293.0 + share * (150.0 * fire(t) + 40.0 * smoke(t))
        });
        add(room, Quantity::Interface, &move |t| {
            2.4 - depth * smoke(t) + 0.5 * bump(t, 490.0, 700.0, 50.0)
        });
        add(room, Quantity::UpperOxygen, &move |t| {
            0.207 - 0.13 * share * smoke(t) + 0.05 * bump(t, 500.0, 600.0, 30.0)
        });
        add(room, Quantity::LowerOxygen, &move |t| {
            0.207 - 0.06 * share * bump(t, 200.0, 520.0, 20.0)
        });
        add(room, Quantity::UpperFuel, &move |t| {
            0.04 * share * bump(t, 240.0, 640.0, 40.0)
        });
        add(room, Quantity::LowerFuel, &move |t| {
            0.01 * share * bump(t, 260.0, 540.0, 30.0)
        });
    }
}

fn openings(add: &mut Add<'_>, fire: &dyn Fn(f64) -> f64) {
    for index in 0..3 {
        let opening = Subject::Opening(index);
        let is_front = index == 1;
        let clear = move |t: f64| match (is_front, t) {
            (false, _) if index == 0 => 0.8,
            (false, _) => 0.0,
            (true, t) if t < 480.0 => 0.0,
            (true, t) if t < 540.0 => 0.9,
            _ => 0.13,
        };
        add(opening, Quantity::ClearWidth, &clear);
        add(opening, Quantity::FlowForward, &move |t| {
            clear(t) * (0.3 + 0.8 * fire(t))
        });
        add(opening, Quantity::FlowBackward, &move |t| {
            clear(t) * (0.28 + 0.7 * fire(t))
        });
        add(opening, Quantity::NeutralPlane, &move |t| {
            if clear(t) > 0.0 {
                1.1 - 0.2 * fire(t)
            } else {
                f64::NAN
            }
        });
    }
}

fn stations(add: &mut Add<'_>, fire: &dyn Fn(f64) -> f64) {
    let crew = Subject::Station(0);
    let smoke = |t: f64| 1.0 / (1.0 + (-(t - 120.0) / 15.0).exp());
    add(crew, Quantity::StationTemperature, &|t| {
        293.0 + 190.0 * fire(t) + 40.0 * smoke(t)
    });
    add(crew, Quantity::StationVisibility, &|t| {
        30.0 - 29.0 * smoke(t)
    });
    add(crew, Quantity::StationOxygen, &|t| 0.209 - 0.05 * smoke(t));
    add(crew, Quantity::StationFlux, &|t| 6e3 * fire(t));
}
