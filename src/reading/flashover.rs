//! Flashover by two criteria, reported apart: 600 °C in the layer and
//! 20 kW/m2 on the floor (reviewed by Peacock, Reneke, Bukowski and Babrauskas
//! 1999, Fire Safety Journal 32:331; numbers from memory).

use serde::Serialize;

use super::reader::Reader;
use crate::record::{Quantity, Subject};

/// Layer temperature of flashover, K: 600 °C, the upper end of the 500-600 °C
/// that are given.
pub(super) const LAYER: f64 = 873.15;

/// Layer temperature that is near, K: 500 °C.
pub(super) const LAYER_NEAR: f64 = 773.15;

/// Radiant flux on the floor of flashover, W/m2.
pub(super) const FLOOR_FLUX: f64 = 20e3;

/// Radiant flux on the floor that is near, W/m2: 15 kW/m2 \[choice\].
const FLOOR_FLUX_NEAR: f64 = 15e3;

/// How a criterion, or both, came out.
#[derive(Debug, Clone, Copy, PartialEq, Eq, PartialOrd, Ord, Serialize)]
#[serde(rename_all = "snake_case")]
pub enum Answer {
    /// Not reached.
    No,
    /// Close to it, or reached by one criterion only.
    Near,
    /// Reached.
    Yes,
}

impl Answer {
    /// The word for it.
    pub fn word(self) -> &'static str {
        match self {
            Answer::No => "no",
            Answer::Near => "near",
            Answer::Yes => "yes",
        }
    }
}

/// Flashover of a room over a stretch of the run.
#[derive(Debug, Clone, Copy, PartialEq, Serialize)]
pub struct Flashover {
    /// Both criteria together: yes when both are reached, near when one is
    /// reached or near.
    pub word: Answer,
    /// By the layer: yes from 600 °C, near from 500 °C.
    pub by_layer: Answer,
    /// By the radiation on the floor: yes from 20 kW/m2, near from 15.
    pub by_floor_flux: Answer,
    /// Highest layer temperature, K.
    pub hottest_layer: f64,
    /// Highest radiant flux on the floor, W/m2.
    pub highest_flux: f64,
}

/// Reads a room between two times; `None` when nothing is recorded there.
pub(super) fn read(reader: &Reader<'_>, room: usize, from: f64, to: f64) -> Option<Flashover> {
    let subject = Subject::Room(room);
    let layer = reader
        .history(subject, Quantity::UpperTemperature)
        .largest(from, to);
    let flux = reader
        .history(subject, Quantity::FloorFlux)
        .largest(from, to);
    if layer.is_none() && flux.is_none() {
        return None;
    }
    let hottest_layer = layer.map_or(f64::NAN, |(_, value)| value);
    let highest_flux = flux.map_or(f64::NAN, |(_, value)| value);
    let by_layer = answer(hottest_layer, LAYER_NEAR, LAYER);
    let by_floor_flux = answer(highest_flux, FLOOR_FLUX_NEAR, FLOOR_FLUX);
    let word = match (by_layer, by_floor_flux) {
        (Answer::Yes, Answer::Yes) => Answer::Yes,
        (Answer::No, Answer::No) => Answer::No,
        _ => Answer::Near,
    };
    Some(Flashover {
        word,
        by_layer,
        by_floor_flux,
        hottest_layer,
        highest_flux,
    })
}

fn answer(value: f64, near: f64, reached: f64) -> Answer {
    if value >= reached {
        Answer::Yes
    } else if value >= near {
        Answer::Near
    } else {
        Answer::No
    }
}

/// The lesser of both criteria over its limit at every output time: 1 or more
/// while both hold.
pub(super) fn margin(reader: &Reader<'_>, room: usize) -> Vec<f64> {
    let subject = Subject::Room(room);
    let layer = reader.record.get(subject, Quantity::UpperTemperature);
    let flux = reader.record.get(subject, Quantity::FloorFlux);
    layer
        .iter()
        .zip(flux)
        .map(|(layer, flux)| {
            if layer.is_finite() && flux.is_finite() {
                (layer / LAYER).min(flux / FLOOR_FLUX)
            } else {
                f64::NAN
            }
        })
        .collect()
}
