//! The pressure of the wind on openings and leakage.

use super::super::fault::{Fault, code};
use super::super::fields::{COMPASS, Of, WIND_FROM};
use super::super::read::{Located, Sheet, Values};
use super::{Resolver, UNREAD, unwanted, wanted};
use crate::physics::gas::{GasTable, moist_air};
use crate::physics::humidity::vapour_fraction;
use crate::physics::wind::{PressureCoefficients, angle_between, dynamic_pressure};
use crate::plan::{OpenAir, Opening, OpeningKind, Space};

/// The wind in force: speed (m/s), where it comes from (degrees), roof.
struct Wind {
    speed: f64,
    from: Option<f64>,
    roof: f64,
}

impl Resolver<'_> {
    /// Presses the wind on all openings to the open air. The openings of the
    /// scenario come first, in its order, then those of its leakages.
    pub(super) fn wind(
        &mut self,
        openings: &mut [Opening],
        open_air: &OpenAir,
        tactic: Option<&str>,
    ) {
        let sheet: &Sheet = self.sheet;
        let wind = self.blowing(tactic);
        let dynamic = dynamic_pressure(wind.speed, air_density(open_air));
        for facade in &sheet.facades {
            if !facade.values.has("faces") && !facade.values.has("pressure_coefficient") {
                let because = "a facade faces somewhere or has a coefficient";
                self.note(wanted(&facade.values, "faces", because));
            }
        }
        let (own, leaks) = openings.split_at_mut(sheet.openings.len());
        for (named, opening) in sheet.openings.iter().zip(own) {
            // Adding zero leaves no negative zero in calm.
            opening.wind_pressure = self.on_opening(&named.values, opening, &wind, dynamic) + 0.0;
        }
        let mut leaks = leaks.iter_mut();
        for named in &sheet.leakages {
            let coefficient = self.of_facade(&named.values, &wind);
            let outside = named.values.text("to") == Some(super::super::fields::OPEN_AIR_NAME);
            if !outside && named.values.has("facade") {
                let because = "it does not leak to the open air";
                self.note(unwanted(&named.values, "facade", because));
            }
            let count = named.values.names("rooms").len();
            for leak in leaks.by_ref().take(count) {
                leak.wind_pressure = coefficient.unwrap_or(0.0) * dynamic + 0.0;
            }
        }
    }

    /// Base wind with what the tactic says otherwise.
    fn blowing(&mut self, tactic: Option<&str>) -> Wind {
        let sheet: &Sheet = self.sheet;
        let other = sheet
            .tactics
            .iter()
            .find(|sheet| tactic == Some(sheet.named.name.value.as_str()))
            .and_then(|sheet| sheet.named.values.inner("wind"));
        let of = |key: &str| -> &Values {
            match other {
                Some(other) if other.has(key) => other,
                _ => &sheet.wind,
            }
        };
        Wind {
            speed: of("speed").number("speed").unwrap_or(0.0),
            from: bearing(of("direction"), "direction", &WIND_FROM),
            roof: of("roof_coefficient")
                .number("roof_coefficient")
                .unwrap_or(UNREAD),
        }
    }

    fn on_opening(&mut self, values: &Values, opening: &Opening, wind: &Wind, dynamic: f64) -> f64 {
        let outside = opening.from == Space::OpenAir || opening.to == Space::OpenAir;
        let known = values.names("between").len() == 2;
        for key in ["facade", "wind_pressure"] {
            if known && !outside && values.has(key) {
                self.note(unwanted(values, key, "it does not lead to the open air"));
            }
        }
        if let Some(pressure) = values.number("wind_pressure") {
            if values.has("facade") {
                self.note(unwanted(values, "facade", "the wind pressure is stated"));
            }
            return pressure;
        }
        match self.of_facade(values, wind) {
            Some(coefficient) => coefficient * dynamic,
            None if opening.kind == OpeningKind::Hatch && outside => wind.roof * dynamic,
            None => {
                self.out_of_the_wind(values, opening, wind, outside);
                0.0
            }
        }
    }

    fn out_of_the_wind(&mut self, values: &Values, opening: &Opening, wind: &Wind, outside: bool) {
        let large = matches!(opening.kind, OpeningKind::Door | OpeningKind::Window);
        if wind.speed > 0.0 && outside && large && !values.has("facade") {
            self.note(
                Fault::caution(
                    values.span.clone(),
                    format!(
                        "the wind does not reach \"{}\": it lies in no facade",
                        opening.name
                    ),
                )
                .help("add `facade`, or `wind_pressure = \"0 Pa\"` where it is sheltered"),
            );
        }
    }

    /// Pressure coefficient of the facade that a thing names.
    fn of_facade(&mut self, values: &Values, wind: &Wind) -> Option<f64> {
        let sheet: &Sheet = self.sheet;
        let name: Located<String> = values.name("facade")?;
        let facade = sheet
            .facades
            .iter()
            .find(|facade| facade.name.value == name.value);
        let Some(facade) = facade else {
            let known: Vec<&str> = sheet
                .facades
                .iter()
                .map(|f| f.name.value.as_str())
                .collect();
            self.unknown(Of::Facade, &name, &known);
            return None;
        };
        if let Some(coefficient) = facade.values.number("pressure_coefficient") {
            return Some(coefficient);
        }
        let faces = bearing(&facade.values, "faces", &COMPASS)?;
        let Some(from) = wind.from else {
            if wind.speed > 0.0 {
                self.note(
                    Fault::error(
                        code::MISSING_KEY,
                        sheet.wind.span.clone(),
                        format!(
                            "`direction` is missing: the wind blows, and facade \"{}\" only says where it faces",
                            facade.name.value
                        ),
                    )
                    .label("in this table")
                    .help("write it like `direction = \"from the west\"`"),
                );
            }
            return Some(0.0);
        };
        Some(PressureCoefficients::default().facade(angle_between(from, faces)))
    }
}

/// A direction, degrees clockwise from north: one of eight words or an angle.
fn bearing(values: &Values, key: &str, words: &[&str; 8]) -> Option<f64> {
    let word = values
        .text(key)
        .and_then(|text| words.iter().position(|word| *word == text));
    #[allow(clippy::cast_precision_loss)] // eight words
    word.map(|eighth| 45.0 * eighth as f64)
        .or_else(|| values.number(key))
}

/// Density of the open air, kg/m3.
pub(super) fn air_density(open_air: &OpenAir) -> f64 {
    let gas = GasTable::new(&[]);
    let water = vapour_fraction(open_air.temperature, open_air.humidity, open_air.pressure);
    let air = moist_air(water, gas.len());
    open_air.pressure / (gas.mixture_gas_constant(&air) * open_air.temperature)
}
