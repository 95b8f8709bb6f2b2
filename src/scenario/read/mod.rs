//! First stage: from text to a sheet of values with places. Syntax, keys,
//! kinds, units and ranges; nothing is looked up elsewhere yet.

mod lists;
mod special;
mod table;
mod value;
mod values;

pub(super) use special::{BY_GLASS, BY_LAYER, NEVER};
pub(super) use values::{Located, Opened, Value, Values};

use super::fault::{Fault, code};
use super::fields::{self, Shape, Table};
use super::names;
use crate::catalogue::Catalogue;
use std::ops::Range;
use table::Reader;
use toml::Spanned;
use toml::de::{DeTable, DeValue};

/// Largest file read, bytes.
pub(super) const LARGEST_FILE: usize = 1 << 20;

/// A named table.
#[derive(Debug, Clone)]
pub(super) struct Named {
    /// Its name and where it stands.
    pub(super) name: Located<String>,
    /// Its values.
    pub(super) values: Values,
}

/// A tactic with its own actions.
#[derive(Debug)]
pub(super) struct TacticSheet {
    /// Name and values.
    pub(super) named: Named,
    /// Its actions.
    pub(super) actions: Vec<Values>,
}

/// Everything a file says, in the order of the file.
#[derive(Debug)]
pub(super) struct Sheet {
    pub(super) root: Values,
    pub(super) open_air: Values,
    pub(super) wind: Values,
    pub(super) indoors: Values,
    pub(super) limits: Values,
    pub(super) physics: Values,
    pub(super) facades: Vec<Named>,
    pub(super) rooms: Vec<Named>,
    pub(super) linings: Vec<Named>,
    pub(super) shared_walls: Vec<Named>,
    pub(super) openings: Vec<Named>,
    pub(super) glass: Vec<Named>,
    pub(super) leakages: Vec<Named>,
    pub(super) fans: Vec<Named>,
    pub(super) items: Vec<Named>,
    pub(super) fuels: Vec<Named>,
    pub(super) stations: Vec<Named>,
    pub(super) actions: Vec<Values>,
    pub(super) tactics: Vec<TacticSheet>,
}

impl Sheet {
    /// A sheet that says nothing but some fuels and linings.
    pub(super) fn of_materials(fuels: &[Named], linings: &[Named]) -> Self {
        let none = |table: &'static Table| Values::new(table, 0..0);
        Self {
            root: none(&fields::ROOT),
            open_air: none(&fields::OPEN_AIR),
            wind: none(&fields::WIND),
            indoors: none(&fields::INDOORS),
            limits: none(&fields::LIMITS),
            physics: none(&fields::PHYSICS),
            facades: Vec::new(),
            rooms: Vec::new(),
            linings: linings.to_vec(),
            shared_walls: Vec::new(),
            openings: Vec::new(),
            glass: Vec::new(),
            leakages: Vec::new(),
            fans: Vec::new(),
            items: Vec::new(),
            fuels: fuels.to_vec(),
            stations: Vec::new(),
            actions: Vec::new(),
            tactics: Vec::new(),
        }
    }
}

/// Reads a file; faults are collected, never thrown.
pub(super) fn sheet(text: &str, catalogue: &Catalogue, faults: &mut Vec<Fault>) -> Sheet {
    with_reader(text, catalogue, faults, |document, reader| {
        document.sheet(reader)
    })
}

/// A user's own models file: rows by the name of their kind.
pub(super) fn models(
    text: &str,
    catalogue: &Catalogue,
    faults: &mut Vec<Fault>,
) -> Vec<(&'static str, Vec<Named>)> {
    with_reader(text, catalogue, faults, |document, reader| {
        document.models(reader)
    })
}

/// Name of the user's own models file, as far as the text can be read.
pub(super) fn models_file(text: &str) -> Option<Located<String>> {
    let (document, _) = DeTable::parse_recoverable(text);
    let value = document.get_ref().get(MODELS_KEY)?;
    Some(Located {
        value: value.get_ref().as_str()?.to_owned(),
        span: value.span(),
        given: true,
    })
}

/// Key at the top of a scenario that names the models file.
const MODELS_KEY: &str = "models";

fn with_reader<T>(
    text: &str,
    catalogue: &Catalogue,
    faults: &mut Vec<Fault>,
    read: impl FnOnce(&Document<'_, '_>, &mut Reader<'_>) -> T,
) -> T {
    let (document, errors) = DeTable::parse_recoverable(text);
    let mut reader = Reader::new(catalogue);
    let root = document.get_ref();
    let sheet = read(&Document { root }, &mut reader);
    if errors.is_empty() {
        faults.append(&mut reader.faults);
    } else {
        let syntax: Vec<Fault> = errors.iter().map(|error| syntax(error, text)).collect();
        let syntax = once_per_table(syntax, text);
        faults.extend(unshadowed(reader.faults, &syntax, text));
        faults.extend(syntax);
    }
    sheet
}

fn syntax(error: &toml::de::Error, text: &str) -> Fault {
    let span = error.span().unwrap_or(0..0);
    let message = error.message();
    if message.starts_with("duplicate key") {
        let name = text.get(span.clone()).unwrap_or_default();
        if let Some(header) = list_header(name, span.start, text) {
            return Fault::error(
                code::SAME_NAME,
                span,
                format!("`{name}` stands in single brackets beside another"),
            )
            .label("again here")
            .help(format!("there may be many: begin each one with {header}"));
        }
        return Fault::error(
            code::SAME_NAME,
            span,
            format!("`{name}` is given twice in one table"),
        )
        .label("again here")
        .help("keep one of the two, or give the second another name");
    }
    Fault::error(code::SYNTAX, span, message.to_owned())
        .help("the file is TOML: `key = \"value\"`, text in quotes, tables as [room.hall]")
}

/// How a table that may stand many times in a row is begun, when the line of a
/// doubled name is its header in single brackets.
fn list_header(name: &str, at: usize, text: &str) -> Option<String> {
    let before = text.get(..at)?.rsplit('\n').next()?;
    let after = text.get(at..)?.lines().next()?;
    let line = format!("{before}{after}");
    let inner = line.trim().strip_prefix('[')?.split(']').next()?;
    let is_list = name == fields::ACTION.name && inner.ends_with(name) && !inner.starts_with('[');
    is_list.then(|| format!("[[{inner}]]"))
}

/// A table given twice makes each of its keys given twice: the table is named
/// once, its keys are not.
fn once_per_table(mut faults: Vec<Fault>, text: &str) -> Vec<Fault> {
    let start = |fault: &Fault| fault.span.as_ref().map_or(0, |span| span.start);
    let header = |at: usize| {
        let before = text.get(..at).unwrap_or_default();
        let line = before.rsplit('\n').next().unwrap_or_default();
        line.trim_start().starts_with('[')
    };
    faults.sort_by_key(start);
    let mut doubled: Option<usize> = None;
    faults.retain(|fault| {
        let at = start(fault);
        if fault.code != code::SAME_NAME {
            return true;
        }
        if header(at) {
            doubled = Some(at);
            return true;
        }
        doubled.is_none_or(|from| text.get(from..at).is_some_and(|body| body.contains("\n[")))
    });
    faults
}

/// Faults that are not mere consequences of a syntax error: what stands on a
/// broken line, and keys that may be missing because of it.
fn unshadowed(faults: Vec<Fault>, syntax: &[Fault], text: &str) -> Vec<Fault> {
    let line = |at: usize| {
        text.as_bytes()
            .iter()
            .take(at)
            .filter(|byte| **byte == b'\n')
            .count()
    };
    let broken: Vec<usize> = syntax
        .iter()
        .filter_map(|fault| fault.span.as_ref())
        .map(|span| line(span.start))
        .collect();
    faults
        .into_iter()
        .filter(|fault| fault.code != code::MISSING_KEY)
        .filter(|fault| {
            fault
                .span
                .as_ref()
                .is_none_or(|span| !broken.contains(&line(span.start)))
        })
        .collect()
}

struct Document<'a, 'i> {
    root: &'a DeTable<'i>,
}

impl<'a, 'i> Document<'a, 'i> {
    fn sheet(&self, reader: &mut Reader<'_>) -> Sheet {
        self.unknown_tables(reader);
        Sheet {
            root: self.root_values(reader),
            open_air: self.one(&fields::OPEN_AIR, reader),
            wind: self.one(&fields::WIND, reader),
            indoors: self.one(&fields::INDOORS, reader),
            limits: self.one(&fields::LIMITS, reader),
            physics: self.one(&fields::PHYSICS, reader),
            facades: self.named(&fields::FACADE, reader),
            rooms: self.named(&fields::ROOM, reader),
            linings: self.named(&fields::LINING, reader),
            shared_walls: self.named(&fields::SHARED_WALL, reader),
            openings: self.named(&fields::OPENING, reader),
            glass: self.named(&fields::GLASS, reader),
            leakages: self.named(&fields::LEAKAGE, reader),
            fans: self.named(&fields::FAN, reader),
            items: self.named(&fields::ITEM, reader),
            fuels: self.named(&fields::FUEL, reader),
            stations: self.named(&fields::STATION, reader),
            actions: self
                .entry(fields::ACTION.name)
                .map(|value| reader.list(&fields::ACTION, value))
                .unwrap_or_default(),
            tactics: self.tactics(reader),
        }
    }

    fn entry(&self, name: &str) -> Option<&'a Spanned<DeValue<'i>>> {
        let root: &'a DeTable<'i> = self.root;
        root.get(name)
    }

    fn models(&self, reader: &mut Reader<'_>) -> Vec<(&'static str, Vec<Named>)> {
        let names = || fields::MODEL_ROWS.iter().map(|table| table.name);
        self.unknown_among(reader, "row of a models file", &names().collect::<Vec<_>>());
        let rows = |of: &'static Table, reader: &mut Reader<'_>| -> Vec<Named> {
            let list = self.entry(of.name).map(|value| reader.list(of, value));
            list.unwrap_or_default()
                .into_iter()
                .filter_map(|values| {
                    let name = values.name("name")?;
                    reader.check_name(of, &name.value, &name.span);
                    Some(Named { name, values })
                })
                .collect()
        };
        fields::MODEL_ROWS
            .iter()
            .map(|of| (of.name, rows(of, reader)))
            .collect()
    }

    fn unknown_tables(&self, reader: &mut Reader<'_>) {
        let known: Vec<&str> = fields::TABLES
            .iter()
            .filter(|table| table.shape != Shape::Inner && !table.name.contains('.'))
            .map(|table| table.name)
            .filter(|name| !name.is_empty())
            .chain(fields::ROOT.fields().map(|field| field.name))
            .collect();
        self.unknown_among(reader, "key or table of a scenario", &known);
    }

    fn unknown_among(&self, reader: &mut Reader<'_>, what: &str, known: &[&str]) {
        for (key, span, _) in table::entries(self.root) {
            if !known.contains(&key) {
                reader.faults.push(
                    Fault::error(code::UNKNOWN_KEY, span, format!("`{key}` is not a {what}"))
                        .label("unknown")
                        .help(names::suggestion(key, "key", known.iter().copied())),
                );
            }
        }
    }

    fn root_values(&self, reader: &mut Reader<'_>) -> Values {
        let own = table::entries(self.root)
            .into_iter()
            .filter(|(key, ..)| fields::ROOT.field(key).is_some())
            .collect();
        reader.values(&fields::ROOT, 0..0, own)
    }

    fn one(&self, of: &'static Table, reader: &mut Reader<'_>) -> Values {
        let Some(value) = self.entry(of.name) else {
            return reader.values(of, 0..0, Vec::new());
        };
        let span = self.key_span(of.name);
        let inner = value.get_ref().as_table();
        if inner.is_none() {
            reader.not_a_table(of, value.span());
        }
        reader.values(of, span, inner.map(table::entries).unwrap_or_default())
    }

    fn key_span(&self, name: &str) -> Range<usize> {
        self.root
            .iter()
            .find(|(key, _)| key.get_ref() == name)
            .map_or(0..0, |(key, _)| key.span())
    }

    fn named(&self, of: &'static Table, reader: &mut Reader<'_>) -> Vec<Named> {
        self.members(of, reader)
            .into_iter()
            .map(|(name, inner)| Named {
                values: reader.values(of, name.span.clone(), table::entries(inner)),
                name,
            })
            .collect()
    }

    /// The named tables of one kind.
    fn members(
        &self,
        of: &'static Table,
        reader: &mut Reader,
    ) -> Vec<(Located<String>, &'a DeTable<'i>)> {
        let Some(value) = self.entry(of.name) else {
            return Vec::new();
        };
        let DeValue::Table(all) = value.get_ref() else {
            reader.not_a_table(of, value.span());
            return Vec::new();
        };
        let mut members = Vec::new();
        for (key, span, value) in table::entries(all) {
            match value.get_ref() {
                DeValue::Table(inner) => {
                    reader.check_name(of, key, &span);
                    let name = Located {
                        value: key.to_owned(),
                        span,
                        given: true,
                    };
                    members.push((name, inner));
                }
                _ => reader.not_a_table(of, span),
            }
        }
        if let Shape::Named(most) = of.shape
            && members.len() > most
        {
            reader.too_many(of, most, members.len(), members[most].0.span.clone());
            members.truncate(most);
        }
        members
    }

    fn tactics(&self, reader: &mut Reader<'_>) -> Vec<TacticSheet> {
        let mut tactics = Vec::new();
        for (name, inner) in self.members(&fields::TACTIC, reader) {
            let (actions, own): (Vec<_>, Vec<_>) = table::entries(inner)
                .into_iter()
                .partition(|(key, ..)| *key == "action");
            tactics.push(TacticSheet {
                actions: actions
                    .into_iter()
                    .flat_map(|(_, _, value)| reader.list(&fields::TACTIC_ACTION, value))
                    .collect(),
                named: Named {
                    values: reader.values(&fields::TACTIC, name.span.clone(), own),
                    name,
                },
            });
        }
        tactics
    }
}
