//! Colours and strokes. The hues are a subset of the palette of Okabe and Ito
//! (2008, "Color universal design"), chosen to stay apart for readers with any
//! kind of colour vision and in grey print; style tells lines apart as well.

use plotters::style::RGBColor;

/// Titles and labels.
pub const INK: RGBColor = RGBColor(0x22, 0x26, 0x2B);
/// Secondary text.
pub const SOFT_INK: RGBColor = RGBColor(0x5B, 0x63, 0x6B);
/// Grid.
pub const GRID: RGBColor = RGBColor(0xE4, 0xE7, 0xEA);
/// From the end of a curve to its label.
pub const LEADER: RGBColor = RGBColor(0xC4, 0xC9, 0xCE);
/// Axes and the lines of actions.
pub const AXIS: RGBColor = RGBColor(0x8A, 0x92, 0x99);
/// Limits and heights that a curve is read against.
pub const LEVEL: RGBColor = RGBColor(0x5B, 0x63, 0x6B);
/// Time spans that are picked out.
pub const SHADE: RGBColor = RGBColor(0xF6, 0xEC, 0xD9);
/// Vermilion.
pub const VERMILION: RGBColor = RGBColor(0xD5, 0x5E, 0x00);
/// Blue.
pub const BLUE: RGBColor = RGBColor(0x00, 0x72, 0xB2);
/// Bluish green.
pub const GREEN: RGBColor = RGBColor(0x00, 0x9E, 0x73);
/// Reddish purple.
pub const PURPLE: RGBColor = RGBColor(0xCC, 0x79, 0xA7);
/// Sky blue.
pub const SKY: RGBColor = RGBColor(0x56, 0xB4, 0xE9);
/// Orange.
pub const ORANGE: RGBColor = RGBColor(0xE6, 0x9F, 0x00);

/// Colours of rooms, by rank: the room of the fire first.
pub const ROOMS: [RGBColor; 6] = [VERMILION, BLUE, GREEN, PURPLE, ORANGE, SKY];

/// How a line is stroked.
#[derive(Debug, Clone, Copy, PartialEq, Eq)]
pub enum Stroke {
    /// Unbroken.
    Solid,
    /// Long dashes.
    Dashed,
    /// Short dots.
    Dotted,
}

impl Stroke {
    /// Lengths of dash and gap in points of the picture; `None` when unbroken.
    pub fn pattern(self) -> Option<(f64, f64)> {
        match self {
            Stroke::Solid => None,
            Stroke::Dashed => Some((7.0, 4.0)),
            Stroke::Dotted => Some((2.0, 3.0)),
        }
    }
}
