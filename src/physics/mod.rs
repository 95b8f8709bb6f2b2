//! The fire physics: pure functions, one file per phenomenon, no state.
