//! The one table of units.

/// What kind of quantity a text stands for. Inside, every value is SI.
#[derive(Debug, Clone, Copy, PartialEq, Eq, Hash)]
pub enum Dimension {
    /// m.
    Length,
    /// m2.
    Area,
    /// s.
    Time,
    /// K, on the absolute scale.
    Temperature,
    /// K, a difference or rise; kept apart from [`Dimension::Temperature`].
    TemperatureDifference,
    /// kg.
    Mass,
    /// W.
    Power,
    /// J.
    Energy,
    /// W/m2.
    Flux,
    /// W/s2, the factor of a fire that grows with the square of time.
    GrowthFactor,
    /// Pa.
    Pressure,
    /// J/kg.
    SpecificEnergy,
    /// W/m/K.
    Conductivity,
    /// kg/m3.
    Density,
    /// J/kg/K.
    HeatCapacity,
    /// J/kg/K2, how a heat capacity rises with temperature.
    HeatCapacitySlope,
    /// W/m2/K.
    HeatTransfer,
    /// kg/mol.
    MolarMass,
    /// m/s.
    Speed,
    /// m3/s.
    VolumeFlow,
    /// Degrees, clockwise from north for directions.
    Angle,
    /// A plain number or a share; `"70 %"` and `0.7` say the same.
    Ratio,
}

impl Dimension {
    /// Every dimension.
    pub const ALL: &'static [Dimension] = &[
        Dimension::Length,
        Dimension::Area,
        Dimension::Time,
        Dimension::Temperature,
        Dimension::TemperatureDifference,
        Dimension::Mass,
        Dimension::Power,
        Dimension::Energy,
        Dimension::Flux,
        Dimension::GrowthFactor,
        Dimension::Pressure,
        Dimension::SpecificEnergy,
        Dimension::Conductivity,
        Dimension::Density,
        Dimension::HeatCapacity,
        Dimension::HeatCapacitySlope,
        Dimension::HeatTransfer,
        Dimension::MolarMass,
        Dimension::Speed,
        Dimension::VolumeFlow,
        Dimension::Angle,
        Dimension::Ratio,
    ];

    /// In plain words, with its article: "a length".
    pub fn words(self) -> &'static str {
        match self {
            Dimension::Length => "a length",
            Dimension::Area => "an area",
            Dimension::Time => "a time",
            Dimension::Temperature => "a temperature",
            Dimension::TemperatureDifference => "a temperature difference",
            Dimension::Mass => "a mass",
            Dimension::Power => "a heat release rate",
            Dimension::Energy => "an amount of heat",
            Dimension::Flux => "a heat flux",
            Dimension::GrowthFactor => "a growth factor",
            Dimension::Pressure => "a pressure",
            Dimension::SpecificEnergy => "a heat of combustion",
            Dimension::Conductivity => "a thermal conductivity",
            Dimension::Density => "a density",
            Dimension::HeatCapacity => "a heat capacity",
            Dimension::HeatCapacitySlope => "a slope of heat capacity",
            Dimension::HeatTransfer => "a heat transfer coefficient",
            Dimension::MolarMass => "a molar mass",
            Dimension::Speed => "a speed",
            Dimension::VolumeFlow => "a volume flow",
            Dimension::Angle => "an angle",
            Dimension::Ratio => "a plain number or a percentage",
        }
    }

    /// A text that reads well as this dimension.
    pub fn example(self) -> &'static str {
        match self {
            Dimension::Length => "2.4 m",
            Dimension::Area => "0.06 m2",
            Dimension::Time => "4 min",
            Dimension::Temperature => "20 °C",
            Dimension::TemperatureDifference => "15 K",
            Dimension::Mass => "21 kg",
            Dimension::Power => "500 kW",
            Dimension::Energy => "370 MJ",
            Dimension::Flux => "5 kW/m2",
            Dimension::GrowthFactor => "0.0469 kW/s2",
            Dimension::Pressure => "25 Pa",
            Dimension::SpecificEnergy => "17 MJ/kg",
            Dimension::Conductivity => "0.2 W/m/K",
            Dimension::Density => "790 kg/m3",
            Dimension::HeatCapacity => "1090 J/kg/K",
            Dimension::HeatCapacitySlope => "3.3 J/kg/K2",
            Dimension::HeatTransfer => "15 W/m2/K",
            Dimension::MolarMass => "44.1 g/mol",
            Dimension::Speed => "9 m/s",
            Dimension::VolumeFlow => "3 m3/s",
            Dimension::Angle => "270 °",
            Dimension::Ratio => "70 %",
        }
    }

    /// Whether several terms may be added up ("6 ft 8 in", "4 min 30 s").
    pub fn adds_terms(self) -> bool {
        matches!(self, Dimension::Length | Dimension::Time | Dimension::Mass)
    }

    /// The units of this dimension, the SI unit among them.
    pub fn units(self) -> impl Iterator<Item = &'static Unit> {
        UNITS.iter().filter(move |unit| unit.dimension == self)
    }
}

/// One way of writing a dimension: `SI = (value + shift) * times / over`.
///
/// A factor and a divisor keep decimal units exact: 35 cm is 35/100.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Unit {
    /// What it measures.
    pub dimension: Dimension,
    /// Symbol as written.
    pub symbol: &'static str,
    /// Added to the number first (temperatures only).
    pub shift: f64,
    /// Factor to SI.
    pub times: f64,
    /// Divisor to SI.
    pub over: f64,
    /// Whether [`super::write()`] may pick it, and the SI magnitudes (least,
    /// most) for which it reads well.
    pub shown: Option<(f64, f64)>,
}

impl Unit {
    /// SI value of a number in this unit.
    pub fn to_si(&self, number: f64) -> f64 {
        (number + self.shift) * self.times / self.over
    }

    /// Number in this unit of an SI value.
    pub fn from_si(&self, si: f64) -> f64 {
        si * self.over / self.times - self.shift
    }
}

const fn unit(dimension: Dimension, symbol: &'static str, times: f64, over: f64) -> Unit {
    Unit {
        dimension,
        symbol,
        shift: 0.0,
        times,
        over,
        shown: None,
    }
}

const fn shown(base: Unit, least: f64, most: f64) -> Unit {
    Unit {
        shown: Some((least, most)),
        ..base
    }
}

const fn shifted(base: Unit, shift: f64) -> Unit {
    Unit { shift, ..base }
}

const FAR: f64 = f64::INFINITY;

/// International foot, m (exact by definition, 1959).
const FOOT: f64 = 0.3048;
/// International avoirdupois pound, kg (exact by definition, 1959).
const POUND: f64 = 0.453_592_37;
/// British thermal unit, international table, J (4.1868 J/g/K x lb x °F/K).
const BTU: f64 = 1_055.055_852_62;
/// Inch of water column, Pa (conventional, at 4 °C).
const INCH_WATER: f64 = 249.088_9;

use Dimension as D;

/// Every unit that a scenario or a catalogue file may use. Where a dimension
/// has several units for showing, the first whose span holds the value wins.
pub const UNITS: &[Unit] = &[
    shown(unit(D::Length, "mm", 1.0, 1000.0), 0.0, 0.02),
    shown(unit(D::Length, "cm", 1.0, 100.0), 0.0, 0.3),
    shown(unit(D::Length, "m", 1.0, 1.0), 0.0, FAR),
    unit(D::Length, "in", FOOT, 12.0),
    unit(D::Length, "\"", FOOT, 12.0),
    unit(D::Length, "ft", FOOT, 1.0),
    unit(D::Length, "'", FOOT, 1.0),
    unit(D::Length, "yd", FOOT * 3.0, 1.0),
    shown(unit(D::Area, "m2", 1.0, 1.0), 0.0, FAR),
    unit(D::Area, "cm2", 1.0, 1e4),
    unit(D::Area, "mm2", 1.0, 1e6),
    unit(D::Area, "ft2", FOOT * FOOT, 1.0),
    unit(D::Area, "in2", FOOT * FOOT, 144.0),
    shown(unit(D::Time, "s", 1.0, 1.0), 0.0, 180.0),
    shown(unit(D::Time, "min", 60.0, 1.0), 0.0, 7200.0),
    unit(D::Time, "ms", 1.0, 1000.0),
    shown(unit(D::Time, "h", 3600.0, 1.0), 0.0, FAR),
    shown(
        shifted(unit(D::Temperature, "°C", 1.0, 1.0), 273.15),
        0.0,
        FAR,
    ),
    shifted(unit(D::Temperature, "C", 1.0, 1.0), 273.15),
    shifted(unit(D::Temperature, "°F", 5.0, 9.0), 459.67),
    shifted(unit(D::Temperature, "F", 5.0, 9.0), 459.67),
    unit(D::Temperature, "K", 1.0, 1.0),
    shown(unit(D::TemperatureDifference, "K", 1.0, 1.0), 0.0, FAR),
    unit(D::TemperatureDifference, "°C", 1.0, 1.0),
    unit(D::TemperatureDifference, "°F", 5.0, 9.0),
    shown(unit(D::Mass, "kg", 1.0, 1.0), 0.0, FAR),
    unit(D::Mass, "g", 1.0, 1000.0),
    unit(D::Mass, "t", 1000.0, 1.0),
    unit(D::Mass, "lb", POUND, 1.0),
    unit(D::Mass, "oz", POUND, 16.0),
    unit(D::Power, "W", 1.0, 1.0),
    shown(unit(D::Power, "kW", 1e3, 1.0), 0.0, FAR),
    unit(D::Power, "MW", 1e6, 1.0),
    unit(D::Power, "Btu/s", BTU, 1.0),
    unit(D::Power, "Btu/h", BTU, 3600.0),
    unit(D::Energy, "J", 1.0, 1.0),
    unit(D::Energy, "kJ", 1e3, 1.0),
    shown(unit(D::Energy, "MJ", 1e6, 1.0), 0.0, FAR),
    unit(D::Energy, "GJ", 1e9, 1.0),
    unit(D::Energy, "Btu", BTU, 1.0),
    unit(D::Flux, "W/m2", 1.0, 1.0),
    shown(unit(D::Flux, "kW/m2", 1e3, 1.0), 0.0, FAR),
    unit(D::Flux, "MW/m2", 1e6, 1.0),
    unit(D::Flux, "Btu/ft2/s", BTU, FOOT * FOOT),
    unit(D::GrowthFactor, "W/s2", 1.0, 1.0),
    shown(unit(D::GrowthFactor, "kW/s2", 1e3, 1.0), 0.0, FAR),
    unit(D::GrowthFactor, "Btu/s3", BTU, 1.0),
    shown(unit(D::Pressure, "Pa", 1.0, 1.0), 0.0, 10_000.0),
    unit(D::Pressure, "hPa", 100.0, 1.0),
    unit(D::Pressure, "mbar", 100.0, 1.0),
    shown(unit(D::Pressure, "kPa", 1e3, 1.0), 0.0, FAR),
    unit(D::Pressure, "in H2O", INCH_WATER, 1.0),
    unit(D::SpecificEnergy, "J/kg", 1.0, 1.0),
    unit(D::SpecificEnergy, "kJ/kg", 1e3, 1.0),
    unit(D::SpecificEnergy, "kJ/g", 1e6, 1.0),
    shown(unit(D::SpecificEnergy, "MJ/kg", 1e6, 1.0), 0.0, FAR),
    unit(D::SpecificEnergy, "Btu/lb", BTU, POUND),
    shown(unit(D::Conductivity, "W/m/K", 1.0, 1.0), 0.0, FAR),
    unit(D::Conductivity, "W/(m K)", 1.0, 1.0),
    unit(
        D::Conductivity,
        "Btu/h/ft/°F",
        BTU * 9.0,
        3600.0 * FOOT * 5.0,
    ),
    shown(unit(D::Density, "kg/m3", 1.0, 1.0), 0.0, FAR),
    unit(D::Density, "g/cm3", 1000.0, 1.0),
    unit(D::Density, "lb/ft3", POUND, FOOT * FOOT * FOOT),
    shown(unit(D::HeatCapacity, "J/kg/K", 1.0, 1.0), 0.0, FAR),
    unit(D::HeatCapacity, "J/(kg K)", 1.0, 1.0),
    unit(D::HeatCapacity, "kJ/kg/K", 1000.0, 1.0),
    unit(D::HeatCapacity, "Btu/lb/°F", BTU * 9.0, POUND * 5.0),
    shown(unit(D::HeatCapacitySlope, "J/kg/K2", 1.0, 1.0), 0.0, FAR),
    shown(unit(D::HeatTransfer, "W/m2/K", 1.0, 1.0), 0.0, FAR),
    unit(D::HeatTransfer, "W/(m2 K)", 1.0, 1.0),
    shown(unit(D::MolarMass, "g/mol", 1.0, 1000.0), 0.0, FAR),
    unit(D::MolarMass, "kg/mol", 1.0, 1.0),
    shown(unit(D::Speed, "m/s", 1.0, 1.0), 0.0, FAR),
    unit(D::Speed, "km/h", 1000.0, 3600.0),
    unit(D::Speed, "mph", FOOT * 5280.0, 3600.0),
    unit(D::Speed, "kn", 1852.0, 3600.0),
    unit(D::Speed, "ft/s", FOOT, 1.0),
    unit(D::Speed, "fpm", FOOT, 60.0),
    shown(unit(D::VolumeFlow, "m3/s", 1.0, 1.0), 0.0, FAR),
    unit(D::VolumeFlow, "m3/h", 1.0, 3600.0),
    unit(D::VolumeFlow, "L/s", 1.0, 1000.0),
    unit(D::VolumeFlow, "cfm", FOOT * FOOT * FOOT, 60.0),
    shown(unit(D::Angle, "°", 1.0, 1.0), 0.0, FAR),
    unit(D::Angle, "deg", 1.0, 1.0),
    unit(D::Ratio, "%", 1.0, 100.0),
];

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;

    #[test]
    fn verify_every_dimension_has_a_unit_and_an_example_that_reads() {
        for &dimension in Dimension::ALL {
            assert!(dimension.units().next().is_some(), "{dimension:?}");
            crate::units::read(dimension.example(), dimension).unwrap();
        }
    }

    #[test]
    fn verify_no_symbol_twice_in_a_dimension() {
        for &dimension in Dimension::ALL {
            let mut symbols: Vec<_> = dimension.units().map(|unit| unit.symbol).collect();
            let before = symbols.len();
            symbols.sort_unstable();
            symbols.dedup();
            assert_eq!(before, symbols.len(), "{dimension:?}");
        }
    }
}
