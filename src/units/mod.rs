//! Quantities as text with units: read once at the door, written once in show.
