//! The reference page of the scenario file, written from the field table.

use super::fields::{Field, KNOBS, Kind, MODEL_ROWS, Need, Shape, TABLES, Table, Words};
use crate::catalogue::catalogue;
use crate::plan::Choices;
use crate::units::{self, Dimension};
use std::fmt::Write as _;

/// A small scenario for the top of the page, and what to know of TOML.
const SMALL: &str = r#"
## A small one, complete

```toml
title = "Reed Lane 2: kitchen door opened"
duration = "10 min"

[room.kitchen]
width = "3.0 m"
length = "4.0 m"
height = "2.4 m"

[opening.back_door]
kind = "door"
between = ["kitchen", "open air"]
width = "0.9 m"
head = "2.0 m"
position = "shut"

[item.bin]
room = "kitchen"
fuel = "polyurethane mattress with bedding"
mass = "10 kg"
growth = "fast"
peak = "900 kW"
surface_height = "0.5 m"

[station.crew]
room = "kitchen"
posture = "kneeling"

[[action]]
name = "entry"
at = "5 min"
open = "back_door"
```

`[room.kitchen]` in single brackets begins one table with a name of its own; `[[action]]` in double brackets
begins one of many in a row, and is written again for each.
Text and quantities stand in quotes; only true, false and plain numbers do without.
"#;

/// The page `docs/scenario.md`; a test keeps the file in step.
pub fn reference_page() -> String {
    let mut out = String::from(
        "# The scenario file\n\n\
         <!-- Written from the field table (src/scenario/fields). Do not edit: change the table, \
         then run `UPDATE_REFERENCE=1 cargo test --test scenario reference`. -->\n\n\
         One TOML file says what the building is, what burns, who is there and what is done when. \
         Every quantity is text with its unit, metric or US customary. \
         `doorglow check FILE` reads a file, names every fault at once and runs nothing.\n\n\
         Names of rooms, openings and so on are yours. `\"open air\"` is the outside. \
         Names of fuels, linings, growth classes and positions come from the catalogue: \
         `doorglow catalogue` lists them with their sources.\n",
    );
    out.push_str(SMALL);
    out.push_str("\n## Units\n\n| quantity | units |\n| --- | --- |\n");
    for &dimension in Dimension::ALL {
        let symbols: Vec<String> = dimension
            .units()
            .map(|unit| format!("`{}`", unit.symbol))
            .collect();
        let bare = if dimension == Dimension::Ratio {
            ", or a plain number"
        } else {
            ""
        };
        // Writing to a string cannot fail.
        let _ = writeln!(
            out,
            "| {} | {}{bare} |",
            dimension.words(),
            symbols.join(", ")
        );
    }
    out.push_str("\nLengths, times and masses may add terms: `\"6 ft 8 in\"`, `\"4 min 30 s\"`.\n");
    for table in TABLES {
        section(&mut out, table);
    }
    out.push_str(
        "\n# A models file of your own\n\n\
         The scenario names it with `models`; it lies beside the scenario. \
         Its rows have the form of the files of `models/` and go before rows of the same name there. \
         Every row names its source.\n",
    );
    for table in MODEL_ROWS {
        section(&mut out, table);
    }
    out
}

fn section(out: &mut String, table: &Table) {
    let title = match table.shape {
        Shape::Root => "Top of the file".to_owned(),
        Shape::Inner => format!("Each of `{}`", table.name),
        _ => format!("`{}`", table.header()),
    };
    let _ = write!(out, "\n## {title}\n\n{}\n\n", table.doc);
    out.push_str("| key | value | when absent | meaning | example |\n");
    out.push_str("| --- | --- | --- | --- | --- |\n");
    for field in table.fields() {
        let _ = writeln!(
            out,
            "| `{}` | {} | {} | {} | `{}` |",
            field.name,
            kind_words(field.kind),
            absent_words(field),
            field.doc,
            example(field).replace('|', "\\|"),
        );
    }
}

fn absent_words(field: &Field) -> String {
    match field.need {
        Need::Required => "**required**".to_owned(),
        Need::Default(text) => format!("`{}`", toml_example(field.kind, text)),
        Need::Absent(words) => {
            standard(field).map_or_else(|| words.to_owned(), |text| format!("`{text}`"))
        }
    }
}

/// Default of a coefficient of `[physics]`, as written.
fn standard(field: &Field) -> Option<String> {
    let knob = KNOBS.iter().find(|knob| knob.field.name == field.name)?;
    let Kind::Quantity(dimension, ..) = field.kind else {
        return None;
    };
    let text = units::write((knob.get)(&Choices::default()), dimension);
    Some(toml_example(field.kind, &text))
}

fn kind_words(kind: Kind) -> String {
    let range = |dimension: Dimension, least: f64, most: f64| {
        format!(
            "{}, {} to {}",
            dimension.words(),
            units::rounded(least, dimension),
            units::rounded(most, dimension)
        )
    };
    match kind {
        Kind::Text => "text".to_owned(),
        Kind::Flag => "true or false".to_owned(),
        Kind::Quantity(dimension, least, most) => range(dimension, least, most),
        Kind::Word(words) => word_list(words),
        Kind::WordOr(words, dimension, least, most) => {
            format!("{}; or {}", word_list(words), range(dimension, least, most))
        }
        Kind::Growth => "a growth class, a growth factor, or a list of pairs".to_owned(),
        Kind::Two([first, second]) => {
            format!("a list of {} and {}", first.0.words(), second.0.words())
        }
        Kind::Courses => "a list of tables".to_owned(),
        Kind::Name(of) => format!("the name of a {}", of.words()),
        Kind::Names(of, least, most) if least == most => {
            format!("a list of {least} names, each a {}", of.words())
        }
        Kind::Names(of, least, most) => {
            format!("a list of {least} to {most} names, each a {}", of.words())
        }
        Kind::Starts => "a table of openings and positions".to_owned(),
        Kind::Inner(table) => format!("a table with keys as in `{}`", table.header()),
        Kind::GivesWay(table) => format!("a table or a short form, see `{}`", table.header()),
        Kind::Condition => {
            "`\"ROOM layer temperature > 300 °C\"`, `\"ROOM smoke level < 1.5 m\"`, `\"ROOM oxygen < 15 %\"`, `\"heat release > 1 MW\"`".to_owned()
        }
        Kind::AirChanges => "air changes per hour at a pressure".to_owned(),
    }
}

fn word_list(words: Words) -> String {
    let listed: Vec<String> = words
        .list(catalogue())
        .iter()
        .map(|word| format!("`\"{word}\"`"))
        .collect();
    listed.join(", ")
}

/// The example of a key, as it stands in a file.
pub(super) fn example(field: &Field) -> String {
    if field.example.is_empty() {
        return standard(field).unwrap_or_default();
    }
    toml_example(field.kind, field.example)
}

/// A text of the field table as a TOML value.
pub(super) fn toml_example(kind: Kind, text: &str) -> String {
    let bare = match kind {
        Kind::Flag
        | Kind::Two(_)
        | Kind::Courses
        | Kind::Names(..)
        | Kind::Starts
        | Kind::Inner(_)
        | Kind::GivesWay(_) => true,
        Kind::Quantity(Dimension::Ratio, ..) => text.parse::<f64>().is_ok(),
        _ => false,
    };
    if bare {
        text.to_owned()
    } else {
        format!("\"{text}\"")
    }
}
