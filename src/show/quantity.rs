//! From SI inside to the units people read: the one place where numbers of a
//! record change unit on the way out.

use crate::record::Dimension;

/// A unit that a value in SI is shown in: `shown = si * scale + offset`.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// The unit as written beside the number; empty for a plain ratio.
    pub name: &'static str,
    /// Factor from the SI value.
    pub scale: f64,
    /// Added after the factor (temperatures only), in the shown unit.
    pub offset: f64,
    /// Decimals in running text.
    pub decimals: usize,
}

impl Unit {
    const fn new(name: &'static str, scale: f64, offset: f64, decimals: usize) -> Self {
        Self {
            name,
            scale,
            offset,
            decimals,
        }
    }

    /// The value in this unit, from the value in SI.
    pub fn shown(self, si: f64) -> f64 {
        si * self.scale + self.offset
    }

    /// The value with its unit, rounded for running text; a dash where there
    /// is no value.
    pub fn text(self, si: f64) -> String {
        if !si.is_finite() {
            return "-".to_owned();
        }
        // Adding zero turns a rounded minus zero into zero.
        let shown = round_to(self.shown(si), self.decimals) + 0.0;
        let number = format!("{shown:.*}", self.decimals);
        if self.name.is_empty() {
            number
        } else {
            format!("{number} {}", self.name)
        }
    }
}

/// The unit in which a dimension is shown first.
pub const fn unit(dimension: Dimension) -> Unit {
    match dimension {
        Dimension::Temperature => Unit::new("°C", 1.0, -273.15, 0),
        Dimension::Length => Unit::new("m", 1.0, 0.0, 2),
        Dimension::VolumeFraction | Dimension::MassFraction => Unit::new("%", 100.0, 0.0, 1),
        Dimension::Ratio => Unit::new("", 1.0, 0.0, 2),
        Dimension::Pressure => Unit::new("Pa", 1.0, 0.0, 1),
        Dimension::Power => Unit::new("kW", 1e-3, 0.0, 0),
        Dimension::Flux => Unit::new("kW/m2", 1e-3, 0.0, 1),
        Dimension::MassFlow => Unit::new("kg/s", 1.0, 0.0, 2),
        Dimension::Speed => Unit::new("m/s", 1.0, 0.0, 1),
        Dimension::Mass => Unit::new("kg", 1.0, 0.0, 1),
        Dimension::Density => Unit::new("g/m3", 1e3, 0.0, 2),
        Dimension::Time => Unit::new("s", 1.0, 0.0, 0),
    }
}

/// The US customary unit of a dimension, for a second figure in running text;
/// the same unit again where the trade has no other.
///
/// Factors from the exact definitions of inch (0.0254 m), pound (0.45359237 kg)
/// and the international-table Btu (1055.05585262 J), NIST SP 811; the inch of
/// water is the conventional one (249.08891 Pa).
pub const fn customary(dimension: Dimension) -> Unit {
    const FOOT: f64 = 0.3048;
    const POUND: f64 = 0.453_592_37;
    const BTU: f64 = 1_055.055_852_62;
    match dimension {
        Dimension::Temperature => Unit::new("°F", 1.8, -459.67, 0),
        Dimension::Length => Unit::new("ft", 1.0 / FOOT, 0.0, 1),
        Dimension::Pressure => Unit::new("in of water", 1.0 / 249.088_91, 0.0, 3),
        Dimension::Power => Unit::new("Btu/s", 1.0 / BTU, 0.0, 0),
        Dimension::Flux => Unit::new("Btu/ft2 s", FOOT * FOOT / BTU, 0.0, 2),
        Dimension::MassFlow => Unit::new("lb/min", 60.0 / POUND, 0.0, 0),
        Dimension::Speed => Unit::new("ft/min", 60.0 / FOOT, 0.0, 0),
        Dimension::Mass => Unit::new("lb", 1.0 / POUND, 0.0, 1),
        Dimension::VolumeFraction
        | Dimension::MassFraction
        | Dimension::Ratio
        | Dimension::Density
        | Dimension::Time => unit(dimension),
    }
}

/// The SI unit in which a dimension is kept inside and in `record.json`.
pub const fn si_unit(dimension: Dimension) -> &'static str {
    match dimension {
        Dimension::Temperature => "K",
        Dimension::Length => "m",
        Dimension::VolumeFraction | Dimension::MassFraction | Dimension::Ratio => "1",
        Dimension::Pressure => "Pa",
        Dimension::Power => "W",
        Dimension::Flux => "W/m2",
        Dimension::MassFlow => "kg/s",
        Dimension::Speed => "m/s",
        Dimension::Mass => "kg",
        Dimension::Density => "kg/m3",
        Dimension::Time => "s",
    }
}

/// A number for a table: seven significant digits, no trailing zeros, no sign
/// on zero; empty where there is no value.
pub fn table_number(value: f64) -> String {
    if !value.is_finite() {
        return String::new();
    }
    let rounded: f64 = format!("{value:.6e}").parse().unwrap_or(value) + 0.0;
    if rounded != 0.0 && rounded.abs() < 1e-4 {
        format!("{rounded:e}")
    } else {
        format!("{rounded}")
    }
}

/// A time as minutes and seconds, `"8:05"`; from ignition or from an action.
/// Seconds in, rounded to the whole second.
pub fn clock(seconds: f64) -> String {
    if !seconds.is_finite() {
        return "-".to_owned();
    }
    let sign = if seconds.round() < 0.0 { "-" } else { "" };
    let whole = seconds.abs().round();
    format!("{sign}{}:{:02}", (whole / 60.0).floor(), whole % 60.0)
}

fn round_to(value: f64, decimals: usize) -> f64 {
    let factor = 10f64.powi(i32::try_from(decimals).unwrap_or(0));
    (value * factor).round() / factor
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_units_of_the_trade() {
        assert_eq!(unit(Dimension::Temperature).text(873.15), "600 °C");
        assert_eq!(customary(Dimension::Temperature).text(873.15), "1112 °F");
        assert_eq!(unit(Dimension::Power).text(1.4e6), "1400 kW");
        assert_eq!(customary(Dimension::Power).text(1e6), "948 Btu/s");
        assert_eq!(customary(Dimension::Flux).text(84e3), "7.40 Btu/ft2 s");
        assert_eq!(customary(Dimension::MassFlow).text(1.0), "132 lb/min");
        assert_eq!(customary(Dimension::Speed).text(1.0), "197 ft/min");
        assert_eq!(
            customary(Dimension::Pressure).text(25.0),
            "0.100 in of water"
        );
        assert_eq!(unit(Dimension::Length).text(f64::NAN), "-");
        assert_eq!(unit(Dimension::Pressure).text(-0.01), "0.0 Pa");
    }

    #[test]
    fn verify_table_numbers_are_readable_and_close() {
        assert_eq!(table_number(293.15 - 273.15), "20");
        assert_eq!(table_number(-0.0), "0");
        assert_eq!(table_number(1.0 / 3.0), "0.3333333");
        assert_eq!(table_number(1_234_567.89), "1234568");
        assert_eq!(table_number(1.5e-7), "1.5e-7");
        assert_eq!(table_number(f64::NAN), "");
        assert_eq!(table_number(f64::INFINITY), "");
    }

    #[test]
    fn verify_clock() {
        assert_eq!(clock(485.2), "8:05");
        assert_eq!(clock(59.6), "1:00");
        assert_eq!(clock(-61.0), "-1:01");
        assert_eq!(clock(-0.2), "0:00");
    }
}
