//! What a person at a station meets, reckoned from the record.
