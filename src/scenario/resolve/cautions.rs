//! What can be run but looks odd.

use super::super::fault::Fault;
use super::super::read::Sheet;
use super::Resolver;
use crate::plan::{Burning, Curve, Item, OpeningKind, Plan, Space};
use crate::units::{Dimension, rounded};

/// Length over width above which one room is no longer one box of gas.
const LONG_ROOM: f64 = 5.0;
/// Height above which two layers are doubtful, m.
const HIGH_ROOM: f64 = 6.0;
/// A peak that the mass cannot feed this long is never seen, s.
const SHORT_PEAK: f64 = 10.0;
/// Leak area per floor area below which pressures become large, m2/m2.
const TIGHT: f64 = 2e-4;

impl Resolver<'_> {
    pub(super) fn cautions(&mut self, plan: &Plan) {
        let sheet: &Sheet = self.sheet;
        if plan.items.is_empty() {
            self.note(Fault::caution(0..0, "nothing burns in this scenario"));
        }
        for (named, room) in sheet.rooms.iter().zip(&plan.rooms) {
            let (short, long) = (room.width.min(room.length), room.width.max(room.length));
            if long > LONG_ROOM * short {
                self.note(
                    Fault::caution(
                        named.name.span.clone(),
                        format!(
                            "room \"{}\" is more than {LONG_ROOM:.0} times as long as wide: its far end does not meet the gas of its near end at once",
                            room.name
                        ),
                    )
                    .help("split it into two rooms joined by an opening of kind = \"division\""),
                );
            }
            if room.height > HIGH_ROOM {
                self.note(Fault::caution(
                    named.values.span("height"),
                    format!(
                        "room \"{}\" is higher than {HIGH_ROOM:.0} m: two layers are doubtful",
                        room.name
                    ),
                ));
            }
        }
        for (named, item) in sheet.items.iter().zip(&plan.items) {
            if let Some(fuel) = plan.fuels.get(item.fuel.0) {
                let heat = energy(item, fuel);
                self.feeds_peak(named, item, heat);
            }
        }
        self.air_tight(plan);
        self.unused(plan);
        self.unused_linings(plan);
    }

    /// The mass feeds growth and some time at the peak.
    fn feeds_peak(&mut self, named: &super::Named, item: &Item, heat: f64) {
        let (Burning::Growing(curve) | Burning::AsGiven(curve)) = &item.burning else {
            return;
        };
        let wanted = match curve {
            Curve::Growth { alpha, peak } => {
                let reached = (peak / alpha).sqrt();
                alpha * reached.powi(3) / 3.0 + peak * SHORT_PEAK
            }
            Curve::Table(rates) => {
                rates
                .windows(2)
                .map(|pair| (pair[1].0 - pair[0].0) * (pair[0].1 + pair[1].1) / 2.0)
                .sum::<f64>()
                // A list with its own decay may ask for all of the mass.
                * 0.95
            }
        };
        if heat < wanted && named.values.number("mass").is_some() {
            self.note(
                Fault::caution(
                    named.values.span("mass"),
                    format!(
                        "item \"{}\" burns out before its curve is through: its mass gives {:.0} MJ, the curve wants {:.0} MJ",
                        item.name,
                        heat / 1e6,
                        wanted / 1e6
                    ),
                )
                .help("more mass, a lower peak or faster growth"),
            );
        }
    }

    /// A burning room needs some way out for its gas.
    fn air_tight(&mut self, plan: &Plan) {
        let outward: f64 = plan
            .openings
            .iter()
            .filter(|opening| opening.from == Space::OpenAir || opening.to == Space::OpenAir)
            .map(|opening| opening.gap_area + open_area(opening))
            .sum();
        let floor: f64 = plan.rooms.iter().map(crate::plan::Room::floor_area).sum();
        if !plan.items.is_empty() && outward < TIGHT * floor {
            self.note(
                Fault::caution(
                    0..0,
                    format!(
                        "the building is nearly airtight at ignition ({} to the open air): pressures will be higher than doors and windows bear",
                        rounded(outward, Dimension::Area)
                    ),
                )
                .help("add [leakage.house]; a dwelling of 100 m2 has about 0.03 to 0.1 m2"),
            );
        }
    }

    /// Facades, glass and fans that do nothing.
    fn unused(&mut self, plan: &Plan) {
        let sheet: &Sheet = self.sheet;
        let names = |key: &str, name: &str| {
            let tables = sheet.openings.iter().chain(&sheet.leakages);
            tables
                .filter(|named| named.values.table.field(key).is_some())
                .any(|named| named.values.text(key) == Some(name))
        };
        for (what, key, things) in [
            ("facade", "facade", &sheet.facades),
            ("glass", "glass", &sheet.glass),
        ] {
            for own in things.iter().filter(|own| !names(key, &own.name.value)) {
                self.note(
                    Fault::caution(
                        own.name.span.clone(),
                        format!("{what} \"{}\" is not used", own.name.value),
                    )
                    .help("name it in an opening, or take it out"),
                );
            }
        }
        for (own, fan) in sheet.fans.iter().zip(&plan.fans) {
            let starts = |values: &super::Values| values.text("start") == Some(&fan.name);
            let of_tactics = sheet.tactics.iter().flat_map(|tactic| &tactic.actions);
            if !fan.running && !sheet.actions.iter().chain(of_tactics).any(starts) {
                self.note(
                    Fault::caution(
                        own.name.span.clone(),
                        format!("fan \"{}\" never runs", fan.name),
                    )
                    .help("add an action that starts it, or `running = true`"),
                );
            }
        }
    }

    fn unused_linings(&mut self, plan: &Plan) {
        let sheet: &Sheet = self.sheet;
        for own in &sheet.linings {
            let name = &own.name.value;
            let used = plan.rooms.iter().any(|room| {
                [&room.ceiling, &room.walls, &room.floor]
                    .iter()
                    .any(|lining| lining.name == *name)
            }) || plan
                .shared_walls
                .iter()
                .any(|wall| wall.lining.name == *name);
            if !used {
                self.note(
                    Fault::caution(
                        own.name.span.clone(),
                        format!("lining \"{name}\" is not used"),
                    )
                    .help("name it in a room, or take it out"),
                );
            }
        }
    }
}

/// Heat that an item can give off when all that burns of it burns, J.
pub(in super::super) fn energy(item: &Item, fuel: &crate::plan::Fuel) -> f64 {
    let per_mass = fuel.heat_of_combustion - 32.8e6 * fuel.soot_yield - 10.1e6 * fuel.co_yield;
    item.mass * (1.0 - fuel.residue_share) * per_mass
}

/// Area that stands open at ignition, m2, gaps left aside.
pub(in super::super) fn open_area(opening: &crate::plan::Opening) -> f64 {
    if opening.kind.is_horizontal() {
        opening.area * opening.clear_width / opening.width
    } else {
        opening.clear_width * (opening.head - opening.sill)
    }
}

/// Whether an opening stands open at ignition, gaps left aside.
pub(in super::super) fn stands_open(opening: &crate::plan::Opening) -> bool {
    opening.kind != OpeningKind::Gap && opening.clear_width > 0.0
}
