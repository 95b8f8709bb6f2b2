//! A plan as a scenario file with every default written out, readable again.

mod air;

pub(super) use air::condition;

use super::fields::{KNOBS, Kind};
use crate::catalogue::catalogue;
use crate::plan::{
    Burning, Curve, Fuel, Item, Lining, OpeningId, Pane, PlacementRule, Plan, PlumeModel, Room,
    SharedWall, Station,
};
use crate::units::{Dimension, write};

/// The plan as a scenario file. Reading it back gives the same plan, without
/// the tactics that were not played.
pub fn resolved_text(plan: &Plan) -> String {
    let mut out = Writer::default();
    out.line("# The scenario as it was run, with every default written out.");
    if let Some(tactic) = &plan.tactic {
        out.line(&format!(
            "# Tactic played: {}",
            tactic.replace(['\n', '\r'], " ")
        ));
    }
    out.text("title", &plan.title);
    out.quantity("duration", plan.end, Dimension::Time);
    out.table("open_air", None);
    out.quantity(
        "temperature",
        plan.open_air.temperature,
        Dimension::Temperature,
    );
    out.quantity("humidity", plan.open_air.humidity, Dimension::Ratio);
    out.quantity("pressure", plan.open_air.pressure, Dimension::Pressure);
    for room in &plan.rooms {
        out.room(room);
    }
    for wall in &plan.shared_walls {
        out.shared_wall(wall, plan);
    }
    for lining in linings(plan) {
        out.lining(lining);
    }
    for (index, opening) in plan.openings.iter().enumerate() {
        out.opening(opening, OpeningId(index), plan);
    }
    for pane in panes(plan) {
        out.pane(pane);
    }
    for fan in &plan.fans {
        out.fan(fan, plan);
    }
    for item in &plan.items {
        out.item(item, plan);
    }
    for fuel in &plan.fuels {
        out.fuel(fuel);
    }
    for station in &plan.stations {
        out.station(station, plan);
    }
    for action in &plan.actions {
        out.action(action, plan);
    }
    for trigger in &plan.triggers {
        out.trigger(trigger, plan);
    }
    out.physics(plan);
    out.out
}

/// Distinct glass, in order of first use.
fn panes(plan: &Plan) -> Vec<&Pane> {
    let mut distinct: Vec<&Pane> = Vec::new();
    for pane in plan.openings.iter().filter_map(|o| o.pane.as_ref()) {
        if !distinct.iter().any(|known| known.name == pane.name) {
            distinct.push(pane);
        }
    }
    distinct
}

/// Distinct linings, in order of first use.
fn linings(plan: &Plan) -> Vec<&Lining> {
    let of_rooms = plan
        .rooms
        .iter()
        .flat_map(|room| [&room.walls, &room.ceiling, &room.floor]);
    let of_walls = plan.shared_walls.iter().map(|wall| &wall.lining);
    let mut distinct: Vec<&Lining> = Vec::new();
    for lining in of_rooms.chain(of_walls) {
        if !distinct.iter().any(|known| known.name == lining.name) {
            distinct.push(lining);
        }
    }
    distinct
}

#[derive(Default)]
struct Writer {
    out: String,
}

impl Writer {
    fn line(&mut self, line: &str) {
        self.out.push_str(line);
        self.out.push('\n');
    }

    fn table(&mut self, kind: &str, name: Option<&str>) {
        self.line("");
        match name {
            Some(name) => self.line(&format!("[{kind}.{}]", key(name))),
            None => self.line(&format!("[{kind}]")),
        }
    }

    fn text(&mut self, name: &str, value: &str) {
        self.line(&format!("{name} = {}", quoted(value)));
    }

    fn quantity(&mut self, name: &str, value: f64, dimension: Dimension) {
        self.line(&format!("{name} = {}", quantity(value, dimension)));
    }

    fn length(&mut self, name: &str, value: f64) {
        self.quantity(name, value, Dimension::Length);
    }

    fn place(&mut self, at: Option<[f64; 2]>) {
        if let Some([along, across]) = at {
            let text = |value| quantity(value, Dimension::Length);
            self.line(&format!("at = [{}, {}]", text(along), text(across)));
        }
    }

    fn room(&mut self, room: &Room) {
        self.table("room", Some(&room.name));
        self.length("width", room.width);
        self.length("length", room.length);
        self.length("height", room.height);
        self.length("floor_level", room.floor_level);
        self.text("walls", &room.walls.name);
        self.text("ceiling", &room.ceiling.name);
        self.text("floor", &room.floor.name);
        self.quantity("behind", room.behind, Dimension::Temperature);
        self.quantity("temperature", room.temperature, Dimension::Temperature);
    }

    fn shared_wall(&mut self, wall: &SharedWall, plan: &Plan) {
        self.table("shared_wall", Some(&wall.name));
        let rooms = wall.between.map(|id| quoted(&plan.rooms[id.0].name));
        self.line(&format!("between = [{}, {}]", rooms[0], rooms[1]));
        self.length("length", wall.length);
        self.text("lining", &wall.lining.name);
    }

    fn lining(&mut self, lining: &Lining) {
        self.table("lining", Some(&lining.name));
        self.quantity("emissivity", lining.emissivity, Dimension::Ratio);
        self.line("courses = [");
        for course in &lining.courses {
            self.line(&format!(
                "  {{ thickness = {}, conductivity = {}, density = {}, heat_capacity = {} }},",
                quantity(course.thickness, Dimension::Length),
                quantity(course.conductivity, Dimension::Conductivity),
                quantity(course.density, Dimension::Density),
                quantity(course.heat_capacity, Dimension::HeatCapacity),
            ));
        }
        self.line("]");
    }

    fn item(&mut self, item: &Item, plan: &Plan) {
        self.table("item", Some(&item.name));
        self.text("room", &plan.rooms[item.room.0].name);
        self.text("fuel", &plan.fuels[item.fuel.0].name);
        match &item.burning {
            Burning::Burner { rate, ramp, side } => {
                self.text("kind", "burner");
                self.quantity("rate", *rate, Dimension::Power);
                self.quantity("ramp", *ramp, Dimension::Time);
                self.length("side", *side);
            }
            Burning::Growing(curve) => self.load(item, curve, "freely"),
            Burning::AsGiven(curve) => self.load(item, curve, "as given"),
        }
        self.length("surface_height", item.surface_height);
        if let Some(gap) = item.gap_to_wall {
            self.length("gap_to_wall", gap);
        }
        self.line(&format!("corner = {}", item.in_corner));
        self.quantity("starts", item.ignition, Dimension::Time);
        self.place(item.at);
    }

    fn load(&mut self, item: &Item, curve: &Curve, burns: &str) {
        self.quantity("mass", item.mass, Dimension::Mass);
        self.text("burns", burns);
        match curve {
            Curve::Growth { alpha, peak } => {
                let class = catalogue().growth.iter().find(|row| row.value == *alpha);
                match class {
                    Some(row) => self.text("growth", &row.name),
                    None => self.quantity("growth", *alpha, Dimension::GrowthFactor),
                }
                self.quantity("peak", *peak, Dimension::Power);
            }
            Curve::Table(rates) => {
                self.line("growth = [");
                for (time, rate) in rates {
                    self.line(&format!(
                        "  [{}, {}],",
                        quantity(*time, Dimension::Time),
                        quantity(*rate, Dimension::Power)
                    ));
                }
                self.line("]");
            }
        }
    }

    fn fuel(&mut self, fuel: &Fuel) {
        self.table("fuel", Some(&fuel.name));
        for (name, value, dimension) in [
            ("carbon", fuel.carbon, Dimension::Ratio),
            ("hydrogen", fuel.hydrogen, Dimension::Ratio),
            ("oxygen", fuel.oxygen, Dimension::Ratio),
            ("nitrogen", fuel.nitrogen, Dimension::Ratio),
            (
                "heat_of_combustion",
                fuel.heat_of_combustion,
                Dimension::SpecificEnergy,
            ),
            ("co_yield", fuel.co_yield, Dimension::Ratio),
            ("soot_yield", fuel.soot_yield, Dimension::Ratio),
            ("residue_share", fuel.residue_share, Dimension::Ratio),
            (
                "radiative_fraction",
                fuel.radiative_fraction,
                Dimension::Ratio,
            ),
            ("limiting_oxygen", fuel.limiting_oxygen, Dimension::Ratio),
            (
                "vapour_molar_mass",
                fuel.vapour_molar_mass,
                Dimension::MolarMass,
            ),
            ("doubling_flux", fuel.doubling_flux, Dimension::Flux),
            ("critical_flux", fuel.critical_flux, Dimension::Flux),
            ("release_per_area", fuel.release_per_area, Dimension::Flux),
        ] {
            self.quantity(name, value, dimension);
        }
        self.line(&format!(
            "vapour_heat_capacity = [{}, {}]",
            quantity(fuel.vapour_heat_capacity[0], Dimension::HeatCapacity),
            quantity(fuel.vapour_heat_capacity[1], Dimension::HeatCapacitySlope)
        ));
    }

    fn station(&mut self, station: &Station, plan: &Plan) {
        self.table("station", Some(&station.name));
        self.text("room", &plan.rooms[station.room.0].name);
        if catalogue().posture(&station.posture).is_some() {
            self.text("posture", &station.posture);
        }
        self.length("height", station.height);
        let limits = &station.limits;
        self.quantity(
            "attention",
            limits.attention_temperature,
            Dimension::Temperature,
        );
        self.quantity("out", limits.out_temperature, Dimension::Temperature);
        self.quantity("oxygen", limits.oxygen, Dimension::Ratio);
        self.length("visibility", limits.visibility);
    }

    fn physics(&mut self, plan: &Plan) {
        self.table("physics", None);
        let plume = match plan.choices.plume {
            PlumeModel::McCaffrey => "McCaffrey",
            PlumeModel::Heskestad => "Heskestad",
            PlumeModel::Zukoski => "Zukoski",
        };
        let placement = match plan.choices.placement {
            PlacementRule::Weak => "weak",
            PlacementRule::Image => "image",
            PlacementRule::None => "none",
        };
        self.text("plume", plume);
        self.text("placement", placement);
        for knob in KNOBS {
            if let Kind::Quantity(dimension, ..) = knob.field.kind {
                self.quantity(knob.field.name, (knob.get)(&plan.choices), dimension);
            }
        }
    }
}

/// A quantity as a TOML value: a plain number where there is no unit.
fn quantity(value: f64, dimension: Dimension) -> String {
    let text = write(value, dimension);
    if dimension == Dimension::Ratio {
        text
    } else {
        quoted(&text)
    }
}

fn quoted(text: &str) -> String {
    toml::Value::String(text.to_owned()).to_string()
}

fn key(name: &str) -> String {
    let bare = name
        .chars()
        .all(|letter| letter.is_ascii_alphanumeric() || letter == '_' || letter == '-');
    if bare && !name.is_empty() {
        return name.to_owned();
    }
    let mut out = String::from("\"");
    for letter in name.chars() {
        if letter == '"' || letter == '\\' {
            out.push('\\');
        }
        out.push(letter);
    }
    out.push('"');
    out
}
