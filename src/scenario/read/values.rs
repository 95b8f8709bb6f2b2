//! Values read from one table, each with its place.

use super::super::fields::Table;
use std::collections::BTreeMap;
use std::ops::Range;

/// Something with its place in the file.
#[derive(Debug, Clone, PartialEq)]
pub(in super::super) struct Located<T> {
    /// What.
    pub(in super::super) value: T,
    /// Where; the table's header when it is a default.
    pub(in super::super) span: Range<usize>,
    /// Whether the file says it.
    pub(in super::super) given: bool,
}

/// How far something is open: in words, or a clear width in m.
#[derive(Debug, Clone, PartialEq)]
pub(in super::super) struct Opened {
    /// As written.
    pub(in super::super) text: String,
    /// Clear width, m, when written as one.
    pub(in super::super) width: Option<f64>,
}

/// A value that has passed the first stage.
#[derive(Debug, Clone)]
pub(in super::super) enum Value {
    /// Free text or one word of a set.
    Text(String),
    /// true or false.
    Flag(bool),
    /// SI number, with the text it was written as.
    Number(f64, String),
    /// Two SI numbers.
    Two([f64; 2]),
    /// Times (s) and heat release (W).
    Rates(Vec<(f64, f64)>),
    /// Names.
    Names(Vec<Located<String>>),
    /// Inner tables.
    Tables(Vec<Values>),
    /// Openings and positions.
    Starts(Vec<(Located<String>, Located<Opened>)>),
}

/// The values of one table.
#[derive(Debug, Clone)]
pub(in super::super) struct Values {
    /// The table they belong to.
    pub(in super::super) table: &'static Table,
    /// Place of the table's header.
    pub(in super::super) span: Range<usize>,
    found: BTreeMap<&'static str, Located<Value>>,
    /// Keys that are there but could not be read.
    faulty: Vec<&'static str>,
}

impl Values {
    pub(super) fn new(table: &'static Table, span: Range<usize>) -> Self {
        Self {
            table,
            span,
            found: BTreeMap::new(),
            faulty: Vec::new(),
        }
    }

    pub(super) fn put(&mut self, key: &'static str, value: Located<Value>) {
        self.found.insert(key, value);
    }

    pub(super) fn put_faulty(&mut self, key: &'static str) {
        self.faulty.push(key);
    }

    /// A value, given or by default.
    pub(in super::super) fn get(&self, key: &str) -> Option<&Located<Value>> {
        debug_assert!(
            self.table.field(key).is_some(),
            "{} has no key {key}",
            self.table.header()
        );
        self.found.get(key)
    }

    /// Whether the file has the key, readable or not.
    pub(in super::super) fn has(&self, key: &str) -> bool {
        self.faulty.contains(&key) || self.get(key).is_some_and(|found| found.given)
    }

    /// Place of the value, or of the table's header when the file is silent.
    pub(in super::super) fn span(&self, key: &str) -> Range<usize> {
        self.get(key)
            .map_or_else(|| self.span.clone(), |found| found.span.clone())
    }

    /// SI number.
    pub(in super::super) fn number(&self, key: &str) -> Option<f64> {
        match self.get(key)?.value {
            Value::Number(number, _) => Some(number),
            _ => None,
        }
    }

    /// Text or word.
    pub(in super::super) fn text(&self, key: &str) -> Option<&str> {
        match &self.get(key)?.value {
            Value::Text(text) => Some(text),
            _ => None,
        }
    }

    /// true or false; false when absent.
    pub(in super::super) fn flag(&self, key: &str) -> bool {
        matches!(
            self.get(key),
            Some(Located {
                value: Value::Flag(true),
                ..
            })
        )
    }

    /// Two SI numbers.
    pub(in super::super) fn two(&self, key: &str) -> Option<[f64; 2]> {
        match self.get(key)?.value {
            Value::Two(two) => Some(two),
            _ => None,
        }
    }

    /// A name with its place.
    pub(in super::super) fn name(&self, key: &str) -> Option<Located<String>> {
        let found = self.get(key)?;
        match &found.value {
            Value::Text(text) => Some(Located {
                value: text.clone(),
                span: found.span.clone(),
                given: found.given,
            }),
            _ => None,
        }
    }

    /// Names with their places.
    pub(in super::super) fn names(&self, key: &str) -> &[Located<String>] {
        match self.get(key).map(|found| &found.value) {
            Some(Value::Names(names)) => names,
            _ => &[],
        }
    }

    /// Inner tables.
    pub(in super::super) fn tables(&self, key: &str) -> &[Values] {
        match self.get(key).map(|found| &found.value) {
            Some(Value::Tables(tables)) => tables,
            _ => &[],
        }
    }

    /// Openings and positions.
    pub(in super::super) fn starts(&self) -> &[(Located<String>, Located<Opened>)] {
        match self.get("start").map(|found| &found.value) {
            Some(Value::Starts(starts)) => starts,
            _ => &[],
        }
    }

    /// How far something is open.
    pub(in super::super) fn opened(&self, key: &str) -> Option<Located<Opened>> {
        let found = self.get(key)?;
        let (text, width) = match &found.value {
            Value::Text(text) => (text.clone(), None),
            Value::Number(width, text) => (text.clone(), Some(*width)),
            _ => return None,
        };
        Some(Located {
            value: Opened { text, width },
            span: found.span.clone(),
            given: found.given,
        })
    }
}
