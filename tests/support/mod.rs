//! An invented run for tests of readings and reports: a bedroom fire that
//! starves and comes back when the front door is opened. Drawn with straight
//! lines, not reckoned.
#![allow(dead_code, clippy::ptr_arg)]

use doorglow::plan::{
    Action, Burning, Choices, Course, Curve, Fuel, FuelId, Item, Limits, Lining, OpenAir, Opening,
    OpeningId, OpeningKind, Plan, Room, RoomId, Space, Station,
};
use doorglow::record::{
    Closure, Column, Ended, Flag, Ledger, Names, Quantity, Record, Subject, Work,
};

/// A history drawn with straight lines through points (time, value).
type Line<'a> = &'a [(f64, f64)];

fn lining() -> Lining {
    Lining {
        name: "gypsum plasterboard 13 mm".into(),
        emissivity: 0.9,
        courses: vec![Course {
            thickness: 0.013,
            conductivity: 0.2,
            density: 790.0,
            heat_capacity: 1000.0,
        }],
    }
}

fn room(name: &str, width: f64, length: f64) -> Room {
    Room {
        name: name.into(),
        width,
        length,
        height: 2.4,
        floor_level: 0.0,
        temperature: 293.15,
        ceiling: lining(),
        walls: lining(),
        floor: lining(),
        behind: 293.15,
    }
}

fn door(name: &str, from: Space, to: Space, clear_width: f64) -> Opening {
    Opening {
        name: name.into(),
        kind: OpeningKind::Door,
        from,
        to,
        sill: 0.0,
        head: 2.0,
        width: 0.9,
        coefficient: 0.7,
        clear_width,
        gap_area: 0.01,
        gap_coefficient: 0.6,
        at: None,
    }
}

fn fuel() -> Fuel {
    Fuel {
        name: "invented mattress".into(),
        carbon: 1.0,
        hydrogen: 1.8,
        oxygen: 0.3,
        nitrogen: 0.05,
        heat_of_combustion: 24e6,
        co_yield: 0.03,
        soot_yield: 0.1,
        residue_share: 0.0,
        radiative_fraction: 0.4,
        limiting_oxygen: 0.1413,
        vapour_molar_mass: 0.06,
        vapour_heat_capacity: [500.0, 3.0],
        doubling_flux: 45e3,
        critical_flux: 10e3,
        release_per_area: 500e3,
    }
}

/// Plan of the invented building: bedroom, hall, a bed, a crew in the hall.
pub fn plan() -> Plan {
    let bedroom = Space::Room(RoomId(0));
    let hall = Space::Room(RoomId(1));
    Plan {
        title: "Sandpiper Row 9: front door opened on a fire short of air".into(),
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
        ],
        fuels: vec![fuel()],
        items: vec![Item {
            name: "bed".into(),
            room: RoomId(0),
            fuel: FuelId(0),
            mass: 21.0,
            burning: Burning::Growing(Curve::Growth {
                alpha: 46.9,
                peak: 1.4e6,
            }),
            surface_height: 0.5,
            gap_to_wall: Some(0.3),
            in_corner: false,
            ignition: 0.0,
            at: None,
        }],
        stations: vec![Station {
            name: "crew".into(),
            room: RoomId(1),
            height: 1.0,
            posture: "kneeling".into(),
            limits: Limits {
                attention_temperature: 373.15,
                out_temperature: 433.15,
                oxygen: 0.17,
                visibility: 3.0,
            },
        }],
        actions: vec![Action {
            name: "entry".into(),
            time: 480.0,
            over: 2.0,
            opening: OpeningId(1),
            clear_width: 0.9,
            what: "open".into(),
            because: Some("crew makes entry".into()),
        }],
        choices: Choices::default(),
        tactic: None,
    }
}

fn value(line: Line<'_>, time: f64) -> f64 {
    let after = line.partition_point(|&(t, _)| t < time);
    match (line.get(after.wrapping_sub(1)), line.get(after)) {
        (Some(&(t0, v0)), Some(&(t1, v1))) => v0 + (v1 - v0) * (time - t0) / (t1 - t0),
        (None, Some(&(_, v))) | (Some(&(_, v)), None) => v,
        (None, None) => f64::NAN,
    }
}

/// Temperature in K of a line in °C.
fn kelvin(line: Line<'_>) -> Vec<(f64, f64)> {
    line.iter().map(|&(t, v)| (t, v + 273.15)).collect()
}

/// A record of the given lines, one value a second.
pub fn drawn(plan: &Plan, until: u32, lines: &Lines) -> Record {
    let time: Vec<f64> = (0..=until).map(f64::from).collect();
    let columns = lines
        .iter()
        .map(|(subject, quantity, line)| Column {
            subject: *subject,
            quantity: *quantity,
            values: time.iter().map(|&t| value(line, t)).collect(),
        })
        .collect();
    Record {
        names: Names {
            rooms: plan.rooms.iter().map(|x| x.name.clone()).collect(),
            openings: plan.openings.iter().map(|x| x.name.clone()).collect(),
            items: plan.items.iter().map(|x| x.name.clone()).collect(),
            stations: plan.stations.iter().map(|x| x.name.clone()).collect(),
        },
        time,
        columns,
        ledger: ledger(),
        work: Work {
            evaluations: 2233,
            steps: 301,
            rejections: 12,
            newton_iterations: 4500,
            guards: 3,
        },
        flags: vec![Flag {
            since: 240.0,
            duration: 55.0,
            what: "hall nearly mixed: two layers are doubtful there".into(),
        }],
        ended: Ended::Completed,
    }
}

fn ledger() -> Ledger {
    let closure = |at_start, at_end, gained, lost, relative| Closure {
        at_start,
        at_end,
        gained,
        lost,
        relative,
    };
    Ledger {
        mass: closure(48.2, 25.9, 410.0, 432.3, 2.1e-9),
        energy: closure(0.0, 4.1e7, 3.6e8, 3.19e8, 3.4e-5),
        oxygen: closure(11.1, 5.6, 95.0, 100.5, 2.2e-9),
        carbon: closure(0.02, 0.5, 8.1, 7.62, 1.9e-9),
    }
}

/// The invented run: starved from about 200 s, opened at 480 s, back at 9 min.
pub fn starved_and_back() -> (Plan, Record) {
    let plan = plan();
    let mut lines = bedroom();
    lines.extend(hall());
    lines.extend(fire());
    let record = drawn(&plan, 900, &lines);
    (plan, record)
}

/// Drawn histories of a record.
pub type Lines = Vec<(Subject, Quantity, Vec<(f64, f64)>)>;

fn bedroom() -> Lines {
    use Quantity as Q;
    let room = Subject::Room(0);
    let hot = [
        (0., 20.),
        (175., 547.),
        (280., 190.),
        (480., 95.),
        (560., 240.),
        (590., 600.),
        (610., 880.),
        (700., 800.),
        (900., 300.),
    ];
    let cool = [
        (0., 20.),
        (175., 70.),
        (480., 60.),
        (610., 300.),
        (900., 60.),
    ];
    vec![
        (room, Q::UpperTemperature, kelvin(&hot)),
        (room, Q::LowerTemperature, kelvin(&cool)),
        (room, Q::MeanTemperature, kelvin(&hot)),
        (
            room,
            Q::Interface,
            vec![
                (0., 2.39),
                (20., 2.1),
                (60., 1.2),
                (175., 0.4),
                (480., 0.3),
                (520., 0.8),
                (610., 0.4),
                (900., 1.0),
            ],
        ),
        (
            room,
            Q::Pressure,
            vec![
                (0., 0.),
                (60., 60.),
                (150., 620.),
                (175., 20.),
                (190., -70.),
                (280., -3.),
                (900., -1.),
            ],
        ),
        (
            room,
            Q::FloorFlux,
            vec![
                (0., 0.),
                (150., 14e3),
                (175., 22.6e3),
                (200., 9e3),
                (480., 1e3),
                (580., 14e3),
                (610., 60e3),
                (700., 45e3),
                (900., 3e3),
            ],
        ),
        (
            room,
            Q::UpperOxygenDry,
            vec![
                (0., 0.2095),
                (280., 0.12),
                (480., 0.13),
                (610., 0.01),
                (900., 0.12),
            ],
        ),
    ]
}

fn hall() -> Lines {
    use Quantity as Q;
    let room = Subject::Room(1);
    let hot = [
        (0., 20.),
        (175., 180.),
        (280., 120.),
        (480., 93.),
        (520., 80.),
        (564., 190.),
        (640., 420.),
        (900., 150.),
    ];
    let cool = [
        (0., 20.),
        (175., 45.),
        (480., 37.),
        (520., 18.),
        (640., 60.),
        (900., 30.),
    ];
    vec![
        (room, Q::UpperTemperature, kelvin(&hot)),
        (room, Q::LowerTemperature, kelvin(&cool)),
        (room, Q::MeanTemperature, kelvin(&hot)),
        (
            room,
            Q::Interface,
            vec![
                (0., 2.39),
                (40., 2.05),
                (90., 1.2),
                (175., 0.5),
                (480., 0.4),
                (515., 1.05),
                (560., 0.7),
                (900., 1.2),
            ],
        ),
        (
            room,
            Q::UpperOxygenDry,
            vec![
                (0., 0.2095),
                (280., 0.14),
                (480., 0.145),
                (520., 0.17),
                (640., 0.05),
                (900., 0.15),
            ],
        ),
        (
            room,
            Q::LowerOxygenDry,
            vec![
                (0., 0.2095),
                (280., 0.18),
                (480., 0.17),
                (500., 0.205),
                (900., 0.2095),
            ],
        ),
        (
            room,
            Q::UpperCarbonMonoxide,
            vec![(0., 0.), (280., 0.006), (640., 0.02), (900., 0.004)],
        ),
        (room, Q::LowerCarbonMonoxide, vec![(0., 0.), (900., 0.001)]),
        (
            room,
            Q::UpperCarbonDioxide,
            vec![(0., 0.0004), (280., 0.05), (900., 0.05)],
        ),
        (
            room,
            Q::LowerCarbonDioxide,
            vec![(0., 0.0004), (900., 0.005)],
        ),
        (
            room,
            Q::UpperSoot,
            vec![(0., 0.), (90., 4e-4), (480., 9e-4), (900., 6e-4)],
        ),
        (
            room,
            Q::LowerSoot,
            vec![(0., 0.), (480., 1e-5), (900., 1e-5)],
        ),
        (
            room,
            Q::CeilingTemperature,
            kelvin(&[(0., 20.), (640., 250.), (900., 120.)]),
        ),
        (
            room,
            Q::LayerEmissivity,
            vec![(0., 0.), (90., 0.5), (900., 0.6)],
        ),
    ]
}

fn fire() -> Lines {
    use Quantity as Q;
    let bed = Subject::Item(0);
    let burned = vec![
        (0., 0.),
        (170., 1.36e6),
        (210., 0.7e6),
        (280., 0.12e6),
        (480., 54e3),
        (500., 60e3),
        (570., 1.0e6),
        (604., 2.4e6),
        (700., 1.8e6),
        (880., 0.05e6),
        (900., 0.03e6),
    ];
    vec![
        (Subject::House, Q::Burned, burned.clone()),
        (
            Subject::House,
            Q::AirCouldBurn,
            vec![(0., 0.), (480., 0.1e6), (490., 2.6e6), (900., 2.6e6)],
        ),
        (bed, Q::Burned, burned),
        (
            bed,
            Q::FreeRate,
            vec![
                (0., 0.),
                (170., 1.38e6),
                (480., 1.45e6),
                (604., 2.4e6),
                (700., 1.8e6),
                (880., 0.06e6),
                (900., 0.04e6),
            ],
        ),
        (
            bed,
            Q::BaseOxygen,
            vec![
                (0., 0.207),
                (175., 0.16),
                (280., 0.145),
                (480., 0.149),
                (488., 0.149),
                (520., 0.19),
                (620., 0.12),
                (900., 0.19),
            ],
        ),
        (
            bed,
            Q::FuelLeft,
            vec![
                (0., 21.),
                (175., 17.),
                (480., 14.),
                (700., 5.),
                (860., 0.9),
                (900., 0.5),
            ],
        ),
    ]
}
