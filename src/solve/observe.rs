//! Fills the record's columns from the model at an output time.

use super::derivative::Model;
use super::layers::dot;
use super::layout::{ItemPlace, LOWER, UPPER};
use crate::physics::external_flame;
use crate::physics::gas::{CO, CO2, FIRST_FUEL, H2O, O2, SOOT};
use crate::plan::Plan;
use crate::record::{Column, Quantity, Subject};

/// Flow below which a direction counts as still, kg/s.
const STILL: f64 = 1e-6;

/// Depth below zero, as a fraction or in kg/m3 or kg, that an amount may reach
/// within the tolerance of the integration while it is none: an explicit step
/// dips a little before the first smoke comes. The absolute tolerance of a
/// layer's species, 2e-7 of the room's air, over the thinnest layer, 2e-3 of
/// it. Shown as zero; what lies deeper is shown as it is.
const NONE: f64 = 1e-4;

/// Zero for what is none within the tolerance.
fn present(amount: f64) -> f64 {
    if amount > -NONE {
        amount.max(0.0)
    } else {
        amount
    }
}

/// Collects output rows into columns.
pub struct Observer {
    /// Output times, s.
    pub time: Vec<f64>,
    /// Columns so far.
    pub columns: Vec<Column>,
    at: usize,
}

impl Observer {
    /// An empty set of columns; they take shape with the first row.
    pub fn new() -> Self {
        Self {
            time: Vec::new(),
            columns: Vec::new(),
            at: 0,
        }
    }

    fn put(&mut self, subject: Subject, quantity: Quantity, value: f64) {
        if self.time.len() == 1 {
            self.columns.push(Column {
                subject,
                quantity,
                values: vec![value],
            });
        } else {
            self.columns[self.at].values.push(value);
        }
        self.at += 1;
    }

    /// Adds a row from a model just evaluated at this time and state.
    pub fn row(&mut self, model: &Model<'_>, time: f64, y: &[f64]) {
        self.time.push(time);
        self.at = 0;
        self.house(model);
        for room in 0..model.building.rooms.len() {
            self.room(model, room, y);
        }
        for opening in 0..model.plan.openings.len() {
            self.opening(model, model.plan, opening, y);
        }
        for item in 0..model.plan.items.len() {
            self.item(model, item, y);
        }
    }

    fn house(&mut self, model: &Model<'_>) {
        use Quantity as Q;
        let sum = |f: fn(&super::burning::ItemRates) -> f64| model.items.iter().map(f).sum::<f64>();
        let oxygen = model.air_in() * model.layers.fractions(model.layers.outside())[O2];
        // The heat per oxygen of what burns, by the items' free rates; the
        // first fuel's while nothing burns.
        let (mut heat, mut need) = (0.0, 0.0);
        for (rates, source) in model.items.iter().zip(&model.building.items) {
            let reaction = &model.building.reactions[source.fuel];
            let weight = rates.free.max(1.0);
            heat += weight;
            need += weight / reaction.heat_per_oxygen;
        }
        let per_oxygen = if need > 0.0 { heat / need } else { 0.0 };
        let s = Subject::House;
        self.put(s, Q::FreeRate, sum(|i| i.free));
        self.put(s, Q::GivenOff, sum(|i| i.given_off));
        self.put(s, Q::Burned, model.heat_released());
        self.put(s, Q::AirCouldBurn, oxygen * per_oxygen);
    }

    fn room(&mut self, model: &Model<'_>, room: usize, y: &[f64]) {
        use Quantity as Q;
        let s = Subject::Room(room);
        let hull = &model.building.rooms[room];
        let (l, u) = (2 * room + LOWER, 2 * room + UPPER);
        let (low, up) = (&model.layers.layers[l], &model.layers.layers[u]);
        let interface = model.layers.interface[room];
        self.put(s, Q::UpperTemperature, up.temperature);
        self.put(s, Q::LowerTemperature, low.temperature);
        let depth = interface / hull.height;
        self.put(
            s,
            Q::MeanTemperature,
            depth * low.temperature + (1.0 - depth) * up.temperature,
        );
        self.put(s, Q::Interface, interface);
        self.put(s, Q::Pressure, model.balance.pressure(room));
        for (layer, quantities) in [
            (
                u,
                [
                    Q::UpperOxygen,
                    Q::UpperOxygenDry,
                    Q::UpperFuel,
                    Q::UpperCarbonMonoxide,
                    Q::UpperCarbonDioxide,
                    Q::UpperWater,
                    Q::UpperSoot,
                ],
            ),
            (
                l,
                [
                    Q::LowerOxygen,
                    Q::LowerOxygenDry,
                    Q::LowerFuel,
                    Q::LowerCarbonMonoxide,
                    Q::LowerCarbonDioxide,
                    Q::LowerWater,
                    Q::LowerSoot,
                ],
            ),
        ] {
            for (quantity, value) in quantities.into_iter().zip(composition(model, layer)) {
                self.put(s, quantity, value);
            }
        }
        self.put(s, Q::GasMass, low.mass + up.mass);
        let scene = model.heat_scene(y);
        let surfaces = scene.surface_temperatures(room);
        self.put(s, Q::CeilingTemperature, surfaces[0]);
        self.put(s, Q::UpperWallTemperature, surfaces[1]);
        self.put(s, Q::LowerWallTemperature, surfaces[2]);
        self.put(s, Q::FloorTemperature, surfaces[3]);
        let radiation = &model.radiation[room];
        self.put(s, Q::FloorFlux, scene.floor_flux(radiation, room));

        let (low, up) = (low.density, up.density);
        self.put(s, Q::Mixing, model.exchange[room] * 0.5 * (low + up));
        self.put(s, Q::MixedShare, model.mixed[room]);
        self.put(s, Q::LayerEmissivity, radiation.emissivity);
        self.put(s, Q::BurnedInSmoke, model.in_layers[room]);
        self.put(s, Q::BurnedInJets, model.in_jets[room]);
    }

    fn opening(&mut self, model: &Model<'_>, plan: &Plan, index: usize, y: &[f64]) {
        use Quantity as Q;
        let s = Subject::Opening(index);
        let passage = &model.balance.passages[index];
        let opening = &plan.openings[index];
        let [forward, backward] = &passage.streams;
        self.put(s, Q::ClearWidth, passage.stand.clear_width);
        self.put(s, Q::FlowForward, forward.total());
        self.put(s, Q::FlowBackward, backward.total());
        // The two streams of a horizontal opening have no plane between them.
        let plane = if opening.kind.is_horizontal() {
            None
        } else {
            passage.bands.neutral_plane()
        };
        self.put(s, Q::NeutralPlane, plane.unwrap_or(f64::NAN));
        for (direction, stream, quantity) in [
            (0, forward, Q::SpeedForward),
            (1, backward, Q::SpeedBackward),
        ] {
            let source = passage.source(direction);
            let density = mean(stream, |k| model.layers.layers[source[k]].density);
            // Bernoulli speed at the opening.
            let speed = (2.0 * stream.peak_difference / density).sqrt();
            let moving = stream.total() > STILL;
            self.put(s, quantity, if moving { speed } else { 0.0 });
        }
        let source = passage.source(0);
        self.put(
            s,
            Q::TemperatureForward,
            mean(forward, |k| model.layers.layers[source[k]].temperature),
        );

        let pane = if opening.pane.is_some() {
            y[model.building.layout.pane(index)]
        } else {
            f64::NAN
        };
        self.put(s, Q::PaneTemperature, pane);
        let flame = external_flame::height_above_head(
            model.release_behind(index),
            passage.stand.clear_width,
            opening.head - opening.sill,
        );
        self.put(s, Q::OutsideFlame, flame);
        self.put(s, Q::BurnedOutside, model.outside[index]);
    }

    fn item(&mut self, model: &Model<'_>, index: usize, y: &[f64]) {
        use Quantity as Q;
        let s = Subject::Item(index);
        let rates = &model.items[index];
        let place = |p| y[model.building.layout.item(index, p)];
        self.put(s, Q::FreeRate, rates.free);
        self.put(s, Q::GivenOff, rates.given_off);
        self.put(s, Q::Burned, rates.burned);
        self.put(s, Q::FlamedShare, place(ItemPlace::Flamed));
        self.put(s, Q::EmberActivity, place(ItemPlace::Embers));
        self.put(s, Q::BaseOxygen, place(ItemPlace::Oxygen));
        self.put(s, Q::FuelLeft, present(place(ItemPlace::Mass)));
        self.put(s, Q::FlameHeight, rates.flame_height);
        self.put(s, Q::Progress, place(ItemPlace::Progress));
        self.put(s, Q::FreshAirAtBase, rates.lower_share);
    }
}

fn mean(stream: &super::passage::Stream, value: impl Fn(usize) -> f64) -> f64 {
    let flows = [stream.of_layer(0), stream.of_layer(1)];
    let total = flows[0] + flows[1];
    if total > STILL {
        (flows[0] * value(0) + flows[1] * value(1)) / total
    } else {
        f64::NAN
    }
}

/// Oxygen wet and dry, unburned fuel by mass, CO, CO2, H2O by volume, soot per
/// volume (kg/m3) of a layer.
fn composition(model: &Model<'_>, layer: usize) -> [f64; 7] {
    let fractions = model.layers.fractions(layer);
    let inverse = model.building.gas.inverse_molar_mass();
    let moles = dot(fractions, inverse);
    let share = |s: usize| present(fractions[s] * inverse[s] / moles);
    let fuel: f64 = fractions[FIRST_FUEL..].iter().sum();
    [
        share(O2),
        share(O2) / (1.0 - share(H2O)),
        present(fuel),
        share(CO),
        share(CO2),
        share(H2O),
        present(fractions[SOOT] * model.layers.layers[layer].density),
    ]
}
