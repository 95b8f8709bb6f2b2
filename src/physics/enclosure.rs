//! Radiation in a room of two layers: net-radiation method for four surfaces
//! (ceiling, wall above the interface, wall below, floor) around a grey upper
//! layer and a clear lower layer. Each surface may be made of parts with
//! their own emissivity and temperature; open openings to the outside are
//! black parts at the outside temperature, openings to another room are
//! mirrors whose net loss is prescribed.
//!
//! Source: net-radiation method, Siegel and Howell, Thermal Radiation Heat
//! Transfer (from memory); view factors by [`parallel_rectangles`] and the
//! summation and reciprocity rules.

use super::view_factor::{parallel_rectangles, point_to_rectangle};
use nalgebra::{Matrix4, Vector4};

/// Stefan-Boltzmann constant, W/m2/K4 (CODATA 2018).
pub const STEFAN_BOLTZMANN: f64 = 5.670_374_419e-8;

/// Index of the ceiling.
pub const CEILING: usize = 0;
/// Index of the wall above the interface.
pub const UPPER_WALL: usize = 1;
/// Index of the wall below the interface.
pub const LOWER_WALL: usize = 2;
/// Index of the floor.
pub const FLOOR: usize = 3;

/// Emissive power of a black body, W/m2, at a temperature in K.
pub fn black(temperature: f64) -> f64 {
    let t2 = temperature * temperature;
    STEFAN_BOLTZMANN * t2 * t2
}

/// Shape of a room cut at its interface.
#[derive(Debug, Clone, Copy, PartialEq)]
pub struct Shape {
    /// Areas of the four surfaces, m2.
    pub area: [f64; 4],
    /// View factors from row to column.
    pub view: [[f64; 4]; 4],
}

/// Areas and view factors of a room `width` x `length` x `height` (m) with its
/// interface at `interface` (m, strictly inside the height). `ceiling_floor` is
/// the view factor between ceiling and floor, which does not change.
pub fn shape(width: f64, length: f64, height: f64, interface: f64, ceiling_floor: f64) -> Shape {
    let plan = width * length;
    let perimeter = 2.0 * (width + length);
    let (above, below) = (height - interface, interface);
    let a = parallel_rectangles(width, length, above);
    let b = parallel_rectangles(width, length, below);
    let c = ceiling_floor;
    let area = [plan, perimeter * above, perimeter * below, plan];
    let up = plan / area[UPPER_WALL];
    let low = plan / area[LOWER_WALL];
    let cross = (1.0 - a) - (b - c);
    let view = [
        [0.0, 1.0 - a, a - c, c],
        [
            up * (1.0 - a),
            1.0 - 2.0 * up * (1.0 - a),
            up * cross,
            up * (b - c),
        ],
        [
            low * (a - c),
            low * cross,
            1.0 - 2.0 * low * (1.0 - b),
            low * (1.0 - b),
        ],
        [c, b - c, 1.0 - b, 0.0],
    ];
    Shape { area, view }
}

/// True when the way between two surfaces leads through the upper layer.
const THROUGH_LAYER: [[bool; 4]; 4] = [
    [true, true, true, true],
    [true, true, true, true],
    [true, true, false, false],
    [true, true, false, false],
];

/// Shares of an isotropic point source that fall on the four surfaces, for a
/// source above the middle of the floor at `source` (m above the floor).
pub fn point_shares(width: f64, length: f64, height: f64, interface: f64, source: f64) -> [f64; 4] {
    let ceiling = point_to_rectangle(width, length, (height - source).max(1e-3));
    let floor = point_to_rectangle(width, length, source.max(1e-3));
    let plane = point_to_rectangle(width, length, (interface - source).abs().max(1e-6));
    let above = if source < interface {
        plane
    } else {
        1.0 - plane
    };
    let upper = (above - ceiling).max(0.0);
    let lower = (1.0 - above - floor).max(0.0);
    let total = ceiling + upper + lower + floor;
    [ceiling / total, upper / total, lower / total, floor / total]
}

/// The four surfaces as seen by the radiation: what leaves them is
/// `emission + reflection * irradiation`.
#[derive(Debug, Clone, Copy, PartialEq, Default)]
pub struct Face {
    /// Area-weighted own emission, W/m2.
    pub emission: f64,
    /// Area-weighted reflectance, 0..1.
    pub reflection: f64,
}

/// A factorised room, ready to be solved for several sources.
#[derive(Debug, Clone)]
pub struct Enclosure {
    inverse: Matrix4<f64>,
    exchange: Matrix4<f64>,
    layer: Vector4<f64>,
    emission: Vector4<f64>,
}

impl Enclosure {
    /// Sets up `G = K (E + R G) + L`, where `K` holds view factors times the
    /// transmittance of the layer and `L` the layer's own emission. `emissivity`
    /// of the layer 0..1; `layer_emission` is the black emissive power at its
    /// temperature, W/m2.
    pub fn new(shape: &Shape, faces: &[Face; 4], emissivity: f64, layer_emission: f64) -> Self {
        let mut exchange = Matrix4::zeros();
        let mut layer = Vector4::zeros();
        for i in 0..4 {
            for j in 0..4 {
                let view = shape.view[i][j];
                let clear = if THROUGH_LAYER[i][j] {
                    1.0 - emissivity
                } else {
                    1.0
                };
                exchange[(i, j)] = view * clear;
                layer[i] += view * (1.0 - clear) * layer_emission;
            }
        }
        let mut matrix = -exchange;
        for j in 0..4 {
            for i in 0..4 {
                matrix[(i, j)] *= faces[j].reflection;
            }
            matrix[(j, j)] += 1.0;
        }
        let emission = Vector4::from_fn(|i, _| faces[i].emission);
        // Diagonally dominant, so the inverse exists; the identity would only
        // stand for a state that is not a number, which the caller rejects.
        let inverse = matrix.try_inverse().unwrap_or_else(Matrix4::identity);
        Self {
            inverse,
            exchange,
            layer,
            emission,
        }
    }

    /// Irradiation of the surfaces by surfaces and layer, W/m2.
    pub fn irradiation(&self) -> Vector4<f64> {
        self.inverse * (self.exchange * self.emission + self.layer)
    }

    /// Irradiation, reflections included, that comes of a flux falling on the
    /// surfaces first, W/m2.
    pub fn of_incident(&self, incident: &Vector4<f64>) -> Vector4<f64> {
        self.inverse * incident
    }

    /// Irradiation that comes of an extra emission of the surfaces, W/m2.
    pub fn of_emission(&self, extra: &Vector4<f64>) -> Vector4<f64> {
        self.inverse * (self.exchange * extra)
    }
}
