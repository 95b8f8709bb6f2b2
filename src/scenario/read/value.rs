//! Reads one value by its kind.

use super::super::fault::{Fault, code};
use super::super::fields::{Field, Kind, Words};
use super::super::{names, reference};
use super::table::Reader;
use super::values::Value;
use crate::units::{self, Dimension};
use std::ops::Range;
use toml::Spanned;
use toml::de::DeValue;

/// Longest text taken, characters.
const LONGEST_TEXT: usize = 500;

impl Reader<'_> {
    /// Value of a key, or `None` after a fault.
    pub(super) fn value(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        match field.kind {
            Kind::Text | Kind::Name(_) | Kind::Condition => {
                self.text(field, value).map(Value::Text)
            }
            Kind::Flag => self.flag(field, value),
            Kind::Quantity(dimension, least, most) => {
                self.quantity(field, value, (dimension, least, most))
            }
            Kind::Word(words) => self.word(field, value, words),
            Kind::WordOr(words, dimension, least, most) => {
                self.word_or(field, value, words, (dimension, least, most))
            }
            Kind::Growth => self.growth(field, value),
            Kind::Two(both) => self.two(field, value, both),
            Kind::Courses => self.courses(field, value),
            Kind::Names(_, least, most) => self.names(field, value, least, most),
            Kind::Starts => self.starts(field, value),
            Kind::Inner(table) => self.inner(field, table, value),
            Kind::GivesWay(table) => self.gives_way(field, table, value),
            Kind::AirChanges => self.air_changes(field, value),
        }
    }

    pub(super) fn wrong_kind(&mut self, field: &Field, span: Range<usize>, wanted: &str) {
        self.faults.push(
            Fault::error(
                code::WRONG_KIND,
                span,
                format!("`{}` wants {wanted}", field.name),
            )
            .help(format!(
                "write it like `{} = {}`",
                field.name,
                reference::example(field)
            )),
        );
    }

    pub(super) fn text(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<String> {
        let Some(text) = value.get_ref().as_str() else {
            self.wrong_kind(field, value.span(), "text in quotes");
            return None;
        };
        let controls = text.chars().any(char::is_control);
        if text.trim().is_empty() || text.chars().count() > LONGEST_TEXT || controls {
            let wanted = format!("text on one line, 1 to {LONGEST_TEXT} characters");
            self.wrong_kind(field, value.span(), &wanted);
            return None;
        }
        Some(text.to_owned())
    }

    fn flag(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        let flag = value.get_ref().as_bool();
        if flag.is_none() {
            self.wrong_kind(field, value.span(), "true or false");
        }
        flag.map(Value::Flag)
    }

    /// A quantity within its range; a bare number only where no unit is wanted.
    pub(super) fn quantity(
        &mut self,
        field: &Field,
        value: &Spanned<DeValue>,
        (dimension, least, most): (Dimension, f64, f64),
    ) -> Option<Value> {
        let text = match value.get_ref() {
            DeValue::String(text) => text.to_string(),
            DeValue::Integer(integer) if integer.radix() == 10 => integer.as_str().to_owned(),
            DeValue::Float(float) => float.as_str().to_owned(),
            _ => {
                self.wrong_kind(field, value.span(), dimension.words());
                return None;
            }
        };
        let si = match units::read(&text, dimension) {
            Ok(si) => si,
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
        if si < least || si > most {
            let (least, most) = (
                units::rounded(least, dimension),
                units::rounded(most, dimension),
            );
            self.not_within(field, value.span(), &format!("{least} to {most}"));
            return None;
        }
        Some(Value::Number(si, text))
    }

    fn word(&mut self, field: &Field, value: &Spanned<DeValue>, words: Words) -> Option<Value> {
        let text = self.text(field, value)?;
        let known = words.list(self.catalogue);
        if known.contains(&text.as_str()) {
            return Some(Value::Text(text));
        }
        self.unknown_word(field, value.span(), &text, &known, "");
        None
    }

    fn unknown_word(
        &mut self,
        field: &Field,
        span: Range<usize>,
        text: &str,
        known: &[&str],
        or: &str,
    ) {
        let help = names::suggestion(text, field.name, known.iter().copied());
        self.faults.push(
            Fault::error(
                code::UNKNOWN_NAME,
                span,
                format!("`{}` cannot be \"{text}\"", field.name),
            )
            .label("not known here")
            .help(format!("{help}{or}")),
        );
    }

    pub(super) fn word_or(
        &mut self,
        field: &Field,
        value: &Spanned<DeValue>,
        words: Words,
        range: (Dimension, f64, f64),
    ) -> Option<Value> {
        let known = words.list(self.catalogue);
        match value.get_ref().as_str() {
            Some(text) if known.contains(&text) => Some(Value::Text(text.to_owned())),
            Some(text) if !looks_like_number(text) => {
                let or = format!(" (or {} like \"{}\")", range.0.words(), range.0.example());
                self.unknown_word(field, value.span(), text, &known, &or);
                None
            }
            text => {
                let meant_a_word = text.is_some_and(|text| text.contains('/'));
                let before = self.faults.len();
                let read = self.quantity(field, value, range);
                if meant_a_word
                    && let Some(fault) = self.faults.get_mut(before)
                    && fault.code == code::UNIT
                {
                    let words = known.join("\", \"");
                    fault.help = Some(format!(
                        "write one of \"{words}\" (or {} like \"{}\")",
                        range.0.words(),
                        range.0.example()
                    ));
                }
                read
            }
        }
    }

    fn growth(&mut self, field: &Field, value: &Spanned<DeValue>) -> Option<Value> {
        const FACTOR: (Dimension, f64, f64) = (Dimension::GrowthFactor, 1e-3, 1e5);
        match value.get_ref() {
            DeValue::Array(rows) => self.rates(field, rows, value.span()),
            DeValue::String(text) => {
                if let Some(factor) = self.catalogue.growth(text) {
                    return Some(Value::Number(factor, text.to_string()));
                }
                if looks_like_number(text) {
                    return self.quantity(field, value, FACTOR);
                }
                let known: Vec<&str> = self
                    .catalogue
                    .growth
                    .iter()
                    .map(|row| row.name.as_str())
                    .collect();
                let or = " (or a growth factor like \"0.0469 kW/s2\", or a list of times and heat release like [[\"0 s\", \"0 kW\"], [\"60 s\", \"200 kW\"]])";
                self.unknown_word(field, value.span(), text, &known, or);
                None
            }
            _ => {
                self.wrong_kind(field, value.span(), "a growth class, factor or list");
                None
            }
        }
    }
}

/// Whether a text means to be a number.
fn looks_like_number(text: &str) -> bool {
    text.trim_start()
        .starts_with(|first: char| first.is_ascii_digit() || "+-.−".contains(first))
}
