//! Reads values that are lists or inner tables.

use super::super::fault::{Fault, code};
use super::super::fields::{self, Field, Kind, Words};
use super::table::{Reader, entries};
use super::values::{Located, Opened, Value};
use crate::units::Dimension;
use std::ops::Range;
use toml::Spanned;
use toml::de::{DeArray, DeValue};

/// Most rows in a list of times and heat release.
const MOST_RATES: usize = 5000;
/// Most courses in a lining.
const MOST_COURSES: usize = 8;

impl Reader<'_> {
    pub(super) fn two(
        &mut self,
        field: &Field,
        value: &Spanned<DeValue>,
        both: [(Dimension, f64, f64); 2],
    ) -> Option<Value> {
        let Some(array) = value.get_ref().as_array().filter(|array| array.len() == 2) else {
            self.wrong_kind(field, value.span(), "a list of two quantities");
            return None;
        };
        let mut numbers = [0.0; 2];
        let mut whole = true;
        for ((slot, element), range) in numbers.iter_mut().zip(array.iter()).zip(both) {
            match self.quantity(field, element, range) {
                Some(Value::Number(si, _)) => *slot = si,
                _ => whole = false,
            }
        }
        whole.then_some(Value::Two(numbers))
    }

    /// A list of times and heat release.
    pub(super) fn rates(
        &mut self,
        field: &Field,
        rows: &DeArray,
        span: Range<usize>,
    ) -> Option<Value> {
        const BOTH: [(Dimension, f64, f64); 2] = [
            (Dimension::Time, 0.0, 86_400.0),
            (Dimension::Power, 0.0, 1e9),
        ];
        if rows.len() < 2 || rows.len() > MOST_RATES {
            let wanted = format!("2 to {MOST_RATES} pairs of time and heat release");
            self.wrong_kind(field, span, &wanted);
            return None;
        }
        let mut read: Vec<(f64, f64)> = Vec::with_capacity(rows.len());
        let mut whole = true;
        for row in rows {
            let Some(Value::Two([time, rate])) = self.two(field, row, BOTH) else {
                whole = false;
                continue;
            };
            if read.last().is_some_and(|(before, _)| time <= *before) {
                whole = false;
                self.faults.push(
                    Fault::error(
                        code::OUT_OF_RANGE,
                        row.span(),
                        "times in a list of heat release must rise",
                    )
                    .label("not later than the row before")
                    .help("sort the rows by time, each time once"),
                );
            }
            read.push((time, rate));
        }
        if whole && read.iter().all(|(_, rate)| *rate <= 0.0) {
            self.wrong_kind(field, span, "some heat release above zero");
            return None;
        }
        whole.then_some(Value::Rates(read))
    }

    pub(super) fn courses(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        let count = value.get_ref().as_array().map_or(0, |array| array.len());
        if count == 0 || count > MOST_COURSES {
            let wanted = format!("a list of 1 to {MOST_COURSES} courses");
            self.wrong_kind(field, value.span(), &wanted);
            return None;
        }
        let rows = self.list(&fields::COURSE, value);
        (rows.len() == count).then_some(Value::Tables(rows))
    }

    pub(super) fn names(
        &mut self,
        field: &Field,
        value: &Spanned<DeValue>,
        least: usize,
        most: usize,
    ) -> Option<Value> {
        let wanted = if least == most {
            format!("a list of {least} names")
        } else {
            format!("a list of {least} to {most} names")
        };
        let array = value.get_ref().as_array();
        let Some(array) = array.filter(|array| (least..=most).contains(&array.len())) else {
            self.wrong_kind(field, value.span(), &wanted);
            return None;
        };
        let mut names = Vec::with_capacity(array.len());
        for element in array {
            let text = self.text(field, element)?;
            names.push(Located {
                value: text,
                span: element.span(),
                given: true,
            });
        }
        Some(Value::Names(names))
    }

    pub(super) fn starts(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        let Some(table) = value.get_ref().as_table() else {
            self.wrong_kind(field, value.span(), "a table of openings and positions");
            return None;
        };
        let range = (Dimension::Length, 0.0, 50.0);
        let position = Field {
            name: "position",
            kind: Kind::WordOr(Words::Positions, range.0, range.1, range.2),
            example: "shut",
            ..*field
        };
        let mut starts = Vec::new();
        for (key, span, element) in entries(table) {
            let opened = match self.word_or(&position, element, Words::Positions, range) {
                Some(Value::Text(text)) => Opened { text, width: None },
                Some(Value::Number(width, text)) => Opened {
                    text,
                    width: Some(width),
                },
                _ => continue,
            };
            let name = Located {
                value: key.to_owned(),
                span,
                given: true,
            };
            let opened = Located {
                value: opened,
                span: element.span(),
                given: true,
            };
            starts.push((name, opened));
        }
        Some(Value::Starts(starts))
    }
}
