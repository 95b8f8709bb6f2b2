//! Reads the embedded files of `models/`.

use super::{Catalogue, Clear, FuelRow, GlassRow, LeafRow, LiningRow, NumberRow, PositionRow};
use crate::plan::{Course, Fuel, Lining, Pane};
use crate::units::{self, Dimension};
use serde::Deserialize;

const FUELS: &str = include_str!("../../models/fuels.toml");
const LININGS: &str = include_str!("../../models/linings.toml");
const GROWTH: &str = include_str!("../../models/growth.toml");
const GLASS: &str = include_str!("../../models/glass.toml");
const DOORS: &str = include_str!("../../models/doors.toml");

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct FuelFile {
    fuel: Vec<FuelText>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct FuelText {
    name: String,
    note: String,
    carbon: f64,
    hydrogen: f64,
    oxygen: f64,
    nitrogen: f64,
    heat_of_combustion: String,
    chemical_heat: String,
    co_yield: f64,
    soot_yield: f64,
    residue_share: f64,
    radiative_fraction: f64,
    limiting_oxygen: f64,
    vapour_molar_mass: String,
    vapour_heat_capacity: [String; 2],
    doubling_flux: String,
    critical_flux: String,
    release_per_area: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct LiningFile {
    lining: Vec<LiningText>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct LiningText {
    name: String,
    note: String,
    emissivity: f64,
    courses: Vec<CourseText>,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct CourseText {
    thickness: String,
    conductivity: String,
    density: String,
    heat_capacity: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct GrowthFile {
    growth: Vec<GrowthText>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct GrowthText {
    name: String,
    factor: String,
    note: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct DoorFile {
    position: Vec<PositionText>,
    gap: Vec<GapText>,
    posture: Vec<PostureText>,
    leaf: Vec<LeafText>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct GlassFile {
    glass: Vec<GlassText>,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct GlassText {
    name: String,
    thickness: String,
    density: String,
    heat_capacity: String,
    emissivity: f64,
    layer: String,
    glass: String,
    fraction: f64,
    delay: String,
    note: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct LeafText {
    name: String,
    layer: String,
    fraction: f64,
    delay: String,
    note: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct PositionText {
    name: String,
    share: Option<f64>,
    clear_width: Option<String>,
    note: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct GapText {
    name: String,
    area: String,
    note: String,
    source: String,
}

#[derive(Deserialize)]
#[serde(deny_unknown_fields)]
struct PostureText {
    name: String,
    height: String,
    note: String,
    source: String,
}

/// The catalogue as embedded; what cannot be read is left out and named.
pub(super) fn embedded() -> Catalogue {
    let mut catalogue = Catalogue::default();
    let mut faults = Vec::new();
    if let Some(file) = parse::<FuelFile>("fuels", FUELS, &mut faults) {
        catalogue.fuels = keep(file.fuel, fuel, &mut faults);
    }
    if let Some(file) = parse::<LiningFile>("linings", LININGS, &mut faults) {
        catalogue.linings = keep(file.lining, lining, &mut faults);
    }
    if let Some(file) = parse::<GrowthFile>("growth", GROWTH, &mut faults) {
        catalogue.growth = keep(file.growth, growth, &mut faults);
    }
    if let Some(file) = parse::<DoorFile>("doors", DOORS, &mut faults) {
        catalogue.positions = keep(file.position, position, &mut faults);
        catalogue.gaps = keep(file.gap, gap, &mut faults);
        catalogue.postures = keep(file.posture, posture, &mut faults);
        catalogue.leaves = keep(file.leaf, leaf, &mut faults);
    }
    if let Some(file) = parse::<GlassFile>("glass", GLASS, &mut faults) {
        catalogue.glass = keep(file.glass, glass, &mut faults);
    }
    catalogue.faults = faults;
    catalogue
}

fn parse<T: for<'de> Deserialize<'de>>(
    name: &str,
    text: &str,
    faults: &mut Vec<String>,
) -> Option<T> {
    toml::from_str(text)
        .map_err(|error| faults.push(format!("models/{name}.toml: {error}")))
        .ok()
}

fn keep<T, R>(
    rows: Vec<T>,
    read: impl Fn(T) -> Result<R, String>,
    faults: &mut Vec<String>,
) -> Vec<R> {
    rows.into_iter()
        .filter_map(|row| read(row).map_err(|fault| faults.push(fault)).ok())
        .collect()
}

fn si(row: &str, text: &str, dimension: Dimension) -> Result<f64, String> {
    units::read(text, dimension).map_err(|error| format!("{row}: \"{text}\": {error}"))
}

fn fuel(text: FuelText) -> Result<FuelRow, String> {
    let name = text.name.as_str();
    Ok(FuelRow {
        chemical_heat: si(name, &text.chemical_heat, Dimension::SpecificEnergy)?,
        fuel: Fuel {
            name: text.name.clone(),
            carbon: text.carbon,
            hydrogen: text.hydrogen,
            oxygen: text.oxygen,
            nitrogen: text.nitrogen,
            heat_of_combustion: si(name, &text.heat_of_combustion, Dimension::SpecificEnergy)?,
            co_yield: text.co_yield,
            soot_yield: text.soot_yield,
            residue_share: text.residue_share,
            radiative_fraction: text.radiative_fraction,
            limiting_oxygen: text.limiting_oxygen,
            vapour_molar_mass: si(name, &text.vapour_molar_mass, Dimension::MolarMass)?,
            vapour_heat_capacity: [
                si(name, &text.vapour_heat_capacity[0], Dimension::HeatCapacity)?,
                si(
                    name,
                    &text.vapour_heat_capacity[1],
                    Dimension::HeatCapacitySlope,
                )?,
            ],
            doubling_flux: si(name, &text.doubling_flux, Dimension::Flux)?,
            critical_flux: si(name, &text.critical_flux, Dimension::Flux)?,
            release_per_area: si(name, &text.release_per_area, Dimension::Flux)?,
        },
        note: text.note,
        source: text.source,
    })
}

fn lining(text: LiningText) -> Result<LiningRow, String> {
    let name = text.name.as_str();
    let course = |course: &CourseText| -> Result<Course, String> {
        Ok(Course {
            thickness: si(name, &course.thickness, Dimension::Length)?,
            conductivity: si(name, &course.conductivity, Dimension::Conductivity)?,
            density: si(name, &course.density, Dimension::Density)?,
            heat_capacity: si(name, &course.heat_capacity, Dimension::HeatCapacity)?,
        })
    };
    Ok(LiningRow {
        lining: Lining {
            name: text.name.clone(),
            emissivity: text.emissivity,
            courses: text.courses.iter().map(course).collect::<Result<_, _>>()?,
        },
        note: text.note,
        source: text.source,
    })
}

fn glass(text: GlassText) -> Result<GlassRow, String> {
    let name = text.name.as_str();
    Ok(GlassRow {
        pane: Pane {
            name: text.name.clone(),
            thickness: si(name, &text.thickness, Dimension::Length)?,
            density: si(name, &text.density, Dimension::Density)?,
            heat_capacity: si(name, &text.heat_capacity, Dimension::HeatCapacity)?,
            emissivity: text.emissivity,
        },
        layer: si(name, &text.layer, Dimension::Temperature)?,
        rise: si(name, &text.glass, Dimension::TemperatureDifference)?,
        fraction: text.fraction,
        delay: si(name, &text.delay, Dimension::Time)?,
        note: text.note,
        source: text.source,
    })
}

fn leaf(text: LeafText) -> Result<LeafRow, String> {
    Ok(LeafRow {
        layer: si(&text.name, &text.layer, Dimension::Temperature)?,
        fraction: text.fraction,
        delay: si(&text.name, &text.delay, Dimension::Time)?,
        name: text.name,
        note: text.note,
        source: text.source,
    })
}

fn growth(text: GrowthText) -> Result<NumberRow, String> {
    Ok(NumberRow {
        value: si(&text.name, &text.factor, Dimension::GrowthFactor)?,
        name: text.name,
        note: text.note,
        source: text.source,
    })
}

fn gap(text: GapText) -> Result<NumberRow, String> {
    Ok(NumberRow {
        value: si(&text.name, &text.area, Dimension::Area)?,
        name: text.name,
        note: text.note,
        source: text.source,
    })
}

fn posture(text: PostureText) -> Result<NumberRow, String> {
    Ok(NumberRow {
        value: si(&text.name, &text.height, Dimension::Length)?,
        name: text.name,
        note: text.note,
        source: text.source,
    })
}

fn position(text: PositionText) -> Result<PositionRow, String> {
    let clear = match (text.share, &text.clear_width) {
        (Some(share), None) => Clear::Share(share),
        (None, Some(width)) => Clear::Width(si(&text.name, width, Dimension::Length)?),
        _ => return Err(format!("{}: one of share and clear_width", text.name)),
    };
    Ok(PositionRow {
        clear,
        name: text.name,
        note: text.note,
        source: text.source,
    })
}
