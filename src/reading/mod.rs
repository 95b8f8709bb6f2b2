//! Moments of a run: what happened when, read off the record.
