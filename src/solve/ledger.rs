//! What a run adds up: heat released, air that came in, and the rates of the
//! ledger's accounts.

use super::derivative::Model;
use super::layout::Account;
use crate::physics::gas::FIRST_FUEL;

/// Lit fuel leaving at which the whole release of the room begins to count for
/// the flame outside, W (own choice).
const FLAMES_OUTSIDE: f64 = 100e3;

impl Model<'_> {
    /// Heat that leaves with opening leaves, W; negative when they bring it
    /// back.
    pub(super) fn heat_of_leaves(&self, time: f64, y: &[f64]) -> f64 {
        let mut lost = 0.0;
        for leaf in &self.building.leaves {
            let opening = &self.plan.openings[leaf.opening];
            let rate = self.schedule.widening(leaf.opening, time) / opening.width;
            if rate != 0.0 {
                lost += leaf.area * rate * self.building.stored(leaf.slab, y);
            }
        }
        lost
    }

    /// Heat that leaves at a moment with leaves that jump open, J; negative when
    /// they jump shut.
    pub fn heat_of_jumps(&self, time: f64, y: &[f64]) -> f64 {
        let mut lost = 0.0;
        for leaf in &self.building.leaves {
            let (o, width) = (leaf.opening, self.plan.openings[leaf.opening].width);
            let open = |clear: f64| (clear / width).clamp(0.0, 1.0);
            let jump = open(self.schedule.clear_width(o, time))
                - open(self.schedule.clear_width_before(o, time));
            if jump != 0.0 {
                lost += leaf.area * jump * self.building.stored(leaf.slab, y);
            }
        }
        lost
    }

    /// Heat released everywhere, W.
    pub fn heat_released(&self) -> f64 {
        self.items.iter().map(|i| i.burned).sum::<f64>()
            + self.in_layers.iter().sum::<f64>()
            + self.in_jets.iter().sum::<f64>()
    }

    /// Heat release that counts for the flame outside an opening, W: that of the
    /// room behind it and of the lit fuel that leaves, once such fuel leaves.
    pub fn release_behind(&self, opening: usize) -> f64 {
        let outside = self.outside[opening];
        let rooms = self.balance.passages[opening].rooms();
        let (Some(room), true) = (rooms[0].or(rooms[1]), outside > 0.0) else {
            return 0.0;
        };
        let items = self.items.iter().zip(&self.building.items);
        let inside = items
            .filter(|(_, source)| source.room == room)
            .map(|(rates, _)| rates.burned)
            .sum::<f64>()
            + self.in_layers[room]
            + self.in_jets[room];
        outside + inside * outside / (outside + FLAMES_OUTSIDE)
    }

    /// Flow of outside air into the building, kg/s.
    pub fn air_in(&self) -> f64 {
        self.balance
            .passages
            .iter()
            .map(|p| match p.rooms() {
                [None, _] => p.streams[0].total(),
                [_, None] => p.streams[1].total(),
                _ => 0.0,
            })
            .sum()
    }

    pub(super) fn keep_ledger(&self, time: f64, y: &[f64], dy: &mut [f64]) {
        let layout = &self.building.layout;
        let outside = self.layers.outside();
        let air = self.layers.layers[outside];
        let inflow = self.air_in();
        // The outside collects outflow less inflow.
        let net = self.changes.species(outside);
        let oxygen = &self.building.oxygen_share;
        let carbon = &self.building.carbon_share;
        let fractions = self.layers.fractions(outside);
        let dot = super::layers::dot;
        let mut set = |account, value| dy[layout.account(account)] = value;
        let (mut mass, mut o, mut c) = (0.0, 0.0, 0.0);
        for (item, source) in self.items.iter().zip(&self.building.items) {
            let rate = item.given_off / self.building.reactions[source.fuel].heat;
            mass += rate;
            o += rate * oxygen[FIRST_FUEL + source.fuel];
            c += rate * carbon[FIRST_FUEL + source.fuel];
        }
        set(Account::MassGained, inflow + mass);
        set(Account::MassLost, net.iter().sum::<f64>() + inflow);
        set(Account::OxygenGained, inflow * dot(fractions, oxygen) + o);
        set(
            Account::OxygenLost,
            dot(net, oxygen) + inflow * dot(fractions, oxygen),
        );
        set(Account::CarbonGained, inflow * dot(fractions, carbon) + c);
        set(
            Account::CarbonLost,
            dot(net, carbon) + inflow * dot(fractions, carbon),
        );
        let released = self.heat_released();
        set(Account::HeatReleased, released);
        set(Account::EnergyGained, released + inflow * air.enthalpy);
        set(
            Account::EnergyLost,
            self.changes.enthalpy(outside)
                + inflow * air.enthalpy
                + self.losses.radiation
                + self.losses.backs
                + self.heat_of_leaves(time, y),
        );
    }
}
