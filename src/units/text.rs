//! Text to SI and back.

use super::table::{Dimension, UNITS, Unit};
use thiserror::Error;

/// Why a text is not the quantity that was wanted. [`QuantityError::help`]
/// says what would be right.
#[derive(Debug, Clone, PartialEq, Error)]
pub enum QuantityError {
    /// Nothing there.
    #[error("this is empty; {} is wanted", .0.words())]
    Empty(Dimension),
    /// No number at the start.
    #[error("this does not begin with a number; {} is wanted", .0.words())]
    NoNumber(Dimension),
    /// A number without a unit.
    #[error("the unit is missing; {want} is wanted", want = .1.words())]
    NoUnit(String, Dimension),
    /// A decimal comma.
    #[error("a decimal comma cannot be read")]
    Comma(String),
    /// A unit of something else.
    #[error("`{0}` is the unit of {was}; {want} is wanted", was = .1.words(), want = .2.words())]
    WrongDimension(String, Dimension, Dimension),
    /// A unit nobody knows.
    #[error("`{0}` is not a unit known here; {want} is wanted", want = .2.words())]
    UnknownUnit(String, Vec<&'static str>, Dimension),
    /// Too large for a number, or not a number.
    #[error("this number is not finite")]
    NotFinite(Dimension),
}

impl QuantityError {
    /// What would be right.
    pub fn help(&self) -> String {
        match self {
            Self::Empty(dimension)
            | Self::NoNumber(dimension)
            | Self::NotFinite(dimension)
            | Self::WrongDimension(_, _, dimension) => {
                format!("write it like \"{}\"", dimension.example())
            }
            Self::NoUnit(number, Dimension::Time) => match number.parse::<f64>() {
                Ok(count) if count > 60.0 && count % 60.0 == 0.0 => {
                    format!("write the unit: \"{number} s\" or \"{} min\"", count / 60.0)
                }
                Ok(count) if count > 60.0 => format!("write the unit: \"{number} s\""),
                _ => format!("write the unit: \"{number} s\" or \"{number} min\""),
            },
            Self::NoUnit(number, dimension) => {
                let symbol = dimension
                    .example()
                    .split_once(' ')
                    .map_or("", |(_, symbol)| symbol);
                format!("write the unit: \"{number} {symbol}\"")
            }
            Self::Comma(better) => format!("write a decimal point: \"{better}\""),
            Self::UnknownUnit(_, near, dimension) => {
                let known: Vec<_> = dimension.units().map(|unit| unit.symbol).collect();
                if near.is_empty() {
                    format!("units known for it: {}", known.join(", "))
                } else {
                    format!(
                        "did you mean `{}`? units known for it: {}",
                        near.join("` or `"),
                        known.join(", ")
                    )
                }
            }
        }
    }
}

/// SI value of a text such as `"2.4 m"`, `"6 ft 8 in"`, `"53 °F"`.
///
/// Only [`Dimension::Ratio`] may come without a unit. Anything else is an
/// error that says what was wanted; no text makes this function panic.
///
/// # Errors
/// See [`QuantityError`].
pub fn read(text: &str, dimension: Dimension) -> Result<f64, QuantityError> {
    let mut rest = text.trim();
    if rest.is_empty() {
        return Err(QuantityError::Empty(dimension));
    }
    let mut sum = 0.0;
    let mut terms = 0;
    while !rest.is_empty() {
        let (number, after) = split_number(rest).ok_or(QuantityError::NoNumber(dimension))?;
        if after.starts_with(',') {
            return Err(QuantityError::Comma(text.trim().replacen(',', ".", 1)));
        }
        let (symbol, next) = split_symbol(after, dimension);
        sum += term(number, symbol, dimension)?;
        terms += 1;
        if terms > 1 && (!dimension.adds_terms() || number.starts_with(['+', '-', '−'])) {
            return Err(QuantityError::UnknownUnit(
                after.trim().to_owned(),
                Vec::new(),
                dimension,
            ));
        }
        rest = next;
    }
    if sum.is_finite() {
        Ok(sum)
    } else {
        Err(QuantityError::NotFinite(dimension))
    }
}

/// One number with its unit, in SI.
fn term(number: &str, symbol: &str, dimension: Dimension) -> Result<f64, QuantityError> {
    let value: f64 = number
        .replace('−', "-")
        .parse()
        .map_err(|_| QuantityError::NoNumber(dimension))?;
    if !value.is_finite() {
        return Err(QuantityError::NotFinite(dimension));
    }
    if symbol.is_empty() {
        return if dimension == Dimension::Ratio {
            Ok(value)
        } else {
            Err(QuantityError::NoUnit(number.to_owned(), dimension))
        };
    }
    let unit = find(symbol, dimension)?;
    Ok(unit.to_si(value))
}

/// Splits a leading number off; `None` when there is none.
fn split_number(text: &str) -> Option<(&str, &str)> {
    let bytes = text.as_bytes();
    let mut end = ["+", "-", "−"]
        .iter()
        .find(|sign| text.starts_with(**sign))
        .map_or(0, |sign| sign.len());
    let digits = |from: usize| {
        bytes[from..]
            .iter()
            .take_while(|byte| byte.is_ascii_digit())
            .count()
    };
    let whole = digits(end);
    end += whole;
    let mut share = 0;
    if bytes.get(end) == Some(&b'.') {
        share = digits(end + 1);
        end += 1 + share;
    }
    if whole + share == 0 {
        return None;
    }
    if matches!(bytes.get(end), Some(b'e' | b'E')) {
        let sign = usize::from(matches!(bytes.get(end + 1), Some(b'+' | b'-')));
        let power = digits((end + 1 + sign).min(bytes.len()));
        if power > 0 {
            end += 1 + sign + power;
        }
    }
    Some((&text[..end], text[end..].trim_start()))
}

/// Splits the unit off what follows a number; a further term begins at a
/// digit after a space where terms may be added up.
fn split_symbol(text: &str, dimension: Dimension) -> (&str, &str) {
    if dimension.adds_terms() {
        let mut previous = ' ';
        for (index, letter) in text.char_indices() {
            let splits = previous == ' ' || previous == '\'';
            if index > 0 && splits && letter.is_ascii_digit() {
                return (text[..index].trim_end(), &text[index..]);
            }
            previous = letter;
        }
    }
    (text.trim_end(), "")
}

/// Unit of a dimension by its symbol.
fn find(symbol: &str, dimension: Dimension) -> Result<&'static Unit, QuantityError> {
    let plain = plain(symbol);
    if let Some(unit) = dimension.units().find(|unit| unit.symbol == plain) {
        return Ok(unit);
    }
    if let Some(other) = UNITS.iter().find(|unit| unit.symbol == plain) {
        return Err(QuantityError::WrongDimension(
            symbol.to_owned(),
            other.dimension,
            dimension,
        ));
    }
    Err(QuantityError::UnknownUnit(
        symbol.to_owned(),
        near(&plain, dimension),
        dimension,
    ))
}

/// Spellings that mean the same: superscripts, the degree signs, full words.
fn plain(symbol: &str) -> String {
    let symbol = symbol
        .replace('²', "2")
        .replace('³', "3")
        .replace('℃', "°C")
        .replace('℉', "°F")
        .replace('º', "°")
        .replace('^', "")
        .replace('·', " ");
    match symbol.as_str() {
        "sec" | "second" | "seconds" => "s".to_owned(),
        "minute" | "minutes" => "min".to_owned(),
        "hour" | "hours" | "hr" => "h".to_owned(),
        "metre" | "metres" | "meter" | "meters" => "m".to_owned(),
        "foot" | "feet" => "ft".to_owned(),
        "inch" | "inches" => "in".to_owned(),
        "lbs" | "pound" | "pounds" => "lb".to_owned(),
        "percent" => "%".to_owned(),
        "sq ft" | "sqft" => "ft2".to_owned(),
        "in. w.g." | "in w.g." | "inH2O" => "in H2O".to_owned(),
        _ => symbol,
    }
}

/// Units of the dimension that differ by letter case or one letter.
fn near(symbol: &str, dimension: Dimension) -> Vec<&'static str> {
    let lower = symbol.to_lowercase();
    let mut found: Vec<_> = dimension
        .units()
        .map(|unit| {
            let distance = strsim::damerau_levenshtein(&lower, &unit.symbol.to_lowercase());
            (distance, unit.symbol)
        })
        .filter(|(distance, known)| *distance == 0 || (*distance == 1 && known.len() > 1))
        .collect();
    found.sort_by_key(|(distance, _)| *distance);
    if found.first().is_some_and(|(distance, _)| *distance == 0) {
        found.retain(|(distance, _)| *distance == 0);
    }
    found.into_iter().take(2).map(|(_, known)| known).collect()
}

/// An SI value as text that [`read`] turns back into exactly the same number,
/// in a unit people read where that is possible.
pub fn write(si: f64, dimension: Dimension) -> String {
    if dimension == Dimension::Ratio {
        return number(si);
    }
    let pleasant = dimension
        .units()
        .filter(|unit| {
            unit.shown
                .is_some_and(|(least, most)| si.abs() >= least && si.abs() <= most)
        })
        .filter_map(|unit| exact(si, unit))
        .min_by_key(String::len);
    pleasant
        .or_else(|| {
            dimension
                .units()
                .filter_map(|unit| exact(si, unit))
                .min_by_key(String::len)
        })
        .unwrap_or_else(|| {
            let symbol = dimension
                .units()
                .find(|unit| unit.times == 1.0 && unit.over == 1.0 && unit.shift == 0.0)
                .map_or("", |unit| unit.symbol);
            format!("{si} {symbol}")
        })
}

/// An SI value as short text for people, rounded to four figures.
pub fn rounded(si: f64, dimension: Dimension) -> String {
    let unit = dimension.units().find(|unit| {
        unit.shown
            .is_some_and(|(least, most)| si.abs() >= least && si.abs() <= most)
    });
    let value = unit.map_or(si, |unit| unit.from_si(si));
    let places = if value == 0.0 {
        0
    } else {
        // Magnitudes of f64 are far inside i32.
        #[allow(clippy::cast_possible_truncation)]
        let magnitude = value.abs().log10().floor() as i32;
        usize::try_from((3 - magnitude).clamp(0, 12)).unwrap_or(0)
    };
    let full = format!("{value:.places$}");
    let text = if full.contains('.') {
        full.trim_end_matches('0').trim_end_matches('.')
    } else {
        &full
    };
    match unit {
        Some(unit) => format!("{text} {}", unit.symbol),
        None => text.to_owned(),
    }
}

/// The value in one unit with the fewest digits that read back exactly.
fn exact(si: f64, unit: &Unit) -> Option<String> {
    let value = unit.from_si(si);
    (0..=17)
        .map(|digits| format!("{value:.digits$}"))
        .find(|text| text.parse().is_ok_and(|back: f64| unit.to_si(back) == si))
        .map(|text| format!("{text} {}", unit.symbol))
}

/// A plain number as TOML writes it.
fn number(value: f64) -> String {
    format!("{value:?}")
}

#[cfg(test)]
#[allow(clippy::unwrap_used)]
mod tests {
    use super::*;
    use proptest::prelude::*;

    fn close(text: &str, dimension: Dimension, si: f64) {
        let value = read(text, dimension).unwrap();
        assert!(
            (value - si).abs() <= 1e-12 * si.abs().max(1.0),
            "{text}: {value} is not {si}"
        );
    }

    #[test]
    fn formula_units_by_definition() {
        close("1 ft", Dimension::Length, 0.3048);
        close("8 ft", Dimension::Length, 2.4384);
        close("6 in", Dimension::Length, 0.1524);
        close("6 ft 8 in", Dimension::Length, 2.032);
        close("6'8\"", Dimension::Length, 2.032);
        close("13 cm", Dimension::Length, 0.13);
        close("1 ft2", Dimension::Area, 0.092_903_04);
        close("1 Btu/s", Dimension::Power, 1_055.055_852_62);
        close("475 Btu/s", Dimension::Power, 501_151.529_994_5);
        close("1.2 MW", Dimension::Power, 1.2e6);
        close("12 °C", Dimension::Temperature, 285.15);
        close("32 °F", Dimension::Temperature, 273.15);
        close("-40 °F", Dimension::Temperature, 233.15);
        close("53 °F", Dimension::Temperature, (53.0 + 459.67) / 1.8);
        close("285 K", Dimension::Temperature, 285.0);
        close("9 °F", Dimension::TemperatureDifference, 5.0);
        close("15 °C", Dimension::TemperatureDifference, 15.0);
        close("4 min 30 s", Dimension::Time, 270.0);
        close("1 h", Dimension::Time, 3600.0);
        close("40 lb", Dimension::Mass, 18.143_694_8);
        close("70 %", Dimension::Ratio, 0.7);
        close("0.7", Dimension::Ratio, 0.7);
        close("17 MJ/kg", Dimension::SpecificEnergy, 17e6);
        close("1 Btu/lb", Dimension::SpecificEnergy, 2326.0);
        close("1 lb/ft3", Dimension::Density, 16.018_463_373_960_14);
        close("1 Btu/lb/°F", Dimension::HeatCapacity, 4186.8);
        close("1 Btu/h/ft/°F", Dimension::Conductivity, 1.730_734_666_37);
        close("1 in H2O", Dimension::Pressure, 249.0889);
        close("790 kg/m³", Dimension::Density, 790.0);
        close("2.5e2 kW", Dimension::Power, 250e3);
    }

    #[test]
    fn verify_rounded_text_for_people() {
        assert_eq!(rounded(213.15, Dimension::Temperature), "-60 °C");
        assert_eq!(rounded(2.4384, Dimension::Length), "2.438 m");
        assert_eq!(rounded(0.13, Dimension::Length), "13 cm");
        assert_eq!(rounded(1.0, Dimension::Ratio), "1");
        assert_eq!(rounded(1e-10, Dimension::Ratio), "0.0000000001");
        assert_eq!(rounded(86_400.0, Dimension::Time), "24 h");
        assert_eq!(rounded(0.0, Dimension::Length), "0 mm");
    }

    #[test]
    fn verify_messages_say_what_is_wanted() {
        let help = |text, dimension| read(text, dimension).unwrap_err();
        let bare = help("2.4", Dimension::Length);
        assert_eq!(bare.help(), "write the unit: \"2.4 m\"");
        let wrong = help("2.4 kW", Dimension::Length);
        assert_eq!(
            wrong.to_string(),
            "`kW` is the unit of a heat release rate; a length is wanted"
        );
        assert_eq!(wrong.help(), "write it like \"2.4 m\"");
        let unknown = help("500 Kw", Dimension::Power);
        assert!(unknown.help().starts_with("did you mean `kW`?"));
        assert_eq!(
            help("2,4 m", Dimension::Length).help(),
            "write a decimal point: \"2.4 m\""
        );
        assert!(matches!(
            help("1e999 m", Dimension::Length),
            QuantityError::NotFinite(_)
        ));
        assert!(matches!(
            help("nan m", Dimension::Length),
            QuantityError::NoNumber(_)
        ));
        assert!(matches!(
            help("1 kW 2 kW", Dimension::Power),
            QuantityError::UnknownUnit(..)
        ));
    }

    proptest! {
        #[test]
        fn verify_no_text_panics(text in "\\PC*", which in 0..Dimension::ALL.len()) {
            let _ = read(&text, Dimension::ALL[which]);
        }

        #[test]
        fn verify_number_like_text_never_panics(text in "[-+−0-9.eE ,ftmins°FCk'\"]{0,20}") {
            for &dimension in Dimension::ALL {
                let _ = read(&text, dimension);
            }
        }

        #[test]
        fn verify_written_reads_back_exactly(si in prop_oneof![0.0..1e3f64, 1e-6..1e-1f64, 1e3..1e9f64]) {
            for &dimension in Dimension::ALL {
                let text = write(si, dimension);
                prop_assert_eq!(read(&text, dimension).unwrap(), si, "{}", text);
            }
        }
    }
}
