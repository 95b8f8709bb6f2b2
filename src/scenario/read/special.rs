//! Reads values that have a form of their own: inner tables, when something
//! gives way, air-tightness.

use super::super::fault::{Fault, code};
use super::super::fields::{Field, Table};
use super::super::names;
use super::table::{Reader, entries};
use super::values::{Located, Value, Values};
use crate::physics::airtightness::{FLOW_EXPONENT, TEST_PRESSURE};
use crate::units::{self, Dimension};
use std::ops::Range;
use toml::Spanned;
use toml::de::DeValue;

/// Short forms of when something gives way.
pub(in super::super) const NEVER: &str = "never";
/// As [`NEVER`].
pub(in super::super) const BY_LAYER: &str = "by layer temperature";
/// As [`NEVER`].
pub(in super::super) const BY_GLASS: &str = "by glass temperature";

impl Reader<'_> {
    pub(super) fn inner(
        &mut self,
        field: &Field,
        table: &'static Table,
        value: &Spanned<DeValue>,
    ) -> Option<Value> {
        let Some(inner) = value.get_ref().as_table() else {
            self.wrong_kind(field, value.span(), "an inner table");
            return None;
        };
        let before = self.faults.len();
        let values = self.values(table, value.span(), entries(inner));
        (self.faults.len() == before).then(|| Value::Tables(vec![values]))
    }

    /// An inner table, or one of the short forms.
    pub(super) fn gives_way(
        &mut self,
        field: &Field,
        table: &'static Table,
        value: &Spanned<DeValue>,
    ) -> Option<Value> {
        let Some(text) = value.get_ref().as_str() else {
            return self.inner(field, table, value);
        };
        let mut known = vec![NEVER, BY_LAYER];
        if table.field("glass").is_some() {
            known.push(BY_GLASS);
        }
        if known.contains(&text) {
            return Some(Value::Text(text.to_owned()));
        }
        let Some(time) = text.strip_prefix("at ") else {
            let help = names::suggestion(text, field.name, known);
            self.faults.push(
                Fault::error(
                    code::UNKNOWN_NAME,
                    value.span(),
                    format!("`{}` cannot be \"{text}\"", field.name),
                )
                .label("not known here")
                .help(format!(
                    "{help} (or \"at 4 min\", or a table: {})",
                    field.example
                )),
            );
            return None;
        };
        let mut values = self.values(table, value.span(), Vec::new());
        let at = table.field("at")?;
        let time = Spanned::new(value.span(), DeValue::String(time.into()));
        let read = self.value(at, &time)?;
        values.put(
            at.name,
            Located {
                value: read,
                span: value.span(),
                given: true,
            },
        );
        Some(Value::Tables(vec![values]))
    }

    /// Air changes per hour, turned to 50 Pa.
    pub(super) fn air_changes(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        let text = self.text(field, value)?;
        let (rate, pressure) = text.split_once(" at ").unwrap_or((&text, "50 Pa"));
        let rate = ["per hour", "/h", "1/h", "ach"]
            .iter()
            .find_map(|unit| rate.trim().strip_suffix(unit));
        let Some(number) = rate.and_then(|rate| rate.trim().parse::<f64>().ok()) else {
            self.wrong_kind(field, value.span(), "air changes per hour at a pressure");
            return None;
        };
        let pressure = match units::read(pressure, Dimension::Pressure) {
            Ok(pressure) => pressure,
            Err(error) => {
                self.faults.push(
                    Fault::error(
                        code::UNIT,
                        value.span(),
                        format!("`{}`: {error}", field.name),
                    )
                    .help(error.help()),
                );
                return None;
            }
        };
        let sound = (0.01..=200.0).contains(&number) && (1.0..=200.0).contains(&pressure);
        if !sound {
            self.not_within(field, value.span(), "0.01 to 200 per hour at 1 to 200 Pa");
            return None;
        }
        let at_test = number * (TEST_PRESSURE / pressure).powf(FLOW_EXPONENT);
        Some(Value::Number(at_test, text))
    }

    pub(super) fn not_within(&mut self, field: &Field, span: Range<usize>, range: &str) {
        self.faults.push(
            Fault::error(
                code::OUT_OF_RANGE,
                span,
                format!("`{}` is out of range", field.name),
            )
            .label(format!("not within {range}"))
            .help(format!("{} It must lie within {range}", field.doc)),
        );
    }
}

impl Values {
    /// The inner table of a key.
    pub(in super::super) fn inner(&self, key: &str) -> Option<&Values> {
        self.tables(key).first()
    }
}
