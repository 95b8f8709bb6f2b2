//! Values as people read them: metric first, US customary beside it where a
//! crew would say it that way.

use crate::record::Dimension;

/// A time as minutes and seconds, `9:24`; whole seconds.
pub fn clock(seconds: f64) -> String {
    if !seconds.is_finite() {
        return "-".to_owned();
    }
    let sign = if seconds.round() < 0.0 { "-" } else { "" };
    let whole = seconds.abs().round();
    format!("{sign}{:.0}:{:02.0}", (whole / 60.0).floor(), whole % 60.0)
}

/// A time since something, with its sign: `+1:24`.
pub fn since(seconds: f64) -> String {
    let text = clock(seconds);
    if text.starts_with('-') {
        text
    } else {
        format!("+{text}")
    }
}

/// A value with its unit, SI in, metric with US customary out.
pub fn value(value: f64, dimension: Dimension) -> String {
    if !value.is_finite() {
        return "-".to_owned();
    }
    match dimension {
        Dimension::Temperature => {
            let celsius = value - 273.15;
            format!("{celsius:.0} °C ({:.0} °F)", celsius * 1.8 + 32.0)
        }
        Dimension::Length if value.abs() < 0.3 => {
            format!("{:.0} cm ({:.0} in)", value * 100.0, value / 0.0254)
        }
        Dimension::Length if value.abs() < 10.0 => {
            format!("{value:.1} m ({:.1} ft)", value / 0.3048)
        }
        Dimension::Length => format!("{value:.0} m ({:.0} ft)", value / 0.3048),
        Dimension::Speed => format!("{value:.1} m/s ({:.0} ft/min)", value / 0.3048 * 60.0),
        Dimension::Mass => format!("{value:.1} kg ({:.1} lb)", value / 0.453_592_37),
        _ => metric(value, dimension),
    }
}

/// A value with its metric unit alone, SI in.
pub fn metric(value: f64, dimension: Dimension) -> String {
    if !value.is_finite() {
        return "-".to_owned();
    }
    match dimension {
        Dimension::Temperature => format!("{:.0} °C", value - 273.15),
        Dimension::Length => format!("{value:.2} m"),
        Dimension::VolumeFraction | Dimension::MassFraction if value.abs() < 0.01 => {
            format!("{:.2} %", value * 100.0)
        }
        Dimension::VolumeFraction | Dimension::MassFraction => format!("{:.1} %", value * 100.0),
        Dimension::Ratio => format!("{value:.2}"),
        Dimension::Pressure => format!("{value:.0} Pa"),
        Dimension::Power if value.abs() >= 0.9995e6 => format!("{:.2} MW", value / 1e6),
        Dimension::Power => format!("{:.0} kW", value / 1e3),
        Dimension::Flux => format!("{:.1} kW/m2", value / 1e3),
        Dimension::MassFlow => format!("{value:.2} kg/s"),
        Dimension::Speed => format!("{value:.1} m/s"),
        Dimension::Mass => format!("{value:.1} kg"),
        Dimension::Density => format!("{:.2} g/m3", value * 1e3),
        Dimension::Time => clock(value),
    }
}

#[cfg(test)]
mod tests {
    use super::*;

    #[test]
    fn verify_clock_rounds_to_whole_seconds() {
        assert_eq!(clock(0.0), "0:00");
        assert_eq!(clock(59.6), "1:00");
        assert_eq!(clock(564.0), "9:24");
        assert_eq!(clock(-61.0), "-1:01");
        assert_eq!(clock(-0.2), "0:00");
        assert_eq!(clock(f64::NAN), "-");
        assert_eq!(since(84.0), "+1:24");
        assert_eq!(since(-4.0), "-0:04");
    }

    #[test]
    fn verify_values_carry_both_units() {
        assert_eq!(value(433.15, Dimension::Temperature), "160 °C (320 °F)");
        assert_eq!(value(0.13, Dimension::Length), "13 cm (5 in)");
        assert_eq!(value(2.0, Dimension::Length), "2.0 m (6.6 ft)");
        assert_eq!(value(1.36e6, Dimension::Power), "1.36 MW");
        assert_eq!(value(999_600.0, Dimension::Power), "1.00 MW");
        assert_eq!(value(0.149, Dimension::VolumeFraction), "14.9 %");
        assert_eq!(value(f64::NAN, Dimension::Power), "-");
    }
}
