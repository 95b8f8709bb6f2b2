//! What models/ holds: fuels, linings, growth classes, door positions and gaps, each row with its source.
