//! Linings and fuels: of the scenario first, then of the catalogue.

use super::super::fault::{Fault, code};
use super::super::fields::Of;
use super::super::read::{Located, Named, Sheet, Values};
use super::{Resolver, UNREAD};
use crate::plan::{Course, Fuel, Lining};
use std::ops::Range;

/// How long a chain of `like` may be.
const LONGEST_LIKE: usize = 10;

/// Numbers of a fuel that a scenario may state.
type FuelKey = (&'static str, fn(&mut Fuel) -> &mut f64);

const FUEL_KEYS: &[FuelKey] = &[
    ("carbon", |fuel| &mut fuel.carbon),
    ("hydrogen", |fuel| &mut fuel.hydrogen),
    ("oxygen", |fuel| &mut fuel.oxygen),
    ("nitrogen", |fuel| &mut fuel.nitrogen),
    ("heat_of_combustion", |fuel| &mut fuel.heat_of_combustion),
    ("co_yield", |fuel| &mut fuel.co_yield),
    ("soot_yield", |fuel| &mut fuel.soot_yield),
    ("residue_share", |fuel| &mut fuel.residue_share),
    ("radiative_fraction", |fuel| &mut fuel.radiative_fraction),
    ("limiting_oxygen", |fuel| &mut fuel.limiting_oxygen),
    ("vapour_molar_mass", |fuel| &mut fuel.vapour_molar_mass),
    ("doubling_flux", |fuel| &mut fuel.doubling_flux),
    ("critical_flux", |fuel| &mut fuel.critical_flux),
    ("release_per_area", |fuel| &mut fuel.release_per_area),
];

impl Resolver<'_> {
    /// Lining that a key names.
    pub(super) fn lining(&mut self, values: &Values, key: &str) -> Lining {
        let unread = Lining {
            name: String::new(),
            emissivity: UNREAD,
            courses: Vec::new(),
        };
        let Some(name) = values.name(key) else {
            return unread;
        };
        let sheet: &Sheet = self.sheet;
        let own = sheet
            .linings
            .iter()
            .find(|lining| lining.name.value == name.value);
        if let Some(own) = own {
            return own_lining(own);
        }
        if let Some(row) = self.catalogue.lining(&name.value) {
            return row.lining.clone();
        }
        let known: Vec<&str> = sheet
            .linings
            .iter()
            .map(|lining| lining.name.value.as_str())
            .chain(
                self.catalogue
                    .linings
                    .iter()
                    .map(|row| row.lining.name.as_str()),
            )
            .collect();
        self.unknown(Of::Lining, &name, &known);
        unread
    }

    /// Fuel by name; `None` after a fault.
    pub(super) fn fuel(&mut self, name: &Located<String>) -> Option<Fuel> {
        self.fuel_within(name, LONGEST_LIKE)
    }

    fn fuel_within(&mut self, name: &Located<String>, left: usize) -> Option<Fuel> {
        let sheet: &Sheet = self.sheet;
        let own = sheet
            .fuels
            .iter()
            .find(|fuel| fuel.name.value == name.value);
        let Some(own) = own else {
            let found = self.catalogue.fuel(&name.value).map(|row| row.fuel.clone());
            if found.is_none() {
                let known: Vec<&str> = sheet
                    .fuels
                    .iter()
                    .map(|fuel| fuel.name.value.as_str())
                    .chain(
                        self.catalogue
                            .fuels
                            .iter()
                            .map(|row| row.fuel.name.as_str()),
                    )
                    .collect();
                self.unknown(Of::Fuel, name, &known);
            }
            return found;
        };
        let base = match own.values.name("like") {
            // A fuel that is like its own name means the catalogue's.
            Some(like) if like.value == name.value => {
                let found = self.catalogue.fuel(&like.value).map(|row| row.fuel.clone());
                if found.is_none() {
                    self.unknown(Of::Fuel, &like, &[]);
                }
                Some(found?)
            }
            Some(like) if left == 0 => {
                self.note(
                    Fault::error(
                        code::CONTRADICTION,
                        like.span,
                        "fuels that are like each other in a ring",
                    )
                    .help("let one of them be like a fuel of the catalogue"),
                );
                return None;
            }
            Some(like) => Some(self.fuel_within(&like, left - 1)?),
            None => None,
        };
        let fuel = self.own_fuel(&name.value, &own.values, base)?;
        self.mixture(&fuel, &own.values);
        Some(fuel)
    }

    /// A fuel from its own keys over those of another.
    fn own_fuel(&mut self, name: &str, values: &Values, base: Option<Fuel>) -> Option<Fuel> {
        let alone = base.is_none();
        let mut fuel = base.unwrap_or_else(blank);
        name.clone_into(&mut fuel.name);
        let mut missing = Vec::new();
        let mut whole = true;
        let mut absent = |key: &'static str| {
            // A key that could not be read has its fault already.
            if values.has(key) {
                whole = false;
            } else if alone {
                missing.push(key);
            }
        };
        for (key, slot) in FUEL_KEYS {
            match values.number(key) {
                Some(number) => *slot(&mut fuel) = number,
                None => absent(key),
            }
        }
        match values.two("vapour_heat_capacity") {
            Some(two) => fuel.vapour_heat_capacity = two,
            None => absent("vapour_heat_capacity"),
        }
        if !missing.is_empty() {
            whole = false;
            self.note(
                Fault::error(
                    code::MISSING_KEY,
                    values.span.clone(),
                    format!(
                        "fuel \"{name}\" is like no other and lacks `{}`",
                        missing.join("`, `")
                    ),
                )
                .label("in this table")
                .help("state them all, or write `like = \"wood\"` and only what differs"),
            );
        }
        whole.then_some(fuel)
    }

    /// Overrides of yields that an item states, as a fuel of its own.
    pub(super) fn item_fuel(&mut self, item: &str, values: &Values, fuel: Fuel) -> Fuel {
        let mut own = fuel;
        let mut changed = false;
        for (key, slot) in FUEL_KEYS {
            if values.table.field(key).is_some()
                && let Some(number) = values.number(key)
            {
                changed |= *slot(&mut own) != number;
                *slot(&mut own) = number;
            }
        }
        if changed {
            own.name = format!("{} as in {item}", own.name);
            self.mixture(&own, values);
        }
        own
    }

    /// What cannot be: no carbon and hydrogen, more carbon in soot and CO than
    /// the fuel has, more heat in them than it gives.
    fn mixture(&mut self, fuel: &Fuel, values: &Values) {
        let mass = 12.011 * fuel.carbon
            + 1.008 * fuel.hydrogen
            + 15.999 * fuel.oxygen
            + 14.007 * fuel.nitrogen;
        let oxygen = fuel.carbon + fuel.hydrogen / 4.0 - fuel.oxygen / 2.0;
        if mass <= 0.0 || oxygen <= 0.0 {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    place(values, "carbon"),
                    format!("fuel \"{}\" takes no oxygen: it cannot burn", fuel.name),
                )
                .help("check carbon, hydrogen and oxygen"),
            );
            return;
        }
        let carbon = 12.011 * fuel.carbon / mass;
        let bound = fuel.soot_yield + fuel.co_yield * 12.011 / 28.01;
        let heat = 32.8e6 * fuel.soot_yield + 10.1e6 * fuel.co_yield;
        if bound > carbon || heat >= fuel.heat_of_combustion {
            self.note(
                Fault::error(
                    code::DOES_NOT_FIT,
                    place(values, "soot_yield"),
                    format!(
                        "soot and CO of fuel \"{}\" take more carbon or heat than it has",
                        fuel.name
                    ),
                )
                .help("lower soot_yield or co_yield"),
            );
        }
        let per_oxygen = fuel.heat_of_combustion * mass / (oxygen * 31.998) / 13.1e6;
        if (per_oxygen - 1.0).abs() > 0.08 {
            self.note(
                Fault::caution(
                    place(values, "heat_of_combustion"),
                    format!(
                        "fuel \"{}\" gives {:.1} MJ per kg of oxygen; nearly all fuels give 13.1 within 8 %",
                        fuel.name,
                        per_oxygen * 13.1
                    ),
                )
                .help("check the formula against the complete net heat of the volatiles"),
            );
        }
    }
}

/// A lining from its own table.
pub(super) fn own_lining(own: &Named) -> Lining {
    Lining {
        name: own.name.value.clone(),
        emissivity: own.values.number("emissivity").unwrap_or(UNREAD),
        courses: own.values.tables("courses").iter().map(course).collect(),
    }
}

/// Place of a key, or of the table's header where the table has no such key:
/// an item states some keys of its fuel, but not all.
fn place(values: &Values, key: &str) -> Range<usize> {
    if values.table.field(key).is_some() {
        values.span(key)
    } else {
        values.span.clone()
    }
}

fn course(values: &Values) -> Course {
    let number = |key| values.number(key).unwrap_or(UNREAD);
    Course {
        thickness: number("thickness"),
        conductivity: number("conductivity"),
        density: number("density"),
        heat_capacity: number("heat_capacity"),
    }
}

fn blank() -> Fuel {
    Fuel {
        name: String::new(),
        carbon: UNREAD,
        hydrogen: UNREAD,
        oxygen: UNREAD,
        nitrogen: UNREAD,
        heat_of_combustion: UNREAD,
        co_yield: UNREAD,
        soot_yield: UNREAD,
        residue_share: UNREAD,
        radiative_fraction: UNREAD,
        limiting_oxygen: UNREAD,
        vapour_molar_mass: UNREAD,
        vapour_heat_capacity: [UNREAD; 2],
        doubling_flux: UNREAD,
        critical_flux: UNREAD,
        release_per_area: UNREAD,
    }
}
