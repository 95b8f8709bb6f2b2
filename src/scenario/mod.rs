//! The scenario as the user writes it: reading, every check with its located message.
