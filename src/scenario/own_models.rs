//! A user's own models file: its rows go before those of the catalogue.

use super::fault::{Fault, Report, Severity, code};
use super::read::{self, Located, Named, Values};
use super::resolve;
use crate::catalogue::{
    Catalogue, Clear, FuelRow, GlassRow, LeafRow, LiningRow, NumberRow, PositionRow, catalogue,
};
use std::borrow::Cow;

/// What stands beside a scenario: gives the text of a file by its name, or why
/// it cannot be read.
pub type Beside<'a> = &'a dyn Fn(&str) -> Result<String, String>;

/// A models file as it was read.
#[derive(Debug, Clone, PartialEq, Eq)]
pub struct Models {
    /// Name in the scenario.
    pub name: String,
    /// Its text.
    pub text: String,
}

/// The models file that a scenario names, read.
pub(super) fn beside(text: &str, beside: Beside<'_>) -> Result<Option<Models>, Fault> {
    let Some(Located {
        value: name, span, ..
    }) = read::models_file(text)
    else {
        return Ok(None);
    };
    if name.contains(['/', '\\']) || name.starts_with('.') {
        return Err(Fault::error(
            code::UNKNOWN_NAME,
            span,
            "a models file lies beside the scenario: a name without folders",
        )
        .help("write it like `models = \"my-models.toml\"`"));
    }
    match beside(&name) {
        Ok(text) if text.len() > read::LARGEST_FILE => Err(Fault::error(
            code::TOO_MUCH,
            span,
            format!("{name} is larger than 1 MiB"),
        )),
        Ok(text) => Ok(Some(Models { name, text })),
        Err(why) => Err(Fault::error(
            code::UNKNOWN_NAME,
            span,
            format!("the models file \"{name}\" cannot be read: {why}"),
        )
        .help("put it beside the scenario, or take `models` out")),
    }
}

/// The catalogue with a user's own rows in it.
pub(super) fn with_own(models: Option<&Models>) -> Result<Cow<'static, Catalogue>, Report> {
    let Some(models) = models else {
        return Ok(Cow::Borrowed(catalogue()));
    };
    let mut faults = Vec::new();
    let rows = read::models(&models.text, catalogue(), &mut faults);
    let of = |kind: &str| -> &[Named] {
        rows.iter()
            .find(|(name, _)| *name == kind)
            .map_or(&[], |(_, rows)| rows)
    };
    let mut own = catalogue().clone();
    let (fuels, linings) = resolve::materials(of("fuel"), of("lining"), &mut faults);
    for fuel in fuels {
        let row = of("fuel").iter().find(|row| row.name.value == fuel.name);
        let (note, source) = row.map_or_else(Default::default, |row| told(&row.values));
        let chemical_heat = row
            .and_then(|row| row.values.number("chemical_heat"))
            .unwrap_or(f64::NAN);
        put(
            &mut own.fuels,
            FuelRow {
                fuel,
                chemical_heat,
                note,
                source,
            },
            |row| &row.fuel.name,
        );
    }
    for (lining, row) in linings.into_iter().zip(of("lining")) {
        let (note, source) = told(&row.values);
        put(
            &mut own.linings,
            LiningRow {
                lining,
                note,
                source,
            },
            |row| &row.lining.name,
        );
    }
    for row in of("glass") {
        put(&mut own.glass, glass(row), |row| &row.pane.name);
    }
    for row in of("leaf") {
        put(&mut own.leaves, leaf(row), |row| &row.name);
    }
    for row in of("position") {
        match position(row) {
            Ok(row) => put(&mut own.positions, row, |row| &row.name),
            Err(fault) => faults.push(fault),
        }
    }
    for (kind, key, list) in [
        ("growth", "factor", &mut own.growth),
        ("gap", "area", &mut own.gaps),
        ("posture", "height", &mut own.postures),
    ] {
        for row in of(kind) {
            put(list, number(row, key), |row| &row.name);
        }
    }
    if faults.iter().any(|fault| fault.severity == Severity::Error) {
        faults.retain(|fault| fault.severity == Severity::Error);
        return Err(Report::new(&models.name, &models.text, faults));
    }
    Ok(Cow::Owned(own))
}

/// Puts a row in the place of the one of its name, or at the end.
fn put<T>(rows: &mut Vec<T>, row: T, name: impl Fn(&T) -> &String) {
    match rows.iter_mut().find(|known| name(known) == name(&row)) {
        Some(place) => *place = row,
        None => rows.push(row),
    }
}

/// Note and source of a row.
fn told(values: &Values) -> (String, String) {
    let text = |key| values.text(key).unwrap_or_default().to_owned();
    (text("note"), text("source"))
}

/// A number of a row; what could not be read has its fault already.
fn of(row: &Named, key: &str) -> f64 {
    row.values.number(key).unwrap_or(f64::NAN)
}

fn number(row: &Named, key: &str) -> NumberRow {
    let (note, source) = told(&row.values);
    NumberRow {
        name: row.name.value.clone(),
        value: of(row, key),
        note,
        source,
    }
}

/// Glass from its own table.
pub(super) fn glass(row: &Named) -> GlassRow {
    let (note, source) = if row.values.table.field("note").is_some() {
        told(&row.values)
    } else {
        Default::default()
    };
    GlassRow {
        pane: crate::plan::Pane {
            name: row.name.value.clone(),
            thickness: of(row, "thickness"),
            density: of(row, "density"),
            heat_capacity: of(row, "heat_capacity"),
            emissivity: of(row, "emissivity"),
        },
        layer: of(row, "layer"),
        rise: of(row, "glass"),
        fraction: of(row, "fraction"),
        delay: of(row, "delay"),
        note,
        source,
    }
}

fn leaf(row: &Named) -> LeafRow {
    let (note, source) = told(&row.values);
    LeafRow {
        name: row.name.value.clone(),
        layer: of(row, "layer"),
        fraction: of(row, "fraction"),
        delay: of(row, "delay"),
        note,
        source,
    }
}

fn position(row: &Named) -> Result<PositionRow, Fault> {
    let values = &row.values;
    let clear = match (values.number("share"), values.number("clear_width")) {
        (Some(share), None) => Clear::Share(share),
        (None, Some(width)) => Clear::Width(width),
        _ => {
            return Err(Fault::error(
                code::CONTRADICTION,
                values.span.clone(),
                "a position has one of `share` and `clear_width`",
            )
            .help("write `share = 0.5` or `clear_width = \"13 cm\"`"));
        }
    };
    let (note, source) = told(values);
    Ok(PositionRow {
        name: row.name.value.clone(),
        clear,
        note,
        source,
    })
}
