//! Reads the keys of one table against the field table.

use super::super::fault::{Fault, code};
use super::super::fields::{self, Field, Need, Shape, Table};
use super::super::names;
use super::values::{Located, Values};
use crate::catalogue::Catalogue;
use std::ops::Range;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// Longest name of a room, station and so on.
const LONGEST_NAME: usize = 60;
/// Longest name of an opening or fuel, which may be made of two others
/// ("house in hall").
const LONGEST_JOINED: usize = 2 * LONGEST_NAME + 10;

/// One key with its place and value.
pub(super) type Entry<'a, 'i> = (&'a str, Range<usize>, &'a Spanned<DeValue<'i>>);

/// Keys in the order of the file.
pub(super) fn entries<'a, 'i>(table: &'a DeTable<'i>) -> Vec<Entry<'a, 'i>> {
    let mut entries: Vec<Entry<'a, 'i>> = table
        .iter()
        .map(|(key, value)| (key.get_ref().as_ref(), key.span(), value))
        .collect();
    entries.sort_by_key(|(_, span, _)| span.start);
    entries
}

/// Collects faults while reading.
#[derive(Debug)]
pub(super) struct Reader<'c> {
    /// Found so far.
    pub(super) faults: Vec<Fault>,
    /// Words that values may be.
    pub(super) catalogue: &'c Catalogue,
}

impl<'c> Reader<'c> {
    /// A reader that knows the words of a catalogue.
    pub(super) fn new(catalogue: &'c Catalogue) -> Self {
        Self {
            faults: Vec::new(),
            catalogue,
        }
    }

    /// Values of one table; every absent key gets its default or a fault.
    pub(super) fn values(
        &mut self,
        table: &'static Table,
        span: Range<usize>,
        entries: Vec<Entry>,
    ) -> Values {
        let mut values = Values::new(table, span);
        let mut misspelt = Vec::new();
        for (key, key_span, value) in entries {
            let Some(field) = table.field(key) else {
                misspelt.extend(self.unknown_key(table, key, key_span));
                continue;
            };
            match self.value(field, value) {
                Some(read) => values.put(
                    field.name,
                    Located {
                        value: read,
                        span: value.span(),
                        given: true,
                    },
                ),
                None => values.put_faulty(field.name),
            }
        }
        for field in table.fields() {
            if values.has(field.name) {
                continue;
            }
            if matches!(field.need, Need::Required) && misspelt.contains(&field.name) {
                // Said already: it is there under a name that is nearly its own.
                values.put_faulty(field.name);
            } else {
                self.absent(table, field, &mut values);
            }
        }
        values
    }

    fn absent(&mut self, table: &Table, field: &'static Field, values: &mut Values) {
        match field.need {
            Need::Required => self.faults.push(
                Fault::error(
                    code::MISSING_KEY,
                    values.span.clone(),
                    format!(
                        "`{}` is missing {} {}",
                        field.name,
                        if table.shape == Shape::Root {
                            "at"
                        } else {
                            "in"
                        },
                        table.header()
                    ),
                )
                .label(if table.shape == Shape::Root {
                    "at the top of the file"
                } else {
                    "in this table"
                })
                .help(format!(
                    "{} Write it like `{} = {}`",
                    field.doc,
                    field.name,
                    super::super::reference::example(field)
                )),
            ),
            Need::Default(text) => {
                let source = super::super::reference::toml_example(field.kind, text);
                let span = values.span.clone();
                if let Ok(parsed) = DeValue::parse(&source)
                    && let Some(value) = self.value(field, &parsed)
                {
                    let given = false;
                    values.put(field.name, Located { value, span, given });
                }
            }
            Need::Absent(_) => {}
        }
    }

    /// Notes an unknown key and gives the known ones that it may stand for.
    fn unknown_key(&mut self, table: &Table, key: &str, span: Range<usize>) -> Vec<&'static str> {
        let known = || table.fields().map(|field| field.name);
        let near = names::near(key, known());
        let help = if near.is_empty() {
            let all: Vec<&str> = known().collect();
            format!("keys of {}: {}", table.header(), all.join(", "))
        } else {
            format!("did you mean `{}`?", near.join("` or `"))
        };
        self.faults.push(
            Fault::error(
                code::UNKNOWN_KEY,
                span,
                format!("`{key}` is not a key of {}", table.header()),
            )
            .label("unknown")
            .help(help),
        );
        near
    }

    /// A list of tables.
    pub(super) fn list(&mut self, table: &'static Table, value: &Spanned<DeValue>) -> Vec<Values> {
        let DeValue::Array(array) = value.get_ref() else {
            self.not_a_table(table, value.span());
            return Vec::new();
        };
        let most = match table.shape {
            Shape::List(most) => most,
            _ => usize::MAX,
        };
        let mut rows = Vec::new();
        for row in array {
            if rows.len() >= most {
                self.too_many(table, most, array.len(), row.span());
                break;
            }
            match row.get_ref() {
                DeValue::Table(inner) => rows.push(self.values(table, row.span(), entries(inner))),
                _ => self.not_a_table(table, row.span()),
            }
        }
        rows
    }

    pub(super) fn not_a_table(&mut self, table: &Table, span: Range<usize>) {
        self.faults.push(
            Fault::error(
                code::WRONG_KIND,
                span,
                format!("a table is wanted: {}", table.header()),
            )
            .help(format!(
                "begin it with {} on a line of its own",
                table.header()
            )),
        );
    }

    pub(super) fn too_many(
        &mut self,
        table: &Table,
        most: usize,
        found: usize,
        span: Range<usize>,
    ) {
        self.faults.push(
            Fault::error(
                code::TOO_MUCH,
                span,
                format!("{found} times {}; at most {most} are taken", table.header()),
            )
            .label("the first too many"),
        );
    }

    pub(super) fn check_name(&mut self, of: &Table, name: &str, span: &Range<usize>) {
        let longest = if [fields::OPENING.name, fields::FUEL.name].contains(&of.name) {
            LONGEST_JOINED
        } else {
            LONGEST_NAME
        };
        let printable = name.chars().all(|letter| !letter.is_control());
        let told = name.chars().any(char::is_alphanumeric);
        if !printable || !told || name.chars().count() > longest {
            self.faults.push(
                Fault::error(
                    code::WRONG_KIND,
                    span.clone(),
                    format!(
                        "this cannot be a name: letters or digits, at most {longest} characters"
                    ),
                )
                .help("write a name like bedroom_2, or \"Bedroom 2\" in quotes"),
            );
        }
    }
}
