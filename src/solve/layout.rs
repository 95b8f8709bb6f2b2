//! Where each quantity stands in the flat state vector. No index arithmetic
//! outside this file.
//!
//! Order: rooms (volume of the upper layer, species masses of lower and upper
//! layer, burning in jets, mixing by momentum), items (progress, mass, flamed share, embers,
//! oxygen breathed), slabs (node temperatures), mean pressure of tight groups
//! (one place per room), panes (one place per opening), ledger.

use std::ops::Range;

/// Index of the lower layer of a room in lists of two layers a room.
pub const LOWER: usize = 0;
/// Index of the upper layer.
pub const UPPER: usize = 1;

/// Places of an item's state, relative to its start.
#[derive(Debug, Clone, Copy)]
pub enum ItemPlace {
    /// Progress clock, s.
    Progress,
    /// Mass that can still be given off, kg.
    Mass,
    /// Flamed share.
    Flamed,
    /// Ember activity.
    Embers,
    /// Oxygen volume fraction breathed by the flame base.
    Oxygen,
}

const ITEM_PLACES: usize = 5;

/// Places of a room before its layers.
const ROOM_PLACES: usize = 4;

/// Accounts of the ledger.
#[derive(Debug, Clone, Copy)]
pub enum Account {
    /// Mass gained, kg.
    MassGained,
    /// Mass lost, kg.
    MassLost,
    /// Oxygen atoms gained, kg.
    OxygenGained,
    /// Oxygen atoms lost, kg.
    OxygenLost,
    /// Carbon atoms gained, kg.
    CarbonGained,
    /// Carbon atoms lost, kg.
    CarbonLost,
    /// Energy gained: heat released and enthalpy that came in, J.
    EnergyGained,
    /// Energy lost: enthalpy that went out, radiation outside, back faces, J.
    EnergyLost,
    /// Heat released, J.
    HeatReleased,
}

const ACCOUNTS: usize = 9;

/// Layout of the state vector.
#[derive(Debug, Clone)]
pub struct Layout {
    species: usize,
    items_at: usize,
    slabs: Vec<Range<usize>>,
    pressures_at: usize,
    panes_at: usize,
    ledger_at: usize,
    len: usize,
}

impl Layout {
    /// Layout for rooms, species, items and the node counts of the slabs.
    pub fn new(
        rooms: usize,
        species: usize,
        items: usize,
        nodes: &[usize],
        openings: usize,
    ) -> Self {
        let items_at = rooms * (ROOM_PLACES + 2 * species);
        let mut at = items_at + items * ITEM_PLACES;
        let mut slabs = Vec::with_capacity(nodes.len());
        for n in nodes {
            slabs.push(at..at + n);
            at += n;
        }
        let pressures_at = at;
        let panes_at = pressures_at + rooms;
        let ledger_at = panes_at + openings;
        Self {
            species,
            items_at,
            slabs,
            pressures_at,
            panes_at,
            ledger_at,
            len: ledger_at + ACCOUNTS,
        }
    }

    /// Length of the state.
    pub fn len(&self) -> usize {
        self.len
    }

    fn room(&self, room: usize) -> usize {
        room * (ROOM_PLACES + 2 * self.species)
    }

    /// Volume of the upper layer of a room, m3.
    pub fn upper_volume(&self, room: usize) -> usize {
        self.room(room)
    }

    /// Heat release in the jets that enter a room, W.
    pub fn jets(&self, room: usize) -> usize {
        self.room(room) + 1
    }

    /// How far momentum mixes a room, 0..1, lagged.
    pub fn mixed(&self, room: usize) -> usize {
        self.room(room) + 2
    }

    /// Rate at which what goes through turns a room's gas over, 1/s, lagged.
    pub fn turnover(&self, room: usize) -> usize {
        self.room(room) + 3
    }

    /// Species masses of one layer of a room, kg.
    pub fn layer(&self, room: usize, layer: usize) -> Range<usize> {
        let at = self.room(room) + ROOM_PLACES + layer * self.species;
        at..at + self.species
    }

    /// A place of an item's state.
    pub fn item(&self, item: usize, place: ItemPlace) -> usize {
        self.items_at + item * ITEM_PLACES + place as usize
    }

    /// Node temperatures of a slab, hot face first, K.
    pub fn slab(&self, slab: usize) -> Range<usize> {
        self.slabs[slab].clone()
    }

    /// Mean gauge pressure of the tight group whose first room this is, Pa.
    pub fn pressure(&self, room: usize) -> usize {
        self.pressures_at + room
    }

    /// Temperature of an opening's inner pane, K; unused without glass.
    pub fn pane(&self, opening: usize) -> usize {
        self.panes_at + opening
    }

    /// Number of places for panes.
    pub fn panes(&self) -> usize {
        self.ledger_at - self.panes_at
    }

    /// An account of the ledger.
    pub fn account(&self, account: Account) -> usize {
        self.ledger_at + account as usize
    }
}
