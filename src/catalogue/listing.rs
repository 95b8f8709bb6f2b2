//! The catalogue as text and as JSON, for `doorglow catalogue`.

use super::{
    Catalogue, Clear, FuelRow, GlassRow, LeafRow, LiningRow, NumberRow, PositionRow, catalogue,
};
use crate::units::{Dimension, write};
use serde_json::{Value, json};
use std::fmt::Write as _;

/// Form of a listing.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Format {
    /// For people.
    Text,
    /// For programs; SI numbers.
    Json,
}

/// Everything the catalogue holds, with sources.
pub fn listing(format: Format) -> String {
    let catalogue = catalogue();
    match format {
        Format::Text => text(catalogue),
        Format::Json => format!("{:#}\n", json(catalogue)),
    }
}

fn text(catalogue: &Catalogue) -> String {
    let mut out = String::new();
    out.push_str("FUELS (per kg of what burns, well ventilated)\n");
    for row in &catalogue.fuels {
        out.push_str(&fuel_text(row));
    }
    out.push_str("\nLININGS (from the hot face inwards)\n");
    for row in &catalogue.linings {
        out.push_str(&lining_text(row));
    }
    out.push_str("\nGROWTH (heat release = factor x time squared)\n");
    numbers(&mut out, &catalogue.growth, Dimension::GrowthFactor);
    out.push_str("\nPOSITIONS OF DOORS AND WINDOWS\n");
    for row in &catalogue.positions {
        let clear = match row.clear {
            Clear::Share(share) => format!("{:.0} % of the clear width", share * 100.0),
            Clear::Width(width) => format!("{} clear", write(width, Dimension::Length)),
        };
        entry(&mut out, &row.name, &clear, &row.note, &row.source);
    }
    out.push_str("\nGAPS OF SHUT DOORS AND WINDOWS (orifice area, coefficient 0.6)\n");
    numbers(&mut out, &catalogue.gaps, Dimension::Area);
    out.push_str("\nPOSTURES (height of the head above the floor)\n");
    numbers(&mut out, &catalogue.postures, Dimension::Length);
    out.push_str("\nGLASS (when it falls out is uncertain: vary it)\n");
    for row in &catalogue.glass {
        let value = format!(
            "{} inner pane; falls out at {} of the layer, or {} rise of the pane when asked for; {:.0} % of the clear width",
            write(row.pane.thickness, Dimension::Length),
            write(row.layer, Dimension::Temperature),
            write(row.rise, Dimension::TemperatureDifference),
            row.fraction * 100.0,
        );
        entry(&mut out, &row.pane.name, &value, &row.note, &row.source);
    }
    out.push_str("\nDOOR LEAVES (when they fail is uncertain: vary it)\n");
    for row in &catalogue.leaves {
        let value = format!(
            "fails {} after the layer has reached {}",
            write(row.delay, Dimension::Time),
            write(row.layer, Dimension::Temperature),
        );
        entry(&mut out, &row.name, &value, &row.note, &row.source);
    }
    out
}

fn entry(out: &mut String, name: &str, value: &str, note: &str, source: &str) {
    // Writing to a string cannot fail.
    let _ = writeln!(out, "  {name}: {value}");
    let _ = writeln!(out, "    {note}");
    let _ = writeln!(out, "    source: {source}");
}

fn numbers(out: &mut String, rows: &[NumberRow], dimension: Dimension) {
    for row in rows {
        let value = write(row.value, dimension);
        entry(out, &row.name, &value, &row.note, &row.source);
    }
}

fn fuel_text(row: &FuelRow) -> String {
    let fuel = &row.fuel;
    let mut out = String::new();
    let value = format!(
        "{} of item released (volatiles {}), radiated {:.0} %, soot {} and CO {} kg/kg, \
         residue {:.0} %, oxygen limit {:.1} %",
        write(row.chemical_heat, Dimension::SpecificEnergy),
        write(fuel.heat_of_combustion, Dimension::SpecificEnergy),
        fuel.radiative_fraction * 100.0,
        fuel.soot_yield,
        fuel.co_yield,
        fuel.residue_share * 100.0,
        fuel.limiting_oxygen * 100.0,
    );
    entry(&mut out, &fuel.name, &value, &row.note, &row.source);
    out
}

fn lining_text(row: &LiningRow) -> String {
    let courses: Vec<String> = row
        .lining
        .courses
        .iter()
        .map(|course| {
            format!(
                "{} of {}, {}, {}",
                write(course.thickness, Dimension::Length),
                write(course.conductivity, Dimension::Conductivity),
                write(course.density, Dimension::Density),
                write(course.heat_capacity, Dimension::HeatCapacity),
            )
        })
        .collect();
    let mut out = String::new();
    entry(
        &mut out,
        &row.lining.name,
        &courses.join("; then "),
        &row.note,
        &row.source,
    );
    out
}

fn json(catalogue: &Catalogue) -> Value {
    let fuels: Vec<Value> = catalogue.fuels.iter().map(fuel_json).collect();
    let linings: Vec<Value> = catalogue.linings.iter().map(lining_json).collect();
    let positions: Vec<Value> = catalogue.positions.iter().map(position_json).collect();
    json!({
        "units": "SI",
        "fuels": fuels,
        "linings": linings,
        "growth": numbers_json(&catalogue.growth),
        "positions": positions,
        "gaps": numbers_json(&catalogue.gaps),
        "postures": numbers_json(&catalogue.postures),
        "glass": catalogue.glass.iter().map(glass_json).collect::<Vec<_>>(),
        "leaves": catalogue.leaves.iter().map(leaf_json).collect::<Vec<_>>(),
    })
}

fn fuel_json(row: &FuelRow) -> Value {
    json!({
        "fuel": row.fuel,
        "chemical_heat": row.chemical_heat,
        "note": row.note,
        "source": row.source,
    })
}

fn lining_json(row: &LiningRow) -> Value {
    json!({ "lining": row.lining, "note": row.note, "source": row.source })
}

fn position_json(row: &PositionRow) -> Value {
    let mut value = json!({ "name": row.name, "note": row.note, "source": row.source });
    match row.clear {
        Clear::Share(share) => value["share"] = json!(share),
        Clear::Width(width) => value["clear_width"] = json!(width),
    }
    value
}

fn glass_json(row: &GlassRow) -> Value {
    json!({
        "pane": row.pane,
        "layer": row.layer,
        "rise": row.rise,
        "fraction": row.fraction,
        "delay": row.delay,
        "note": row.note,
        "source": row.source,
    })
}

fn leaf_json(row: &LeafRow) -> Value {
    json!({
        "name": row.name,
        "layer": row.layer,
        "fraction": row.fraction,
        "delay": row.delay,
        "note": row.note,
        "source": row.source,
    })
}

fn numbers_json(rows: &[NumberRow]) -> Vec<Value> {
    rows.iter()
        .map(|row| {
            json!({
                "name": row.name,
                "value": row.value,
                "note": row.note,
                "source": row.source,
            })
        })
        .collect()
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;

    #[test]
    fn verify_both_listings_name_every_row() {
        let text = listing(Format::Text);
        let json: Value = serde_json::from_str(&listing(Format::Json)).unwrap();
        for row in &catalogue().fuels {
            assert!(text.contains(&row.fuel.name));
        }
        assert_eq!(
            json["fuels"].as_array().unwrap().len(),
            catalogue().fuels.len()
        );
    }
}
